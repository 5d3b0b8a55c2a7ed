"""The commands without a window: check a file, list its stations, write its margin sheet."""

import argparse
import contextlib
import datetime
import hashlib
import logging
import os
import sys
from collections.abc import Callable, Sequence
from pathlib import Path
from typing import NoReturn

from shaftcore import VERSION
from shaftcore.errors import FileAccessError, FilletwrightError, UnsoundShaftError
from shaftcore.evaluation import evaluate
from shaftcore.ledger_table import columns_text, ledger_csv, ledger_text, summary
from shaftcore.results import Results
from shaftcore.shaft import Shaft
from shaftcore.shaft_file import shaft_from_bytes
from shaftcore.shaft_file.json_text import LARGEST_FILE
from shaftcore.soundness import problems_of
from shaftcore.whole_file import read_at_most, write_whole_file

PROGRAM = "filletwright"
LOG = logging.getLogger(PROGRAM)
SOUND, MISSED, BAD_INPUT, SLIP = 0, 1, 2, 3

ABOUT = """\
Sizes rotating shafts: a fatigue and a yield margin at every station.

  filletwright [SHAFT.json]                    open the window
  filletwright check SHAFT.json                say what is wrong with a file, or that it is sound
  filletwright ledger SHAFT.json [--csv OUT]   list the stations with factors and margins
  filletwright sheet SHAFT.json OUT.pdf        write the margin sheet
  filletwright likeness SHAFT.json OUT.png     write a picture of the window"""

STATUS = """\
exit status: 0 sound, 1 a station misses its asked factor (ledger, sheet), 2 bad input,
3 stopped, or a slip of the program's own.
The results are a design aid; the codes in force and licensed practice decide."""


def main(argv: Sequence[str] | None = None) -> int:
    """Run one command; returns its exit status. Complaints go to stderr, one line each."""
    for stream in (sys.stdout, sys.stderr):
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(errors="replace")  # a console that lacks a letter gets "?" instead of an error
    try:
        status = _run(sys.argv[1:] if argv is None else argv)
        sys.stdout.flush()
        return status
    except BrokenPipeError:
        _let_go_of_stdout()
        return SOUND
    except KeyboardInterrupt:
        _complain("stopped")
    except Exception as error:  # a slip of ours: no traceback at the user
        LOG.debug("unexpected", exc_info=error)
        _complain(f"something went wrong inside the program ({type(error).__name__}: {error}); no file was changed")
    return SLIP


def _run(argv: Sequence[str]) -> int:
    try:
        given = _parser().parse_args(argv)
        return int(given.run(given))
    except SystemExit as end:  # argparse has said all there is to say
        return int(end.code or 0)
    except UnsoundShaftError as error:
        for problem in error.problems:
            _complain(f"{error.place}: {problem}" if error.place else str(problem))
        return BAD_INPUT
    except FilletwrightError as error:
        _complain(str(error))
        return BAD_INPUT


# the commands -----------------------------------------------------------------------------------


def _check(given: argparse.Namespace) -> int:
    shaft, _ = _opened(given.shaft)
    missing = problems_of(shaft)
    if missing:
        print(f"{given.shaft.name}: nothing is wrong, but the shaft is not finished")
        raise UnsoundShaftError(missing, f"{given.shaft.name}: missing")
    counts = ", ".join(f"{name} {len(getattr(shaft, name))}" for name in ("segments", "raisers", "supports", "loads"))
    print(f"{given.shaft.name}: sound and finished ({counts})")
    return SOUND


def _ledger(given: argparse.Namespace) -> int:
    results, _ = _analysed(given.shaft)
    if given.csv is not None:
        _keep_apart(given.shaft, given.csv)
        write_whole_file(given.csv, ledger_csv(results).encode())
    print(ledger_text(results))
    print(summary(results))
    return _status(results)


def _sheet(given: argparse.Namespace) -> int:
    from shaftcore.sheet import write_sheet  # drawing and printing are slow to load

    _keep_apart(given.shaft, given.out)
    results, file_hash = _analysed(given.shaft)
    write_sheet(results, given.out, file_hash=file_hash, date=given.date or datetime.date.today())
    print(summary(results))
    return _status(results)


def _opened(path: Path) -> tuple[Shaft, str]:
    """The shaft of a file and the file's SHA-256."""
    content = read_at_most(path, LARGEST_FILE + 1)
    return shaft_from_bytes(content, path.name), hashlib.sha256(content).hexdigest()


def _analysed(path: Path) -> tuple[Results, str]:
    shaft, file_hash = _opened(path)
    try:
        return evaluate(shaft), file_hash
    except UnsoundShaftError as error:
        raise UnsoundShaftError(error.problems, f"{path.name}: missing") from error


def _keep_apart(shaft: Path, out: Path) -> None:
    """Refuse to write over the shaft itself."""
    if os.path.realpath(shaft) == os.path.realpath(out):
        raise FileAccessError(f"{out} is the shaft file itself; name another file to write to.")


def _status(results: Results) -> int:
    return SOUND if results.sound else MISSED


# the command line -------------------------------------------------------------------------------


class _Parser(argparse.ArgumentParser):
    """Says what is amiss in one line."""

    def error(self, message: str) -> NoReturn:
        _complain(f"{message}; see {self.prog} --help")
        sys.exit(BAD_INPUT)


class _Columns(argparse.Action):
    """Print what the columns hold, and end."""

    def __call__(self, *_: object) -> NoReturn:
        print(columns_text(), end="")
        sys.exit(SOUND)


def _date(text: str) -> datetime.date:
    try:
        return datetime.date.fromisoformat(text)
    except ValueError:
        raise argparse.ArgumentTypeError(f'"{text}" is no date; write it as YYYY-MM-DD') from None


def _ledger_options(command: argparse.ArgumentParser) -> None:
    command.add_argument("--csv", metavar="OUT.csv", type=Path, help="write all columns to this file as well")
    command.add_argument("--columns", action=_Columns, nargs=0, help="list the columns of the CSV, and end")


def _sheet_options(command: argparse.ArgumentParser) -> None:
    command.add_argument("out", metavar="OUT.pdf", type=Path, help="the file to write")
    command.add_argument("--date", metavar="YYYY-MM-DD", type=_date, help="date in the title block, else today")


def _no_options(command: argparse.ArgumentParser) -> None:
    """The shaft file is all the command takes."""


def _parser() -> argparse.ArgumentParser:
    raw = argparse.RawDescriptionHelpFormatter
    parser = _Parser(PROGRAM, "%(prog)s COMMAND …", ABOUT, STATUS, formatter_class=raw, allow_abbrev=False)
    parser.add_argument("--version", action="version", version=f"{PROGRAM} {VERSION}")
    commands = parser.add_subparsers(title="commands", metavar="COMMAND", required=True, prog=PROGRAM)
    for name, (run, words, options) in _COMMANDS.items():
        about = f"{words[0].upper()}{words[1:]}."
        command = commands.add_parser(
            name, help=words, description=about, epilog=STATUS, formatter_class=raw, allow_abbrev=False
        )
        command.add_argument("shaft", metavar="SHAFT.json", type=Path, help="the shaft file")
        options(command)
        command.set_defaults(run=run)
    return parser


def _complain(words: str) -> None:
    print(f"{PROGRAM}: {' '.join(words.split())}", file=sys.stderr)


def _let_go_of_stdout() -> None:
    """Whoever read our output has gone; keep the interpreter from complaining about it at its end."""
    with contextlib.suppress(OSError):
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())


Run = Callable[[argparse.Namespace], int]
Options = Callable[[argparse.ArgumentParser], None]
_COMMANDS: dict[str, tuple[Run, str, Options]] = {
    "check": (_check, "say what is wrong with a shaft file, or that it is sound", _no_options),
    "ledger": (_ledger, "list the stations with factors and margins", _ledger_options),
    "sheet": (_sheet, "write the margin sheet as PDF", _sheet_options),
}
COMMANDS: tuple[str, ...] = tuple(_COMMANDS)
"""The names `main` takes as its first word."""
