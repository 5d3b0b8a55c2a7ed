"""Every command of the window as one list: name, shortcut, what it does. Menus are built from it."""

from collections.abc import Callable
from dataclasses import dataclass

from PySide6.QtGui import QAction, QKeySequence
from PySide6.QtWidgets import QMainWindow

from app.error_messages import guarded


@dataclass(frozen=True)
class Command:
    """One entry: `key` names it in code, `menu` the menu it stands in, "-" before a name draws a line first."""

    key: str
    menu: str
    name: str
    shortcut: str | QKeySequence.StandardKey | None
    words: str
    line_before: bool = False


STANDARD = QKeySequence.StandardKey
COMMANDS: tuple[Command, ...] = (
    Command("new", "&File", "&New shaft", STANDARD.New, "Begin with an empty bench"),
    Command("open", "&File", "&Open…", STANDARD.Open, "Open a shaft file"),
    Command("save", "&File", "&Save", STANDARD.Save, "Save the shaft to its file", line_before=True),
    Command("save_as", "&File", "Save &as…", "Ctrl+Shift+S", "Save the shaft under another name"),
    Command("sheet", "&File", "&Margin sheet…", "Ctrl+P", "Write the margin sheet as a PDF", line_before=True),
    Command("ledger_csv", "&File", "&Ledger as CSV…", "Ctrl+Shift+E", "Write every station with every number as CSV"),
    Command("likeness", "&File", "&Picture of the window…", None, "Write what is shown as a PNG"),
    Command("quit", "&File", "&Quit", "Ctrl+Q", "Close the program", line_before=True),
    Command("fit", "&View", "&Fit the shaft", "Ctrl+0", "Show the whole shaft"),
    Command("closer", "&View", "&Closer", STANDARD.ZoomIn, "Look closer at the middle of the bench"),
    Command("farther", "&View", "F&arther", STANDARD.ZoomOut, "See more of the shaft"),
    Command("next_part", "&View", "&Next part of the window", "F6", "Move the keyboard to the next part", True),
    Command("manual", "&Help", "&Manual", STANDARD.HelpContents, "The manual, without a network"),
    Command("cautions", "&Help", "&What the margins do not cover", None, "Limits and cautions"),
    Command("about", "&Help", "&About Filletwright", None, "Version and licence", line_before=True),
)


def build_actions(window: QMainWindow, slots: dict[str, Callable[[], object]]) -> dict[str, QAction]:
    """A QAction for every command, by key; KeyError where a command has no slot."""
    made = {}
    for command in COMMANDS:
        action = QAction(command.name, window)
        if command.shortcut is not None:
            action.setShortcut(QKeySequence(command.shortcut))
        action.setStatusTip(command.words)
        action.setToolTip(command.words)
        slot = guarded(slots[command.key])
        action.triggered.connect(lambda checked=False, slot=slot: slot())
        made[command.key] = action
    return made
