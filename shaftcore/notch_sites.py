"""From the description to the raisers as they sit on the shaft."""

from dataclasses import dataclass
from typing import Any

from shaftcore.geometry import around_face, around_place, faces_of
from shaftcore.notches._contract import Around, RaiserKind, Site
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Shaft


@dataclass(frozen=True)
class Seating:
    """A raiser record with its kind and the plain shaft around it; `place` is the id it goes by."""

    kind: RaiserKind
    record: Any
    place: str
    around: Around

    def site(self) -> Site:
        return self.kind.site(self.record, self.place, self.around)


def seatings(shaft: Shaft) -> tuple[Seating, ...]:
    """Every raiser of the shaft: each real step's shoulder, then the raisers on the segments.

    A shoulder goes by the id of the segment whose right-hand face it is. Steps without a shoulder
    and shoulders without a step are left out (`soundness` reports the former).
    """
    faces = faces_of(shaft)
    found = []
    for left, right, x in zip(shaft.segments, shaft.segments[1:], faces[1:], strict=False):
        if left.shoulder is not None and left.right_diameter != right.diameter:
            found.append(Seating(KINDS["shoulder"], left.shoulder, left.id, around_face(left, right, x)))
    for raiser in shaft.raisers:
        found.append(Seating(KINDS[raiser.kind], raiser, raiser.id, around_place(shaft, raiser.x, faces)))
    return tuple(found)
