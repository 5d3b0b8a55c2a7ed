"""Laws that hold for every shaft, whatever its shape and loads."""

import copy
import pickle
from dataclasses import fields, is_dataclass, replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from sound_shafts import mirrored, scaled, sound_shafts, turned, with_loads_times

from shaftcore.beam_loads import beam_loads
from shaftcore.evaluation import evaluate
from shaftcore.geometry import profile_of
from shaftcore.judged_places import trace_points
from shaftcore.nomenclature import COLUMNS
from shaftcore.notch_sites import seatings
from shaftcore.shaft import AxialForce, RadialForce, Segment, Shaft, Support
from shaftcore.stations import place_stations

FEW = settings(max_examples=60, deadline=None)
NOTHING = 1e-12
"""Utilisation, deflection (mm), slope or force (N) left of large forces that cancel on a support: rounding."""

STRESSES = (
    "bending_amplitude",
    "bending_mean",
    "axial_amplitude",
    "axial_mean",
    "torsion_amplitude",
    "torsion_mean",
)


def alike(one, other, rel=1e-7):
    """Equal but for rounding, measured on the largest entry; inf where inf."""
    one, other = np.asarray(one, dtype=float), np.asarray(other, dtype=float)
    bulk = np.abs(one[np.isfinite(one)]).max(initial=0.0)
    np.testing.assert_allclose(other, one, rtol=rel, atol=rel * 1e-2 * bulk + NOTHING)


@FEW
@given(sound_shafts())
def test_mirroring_the_shaft_leaves_every_station_as_it_was(shaft: Shaft):
    results, behind = evaluate(shaft), evaluate(mirrored(shaft))
    alike([s.x for s in results.stations], [shaft.length - s.x for s in reversed(behind.stations)])
    for name in ("utilisation", "amplitude", "mean", "greatest", "d"):
        alike(getattr(results.judged, name), getattr(behind.judged, name)[::-1], 1e-6)
    alike(results.factors.kf, behind.factors.kf[:, ::-1])
    alike(results.at.reactions[..., 0], behind.at.reactions[..., 0], 1e-6)


@FEW
@given(sound_shafts(), st.sampled_from([0.5, 2.0, 4.0]))
def test_scaling_all_lengths_with_forces_as_areas_leaves_nominal_stresses(shaft: Shaft, k: float):
    """Size, finish and notch sensitivity know millimetres, so n changes; the nominal stresses and Kt do not."""
    results, larger = evaluate(shaft), evaluate(scaled(shaft, k))
    nominal, nominal_larger = results.judged_along.nominal, larger.judged_along.nominal
    for name in STRESSES:
        np.testing.assert_allclose(getattr(nominal_larger, name), getattr(nominal, name), rtol=1e-9)
    np.testing.assert_allclose(larger.factors.kt, results.factors.kt, rtol=1e-12)
    alike(results.along.deflection * k, larger.along.deflection)
    alike(results.along.slope, larger.along.slope)


@FEW
@given(sound_shafts(offsets=False), st.integers(0, 6))
def test_superposing_loads_adds_what_they_do(shaft: Shaft, count: int):
    profile = profile_of(shaft)
    x, side = trace_points(shaft, profile, place_stations(shaft, profile, seatings(shaft)))

    def under(loads):
        return beam_loads(replace(shaft, loads=loads), profile, x, side)

    both, one, other = under(shaft.loads), under(shaft.loads[:count]), under(shaft.loads[count:])
    for name in ("moment", "shear", "normal", "torque", "deflection", "slope", "reactions", "axial_reaction"):
        parts = getattr(one, name), getattr(other, name)
        bulk = max(np.abs(part).max(initial=0.0) for part in parts)
        np.testing.assert_allclose(sum(parts), getattr(both, name), rtol=1e-9, atol=1e-9 * bulk + NOTHING)


@FEW
@given(sound_shafts())
def test_offsets_add_to_the_steady_loads_alone(shaft: Shaft):
    """What the shaft carries is what its loads do on supports in line, and what the offsets do without loads."""
    profile = profile_of(shaft)
    x, side = trace_points(shaft, profile, place_stations(shaft, profile, seatings(shaft)))
    in_line = replace(shaft, supports=tuple(replace(s, offset_y=0.0, offset_z=0.0) for s in shaft.supports))
    both, loaded = beam_loads(shaft, profile, x, side), beam_loads(in_line, profile, x, side)
    bare = beam_loads(replace(shaft, loads=()), profile, x, side)
    for name in ("moment", "shear", "deflection", "slope", "reactions"):
        parts = getattr(loaded, name), getattr(bare, name)
        bulk = max(np.abs(part).max(initial=0.0) for part in parts)
        np.testing.assert_allclose(sum(parts), getattr(both, name), rtol=1e-9, atol=1e-9 * bulk + NOTHING)
        assert not parts[1][1].any(), name


@FEW
@given(sound_shafts(), st.floats(-180, 180))
def test_turning_loads_and_offsets_about_the_axis_leaves_every_n(shaft: Shaft, degrees: float):
    results, other = evaluate(shaft), evaluate(turned(shaft, degrees))
    alike(results.judged.utilisation, other.judged.utilisation)
    alike(results.judged_along.utilisation, other.judged_along.utilisation)
    alike(np.hypot(*results.along.deflection[0]), np.hypot(*other.along.deflection[0]), 1e-6)


def test_turning_the_loads_alone_past_an_offset_changes_n():
    """A support 0.1 mm too low helps against a load from above as much as it harms under one from below."""
    from_above = Shaft(
        segments=(Segment("s", 600.0, 40.0),),
        supports=(Support("A", 0.0, locating=True), Support("B", 300.0, offset_y=-0.1), Support("C", 600.0)),
        loads=(RadialForce("f", 150.0, 5000.0, 180.0),),
    )
    turned_back = replace(turned(from_above, 180.0), supports=from_above.supports)
    assert min(evaluate(from_above).judged.n) != pytest.approx(min(evaluate(turned_back).judged.n), rel=0.1)


@FEW
@given(sound_shafts(offsets=False), st.floats(1.0, 3.0))
def test_n_falls_in_proportion_as_all_loads_are_scaled_up_together(shaft: Shaft, k: float):
    """Both rules follow the line on which amplitude and mean grow together, so n never rises."""
    results, more = evaluate(shaft), evaluate(with_loads_times(shaft, k, k))
    for name in ("n", "n_yield"):
        before, after = getattr(results.judged, name), getattr(more.judged, name)
        assert np.all(after <= before * (1 + 1e-9))
    alike(results.judged.utilisation * k, more.judged.utilisation)


@FEW
@given(sound_shafts())
def test_equal_shafts_give_equal_results_and_no_nan(shaft: Shaft):
    results, again = evaluate(shaft), evaluate(copy.deepcopy(shaft))
    for name, one, other in zip_arrays(results, again):
        np.testing.assert_array_equal(one, other, err_msg=name)
        assert not np.isnan(one).any(), name
    assert results.notices == again.notices
    assert results.stations == again.stations
    for column in COLUMNS:
        assert all(value is None or value == value for value in column.values(results)), column.key


def zip_arrays(one, other, path=""):
    for f in fields(one):
        a, b = getattr(one, f.name), getattr(other, f.name)
        if isinstance(a, np.ndarray):
            yield path + f.name, a, b
        elif is_dataclass(a) and not isinstance(a, Shaft):
            yield from zip_arrays(a, b, f"{path}{f.name}.")


@FEW
@given(sound_shafts())
def test_statics(shaft: Shaft):
    """Forces and moments of each plane and set balance, and no moment is left beyond the ends."""
    results = evaluate(shaft)
    loads = results.along
    at = np.array([support.x for support in shaft.supports])
    forces = [load for load in shaft.loads if load.kind == "radial force"]
    for plane, direction in enumerate((np.cos, np.sin)):
        share = np.array([direction(np.radians(f.angle)) for f in forces])
        x = np.array([f.x for f in forces])
        swing = [np.copysign(f.amplitude, f.force) for f in forces]
        for sort, size in enumerate((np.array([f.force for f in forces]), np.array(swing))):
            reaction, own = loads.reactions[sort, plane], size * share
            bulk = np.abs(size).sum() + np.abs(reaction).sum() + 1e-12
            assert reaction.sum() + own.sum() == pytest.approx(0, abs=1e-9 * bulk)
            assert (reaction * at).sum() + (own * x).sum() == pytest.approx(0, abs=1e-9 * bulk * shaft.length)
    bulk = np.abs(loads.moment).max() + np.abs(loads.reactions).max() * shaft.length + 1e-12
    assert np.abs(loads.moment[..., [0, -1]]).max() <= 1e-10 * bulk
    pushes = sum(load.force for load in shaft.loads if isinstance(load, AxialForce))
    assert loads.axial_reaction[0] == pytest.approx(-pushes, abs=1e-6)


@FEW
@given(sound_shafts())
def test_the_shaft_lies_on_its_seats_and_springs(shaft: Shaft):
    """Deflection at a support is its offset less what its spring gives, mean and pulsation alike."""
    loads = evaluate(shaft).along
    bulk = np.abs(loads.deflection).max() + 1e-12
    for i, support in enumerate(shaft.supports):
        yielding = loads.reactions[..., i] / (support.stiffness or np.inf)
        seat = np.array([[support.offset_y, support.offset_z], [0.0, 0.0]])
        found = loads.deflection[..., loads.x == support.x]
        assert np.abs(found - (seat - yielding)[..., None]).max() <= 1e-9 * bulk + NOTHING
    assert np.all(np.isfinite(loads.deflection))


@settings(max_examples=10, deadline=None)
@given(sound_shafts())
def test_results_can_be_sent_to_another_process_and_not_be_changed(shaft: Shaft):
    results = evaluate(shaft)
    assert pickle.loads(pickle.dumps(results)).notices == results.notices
    for name, array, _ in zip_arrays(results, results):
        assert not array.flags.writeable, name
