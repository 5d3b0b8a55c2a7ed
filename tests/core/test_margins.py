"""From beam loads to margins: what alternates, which section counts, what the factors are compared with."""

from dataclasses import replace

import numpy as np
import pytest
from varied_shafts import STANDING, TURNING

from shaftcore.evaluation import evaluate
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.results import Results
from shaftcore.shaft import AxialForce, Duty, Judgement, RadialForce, Segment, Shaft, Support, Torque

BAR = Shaft(
    segments=(Segment("bar", 400.0, 40.0, bore=20.0),),
    supports=(Support("left", 0.0, locating=True), Support("right", 400.0)),
    loads=(
        RadialForce("middle", 200.0, 1000.0, 180.0, 300.0),
        Torque("in", 100.0, 80e3, 20e3),
        Torque("out", 300.0, -80e3, -20e3),
    ),
)
W = np.pi * (40**4 - 20**4) / (32 * 40)


def _at(results: Results, x: float) -> int:
    return next(i for i, station in enumerate(results.stations) if abs(station.x - x) < 1e-9)


def test_a_turning_shaft_is_bent_to_and_fro_by_the_whole_moment() -> None:
    """Statics by hand: 1000 N in the middle of 400 mm bends by F L/4 = 100 N·m, its swing by 30 N·m more."""
    results = evaluate(BAR)
    nominal, i = results.judged.nominal, _at(results, 200.0)
    assert nominal.bending_amplitude[i] == pytest.approx(130e3 / W)
    assert nominal.bending_mean[i] == 0
    assert nominal.torsion_mean[i] == pytest.approx(80e3 / (2 * W))
    assert nominal.torsion_amplitude[i] == pytest.approx(20e3 / (2 * W))


def test_a_standing_shaft_sees_mean_and_swing_apart() -> None:
    results = evaluate(replace(BAR, duty=Duty(turning=False)))
    nominal, i = results.judged.nominal, _at(results, 200.0)
    assert nominal.bending_amplitude[i] == pytest.approx(30e3 / W)
    assert nominal.bending_mean[i] == pytest.approx(100e3 / W)


def test_torque_the_other_way_round_is_as_bad() -> None:
    turned = replace(BAR, loads=(BAR.loads[0], Torque("in", 100.0, -80e3, -20e3), Torque("out", 300.0, 80e3, 20e3)))
    for one, other in (("torsion_mean", "torsion_mean"), ("torsion_amplitude", "torsion_amplitude")):
        found = getattr(evaluate(turned).judged.nominal, one)
        assert found == pytest.approx(getattr(evaluate(BAR).judged.nominal, other))
        assert np.all(found >= 0)


def test_stress_is_taken_on_the_net_section() -> None:
    grooved = replace(BAR, raisers=(Groove("cut", 200.0, 3.0, 2.0),))
    results = evaluate(grooved)
    i = _at(results, 200.0)
    assert results.judged.d[i] == 34.0
    assert results.judged.nominal.bending_amplitude[i] == pytest.approx(130e3 * 32 * 34 / (np.pi * (34**4 - 20**4)))


def test_axial_alone_takes_no_size_factor_on_either_overhang() -> None:
    """Moments left over from summing forces must not decide about kb, left and right alike."""
    shaft = Shaft(
        segments=(Segment("bar", 900.0, 40.0),),
        supports=(Support("left", 200.0), Support("right", 700.0, locating=True)),
        loads=(
            RadialForce("middle", 433.3, 7777.7, 133.0),
            AxialForce("a", 100.0, 0.0, 5e3),
            AxialForce("b", 800.0, 0.0, -5e3),
            AxialForce("c", 0.0, 0.0, 1e3),
            AxialForce("d", 900.0, 0.0, -1e3),
        ),
    )
    results = evaluate(shaft)
    for x in (100.0, 800.0):
        assert results.judged.strength.kb[_at(results, x)] == 1.0
    assert results.judged.strength.kb[_at(results, 433.3)] < 0.9


def test_finish_of_the_raiser_counts_at_the_raiser() -> None:
    ground, rough = (
        evaluate(replace(TURNING, segments=(replace(TURNING.segments[0], shoulder=Shoulder(1.2, finish=finish)),
                                            *TURNING.segments[1:])))
        for finish in ("ground", "as-forged")
    )  # fmt: skip
    i = next(i for i, station in enumerate(ground.stations) if station.kind == "shoulder")
    assert ground.judged.strength.ka[i] > rough.judged.strength.ka[i]
    assert ground.judged.n[i] > rough.judged.n[i]


def test_margins_are_factor_over_asked() -> None:
    asked = replace(TURNING, judgement=Judgement(asked_factor=2.0, asked_yield_factor=3.0))
    judged, plain = evaluate(asked).judged, evaluate(TURNING).judged
    loaded = np.isfinite(judged.n)
    assert judged.n == pytest.approx(plain.n)
    assert judged.margin[loaded] == pytest.approx(judged.n[loaded] / 2.0 - 1)
    assert judged.yield_margin[loaded] == pytest.approx(judged.n_yield[loaded] / 3.0 - 1)
    assert judged.utilisation == pytest.approx(np.maximum(2.0 / judged.n, 3.0 / judged.n_yield))


def test_switches_only_ever_help_when_switched_off() -> None:
    for shaft in (TURNING, STANDING):
        with_all = evaluate(replace(shaft, judgement=Judgement())).judged
        steady = evaluate(replace(shaft, judgement=Judgement(notch_on_steady_torque=False))).judged
        bare = evaluate(replace(shaft, judgement=Judgement(notch_on_yield=False))).judged
        assert np.all(steady.n >= with_all.n * (1 - 1e-12))
        assert np.all(bare.n_yield >= with_all.n_yield * (1 - 1e-12))
        assert bare.n == pytest.approx(with_all.n)
