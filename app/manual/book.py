"""The manual's pages: written ones from files, lists made from what the program declares."""

from collections.abc import Callable
from dataclasses import dataclass
from functools import cache
from importlib.resources import files

from PySide6.QtGui import QKeySequence

from app.actions import COMMANDS
from app.bench.tools import TOOLS
from shaftcore.nomenclature import COLUMNS
from shaftcore.notches._contract import LOAD_SORTS
from shaftcore.notches.kinds import KINDS
from shaftcore.sources import SOURCES
from shaftcore.units import dimension


@dataclass(frozen=True)
class Page:
    """One page: its `key` is the link target, `text` makes the Markdown."""

    key: str
    title: str
    text: Callable[[], str]


def _written(key: str) -> Callable[[], str]:
    return lambda: (files("app.manual") / "pages" / f"{key}.md").read_text(encoding="utf-8")


def _quantities() -> str:
    lines = ["# Quantities of a station", "", "The ledger, the CSV file and the sheet use these names.", ""]
    lines += ["| Symbol | Quantity | Unit | CSV head | |", "| --- | --- | --- | --- | --- |"]
    for column in COLUMNS:
        unit = dimension(column.dimension).si.symbol if column.dimension else ""
        lines.append(f"| {column.symbol} | {column.label} | {unit} | `{column.csv_head}` | {column.words} |")
    return "\n".join(lines)


def _raisers() -> str:
    lines = ["# Raisers and the fits for Kt", ""]
    for kind in KINDS.values():
        lines += [f"## {kind.label}", "", kind.words, ""]
        for choice, fits in kind.fits.items():
            lines += [f"**{choice}**", ""]
            for sort in LOAD_SORTS:
                fit = fits[sort]
                ranges = ", ".join(str(limits) for limits in fit.ranges)
                worst = max((share for _, share in fit.low_by), default=0.0)
                low = f" Finite elements give up to {worst:.0%} more for sharp roots." if worst else ""
                lines.append(f"- {sort}: {fit.formula} ({SOURCES[fit.source].short}), for {ranges}.{low}")
            lines.append("")
    return "\n".join(lines)


def _keys() -> str:
    lines = [_written("keys")(), "## The kit, while the bench or the strip has the keyboard", ""]
    lines += [f"- **{tool.letter}**: {tool.label.lower()}. {tool.words.rstrip('.')}." for tool in TOOLS]
    lines += ["", "## Commands", ""]
    for command in COMMANDS:
        if command.shortcut is not None:
            keys = QKeySequence(command.shortcut).toString(QKeySequence.SequenceFormat.NativeText)
            lines.append(f"- **{keys}**: {command.name.replace('&', '').rstrip('…')}. {command.words}.")
    lines += ["- **Ctrl+Z**, **Ctrl+Shift+Z**: undo, redo"]
    return "\n".join(lines)


def _sources() -> str:
    lines = ["# Sources", "", "Formulas written down from memory are checked against a second source.", ""]
    for source in SOURCES.values():
        memory = " (from memory)" if source.from_memory else ""
        lines.append(f"- **{source.short}**: {source.full}{memory}")
    return "\n".join(lines)


PAGES: tuple[Page, ...] = (
    Page("start", "A first shaft", _written("start")),
    Page("bench", "The bench", _written("bench")),
    Page("traces", "Traces", _written("traces")),
    Page("panels", "Ledger, workings, givens, notices", _written("panels")),
    Page("method", "How the margins come about", _written("method")),
    Page("raisers", "Raisers and fits", _raisers),
    Page("quantities", "Quantities", _quantities),
    Page("sheet", "The margin sheet", _written("sheet")),
    Page("files", "Files and commands", _written("files")),
    Page("keys", "Keys", _keys),
    Page("cautions", "Limits and cautions", _written("cautions")),
    Page("sources", "Sources", _sources),
)
BY_KEY: dict[str, Page] = {page.key: page for page in PAGES}


@cache
def page_text(key: str) -> str:
    """Markdown of a page; KeyError where there is none."""
    return BY_KEY[key].text()


def pages_with(words: str) -> list[Page]:
    """Pages that hold every one of the words, those with a hit in the title first."""
    wanted = words.lower().split()
    found = [page for page in PAGES if all(word in page_text(page.key).lower() for word in wanted)]
    return sorted(found, key=lambda page: not any(word in page.title.lower() for word in wanted))
