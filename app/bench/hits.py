"""What lies under the pointer: grips by which sizes are pulled, and the things themselves.

Grips are points on the drawing (fillets, raisers, marks of supports and loads) or lines (outline
and faces). Points win over lines, the nearest over the farther.
"""

import math
from collections.abc import Iterator
from dataclasses import dataclass
from typing import Literal

from PySide6.QtCore import QPointF, Qt

from app.bench.frame import Frame
from app.bench.marks import marks_of
from app.bench.stage import Stage
from app.document import Selection
from shaftcore.geometry import around_place, faces_of, segment_index
from shaftcore.shaft import Shaft

POINT_REACH, LINE_REACH = 11.0, 6.0
"""Pixels within which a point or a line is taken hold of."""

Law = Literal["ratio", "linear"]
CURSORS = (
    Qt.CursorShape.SizeHorCursor,
    Qt.CursorShape.SizeBDiagCursor,
    Qt.CursorShape.SizeVerCursor,
    Qt.CursorShape.SizeFDiagCursor,
)


@dataclass(frozen=True)
class Grip:
    """A point, or a line up to (`x2`, `y2`), in pixels, by which one size is pulled.

    Pulling along `direction` (unit vector on the screen) makes the size grow: by `gain` mm for a
    mm of pull, or by ratio where small sizes must stay in reach. `face` marks the pull of a face.
    """

    chosen: Selection
    name: str
    x: float
    y: float
    direction: tuple[float, float]
    law: Law = "linear"
    gain: float = 1.0
    face: bool = False
    x2: float | None = None
    y2: float | None = None

    @property
    def is_line(self) -> bool:
        return self.x2 is not None

    @property
    def cursor(self) -> Qt.CursorShape:
        """The pointer that shows which way this goes."""
        turn = math.degrees(math.atan2(-self.direction[1], self.direction[0])) % 180.0
        return CURSORS[round(turn / 45.0) % 4]

    def distance(self, pos: QPointF) -> float:
        """Pixels from a place to the grip."""
        x2, y2 = (self.x, self.y) if self.x2 is None or self.y2 is None else (self.x2, self.y2)
        along = math.hypot(x2 - self.x, y2 - self.y)
        if not along:
            return math.hypot(pos.x() - self.x, pos.y() - self.y)
        ux, uy = (x2 - self.x) / along, (y2 - self.y) / along
        share = min(max((pos.x() - self.x) * ux + (pos.y() - self.y) * uy, 0.0), along)
        return math.hypot(pos.x() - self.x - share * ux, pos.y() - self.y - share * uy)


def grips_of(stage: Stage) -> tuple[Grip, ...]:
    """Every grip of a shaft as it stands on the screen."""
    if not stage.shaft.segments:
        return ()
    return (*_raiser_grips(stage), *_mark_grips(stage), *_outline_grips(stage.shaft, stage.frame))


def pick(grips: tuple[Grip, ...], pos: QPointF) -> Grip | None:
    """The grip that a press at `pos` takes hold of."""
    for lines, reach in ((False, POINT_REACH), (True, LINE_REACH)):
        near = [(grip.distance(pos), i) for i, grip in enumerate(grips) if grip.is_line == lines]
        best = min(near, default=(math.inf, -1))
        if best[0] <= reach:
            return grips[best[1]]
    return None


def thing_at(shaft: Shaft, frame: Frame, grips: tuple[Grip, ...], pos: QPointF) -> Selection | None:
    """The thing drawn at `pos`: one that has a point there, else the segment there."""
    grip = pick(tuple(grip for grip in grips if not grip.is_line), pos)
    if grip is not None:
        return grip.chosen
    x, y = frame.to_shaft(pos)
    if not shaft.segments or not 0 <= x <= shaft.length:
        return None
    faces = faces_of(shaft)
    reach = around_place(shaft, x, faces).left_diameter / 2 + LINE_REACH / frame.scale
    return ("segment", shaft.segments[segment_index(faces, x)].id) if abs(y) <= reach else None


def _raiser_grips(stage: Stage) -> Iterator[Grip]:
    """The handles each kind declares; a step has them below too, where a raiser that can be moved has its place."""
    for seating in stage.plan.seated:
        chosen, movable = (seating.kind.key, seating.place), seating.kind.goes == "on a diameter"
        for side in (1.0,) if movable else (1.0, -1.0):
            for handle in seating.kind.handles(seating.record, seating.around):
                at = stage.frame.to_screen(handle.x, side * handle.y)
                direction = (handle.direction[0], -side * handle.direction[1])
                yield Grip(chosen, handle.size, at.x(), at.y(), direction, "ratio")
        if movable:
            at = stage.frame.to_screen(seating.around.x, -seating.around.left_diameter / 2)
            yield Grip(chosen, "x", at.x(), at.y(), (1.0, 0.0))


def _mark_grips(stage: Stage) -> Iterator[Grip]:
    """A mark is moved along the shaft by its foot; pulled away from the shaft by its tip, a load grows."""
    for mark in marks_of(stage):
        foot, tip = mark.foot, mark.tip
        yield Grip(mark.chosen, "x", foot.x(), foot.y(), (1.0, 0.0))
        if tip is not None:
            away = tip - foot
            far = math.hypot(away.x(), away.y()) or 1.0
            yield Grip(mark.chosen, mark.size_name, tip.x(), tip.y(), (away.x() / far, away.y() / far), "ratio")


def _outline_grips(shaft: Shaft, frame: Frame) -> Iterator[Grip]:
    """Outlines pull diameters, faces pull lengths; a taper has one half of its outline for each end."""
    faces = faces_of(shaft)
    for index, segment in enumerate(shaft.segments):
        chosen = ("segment", segment.id)
        begin, end = faces[index], faces[index + 1]
        ends = [("diameter", begin, segment.diameter, end, segment.right_diameter)]
        if segment.end_diameter is not None:
            middle, waist = (begin + end) / 2, (segment.diameter + segment.end_diameter) / 2
            ends = [
                ("diameter", begin, segment.diameter, middle, waist),
                ("end_diameter", middle, waist, end, segment.end_diameter),
            ]
        for name, x1, d1, x2, d2 in ends:
            for side in (1.0, -1.0):
                one, other = frame.to_screen(x1, side * d1 / 2), frame.to_screen(x2, side * d2 / 2)
                line = (other.x(), other.y())
                yield Grip(chosen, name, one.x(), one.y(), (0.0, -side), "linear", 2.0, False, *line)
        following = shaft.segments[index + 1 : index + 2]
        reach = max(segment.right_diameter, *(after.diameter for after in following), 0.0) / 2
        top, foot = frame.to_screen(end, reach), frame.to_screen(end, -reach)
        yield Grip(chosen, "length", top.x(), top.y(), (1.0, 0.0), "linear", 1.0, True, foot.x(), foot.y())
