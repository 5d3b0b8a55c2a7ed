"""How the panels are set: spacing, and the few colours that a palette has no role for."""

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QLabel, QScrollArea, QVBoxLayout, QWidget

from app.theme import Theme, text_font

EDGE = 12
"""Pixels free at a panel's edge."""
GAP = 6
SMALL_POINTS = 8.5


def panel_style(theme: Theme) -> str:
    """Rules for labels by their part in a panel, and a flat background."""
    return f"""
        QLabel#quiet {{ color: {theme.faint}; }}
        QLabel#problem {{ color: {theme.caution}; }}
        QLabel#heading {{ color: {theme.ink}; font-weight: bold; }}
        QScrollArea, QScrollArea > QWidget > QWidget {{ background: {theme.panel}; border: none; }}
    """


def quiet(text: str, points: float = SMALL_POINTS) -> QLabel:
    """A small faint line of explanation that wraps."""
    label = QLabel(text)
    label.setObjectName("quiet")
    label.setFont(text_font(points))
    label.setWordWrap(True)
    return label


def heading(text: str, parent: QWidget | None = None) -> QLabel:
    label = QLabel(text, parent)
    label.setObjectName("heading")
    return label


def scrolled_column(panel: QWidget) -> QVBoxLayout:
    """A column that fills the panel and scrolls upwards and down where it is too long for it."""
    inside, scroll = QWidget(), QScrollArea()
    column = QVBoxLayout(inside)
    column.setContentsMargins(EDGE, EDGE, EDGE, EDGE)
    column.setSpacing(GAP)
    scroll.setWidget(inside)
    scroll.setWidgetResizable(True)
    scroll.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
    scroll.setFocusPolicy(Qt.FocusPolicy.NoFocus)
    whole = QVBoxLayout(panel)
    whole.setContentsMargins(0, 0, 0, 0)
    whole.addWidget(scroll)
    return column
