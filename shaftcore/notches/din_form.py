"""Form numbers in the closed form of DIN 743-2.

alpha = 1 + 1/√(A r/t + 2B (r/d)(1 + 2r/d)² + C (r/t)^z (d/D)), t the step height or groove depth.
Smooth in all sizes and tending to 1 for blunt notches, so it needs no continuation of its own.
"""

import numpy as np

from shaftcore.notches._contract import Array, Fit, Sizes
from shaftcore.records import ValidRange


def din_alpha(a: float, b: float, c: float, z: float, sizes: Sizes) -> Array:
    """alpha for arrays `d`, `D`, `h`, `r` (mm, all > 0)."""
    r_t, r_d = sizes["r"] / sizes["h"], sizes["r"] / sizes["d"]
    under = a * r_t + 2 * b * r_d * (1 + 2 * r_d) ** 2 + c * r_t**z * sizes["d"] / sizes["D"]
    return 1 + 1 / np.sqrt(under)


def din_fit(
    a: float,
    b: float,
    c: float,
    z: float,
    ranges: tuple[ValidRange, ...],
    low_by: tuple[tuple[float, float], ...] = (),
) -> Fit:
    """The closed form with its constants as one `Fit`."""
    step = f" + {c:g} (r/t)^{z:g} (d/D)" if c else ""
    return Fit(
        source="din743-2",
        value=lambda sizes: din_alpha(a, b, c, z, sizes),
        ranges=ranges,
        formula=f"alpha = 1 + 1/√({a:g} r/t + {2 * b:g} (r/d)(1 + 2r/d)²{step})",
        low_by=low_by,
    )
