"""How numbers stand on the sheet: in the reader's units, with a true minus sign."""

import math

from shaftcore.declared import Choice, Declaration, Quantity, Switch
from shaftcore.units import System, dimension

UNLOADED = "unloaded"
NOTHING = "–"

Entry = float | str | int | None


def shown(value: Entry, dimension_name: str, system: System, decimals: int | None = None, signed: bool = False) -> str:
    """A value in internal units as it stands in a table, without its unit.

    inf is "unloaded", None an en dash; words and counts pass.
    """
    if value is None:
        return NOTHING
    if isinstance(value, str) or not dimension_name:
        return str(value)
    if math.isinf(value):
        return UNLOADED
    unit = dimension(dimension_name).unit(system)
    places = unit.decimals if decimals is None else decimals
    text = f"{unit.shown(value):{'+' if signed else ''}.{places}f}"
    if not signed and not text.strip("-0."):
        text = text.lstrip("-")
    return text.replace("-", "−")


def with_unit(
    value: Entry, dimension_name: str, system: System, decimals: int | None = None, signed: bool = False
) -> str:
    """A value with its unit, as it stands in a sentence."""
    text = shown(value, dimension_name, system, decimals, signed)
    symbol = unit_of(dimension_name, system)
    if not symbol or text in (UNLOADED, NOTHING):
        return text
    return text + symbol if symbol == "°" else f"{text}\u00a0{symbol}"


def unit_of(dimension_name: str, system: System) -> str:
    """The unit's symbol, "" for a bare number."""
    return dimension(dimension_name).unit(system).symbol if dimension_name else ""


def given(value: Entry, quantity: Quantity, system: System) -> str:
    """An entry of the user's with every digit that matters, without its unit."""
    if value is None or isinstance(value, str):
        return NOTHING
    return f"{quantity.dimension.unit(system).shown(float(value)):.6g}".replace("-", "−")


def entry_words(value: Entry, declaration: Declaration, system: System) -> str:
    """Any declared entry in words: the number, the option's words, yes or no, the text."""
    if isinstance(declaration, Quantity):
        return given(value, declaration, system)
    if isinstance(declaration, Choice):
        words = dict(declaration.options).get(str(value), str(value))
        return words if value is not None else declaration.none_words or NOTHING
    if isinstance(declaration, Switch):
        return "yes" if value else "no"
    return str(value) if value else NOTHING
