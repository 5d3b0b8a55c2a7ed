"""A form made from a record's declarations: a new field of the record costs no line here."""

from collections.abc import Callable
from dataclasses import dataclass, replace
from typing import Any

from PySide6.QtCore import Qt, Signal
from PySide6.QtWidgets import QGridLayout, QLabel, QSizePolicy, QVBoxLayout, QWidget

from app.document import Document
from app.error_messages import guarded
from app.panels.dress import GAP, heading, quiet
from app.panels.editors import Editor, SwitchField, editor_of
from app.quantity_field import QuantityField
from app.symbol_text import rich
from app.theme import Theme
from shaftcore.declared import Choice, Declaration, Part, Quantity, Text, declared
from shaftcore.shaft import Shaft
from shaftcore.units import System

NUMBER_WIDTH = 150
LONG_OPTION = 24
"""Options with more letters than this get a row of their own under the label."""
LONG_LINE = 150
"""And so do texts that may be longer than this."""
LABEL_DROP = 4
"""Pixels from an editor's top edge to the top of the line in it."""


@dataclass(frozen=True)
class Home:
    """Where a record lives on the shaft: `write` gives the shaft with one field of it replaced.

    `key` tells the fields of one record from those of another when undo steps merge.
    """

    key: str
    read: Callable[[Shaft], Any]
    write: Callable[[Shaft, str, Any], Shaft]

    def part(self, name: str) -> "Home":
        """The home of the record in one of this record's fields."""

        def write(shaft: Shaft, field: str, value: Any) -> Shaft:
            changed: dict[str, Any] = {field: value}
            return self.write(shaft, name, replace(getattr(self.read(shaft), name), **changed))

        return Home(f"{self.key}.{name}", lambda shaft: getattr(self.read(shaft), name), write)


class RecordForm(QWidget):
    """Label, editor and, under them, what is wrong; records inside the record follow with a heading."""

    renamed = Signal(str)
    """The record goes by another id from now on."""

    def __init__(self, document: Document, theme: Theme, record: type, home: Callable[[], Home]) -> None:
        super().__init__()
        self.record, self.home = record, home
        self.editors: dict[str, Editor] = {}
        self.parts: dict[str, RecordForm] = {}
        self._document = document
        self._column = QVBoxLayout(self)
        self._column.setContentsMargins(0, 0, 0, 0)
        self._column.setSpacing(GAP)
        self._grid = QGridLayout()
        self._grid.setHorizontalSpacing(2 * GAP)
        self._grid.setVerticalSpacing(GAP)
        self._grid.setColumnStretch(0, 4)
        self._grid.setColumnStretch(1, 5)
        self._column.addLayout(self._grid)
        for name, declaration in declared(record).items():
            if isinstance(declaration, Part):
                self._add_part(theme, name, declaration)
            else:
                self._add_field(name, declaration)
        self._column.addStretch(1)  # room to spare stays below, not between the fields
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        for editor in self.editors.values():
            if isinstance(editor, QuantityField):
                editor.set_theme(theme)
        for form in self.parts.values():
            form.set_theme(theme)

    def show_record(self, record: Any, system: System) -> None:
        """Put a record's values into the editors; untouched ones are left as they are."""
        for name, editor in self.editors.items():
            if isinstance(editor, QuantityField):
                editor.set_system(system)
            editor.set_value(getattr(record, name))
        for name, form in self.parts.items():
            part = getattr(record, name)
            form.setVisible(part is not None)
            if part is not None:
                form.show_record(part, system)

    # building -------------------------------------------------------------------------------------

    def _add_field(self, name: str, declaration: Declaration) -> None:
        editor = editor_of(declaration)
        self.editors[name] = editor
        editor.committed.connect(lambda value, name=name: self._commit(name, value))
        row = self._grid.rowCount()
        words = getattr(declaration, "words", "")
        if isinstance(editor, SwitchField):
            self._grid.addWidget(editor, row, 0, 1, 2)
        elif _wants_a_row(declaration):
            self._grid.addWidget(_label(declaration, editor), row, 0, 1, 2)
            row += 1
            self._grid.addWidget(editor, row, 0, 1, 2)
        else:
            self._grid.addWidget(_label(declaration, editor), row, 0, Qt.AlignmentFlag.AlignTop)
            if isinstance(editor, QuantityField):
                editor.setFixedWidth(NUMBER_WIDTH)
                self._grid.addWidget(editor, row, 1, Qt.AlignmentFlag.AlignTop | Qt.AlignmentFlag.AlignRight)
            else:
                self._grid.addWidget(editor, row, 1)
        self._grid.addWidget(editor.words_label, row + 1, 0, 1, 2)
        if words and not words.startswith("Name of this thing"):
            said = quiet(words)
            said.setContentsMargins(0, 0, 0, GAP)
            self._grid.addWidget(said, row + 2, 0, 1, 2)

    def _add_part(self, theme: Theme, name: str, declaration: Part) -> None:
        if declaration.many:
            return
        form = RecordForm(self._document, theme, declaration.kinds[0], lambda: self.home().part(name))
        above = heading(declaration.label)
        above.setContentsMargins(0, 2 * GAP, 0, 0)
        form.layout().insertWidget(0, above)  # type: ignore[union-attr]
        self.parts[name] = form
        self._column.addWidget(form)

    # asking for a change --------------------------------------------------------------------------

    @guarded
    def _commit(self, name: str, value: Any) -> None:
        editor, document, home = self.editors[name], self._document, self.home()
        if document.in_gesture:
            document.cancel()
        refusals: list[str] = []
        document.refused.connect(refusals.append)
        try:
            words = f"{self.record.label}: {editor.accessibleName().lower()}"  # type: ignore[attr-defined]
            taken = document.change(home.write(document.shaft, name, value), words, f"{home.key}.{name}")
        finally:
            document.refused.disconnect(refusals.append)
        if taken and name == "id":
            self.renamed.emit(value)
        elif not taken:
            editor.refuse(refusals[0] if refusals else "This could not be taken.")


def _wants_a_row(declaration: Declaration) -> bool:
    """True where the words to be shown do not fit beside their label."""
    if isinstance(declaration, Choice):
        return max(len(shown) for _, shown in declaration.options) > LONG_OPTION
    return isinstance(declaration, Text) and declaration.longest > LONG_LINE


def _label(declaration: Declaration, editor: Editor) -> QLabel:
    """The field's name with its symbol, fit to be read out with the editor."""
    symbol = declaration.symbol if isinstance(declaration, Quantity) else ""
    label = QLabel(declaration.label + (f"&nbsp;&nbsp;<i>{rich(symbol)}</i>" if symbol else ""))
    label.setTextFormat(Qt.TextFormat.RichText)
    label.setWordWrap(True)
    label.setBuddy(editor)
    label.setSizePolicy(QSizePolicy.Policy.Preferred, QSizePolicy.Policy.Preferred)
    label.setContentsMargins(0, LABEL_DROP, 0, 0)
    return label
