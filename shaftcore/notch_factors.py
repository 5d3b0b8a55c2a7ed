"""Kt, q and Kf of every raiser under bending, tension and torsion, one call a kind."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from shaftcore.notch_sensitivity import fatigue_factor, material_length, sensitivity
from shaftcore.notches._contract import LOAD_SORTS, Array, Fit, Fits, RaiserKind, Site, Sizes
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Judgement

PEAK_SHARES = np.geomspace(0.005, 2.2, 28)
"""Root radii, in lengths a of the sensitivity rule, among which the peak of Kf is sought. Where Kt - 1
grows as r^-p, Peterson's Kf peaks at r = a (1 - p)/p and Neuber's, for p < 1/2, at a ((1/2 - p)/p)²."""

JUST_ABOVE = 1 + 1e-9
SLACK = 1e-9
"""Shares by which a radius lies above a seam, and by which a size may miss the end of a range by rounding."""

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
        index, chosen = _of_kind(key, sites)
        if chosen:
            sizes = {name: np.array([own[name] for own in chosen]) for name in kind.size_symbols}
            for name, values in vars(factors_of(kind, sizes, judgement, tensile_strength)).items():
                getattr(every, name)[:, index] = values
    return every


def _of_kind(key: str, sites: Sequence[Site | None]) -> tuple[NDArray[np.intp], list[Mapping[str, float]]]:
    """Which of the sites are of one kind, and their sizes."""
    chosen = [(i, site.sizes) for i, site in enumerate(sites) if site is not None and site.kind == key]
    return np.array([i for i, _ in chosen], dtype=np.intp), [sizes for _, sizes in chosen]


def factors_of(kind: RaiserKind, sizes: Sizes, judgement: Judgement, tensile_strength: float) -> NotchFactors:
    """Factors of raisers of one kind for arrays (n) of their sizes, in mm."""
    fits, rule, own = kind.fits[judgement.kt_source], judgement.sensitivity, sizes["r"]
    seams = fits.seams(sizes)
    radii = np.empty((*seams.shape[:2], 1 + seams.shape[2]))
    radii[..., 0], radii[..., 1:] = own, seams * JUST_ABOVE
    kt, q, every = _kf_over(fits, sizes, radii, rule, tensile_strength)
    kf, radius = _highest(own, radii, every)
    lengths = np.array([material_length(rule, tensile_strength, sort == "torsion") for sort in fits])
    small = np.flatnonzero(own < lengths.max() * PEAK_SHARES[-1])
    if len(small):
        chosen = {name: values[small] for name, values in sizes.items()}
        peak, at = _peaks_above(fits, chosen, lengths, rule, tensile_strength)
        higher = peak > kf[:, small]
        kf[:, small], radius[:, small] = np.where(higher, (peak, at), (kf[:, small], radius[:, small]))
    outside, low_by = _reservations(fits, kind.parameters(sizes), sizes)
    return NotchFactors(kt[..., 0], q[..., 0], kf, radius > own, radius, outside, low_by)


def _kf_over(fits: Fits, sizes: Sizes, radii: Array, rule: str, tensile_strength: float) -> tuple[Array, Array, Array]:
    """Kt, q and Kf for root radii (3 loads, n, m) on raisers of n sizes, as the formulas give them."""
    kt = np.maximum(fits.kt({**{name: values[:, None] for name, values in sizes.items()}, "r": radii}), 1.0)
    twist = LOAD_ROWS["torsion"]
    q = np.empty_like(kt)
    q[:twist] = sensitivity(rule, radii[:twist], tensile_strength)
    q[twist] = sensitivity(rule, radii[twist], tensile_strength, torsion=True)
    return kt, q, fatigue_factor(kt, q)


def _reservations(fits: Fits, measures: Sizes, sizes: Sizes) -> tuple[NDArray[np.bool_], Array]:
    """Where each fit is used outside its range, and the share by which finite elements lie above it (3, n)."""
    sharpness, cut = sizes["r"] / sizes["d"], sizes["r"] / sizes["h"]
    outside, low_by = np.zeros((len(fits), len(cut)), dtype=bool), np.zeros((len(fits), len(cut)))
    for row, fit in enumerate(fits.values()):
        for r in fit.ranges:
            outside[row] |= (measures[r.symbol] < r.low * (1 - SLACK)) | (measures[r.symbol] > r.high * (1 + SLACK))
        if fit.low_by:
            low_by[row] = _shortfall(fit, sharpness, cut)
    return outside, low_by


def _shortfall(fit: Fit, sharpness: Array, cut: Array) -> Array:
    """Share by which finite elements lie above a fit, for arrays of r/d and of r/h.

    Sharper than the sharpest root known it goes on rising by the logarithm of r/d as between the last two.
    """
    known, share, growth = fit.low_knots
    low: Array = np.interp(sharpness, known, share)
    if growth and sharpness.min() < known[0]:
        low += growth * np.log(np.maximum(known[0] / sharpness, 1.0))
    if fit.low_when_cut:
        arcs, shares = (np.array(column) for column in zip(*fit.low_when_cut, strict=True))
        low = np.maximum(low, np.interp(cut, arcs, shares))
    return low


def _plain(count: int) -> NotchFactors:
    shape = (len(LOAD_SORTS), count)
    no, none = np.zeros(shape, dtype=bool), np.zeros(shape)
    return NotchFactors(np.ones(shape), none, np.ones(shape), no, none.copy(), no.copy(), none.copy())


def _peaks_above(fits: Fits, sizes: Sizes, lengths: Array, rule: str, tensile_strength: float) -> tuple[Array, Array]:
    """Largest Kf (3, n) of radii that are not below the raiser's own, and its radius; 0 where none is.

    Kt grows as r^-½ at most while q falls in proportion to √r or r, so Kf can pass a peak and would
    fall to 1 for a sharp corner; no real corner does, so below the peak Kf stays at it. The same
    holds at the seams of a fit, where Kt may jump.
    """
    own = sizes["r"]
    tried = lengths[:, None, None] * PEAK_SHARES
    radii = np.repeat(tried, len(own), axis=1)
    kf = _kf_over(fits, sizes, radii, rule, tensile_strength)[2]
    finer = _vertex(radii, kf, radii >= own[:, None])[..., None]
    finest = _kf_over(fits, sizes, finer, rule, tensile_strength)[2]
    return _highest(own, np.concatenate([radii, finer], axis=-1), np.concatenate([kf, finest], axis=-1))


def _highest(own: Array, radii: Array, kf: Array) -> tuple[Array, Array]:
    """Largest Kf (3, n) among radii (3, n, m) not below `own` (n), the first on a tie, and its radius."""
    rows, columns, top = _top(kf, radii >= own[:, None])
    kept = radii[rows, columns, top]
    return np.where(kept >= own, kf[rows, columns, top], 0.0), kept


def _vertex(radii: Array, kf: Array, allowed: NDArray[np.bool_]) -> Array:
    """Radius at the top of the parabola, over log r, through the largest allowed Kf and its neighbours."""
    rows, columns, top = _top(kf, allowed)
    middle = np.clip(top, 1, kf.shape[-1] - 2)
    before, at, after = (kf[rows, columns, middle + step] for step in (-1, 0, 1))
    bend = np.minimum(before - 2 * at + after, -1e-12)
    shift = np.clip((before - after) / (2 * bend), -1.0, 1.0)
    return radii[rows, columns, middle] * (radii[..., 1] / radii[..., 0]) ** shift


def _top(kf: Array, allowed: NDArray[np.bool_]) -> tuple[NDArray[np.intp], NDArray[np.intp], NDArray[np.intp]]:
    """Indices of the largest allowed Kf along the last axis."""
    rows, columns = np.ogrid[: kf.shape[0], : kf.shape[1]]
    return rows, columns, np.where(allowed, kf, 0.0).argmax(axis=-1)
