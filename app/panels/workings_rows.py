"""The workings of a station as rows of text: what stands on each line of the panel."""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Literal

from shaftcore.calculation_lines import written
from shaftcore.number_text import with_unit
from shaftcore.results import Results
from shaftcore.sources import SOURCES
from shaftcore.units import System
from shaftcore.workings import Chapter, Line

Sort = Literal["title", "quiet", "head", "name", "formula", "value", "flag"]


@dataclass(frozen=True)
class Row:
    """One paragraph: `symbol` stands in the margin, `strong` in bold after `text`, `faint` behind both."""

    sort: Sort
    text: str = ""
    symbol: str = ""
    strong: str = ""
    faint: str = ""


def rows_of(results: Results, station: int, chapters: Sequence[Chapter], system: System) -> list[Row]:
    """Title, then every chapter with its lines."""
    here = results.stations[station]
    rows = [Row("title", f"No. {here.number}  {here.label}")]
    said = ["governs the shaft"] * (station == results.governing) + ["provisional"] * results.provisional
    place = f"at x = {with_unit(here.x, 'length', system)}"
    rows.append(Row("quiet", ", ".join([place, *said]) + ". Worked in mm, N and MPa."))
    for chapter in chapters:
        rows.append(Row("head", chapter.title))
        for line in chapter.lines:
            rows.extend(_line_rows(line, system))
    return rows


def _line_rows(line: Line, system: System) -> Iterator[Row]:
    source = SOURCES[line.source].short if line.source in SOURCES else line.source
    strong, also = line.result, line.restated(system)
    also = f"   {also}" if also else ""
    if line.numbers.strip("()") == written(line.value).strip("()"):
        # nothing was put in: one row says it all
        yield Row("name", f"{line.label} = ", line.symbol, strong, f"{also}   {line.formula} ·\u00a0{source}")
    else:
        yield Row("name", line.label, line.symbol, "", f"   {source}")
        yield Row("formula", f"= {line.formula}")
        yield Row("formula", f"= {line.numbers}")
        yield Row("value", "= ", "", strong, also)
    if line.flag:
        yield Row("flag", line.flag[0].upper() + line.flag[1:])
