"""What every gesture on the bench can be asked, and what it may ask of the hand that holds it."""

from collections.abc import Callable
from typing import Protocol

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QDropEvent, QMouseEvent, QPainter

from app.bench.hits import Grip
from app.bench.readout import Lines
from app.bench.sizes import Size
from app.bench.view import BenchView
from app.document import Document, Selection
from shaftcore.shaft import Shaft

STARTS_AT = 4.0
"""Pixels of movement that turn a press into a pull, so that a click changes nothing."""


class Holder(Protocol):
    """The hand as gestures, keys and menu see it.

    `typed` is the number typed so far, `refusal` why the last change was not taken.
    """

    view: BenchView
    document: Document
    gesture: "Gesture | None"
    typed: str
    refusal: str

    @property
    def grips(self) -> tuple[Grip, ...]: ...

    def choose(self, chosen: Selection | None) -> None: ...

    def attempt(self, change: Callable[[], object]) -> None: ...

    def say(self, words: str) -> None: ...

    def type_number(self, text: str) -> None: ...

    def open_field(self, size: Size, at: QPointF, typed: str = "") -> None: ...

    def read_out(
        self,
        painter: QPainter,
        lines: Lines,
        at: QPointF | None = None,
        clear: QPointF | None = None,
        taken: QRectF | None = None,
    ) -> QRectF: ...

    def end(self) -> None: ...


class Gesture:
    """Something under way between hand and shaft. Without an answer of its own a gesture does nothing.

    `key` is the kit's entry it belongs to ("" for none), `base` the shaft it began on, where it
    previews changes of it. `done` is told when the hand gives it up, after the document is at rest.
    """

    key = ""
    base: Shaft | None = None

    def __init__(self, hand: Holder) -> None:
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
