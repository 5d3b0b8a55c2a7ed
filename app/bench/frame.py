"""Where a place on the shaft lies on the screen: one scale along and across."""

from dataclasses import dataclass

import numpy as np
from PySide6.QtCore import QPointF

from shaftcore.notches._contract import Array


@dataclass(frozen=True)
class Frame:
    """Pixels of the widget: `origin` is where x = 0 lies, `axis` the centre line, `scale` px per mm."""

    origin: float
    scale: float
    axis: float
    width: float
    height: float

    def x(self, mm: float) -> float:
        return self.origin + mm * self.scale

    def y(self, mm: float) -> float:
        """Pixels from the top for a height above the axis."""
        return self.axis - mm * self.scale

    def to_screen(self, x: float, y: float) -> QPointF:
        return QPointF(self.x(x), self.y(y))

    def to_shaft(self, pos: QPointF) -> tuple[float, float]:
        return (pos.x() - self.origin) / self.scale, (self.axis - pos.y()) / self.scale

    def points(self, shaft_points: Array, mirrored: bool = False) -> Array:
        """Points (n, 2) in mm to pixels; `mirrored` takes the lower half."""
        sense = 1.0 if mirrored else -1.0
        return shaft_points * np.array([self.scale, sense * self.scale]) + np.array([self.origin, self.axis])
