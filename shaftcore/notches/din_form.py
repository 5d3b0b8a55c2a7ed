"""Form numbers in the closed form of DIN 743-2.

alpha = 1 + 1/√(A r/t + 2B (r/d)(1 + 2r/d)² + C (r/t)^z (d/D)), t the step height or groove depth.
Smooth in all sizes and tending to 1 for blunt notches, so it needs no continuation of its own.
"""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from shaftcore.calculation_lines import Line, line
from shaftcore.notches._contract import Array, Fit, Sizes
from shaftcore.records import ValidRange

SOURCE = "din743-2"


@dataclass(frozen=True)
class FormConstants:
    """A, B, C and z of one geometry under one load."""

    a: float
    b: float
    c: float = 0.0
    z: float = 1.0

    def under_root(self, r_t: str, r_d: str, d_large: str, times: str = " ") -> str:
        """The sum under the root as text, with the three ratios as they are to be spelled out."""
        step = f" + {self.c:g}{times}({r_t})^{self.z:g}{times}({d_large})" if self.c else ""
        return f"{self.a:g}{times}{r_t} + {2 * self.b:g}{times}({r_d}){times}(1 + 2{times}{r_d})^2{step}"


def din_alpha(k: FormConstants, sizes: Sizes) -> Array:
    """alpha for arrays `d`, `D`, `h`, `r` (mm, all > 0)."""
    r_t, r_d = sizes["r"] / sizes["h"], sizes["r"] / sizes["d"]
    under = k.a * r_t + 2 * k.b * r_d * (1 + 2 * r_d) ** 2 + k.c * r_t**k.z * sizes["d"] / sizes["D"]
    return 1 + 1 / np.sqrt(under)


def din_steps(k: FormConstants, sizes: Mapping[str, float], symbol: str) -> tuple[Line, ...]:
    """The closed form written out for one raiser."""
    formula = f"1 + 1/√({k.under_root('r/t', 'r/d', 'd/D')})"
    numbers = f"1 + 1/√({k.under_root('{r}/{h}', '{r}/{d}', '{d}/{D}', ' × ')})"
    value = float(din_alpha(k, {name: np.array(size) for name, size in sizes.items()}))
    return (line(symbol, "Form number", formula, numbers, value, "ratio", SOURCE, **sizes),)


def din_fit(
    constants: FormConstants,
    ranges: tuple[ValidRange, ...],
    low_by: tuple[tuple[float, float], ...] = (),
    low_when_cut: tuple[tuple[float, float], ...] = (),
) -> Fit:
    """The closed form with its constants as one `Fit`."""
    return Fit(
        source=SOURCE,
        value=lambda sizes: din_alpha(constants, sizes),
        ranges=ranges,
        formula=f"alpha = 1 + 1/√({constants.under_root('r/t', 'r/d', 'd/D')})",
        steps=lambda sizes, symbol: din_steps(constants, sizes, symbol),
        low_by=low_by,
        low_when_cut=low_when_cut,
    )
