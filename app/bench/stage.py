"""What every part of the drawing is given: the scene, where it lies on the screen, colours and type."""

from bisect import bisect_left, bisect_right
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from PySide6.QtGui import QFont, QFontMetricsF

from app.bench.frame import Frame
from app.document import Scene
from app.theme import Theme, text_font
from shaftcore.geometry import Profile, faces_of, profile_of
from shaftcore.notch_sites import Seating, seatings
from shaftcore.notches._contract import Array
from shaftcore.outline import upper_outline
from shaftcore.shaft import Shaft

SMALL = 8.5
FOOT = 60.0
"""Pixels at the bottom for station numbers, ruler marks and the legend."""


class Plan:
    """The shaft's shape in mm, worked out once for each shaft."""

    def __init__(self, shaft: Shaft) -> None:
        self.shaft = shaft
        self.seated: tuple[Seating, ...] = seatings(shaft)
        self.outline: Array = upper_outline(shaft, self.seated)

    @cached_property
    def faces(self) -> tuple[float, ...]:
        return faces_of(self.shaft)

    @cached_property
    def profile(self) -> Profile:
        return profile_of(self.shaft)

    def radius_at(self, x: float) -> float:
        """The larger plain radius (mm) of both sides of x."""
        if not self.shaft.segments:
            return 0.0
        last = len(self.shaft.segments) - 1
        sides = bisect_left(self.faces, x) - 1, bisect_right(self.faces, x) - 1
        return max(self._radius_within(min(max(i, 0), last), x) for i in sides)

    def radii_at(self, x: Array) -> Array:
        """`radius_at` of many places (n,) at once."""
        profile, last = self.profile, len(self.shaft.segments) - 1
        sides = []
        for side in ("left", "right"):
            i = np.clip(np.searchsorted(profile.faces, x, side) - 1, 0, last)
            share = np.clip((x - profile.faces[i]) / np.diff(profile.faces)[i], 0.0, 1.0)
            sides.append(profile.left[i] + share * (profile.right[i] - profile.left[i]))
        radii: Array = np.maximum(*sides) / 2
        return radii

    def _radius_within(self, index: int, x: float) -> float:
        segment = self.shaft.segments[index]
        share = min(max((x - self.faces[index]) / segment.length, 0.0), 1.0)
        return (segment.diameter + share * (segment.right_diameter - segment.diameter)) / 2


@dataclass(frozen=True, eq=False)
class Stage:
    """One picture's givens; `pixel_ratio` is device pixels per pixel."""

    scene: Scene
    plan: Plan
    frame: Frame
    theme: Theme
    pixel_ratio: float

    @property
    def shaft(self) -> Shaft:
        return self.plan.shaft

    @property
    def foot(self) -> float:
        """y where the strip at the bottom begins."""
        return self.frame.height - FOOT

    @cached_property
    def upper_edge(self) -> Array:
        """The outline in pixels without points nearer than half a device pixel to the one before."""
        points = self.frame.points(self.plan.outline)
        moved = np.any(np.diff(np.rint(points * (2 * self.pixel_ratio)), axis=0) != 0, axis=1)
        return points[np.concatenate([[True], moved])]

    @cached_property
    def lower_edge(self) -> Array:
        return self.upper_edge * np.array([1.0, -1.0]) + np.array([0.0, 2 * self.frame.axis])

    def chosen(self, thing: str, sorts: tuple[str, ...] = ()) -> bool:
        """Whether the thing with this id is chosen, as one of `sorts` where given."""
        chosen = self.scene.chosen
        return chosen is not None and chosen[1] == thing and (not sorts or chosen[0] in sorts)


class Type:
    """Fonts of the drawing, made once, with the width of texts remembered."""

    def __init__(self) -> None:
        self.plain, self.bold = text_font(SMALL), text_font(SMALL, bold=True)
        self._widths: dict[tuple[str, bool], float] = {}
        self._plain, self._bold = QFontMetricsF(self.plain), QFontMetricsF(self.bold)
        self.line = self._plain.height()
        self.ascent = self._plain.ascent()

    def font(self, bold: bool) -> QFont:
        return self.bold if bold else self.plain

    def width(self, text: str, bold: bool = False) -> float:
        known = self._widths.get((text, bold))
        if known is None:
            known = (self._bold if bold else self._plain).horizontalAdvance(text)
            if len(self._widths) > 4096:
                self._widths.clear()
            self._widths[text, bold] = known
        return known
