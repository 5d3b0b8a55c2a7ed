"""The hand on the bench: what pointer and keys do to the shaft.

At rest it shows what can be taken hold of and chooses what is pressed; otherwise one gesture is
under way and gets every event. Every change goes through the document.
"""

from collections.abc import Callable

from PySide6.QtCore import QEvent, QObject, QPointF, QRectF, Qt, Signal
from PySide6.QtGui import (
    QContextMenuEvent,
    QCursor,
    QDragEnterEvent,
    QDragMoveEvent,
    QDropEvent,
    QKeyEvent,
    QMouseEvent,
    QPainter,
    QWheelEvent,
)

from app.bench.drags import Drag, size_under
from app.bench.gesture import Gesture, has_shift, is_far
from app.bench.hits import Grip, grips_of, pick, thing_at
from app.bench.keys import Keys
from app.bench.lens_at import LensAtRest
from app.bench.number_field import NumberField
from app.bench.overlay import GripStamps
from app.bench.placing import Placing
from app.bench.readout import Lines, draw_readout
from app.bench.sizes import Size
from app.bench.sketching import Sketching
from app.bench.stage import Plan, Stage
from app.bench.thing_menu import thing_menu
from app.bench.tools import BY_KEY, MIME
from app.bench.view import BenchView
from app.document import Document, Scene, Selection
from app.error_messages import guarded
from shaftcore.errors import QuantityError


class BenchHand(QObject):
    """Handles what the bench forwards. `armed` tells the kit which of its entries is in hand ("" for none)."""

    armed = Signal(str)

    def __init__(self, view: BenchView, document: Document) -> None:
        super().__init__(view)
        self.view, self.document = view, document
        self.gesture: Gesture | None = None
        self.typed = ""
        self.refusal = ""
        self.keys = Keys(self)
        self._field: NumberField | None = None
        self._pressed: tuple[QPointF, Grip | None] | None = None
        self._panned: QPointF | None = None
        self._pointer = QPointF()
        self._hovered: Grip | None = None
        self._grips: tuple[Grip, ...] | None = None
        self._stamps, self.lens_at_rest = GripStamps(), LensAtRest(view)
        self._attempting = False
        document.shown.connect(self._shown)
        document.refused.connect(self._refused)
        view.ruler.moved.connect(self._forget_grips)
        view.installEventFilter(self)

    # gestures ---------------------------------------------------------------------------------------

    @property
    def grips(self) -> tuple[Grip, ...]:
        """The grips of the shaft at rest, found once for each picture."""
        if self._grips is None:
            plan = Plan(self.document.shaft)
            self._grips = grips_of(Stage(self.document.scene, plan, self.view.frame, self.view.theme, 1.0))
        return self._grips

    def choose(self, chosen: Selection | None) -> None:
        """Choose a thing together with its own station."""
        self.document.choose(chosen)

    def begin(self, gesture: Gesture) -> None:
        self.end()
        self.gesture = gesture
        self._set_hovered(None)
        self.armed.emit(gesture.key)
        self.view.update()

    def arm(self, key: str) -> None:
        """Take an entry of the kit in hand; "" puts it back. A sketch can go on by keyboard at once."""
        tool = BY_KEY.get(key)
        if tool is None:
            self.end()
            return
        self.begin(Sketching(self) if tool.place is None else Placing(self, tool))
        self.view.setCursor(QCursor(Qt.CursorShape.CrossCursor))

    def end(self) -> None:
        """Give up whatever is under way; what was not kept is taken back."""
        gesture, self.gesture = self.gesture, None
        self.typed, self.refusal, self._pressed = "", "", None
        if self.document.in_gesture:
            self.document.cancel()
        if gesture is not None:
            gesture.done()
            self.view.unsetCursor()
            self.armed.emit("")
            self.view.update()

    def attempt(self, change: Callable[[], object]) -> None:
        """Ask the document for a change; whatever goes wrong ends the gesture with the shaft as it was."""
        self.refusal, self._attempting = "", True
        try:
            change()
        except Exception:
            self.end()
            raise
        finally:
            self._attempting = False
        self.view.update()

    def type_number(self, text: str) -> None:
        """The text typed so far goes to the gesture as soon as it is a number."""
        self.typed = text
        if self.gesture is None or (text and not any(map(str.isdigit, text))):
            return
        try:
            self.gesture.read(text)
        except QuantityError as error:
            self.say(str(error))

    def say(self, words: str) -> None:
        """Say beside the pointer why something is not done."""
        self.refusal = words
        self.view.update()

    @guarded
    def _shown(self, scene: Scene) -> None:
        """A shaft that changed under a gesture (another file, a step taken back) ends it."""
        self._forget_grips()
        base = self.gesture.base if self.gesture else None
        if base is not None and not scene.live and not self._attempting and scene.shaft is not base:
            self.end()

    @guarded
    def _refused(self, words: str) -> None:
        """An open number field says it itself."""
        if self._field is None:
            self.refusal = words

    @guarded
    def _forget_grips(self) -> None:
        self._grips = None
        if self._hovered is not None:
            self._hovered = None
            self.view.unsetCursor()

    # pointer ----------------------------------------------------------------------------------------

    def press(self, event: QMouseEvent) -> None:
        self._pointer = event.position()
        self._leave_field()
        if event.button() == Qt.MouseButton.MiddleButton:
            self._panned = self._pointer
        elif event.button() == Qt.MouseButton.LeftButton:
            if self.gesture is None and not self.document.shaft.segments:
                self.begin(Sketching(self))
            if self.gesture is not None:
                self.gesture.press(event)
            else:
                self._take_hold(self._pointer)

    def move(self, event: QMouseEvent) -> None:
        self._pointer = event.position()
        if self._panned is not None:
            self.view.ruler.pan(self._pointer.x() - self._panned.x())
            self._panned = self._pointer
        elif self.gesture is not None:
            self.gesture.move(event)
            self.view.update()
        elif self._pressed is not None and event.buttons() & Qt.MouseButton.LeftButton:
            self._maybe_drag(event)
        else:
            self._set_hovered(pick(self.grips, self._pointer))

    def release(self, event: QMouseEvent) -> None:
        self._panned = self._pressed = None
        if self.gesture is not None and event.button() == Qt.MouseButton.LeftButton:
            self.gesture.release(event)

    def double_click(self, event: QMouseEvent) -> bool:
        """Two quick clicks are two presses in a gesture; on a grip or thing they open its number."""
        if self.gesture is not None or not self.document.shaft.segments:
            self.press(event)
            return True
        grip = pick(self.grips, event.position())
        found = grip.chosen if grip else thing_at(self.document.shaft, self.view.frame, self.grips, event.position())
        if found is None:
            return False
        self._pressed = None
        self.choose(found)
        return self.keys.open_number(grip.name if grip else "")

    def leave(self) -> None:
        self._set_hovered(None)
        if self.gesture is not None:
            self.gesture.leave()

    def wheel(self, event: QWheelEvent) -> bool:
        """The view zooms and moves; while a size is pulled it keeps still."""
        return isinstance(self.gesture, Drag)

    def _take_hold(self, pos: QPointF) -> None:
        grip = pick(self.grips, pos)
        found = grip.chosen if grip else thing_at(self.document.shaft, self.view.frame, self.grips, pos)
        self._pressed, self.refusal, self.keys.in_use = (pos, grip), "", False
        self.choose(found)

    def _maybe_drag(self, event: QMouseEvent) -> None:
        if self._pressed is None or not is_far(self._pointer, self._pressed[0]):
            return
        pos, grip = self._pressed
        size = size_under(self.document.shaft, grip) if grip else None
        if grip is not None and size is not None:
            self.begin(Drag(self, grip, pos, size, has_shift(event)))
            self.move(event)

    def _set_hovered(self, grip: Grip | None) -> None:
        if grip == self._hovered:
            return
        self._hovered = grip
        if grip is None:
            self.view.unsetCursor()
        else:
            self.view.setCursor(QCursor(grip.cursor))
        self.view.update()

    # things dragged from the kit ----------------------------------------------------------------------

    def drag_enter(self, event: QDragEnterEvent) -> None:
        if event.mimeData().hasFormat(MIME):
            self.arm(bytes(event.mimeData().data(MIME).data()).decode())
            event.acceptProposedAction()

    def drag_move(self, event: QDragMoveEvent) -> None:
        if self.gesture is not None and event.mimeData().hasFormat(MIME):
            self._pointer = event.position()
            self.gesture.move(event)
            event.acceptProposedAction()

    def drop(self, event: QDropEvent) -> None:
        if isinstance(self.gesture, Placing) and event.mimeData().hasFormat(MIME):
            self.gesture.move(event)
            self.gesture.set_down()
            self.view.setFocus()
            event.acceptProposedAction()

    # keys, menu, picture ------------------------------------------------------------------------------

    def key(self, event: QKeyEvent) -> bool:
        return self.keys.press(event)

    @guarded
    def eventFilter(self, watched: QObject, event: QEvent) -> bool:  # noqa: N802 (Qt's name)
        """Tab, and keys that would be shortcuts elsewhere, where the hand has a use for them."""
        if event.type() == QEvent.Type.ShortcutOverride and isinstance(event, QKeyEvent):
            if self.keys.claims(event):
                event.accept()
        elif event.type() == QEvent.Type.KeyPress and isinstance(event, QKeyEvent):
            return self.keys.tab(event)
        return False

    def context(self, event: QContextMenuEvent) -> None:
        if self.gesture is not None:
            self.end()
            return
        pos, size = QPointF(event.pos()), self.keys.size
        if event.reason() == QContextMenuEvent.Reason.Mouse:
            self._take_hold(pos)
            self._pressed = None
        elif size is not None:
            pos = self.keys.anchor(size)
        menu = thing_menu(self, self.keys, self.view.to_shaft(pos)[0])
        if menu is not None:
            menu.popup(self.view.mapToGlobal(pos.toPoint()))

    def open_field(self, size: Size, at: QPointF, typed: str = "") -> None:
        """A field over the bench for the number of a size."""
        self._leave_field()
        self._field = NumberField(self.view, self.document, size, at, self.view.theme, typed)
        self._field.left.connect(self._field_left)

    @property
    def number_field(self) -> NumberField | None:
        return self._field

    def _leave_field(self) -> None:
        if self._field is not None:
            self._field.leave()

    @guarded
    def _field_left(self) -> None:
        self._field = None

    def overlay(self, painter: QPainter) -> None:
        """Everything the hand shows over the drawing."""
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, True)
        if self.gesture is not None:
            self.gesture.paint(painter)
        elif not self.document.scene.live:
            self._stamps.draw(painter, self.grips, self._hovered, self.view.theme)
            self._paint_at_rest(painter)

    def _paint_at_rest(self, painter: QPainter) -> None:
        """What the keys do beside its place, and the chosen raiser enlarged where there is room."""
        scene, field = self.document.scene, self._field
        self.lens_at_rest.seek(scene, self.keys.size, self.grips, field, self.keys.in_use)
        lens = self.lens_at_rest.lens
        box = self.keys.paint(painter, lens.room if lens else None)
        if lens is not None and not box.intersects(lens.room):
            self.lens_at_rest.paint(painter, scene, field)

    def read_out(
        self,
        painter: QPainter,
        lines: Lines,
        at: QPointF | None = None,
        clear: QPointF | None = None,
        taken: QRectF | None = None,
    ) -> QRectF:
        """Lines beside the pointer or a place, and why a size was refused; `clear` and `taken` are left open."""
        lines = [*lines, *([("refusal", self.refusal)] if self.refusal else [])]
        room = QRectF(self.view.rect())
        return draw_readout(painter, lines, at or self._pointer, room, self.view.theme, clear, taken)


def make_hand(view: BenchView, document: Document) -> BenchHand:
    """The hand for a bench."""
    return BenchHand(view, document)
