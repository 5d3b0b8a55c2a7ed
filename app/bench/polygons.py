"""Arrays of points to Qt's polygons, and lines of a weight drawn the quick way."""

import numpy as np
from PySide6.QtCore import QPointF
from PySide6.QtGui import QColor, QPainter, QPen, QPolygonF
from shiboken6 import VoidPtr

from shaftcore.notches._contract import Array


def polygon(points: Array) -> QPolygonF:
    """A polygon of points (n, 2) in pixels, copied in one go."""
    made = QPolygonF()
    made.resize(len(points))
    if len(points):
        room = VoidPtr(made.data(), 16 * len(points), True)  # type: ignore[call-arg,arg-type]
        np.frombuffer(room, dtype=float)[:] = np.ascontiguousarray(points, dtype=float).ravel()  # type: ignore[call-overload]
    return made


def hairline(colour: str | QColor) -> QPen:
    """The thinnest line there is; Qt draws it some twenty times as fast as a wide smooth one."""
    pen = QPen(QColor(colour))
    pen.setWidth(0)
    return pen


def draw_weighted(painter: QPainter, lines: list[QPolygonF], colour: str | QColor, weight: float) -> None:
    """Smooth lines about `weight` pixels wide, as hairlines side by side.

    The hairlines lie a device pixel apart, so a weight holds at every scale factor.
    """
    painter.setPen(hairline(colour))
    pixel = 1.0 / painter.device().devicePixelRatio()
    steps = max(round(weight / pixel), 1)
    offsets = [(i - (steps - 1) / 2) * pixel for i in range(steps)]
    for way in (QPointF(1, 0), QPointF(0, 1)) if steps > 1 else (QPointF(1, 0),):
        for offset in offsets:
            painter.translate(way * offset)
            for line in lines:
                painter.drawPolyline(line)
            painter.translate(way * -offset)
