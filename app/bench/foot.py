"""The strip under the shaft: station numbers, marks of x in the user's unit, legend of the band."""

import math
from dataclasses import dataclass
from functools import lru_cache

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF
from PySide6.QtGui import QBrush, QColor, QPainter

from app.bench.colour_scale import TOP, colours_of
from app.bench.polygons import hairline
from app.bench.stage import FOOT, Stage, Type
from app.bench.utilisation_band import row_brush
from app.ruler import LEFT_MARGIN, RIGHT_MARGIN
from shaftcore.units import dimension

STATION_LINE, RULER_LINE, LEGEND_LINE = 12.0, 19.0, 52.0
"""Below the strip's top: baseline of the numbers, the ruler's line, baseline of the legend."""
MARK_SPACING = 90.0
LEGEND_LENGTH, LEGEND_HEIGHT = 180.0, 6.0


@dataclass(frozen=True)
class StationNumber:
    """One number over the ruler: its place (px), the digits, and its colour where it is stressed."""

    x: float
    text: str
    stressed: str | None


def draw_foot(painter: QPainter, stage: Stage, letters: Type, numbers: tuple[StationNumber, ...]) -> None:
    """The strip, on paper of its own, so that it stands over a shaft drawn larger than the bench."""
    painter.fillRect(QRectF(0.0, stage.foot, stage.frame.width, FOOT), QColor(stage.theme.paper))
    _draw_ruler(painter, stage, letters)
    if stage.scene.results is not None:
        _draw_stations(painter, stage, letters, numbers)
        _draw_legend(painter, stage, letters)


def _draw_head(painter: QPainter, stage: Stage, letters: Type, text: str, baseline: float) -> None:
    """The name of a row, in the left margin."""
    painter.setFont(letters.plain)
    painter.setPen(hairline(stage.theme.faint))
    painter.drawText(QPointF(8.0, stage.foot + baseline), text)


# marks of x -----------------------------------------------------------------------------------


def mark_step(px_per_unit: float, spacing: float = MARK_SPACING) -> float:
    """The smallest of 1, 2, 5 times a power of ten whose marks stand `spacing` pixels apart or more."""
    least = spacing / px_per_unit
    power = 10.0 ** math.floor(math.log10(least))
    return next(step for step in (power, 2 * power, 5 * power, 10 * power) if step >= least * (1 - 1e-9))


def _draw_ruler(painter: QPainter, stage: Stage, letters: Type) -> None:
    unit = dimension("length").unit(stage.scene.system)
    frame, y = stage.frame, stage.foot + RULER_LINE
    left, right = LEFT_MARGIN - 8.0, frame.width - RIGHT_MARGIN + 8.0
    step = mark_step(frame.scale * unit.factor)
    begin, end = (unit.shown((px - frame.origin) / frame.scale) for px in (left, right))
    lines, texts = [QLineF(left, y, right, y)], []
    for i in range(math.ceil(begin / step), math.floor(end / step) + 1):
        x = frame.x(unit.internal(i * step))
        lines.append(QLineF(x, y, x, y + 4))
        texts.append((x, f"{i * step:.10g}".replace("-", "−")))
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
    painter.setPen(hairline(stage.theme.faint))
    painter.drawLines(lines)
    painter.setFont(letters.plain)
    for x, text in texts:
        painter.drawText(QPointF(x - letters.width(text) / 2, y + 4 + letters.ascent), text)
    _draw_head(painter, stage, letters, f"x, {unit.symbol}", RULER_LINE + 4 + letters.ascent)


# stations -------------------------------------------------------------------------------------


def shown_stations(stage: Stage, letters: Type) -> list[int]:
    """Indices of the stations whose numbers fit: the chosen, the governing, then by utilisation."""
    results, frame = stage.scene.results, stage.frame
    if results is None:
        return []
    order = [results.governing, *np.argsort(-results.judged.utilisation, kind="stable").tolist()]
    if stage.scene.station is not None:
        order.insert(0, stage.scene.station)
    taken = bytearray(max(math.ceil(frame.width), 1))
    places = [frame.x(station.x) for station in results.stations]
    halves = [letters.width("0" * digits, True) / 2 + 2.5 for digits in range(len(str(len(places))) + 1)]
    kept = []
    for i in dict.fromkeys(order):
        x, half = places[i], halves[len(str(i + 1))]
        if x < LEFT_MARGIN - 16 or x > frame.width - half:
            continue
        begin, end = int(x - half), math.ceil(x + half)
        if 1 not in taken[begin:end]:
            taken[begin:end] = b"\1" * (end - begin)
            kept.append(i)
    return kept


def station_numbers(stage: Stage, letters: Type) -> tuple[StationNumber, ...]:
    """The numbers that are shown: the chosen station's in accent, the governing one's in ink."""
    results = stage.scene.results
    if results is None:
        return ()
    stressed = {results.governing: stage.theme.ink}
    if stage.scene.station is not None:
        stressed[stage.scene.station] = stage.theme.accent
    shown = ((i, results.stations[i]) for i in shown_stations(stage, letters))
    return tuple(StationNumber(stage.frame.x(s.x), str(s.number), stressed.get(i)) for i, s in shown)


def _draw_stations(painter: QPainter, stage: Stage, letters: Type, numbers: tuple[StationNumber, ...]) -> None:
    y = stage.foot + STATION_LINE
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
    painter.setPen(hairline(stage.theme.faint))
    painter.drawLines([QLineF(number.x, y + 3, number.x, y + 7) for number in numbers])
    for colour in dict.fromkeys((None, *(number.stressed for number in numbers))):
        bold = colour is not None
        painter.setFont(letters.font(bold))
        painter.setPen(hairline(colour or stage.theme.faint))
        for number in numbers:
            if number.stressed == colour:
                painter.drawText(QPointF(number.x - letters.width(number.text, bold) / 2, y), number.text)
    _draw_head(painter, stage, letters, "station", STATION_LINE)


# legend ---------------------------------------------------------------------------------------


def _draw_legend(painter: QPainter, stage: Stage, letters: Type) -> None:
    """The colour scale lying along x, its marks and what the ticks mean."""
    left, baseline = LEFT_MARGIN, stage.foot + LEGEND_LINE
    middle = baseline - letters.ascent / 2 + 1
    bar = QRectF(left, middle - LEGEND_HEIGHT / 2, LEGEND_LENGTH, LEGEND_HEIGHT)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
    painter.setBrushOrigin(bar.topLeft())
    painter.fillRect(bar, _legend_brush(stage.pixel_ratio))
    painter.setBrushOrigin(0, 0)
    painter.setPen(hairline(stage.theme.ink))
    over = left + LEGEND_LENGTH / TOP
    painter.drawLines([QLineF(x, middle - 6, x, middle + 6) for x in np.arange(over + 3, left + LEGEND_LENGTH, 6.0)])
    _draw_head(painter, stage, letters, "utilisation", LEGEND_LINE)
    painter.setPen(hairline(stage.theme.faint))
    words = f"0 to {TOP:g} (n asked / n); ticks: above 1, asked factor missed"
    painter.drawText(QPointF(left + LEGEND_LENGTH + 10, baseline), words)


@lru_cache(maxsize=8)
def _legend_brush(ratio: float) -> QBrush:
    return row_brush(colours_of(np.linspace(0.0, TOP, round(LEGEND_LENGTH * ratio))), ratio)
