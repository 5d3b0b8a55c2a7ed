"""A part of the right-hand column that opens and closes under its own heading."""

from PySide6.QtCore import Qt, Signal
from PySide6.QtWidgets import QSizePolicy, QToolButton, QVBoxLayout, QWidget

from app.error_messages import guarded


class Fold(QWidget):
    """Heading and content; closed, only the heading takes space."""

    folded = Signal(bool)

    def __init__(self, title: str, content: QWidget, opened: bool = True) -> None:
        super().__init__()
        self.title, self.content = title, content
        self.head = QToolButton()
        self.head.setObjectName("foldHead")
        self.head.setCheckable(True)
        self.head.setToolButtonStyle(Qt.ToolButtonStyle.ToolButtonTextBesideIcon)
        self.head.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Fixed)
        self.head.setAccessibleName(f"{title}: open or close")
        layout = QVBoxLayout(self)
        layout.setContentsMargins(0, 0, 0, 0)
        layout.setSpacing(0)
        layout.addWidget(self.head)
        layout.addWidget(content, 1)
        self.head.toggled.connect(self._toggled)
        self.head.setChecked(opened)
        self._toggled(opened)

    @property
    def opened(self) -> bool:
        return self.head.isChecked()

    def set_opened(self, opened: bool) -> None:
        self.head.setChecked(opened)

    def set_title(self, title: str) -> None:
        """Another heading, a count for instance."""
        self.head.setText(title)

    @guarded
    def _toggled(self, opened: bool) -> None:
        self.content.setVisible(opened)
        self.head.setArrowType(Qt.ArrowType.DownArrow if opened else Qt.ArrowType.RightArrow)
        self.head.setText(self.head.text() or self.title)
        self.setMaximumHeight(16777215 if opened else self.head.sizeHint().height())
        self.folded.emit(opened)
