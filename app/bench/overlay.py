"""What the hand draws over the bench: grips, the radius window, and a thing about to be placed."""

import numpy as np
from PySide6.QtCore import QPointF, Qt
from PySide6.QtGui import QBrush, QColor, QPainter, QPen, QPixmap

from app.bench.frame import Frame
from app.bench.hits import Grip
from app.bench.polygons import hairline, polygon
from app.bench.sizes import Size, at_step
from app.theme import Theme
from shaftcore.notch_sites import Seating, seatings
from shaftcore.notches._contract import Array
from shaftcore.outline import outline_with
from shaftcore.radius_window import RadiusWindow, radius_window
from shaftcore.results import Results
from shaftcore.shaft import Shaft

GRIP_PX = 7.0
BAND_ALPHA = 90
LEAST_RADIUS = 1e-3


class GripStamps:
    """The one neutral shape of all grips, drawn once for each theme and pixel ratio."""

    def __init__(self) -> None:
        self._made: dict[tuple[str, float, bool], QPixmap] = {}

    def draw(self, painter: QPainter, grips: tuple[Grip, ...], hovered: Grip | None, theme: Theme) -> None:
        """Stamp the points; of a hovered line, its middle."""
        ratio = painter.device().devicePixelRatio()
        for grip in grips:
            if not grip.is_line:
                self._stamp(painter, grip.x, grip.y, theme, ratio, grip == hovered)
        if hovered is not None and hovered.x2 is not None and hovered.y2 is not None:
            painter.setPen(hairline(theme.accent))
            painter.drawLine(QPointF(hovered.x, hovered.y), QPointF(hovered.x2, hovered.y2))
            middle = ((hovered.x + hovered.x2) / 2, (hovered.y + hovered.y2) / 2)
            self._stamp(painter, *middle, theme, ratio, True)

    def _stamp(self, painter: QPainter, x: float, y: float, theme: Theme, ratio: float, hovered: bool) -> None:
        key = (theme.name, ratio, hovered)
        stamp = self._made.get(key) or self._made.setdefault(key, _grip_pixmap(theme, ratio, hovered))
        half = stamp.width() / ratio / 2
        painter.drawPixmap(QPointF(x - half, y - half), stamp)


def _grip_pixmap(theme: Theme, ratio: float, hovered: bool) -> QPixmap:
    side = GRIP_PX + (6.0 if hovered else 2.0)
    made = QPixmap(round(side * ratio), round(side * ratio))
    made.setDevicePixelRatio(ratio)
    made.fill(Qt.GlobalColor.transparent)
    painter = QPainter(made)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.setPen(QPen(QColor(theme.accent if hovered else theme.metal_edge), 1.2))
    painter.setBrush(QColor(theme.accent_soft if hovered else theme.raised))
    radius = GRIP_PX / 2 + (1.5 if hovered else -0.5)
    painter.drawEllipse(QPointF(side / 2, side / 2), radius, radius)
    painter.end()
    return made


def seating_of(shaft: Shaft, size: Size) -> Seating | None:
    """The raiser a size belongs to, as it sits on the shaft."""
    return next((s for s in seatings(shaft) if (s.kind.key, s.place) == size.chosen), None)


def window_of(results: Results | None, size: Size) -> RadiusWindow | None:
    """The radius window of a fillet, None for any other size; it does not hang on the radius."""
    if results is None or not at_step(size.chosen) or size.sort != "radius":
        return None
    return radius_window(results, size.chosen[1])


def window_band(shaft: Shaft, size: Size, window: RadiusWindow) -> Array | None:
    """The ring (n, 2) in mm between the needed and the allowed outline; None where no radius is enough."""
    seating = seating_of(shaft, size)
    if window.needed is None or seating is None:
        return None
    edges = [outline_with(seating, size.name, max(r, LEAST_RADIUS)) for r in (window.needed, window.allowed)]
    return np.vstack([edges[0], edges[1][::-1]])


def set_band_brush(painter: QPainter, empty: bool, theme: Theme) -> None:
    """The look of a radius window: translucent, hatched where nothing lies between its ends."""
    colour = QColor(theme.caution if empty else theme.accent)
    painter.setPen(hairline(theme.caution if empty else theme.accent))
    colour.setAlpha(BAND_ALPHA)
    painter.setBrush(QBrush(colour, Qt.BrushStyle.BDiagPattern) if empty else QBrush(colour))


def draw_band(painter: QPainter, frame: Frame, band: Array, empty: bool, theme: Theme) -> None:
    """The radius window on both outlines."""
    set_band_brush(painter, empty, theme)
    for mirrored in (False, True):
        painter.drawPolygon(polygon(frame.points(band, mirrored)))
    painter.setBrush(Qt.BrushStyle.NoBrush)


def draw_ghost(painter: QPainter, frame: Frame, x: float, theme: Theme) -> None:
    """A thing about to be placed: a fine line across the shaft."""
    at = frame.x(x)
    pen = hairline(theme.accent)
    pen.setStyle(Qt.PenStyle.DashLine)
    painter.setPen(pen)
    painter.drawLine(QPointF(at, 8), QPointF(at, frame.height - 8))
