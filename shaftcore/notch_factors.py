"""Kt, q and Kf of every raiser under bending, tension and torsion, one call a kind."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from shaftcore.notch_sensitivity import fatigue_factor, sensitivity
from shaftcore.notches._contract import LOAD_SORTS, Array, Fit, Site, Sizes
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Judgement

HOLD_RADII = np.geomspace(0.03, 1.2, 24)
"""Root radii (mm) among which the peak of Kf is sought; steels have it well below 1 mm."""

LOAD_ROWS = {sort: row for row, sort in enumerate(LOAD_SORTS)}


@dataclass(frozen=True, eq=False)
class NotchFactors:
    """Arrays (3 loads in the order of LOAD_SORTS, n stations); 1 where the section is plain.

    `held` marks where Kf is kept at its peak because a smaller radius would seem to lower it;
    `radius` (mm) is the root radius Kf was taken at, the raiser's own where it is not held.
    `outside` marks where a fit is used outside its range, `low_by` the share by which finite
    elements are known to lie above the fit thereabouts.
    """

    kt: Array
    q: Array
    kf: Array
    held: NDArray[np.bool_]
    radius: Array
    outside: NDArray[np.bool_]
    low_by: Array


def notch_factors(sites: Sequence[Site | None], judgement: Judgement, tensile_strength: float) -> NotchFactors:
    """Factors for one entry a station, None for a plain section."""
    shape = (len(LOAD_SORTS), len(sites))
    found = NotchFactors(
        np.ones(shape),
        np.zeros(shape),
        np.ones(shape),
        np.zeros(shape, bool),
        np.zeros(shape),
        np.zeros(shape, bool),
        np.zeros(shape),
    )
    for key, kind in KINDS.items():
        index = np.array([i for i, site in enumerate(sites) if site is not None and site.kind == key], dtype=np.intp)
        if index.size:
            chosen = [sites[i] for i in index]
            sizes = {name: np.array([s.sizes[name] for s in chosen if s]) for name in kind.size_symbols}
            measures = kind.parameters(sizes)
            for sort, fit in kind.fits[judgement.kt_source].items():
                row = LOAD_ROWS[sort]
                _one_load(found, row, index, fit, sizes, judgement.sensitivity, tensile_strength)
                found.outside[row, index] = _outside(fit, measures)
                if fit.low_by:
                    sharpness, share = zip(*fit.low_by, strict=True)
                    found.low_by[row, index] = np.interp(measures["r/d"], sharpness, share)
    return found


def kf_of(fit: Fit, sizes: Sizes, rule: str, tensile_strength: float, torsion: bool) -> tuple[Array, Array, Array]:
    """Kt, q and Kf of one fit for arrays of sizes, as the formulas give them."""
    kt = np.maximum(fit.value(sizes), 1.0)
    q = sensitivity(rule, sizes["r"], tensile_strength, torsion)
    return kt, q, fatigue_factor(kt, q)


def _one_load(
    found: NotchFactors, row: int, index: NDArray[np.intp], fit: Fit, sizes: Sizes, rule: str, tensile_strength: float
) -> None:
    torsion = row == LOAD_ROWS["torsion"]
    kt, q, kf = kf_of(fit, sizes, rule, tensile_strength, torsion)
    found.kt[row, index], found.q[row, index], found.radius[row, index] = kt, q, sizes["r"]
    small = sizes["r"] < HOLD_RADII[-1]
    if small.any():
        peak, radius = _peak_above(
            {name: values[small] for name, values in sizes.items()}, fit, rule, tensile_strength, torsion
        )
        held = peak > kf[small] * 1.001
        found.held[row, index[small]] = held
        found.radius[row, index[small]] = np.where(held, radius, sizes["r"][small])
        kf[small] = np.where(held, peak, kf[small])
    found.kf[row, index] = kf


def _peak_above(sizes: Sizes, fit: Fit, rule: str, tensile_strength: float, torsion: bool) -> tuple[Array, Array]:
    """Largest Kf, and its radius, for any root radius not below the given one, all else kept.

    Kt grows as r^-½ at most while q falls in proportion to √r or r, so Kf passes a peak and would
    fall to 1 for a sharp corner; no real corner does, so below the peak Kf stays at it.
    """
    grid = {name: values[:, None] for name, values in sizes.items()}
    grid["r"] = np.maximum(grid["r"], HOLD_RADII)
    kf = kf_of(fit, grid, rule, tensile_strength, torsion)[2]
    top, rows = kf.argmax(axis=1), np.arange(len(kf))
    return kf[rows, top], grid["r"][rows, top]


def _outside(fit: Fit, measures: Sizes) -> NDArray[np.bool_]:
    slack = 1e-9
    return np.any(
        [(measures[r.symbol] < r.low * (1 - slack)) | (measures[r.symbol] > r.high * (1 + slack)) for r in fit.ranges],
        axis=0,
    )
