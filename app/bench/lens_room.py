"""Where on the bench a lens may stand: below or beside the shaft, off what must be seen with it."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from PySide6.QtCore import QPointF, QRectF

from app.bench.drawing import Drawing
from app.bench.stage import Stage
from shaftcore.notches._contract import Array

HEIGHTS = (168.0, 148.0, 128.0, 112.0, 98.0, 90.0, 84.0, 72.0, 60.0)
WIDE_OF_HIGH = 1.3
"""Width of a lens' picture for its height."""
EDGE, GAP, STRIDE = 8.0, 3.0, 8.0
NEAR = 400.0
"""Pixels beside the thing under the hand where its readout may stand."""


@dataclass(frozen=True)
class Taken:
    """Rooms a lens must keep off, and rooms of other things' words and symbols."""

    held: list[QRectF]
    others: list[QRectF]


def taken_of(stage: Stage, drawing: Drawing, points: Sequence[QPointF]) -> Taken:
    """What is taken while the chosen thing is in hand, its grips at `points`."""
    own: list[QRectF] = []
    others: list[QRectF] = []
    for callout in drawing.callouts:
        (own if callout.chosen else others).append(callout.room)
    others += [room for glyph in drawing.marks.glyphs for room in glyph.rooms]
    own += [QRectF(at.x() - 12, at.y() - 12, 24, 24) for at in points]
    results, station = stage.scene.results, stage.scene.station
    if results is not None and station is not None:
        x = stage.frame.x(results.stations[station].x)
        own.append(QRectF(x - 2, stage.frame.axis, 4, stage.foot - stage.frame.axis))
    return Taken(own + _body(stage), others)


def lens_room(stage: Stage, taken: Taken, hand: float, words: float, over_others: bool) -> QRectF | None:
    """The largest free room; with `over_others` other things' words may be covered, few rather than many.

    `hand` is the x (px) of the thing in hand: rooms away from it come first. `words` is the width
    beside the picture.
    """
    for height in HEIGHTS:
        width = height * WIDE_OF_HIGH + words
        top = stage.foot - EDGE / 2 - height
        lefts = np.arange(EDGE, stage.frame.width - EDGE - width, STRIDE)
        if top < EDGE or not len(lefts):
            continue
        cover = _covered(lefts, top, width, height, taken.others)
        free = _covered(lefts, top, width, height, taken.held) == 0
        if not over_others:
            free &= cover == 0
        if np.any(free):
            gap = np.maximum(lefts - hand, hand - lefts - width)
            cost = np.where(free, cover / (width * height) + np.clip(1 - gap / NEAR, 0, 2), np.inf)
            return QRectF(float(lefts[int(np.argmin(cost))]), top, width, height)
    return None


def _covered(lefts: Array, top: float, width: float, height: float, rooms: list[QRectF]) -> Array:
    """Area (px²) of the rooms under a lens, gap included, for each place of its left edge."""
    if not rooms:
        return np.zeros(len(lefts))
    x0, y0, x1, y1 = np.array([(r.left() - GAP, r.top() - GAP, r.right() + GAP, r.bottom() + GAP) for r in rooms]).T
    along = np.minimum(x1, lefts[:, None] + width) - np.maximum(x0, lefts[:, None])
    down = np.minimum(y1, top + height) - np.maximum(y0, top)
    return np.sum(np.maximum(along, 0.0) * np.maximum(down, 0.0), axis=1)


def _body(stage: Stage) -> list[QRectF]:
    frame, faces = stage.frame, stage.plan.faces
    rooms = []
    for segment, begin, end in zip(stage.shaft.segments, faces, faces[1:], strict=False):
        reach = max(segment.diameter, segment.right_diameter) / 2
        rooms.append(QRectF(frame.to_screen(begin, reach), frame.to_screen(end, -reach)))
    return rooms
