"""The ledger as a table: one row a station, columns from the nomenclature, values written when they are seen."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Literal

import numpy as np
from PySide6.QtCore import QAbstractTableModel, QModelIndex, QPersistentModelIndex, Qt

from app.document import Scene
from shaftcore.nomenclature import BY_KEY, Column
from shaftcore.number_text import GROUP, Entry, unit_symbol
from shaftcore.results import Results

Order = Literal["governing", "x"]
ORDERS: tuple[tuple[Order, str], ...] = (("governing", "governing first"), ("x", "by position"))
FIRST_COLUMNS = (
    "station", "place", "n", "margin", "yield_margin", "radius", "x", "d",
    "kt_bending", "kf_bending", "endurance", "amplitude",
)  # fmt: skip
"""What a new user sees, the most telling ones first so that a narrow window shows them."""
WORDS = {"place", "flags"}
"""Columns of words, set from the left."""

Index = QModelIndex | QPersistentModelIndex
_NO_PARENT = QModelIndex()


@dataclass(frozen=True)
class Mark:
    """What is to be said of a row beside its numbers."""

    fails: bool = False
    governs: bool = False
    notices: tuple[str, ...] = ()

    @property
    def drawn(self) -> tuple[bool, bool, bool]:
        """What of it can be seen."""
        return self.fails, self.governs, bool(self.notices)

    def words(self) -> str:
        said = ["falls short of an asked factor"] * self.fails + ["governs the shaft"] * self.governs
        return "\n".join([*(word[0].upper() + word[1:] + "." for word in said), *self.notices])


class LedgerModel(QAbstractTableModel):
    """Keeps the last scene's values of the chosen columns; reset only when the stations are others.

    While a gesture runs the rows keep their order, so that nothing jumps under the eye; they are
    sorted anew when it ends.
    """

    def __init__(self) -> None:
        super().__init__()
        self.columns: tuple[Column, ...] = tuple(BY_KEY[key] for key in FIRST_COLUMNS)
        self.rows: list[int] = []
        self.marks: list[Mark] = []
        self.order: Order = "governing"
        self._search: tuple[str, ...] = ()
        self._scene = Scene()
        self._values: list[Sequence[Entry]] = []
        self._fails: list[bool] = []

    # what is shown --------------------------------------------------------------------------------

    def show_scene(self, scene: Scene) -> None:
        """Take over a scene with as little repainting as it allows."""
        before, self._scene = self._scene, scene
        if scene.results is before.results and scene.system == before.system:
            if before.live and not scene.live:
                self._sort()
            return
        if _stations(scene.results) != _stations(before.results) or scene.system != before.system:
            self._anew()
            return
        self._refresh()
        if not scene.live:
            self._sort()

    def set_columns(self, keys: Sequence[str]) -> None:
        """Show these columns, in this order; unknown keys are left out."""
        self.columns = tuple(BY_KEY[key] for key in dict.fromkeys(keys) if key in BY_KEY)
        self._anew()

    def set_order(self, order: Order) -> None:
        self.order = order
        self._sort()

    def set_search(self, text: str) -> None:
        """Keep the rows whose number, place and notices hold every word."""
        self._search = tuple(text.casefold().split())
        self._anew()

    def row_of(self, station: int | None) -> int | None:
        return self.rows.index(station) if station is not None and station in self.rows else None

    def _anew(self) -> None:
        self.beginResetModel()
        self._read()
        self.rows = self._sorted()
        self.endResetModel()

    def _refresh(self) -> None:
        """New numbers in the same rows: only the block of cells that changed is announced."""
        values, fails, marks = self._values, self._fails, self.marks
        self._read()
        columns = [c for c, (new, old) in enumerate(zip(self._values, values, strict=True)) if new != old]
        stations = {i for c in columns for i, v in enumerate(self._values[c]) if v != values[c][i]}
        turned = {i for i, (new, old) in enumerate(zip(self._fails, fails, strict=True)) if new != old}
        if turned:
            columns = [0, len(self.columns) - 1]
        rows = [row for row, station in enumerate(self.rows) if station in stations or station in turned]
        if rows:
            self.dataChanged.emit(self.index(rows[0], columns[0]), self.index(rows[-1], columns[-1]))
        if [mark.drawn for mark in marks] != [mark.drawn for mark in self.marks] and self.rows:
            self.headerDataChanged.emit(Qt.Orientation.Vertical, 0, len(self.rows) - 1)

    def _read(self) -> None:
        results = self._scene.results
        if results is None:
            self._values, self._fails, self.marks = [()] * len(self.columns), [], []
            return
        self._values = [column.values(results) for column in self.columns]
        judged = results.judged
        self._fails = ((judged.margin < 0) | (judged.yield_margin < 0)).tolist()
        governing, system = results.governing, self._scene.system
        self.marks = [
            Mark(fails, i == governing, tuple(notice.words.written(system) for notice in said))
            for i, (fails, said) in enumerate(zip(self._fails, results.notices_by_station(), strict=True))
        ]

    def _sorted(self) -> list[int]:
        results = self._scene.results
        if results is None:
            return []
        by_x = self.order == "x"
        order = range(len(results.stations)) if by_x else np.argsort(-results.judged.utilisation, kind="stable")
        found = [int(i) for i in order]
        return [i for i in found if self._found(results, i)] if self._search else found

    def _found(self, results: Results, i: int) -> bool:
        station = results.stations[i]
        text = f"{station.number} {station.label} {self.marks[i].words()}".casefold()
        return all(word in text for word in self._search)

    def _sort(self) -> None:
        rows = self._sorted()
        if rows == self.rows:
            return
        if len(rows) != len(self.rows):
            self._anew()
            return
        self.layoutAboutToBeChanged.emit()
        old, place = self.persistentIndexList(), {station: row for row, station in enumerate(rows)}
        new = [self.index(place.get(self.rows[i.row()], i.row()), i.column()) for i in old]
        self.rows = rows
        self.changePersistentIndexList(old, new)
        self.layoutChanged.emit()

    # as text --------------------------------------------------------------------------------------

    def texts(self, column: int, rows: range) -> list[str]:
        """The written cells of one column."""
        write = self.columns[column].writer(self._scene.system)
        values, stations = self._values[column], self.rows
        return [write(values[stations[row]]) for row in rows]

    def fails(self, row: int) -> bool:
        return self._fails[self.rows[row]]

    def mark(self, row: int) -> Mark:
        return self.marks[self.rows[row]]

    def unit(self, column: int) -> str:
        return unit_symbol(self.columns[column].dimension, self._scene.system)

    def head(self, column: int) -> str:
        what = self.columns[column]
        return what.symbol or what.label

    def tab_separated(self, rows: Sequence[int], columns: Sequence[int]) -> str:
        """Heads with units, then the rows, fit for a spreadsheet: plain minus, no gaps in numbers."""
        heads = [self.head(c) + (f" ({self.unit(c)})" if self.unit(c) else "") for c in columns]
        cells = [[self.texts(c, range(row, row + 1))[0] for c in columns] for row in rows]
        plain = [[cell.replace(GROUP, "").replace("−", "-").replace("\t", " ") for cell in row] for row in cells]
        return "\n".join("\t".join(row) for row in [heads, *plain]) + "\n"

    # Qt's questions -------------------------------------------------------------------------------

    def rowCount(self, parent: Index = _NO_PARENT) -> int:  # noqa: N802 (Qt's name)
        return 0 if parent.isValid() else len(self.rows)

    def columnCount(self, parent: Index = _NO_PARENT) -> int:  # noqa: N802 (Qt's name)
        return 0 if parent.isValid() else len(self.columns)

    def data(self, index: Index, role: int = Qt.ItemDataRole.DisplayRole) -> Any:
        if not index.isValid():
            return None
        row, column = index.row(), index.column()
        if role == Qt.ItemDataRole.DisplayRole:
            return self.texts(column, range(row, row + 1))[0]
        if role == Qt.ItemDataRole.AccessibleTextRole:
            return f"{self.columns[column].label}: {self.data(index)} {self.unit(column)}".rstrip()
        if role == Qt.ItemDataRole.ToolTipRole:
            return "\n".join(filter(None, [self.data(index) if self._is_words(column) else "", self.mark(row).words()]))
        if role == Qt.ItemDataRole.TextAlignmentRole:
            side = Qt.AlignmentFlag.AlignLeft if self._is_words(column) else Qt.AlignmentFlag.AlignRight
            return side | Qt.AlignmentFlag.AlignVCenter
        return None

    def _is_words(self, column: int) -> bool:
        return self.columns[column].key in WORDS

    def headerData(  # noqa: N802 (Qt's name)
        self, section: int, orientation: Qt.Orientation, role: int = Qt.ItemDataRole.DisplayRole
    ) -> Any:
        spoken = role in (Qt.ItemDataRole.ToolTipRole, Qt.ItemDataRole.AccessibleTextRole)
        if orientation == Qt.Orientation.Vertical:
            return self.mark(section).words() if spoken and section < len(self.rows) else None
        if section >= len(self.columns):
            return None
        what = self.columns[section]
        if spoken:
            return f"{what.label}: {what.words}" if what.words else what.label
        if role == Qt.ItemDataRole.DisplayRole:
            return f"{self.head(section)} {self.unit(section)}".rstrip()
        return None


def _stations(results: Results | None) -> list[tuple[str, str, str]]:
    return [] if results is None else [(s.kind, s.place, s.label) for s in results.stations]
