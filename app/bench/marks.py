"""By which points the marks of supports and loads are taken hold of, read off their drawing."""

from dataclasses import dataclass

from PySide6.QtCore import QPointF

from app.bench.stage import Stage
from app.bench.symbols import Glyph, glyphs_of
from app.document import Selection
from shaftcore import edits
from shaftcore.shaft import Load, Support, things


@dataclass(frozen=True)
class Mark:
    """Where a mark is moved from, and the free end by which its size is pulled (pixels; None without one)."""

    chosen: Selection
    foot: QPointF
    tip: QPointF | None = None
    size_name: str = ""


def marks_of(stage: Stage) -> tuple[Mark, ...]:
    """Marks of all supports and loads; a support, standing above and below, has two."""
    if not stage.shaft.segments:
        return ()
    on_shaft = things(stage.shaft)
    found: list[Mark] = []
    for glyph in glyphs_of(stage):
        thing = on_shaft[glyph.thing]
        if isinstance(thing, Support):
            found += [Mark(("support", thing.id), room.center()) for room in glyph.rooms]
        elif isinstance(thing, Load):
            found.append(_load_mark(stage, glyph, thing))
    return tuple(found)


def _load_mark(stage: Stage, glyph: Glyph, load: Load) -> Mark:
    """An arrow is moved by its end at the shaft and pulled by the other; an arc by its foot and its top."""
    chosen, name = (load.kind, load.id), edits.main_quantity(type(load))
    at = QPointF(stage.frame.x(load.x), stage.frame.axis)
    if len(glyph.rooms) > 1:
        return Mark(chosen, glyph.rooms[-1].center(), glyph.anchor, name)
    room = glyph.rooms[0]
    away = room.center() - at
    if abs(away.x()) > abs(away.y()):
        return Mark(chosen, at, at + QPointF(2 * away.x(), 0.0), name)
    if abs(away.y()) <= room.height() / 2:
        return Mark(chosen, room.center())
    near, far = sorted((room.top(), room.bottom()), key=lambda y: abs(y - at.y()))
    return Mark(chosen, QPointF(at.x(), near), QPointF(at.x(), far), name)
