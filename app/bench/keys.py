"""The same edits without a pointer: arrows choose and change, Enter and digits open a number."""

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QKeyEvent, QPainter

from app.bench.gesture import Holder
from app.bench.readout import drag_lines
from app.bench.sizes import Size, at_step, label_of, record_of, sizes_of
from app.bench.stops import next_stop, stops_of
from app.document import Selection
from shaftcore import edits

Key = Qt.Key
NUMERIC = frozenset("0123456789.,-−")
ENTER = (Key.Key_Return, Key.Key_Enter)
ARROWS = (Key.Key_Left, Key.Key_Right, Key.Key_Up, Key.Key_Down)
AT_REST = (*ENTER, *ARROWS, Key.Key_Delete, Key.Key_Backspace, Key.Key_Home, Key.Key_End, Key.Key_Escape)


class Keys:
    """Keys on the bench. Which size of the chosen thing they change is kept here: Tab goes on to the next."""

    def __init__(self, hand: Holder) -> None:
        self.hand = hand
        self._of: Selection | None = None
        self._at = 0
        self.in_use = False

    # which size ---------------------------------------------------------------------------------------

    @property
    def size(self) -> Size | None:
        """The size that Up, Down and Enter work on."""
        scene = self.hand.document.scene
        sizes = sizes_of(scene.shaft, scene.chosen)
        if scene.chosen != self._of:
            self._of, self._at = scene.chosen, 0
        return sizes[min(self._at, len(sizes) - 1)] if sizes else None

    def _other_size(self, forward: bool) -> bool:
        """Go to the next size; False at the end of the row, so that Tab leads on to the next part."""
        scene = self.hand.document.scene
        count = len(sizes_of(scene.shaft, scene.chosen))
        at = self._at + (1 if forward else -1)
        if self.size is None or not 0 <= at < count:
            return False
        self._at, self.in_use = at, True
        self.hand.view.update()
        return True

    # events -------------------------------------------------------------------------------------------

    def claims(self, event: QKeyEvent) -> bool:
        """Keys that must not act as shortcuts: undo and, in a drag, the kit's letters; digits are numbers."""
        if self.hand.gesture is not None:
            undo = event.key() in (Key.Key_Z, Key.Key_Y) and event.modifiers() & Qt.KeyboardModifier.ControlModifier
            letters = event.text().isalpha() and not self.hand.gesture.key
            return bool(undo) or letters or event.key() in AT_REST or _digits(event) != ""
        return event.key() in AT_REST or (_digits(event) != "" and self.size is not None)

    def tab(self, event: QKeyEvent) -> bool:
        """True where Tab was used on the bench and must not move the keyboard elsewhere."""
        if event.key() not in (Key.Key_Tab, Key.Key_Backtab):
            return False
        if self.hand.gesture is not None:
            self.hand.gesture.tab()
            return True
        return self._other_size(event.key() == Key.Key_Tab)

    def press(self, event: QKeyEvent) -> bool:
        return self._in_gesture(event) if self.hand.gesture is not None else self._at_rest(event)

    def _in_gesture(self, event: QKeyEvent) -> bool:
        hand, key = self.hand, event.key()
        gesture = hand.gesture
        assert gesture is not None
        if key == Key.Key_Escape:
            hand.end()
        elif key in ENTER:
            gesture.enter()
        elif key in (Key.Key_Left, Key.Key_Right):
            gesture.arrow(key == Key.Key_Right, _fine(event))
        elif key == Key.Key_Backspace and not hand.typed:
            gesture.back()
        elif key == Key.Key_Backspace:
            hand.type_number(hand.typed[:-1])
        elif _digits(event):
            hand.type_number(hand.typed + _digits(event))
        return True

    def _at_rest(self, event: QKeyEvent) -> bool:
        key = event.key()
        if key in (Key.Key_Left, Key.Key_Right):
            return self._walk(key == Key.Key_Right)
        if key in (Key.Key_Up, Key.Key_Down):
            return self._step(key == Key.Key_Up, _fine(event))
        if key in (Key.Key_Home, Key.Key_End):
            return self._to_end(key == Key.Key_End)
        if key in ENTER:
            return self.open_number("")
        if key in (Key.Key_Delete, Key.Key_Backspace):
            return self.remove()
        if key == Key.Key_Escape and self.hand.document.scene.chosen is not None:
            self.hand.document.choose(None)
            return True
        return bool(_digits(event)) and self.open_number("", _digits(event))

    # what they do -------------------------------------------------------------------------------------

    def _walk(self, right: bool) -> bool:
        stop = next_stop(self.hand.document.scene, right)
        if stop is not None:
            self.in_use = True
            self.hand.document.choose(stop.chosen, stop.station)
        return stop is not None

    def _to_end(self, last: bool) -> bool:
        stops = stops_of(self.hand.document.scene)
        if stops:
            stop = stops[-1 if last else 0]
            self.in_use = True
            self.hand.document.choose(stop.chosen, stop.station)
        return bool(stops)

    def _step(self, up: bool, fine: bool) -> bool:
        """The next preferred value; presses in a row make one step to undo."""
        document, size = self.hand.document, self.size
        if size is None or size.value is None:
            return size is not None
        self.in_use = True
        value = size.next(up, fine, document.scene.system)
        words = size.step_words(value, document.scene.system)
        self.hand.attempt(lambda: document.change(size.apply(document.shaft, value), words, size.key))
        return True

    def open_number(self, name: str, typed: str = "") -> bool:
        """Open the number of a size of the chosen thing, "" for the one in turn."""
        scene = self.hand.document.scene
        named = [size for size in sizes_of(scene.shaft, scene.chosen) if size.name == name]
        size = named[0] if named else self.size
        if size is None:
            return False
        self.hand.open_field(size, self.anchor(size), typed)
        return True

    def remove(self) -> bool:
        """Take the chosen thing off the shaft."""
        document, chosen = self.hand.document, self.hand.document.scene.chosen
        if chosen is None or record_of(document.shaft, chosen) is None:
            return False
        name = label_of(document.shaft, chosen)
        if at_step(chosen):
            document.refused.emit(f"{name}: it stands as long as the diameters beside it differ; give both the same")
            self.hand.view.update()
            return True
        taken: list[bool] = []
        shaft = edits.remove_thing(document.shaft, chosen[1])
        self.hand.attempt(lambda: taken.append(document.change(shaft, f"{name} taken off")))
        if any(taken):
            document.choose(None)
        return True

    # picture ------------------------------------------------------------------------------------------

    def anchor(self, size: Size) -> QPointF:
        """Where a size is on the screen: its grip, else its place on the axis."""
        grips = [grip for grip in self.hand.grips if grip.chosen[1] == size.chosen[1]]
        grips.sort(key=lambda grip: (grip.chosen != size.chosen, grip.name != size.name, grip.is_line))
        if not grips:
            return QPointF(self.hand.view.width() / 2, self.hand.view.axis_px())
        grip = grips[0]
        x2, y2 = (grip.x, grip.y) if grip.x2 is None or grip.y2 is None else (grip.x2, grip.y2)
        return QPointF((grip.x + x2) / 2, (grip.y + y2) / 2)

    def paint(self, painter: QPainter, taken: QRectF | None) -> QRectF:
        """While the keyboard is in use: the size in turn and what it does, beside its place; where it stands."""
        hand, size = self.hand, self.size
        if size is not None and self.in_use and hand.view.hasFocus():
            lines = drag_lines(hand.document.scene, size, size.value, "", None)
            return hand.read_out(painter, lines, self.anchor(size), taken=taken)
        return hand.read_out(painter, [], taken=taken) if hand.refusal else QRectF()


def _fine(event: QKeyEvent) -> bool:
    return bool(event.modifiers() & Qt.KeyboardModifier.ControlModifier)


def _digits(event: QKeyEvent) -> str:
    """The text of a key that belongs to a number, "" for all others."""
    plain = not event.modifiers() & ~(Qt.KeyboardModifier.KeypadModifier | Qt.KeyboardModifier.ShiftModifier)
    return event.text() if plain and event.text() and set(event.text()) <= NUMERIC else ""
