"""What the window looked like last time, kept in the preferences and brought back."""

import re
from typing import TYPE_CHECKING

from PySide6.QtWidgets import QSplitter

if TYPE_CHECKING:
    from app.main_window import MainWindow


def _splitters(window: "MainWindow") -> dict[str, QSplitter]:
    return {"left": window.left, "right": window.right, "across": window.across}


def _shares(lines: list[str]) -> dict[str, float]:
    """``key=share`` by line; what cannot be read counts as never kept."""
    found = (re.fullmatch(r"(\w+)=(\d+\.\d+)", line) for line in lines)
    return {match[1]: float(match[2]) for match in found if match}


def restore(window: "MainWindow") -> None:
    """Bring back sizes, units, traces, ledger columns and open parts."""
    kept = window.preferences
    opened = kept.lines("opened parts", [key for key, fold in window.folds.items() if fold.opened])
    for key, fold in window.folds.items():
        fold.set_opened(key in opened)
    for key, splitter in _splitters(window).items():
        state = kept.state(f"split/{key}")
        if state is not None:
            splitter.restoreState(state)
    geometry = kept.state("geometry")
    if geometry is not None:
        window.restoreGeometry(geometry)
    if kept.words("units", "SI") == "US":
        window.document.set_system("US")
    window.traces.show_tracks(kept.lines("tracks", list(window.traces.shown_tracks)))
    window.traces.set_track_heights(_shares(kept.lines("track heights", [])))
    window.ledger.columns = kept.lines("ledger columns", list(window.ledger.columns))
    window.ledger.order = kept.words("ledger order", window.ledger.order)


def remember(window: "MainWindow") -> None:
    """Keep what `restore` brings back."""
    kept = window.preferences
    for key, splitter in _splitters(window).items():
        kept.keep(f"split/{key}", splitter.saveState())
    kept.keep("geometry", window.saveGeometry())
    kept.keep("units", window.document.scene.system)
    kept.keep("tracks", list(window.traces.shown_tracks))
    kept.keep("track heights", [f"{key}={share:.3f}" for key, share in window.traces.track_heights.items()])
    kept.keep("ledger columns", list(window.ledger.columns))
    kept.keep("ledger order", window.ledger.order)
    kept.keep("opened parts", [key for key, fold in window.folds.items() if fold.opened])
