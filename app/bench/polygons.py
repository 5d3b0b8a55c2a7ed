"""Arrays of points to Qt's polygons, and lines of a weight drawn the quick way."""

from functools import lru_cache

import numpy as np
from PySide6.QtCore import QPointF, Qt
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


def hairline(colour: str) -> QPen:
    """The thinnest line there is; Qt draws it some twenty times as fast as a wide smooth one."""
    return QPen(_pen(colour, 0.0))


def stroke(colour: str, weight: float) -> QPen:
    """A pen of a true width, for short lines."""
    return QPen(_pen(colour, weight))


@lru_cache(maxsize=64)
def _pen(colour: str, weight: float) -> QPen:
    pen = QPen(QColor(colour), weight)
    pen.setCapStyle(Qt.PenCapStyle.FlatCap)
    pen.setJoinStyle(Qt.PenJoinStyle.MiterJoin)
    return pen


def chain_line(colour: str) -> QPen:
    """The fine dash-dot line of an axis."""
    pen = hairline(colour)
    pen.setDashPattern([14.0, 4.0, 3.0, 4.0])
    return pen


def draw_weighted(painter: QPainter, lines: list[QPolygonF], colour: str, weight: float) -> None:
    """Long smooth lines about `weight` pixels wide, as hairlines side by side.

    The hairlines lie a device pixel apart down one diagonal, so a weight holds at every scale
    factor; where there are several, one more keeps strokes along that diagonal from being thin.
    """
    painter.setPen(hairline(colour))
    pixel = 1.0 / painter.device().devicePixelRatio()
    steps = max(round(weight / pixel), 1)
    reach = (steps - 1) / 2 * pixel
    offsets = [QPointF(at, at) for at in np.linspace(-reach, reach, steps)]
    if steps > 2:
        offsets.append(QPointF(reach, -reach))
    for offset in offsets:
        painter.translate(offset)
        for line in lines:
            painter.drawPolyline(line)
        painter.translate(-offset)
