"""The gesture of drawing a shaft: press on the axis, pull, click for the next step, Esc ends."""

from PySide6.QtCore import QPointF, QRectF
from PySide6.QtGui import QDropEvent, QMouseEvent, QPainter

from app.bench.gesture import Gesture, Holder, is_far, is_free
from app.bench.readout import sketch_lines
from app.bench.sketch import Sketch
from app.bench.tools import DRAW
from shaftcore.shaft import Shaft
from shaftcore.typed_numbers import parse

EDGE, GROWTH = 40.0, 1.35
"""A step pulled this near the edge of the bench (pixels) makes it show that much more."""


class Sketching(Gesture):
    """Pointer and keys on a `Sketch`. Nothing is pulled before the first press or the first number."""

    key = DRAW.key

    def __init__(self, hand: Holder) -> None:
        super().__init__(hand)
        self.sketch = Sketch(self.document)
        self._pulling = self._at_edge = False
        self._pressed: QPointF | None = None
        self.view.keep_view = True
        if self.base.segments:
            self._show_more()

    @property
    def base(self) -> Shaft:  # type: ignore[override]
        return self.sketch.base

    def press(self, event: QMouseEvent) -> None:
        """The first press takes hold of the axis; each later one keeps a step and begins the next."""
        if self._pulling:
            self._follow(event)
            self._keep()
        self._pulling, self._pressed = True, event.position()

    def move(self, event: QMouseEvent | QDropEvent) -> None:
        if self._pulling:
            self._grow_view(event.position())
            self._follow(event)

    def release(self, event: QMouseEvent) -> None:
        """A step pulled out with the button held stands when the button is let go."""
        pressed, self._pressed = self._pressed, None
        if pressed is not None and is_far(event.position(), pressed):
            self._keep()

    def read(self, text: str) -> None:
        sketch = self.sketch
        if not text:
            sketch.fixed.pop(sketch.name, None)
            self.hand.attempt(sketch.show)
            return
        self._pulling = True
        value = parse(text, sketch.declaration(sketch.name), self.document.scene.system)
        self.hand.attempt(lambda: sketch.fix(value))

    def tab(self) -> None:
        self.sketch.tab()
        self.hand.typed = ""
        self.view.update()

    def enter(self) -> None:
        """Keeps a step whose numbers were typed; with nothing typed it ends the sketch."""
        if not self.sketch.fixed or self.hand.refusal or not self._keep():
            if self.sketch.fixed:
                return
            self.hand.end()

    def back(self) -> None:
        self.hand.attempt(self.sketch.take_back)

    def done(self) -> None:
        self.view.keep_view = False
        self.view.fit()

    def paint(self, painter: QPainter) -> None:
        self.hand.read_out(painter, sketch_lines(self.document.scene, self.sketch, self.hand.typed), taken=self._step())

    def _step(self) -> QRectF | None:
        """Where the step being pulled stands on the screen, to keep the readout off it."""
        if not self.sketch.has_step:
            return None
        sizes, begin = self.sketch.sizes(), self.sketch.begin
        reach = sizes["diameter"] / 2
        return QRectF(self.view.to_screen(begin, reach), self.view.to_screen(begin + sizes["length"], -reach))

    def _follow(self, event: QMouseEvent | QDropEvent) -> None:
        x, y = self.view.to_shaft(event.position())
        self.hand.attempt(lambda: self.sketch.follow(x, y, self.view.ruler.scale, is_free(event)))

    def _keep(self) -> bool:
        kept: list[bool] = []
        self.hand.attempt(lambda: kept.append(self.sketch.keep()))
        if any(kept):
            self.hand.typed = ""
        return any(kept)

    def _grow_view(self, pos: QPointF) -> None:
        """Show more of the bench when the pointer comes near its edge; once for each time it does."""
        view = self.view
        near = pos.x() > view.width() - EDGE or pos.y() < EDGE / 2
        if near and not self._at_edge:
            self._show_more()
        self._at_edge = near

    def _show_more(self) -> None:
        """Room to the right; the left-hand end of the shaft stays where it is."""
        self.view.ruler.zoom(1 / GROWTH, self.view.ruler.to_px(0.0))
