"""Preferred sizes: what a pulled or stepped quantity comes to rest on.

Numbers: ISO 3 (R5 to R40). Bores of rolling bearings: ISO 15, written from memory. Fillet radii:
DIN 250, first and second choice, written from memory. US customary lengths rest on binary
fractions of an inch (common practice, no source).
"""

import math
from bisect import bisect_left, bisect_right
from typing import Literal

from shaftcore.abutment import CORNERS
from shaftcore.declared import Quantity
from shaftcore.units import System, dimension

SizeSort = Literal["radius", "corner", "diameter", "length", "place", "turn", "number"]

R40: tuple[float, ...] = (
    *(1.0, 1.06, 1.12, 1.18, 1.25, 1.32, 1.4, 1.5, 1.6, 1.7, 1.8, 1.9, 2.0, 2.12, 2.24, 2.36, 2.5, 2.65, 2.8, 3.0),
    *(3.15, 3.35, 3.55, 3.75, 4.0, 4.25, 4.5, 4.75, 5.0, 5.3, 5.6, 6.0, 6.3, 6.7, 7.1, 7.5, 8.0, 8.5, 9.0, 9.5),
)
R20, R10, R5 = R40[::2], R40[::4], R40[::8]

BEARING_BORES: tuple[float, ...] = (
    *(3, 4, 5, 6, 7, 8, 9, 10, 12, 15, 17, *range(20, 111, 5), *range(120, 201, 10), *range(220, 501, 20)),
    *(530, 560, 600, 630, 670, 710, 750, 800, 850, 900, 950, 1000),
)
FIRST_RADII: tuple[float, ...] = (0.2, 0.4, 0.6, 1, 1.6, 2.5, 4, 6, 10, 16, 25, 40, 63, 100, 160)
SECOND_RADII: tuple[float, ...] = (0.3, 0.5, 0.8, 1.2, 2, 3, 5, 8, 12, 20, 32, 50, 80, 125, 200)
RADII: tuple[float, ...] = tuple(sorted(float(r) for r in (*FIRST_RADII, *SECOND_RADII)))

INCHES: tuple[float, ...] = (
    *(count / 64 for count in range(1, 8)),
    *(2.0**octave * (1 + eighth / 8) for octave in range(-3, 12) for eighth in range(8)),
)
"""Sixty-fourths up to an eighth of an inch, then eight sizes from each power of two to the next."""

WIDE = 8
"""Preferred sizes further apart than this many resolutions get round sizes between them."""

FINER = 8
"""Freely pulled sizes go in steps this many times finer than the hand can tell, or nearly so."""


def sort_of(name: str, quantity: Quantity) -> SizeSort:
    """By which row of sizes a declared quantity steps."""
    if name == "x":
        return "place"
    if quantity.dimension_name == "angle":
        return "turn"
    if quantity.dimension_name != "length":
        return "number"
    if name == "bearing_corner":
        return "corner"
    if quantity.symbol.startswith("r"):
        return "radius"
    return "diameter" if "iameter" in quantity.label or quantity.label == "Bore" else "length"


def snapped(
    value: float, sort: SizeSort, resolution: float, system: System = "SI", dimension_name: str = "length"
) -> float:
    """The preferred size nearest `value`, both in internal units and of either sign.

    `resolution` is the smallest difference the hand can tell: rows of sizes that stand closer are
    passed over for coarser ones, and round sizes fill in where preferred ones stand far apart.
    """
    unit = dimension(dimension_name).unit(system)
    shown, fine = abs(value) / unit.factor, resolution / unit.factor
    for row in (*_rows(sort, shown, system, unit.factor), None):
        if row is None:
            rest = _round_to(shown, round_step(fine, system, dimension_name))
            break
        low, high = _neighbours(row, shown)
        if high - low >= fine:
            wide = high - low > WIDE * fine and sort not in ("radius", "corner")
            filled = [_round_to(shown, round_step(fine, system, dimension_name))] if wide else []
            rest = min((low, high, *filled), key=lambda size: abs(size - shown))
            break
    return math.copysign(rest * unit.factor, value)


def rounded(value: float, resolution: float, system: System = "SI", dimension_name: str = "length") -> float:
    """`value` without digits that no hand can mean: on round steps a few times finer than `resolution`."""
    factor = dimension(dimension_name).unit(system).factor
    step = round_step(resolution / factor / FINER, "SI", dimension_name)
    return _round_to(value / factor, step) * factor


def stepped(value: float, sort: SizeSort, up: bool, system: System = "SI", dimension_name: str = "length") -> float:
    """The next preferred size above or below `value` (internal units)."""
    unit = dimension(dimension_name).unit(system)
    shown = value / unit.factor
    if sort == "turn":
        return _next_multiple(shown, 15.0, up) * unit.factor
    if sort == "place":
        return _next_multiple(shown, 5.0 if system == "SI" else 0.25, up) * unit.factor
    away = up == (shown >= 0) or shown == 0
    row = next(iter(_rows(sort, max(abs(shown), _LEAST), system, unit.factor)))
    low, high = _beside(row, abs(shown))
    return math.copysign(high if away else low, shown or (1 if up else -1)) * unit.factor


def finely(value: float, up: bool, system: System = "SI", dimension_name: str = "length") -> float:
    """A small round step from `value`, about a fiftieth of it."""
    unit = dimension(dimension_name).unit(system)
    shown = value / unit.factor
    step = _round_below(max(abs(shown), 0.05) / 50)
    return _next_multiple(shown, step, up) * unit.factor


def round_step(least: float, system: System = "SI", dimension_name: str = "length") -> float:
    """The smallest round step that is at least `least`: 1, 2 or 5 of a decade, inches in halves."""
    least = max(least, 1e-9)
    if system == "US" and dimension_name == "length":
        return float(2.0 ** math.ceil(math.log2(least) - 1e-9))
    decade = 10.0 ** math.floor(math.log10(least) + 1e-9)
    return next(decade * lead for lead in (1, 2, 5, 10) if decade * lead >= least * (1 - 1e-9))


_LEAST = 1e-3


def _round_below(most: float) -> float:
    decade = 10.0 ** math.floor(math.log10(most) + 1e-9)
    return decade * max(lead for lead in (1, 2, 5) if decade * lead <= most * (1 + 1e-9))


def _round_to(value: float, step: float) -> float:
    return float(f"{round(value / step) * step:.10g}")


def _next_multiple(value: float, step: float, up: bool) -> float:
    count = math.floor(value / step + 1e-6) + 1 if up else math.ceil(value / step - 1e-6) - 1
    return float(f"{count * step:.10g}")


def _rows(sort: SizeSort, shown: float, system: System, factor: float) -> list[tuple[float, ...]]:
    """Rows of sizes (in the unit shown) that reach beyond `shown`, the finest first."""
    if sort in ("place", "turn"):
        return []
    if sort == "corner":
        return [tuple(corner / factor for corner, _, _ in CORNERS)]
    if system == "US" and sort in ("radius", "diameter", "length"):
        return [INCHES]
    if sort == "radius":
        return [RADII, tuple(float(r) for r in FIRST_RADII)]
    series = [_decades(decade, shown) for decade in (R40, R20, R10, R5)]
    if sort == "diameter":
        bores = tuple(float(bore) for bore in BEARING_BORES)
        return [tuple(sorted({*series[0], *bores})), bores, *series[2:]]
    return series if sort == "length" else series[1:]


def _decades(decade: tuple[float, ...], near: float) -> tuple[float, ...]:
    middle = math.floor(math.log10(max(near, _LEAST)))
    return tuple(float(f"{lead * 10.0**power:.6g}") for power in range(middle - 1, middle + 3) for lead in decade)


def _neighbours(row: tuple[float, ...], value: float) -> tuple[float, float]:
    """The sizes just at or below and above a value; the ends of the row hold it."""
    at = min(max(bisect_right(row, value), 1), len(row) - 1)
    return row[at - 1], row[at]


def _beside(row: tuple[float, ...], value: float) -> tuple[float, float]:
    """The sizes next below and next above, neither of them the value itself; at an end the value."""
    slack = 1e-6 * value
    below, above = bisect_left(row, value - slack) - 1, bisect_right(row, value + slack)
    return row[below] if below >= 0 else value, row[above] if above < len(row) else value
