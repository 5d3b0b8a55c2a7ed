"""The key of station numbers beside the drawing: read row by row, three stations a row."""

from reportlab.lib.units import mm
from reportlab.platypus import Table

from shaftcore.nomenclature import BY_KEY
from shaftcore.number_text import unit_symbol
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.pages import ACROSS, papers
from shaftcore.sheet.tables import Field, ruled_table

ABREAST = 3
HEAD_ROOM, ROW = 9 * mm, 4.2 * mm
BESIDE = 46 * mm
"""Room for number, x and margin beside the place."""


def key_height(edition: Edition) -> float:
    """Height (points) of the key where every place takes one line."""
    return HEAD_ROOM + ROW * -(-len(edition.results.stations) // ABREAST)


def station_key(edition: Edition) -> Table:
    """No., place, x and the smaller margin of every station."""
    count = len(edition.results.stations)
    abreast = min(ABREAST, count)
    share = papers(edition.system)[ACROSS].width / abreast - BESIDE
    fields = [
        field for first in range(abreast) for field in _block(edition, range(first, count, abreast), first, share)
    ]
    rows = max(len(field.cells) for field in fields)
    even = [Field(f.head, [*f.cells, *[""] * (rows - len(f.cells))], f.number, f.least) for f in fields]
    return ruled_table(even, papers(edition.system)[ACROSS].width, size=6.4)


def _block(edition: Edition, chosen: range, number: int, share: float) -> list[Field]:
    stations = [edition.results.stations[i] for i in chosen]
    unit = unit_symbol(BY_KEY["x"].dimension, edition.system)
    gutter = [Field("", [""] * len(stations), least=10.0)] if number else []
    return [
        *gutter,
        Field("No.", [str(station.number) for station in stations]),
        Field("Place", [station.label for station in stations], False, share),
        Field(f"x<br/>{unit}", [edition.cell("x", i) for i in chosen]),
        Field("least margin", [edition.phrase(edition.least_margin(i), i) for i in chosen]),
    ]
