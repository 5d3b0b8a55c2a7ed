"""Symbols set by Qt: real subscripts, powers raised, for labels and for a painter."""

from functools import lru_cache

from PySide6.QtCore import QPointF
from PySide6.QtGui import QFont, QFontMetricsF, QPainter

from shaftcore.lettering import Level, marked_up, pieces

SMALLER = 0.76
"""Size of a subscript beside its symbol."""

TAGS: dict[Level, str] = {"on": "{}", "below": "<sub>{}</sub>", "above": "<sup>{}</sup>"}


def rich(text: str) -> str:
    """The text as HTML."""
    return marked_up(text, TAGS)


def small(font: QFont) -> QFont:
    """The font of the subscripts that go with `font`."""
    lesser = QFont(font)
    lesser.setPointSizeF(font.pointSizeF() * SMALLER)
    return lesser


def width(text: str, font: QFont) -> float:
    """How many pixels the set text takes."""
    return _width(text, font.toString())


def plain_width(text: str, font: QFont) -> float:
    """How many pixels the text takes as it stands, without subscripts."""
    return _plain_width(text, font.toString())


@lru_cache(maxsize=4096)
def _plain_width(text: str, described: str) -> float:
    font = QFont()
    font.fromString(described)
    return QFontMetricsF(font).horizontalAdvance(text)


@lru_cache(maxsize=4096)
def _width(text: str, described: str) -> float:
    """Remembered, since the same words are measured at every move of a drag."""
    font = QFont()
    font.fromString(described)
    on, off = QFontMetricsF(font), QFontMetricsF(small(font))
    return sum((on if level == "on" else off).horizontalAdvance(run) for run, level in pieces(text))


def draw(painter: QPainter, at: QPointF, text: str, font: QFont) -> None:
    """Draw the set text with its base line beginning at `at`."""
    x, lesser, shift = at.x(), small(font), QFontMetricsF(font).xHeight()
    for run, level in pieces(text):
        using = font if level == "on" else lesser
        painter.setFont(using)
        drop = {"on": 0.0, "below": 0.35 * shift, "above": -0.7 * shift}[level]
        painter.drawText(QPointF(x, at.y() + drop), run)
        x += QFontMetricsF(using).horizontalAdvance(run)
