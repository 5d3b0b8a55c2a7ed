"""Notices: the standing list of what must be seen, each entry leading to its place."""

import re
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

from PySide6.QtCore import QAbstractListModel, QModelIndex, QPersistentModelIndex, QRect, QSize, Qt
from PySide6.QtGui import QColor, QFontMetrics, QPainter, QResizeEvent
from PySide6.QtWidgets import QFrame, QListView, QStyle, QStyledItemDelegate, QStyleOptionViewItem, QVBoxLayout, QWidget

from app.document import Document, Scene
from app.error_messages import guarded
from app.panels.dress import EDGE, GAP, SMALL_POINTS
from app.theme import Theme, text_font
from shaftcore.shaft import Shaft, things

NOTHING = "Nothing to notice."
_TALL = 10_000
_PATH = re.compile(r"(\w+)\[(\d+)\]")
Index = QModelIndex | QPersistentModelIndex
_NO_PARENT = QModelIndex()


@dataclass(frozen=True)
class Entry:
    """One notice as it is shown; it leads to a station, else to the thing with an id."""

    head: str
    text: str
    station: int | None = None
    place: str = ""
    urgent: bool = False


def entries_of(scene: Scene) -> tuple[Entry, ...]:
    """What is missing, then what makes the margins provisional, then everything else along the shaft."""
    missing = tuple(
        Entry(
            "Missing", f"{p.path}: {p.value}. Needed: {p.allowed}; {p.remedy}.", None, _id_at(scene.shaft, p.path), True
        )
        for p in scene.missing
    )
    results = scene.results
    if results is None:
        return missing or (Entry("", NOTHING),)
    found = []
    for notice in sorted(results.notices, key=lambda notice: not notice.provisional):
        head = notice.key[0].upper() + notice.key[1:]
        if notice.station is not None:
            station = results.stations[notice.station]
            head = f"{head} · No. {station.number}  {station.label}"
        if notice.provisional:
            head = f"Provisional · {head}"
        found.append(Entry(head, notice.words.written(scene.system), notice.station, notice.place, notice.provisional))
    return (*missing, *found) or (Entry("", NOTHING),)


def _id_at(shaft: Shaft, path: str) -> str:
    """The id of the thing that a path of the file names, "" where it names none."""
    found = _PATH.match(path)
    group = getattr(shaft, found[1], ()) if found else ()
    return group[int(found[2])].id if found and int(found[2]) < len(group) else ""


class NoticeModel(QAbstractListModel):
    """The entries as a list."""

    def __init__(self) -> None:
        super().__init__()
        self.entries: tuple[Entry, ...] = ()

    def show_entries(self, entries: tuple[Entry, ...]) -> None:
        if [e.head for e in entries] == [e.head for e in self.entries]:
            changed = [row for row, (new, old) in enumerate(zip(entries, self.entries, strict=True)) if new != old]
            self.entries = entries
            for row in changed:
                self.dataChanged.emit(self.index(row), self.index(row))
            return
        self.beginResetModel()
        self.entries = entries
        self.endResetModel()

    def rowCount(self, parent: Index = _NO_PARENT) -> int:  # noqa: N802 (Qt's name)
        return 0 if parent.isValid() else len(self.entries)

    def data(self, index: Index, role: int = Qt.ItemDataRole.DisplayRole) -> Any:
        if index.isValid() and role in (Qt.ItemDataRole.DisplayRole, Qt.ItemDataRole.AccessibleTextRole):
            entry = self.entries[index.row()]
            return f"{entry.head}: {entry.text}" if entry.head else entry.text
        return None


class NoticePainter(QStyledItemDelegate):
    """A head in bold, the words under it, a bar beside what makes the margins provisional."""

    def __init__(self, model: NoticeModel, theme: Theme) -> None:
        super().__init__()
        self._model, self.theme, self.width = model, theme, 300
        self._head, self._text = text_font(SMALL_POINTS, bold=True), text_font(SMALL_POINTS)

    @guarded
    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        entry, box = self._model.entries[index.row()], option.rect
        painter.save()
        if option.state & QStyle.StateFlag.State_Selected:
            painter.fillRect(box, QColor(self.theme.accent_soft))
        if entry.urgent:
            painter.fillRect(box.left(), box.top() + GAP, 3, box.height() - 2 * GAP, QColor(self.theme.caution))
        inner = box.adjusted(EDGE, GAP, -EDGE, -GAP)
        painter.setPen(QColor(self.theme.ink))
        painter.setFont(self._head)
        head_height = self._height(entry.head, self._head)
        painter.drawText(inner, Qt.TextFlag.TextWordWrap, entry.head)
        painter.setPen(QColor(self.theme.faint if not entry.urgent else self.theme.ink))
        painter.setFont(self._text)
        painter.drawText(inner.adjusted(0, head_height, 0, 0), Qt.TextFlag.TextWordWrap, entry.text)
        painter.fillRect(box.left() + EDGE, box.bottom(), box.width() - 2 * EDGE, 1, QColor(self.theme.rule))
        painter.restore()

    @guarded
    def sizeHint(self, option: QStyleOptionViewItem, index: Index) -> QSize:  # noqa: N802 (Qt's name)
        entry = self._model.entries[index.row()]
        return QSize(self.width, self._height(entry.head, self._head) + self._height(entry.text, self._text) + 2 * GAP)

    def _height(self, text: str, font: Any) -> int:
        if not text:
            return 0
        room = QRect(0, 0, self.width - 2 * EDGE, _TALL)
        return QFontMetrics(font).boundingRect(room, Qt.TextFlag.TextWordWrap, text).height() + 1


class NoticeList(QListView):
    """Lines wrap to the list's width."""

    def __init__(self, model: NoticeModel, painter: NoticePainter) -> None:
        super().__init__()
        self._painter = painter
        self.setModel(model)
        self.setItemDelegate(painter)
        self.setFrameShape(QFrame.Shape.NoFrame)
        self.setVerticalScrollMode(QListView.ScrollMode.ScrollPerPixel)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setAccessibleName("Notices")

    @guarded
    def resizeEvent(self, event: QResizeEvent) -> None:  # noqa: N802 (Qt's name)
        self._painter.width = self.viewport().width()
        self.scheduleDelayedItemsLayout()
        super().resizeEvent(event)


class Notices(QWidget):
    """Click, or Enter on an entry, to go to its place. Words follow once a drag has ended."""

    def __init__(self, document: Document, theme: Theme) -> None:
        super().__init__()
        self._document = document
        self.setAccessibleName("Notices")
        self.model = NoticeModel()
        self._painter = NoticePainter(self.model, theme)
        self.list = NoticeList(self.model, self._painter)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.addWidget(self.list)
        self.list.clicked.connect(self._go)
        self.list.activated.connect(self._go)
        document.shown.connect(self._shown)
        self._shown(document.scene)

    def set_theme(self, theme: Theme) -> None:
        self._painter.theme = theme
        self.list.viewport().update()

    @property
    def entries(self) -> Sequence[Entry]:
        return self.model.entries

    @guarded
    def _shown(self, scene: Scene) -> None:
        if not scene.live:
            self.model.show_entries(entries_of(scene))

    @guarded
    def _go(self, index: QModelIndex) -> None:
        entry = self.model.entries[index.row()]
        if entry.station is not None:
            self._document.choose(None, entry.station)
        elif entry.place:
            thing = things(self._document.shaft)[entry.place]
            self._document.choose((getattr(thing, "kind", thing.label.lower()), entry.place))
