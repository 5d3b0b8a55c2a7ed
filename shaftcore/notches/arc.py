"""What shoulders and round grooves share: a circular arc of radius r that climbs a height h."""

import math

from shaftcore.notches._contract import Sizes
from shaftcore.records import ValidRange

SIZE_SYMBOLS = {"d": "d", "D": "D", "h": "h", "r": "r"}
SIZE_LABELS = {"d": "Net diameter", "D": "Large diameter", "h": "Step height or depth", "r": "Root radius"}
DIN_RANGES = (ValidRange("r/h", 0.03, math.inf), ValidRange("d/D", 0.0, 0.98))


def arc_along(r: float, h: float) -> float:
    """Length along the shaft (mm) the arc takes; beyond a quarter circle the flank is upright."""
    return r if r <= h else math.sqrt(h * (2 * r - h))


def largest_arc_radius(room: float, h: float) -> float:
    """The largest radius (mm) whose arc takes no more than `room` along the shaft: `arc_along` turned round."""
    return room if room <= h else (room**2 / h + h) / 2


def arc_turn(r: float, h: float) -> float:
    """Angle (rad) through which the arc turns while it climbs, a right angle at most."""
    return math.acos(max(1 - h / r, 0.0))


def parameters(sizes: Sizes) -> Sizes:
    """The ratios that the ranges of the fits are stated in."""
    h, r, d, large = sizes["h"], sizes["r"], sizes["d"], sizes["D"]
    return {"h/r": h / r, "r/h": r / h, "r/d": r / d, "d/D": d / large, "D/d": large / d}
