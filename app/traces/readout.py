"""What is read off the traces at this moment: at the pointer, or else at the chosen station."""

from collections.abc import Sequence
from dataclasses import dataclass

from PySide6.QtGui import QPainter, QRegion

from app.document import Scene
from app.ruler import LEFT_MARGIN, RIGHT_MARGIN, Ruler
from app.traces.heads import Head, paint_numbers
from app.traces.overlay import paint_hairline, paint_place, paint_rings, place_words
from app.traces.plots import Frame
from app.traces.reading import least_text, nearest_station, station_text
from app.traces.tracks import Curve, Track
from shaftcore.results import Results

NEAR_STATION = 6.0
"""Pixels within which the hairline counts as being at a station."""


@dataclass(frozen=True)
class Readout:
    """A scene with results, and the x (mm) pointed at, or None."""

    scene: Scene
    results: Results
    hovered: float | None
    ruler: Ruler

    @property
    def place(self) -> float | None:
        """x (mm) where every track is read."""
        if self.hovered is not None or self.scene.station is None:
            return self.hovered
        return self.results.stations[self.scene.station].x

    @property
    def station(self) -> int | None:
        """The station under the hairline, or the chosen one where nothing is pointed at."""
        if self.hovered is None:
            return self.scene.station
        near = nearest_station(self.results, self.hovered)
        if near is None or abs(self.results.stations[near].x - self.hovered) * self.ruler.scale > NEAR_STATION:
            return None
        return near

    def note(self, track: Track) -> str:
        """What stands at the right of a track's head: the station's own values, or the least margin."""
        words = "" if self.station is None else station_text(track, self.results, self.station, self.scene.system)
        return words or (least_text(self.results, self.scene.system) if track.capped else "")

    def paint(
        self,
        painter: QPainter,
        frame: Frame,
        heads: Sequence[Head],
        curves: list[tuple[Curve, ...]],
        region: QRegion,
    ) -> None:
        """Hairlines and rings over the plots, the numbers in those heads that lie in the region."""
        chosen = self.scene.station
        if chosen is not None and self._in_sight(frame, self.results.stations[chosen].x):
            paint_hairline(painter, frame, self.ruler.to_px(self.results.stations[chosen].x), chosen=True)
            paint_rings(painter, frame, curves, chosen)
        if self.hovered is not None and self._in_sight(frame, self.hovered):
            paint_hairline(painter, frame, self.ruler.to_px(self.hovered), chosen=False)
        for head in heads:
            if region.intersects(head.rect(0.0, frame.view.width).toAlignedRect()):
                paint_numbers(painter, head, frame.view, self.results, self.place, self.note(head.plot.track))
        place = self.place
        if place is not None and self._in_sight(frame, place):
            number = None if self.station is None else self.results.stations[self.station].number
            paint_place(painter, frame, self.ruler.to_px(place), place_words(frame, place, number))

    def _in_sight(self, frame: Frame, x: float) -> bool:
        return LEFT_MARGIN - 0.5 <= self.ruler.to_px(x) <= frame.view.width - RIGHT_MARGIN + 0.5
