"""What one sheet is made of: the results, and what is printed with them."""

from dataclasses import dataclass
from datetime import date
from functools import cached_property

from shaftcore.nomenclature import BY_KEY
from shaftcore.number_text import Entry, beside_unit, with_unit
from shaftcore.results import Results
from shaftcore.stations import Station
from shaftcore.units import System, dimension


@dataclass(frozen=True, eq=False)
class Edition:
    """One sheet: results, the units it is read in, the hash of the shaft file, date and program version."""

    results: Results
    system: System
    file_hash: str
    date: date
    version: str

    def cell(self, key: str, station: int) -> str:
        """A station quantity of the nomenclature list as the tables write it."""
        return BY_KEY[key].writer(self.system)(self._values(key)[station])

    def cells(self, key: str) -> list[str]:
        """That quantity of every station."""
        return [self.cell(key, i) for i in range(len(self.results.stations))]

    def phrase(self, key: str, station: int) -> str:
        """The same with its unit."""
        return beside_unit(self.cell(key, station), BY_KEY[key].dimension, self.system)

    @property
    def length_unit(self) -> float:
        """Millimetres in the reader's unit of length."""
        return dimension("length").unit(self.system).factor

    def place(self, station: Station) -> str:
        """A station by number, name and place."""
        return f"station {station.number}, {station.label}, x = {with_unit(station.x, 'length', self.system)}"

    def least_margin(self, station: int) -> str:
        """Key of the smaller margin of a station."""
        judged = self.results.judged
        return "margin" if judged.margin[station] <= judged.yield_margin[station] else "yield_margin"

    @cached_property
    def _columns(self) -> dict[str, list[Entry]]:
        return {}

    def _values(self, key: str) -> list[Entry]:
        if key not in self._columns:
            self._columns[key] = list(BY_KEY[key].values(self.results))
        return self._columns[key]
