"""Writing the margin sheet from the window, off the interface thread."""

import hashlib
from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING

from shaftcore.shaft_file import shaft_to_text

from app.long_work import LongWork, Progress, Stopped
from shaftcore.results import Results
from shaftcore.units import System

if TYPE_CHECKING:
    from app.main_window import MainWindow


def export_sheet(window: "MainWindow", results: Results, path: Path, day: date, system: System) -> LongWork:
    """Start writing the sheet of these results; the design may change meanwhile, the sheet does not."""
    file_hash = hashlib.sha256(shaft_to_text(results.shaft).encode()).hexdigest()

    def work(progress: Progress, stopped: Stopped) -> None:
        from shaftcore.sheet import write_sheet

        write_sheet(results, path, file_hash=file_hash, date=day, system=system, progress=progress, stopped=stopped)

    job = LongWork(window, "Writing the margin sheet", work)

    def ended(done: bool) -> None:
        words = f"Margin sheet written to {path}" if done else "The margin sheet was not written"
        window.statusBar().showMessage(words, 10000)

    job.finished.connect(ended)
    job.start()
    return job
