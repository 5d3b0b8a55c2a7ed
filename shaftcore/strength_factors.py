"""Endurance limit Se = ka kb kc kd ke kf Se' (Marin), after the Shigley textbooks, written from memory.

Arrays broadcast; d in mm, strengths in MPa, temperature in °C.
"""

from statistics import NormalDist

import numpy as np
from numpy.typing import ArrayLike

from shaftcore.notches._contract import Array
from shaftcore.surface import FINISHES

FINISH_TABLES: dict[str, dict[str, tuple[float, float]]] = {
    "older": {
        "ground": (1.58, -0.085),
        "machined": (4.51, -0.265),
        "hot-rolled": (57.7, -0.718),
        "as-forged": (272.0, -0.995),
    },
    "newer": {
        "ground": (1.38, -0.067),
        "machined": (3.04, -0.217),
        "hot-rolled": (38.6, -0.650),
        "as-forged": (54.9, -0.758),
    },
}
"""ka = a Sut^b by finish; both published tables."""

SIZE_LOW, SIZE_SWITCH, SIZE_HIGH = 2.79, 51.0, 254.0
"""Diameters (mm) between which the two size formulas hold."""

STANDING_SHARE = 0.37
"""Equivalent diameter of a round bar that does not turn under its load, as a share of d."""

AXIAL_FACTOR = 0.85
"""Strength under alternating axial load as a share of that in bending (kc)."""

PLAIN_SHARE, PLAIN_CAP = 0.5, 700.0
TEMPERATURE_FIT = (0.975, 0.432e-3, -0.115e-5, 0.104e-8, -0.595e-12)
TEMPERATURE_LOW_F, TEMPERATURE_HIGH_F = 70.0, 1000.0
RELIABILITY_SPREAD = 0.08


def plain_endurance(tensile_strength: float) -> float:
    """Se' = 0.5 Sut, at most 700 MPa."""
    return min(PLAIN_SHARE * tensile_strength, PLAIN_CAP)


def finish_factors(table: str, tensile_strength: float) -> Array:
    """ka for every finish, in the order of `surface.FINISHES`; at most 1."""
    rows = FINISH_TABLES[table]
    return np.array([min(rows[name][0] * tensile_strength ** rows[name][1], 1.0) for name, _ in FINISHES])


def size_factor(d: ArrayLike, turning: bool, axial_alone: ArrayLike = False) -> Array:
    """kb = 1.24 d^-0.107 up to 51 mm, 1.51 d^-0.157 above; 1 under axial load alone.

    A shaft that stands still uses 0.37 d. d is held within 2.79 and 254 mm.
    """
    d = np.asarray(d, dtype=float) * (1.0 if turning else STANDING_SHARE)
    d = np.clip(d, SIZE_LOW, SIZE_HIGH)
    kb = np.where(d <= SIZE_SWITCH, 1.24 * d**-0.107, 1.51 * d**-0.157)
    return np.where(axial_alone, 1.0, np.minimum(kb, 1.0))


def temperature_factor(celsius: float) -> float:
    """kd: polynomial in °F from 70 to 1000 °F; 1 below."""
    fahrenheit = min(celsius * 9 / 5 + 32, TEMPERATURE_HIGH_F)
    if fahrenheit < TEMPERATURE_LOW_F:
        return 1.0
    return float(np.polynomial.polynomial.polyval(fahrenheit, TEMPERATURE_FIT))


def reliability_factor(reliability: float) -> float:
    """ke = 1 - 0.08 z, z the normal quantile of the reliability."""
    return 1 - RELIABILITY_SPREAD * NormalDist().inv_cdf(reliability)
