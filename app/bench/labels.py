"""Placing labels so that none lies on another or on the drawing: beside their thing, else in rows beyond it."""

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from PySide6.QtCore import QPointF, QRectF

from shaftcore.notches._contract import Array

GAP = 4.0
EDGE = 6.0
BESIDE = 12.0
SHARES = np.array([0.5, 0.2, 0.8, 0.0, 1.0])
"""Where along its width a label may stand over its anchor."""
REACH = np.array([-GAP, 0.0, GAP, 0.0])


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
        self._rooms = np.empty((256, 4))
        self._count = 0

    def take(self, room: QRectF) -> None:
        if self._count == len(self._rooms):
            self._rooms = np.vstack([self._rooms, np.empty_like(self._rooms)])
        self._rooms[self._count] = room.left(), room.top(), room.right(), room.bottom()
        self._count += 1

    def copy(self) -> "Board":
        twin = Board(self.width, self.top, self.bottom)
        twin._rooms, twin._count = self._rooms.copy(), self._count
        return twin

    def place(self, wanted: Wanted, row: float) -> QRectF | None:
        """The nearest free place, taken at once with its leader; None where there is none."""
        choices = self._choices(wanted, row)
        free = np.flatnonzero(self._free(choices, wanted.anchor.x(), wanted.anchor.y()))
        if not len(free):
            return None
        left, top, right, bottom = choices[free[0]].tolist()
        found = QRectF(left, top, right - left, bottom - top)
        self.take(found)
        for leader in leader_rooms(found, wanted.anchor):
            self.take(leader)
        return found

    def _choices(self, wanted: Wanted, row: float) -> Array:
        """Rooms (n, 4) as left, top, right, bottom, best first: both sides, row after row, then off to both sides."""
        x, y, sense = wanted.anchor.x(), wanted.anchor.y(), -1.0 if wanted.upward else 1.0
        above = y + sense * (GAP + np.arange(0.0, max(self.bottom - self.top, row), row))
        above -= wanted.height if wanted.upward else 0.0
        beside = y + sense * np.arange(0.0, wanted.height + 2 * row, row / 2)
        beside -= 0.0 if wanted.upward else wanted.height
        level = beside[: math.ceil(2 * wanted.height / row)]
        beyond = beside[len(level) :]
        lefts = np.clip(x - wanted.width * SHARES, EDGE, max(self.width - wanted.width - EDGE, EDGE))
        sides = np.array([x + BESIDE, x - BESIDE - wanted.width])
        left = np.concatenate([np.tile(sides, len(level)), np.tile(lefts, len(above)), np.tile(sides, len(beyond))])
        top = np.concatenate([np.repeat(level, 2), np.repeat(above, len(lefts)), np.repeat(beyond, 2)])
        return np.column_stack([left, top, left + wanted.width, top + wanted.height])

    def _free(self, rooms: Array, x: float, y: float) -> NDArray[np.bool_]:
        """Whether each room and its leader meet nothing and lie on the board."""
        left, top, right, bottom = rooms.T
        inside = (left >= EDGE) & (right <= self.width - EDGE) & (top >= self.top) & (bottom <= self.bottom)
        taken = self._rooms[: self._count]
        near = (taken[:, 0] < right.max() + GAP) & (taken[:, 2] > left.min() - GAP)
        taken = taken[near]
        stem = np.clip(x, left, right)
        leader = np.column_stack([stem - 1, np.minimum(bottom, y), stem + 1, np.maximum(top, y)])
        beyond = (bottom < y) | (top > y)
        return inside & ~_meets(rooms + REACH, taken) & ~(beyond & _meets(leader, taken))


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
