"""The ledger as text to read and as CSV to work on, both from the one list of station quantities."""

import csv
import io
import math

from shaftcore.nomenclature import BY_KEY, COLUMNS, Column
from shaftcore.number_text import UNLOADED, Entry, unit_symbol, with_unit
from shaftcore.results import Results
from shaftcore.units import Unit, dimension

READ = (
    "station",
    "place",
    "x",
    "d",
    "radius",
    "kf_bending",
    "kf_torsion",
    "amplitude",
    "mean",
    "n",
    "margin",
    "n_yield",
    "yield_margin",
    "flags",
)
"""Columns of the table to read; the CSV has them all."""

GAP = "  "


def ledger_csv(results: Results) -> str:
    """One row a station, all columns, numbers in full in the unit the column's head names.

    A place that is not stressed has "unloaded" for its factors, a quantity without meaning there is empty.
    """
    text = io.StringIO()
    writer = csv.writer(text)
    writer.writerow([column.csv_head for column in COLUMNS])
    writer.writerows(zip(*(_in_full(column, results) for column in COLUMNS), strict=True))
    return text.getvalue()


def ledger_text(results: Results) -> str:
    """A table to read: aligned, rounded, one line a station under two head lines (symbol or name, unit)."""
    columns = [_cells(BY_KEY[key], results) for key in READ]
    return "\n".join(GAP.join(line).rstrip() for line in zip(*columns, strict=True)) + "\n"


def columns_text() -> str:
    """What the columns of the CSV hold, one line a column."""
    rows = [(column.csv_head, column.symbol, _words(column)) for column in COLUMNS]
    wide, narrow = (max(len(row[i]) for row in rows) for i in (0, 1))
    return "\n".join(f"{head:<{wide}}{GAP}{symbol:<{narrow}}{GAP}{words}" for head, symbol, words in rows) + "\n"


def _words(column: Column) -> str:
    unit = dimension(column.dimension).file.symbol if column.dimension else ""
    words = column.label + (f", {unit}" if unit else "")
    return words + (f": {column.words}" if column.words else "")


def _in_full(column: Column, results: Results) -> list[str]:
    """The values of one column with every digit, in the unit of the file."""
    unit = dimension(column.dimension).file if column.dimension else None
    return [_written(value, unit) for value in column.values(results)]


def _written(value: Entry, unit: Unit | None) -> str:
    if value is None:
        return ""
    if unit is None or isinstance(value, str):
        return str(value)
    return UNLOADED if math.isinf(value) else repr(float(unit.shown(value)))


def _cells(column: Column, results: Results) -> list[str]:
    """Head, unit and values of one column, all of one width; numbers to the right, words to the left."""
    head = [column.symbol or column.label, unit_symbol(column.dimension, "SI")]
    values = list(column.values(results))
    cells = head + list(map(column.writer("SI"), values))
    width = max(len(cell) for cell in cells)
    words = any(isinstance(value, str) for value in values)
    return [cell.ljust(width) if words else cell.rjust(width) for cell in cells]


def summary(results: Results) -> str:
    """What governs, whether the asked factors are reached, then every notice for the whole shaft, a line each."""
    i = results.governing
    station, fatigue, yielding = results.stations[i], results.judged.margin[i], results.judged.yield_margin[i]
    verdict = "every station reaches" if results.sound else "not every station reaches"
    lines = [
        f"Governing: station {station.number}, {station.label}: "
        f"fatigue margin {_per_cent(fatigue)}, yield margin {_per_cent(yielding)}.",
        f"By these rules {verdict} the asked factors{' (provisional)' if results.provisional else ''}.",
    ]
    return "\n".join(lines + [notice.text for notice in results.notices if notice.station is None])


def _per_cent(margin: float) -> str:
    return with_unit(float(margin), "share", "SI", 1, signed=True)
