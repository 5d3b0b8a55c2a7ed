"""Second looks at stations that pass: what the judged numbers leave out, said where it counts.

Each look judges the stations once more with one thing changed. Small effects stay silent.
"""

from collections.abc import Iterator, Sequence
from dataclasses import fields, replace

import numpy as np
from numpy.typing import NDArray

from shaftcore.beam_loads import BeamLoads
from shaftcore.equivalent_stress import Fatigue, Nominal
from shaftcore.judged_places import places_within
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


def second_looks(
    shaft: Shaft, stations: Sequence[Station], loads: BeamLoads, factors: NotchFactors, judged: Judged
) -> Iterator[Notice]:
    """Notices of all looks; `loads` run along the shaft, `factors` and `judged` over the stations."""
    yield from _finite_elements(shaft, stations, factors, judged)
    yield from _moment_under_fillet(shaft, stations, loads, factors, judged)
    yield from _transverse_shear(shaft, stations, loads, factors, judged)


def _again(shaft: Shaft, judged: Judged, nominal: Nominal, kf: Array, index: NDArray[np.intp]) -> Judged:
    """The stations in `index` judged with other stresses or fatigue factors (3, n), given for all stations."""
    some = type(nominal)(**{f.name: getattr(nominal, f.name)[index] for f in fields(nominal)})
    fatigue = Fatigue(*(kf[LOAD_ROWS[sort]][index] for sort in ("bending", "tension", "torsion")))
    return judge(shaft, some, fatigue, judged.d[index], judged.bore[index], judged.finish[index])


def _finite_elements(
    shaft: Shaft, stations: Sequence[Station], factors: NotchFactors, judged: Judged
) -> Iterator[Notice]:
    """With the Kt that finite elements give at most: verdicts that turn each, all others in one line."""
    low = factors.low_by
    index = np.flatnonzero(np.any(low > 0, axis=0) & (judged.utilisation > 0))
    if not len(index):
        return
    # Kf = 1 + q (Kt - 1), so a Kt higher by a share `low` adds low q Kt
    again = _again(shaft, judged, judged.nominal, factors.kf + low * (factors.kf - 1 + factors.q), index)
    falls = np.maximum(_fall(judged.n[index], again.n), _fall(judged.n_yield[index], again.n_yield))
    source = KINDS[next(s.kind for s in stations if s.site)].fits[shaft.judgement.kt_source]["bending"].source
    name = SOURCES[source].short
    for row, i in enumerate(index.tolist()):
        for symbol, before, after, asked in (
            ("n", judged.n[i], again.n[row], shaft.judgement.asked_factor),
            ("n_y", judged.n_yield[i], again.n_yield[row], shaft.judgement.asked_yield_factor),
        ):
            if after < asked <= before:
                words = (
                    f"It passes by the fit alone: finite elements give up to {_more(low[:, i])} more Kt than {name} "
                    f"for a root this sharp; with that {symbol} is {after:.3f}, below the asked {asked:g}."
                )
                yield Notice("passes by the fit alone", Phrase(words), stations[i].place, i)
    most = int(np.argmax(falls))
    if falls[most] > WORTH_SAYING:
        count, station = int(np.sum(falls > WORTH_SAYING)), stations[index[most]]
        words = (
            f"Finite elements give more Kt than {name} for sharp roots. With theirs the factors would be lower by "
            f"more than {WORTH_SAYING:.0%} at {count} station{'s' * (count > 1)}, most at station {station.number}, "
            f"by {falls[most]:.0%}."
        )
        yield Notice("fit below finite elements", Phrase(words))


def _fall(before: Array, after: Array) -> Array:
    """Share by which a factor falls, 0 where there was none to fall."""
    known = np.isfinite(before)
    return np.where(known, 1 - np.where(known, after, 1.0) / np.where(known, before, 1.0), 0.0)


def _more(low: Array) -> str:
    """Shares by sort of load in words, the sorts where the fit is safe left out."""
    return ", ".join(f"{low[row]:.0%} ({sort})" for sort, row in LOAD_ROWS.items() if low[row] >= 0.005)


def _moment_under_fillet(
    shaft: Shaft, stations: Sequence[Station], loads: BeamLoads, factors: NotchFactors, judged: Judged
) -> Iterator[Notice]:
    """A shoulder is judged at its face; along the fillet towards the thin side the moment may rise."""
    shoulders = [i for i, s in enumerate(stations) if s.kind == "shoulder"]
    if not shoulders:
        return
    index = np.array(shoulders, dtype=np.intp)
    ends = [_thin_end(stations[i]) for i in shoulders]
    moment = np.array([[np.interp(ends, loads.x, plane) for plane in planes] for planes in loads.moment])
    bending = np.hypot(moment[:, 0], moment[:, 1]) / bending_modulus(judged.d[index], judged.bore[index])
    turning, whole = shaft.duty.turning, judged.nominal
    amplitude, mean = whole.bending_amplitude.copy(), whole.bending_mean.copy()
    amplitude[index] = np.maximum(amplitude[index], bending.sum(axis=0) if turning else bending[1])
    mean[index] = mean[index] if turning else np.maximum(mean[index], bending[0])
    nominal = replace(whole, bending_amplitude=amplitude, bending_mean=mean)
    use, used = _again(shaft, judged, nominal, factors.kf, index).utilisation, judged.utilisation[index]
    for row in np.flatnonzero((use > used * (1 + RISE_WORTH_SAYING)) & (use > USED_WORTH_SAYING)).tolist():
        i = shoulders[row]
        words = (
            "The moment rises along the fillet, away from the face it is judged at: at the thin end the utilisation "
            f"is {use[row]:.0%} instead of {used[row]:.0%}."
        )
        yield Notice("moment rises under the fillet", Phrase(words), stations[i].place, i)


def _thin_end(station: Station) -> float:
    assert station.site is not None
    return max(station.site.span, key=lambda end: abs(end - station.x))


def _transverse_shear(
    shaft: Shaft, stations: Sequence[Station], loads: BeamLoads, factors: NotchFactors, judged: Judged
) -> Iterator[Notice]:
    """Where the neutral axis, under shear and torsion, is used more than the surface that is judged."""
    owner, point = places_within(tuple(stations), loads.x)
    force = np.zeros((2, len(stations)))
    for part, shear in enumerate(np.hypot(loads.shear[:, 0], loads.shear[:, 1])):
        np.maximum.at(force[part], owner, shear[point])
    mean, amplitude = force / area(judged.d, judged.bore) * _shear_peak(judged.d, judged.bore)
    if shaft.duty.turning:
        mean, amplitude = np.zeros_like(mean), mean + amplitude
    whole, none = judged.nominal, np.zeros_like(mean)
    nominal = replace(
        whole,
        bending_amplitude=none,
        bending_mean=none,
        torsion_amplitude=whole.torsion_amplitude + amplitude,
        torsion_mean=whole.torsion_mean + mean,
    )
    use = _again(shaft, judged, nominal, factors.kf, np.arange(len(stations))).utilisation
    for i in np.flatnonzero((use > judged.utilisation * (1 + RISE_WORTH_SAYING)) & (use > USED_WORTH_SAYING)).tolist():
        words = (
            f"Transverse shear of {{:force}} counts here: with the torsion it uses {use[i]:.0%} of what is asked "
            "at the neutral axis. The margins count the surface only, where there is none."
        )
        yield Notice("transverse shear", Phrase(words, (float(force[:, i].sum()),)), stations[i].place, i)


def _shear_peak(d: Array, bore: Array) -> Array:
    """Largest over mean shear stress of a round section in bending: 4/3 solid, 2 for a thin tube (beam theory)."""
    result: Array = 4 / 3 * (d * d + d * bore + bore * bore) / (d * d + bore * bore)
    return result
