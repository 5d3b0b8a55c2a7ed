"""Dimensions of the chosen segment, and the sizes of a chosen raiser, as a drawing gives them."""

from typing import Any

from PySide6.QtCore import QLineF, QPointF, QRectF
from PySide6.QtGui import QColor, QPainter, QPolygonF

from app.bench.polygons import hairline
from app.bench.stage import Stage, Type
from app.bench.words import quantity
from shaftcore.declared import Quantity, declared
from shaftcore.notch_sites import Seating
from shaftcore.shaft import Segment

ABOVE_FOOT = 9.0
ARROW = 6.0
ROOM_FOR_DIAMETER = (74.0, 40.0)


def chosen_segment(stage: Stage) -> int | None:
    """Index of the chosen segment, None where something else or nothing is chosen."""
    return next(
        (i for i, s in enumerate(stage.shaft.segments) if stage.chosen(s.id, ("segment", "plain"))),
        None,
    )


def chosen_raiser(stage: Stage) -> Seating | None:
    return next((s for s in stage.plan.seated if stage.chosen(s.place, (s.kind.key,))), None)


def raiser_words(stage: Stage, seating: Seating) -> list[str]:
    """Every size of the raiser in the order it is declared; a symbol with a subscript is said in words."""
    record: Any = seating.record
    return [
        f"{_name(declaration)} {quantity(getattr(record, name), declaration.dimension_name, stage.scene.system)}"
        for name, declaration in declared(record).items()
        if isinstance(declaration, Quantity) and name != "x" and getattr(record, name) is not None
    ]


def _name(declaration: Quantity) -> str:
    return declaration.symbol if declaration.symbol.isalpha() else declaration.label.lower()


def raiser_anchor(stage: Stage, seating: Seating) -> QPointF:
    """Where the words of a raiser point: the upper edge of the shaft above it."""
    return stage.frame.to_screen(seating.around.x, stage.plan.radius_at(seating.around.x))


def segment_rooms(stage: Stage, index: int) -> list[QRectF]:
    """What the length dimension takes: its strip just above the foot and both extension lines."""
    begin, end = (stage.frame.x(x) for x in stage.plan.faces[index : index + 2])
    axis, top = stage.frame.axis, stage.foot - ABOVE_FOOT - 14
    strip = QRectF(begin - 4, top, end - begin + 8, 14 + ABOVE_FOOT)
    return [strip, *(QRectF(x - 1, axis, 2, top - axis) for x in (begin, end))]


def draw_segment_dimensions(painter: QPainter, stage: Stage, letters: Type, index: int) -> None:
    """Length below the shaft; diameter across it where there is room, else beside the length."""
    segment, frame = stage.shaft.segments[index], stage.frame
    begin, end = (frame.x(x) for x in stage.plan.profile.faces[index : index + 2])
    tall = min(segment.diameter, segment.right_diameter) * frame.scale
    across = end - begin >= ROOM_FOR_DIAMETER[0] and tall >= ROOM_FOR_DIAMETER[1]
    words = [quantity(segment.length, "length", stage.scene.system)]
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, True)
    painter.setPen(hairline(stage.theme.accent))
    painter.setBrush(QColor(stage.theme.accent))
    if across:
        _draw_diameter(painter, stage, letters, index)
    else:
        words.insert(0, _diameter_words(segment, stage))
    y = stage.foot - ABOVE_FOOT
    for x, d in ((begin, segment.diameter), (end, segment.right_diameter)):
        painter.drawLine(QLineF(x, frame.y(-d / 2) + 3, x, y + 3))
    _draw_line(painter, QPointF(begin, y), QPointF(end, y))
    text = " × ".join(words)
    width = letters.width(text, True)
    left = min(max((begin + end - width) / 2, 4.0), frame.width - width - 4.0)
    _draw_text(painter, stage, letters, QPointF(left, y - 4), text, stage.theme.paper)


def _draw_diameter(painter: QPainter, stage: Stage, letters: Type, index: int) -> None:
    frame, segment = stage.frame, stage.shaft.segments[index]
    begin, end = stage.plan.profile.faces[index : index + 2]
    middle = begin + 0.3 * (end - begin)
    radius = (segment.diameter + 0.3 * (segment.right_diameter - segment.diameter)) / 2
    x = frame.x(middle)
    _draw_line(painter, QPointF(x, frame.y(radius)), QPointF(x, frame.y(-radius)))
    text = _diameter_words(segment, stage)
    at = QPointF(x + 5, frame.axis - 0.4 * radius * frame.scale)
    _draw_text(painter, stage, letters, at, text, stage.theme.metal)


def _diameter_words(segment: Segment, stage: Stage) -> str:
    ends = [segment.diameter] if segment.end_diameter is None else [segment.diameter, segment.end_diameter]
    return "⌀ " + " to ".join(quantity(d, "length", stage.scene.system) for d in ends)


def _draw_line(painter: QPainter, a: QPointF, b: QPointF) -> None:
    """A dimension line with filled heads at both ends."""
    line = QLineF(a, b)
    painter.drawLine(line)
    if line.length() < 2.5 * ARROW:
        return
    way = QPointF(line.dx(), line.dy()) / line.length()
    across = QPointF(-way.y(), way.x()) * 2.2
    for tip, along in ((a, way), (b, way * -1)):
        painter.drawPolygon(QPolygonF([tip, tip + along * ARROW + across, tip + along * ARROW - across]))


def _draw_text(painter: QPainter, stage: Stage, letters: Type, at: QPointF, text: str, ground: str) -> None:
    room = QRectF(at.x() - 2, at.y() - letters.ascent, letters.width(text, True) + 4, letters.line)
    painter.fillRect(room, QColor(ground))
    painter.setFont(letters.bold)
    painter.drawText(at, text)
