"""The ledger's table, painted by hand so that it can follow a drag: whole rows in one pass, no cell objects."""

from functools import lru_cache

from PySide6.QtCore import QPointF, QRect, Qt
from PySide6.QtGui import QColor, QFontMetrics, QFontMetricsF, QPainter, QPaintEvent, QPalette, QPen, QPolygonF
from PySide6.QtWidgets import QAbstractItemView, QHeaderView, QTableView

from app import symbol_text
from app.error_messages import guarded
from app.panels.ledger_model import WORDS, LedgerModel
from app.theme import Theme, text_font

POINTS = 9.0
PAD = 8
ROW_AIR = 8
WIDEST_WORDS = 180
MARKS_WIDTH = 34


class Heads(QHeaderView):
    """Symbol over unit."""

    def __init__(self, model: LedgerModel, theme: Theme) -> None:
        super().__init__(Qt.Orientation.Horizontal)
        self._model, self.theme = model, theme
        self.setSectionsMovable(True)
        self.setHighlightSections(False)
        self.setFont(text_font(POINTS))
        self.setFixedHeight(2 * self.fontMetrics().height() + 12)
        self.setAccessibleName("Columns of the ledger")

    @guarded
    def paintSection(self, painter: QPainter, rect: QRect, column: int) -> None:  # noqa: N802 (Qt's name)
        painter.save()
        painter.fillRect(rect, QColor(self.theme.panel))
        font, metrics = self.font(), QFontMetricsF(self.font())
        head, words = self._model.head(column), self._model.columns[column].key in WORDS
        unit = self._model.unit(column)
        left, right = rect.left() + PAD, rect.right() + 1 - PAD
        painter.setPen(QColor(self.theme.ink))
        base = rect.top() + 4 + metrics.ascent()
        at = left if words else right - symbol_text.width(head, font)
        symbol_text.draw(painter, QPointF(at, base), head, font)
        painter.setFont(font)
        painter.setPen(QColor(self.theme.faint))
        painter.drawText(QPointF(right - metrics.horizontalAdvance(unit), base + metrics.height() + 2), unit)
        painter.fillRect(rect.left(), rect.bottom(), rect.width(), 1, QColor(self.theme.rule))
        painter.restore()


class Marks(QHeaderView):
    """The gutter at the left: a bar for the governing row, two slant strokes where a row falls short,
    a lozenge where there is a notice."""

    def __init__(self, model: LedgerModel, theme: Theme) -> None:
        super().__init__(Qt.Orientation.Vertical)
        self._model, self.theme = model, theme
        self.setSectionResizeMode(QHeaderView.ResizeMode.Fixed)
        self.setFixedWidth(MARKS_WIDTH)
        self.setAccessibleName("Marks of the rows")

    @guarded
    def paintSection(self, painter: QPainter, rect: QRect, row: int) -> None:  # noqa: N802 (Qt's name)
        painter.save()
        painter.fillRect(rect, QColor(self.theme.raised))
        mark, middle = self._model.mark(row), rect.center().y() + 0.5
        if mark.governs:
            painter.fillRect(rect.left(), rect.top() + 2, 3, rect.height() - 4, QColor(self.theme.accent))
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        if mark.fails:
            painter.setPen(QPen(QColor(self.theme.ink), 1.6))
            for x in (rect.left() + 8.0, rect.left() + 12.5):
                painter.drawLine(QPointF(x, middle + 4.5), QPointF(x + 3, middle - 4.5))
        if mark.notices:
            painter.setPen(QPen(QColor(self.theme.caution), 1.3))
            x = rect.left() + 25.0
            corners = ((x - 4, middle), (x, middle - 4), (x + 4, middle), (x, middle + 4))
            painter.drawPolygon(QPolygonF([QPointF(*corner) for corner in corners]))
        painter.restore()


class LedgerTable(QTableView):
    """Rows of one height, so that what must be painted is known without asking every cell."""

    def __init__(self, model: LedgerModel, theme: Theme) -> None:
        super().__init__()
        self.theme, self.empty_words = theme, ""
        self._ledger = model
        self._plain, self._bold = text_font(POINTS), text_font(POINTS, bold=True)
        self.heads, self.gutter = Heads(model, theme), Marks(model, theme)
        self.setHorizontalHeader(self.heads)
        self.setVerticalHeader(self.gutter)
        self.setModel(model)
        self.gutter.setDefaultSectionSize(QFontMetrics(self._plain).height() + ROW_AIR)
        self.setSelectionBehavior(QAbstractItemView.SelectionBehavior.SelectRows)
        self.setSelectionMode(QAbstractItemView.SelectionMode.ExtendedSelection)
        self.setEditTriggers(QAbstractItemView.EditTrigger.NoEditTriggers)
        self.setTabKeyNavigation(False)
        self.setShowGrid(False)
        self.setFrameShape(QTableView.Shape.NoFrame)
        self.setHorizontalScrollMode(QAbstractItemView.ScrollMode.ScrollPerPixel)
        self.setAccessibleName("Ledger of stations")
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        self.setStyleSheet(
            f"QTableCornerButton::section {{ background: {theme.panel}; border: none;"
            f" border-bottom: 1px solid {theme.rule}; }}"
        )
        ground = self.gutter.palette()
        for role in (QPalette.ColorRole.Window, QPalette.ColorRole.Button, QPalette.ColorRole.Base):
            ground.setColor(role, QColor(theme.raised))
        self.gutter.setPalette(ground)
        self.theme = self.heads.theme = self.gutter.theme = theme
        for part in (self.viewport(), self.heads.viewport(), self.gutter.viewport()):
            part.update()

    def fit_columns(self, calmly: bool = False) -> None:
        """Columns as wide as head and numbers need; `calmly`, none narrows that is not twice as wide as it must be."""
        bold = QFontMetrics(self._bold)
        for column, what in enumerate(self._ledger.columns):
            texts = self._ledger.texts(column, range(len(self._ledger.rows)))
            need = max((bold.horizontalAdvance(text) for text in set(texts)), default=0) + 1
            head = symbol_text.width(self._ledger.head(column), self.heads.font())
            unit = self.heads.fontMetrics().horizontalAdvance(self._ledger.unit(column))
            wide = round(max(need, head, unit)) + 2 * PAD
            if what.key in WORDS:
                wide = min(wide, WIDEST_WORDS)
            if not calmly or not wide <= self.columnWidth(column) < 2 * wide:
                self.setColumnWidth(column, wide)

    @guarded
    def paintEvent(self, event: QPaintEvent) -> None:  # noqa: N802 (Qt's name)
        painter, area = QPainter(self.viewport()), event.rect()
        painter.fillRect(area, QColor(self.theme.raised))
        if self._ledger.rows:
            first, last = self.rowAt(area.top()), self.rowAt(area.bottom())
            rows = range(max(first, 0), (last if last >= 0 else len(self._ledger.rows) - 1) + 1)
            self._paint_ground(painter, rows)
            self._paint_texts(painter, rows, area)
        else:
            painter.setPen(QColor(self.theme.faint))
            painter.setFont(self._plain)
            box = self.viewport().rect().adjusted(PAD, PAD, -PAD, -PAD)
            painter.drawText(box, Qt.AlignmentFlag.AlignTop | Qt.TextFlag.TextWordWrap, self.empty_words)
        painter.end()

    def _paint_ground(self, painter: QPainter, rows: range) -> None:
        width, high = self.viewport().width(), self.gutter.defaultSectionSize()
        rule, chosen = QColor(self.theme.rule), QColor(self.theme.accent_soft)
        selected = {index.row() for index in self.selectionModel().selectedRows()}
        for row in rows:
            y = self.rowViewportPosition(row)
            if row in selected:
                painter.fillRect(0, y, width, high, chosen)
            painter.fillRect(0, y + high - 1, width, 1, rule)
        current = self.currentIndex().row()
        if self.hasFocus() and current in rows:
            painter.setPen(QColor(self.theme.accent))
            painter.drawRect(0, self.rowViewportPosition(current), width - 1, high - 2)

    def _paint_texts(self, painter: QPainter, rows: range, area: QRect) -> None:
        """Column by column; numbers end at the right edge, in bold where the row falls short."""
        painter.setPen(QColor(self.theme.ink))
        high, top = self.gutter.defaultSectionSize(), self.rowViewportPosition(rows.start) if rows else 0
        fails = [self._ledger.fails(row) for row in rows]
        for bold in (False, True):
            if bold not in fails:
                continue
            font = self._bold if bold else self._plain
            painter.setFont(font)
            base = top + (high + QFontMetrics(font).ascent() - QFontMetrics(font).descent()) // 2
            for column in range(len(self._ledger.columns)):
                x, wide = self.columnViewportPosition(column), self.columnWidth(column)
                if x > area.right() or x + wide < area.left():
                    continue
                words, texts = self._ledger.columns[column].key in WORDS, self._ledger.texts(column, rows)
                for offset, (text, failing) in enumerate(zip(texts, fails, strict=True)):
                    if failing is not bold:
                        continue
                    if words:
                        at, text = x + PAD, _cut(text, wide - 2 * PAD, bold)
                    else:
                        at = x + wide - PAD - _length(text, bold)
                    painter.drawText(at, base + offset * high, text)

    def sizeHintForRow(self, row: int) -> int:  # noqa: N802 (Qt's name)
        return self.gutter.defaultSectionSize()


@lru_cache(maxsize=1024)
def _cut(text: str, width: int, bold: bool) -> str:
    """The text cut to a width with an ellipsis."""
    return QFontMetrics(text_font(POINTS, bold)).elidedText(text, Qt.TextElideMode.ElideRight, width)


@lru_cache(maxsize=256)
def _advance(sign: str, bold: bool) -> float:
    return QFontMetricsF(text_font(POINTS, bold)).horizontalAdvance(sign)


def _length(number: str, bold: bool) -> int:
    """Pixels a written number takes; its signs are added up, which is much quicker than shaping it."""
    return round(sum([_advance(sign, bold) for sign in number]))
