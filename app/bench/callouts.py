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
class Standing:
    """How words were placed: in which of their forms, at which of their anchors, how far from it."""

    form: int
    anchor: int
    offset: QPointF


@dataclass(frozen=True)
class Callout:
    """Lines of text in a room, and where their leader ends."""

    key: str
    lines: tuple[str, ...]
    room: QRectF
    anchor: QPointF
    chosen: bool
    standing: Standing

    @property
    def leader(self) -> QLineF | None:
        """From the words to their thing; None where they stand beside it."""
        room, anchor = self.room, self.anchor
        x = min(max(anchor.x(), room.left()), room.right())
        if room.bottom() < anchor.y():
            return QLineF(x, room.bottom(), anchor.x(), anchor.y())
        return QLineF(x, room.top(), anchor.x(), anchor.y()) if room.top() > anchor.y() else None


Kept = dict[str, Standing | None]
"""How each callout stood (None: nowhere), so that words keep their place during a gesture."""


def place_callouts(stage: Stage, letters: Type, glyphs: list[Glyph], wishes: list[Wish], kept: Kept) -> list[Callout]:
    """All callouts that find room; those in `kept` stay where they stood.

    Where not all others find room for all their words, other orders are tried and the best is taken.
    """
    stay = [_as_it_stood(stage, letters, w, standing) for w in wishes if (standing := kept.get(w.key)) is not None]
    seek = [wish for wish in wishes if wish.key not in kept]
    return [*stay, *_best_placed(stage, letters, _board(stage, glyphs, stay), seek)] if seek else stay


def _as_it_stood(stage: Stage, letters: Type, wish: Wish, standing: Standing) -> Callout:
    forms, anchor = _forms(wish.lines), wish.anchors(stage)[standing.anchor]
    words = forms[min(standing.form, len(forms) - 1)]
    room = QRectF(anchor + standing.offset, _size(letters, words, wish.chosen))
    return Callout(wish.key, tuple(words), room, anchor, wish.chosen, standing)


def _best_placed(stage: Stage, letters: Type, board: Board, wishes: list[Wish]) -> list[Callout]:
    best: list[Callout] = []
    most = sum(LINES_WORTH_A_PLACE + len(wish.lines) for wish in wishes)
    for order in _ORDERS:
        board.clear_labels()
        best = max(best, _placed(stage, letters, board, sorted(wishes, key=order)), key=_lines_said)
        if _lines_said(best) == most:
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


def _placed(stage: Stage, letters: Type, board: Board, wishes: list[Wish]) -> list[Callout]:
    found = (_first_free(stage, letters, board, wish) for wish in wishes)
    return [callout for callout in found if callout is not None]


def _first_free(stage: Stage, letters: Type, board: Board, wish: Wish) -> Callout | None:
    """The longest form of the words that finds room, at the first anchor where it does."""
    for (form, words), (at, anchor) in itertools.product(enumerate(_forms(wish.lines)), enumerate(wish.anchors(stage))):
        size = _size(letters, words, wish.chosen)
        wanted = Wanted(wish.key, size.width(), size.height(), anchor, anchor.y() < stage.frame.axis)
        room = board.place(wanted, letters.line)
        if room is not None:
            standing = Standing(form, at, room.topLeft() - anchor)
            return Callout(wish.key, tuple(words), room, anchor, wish.chosen, standing)
    return None


def _size(letters: Type, words: list[str], bold: bool) -> QSizeF:
    return QSizeF(max(letters.width(line, bold) for line in words), letters.line * len(words))


def draw_callouts(painter: QPainter, stage: Stage, letters: Type, callouts: list[Callout]) -> None:
    """Leaders and words, the chosen thing's in the accent colour and bold."""
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
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


def _board(stage: Stage, glyphs: list[Glyph], stay: list[Callout]) -> Board:
    """What is taken already: words that stay, shaft, glyphs, hint, what the chosen station and segment draw."""
    frame = stage.frame
    board = Board(frame.width, TOP_EDGE, stage.foot - 2)
    for room in (*_body_rooms(stage), *(callout.room for callout in stay)):
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


def _forms(lines: list[str]) -> list[list[str]]:
    """The lines, then the same in less and less room."""
    tried = [lines, [" · ".join(lines)]]
    if len(lines) > 2:
        tried.insert(1, [lines[0], " · ".join(lines[1:])])
    return [*tried, lines[-1:]]
