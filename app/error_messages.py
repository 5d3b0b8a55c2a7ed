"""What the user sees when something goes wrong, and the guard that keeps it from going worse."""

import functools
import logging
from collections.abc import Callable
from typing import Any, TypeVar

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QApplication, QMessageBox, QWidget

from shaftcore.errors import FilletwrightError

F = TypeVar("F", bound=Callable[..., Any])
LOG = logging.getLogger("filletwright")
WORDS_WIDTH = 360
"""Pixels for the words of a message box; left to itself it breaks them after two or three."""
SLIPS: list[Exception] = []
"""Errors of the program's own since it started: none of them reached the user as a crash."""

_OPEN: dict[tuple[str, str], QMessageBox] = {}
"""Boxes on the screen, by their words; held here so that they live as long as they are shown."""


def guarded(method: F) -> F:
    """For every override of a Qt virtual and every slot: no exception may leave it.

    An exception that escapes such a method can end the process; here it becomes a calm message,
    and the design stays as it was.
    """

    @functools.wraps(method)
    def inner(*args: Any, **kwargs: Any) -> Any:
        try:
            return method(*args, **kwargs)
        except Exception as error:
            report(error)
            return None

    return inner  # type: ignore[return-value]


def report(error: Exception, parent: QWidget | None = None) -> None:
    """Show an error; what the user cannot mend is logged and said in plain words."""
    if isinstance(error, FilletwrightError):
        tell("This could not be done", str(error), parent)
        return
    LOG.error("unexpected", exc_info=error)
    SLIPS.append(error)
    tell(
        "Something went wrong inside the program",
        f"{type(error).__name__}: {error}\n\nThe design is as it was before. Save it under a new name to be safe.",
        parent,
    )


def tell(head: str, words: str, parent: QWidget | None = None) -> None:
    """A calm message box; one that is still open with the same words is not opened twice."""
    if QApplication.instance() is None:
        LOG.error("%s: %s", head, words)
        return
    if (head, words) in _OPEN:
        return
    above = parent or QApplication.activeWindow()
    box = QMessageBox(QMessageBox.Icon.NoIcon, "Filletwright", head, QMessageBox.StandardButton.Ok, above)
    box.setInformativeText(words)
    box.setStyleSheet(f"QLabel#qt_msgbox_informativelabel {{ min-width: {WORDS_WIDTH}px; }}")
    box.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
    _OPEN[head, words] = box
    box.finished.connect(lambda _: _OPEN.pop((head, words), None))
    box.open()
