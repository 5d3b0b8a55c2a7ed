"""The line over each track: its name, the key of its lines, and the numbers read at one place."""

from collections.abc import Sequence
from dataclasses import dataclass
from functools import lru_cache

import numpy as np
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPainter, QPen

from app.ruler import RIGHT_MARGIN
from app.theme import Theme, text_font
from app.traces.bands import FOOT, HEAD
from app.traces.plots import Plot, View
from app.traces.reading import head_words, line_text, widest_text
from app.traces.tracks import Line
from shaftcore.number_text import unit_symbol
from shaftcore.results import Results
from shaftcore.units import dimension

LEFT = 12.0
SAMPLE, NEAR, APART = 22.0, 5.0, 18.0
"""Pixels: length of a line's sample, room inside and between entries."""


@lru_cache(maxsize=2)
def key_font(bold: bool = False) -> QFont:
    return text_font(8.5, bold)


@dataclass(frozen=True)
class Entry:
    """One line's place in the key: where its sample begins, its words, and where its number stands, if it has one."""

    line: Line
    sample: float
    words: float
    number: float | None
    end: float


@dataclass(frozen=True)
class Head:
    """One track's head; `free` is where the entries end."""

    plot: Plot
    words: str
    entries: tuple[Entry, ...]
    free: float

    def rect(self, left: float, right: float) -> QRectF:
        return QRectF(left, self.plot.band.top, right - left, HEAD)


def heads_of(plots: Sequence[Plot], view: View) -> tuple[Head, ...]:
    """All heads, their keys beginning in one column; numbers have fixed places, so they never dance."""
    bold, plain = QFontMetricsF(key_font(bold=True)), QFontMetricsF(key_font())
    words = [head_words(plot.track, tuple(scale.dimension for scale in plot.scales), view.system) for plot in plots]
    column = LEFT + max(map(bold.horizontalAdvance, words), default=0.0) + 2 * APART
    found = []
    for plot, name in zip(plots, words, strict=True):
        own = LEFT + bold.horizontalAdvance(name) + APART
        entries = _fitting(plot, (column, own), plain, view)
        found.append(Head(plot, name, entries, entries[-1].end + APART if entries else own))
    return tuple(found)


def _fitting(plot: Plot, columns: tuple[float, float], metrics: QFontMetricsF, view: View) -> tuple[Entry, ...]:
    """The key in the common column; in a narrow window from where the name ends, and last without numbers."""
    common, own = columns
    for at, numbered in ((common, True), (own, True), (own, False)):
        entries = []
        for curve in plot.curves:
            entries.append(_entry(plot, curve.line, at, metrics, view, numbered))
            at = entries[-1].end + APART
        if not entries or entries[-1].end <= view.width - RIGHT_MARGIN:
            break
    return tuple(entries)


def _entry(plot: Plot, line: Line, at: float, metrics: QFontMetricsF, view: View, numbered: bool) -> Entry:
    scale = next(scale for scale in plot.scales if scale.dimension == line.dimension)
    reach = dimension(line.dimension).unit(view.system).internal(float(np.abs(scale.limits).max()))
    words = at + SAMPLE + NEAR
    words_end = words + metrics.horizontalAdvance(line.label)
    if not numbered:
        return Entry(line, at, words, None, words_end)
    number = words_end + NEAR
    widest = metrics.horizontalAdvance(widest_text(plot.track, line, reach, view.system))
    return Entry(line, at, words, number, number + widest)


def paint_still(painter: QPainter, heads: Sequence[Head], view: View) -> None:
    """Names and keys: what stays while the numbers change."""
    theme = view.theme
    for head in heads:
        painter.setFont(key_font(bold=True))
        painter.setPen(QColor(theme.ink))
        painter.drawText(head.rect(LEFT, view.width), _ALIGN, head.words)
        painter.setFont(key_font())
        for entry in head.entries:
            _paint_sample(painter, entry, head, theme)
            painter.setPen(QColor(theme.faint))
            painter.drawText(head.rect(entry.words, view.width), _ALIGN, entry.line.label)
    if heads:
        foot = QRectF(LEFT, heads[-1].plot.band.plot_bottom + 2, view.width, FOOT - 2)
        painter.drawText(foot, _ALIGN, f"x, {unit_symbol('length', view.system)}")


_ALIGN = Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter
_ALIGN_RIGHT = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter


def _paint_sample(painter: QPainter, entry: Entry, head: Head, theme: Theme) -> None:
    ink = QColor(theme.traces[entry.line.ink])
    pen = QPen(ink, entry.line.weight)
    pen.setCapStyle(Qt.PenCapStyle.FlatCap)
    if entry.line.dash:
        pen.setDashPattern([step / entry.line.weight for step in entry.line.dash])
    middle = round(head.plot.band.top + HEAD / 2) + 0.5
    painter.save()
    painter.setPen(pen)
    painter.drawLine(QPointF(entry.sample, middle), QPointF(entry.sample + SAMPLE, middle))
    if entry.line.at_stations is not None:
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(QPen(ink, 1.0))
        painter.setBrush(QColor(theme.paper) if entry.line.dash else ink)
        painter.drawEllipse(QPointF(entry.sample + SAMPLE / 2, middle), 2.5, 2.5)
    painter.restore()


def paint_numbers(painter: QPainter, head: Head, view: View, results: Results, place: float | None, note: str) -> None:
    """The track's readings at a place, and a note at the right where there is room for it."""
    painter.setFont(key_font())
    painter.setPen(QColor(view.theme.ink))
    right = view.width - RIGHT_MARGIN
    if place is not None:
        for entry in head.entries:
            if entry.number is not None:
                text = line_text(head.plot.track, entry.line, results, place, view.system)
                painter.drawText(head.rect(entry.number, entry.end + APART), _ALIGN, text)
    if note and head.free + QFontMetricsF(key_font()).horizontalAdvance(note) <= right:
        painter.drawText(head.rect(head.free, right), _ALIGN_RIGHT, note)
