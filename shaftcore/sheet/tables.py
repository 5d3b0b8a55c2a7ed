"""Tables with hairlines: words left and wrapping, numbers right and whole."""

import re
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
from reportlab.lib.colors import HexColor
from reportlab.lib.styles import ParagraphStyle
from reportlab.lib.units import mm
from reportlab.pdfbase.pdfmetrics import stringWidth
from reportlab.platypus import Paragraph, Table, TableStyle

from shaftcore.declared import Part, Quantity, Text, declared
from shaftcore.number_text import NOTHING, beside_unit, entry_words, unit_symbol
from shaftcore.sheet.lettering import REGULAR, para, plain, safe, sized, typeset
from shaftcore.sheet.palette import FAINT, INK, RULE, TINT
from shaftcore.units import System

PAD = 1.5 * mm
LEAST_WORDS = 11 * mm
LEAST_TYPE = 4.6
HEAD = 6.6
_TAG = re.compile(r"<[^>]*>")


@dataclass(frozen=True)
class Field:
    """One column: head (markup), cells as text, whether they are numbers or texts of our own with symbols."""

    head: str
    cells: Sequence[str]
    number: bool = True
    least: float = 0.0
    symbols: bool = False


def ruled_table(fields: Sequence[Field], width: float, *, size: float = 7.4, marked: Sequence[int] = ()) -> Table:
    """A table over `width` points; head rows repeat on every page, rows in `marked` are tinted.

    Number columns take at least what their widest entry needs; where they would not fit, the type
    gets smaller, so nothing is cut.
    """
    while size > LEAST_TYPE and sum(_least(f, size) for f in fields) > width:
        size -= 0.2
    style = sized("cell", size)
    heads = [para(f.head, "head_right" if f.number else "head") for f in fields]
    rows = [heads, *map(list, zip(*(_cells(f, style) for f in fields), strict=True))]
    table = Table(rows, colWidths=_widths(fields, width, size), repeatRows=1, hAlign="LEFT")
    table.setStyle(_style(fields, size, marked))
    return table


def plain_table(
    rows: Sequence[Sequence[Any]], widths: Sequence[float], *commands: tuple[Any, ...], **more: Any
) -> Table:
    """A table without rules of its own, in the sheet's type, cells at their tops."""
    table = Table(rows, colWidths=widths, hAlign="LEFT", **more)
    ground = [("FONTNAME", (0, 0), (-1, -1), REGULAR), ("VALIGN", (0, 0), (-1, -1), "TOP")]
    table.setStyle(TableStyle([*ground, *commands]))
    return table


def _cells(column: Field, style: ParagraphStyle) -> list[Any]:
    if column.number:
        return [plain(cell) for cell in column.cells]
    markup = typeset if column.symbols else safe
    return [Paragraph(markup(cell), style) for cell in column.cells]


def _widths(fields: Sequence[Field], width: float, size: float) -> list[float]:
    """Needs first, then words in full, then short heads, then the rest evenly."""
    needs = np.array([_least(f, size) for f in fields])
    for wanted in (_words_whole, _head_in_two_lines):
        wants = np.maximum(np.array([wanted(f, size) for f in fields]) - needs, 0.0)
        spare = max(width - needs.sum(), 0.0)
        if wants.sum() > 0:
            needs += wants * min(spare / wants.sum(), 1.0)
    return list(needs + max(width - needs.sum(), 0.0) / len(fields))


def _least(column: Field, size: float) -> float:
    if not column.number:
        return max(LEAST_WORDS, column.least)
    return max(_cell_width(column, size), _longest_word(column.head), column.least) + 2 * PAD + 1.0


def _words_whole(column: Field, size: float) -> float:
    return _cell_width(column, size) + 2 * PAD + 1.0


def _head_in_two_lines(column: Field, size: float) -> float:
    return 0.55 * stringWidth(_TAG.sub(" ", column.head), REGULAR, HEAD) + 2 * PAD


def _cell_width(column: Field, size: float) -> float:
    return max((stringWidth(plain(cell), REGULAR, size) for cell in column.cells), default=0.0)


def _longest_word(head: str) -> float:
    return max((stringWidth(word, REGULAR, HEAD) for word in _TAG.sub(" ", head).split()), default=0.0)


def _style(fields: Sequence[Field], size: float, marked: Sequence[int]) -> TableStyle:
    commands: list[tuple[Any, ...]] = [
        ("FONT", (0, 0), (-1, -1), REGULAR, size, size * 1.3),
        ("TEXTCOLOR", (0, 0), (-1, -1), HexColor(INK)),
        ("VALIGN", (0, 0), (-1, 0), "BOTTOM"),
        ("VALIGN", (0, 1), (-1, -1), "TOP"),
        ("LINEABOVE", (0, 0), (-1, 0), 0.5, HexColor(INK)),
        ("LINEBELOW", (0, 0), (-1, 0), 0.4, HexColor(FAINT)),
        ("LINEBELOW", (0, 1), (-1, -1), 0.25, HexColor(RULE)),
        ("LEFTPADDING", (0, 0), (-1, -1), PAD),
        ("RIGHTPADDING", (0, 0), (-1, -1), PAD),
        ("TOPPADDING", (0, 0), (-1, -1), 0.26 * size),
        ("BOTTOMPADDING", (0, 0), (-1, -1), 0.32 * size),
    ]
    commands += [("ALIGN", (i, 1), (i, -1), "RIGHT") for i, f in enumerate(fields) if f.number]
    commands += [("BACKGROUND", (0, row + 1), (-1, row + 1), HexColor(TINT)) for row in marked]
    return TableStyle(commands)


def record_fields(records: Sequence[Any], system: System) -> list[Field]:
    """Columns of records of one class, from their declarations; columns nobody filled are left out."""
    found = []
    for name, declaration in declared(records[0]).items():
        values = [getattr(record, name) for record in records]
        unsaid = not getattr(declaration, "none_words", "") and all(value in (None, "") for value in values)
        if isinstance(declaration, Part) or unsaid:
            continue
        cells = [entry_words(value, declaration, system) for value in values]
        found.append(Field(head_of(declaration, system), cells, isinstance(declaration, Quantity)))
    return found


def head_of(declaration: Any, system: System) -> str:
    """Column head: label, symbol and unit."""
    symbol = typeset(declaration.symbol) if isinstance(declaration, Quantity) and declaration.symbol else ""
    unit = unit_symbol(declaration.dimension_name, system) if isinstance(declaration, Quantity) else ""
    return " ".join(part for part in (safe(declaration.label), symbol, f"<br/>{unit}" if unit else "") if part)


def entry_rows(record: Any, system: System) -> list[tuple[str, str]]:
    """(label markup, value) of every field of one record, units with the values."""
    rows = []
    for name, declaration in declared(record).items():
        if isinstance(declaration, Part):
            continue
        value = entry_words(getattr(record, name), declaration, system)
        label = safe(declaration.label)
        if isinstance(declaration, Quantity):
            label += f", {typeset(declaration.symbol)}" if declaration.symbol else ""
            value = beside_unit(value, declaration.dimension_name, system)
        if isinstance(declaration, Text) and value == NOTHING and name != "name":
            continue
        rows.append((label, value))
    return rows
