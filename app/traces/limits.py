"""How far each vertical axis reaches, and when it must reach further. Pure arithmetic of the picture."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from app.traces.tracks import MARGIN_CAP, Curve, Track
from shaftcore.notches._contract import Array
from shaftcore.units import System, dimension

Limits = tuple[float, float]

ROOM, GROWN_ROOM = 0.08, 0.30
"""Free share above and below the curves: in a settled picture, and after growing under a drag."""
SECOND_ROOM = 0.3
LEAST_FILLED = 0.5
"""A settled axis of which less than this is used is fitted anew."""
MARGIN_TOPS = (1.0, 2.0, MARGIN_CAP)
MARGIN_FLOORS = (-0.25, -0.5, -1.0)
EDGE_ROOM, TOP_ROOM = 0.04, 0.1
"""Free shares beyond an end that no line crosses, and above a capped end with its number."""


@dataclass(frozen=True)
class Scale:
    """One vertical axis: its dimension, its ends in the unit shown, and where a capped one ends."""

    dimension: str
    limits: Limits
    cap: float | None = None

    def holds(self, curves: Sequence[Curve]) -> bool:
        """True where no curve leaves the axis, but upwards where it is capped."""
        low, high = _needed(curves)
        return self.limits[0] <= low and (self.cap is not None or high <= self.limits[1])

    def pinned(self, values: Array) -> Array:
        """Values of marks, held at the end of a capped axis."""
        return values if self.cap is None else np.minimum(values, self.cap)


def scales_of(
    track: Track, curves: Sequence[Curve], system: System, before: Sequence[Scale] = (), live: bool = False
) -> tuple[Scale, ...]:
    """The vertical axes of a track: the left one first, the right one with its zero at the same height.

    Where the scales shown before still serve they stay, so that the picture rests.
    """
    if before and _serve(track, curves, before, live):
        return tuple(before)
    if track.capped:
        return (_capped(track.dimensions[0], curves, system),)
    found: list[Scale] = []
    for name in track.dimensions:
        own = [curve for curve in curves if curve.line.dimension == name]
        if own or not found:
            # the second scale stays lower, so that its line does not lie on the first one's
            room = (GROWN_ROOM if live else ROOM) + (SECOND_ROOM if found else 0.0)
            found.append(Scale(name, _with_room(_needed(own), room)))
    return _one_zero(found)


def _serve(track: Track, curves: Sequence[Curve], scales: Sequence[Scale], live: bool) -> bool:
    shown = {curve.line.dimension for curve in curves} | {track.dimensions[0]}
    if shown != {scale.dimension for scale in scales} or (track.capped and not live):
        return False
    filled = 0.0
    for scale in scales:
        own = [curve for curve in curves if curve.line.dimension == scale.dimension]
        low, high = _needed(own)
        filled = max(filled, (high - low) / (scale.limits[1] - scale.limits[0]))
        if not scale.holds(own):
            return False
    return live or filled >= LEAST_FILLED


def _needed(curves: Sequence[Curve]) -> Limits:
    """Lowest and highest value, zero included."""
    values = [array for curve in curves for array in (curve.y, curve.mark_y) if array.size]
    low = min((float(array.min()) for array in values), default=0.0)
    high = max((float(array.max()) for array in values), default=0.0)
    return min(low, 0.0), max(high, 0.0)


def _with_room(needed: Limits, room: float) -> Limits:
    low, high = needed
    span = high - low
    if span <= 0.0:
        return -EDGE_ROOM, 1.0
    return low - (room if low < 0 else EDGE_ROOM) * span, high + (room if high > 0 else EDGE_ROOM) * span


def _one_zero(scales: Sequence[Scale]) -> tuple[Scale, ...]:
    """The same scales, stretched so that their zeros lie at one height."""
    if len(scales) < 2:
        return tuple(scales)
    below = max(-s.limits[0] / (s.limits[1] - s.limits[0]) for s in scales)
    above = max(s.limits[1] / (s.limits[1] - s.limits[0]) for s in scales)
    share = below / (below + above)
    stretched = []
    for s in scales:
        span = max(-s.limits[0] / share, s.limits[1] / (1 - share))
        stretched.append(Scale(s.dimension, (-share * span, (1 - share) * span)))
    return tuple(stretched)


def _capped(dimension_name: str, curves: Sequence[Curve], system: System) -> Scale:
    """A margin's axis: down to the first floor below all values, up to the first top above most marks."""
    shown = dimension(dimension_name).unit(system).shown
    marks = np.concatenate([curve.mark_y for curve in curves]) if curves else np.empty(0)
    usual = float(np.median(marks)) if marks.size else shown(MARGIN_CAP)
    low = _needed(curves)[0]
    top = next((shown(t) for t in MARGIN_TOPS if usual <= shown(t)), shown(MARGIN_CAP))
    floor = next((shown(f) for f in MARGIN_FLOORS if low >= shown(f)), shown(MARGIN_FLOORS[-1]))
    span = top - floor
    return Scale(dimension_name, (floor - EDGE_ROOM * span, top + TOP_ROOM * span), top)
