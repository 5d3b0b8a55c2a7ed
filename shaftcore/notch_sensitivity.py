"""Notch sensitivity q and the fatigue factor Kf = 1 + q (Kt - 1). Arrays in, arrays out; r in mm, Sut in MPa."""

import numpy as np
from numpy.typing import ArrayLike

from shaftcore.calculation_lines import Line, line
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


def material_length(rule: str, tensile_strength: float, torsion: bool = False) -> float:
    """The rule's constant a in mm, the root radius at which q is about one half."""
    if rule == "neuber":
        return neuber_root_a(tensile_strength, torsion) ** 2
    return peterson_a(tensile_strength, torsion)


def sensitivity(rule: str, r: ArrayLike, tensile_strength: float, torsion: bool = False) -> Array:
    """q by the rule named in the judgement: "neuber" or "peterson"."""
    return (neuber_q if rule == "neuber" else peterson_q)(r, tensile_strength, torsion)


def fatigue_factor(kt: ArrayLike, q: ArrayLike) -> Array:
    """Kf = 1 + q (Kt - 1)."""
    return 1 + np.asarray(q) * (np.asarray(kt, dtype=float) - 1)


def sensitivity_steps(rule: str, r: float, tensile_strength: float, torsion: bool, symbol: str) -> tuple[Line, ...]:
    """q by the named rule written out for one root radius (mm), the material constant first."""
    return (_neuber_steps if rule == "neuber" else _peterson_steps)(r, tensile_strength, torsion, symbol)


def _neuber_steps(r: float, tensile_strength: float, torsion: bool, symbol: str) -> tuple[Line, ...]:
    limits = NEUBER_RANGE["torsion" if torsion else "bending"]
    s = min(max(tensile_strength, limits.low), limits.high)
    flag = "" if s == tensile_strength else f"fitted for {limits} MPa: taken at the nearer end"
    root_a = neuber_root_a(tensile_strength, torsion)
    c = dict(zip(("c0", "c1", "c2", "c3"), NEUBER_TORSION if torsion else NEUBER_BENDING, strict=True))
    constant = line(
        "√a", "Neuber's constant, √mm", "c0 + c1 S_ut + c2 S_ut² + c3 S_ut³",
        "{c0} + {c1} × {s} + {c2} × {s}^2 + {c3} × {s}^3", root_a, "", "neuber", flag, s=s, **c,
    )  # fmt: skip
    q = float(neuber_q(r, tensile_strength, torsion))
    return (
        constant,
        line(symbol, "Notch sensitivity", "1/(1 + √a/√r)", "1/(1 + {a}/√({r}))", q, "ratio", "neuber", a=root_a, r=r),
    )


def _peterson_steps(r: float, tensile_strength: float, torsion: bool, symbol: str) -> tuple[Line, ...]:
    a = peterson_a(tensile_strength, torsion)
    share = ("0.6 × ", "0.6 × ") if torsion else ("", "")
    constant = line(
        "a", "Peterson's constant, mm", f"{share[0]}0.0254 (2070/S_ut)^1.8", f"{share[1]}0.0254 × (2070/{{s}})^1.8", a,
        "length", "peterson", s=tensile_strength,
    )  # fmt: skip
    q = float(peterson_q(r, tensile_strength, torsion))
    return (
        constant,
        line(symbol, "Notch sensitivity", "1/(1 + a/r)", "1/(1 + {a}/{r})", q, "ratio", "peterson", a=a, r=r),
    )
