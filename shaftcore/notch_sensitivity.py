"""Notch sensitivity q and the fatigue factor Kf = 1 + q (Kt - 1). Arrays in, arrays out; r in mm, Sut in MPa."""

import numpy as np
from numpy.typing import ArrayLike

from shaftcore.notches._contract import Array
from shaftcore.records import ValidRange

NEUBER_BENDING = (1.24, -2.25e-3, 1.60e-6, -4.11e-10)
NEUBER_TORSION = (0.958, -1.83e-3, 1.43e-6, -4.11e-10)
NEUBER_RANGE = {"bending": ValidRange("S_ut", 340.0, 1700.0), "torsion": ValidRange("S_ut", 340.0, 1500.0)}


def neuber_root_a(tensile_strength: float, torsion: bool = False) -> float:
    """√a in √mm for steel (fit of the Shigley textbooks, Sut in MPa), Sut held within the fit's range."""
    limits = NEUBER_RANGE["torsion" if torsion else "bending"]
    s = min(max(tensile_strength, limits.low), limits.high)
    c0, c1, c2, c3 = NEUBER_TORSION if torsion else NEUBER_BENDING
    return c0 + s * (c1 + s * (c2 + s * c3))


def neuber_q(r: ArrayLike, tensile_strength: float, torsion: bool = False) -> Array:
    """q = 1/(1 + √a/√r) after Neuber."""
    return 1 / (1 + neuber_root_a(tensile_strength, torsion) / np.sqrt(np.asarray(r, dtype=float)))


def peterson_a(tensile_strength: float, torsion: bool = False) -> float:
    """a = 0.0254 (2070/Sut)^1.8 mm, 0.6 of it in torsion (R. E. Peterson)."""
    return 0.0254 * (2070 / tensile_strength) ** 1.8 * (0.6 if torsion else 1.0)


def peterson_q(r: ArrayLike, tensile_strength: float, torsion: bool = False) -> Array:
    """q = 1/(1 + a/r) after Peterson."""
    return 1 / (1 + peterson_a(tensile_strength, torsion) / np.asarray(r, dtype=float))


def sensitivity(rule: str, r: ArrayLike, tensile_strength: float, torsion: bool = False) -> Array:
    """q by the rule named in the judgement: "neuber" or "peterson"."""
    return (neuber_q if rule == "neuber" else peterson_q)(r, tensile_strength, torsion)


def fatigue_factor(kt: ArrayLike, q: ArrayLike) -> Array:
    """Kf = 1 + q (Kt - 1)."""
    return 1 + np.asarray(q) * (np.asarray(kt, dtype=float) - 1)
