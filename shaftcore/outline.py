"""The shaft's outline as points, for everything that draws it."""

from functools import lru_cache
from itertools import pairwise
from typing import Any

import numpy as np

from shaftcore.geometry import faces_of
from shaftcore.notch_sites import Seating, seatings
from shaftcore.notches._contract import Around, Array
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Shaft


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
