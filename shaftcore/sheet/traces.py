"""What runs along the shaft: moments, torque and axial force, stresses, margin, deflection and slope."""

from collections.abc import Callable
from typing import Any

import numpy as np
from matplotlib.figure import Figure
from matplotlib.ticker import MaxNLocator

from shaftcore.geometry import faces_of
from shaftcore.notches._contract import Array
from shaftcore.number_text import unit_symbol
from shaftcore.outline import upper_outline
from shaftcore.sheet.chart_page import bare, figure, letters
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.palette import FAINT, INK, METAL, RULE, RUST, TEAL, VIOLET
from shaftcore.units import dimension

LEFT, RIGHT, GAP, FOOT, STRIP = 17.0, 17.0, 6.5, 9.0, 12.0
MOST_MARGIN = 300.0
"""Margins above this (per cent) are drawn at the upper edge."""

SOLID, LONG, SHORT, DOTS = (None, (6, 2.2), (2.6, 1.6), (1, 1.6))


class Board:
    """The figure with tracks one above the other over one x."""

    def __init__(self, edition: Edition, width: float, height: float) -> None:
        self.edition, self.results = edition, edition.results
        self.size = (width, height)
        self.figure = figure(width, height)
        self.per = edition.length_unit
        self.length = self.results.shaft.length / self.per
        self.x = self.results.along.x / self.per
        self.station_x = np.array([s.x for s in self.results.stations]) / self.per

    def axes(self, low: float, high: float) -> Any:
        width, height = self.size
        made = self.figure.add_axes((LEFT / width, low / height, (width - LEFT - RIGHT) / width, (high - low) / height))
        made.set_xlim(-0.01 * self.length, 1.01 * self.length)
        made.patch.set_visible(False)
        return made

    def values(self, values: Array, dimension_name: str) -> Array:
        """Internal values in the reader's unit."""
        return values / dimension(dimension_name).unit(self.edition.system).factor

    def label(self, words: str, dimension_name: str) -> str:
        return f"{words}, {unit_symbol(dimension_name, self.edition.system)}"


def traces(edition: Edition, width: float, height: float) -> Figure:
    """The figure, width and height in mm."""
    board = Board(edition, width, height)
    _strip(board.axes(height - STRIP, height), board)
    room = (height - STRIP - FOOT) / len(_TRACKS)
    for i, track in enumerate(_TRACKS):
        low = FOOT + (len(_TRACKS) - 1 - i) * room
        axes = board.axes(low, low + room - GAP)
        _dress(axes, board, last=i == len(_TRACKS) - 1)
        track(axes, board)
    return board.figure


def _strip(axes: Any, board: Board) -> None:
    """The outline above the tracks, for orientation only."""
    x, r = upper_outline(board.results.shaft).T
    axes.fill(np.concatenate([x, x[::-1]]) / board.per, np.concatenate([r, -r[::-1]]), fc=METAL, ec=INK, lw=0.6)
    axes.plot([-0.01 * board.length, 1.01 * board.length], [0, 0], color=FAINT, lw=0.4, dashes=(22, 4, 3, 4))
    axes.set_ylim(-1.25 * r.max(), 1.25 * r.max())
    bare(axes)
    axes.text(
        1.005,
        0.5,
        "heights\nnot to scale",
        transform=axes.transAxes,
        va="center",
        color=FAINT,
        fontproperties=letters(5),
    )


def _dress(axes: Any, board: Board, last: bool) -> None:
    for side in ("top", "right"):
        axes.spines[side].set_visible(False)
    for side in ("left", "bottom"):
        axes.spines[side].set_linewidth(0.4)
        axes.spines[side].set_color(FAINT)
    _ticks(axes, FAINT)
    axes.xaxis.set_major_locator(MaxNLocator(12, steps=[1, 2, 5, 10]))
    axes.tick_params(axis="x", labelbottom=last)
    if last:
        axes.set_xlabel(board.label("x", "length"), fontproperties=letters(6.4), color=FAINT, labelpad=2)
    for face in faces_of(board.results.shaft):
        axes.axvline(face / board.per, color=RULE, lw=0.35, zorder=0)


def _ticks(axes: Any, colour: str) -> None:
    axes.tick_params(
        length=2, width=0.4, color=FAINT, labelsize=6, labelcolor=colour, labelfontfamily="DejaVu Sans", pad=1.5
    )
    axes.yaxis.set_major_locator(MaxNLocator(5, steps=[1, 2, 2.5, 5, 10]))
    axes.ticklabel_format(axis="y", useOffset=False, style="plain")


def _second(axes: Any, words: str, colour: str) -> Any:
    """A second scale at the right, in the colour of its line."""
    other = axes.twinx()
    for side in ("top", "left", "bottom"):
        other.spines[side].set_visible(False)
    other.spines["right"].set_linewidth(0.4)
    other.spines["right"].set_color(colour)
    _ticks(other, colour)
    other.set_ylabel(words, fontproperties=letters(6.2), color=colour, labelpad=3)
    return other


def _line(axes: Any, x: Array, y: Array, words: str, colour: str, dashes: Any = None, wide: float = 0.9) -> Any:
    style = {} if dashes is None else {"dashes": dashes}
    return axes.plot(x, y, color=colour, lw=wide, label=words, solid_joinstyle="round", zorder=3, **style)[0]


def _title(axes: Any, title: str, words: str, lines: list[Any]) -> None:
    axes.set_title(title, loc="left", fontproperties=letters(7, True), color=INK, pad=3.5)
    axes.set_ylabel(words, fontproperties=letters(6.2), color=FAINT, labelpad=3)
    axes.legend(
        handles=lines, loc="lower right", bbox_to_anchor=(1.0, 1.0), ncols=len(lines), frameon=False,
        borderaxespad=0.2, prop=letters(6.2), labelcolor=INK, handlelength=2.6, columnspacing=1.8, handletextpad=0.6,
    )  # fmt: skip


def _zero(axes: Any) -> None:
    axes.axhline(0, color=FAINT, lw=0.5, zorder=1)


def _moments(axes: Any, board: Board) -> None:
    mean, swing = (board.values(part, "torque") for part in board.results.along.moment)
    lines = [
        _line(axes, board.x, mean[0], "plane y (up)", TEAL, LONG),
        _line(axes, board.x, mean[1], "plane z (viewer)", RUST, SHORT),
        _line(axes, board.x, np.hypot(*mean), "resultant M", INK, wide=1.2),
    ]
    if np.any(swing):
        lines.append(_line(axes, board.x, np.hypot(*swing), "pulsation, resultant", VIOLET, DOTS))
    _zero(axes)
    _title(axes, "Bending moment", board.label("M", "torque"), lines)


def _torque(axes: Any, board: Board) -> None:
    loads = board.results.along
    lines = [_line(axes, board.x, board.values(loads.torque[0], "torque"), "torque T", INK, wide=1.2)]
    if np.any(loads.torque[1]):
        lines.append(_line(axes, board.x, board.values(loads.torque[1], "torque"), "amplitude of T", VIOLET, SHORT))
    _zero(axes)
    if np.any(loads.normal):
        other = _second(axes, board.label("N", "force"), TEAL)
        lines.append(_line(other, board.x, board.values(loads.normal[0], "force"), "axial force N, right", TEAL, LONG))
        if np.any(loads.normal[1]):
            swing = board.values(loads.normal[1], "force")
            lines.append(_line(other, board.x, swing, "amplitude of N, right", TEAL, DOTS))
    _title(axes, "Torque and axial force", board.label("T", "torque"), lines)


def _stress(axes: Any, board: Board) -> None:
    along, at = board.results.judged_along, board.results.judged
    lines = []
    for words, field, colour, dashes, mark in (
        ("amplitude σa′", "amplitude", INK, SOLID, "o"),
        ("mean σm′", "mean", RUST, SHORT, "s"),
    ):
        lines.append(
            _line(
                axes, board.x, board.values(getattr(along, field), "stress"), f"{words}, plain section", colour, dashes
            )
        )
        marks = board.values(getattr(at, field), "stress")
        lines.append(_marks(axes, board.station_x, marks, f"{words}, stations", colour, mark))
    axes.set_ylim(bottom=0)
    _title(axes, "Equivalent stress", board.label("σ", "stress"), lines)


def _marks(axes: Any, x: Array, y: Array, words: str, colour: str, mark: str) -> Any:
    return axes.plot(x, y, mark, ms=3.0, mfc="white", mec=colour, mew=0.8, label=words, zorder=5, ls="none")[0]


def _margin(axes: Any, board: Board) -> None:
    results = board.results
    along, at = (
        100 * np.minimum(judged.margin, judged.yield_margin) for judged in (results.judged_along, results.judged)
    )
    high = min(MOST_MARGIN, max(1.15 * float(np.max(at[np.isfinite(at)], initial=20.0)), 40.0))
    low = min(1.6 * float(at.min(initial=0.0)), -0.16 * high)
    lines = [
        _line(axes, board.x, np.minimum(along, 2 * high), "plain section", INK, LONG, 0.8),
        _marks(axes, board.station_x, np.where(at <= high, at, np.nan), "stations", TEAL, "o"),
    ]
    above = at > high
    if above.any():
        marks = _marks(
            axes, board.station_x[above], np.full(above.sum(), high), f"stations above {high:.0f} %", TEAL, "^"
        )
        lines.append(marks)
    axes.axhline(0, color=RUST, lw=0.9, zorder=2)
    axes.text(
        1.004,
        0,
        "just as asked",
        transform=axes.get_yaxis_transform(),
        va="center",
        color=RUST,
        fontproperties=letters(5.4),
    )
    axes.set_ylim(low, 1.06 * high)
    _name_governing(axes, board, at)
    _title(axes, "Margin, the smaller of fatigue and yield", "margin, %", lines)


def _name_governing(axes: Any, board: Board, at: Array) -> None:
    i = board.results.governing
    if np.isfinite(at[i]):
        axes.annotate(
            f"No. {board.results.stations[i].number}", (board.station_x[i], min(at[i], axes.get_ylim()[1])),
            xytext=(5, 0), va="center", textcoords="offset points", bbox={"fc": "white", "ec": "none", "pad": 0.6},
            fontproperties=letters(6.2, True), color=TEAL, zorder=6,
        )  # fmt: skip


def _deflection(axes: Any, board: Board) -> None:
    loads = board.results.along
    deflection, slope = np.hypot(*loads.deflection[0]), np.hypot(*loads.slope[0])
    lines = [_line(axes, board.x, board.values(deflection, "deflection"), "deflection w", INK, wide=1.2)]
    other = _second(axes, board.label("φ", "slope"), RUST)
    lines.append(_line(other, board.x, board.values(slope, "slope"), "slope φ, right", RUST, SHORT))
    axes.set_ylim(bottom=0)
    other.set_ylim(bottom=0)
    _title(axes, "Deflection and slope under mean loads", board.label("w", "deflection"), lines)


_TRACKS: tuple[Callable[[Any, Board], None], ...] = (_moments, _torque, _stress, _margin, _deflection)
