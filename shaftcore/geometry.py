"""Where things lie on a shaft, and the plain section at any place."""

from bisect import bisect_right
from collections.abc import Sequence
from dataclasses import dataclass
from itertools import accumulate

import numpy as np
from numpy.typing import NDArray

from shaftcore.notches._contract import Around, Array
from shaftcore.shaft import Segment, Shaft
from shaftcore.surface import FINISHES

FINISH_NUMBER = {name: index for index, (name, _) in enumerate(FINISHES)}


@dataclass(frozen=True, eq=False)
class Profile:
    """The segments as arrays: faces x (n+1), diameters at both ends, bores, finish numbers (n)."""

    faces: Array
    left: Array
    right: Array
    bore: Array
    finish: NDArray[np.intp]

    def segment_at(self, x: Array, side: Array) -> NDArray[np.intp]:
        """Index of the segment just left (side < 0) or right of each x."""
        inner = self.faces[1:-1]
        index = np.where(side < 0, np.searchsorted(inner, x, "left"), np.searchsorted(inner, x, "right"))
        return index.astype(np.intp)

    def diameter_at(self, x: Array, segment: NDArray[np.intp]) -> Array:
        """Outer diameter (mm) at x taken within the given segments."""
        begin, end = self.faces[segment], self.faces[segment + 1]
        share = np.clip((x - begin) / (end - begin), 0.0, 1.0)
        return self.left[segment] + share * (self.right[segment] - self.left[segment])


def faces_of(shaft: Shaft) -> tuple[float, ...]:
    """x (mm) of every face, both ends included: one more than there are segments."""
    return tuple(accumulate((segment.length for segment in shaft.segments), initial=0.0))


def profile_of(shaft: Shaft) -> Profile:
    """The shaft's segments as arrays."""
    segments = shaft.segments
    return Profile(
        faces=np.array(faces_of(shaft)),
        left=np.array([s.diameter for s in segments], dtype=float),
        right=np.array([s.right_diameter for s in segments], dtype=float),
        bore=np.array([s.bore for s in segments], dtype=float),
        finish=np.array([FINISH_NUMBER[s.finish] for s in segments], dtype=np.intp),
    )


def around_face(left: Segment, right: Segment, x: float) -> Around:
    """The plain shaft either side of the face at x between two segments."""
    return Around(x, left.right_diameter, right.diameter, left.bore, right.bore, left.finish, right.finish)


def segment_index(faces: Sequence[float], x: float) -> int:
    """Index of the segment at x; at a face the one to its right, the outermost beyond the ends."""
    return min(max(bisect_right(faces, x) - 1, 0), len(faces) - 2)


def around_place(shaft: Shaft, x: float, faces: Sequence[float]) -> Around:
    """The plain shaft either side of any place inside the shaft, which must have a segment."""
    index = segment_index(faces, x)
    return around_within(shaft.segments[index], faces[index], x)


def around_within(segment: Segment, begin: float, x: float) -> Around:
    """The plain shaft either side of a place x within a segment that begins at `begin`."""
    share = min(max((x - begin) / segment.length, 0.0), 1.0)
    d = segment.diameter + share * (segment.right_diameter - segment.diameter)
    return Around(x, d, d, segment.bore, segment.bore, segment.finish, segment.finish)
