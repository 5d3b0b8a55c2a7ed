"""The program's icon, drawn here: a fillet's arc between two surfaces."""

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QIcon, QPainter, QPainterPath, QPen, QPixmap

from app.theme import LIGHT

SIZES = (16, 24, 32, 48, 64, 128, 256)


def _picture(size: int) -> QPixmap:
    picture = QPixmap(size, size)
    picture.fill(Qt.GlobalColor.transparent)
    painter = QPainter(picture)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.scale(size / 64, size / 64)
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(LIGHT.accent))
    painter.drawRoundedRect(QRectF(2, 2, 60, 60), 13, 13)
    line = QPainterPath(QPointF(10, 48))
    line.lineTo(22, 48)
    line.arcTo(QRectF(-2, 0, 48, 48), 270, 90)
    line.lineTo(46, 14)
    painter.setBrush(Qt.BrushStyle.NoBrush)
    painter.setPen(QPen(QColor(LIGHT.paper), 6, Qt.PenStyle.SolidLine, Qt.PenCapStyle.RoundCap))
    painter.drawPath(line)
    painter.end()
    return picture


def program_icon() -> QIcon:
    icon = QIcon()
    for size in SIZES:
        icon.addPixmap(_picture(size))
    return icon
