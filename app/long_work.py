"""Work that takes longer than a moment: off the interface thread, with progress and Cancel."""

import threading
from collections.abc import Callable

from PySide6.QtCore import QObject, Qt, QThread, Signal
from PySide6.QtWidgets import QProgressDialog, QWidget

from app.error_messages import guarded, report
from shaftcore.errors import StoppedError

Progress = Callable[[float, str], None]
Stopped = Callable[[], bool]


class _Worker(QThread):
    moved = Signal(float, str)
    failed = Signal(object)

    def __init__(self, work: Callable[[Progress, Stopped], None], parent: QObject) -> None:
        super().__init__(parent)
        self._work = work
        self.halt = threading.Event()
        self.done = False

    def run(self) -> None:
        try:
            self._work(self.moved.emit, self.halt.is_set)
            self.done = True
        except StoppedError:
            pass
        except Exception as error:  # shown by the window; a thread must not die loudly
            self.failed.emit(error)


class LongWork(QObject):
    """One piece of work with its progress dialog; `finished(bool)` tells whether it was done."""

    finished = Signal(bool)

    def __init__(self, parent: QWidget, head: str, work: Callable[[Progress, Stopped], None]) -> None:
        super().__init__(parent)
        self._window = parent
        self._dialog = QProgressDialog(head, "Cancel", 0, 100, parent)
        self._dialog.setWindowTitle("Filletwright")
        self._dialog.setWindowModality(Qt.WindowModality.WindowModal)
        self._dialog.setMinimumDuration(300)
        self._dialog.setAutoClose(False)
        self._dialog.setAutoReset(False)
        self._worker = _Worker(work, self)
        self._worker.moved.connect(self._show)
        self._worker.failed.connect(self._failed)
        self._worker.finished.connect(self._end)
        self._dialog.canceled.connect(self.halt)
        self._error: Exception | None = None

    def start(self) -> None:
        self._worker.start()

    @property
    def going_on(self) -> bool:
        return self._worker.isRunning()

    def halt(self) -> None:
        """Ask the work to stop, as Cancel does."""
        self._worker.halt.set()

    def stop_and_wait(self) -> None:
        """For closing the window while work is going on."""
        self.halt()
        self._worker.wait()

    @guarded
    def _show(self, share: float, words: str) -> None:
        if not self._worker.halt.is_set():
            self._dialog.setLabelText(words)
            self._dialog.setValue(round(100 * share))

    @guarded
    def _failed(self, error: Exception) -> None:
        self._error = error

    @guarded
    def _end(self) -> None:
        self._dialog.close()
        self._dialog.deleteLater()
        if self._error is not None:
            report(self._error, self._window)
        self.finished.emit(self._worker.done)
        self.deleteLater()
