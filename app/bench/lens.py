"""The lens: one raiser enlarged in a framed inset, with its radius window and what seats there."""

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter, QPen, QPolygonF

from app import symbol_text
from app.bench.close_up import CloseUp, lens_frame
from app.bench.frame import Frame
from app.bench.lens_words import (
    ALLOWED,
    BEFORE,
    NEEDED,
    NOTE,
    NOW,
    RING,
    WITH_STROKE,
    Row,
    lens_rows,
    scale_words,
    words_width,
)
from app.bench.overlay import set_band_brush
from app.bench.polygons import draw_weighted, hairline, polygon, stroke
from app.theme import Theme, text_font
from shaftcore.notches._contract import Array
from shaftcore.units import System

POINTS, SWATCH, PADDING = 8.0, 16.0, 4.0
NOW_WEIGHT, BEYOND = 1.6, 20.0
GROWN, SHRUNK = 1.6, 0.3
"""How many times the size it was scaled for a raiser may become before the lens takes another scale."""


class Lens:
    """One raiser enlarged in one room. The picture keeps still until what it shows grows out of it."""

    def __init__(self, shown: CloseUp, room: QRectF, scale: float) -> None:
        self.room, self.shown = room, shown
        self.picture = QRectF(room.left(), room.top(), room.width() - words_width(shown), room.height())
        self._scale = scale
        self._found: tuple[Frame, float] | None = None
        self._outlines: dict[str, QPolygonF] = {}
        self._areas: dict[str, QPolygonF] = {}
        self._font = text_font(POINTS)
        self._line, self._ascent = (measure := QFontMetricsF(self._font)).height(), measure.ascent()
        self._scale_for(shown.size.value or 0.0)

    @property
    def useful(self) -> bool:
        """False where the bench itself shows as much."""
        return self._found is not None

    def paint(self, painter: QPainter, value: float, theme: Theme, system: System) -> None:
        """Draw a value of the size, and in a pale line the one it began with."""
        if not SHRUNK < value / self._scaled_for < GROWN:
            self._scale_for(value)
        if self._found is None:
            return
        frame, times = self._found
        painter.save()
        painter.fillRect(self.room, QColor(theme.raised))
        painter.setClipRect(self.picture)
        self._paint_picture(painter, frame, value, theme)
        self._write_scale(painter, scale_words(times), theme)
        painter.setClipping(False)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
        painter.setPen(hairline(theme.rule))
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.drawRect(self.room)
        painter.drawLine(QLineF(self.picture.topRight(), self.picture.bottomRight()))
        self._write(painter, lens_rows(self.shown, value, system), theme)
        painter.restore()

    def _scale_for(self, value: float) -> None:
        self._scaled_for = max(value, 1e-9)
        self._found = lens_frame(self.shown, value, self.picture, self._scale)
        if self._found is not None:
            self._set_up(self._found[0])

    def _set_up(self, frame: Frame) -> None:
        """What keeps still while the size changes, in pixels: lines, ring and band between the limits."""
        shown, before = self.shown, self.shown.size.value
        outlines = {
            RING: shown.ring,
            BEFORE: None if before is None else shown.outline(before),
            NEEDED: shown.needed,
            ALLOWED: shown.allowed,
        }
        points = {style: frame.points(outline) for style, outline in outlines.items() if outline is not None}
        self._outlines = {style: polygon(line) for style, line in points.items()}
        self._areas = {}
        if RING in points:
            ring = points[RING]
            self._areas[RING] = polygon(np.vstack([ring, [(ring[0, 0], ring[-1, 1])]]))
        if NEEDED in points and ALLOWED in points:
            self._areas[NEEDED] = polygon(np.vstack([points[NEEDED], points[ALLOWED][::-1]]))

    def _paint_picture(self, painter: QPainter, frame: Frame, value: float, theme: Theme) -> None:
        shown = self.shown
        painter.fillRect(self.picture, QColor(theme.paper))
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)  # each area has a line along its edge
        painter.setPen(Qt.PenStyle.NoPen)
        edge = self._cut(frame.points(shown.metal(value)))
        below = self.picture.bottom() + BEYOND
        painter.setBrush(QColor(theme.metal))
        painter.drawPolygon(polygon(np.vstack([edge, [(edge[-1, 0], below), (edge[0, 0], below)]])))
        if RING in self._areas:
            painter.setBrush(QColor(theme.panel))
            painter.drawPolygon(self._areas[RING])
        if NEEDED in self._areas and shown.window is not None:
            set_band_brush(painter, shown.window.empty, theme)
            painter.drawPolygon(self._areas[NEEDED])
            painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, True)
        for style, outline in self._outlines.items():
            if style != BEFORE or value != shown.size.value:
                painter.setPen(_pen(style, theme))
                painter.drawPolyline(outline)
        draw_weighted(painter, [polygon(edge)], theme.ink, NOW_WEIGHT)

    def _write_scale(self, painter: QPainter, words: str, theme: Theme) -> None:
        """In the upper corner of the picture that lies over the thinner side."""
        width = QFontMetricsF(self._font).horizontalAdvance(words) + 2 * PADDING
        around = self.shown.seating.around
        thin_left = around.left_diameter <= around.right_diameter
        left = self.picture.left() if thin_left else self.picture.right() - width
        tag = QRectF(left, self.picture.top(), width, self._line + 2)
        painter.fillRect(tag, QColor(theme.raised))
        painter.setPen(QColor(theme.ink))
        painter.setFont(self._font)
        painter.drawText(QPointF(tag.left() + PADDING, tag.top() + 1 + self._ascent), words)

    def _cut(self, points: Array) -> Array:
        """The line without what lies far outside the picture: long polygons cost."""
        left, right = self.picture.left() - BEYOND, self.picture.right() + BEYOND
        cut = points.copy()
        for end, inner, bound in ((0, 1, left), (-1, -2, right)):
            (x0, y0), (x1, y1) = points[end], points[inner]
            if (x0 < bound) == (end == 0) and x1 != x0:
                cut[end] = bound, y0 + (y1 - y0) * (bound - x0) / (x1 - x0)
        return np.asarray(np.clip(cut, -1e4, 1e4))

    def _write(self, painter: QPainter, rows: list[Row], theme: Theme) -> None:
        """Each line with the stroke it explains, as many as there is room for."""
        x, y = self.picture.right() + 2 * PADDING, self.room.top() + PADDING
        for style, text in rows:
            indent = SWATCH + 6 if style in WITH_STROKE else 0.0
            if y + self._line > self.room.bottom() - PADDING / 2:
                return
            if indent:
                painter.setPen(_pen(style, theme))
                middle = y + self._line / 2
                painter.drawLine(QLineF(x, middle, x + SWATCH, middle))
            painter.setPen(QColor(theme.caution if style == NOTE else theme.ink))
            symbol_text.draw(painter, QPointF(x + indent, y + self._ascent), text, self._font)
            y += self._line


def _pen(style: str, theme: Theme) -> QPen:
    colours = {NOW: theme.ink, NEEDED: theme.accent, ALLOWED: theme.accent, BEFORE: theme.faint, RING: theme.metal_edge}
    pen = stroke(colours[style], NOW_WEIGHT) if style == NOW else hairline(colours[style])
    if style in (NEEDED, BEFORE):
        pen.setDashPattern([5.0, 3.0] if style == NEEDED else [1.0, 3.0])
    return pen
