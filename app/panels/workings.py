"""Workings: how the chosen station's number came about, line by line, for a checker with a pocket calculator."""

from PySide6.QtCore import QTimer
from PySide6.QtGui import (
    QColor,
    QFont,
    QShowEvent,
    QTextBlock,
    QTextBlockFormat,
    QTextCharFormat,
    QTextCursor,
    QTextOption,
)
from PySide6.QtWidgets import QTextBrowser, QVBoxLayout, QWidget

from app.document import Document, Scene
from app.error_messages import guarded
from app.panels.dress import EDGE, SMALL_POINTS
from app.panels.workings_rows import Row, Sort, rows_of
from app.theme import Theme, text_font
from shaftcore.lettering import pieces
from shaftcore.workings import workings_of

NOT_YET = "The workings stand here once the shaft can be analysed."
PAUSE_MS = 60
"""Least time between two updates while something is being dragged."""
MARGIN = 70
"""Pixels left of the text, for the symbols."""
HANGING = 14
_ABOVE: dict[Sort, int] = {"head": 14, "name": 7, "quiet": 1}


class Workings(QWidget):
    """Selectable text. While a gesture runs only the rows in sight are written anew, and not at every move."""

    def __init__(self, document: Document, theme: Theme) -> None:
        super().__init__()
        self._document, self._theme = document, theme
        self._rows: list[Row] = []
        self._waiting: Scene | None = None
        self._pause = QTimer(self)
        self._pause.setSingleShot(True)
        self._pause.setInterval(PAUSE_MS)
        self._pause.timeout.connect(self._pause_over)
        self.setAccessibleName("Workings")
        self.text = QTextBrowser()
        self.text.setAccessibleName("Workings of the chosen station")
        self.text.setFont(text_font(9.0))
        self.text.setWordWrapMode(QTextOption.WrapMode.WordWrap)
        self.text.document().setDocumentMargin(EDGE)
        self.text.document().setUndoRedoEnabled(False)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.addWidget(self.text)
        document.shown.connect(self._shown)
        self._shown(document.scene)

    def set_theme(self, theme: Theme) -> None:
        self._theme, self._rows = theme, []
        self._draw(self._document.scene)

    # when to draw ---------------------------------------------------------------------------------

    @guarded
    def _shown(self, scene: Scene) -> None:
        if scene.live and self._pause.isActive():
            self._waiting = scene
            return
        self._waiting = None
        if scene.live:
            self._pause.start()
        else:
            self._pause.stop()
        self._draw(scene)

    @guarded
    def _pause_over(self) -> None:
        scene, self._waiting = self._waiting, None
        if scene is not None:
            self._pause.start()
            self._draw(scene)

    @guarded
    def showEvent(self, event: QShowEvent) -> None:  # noqa: N802 (Qt's name)
        super().showEvent(event)
        self._draw(self._document.scene)

    # drawing --------------------------------------------------------------------------------------

    def _draw(self, scene: Scene) -> None:
        if not self.isVisible():
            return
        rows, before = self._rows_of(scene), self._rows
        alike = len(rows) == len(before) and all(a.sort == b.sort for a, b in zip(rows, before, strict=True))
        if alike and rows[0].text == before[0].text:
            self._rewrite(rows, only_in_sight=scene.live)
        else:
            self._write(rows)

    def _rows_of(self, scene: Scene) -> list[Row]:
        if scene.results is None:
            return [Row("quiet", NOT_YET), *(Row("quiet", f"Missing: {p.remedy}.") for p in scene.missing)]
        station = scene.results.governing if scene.station is None else scene.station
        return rows_of(scene.results, station, workings_of(scene.results, station), scene.system)

    def _write(self, rows: list[Row]) -> None:
        """The whole text anew; the same station keeps its place on the screen."""
        same = bool(rows and self._rows and rows[0].text == self._rows[0].text)
        at = self.text.verticalScrollBar().value() if same else 0
        self.text.clear()
        cursor = QTextCursor(self.text.document())
        cursor.beginEditBlock()
        for number, row in enumerate(rows):
            if number:
                cursor.insertBlock()
            cursor.setBlockFormat(_block_format(row))
            self._insert(cursor, row)
        cursor.endEditBlock()
        self._rows = rows
        self.text.verticalScrollBar().setValue(at)

    def _rewrite(self, rows: list[Row], only_in_sight: bool) -> None:
        """Only the paragraphs that changed; those out of sight keep their old row and so come later."""
        block, cursor = self.text.document().firstBlock(), QTextCursor(self.text.document())
        seen = self._in_sight() if only_in_sight else range(len(rows))
        cursor.beginEditBlock()
        for number, row in enumerate(rows):
            if number in seen and row != self._rows[number]:
                self._replace(cursor, block, row)
                self._rows[number] = row
            block = block.next()
        cursor.endEditBlock()

    def _in_sight(self) -> range:
        view = self.text.viewport().rect()
        first = self.text.cursorForPosition(view.topLeft()).blockNumber()
        return range(first, self.text.cursorForPosition(view.bottomRight()).blockNumber() + 1)

    def _replace(self, cursor: QTextCursor, block: QTextBlock, row: Row) -> None:
        cursor.setPosition(block.position())
        cursor.movePosition(QTextCursor.MoveOperation.EndOfBlock, QTextCursor.MoveMode.KeepAnchor)
        cursor.removeSelectedText()
        self._insert(cursor, row)

    def _insert(self, cursor: QTextCursor, row: Row) -> None:
        theme = self._theme
        plain = _letters(theme.ink)
        main = {
            "title": _letters(theme.ink, bold=True, points=10.5),
            "quiet": _letters(theme.faint, points=SMALL_POINTS),
            "head": _letters(theme.accent, bold=True),
            "flag": _letters(theme.caution, points=SMALL_POINTS),
        }.get(row.sort, plain)
        if row.symbol:
            self._set(cursor, row.symbol, _letters(theme.ink, slant=True))
            cursor.insertText("\t", plain)
        if row.sort in ("formula", "value"):
            self._set(cursor, row.text, main)
        else:
            cursor.insertText(row.text, main)
        if row.strong:
            self._set(cursor, row.strong, _letters(theme.ink, bold=True))
        if row.faint:
            self._set(cursor, row.faint, _letters(theme.faint, points=SMALL_POINTS))

    def _set(self, cursor: QTextCursor, text: str, letters: QTextCharFormat) -> None:
        """Insert with real subscripts and powers."""
        for run, level in pieces(text):
            if level == "on":
                cursor.insertText(run, letters)
                continue
            raised = QTextCharFormat(letters)
            below = level == "below"
            align = QTextCharFormat.VerticalAlignment
            raised.setVerticalAlignment(align.AlignSubScript if below else align.AlignSuperScript)
            cursor.insertText(run, raised)


def _letters(colour: str, bold: bool = False, points: float = 9.0, slant: bool = False) -> QTextCharFormat:
    letters = QTextCharFormat()
    letters.setForeground(QColor(colour))
    letters.setFontPointSize(points)
    letters.setFontItalic(slant)
    if bold:
        letters.setFontWeight(QFont.Weight.Bold)
    return letters


def _block_format(row: Row) -> QTextBlockFormat:
    """Symbols in the margin, text in one column; a second line of a formula hangs a little."""
    block = QTextBlockFormat()
    block.setTopMargin(_ABOVE.get(row.sort, 1))
    block.setLineHeight(115, QTextBlockFormat.LineHeightTypes.ProportionalHeight.value)
    if row.sort == "name":
        block.setLeftMargin(MARGIN)
        block.setTextIndent(-MARGIN)
        block.setTabPositions([QTextOption.Tab(MARGIN, QTextOption.TabType.LeftTab)])
    elif row.sort in ("formula", "value"):
        block.setLeftMargin(MARGIN + HANGING)
        block.setTextIndent(-HANGING)
    elif row.sort == "flag":
        block.setLeftMargin(MARGIN)
    return block
