"""The chosen thing's sizes as numbers to type: a segment, shoulder, raiser, support or load."""

from collections.abc import Callable
from typing import Any

from PySide6.QtWidgets import QLabel, QStackedWidget, QWidget

from app.document import Document, Scene, Selection
from app.error_messages import guarded
from app.panels.dress import SMALL_POINTS, heading, panel_style, quiet, scrolled_column
from app.panels.record_form import Home, RecordForm
from app.theme import Theme, text_font
from shaftcore.declared import Part, declared
from shaftcore.edits import make_locating, replace_thing, set_length
from shaftcore.notches.kinds import KINDS
from shaftcore.reactions import reaction_of, reaction_words
from shaftcore.shaft import Shaft, things

NOTHING_CHOSEN = "Choose something on the bench, or a station in the ledger, and its sizes stand here to be typed."

_OWN_EDITS: dict[str, Callable[[Shaft, str, Any], Shaft]] = {
    "length": set_length,
    "locating": lambda shaft, id, held: make_locating(shaft, id) if held else replace_thing(shaft, id, locating=False),
}
"""Fields whose change moves or changes other things as well."""


def home_of(shaft: Shaft, chosen: Selection) -> Home | None:
    """Where the chosen thing's record lives; a raiser at a face lives in its segment. None where it is gone."""
    kind, id = chosen
    thing = things(shaft).get(id)
    if thing is None:
        return None
    home = Home(id, lambda shaft: things(shaft)[id], lambda shaft, name, value: _write(shaft, id, name, value))
    raiser = KINDS.get(kind)
    if raiser is None or isinstance(thing, raiser.record):
        return home
    for name, declaration in declared(thing).items():
        if isinstance(declaration, Part) and raiser.record in declaration.kinds and getattr(thing, name) is not None:
            return home.part(name)
    return home


def _write(shaft: Shaft, id: str, name: str, value: Any) -> Shaft:
    own = _OWN_EDITS.get(name)
    return own(shaft, id, value) if own is not None else replace_thing(shaft, id, **{name: value})


def reaction_said(scene: Scene) -> str:
    """What the chosen support does to the shaft, a line each; "" where no support is chosen or nothing known."""
    if scene.results is None or scene.chosen is None:
        return ""
    reaction = reaction_of(scene.results, scene.chosen[1])
    return "" if reaction is None else "\n".join(p.written(scene.system) for p in reaction_words(reaction))


class ThingPanel(QWidget):
    """One form a sort of thing, kept once made; empty while nothing is chosen."""

    def __init__(self, document: Document, theme: Theme) -> None:
        super().__init__()
        self._document, self._theme = document, theme
        self._home: Home | None = None
        self.forms: dict[type, RecordForm] = {}
        self.setAccessibleName("Chosen thing")
        self.title = heading("")
        self.nothing = quiet(NOTHING_CHOSEN)
        self.said = QLabel()
        self.said.setWordWrap(True)
        self.said.setFont(text_font(SMALL_POINTS))
        self.said.setAccessibleName("Reaction of the support")
        self._stack = QStackedWidget()
        column = scrolled_column(self)
        for part in (self.title, self.nothing, self.said, self._stack):
            column.addWidget(part)
        column.addStretch(1)
        self.set_theme(theme)
        document.shown.connect(self._shown)
        self._shown(document.scene)

    def set_theme(self, theme: Theme) -> None:
        self._theme = theme
        self.setStyleSheet(panel_style(theme))
        for form in self.forms.values():
            form.set_theme(theme)

    @guarded
    def _shown(self, scene: Scene) -> None:
        home = None if scene.chosen is None else home_of(scene.shaft, scene.chosen)
        self._home = home
        record = None if home is None else home.read(scene.shaft)
        self.title.setVisible(record is not None)
        self.nothing.setVisible(record is None)
        self._stack.setVisible(record is not None)
        self._say(reaction_said(scene))
        if record is None or scene.chosen is None:
            return
        self.title.setText(f"{record.label} {scene.chosen[1]}")
        form = self._form_of(type(record))
        form.show_record(record, scene.system)
        self._stack.setCurrentWidget(form)

    def _say(self, words: str) -> None:
        self.said.setText(words)
        self.said.setVisible(bool(words))

    def _form_of(self, record: type) -> RecordForm:
        if record not in self.forms:
            form = RecordForm(self._document, self._theme, record, self._present_home)
            form.renamed.connect(self._renamed)
            self.forms[record] = form
            self._stack.addWidget(form)
        return self.forms[record]

    def _present_home(self) -> Home:
        if self._home is None:
            raise LookupError("nothing is chosen")
        return self._home

    @guarded
    def _renamed(self, id: str) -> None:
        """Stay with the thing after its id was changed."""
        chosen = self._document.scene.chosen
        if chosen is not None:
            self._document.choose((chosen[0], id))
