"""One editor for each sort of declared field, all with the same few words.

Every editor has `set_value`, `refuse`, a signal `committed` with the new value, and a
`words_label` for what is wrong.
"""

from collections.abc import Callable
from typing import Any

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QFocusEvent, QKeyEvent, QWheelEvent
from PySide6.QtWidgets import QCheckBox, QComboBox, QLineEdit, QPlainTextEdit, QWidget

from app.error_messages import guarded
from app.quantity_field import ProblemLabel, QuantityField
from shaftcore.declared import Choice, Declaration, Quantity, Switch, Text

LONG_TEXT = 300
"""Texts that may be longer than this get a field of several lines."""


def _named(editor: QWidget, label: str, words: str) -> ProblemLabel:
    """Give an editor its name for a screen reader and its tooltip; returns the label for refusals."""
    editor.setAccessibleName(label)
    editor.setToolTip(words)
    editor.setAccessibleDescription(words)
    return ProblemLabel()


class ChoiceField(QComboBox):
    """One of several named options; the wheel does not change it in passing."""

    committed = Signal(object)

    def __init__(self, declaration: Choice) -> None:
        super().__init__()
        self.words_label = _named(self, declaration.label, declaration.words)
        self._value: str | None = None
        if declaration.optional:
            self.addItem(declaration.none_words or "none", None)
        for value, words in declaration.options:
            self.addItem(words, value)
        self.setSizeAdjustPolicy(QComboBox.SizeAdjustPolicy.AdjustToMinimumContentsLengthWithIcon)
        self.setMinimumContentsLength(12)
        self.activated.connect(self._picked)

    def set_value(self, value: str | None) -> None:
        self._value = value
        self.words_label.say("")
        self.setCurrentIndex(self.findData(value))

    def refuse(self, words: str) -> None:
        self.set_value(self._value)
        self.words_label.say(words)

    @guarded
    def _picked(self, index: int) -> None:
        value = self.itemData(index)
        if value != self._value:
            self.committed.emit(value)

    @guarded
    def wheelEvent(self, event: QWheelEvent) -> None:  # noqa: N802 (Qt's name)
        event.ignore()


class SwitchField(QCheckBox):
    """Yes or no."""

    committed = Signal(object)

    def __init__(self, declaration: Switch) -> None:
        super().__init__(declaration.label)
        self.words_label = _named(self, declaration.label, declaration.words)
        self._value = False
        self.clicked.connect(self._clicked)

    def set_value(self, value: bool) -> None:
        self._value = value
        self.words_label.say("")
        self.setChecked(value)

    def refuse(self, words: str) -> None:
        self.set_value(self._value)
        self.words_label.say(words)

    @guarded
    def _clicked(self) -> None:
        self.committed.emit(self.isChecked())


class LineField(QLineEdit):
    """A line of text, taken on Enter or on leaving; Esc takes the typing back."""

    committed = Signal(object)

    def __init__(self, declaration: Text) -> None:
        super().__init__()
        self.words_label = _named(self, declaration.label, declaration.words)
        self.setMaxLength(declaration.longest)
        self._value = ""
        self.editingFinished.connect(self._leave)

    def set_value(self, value: str) -> None:
        if value != self._value:
            self._value = value
            self.words_label.say("")
            self.setText(value)
            self.setCursorPosition(0)

    def refuse(self, words: str) -> None:
        self.words_label.say(words)

    @guarded
    def _leave(self) -> None:
        if self.isModified() and self.text() != self._value:
            self.setModified(False)
            self.committed.emit(self.text())

    @guarded
    def keyPressEvent(self, event: QKeyEvent) -> None:  # noqa: N802 (Qt's name)
        if event.key() == Qt.Key.Key_Escape and self.text() != self._value:
            self.setText(self._value)
            self.words_label.say("")
            event.accept()
            return
        super().keyPressEvent(event)


class TextField(QPlainTextEdit):
    """Several lines of text, taken on leaving; Tab goes on to the next field, Esc takes the typing back."""

    committed = Signal(object)

    def __init__(self, declaration: Text) -> None:
        super().__init__()
        self.words_label = _named(self, declaration.label, declaration.words)
        self._longest, self._value = declaration.longest, ""
        self.setTabChangesFocus(True)
        self.setFixedHeight(self.fontMetrics().lineSpacing() * 4)

    def set_value(self, value: str) -> None:
        if value != self._value:
            self._value = value
            self.words_label.say("")
            self.setPlainText(value)

    def refuse(self, words: str) -> None:
        self.words_label.say(words)

    @guarded
    def focusOutEvent(self, event: QFocusEvent) -> None:  # noqa: N802 (Qt's name)
        super().focusOutEvent(event)
        text = self.toPlainText()
        if len(text) > self._longest:
            self.words_label.say(f"{len(text)} characters; allowed: {self._longest} at most. Shorten it.")
        elif text != self._value:
            self.committed.emit(text)

    @guarded
    def keyPressEvent(self, event: QKeyEvent) -> None:  # noqa: N802 (Qt's name)
        if event.key() == Qt.Key.Key_Escape and self.toPlainText() != self._value:
            self.setPlainText(self._value)
            self.words_label.say("")
            event.accept()
            return
        super().keyPressEvent(event)


Editor = QuantityField | ChoiceField | SwitchField | LineField | TextField

_EDITORS: dict[type, Callable[[Any], Editor]] = {
    Quantity: QuantityField,
    Choice: ChoiceField,
    Switch: SwitchField,
    Text: lambda text: TextField(text) if text.longest > LONG_TEXT else LineField(text),
}


def editor_of(declaration: Declaration) -> Editor:
    """The editor that goes with a declaration of a plain field."""
    return _EDITORS[type(declaration)](declaration)
