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
Room = tuple[float, float, float, float]
"""Left, top, right, bottom."""
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
    """The room left for labels between `top` and `bottom`, in pixels.

    What lies on the board is taken first; which choices it leaves a label is found once and serves
    every order in which labels are tried.
    """

    def __init__(self, width: float, top: float, bottom: float) -> None:
        self.width, self.top, self.bottom = width, top, bottom
        self._taken: list[Room] = []
        self._labels: list[Room] = []
        self._left: dict[tuple[str, float, float, float, float], tuple[Array, Array]] = {}

    def take(self, room: QRectF) -> None:
        """Room that is no label's."""
        self._taken.append((room.left(), room.top(), room.right(), room.bottom()))
        self._left.clear()

    def clear_labels(self) -> None:
        self._labels = []

    def place(self, wanted: Wanted, row: float) -> QRectF | None:
        """The nearest free place, taken at once with its leader; None where there is none."""
        rooms, leaders = self._choices_left(wanted, row)
        free = np.flatnonzero(_clear(rooms, leaders, np.array(self._labels).reshape(-1, 4)))
        if not len(free):
            return None
        left, top, right, bottom = rooms[free[0]].tolist()
        found = QRectF(left, top, right - left, bottom - top)
        for taken in (found, *leader_rooms(found, wanted.anchor)):
            self._labels.append((taken.left(), taken.top(), taken.right(), taken.bottom()))
        return found

    def _choices_left(self, wanted: Wanted, row: float) -> tuple[Array, Array]:
        """Rooms and leaders (n, 4) each, best first, that lie on the board and meet nothing but labels."""
        x, y = wanted.anchor.x(), wanted.anchor.y()
        key = wanted.key, wanted.width, wanted.height, x, y
        if key not in self._left:
            rooms = self._choices(wanted, row)
            left, top, right, bottom = rooms.T
            on_board = (left >= EDGE) & (right <= self.width - EDGE) & (top >= self.top) & (bottom <= self.bottom)
            rooms = rooms[on_board]
            leaders = _leaders(rooms, x, y)
            free = _clear(rooms, leaders, np.array(self._taken).reshape(-1, 4))
            self._left[key] = rooms[free], leaders[free]
        return self._left[key]

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


def _leaders(rooms: Array, x: float, y: float) -> Array:
    """The upright stretch (n, 4) between each room and its anchor; turned inside out where there is none."""
    left, top, right, bottom = rooms.T
    stem = np.clip(x, left, right)
    made = np.column_stack([stem - 1, np.minimum(bottom, y), stem + 1, np.maximum(top, y)])
    made[(bottom >= y) & (top <= y)] = np.inf, np.inf, -np.inf, -np.inf
    return made


def leader_rooms(label: QRectF, anchor: QPointF) -> list[QRectF]:
    """The thin upright stretch between a label and its anchor, if they stand apart."""
    x = min(max(anchor.x(), label.left()), label.right())
    if label.bottom() < anchor.y() - GAP:
        return [QRectF(x - 1.5, label.bottom(), 3.0, anchor.y() - label.bottom())]
    if label.top() > anchor.y() + GAP:
        return [QRectF(x - 1.5, anchor.y(), 3.0, label.top() - anchor.y())]
    return []


def _clear(rooms: Array, leaders: Array, taken: Array) -> NDArray[np.bool_]:
    """Whether each room, with a gap at its sides, and its leader meet nothing that is taken."""
    if not (len(rooms) and len(taken)):
        return np.ones(len(rooms), dtype=bool)
    near = (taken[:, 0] < rooms[:, 2].max() + GAP) & (taken[:, 2] > rooms[:, 0].min() - GAP)
    taken = np.ascontiguousarray(taken[near].T)
    return ~(_meets(rooms + REACH, taken) | _meets(leaders, taken))


def _meets(rooms: Array, taken: Array) -> NDArray[np.bool_]:
    """Which of the rooms (n, 4) lie over any of the columns of `taken` (4, m)."""
    left, top, right, bottom = np.ascontiguousarray(rooms.T)[:, :, None]
    over = (left < taken[2]) & (right > taken[0])
    over &= top < taken[3]
    over &= bottom > taken[1]
    meets: NDArray[np.bool_] = over.any(axis=1)
    return meets
