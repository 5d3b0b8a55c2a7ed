"""A raiser seen closely: which of its outlines are shown, and at which scale they fit a room."""

from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np
from PySide6.QtCore import QRectF

from app.bench.frame import Frame
from app.bench.overlay import LEAST_RADIUS, seating_of
from app.bench.sizes import Size
from shaftcore.notch_sites import Seating
from shaftcore.notches._contract import Array
from shaftcore.outline import outline_between, outline_with, ring_corner
from shaftcore.radius_window import RadiusWindow
from shaftcore.shaft import Shaft

LARGER, FAR = 1.3, 8.0
"""What is shown reaches as far as the size would take if it were so much larger; limits that are
farther off than `FAR` times the size do not count, the number beside the picture is enough."""
SPARE = 1.25
"""Room round what is shown."""
SCALES = tuple(lead * 10.0**decade for decade in range(4) for lead in (1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8))
LEAST_SCALE = 2.0
"""Less enlarged than this there is nothing to see that the bench does not show."""


@dataclass(frozen=True, eq=False)
class CloseUp:
    """One raiser of a shaft at rest, and what other values of one of its sizes would make of it; mm.

    `needed` and `allowed` bound the radius window; `ring` is the corner of what seats there. None
    where there is none.
    """

    shaft: Shaft
    seating: Seating
    size: Size
    window: RadiusWindow | None

    @cached_property
    def needed(self) -> Array | None:
        needed = self.window.needed if self.window else None
        return None if needed is None else self.outline(needed)

    @cached_property
    def allowed(self) -> Array | None:
        return self.outline(self.window.allowed) if self.window else None

    @cached_property
    def ring(self) -> Array | None:
        return ring_corner(self.seating)

    def outline(self, value: float) -> Array:
        """Points (n, 2) of the raiser alone."""
        return outline_with(self.seating, self.size.name, max(value, LEAST_RADIUS))

    def metal(self, value: float) -> Array:
        """Points (n, 2) of the raiser with the plain edge beside it."""
        record = replace(self.seating.record, **{self.size.name: value})
        return outline_between(self.shaft, replace(self.seating, record=record))

    def region(self, value: float) -> tuple[Array, Array]:
        """Corners of the box round all points that move when the size changes about a value."""
        limits = (self.window.needed, self.window.allowed) if self.window else ()
        near = [limit for limit in limits if limit is not None and limit <= FAR * value]
        now, *others = (self.outline(v) for v in (value, LARGER * value, *near))
        stands = {tuple(point) for point in now} & {tuple(point) for point in others[0]}
        moving = np.array([point for outline in (now, *others) for point in outline if tuple(point) not in stands])
        if self.ring is not None:
            moving = np.vstack([moving, self.ring[1:-1]])
        return moving.min(axis=0), moving.max(axis=0)


def close_up(shaft: Shaft, size: Size, window: RadiusWindow | None) -> CloseUp | None:
    """A close view for a size that a handle on the outline of a raiser pulls; None for any other."""
    seating = seating_of(shaft, size)
    return CloseUp(shaft, seating, size, window) if seating is not None and _has_handle(seating, size) else None


def has_close_up(shaft: Shaft, size: Size) -> bool:
    """Whether there is a close view for a size."""
    return close_up(shaft, size, None) is not None


def _has_handle(seating: Seating, size: Size) -> bool:
    return size.name in {handle.size for handle in seating.kind.handles(seating.record, seating.around)}


def lens_frame(shown: CloseUp, value: float, room: QRectF, scale: float) -> tuple[Frame, float] | None:
    """(frame, how many times the bench's `scale`) that shows the raiser in `room`; None where little is gained."""
    begin, end = shown.region(value)
    across = np.maximum((end - begin) * SPARE, 1e-9)
    most = min(room.width() / across[0], room.height() / across[1]) / scale
    times = max((step for step in SCALES if step <= most), default=0.0)
    if times < LEAST_SCALE:
        return None
    middle, px = (begin + end) / 2, times * scale
    origin, axis = room.center().x() - middle[0] * px, room.center().y() + middle[1] * px
    return Frame(float(origin), px, float(axis), room.right(), room.bottom()), times
