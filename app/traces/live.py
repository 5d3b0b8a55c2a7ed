"""The quick painting of a drag: lines and marks over a still frame, by the axes' own mappings.

Thin cosmetic pens are what is quick; a strong line is drawn as several of them side by side.
"""

import math
from collections.abc import Sequence
from typing import Any

import numpy as np
import shiboken6
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QPainter, QPen, QPixmap, QPolygonF

from app.ruler import LEFT_MARGIN, RIGHT_MARGIN
from app.theme import Theme
from app.traces.bands import Band
from app.traces.limits import Scale
from app.traces.plots import MARK_SIZE, Frame, Mapping
from app.traces.tracks import Curve
from shaftcore.notches._contract import Array

FAR_OUT = 20_000.0
"""Pixels beyond which a coordinate is cut, far outside any screen."""
WIDEST_GAP = 1.2
"""Pixels of the screen between the thin lines of a strong one that the eye does not part."""
PALE = 0.38
"""Share of its ink that a ghost keeps."""


class Polyline:
    """Points for the painter, in one lasting buffer: no point is made as an object of its own."""

    def __init__(self) -> None:
        self.polygon = QPolygonF()
        self._points: Array = np.empty((0, 2))

    def fill(self, x: Array, y: Array) -> QPolygonF:
        """Pixels as a polygon; what the buffer has too much repeats the last point."""
        count = len(x)
        if count > len(self._points):
            self._provide(count + count // 4)
        points = self._points
        points[:count, 0], points[:count, 1] = x, y
        points[count:] = points[count - 1] if count else 0.0
        return self.polygon

    def _provide(self, room: int) -> None:
        self.polygon = QPolygonF([QPointF()] * room)
        first = shiboken6.getCppPointer(self.polygon.data())[0]
        memory_at: Any = shiboken6.VoidPtr  # its stubs know one argument only
        self._points = np.frombuffer(memory_at(first, room * 16, True), dtype=np.float64).reshape(room, 2)


class LivePainter:
    """Paints tracks over a frame; keeps its buffers and stamps from one step of the drag to the next."""

    def __init__(self) -> None:
        self._polyline = Polyline()
        self._stamps: dict[tuple[str, str, bool, float], QPixmap] = {}

    def paint(self, painter: QPainter, frame: Frame, index: int, curves: Sequence[Curve], pale: bool = False) -> None:
        """All curves of track `index`; `pale` is for the design as it was before."""
        plot, view = frame.plots[index], frame.view
        painter.save()
        painter.setClipRect(plot_rect(plot.band, view.width), Qt.ClipOperation.IntersectClip)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        for curve in curves:
            scale = plot.scale_of(curve)
            ink = _ink(view.theme, curve, pale)
            self._line(painter, curve, frame.mappings[index][scale], ink, view.ratio)
        painter.restore()
        for curve in curves:
            if curve.mark_x.size:
                scale = plot.scale_of(curve)
                mapping = frame.mappings[index][scale]
                self._marks(painter, curve, mapping, plot.scales[scale], _ink(view.theme, curve, pale), frame)

    def _line(self, painter: QPainter, curve: Curve, mapping: Mapping, ink: QColor, ratio: float) -> None:
        x, y = to_pixels(mapping, curve.x, curve.y)
        # cosmetic pens count in pixels of the screen
        pen = QPen(ink, 0)
        if curve.line.dash:
            pen.setDashPattern([step * ratio for step in curve.line.dash])
        painter.setPen(pen)
        for right, down in strands(curve.line.weight * ratio):
            painter.drawPolyline(self._polyline.fill(x + right / ratio, y + down / ratio))

    def _marks(
        self, painter: QPainter, curve: Curve, mapping: Mapping, scale: Scale, ink: QColor, frame: Frame
    ) -> None:
        capped = scale.pinned(curve.mark_y)
        x, y = to_pixels(mapping, curve.mark_x, capped)
        over = capped < curve.mark_y
        seen = (x >= LEFT_MARGIN - 1) & (x <= frame.view.width - RIGHT_MARGIN + 1)
        paper = frame.view.theme.paper if curve.line.dash else ink.name()
        half = STAMP / 2
        for chosen, upward in ((seen & ~over, False), (seen & over, True)):
            stamp = self._stamp(ink.name(), paper, upward, frame.view.ratio)
            for left, top in zip((x[chosen] - half).tolist(), (y[chosen] - half).tolist(), strict=True):
                painter.drawPixmap(QPointF(left, top), stamp)

    def _stamp(self, ink: str, paper: str, upward: bool, ratio: float) -> QPixmap:
        key = (ink, paper, upward, ratio)
        if key not in self._stamps:
            self._stamps[key] = _draw_stamp(*key)
        return self._stamps[key]


STAMP = MARK_SIZE + 3.0


def _draw_stamp(ink: str, paper: str, upward: bool, ratio: float) -> QPixmap:
    """A small mark: a disc, or a triangle pointing beyond the end of the axis."""
    side = round(STAMP * ratio)
    pixmap = QPixmap(side, side)
    pixmap.setDevicePixelRatio(ratio)
    pixmap.fill(Qt.GlobalColor.transparent)
    painter = QPainter(pixmap)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.setPen(QPen(QColor(ink), 1.0))
    painter.setBrush(QColor(paper))
    box = QRectF((STAMP - MARK_SIZE) / 2, (STAMP - MARK_SIZE) / 2, MARK_SIZE, MARK_SIZE)
    if upward:
        painter.drawPolygon(QPolygonF([box.bottomLeft(), QPointF(box.center().x(), box.top()), box.bottomRight()]))
    else:
        painter.drawEllipse(box)
    painter.end()
    return pixmap


def strands(width: float) -> tuple[tuple[float, float], ...]:
    """Where the thin lines lie that make a line of `width`, right and down, all in pixels of the screen.

    A pair will do for a line of up to two pixels; more than that is as wide in every direction.
    """
    spare = (width - 1) / 2
    if spare < 0.15:
        return ((0.0, 0.0),)
    if spare <= 0.5:
        return ((-spare, -spare), (spare, spare))
    rings = [spare * step / math.ceil(spare / WIDEST_GAP) for step in range(1, math.ceil(spare / WIDEST_GAP) + 1)]
    return tuple(place for r in rings for place in ((-r, 0.0), (r, 0.0), (0.0, -r), (0.0, r)))


def to_pixels(mapping: Mapping, x: Array, y: Array) -> tuple[Array, Array]:
    """Logical pixels of points given in mm and the vertical unit."""
    down = np.clip(mapping.y0 + y * mapping.ky, -FAR_OUT, FAR_OUT)
    return np.clip(mapping.x0 + x * mapping.kx, -FAR_OUT, FAR_OUT), down


def plot_rect(band: Band, width: float) -> QRectF:
    return QRectF(LEFT_MARGIN, band.plot_top, width - LEFT_MARGIN - RIGHT_MARGIN, band.height)


def _ink(theme: Theme, curve: Curve, pale: bool) -> QColor:
    """The line's colour; a pale one is mixed with the paper, so that nothing need be see-through."""
    ink = QColor(theme.traces[curve.line.ink])
    if not pale:
        return ink
    paper = QColor(theme.paper)
    pairs = ((ink.red(), paper.red()), (ink.green(), paper.green()), (ink.blue(), paper.blue()))
    return QColor(*(round(PALE * a + (1 - PALE) * b) for a, b in pairs))


def changed_tracks(before: Sequence[Sequence[Curve]], now: Sequence[Sequence[Curve]]) -> list[int] | None:
    """Indices of the tracks whose picture is no longer the one painted last; None for all."""
    if len(before) != len(now):
        return None
    return [
        i
        for i, (old, new) in enumerate(zip(before, now, strict=True))
        if len(old) != len(new) or not all(a.same_as(b) for a, b in zip(old, new, strict=True))
    ]
