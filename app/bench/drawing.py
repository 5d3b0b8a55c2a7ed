"""The whole drawing of the shaft, from back to front, as one routine a newcomer can read."""

import numpy as np
from PySide6.QtCore import QLineF, QPointF
from PySide6.QtGui import QPainter

from app.bench.body import draw_edges, draw_metal, part_of_outline
from app.bench.callouts import Callout, Offsets, draw_callouts, place_callouts
from app.bench.dimensions import chosen_raiser, chosen_segment, draw_segment_dimensions
from app.bench.foot import STATION_LINE, draw_foot
from app.bench.polygons import chain_line, draw_weighted, hairline
from app.bench.stage import Stage, Type
from app.bench.symbols import Glyph, draw_glyphs, glyphs_of
from app.bench.utilisation_band import draw_band, draw_ticks, utilisation_columns
from app.bench.wishes import wishes_of
from app.bench.words import next_step

CHOSEN_WEIGHT = 3.0


class Drawing:
    """One picture, laid out once and painted as often as wanted."""

    def __init__(self, stage: Stage, letters: Type, kept: Offsets | None = None) -> None:
        self.stage, self.letters = stage, letters
        self.glyphs: list[Glyph] = glyphs_of(stage) if stage.shaft.segments else []
        wishes = wishes_of(stage, self.glyphs)
        self.wanted = [wish.key for wish in wishes]
        self.callouts: list[Callout] = place_callouts(stage, letters, self.glyphs, wishes, kept or {})
        self.columns = utilisation_columns(stage)

    @property
    def offsets(self) -> Offsets:
        """Where the words stand, to keep them there during a gesture."""
        stood = {callout.key: callout.room.topLeft() - callout.anchor for callout in self.callouts}
        return {key: stood.get(key) for key in self.wanted}

    def paint(self, painter: QPainter) -> None:
        stage = self.stage
        painter.setRenderHint(QPainter.RenderHint.TextAntialiasing, True)
        draw_foot(painter, stage, self.letters)
        if stage.shaft.segments:
            self._paint_shaft(painter)
        else:
            self._paint_empty_axis(painter)
        self._paint_hint(painter)

    def _paint_shaft(self, painter: QPainter) -> None:
        stage = self.stage
        self._paint_station_line(painter)
        draw_metal(painter, stage)
        if stage.scene.results is not None:
            draw_band(painter, stage, self.columns)
        draw_edges(painter, stage)
        if stage.scene.results is not None:
            draw_ticks(painter, stage, self.columns)
        self._paint_chosen(painter)
        draw_glyphs(painter, stage, self.glyphs)
        draw_callouts(painter, stage, self.letters, self.callouts)
        index = chosen_segment(stage)
        if index is not None:
            draw_segment_dimensions(painter, stage, self.letters, index)

    def _paint_station_line(self, painter: QPainter) -> None:
        """From the chosen station down to its number."""
        stage = self.stage
        results, index = stage.scene.results, stage.scene.station
        if results is None or index is None:
            return
        x = stage.frame.x(results.stations[index].x)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
        painter.setPen(hairline(stage.theme.accent))
        painter.drawLine(QLineF(x, stage.frame.axis, x, stage.foot + STATION_LINE - 10))

    def _paint_chosen(self, painter: QPainter) -> None:
        """The chosen segment's or raiser's part of the outline, in accent and weight."""
        stage = self.stage
        index, seating = chosen_segment(stage), chosen_raiser(stage)
        if index is not None:
            faces, segment = stage.plan.profile.faces, stage.shaft.segments[index]
            top = max(segment.diameter, segment.right_diameter) / 2
            lines = part_of_outline(stage, float(faces[index]), float(faces[index + 1]), top)
        elif seating is not None:
            lines = part_of_outline(stage, *seating.site.span, np.inf)
        else:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, True)
        draw_weighted(painter, lines, stage.theme.accent, CHOSEN_WEIGHT)

    def _paint_empty_axis(self, painter: QPainter) -> None:
        stage = self.stage
        painter.setPen(chain_line(stage.theme.faint))
        painter.drawLine(QLineF(40.0, stage.frame.axis, stage.frame.width - 20.0, stage.frame.axis))

    def _paint_hint(self, painter: QPainter) -> None:
        """What to do next: in the middle of an empty bench, else in the first two rows."""
        step = next_step(self.stage.scene)
        if step is None:
            return
        stage, letters = self.stage, self.letters
        top = 6.0 if stage.shaft.segments else stage.frame.axis - 3 * letters.line
        for i, (text, bold) in enumerate(((step[0], True), (step[1], False))):
            painter.setFont(letters.font(bold))
            painter.setPen(hairline(stage.theme.accent if bold else stage.theme.ink))
            left = (stage.frame.width - letters.width(text, bold)) / 2
            painter.drawText(QPointF(left, top + i * letters.line + letters.ascent), text)
