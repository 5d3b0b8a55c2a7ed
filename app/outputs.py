"""What the window writes besides the shaft file: margin sheet, ledger, picture."""

import hashlib
from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING

from app.error_messages import tell
from app.file_dialogs import ask_save
from app.long_work import LongWork, Progress, Stopped
from shaftcore.results import Results
from shaftcore.shaft_file import shaft_to_text
from shaftcore.units import System

if TYPE_CHECKING:
    from app.main_window import MainWindow

MESSAGE_MS = 10_000


def _beside(window: "MainWindow", suffix: str) -> Path:
    """A name beside the shaft file, with another ending."""
    path = window.document.path
    if path is None:
        return Path(window.preferences.folder()) / f"shaft{suffix}"
    return path.with_name(path.name.removesuffix(".json").removesuffix(".shaft") + suffix)


def write_sheet(window: "MainWindow") -> None:
    """Ask where to, then write the margin sheet of the design as it is now."""
    scene = window.document.scene
    if scene.results is None:
        return
    path = ask_save(window, "Write the margin sheet", _beside(window, ".pdf"), "PDF (*.pdf)", ".pdf")
    if path is not None:
        export_sheet(window, scene.results, path, date.today(), scene.system)


def export_sheet(window: "MainWindow", results: Results, path: Path, day: date, system: System) -> LongWork:
    """Write the sheet off the interface thread; the design may change meanwhile, the sheet does not."""
    file_hash = hashlib.sha256(shaft_to_text(results.shaft).encode()).hexdigest()

    def work(progress: Progress, stopped: Stopped) -> None:
        from shaftcore.sheet import write_sheet as write

        write(results, path, file_hash=file_hash, date=day, system=system, progress=progress, stopped=stopped)

    def ended(done: bool) -> None:
        words = f"Margin sheet written to {path}" if done else "The margin sheet was not written"
        window.statusBar().showMessage(words, MESSAGE_MS)

    job = LongWork(window, "Writing the margin sheet", work)
    job.finished.connect(ended)
    job.start()
    return job


def write_ledger(window: "MainWindow") -> None:
    """Ask where to, then write every number of every station as CSV."""
    from shaftcore.ledger_table import ledger_csv
    from shaftcore.whole_file import write_whole_file

    results = window.document.scene.results
    if results is None:
        return
    path = ask_save(window, "Write the ledger", _beside(window, ".csv"), "CSV (*.csv)", ".csv")
    if path is not None:
        write_whole_file(path, ledger_csv(results).encode())
        window.statusBar().showMessage(f"Ledger written to {path}", MESSAGE_MS)


def write_picture(window: "MainWindow") -> None:
    """Ask where to, then write the window as it is."""
    path = ask_save(window, "Write a picture of the window", _beside(window, ".png"), "PNG (*.png)", ".png")
    if path is None:
        return
    if window.grab().save(str(path), "PNG"):
        window.statusBar().showMessage(f"Picture written to {path}", MESSAGE_MS)
    else:
        tell("The picture could not be written", f"{path}: choose a folder you may write to.", window)
