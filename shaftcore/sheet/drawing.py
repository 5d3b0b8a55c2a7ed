"""The shaft to scale: outline, numbered stations, supports and loads, utilisation along the edge."""

from itertools import pairwise
from typing import Any

import numpy as np
from matplotlib.collections import LineCollection, PolyCollection
from matplotlib.figure import Figure
from matplotlib.ticker import MaxNLocator

from shaftcore.notch_sites import seatings
from shaftcore.notches._contract import Array
from shaftcore.number_text import shown, unit_symbol
from shaftcore.outline import bore_outline
from shaftcore.results import Results
from shaftcore.sheet.chart_page import bare, figure, letters
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.palette import FAINT, INK, LEAD, METAL, TEAL
from shaftcore.sheet.sheetwise import CLEAR, ROW, Sheetwise
from shaftcore.sheet.spread import spread
from shaftcore.sheet.symbols import draw_loads, draw_supports
from shaftcore.sheet.utilisation_band import FULL, band_stretches, colours

SHORTEST, TALLEST = 42.0, 64.0
"""Between which heights (mm) a thick shaft is drawn, as the page has room."""
AROUND = 70.0
"""Height (mm) of all that stands above and below the shaft in the drawing, about."""
BAND = 1.5
"""Width (mm) of the utilisation band."""
LEAST_STRETCH = 1.6
"""Length (mm) on paper below which a raiser's stretch would not be seen."""


def shaft_drawing(edition: Edition, width: float, height: float) -> tuple[Figure, float]:
    """The figure and its height (mm) for a width in mm, about as high as `height` or lower."""
    results = edition.results
    at = Sheetwise(results, width, min(max(height - AROUND, SHORTEST), TALLEST))
    drawn = figure(width, at.height)
    axes = bare(drawn.add_axes((0, 0, 1, 1)))
    axes.set_xlim(0, width)
    axes.set_ylim(0, at.height)
    _body(axes, at, results)
    _band(axes, at, results)
    _numbers(axes, at, results)
    draw_supports(axes, at, results)
    draw_loads(axes, at, results)
    _ruler(axes, at, edition)
    _key(drawn, at)
    return drawn, at.height


def _body(axes: Any, at: Sheetwise, results: Results) -> None:
    x, r = at.outline.T
    closed = np.vstack([at.outline, np.column_stack([x, -r])[::-1]]) + np.array([0.0, at.middle])
    axes.fill(*closed.T, facecolor=METAL, edgecolor="none", zorder=2)
    axes.fill(*closed.T, facecolor="none", edgecolor=INK, linewidth=0.8, joinstyle="round", zorder=5)
    edges = []
    for seating in seatings(results.shaft):
        outline = at.points(seating.kind.outline(seating.record, seating.around))
        top = outline[:, 1].max()
        ends = [at.x(seating.around.x)] if seating.kind.goes == "at a step" else outline[[0, -1], 0]
        edges += [[(end, at.middle - top), (end, at.middle + top)] for end in ends]
    axes.add_collection(LineCollection(edges, colors=INK, linewidths=0.45, zorder=4))
    bore = at.points(bore_outline(results.shaft))
    for begin in range(0, len(bore), 2):
        (x0, hole), (x1, _) = bore[begin : begin + 2]
        if hole > 0:
            for sign in (-1, 1):
                axes.plot([x0, x1], [at.middle + sign * hole] * 2, color=INK, lw=0.4, dashes=(11, 6), zorder=5)
    axes.plot([at.x(0) - 7, at.x(at.length) + 7], [at.middle] * 2, color=FAINT, lw=0.45, dashes=(44, 8, 6, 8), zorder=5)


def _band(axes: Any, at: Sheetwise, results: Results) -> None:
    edges, use = band_stretches(results, LEAST_STRETCH / at.scale)
    x = at.x(edges)
    nudge = 1e-9 * at.width
    r0, r1 = (np.interp(side, *at.outline.T) for side in (x[:-1] + nudge, x[1:] - nudge))
    deep = min(BAND, 0.35 * at.half)
    tints = colours(use)
    for sign in (-1, 1):
        corners = (x[:-1], r0), (x[1:], r1), (x[1:], r1 - deep), (x[:-1], r0 - deep)
        quads = np.stack([np.column_stack([along, at.middle + sign * r]) for along, r in corners], axis=1)
        axes.add_collection(PolyCollection(list(quads), facecolors=tints, edgecolors=tints, linewidths=0.15, zorder=3))
    _ticks(axes, at, x, use)


def _ticks(axes: Any, at: Sheetwise, x: Array, use: Array) -> None:
    """Short strokes across both edges of the outline where an asked factor is missed."""
    failing = use > 1
    places: list[float] = []
    for begin, end in zip(
        *(np.flatnonzero(np.diff(np.concatenate([[0], failing, [0]])) == s) for s in (1, -1)), strict=True
    ):
        count = max(int((x[end] - x[begin]) / 1.1), 2)
        places += np.linspace(x[begin], x[end], count + 1).tolist()
    radii = np.interp(places, *at.outline.T)
    strokes = [
        [(p - 0.35, at.middle + s * (r - 1.3)), (p + 0.35, at.middle + s * (r + 1.3))]
        for p, r in zip(places, radii, strict=True)
        for s in (-1, 1)
    ]
    axes.add_collection(LineCollection(strokes, colors=INK, linewidths=0.55, zorder=6))


def _numbers(axes: Any, at: Sheetwise, results: Results) -> None:
    """Station numbers above the shaft, each led to its place; the governing one set bold in a frame."""
    kept = [s for s in results.stations if s.number % at.every == 0 or s.number - 1 == results.governing]
    want = at.x(np.array([s.x for s in kept]))
    places = spread(want, at.gap / at.rows, 4.0, at.width - 4.0)
    low = at.middle + at.half + CLEAR
    leads = []
    for i, (station, x, place) in enumerate(zip(kept, want, places, strict=True)):
        up = low + 5.0 + ROW * (i % at.rows)
        foot = at.middle + at.edge(station.x)
        leads.append([(x, foot), (x, low), (place, low + 3.5), (place, up)])
        governs = station.number - 1 == results.governing
        axes.text(
            place, up + 0.5, str(station.number), ha="center", va="bottom", color=INK if governs else FAINT,
            fontproperties=letters(6.6 if governs else 6.0, governs), zorder=8,
            bbox={"boxstyle": "round,pad=0.22", "fc": "white", "ec": TEAL, "lw": 0.8} if governs else None,
        )  # fmt: skip
    axes.add_collection(LineCollection(leads, colors=LEAD, linewidths=0.35, zorder=1))
    axes.plot(want, [at.middle + at.edge(s.x) for s in kept], ".", color=INK, ms=1.6, zorder=7)


def _ruler(axes: Any, at: Sheetwise, edition: Edition) -> None:
    """The x scale under the drawing, in the reader's unit."""
    unit_size = edition.length_unit
    high = 15.5
    ticks = np.asarray(MaxNLocator(10, steps=[1, 2, 5, 10]).tick_values(0, at.length / unit_size))
    ticks = ticks[(ticks >= 0) & (ticks <= at.length / unit_size * (1 + 1e-9))]
    axes.plot(at.x([0, at.length]), [high, high], color=FAINT, lw=0.4)
    for tick in ticks:
        x = float(at.x(tick * unit_size))
        axes.plot([x, x], [high, high - 1.2], color=FAINT, lw=0.4)
        axes.text(x, high - 1.8, f"{tick:g}", ha="center", va="top", color=FAINT, fontproperties=letters(6))
    words = f"x, {unit_symbol('length', edition.system)}"
    axes.text(at.x(at.length) + 3, high, words, ha="left", va="center", color=FAINT, fontproperties=letters(6))
    ratio = f"scale about 1 : {1 / at.scale:.3g}" if at.scale < 1 else f"scale about {at.scale:.3g} : 1"
    length = shown(at.length, "length", edition.system)
    words = f"{ratio}, length {length} {unit_symbol('length', edition.system)}"
    if at.every > 1:
        words = f"one station in {at.every} is numbered; {words}"
    axes.text(at.width - 1, 5.0, words, ha="right", va="center", color=FAINT, fontproperties=letters(6))


def _key(drawn: Figure, at: Sheetwise) -> None:
    """The one scale of the utilisation band, along x, and what the strokes mean."""
    begin, long, y = 1.0, 60.0, 4.0
    key = drawn.add_axes((begin / at.width, y / at.height, long / at.width, 2.0 / at.height))
    steps = np.linspace(0, FULL, 51)
    quads = [[(a, 0), (b, 0), (b, 1), (a, 1)] for a, b in pairwise(steps)]
    tints = colours((steps[1:] + steps[:-1]) / 2)
    key.add_collection(PolyCollection(quads, facecolors=tints, edgecolors=tints, linewidths=0.15))
    key.set_xlim(0, FULL)
    key.set_ylim(0, 1)
    bare(key)
    for value in (0.0, 0.5, 1.0):
        key.text(
            value,
            -0.35,
            f"{value:.0%}",
            ha="center" if value else "left",
            va="top",
            color=FAINT,
            fontproperties=letters(5.6),
        )
    key.text(
        0,
        1.3,
        "utilisation, n asked over n (larger of fatigue and yield)",
        va="bottom",
        color=FAINT,
        fontproperties=letters(5.6),
    )
    words = "short strokes across the outline: an asked factor is missed"
    key.text(FULL * 1.08, 0.5, words, va="center", color=FAINT, fontproperties=letters(5.6))
