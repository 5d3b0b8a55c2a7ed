"""The whole computation as one sentence: a described shaft goes in, its margins come out.

shaft -> raisers and stations -> beam loads -> nominal stresses -> notch factors -> margins -> Results
"""

from dataclasses import fields, is_dataclass
from typing import Any

import numpy as np

from shaftcore.beam_loads import BeamLoads, beam_loads
from shaftcore.design_checks import notices_of, seat_limits
from shaftcore.equivalent_stress import Fatigue
from shaftcore.geometry import FINISH_NUMBER, Profile, profile_of
from shaftcore.margins import judge, station_stresses
from shaftcore.notch_factors import LOAD_ROWS, NotchFactors, notch_factors
from shaftcore.notch_sites import seatings
from shaftcore.notches._contract import Array
from shaftcore.results import Judged, Results
from shaftcore.shaft import Shaft
from shaftcore.soundness import require_ready
from shaftcore.stations import Station, place_stations

TRACE_POINTS = 301
"""Evenly spread points of the traces, besides both sides of every face, load, support and station."""


def evaluate(shaft: Shaft) -> Results:
    """Analyse a whole shaft.

    Raises UnsoundShaftError with every problem where the shaft is wrong or not finished.
    """
    require_ready(shaft)
    profile = profile_of(shaft)
    seated = seatings(shaft)
    stations = place_stations(shaft, profile, seated)
    x, side = _points(shaft, profile, stations)
    loads = beam_loads(shaft, profile, x, side)

    station_x = np.array([station.x for station in stations])
    left, right = np.searchsorted(x, station_x, "left"), np.searchsorted(x, station_x, "right") - 1
    factors = notch_factors([station.site for station in stations], shaft.judgement, shaft.material.tensile_strength)
    at, judged = _severer_side(
        *(_judge_stations(shaft, profile, stations, _taken(loads, index), factors) for index in (left, right))
    )
    judged_along = _judge_along(shaft, profile, loads)
    results = Results(
        shaft=shaft,
        stations=stations,
        at=at,
        factors=factors,
        judged=judged,
        along=loads,
        judged_along=judged_along,
        seat_limits=seat_limits(shaft, seated),
        notices=notices_of(shaft, stations, seated, loads, factors, judged),
    )
    _lock(results)
    return results


def _points(shaft: Shaft, profile: Profile, stations: tuple[Station, ...]) -> tuple[Array, Array]:
    """Points of the traces with their side, sorted; places where something jumps stand twice."""
    jumps = {*profile.faces[1:-1].tolist(), *(s.x for s in shaft.supports), *(load.x for load in shaft.loads)}
    twice = np.unique([*jumps, *(station.x for station in stations)])
    even = np.setdiff1d(np.linspace(profile.faces[0], profile.faces[-1], TRACE_POINTS), twice)
    x = np.concatenate([twice, twice, even])
    side = np.concatenate([-np.ones(len(twice)), np.ones(len(twice) + len(even))])
    order = np.lexsort((side, x))
    return x[order], side[order]


def _judge_stations(
    shaft: Shaft, profile: Profile, stations: tuple[Station, ...], loads: BeamLoads, factors: NotchFactors
) -> tuple[BeamLoads, Judged]:
    segment = profile.segment_at(loads.x, loads.side)
    d, bore, finish = profile.diameter_at(loads.x, segment), profile.bore[segment], profile.finish[segment]
    for i, station in enumerate(stations):
        if station.site is not None:
            d[i], bore[i], finish[i] = station.site.d, station.site.bore, FINISH_NUMBER[station.site.finish]
    kf = factors.kf
    fatigue = Fatigue(kf[LOAD_ROWS["bending"]], kf[LOAD_ROWS["tension"]], kf[LOAD_ROWS["torsion"]])
    nominal = station_stresses(loads, d, bore, shaft.duty.turning)
    return loads, judge(shaft, nominal, fatigue, d, bore, finish)


def _judge_along(shaft: Shaft, profile: Profile, loads: BeamLoads) -> Judged:
    segment = profile.segment_at(loads.x, loads.side)
    d, bore = profile.diameter_at(loads.x, segment), profile.bore[segment]
    one = np.ones_like(d)
    nominal = station_stresses(loads, d, bore, shaft.duty.turning)
    return judge(shaft, nominal, Fatigue(one, one, one), d, bore, profile.finish[segment])


def _severer_side(left: tuple[BeamLoads, Judged], right: tuple[BeamLoads, Judged]) -> tuple[BeamLoads, Judged]:
    """Of both sides of each station the one with the larger utilisation, for every array."""
    take_right = right[1].utilisation > left[1].utilisation
    return _merged(left[0], right[0], take_right), _merged(left[1], right[1], take_right)


_PER_SUPPORT = {"reactions", "axial_reaction", "torque_left_over"}


def _merged(left: Any, right: Any, take_right: Any) -> Any:
    """A record of arrays over stations, each entry from one of two such records."""
    values = {}
    for f in fields(left):
        a, b = getattr(left, f.name), getattr(right, f.name)
        if is_dataclass(a):
            values[f.name] = _merged(a, b, take_right)
        elif isinstance(a, np.ndarray) and f.name not in _PER_SUPPORT:
            values[f.name] = np.where(take_right, b, a)
        else:
            values[f.name] = a
    return type(left)(**values)


def _taken(loads: BeamLoads, index: Any) -> BeamLoads:
    values = {
        f.name: value if f.name in _PER_SUPPORT else value[..., index]
        for f in fields(loads)
        for value in [getattr(loads, f.name)]
    }
    return BeamLoads(**values)


def _lock(record: Any) -> None:
    for f in fields(record):
        value = getattr(record, f.name)
        if isinstance(value, np.ndarray):
            value.flags.writeable = False
        elif is_dataclass(value) and not isinstance(value, Shaft):
            _lock(value)
