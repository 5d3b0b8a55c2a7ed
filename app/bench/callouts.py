"""Words beside supports, loads and the chosen raiser: what each says and where it stands."""

import itertools
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from PySide6.QtCore import QPointF, QRectF, QSizeF
from PySide6.QtGui import QPainter

from app.bench.dimensions import chosen_raiser, chosen_segment, length_room, raiser_anchor, raiser_words
from app.bench.labels import Board, Wanted
from app.bench.polygons import hairline
from app.bench.stage import Stage, Type
from app.bench.symbols import Glyph
from app.bench.words import load_words, quantity, support_words
from shaftcore.shaft import Load, Support

TOP_EDGE = 4.0
SAME_PLACE = 4.0
"""Things nearer than this (px) on one side of the shaft share their words."""
HINT_ROOM = 40.0
LINES_WORTH_A_PLACE = 4
"""That a thing is named at all counts as much as this many lines."""


@dataclass(frozen=True)
class Callout:
    """Lines of text in a room, and where their leader ends; None where the words stand beside it."""

    key: str
    lines: tuple[str, ...]
    room: QRectF
    anchor: QPointF
    chosen: bool


Offsets = dict[str, QPointF | None]
"""Where each callout stood from its anchor (None: nowhere), so that words keep their place during a gesture."""


def place_callouts(
    stage: Stage, letters: Type, glyphs: list[Glyph], wishes: list["Wish"], kept: Offsets
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


_ORDERS: tuple[Callable[["Wish"], Any], ...] = (
    lambda wish: not wish.chosen,
    lambda wish: (not wish.chosen, -wish.anchor.x()),
    lambda wish: (not wish.chosen, wish.anchor.x()),
    lambda wish: (not wish.chosen, -len(wish.lines)),
)


def _lines_said(callouts: list[Callout]) -> int:
    return sum(LINES_WORTH_A_PLACE + len(callout.lines) for callout in callouts)


def _placed(stage: Stage, letters: Type, board: Board, wishes: list["Wish"], kept: Offsets) -> list[Callout]:
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


def draw_callout(painter: QPainter, stage: Stage, letters: Type, callout: Callout) -> None:
    colour = stage.theme.accent if callout.chosen else stage.theme.ink
    room, anchor = callout.room, callout.anchor
    x = min(max(anchor.x(), room.left()), room.right())
    painter.setPen(hairline(stage.theme.accent if callout.chosen else stage.theme.faint))
    edge = room.bottom() if room.bottom() < anchor.y() else room.top() if room.top() > anchor.y() else None
    if edge is not None:
        painter.drawLine(QPointF(x, edge), anchor)
    painter.setFont(letters.font(callout.chosen))
    painter.setPen(hairline(colour))
    for i, line in enumerate(callout.lines):
        left = room.left()
        if edge is not None:
            left += (room.width() - letters.width(line, callout.chosen)) / 2
        painter.drawText(QPointF(left, room.top() + i * letters.line + letters.ascent), line)


def _board(stage: Stage, glyphs: list[Glyph]) -> Board:
    """What is taken already: shaft, glyphs, a hint at the top, what the chosen station and segment draw."""
    frame = stage.frame
    board = Board(frame.width, TOP_EDGE, stage.foot - 2)
    faces = stage.plan.profile.faces if stage.shaft.segments else ()
    for i, segment in enumerate(stage.shaft.segments):
        radius = max(segment.diameter, segment.right_diameter) / 2 * frame.scale
        begin, end = frame.x(faces[i]), frame.x(faces[i + 1])
        board.take(QRectF(begin, frame.axis - radius, end - begin, 2 * radius))
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
        board.take(length_room(stage, index))
    return board


def _shorter(lines: list[str]) -> list[list[str]]:
    """The lines, then the same in less and less room."""
    tried = [lines, [" · ".join(lines)]]
    if len(lines) > 2:
        tried.insert(1, [lines[0], " · ".join(lines[1:])])
    return [*tried, lines[-1:]]


@dataclass(frozen=True)
class Wish:
    """Words wanted at an anchor; those of a raiser may stand on either side of the shaft."""

    key: str
    lines: list[str]
    anchor: QPointF
    chosen: bool
    either_side: bool = False

    def anchors(self, stage: Stage) -> list[QPointF]:
        mirrored = QPointF(self.anchor.x(), 2 * stage.frame.axis - self.anchor.y())
        return [self.anchor, mirrored] if self.either_side else [self.anchor]


def wishes_of(stage: Stage, glyphs: list[Glyph]) -> list[Wish]:
    """Callouts wanted: the chosen raiser's, then supports', then loads'."""
    wishes: list[Wish] = []
    seating = chosen_raiser(stage)
    if seating is not None:
        wishes.append(
            Wish(seating.place, raiser_words(stage, seating), raiser_anchor(stage, seating), True, either_side=True)
        )
    things = {thing.id: thing for thing in (*stage.shaft.supports, *stage.shaft.loads)}
    for group in _groups([glyph for glyph in glyphs if -60 < glyph.anchor.x() < stage.frame.width + 60]):
        outer = min if group[0].upward else max
        anchor = outer((glyph.anchor for glyph in group), key=lambda point: point.y())
        chosen = any(stage.chosen(glyph.thing) for glyph in group)
        lines = _lines(stage, [things[glyph.thing] for glyph in group])
        wishes.append(Wish("+".join(glyph.thing for glyph in group), lines, anchor, chosen))
    return wishes


def _groups(glyphs: list[Glyph]) -> list[list[Glyph]]:
    groups: list[list[Glyph]] = []
    for glyph in glyphs:
        near = (
            g for g in groups if g[0].upward == glyph.upward and abs(g[0].anchor.x() - glyph.anchor.x()) < SAME_PLACE
        )
        home = next(near, None)
        if home is None:
            groups.append([glyph])
        else:
            home.append(glyph)
    return groups


def _lines(stage: Stage, members: list[Load | Support]) -> list[str]:
    """Names once each, the words of every member, and the place of a chosen one."""
    lines: list[str] = []
    for thing in members:
        if isinstance(thing, Support):
            lines.append(f"{thing.name or thing.label}, {support_words(thing)}")
        else:
            if thing.name and thing.name not in lines:
                lines.append(thing.name)
            lines.append(load_words(thing, stage.scene.system))
        if stage.chosen(thing.id):
            lines.append(f"x {quantity(thing.x, 'length', stage.scene.system)}")
    return lines
