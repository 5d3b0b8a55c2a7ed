"""What holds for the whole shaft: units, material, duty, judgement and title, each entry made from its declaration."""

from dataclasses import replace
from typing import Any

from PySide6.QtWidgets import QVBoxLayout, QWidget

from app.document import Document, Scene
from app.error_messages import guarded
from app.panels.dress import EDGE, heading, panel_style, scrolled_column
from app.panels.editors import ChoiceField
from app.panels.record_form import Home, RecordForm
from app.panels.steel_picker import SteelPicker
from app.theme import Theme
from shaftcore.declared import Choice, Part, declared
from shaftcore.shaft import Shaft

UNITS = Choice("Units", (("SI", "SI (mm, N, MPa)"), ("US", "US customary (in, lbf, ksi)")))
FIRST = ("material", "duty", "judgement", "title")
"""The order in which these are filled in; others follow in the order of their declaration."""


def given_home(name: str) -> Home:
    """Where one of the shaft's own records lives."""

    def write(shaft: Shaft, field: str, value: Any) -> Shaft:
        changed: dict[str, Any] = {name: replace(getattr(shaft, name), **{field: value})}
        return replace(shaft, **changed)

    return Home(name, lambda shaft: getattr(shaft, name), write)


def given_parts() -> dict[str, type]:
    """Field of the shaft -> record, for every single record it holds."""
    found = {
        name: declaration.kinds[0]
        for name, declaration in declared(Shaft).items()
        if isinstance(declaration, Part) and not declaration.many
    }
    return {name: found[name] for name in sorted(found, key=lambda n: FIRST.index(n) if n in FIRST else len(FIRST))}


class Givens(QWidget):
    """One column of forms in a scroll area; every field is judged as it is typed."""

    def __init__(self, document: Document, theme: Theme) -> None:
        super().__init__()
        self._document = document
        self.setAccessibleName("Givens")
        self.units = ChoiceField(UNITS)
        self.units.committed.connect(document.set_system)
        self.steel = SteelPicker(document)
        self.forms: dict[str, RecordForm] = {}
        column = scrolled_column(self)
        column.addWidget(heading(UNITS.label))
        column.addWidget(self.units)
        for name, record in given_parts().items():
            self._add(column, theme, name, record)
        column.addStretch(1)
        self.set_theme(theme)
        document.shown.connect(self._shown)
        self._shown(document.scene)

    def _add(self, column: QVBoxLayout, theme: Theme, name: str, record: type) -> None:
        home = given_home(name)
        form = RecordForm(self._document, theme, record, lambda: home)
        self.forms[name] = form
        column.addSpacing(EDGE)
        column.addWidget(heading(declared(Shaft)[name].label))
        if self.steel.fills is record:
            column.addWidget(self.steel)
        column.addWidget(form)

    def set_theme(self, theme: Theme) -> None:
        self.setStyleSheet(panel_style(theme))
        for form in self.forms.values():
            form.set_theme(theme)

    @guarded
    def _shown(self, scene: Scene) -> None:
        if scene.live:
            return  # no gesture changes a given
        self.units.set_value(scene.system)
        self.steel.show_scene(scene)
        for name, form in self.forms.items():
            form.show_record(getattr(scene.shaft, name), scene.system)
