"""Numbers as people read them, in the units of either system: window, sheet and command line alike.

A true minus sign, a point for the decimals, digits in threes from five on, "unloaded" for what
nothing loads, an en dash where there is no number.
"""

import math
from collections.abc import Callable
from functools import lru_cache

from shaftcore.declared import Choice, Declaration, Quantity, Switch
from shaftcore.units import System, dimension

UNLOADED = "unloaded"
NOTHING = "–"
MINUS = "−"
GROUP = "\u202f"
"""A narrow space between groups of three digits: no sign that could be taken for a decimal one."""

MOST_DIGITS, KEPT = 9, 6
"""A number of more digits than the first was converted or computed; then so many are shown."""

Entry = float | int | str | None


@lru_cache(maxsize=512)
def writer(
    dimension_name: str, system: System, decimals: int | None = None, signed: bool = False
) -> Callable[[Entry], str]:
    """A function that writes values (internal units) of one sort; words pass, None becomes a dash.

    An empty dimension stands for counts and words. inf means that nothing loads the place.
    """
    if not dimension_name:
        return lambda value: NOTHING if value is None else str(value)
    unit = dimension(dimension_name).unit(system)
    form = f"{'+' if signed else ''},.{unit.decimals if decimals is None else decimals}f"
    factor, zero = unit.factor, unit.zero

    def write(value: Entry) -> str:
        if value is None or isinstance(value, str):
            return NOTHING if value is None else value
        if not math.isfinite(value):
            return UNLOADED if value > 0 else NOTHING
        text = _set(format(value / factor + zero, form))
        # a margin that fails by a hair keeps its minus; a length of minus nought does not
        return text if signed or text[0] != MINUS or text.strip("−0.") else text[1:]

    return write


def shown(value: Entry, dimension_name: str, system: System, decimals: int | None = None, signed: bool = False) -> str:
    """A value (internal units) as it stands in a table, without its unit."""
    return writer(dimension_name, system, decimals, signed)(value)


def brief(value: Entry, dimension_name: str, system: System) -> str:
    """The same without the noughts at the end of its decimals."""
    text = shown(value, dimension_name, system)
    return text.rstrip("0").rstrip(".") if "." in text else text


def with_unit(
    value: Entry, dimension_name: str, system: System, decimals: int | None = None, signed: bool = False
) -> str:
    """A value with its unit, as it stands in running text."""
    text = shown(value, dimension_name, system, decimals, signed)
    return text if isinstance(value, str) else beside_unit(text, dimension_name, system)


def beside_unit(text: str, dimension_name: str, system: System) -> str:
    """A written number and its unit, which no end of line parts; what is no number stands alone."""
    symbol = unit_symbol(dimension_name, system)
    if not symbol or text in ("", UNLOADED, NOTHING):
        return text
    return text + symbol if symbol == "°" else f"{text}\u00a0{symbol}"


def unit_symbol(dimension_name: str, system: System) -> str:
    """The unit's symbol, "" for a bare number."""
    return dimension(dimension_name).unit(system).symbol if dimension_name else ""


def in_full(value: float, dimension_name: str, system: System, kept: int = KEPT) -> str:
    """A value as it was typed, without its unit; `kept` digits where a conversion left a long tail."""
    return _set(format(_digits(value, dimension_name, system, kept), ",.12g"))


def editable(value: float | None, declaration: Quantity, system: System) -> str:
    """The same as it stands in a field, digits not grouped, "" for none.

    The field holds the full value beside its text, so nothing is rounded away unless it is typed anew.
    """
    if value is None:
        return ""
    return f"{_digits(value, declaration.dimension_name, system, KEPT):.12g}".replace("-", MINUS)


def entry_words(value: Entry, declaration: Declaration, system: System) -> str:
    """Any declared entry in words: the number in full without its unit, the option's words, yes or no, the text."""
    if isinstance(declaration, Quantity):
        if value is None:
            return declaration.none_words or NOTHING
        return NOTHING if isinstance(value, str) else in_full(float(value or 0.0), declaration.dimension_name, system)
    if isinstance(declaration, Choice):
        words = dict(declaration.options).get(str(value), str(value))
        return words if value is not None else declaration.none_words or NOTHING
    if isinstance(declaration, Switch):
        return "yes" if value else "no"
    return str(value) if value else NOTHING


def _digits(value: float, dimension_name: str, system: System, kept: int) -> float:
    """The number in the unit of `system`, rounded where it has more digits than anybody types."""
    number = dimension(dimension_name).unit(system).shown(value) + 0.0
    digits = f"{number:.12g}".partition("e")[0].lstrip("-0.")
    return number if sum(map(str.isdigit, digits)) <= MOST_DIGITS else float(f"{number:.{kept}g}")


def _set(text: str) -> str:
    """Digits of `text` grouped from five on, and a true minus sign."""
    if "," in text:
        whole = text.partition(".")[0].lstrip("+-")
        text = text.replace(",", GROUP if len(whole) > 5 else "")
    return MINUS + text[1:] if text[0] == "-" else text
