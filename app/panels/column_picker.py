"""Which columns the ledger shows: a list to tick, opened under the button or where the head was clicked."""

from collections.abc import Sequence

from PySide6.QtCore import QPoint, QSize, Qt, Signal
from PySide6.QtWidgets import QFrame, QListWidget, QListWidgetItem, QPushButton, QVBoxLayout, QWidget

from app.error_messages import guarded
from app.panels.dress import GAP
from app.panels.ledger_model import FIRST_COLUMNS
from shaftcore.nomenclature import COLUMNS, Column

SIZE = QSize(300, 360)


class ColumnPicker(QFrame):
    """Space ticks, Esc closes; a newly ticked column comes last."""

    picked = Signal(list)

    def __init__(self, parent: QWidget) -> None:
        super().__init__(parent, Qt.WindowType.Popup)
        self._keys: list[str] = []
        self.setFrameShape(QFrame.Shape.StyledPanel)
        self.list = QListWidget()
        self.list.setAccessibleName("Columns of the ledger")
        for column in COLUMNS:
            item = QListWidgetItem(_words(column))
            item.setData(Qt.ItemDataRole.UserRole, column.key)
            item.setToolTip(column.words)
            item.setFlags(item.flags() | Qt.ItemFlag.ItemIsUserCheckable)
            self.list.addItem(item)
        self.usual = QPushButton("Usual columns")
        self.usual.setAccessibleName("Show the usual columns")
        box = QVBoxLayout(self)
        box.setContentsMargins(GAP, GAP, GAP, GAP)
        box.addWidget(self.list)
        box.addWidget(self.usual)
        self.list.itemChanged.connect(self._ticked)
        self.usual.clicked.connect(self._usual)
        self.resize(SIZE)

    def open_at(self, where: QPoint, keys: Sequence[str]) -> None:
        """Open with these columns ticked, `where` on the screen."""
        self._tick(list(keys))
        self.move(where)
        self.show()
        self.list.setFocus()

    def _tick(self, keys: list[str]) -> None:
        self._keys = keys
        self.list.blockSignals(True)
        for item in self._items():
            shown = item.data(Qt.ItemDataRole.UserRole) in keys
            item.setCheckState(Qt.CheckState.Checked if shown else Qt.CheckState.Unchecked)
        self.list.blockSignals(False)

    def _items(self) -> list[QListWidgetItem]:
        return [self.list.item(row) for row in range(self.list.count())]

    @guarded
    def _ticked(self, item: QListWidgetItem) -> None:
        key, shown = item.data(Qt.ItemDataRole.UserRole), item.checkState() == Qt.CheckState.Checked
        keys = [known for known in self._keys if known != key] + [key] * shown
        if not keys:
            self._tick(self._keys)  # one column stays, or there would be nothing to right-click
            return
        self._keys = keys
        self.picked.emit(keys)

    @guarded
    def _usual(self) -> None:
        self._tick(list(FIRST_COLUMNS))
        self.picked.emit(list(FIRST_COLUMNS))


def _words(column: Column) -> str:
    return f"{column.label}  {column.symbol}" if column.symbol else column.label
