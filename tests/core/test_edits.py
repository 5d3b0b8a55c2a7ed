"""Edits keep what they promise on any shaft: lengths, places, shoulders, ids, one locating support."""

from dataclasses import replace

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from shaftcore import edits
from shaftcore.errors import UnsoundShaftError
from shaftcore.evaluation import evaluate
from shaftcore.geometry import faces_of
from shaftcore.notches.groove import Groove
from shaftcore.notches.kinds import KINDS
from shaftcore.preferred import FIRST_RADII
from shaftcore.shaft import LOAD_RECORDS, RadialForce, Segment, Shaft, Support, Torque, things

DIAMETERS = st.sampled_from([20.0, 25.0, 30.0, 40.0, 45.0])
LENGTHS = st.floats(10.0, 200.0)


@st.composite
def shafts(draw: st.DrawFn) -> Shaft:
    shaft = Shaft()
    for length, diameter in draw(st.lists(st.tuples(LENGTHS, DIAMETERS), min_size=1, max_size=6)):
        shaft = edits.add_segment(shaft, length, diameter)
    for share in draw(st.lists(st.floats(0.0, 1.0), max_size=3)):
        shaft, _ = edits.add_support(shaft, share * shaft.length)
    for share in draw(st.lists(st.floats(0.0, 1.0), max_size=3)):
        shaft, _ = edits.add_load(shaft, "radial force", share * shaft.length, 500.0)
    return shaft


def stepped() -> Shaft:
    shaft = edits.add_segment(edits.add_segment(edits.add_segment(Shaft(), 40.0, 30.0), 60.0, 40.0), 50.0, 30.0)
    shaft, _ = edits.add_support(shaft, 20.0)
    shaft, _ = edits.add_support(shaft, 130.0)
    shaft, _ = edits.add_load(shaft, "radial force", 100.0, 1000.0)
    return shaft


def every_step_has_a_shoulder(shaft: Shaft) -> bool:
    pairs = zip(shaft.segments, shaft.segments[1:], strict=False)
    return all(left.shoulder is not None for left, right in pairs if left.right_diameter != right.diameter)


@given(shafts())
@settings(max_examples=60, deadline=None)
def test_every_step_of_a_drawn_shaft_has_a_preferred_fillet_that_fits(shaft: Shaft) -> None:
    assert every_step_has_a_shoulder(shaft)
    faces = faces_of(shaft)
    for index, (left, right) in enumerate(zip(shaft.segments, shaft.segments[1:], strict=False)):
        if left.right_diameter != right.diameter:
            assert left.shoulder is not None
            assert left.shoulder.radius in FIRST_RADII
            assert left.shoulder.radius < min(left.length, right.length)
            assert faces[index + 1] - faces[index] == pytest.approx(left.length)


def test_a_drawn_and_supported_shaft_can_be_analysed_at_once() -> None:
    assert evaluate(stepped()).stations


@given(shafts(), st.integers(0, 5), st.floats(5.0, 300.0))
@settings(max_examples=60, deadline=None)
def test_a_new_length_moves_all_to_its_right_and_nothing_to_its_left(shaft: Shaft, which: int, length: float) -> None:
    index = which % len(shaft.segments)
    segment, faces = shaft.segments[index], faces_of(shaft)
    grown = length - segment.length
    changed = edits.set_length(shaft, segment.id, length)
    assert changed.length == pytest.approx(shaft.length + grown)
    for before, after in zip((*shaft.supports, *shaft.loads), (*changed.supports, *changed.loads), strict=True):
        if before.x <= faces[index]:
            assert after.x == before.x
        elif before.x >= faces[index + 1]:
            assert after.x == pytest.approx(before.x + grown)
        else:
            assert faces[index] <= after.x <= faces[index] + length + 1e-9


@given(shafts(), st.integers(0, 5), st.floats(0.1, 0.9))
@settings(max_examples=60, deadline=None)
def test_a_moved_inner_face_keeps_the_whole_length(shaft: Shaft, which: int, share: float) -> None:
    if len(shaft.segments) < 2:
        return
    index = which % (len(shaft.segments) - 1)
    faces = faces_of(shaft)
    x = faces[index] + share * (faces[index + 2] - faces[index])
    changed = edits.move_face(shaft, shaft.segments[index].id, x)
    assert faces_of(changed)[index + 1] == pytest.approx(x)
    assert changed.length == pytest.approx(shaft.length)


def test_things_at_a_face_go_with_it() -> None:
    shaft = edits.move_thing(stepped(), "F1", 100.0)
    assert things(edits.move_face(shaft, "s2", 90.0))["F1"].x == 90.0  # type: ignore[union-attr]
    assert things(edits.move_face(shaft, "s1", 30.0))["F1"].x == 100.0  # type: ignore[union-attr]


def test_the_last_face_changes_the_length_of_the_shaft() -> None:
    assert edits.move_face(stepped(), "s3", 170.0).length == pytest.approx(170.0)


def test_a_step_that_vanishes_keeps_its_record_for_its_return() -> None:
    shaft = edits.replace_shoulder(stepped(), "s1", radius=3.3, bearing_corner=1.5)
    flat = edits.set_diameter(shaft, "s2", 30.0)
    assert not [s for s in evaluate(flat).stations if s.kind == "shoulder" and s.place == "s1"]
    back = edits.set_diameter(flat, "s2", 40.0)
    assert back == shaft
    assert back.segments[0].shoulder is not None
    assert back.segments[0].shoulder.bearing_corner == 1.5


def test_a_new_diameter_never_leaves_a_step_bare() -> None:
    plain = edits.add_segment(edits.add_segment(Shaft(), 50.0, 30.0), 50.0, 30.0)
    assert plain.segments[0].shoulder is None
    assert every_step_has_a_shoulder(edits.set_diameter(plain, "s2", 36.0))
    assert every_step_has_a_shoulder(edits.make_taper(plain, "s1"))


@given(shafts(), st.integers(0, 5), st.floats(0.2, 0.8))
@settings(max_examples=40, deadline=None)
def test_split_keeps_shape_and_places(shaft: Shaft, which: int, share: float) -> None:
    index = which % len(shaft.segments)
    segment, begin = shaft.segments[index], faces_of(shaft)[index]
    changed = edits.split_segment(shaft, segment.id, begin + share * segment.length)
    assert len(changed.segments) == len(shaft.segments) + 1
    assert changed.length == pytest.approx(shaft.length)
    assert changed.segments[index].right_diameter == changed.segments[index + 1].diameter
    assert changed.segments[index + 1].shoulder == segment.shoulder
    assert (changed.supports, changed.loads) == (shaft.supports, shaft.loads)


def test_a_split_taper_stays_one_cone() -> None:
    cone = replace(Shaft(), segments=(Segment("s1", 100.0, 40.0, end_diameter=20.0),))
    left, right = edits.split_segment(cone, "s1", 25.0).segments
    assert (left.right_diameter, right.diameter, right.right_diameter) == (35.0, 35.0, 20.0)


def test_a_removed_segment_takes_its_raisers_and_keeps_the_rest_in_place() -> None:
    shaft, groove = edits.add_raiser(stepped(), "groove", 70.0)
    changed = edits.remove_thing(shaft, "s2")
    assert changed.length == pytest.approx(90.0)
    assert groove not in things(changed)
    places = {thing.id: thing.x for thing in (*changed.supports, *changed.loads)}
    assert places == {"A": 20.0, "B": pytest.approx(70.0), "F1": pytest.approx(40.0)}


@given(shafts())
@settings(max_examples=40, deadline=None)
def test_removing_every_segment_ends_in_an_empty_shaft(shaft: Shaft) -> None:
    for segment in shaft.segments:
        shaft = edits.remove_thing(shaft, segment.id)
        assert every_step_has_a_shoulder(shaft)
    assert shaft.segments == ()


def test_ids_are_free_letters_and_numbers() -> None:
    shaft = stepped()
    shaft, groove = edits.add_raiser(shaft, "groove", 70.0)
    shaft, torque = edits.add_load(shaft, "torque", 10.0, 1e5)
    shaft, force = edits.add_load(shaft, "radial force", 50.0, 10.0)
    assert (groove, torque, force) == ("g1", "T1", "F2")
    shaft = edits.remove_thing(shaft, "F1")
    assert edits.add_load(shaft, "radial force", 5.0, 1.0)[1] == "F1"
    count = len(shaft.segments) + len(shaft.raisers) + len(shaft.supports) + len(shaft.loads)
    assert len(things(shaft)) == count


def test_a_support_never_takes_the_name_of_another_thing() -> None:
    shaft = replace(stepped(), loads=(Torque(id="C", x=0.0, torque=1.0),))
    assert edits.add_support(shaft, 75.0)[1] == "D"


def test_holding_along_the_axis_passes_on() -> None:
    shaft = stepped()
    assert [support.locating for support in shaft.supports] == [True, False]
    assert edits.remove_thing(shaft, "A").supports == (Support("B", 130.0, locating=True),)
    assert [s.locating for s in edits.make_locating(shaft, "B").supports] == [False, True]
    again, _ = edits.add_support(edits.remove_thing(edits.remove_thing(shaft, "A"), "B"), 5.0)
    assert again.supports[0].locating


def test_places_are_held_on_the_shaft() -> None:
    assert things(edits.move_thing(stepped(), "A", 1e6))["A"].x == 150.0  # type: ignore[union-attr]
    assert things(edits.move_thing(stepped(), "A", -4.0))["A"].x == 0.0  # type: ignore[union-attr]


@pytest.mark.parametrize("kind", [record.kind for record in LOAD_RECORDS])
def test_every_load_can_be_put_on_with_its_size(kind: str) -> None:
    shaft, id = edits.add_load(stepped(), kind, 75.0, 123.0)
    load = things(shaft)[id]
    assert getattr(load, edits.main_quantity(load)) == 123.0


@pytest.mark.parametrize("key", [key for key, kind in KINDS.items() if kind.goes == "on a diameter"])
def test_every_raiser_kind_can_be_put_on_with_its_usual_sizes(key: str) -> None:
    shaft, id = edits.add_raiser(stepped(), key, 70.0)
    assert evaluate(shaft).station_of(id) is not None


def test_edits_of_unknown_things_change_nothing() -> None:
    shaft = stepped()
    for changed in (
        edits.replace_thing(shaft, "x", length=1.0),
        edits.replace_shoulder(shaft, "x", radius=1.0),
        edits.remove_thing(shaft, "x"),
        edits.set_length(shaft, "x", 1.0),
        edits.move_face(shaft, "x", 1.0),
        edits.split_segment(shaft, "x", 1.0),
        edits.make_taper(shaft, "x"),
    ):
        assert changed == shaft


def test_edits_refuse_nothing_soundness_does() -> None:
    for changed in (
        edits.set_length(stepped(), "s1", -5.0),
        edits.move_face(stepped(), "s1", 500.0),
        edits.replace_shoulder(stepped(), "s1", radius=400.0),
        edits.replace_thing(stepped(), "s2", bore=90.0),
        edits.replace_thing(edits.add_raiser(stepped(), "groove", 70.0)[0], "g1", depth=30.0),
    ):
        with pytest.raises(UnsoundShaftError):
            evaluate(changed)


def test_sizes_go_where_they_belong() -> None:
    shaft = edits.add_raiser(stepped(), "groove", 70.0)[0]
    assert edits.set_size(shaft, "s1", "radius", 2.0, at_step=True).segments[0].shoulder.radius == 2.0  # type: ignore[union-attr]
    assert edits.set_size(shaft, "g1", "radius", 2.0).raisers == (Groove("g1", 70.0, 1.0, 2.0),)
    assert edits.set_size(shaft, "s1", "length", 50.0).length == pytest.approx(160.0)
    assert edits.set_size(shaft, "F1", "force", 7.0).loads == (RadialForce("F1", 100.0, 7.0),)
    assert edits.set_size(shaft, "g1", "x", 1e9).raisers[0].x == 150.0
