"""The margin sheet: one shaft's results as a PDF that a checker can follow from givens to margins."""

import datetime
from collections.abc import Callable
from importlib.metadata import PackageNotFoundError, version
from pathlib import Path

from shaftcore import VERSION
from shaftcore.errors import StoppedError
from shaftcore.results import Results
from shaftcore.units import System
from shaftcore.whole_file import write_whole_file

__all__ = ["write_sheet"]


def write_sheet(
    results: Results,
    path: Path,
    *,
    file_hash: str,
    date: datetime.date,
    system: System = "SI",
    progress: Callable[[float, str], None] | None = None,
    stopped: Callable[[], bool] | None = None,
) -> None:
    """Write the margin sheet of `results` to `path`, whole or not at all.

    The same results, hash, date and units give the same bytes. `progress` gets a share of 0..1 and
    words, `stopped` is asked between steps. Raises StoppedError where it says yes and
    FileAccessError where the file cannot be written; a file that stood there is untouched then.
    """
    from shaftcore.sheet.assembly import sheet_bytes  # the libraries behind it are slow to load
    from shaftcore.sheet.edition import Edition

    def say(share: float, words: str) -> None:
        if progress is not None:
            progress(share, words)

    def pause() -> None:
        if stopped is not None and stopped():
            raise StoppedError("The margin sheet was not written: the export was cancelled.")

    pause()
    content = sheet_bytes(Edition(results, system, file_hash, date, program_version()), say, pause)
    pause()
    say(0.97, "Writing the file")
    write_whole_file(Path(path), content)
    say(1.0, "Done")


def program_version() -> str:
    """The installed version, or this source's where the program runs without being installed."""
    try:
        return version("filletwright")
    except PackageNotFoundError:
        return VERSION
