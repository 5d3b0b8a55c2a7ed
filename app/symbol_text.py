"""Symbols and formulas set as in print: real subscripts, powers raised, true minus signs.

The core writes symbols as plain text: ``σ_b,a``, ``Kt,b``, ``σ_a'``, ``d^4``. Here they become
rich text for labels and pieces for a painter.
"""

import html
import re
from functools import lru_cache
from typing import Literal

from PySide6.QtCore import QPointF
from PySide6.QtGui import QFont, QFontMetricsF, QPainter

Level = Literal["on", "below", "above"]
SMALLER = 0.76
"""Size of a subscript beside its symbol."""

_PIECE = re.compile(
    r"(?<![^\W\d_])(?P<kay>K)(?P<kind>[tf]s?)(?P<sort>(?:[,_][a-z0-9]+)*)(?![^\W\d_])"  # Kt,b and Kfs
    r"|(?P<base>[^\W\d_]+)_(?P<under>[a-zA-Z0-9]+(?:,[a-zA-Z0-9]+)*)"  # σ_b,a
    r"|(?<!\w)(?P<letter>[A-Za-z])(?P<number>\d|,[a-z](?!\w))(?!\d)"  # C1 and T,a
    r"|\^(?P<power>[−-]?\w+(?:\.\d+)?)|\^\((?P<inner>[^()]*)\)"  # d^4 and x^(1/3)
)


@lru_cache(maxsize=2048)
def pieces(text: str) -> tuple[tuple[str, Level], ...]:
    """The text in runs, each on the line, below it or above it."""
    text = text.replace(" - ", " − ").replace("sqrt(", "√(").replace("'", "′")
    found: list[tuple[str, Level]] = []
    end = 0
    for match in _PIECE.finditer(text):
        found.append((text[end : match.start()], "on"))
        power = match["power"] or match["inner"]
        if power:
            found.append((power.replace("-", "−"), "above"))
        elif match["kay"]:
            found += [("K", "on"), (match["kind"] + match["sort"].replace("_", ","), "below")]
        elif match["letter"]:
            found += [(match["letter"], "on"), (match["number"].lstrip(","), "below")]
        else:
            found += [(match["base"], "on"), (match["under"], "below")]
        end = match.end()
    found.append((text[end:], "on"))
    return tuple((run, level) for run, level in found if run)


def rich(text: str) -> str:
    """The text as HTML."""
    tags = {"on": "{}", "below": "<sub>{}</sub>", "above": "<sup>{}</sup>"}
    return "".join(tags[level].format(html.escape(run)) for run, level in pieces(text))


def small(font: QFont) -> QFont:
    """The font of the subscripts that go with `font`."""
    lesser = QFont(font)
    lesser.setPointSizeF(font.pointSizeF() * SMALLER)
    return lesser


def width(text: str, font: QFont) -> float:
    """How many pixels the set text takes."""
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
