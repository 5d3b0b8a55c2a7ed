"""Properties of a round section, solid or bored. Arrays in, arrays out, mm."""

import numpy as np

from shaftcore.notches._contract import Array


def area(d: Array, bore: Array) -> Array:
    """A = pi/4 (d² - di²), mm²."""
    return np.pi / 4 * (d**2 - bore**2)


def second_moment(d: Array, bore: Array) -> Array:
    """I = pi/64 (d⁴ - di⁴), mm⁴."""
    return np.pi / 64 * (d**4 - bore**4)


def bending_modulus(d: Array, bore: Array) -> Array:
    """W = pi (d⁴ - di⁴)/(32 d), mm³."""
    return np.pi * (d**4 - bore**4) / (32 * d)


def torsion_modulus(d: Array, bore: Array) -> Array:
    """Wt = pi (d⁴ - di⁴)/(16 d), mm³."""
    return np.pi * (d**4 - bore**4) / (16 * d)


def shear_coefficient(d: Array, bore: Array, poisson_ratio: float) -> Array:
    """Cowper's coefficient for the round and the hollow round section (G. R. Cowper 1966).

    k = 6(1+nu)(1+m²)²/((7+6nu)(1+m²)² + (20+12nu) m²), m = di/d.
    """
    m2 = (bore / d) ** 2
    ring = (1 + m2) ** 2
    return 6 * (1 + poisson_ratio) * ring / ((7 + 6 * poisson_ratio) * ring + (20 + 12 * poisson_ratio) * m2)
