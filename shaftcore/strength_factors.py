"""Endurance limit Se = ka kb kc kd ke kf Se' (Marin), after the Shigley textbooks, written from memory.

Arrays broadcast; d in mm, strengths in MPa, temperature in °C.
"""

from statistics import NormalDist

import numpy as np
from numpy.typing import ArrayLike

from shaftcore.notches._contract import Array
from shaftcore.surface import FINISHES
from shaftcore.units import dimension

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

SIZE_SMALL, SIZE_LARGE = (1.24, -0.107), (1.51, -0.157)
"""kb = factor d^power up to SIZE_SWITCH and above it."""

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


def size_diameter(d: ArrayLike, turning: bool, torsion_alternates: ArrayLike = False) -> Array:
    """Diameter (mm) the size factor is taken for: d, and 0.37 d where a standing shaft is only bent.

    The 0.37 stands for the small part of the surface near the highest bending stress. Alternating
    torsion stresses the whole surface alike, standing or turning, so it takes d in full.
    """
    d = np.asarray(d, dtype=float)
    return d if turning else np.where(torsion_alternates, d, STANDING_SHARE * d)


def size_factor(size_diameter: ArrayLike, axial_alone: ArrayLike = False) -> Array:
    """kb = 1.24 d^-0.107 up to 51 mm, 1.51 d^-0.157 above; 1 under axial load alone, never above 1.

    Fitted for 2.79 to 254 mm. Below, the bound of 1 rules; above, the power is carried on, since
    holding the last value would be unsafe.
    """
    d = np.asarray(size_diameter, dtype=float)
    (low, low_power), (high, high_power) = SIZE_SMALL, SIZE_LARGE
    small = d <= SIZE_SWITCH
    kb = np.where(small, low, high) * d ** np.where(small, low_power, high_power)
    return np.where(axial_alone, 1.0, np.minimum(kb, 1.0))


def in_fahrenheit(celsius: float) -> float:
    """The temperature in the unit the published polynomial asks for."""
    return dimension("temperature").us.shown(celsius)


def temperature_factor(celsius: float) -> float:
    """kd: polynomial in °F from 70 to 1000 °F; 1 below."""
    fahrenheit = min(in_fahrenheit(celsius), TEMPERATURE_HIGH_F)
    if fahrenheit < TEMPERATURE_LOW_F:
        return 1.0
    return float(np.polynomial.polynomial.polyval(fahrenheit, TEMPERATURE_FIT))


def reliability_quantile(reliability: float) -> float:
    """z, the quantile of the standard normal distribution."""
    return NormalDist().inv_cdf(reliability)


def reliability_factor(reliability: float) -> float:
    """ke = 1 - 0.08 z."""
    return 1 - RELIABILITY_SPREAD * reliability_quantile(reliability)
