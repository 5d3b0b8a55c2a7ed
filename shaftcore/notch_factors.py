"""Kt, q and Kf of every raiser under bending, tension and torsion, one call a kind."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from shaftcore.notch_sensitivity import fatigue_factor, material_length, sensitivity
from shaftcore.notches._contract import LOAD_SORTS, Array, Fit, RaiserKind, Site, Sizes
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Judgement

PEAK_SHARES = np.geomspace(0.005, 2.2, 28)
"""Root radii, in lengths a of the sensitivity rule, among which the peak of Kf is sought. Where Kt - 1
grows as r^-p, Peterson's Kf peaks at r = a (1 - p)/p and Neuber's, for p < 1/2, at a ((1/2 - p)/p)²."""

JUST_ABOVE = 1 + 1e-9

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
    every = _plain(len(sites))
    for key, kind in KINDS.items():
        index = [i for i, site in enumerate(sites) if site is not None and site.kind == key]
        if index:
            chosen = [site.sizes for site in sites if site is not None and site.kind == key]
            sizes = {name: np.array([own[name] for own in chosen]) for name in kind.size_symbols}
            for name, values in vars(factors_of(kind, sizes, judgement, tensile_strength)).items():
                getattr(every, name)[:, index] = values
    return every


def factors_of(kind: RaiserKind, sizes: Sizes, judgement: Judgement, tensile_strength: float) -> NotchFactors:
    """Factors of raisers of one kind for arrays (n) of their sizes, in mm."""
    found, measures = _plain(len(sizes["r"])), kind.parameters(sizes)
    for sort, fit in kind.fits[judgement.kt_source].items():
        row = LOAD_ROWS[sort]
        _one_load(found, row, fit, sizes, judgement.sensitivity, tensile_strength)
        found.outside[row] = _outside(fit, measures)
        if fit.low_by:
            found.low_by[row] = _shortfall(fit, sizes["r"] / sizes["d"], sizes["r"] / sizes["h"])
    return found


def _shortfall(fit: Fit, sharpness: Array, cut: Array) -> Array:
    """Share by which finite elements lie above a fit, for arrays of r/d and of r/h.

    Sharper than the sharpest root known it goes on rising by the logarithm of r/d as between the last two.
    """
    known, share = (np.array(column) for column in zip(*fit.low_by, strict=True))
    slope = max((share[0] - share[1]) / np.log(known[1] / known[0]), 0.0)
    beyond = slope * np.log(np.maximum(known[0] / sharpness, 1.0))
    low: Array = np.interp(sharpness, known, share) + beyond
    if fit.low_when_cut:
        arcs, shares = (np.array(column) for column in zip(*fit.low_when_cut, strict=True))
        low = np.maximum(low, np.interp(cut, arcs, shares))
    return low


def _plain(count: int) -> NotchFactors:
    shape = (len(LOAD_SORTS), count)
    no, none = np.zeros(shape, dtype=bool), np.zeros(shape)
    return NotchFactors(np.ones(shape), none, np.ones(shape), no, none.copy(), no.copy(), none.copy())


def kf_of(fit: Fit, sizes: Sizes, rule: str, tensile_strength: float, torsion: bool) -> tuple[Array, Array, Array]:
    """Kt, q and Kf of one fit for arrays of sizes, as the formulas give them."""
    kt = np.maximum(fit.value(sizes), 1.0)
    q = sensitivity(rule, sizes["r"], tensile_strength, torsion)
    return kt, q, fatigue_factor(kt, q)


def _one_load(found: NotchFactors, row: int, fit: Fit, sizes: Sizes, rule: str, tensile_strength: float) -> None:
    torsion, own = row == LOAD_ROWS["torsion"], sizes["r"]

    def factors_at(chosen: Sizes, radii: Array) -> tuple[Array, Array, Array]:
        grid = {name: values[:, None] for name, values in chosen.items()}
        return kf_of(fit, {**grid, "r": radii}, rule, tensile_strength, torsion)

    radii = np.column_stack([own, *(seam * JUST_ABOVE for seam in fit.seams(sizes))])
    kt, q, every = factors_at(sizes, radii)
    kf, radius = _highest(own, radii, every)
    tried = material_length(rule, tensile_strength, torsion) * PEAK_SHARES
    small = own < tried[-1]
    if small.any():
        chosen = {name: values[small] for name, values in sizes.items()}
        peak, at = _peak_above(chosen, np.tile(tried, (len(chosen["r"]), 1)), lambda *grid: factors_at(*grid)[2])
        higher = peak > kf[small]
        kf[small], radius[small] = np.where(higher, peak, kf[small]), np.where(higher, at, radius[small])
    found.kt[row], found.q[row], found.kf[row], found.radius[row] = kt[:, 0], q[:, 0], kf, radius
    found.held[row] = radius > own


def _peak_above(sizes: Sizes, radii: Array, kf_at: Callable[[Sizes, Array], Array]) -> tuple[Array, Array]:
    """Largest Kf of the radii tried (n, m) that are not below the raiser's own, and its radius; 0 where none is.

    Kt grows as r^-½ at most while q falls in proportion to √r or r, so Kf can pass a peak and would
    fall to 1 for a sharp corner; no real corner does, so below the peak Kf stays at it. The same
    holds at the seams of a fit, where Kt may jump.
    """
    kf = kf_at(sizes, radii)
    finer = _vertex(radii, kf, radii >= sizes["r"][:, None])[:, None]
    return _highest(sizes["r"], np.hstack([radii, finer]), np.hstack([kf, kf_at(sizes, finer)]))


def _highest(own: Array, radii: Array, kf: Array) -> tuple[Array, Array]:
    """Largest Kf (n) among radii (n, m) not below `own`, the first on a tie, and its radius."""
    allowed = np.where(radii >= own[:, None], kf, 0.0)
    top, rows = allowed.argmax(axis=1), np.arange(len(kf))
    return allowed[rows, top], radii[rows, top]


def _vertex(radii: Array, kf: Array, allowed: NDArray[np.bool_]) -> Array:
    """Radius at the top of the parabola, over log r, through the largest allowed Kf and its neighbours."""
    top, rows = np.where(allowed, kf, 0.0).argmax(axis=1), np.arange(len(kf))
    middle = np.clip(top, 1, kf.shape[1] - 2)
    before, at, after = (kf[rows, middle + step] for step in (-1, 0, 1))
    bend = np.minimum(before - 2 * at + after, -1e-12)
    shift = np.clip((before - after) / (2 * bend), -1.0, 1.0)
    return radii[rows, middle] * (radii[rows, 1] / radii[rows, 0]) ** shift


def _outside(fit: Fit, measures: Sizes) -> NDArray[np.bool_]:
    slack = 1e-9
    return np.any(
        [(measures[r.symbol] < r.low * (1 - slack)) | (measures[r.symbol] > r.high * (1 + slack)) for r in fit.ranges],
        axis=0,
    )
