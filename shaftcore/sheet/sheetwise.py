"""Where things of the shaft lie on paper."""

from typing import Any

import numpy as np

from shaftcore.notches._contract import Array
from shaftcore.outline import upper_outline
from shaftcore.results import Results
from shaftcore.sheet.spread import TAG, rows_needed

EDGE = 14.0
"""Room (mm) left and right of the shaft."""
CLEAR = 15.0
"""Room (mm) above and below the shaft for arrows and bearings."""
ROW = 4.6
"""Height (mm) of a row of numbers or marks."""


class Sheetwise:
    """From the shaft's mm to mm on paper; the axis lies at height `middle`."""

    def __init__(self, results: Results, width: float, tallest: float) -> None:
        outline = upper_outline(results.shaft)
        self.length, self.radius = results.shaft.length, float(outline[:, 1].max())
        self.scale = min((width - 2 * EDGE) / self.length, tallest / (2 * self.radius))
        self.left = (width - self.length * self.scale) / 2
        self.width, self.half = width, self.radius * self.scale
        count = len(results.stations)
        self.gap = 2.0 + 1.4 * len(str(count))
        self.rows = rows_needed(count, self.gap, width, 2)
        self.every = -(-int(count * self.gap) // int(self.rows * width))
        self.tags = len(results.shaft.loads) + len(results.shaft.supports)
        self.tag_rows = rows_needed(self.tags, TAG, width, 4)
        self.foot = 19.0 + ROW * self.tag_rows
        self.middle = self.foot + CLEAR + self.half
        self.height = self.middle + self.half + CLEAR + 5.0 + ROW * (self.rows + 0.5)
        self.outline = self.points(outline)

    def x(self, along: Any) -> Any:
        return self.left + np.asarray(along) * self.scale

    def points(self, at: Array) -> Array:
        """Shaft points (x, radius) as paper points above the axis, radius still from the axis."""
        return np.column_stack([self.x(at[:, 0]), at[:, 1] * self.scale])

    def edge(self, along: float) -> float:
        """Largest radius on paper at a place of the shaft (mm of the shaft)."""
        x = float(self.x(along))
        near = np.abs(self.outline[:, 0] - x) < 1e-9
        if near.any():
            return float(self.outline[near, 1].max())
        return float(np.interp(x, self.outline[:, 0], self.outline[:, 1]))
