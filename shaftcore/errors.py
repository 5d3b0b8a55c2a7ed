"""The one tree of errors; every message is fit to be shown to the user as it stands."""

from collections.abc import Iterable

from shaftcore.records import Problem


class FilletwrightError(Exception):
    """Anything the program refuses, in words for the user."""


class UnsoundShaftError(FilletwrightError):
    """A shaft that cannot be analysed; `problems` says why, place by place."""

    def __init__(self, problems: Iterable[Problem], place: str = "") -> None:
        self.problems = tuple(problems)
        self.place = place
        head = f"{place}: " if place else ""
        more = f" (and {len(self.problems) - 1} more)" if len(self.problems) > 1 else ""
        super().__init__(f"{head}{self.problems[0]}{more}")


class ShaftFileError(UnsoundShaftError):
    """A file that is no sound shaft file."""


class FileAccessError(FilletwrightError):
    """A file that could not be read or written; nothing was lost."""


class QuantityError(FilletwrightError):
    """A typed number that is none, or lies outside what its place allows."""


class StoppedError(FilletwrightError):
    """Long work was cancelled by the user."""
