"""From the description to the raisers as they sit on the shaft."""

from dataclasses import dataclass
from itertools import pairwise
from typing import Any

from shaftcore.geometry import around_face, around_within, faces_of, segment_index
from shaftcore.notches._contract import Around, RaiserKind, Site
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Shaft


@dataclass(frozen=True)
class Seating:
    """A raiser record with its kind and the plain shaft around it.

    `place` is the id it goes by, `site` what the formulas ask for, `path` where it stands in the
    file, `segment` the index of the segment it cuts into: at a step the thinner one.
    """

    kind: RaiserKind
    record: Any
    place: str
    around: Around
    site: Site
    path: str
    segment: int


def seatings(shaft: Shaft) -> tuple[Seating, ...]:
    """Every raiser of the shaft: each real step's shoulder, then the raisers on the segments.

    A shoulder goes by the id of the segment whose right-hand face it is. Steps without a shoulder
    and shoulders without a step are left out (`soundness` reports the former).
    """
    faces = faces_of(shaft)
    return (*_shoulders(shaft, faces), *_on_segments(shaft, faces))


def _shoulders(shaft: Shaft, faces: tuple[float, ...]) -> list[Seating]:
    found = []
    for index, (left, right) in enumerate(pairwise(shaft.segments)):
        step = right.diameter - left.right_diameter
        if left.shoulder is not None and step:
            around = around_face(left, right, faces[index + 1])
            thin = index if step > 0 else index + 1
            found.append(_seated("shoulder", left.shoulder, left.id, around, f"segments[{index}].shoulder", thin))
    return found


def _on_segments(shaft: Shaft, faces: tuple[float, ...]) -> list[Seating]:
    found = []
    for index, raiser in enumerate(shaft.raisers):
        segment = segment_index(faces, raiser.x)
        around = around_within(shaft.segments[segment], faces[segment], raiser.x)
        found.append(_seated(raiser.kind, raiser, raiser.id, around, f"raisers[{index}]", segment))
    return found


def _seated(key: str, record: Any, place: str, around: Around, path: str, segment: int) -> Seating:
    kind = KINDS[key]
    return Seating(kind, record, place, around, kind.site(record, place, around), path, segment)
