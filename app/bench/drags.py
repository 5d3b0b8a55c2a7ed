"""Pulling one size with the pointer, from taking hold to letting go."""

import math
from dataclasses import replace
from itertools import pairwise

from PySide6.QtCore import QPointF
from PySide6.QtGui import QDropEvent, QMouseEvent, QPainter

from app.bench.gesture import Gesture, Holder, is_free
from app.bench.hits import Grip
from app.bench.lens_at import lens_on
from app.bench.overlay import draw_band, window_band, window_of
from app.bench.readout import drag_lines
from app.bench.sizes import Size, size_of
from shaftcore import edits
from shaftcore.geometry import faces_of
from shaftcore.shaft import Shaft
from shaftcore.soundness import nearest_sound
from shaftcore.typed_numbers import parse

E_FOLD = 120.0
"""Pixels of pull that make a size e times as large."""
TELLABLE = 4.0
"""Pixels that the hand can tell apart; preferred sizes closer than this are passed over."""


class Drag(Gesture):
    """One size being pulled by its grip: previews while the pointer moves, then one step or none.

    Pulled to a size that cannot be it goes to the limit, the nearest one that can, and the hand
    says why; a typed one is refused. A typed number stands whatever the pointer does.
    """

    def __init__(self, hand: Holder, grip: Grip, press: QPointF, size: Size, whole: bool = False) -> None:
        super().__init__(hand)
        self.grip, self.size = grip, _pulled_size(self.document.shaft, grip, size, whole)
        self.base: Shaft = self.document.shaft
        self.value = size.value
        self._press, self._scale = press, self.view.ruler.scale
        self._limits: dict[bool, float] = {}
        self._least, self._most = self._pulled_between(whole)
        self.window = window_of(self.document.scene.results, size)
        self._band = None if self.window is None else window_band(self.base, size, self.window)
        self.lens = lens_on(self.view, self.document.scene, size, hand.grips, self.window, over_others=True)

    def move(self, event: QMouseEvent | QDropEvent) -> None:
        if self.hand.typed or self.size.value is None:
            return
        value = self._rested(self.size.held(self._at(event.position())), is_free(event))
        self.hand.attempt(lambda: self.set(value) or self.set(self._limit(value)))

    def set(self, value: float) -> bool:
        """Show the shaft with this number unless it stands there already; False where it cannot be."""
        if value == self.value and self.document.in_gesture:
            return True
        return self._show(self.size.apply(self.base, value), value)

    def _show(self, shaft: Shaft, value: float) -> bool:
        if not self.document.preview(shaft):
            return False
        taken = size_of(self.document.shaft, self.size.chosen, self.size.name)  # a thing stops at the shaft's end
        self.value = value if taken is None or taken.value is None else taken.value
        return True

    def read(self, text: str) -> None:
        if text:
            value = parse(text, self.size.declaration, self.document.scene.system)
            self.hand.attempt(lambda: self._show(self.size.typed(self.base, value), value))

    def press(self, event: QMouseEvent) -> None:
        """A press while a refused number still stands gives it up."""
        self.hand.end()

    def release(self, event: QMouseEvent) -> None:
        self.enter()

    def enter(self) -> None:
        """Let go: what is on the screen becomes one named step; a refused number waits to be mended."""
        if self.hand.typed and self.hand.refusal:
            return
        if self.document.in_gesture:
            words = self.size.step_words(self.value, self.document.scene.system)
            self.hand.attempt(lambda: self.document.commit(words))
        self.hand.end()

    def paint(self, painter: QPainter) -> None:
        scene, window = self.document.scene, self.window
        if window is not None and self._band is not None:
            draw_band(painter, self.view.frame, self._band, window.empty, self.view.theme)
        lines = drag_lines(scene, self.size, self.value, self.hand.typed, window)
        lens = self.lens
        clear = None if self.grip.is_line else QPointF(self.grip.x, self.grip.y)
        box = self.hand.read_out(painter, lines, None, clear, lens.room if lens else None)
        if lens is not None and self.value is not None and not box.intersects(lens.room):
            lens.paint(painter, self.value, self.view.theme, scene.system)

    def _at(self, pos: QPointF) -> float:
        """The size for a pointer at `pos`."""
        pull, start = pos - self._press, self.size.value or 0.0
        along = pull.x() * self.grip.direction[0] + pull.y() * self.grip.direction[1]
        if self.grip.law == "ratio":
            return start * math.exp(min(max(along / E_FOLD, -12.0), 12.0))
        return start + self.grip.gain * along / self._scale

    def _pulled_between(self, whole: bool) -> tuple[float, float]:
        """Nothing is pulled thinner than the hand can tell, nor a neighbour that gives way; numbers may be typed."""
        tellable, now = self._resolution(self.size.value or 0.0), self.size.value or 0.0
        if self.grip.law == "ratio" or self.size.declaration.low <= 0:
            return -math.inf, math.inf
        gives = next(
            (after for before, after in pairwise(self.base.segments) if before.id == self.grip.chosen[1]), None
        )
        if not self.grip.face or whole or gives is None:
            return min(now, tellable), math.inf
        return min(now, tellable), now + gives.length - min(gives.length, tellable)

    def _limit(self, refused: float) -> float:
        """Where the size must stop on its way to `refused`; one that was found is kept while it lies on the way."""
        sound = self.value or 0.0
        up = refused > sound
        known = self._limits.get(up)
        if known is not None and min(sound, refused) <= known <= max(sound, refused):
            return known
        unit = self.size.declaration.dimension.unit(self.document.scene.system).factor
        self._limits[up] = nearest_sound(lambda value: self.size.apply(self.base, value), sound, refused, unit)
        return self._limits[up]

    def _rested(self, value: float, free: bool) -> float:
        """The value a pull comes to rest on."""
        value, system = min(max(value, self._least), self._most), self.document.scene.system
        free_value = self.size.freely(value, self._resolution(value), system)
        if free:
            return free_value
        rest = self.size.rested(value, self._resolution(value), system)
        return rest if self._least <= rest <= self._most else free_value

    def _resolution(self, value: float) -> float:
        if self.grip.law == "ratio":
            return abs(value) * TELLABLE / E_FOLD
        return self.grip.gain * TELLABLE / self._scale


def size_under(shaft: Shaft, grip: Grip) -> Size | None:
    """The size a grip pulls; None where its thing has gone or the size is not set."""
    size = size_of(shaft, grip.chosen, grip.name)
    return None if size is None or size.value is None else size


def _pulled_size(shaft: Shaft, grip: Grip, size: Size, whole: bool) -> Size:
    """At a face the neighbour gives way, or with `whole` all to the right moves along."""
    if not grip.face or whole:
        return size
    index = [segment.id for segment in shaft.segments].index(grip.chosen[1])
    begin = faces_of(shaft)[index]
    return replace(size, apply=lambda base, value: edits.move_face(base, grip.chosen[1], begin + (value or 0.0)))
