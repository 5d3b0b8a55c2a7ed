"""What stands beside an enlarged raiser: its scale, its sizes with their symbols, and an empty window in words."""

from app.bench.close_up import CloseUp
from app.bench.readout import allowed_shown, needed_shown
from app.bench.sizes import Size, size_of
from shaftcore.radius_window import SMALLEST, RadiusWindow
from shaftcore.units import System

NOW, NEEDED, ALLOWED, BEFORE, RING, NOTE, PLAIN = "now", "needed", "allowed", "before", "ring", "note", "plain"
WITH_STROKE = (NOW, NEEDED, ALLOWED, BEFORE, RING)
Row = tuple[str, str]
"""(which stroke of the picture it explains, or how it is said; the words)."""


WIDE, NARROW = 150.0, 112.0
"""Room in pixels for the lines of a raiser with limits, and of one without."""


def words_width(shown: CloseUp) -> float:
    return NARROW if shown.window is None and shown.ring is None else WIDE


def scale_words(times: float) -> str:
    """How many times larger than on the bench."""
    return f"{times:g} : 1"


def lens_rows(shown: CloseUp, value: float, system: System) -> list[Row]:
    """The lines in the order of their weight: where room ends, the last are left out."""
    size, window, before = shown.size, shown.window, shown.size.value
    symbol = f"{size.declaration.symbol} " if size.declaration.symbol else ""
    rows: list[Row] = [(NOW, f"{symbol}{size.shown(value, system)} now")]
    if window is not None:
        rows += _window_rows(size, window, symbol, system)
    corner = size_of(shown.shaft, size.chosen, "bearing_corner")
    if corner is not None and corner.value is not None:
        rows.append((RING, f"{corner.declaration.symbol} {corner.shown(corner.value, system)} ring"))
    if before is not None and before != value:
        rows.append((BEFORE, f"{symbol}{size.shown(before, system)} before"))
    return rows


def _window_rows(size: Size, window: RadiusWindow, symbol: str, system: System) -> list[Row]:
    allowed = (ALLOWED, f"{symbol}{allowed_shown(size, window.allowed, system)} allowed")
    if window.needed is None:
        return [(NOTE, "no radius is enough"), allowed]
    if window.needed <= SMALLEST:
        return [(PLAIN, "any radius is enough"), allowed]
    rows = [(NEEDED, f"{symbol}{needed_shown(size, window.needed, system)} needed"), allowed]
    return [*rows, (NOTE, "the window is empty")] if window.empty else rows
