"""The still part of the traces, drawn by matplotlib into pixmaps: axes, ticks, numbers, settled lines.

One pass yields two pictures: the bare frame, over which live lines are painted during a drag, and
the same with the settled lines in it. Importing this module loads the plotting library; the
window does so only once it is up.
"""

from collections.abc import Sequence
from typing import Any

import matplotlib
from matplotlib.axes import Axes
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.figure import Figure
from matplotlib.lines import Line2D
from matplotlib.ticker import FixedFormatter, FixedLocator
from PySide6.QtGui import QImage, QPixmap

from app.ruler import LEFT_MARGIN, RIGHT_MARGIN
from app.theme import FAMILY
from app.traces.bands import Band
from app.traces.limits import Scale
from app.traces.plots import MARK_SIZE, Frame, Mapping, Plot, View
from app.traces.ticks import LEAST_APART, inner_ticks, labels, value_ticks
from app.traces.tracks import Curve
from shaftcore.notches._contract import Array
from shaftcore.units import dimension

DPI = 96.0
"""Pixels of a logical inch: a point of type is as large as in the widgets beside."""
POINT = DPI / 72
NUMBER_SIZE = 8.0
PIXELS_PER_X_TICK = 130


class Chart:
    """The plotting library's figure for one arrangement of tracks; making it costs more than drawing it."""

    def __init__(self, plots: Sequence[Plot], view: View) -> None:
        self._made_for = _arrangement(plots, view)
        self._view = view
        self._wide, self._high = round(view.width * view.ratio), round(view.height * view.ratio)
        self._lines: list[tuple[Axes, Line2D]] = []
        with _style():
            dpi = DPI * view.ratio
            self._figure = Figure((self._wide / dpi, self._high / dpi), dpi, facecolor=view.theme.paper)
            self._canvas = FigureCanvasAgg(self._figure)
            self._axes = [self._add_track(plot) for plot in plots]

    def serves(self, plots: Sequence[Plot], view: View) -> bool:
        """True where only lines, limits and numbers differ from what the figure was made for."""
        return self._made_for == _arrangement(plots, view)

    def draw(self, plots: Sequence[Plot], view: View) -> Frame:
        """The whole picture anew: some tens of milliseconds, so not for every step of a drag."""
        self._view = view
        with _style():
            self._set(plots)
            self._canvas.draw()  # type: ignore[no-untyped-call]
            bare = self._picture()
            for axes, line in self._lines:
                axes.draw_artist(line)
        mappings = tuple(tuple(self._mapping(axes) for axes in of_track) for of_track in self._axes)
        second = tuple(_second_numbers(plot, found) for plot, found in zip(plots, mappings, strict=True))
        return Frame(view, tuple(plots), bare, self._picture(), mappings, second)

    # making --------------------------------------------------------------------------------------

    def _add_track(self, plot: Plot) -> list[Axes]:
        theme = self._view.theme
        first, *others = [self._add_axes(plot.band) for _ in plot.scales]
        first.grid(True, color=theme.rule, linewidth=0.5 / POINT)
        # on the margin's track zero parts what holds from what fails
        first.axhline(0.0, color=theme.ink if plot.track.capped else theme.faint, linewidth=1.0 / POINT)
        for axes in others:
            axes.xaxis.set_visible(False)
            axes.yaxis.set_visible(False)
        return [first, *others]

    def _add_axes(self, band: Band) -> Axes:
        """Axes from margin to margin, see-through, so that those for a second scale can lie over the first."""
        wide, high, ratio = self._wide, self._high, self._view.ratio
        across = (self._view.width - LEFT_MARGIN - RIGHT_MARGIN) * ratio
        bottom = 1 - band.plot_bottom * ratio / high
        axes = self._figure.add_axes((LEFT_MARGIN * ratio / wide, bottom, across / wide, band.height * ratio / high))
        axes.patch.set_visible(False)
        axes.set_autoscale_on(False)
        for side in ("left", "right", "top", "bottom"):
            axes.spines[side].set_visible(False)
        axes.tick_params(length=0, labelsize=NUMBER_SIZE, labelcolor=self._view.theme.faint, pad=5)
        return axes

    # drawing -------------------------------------------------------------------------------------

    def _set(self, plots: Sequence[Plot]) -> None:
        for _, line in self._lines:
            line.remove()
        self._lines.clear()
        x_ticks, x_labels = self._along()
        for plot, of_track in zip(plots, self._axes, strict=True):
            for axes, scale in zip(of_track, plot.scales, strict=True):
                axes.set_xlim(self._view.begin, self._view.end)
                axes.set_ylim(*scale.limits)
            self._number(of_track[0], plot, x_ticks, x_labels if plot is plots[-1] else [""] * len(x_labels))
            for curve in plot.curves:
                index = plot.scale_of(curve)
                self._settle(of_track[index], curve, plot.scales[index])

    def _along(self) -> tuple[Array, list[str]]:
        """Ticks of the x axis, mm, and what stands beside them in the unit shown."""
        view = self._view
        unit = dimension("length").unit(view.system)
        most = max(2, int(view.width / PIXELS_PER_X_TICK))
        ticks = inner_ticks((unit.shown(view.begin), unit.shown(view.end)), most)
        return (ticks - unit.zero) * unit.factor, labels(ticks)

    def _number(self, axes: Axes, plot: Plot, x_ticks: Array, x_labels: list[str]) -> None:
        ticks = value_ticks(plot.scales[0], plot.band.height)
        axes.yaxis.set_major_locator(FixedLocator(ticks.tolist()))
        axes.yaxis.set_major_formatter(FixedFormatter(labels(ticks, plot.scales[0].cap)))
        axes.xaxis.set_major_locator(FixedLocator(x_ticks.tolist()))
        axes.xaxis.set_major_formatter(FixedFormatter(x_labels))

    def _settle(self, axes: Axes, curve: Curve, scale: Scale) -> None:
        """A settled line and its marks; `animated` keeps them out of the bare frame."""
        theme, line = self._view.theme, curve.line
        ink = theme.traces[line.ink]
        dash = (0, tuple(step / POINT for step in line.dash)) if line.dash else "solid"
        self._keep(axes, curve.x, curve.y, color=ink, linewidth=line.weight / POINT, linestyle=dash)
        if not curve.mark_x.size:
            return
        y = scale.pinned(curve.mark_y)
        over = y < curve.mark_y
        face = theme.paper if line.dash else ink
        size = {"markersize": MARK_SIZE / POINT, "markeredgewidth": 1.0 / POINT}
        look = {"linestyle": "none", "color": ink, "markerfacecolor": face, **size}
        self._keep(axes, curve.mark_x[~over], y[~over], marker="o", **look)
        self._keep(axes, curve.mark_x[over], y[over], marker="^", **look)

    def _keep(self, axes: Axes, x: Array, y: Array, **look: object) -> None:
        (line,) = axes.plot(x, y, animated=True, **look)  # type: ignore[arg-type]
        self._lines.append((axes, line))

    def _picture(self) -> QPixmap:
        """The canvas as it is now; the copy into the screen's format makes it our own."""
        pixels = self._canvas.buffer_rgba()  # type: ignore[no-untyped-call]
        image = QImage(pixels, self._wide, self._high, QImage.Format.Format_RGBX8888)
        pixmap = QPixmap.fromImage(image.convertToFormat(QImage.Format.Format_RGB32))
        pixmap.setDevicePixelRatio(self._view.ratio)
        return pixmap

    def _mapping(self, axes: Axes) -> Mapping:
        (left, low), (right, high) = axes.transData.transform([(0.0, 0.0), (1.0, 1.0)])
        ratio = self._view.ratio
        return Mapping(left / ratio, (right - left) / ratio, (self._high - low) / ratio, (low - high) / ratio)


def _style() -> Any:
    return matplotlib.rc_context({"font.family": FAMILY, "lines.scale_dashes": False})


def _arrangement(plots: Sequence[Plot], view: View) -> tuple[object, ...]:
    return view.width, view.height, view.ratio, view.theme, tuple((plot.band, len(plot.scales)) for plot in plots)


def _second_numbers(plot: Plot, mappings: Sequence[Mapping]) -> tuple[tuple[float, str], ...]:
    """Height and words of every number of the second scale; its zero is the first one's."""
    if len(mappings) < 2:
        return ()
    ticks = value_ticks(plot.scales[1], plot.band.height, 2 * LEAST_APART)
    heights = mappings[1].y0 + ticks * mappings[1].ky
    return tuple((y, text) for y, tick, text in zip(heights.tolist(), ticks, labels(ticks), strict=True) if tick)
