"""The picture of the traces from one scene to the next: what is kept, what is drawn anew and when."""

from collections.abc import Sequence
from typing import TYPE_CHECKING

from PySide6.QtGui import QPainter, QPixmap

from app.document import Scene
from app.traces.bands import bands_of
from app.traces.heads import Head, heads_of, paint_still
from app.traces.limits import Scale, scales_of
from app.traces.live import LivePainter, changed_tracks
from app.traces.overlay import paint_second_scale
from app.traces.pace import Pace
from app.traces.plots import Frame, Plot, View
from app.traces.tracks import Curve, Track, curves_of
from shaftcore.results import Results

if TYPE_CHECKING:
    from app.traces.frame import Chart

Curves = list[tuple[Curve, ...]]

GROWTH_INTERVAL = 0.2
"""Seconds between two full redraws under a drag, when lines leave their axes."""


class Picture:
    """Frame, ghost and live curves. `take` a scene, then `paint`; a full draw happens only within `paint`."""

    def __init__(self, tracks: Sequence[Track]) -> None:
        self.tracks = tuple(tracks)
        self.weights: dict[str, float] = {}
        self.frame: Frame | None = None
        self.heads: tuple[Head, ...] = ()
        self.curves: Curves = []
        self.pace = Pace(GROWTH_INTERVAL)
        self._scales: dict[str, tuple[Scale, ...]] = {}
        self._results: Results | None = None
        self._live = False
        self._ghost: Curves = []
        self._ghosted: QPixmap | None = None
        self._painter = LivePainter()
        self._chart: Chart | None = None

    # scenes -----------------------------------------------------------------------------------------

    def take(self, scene: Scene) -> list[int] | None:
        """Take what a scene shows; the tracks to be painted again, or None for all of them."""
        began = scene.live and not self._live
        if scene.results is self._results and scene.live == self._live and self._same_system(scene):
            return []
        before, self._live, self._results = self.curves, scene.live, scene.results
        self.curves = self._curves_of(scene)
        if not scene.live:
            self.frame = None
            return None
        if began:
            self._ghost, self._ghosted = before, None
        if began or self.frame is None:
            return None
        return changed_tracks(before, self.curves)

    def _same_system(self, scene: Scene) -> bool:
        return self.frame is not None and self.frame.view.system == scene.system

    def _curves_of(self, scene: Scene) -> Curves:
        if scene.results is None:
            return []
        return [curves_of(track, scene.results, scene.system) for track in self.tracks]

    def show_tracks(self, tracks: Sequence[Track], scene: Scene) -> None:
        self.tracks = tuple(tracks)
        self.frame, self._ghost = None, []
        self.curves = self._curves_of(scene)

    def outgrown(self) -> bool:
        """True where a live line leaves its axis, or a line has come or gone."""
        return self.frame is not None and any(
            scales_of(plot.track, curves, self.frame.view.system, plot.scales, live=True) != plot.scales
            or [curve.line for curve in curves] != [curve.line for curve in plot.curves]
            for plot, curves in zip(self.frame.plots, self.curves, strict=True)
        )

    def grow(self) -> bool:
        """Let the next painting draw a wider frame, if the last time is long enough ago."""
        if not self.pace.take():
            return False
        self.frame = None
        return True

    # painting ---------------------------------------------------------------------------------------

    def ready(self, view: View) -> Frame:
        """The frame for a view, drawn anew in full where the one at hand does not serve."""
        bands = bands_of([track.key for track in self.tracks], self.weights, view.height)
        frame = self.frame
        if frame is None or frame.view != view or tuple(plot.band for plot in frame.plots) != bands:
            frame = self._draw(view)
            self.frame, self._ghosted = frame, None
        return frame

    def _draw(self, view: View) -> Frame:
        # here, so that the plotting library is loaded only once there is something to plot
        from app.traces.frame import Chart

        bands = bands_of([track.key for track in self.tracks], self.weights, view.height)
        plots = [
            Plot(track, band, curves, self._scales_for(track, curves, view))
            for track, band, curves in zip(self.tracks, bands, self.curves, strict=True)
        ]
        if self._chart is None or not self._chart.serves(plots, view):
            self._chart = Chart(plots, view)
        frame = self._chart.draw(plots, view)
        self.heads = heads_of(plots, view)
        for pixmap in (frame.bare, frame.full):
            painter = QPainter(pixmap)
            paint_still(painter, self.heads, view)
            painter.end()
        return frame

    def _scales_for(self, track: Track, curves: Sequence[Curve], view: View) -> tuple[Scale, ...]:
        key = f"{track.key} {view.system}"
        self._scales[key] = scales_of(track, curves, view.system, self._scales.get(key, ()), self._live)
        return self._scales[key]

    def paint(self, painter: QPainter, frame: Frame, indices: Sequence[int]) -> None:
        """The still picture; during a drag the ghost and, for the given tracks, the live lines."""
        if self._live and self._ghosted is None:
            self._ghosted = self._with_ghost(frame)
        painter.drawPixmap(0, 0, self._ghosted if self._live and self._ghosted is not None else frame.full)
        for index in indices:
            if self._live:
                self._painter.paint(painter, frame, index, self.curves[index])
            paint_second_scale(painter, frame, index)

    def _with_ghost(self, frame: Frame) -> QPixmap:
        pixmap = frame.bare.copy()
        painter = QPainter(pixmap)
        for index, curves in enumerate(self._ghost):
            shown = [
                curve for curve in curves if curve.line.dimension in {s.dimension for s in frame.plots[index].scales}
            ]
            self._painter.paint(painter, frame, index, shown, pale=True)
        painter.end()
        return pixmap
