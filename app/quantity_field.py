"""A field for one declared quantity: read as it is typed, taken on Enter or on leaving."""

from PySide6.QtCore import QRectF, Qt, Signal
from PySide6.QtGui import QColor, QKeyEvent, QPainter, QPaintEvent
from PySide6.QtWidgets import QLabel, QLineEdit, QWidget

from app.error_messages import guarded
from app.theme import LIGHT, Theme, text_font
from shaftcore.declared import Quantity
from shaftcore.errors import QuantityError
from shaftcore.number_text import editable, unit_symbol
from shaftcore.typed_numbers import parse
from shaftcore.units import System, Unit

ECHO_DIGITS = 6
_GAP = 8


class ProblemLabel(QLabel):
    """What is wrong with a field, in small type; gone while there is nothing to say."""

    def __init__(self) -> None:
        super().__init__()
        self.setObjectName("problem")
        self.setFont(text_font(8.5))
        self.setWordWrap(True)
        self.hide()

    def say(self, words: str) -> None:
        self.setText(words)
        # without a parent it would open as a window of its own
        self.setVisible(bool(words) and self.parentWidget() is not None)


class QuantityField(QLineEdit):
    """Shows a number with its unit; `committed` carries the new value (internal units) or None.

    What is wrong with the typed text stands in `words_label`, which the owner places beside or
    under the field. Esc takes the typing back; text that was refused stays until it is mended.
    """

    committed = Signal(object)

    def __init__(self, declaration: Quantity, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.declaration = declaration
        self.value: float | None = None
        self.words_label = ProblemLabel()
        self._system: System = "SI"
        self._theme = LIGHT
        self.setAlignment(Qt.AlignmentFlag.AlignRight)
        self.setAccessibleName(declaration.label)
        if declaration.optional:
            self.setPlaceholderText(declaration.none_words or "none")
        self.textEdited.connect(self._typed)
        self.editingFinished.connect(self._leave)
        self._write()

    # what is shown --------------------------------------------------------------------------------

    @property
    def problem(self) -> str:
        """What is wrong with the text, "" where it can be taken."""
        return self.words_label.text()

    def set_theme(self, theme: Theme) -> None:
        self._theme = theme
        self.update()

    def set_system(self, system: System) -> None:
        """Show the value in the other system; typing that was not taken yet is dropped."""
        if system != self._system:
            self._system = system
            self._write()

    def set_value(self, value: float | None) -> None:
        """Show a value from the shaft; the one being typed is left alone unless it changed there."""
        if value != self.value:
            self.value = value
            self._write()

    def refuse(self, words: str) -> None:
        """Say beside the field why its number was not taken."""
        self._say(words)

    def _write(self) -> None:
        self.setText(editable(self.value, self.declaration, self._system))
        self._say("")
        unit = unit_symbol(self.declaration.dimension_name, self._system)
        self.setTextMargins(0, 0, self.fontMetrics().horizontalAdvance(unit) + _GAP + 4 if unit else 0, 0)
        self._echo(self.value)

    def _echo(self, value: float | None) -> None:
        """The same number in the other system, and what may be typed, in the tooltip."""
        other: System = "US" if self._system == "SI" else "SI"
        name, lines = self.declaration.dimension_name, []
        if value is not None and unit_symbol(name, other) != unit_symbol(name, self._system):
            lines.append(f"= {_few_digits(self.declaration.dimension.unit(other), value)}")
        lines.append(f"Allowed: {self.declaration.allowed(self._system)}")
        if self.declaration.words:
            lines.append(self.declaration.words)
        self.setToolTip("\n".join(lines))
        unit = unit_symbol(name, self._system)
        self.setAccessibleDescription(". ".join(filter(None, [self.problem, f"in {unit}" if unit else "", *lines])))

    def _say(self, words: str) -> None:
        self.words_label.say(words)
        self.update()

    # typing ---------------------------------------------------------------------------------------

    def _read(self) -> float | None:
        text = self.text().strip()
        if self.declaration.optional and text.casefold() in ("", "none", "–", "-"):
            return None
        return parse(text, self.declaration, self._system)

    @guarded
    def _typed(self, _: str) -> None:
        try:
            value = self._read()
        except QuantityError as error:
            self._say(str(error))
            self._echo(None)
        else:
            self._say("")
            self._echo(value)

    @guarded
    def _leave(self) -> None:
        """Offer what was typed to the owner; the owner answers with `set_value` or `refuse`."""
        if not self.isModified() and not self.problem:
            return
        try:
            value = self._read()
        except QuantityError as error:
            self._say(str(error))
            return
        self.setModified(False)
        if value == self.value:
            self._write()
        else:
            self._say("")
            self.committed.emit(value)

    @guarded
    def keyPressEvent(self, event: QKeyEvent) -> None:  # noqa: N802 (Qt's name)
        if event.key() == Qt.Key.Key_Escape and (self.isModified() or self.problem):
            self._write()
            self.selectAll()
            event.accept()
            return
        super().keyPressEvent(event)

    @guarded
    def paintEvent(self, event: QPaintEvent) -> None:  # noqa: N802 (Qt's name)
        super().paintEvent(event)
        unit = unit_symbol(self.declaration.dimension_name, self._system)
        if self.text().strip()[-1:].isalpha():
            unit = ""  # one was typed
        painter = QPainter(self)
        box = QRectF(self.rect())
        if self.problem:
            painter.fillRect(QRectF(1, box.height() - 3, box.width() - 2, 2), QColor(self._theme.caution))
        painter.setPen(QColor(self._theme.faint))
        right = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
        painter.drawText(box.adjusted(0, 0, -_GAP, 0), right, unit)
        painter.end()


def _few_digits(unit: Unit, value: float) -> str:
    return f"{unit.shown(value):.{ECHO_DIGITS}g} {unit.symbol}".replace("-", "−")
