"""One line of a hand calculation as data, and how its numbers are written.

`numbers` uses only digits, + − × / ^ ( ) π and √( ), so a pocket calculator follows it.
"""

import math
import re
from dataclasses import dataclass
from decimal import Decimal

from shaftcore.number_text import unit_symbol, with_unit
from shaftcore.units import System, readable_units

DIGITS = 6
"""Significant digits of every printed number."""

_PLUS_NEGATIVE = re.compile(r"\+ \(−([\d.]+|\([^()]+\))\)(?!\^)")
_WHOLLY_NEGATIVE = re.compile(r"^\(−([\d.]+)\)$")
"""Signs that read better without parentheses: "a + (−2)" as "a − 2", "(−3)" alone as "−3"."""


@dataclass(frozen=True)
class Line:
    """A result with the formula as in the book and the same with numbers put in.

    `numbers` and `value` are in internal units (mm, N, N·mm, MPa); `dimension` is a key of
    units.DIMENSIONS or ""; `source` a key of sources.SOURCES; `flag` a remark to show beside it.
    """

    symbol: str
    label: str
    formula: str
    numbers: str
    value: float
    dimension: str
    source: str
    flag: str = ""

    @property
    def result(self) -> str:
        """The value with the unit it was calculated in."""
        return f"{_bare(self.value)}\u00a0{self._unit}" if self._unit else _bare(self.value)

    def restated(self, system: System) -> str:
        """The value as the reader's system has it, "" where that is what `result` says."""
        if not self.dimension or unit_symbol(self.dimension, system) == self._unit:
            return ""
        return with_unit(self.value, self.dimension, system)

    @property
    def _unit(self) -> str:
        units = readable_units(self.dimension) if self.dimension else ()
        return next((unit.symbol for unit in units if unit.factor == 1 and not unit.zero), "")


def written(value: float) -> str:
    """A number with six significant digits, in parentheses where negative, tiny ones by a power of ten."""
    if value < 0:
        return f"(−{written(-value)})"
    if 0 < value < 1e-6 or value >= 1e15:
        digits, power = f"{value:.{DIGITS - 1}e}".split("e")
        exponent = f"{int(power)}".replace("-", "−")
        return f"({Decimal(digits).normalize():f} × 10^{exponent})"
    return f"{Decimal(f'{value:.{DIGITS}g}'):f}" if value else "0"


def _bare(value: float) -> str:
    """The same where it stands alone: a minus needs no parentheses there."""
    return "−" * (value < 0) + written(abs(value)).strip("()")


def line(
    symbol: str,
    label: str,
    formula: str,
    numbers: str,
    value: float,
    dimension: str,
    source: str,
    flag: str = "",
    /,
    **put_in: float,
) -> Line:
    """A line whose `numbers` is a template with the names of `put_in` in braces."""
    if not math.isfinite(value):
        raise ValueError(f"{symbol} has no finite value to write down")
    text = numbers.format(**{name: written(float(number)) for name, number in put_in.items()})
    text = _WHOLLY_NEGATIVE.sub(r"−\1", _PLUS_NEGATIVE.sub(r"− \1", text))
    return Line(symbol, label, formula, text, float(value), dimension, source, flag)


def given(
    symbol: str, label: str, value: float, dimension: str, source: str = "given", flag: str = "", *, formula: str = ""
) -> Line:
    """A line that only states a number: an entry of the user's, a choice, or what another place worked out."""
    formula = formula or _STATED[source]
    return line(symbol, label, formula, "{number}", value, dimension, source, flag, number=value)


_STATED = {"given": "as described", "judgement": "as chosen", "statics": "by equilibrium"}
