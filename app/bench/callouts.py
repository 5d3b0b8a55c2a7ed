"""Words beside supports, loads and the chosen raiser: what each says and where it stands."""

import itertools
import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF, QSizeF
from PySide6.QtGui import QPainter

from app.bench.dimensions import chosen_segment, segment_rooms
from app.bench.labels import GAP, Board, Wanted
from app.bench.polygons import hairline
from app.bench.stage import Stage, Type
from app.bench.symbols import Glyph
from app.bench.wishes import Wish

TOP_EDGE = 4.0
HINT_ROOM = 40.0
LINES_WORTH_A_PLACE = 4
"""That a thing is named at all counts as much as this many lines."""


@dataclass(frozen=True)
class Callout:
    """Lines of text in a room, and where their leader ends."""

    key: str
    lines: tuple[str, ...]
    room: QRectF
    anchor: QPointF
    chosen: bool

    @property
    def leader(self) -> QLineF | None:
        """From the words to their thing; None where they stand beside it."""
        room, anchor = self.room, self.anchor
        x = min(max(anchor.x(), room.left()), room.right())
        if room.bottom() < anchor.y():
            return QLineF(x, room.bottom(), anchor.x(), anchor.y())
        return QLineF(x, room.top(), anchor.x(), anchor.y()) if room.top() > anchor.y() else None


Offsets = dict[str, QPointF | None]
"""Where each callout stood from its anchor (None: nowhere), so that words keep their place during a gesture."""


def place_callouts(
    stage: Stage, letters: Type, glyphs: list[Glyph], wishes: list[Wish], kept: Offsets
) -> list[Callout]:
    """All callouts that find room; those in `kept` stay where they stood.

    Where not all find room for all their words, other orders are tried and the best is taken.
    """
    board = _board(stage, glyphs)
    best: list[Callout] = []
    most = sum(LINES_WORTH_A_PLACE + len(wish.lines) for wish in wishes)
    for order in _ORDERS:
        found = _placed(stage, letters, board.copy(), sorted(wishes, key=order), kept)
        best = max(best, found, key=_lines_said)
        if kept or _lines_said(best) == most:
            break
    return best


_ORDERS: tuple[Callable[[Wish], Any], ...] = (
    lambda wish: wish.rank,
    lambda wish: (wish.rank, -wish.anchor.x()),
    lambda wish: (wish.rank, wish.anchor.x()),
    lambda wish: (wish.rank, -len(wish.lines)),
)


def _lines_said(callouts: list[Callout]) -> int:
    return sum(LINES_WORTH_A_PLACE + len(callout.lines) for callout in callouts)


def _placed(stage: Stage, letters: Type, board: Board, wishes: list[Wish], kept: Offsets) -> list[Callout]:
    found = []
    for wish in wishes:
        for words, anchor in itertools.product(_shorter(wish.lines), wish.anchors(stage)):
            size = max(letters.width(line, wish.chosen) for line in words), letters.line * len(words)
            if wish.key in kept:
                stood = kept[wish.key]
                room = None if stood is None else QRectF(anchor + stood, QSizeF(*size))
            else:
                room = board.place(Wanted(wish.key, *size, anchor, anchor.y() < stage.frame.axis), letters.line)
            if room is not None:
                found.append(Callout(wish.key, tuple(words), room, anchor, wish.chosen))
                break
    return found


def draw_callouts(painter: QPainter, stage: Stage, letters: Type, callouts: list[Callout]) -> None:
    """Leaders and words, the chosen thing's in the accent colour and bold."""
    for chosen in (False, True):
        these = [callout for callout in callouts if callout.chosen is chosen]
        colour = stage.theme.accent if chosen else stage.theme.ink
        painter.setPen(hairline(stage.theme.accent if chosen else stage.theme.faint))
        painter.drawLines([leader for callout in these if (leader := callout.leader) is not None])
        painter.setPen(hairline(colour))
        painter.setFont(letters.font(chosen))
        for callout in these:
            _draw_lines(painter, letters, callout)


def _draw_lines(painter: QPainter, letters: Type, callout: Callout) -> None:
    """The words, centred over their leader, flush where they stand beside their thing."""
    room, centred = callout.room, callout.leader is not None
    for i, line in enumerate(callout.lines):
        spare = room.width() - letters.width(line, callout.chosen) if centred else 0.0
        painter.drawText(QPointF(room.left() + spare / 2, room.top() + i * letters.line + letters.ascent), line)


def _board(stage: Stage, glyphs: list[Glyph]) -> Board:
    """What is taken already: shaft, glyphs, a hint at the top, what the chosen station and segment draw."""
    frame = stage.frame
    board = Board(frame.width, TOP_EDGE, stage.foot - 2)
    for room in _body_rooms(stage):
        board.take(room)
    for glyph in glyphs:
        for room in glyph.rooms:
            board.take(room)
    if stage.scene.missing:
        board.take(QRectF(0, 0, frame.width, HINT_ROOM))
    if stage.scene.results is not None and stage.scene.station is not None:
        x = frame.x(stage.scene.results.stations[stage.scene.station].x)
        board.take(QRectF(x - 1, frame.axis, 2, stage.foot - frame.axis))
    index = chosen_segment(stage)
    if index is not None:
        for room in segment_rooms(stage, index):
            board.take(room)
    return board


def _body_rooms(stage: Stage) -> list[QRectF]:
    """The shaft as boxes; a taper in slices whose height differs by less than the gap round words."""
    frame, rooms = stage.frame, []
    for segment, x0, x1 in zip(stage.shaft.segments, stage.plan.faces, stage.plan.faces[1:], strict=False):
        one, other = (d / 2 * frame.scale for d in (segment.diameter, segment.right_diameter))
        count = 1 + math.ceil(abs(other - one) / (GAP / 2))
        edges, radii = np.linspace(frame.x(x0), frame.x(x1), count + 1), np.linspace(one, other, count + 1)
        for i in range(count):
            radius = min(radii[i], radii[i + 1])
            rooms.append(QRectF(edges[i], frame.axis - radius, edges[i + 1] - edges[i], 2 * radius))
    return rooms


def _shorter(lines: list[str]) -> list[list[str]]:
    """The lines, then the same in less and less room."""
    tried = [lines, [" · ".join(lines)]]
    if len(lines) > 2:
        tried.insert(1, [lines[0], " · ".join(lines[1:])])
    return [*tried, lines[-1:]]
