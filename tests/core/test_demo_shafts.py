"""Each demo shaft opens, is analysed and has the difficulty it is there to show."""

import json
import math
from dataclasses import replace
from pathlib import Path

import jsonschema
import numpy as np
import pytest

from shaftcore.abutment import largest_fillet
from shaftcore.demo import FOLDER, demo_shafts
from shaftcore.evaluation import evaluate
from shaftcore.results import Results
from shaftcore.shaft import AxialForce, Shaft, Torque
from shaftcore.shaft_file import read_shaft, shaft_to_text
from shaftcore.shaft_file.schema import shaft_schema

DEMOS = demo_shafts()


def opened(name: str) -> tuple[Shaft, Results]:
    shaft = read_shaft(FOLDER / f"{name}.shaft.json")
    return shaft, evaluate(shaft)


def with_fillet(shaft: Shaft, place: str, radius: float) -> Shaft:
    """The shaft after one fillet has been dragged to that radius."""
    return replace(
        shaft,
        segments=tuple(
            replace(segment, shoulder=replace(segment.shoulder, radius=radius))
            if segment.id == place and segment.shoulder
            else segment
            for segment in shaft.segments
        ),
    )


def failing(results: Results) -> list[str]:
    """Places of the stations that miss an asked factor."""
    missed = np.minimum(results.judged.margin, results.judged.yield_margin) < 0
    return [station.place for station, miss in zip(results.stations, missed, strict=True) if miss]


def seat_limit(results: Results, place: str) -> float:
    return next(limit.allowed for limit in results.seat_limits if limit.place == place)


def test_there_are_six() -> None:
    assert len(DEMOS) >= 6


@pytest.mark.parametrize("path", DEMOS, ids=lambda path: path.name.removesuffix(".shaft.json"))
def test_opens_is_canonical_and_analysed(path: Path) -> None:
    shaft = read_shaft(path)
    assert path.read_bytes() == shaft_to_text(shaft).encode()
    jsonschema.Draft202012Validator(shaft_schema()).validate(json.loads(path.read_text(encoding="utf-8")))
    results = evaluate(shaft)
    assert not results.provisional
    assert not np.any(np.isnan(results.judged.margin))
    assert shaft.title.project
    assert shaft.title.part
    assert shaft.title.remarks
    assert shaft.material.source


def test_slurry_pump_the_bearing_forbids_the_fillet_fatigue_needs() -> None:
    """DIN 5418: a corner r_s,min of 1.5 mm lets no more than 1.5 mm seat; the step of 6 mm has room for 3 mm."""
    shaft, results = opened("slurry_pump")
    place = "wet-end seat"
    assert failing(results) == [place]
    assert seat_limit(results, place) == largest_fillet(1.5) == 1.5
    assert failing(evaluate(with_fillet(shaft, place, 1.5))) == [place]
    assert evaluate(with_fillet(shaft, place, 3.0)).sound
    seated = evaluate(with_fillet(shaft, place, 3.0))
    assert any(notice.key == "fillet too large for its bearing" for notice in seated.notices)
    overhung = [load for load in shaft.loads if load.x < min(support.x for support in shaft.supports)]
    assert len(overhung) >= 3


def test_gearbox_shaft_balances_and_bends_in_both_planes() -> None:
    """By statics: torque runs from wheel to pinion only; the locating bearing takes the difference of the thrusts."""
    shaft, results = opened("gearbox_intermediate")
    assert results.sound
    thrusts = [load.force for load in shaft.loads if isinstance(load, AxialForce)]
    assert len(thrusts) == 2
    assert thrusts[0] * thrusts[1] < 0
    assert results.along.axial_reaction[0] == pytest.approx(-sum(thrusts))
    torques = {load.x: load.torque for load in shaft.loads if isinstance(load, Torque)}
    begin, end = sorted(torques)
    inside = (results.along.x > begin) & (results.along.x < end)
    assert np.allclose(results.along.torque[0][inside], torques[begin])
    assert np.allclose(results.along.torque[0][results.along.x < begin], 0.0, atol=1e-6)
    in_both_planes = np.abs(results.along.moment[0]).max(axis=-1)
    assert in_both_planes.min() > 0.2 * in_both_planes.max()


def test_gearbox_forces_are_those_of_its_gears() -> None:
    """Ft = 2T/d, Fr = Ft tan 20°/cos β (elementary gear statics) for the sizes its remarks state."""
    shaft, _ = opened("gearbox_intermediate")
    things = {load.id: load for load in shaft.loads}
    torque = things["wheel torque"].torque
    for name, diameter, helix in (("wheel", 226.0, 16.0), ("pinion", 84.0, 11.0)):
        assert f"{diameter:g} mm, {helix:g} degrees" in shaft.title.remarks
        tangential = 2 * torque / diameter
        radial = tangential * math.tan(math.radians(20)) / math.cos(math.radians(helix))
        assert things[name].force == pytest.approx(math.hypot(tangential, radial), rel=1e-3)
        thrust = tangential * math.tan(math.radians(helix))
        assert abs(things[f"{name} thrust"].force) == pytest.approx(thrust, rel=1e-3)
        left, right = things[f"{name} tilt left"], things[f"{name} tilt right"]
        assert left.force == -right.force
        assert abs(left.force) * (right.x - left.x) == pytest.approx(thrust * diameter / 2, rel=1e-3)


def test_sheave_axle_stands_still_and_holds_only_because_it_does() -> None:
    shaft, results = opened("haul_sheave_axle")
    assert not shaft.duty.turning
    assert results.sound
    nominal, i = results.judged.nominal, results.governing
    assert 0 < nominal.bending_amplitude[i] < nominal.bending_mean[i]
    assert results.judged.yield_margin[i] < results.judged.margin[i]
    turned = evaluate(replace(shaft, duty=replace(shaft.duty, turning=True)))
    assert not turned.sound
    groove = results.station_of("keeper groove")
    assert groove is not None
    assert math.isinf(results.judged.n[groove])


def test_hollow_main_shaft_is_worst_inside_its_taper() -> None:
    """The moment falls evenly, the section modulus with the cube of d: the peak of M/W lies between the ends."""
    shaft, results = opened("hollow_main_shaft")
    assert results.sound
    assert all(segment.bore > 0 for segment in shaft.segments)
    begin = sum(segment.length for segment in shaft.segments[:3])
    taper = shaft.segments[3]
    assert taper.end_diameter is not None
    worst = results.along.x[np.argmax(results.judged_along.utilisation)]
    assert begin + 0.1 * taper.length < worst < begin + 0.9 * taper.length


def test_feed_roll_pays_for_its_starts() -> None:
    """From nothing to full torque and back: amplitude equals mean; the same torque held steady leaves more."""
    shaft, results = opened("feed_roll")
    assert results.sound
    assert "40 times an hour" in shaft.title.remarks
    torques = [load for load in shaft.loads if isinstance(load, Torque)]
    assert torques
    assert all(load.amplitude == load.torque for load in torques)
    i = results.governing
    assert results.judged.nominal.torsion_amplitude[i] == pytest.approx(results.judged.nominal.torsion_mean[i])
    steady = replace(
        shaft,
        loads=tuple(
            replace(load, torque=2 * load.torque, amplitude=0.0) if isinstance(load, Torque) else load
            for load in shaft.loads
        ),
    )
    assert evaluate(steady).judged.n[i] > 1.05 * results.judged.n[i]


def test_one_fillet_mends_what_fails() -> None:
    shaft, results = opened("mended_by_one_fillet")
    assert not results.sound
    (place,) = failing(results)
    allowed = seat_limit(results, place)
    mended = evaluate(with_fillet(shaft, place, allowed))
    assert np.all(mended.judged.margin >= 0)
    assert np.all(mended.judged.yield_margin >= 0)
    assert not any(notice.key == "fillet too large for its bearing" for notice in mended.notices)
    for other in [segment.id for segment in shaft.segments if segment.shoulder and segment.id != place]:
        blunter = min(seat_limit(results, other), 5.0)
        assert failing(evaluate(with_fillet(shaft, other, blunter))) == [place]
