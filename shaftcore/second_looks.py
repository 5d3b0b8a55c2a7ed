"""Second looks at stations that pass: what the judged numbers leave out, said where it counts.

Each look judges some stations once more with one thing changed, all looks in one call. Small
effects stay silent.
"""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from shaftcore.beam_loads import BeamLoads
from shaftcore.equivalent_stress import Fatigue, Nominal
from shaftcore.judged_places import Places, taken
from shaftcore.margins import judge
from shaftcore.notch_factors import LOAD_ROWS, NotchFactors
from shaftcore.notches._contract import Array
from shaftcore.notches.kinds import KINDS
from shaftcore.phrase import Phrase
from shaftcore.records import Notice
from shaftcore.results import Judged
from shaftcore.section_properties import area, bending_modulus
from shaftcore.shaft import Shaft
from shaftcore.sources import SOURCES
from shaftcore.stations import Station

WORTH_SAYING = 0.03
"""Share by which finite elements must lower a factor before it is worth a notice."""

RISE_WORTH_SAYING = 0.05
"""Share by which a place that is left out must be used more than the judged one beside it."""

USED_WORTH_SAYING = 0.5
"""Utilisation below which a place that the judged numbers leave out is no concern."""


@dataclass(frozen=True, eq=False)
class _Case:
    """Stations (indices, n) to be judged again with other stresses or fatigue factors (3, n)."""

    index: NDArray[np.intp]
    nominal: Nominal
    kf: Array


@dataclass(frozen=True, eq=False)
class _Again:
    """What came of it, for the stations of one case."""

    index: NDArray[np.intp]
    n: Array
    n_yield: Array
    utilisation: Array


def second_looks(
    shaft: Shaft,
    stations: Sequence[Station],
    places: Places,
    loads: BeamLoads,
    factors: NotchFactors,
    judged: Judged,
) -> Iterator[Notice]:
    """Notices of all looks; `loads` run along the shaft, `factors` and `judged` over the stations."""
    elements, thin_end, axis = _judged_again(
        shaft,
        judged,
        _with_finite_elements(factors, judged),
        _at_thin_ends(shaft, stations, loads, factors, judged),
        _at_the_neutral_axis(shaft, judged, factors, shear := _greatest_shear(len(stations), places, loads)),
    )
    yield from _fit_notices(shaft, stations, factors, judged, elements)
    yield from _fillet_notices(stations, judged, thin_end)
    yield from _shear_notices(stations, judged, axis, shear)


def _judged_again(shaft: Shaft, judged: Judged, *cases: _Case) -> Iterator[_Again]:
    index = np.concatenate([case.index for case in cases])
    stresses = zip(*(vars(case.nominal).values() for case in cases), strict=True)
    nominal, fatigue = Nominal(*map(np.concatenate, stresses)), np.concatenate([case.kf for case in cases], axis=1)
    found = judge(shaft, nominal, Fatigue(*fatigue), judged.d[index], judged.bore[index], judged.finish[index])
    begin = 0
    for case in cases:
        part = slice(begin, begin := begin + len(case.index))
        yield _Again(case.index, found.n[part], found.n_yield[part], found.utilisation[part])


def _with_finite_elements(factors: NotchFactors, judged: Judged) -> _Case:
    """Every stressed station with the Kt that finite elements give at most."""
    index = np.flatnonzero(np.any(factors.low_by > 0, axis=0) & (judged.utilisation > 0))
    low, kf, q = factors.low_by[:, index], factors.kf[:, index], factors.q[:, index]
    # Kf = 1 + q (Kt - 1), so a Kt higher by a share `low` adds low q Kt
    return _Case(index, taken(judged.nominal, index), kf + low * (kf - 1 + q))


def _fit_notices(
    shaft: Shaft, stations: Sequence[Station], factors: NotchFactors, judged: Judged, again: _Again
) -> Iterator[Notice]:
    """Verdicts that turn with the finite elements each, all other falls in one line."""
    if not len(again.index):
        return
    name = _source_name(shaft, stations)
    before, before_yield = judged.n[again.index], judged.n_yield[again.index]
    asked, asked_yield = shaft.judgement.asked_factor, shaft.judgement.asked_yield_factor
    turns = (again.n < asked) & (asked <= before)
    turns_yield = (again.n_yield < asked_yield) & (asked_yield <= before_yield)
    for row in np.flatnonzero(turns | turns_yield).tolist():
        i = int(again.index[row])
        for turned, symbol, after, least in (
            (turns[row], "n", again.n[row], asked),
            (turns_yield[row], "n_y", again.n_yield[row], asked_yield),
        ):
            if turned:
                words = (
                    f"It passes by the fit alone: finite elements give up to {_more(factors.low_by[:, i])} more Kt "
                    f"than {name} for a root this sharp; with that {symbol} is {after:.3f}, below the asked {least:g}."
                )
                yield Notice("passes by the fit alone", Phrase(words), stations[i].place, i)
    falls = np.maximum(_fall(before, again.n), _fall(before_yield, again.n_yield))
    most = int(np.argmax(falls))
    if falls[most] > WORTH_SAYING:
        count, station = int(np.sum(falls > WORTH_SAYING)), stations[again.index[most]]
        words = (
            f"Finite elements give more Kt than {name} for sharp roots. With theirs the factors would be lower by "
            f"more than {WORTH_SAYING:.0%} at {count} station{'s' * (count > 1)}, most at station {station.number}, "
            f"by {falls[most]:.0%}."
        )
        yield Notice("fit below finite elements", Phrase(words))


def _source_name(shaft: Shaft, stations: Sequence[Station]) -> str:
    kind = KINDS[next(station.kind for station in stations if station.site)]
    return SOURCES[kind.fits[shaft.judgement.kt_source]["bending"].source].short


def _fall(before: Array, after: Array) -> Array:
    """Share by which a factor falls, 0 where there was none to fall."""
    known = np.isfinite(before)
    return np.where(known, 1 - np.where(known, after, 1.0) / np.where(known, before, 1.0), 0.0)


def _more(low: Array) -> str:
    """Shares by sort of load in words, the sorts where the fit is safe left out."""
    return ", ".join(f"{low[row]:.0%} ({sort})" for sort, row in LOAD_ROWS.items() if low[row] >= 0.005)


def _at_thin_ends(
    shaft: Shaft, stations: Sequence[Station], loads: BeamLoads, factors: NotchFactors, judged: Judged
) -> _Case:
    """A shoulder is judged at its face; along the fillet towards the thin side the moment may rise."""
    ends = {i: _thin_end(s) for i, s in enumerate(stations) if s.kind == "shoulder"}
    index, at = np.array(list(ends), dtype=np.intp), np.array(list(ends.values()))
    moment = np.array([[np.interp(at, loads.x, plane) for plane in planes] for planes in loads.moment])
    bending = np.hypot(moment[:, 0], moment[:, 1]) / bending_modulus(judged.d[index], judged.bore[index])
    turning, face = shaft.duty.turning, judged.nominal
    amplitude = np.maximum(bending[0] + bending[1] if turning else bending[1], face.bending_amplitude[index])
    mean = face.bending_mean[index] if turning else np.maximum(bending[0], face.bending_mean[index])
    rises = (amplitude > face.bending_amplitude[index]) | (mean > face.bending_mean[index])
    index, amplitude, mean = index[rises], amplitude[rises], mean[rises]
    nominal = replace(taken(face, index), bending_amplitude=amplitude, bending_mean=mean)
    return _Case(index, nominal, factors.kf[:, index])


def _thin_end(station: Station) -> float:
    """The end of a shoulder's stretch that is not its face."""
    assert station.site is not None
    begin, end = station.site.span
    return begin if end == station.x else end


def _fillet_notices(stations: Sequence[Station], judged: Judged, again: _Again) -> Iterator[Notice]:
    for row in np.flatnonzero(_worth_saying(again, judged)).tolist():
        i = int(again.index[row])
        words = (
            "The moment rises along the fillet, away from the face it is judged at: at the thin end the utilisation "
            f"is {again.utilisation[row]:.0%} instead of {judged.utilisation[i]:.0%}."
        )
        yield Notice("moment rises under the fillet", Phrase(words), stations[i].place, i)


def _worth_saying(again: _Again, judged: Judged) -> NDArray[np.bool_]:
    more = again.utilisation > judged.utilisation[again.index] * (1 + RISE_WORTH_SAYING)
    return more & (again.utilisation > USED_WORTH_SAYING)


def _greatest_shear(count: int, places: Places, loads: BeamLoads) -> Array:
    """Largest shear force (2 sets, stations) at any place of each station, N."""
    owner, point = places
    shear, force = np.hypot(loads.shear[:, 0], loads.shear[:, 1]), np.zeros((2, count))
    for part in (0, 1):
        np.maximum.at(force[part], owner, shear[part, point])
    return force


def _at_the_neutral_axis(shaft: Shaft, judged: Judged, factors: NotchFactors, shear: Array) -> _Case:
    """Under shear and torsion, where bending does nothing."""
    mean, amplitude = shear / area(judged.d, judged.bore) * _shear_peak(judged.d, judged.bore)
    if shaft.duty.turning:
        mean, amplitude = np.zeros_like(mean), mean + amplitude
    surface, none = judged.nominal, np.zeros_like(mean)
    nominal = replace(
        surface,
        bending_amplitude=none,
        bending_mean=none,
        torsion_amplitude=surface.torsion_amplitude + amplitude,
        torsion_mean=surface.torsion_mean + mean,
    )
    return _Case(np.arange(len(mean)), nominal, factors.kf)


def _shear_notices(stations: Sequence[Station], judged: Judged, again: _Again, shear: Array) -> Iterator[Notice]:
    for i in np.flatnonzero(_worth_saying(again, judged)).tolist():
        words = (
            f"Transverse shear of {{:force}} counts here: with the torsion it uses {again.utilisation[i]:.0%} of what "
            "is asked at the neutral axis. The margins count the surface only, where there is none."
        )
        yield Notice("transverse shear", Phrase(words, (float(shear[:, i].sum()),)), stations[i].place, i)


def _shear_peak(d: Array, bore: Array) -> Array:
    """Largest over mean shear stress of a round section in bending: 4/3 solid, 2 for a thin tube (beam theory)."""
    result: Array = 4 / 3 * (d * d + d * bore + bore * bore) / (d * d + bore * bore)
    return result
