"""The traces by keyboard: stations, tracks and their heights as actions of the widget."""

from collections.abc import Callable
from typing import TYPE_CHECKING

from PySide6.QtCore import Qt
from PySide6.QtGui import QAction, QKeySequence

from app.error_messages import guarded

if TYPE_CHECKING:
    from app.traces.view import TraceView

FURTHEST = 10**6
TALLER_BY = 12.0


def track_actions(view: "TraceView") -> list[QAction]:
    """Actions that work while the traces have the focus, and in their context menu."""
    rows: tuple[tuple[str, str, Callable[[], None]], ...] = (
        ("Next station", "Right", lambda: view.step_station(1)),
        ("Previous station", "Left", lambda: view.step_station(-1)),
        ("First station", "Home", lambda: view.step_station(-FURTHEST)),
        ("Last station", "End", lambda: view.step_station(FURTHEST)),
        ("Next track", "Down", lambda: view.step_track(1)),
        ("Previous track", "Up", lambda: view.step_track(-1)),
        ("Taller track", "Ctrl+Down", lambda: view.make_taller(TALLER_BY)),
        ("Lower track", "Ctrl+Up", lambda: view.make_taller(-TALLER_BY)),
    )
    return [_action(view, *row) for row in rows]


def _action(view: "TraceView", words: str, key: str, act: Callable[[], None]) -> QAction:
    action = QAction(words, view)
    action.setShortcut(QKeySequence(key))
    action.setShortcutContext(Qt.ShortcutContext.WidgetShortcut)
    action.triggered.connect(guarded(lambda _=False: act()))
    return action
