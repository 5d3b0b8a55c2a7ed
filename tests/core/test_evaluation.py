"""Which place, which side and which section a station is judged on."""

import itertools
import math
from dataclasses import replace

import numpy as np
import pytest

from shaftcore.evaluation import evaluate
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import AxialForce, Duty, RadialForce, Segment, Shaft, Support, Torque

STEP = Shaft(
    segments=(Segment("a", 100.0, 40.0, shoulder=Shoulder(4.0)), Segment("b", 100.0, 50.0)),
    supports=(Support("A", 0.0, locating=True), Support("B", 200.0)),
)
GEARS = (Torque("in", 20.0, 100e3), Torque("out", 100.0, -100e3))


def loaded(*loads, **fields) -> Shaft:
    return replace(STEP, loads=loads, **fields)


def keys(results) -> set[str]:
    return {notice.key for notice in results.notices}


def torsion(shaft: Shaft, place: str = "a") -> float:
    results = evaluate(shaft)
    return float(results.judged.nominal.torsion_mean[results.station_of(place)])


def test_a_shoulder_counts_the_side_that_carries_the_torque():
    """The torque leaves at the very face: to its left 100 N·m run in the small section, W_t = π d³/16."""
    assert torsion(loaded(*GEARS)) == pytest.approx(100e3 * 16 / (math.pi * 40**3), rel=1e-12)
    onward = (Torque("in", 180.0, 100e3), Torque("out", 100.0, -100e3))
    assert torsion(loaded(*onward)) == pytest.approx(100e3 * 16 / (math.pi * 40**3), rel=1e-12)


@pytest.mark.parametrize("x", [96.5, 98.0, 99.9999999, 100.0, 100.0000001])
def test_a_torque_that_leaves_within_the_fillet_still_loads_it(x: float):
    """The fillet takes x 96 to 100; its foot carries the torque wherever in it the torque leaves."""
    assert torsion(loaded(GEARS[0], replace(GEARS[1], x=x))) == pytest.approx(100e3 * 16 / (math.pi * 40**3), rel=1e-9)


def test_a_load_and_a_support_a_rounding_apart_are_one_station_that_misses_nothing():
    shaft = loaded(Torque("in", 150.0, 100e3), Torque("out", 30.0, -100e3))
    close = replace(shaft, supports=(Support("A", 30.0 - 1e-9, locating=True), Support("B", 200.0)))
    results = evaluate(close)
    assert [s.x for s in results.stations].count(30.0) == 0
    assert results.judged.nominal.torsion_mean[results.station_of("A")] > 0


def test_stations_stand_at_seats_steps_loads_and_tapers():
    segments = (
        Segment("a", 50.0, 30.0, shoulder=Shoulder(1.0)),
        Segment("t", 60.0, 40.0, 60.0),
        Segment("c", 50.0, 60.0, bore=20.0),
    )
    shaft = Shaft(
        segments=segments,
        raisers=(Groove("g", 130.0, 1.0, 1.0),),
        supports=(Support("A", 10.0, locating=True), Support("B", 150.0)),
        loads=(RadialForce("f", 25.0, 100.0), AxialForce("p", 0.0, 50.0)),
    )
    results = evaluate(shaft)
    by_kind = {(s.kind, s.place) for s in results.stations}
    assert {
        ("shoulder", "a"),
        ("groove", "g"),
        ("plain", "A"),
        ("plain", "B"),
        ("plain", "f"),
        ("plain", "p"),
    } <= by_kind
    taper = [s.x for s in results.stations if s.label == "Taper t"]
    assert taper[-1] == pytest.approx(110.0)
    diameters = [40 + (x - 50) / 60 * 20 for x in [50.0, *taper]]
    assert max(b / a for a, b in itertools.pairwise(diameters)) < 1.15
    assert [s.number for s in results.stations] == list(range(1, len(results.stations) + 1))
    assert "bore step" in keys(results)


def test_a_bore_step_counts_the_weaker_side():
    shaft = Shaft(
        segments=(Segment("a", 100.0, 40.0), Segment("b", 100.0, 40.0, bore=30.0)),
        supports=STEP.supports,
        loads=(RadialForce("f", 100.0, 1000.0),),
    )
    results = evaluate(shaft)
    assert results.judged.bore[results.station_of("f")] == 30.0


def test_the_bending_stress_of_a_taper_is_caught_between_its_ends():
    """M grows as x and W as d³: the stress peaks where d is 1.5 times what it would be at no moment."""
    shaft = Shaft(
        segments=(Segment("t", 300.0, 20.0, 80.0), Segment("e", 40.0, 80.0)),
        supports=(Support("A", 0.0, locating=True), Support("B", 340.0)),
        loads=(RadialForce("f", 330.0, 1000.0),),
    )
    results = evaluate(shaft)
    rows = [i for i, s in enumerate(results.stations) if s.label == "Taper t"]
    fine = results.judged_along.nominal.bending_amplitude.max()
    assert results.judged.nominal.bending_amplitude[rows].max() == pytest.approx(fine, rel=0.01)


def test_turning_bends_to_and_fro_standing_keeps_mean_and_pulsation_apart():
    """One force 1000 ± 200 N mid-span: turning, all is amplitude; standing, mean 1000 and amplitude 200 N."""
    force = RadialForce("f", 60.0, 1000.0, 180.0, 200.0)
    moment = 60 * 140 / 200 * 32 / (math.pi * 40**3)
    turning = evaluate(loaded(force))
    standing = evaluate(loaded(force, duty=Duty(turning=False)))
    i = turning.station_of("f")
    assert turning.judged.nominal.bending_amplitude[i] == pytest.approx(1200 * moment)
    assert turning.judged.nominal.bending_mean[i] == 0
    assert standing.judged.nominal.bending_amplitude[i] == pytest.approx(200 * moment)
    assert standing.judged.nominal.bending_mean[i] == pytest.approx(1000 * moment)


def test_an_unloaded_overhang_has_no_stress_at_all():
    """Beyond the last support sums cancel but for rounding; n is inf there, not some huge number."""
    shaft = loaded(RadialForce("f", 47.3, 913.7, 21.0), supports=(STEP.supports[0], Support("B", 155.5)))
    results = evaluate(shaft)
    beyond = results.along.x > 155.5
    assert np.isinf(results.judged_along.n[beyond]).all()
    assert not results.along.moment[..., beyond].any()


def test_an_unloaded_shaft_is_provisional_and_an_unbalanced_torque_says_by_how_much():
    assert evaluate(STEP).provisional
    results = evaluate(loaded(Torque("in", 20.0, 100e3), Torque("out", 180.0, -90e3)))
    assert results.provisional
    assert "10 N·m" in next(n.text for n in results.notices if n.key == "unbalanced torque")
    assert not evaluate(loaded(*GEARS)).provisional


def test_axial_force_is_carried_to_the_locating_support():
    results = evaluate(loaded(AxialForce("p", 150.0, 4000.0, 500.0)))
    assert results.at.axial_reaction.tolist() == [-4000.0, -500.0]
    i = results.station_of("a")
    assert results.at.normal[:, i].tolist() == [4000.0, 500.0]
    assert results.judged.nominal.axial_mean[i] == pytest.approx(4000 / (math.pi / 4 * 40**2))
    assert not results.along.normal[:, results.along.x > 150].any()


def test_a_fillet_on_a_steep_taper_is_flagged():
    flat, steep = (
        replace(STEP, segments=(Segment("a", 100.0, d, 40.0, shoulder=Shoulder(4.0)), STEP.segments[1]))
        for d in (39.0, 10.0)
    )
    assert "fillet on a taper" not in keys(evaluate(flat))
    assert "fillet on a taper" in keys(evaluate(steep))


def test_results_name_the_governing_station_and_the_runner_up():
    results = evaluate(loaded(RadialForce("f", 60.0, 3000.0), RadialForce("g", 150.0, 800.0)))
    use = results.judged.utilisation
    assert use[results.governing] == use.max()
    assert use[results.runner_up] == np.sort(use)[-2]
    assert results.sound == bool((use <= 1).all())


def test_of_sides_alike_in_yield_the_one_in_tension_is_kept():
    """20 kN pull at the left of the support, push at its right: yield is alike, only the pull has a mean stress."""
    supports = (Support("A", 50.0, locating=True), Support("B", 200.0))
    for force in (-20e3, 20e3):
        results = evaluate(loaded(AxialForce("p", 0.0, force), AxialForce("q", 100.0, force), supports=supports))
        assert results.judged.mean[results.station_of("A")] == pytest.approx(20e3 * 4 / (math.pi * 40**2))
