"""Glyphs of supports and loads. Bearings follow the simplified representation of ISO 8826-1.

A glyph is made of lines and filled heads in pixels, so that one routine draws them all, and says
which room it takes and where a label's leader may begin.
"""

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF
from PySide6.QtGui import QColor, QPainter, QPolygonF

from app.bench.polygons import hairline, polygon, stroke
from app.bench.stage import Stage
from shaftcore.shaft import AxialForce, RadialForce, Support, Torque

HEAD_LENGTH, HEAD_HALF = 9.0, 3.6
SHORTEST, LONGEST = 17.0, 29.0
AXIAL_LENGTH = 36.0
RING_WIDTH, RING_HEIGHT, LEAST_RING, HEAD_ROOM = 22.0, 17.0, 13.0, 8.0
LIP, SPRING_HEIGHT, SPRING_FOLDS = 9.0, 12.0, 5
ARC_BULGE, ARC_BEYOND, ARC_SHIFT = 7.0, 9.0, 4.0
SPOT = 5.0
IN_PLANE = 0.05
"""Cosine below which a force counts as pointing straight at or away from the viewer."""


@dataclass(frozen=True, eq=False)
class Glyph:
    """One symbol: polylines, filled heads, circles (centre, radius, filled), its rooms and its anchor.

    `upward` says on which side of the shaft the label belongs; `anchor` is where its leader ends,
    and `stem` carries the leader on to a glyph that lies within the outline.
    """

    thing: str
    lines: list[QPolygonF]
    heads: list[QPolygonF]
    circles: list[tuple[QPointF, float, bool]]
    rooms: list[QRectF]
    anchor: QPointF
    upward: bool
    stem: QLineF | None = None


def glyphs_of(stage: Stage) -> list[Glyph]:
    """The glyphs of all supports and loads."""
    forces = [abs(load.force) for load in stage.shaft.loads if isinstance(load, RadialForce)]
    largest = max(forces, default=0.0)
    loads = [_MAKERS[type(load)](stage, load, largest) for load in stage.shaft.loads]
    return [*(_bearing(stage, support) for support in stage.shaft.supports), *loads]


def draw_glyphs(painter: QPainter, stage: Stage, glyphs: list[Glyph]) -> None:
    """All glyphs, the chosen one last, in the accent colour and heavier."""
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, True)
    painter.setPen(hairline(stage.theme.faint))
    painter.drawLines([glyph.stem for glyph in glyphs if glyph.stem is not None])
    chosen = [glyph for glyph in glyphs if stage.chosen(glyph.thing)]
    _draw_in(painter, stage, [glyph for glyph in glyphs if glyph not in chosen], stage.theme.ink, 1.1)
    _draw_in(painter, stage, chosen, stage.theme.accent, 2.0)


def _draw_in(painter: QPainter, stage: Stage, glyphs: list[Glyph], colour: str, weight: float) -> None:
    painter.setPen(hairline(colour))
    for filled in (False, True):
        painter.setBrush(QColor(colour if filled else stage.theme.paper))
        for centre, radius in (circle[:2] for glyph in glyphs for circle in glyph.circles if circle[2] is filled):
            painter.drawEllipse(centre, radius, radius)
    painter.setBrush(QColor(colour))
    for glyph in glyphs:
        for head in glyph.heads:
            painter.drawPolygon(head)
    painter.setPen(stroke(colour, weight))
    for glyph in glyphs:
        for line in glyph.lines:
            painter.drawPolyline(line)


# loads ----------------------------------------------------------------------------------------


def _radial(stage: Stage, load: RadialForce, largest: float) -> Glyph:
    """An arrow onto the outline for the part in the drawing plane, a spot for the part across it."""
    frame, radius = stage.frame, stage.plan.radius_at(load.x)
    angle = math.radians(load.angle) + (math.pi if load.force < 0 else 0.0)
    up, towards = math.cos(angle), math.sin(angle)
    x = frame.x(load.x)
    if abs(up) < IN_PLANE:
        lines, heads, circles = _spot(QPointF(x, frame.axis), towards)
        top = QPointF(x, min(frame.y(radius), frame.axis - SPOT))
        stem = QLineF(top, QPointF(x, frame.axis - SPOT))
        return Glyph(load.id, lines, heads, circles, [_around(x, frame.axis, SPOT)], top, True, stem)
    downwards = up < 0
    sense = -1.0 if downwards else 1.0
    length = SHORTEST + (LONGEST - SHORTEST) * abs(load.force) / largest if largest else SHORTEST
    tip = frame.y(radius) if downwards else frame.y(-radius)
    tail = tip + sense * length
    lines, heads = _arrow(QPointF(x, tail), QPointF(x, tip))
    circles = []
    if abs(towards) >= IN_PLANE:
        spot_lines, _, circles = _spot(QPointF(x, tail + sense * SPOT), towards)
        lines, tail = [*lines, *spot_lines], tail + 2 * sense * SPOT
    room = QRectF(x - SPOT, min(tail, tip), 2 * SPOT, abs(tail - tip))
    return Glyph(load.id, lines, heads, circles, [room], QPointF(x, tail), downwards)


def _spot(
    centre: QPointF, towards: float
) -> tuple[list[QPolygonF], list[QPolygonF], list[tuple[QPointF, float, bool]]]:
    """A circle with a dot (the arrow's point, towards the viewer) or a cross (its feathers)."""
    if towards > 0:
        return [], [], [(centre, SPOT, False), (centre, 1.8, True)]
    reach = SPOT * math.sqrt(0.5)
    cross = [QPolygonF([centre + QPointF(-reach, -s * reach), centre + QPointF(reach, s * reach)]) for s in (1.0, -1.0)]
    return cross, [], [(centre, SPOT, False)]


def _torque(stage: Stage, load: Torque, largest: float) -> Glyph:
    """An arc round the near side of the shaft; its head shows which way the near side is turned."""
    frame = stage.frame
    reach = stage.plan.radius_at(load.x) * frame.scale + ARC_BEYOND
    x = frame.x(load.x)
    turn = np.linspace(-math.pi / 2, math.pi / 2, 21)
    arc = np.column_stack([x + ARC_SHIFT + ARC_BULGE * np.cos(turn), frame.axis + reach * np.sin(turn)])
    size = load.torque or load.amplitude
    tip, sense = (arc[-1], 1.0) if size >= 0 else (arc[0], -1.0)
    head = _head(QPointF(tip[0] - 4.0, tip[1]), QPointF(-1.0, 0.45 * sense))
    rooms = [
        QRectF(x - 9.0, frame.axis - reach - 3, 9.0 + ARC_BULGE, ARC_BEYOND + 3),
        QRectF(x - 9.0, frame.axis + reach - ARC_BEYOND, 9.0 + ARC_BULGE, ARC_BEYOND + 3),
    ]
    return Glyph(load.id, [polygon(arc)], [head], [], rooms, QPointF(x, frame.axis - reach - 3), True)


def _axial(stage: Stage, load: AxialForce, largest: float) -> Glyph:
    """An arrow along the axis whose tip is where the force acts."""
    frame, x = stage.frame, stage.frame.x(load.x)
    sense = 1.0 if (load.force or load.amplitude) >= 0 else -1.0
    tail = QPointF(x - sense * AXIAL_LENGTH, frame.axis)
    lines, heads = _arrow(tail, QPointF(x, frame.axis))
    room = QRectF(min(tail.x(), x), frame.axis - 5, AXIAL_LENGTH, 10)
    top = QPointF(x, frame.y(stage.plan.radius_at(load.x)))
    stem = QLineF(top, QPointF(x, frame.axis))
    return Glyph(load.id, lines, heads, [], [room], top, True, stem)


_MAKERS: dict[type, Callable[[Stage, Any, float], Glyph]] = {
    RadialForce: _radial,
    Torque: _torque,
    AxialForce: _axial,
}


def _arrow(tail: QPointF, tip: QPointF) -> tuple[list[QPolygonF], list[QPolygonF]]:
    line = QLineF(tail, tip)
    way = QPointF(line.dx(), line.dy()) / line.length()
    return [QPolygonF([tail, tip - way * (HEAD_LENGTH - 1)])], [_head(tip, way)]


def _head(tip: QPointF, way: QPointF) -> QPolygonF:
    way = way / math.hypot(way.x(), way.y())
    foot, across = tip - way * HEAD_LENGTH, QPointF(-way.y(), way.x()) * HEAD_HALF
    return QPolygonF([tip, foot + across, foot - across])


def _around(x: float, y: float, reach: float) -> QRectF:
    return QRectF(x - reach, y - reach, 2 * reach, 2 * reach)


# supports -------------------------------------------------------------------------------------


def _bearing(stage: Stage, support: Support) -> Glyph:
    """A ring above and below with the free-standing cross; the housing holds or lets slide.

    A locating bearing stands in a housing with a lip at either side; a floating one has none and
    may move to both sides, as its little heads say. Rings are not to scale: as wide as is usual
    here, narrower on a short seat. A springy support has folds of a spring between ring and housing.
    """
    frame, x = stage.frame, stage.frame.x(support.x)
    reach = stage.plan.radius_at(support.x) * frame.scale
    free = seat_room(stage, support.x) * frame.scale
    half = min(RING_WIDTH / 2, max(free - 4.0, LEAST_RING / 2))
    gives = 0.0 if support.stiffness is None else SPRING_HEIGHT
    lines: list[QPolygonF] = []
    for side in (-1.0, 1.0):
        lines += _ring(x, frame.axis + side * reach, side, half)
        top = frame.axis + side * (reach + RING_HEIGHT)
        lines += _housing(x, top + side * gives, side, half, LIP + gives if support.locating else 0.0)
        lines += [_spring(x, top, side)] if gives else []
    heads = []
    if not support.locating and free > half + HEAD_ROOM:
        y = frame.axis + reach + RING_HEIGHT / 2
        heads = [_small_head(QPointF(x + way * (half + HEAD_ROOM - 1), y), way) for way in (-1.0, 1.0)]
    height, wide = RING_HEIGHT + gives + 7, half + (HEAD_ROOM if heads else 5.0)
    rooms = [
        QRectF(x - wide, frame.axis - reach - height, 2 * wide, height),
        QRectF(x - wide, frame.axis + reach, 2 * wide, height),
    ]
    return Glyph(support.id, lines, heads, [], rooms, QPointF(x, frame.axis + reach + height), False)


def seat_room(stage: Stage, x: float) -> float:
    """mm from x to the nearer step up in diameter; inf where there is none."""
    profile, radius = stage.plan.profile, stage.plan.radius_at(x)
    rises = np.maximum(profile.left, profile.right) / 2 > radius * (1 + 1e-9)
    gaps = np.maximum(np.maximum(profile.faces[:-1] - x, x - profile.faces[1:]), 0.0)
    return float(np.min(gaps[rises & (profile.left == profile.right)], initial=math.inf))


def _ring(x: float, y: float, side: float, half: float) -> list[QPolygonF]:
    w, h, arm = half, side * RING_HEIGHT, 4.5
    middle = y + h / 2
    box = QPolygonF(
        [QPointF(x - w, y), QPointF(x - w, y + h), QPointF(x + w, y + h), QPointF(x + w, y), QPointF(x - w, y)]
    )
    return [
        box,
        QPolygonF([QPointF(x - arm, middle), QPointF(x + arm, middle)]),
        QPolygonF([QPointF(x, middle - arm), QPointF(x, middle + arm)]),
    ]


def _spring(x: float, y: float, side: float) -> QPolygonF:
    """Folds that widen from the ring to the housing: what yields there."""
    folds = np.arange(SPRING_FOLDS + 1)
    wide = np.where(folds % 2, 1.0, -1.0) * (2.5 + 0.9 * folds)
    wide[[0, -1]] = 0.0
    return polygon(np.column_stack([x + wide, y + side * (SPRING_HEIGHT + 2.0) * folds / SPRING_FOLDS]))


def _housing(x: float, y: float, side: float, half: float, lips: float) -> list[QPolygonF]:
    """A line with ground strokes beyond the ring, with lips of that length over its sides where it holds."""
    w = half + (3.0 if lips else 5.0)
    y += side * 2.0
    line = [QPointF(x - w, y), QPointF(x + w, y)]
    if lips:
        lip = QPointF(0.0, -side * lips)
        line = [line[0] + lip, *line, line[1] + lip]
    strokes = [
        QPolygonF([QPointF(x + at, y), QPointF(x + at - 3.5, y + side * 4.5)]) for at in np.arange(-w + 4, w + 0.5, 5.0)
    ]
    return [QPolygonF(line), *strokes]


def _small_head(tip: QPointF, way: float) -> QPolygonF:
    return QPolygonF([tip, tip + QPointF(-4.5 * way, -2.8), tip + QPointF(-4.5 * way, 2.8)])
