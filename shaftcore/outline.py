"""The shaft's outline as points, for everything that draws it."""

import math
from dataclasses import replace
from functools import lru_cache
from itertools import pairwise
from typing import Any

import numpy as np

from shaftcore.geometry import faces_of
from shaftcore.notch_sites import Seating, seatings
from shaftcore.notches._contract import Around, Array
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Shaft

RING_SHOWN = 12.0
"""How much of a ring is drawn along its seat and its face, in corner dimensions."""


def upper_outline(shaft: Shaft, seated: tuple[Seating, ...] | None = None) -> Array:
    """Points (n, 2) of (x, radius), mm, left to right along the upper edge; (0, 2) without segments.

    Fillets and grooves are the arcs their kinds draw, tapers are straight, a step without a
    shoulder is a sharp corner. Both ends of the shaft are in; the end faces down to the axis are not.
    `seated` are the shaft's seatings, where the caller has them at hand.
    """
    if not shaft.segments:
        return np.empty((0, 2))
    seated = seatings(shaft) if seated is None else seated
    at_steps = {s.around.x for s in seated if s.kind.goes == "at a step"}
    pieces = [(s.around.x, _piece(s.kind.key, s.record, s.around)) for s in seated]
    corners = [(x, points) for x, points in _corners(shaft) if x not in at_steps]
    return np.concatenate([points for _, points in sorted(corners + pieces, key=lambda piece: piece[0])])


def bore_outline(shaft: Shaft) -> Array:
    """Points (2 n, 2) of (x, bore radius), mm, two for each of n segments; radius 0 where solid."""
    faces = faces_of(shaft)
    rows = [(x, segment.bore / 2) for segment, ends in zip(shaft.segments, pairwise(faces), strict=True) for x in ends]
    return np.array(rows, dtype=float).reshape(-1, 2)


def outline_with(seating: Seating, name: str, value: float) -> Array:
    """Points (n, 2) of a raiser's outline, mm, with another value for one of its sizes."""
    return seating.kind.outline(replace(seating.record, **{name: value}), seating.around)


def outline_between(shaft: Shaft, seating: Seating) -> Array:
    """A raiser's outline, mm, with the plain edge left and right of it to the ends of its segments."""
    faces, segments, around = faces_of(shaft), shaft.segments, seating.around
    if seating.kind.goes == "at a step":
        first = next(index for index, segment in enumerate(segments) if segment.id == seating.place)
        last = first + 1
    else:
        first = last = seating.segment
    begin = (faces[first], segments[first].diameter / 2)
    end = (faces[last + 1], segments[last].right_diameter / 2)
    return np.vstack([[begin], _piece(seating.kind.key, seating.record, around), [end]])


def ring_corner(seating: Seating) -> Array | None:
    """The corner (n, 2) mm of the ring that seats against a step; None where none is declared.

    The arc that no ring's corner may project beyond has its corner dimension as radius (ISO 582).
    From a place on the seat round the arc to a place on the face, both some radii away.
    """
    corner, around = getattr(seating.record, "bearing_corner", None), seating.around
    if not corner:
        return None
    along = -1.0 if around.left_diameter <= around.right_diameter else 1.0
    seat, turn = min(around.left_diameter, around.right_diameter) / 2, np.linspace(0.0, math.pi / 2, 13)
    arc = np.column_stack([around.x + along * corner * (1 - np.sin(turn)), seat + corner * (1 - np.cos(turn))])
    far = RING_SHOWN * corner
    return np.vstack([[(around.x + along * far, seat)], arc, [(around.x, seat + far)]])


def _corners(shaft: Shaft) -> list[tuple[float, Array]]:
    """The plain points at every face: one at each end, two where the diameter steps."""
    faces, segments = faces_of(shaft), shaft.segments
    radii = [
        (segments[0].diameter / 2,),
        *((a.right_diameter / 2, b.diameter / 2) for a, b in pairwise(segments)),
        (segments[-1].right_diameter / 2,),
    ]
    return [
        (x, np.array([(x, radius) for radius in dict.fromkeys(either)])) for x, either in zip(faces, radii, strict=True)
    ]


@lru_cache(maxsize=4096)
def _piece(kind: str, record: Any, around: Around) -> Array:
    """One raiser's arc; remembered, since a drag changes few raisers at a time."""
    points = KINDS[kind].outline(record, around)
    points.flags.writeable = False
    return points
