"""The whole drawing of the shaft, from back to front, as one routine a newcomer can read."""

from dataclasses import dataclass

import numpy as np
from PySide6.QtCore import QLineF, QPointF
from PySide6.QtGui import QPainter

from app.bench.body import draw_edges, draw_metal, part_of_outline
from app.bench.callouts import Callout, Kept, draw_callouts, place_callouts
from app.bench.colour_scale import colours_of
from app.bench.dimensions import chosen_raiser, chosen_segment, draw_segment_dimensions
from app.bench.foot import draw_foot, station_numbers
from app.bench.polygons import chain_line, draw_weighted, hairline
from app.bench.stage import Stage, Type
from app.bench.symbols import Glyph, draw_glyphs, glyphs_of
from app.bench.utilisation_band import draw_band, draw_ticks, utilisation_columns
from app.bench.wishes import mark_wishes, raiser_wishes
from app.bench.words import next_step

CHOSEN_WEIGHT = 3.0


@dataclass(frozen=True)
class Marks:
    """Symbols of supports and loads and their words: what stands on the shaft, not of it."""

    glyphs: list[Glyph]
    callouts: list[Callout]


class Drawing:
    """One picture, laid out once and painted as often as wanted.

    From back to front: the shaft with its band (`paint_shaft`), marks and foot (`paint_over`), the
    words of the chosen raiser (`paint_words`). During a gesture words keep the places in `kept`,
    and the marks of the picture `before` are taken over while nothing they hang on has changed.
    """

    def __init__(self, stage: Stage, letters: Type, kept: Kept | None = None, before: "Drawing | None" = None) -> None:
        self.stage, self.letters = stage, letters
        self.hung_on = _hung_on(stage)
        self.marks: Marks
        self.wanted: list[str]
        raiser = raiser_wishes(stage)
        if before is not None and stage.scene.live and before.hung_on == self.hung_on:
            self.marks, self.wanted = before.marks, before.wanted
            self.words = place_callouts(stage, letters, self.marks.glyphs, raiser, kept or {})
        else:
            glyphs = glyphs_of(stage) if stage.shaft.segments else []
            wishes = [*raiser, *mark_wishes(stage, glyphs)]
            self.wanted = [wish.key for wish in wishes]
            callouts = place_callouts(stage, letters, glyphs, wishes, kept or {})
            keys = {wish.key for wish in raiser}
            self.words = [callout for callout in callouts if callout.key in keys]
            self.marks = Marks(glyphs, [callout for callout in callouts if callout.key not in keys])
        self.columns = utilisation_columns(stage)
        self.colours = colours_of(np.nan_to_num(self.columns))
        self.numbers = station_numbers(stage, letters)

    @property
    def callouts(self) -> list[Callout]:
        return [*self.words, *self.marks.callouts]

    @property
    def standings(self) -> Kept:
        """Where the words stand, to keep them there during a gesture."""
        stood = {callout.key: callout.standing for callout in self.callouts}
        return {key: stood.get(key) for key in self.wanted}

    @property
    def station_x(self) -> float | None:
        """Where the chosen station lies, px."""
        results, index = self.stage.scene.results, self.stage.scene.station
        return None if results is None or index is None else self.stage.frame.x(results.stations[index].x)

    def same_over(self, other: "Drawing") -> bool:
        """Whether `paint_over` of both gives the same picture: the same marks over the same numbers."""
        return self.marks is other.marks and self.numbers == other.numbers

    def paint(self, painter: QPainter) -> None:
        self.paint_shaft(painter)
        self.paint_over(painter)
        self.paint_words(painter)

    def paint_shaft(self, painter: QPainter) -> None:
        """The shaft itself with its band, ticks and what is chosen of it."""
        stage = self.stage
        if not stage.shaft.segments:
            self._paint_empty_axis(painter)
            return
        self._paint_station_line(painter)
        draw_metal(painter, stage)
        if stage.scene.results is not None:
            draw_band(painter, stage, self.colours)
        draw_edges(painter, stage)
        if stage.scene.results is not None:
            draw_ticks(painter, stage, self.columns)
        self._paint_chosen(painter)

    def paint_over(self, painter: QPainter) -> None:
        """Marks and their words, dimensions of a chosen segment, what to do next, the foot."""
        stage = self.stage
        draw_glyphs(painter, stage, self.marks.glyphs)
        draw_callouts(painter, stage, self.letters, self.marks.callouts)
        index = chosen_segment(stage)
        if index is not None:
            draw_segment_dimensions(painter, stage, self.letters, index)
        self._paint_hint(painter)
        draw_foot(painter, stage, self.letters, self.numbers)

    def paint_words(self, painter: QPainter) -> None:
        """The words of the chosen raiser, which change with it."""
        draw_callouts(painter, self.stage, self.letters, self.words)

    def _paint_station_line(self, painter: QPainter) -> None:
        """From the chosen station down to its number."""
        stage, x = self.stage, self.station_x
        if x is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
        painter.setPen(hairline(stage.theme.accent))
        painter.drawLine(QLineF(x, stage.frame.axis, x, stage.foot))

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


def _hung_on(stage: Stage) -> tuple[object, ...]:
    """View, choice, plain sizes, loads and supports: marks and words hang on these, not on raisers and fillets."""
    scene, shaft = stage.scene, stage.shaft
    plain = tuple((s.id, s.length, s.diameter, s.right_diameter, s.bore) for s in shaft.segments)
    look = stage.frame, stage.theme, stage.pixel_ratio, scene.system, scene.live
    return look, plain, shaft.supports, shaft.loads, scene.chosen, scene.missing, scene.results is None
