"""The menu bar, built from the actions, with the lists that change while the program runs."""

from collections.abc import Callable
from functools import partial
from typing import TYPE_CHECKING

from PySide6.QtGui import QAction, QActionGroup, QKeySequence
from PySide6.QtWidgets import QMenu

from app.actions import COMMANDS
from app.error_messages import guarded
from shaftcore.demo import demo_shafts

if TYPE_CHECKING:
    from app.main_window import MainWindow


class Menus:
    """Fills the window's menu bar."""

    def __init__(self, window: "MainWindow") -> None:
        self._window = window
        bar = window.menuBar()
        menus: dict[str, QMenu] = {}
        for name in ("&File", "&Edit", "&View", "&Help"):
            menus[name] = bar.addMenu(name)
        for command in COMMANDS:
            if command.line_before:
                menus[command.menu].addSeparator()
            menus[command.menu].addAction(window.actions_by_key[command.key])
        self._files(menus["&File"])
        self._edit(menus["&Edit"])
        self._view(menus["&View"])

    def _files(self, menu: QMenu) -> None:
        save = self._window.actions_by_key["save"]
        recent, demos = QMenu("Open &recent", menu), QMenu("Open a &demo shaft", menu)
        menu.insertMenu(save, recent)
        menu.insertMenu(save, demos)
        menu.insertSeparator(save)
        recent.aboutToShow.connect(guarded(lambda: self._fill_recent(recent)))
        for path in demo_shafts():
            name = path.name.removesuffix(".shaft.json").replace("_", " ").capitalize()
            _add(demos, name, partial(self._window.open_copy, path))

    def _fill_recent(self, menu: QMenu) -> None:
        menu.clear()
        for path in self._window.preferences.recent_files():
            _add(menu, str(path), partial(self._window.open_file, path))
        if menu.isEmpty():
            menu.addAction("none yet").setEnabled(False)

    def _edit(self, menu: QMenu) -> None:
        stack = self._window.document.undo_stack
        undo, redo = stack.createUndoAction(menu, "&Undo"), stack.createRedoAction(menu, "&Redo")
        undo.setShortcut(QKeySequence("Ctrl+Z"))
        redo.setShortcuts([QKeySequence("Ctrl+Shift+Z"), QKeySequence("Ctrl+Y")])
        menu.addActions([undo, redo])

    def _view(self, menu: QMenu) -> None:
        window = self._window
        menu.addSeparator()
        traces = menu.addMenu("&Traces")
        traces.aboutToShow.connect(guarded(lambda: self._fill_traces(traces)))
        units = menu.addMenu("&Units")
        system = window.document.scene.system
        _exclusive(
            units,
            [("SI", "&SI: mm, N, N·m, MPa"), ("US", "&US customary: in, lbf, lbf·in, ksi")],
            window.preferences.words("units", system),
            lambda name: window.document.set_system("US" if name == "US" else "SI"),
        )
        colours = menu.addMenu("C&olours")
        _exclusive(
            colours,
            [("", "&As the desktop"), ("light", "&Light"), ("dark", "&Dark")],
            window.preferences.words("theme", ""),
            window.choose_theme,
        )
        parts = menu.addMenu("&Parts at the right")
        for fold in window.folds.values():
            action = parts.addAction(fold.title)
            action.setCheckable(True)
            action.setChecked(fold.opened)
            action.toggled.connect(fold.set_opened)
            fold.folded.connect(action.setChecked)

    def _fill_traces(self, menu: QMenu) -> None:
        menu.clear()
        traces = self._window.traces
        for key, label in traces.available_tracks():
            action = menu.addAction(label)
            action.setCheckable(True)
            action.setChecked(key in traces.shown_tracks)
            action.toggled.connect(guarded(lambda on, key=key: self._show_track(key, on)))

    def _show_track(self, key: str, on: bool) -> None:
        traces = self._window.traces
        wanted = {*traces.shown_tracks, key} if on else {*traces.shown_tracks} - {key}
        order = [known for known, _ in traces.available_tracks() if known in wanted]
        traces.show_tracks(order)


def _add(menu: QMenu, name: str, slot: Callable[[], object]) -> QAction:
    action = menu.addAction(name)
    action.triggered.connect(guarded(lambda checked=False: slot()))
    return action


def _exclusive(menu: QMenu, options: list[tuple[str, str]], now: str, slot: Callable[[str], object]) -> None:
    group = QActionGroup(menu)
    for key, name in options:
        action = menu.addAction(name)
        action.setCheckable(True)
        action.setChecked(key == now)
        action.setActionGroup(group)
        action.triggered.connect(guarded(lambda checked=False, key=key: slot(key)))
