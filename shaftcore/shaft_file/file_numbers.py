"""Numbers between the file and the core, without losing a bit.

Where the file's unit differs from the core's (N·m for N·mm) the decimal digits are shifted, not
multiplied as binary fractions, so that what is written is read back the same to the last bit.
"""

import math
from decimal import Decimal, DecimalException

from shaftcore.units import Unit


class Number(float):
    """A number of the file that keeps the digits it was written with."""

    __slots__ = ("text",)
    text: str

    def __new__(cls, text: str) -> "Number":
        number = super().__new__(cls, text)
        number.text = text
        return number


def internal(value: float, unit: Unit) -> float:
    """A number of the file in the core's unit; inf where it is too large for any float."""
    if unit.factor == 1 or not math.isfinite(value):
        return float(value)
    text = value.text if isinstance(value, Number) else repr(value)
    try:
        return float(Decimal(text) * Decimal(repr(unit.factor)))
    except DecimalException:  # an exponent beyond all reason, and not infinite: nothing is left of it
        return float(value)


def in_file(value: float, unit: Unit) -> str:
    """The digits to write for a number of the core: the shortest that are read back bit-equal."""
    value = float(value) + 0.0  # minus zero is written as zero
    if unit.factor == 1:
        return repr(value)
    shifted = Decimal(repr(value)) / Decimal(repr(unit.factor))
    short = repr(float(shifted))
    return short if internal(Number(short), unit) == value else str(shifted)
