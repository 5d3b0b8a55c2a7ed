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
    kt = np.maximum(fits.kt({**_upright(sizes), "r": radii}), 1.0)
    q = np.empty_like(kt)
    for rows, torsion in ((slice(0, -1), False), (slice(-1, None), True)):
        q[rows] = sensitivity(rule, radii[rows], tensile_strength, torsion)
    kf, radius = _highest(own, radii, fatigue_factor(kt, q))
    for row, (sort, fit) in enumerate(fits.items()):
        _raise_to_peak(kf[row], radius[row], fit, sizes, rule, tensile_strength, sort == "torsion")
    outside, low_by = _reservations(fits, kind.parameters(sizes), sizes)
    return NotchFactors(kt[..., 0], q[..., 0], kf, radius > own, radius, outside, low_by)


def _upright(sizes: Sizes) -> dict[str, Array]:
    """Sizes (n) as (n, 1), for several radii each."""
    return {name: values[:, None] for name, values in sizes.items()}


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


def kf_of(fit: Fit, sizes: Sizes, rule: str, tensile_strength: float, torsion: bool) -> tuple[Array, Array, Array]:
    """Kt, q and Kf of one fit for arrays of sizes, as the formulas give them."""
    kt = np.maximum(fit.value(sizes), 1.0)
    q = sensitivity(rule, sizes["r"], tensile_strength, torsion)
    return kt, q, fatigue_factor(kt, q)


def _raise_to_peak(
    kf: Array, radius: Array, fit: Fit, sizes: Sizes, rule: str, tensile_strength: float, torsion: bool
) -> None:
    """Put the peak of Kf, and its radius, in the place of what sharper roots have.

    Kt grows as r^-½ at most while q falls in proportion to √r or r, so Kf can pass a peak and would
    fall to 1 for a sharp corner; no real corner does, so below the peak Kf stays at it. The same
    holds at the seams of a fit, where Kt may jump.
    """
    length = material_length(rule, tensile_strength, torsion)
    small = np.flatnonzero(sizes["r"] < length * PEAK_SHARES[-1])
    if not len(small):
        return
    chosen = {name: values[small] for name, values in sizes.items()}
    radii = np.tile(length * PEAK_SHARES, (len(small), 1))

    def kf_at(radii: Array) -> Array:
        return kf_of(fit, {**_upright(chosen), "r": radii}, rule, tensile_strength, torsion)[2]

    every = kf_at(radii)
    finer = _vertex(radii, every, radii >= chosen["r"][:, None])[:, None]
    radii, every = np.hstack([radii, finer]), np.hstack([every, kf_at(finer)])
    peak, at = _highest(chosen["r"], radii, every)
    higher = peak > kf[small]
    kf[small[higher]], radius[small[higher]] = peak[higher], at[higher]


def _highest(own: Array, radii: Array, kf: Array) -> tuple[Array, Array]:
    """Largest Kf (..., n) among radii (..., n, m) not below `own` (n), the first on a tie, and its radius."""
    allowed = np.where(radii >= own[:, None], kf, 0.0).reshape(-1, radii.shape[-1])
    top, rows = allowed.argmax(axis=1), np.arange(len(allowed))
    shape = radii.shape[:-1]
    return allowed[rows, top].reshape(shape), radii.reshape(allowed.shape)[rows, top].reshape(shape)


def _vertex(radii: Array, kf: Array, allowed: NDArray[np.bool_]) -> Array:
    """Radius at the top of the parabola, over log r, through the largest allowed Kf and its neighbours."""
    top, rows = np.where(allowed, kf, 0.0).argmax(axis=1), np.arange(len(kf))
    middle = np.clip(top, 1, kf.shape[1] - 2)
    before, at, after = (kf[rows, middle + step] for step in (-1, 0, 1))
    bend = np.minimum(before - 2 * at + after, -1e-12)
    shift = np.clip((before - after) / (2 * bend), -1.0, 1.0)
    return radii[rows, middle] * (radii[rows, 1] / radii[rows, 0]) ** shift
