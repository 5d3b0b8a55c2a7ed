"""Fields declared once: label, unit, range and words of everything a shaft is described by.

The declaration of a field drives validation, file, schema, forms and manual; nothing of it is
written a second time. Read it back with `declared(record_or_class)`.
"""

import math
import re
from dataclasses import MISSING, dataclass, field, fields
from typing import Any

from shaftcore.units import Dimension, System, dimension


@dataclass(frozen=True)
class Quantity:
    """A number with a dimension and a closed range (`above` makes the low end open)."""

    label: str
    dimension_name: str
    low: float
    high: float
    symbol: str = ""
    above: bool = False
    optional: bool = False
    none_words: str = ""
    words: str = ""

    @property
    def dimension(self) -> Dimension:
        return dimension(self.dimension_name)

    def holds(self, value: float) -> bool:
        """True where `value` (internal units) is finite and in range."""
        return math.isfinite(value) and self.low <= value <= self.high and not (self.above and value == self.low)

    def allowed(self, system: System = "SI", in_file: bool = False) -> str:
        """The range in words, in the file's unit or in what the user reads."""
        unit = self.dimension.file if in_file else self.dimension.unit(system)
        low, high = (_plain(unit.shown(end)) for end in (self.low, self.high))
        begin = f"above {low} up to" if self.above else f"{low} to"
        return f"{begin} {high} {unit.symbol}".rstrip() + (", or none" if self.optional else "")


def _plain(number: float) -> str:
    """A number without an exponent where people would write none."""
    return f"{number:.0f}" if abs(number) >= 1e5 else f"{number:.6g}"


@dataclass(frozen=True)
class Choice:
    """One of several named options: (value in the file, words shown)."""

    label: str
    options: tuple[tuple[str, str], ...]
    optional: bool = False
    none_words: str = ""
    words: str = ""

    def allowed(self) -> str:
        names = ", ".join(f'"{value}"' for value, _ in self.options)
        return names + (", or null" if self.optional else "")


@dataclass(frozen=True)
class Switch:
    """Yes or no."""

    label: str
    words: str = ""

    def allowed(self) -> str:
        return "true or false"


TEXT_PATTERN = r"^[^\u0000-\u0008\u000b-\u001f\u007f-\u009f\ud800-\udfff]*$"
"""Any characters but control characters and halves of a pair, which no file or sheet can carry."""


@dataclass(frozen=True)
class Text:
    """A line of text of the user's; it may be empty unless `shortest` says otherwise."""

    label: str
    longest: int = 200
    words: str = ""
    shortest: int = 0

    def holds(self, value: str) -> bool:
        return self.shortest <= len(value) <= self.longest and re.match(TEXT_PATTERN, value) is not None

    def allowed(self) -> str:
        span = f"{self.shortest} to {self.longest}" if self.shortest else f"at most {self.longest}"
        return f"text of {span} characters, no control characters"


@dataclass(frozen=True)
class Part:
    """A record, or a tuple of records, inside a record; `kinds` lists what may stand there.

    `too_many` says what to do where there are more than `most` of them.
    """

    label: str
    kinds: tuple[type, ...]
    many: bool = False
    optional: bool = False
    most: int = 1000
    words: str = ""
    too_many: str = "remove some or join them"


Declaration = Quantity | Choice | Switch | Text | Part


def _declare(declaration: Declaration, default: Any) -> Any:
    return field(default=default, metadata={"declared": declaration})


def quantity(label: str, dimension_name: str, low: float, high: float, *, default: Any = MISSING, **more: Any) -> Any:
    """A dataclass field holding a float in internal units (None allowed with ``optional=True``)."""
    return _declare(Quantity(label, dimension_name, low, high, **more), default)


def choice(label: str, options: tuple[tuple[str, str], ...], *, default: Any = MISSING, **more: Any) -> Any:
    """A dataclass field holding one of the options' values."""
    return _declare(Choice(label, options, **more), default)


def switch(label: str, *, default: bool, words: str = "") -> Any:
    """A dataclass field holding a bool."""
    return _declare(Switch(label, words), default)


def text(label: str, *, default: str = "", longest: int = 200, words: str = "", shortest: int = 0) -> Any:
    """A dataclass field holding a line of text."""
    return _declare(Text(label, longest, words, shortest), default)


def part(label: str, *kinds: type, default: Any = MISSING, **more: Any) -> Any:
    """A dataclass field holding a record or, with ``many=True``, a tuple of records."""
    return _declare(Part(label, kinds, **more), default)


def declared(record: Any) -> dict[str, Declaration]:
    """Field name -> declaration, in order, of a record or its class (fields without one left out)."""
    cls = record if isinstance(record, type) else type(record)
    known = _DECLARED.get(cls)
    if known is None:
        known = {f.name: f.metadata["declared"] for f in fields(cls) if "declared" in f.metadata}
        _DECLARED[cls] = known
    return known


_DECLARED: dict[type, dict[str, Declaration]] = {}


def file_key(name: str, declaration: Declaration) -> str:
    """The key under which a field stands in the file: its name and, for a quantity, its unit."""
    return name + declaration.dimension.suffix if isinstance(declaration, Quantity) else name


def may_be_left_out(declaration: Declaration) -> bool:
    """Whether the file may lack a field: what may be none, a list, a text, or a record of such fields alone.

    No number and no choice is ever assumed for a file that does not state it.
    """
    if isinstance(declaration, Part):
        return (
            declaration.optional
            or declaration.many
            or all(may_be_left_out(inner) for kind in declaration.kinds for inner in declared(kind).values())
        )
    if isinstance(declaration, Text):
        return declaration.shortest == 0
    return not isinstance(declaration, Switch) and declaration.optional
