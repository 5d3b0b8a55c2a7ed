"""The ledger: every station with its numbers, to sort, search, choose from and copy."""

from collections.abc import Sequence

from PySide6.QtCore import QModelIndex, QPoint, Qt
from PySide6.QtGui import QAction, QGuiApplication, QKeySequence
from PySide6.QtWidgets import QComboBox, QHBoxLayout, QLineEdit, QToolButton, QVBoxLayout, QWidget

from app.document import Document, Scene
from app.error_messages import guarded
from app.panels.column_picker import ColumnPicker
from app.panels.dress import EDGE, GAP
from app.panels.ledger_model import ORDERS, LedgerModel, Order
from app.panels.ledger_table import LedgerTable
from app.theme import Theme
from shaftcore.nomenclature import BY_KEY
from shaftcore.results import Results

NOT_YET = "The ledger fills once the shaft can be analysed."


class Ledger(QWidget):
    """Search, order and columns above the table. `columns` and `order` are what is worth remembering."""

    def __init__(self, document: Document, theme: Theme) -> None:
        super().__init__()
        self._document = document
        self.setAccessibleName("Ledger")
        self.model = LedgerModel()
        self.table = LedgerTable(self.model, theme)
        self.search = QLineEdit()
        self.order_box = QComboBox()
        self.columns_button = QToolButton()
        self.picker = ColumnPicker(self)
        self._arrange()
        self._add_actions()
        self._following = False
        self._fitted: Results | None = None
        self.search.textChanged.connect(self._searched)
        self.order_box.activated.connect(self._ordered)
        self.picker.picked.connect(self._picked)
        self.table.heads.setContextMenuPolicy(Qt.ContextMenuPolicy.CustomContextMenu)
        self.table.heads.customContextMenuRequested.connect(self._head_menu)
        self.table.selectionModel().currentRowChanged.connect(self._row_chosen)
        self.model.modelReset.connect(self._was_reset)
        document.shown.connect(self._shown)
        self._shown(document.scene)

    def set_theme(self, theme: Theme) -> None:
        self.table.set_theme(theme)

    # what is worth remembering --------------------------------------------------------------------

    @property
    def columns(self) -> list[str]:
        """Keys of the shown columns as they stand from left to right."""
        heads = self.table.heads
        return [self.model.columns[heads.logicalIndex(place)].key for place in range(len(self.model.columns))]

    @columns.setter
    def columns(self, keys: Sequence[str]) -> None:
        if any(key in BY_KEY for key in keys):
            self._picked(list(keys))

    @property
    def order(self) -> str:
        return self.model.order

    @order.setter
    def order(self, order: str) -> None:
        for index, (known, _) in enumerate(ORDERS):
            if known == order:
                self.order_box.setCurrentIndex(index)
                self._set_order(known)

    # building -------------------------------------------------------------------------------------

    def _arrange(self) -> None:
        self.search.setPlaceholderText("Search stations and notices")
        self.search.setAccessibleName("Search the ledger")
        self.search.setClearButtonEnabled(True)
        self.order_box.setAccessibleName("Order of the ledger")
        for _, words in ORDERS:
            self.order_box.addItem(words)
        self.columns_button.setText("Columns")
        self.columns_button.setAccessibleName("Choose the columns of the ledger")
        self.columns_button.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        tools = QHBoxLayout()
        tools.setContentsMargins(EDGE, GAP, EDGE, GAP)
        tools.setSpacing(GAP)
        tools.addWidget(self.search, 1)
        tools.addWidget(self.order_box)
        tools.addWidget(self.columns_button)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.setSpacing(0)
        whole.addLayout(tools)
        whole.addWidget(self.table, 1)

    def _add_actions(self) -> None:
        self.copy_action = self._action("Copy chosen rows", QKeySequence(QKeySequence.StandardKey.Copy), self.copy)
        self.copy_all_action = self._action("Copy whole ledger", QKeySequence("Ctrl+Shift+C"), self.copy_all)
        self.columns_action = self._action("Columns…", QKeySequence("Ctrl+Shift+K"), self._open_picker)
        self.table.setContextMenuPolicy(Qt.ContextMenuPolicy.ActionsContextMenu)
        self.columns_button.clicked.connect(self.columns_action.trigger)
        self.columns_button.setToolTip(f"Choose the columns ({self.columns_action.shortcut().toString()})")

    def _action(self, words: str, keys: QKeySequence, slot: object) -> QAction:
        action = QAction(words, self.table)
        action.setShortcut(keys)
        action.setShortcutContext(Qt.ShortcutContext.WidgetWithChildrenShortcut)
        action.triggered.connect(slot)
        self.table.addAction(action)
        return action

    # copying --------------------------------------------------------------------------------------

    @guarded
    def copy(self) -> None:
        """The chosen rows, or all of them where none is chosen."""
        rows = sorted(index.row() for index in self.table.selectionModel().selectedRows())
        self._copy_rows(rows or range(len(self.model.rows)))

    @guarded
    def copy_all(self) -> None:
        self._copy_rows(range(len(self.model.rows)))

    def _copy_rows(self, rows: Sequence[int]) -> None:
        heads = self.table.heads
        columns = [heads.logicalIndex(place) for place in range(len(self.model.columns))]
        QGuiApplication.clipboard().setText(self.model.tab_separated(rows, columns))

    # following the scene --------------------------------------------------------------------------

    @guarded
    def _shown(self, scene: Scene) -> None:
        self._say_why_empty(scene)
        self._following = True
        try:
            self.model.show_scene(scene)
            self._follow(scene)
        finally:
            self._following = False
        if not scene.live and scene.results is not self._fitted:
            self._fitted = scene.results
            self.table.fit_columns(calmly=True)
            self.table.viewport().update()

    def _say_why_empty(self, scene: Scene) -> None:
        missing = (f"Missing: {problem.remedy}." for problem in scene.missing)
        unmatched = f"No station matches “{self.search.text()}”."
        self.table.empty_words = " ".join([NOT_YET, *missing]) if scene.results is None else unmatched
        self.table.viewport().update()

    def _follow(self, scene: Scene) -> None:
        """Make the chosen station's row the current one."""
        row = self.model.row_of(scene.station)
        if row is None:
            self.table.clearSelection()
        elif row != self.table.currentIndex().row() or not self.table.selectionModel().isRowSelected(row):
            self.table.setCurrentIndex(self.model.index(row, max(self.table.currentIndex().column(), 0)))

    @guarded
    def _was_reset(self) -> None:
        self.table.fit_columns()
        if not self._following:
            self._following = True
            self._follow(self._document.scene)
            self._following = False

    @guarded
    def _row_chosen(self, current: QModelIndex, _: QModelIndex) -> None:
        if not self._following and current.isValid():
            self._document.choose(None, self.model.rows[current.row()])

    # asked by the user ----------------------------------------------------------------------------

    @guarded
    def _searched(self, text: str) -> None:
        self.model.set_search(text)
        self._say_why_empty(self._document.scene)

    @guarded
    def _ordered(self, index: int) -> None:
        self._set_order(ORDERS[index][0])

    def _set_order(self, order: Order) -> None:
        self.model.set_order(order)
        self.table.scrollTo(self.table.currentIndex())

    @guarded
    def _picked(self, keys: list[str]) -> None:
        heads = self.table.heads
        for place in range(heads.count()):  # the new order is that of the keys, moved heads go back
            heads.moveSection(heads.visualIndex(place), place)
        self.model.set_columns(keys)

    @guarded
    def _head_menu(self, at: QPoint) -> None:
        self.picker.open_at(self.table.heads.mapToGlobal(at), self.columns)

    @guarded
    def _open_picker(self) -> None:
        below = self.columns_button.mapToGlobal(self.columns_button.rect().bottomRight())
        self.picker.open_at(below - QPoint(self.picker.width(), 0), self.columns)
