"""Drawing a shaft: pull out a step, click for the next one, until Esc or Enter ends it."""

from dataclasses import dataclass, field

from app.bench.sizes import Size, size_of
from app.document import Document
from shaftcore import edits
from shaftcore.declared import Quantity, declared
from shaftcore.preferred import rounded, snapped
from shaftcore.shaft import Segment, Shaft

TELLABLE = 6.0
"""Pixels that the hand can tell apart while it pulls."""
FIELDS = ("length", "diameter")


@dataclass
class Sketch:
    """The step being pulled at the right-hand end of the shaft.

    `fixed` holds the numbers that were typed, by field; Tab goes from one field to the other.
    """

    document: Document
    fixed: dict[str, float] = field(default_factory=dict)
    at: int = 0
    pulled: dict[str, float] = field(default_factory=dict)
    drawn: int = 0

    def __post_init__(self) -> None:
        self.base: Shaft = self.document.shaft

    @property
    def begin(self) -> float:
        """x (mm) where the step begins."""
        return self.base.length

    @property
    def name(self) -> str:
        """The field that typed numbers go to."""
        return FIELDS[self.at]

    def declaration(self, name: str) -> Quantity:
        found = declared(Segment)[name]
        assert isinstance(found, Quantity)
        return found

    def tab(self) -> None:
        self.at = 1 - self.at

    def follow(self, x: float, y: float, scale: float, free: bool) -> bool:
        """Show the step pulled to x, y (mm) at that scale (px a mm); nothing while there is no step."""
        length, diameter, mm, system = (
            max(x - self.begin, 0.0),
            2 * abs(y),
            TELLABLE / scale,
            self.document.scene.system,
        )
        if free:
            length, diameter = rounded(length, mm, system), rounded(diameter, 2 * mm, system)
        else:
            length = snapped(length, "length", mm, system) if length > 0 else 0.0
            diameter = snapped(diameter, "diameter", 2 * mm, system)
        self.pulled = {"length": length, "diameter": diameter}
        return self.show()

    def fix(self, value: float) -> bool:
        """A typed number stands from now on for this step."""
        self.fixed[self.name] = value
        return self.show()

    def sizes(self) -> dict[str, float]:
        """Length and diameter as they are now, typed before pulled."""
        return {**self.pulled, **self.fixed}

    @property
    def has_step(self) -> bool:
        sizes = self.sizes()
        return all(self.declaration(name).holds(sizes.get(name, 0.0)) for name in FIELDS)

    def show(self) -> bool:
        """Preview the shaft with the step, or without one where nothing is pulled yet."""
        if not self.has_step:
            if self.document.in_gesture:
                self.document.cancel()
            return True
        sizes = self.sizes()
        return self.document.preview(edits.add_segment(self.base, sizes["length"], sizes["diameter"]))

    def keep(self) -> bool:
        """The step on the screen stays, as one named step; the next begins at its end."""
        if not self.document.in_gesture or len(self.document.shaft.segments) <= len(self.base.segments):
            return False
        self.document.commit(self.words())
        self.base, self.fixed, self.pulled, self.at = self.document.shaft, {}, {}, 0
        self.drawn += 1
        return True

    def words(self) -> str:
        """The name of the step."""
        shaft, system = self.document.shaft, self.document.scene.system
        last = shaft.segments[-1]
        length, diameter = (self.size(shaft, name) for name in FIELDS)
        return f"Draw {last.id}: {length.shown(last.length, system)} long, diameter " + diameter.shown(
            last.diameter, system
        )

    def size(self, shaft: Shaft, name: str) -> Size:
        """A size of the last segment."""
        found = size_of(shaft, ("segment", shaft.segments[-1].id), name)
        assert found is not None
        return found

    def take_back(self) -> None:
        """Give up the step being pulled, or else the one drawn before it."""
        self.document.cancel()
        if self.drawn:
            self.document.undo_stack.undo()
            self.drawn -= 1
        self.base, self.fixed, self.pulled, self.at = self.document.shaft, {}, {}, 0
