"""A small field over the bench in which the number of a size is typed."""

from PySide6.QtCore import QPointF, Qt, Signal
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QFrame, QGridLayout, QLabel, QWidget

from app.bench.sizes import Size
from app.document import Document
from app.error_messages import guarded
from app.quantity_field import QuantityField
from app.theme import Theme, text_font
from shaftcore.errors import QuantityError
from shaftcore.typed_numbers import parse

EDGE, WIDTH = 6, 270


class NumberField(QFrame):
    """One size, its number and what is wrong with it. Enter takes the number, Esc leaves it as it was."""

    left = Signal()

    def __init__(self, bench: QWidget, document: Document, size: Size, at: QPointF, theme: Theme, typed: str) -> None:
        super().__init__(bench)
        self._document, self.shown_size = document, size
        self._refusal = ""
        self.field = QuantityField(size.declaration, self)
        self.field.set_theme(theme)
        self.field.set_system(document.scene.system)
        self.field.set_value(size.value)
        self.field.setAccessibleName(f"{size.declaration.label} {size.place}")
        self.field.committed.connect(self._take)
        self.field.editingFinished.connect(self._finished)
        self.field.textEdited.connect(self._typed)
        self._lay_out(theme)
        self._at = at
        self._stand()
        self.show()
        self.field.setFocus()
        self.field.selectAll()
        if typed:
            self.field.insert(typed)

    def _lay_out(self, theme: Theme) -> None:
        self.setAutoFillBackground(True)
        self.setObjectName("numberField")
        self.setStyleSheet(f"#numberField {{ background: {theme.raised}; border: 1px solid {theme.accent}; }}")
        head = QLabel(f"{self.shown_size.declaration.label} {self.shown_size.place}")
        head.setFont(text_font(9.0))
        head.setBuddy(self.field)
        grid = QGridLayout(self)
        grid.setContentsMargins(EDGE + 2, EDGE, EDGE + 2, EDGE)
        grid.setVerticalSpacing(4)
        for row, part in enumerate((head, self.field, self.field.words_label)):
            grid.addWidget(part, row, 0)
        self.setFixedWidth(WIDTH)

    def _stand(self) -> None:
        """Above its thing and inside the bench, as high as what it has to say."""
        bench, layout = self.parentWidget(), self.layout()
        if bench is None or layout is None:
            return
        layout.activate()
        # words that wrap have a height for a width; without words there is none to ask for
        wrapped = layout.hasHeightForWidth()
        self.resize(WIDTH, layout.totalHeightForWidth(WIDTH) if wrapped else layout.totalSizeHint().height())
        x = min(max(self._at.x() + 12, 2), max(bench.width() - self.width() - 2, 2))
        y = min(max(self._at.y() - self.height() - 12, 2), max(bench.height() - self.height() - 2, 2))
        self.move(round(x), round(y))

    @property
    def typed(self) -> float | None:
        """The number as it stands in the field, None where it is none."""
        try:
            return parse(self.field.text(), self.shown_size.declaration, self._document.scene.system)
        except QuantityError:
            return None

    @guarded
    def _typed(self, _: str) -> None:
        """The bench shows what is being typed."""
        self._stand()
        parent = self.parentWidget()
        if parent is not None:
            parent.update()

    @guarded
    def _take(self, value: float | None) -> None:
        shaft, system = self._document.shaft, self._document.scene.system
        self._refusal = ""
        self._document.refused.connect(self._refused)
        try:
            self._document.change(self.shown_size.typed(shaft, value), self.shown_size.step_words(value, system))
        finally:
            self._document.refused.disconnect(self._refused)

    @guarded
    def _refused(self, words: str) -> None:
        self._refusal = words

    @guarded
    def _finished(self) -> None:
        """Close once the number stands; a refused one stays, with the reason under it."""
        if self._refusal:
            self.field.refuse(self._refusal)
            self._refusal = ""
        elif not self.field.problem:
            self.leave()
        self._stand()

    def leave(self) -> None:
        """Give the keyboard back to the bench and go."""
        if self.isHidden():
            return
        self.field.blockSignals(True)
        self.hide()
        parent = self.parentWidget()
        if parent is not None:
            parent.setFocus()
        self.deleteLater()
        self.left.emit()

    @guarded
    def keyPressEvent(self, event: QKeyEvent) -> None:  # noqa: N802 (Qt's name)
        if event.key() == Qt.Key.Key_Escape:
            self.leave()
        elif event.key() not in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            super().keyPressEvent(event)
