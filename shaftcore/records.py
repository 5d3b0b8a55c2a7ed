"""Small records that the whole core shares: what is wrong, what to notice, where a formula holds."""

import math
from dataclasses import dataclass
from typing import Literal

from shaftcore.phrase import Phrase


@dataclass(frozen=True)
class Problem:
    """One thing that keeps a shaft from being read or analysed.

    `path` names the place as in the file (``segments[2].length_mm``), `value` what stands there,
    `allowed` what may stand there, `remedy` what to do. "wrong" refuses the shaft at every door;
    "missing" only keeps an unfinished shaft from being analysed.
    """

    path: str
    value: str
    allowed: str
    remedy: str
    severity: Literal["wrong", "missing"] = "wrong"

    def __str__(self) -> str:
        place = f"{self.path}: " if self.path else ""
        value = f"{self.value} — " if self.value else ""
        return f"{place}{value}allowed: {self.allowed}; {self.remedy}"


@dataclass(frozen=True)
class Notice:
    """Something the user must see although the number beside it was computed.

    `key` is a short stable word for the sort of notice, `words` say it in the reader's units, `place`
    is the id of the thing on the shaft it belongs to ("" for the whole shaft), `station` the index
    of the station or None. A `provisional` notice makes every margin of the shaft provisional.
    """

    key: str
    words: Phrase
    place: str = ""
    station: int | None = None
    provisional: bool = False

    @property
    def text(self) -> str:
        """The words in SI."""
        return str(self.words)


@dataclass(frozen=True)
class ValidRange:
    """Range in which a published fit holds: ``low <= symbol <= high``; 0 and inf leave an end open."""

    symbol: str
    low: float
    high: float

    def __str__(self) -> str:
        if math.isinf(self.high):
            return f"{self.symbol} ≥ {self.low:g}"
        return f"{self.low:g} ≤ {self.symbol} ≤ {self.high:g}" if self.low else f"{self.symbol} ≤ {self.high:g}"
