"""Sizes of shoulders and grooves in the ratios that charts are drawn in."""

from collections.abc import Sequence

import numpy as np
from numpy.typing import ArrayLike

from shaftcore.notches._contract import LOAD_SORTS, Array, Fit, LoadSort
from shaftcore.notches.kinds import KINDS


def sizes(d_ratio: ArrayLike, r_over_d: ArrayLike, d: float = 1.0) -> dict[str, Array]:
    """`d`, `D`, `h`, `r` for D/d and r/d, broadcast against one another."""
    ratio, sharp = np.broadcast_arrays(np.asarray(d_ratio, dtype=float), np.asarray(r_over_d, dtype=float))
    return {"d": np.full(ratio.shape, d), "D": d * ratio, "h": d * (ratio - 1) / 2, "r": d * sharp}


def all_fits() -> Sequence[tuple[str, str, LoadSort, Fit]]:
    """Every fit of every kind that has the sizes of a shoulder: kind, source, load, fit."""
    return [
        (kind.key, source, sort, fits[sort])
        for kind in KINDS.values()
        if set(kind.size_symbols) == {"d", "D", "h", "r"}
        for source, fits in kind.fits.items()
        for sort in LOAD_SORTS
    ]


def fit_ids() -> list[str]:
    return [f"{kind}, {source}, {sort}" for kind, source, sort, _ in all_fits()]
