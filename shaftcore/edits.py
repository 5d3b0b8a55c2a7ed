"""Every change that can be asked of a shaft: a shaft goes in, a new one comes out.

Edits are total: they never refuse, and say nothing about whether the result can be made or
analysed; `soundness` does. What they do keep: every step has a shoulder, its record stays when a
step vanishes, ids are never used twice, and one support holds the shaft along its axis.
"""

from dataclasses import replace
from typing import Any

from shaftcore.declared import Quantity, declared
from shaftcore.geometry import faces_of
from shaftcore.notches.kinds import KINDS
from shaftcore.notches.shoulder import Shoulder
from shaftcore.preferred import FIRST_RADII
from shaftcore.shaft import LOAD_RECORDS, Load, Segment, Shaft, Support, things

GROUPS = ("segments", "raisers", "supports", "loads")
LOAD_LETTERS = {"radial force": "F", "torque": "T", "axial force": "N"}
SHORTEST_PIECE = 0.1
"""Parts of a split segment are never shorter than this share of it."""
AT_FACE = 1e-6
"""A thing this near a face (mm) stands on it and goes with it."""


# names and records ----------------------------------------------------------------------------------


def new_id(shaft: Shaft, letter: str) -> str:
    """The first free id of a letter with a number: s1, s2, F1."""
    taken, number = things(shaft), 1
    while f"{letter}{number}" in taken:
        number += 1
    return f"{letter}{number}"


def new_support_id(shaft: Shaft) -> str:
    """The first free capital letter that no load goes by; numbers once the letters are used up."""
    taken = things(shaft)
    letters = (letter for letter in "ABCDEGHJKLMPQRSUVWXYZ" if letter not in taken)
    return next(letters, None) or new_id(shaft, "A")


def replace_thing(shaft: Shaft, id: str, /, **fields: Any) -> Shaft:
    """The thing with this id with some of its fields replaced; an unknown id changes nothing."""
    for group in GROUPS:
        entries = getattr(shaft, group)
        if any(entry.id == id for entry in entries):
            changed = tuple(replace(entry, **fields) if entry.id == id else entry for entry in entries)
            return with_shoulders(_with_group(shaft, group, changed))
    return shaft


def replace_shoulder(shaft: Shaft, segment_id: str, **fields: Any) -> Shaft:
    """The shoulder at a segment's right-hand face with some fields replaced, made where there is none."""
    index = _index(shaft, segment_id)
    if index is None:
        return shaft
    shoulder = shaft.segments[index].shoulder or Shoulder(radius=_usual_radius(shaft, index))
    return replace_thing(shaft, segment_id, shoulder=replace(shoulder, **fields))


def remove_thing(shaft: Shaft, id: str) -> Shaft:
    """Take away a segment, raiser, support or load; holding along the axis passes to another support."""
    if _index(shaft, id) is not None:
        return remove_segment(shaft, id)
    for group in GROUPS:
        entries = getattr(shaft, group)
        kept = tuple(entry for entry in entries if entry.id != id)
        if len(kept) < len(entries):
            shaft = _with_group(shaft, group, kept)
    if shaft.supports and not any(support.locating for support in shaft.supports):
        return make_locating(shaft, shaft.supports[0].id)
    return shaft


def move_thing(shaft: Shaft, id: str, x: float) -> Shaft:
    """Put a raiser, support or load at x (mm), held to the length of the shaft."""
    return replace_thing(shaft, id, x=min(max(x, 0.0), shaft.length))


def with_shoulders(shaft: Shaft) -> Shaft:
    """Every step that has no shoulder gets one; shoulders without a step are kept for their return."""
    bare = [
        index
        for index, (left, right) in enumerate(zip(shaft.segments, shaft.segments[1:], strict=False))
        if left.shoulder is None and left.right_diameter != right.diameter
    ]
    if not bare:
        return shaft
    segments = list(shaft.segments)
    for index in bare:
        segments[index] = replace(segments[index], shoulder=Shoulder(radius=_usual_radius(shaft, index)))
    return replace(shaft, segments=tuple(segments))


def _with_group(shaft: Shaft, group: str, entries: tuple[Any, ...]) -> Shaft:
    changed: dict[str, Any] = {group: entries}
    return replace(shaft, **changed)


def _index(shaft: Shaft, segment_id: str) -> int | None:
    return next((i for i, segment in enumerate(shaft.segments) if segment.id == segment_id), None)


def _usual_radius(shaft: Shaft, index: int) -> float:
    """A preferred fillet radius (mm): half the step, a twentieth of d, a quarter of the thin part at most."""
    left, right = shaft.segments[index : index + 2]
    step = abs(left.right_diameter - right.diameter) / 2
    small = min(left.right_diameter, right.diameter)
    room = min(left.length, right.length) / 4
    most = min(step / 2, small / 20, room)
    fitting = [float(radius) for radius in FIRST_RADII if radius <= most]
    return max(fitting) if fitting else min(FIRST_RADII[0], max(room, 1e-3))


def set_size(shaft: Shaft, id: str, name: str, value: float | None, at_step: bool = False) -> Shaft:
    """One declared size of a thing, or (`at_step`) of the shoulder at a segment's right-hand face."""
    if at_step:
        return replace_shoulder(shaft, id, **{name: value})
    if name == "x" and value is not None:
        return move_thing(shaft, id, value)
    if name == "length" and value is not None:
        return set_length(shaft, id, value)
    return replace_thing(shaft, id, **{name: value})


# segments -------------------------------------------------------------------------------------------


def add_segment(shaft: Shaft, length: float, diameter: float) -> Shaft:
    """A new cylinder at the right-hand end (mm), bored and finished like the one before it."""
    last = shaft.segments[-1] if shaft.segments else None
    segment = Segment(new_id(shaft, "s"), length, diameter)
    if last is not None:
        segment = replace(segment, bore=last.bore if last.bore < diameter else 0.0, finish=last.finish)
    return with_shoulders(replace(shaft, segments=(*shaft.segments, segment)))


def split_segment(shaft: Shaft, id: str, x: float) -> Shaft:
    """Divide a segment at x (mm); both parts keep its shape, the right-hand one its shoulder."""
    index = _index(shaft, id)
    if index is None:
        return shaft
    segment, begin = shaft.segments[index], faces_of(shaft)[index]
    least = SHORTEST_PIECE * segment.length
    length = min(max(x - begin, least), segment.length - least)
    middle = segment.diameter + length / segment.length * (segment.right_diameter - segment.diameter)
    tapered = segment.end_diameter is not None
    left = replace(segment, length=length, end_diameter=middle if tapered else None, shoulder=None)
    right = replace(segment, id=new_id(shaft, "s"), length=segment.length - length, diameter=middle)
    return replace(shaft, segments=(*shaft.segments[:index], left, right, *shaft.segments[index + 1 :]))


def remove_segment(shaft: Shaft, id: str) -> Shaft:
    """Take a segment out; what lies to its right closes up, supports and loads on it move to the joint."""
    index = _index(shaft, id)
    if index is None:
        return shaft
    begin, end = faces_of(shaft)[index : index + 2]
    on_it = {raiser.id for raiser in shaft.raisers if begin < raiser.x < end}
    shaft = replace(shaft, raisers=tuple(raiser for raiser in shaft.raisers if raiser.id not in on_it))
    shaft = _shifted(shaft, lambda x: x if x <= begin else max(x - (end - begin), begin))
    segments = (*shaft.segments[:index], *shaft.segments[index + 1 :])
    return with_shoulders(replace(shaft, segments=segments))


def set_length(shaft: Shaft, id: str, length: float) -> Shaft:
    """Make a segment this long (mm); the faces and things to its right move along.

    Things on the segment keep their distance from its left face and are held on it.
    """
    index = _index(shaft, id)
    if index is None:
        return shaft
    begin, end = faces_of(shaft)[index : index + 2]
    grown = length - (end - begin)
    shaft = replace_thing(shaft, id, length=length)
    return _shifted(shaft, lambda x: x + grown if x >= end - AT_FACE else max(min(x, begin + length), min(x, begin)))


def move_face(shaft: Shaft, id: str, x: float) -> Shaft:
    """Put the right-hand face of a segment at x (mm): its neighbour gives or takes, the whole keeps its length.

    Things at the face go with it; the last face changes the length of the shaft.
    """
    index = _index(shaft, id)
    if index is None:
        return shaft
    begin, face = faces_of(shaft)[index : index + 2]
    if index + 1 == len(shaft.segments):
        return set_length(shaft, id, x - begin)
    left, right = shaft.segments[index : index + 2]
    pair = (replace(left, length=x - begin), replace(right, length=right.length + face - x))
    segments = (*shaft.segments[:index], *pair, *shaft.segments[index + 2 :])
    return _shifted(replace(shaft, segments=segments), lambda at: x if abs(at - face) < AT_FACE else at)


def set_diameter(shaft: Shaft, id: str, diameter: float) -> Shaft:
    """The diameter (mm) of a cylinder, or a taper's at its left-hand end."""
    return replace_thing(shaft, id, diameter=diameter)


def make_taper(shaft: Shaft, id: str) -> Shaft:
    """A cone that runs out on the next segment's diameter, or on four fifths of its own."""
    index = _index(shaft, id)
    if index is None:
        return shaft
    segment = shaft.segments[index]
    following = shaft.segments[index + 1].diameter if index + 1 < len(shaft.segments) else segment.diameter
    end = following if following != segment.diameter else 0.8 * segment.diameter
    return replace_thing(shaft, id, end_diameter=end)


def make_cylinder(shaft: Shaft, id: str) -> Shaft:
    """A taper becomes a cylinder of its left-hand diameter."""
    return replace_thing(shaft, id, end_diameter=None)


def _shifted(shaft: Shaft, where: Any) -> Shaft:
    """Raisers, supports and loads moved by a function x -> x."""
    moved: dict[str, Any] = {
        group: tuple(thing if where(thing.x) == thing.x else replace(thing, x=where(thing.x)) for thing in entries)
        for group in ("raisers", "supports", "loads")
        if (entries := getattr(shaft, group))
    }
    return replace(shaft, **moved)


# things put on the shaft ----------------------------------------------------------------------------


def add_raiser(shaft: Shaft, kind: str, x: float) -> tuple[Shaft, str]:
    """A raiser of a registered kind at x (mm) with its usual sizes; returns its id as well."""
    id = new_id(shaft, kind[0])
    return replace(shaft, raisers=(*shaft.raisers, KINDS[kind].record(id=id, x=x))), id


def add_support(shaft: Shaft, x: float) -> tuple[Shaft, str]:
    """A support at x (mm); the first one holds the shaft along its axis. Returns its id as well."""
    id = new_support_id(shaft)
    support = Support(id, x, locating=not any(other.locating for other in shaft.supports))
    return replace(shaft, supports=(*shaft.supports, support)), id


def add_load(shaft: Shaft, kind: str, x: float, size: float) -> tuple[Shaft, str]:
    """A load at x (mm) of that size (N or N·mm); returns its id as well."""
    record = next(record for record in LOAD_RECORDS if record.kind == kind)  # type: ignore[attr-defined]
    id = new_id(shaft, LOAD_LETTERS.get(kind, kind[0].upper()))
    load: Load = record(id=id, x=x, **{main_quantity(record): size})
    return replace(shaft, loads=(*shaft.loads, load)), id


def main_quantity(record: Any) -> str:
    """The name of the field that says how large a load is: its first quantity beside the position."""
    return next(name for name, field in declared(record).items() if isinstance(field, Quantity) and name != "x")


def make_locating(shaft: Shaft, id: str) -> Shaft:
    """One support holds the shaft along its axis, the others let go."""
    held = tuple(replace(support, locating=support.id == id) for support in shaft.supports)
    return replace(shaft, supports=held)
