"""What every gesture on the bench can be asked; the hand holds one at a time."""

from typing import TYPE_CHECKING

from PySide6.QtCore import QPointF, Qt
from PySide6.QtGui import QDropEvent, QMouseEvent, QPainter

from shaftcore.shaft import Shaft

if TYPE_CHECKING:
    from app.bench.hand import BenchHand

STARTS_AT = 4.0
"""Pixels of movement that turn a press into a pull, so that a click changes nothing."""


class Gesture:
    """Something under way between hand and shaft. Without an answer of its own a gesture does nothing.

    `key` is the kit's entry it belongs to ("" for none), `base` the shaft it began on, where it
    previews changes of it. `done` is told when the hand gives it up, after the document is at rest.
    """

    key = ""
    base: Shaft | None = None

    def __init__(self, hand: "BenchHand") -> None:
        self.hand, self.view, self.document = hand, hand.view, hand.document

    def press(self, event: QMouseEvent) -> None: ...

    def move(self, event: QMouseEvent | QDropEvent) -> None: ...

    def release(self, event: QMouseEvent) -> None: ...

    def leave(self) -> None: ...

    def read(self, text: str) -> None:
        """The number typed so far, "" once it is wiped; QuantityError where it is none."""

    def enter(self) -> None: ...

    def tab(self) -> None: ...

    def back(self) -> None:
        """Backspace with nothing typed."""

    def arrow(self, right: bool, fine: bool) -> None: ...

    def done(self) -> None: ...

    def paint(self, painter: QPainter) -> None: ...


def is_free(event: QMouseEvent | QDropEvent) -> bool:
    """Ctrl leaves preferred sizes aside."""
    return bool(event.modifiers() & Qt.KeyboardModifier.ControlModifier)


def has_shift(event: QMouseEvent | QDropEvent) -> bool:
    return bool(event.modifiers() & Qt.KeyboardModifier.ShiftModifier)


def is_far(pos: QPointF, start: QPointF) -> bool:
    """True once a pressed pointer has moved enough to mean it."""
    return (pos - start).manhattanLength() > STARTS_AT
