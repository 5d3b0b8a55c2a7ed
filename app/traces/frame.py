"""The still part of the traces, drawn by matplotlib into pixmaps: axes, ticks, numbers, settled lines.

One pass yields two pictures: the bare frame, over which live lines are painted during a drag, and
the same with the settled lines in it. Importing this module loads the plotting library; the
window does so only once it is up.
"""

from collections.abc import Sequence

import matplotlib
import numpy as np
from matplotlib.axes import Axes
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.figure import Figure
from matplotlib.lines import Line2D
from matplotlib.ticker import FixedFormatter, FixedLocator, MaxNLocator
from PySide6.QtGui import QImage, QPixmap

from app.number_text import shown
from app.ruler import LEFT_MARGIN, RIGHT_MARGIN
from app.theme import FAMILY
from app.traces.bands import Band
from app.traces.limits import Scale
from app.traces.plots import MARK_SIZE, Frame, Mapping, Plot, View
from app.traces.tracks import Curve
from shaftcore.notches._contract import Array
from shaftcore.units import dimension

DPI = 96.0
"""Pixels of a logical inch: a point of type is as large as in the widgets beside."""
POINT = DPI / 72
NUMBER_SIZE = 8.0


def draw_frame(plots: Sequence[Plot], view: View) -> Frame:
    """The whole picture anew: some tens of milliseconds, so not for every step of a drag."""
    with matplotlib.rc_context({"font.family": FAMILY, "lines.scale_dashes": False}):
        return Drawing(view, tuple(plots)).frame()


class Drawing:
    """One pass of the plotting library over all tracks."""

    def __init__(self, view: View, plots: tuple[Plot, ...]) -> None:
        self._view, self._plots = view, plots
        self._wide, self._high = round(view.width * view.ratio), round(view.height * view.ratio)
        dpi = DPI * view.ratio
        self._figure = Figure((self._wide / dpi, self._high / dpi), dpi, facecolor=view.theme.paper)
        self._canvas = FigureCanvasAgg(self._figure)
        self._settled: list[tuple[Axes, Line2D]] = []
        self._x_ticks, self._x_labels = self._along()
        self._axes = [self._add_track(plot) for plot in plots]

    def frame(self) -> Frame:
        self._canvas.draw()  # type: ignore[no-untyped-call]
        bare = self._picture()
        for axes, line in self._settled:
            axes.draw_artist(line)
        mappings = tuple(tuple(self._mapping(axes) for axes in of_track) for of_track in self._axes)
        second = tuple(self._second(plot, found) for plot, found in zip(self._plots, mappings, strict=True))
        return Frame(self._view, self._plots, bare, self._picture(), mappings, second)

    def _second(self, plot: Plot, mappings: Sequence[Mapping]) -> tuple[tuple[float, str], ...]:
        """Height and words of every number of the second scale; its zero is the first one's."""
        if len(mappings) < 2:
            return ()
        ticks = _value_ticks(plot.scales[1], plot.band.height)
        heights = mappings[1].y0 + ticks * mappings[1].ky
        return tuple((y, text) for y, tick, text in zip(heights.tolist(), ticks, _labels(ticks), strict=True) if tick)

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

    def _along(self) -> tuple[Array, list[str]]:
        """Ticks of the x axis, mm, and what stands beside them in the unit shown."""
        view = self._view
        unit = dimension("length").unit(view.system)
        ticks = _inner_ticks((unit.shown(view.begin), unit.shown(view.end)), max(2, int(view.width / 130)))
        return (ticks - unit.zero) * unit.factor, _labels(ticks)

    def _add_track(self, plot: Plot) -> list[Axes]:
        left = self._add_axes(plot.band)
        self._dress(left, plot)
        axes = [left]
        for scale in plot.scales[1:]:
            right = self._add_axes(plot.band)
            right.set_ylim(*scale.limits)
            right.yaxis.set_major_locator(FixedLocator([]))
            axes.append(right)
        for curve in plot.curves:
            index = plot.scale_of(curve)
            self._settle(axes[index], curve, plot.scales[index])
        return axes

    def _add_axes(self, band: Band) -> Axes:
        """Axes from margin to margin, see-through, so that those for a second scale can lie over the first."""
        wide, high, ratio = self._wide, self._high, self._view.ratio
        across = (self._view.width - LEFT_MARGIN - RIGHT_MARGIN) * ratio
        box = (
            LEFT_MARGIN * ratio / wide,
            1 - band.plot_bottom * ratio / high,
            across / wide,
            band.height * ratio / high,
        )
        axes = self._figure.add_axes(box)
        axes.patch.set_visible(False)
        axes.set_xlim(self._view.begin, self._view.end)
        for side in ("left", "right", "top", "bottom"):
            axes.spines[side].set_visible(False)
        axes.tick_params(length=0, labelsize=NUMBER_SIZE, labelcolor=self._view.theme.faint, pad=5)
        axes.xaxis.set_major_locator(FixedLocator([]))
        return axes

    def _dress(self, axes: Axes, plot: Plot) -> None:
        theme, scale = self._view.theme, plot.scales[0]
        axes.set_ylim(*scale.limits)
        ticks = _value_ticks(scale, plot.band.height)
        axes.yaxis.set_major_locator(FixedLocator(ticks.tolist()))
        axes.yaxis.set_major_formatter(FixedFormatter(_labels(ticks, scale.cap)))
        labels = self._x_labels if plot is self._plots[-1] else [""] * len(self._x_labels)
        axes.xaxis.set_major_locator(FixedLocator(self._x_ticks.tolist()))
        axes.xaxis.set_major_formatter(FixedFormatter(labels))
        axes.grid(True, color=theme.rule, linewidth=0.5 / POINT)
        axes.axhline(0.0, color=theme.faint, linewidth=1.0 / POINT)

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
        self._settled.append((axes, line))


def _inner_ticks(limits: tuple[float, float], most: int) -> Array:
    """Round numbers inside the limits."""
    ticks = np.asarray(MaxNLocator(nbins=most, steps=[1, 2, 2.5, 5, 10]).tick_values(*limits))
    inside = ticks[(ticks >= limits[0]) & (ticks <= limits[1])]
    return np.where(np.abs(inside) < 1e-9 * max(map(abs, limits)), 0.0, inside)


def _value_ticks(scale: Scale, height: float) -> Array:
    ticks = _inner_ticks(scale.limits, max(1, int(height / 17)))
    if scale.cap is None:
        return ticks
    step = ticks[1] - ticks[0] if len(ticks) > 1 else scale.cap
    return np.append(ticks[ticks < scale.cap - 0.4 * step], scale.cap)


def _labels(ticks: Array, cap: float | None = None) -> list[str]:
    """Numbers with no more decimals than their step needs; the end of a capped axis says what it is."""
    step = float(np.diff(ticks).min()) if len(ticks) > 1 else abs(float(ticks[0])) if len(ticks) else 1.0
    decimals = max(0, -int(np.floor(np.log10(step) + 1e-9))) if step > 0 else 0
    if step > 0 and abs(step * 10**decimals - round(step * 10**decimals)) > 1e-6:
        decimals += 1
    words = [shown(float(tick), "ratio", "SI", decimals) for tick in ticks]
    return [f"≥ {text}" if cap is not None and tick == cap else text for tick, text in zip(ticks, words, strict=True)]
