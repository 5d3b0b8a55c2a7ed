"""Asking for file names, and whether to keep unsaved work."""

from enum import Enum
from pathlib import Path

from PySide6.QtWidgets import QFileDialog, QMessageBox, QWidget

SHAFT_SUFFIX = ".shaft.json"
SHAFT_FILTER = "Shaft files (*.shaft.json *.json)"


class Unsaved(Enum):
    SAVE = "save"
    DROP = "drop"
    STAY = "stay"


def ask_open(parent: QWidget, folder: str) -> Path | None:
    name, _ = QFileDialog.getOpenFileName(parent, "Open a shaft", folder, SHAFT_FILTER)
    return Path(name) if name else None


def ask_save(parent: QWidget, head: str, suggestion: Path, file_filter: str, suffix: str) -> Path | None:
    """A name to write to, ending in `suffix`; None where nothing is to be written."""
    name, _ = QFileDialog.getSaveFileName(parent, head, str(suggestion), file_filter)
    if not name:
        return None
    if name.endswith((suffix, suffix[suffix.rindex(".") :])):
        return Path(name)
    path = Path(name + suffix)
    return path if not path.exists() or ask_replace(parent, path.name) else None  # Qt asked about another name


def ask_replace(parent: QWidget, name: str) -> bool:
    """May a file that stands there already be written over?"""
    button = QMessageBox.StandardButton
    box = QMessageBox(QMessageBox.Icon.NoIcon, "Filletwright", f"Write over {name}?", parent=parent)
    box.setInformativeText("A file of this name stands there already.")
    box.setStandardButtons(button.Yes | button.Cancel)
    box.setDefaultButton(button.Cancel)
    return int(box.exec()) == int(button.Yes)


def ask_unsaved(parent: QWidget, name: str) -> Unsaved:
    """What is to become of unsaved changes."""
    button = QMessageBox.StandardButton
    box = QMessageBox(QMessageBox.Icon.NoIcon, "Filletwright", f"Keep the changes to {name}?", parent=parent)
    box.setInformativeText("They are not saved yet.")
    box.setStandardButtons(button.Save | button.Discard | button.Cancel)
    box.setDefaultButton(button.Save)
    answer = box.exec()
    return {int(button.Save): Unsaved.SAVE, int(button.Discard): Unsaved.DROP}.get(int(answer), Unsaved.STAY)
