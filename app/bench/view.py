"""The bench widget: draws the scene, turns wheel and size into the ruler's view, hands the rest on."""

from typing import Protocol

from PySide6.QtCore import QEvent, QLineF, QPointF, QRect, Qt
from PySide6.QtGui import (
    QColor,
    QContextMenuEvent,
    QDragEnterEvent,
    QDragMoveEvent,
    QDropEvent,
    QKeyEvent,
    QMouseEvent,
    QPainter,
    QPaintEvent,
    QPen,
    QResizeEvent,
    QWheelEvent,
)
from PySide6.QtWidgets import QWidget

from app.bench.callouts import Kept
from app.bench.drawing import Drawing
from app.bench.frame import Frame
from app.bench.kept_picture import KeptPicture
from app.bench.stage import FOOT, Plan, Stage, Type
from app.bench.words import description
from app.document import Document, Scene
from app.error_messages import guarded
from app.ruler import Ruler
from app.theme import Theme
from shaftcore.shaft import Shaft

LEAST_HEIGHT = 220
ZOOM_PER_NOTCH = 1.2
PAN_PER_NOTCH = 60.0
NOTCH = 120.0
"""One click of a wheel, in Qt's eighths of a degree."""
POINTER_ALPHA = 90
LEFT_IN_SIGHT = 40.0
"""Pixels of the shaft's height that stay on the bench however it is moved."""


class Hand(Protocol):
    """What handles pointer and keys on the bench. A returned True says that the event was taken."""

    def press(self, event: QMouseEvent) -> None: ...
    def move(self, event: QMouseEvent) -> None: ...
    def release(self, event: QMouseEvent) -> None: ...
    def double_click(self, event: QMouseEvent) -> bool: ...
    def key(self, event: QKeyEvent) -> bool: ...
    def leave(self) -> None: ...
    def wheel(self, event: QWheelEvent) -> bool: ...
    def drag_enter(self, event: QDragEnterEvent) -> None: ...
    def drag_move(self, event: QDragMoveEvent) -> None: ...
    def drop(self, event: QDropEvent) -> None: ...
    def context(self, event: QContextMenuEvent) -> None: ...
    def overlay(self, painter: QPainter) -> None: ...


class BenchView(QWidget):
    """The shaft in side view. `hand` is told of pointer and keys and draws last, over everything.

    While `keep_view` is set the picture is not fitted anew when the shaft changes size; during a
    gesture it never is.
    """

    def __init__(self, document: Document, ruler: Ruler, theme: Theme) -> None:
        super().__init__()
        self.document, self.ruler, self.theme = document, ruler, theme
        self.hand: Hand | None = None
        self.keep_view = False
        self._lift = 0.0
        self._fitted_size = (0.0, 0.0)
        self._opened: Shaft | None = None
        self._hovered: float | None = None
        self._letters: Type | None = None
        self._plan = Plan(document.shaft)
        self._drawing: Drawing | None = None
        self._outdated = True
        self._standings: Kept = {}
        self._kept = KeptPicture()
        self.setMinimumHeight(LEAST_HEIGHT)
        self.setMouseTracking(True)
        self.setAcceptDrops(True)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setAttribute(Qt.WidgetAttribute.WA_OpaquePaintEvent)
        self.setAccessibleName("Bench: side view of the shaft")
        document.shown.connect(self._show)
        document.hovered.connect(self._hover)
        document.renamed.connect(self._fit_if_opened)
        ruler.moved.connect(self._ruler_moved)
        self._show(document.scene)

    # where things lie -------------------------------------------------------------------------

    @property
    def frame(self) -> Frame:
        return Frame(self.ruler.to_px(0.0), self.ruler.scale, self.axis_px(), float(self.width()), float(self.height()))

    def axis_px(self) -> float:
        """y of the centre line."""
        return (self.height() - FOOT) / 2 + self._lift

    def to_screen(self, x: float, y: float) -> QPointF:
        """mm along the shaft and mm above the axis to pixels."""
        return self.frame.to_screen(x, y)

    def to_shaft(self, pos: QPointF) -> tuple[float, float]:
        """Pixels to mm along the shaft and mm above the axis."""
        return self.frame.to_shaft(pos)

    # view ---------------------------------------------------------------------------------------

    def set_theme(self, theme: Theme) -> None:
        self.theme = theme
        self._redraw()

    def fit(self) -> None:
        """Show the whole shaft."""
        shaft = self.document.shaft
        if shaft.segments:
            self._fitted_size = _size(shaft)
            self.ruler.fit(*self._fitted_size)

    def zoom_about(self, factor: float, pos: QPointF) -> None:
        """Zoom so that the place under `pos` stays put, along and across."""
        _, height = self.to_shaft(pos)
        self.ruler.zoom(factor, pos.x())
        self._lift_by(pos.y() - self.frame.y(height))

    def pan_by(self, dx: float, dy: float) -> None:
        """Move the picture by pixels, along and across."""
        self.ruler.pan(dx)
        self._lift_by(dy)

    def _lift_by(self, dy: float) -> None:
        """Move the centre line, but never so far that the shaft leaves the bench above or below."""
        frame, plan = self.frame, self._plan
        inside = [x for x in plan.faces if 0.0 < frame.x(x) < frame.width] if plan.shaft.segments else []
        ends = (min(max(frame.to_shaft(QPointF(px, 0.0))[0], 0.0), plan.shaft.length) for px in (0.0, frame.width))
        reach = max(plan.radius_at(x) for x in (*inside, *ends)) * frame.scale
        middle = (self.height() - FOOT) / 2
        most = max(middle + reach - LEFT_IN_SIGHT, 0.0)
        self._lift = min(max(self._lift + dy, -most), most)
        self._redraw()

    @guarded
    def _show(self, scene: Scene) -> None:
        self.ruler.length = scene.shaft.length
        may_fit = self.ruler.fitted and not (scene.live or self.keep_view)
        if may_fit and scene.shaft.segments and _size(scene.shaft) != self._fitted_size:
            self.fit()
        if scene.shaft is not self._plan.shaft:
            self._plan = Plan(scene.shaft)
        if not scene.live:
            self.setAccessibleDescription(description(scene))
        self._redraw()

    def _redraw(self) -> None:
        """Lay the picture out anew at the next repaint."""
        self._outdated = True
        self.update()

    @guarded
    def _fit_if_opened(self) -> None:
        """A shaft just loaded has no steps to undo yet; saving the same one again changes nothing."""
        if self.document.undo_stack.count() == 0 and self.document.shaft is not self._opened:
            self._opened = self.document.shaft
            self.fit()

    @guarded
    def _hover(self, x: float | None) -> None:
        for place in (self._hovered, x):
            if place is not None:
                self.update(QRect(int(self.ruler.to_px(place)) - 2, 0, 5, self.height()))
        self._hovered = x

    @guarded
    def _ruler_moved(self) -> None:
        if self.ruler.fitted:
            self._lift = 0.0
        self._lift_by(0.0)

    # picture --------------------------------------------------------------------------------------

    def _laid_out(self) -> Drawing:
        """The picture of the present scene; during a gesture words keep the places they had."""
        ratio, before = self.devicePixelRatioF(), self._drawing
        if before is not None and not self._outdated and before.stage.pixel_ratio == ratio:
            return before
        scene = self.document.scene
        if self._letters is None:
            self._letters = Type()
        stage = Stage(scene, self._plan, self.frame, self.theme, ratio)
        drawing = Drawing(stage, self._letters, self._standings if scene.live else {}, before)
        if not scene.live:
            self._standings = drawing.standings
        self._drawing, self._outdated = drawing, False
        return drawing

    def _paint_pointer(self, painter: QPainter) -> None:
        """A faint line through bench and traces; a gesture has the pointer for itself."""
        if self._hovered is not None and not self.document.scene.live:
            colour = QColor(self.theme.faint)
            colour.setAlpha(POINTER_ALPHA)
            x = self.ruler.to_px(self._hovered)
            painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
            painter.setPen(QPen(colour, 0.0))
            painter.drawLine(QLineF(x, 0, x, self.height()))

    # events ---------------------------------------------------------------------------------------

    @guarded
    def paintEvent(self, event: QPaintEvent) -> None:  # noqa: N802 (Qt's name)
        # nothing may be left painting when something goes wrong: Qt would end the process
        with QPainter(self) as painter:
            self._kept.paint(painter, self._laid_out())
            self._paint_pointer(painter)
            if self.hand is not None:
                self.hand.overlay(painter)

    @guarded
    def resizeEvent(self, event: QResizeEvent) -> None:  # noqa: N802
        self.ruler.set_size(float(self.width()), float(self.height()))

    @guarded
    def mousePressEvent(self, event: QMouseEvent) -> None:  # noqa: N802
        if self.hand is not None:
            self.hand.press(event)

    @guarded
    def mouseMoveEvent(self, event: QMouseEvent) -> None:  # noqa: N802
        self.document.point_at(self.ruler.to_mm(event.position().x()))
        if self.hand is not None:
            self.hand.move(event)

    @guarded
    def mouseReleaseEvent(self, event: QMouseEvent) -> None:  # noqa: N802
        if self.hand is not None:
            self.hand.release(event)

    @guarded
    def mouseDoubleClickEvent(self, event: QMouseEvent) -> None:  # noqa: N802
        if self.hand is None or not self.hand.double_click(event):
            self.fit()

    @guarded
    def keyPressEvent(self, event: QKeyEvent) -> None:  # noqa: N802
        if self.hand is not None and self.hand.key(event):
            return
        if event.key() == Qt.Key.Key_0 and not event.modifiers():
            self.fit()
        else:
            event.ignore()

    @guarded
    def leaveEvent(self, event: QEvent) -> None:  # noqa: N802
        self.document.point_at(None)
        if self.hand is not None:
            self.hand.leave()

    @guarded
    def wheelEvent(self, event: QWheelEvent) -> None:  # noqa: N802
        if self.hand is not None and self.hand.wheel(event):
            return
        turned = event.angleDelta()
        if event.modifiers() & Qt.KeyboardModifier.ControlModifier:
            self.zoom_about(ZOOM_PER_NOTCH ** (turned.y() / NOTCH), event.position())
        elif event.modifiers() & Qt.KeyboardModifier.ShiftModifier:
            self.pan_by(0.0, (turned.y() or turned.x()) / NOTCH * PAN_PER_NOTCH)
        else:
            self.pan_by((turned.y() or turned.x()) / NOTCH * PAN_PER_NOTCH, 0.0)
        event.accept()

    @guarded
    def dragEnterEvent(self, event: QDragEnterEvent) -> None:  # noqa: N802
        if self.hand is not None:
            self.hand.drag_enter(event)

    @guarded
    def dragMoveEvent(self, event: QDragMoveEvent) -> None:  # noqa: N802
        if self.hand is not None:
            self.hand.drag_move(event)

    @guarded
    def dropEvent(self, event: QDropEvent) -> None:  # noqa: N802
        if self.hand is not None:
            self.hand.drop(event)

    @guarded
    def contextMenuEvent(self, event: QContextMenuEvent) -> None:  # noqa: N802
        if self.hand is not None:
            self.hand.context(event)


def _size(shaft: Shaft) -> tuple[float, float]:
    """Overall length and largest diameter, mm."""
    return shaft.length, max(max(s.diameter, s.right_diameter) for s in shaft.segments)
