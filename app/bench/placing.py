"""Putting a thing of the kit on the shaft: it follows the pointer, a click or Enter sets it down."""

import itertools
import math

from PySide6.QtGui import QDropEvent, QMouseEvent, QPainter

from app.bench.gesture import Gesture, Holder, has_shift, is_free
from app.bench.overlay import draw_ghost
from app.bench.sizes import label_of
from app.bench.tools import Tool
from shaftcore.declared import Quantity, declared
from shaftcore.geometry import faces_of
from shaftcore.preferred import finely, rounded, snapped, stepped
from shaftcore.shaft import Shaft, Support
from shaftcore.typed_numbers import parse
from shaftcore.units import System

TELLABLE, PULL = 4.0, 8.0
"""Pixels the hand can tell apart, and within which a face or the middle of a segment draws things to it."""


HINT = "click or Enter: put it here   Esc: put it back"


class Placing(Gesture):
    """A tool in hand. `x` (mm) is where it would go, None while the pointer is elsewhere."""

    def __init__(self, hand: Holder, tool: Tool) -> None:
        super().__init__(hand)
        self.tool, self.key = tool, tool.key
        self.x: float | None = self.document.shaft.length / 2 if self.document.shaft.segments else None
        declaration = declared(Support)["x"]
        assert isinstance(declaration, Quantity)
        self._declaration = declaration

    def press(self, event: QMouseEvent) -> None:
        self.move(event)
        self.set_down(keep=has_shift(event))

    def move(self, event: QMouseEvent | QDropEvent) -> None:
        if not self.hand.typed:
            self._point(event)

    def leave(self) -> None:
        self.x = None
        self.view.update()

    def read(self, text: str) -> None:
        if text:
            self.x = parse(text, self._declaration, self.document.scene.system)
            self.view.update()

    def arrow(self, right: bool, fine: bool) -> None:
        length, system = self.document.shaft.length, self.document.scene.system
        now = length / 2 if self.x is None else self.x
        moved = finely(now, right, system) if fine else stepped(now, "place", right, system)
        self.x = min(max(moved, 0.0), length)
        self.view.update()

    def enter(self) -> None:
        self.set_down()

    def set_down(self, keep: bool = False) -> None:
        """Put the thing on the shaft and choose it; with `keep` another one follows."""
        scene, tool, hand = self.document.scene, self.tool, self.hand
        if tool.place is None or self.x is None:
            return
        if not scene.shaft.segments:
            hand.say(f"{tool.label}: there is no shaft to put it on yet; draw one first")
            return
        shaft, chosen = tool.place(scene.shaft, self.x, scene.system)
        taken: list[bool] = []
        hand.attempt(lambda: taken.append(self.document.change(shaft, f"{label_of(shaft, chosen)} put on")))
        if any(taken):
            if not keep:
                hand.end()
            hand.choose(chosen)

    def paint(self, painter: QPainter) -> None:
        if self.x is None:
            self.hand.read_out(painter, [("size", self.tool.label), ("plain", HINT)])
            return
        frame, unit = self.view.frame, self._declaration.dimension.unit(self.document.scene.system)
        number = f"{self.hand.typed}▏" if self.hand.typed else f"{unit.shown(self.x):.6g}"
        words = f"{self.tool.label} at {number} {unit.symbol}"
        draw_ghost(painter, frame, self.x, self.view.theme)
        self.hand.read_out(painter, [("size", words), ("plain", HINT)], frame.to_screen(self.x, 0.0))

    def _point(self, event: QMouseEvent | QDropEvent) -> None:
        shaft = self.document.shaft
        x = min(max(self.view.to_shaft(event.position())[0], 0.0), shaft.length)
        scale, system = self.view.ruler.scale, self.document.scene.system
        self.x = (
            rounded(x, TELLABLE / scale, system)
            if is_free(event)
            else rested_place(shaft, x, scale, system, self.tool.goes == "on the axis")
        )
        self.view.update()


def rested_place(shaft: Shaft, x: float, scale: float, system: System, at_faces: bool) -> float:
    """The face or middle of a segment near x (mm), else a round place, at a scale in px a mm.

    What is cut into a segment has no place at its faces: it rests `at_faces` no more than elsewhere.
    """
    faces = faces_of(shaft)
    middles = [(begin + end) / 2 for begin, end in itertools.pairwise(faces)]
    near = min((*middles, *(faces if at_faces else ())), key=lambda place: abs(place - x), default=math.inf)
    if abs(near - x) * scale <= PULL:
        return near
    rest = min(snapped(x, "place", TELLABLE / scale, system), shaft.length)
    return rest if at_faces or rest not in faces else rounded(x, TELLABLE / scale, system)
