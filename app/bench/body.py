"""The shaft itself: metal, outline, edges of steps and raisers, broken-out bores, centre line."""

from functools import lru_cache

import numpy as np
from PySide6.QtCore import QLineF, QPointF, Qt
from PySide6.QtGui import QBrush, QColor, QImage, QPainter, QPen, QPolygonF, QTransform

from app.bench.polygons import chain_line, draw_weighted, hairline, polygon
from app.bench.stage import Stage
from shaftcore.abutment import largest_fillet
from shaftcore.notches._contract import Array

OUTLINE_WEIGHT = 1.2
CENTRE_OVERHANG = 14.0
HATCH_SPACING = 7
SEAT_GAP = 3.0


def draw_metal(painter: QPainter, stage: Stage) -> None:
    """The filled side view, and the bores laid open in the lower half."""
    both = np.vstack([stage.upper_edge, stage.lower_edge[::-1]])
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(stage.theme.metal))
    painter.drawPolygon(polygon(both))
    for first, last in _hollow_runs(stage):
        _draw_broken_out(painter, stage, first, last)


def draw_edges(painter: QPainter, stage: Stage) -> None:
    """Outline, edges seen from the side, faces that rings seat against, centre line."""
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, True)
    theme, frame = stage.theme, stage.frame
    lines = _visible_edges(stage)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
    painter.setPen(hairline(theme.metal_edge))
    painter.drawLines(lines)
    painter.drawLines(_seating_faces(stage))
    painter.setPen(chain_line(theme.faint))
    begin, end = (frame.x(x) for x in (0.0, stage.shaft.length))
    painter.drawLine(QLineF(begin - CENTRE_OVERHANG, frame.axis, end + CENTRE_OVERHANG, frame.axis))
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, True)
    closed = np.vstack([stage.upper_edge, stage.lower_edge[::-1], stage.upper_edge[:1]])
    draw_weighted(painter, [polygon(closed)], theme.metal_edge, OUTLINE_WEIGHT)


def _visible_edges(stage: Stage) -> list[QLineF]:
    """Vertical edges: the larger side of each step, both rims of each raiser that lies on a diameter."""
    frame, profile = stage.frame, stage.plan.profile
    larger, steps = np.maximum(profile.right[:-1], profile.left[1:]) / 2, profile.right[:-1] != profile.left[1:]
    on_diameter = (seating for seating in stage.plan.seated if seating.kind.goes == "on a diameter")
    rims = np.array([x for seating in on_diameter for x in seating.site.span])
    places = np.concatenate([profile.faces[1:-1][steps], rims])
    radii = np.concatenate([larger[steps], stage.plan.radii_at(rims)]) * frame.scale
    laid_open = np.zeros(len(places), dtype=bool)
    for first, last in _hollow_runs(stage):
        laid_open |= (places >= profile.faces[first]) & (places <= profile.faces[last + 1])
    lower = np.where(laid_open, frame.axis, frame.axis + radii)
    rows = zip((frame.origin + places * frame.scale).tolist(), radii.tolist(), lower.tolist(), strict=True)
    return [QLineF(x, frame.axis - radius, x, low) for x, radius, low in rows]


def _seating_faces(stage: Stage) -> list[QLineF]:
    """A second fine line beside each face that a bearing ring seats against, above its corner."""
    frame, lines = stage.frame, []
    for seating in stage.plan.seated:
        corner = getattr(seating.record, "bearing_corner", None)
        if not corner:
            continue
        thin, thick = sorted((seating.around.left_diameter / 2, seating.around.right_diameter / 2))
        sense = -1.0 if seating.around.left_diameter < seating.around.right_diameter else 1.0
        x = frame.x(seating.around.x) + sense * SEAT_GAP
        for side in (1.0, -1.0):
            foot = min(thin + largest_fillet(corner), thick)
            lines.append(QLineF(x, frame.y(side * foot), x, frame.y(side * thick)))
    return lines


# bores ----------------------------------------------------------------------------------------


def _hollow_runs(stage: Stage) -> list[tuple[int, int]]:
    """First and last index of each run of bored segments."""
    bored = [segment.bore > 0 for segment in stage.shaft.segments]
    begins = [i for i, b in enumerate(bored) if b and (i == 0 or not bored[i - 1])]
    ends = [i for i, b in enumerate(bored) if b and (i == len(bored) - 1 or not bored[i + 1])]
    return list(zip(begins, ends, strict=True))


def _draw_broken_out(painter: QPainter, stage: Stage, first: int, last: int) -> None:
    """The lower half of a bored run cut open: hatched wall, empty bore, a break line where it ends inside."""
    frame, profile = stage.frame, stage.plan.profile
    begin, end = float(profile.faces[first]), float(profile.faces[last + 1])
    left = _break(stage, begin, -1.0) if first > 0 else np.empty((0, 2))
    right = _break(stage, end, 1.0) if last + 1 < len(profile.bore) else np.empty((0, 2))
    lower = stage.lower_edge
    x0, x1 = (
        left[-1, 0] if len(left) else frame.x(begin),
        right[-1, 0] if len(right) else frame.x(end),
    )
    wall = np.vstack([left, lower[(lower[:, 0] >= x0) & (lower[:, 0] <= x1)], right[::-1], [[x1, frame.axis]]])
    wall = np.vstack([wall, [[x0, frame.axis]]])
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(_hatch(stage.theme.metal, stage.theme.faint, stage.pixel_ratio))
    painter.drawPolygon(polygon(wall))
    bore = frame.points(_bore_points(stage, first, last), mirrored=True)
    painter.setBrush(QColor(stage.theme.paper))
    painter.setPen(hairline(stage.theme.metal_edge))
    painter.drawPolygon(polygon(bore))
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, True)
    painter.setPen(hairline(stage.theme.faint))
    for line in (left, right):
        if len(line):
            painter.drawPolyline(polygon(line))
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)


def _bore_points(stage: Stage, first: int, last: int) -> Array:
    profile = stage.plan.profile
    rows = [(float(profile.faces[first]), 0.0)]
    for i in range(first, last + 1):
        rows += [(float(profile.faces[i + side]), float(profile.bore[i]) / 2) for side in (0, 1)]
    return np.array([*rows, (float(profile.faces[last + 1]), 0.0)])


def _break(stage: Stage, x: float, sense: float) -> Array:
    """A freehand line (pixels) from the axis to the lower edge, a little beyond a bore's end."""
    frame = stage.frame
    beyond = frame.x(x) + sense * 12.0
    radius = stage.plan.radius_at(min(max(frame.to_shaft(QPointF(beyond, 0))[0], 0.0), stage.shaft.length))
    depth = np.linspace(0.0, radius * frame.scale, 25)
    return np.column_stack([beyond + 2.2 * np.sin(depth / 5.0), frame.axis + depth])


@lru_cache(maxsize=8)
def _hatch(metal: str, ink: str, ratio: float) -> QBrush:
    """Fine 45 degree lines on the metal's colour, as a tile of device pixels."""
    size = max(round(HATCH_SPACING * ratio), 4)
    tile = QImage(size, size, QImage.Format.Format_RGB32)
    tile.fill(QColor(metal))
    with QPainter(tile) as painter:
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(QPen(QColor(ink), 0.8 * ratio))
        for shift in (-size, 0, size):
            painter.drawLine(QPointF(shift, size), QPointF(shift + size, 0))
    brush = QBrush(tile)
    brush.setTransform(QTransform.fromScale(1 / ratio, 1 / ratio))
    return brush


def part_of_outline(stage: Stage, begin: float, end: float, top: float) -> list[QPolygonF]:
    """The outline between two x up to a radius (mm), above and below, as polylines in pixels."""
    outline = stage.plan.outline
    inside = (outline[:, 0] >= begin - 1e-9) & (outline[:, 0] <= end + 1e-9) & (outline[:, 1] <= top + 1e-9)
    return [polygon(stage.frame.points(outline[inside], mirrored=lower)) for lower in (False, True)]
