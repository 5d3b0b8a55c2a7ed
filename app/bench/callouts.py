"""Words beside supports, loads and the chosen raiser: what each says and where it stands."""

from dataclasses import dataclass

from PySide6.QtCore import QPointF, QRectF
from PySide6.QtGui import QPainter

from app.bench.dimensions import chosen_raiser, chosen_segment, length_room, raiser_label
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


@dataclass(frozen=True)
class Callout:
    """Lines of text in a room, and where their leader ends; None where the words stand beside it."""

    key: str
    lines: tuple[str, ...]
    room: QRectF
    anchor: QPointF
    chosen: bool


Offsets = dict[str, QPointF]
"""Where each callout stood from its anchor, so that words keep their place during a gesture."""


def place_callouts(stage: Stage, letters: Type, glyphs: list[Glyph], kept: Offsets) -> list[Callout]:
    """All callouts that find room; those in `kept` stay where they stood."""
    board = _board(stage, glyphs)
    found = []
    for key, lines, anchor, upward, chosen in _wishes(stage, letters, glyphs):
        for words in (lines, lines[-1:]):
            size = max(letters.width(line, chosen) for line in words), letters.line * len(words)
            if key in kept:
                room: QRectF | None = QRectF(anchor + kept[key], QPointF(*size) + anchor + kept[key])
            else:
                room = board.place(Wanted(key, *size, anchor, upward), letters.line)
            if room is not None:
                found.append(Callout(key, tuple(words), room, anchor, chosen))
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
    """What is taken already: the shaft, the glyphs, a hint at the top, the chosen segment's length."""
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
    index = chosen_segment(stage)
    if index is not None:
        board.take(length_room(stage, index))
    return board


Wish = tuple[str, list[str], QPointF, bool, bool]


def _wishes(stage: Stage, letters: Type, glyphs: list[Glyph]) -> list[Wish]:
    """Callouts wanted, the most important first: what is chosen, then supports, then loads."""
    wishes: list[Wish] = []
    seating = chosen_raiser(stage)
    if seating is not None:
        wanted, lines = raiser_label(stage, letters, seating)
        wishes.append((wanted.key, lines, wanted.anchor, True, True))
    things = {thing.id: thing for thing in (*stage.shaft.supports, *stage.shaft.loads)}
    for group in _groups([glyph for glyph in glyphs if -60 < glyph.anchor.x() < stage.frame.width + 60]):
        outer = min if group[0].upward else max
        anchor = outer((glyph.anchor for glyph in group), key=lambda point: point.y())
        chosen = any(stage.chosen(glyph.thing) for glyph in group)
        members = [things[glyph.thing] for glyph in group]
        wishes.append(("+".join(g.thing for g in group), _lines(stage, members), anchor, group[0].upward, chosen))
    wishes.sort(key=lambda wish: not wish[4])
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
