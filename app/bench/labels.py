"""Placing labels so that none lies on another or on the drawing: beside their thing, else in rows beyond it."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from PySide6.QtCore import QPointF, QRectF

from shaftcore.notches._contract import Array

GAP = 4.0
BESIDE = 12.0
SHIFTS = (0.0, 0.3, -0.3, 0.5, -0.5)
"""How far a label may stand off the middle of its anchor, as a share of its width."""


@dataclass(frozen=True)
class Wanted:
    """A label to place: its size, its anchor and on which side of it (up or down) it belongs."""

    key: str
    width: float
    height: float
    anchor: QPointF
    upward: bool


class Board:
    """The room left for labels between `top` and `bottom`, in pixels."""

    def __init__(self, width: float, top: float, bottom: float) -> None:
        self.width, self.top, self.bottom = width, top, bottom
        self._taken: list[tuple[float, float, float, float]] = []

    def take(self, room: QRectF) -> None:
        self._taken.append((room.left(), room.top(), room.right(), room.bottom()))

    def place(self, wanted: Wanted, row: float) -> QRectF | None:
        """The nearest free place, taken at once with its leader; None where there is none."""
        choices = self._choices(wanted, row)
        free = np.flatnonzero(self._free(choices, wanted.anchor))
        if not len(free):
            return None
        left, top, right, bottom = choices[free[0]]
        found = QRectF(left, top, right - left, bottom - top)
        self.take(found)
        for leader in leader_rooms(found, wanted.anchor):
            self.take(leader)
        return found

    def _choices(self, wanted: Wanted, row: float) -> Array:
        """Rooms (n, 4) as left, top, right, bottom, nearest first: both sides, then row after row."""
        x, y, sense = wanted.anchor.x(), wanted.anchor.y(), -1.0 if wanted.upward else 1.0
        room = self.bottom - self.top
        offsets = np.arange(0.0, max(room, row), row / 2)
        above = y + sense * (GAP + offsets) + (-wanted.height if wanted.upward else 0.0)
        lefts = x - wanted.width * (0.5 - np.array(SHIFTS))
        lefts = np.clip(lefts, 2.0, max(self.width - wanted.width - 2.0, 2.0))
        rows = np.array([(left, top) for top in above for left in lefts])
        beside_top = y if wanted.upward else y - wanted.height
        sides = np.array([(x + BESIDE, beside_top), (x - BESIDE - wanted.width, beside_top)])
        corners = np.vstack([sides, rows])
        return np.column_stack([corners, corners + np.array([wanted.width, wanted.height])])

    def _free(self, rooms: Array, anchor: QPointF) -> NDArray[np.bool_]:
        """Whether each room and its leader meet nothing and lie on the board."""
        left, top, right, bottom = rooms.T
        inside = (left >= 2.0) & (right <= self.width - 2.0) & (top >= self.top) & (bottom <= self.bottom)
        taken = np.array(self._taken).reshape(-1, 4)
        reach = np.column_stack([left - GAP, top, right + GAP, bottom])
        stem_x = np.clip(anchor.x(), left, right)
        beyond = (bottom < anchor.y()) | (top > anchor.y())
        begin = np.where(bottom < anchor.y(), bottom, anchor.y())
        end = np.where(top > anchor.y(), top, anchor.y())
        stem = np.column_stack([stem_x - 1, begin, stem_x + 1, end])
        return inside & ~_meets(reach, taken) & ~(beyond & _meets(stem, taken))


def leader_rooms(label: QRectF, anchor: QPointF) -> list[QRectF]:
    """The thin upright stretch between a label and its anchor, if they stand apart."""
    x = min(max(anchor.x(), label.left()), label.right())
    if label.bottom() < anchor.y() - GAP:
        return [QRectF(x - 1.5, label.bottom(), 3.0, anchor.y() - label.bottom())]
    if label.top() > anchor.y() + GAP:
        return [QRectF(x - 1.5, anchor.y(), 3.0, label.top() - anchor.y())]
    return []


def _meets(rooms: Array, taken: Array) -> NDArray[np.bool_]:
    if not len(taken):
        return np.zeros(len(rooms), dtype=bool)
    a, b = rooms[:, None, :], taken[None, :, :]
    over = (a[..., 0] < b[..., 2]) & (a[..., 2] > b[..., 0]) & (a[..., 1] < b[..., 3]) & (a[..., 3] > b[..., 1])
    return np.any(over, axis=1)
