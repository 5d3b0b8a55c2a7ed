"""Stresses of a section joined into one amplitude, one mean and one greatest value (distortion energy).

After the shaft chapter of the Shigley textbooks, from memory. MPa; arrays of one shape.
"""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from shaftcore.notches._contract import Array
from shaftcore.strength_factors import AXIAL_FACTOR

ROUNDING = 1e-9
"""A stress below this share of the others is left over from summing forces, not a load."""


@dataclass(frozen=True, eq=False)
class Nominal:
    """Nominal net-section stresses: bending and torsion amplitudes and means >= 0, axial mean signed."""

    bending_amplitude: Array
    bending_mean: Array
    axial_amplitude: Array
    axial_mean: Array
    torsion_amplitude: Array
    torsion_mean: Array


@dataclass(frozen=True, eq=False)
class Fatigue:
    """Fatigue factors for bending, axial load and torsion (1 where the section is plain)."""

    bending: Array
    axial: Array
    torsion: Array


def axial_alone(s: Nominal) -> NDArray[np.bool_]:
    """Where nothing but axial stress alternates; stresses that are rounding beside it count as none."""
    return (s.axial_amplitude > 0) & (s.bending_amplitude + s.torsion_amplitude <= ROUNDING * s.axial_amplitude)


def torsion_alternates(s: Nominal) -> NDArray[np.bool_]:
    """Where a torsion amplitude counts at all beside the other amplitudes."""
    return s.torsion_amplitude > ROUNDING * (s.bending_amplitude + s.axial_amplitude)


def equivalent_amplitude(s: Nominal, k: Fatigue) -> Array:
    """σa' = √((Kf,b σb,a + Kf,ax σax,a/0.85)² + 3 (Kfs τa)²)."""
    normal = k.bending * s.bending_amplitude + k.axial * s.axial_amplitude / AXIAL_FACTOR
    return np.sqrt(normal**2 + 3 * (k.torsion * s.torsion_amplitude) ** 2)


def mean_axial_factor(s: Nominal, k: Fatigue) -> Array:
    """Kf,ax on a tensile axial mean, 1 on a compressive one."""
    return np.where(s.axial_mean < 0, 1.0, k.axial)


def equivalent_mean(s: Nominal, k: Fatigue, notch_on_steady_torque: bool = True) -> Array:
    """σm' = √((Kf,b σb,m + Kf,ax σax,m)² + 3 (Kfs τm)²).

    A compressive normal mean counts as none, and compression beside tensile bending relieves it by
    its nominal size only: the peaks of the two lie at different places (common practice, no source).
    """
    normal = np.maximum(k.bending * s.bending_mean + mean_axial_factor(s, k) * s.axial_mean, 0.0)
    kfs = k.torsion if notch_on_steady_torque else 1.0
    return np.sqrt(normal**2 + 3 * (kfs * s.torsion_mean) ** 2)


def greatest_stress(s: Nominal, k: Fatigue, notched: bool = True) -> Array:
    """σmax' = √((Kf,b (σb,m + σb,a) + Kf,ax (|σax,m| + σax,a))² + 3 (Kfs (τm + τa))²); plain if not `notched`."""
    bending, axial, torsion = (k.bending, k.axial, k.torsion) if notched else (1.0, 1.0, 1.0)
    normal = bending * (s.bending_mean + s.bending_amplitude) + axial * (np.abs(s.axial_mean) + s.axial_amplitude)
    return np.sqrt(normal**2 + 3 * (torsion * (s.torsion_mean + s.torsion_amplitude)) ** 2)
