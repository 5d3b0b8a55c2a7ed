"""Typed numbers: decimal comma or point, groups of digits, a unit of either system behind them."""

import math
import re

from shaftcore.declared import Quantity
from shaftcore.errors import QuantityError
from shaftcore.units import System, Unit, readable_units

_SPACES = re.compile(r"[\s\u00a0\u2009\u202f]+")
_NUMBER = re.compile(r"([+-]?)([\d.,' ]*\d[.,]?)(?:[eE]([+-]?\d{1,3}))?(?![\d.,])")


def parse(text: str, declaration: Quantity, system: System) -> float:
    """The typed number in internal units; without a unit it is in the one of `system`.

    Raises QuantityError naming the place, what was typed, the allowed range and its unit.
    """
    number, rest = _number_and_unit(text, declaration, system)
    unit = _unit_of(rest, text, declaration, system)
    value = unit.internal(number)
    if not declaration.holds(value):
        value = _at_end(value, declaration)
    if not declaration.holds(value):
        raise QuantityError(
            f"{declaration.label}: {' '.join(text.split())} is out of range. Allowed: {declaration.allowed(system)}."
        )
    return value


def _at_end(value: float, declaration: Quantity) -> float:
    """The end of the range where only rounding of a conversion lies between."""
    for end in (declaration.low, declaration.high):
        if math.isclose(value, end, rel_tol=1e-9):
            return end
    return value


def _number_and_unit(text: str, declaration: Quantity, system: System) -> tuple[float, str]:
    plain = _SPACES.sub(" ", text.strip()).replace("−", "-").replace("’", "'")
    found = _NUMBER.match(plain)
    number = None if found is None else _number(found, declaration)
    strange = found is not None and not re.match(r"\s*([^\W\d_]|[\"”″°%]|$)", plain[found.end() :])
    if found is None or number is None or strange:
        what = f"“{plain[:40]}” is no number" if plain else "a number is needed"
        raise QuantityError(f"{declaration.label}: {what}. Allowed: {declaration.allowed(system)}.")
    return number, plain[found.end() :]


def _number(found: re.Match[str], declaration: Quantity) -> float | None:
    """The value of a run of digits; None where its groups or decimal signs make no sense.

    A lone comma before three digits may be a decimal sign or part a group: the user must say which.
    """
    sign, digits, power = found[1], found[2].strip(), found[3]
    decimal = max(digits.rfind("."), digits.rfind(","))
    whole, fraction = (digits, "") if decimal < 0 else (digits[:decimal], digits[decimal + 1 :])
    groups = re.split(r"[ ',.]", whole)
    if not all(map(str.isdigit, groups[1:])) or not (groups[0].isdigit() or (groups == [""] and fraction)):
        return None
    if len(groups) > 1 and not _grouped(whole, groups, digits[decimal] if decimal >= 0 else ""):
        return None
    if fraction and not fraction.isdigit():
        return None
    if "," in digits and len(groups) == 1 and len(groups[0]) <= 3 and len(fraction) == 3 and groups[0].strip("0"):
        raise QuantityError(
            f"{declaration.label}: {digits} can be read in two ways. "
            f"Write {groups[0]}{fraction}, or {groups[0]}.{fraction}."
        )
    return float(f"{sign}{''.join(groups)}.{fraction or 0}e{power or 0}")


def _grouped(whole: str, groups: list[str], decimal: str) -> bool:
    """True where digits stand in threes behind one sign, which is not the decimal one."""
    signs = set(whole) - set("0123456789")
    return len(signs) == 1 and decimal not in signs and len(groups[0]) <= 3 and all(len(g) == 3 for g in groups[1:])


def _unit_of(symbol: str, text: str, declaration: Quantity, system: System) -> Unit:
    wanted = _bare(symbol)
    if not wanted:
        return declaration.dimension.unit(system)
    units = {_bare(unit.symbol): unit for unit in reversed(readable_units(declaration.dimension_name))}
    if wanted in units:
        return units[wanted]
    known = ", ".join(dict.fromkeys(u.symbol for u in readable_units(declaration.dimension_name) if u.symbol))
    raise QuantityError(
        f"{declaration.label}: “{text.strip()[:40]}” has a unit that is not known here. "
        + (f"Known: {known}. " if known else "It is a bare number. ")
        + f"Allowed: {declaration.allowed(system)}."
    )


def _bare(symbol: str) -> str:
    """A unit's symbol without the signs that people leave out or write in other ways."""
    text = symbol.strip().strip(".").casefold().replace('"', "in").replace("”", "in").replace("″", "in")
    return re.sub(r"[·*.\-\s]", "", text).replace("μ", "µ").replace("mm2", "mm²")
