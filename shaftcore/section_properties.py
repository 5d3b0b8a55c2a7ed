"""Properties of a round section, solid or bored. Arrays in, arrays out, mm."""

import numpy as np

from shaftcore.notches._contract import Array


def area(d: Array, bore: Array) -> Array:
    """A = pi/4 (d² - di²), mm²."""
    return np.pi / 4 * (d * d - bore * bore)


def second_moment(d: Array, bore: Array) -> Array:
    """I = pi/64 (d⁴ - di⁴), mm⁴."""
    return np.pi / 64 * _fourth(d, bore)


def bending_modulus(d: Array, bore: Array) -> Array:
    """W = pi (d⁴ - di⁴)/(32 d), mm³."""
    return np.pi * _fourth(d, bore) / (32 * d)


def torsion_modulus(d: Array, bore: Array) -> Array:
    """Wt = pi (d⁴ - di⁴)/(16 d), mm³."""
    return np.pi * _fourth(d, bore) / (16 * d)


def _fourth(d: Array, bore: Array) -> Array:
    """d⁴ - di⁴ as (d² - di²)(d² + di²), which loses no digits where the wall is thin."""
    outer, inner = d * d, bore * bore
    return (outer - inner) * (outer + inner)


def shear_coefficient(d: Array, bore: Array, poisson_ratio: float) -> Array:
    """Cowper's coefficient for the round and the hollow round section (G. R. Cowper 1966).

    k = 6(1+nu)(1+m²)²/((7+6nu)(1+m²)² + (20+12nu) m²), m = di/d.
    """
    m2 = (bore / d) ** 2
    ring = (1 + m2) ** 2
    return 6 * (1 + poisson_ratio) * ring / ((7 + 6 * poisson_ratio) * ring + (20 + 12 * poisson_ratio) * m2)
