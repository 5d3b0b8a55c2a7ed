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
FIRST_FEW = 16
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
        self._taken_columns: Array | None = None
        self._labels: list[Room] = []
        self._left: dict[tuple[str, float, float, float, float], tuple[Array, Array]] = {}

    def take(self, room: QRectF) -> None:
        """Room that is no label's."""
        self._taken.append((room.left(), room.top(), room.right(), room.bottom()))
        self._left.clear()
        self._taken_columns = None

    def clear_labels(self) -> None:
        self._labels = []

    def place(self, wanted: Wanted, row: float) -> QRectF | None:
        """The nearest free place, taken at once with its leader; None where there is none."""
        rooms, needed = self._choices_left(wanted, row)
        index = _first_clear(needed, _columns(self._labels))
        if index is None:
            return None
        left, top, right, bottom = rooms[index].tolist()
        found = QRectF(left, top, right - left, bottom - top)
        for taken in (found, *leader_rooms(found, wanted.anchor)):
            self._labels.append((taken.left(), taken.top(), taken.right(), taken.bottom()))
        return found

    def _choices_left(self, wanted: Wanted, row: float) -> tuple[Array, Array]:
        """Rooms (n, 4), best first, that lie on the board and meet nothing but labels, and what each needs."""
        x, y = wanted.anchor.x(), wanted.anchor.y()
        key = wanted.key, wanted.width, wanted.height, x, y
        if key not in self._left:
            rooms = self._choices(wanted, row)
            left, top, right, bottom = rooms.T
            rooms = rooms[(left >= EDGE) & (right <= self.width - EDGE) & (top >= self.top) & (bottom <= self.bottom)]
            needed = _needed(rooms, x, y)
            if self._taken_columns is None:
                self._taken_columns = _columns(self._taken)
            free = _clear(needed, _near(rooms, self._taken_columns))
            self._left[key] = rooms[free], needed[:, free]
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


def _needed(rooms: Array, x: float, y: float) -> Array:
    """What n labels need, (4, n, 2): the room with a gap at its sides, and the leader up to (x, y).

    A leader is turned inside out, and so meets nothing, where the label stands level with its anchor.
    """
    left, top, right, bottom = rooms.T
    stem = np.clip(x, left, right)
    apart = (bottom < y) | (top > y)
    needed = np.empty((4, len(rooms), 2))
    needed[..., 0] = (rooms + REACH).T
    needed[0, :, 1] = np.where(apart, stem - 1, np.inf)
    needed[1, :, 1] = np.minimum(bottom, y)
    needed[2, :, 1] = np.where(apart, stem + 1, -np.inf)
    needed[3, :, 1] = np.maximum(top, y)
    return needed


def leader_rooms(label: QRectF, anchor: QPointF) -> list[QRectF]:
    """The thin upright stretch between a label and its anchor, if they stand apart."""
    x = min(max(anchor.x(), label.left()), label.right())
    if label.bottom() < anchor.y() - GAP:
        return [QRectF(x - 1.5, label.bottom(), 3.0, anchor.y() - label.bottom())]
    if label.top() > anchor.y() + GAP:
        return [QRectF(x - 1.5, anchor.y(), 3.0, label.top() - anchor.y())]
    return []


def _columns(rooms: list[Room]) -> Array:
    """Rooms as (4, n)."""
    return np.array(rooms).reshape(-1, 4).T.copy()


def _first_clear(needed: Array, columns: Array) -> int | None:
    """The first of n labels that is clear; the first few are looked at alone, as one of them mostly is."""
    for begin, end in ((0, FIRST_FEW), (FIRST_FEW, needed.shape[1])):
        clear = np.flatnonzero(_clear(needed[:, begin:end], columns))
        if len(clear):
            return begin + int(clear[0])
    return None


def _near(rooms: Array, columns: Array) -> Array:
    """Of the rooms in `columns` (4, m) those above or below where any of `rooms` (n, 4) stands."""
    if not len(rooms):
        return columns
    return columns[:, (columns[0] < rooms[:, 2].max() + GAP) & (columns[2] > rooms[:, 0].min() - GAP)]


def _clear(needed: Array, columns: Array) -> NDArray[np.bool_]:
    """Which of n labels, with `needed` (4, n, 2), lie over none of the rooms in `columns` (4, m)."""
    if not (needed.size and columns.size):
        return np.ones(needed.shape[1], dtype=bool)
    left, top, right, bottom = needed[..., None]
    over = left < columns[2]
    over &= right > columns[0]
    over &= top < columns[3]
    over &= bottom > columns[1]
    clear: NDArray[np.bool_] = ~over.any(axis=(1, 2))
    return clear
