"""Supports and loads on the drawing, after the simplified symbols of the open drawing standards.

Rolling bearings: a rectangle with an upright cross standing free in it (ISO 8826-1). Forces: arrows;
those along the line of sight a circle with a dot (towards the viewer) or a cross (away).
"""

from collections.abc import Callable, Iterator
from typing import Any

import numpy as np
from matplotlib.collections import LineCollection
from matplotlib.patches import Circle, Rectangle

from shaftcore.geometry import faces_of
from shaftcore.results import Results
from shaftcore.shaft import AxialForce, RadialForce, Torque
from shaftcore.sheet.chart_page import letters
from shaftcore.sheet.givens import load_marks, support_marks
from shaftcore.sheet.palette import INK, LEAD, RUST, TEAL, VIOLET
from shaftcore.sheet.sheetwise import Sheetwise
from shaftcore.sheet.spread import TAG, spread

ARROW = 11.0
CLEARANCE = 12.5
"""Room (mm) below the shaft for arrows before the leads spread."""
BOX = (6.4, 5.4)
"""Width and height (mm) of a bearing where there is room."""
SPRING, FOLDS = 3.4, 5
"""Height (mm) of the sign of a springy support, and of how many folds it is."""
SEEN = 0.05
"""Share of a force below which its part in one plane is not drawn."""


def draw_supports(axes: Any, at: Sheetwise, results: Results) -> None:
    """Each bearing above and below the shaft; the locating one with cheeks at its sides, a springy one on folds."""
    faces = np.array(faces_of(results.shaft))
    for support in results.shaft.supports:
        x, r = float(at.x(support.x)), at.edge(support.x)
        away = np.abs(faces - support.x)
        near = float(away[away > 1e-6].min()) * at.scale if (away > 1e-6).any() else BOX[0]
        half = max(min(BOX[0] / 2, near), 1.4)
        for sign in (-1, 1):
            low = at.middle + (r if sign > 0 else -r - BOX[1])
            _bearing(axes, x, low, half, support.locating)
            if support.stiffness is not None:
                _spring(axes, x, low + (BOX[1] if sign > 0 else 0.0), sign)


def _bearing(axes: Any, x: float, low: float, half: float, locating: bool) -> None:
    axes.add_patch(Rectangle((x - half, low), 2 * half, BOX[1], fc="white", ec=INK, lw=0.7, zorder=5))
    arm, middle = 0.55 * min(half, BOX[1] / 2), low + BOX[1] / 2
    cross = [[(x - arm, middle), (x + arm, middle)], [(x, middle - arm), (x, middle + arm)]]
    axes.add_collection(LineCollection(cross, colors=INK, linewidths=0.8, zorder=6))
    if locating:
        cheeks = [[(x + s * (half + 0.8), low), (x + s * (half + 0.8), low + BOX[1])] for s in (-1, 1)]
        axes.add_collection(LineCollection(cheeks, colors=INK, linewidths=1.3, zorder=6))


def _spring(axes: Any, x: float, y: float, sign: int) -> None:
    """Folds that widen from the bearing to a line of ground beyond it."""
    folds = np.arange(FOLDS + 1)
    wide = np.where(folds % 2, 1.0, -1.0) * (0.6 + 0.22 * folds)
    wide[[0, -1]] = 0.0
    axes.plot(x + wide, y + sign * SPRING * folds / FOLDS, color=INK, lw=0.7, zorder=5)
    axes.plot([x - 2.2, x + 2.2], [y + sign * SPRING] * 2, color=INK, lw=0.9, zorder=5)


def draw_loads(axes: Any, at: Sheetwise, results: Results) -> None:
    """Symbols of all loads, and the marks of supports and loads below."""
    for load in results.shaft.loads:
        _SYMBOLS[type(load)](axes, at, load)
    _marks(axes, at, results)


def _radial(axes: Any, at: Sheetwise, load: RadialForce) -> None:
    x, r = float(at.x(load.x)), at.edge(load.x)
    angle, sense = np.radians(load.angle), np.sign(load.force) or 1.0
    up, near = float(np.cos(angle) * sense), float(np.sin(angle) * sense)
    if abs(up) > SEEN:
        long = max(ARROW * abs(up), 4.0)
        tip = at.middle - np.sign(up) * r
        _arrow(axes, (x, tip - np.sign(up) * long), (x, tip), RUST)
    if abs(near) > SEEN:
        axes.add_patch(Circle((x, at.middle), 1.7, fc="white", ec=RUST, lw=0.9, zorder=7))
        if near > 0:
            axes.add_patch(Circle((x, at.middle), 0.55, fc=RUST, ec="none", zorder=8))
        else:
            arm = 1.7 * 0.707
            cross = [[(x - arm, at.middle + s * arm), (x + arm, at.middle - s * arm)] for s in (-1, 1)]
            axes.add_collection(LineCollection(cross, colors=RUST, linewidths=0.9, zorder=8))


def _torque(axes: Any, at: Sheetwise, load: Torque) -> None:
    """A bow round the shaft; its head is above where the torque goes in, below where it comes out."""
    x, wide, high = float(at.x(load.x)), 3.4, at.edge(load.x) + 4.4
    end = np.arcsin((high - 1.2) / high)
    turn = np.linspace(-end, end, 41)
    bow = np.column_stack([x + wide * np.cos(turn), at.middle + high * np.sin(turn)])
    axes.plot(*bow.T, color=VIOLET, lw=1.0, zorder=7, solid_capstyle="round")
    order = bow if (load.torque or load.amplitude) >= 0 else bow[::-1]
    _arrow(axes, tuple(order[-2]), tuple(order[-1]), VIOLET)


def _axial(axes: Any, at: Sheetwise, load: AxialForce) -> None:
    """An arrow along the shaft, a little below the axis so that it hides nothing there."""
    x, y = float(at.x(load.x)), at.middle - 0.45 * at.edge(load.x)
    sense = np.sign(load.force) or 1.0
    _arrow(axes, (x - sense * ARROW, y), (x, y), TEAL)


_SYMBOLS: dict[type, Callable[[Any, Sheetwise, Any], None]] = {
    RadialForce: _radial,
    Torque: _torque,
    AxialForce: _axial,
}


def _arrow(axes: Any, tail: tuple[float, float], tip: tuple[float, float], colour: str) -> None:
    style = {"arrowstyle": "-|>,head_width=0.2,head_length=0.5", "color": colour, "lw": 1.0, "shrinkA": 0, "shrinkB": 0}
    axes.annotate("", xy=tip, xytext=tail, arrowprops={**style, "mutation_scale": 12}, zorder=7)


def _tagged(results: Results) -> Iterator[tuple[float, str, str]]:
    for mark, support in zip(support_marks(results), results.shaft.supports, strict=True):
        yield support.x, mark, INK
    colour = {RadialForce: RUST, Torque: VIOLET, AxialForce: TEAL}
    for mark, load in zip(load_marks(results), results.shaft.loads, strict=True):
        yield load.x, mark, colour[type(load)]


def _marks(axes: Any, at: Sheetwise, results: Results) -> None:
    """L and B marks in rows under the shaft, each led to its place."""
    tags = sorted(_tagged(results), key=lambda tag: tag[0])
    tags = tags[:: -(-int(len(tags) * TAG) // int(at.tag_rows * at.width))]
    want = at.x(np.array([x for x, _, _ in tags]))
    places = spread(want, TAG / at.tag_rows, 4.0, at.width - 4.0)
    high = at.middle - at.half - CLEARANCE
    leads = []
    for i, ((along, mark, colour), x, place) in enumerate(zip(tags, want, places, strict=True)):
        down = high - 3.5 - 4.6 * (i % at.tag_rows)
        leads.append([(x, at.middle - at.edge(along)), (x, high), (place, high - 2.6), (place, down)])
        axes.text(
            place, down - 0.4, mark, ha="center", va="top", color=colour, fontproperties=letters(6.2, True), zorder=8
        )
    axes.add_collection(LineCollection(leads, colors=LEAD, linewidths=0.35, zorder=1))
