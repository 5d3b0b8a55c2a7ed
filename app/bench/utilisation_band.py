"""The band of utilisation along the outline, and ticks across it where an asked factor is missed."""

import numpy as np
from numpy.typing import NDArray
from PySide6.QtCore import QLineF, Qt
from PySide6.QtGui import QBrush, QImage, QPainter, QTransform

from app.bench.polygons import hairline, polygon
from app.bench.stage import Stage
from shaftcore.notches._contract import Array

DEPTH = 6.0
"""Pixels from the outline inwards."""
LEAST_STRETCH = 6.0
"""Pixels a raiser takes at least, so that a small fillet's value is seen."""
TICK_SPACING, TICK_OUT, TICK_IN, LEAST_TICKS = 6.0, 5.0, 9.0, 2


def utilisation_columns(stage: Stage) -> Array:
    """Utilisation at the middle of every device pixel column of the widget; NaN beside the shaft."""
    results, frame = stage.scene.results, stage.frame
    if results is None:
        return np.empty(0)
    columns = round(frame.width * stage.pixel_ratio)
    x = ((np.arange(columns) + 0.5) / stage.pixel_ratio - frame.origin) / frame.scale
    values = np.interp(x, results.along.x, results.judged_along.utilisation)
    at_stations = results.judged.utilisation
    for i in np.argsort(at_stations, kind="stable"):
        site = results.stations[i].site
        if site is not None:
            first, last = _columns_of(stage, site.span)
            values[first:last] = at_stations[i]
    values[(x < 0) | (x > stage.shaft.length)] = np.nan
    return values


def _columns_of(stage: Stage, span: tuple[float, float]) -> tuple[int, int]:
    begin, end = (stage.frame.x(x) for x in span)
    spare = max(LEAST_STRETCH - (end - begin), 0.0) / 2
    ratio = stage.pixel_ratio
    return max(round((begin - spare) * ratio), 0), max(round((end + spare) * ratio), 0)


def draw_band(painter: QPainter, stage: Stage, colours: NDArray[np.uint32]) -> None:
    """The coloured band just inside the outline, above and below."""
    brush = row_brush(colours, stage.pixel_ratio)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(brush)
    for edge in (stage.upper_edge, stage.lower_edge):
        away = edge[:, 1] - stage.frame.axis
        depth = np.minimum(DEPTH, 0.35 * np.abs(away))
        inner = np.column_stack([edge[:, 0], edge[:, 1] - np.sign(away) * depth])
        painter.drawPolygon(polygon(np.vstack([edge, inner[::-1]])))


def row_brush(colours: NDArray[np.uint32], ratio: float) -> QBrush:
    """One row of device pixels repeated downwards."""
    row = np.ascontiguousarray(colours)
    image = QImage(row.data, len(row), 1, 4 * len(row), QImage.Format.Format_RGB32).copy()
    brush = QBrush(image)
    brush.setTransform(QTransform.fromScale(1 / ratio, 1 / ratio))
    return brush


def draw_ticks(painter: QPainter, stage: Stage, columns: Array) -> None:
    """Short strokes across the outline along every stretch whose utilisation is above 1."""
    lines = [
        QLineF(x, y - sense * TICK_OUT, x, y + sense * TICK_IN)
        for x, radius in failing_places(stage, columns)
        for y, sense in ((stage.frame.y(radius), 1.0), (stage.frame.y(-radius), -1.0))
    ]
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
    painter.setPen(hairline(stage.theme.ink))
    painter.drawLines(lines)


def failing_places(stage: Stage, columns: Array) -> list[tuple[float, float]]:
    """(x px, radius mm) of the ticks: evenly spaced in each failing stretch, at least two a stretch."""
    failing = np.concatenate([[False], np.nan_to_num(columns) > 1.0, [False]])
    turns = np.flatnonzero(np.diff(failing.astype(np.int8))).reshape(-1, 2) / stage.pixel_ratio
    outline, frame = stage.plan.outline, stage.frame
    found = []
    for begin, end in turns:
        count = max(round((end - begin) / TICK_SPACING), LEAST_TICKS)
        for x in begin + (np.arange(count) + 0.5) * (end - begin) / count:
            mm = (x - frame.origin) / frame.scale
            found.append((float(x), float(np.interp(mm, outline[:, 0], outline[:, 1]))))
    return found
