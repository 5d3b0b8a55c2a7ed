"""What words are wanted on the bench, and where they point: the chosen raiser's, supports', loads'."""

from dataclasses import dataclass

from PySide6.QtCore import QPointF

from app.bench.dimensions import chosen_raiser, raiser_anchor, raiser_words
from app.bench.stage import Stage
from app.bench.symbols import Glyph
from app.bench.words import load_words, quantity, support_words
from shaftcore.shaft import Load, Support

SAME_PLACE = 4.0
"""Things nearer than this (px) on one side of the shaft share their words."""


@dataclass(frozen=True)
class Wish:
    """Words wanted at an anchor, low ranks first; those of a raiser may stand on either side of the shaft."""

    key: str
    lines: list[str]
    anchor: QPointF
    chosen: bool
    rank: int
    either_side: bool = False

    def anchors(self, stage: Stage) -> list[QPointF]:
        mirrored = QPointF(self.anchor.x(), 2 * stage.frame.axis - self.anchor.y())
        return [self.anchor, mirrored] if self.either_side else [self.anchor]


def raiser_wishes(stage: Stage) -> list[Wish]:
    """The chosen raiser's sizes, if one is chosen."""
    seating = chosen_raiser(stage)
    if seating is None:
        return []
    words, anchor = raiser_words(stage, seating), raiser_anchor(stage, seating)
    return [Wish(seating.place, words, anchor, True, 0, either_side=True)]


def mark_wishes(stage: Stage, glyphs: list[Glyph]) -> list[Wish]:
    """Supports' words, then loads'; what is chosen first."""
    wishes: list[Wish] = []
    things = {thing.id: thing for thing in (*stage.shaft.supports, *stage.shaft.loads)}
    for group in _groups([glyph for glyph in glyphs if -60 < glyph.anchor.x() < stage.frame.width + 60]):
        outer = min if group[0].upward else max
        anchor = outer((glyph.anchor for glyph in group), key=lambda point: point.y())
        chosen = any(stage.chosen(glyph.thing) for glyph in group)
        members = [things[glyph.thing] for glyph in group]
        rank = 0 if chosen else 1 if any(isinstance(thing, Support) for thing in members) else 2
        wishes.append(Wish("+".join(thing.id for thing in members), _lines(stage, members), anchor, chosen, rank))
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
    """One shared name over the words of all members, else each one's name before its words."""
    names = {thing.name for thing in members if thing.name}
    shared = len(names) == 1 and not any(isinstance(thing, Support) for thing in members)
    lines = list(names) if shared else []
    for thing in members:
        if isinstance(thing, Support):
            lines.append(f"{thing.name or thing.id}, {support_words(thing, stage.scene.system)}")
        else:
            words = load_words(thing, stage.scene.system)
            lines.append(words if shared or not thing.name else f"{thing.name} {words}")
        if stage.chosen(thing.id):
            lines.append(f"x {quantity(thing.x, 'length', stage.scene.system)}")
    return lines
