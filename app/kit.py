"""The strip between bench and traces with everything that can be put on the shaft."""

from PySide6.QtCore import QByteArray, QEvent, QMimeData, QObject, QPoint, QSize, Qt
from PySide6.QtGui import QAction, QDrag, QKeySequence, QMouseEvent
from PySide6.QtWidgets import QApplication, QHBoxLayout, QLabel, QToolBar, QWidget

from app.bench.hand import BenchHand
from app.bench.tools import MIME, TOOLS, Tool
from app.bench.view import BenchView
from app.document import Document
from app.error_messages import guarded
from app.kit_glyphs import SIDE, glyph_icon
from app.theme import Theme, text_font


class Kit(QWidget):
    """One action an entry: press its key or click it, then click on the shaft; or drag it onto the bench.

    The keys act while the bench or the strip has the keyboard. `actions_by_key` holds the actions.
    """

    def __init__(self, document: Document, bench: BenchView, theme: Theme) -> None:
        super().__init__()
        hand = bench.hand
        assert isinstance(hand, BenchHand)
        self._hand, self._bench, self.theme = hand, bench, theme
        self._pressed: tuple[QPoint, str] | None = None
        self.setAccessibleName("Kit: what can be put on the shaft")
        self.bar = QToolBar(self)
        self.bar.setToolButtonStyle(Qt.ToolButtonStyle.ToolButtonTextBesideIcon)
        self.bar.setIconSize(QSize(SIDE, SIDE))
        self.actions_by_key: dict[str, QAction] = {}
        self._labels: list[QLabel] = []
        self._fill()
        row = QHBoxLayout(self)
        row.setContentsMargins(0, 2, 0, 2)
        row.addWidget(self.bar)
        hand.armed.connect(self._armed)
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        self.theme = theme
        for key, action in self.actions_by_key.items():
            action.setIcon(glyph_icon(key, theme))
        for label in self._labels:
            label.setStyleSheet(f"color: {theme.faint}; padding: 0 0 0 6px;")
        self.bar.setStyleSheet(
            "QToolBar { spacing: 0; border: none; }"
            "QToolButton { border: 1px solid transparent; border-radius: 3px; padding: 3px 2px; }"
            f"QToolButton:hover {{ background: {theme.raised}; }}"
            f"QToolButton:focus {{ border-color: {theme.rule}; }}"
            f"QToolButton:checked {{ background: {theme.accent_soft}; border-color: {theme.accent}; }}"
        )

    def _fill(self) -> None:
        """Entries by where they go, each group behind its name."""
        group = ""
        for tool in TOOLS:
            if tool.goes != group:
                self._head(tool)
                group = tool.goes
            action = self._action(tool)
            self.bar.addAction(action)
            button = self.bar.widgetForAction(action)
            button.setAccessibleName(tool.label)
            button.setAccessibleDescription(tool.words)
            button.setFocusPolicy(Qt.FocusPolicy.TabFocus)
            button.setProperty("tool", tool.key)
            button.setFont(text_font(8.5))
            button.installEventFilter(self)

    def _head(self, tool: Tool) -> None:
        if tool.place is None:
            return
        label = QLabel(tool.goes)
        label.setFont(text_font(8.0))
        self._labels.append(label)
        self.bar.addWidget(label)

    def _action(self, tool: Tool) -> QAction:
        action = QAction(tool.label, self)
        action.setCheckable(True)
        action.setShortcut(QKeySequence(tool.letter))
        action.setShortcutContext(Qt.ShortcutContext.WidgetWithChildrenShortcut)
        action.setToolTip(f"{tool.words} ({tool.letter})")
        action.setStatusTip(tool.words)
        action.triggered.connect(lambda checked=False, key=tool.key: self._take(key, checked))
        self._bench.addAction(action)
        self.addAction(action)
        self.actions_by_key[tool.key] = action
        return action

    @guarded
    def _take(self, key: str, checked: bool) -> None:
        self._hand.arm(key if checked else "")
        self._bench.setFocus()

    @guarded
    def _armed(self, key: str) -> None:
        for other, action in self.actions_by_key.items():
            action.setChecked(other == key)

    @guarded
    def eventFilter(self, watched: QObject, event: QEvent) -> bool:  # noqa: N802 (Qt's name)
        """A press that moves away from a button drags its entry; a plain click arms it."""
        if isinstance(event, QMouseEvent) and isinstance(watched, QWidget):
            if event.type() == QEvent.Type.MouseButtonPress and event.button() == Qt.MouseButton.LeftButton:
                self._pressed = (event.position().toPoint(), str(watched.property("tool")))
            elif event.type() == QEvent.Type.MouseMove and self._pressed is not None:
                return self._maybe_drag(event.position().toPoint())
            elif event.type() == QEvent.Type.MouseButtonRelease:
                self._pressed = None
        return False

    def _maybe_drag(self, pos: QPoint) -> bool:
        assert self._pressed is not None
        start, key = self._pressed
        if (pos - start).manhattanLength() < QApplication.startDragDistance():
            return False
        self._pressed = None
        drag = self.drag_of(key)
        if drag.exec(Qt.DropAction.CopyAction) == Qt.DropAction.IgnoreAction:
            self._hand.arm("")
        return True

    def drag_of(self, key: str) -> QDrag:
        """What is carried when an entry is dragged."""
        data = QMimeData()
        data.setData(MIME, QByteArray(key.encode()))
        drag = QDrag(self)
        drag.setMimeData(data)
        drag.setPixmap(glyph_icon(key, self.theme).pixmap(SIDE, SIDE))
        return drag
