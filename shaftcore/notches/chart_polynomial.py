"""Kt = C1 + C2 x + C3 x² + C4 x³ with x = 2h/D and each C = a + b √q + c q, q = h/r.

The published form of the fits to the Peterson charts (W. D. Pilkey). Inside the ranges of q the
fit is used as published. Sharper than the last range (q large) Kt is carried on as √q, the
steepest growth a sharp corner can have, so the continuation is on the safe side; blunter than the
first (q small) the excess Kt - 1 is carried on as √q, so that Kt tends to 1 as the step vanishes.
"""

from collections.abc import Sequence

import numpy as np

from shaftcore.notches._contract import Array, Fit, Sizes
from shaftcore.records import ValidRange

Coefficients = tuple[tuple[float, float, float], ...]
Piece = tuple[float, float, Coefficients]
"""One stretch of q: from, to, and the (a, b, c) of C1..C4."""


def _kt_inside(pieces: Sequence[Piece], x: Array, q: Array) -> Array:
    ends = np.array([end for _, end, _ in pieces[:-1]])
    table = np.array([coefficients for _, _, coefficients in pieces])[np.searchsorted(ends, q)]
    root = np.sqrt(q)
    c1, c2, c3, c4 = np.moveaxis(table[..., 0] + table[..., 1] * root[..., None] + table[..., 2] * q[..., None], -1, 0)
    return c1 + x * (c2 + x * (c3 + x * c4))


def chart_kt(pieces: Sequence[Piece], sizes: Sizes) -> Array:
    """Kt for arrays `D` (large diameter), `h` (step height or depth), `r` (root radius), all mm > 0."""
    q = sizes["h"] / sizes["r"]
    low, high = pieces[0][0], pieces[-1][1]
    held = np.clip(q, low, high)
    kt = np.maximum(_kt_inside(pieces, 2 * sizes["h"] / sizes["D"], held), 1.0)
    kt = np.where(q > high, kt * np.sqrt(q / high), kt)
    return np.where(q < low, 1 + (kt - 1) * np.sqrt(q / low), kt)


def chart_fit(pieces: Sequence[Piece], low_by: tuple[tuple[float, float], ...] = ()) -> Fit:
    """The fit over all its stretches of q as one `Fit`."""
    return Fit(
        source="pilkey",
        value=lambda sizes: chart_kt(pieces, sizes),
        ranges=(ValidRange("h/r", pieces[0][0], pieces[-1][1]),),
        formula="Kt = C1 + C2 (2h/D) + C3 (2h/D)² + C4 (2h/D)³",
        low_by=low_by,
    )
