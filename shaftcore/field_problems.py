"""Whether every field of a record holds what its declaration allows."""

import math
from collections.abc import Iterator
from typing import Any

from shaftcore.declared import Choice, Part, Quantity, Switch, Text, declared, file_key
from shaftcore.records import Problem

MOST_REMEMBERED = 8192
_FOUND_RIGHT: dict[int, Any] = {}
"""Records found right with all inside them: edits replace few records at a time, so most need no
second look. By identity, not by equality: 1, 1.0 and True are equal, and only two are numbers."""


def field_problems(record: Any, path: str = "") -> tuple[Problem, ...]:
    """Everything amiss in the fields of a record and of the records inside it; `path` is "" or ends in a dot."""
    if id(record) in _FOUND_RIGHT:
        return ()
    found = (*_own_problems(record, path), *_part_problems(record, path))
    if not found:
        _remember(record)
    return found


def _remember(record: Any) -> None:
    if len(_FOUND_RIGHT) >= MOST_REMEMBERED:
        _FOUND_RIGHT.clear()
    _FOUND_RIGHT[id(record)] = record


def _own_problems(record: Any, path: str) -> Iterator[Problem]:
    for name, declaration in declared(record).items():
        found = plain_problem(declaration, getattr(record, name))
        if found is not None:
            yield Problem(path + file_key(name, declaration), found.value, found.allowed, found.remedy)


def _part_problems(record: Any, path: str) -> Iterator[Problem]:
    for name, declaration in declared(record).items():
        if isinstance(declaration, Part):
            value = getattr(record, name)
            if declaration.many:
                yield from _list_problems(declaration, value, path + name)
            elif value is not None or not declaration.optional:
                yield from _entry_problems(declaration, value, path + name)


def _list_problems(declaration: Part, entries: Any, path: str) -> Iterator[Problem]:
    if not isinstance(entries, tuple):
        yield Problem(path, f"{entries!r:.60}", "a list of entries", "give a list")
    elif len(entries) > declaration.most:
        yield Problem(path, f"{len(entries)} entries", f"{declaration.most} at most", declaration.too_many)
    else:
        for index, entry in enumerate(entries):
            if id(entry) not in _FOUND_RIGHT or not isinstance(entry, declaration.kinds):
                yield from _entry_problems(declaration, entry, f"{path}[{index}]")


def _entry_problems(declaration: Part, entry: Any, path: str) -> Iterator[Problem]:
    if isinstance(entry, declaration.kinds):
        yield from field_problems(entry, path + ".")
    else:
        kinds = ", ".join(kind.__name__ for kind in declaration.kinds)
        yield Problem(path, f"{entry!r:.60}", f"one of {kinds}", "give one of these")


def plain_problem(declaration: Any, value: Any) -> Problem | None:
    """What is wrong with the value of one field (internal units), its path left empty; None for a part."""
    if isinstance(declaration, Part) or (value is None and getattr(declaration, "optional", False)):
        return None
    if isinstance(declaration, Quantity):
        return _number_problem(declaration, value)
    if isinstance(declaration, Choice):
        fits, remedy = value in [v for v, _ in declaration.options], "choose one of these"
    elif isinstance(declaration, Switch):
        fits, remedy = isinstance(value, bool), "give one of these"
    else:
        fits = isinstance(value, str) and declaration.holds(value)
        remedy = _text_remedy(declaration, value)
    return None if fits else Problem("", f"{value!r:.60}", declaration.allowed(), remedy)


def _number_problem(quantity: Quantity, value: Any) -> Problem | None:
    allowed = quantity.allowed(in_file=True)
    if isinstance(value, bool) or not isinstance(value, (int, float)):
        return Problem("", f"{value!r:.60}", allowed, "give a number")
    value = _as_float(value)
    if quantity.holds(value):
        return None
    unit = quantity.dimension.file
    shown = f"{unit.shown(value):.6g} {unit.symbol}".rstrip() if math.isfinite(value) else str(value)
    return Problem("", shown, allowed, "give a number in this range")


def _as_float(value: float) -> float:
    try:
        return float(value)
    except OverflowError:  # a whole number of more than 308 digits
        return math.inf if value > 0 else -math.inf


def _text_remedy(text: Text, value: Any) -> str:
    if not isinstance(value, str):
        return "give a text"
    if len(value) < text.shortest:
        return "give it a name of its own"
    return "shorten it" if len(value) > text.longest else "remove the control characters"
