"""What lies over the charts: the chosen station, the hairline, and the label that says where it is."""

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter, QPen

from app.ruler import LEFT_MARGIN, RIGHT_MARGIN
from app.traces.heads import key_font
from app.traces.live import to_pixels
from app.traces.plots import Frame
from app.traces.tracks import Curve
from shaftcore.number_text import with_unit

RING = 5.5
LABEL_ROOM, LABEL_HEIGHT = 6.0, 19.0


def paint_hairline(painter: QPainter, frame: Frame, px: float, chosen: bool) -> None:
    """A line through all plots; broken and in the accent for the chosen station."""
    theme = frame.view.theme
    pen = QPen(QColor(theme.accent if chosen else theme.faint), 0)
    if chosen:
        pen.setDashPattern([4.0 * frame.view.ratio, 3.0 * frame.view.ratio])
    painter.setPen(pen)
    px = round(px) + 0.5 / frame.view.ratio
    for plot in frame.plots:
        painter.drawLine(QPointF(px, plot.band.plot_top), QPointF(px, plot.band.plot_bottom))


def paint_second_scale(painter: QPainter, frame: Frame, index: int) -> None:
    """Numbers of a track's second scale, inside its right edge, in the ink of its line and over all lines."""
    numbers, plot = frame.second[index], frame.plots[index]
    if not numbers:
        return
    ink = next((c.line.ink for c in plot.curves if c.line.dimension == plot.scales[1].dimension), 0)
    metrics, right = QFontMetricsF(key_font()), frame.view.width - RIGHT_MARGIN
    painter.setFont(key_font())
    painter.setPen(QColor(frame.view.theme.traces[ink]))
    for y, words in numbers:
        wide = metrics.horizontalAdvance(words) + 4
        box = QRectF(round(right - wide), round(y - 6), wide, 12)
        painter.fillRect(box, QColor(frame.view.theme.paper))
        painter.drawText(box, Qt.AlignmentFlag.AlignCenter, words)


def paint_rings(painter: QPainter, frame: Frame, curves: list[tuple[Curve, ...]], station: int) -> None:
    """A ring round every mark of the chosen station."""
    painter.save()
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.setPen(QPen(QColor(frame.view.theme.accent), 1.4))
    for plot, of_track, mappings in zip(frame.plots, curves, frame.mappings, strict=True):
        for curve in of_track:
            if station < curve.mark_x.size:
                index = plot.scale_of(curve)
                y = plot.scales[index].pinned(curve.mark_y[station : station + 1])
                px, py = to_pixels(mappings[index], curve.mark_x[station : station + 1], y)
                painter.drawEllipse(QPointF(float(px[0]), float(py[0])), RING, RING)
    painter.restore()


def place_words(frame: Frame, place: float, number: int | None) -> str:
    words = f"x {with_unit(place, 'length', frame.view.system)}"
    return words if number is None else f"station {number} · {words}"


def paint_place(painter: QPainter, frame: Frame, px: float, words: str) -> None:
    """A small label at the foot, under the hairline, over the numbers of the axis."""
    view = frame.view
    wide = QFontMetricsF(key_font()).horizontalAdvance(words) + 2 * LABEL_ROOM
    left = min(max(px - wide / 2, LEFT_MARGIN), view.width - RIGHT_MARGIN - wide)
    box = QRectF(round(left), frame.plots[-1].band.plot_bottom + 2, round(wide), LABEL_HEIGHT)
    painter.setFont(key_font())
    painter.fillRect(box, QColor(view.theme.accent_soft))
    painter.setPen(QColor(view.theme.ink))
    painter.drawText(box, Qt.AlignmentFlag.AlignCenter, words)


def paint_focus(painter: QPainter, frame: Frame, current: int) -> None:
    """A bar at the left of the track that the keys act on."""
    if current < len(frame.plots):
        band = frame.plots[current].band
        painter.fillRect(QRectF(3, band.top + 4, 3, band.plot_top - band.top - 8), QColor(frame.view.theme.accent))
