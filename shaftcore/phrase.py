"""Words with quantities in them, written in the units of whoever reads them."""

from dataclasses import dataclass
from typing import NamedTuple

from shaftcore.number_text import GROUP, beside_unit, in_full
from shaftcore.units import System

COMPUTED_DIGITS = 4
"""Digits of a quantity that was computed or converted; one that was entered keeps all of its own."""


@dataclass(frozen=True)
class Phrase:
    """A text with ``{:length}``, ``{:stress}`` and the like where its quantities (internal units) go, in order.

    As a plain string it is in SI, with plain spaces: for a terminal, and to be searched.
    """

    template: str
    quantities: tuple[float, ...] = ()

    def written(self, system: System) -> str:
        """The text with its quantities in the units of `system`."""
        return self.template.format(*(_Quantity(value, system) for value in self.quantities))

    def __str__(self) -> str:
        return self.written("SI").replace("\u00a0", " ").replace(GROUP, " ")


class _Quantity(NamedTuple):
    value: float
    system: System

    def __format__(self, dimension_name: str) -> str:
        text = in_full(self.value, dimension_name, self.system, COMPUTED_DIGITS)
        return beside_unit(text, dimension_name, self.system)
