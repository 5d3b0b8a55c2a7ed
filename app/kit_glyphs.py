"""Small drawings for the kit's entries, in a square from (-1, -1) to (1, 1), y downwards.

Supports and loads have a glyph of their own; a raiser shows its own outline cut into a bar, so
that a new kind needs no drawing here.
"""

import math
from collections.abc import Callable
from dataclasses import MISSING, fields

import numpy as np
from PySide6.QtCore import QPointF, QRectF, QSize, Qt
from PySide6.QtGui import QColor, QIcon, QPainter, QPainterPath, QPen, QPixmap

from app.theme import Theme
from shaftcore.notches._contract import Around
from shaftcore.notches.kinds import KINDS

SIDE = 18
RATIOS = (1.0, 2.0, 3.0)
BAR = 6.0
"""Diameter (mm) of the bar that raisers are shown on: thin, so that their usual sizes are seen."""


def _line(*points: tuple[float, float]) -> QPainterPath:
    path = QPainterPath(QPointF(*points[0]))
    for point in points[1:]:
        path.lineTo(QPointF(*point))
    return path


def _arrow(start: tuple[float, float], end: tuple[float, float]) -> QPainterPath:
    path, turn = _line(start, end), math.atan2(end[1] - start[1], end[0] - start[0])
    for side in (2.6, -2.6):
        path.addPath(_line(end, (end[0] + 0.5 * math.cos(turn + side), end[1] + 0.5 * math.sin(turn + side))))
    return path


def _draw() -> QPainterPath:
    path = _line((-0.9, -0.35), (-0.2, -0.35), (-0.2, -0.7), (0.6, -0.7), (0.6, 0.7), (-0.2, 0.7), (-0.2, 0.35))
    path.addPath(_line((-0.2, 0.35), (-0.9, 0.35), (-0.9, -0.35)))
    path.addPath(_line((0.6, 0.0), (0.95, 0.0)))
    return path


def _support() -> QPainterPath:
    path = _line((-0.95, -0.5), (0.95, -0.5))
    path.addRect(QRectF(-0.5, -0.3, 1.0, 0.8))
    path.addPath(_line((-0.2, 0.1), (0.2, 0.1)))
    path.addPath(_line((0.0, -0.1), (0.0, 0.3)))
    path.addPath(_line((-0.7, 0.75), (0.7, 0.75)))
    return path


def _radial() -> QPainterPath:
    path = _arrow((0.0, -0.9), (0.0, 0.35))
    path.addPath(_line((-0.9, 0.45), (0.9, 0.45)))
    return path


def _torque() -> QPainterPath:
    path = QPainterPath()
    path.arcMoveTo(QRectF(-0.45, -0.8, 0.9, 1.6), 100)
    path.arcTo(QRectF(-0.45, -0.8, 0.9, 1.6), 100, -200)
    path.addPath(_arrow((0.1, 0.78), (-0.2, 0.8)))
    path.addPath(_line((-0.95, 0.0), (0.95, 0.0)))
    return path


def _axial() -> QPainterPath:
    path = _arrow((-0.9, 0.0), (0.75, 0.0))
    path.addPath(_line((0.85, -0.6), (0.85, 0.6)))
    return path


_OWN: dict[str, Callable[[], QPainterPath]] = {
    "draw": _draw,
    "support": _support,
    "radial force": _radial,
    "torque": _torque,
    "axial force": _axial,
}


def glyph_path(key: str) -> QPainterPath:
    """The glyph of a kit entry; for a raiser the outline its kind declares."""
    return _OWN[key]() if key in _OWN else _raiser(key)


def _raiser(key: str) -> QPainterPath:
    """Upper and lower outline of a bar with the raiser in its middle, seen closely."""
    kind = KINDS[key]
    step = kind.goes == "at a step"
    around = Around(0.0, 0.6 * BAR if step else BAR, BAR, 0.0, 0.0, "ground", "ground")
    # a size that every user must give himself has no usual one: 1 mm does for the picture
    asked = {field.name: 1.0 for field in fields(kind.record) if field.default is MISSING}
    points = kind.outline(kind.record(**asked), around) / (0.75 * BAR)
    ends = np.array([[-0.95, points[0][1]], [0.95, points[-1][1]]])
    whole = np.vstack([ends[:1], points, ends[1:]])
    path = _line(*((float(x), float(-y)) for x, y in whole))
    path.addPath(_line(*((float(x), float(y)) for x, y in whole)))
    return path


def glyph_icon(key: str, theme: Theme) -> QIcon:
    """The glyph in ink and, while its entry is in hand, in accent."""
    icon = QIcon()
    states = ((theme.ink, QIcon.Mode.Normal, QIcon.State.Off), (theme.accent, QIcon.Mode.Normal, QIcon.State.On))
    for colour, mode, state in states:
        for ratio in RATIOS:
            icon.addPixmap(_pixmap(key, colour, ratio), mode, state)
    return icon


def _pixmap(key: str, colour: str, ratio: float) -> QPixmap:
    made = QPixmap(QSize(round(SIDE * ratio), round(SIDE * ratio)))
    made.fill(Qt.GlobalColor.transparent)
    made.setDevicePixelRatio(ratio)
    painter = QPainter(made)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.translate(SIDE / 2, SIDE / 2)
    painter.scale(SIDE / 2 - 1, SIDE / 2 - 1)
    pen = QPen(QColor(colour), 1.3)
    pen.setCosmetic(True)
    pen.setWidthF(1.3 * ratio)
    painter.setPen(pen)
    painter.drawPath(glyph_path(key))
    painter.end()
    return made
