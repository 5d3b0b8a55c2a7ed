"""What can be put on a shaft: the kit's entries, made from loads, supports and the registry of raisers."""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Literal

from app.document import Selection
from shaftcore import edits
from shaftcore.geometry import around_place, faces_of, segment_index
from shaftcore.notches.kinds import KINDS
from shaftcore.preferred import snapped, stepped
from shaftcore.shaft import AxialForce, Load, RadialForce, Shaft, Support, Torque
from shaftcore.units import System

MIME = "application/x-filletwright-part"
Goes = Literal["drawn", "on the axis", "on a diameter", "at a step"]
Placed = tuple[Shaft, Selection]
FORCE_PER_AREA, TORQUE_PER_CUBE = 0.5, 1.0
"""A new load's size is this times d² or d³ (MPa), rounded: a modest one for any shaft. Common practice, no source."""


@dataclass(frozen=True)
class Tool:
    """One entry of the kit; `place` puts it on a shaft at x (mm) and says what it became."""

    key: str
    label: str
    letter: str
    goes: Goes
    words: str
    place: Callable[[Shaft, float, System], Placed] | None = None


def _support(shaft: Shaft, x: float, system: System) -> Placed:
    shaft, id = edits.add_support(shaft, x)
    return shaft, ("support", id)


def _load(record: type[Load]) -> Callable[[Shaft, float, System], Placed]:
    def place(shaft: Shaft, x: float, system: System) -> Placed:
        d = _diameter_at(shaft, x)
        sort = "torque" if edits.main_quantity(record) == "torque" else "force"
        size = TORQUE_PER_CUBE * d**3 if sort == "torque" else FORCE_PER_AREA * d**2
        size = snapped(size, "number", size / 8, system, sort)
        changed, id = edits.add_load(shaft, record.kind, x, size)
        return changed, (record.kind, id)

    return place


def _raiser(kind: str) -> Callable[[Shaft, float, System], Placed]:
    def place(shaft: Shaft, x: float, system: System) -> Placed:
        changed, id = edits.add_raiser(shaft, kind, x)
        return changed, (kind, id)

    return place


def _step(kind: str) -> Callable[[Shaft, float, System], Placed]:
    """A new step: the segment is split and its right-hand part becomes thinner by a preferred size."""

    def place(shaft: Shaft, x: float, system: System) -> Placed:
        index = segment_index(faces_of(shaft), x)
        segment = shaft.segments[index]
        changed = edits.split_segment(shaft, segment.id, x)
        right = changed.segments[index + 1]
        thinner = stepped(0.9 * right.diameter, "diameter", False, system)
        return edits.set_diameter(changed, right.id, thinner), (kind, segment.id)

    return place


def _diameter_at(shaft: Shaft, x: float) -> float:
    return around_place(shaft, x, faces_of(shaft)).left_diameter if shaft.segments else 50.0


def _with_letters(tools: tuple[Tool, ...]) -> tuple[Tool, ...]:
    """Entries without a letter get the first of their key that is still free."""
    taken = {tool.letter for tool in tools if tool.letter}
    found = []
    for tool in tools:
        letter = tool.letter or next((c for c in tool.key.upper() if c.isalpha() and c not in taken), "")
        taken.add(letter)
        found.append(Tool(tool.key, tool.label, letter, tool.goes, tool.words, tool.place))
    return tuple(found)


DRAW = Tool("draw", "Draw", "D", "drawn", "Draw the shaft step by step, on from its right-hand end")
TOOLS: tuple[Tool, ...] = _with_letters(
    (
        DRAW,
        Tool("support", Support.label, "S", "on the axis", "A bearing that carries the shaft", _support),
        *(
            Tool(record.kind, record.label, record.label[0], "on the axis", words, _load(record))
            for record, words in (
                (RadialForce, "A force across the shaft, at any angle"),
                (Torque, "A torque put into the shaft or taken out of it"),
                (AxialForce, "A force along the shaft"),
            )
        ),
        *(
            Tool(kind.key, kind.label, "", "on a diameter", kind.words, _raiser(kind.key))
            for kind in KINDS.values()
            if kind.goes == "on a diameter"
        ),
        *(
            Tool(kind.key, kind.label, "", "at a step", kind.words, _step(kind.key))
            for kind in KINDS.values()
            if kind.goes == "at a step"
        ),
    )
)
BY_KEY: dict[str, Tool] = {tool.key: tool for tool in TOOLS}
