"""The sizes of whatever is chosen, each with its place in words and the way a new number is put in.

Made from the declarations of the records: pointer, keyboard, number field and menu all work on these.
"""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from app.document import Selection
from shaftcore import edits
from shaftcore.declared import Quantity, declared
from shaftcore.notches.kinds import KINDS
from shaftcore.number_text import editable
from shaftcore.preferred import SizeSort, finely, rounded, snapped, sort_of, stepped
from shaftcore.shaft import Shaft, things
from shaftcore.units import System

LAST = ("length", "x", "stiffness", "offset_y", "offset_z")
"""Sizes that stand behind all others of a thing, in this order."""


@dataclass(frozen=True)
class Size:
    """One quantity of a chosen thing: what it is, how large, and the shaft with another number for it."""

    chosen: Selection
    name: str
    declaration: Quantity
    value: float | None
    place: str
    apply: Callable[[Shaft, float | None], Shaft]

    @property
    def sort(self) -> SizeSort:
        return sort_of(self.name, self.declaration)

    @property
    def key(self) -> str:
        """Steps of one size merge under this."""
        return f"{self.chosen[0]} {self.chosen[1]} {self.name}"

    def shown(self, value: float | None, system: System) -> str:
        """A number with its unit, with every digit that matters and no more."""
        if value is None:
            return self.declaration.none_words or "none"
        return f"{editable(float(f'{value:.6g}'), self.declaration, system)} {self.unit(system)}".rstrip()

    def typed(self, shaft: Shaft, value: float | None) -> Shaft:
        """The shaft with a typed number, which is never bent to one that can be: off the shaft it is refused."""
        return edits.replace_thing(shaft, self.chosen[1], x=value) if self.name == "x" else self.apply(shaft, value)

    def unit(self, system: System) -> str:
        return self.declaration.dimension.unit(system).symbol

    def step_words(self, value: float | None, system: System) -> str:
        """The name of the step that sets this size."""
        return f"{self.declaration.label} {self.place} to {self.shown(value, system)}"

    def rested(self, value: float, resolution: float, system: System) -> float:
        """The preferred size near `value` that the declaration allows."""
        rest = snapped(value, self.sort, resolution, system, self.declaration.dimension_name)
        return self.held(rest) if self.declaration.holds(rest) or not self.declaration.holds(value) else value

    def freely(self, value: float, resolution: float, system: System) -> float:
        """`value` in steps finer than the hand can tell, so that no digits stand in it that nobody meant."""
        return self.held(rounded(value, resolution, system, self.declaration.dimension_name))

    def held(self, value: float) -> float:
        """A value kept within the declared range."""
        return min(max(value, self.declaration.low), self.declaration.high)

    def next(self, up: bool, fine: bool, system: System) -> float:
        """The next preferred size, or the next small round step."""
        now, dimension = self.value or 0.0, self.declaration.dimension_name
        if fine:
            return self.held(finely(now, up, system, dimension))
        return self.held(stepped(now, self.sort, up, system, dimension))


def at_step(chosen: Selection) -> bool:
    """True for a shoulder: a raiser that goes by the segment left of it."""
    kind = KINDS.get(chosen[0])
    return kind is not None and kind.goes == "at a step"


def record_of(shaft: Shaft, chosen: Selection | None) -> Any | None:
    """The chosen record; None where it is not, or no longer, on the shaft."""
    thing: Any = None if chosen is None else things(shaft).get(chosen[1])
    return thing.shoulder if thing is not None and chosen is not None and at_step(chosen) else thing


def place_of(shaft: Shaft, chosen: Selection) -> str:
    """The short words a thing goes by: "s2|s3" for a step, else its id."""
    if at_step(chosen):
        ids = [segment.id for segment in shaft.segments]
        if chosen[1] in ids[:-1]:
            return f"{chosen[1]}|{ids[ids.index(chosen[1]) + 1]}"
    return chosen[1]


def label_of(shaft: Shaft, chosen: Selection) -> str:
    """The words of a thing: "Shoulder s2|s3", "Support A"."""
    record = record_of(shaft, chosen)
    kind = KINDS.get(chosen[0])
    label = kind.label if kind else getattr(record, "label", "")
    return f"{label} {place_of(shaft, chosen)}".strip()


def size_of(shaft: Shaft, chosen: Selection, name: str) -> Size | None:
    """The size with that name."""
    record = record_of(shaft, chosen)
    declaration = None if record is None else declared(record).get(name)
    if not isinstance(declaration, Quantity):
        return None
    step = at_step(chosen)
    return Size(
        chosen,
        name,
        declaration,
        getattr(record, name),
        place_of(shaft, chosen),
        lambda shaft, value: edits.set_size(shaft, chosen[1], name, value, step),
    )


def sizes_of(shaft: Shaft, chosen: Selection | None) -> tuple[Size, ...]:
    """Every size of the chosen thing, the main one first; a step offers the diameters beside it too."""
    record = record_of(shaft, chosen)
    if record is None or chosen is None:
        return ()
    names = [name for name, declaration in declared(record).items() if isinstance(declaration, Quantity)]
    names.sort(key=lambda name: LAST.index(name) if name in LAST else -1)
    found = [size_of(shaft, chosen, name) for name in names]
    if at_step(chosen):
        ids = [segment.id for segment in shaft.segments]
        here = ids.index(chosen[1])
        found += [size_of(shaft, ("segment", id), "diameter") for id in ids[here : here + 2]]
        found.append(size_of(shaft, ("segment", chosen[1]), "length"))
    return tuple(size for size in found if size is not None)
