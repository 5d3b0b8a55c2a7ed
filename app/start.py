"""Bringing the window up, on a screen or as a picture."""

import signal
import sys
from pathlib import Path

from PySide6.QtCore import QSettings, QTimer
from PySide6.QtWidgets import QApplication

from app.error_messages import SLIPS
from app.icon import program_icon
from app.main_window import MainWindow
from app.preferences import Preferences
from app.theme import LIGHT, apply_theme, load_type, system_theme
from shaftcore.errors import FileAccessError, FilletwrightError
from shaftcore.shaft_file import read_shaft

LIKENESS_SIZE = (1400, 900)
SHARE_OF_SCREEN = 0.88
ROOMY = 1600
"""Screens narrower than this (pixels) are filled by the window when it opens for the first time."""


def _application() -> QApplication:
    app = QApplication.instance()
    if not isinstance(app, QApplication):
        app = QApplication(sys.argv[:1])
    app.setApplicationName("Filletwright")
    app.setOrganizationName("Filletwright")
    app.setDesktopFileName("filletwright")
    app.setWindowIcon(program_icon())
    load_type()
    return app


def open_window(path: Path | None) -> int:
    """Show the window, with a shaft if one is named, until it is closed."""
    app = _application()
    preferences = Preferences()
    desktop = system_theme(app)
    window = MainWindow(preferences, desktop)
    screen = app.primaryScreen().availableGeometry()
    first_time = preferences.state("geometry") is None
    if first_time:
        window.resize(screen.size() * SHARE_OF_SCREEN)
    if first_time and screen.width() < ROOMY:
        window.showMaximized()
    else:
        window.show()
    if path is not None:
        window.open_file(path)
    # lets Ctrl+C in the terminal end the program: Python needs a moment to see the signal
    signal.signal(signal.SIGINT, lambda *_: window.close())
    pulse = QTimer()
    pulse.start(250)
    pulse.timeout.connect(lambda: None)
    return app.exec()


def write_likeness(shaft_path: Path, picture_path: Path) -> int:
    """Write the window with this shaft as a PNG; 0, else a line on stderr and 2, or 3 for a slip of our own."""
    try:
        shaft = read_shaft(shaft_path)
        app = _application()
        scratch = Preferences(QSettings("", QSettings.Format.IniFormat))
        apply_theme(app, LIGHT)
        window = MainWindow(scratch, LIGHT)
        window.resize(*LIKENESS_SIZE)
        window.document.load(shaft, shaft_path)
        results = window.document.scene.results
        if results is not None:
            window.document.choose(None, results.governing)
        window.show()
        for _ in range(5):
            app.processEvents()
        if not window.grab().save(str(picture_path), "PNG"):
            raise FileAccessError(f"{picture_path}: the picture could not be written; choose a folder you may write to")
        window.close()
    except FilletwrightError as error:
        print(f"filletwright: {error}", file=sys.stderr)
        return 2
    if SLIPS:
        print(f"filletwright: {picture_path} is not whole: {SLIPS[0]}", file=sys.stderr)
        return 3
    return 0
