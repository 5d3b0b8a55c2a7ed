"""The radius window of a shoulder: from the fillet fatigue needs to the fillet its surroundings allow."""

import math
from dataclasses import dataclass

import numpy as np

from shaftcore.equivalent_stress import Fatigue
from shaftcore.judged_places import taken
from shaftcore.margins import judge
from shaftcore.notch_factors import factors_of
from shaftcore.notches._contract import Array, Site
from shaftcore.notches.kinds import KINDS
from shaftcore.phrase import Phrase
from shaftcore.results import Results

SMALLEST, USUAL = 0.05, 0.3
"""Radii (mm): below the first none is tried, no drawing asks for a sharper fillet; those below the
second, where Kf must be held at its peak at some cost, only where the second is enough."""

TRIED, SPREAD = 48, 16
"""How many radii are tried over a whole range, and again between the last too small and the first enough."""

ABOUT = np.concatenate([-np.geomspace(1e-2, 1e-6, 24), [0.0], np.geomspace(1e-6, 1e-2, 24)])
"""Shares by which radii about the estimated one are tried beside those."""

PRECISE = 5e-4
"""Share by which the radius found may be too large."""

ENOUGH = 1 - 1e-12
"""Utilisation that is enough: 1, but for rounding in the analysis of the shaft with the radius found."""

BESIDE = 1e-9
"""Share by which a radius lies below a seam of a fit; the seam itself belongs to what is above."""


@dataclass(frozen=True)
class RadiusWindow:
    """What a fillet may be, in mm. `place` as in its station, `limited_by` in the reader's units.

    `needed` is the smallest radius with which the station reaches both asked factors, never too small
    and too large by a share of `PRECISE` at most; None where none that was tried does. Where the smallest
    radius tried suffices, it is that.
    """

    place: str
    needed: float | None
    allowed: float
    limited_by: Phrase

    @property
    def empty(self) -> bool:
        """True where no radius both lasts and fits."""
        return self.needed is None or self.needed > self.allowed


def radius_window(results: Results, place: str) -> RadiusWindow:
    """The window of the shoulder that goes by `place`, with the nominal stresses it has now.

    A larger fillet never raises Kf, so one radius parts those that are too small from the rest. It
    is sought up to twice the small diameter or twice what is allowed. Raises StopIteration where
    no shoulder goes by that name.
    """
    limit = next(limit for limit in results.seat_limits if limit.place == place)
    index = next(i for i, s in enumerate(results.stations) if s.place == place and s.kind == "shoulder")
    return RadiusWindow(place, _needed(results, index, limit.allowed), limit.allowed, limit.reason)


def _needed(results: Results, index: int, allowed: float) -> float | None:
    site = results.stations[index].site
    assert site is not None
    largest = 2 * max(allowed, site.d, USUAL)
    needed = _least(results, index, site, USUAL, largest)
    return _least(results, index, site, SMALLEST, USUAL) if needed == USUAL else needed


def _least(results: Results, index: int, site: Site, low: float, high: float) -> float | None:
    """The least radius from low to high that is enough; None where none is."""
    radii = _tried(results, site, low, high)
    use = _utilisation(results, index, site, radii)
    if use[-1] > ENOUGH:
        return None
    enough = int(np.argmax(use <= ENOUGH))
    if enough == 0:
        return low
    while radii[enough] > radii[enough - 1] * (1 + PRECISE):
        radii = _between(radii[enough - 1 : enough + 1], use[enough - 1 : enough + 1])
        use = _utilisation(results, index, site, radii)
        enough = int(np.argmax(use <= ENOUGH))
    return float(radii[enough])


def _tried(results: Results, site: Site, low: float, high: float) -> Array:
    """Radii from low to high, both sides of every seam of the fits among them."""
    sizes = {name: np.array(size) for name, size in site.sizes.items()}
    fits = KINDS[site.kind].fits[results.shaft.judgement.kt_source].values()
    seams = {seam for fit in fits for seam in fit.seams(sizes).tolist() if low < seam < high}
    beside = [radius for seam in seams for radius in (seam * (1 - BESIDE), seam)]
    return np.sort(np.concatenate([_spread(low, high, TRIED), beside]))


def _spread(low: float, high: float, count: int) -> Array:
    """Radii in equal proportions from low to high, both of them exactly."""
    radii = low * np.exp(np.linspace(0.0, math.log(high / low), count))
    radii[-1] = high
    return radii


def _utilisation(results: Results, index: int, site: Site, radii: Array) -> Array:
    """The larger of asked over reached factor (fatigue, yield) at the station, for each root radius."""
    shaft, judged = results.shaft, results.judged
    sizes = {name: np.full(len(radii), size) for name, size in site.sizes.items()} | {"r": radii}
    kf = factors_of(KINDS[site.kind], sizes, shaft.judgement, shaft.material.tensile_strength).kf
    here = np.full(len(radii), index)
    return judge(
        shaft, taken(judged.nominal, here), Fatigue(*kf), judged.d[here], judged.bore[here], judged.finish[here]
    ).utilisation


def _between(ends: Array, use: Array) -> Array:
    """Radii between two of which the second is enough, close about the one at which the utilisation would pass 1
    along a line by logarithms."""
    (x0, x1), (y0, y1) = np.log(ends), np.log(use)
    crossing = math.exp(x0 + (x1 - x0) * y0 / (y0 - y1))
    return np.sort(np.concatenate([_spread(ends[0], ends[1], SPREAD), np.clip(crossing * (1 + ABOUT), *ends)]))
