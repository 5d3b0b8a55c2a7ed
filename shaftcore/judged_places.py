"""Where the shaft is judged: along its whole length, and each station wherever it is worst off."""

from dataclasses import is_dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from shaftcore.beam_loads import BeamLoads
from shaftcore.equivalent_stress import Fatigue
from shaftcore.geometry import FINISH_NUMBER, Profile
from shaftcore.margins import judge, station_stresses
from shaftcore.notch_factors import LOAD_ROWS, NotchFactors
from shaftcore.notches._contract import LOAD_SORTS, Array
from shaftcore.results import Judged
from shaftcore.shaft import Shaft
from shaftcore.stations import Station

TRACE_POINTS = 301
"""Evenly spread points of the traces, besides both sides of every face, load, support and station."""

Index = NDArray[np.intp]


def trace_points(shaft: Shaft, profile: Profile, stations: tuple[Station, ...]) -> tuple[Array, Array]:
    """Points x (mm) of the traces with their side (-1 left, +1 right), sorted.

    Places where something jumps, and stations, stand twice.
    """
    jumps = [*(s.x for s in shaft.supports), *(load.x for load in shaft.loads), *(s.x for s in stations)]
    twice = np.concatenate([jumps, profile.faces[1:-1]])
    even = np.linspace(profile.faces[0], profile.faces[-1], TRACE_POINTS)
    once = np.unique(np.concatenate([twice, even]))
    copies = np.ones(len(once), dtype=np.intp)
    copies[np.searchsorted(once, twice)] = 2
    x = np.repeat(once, copies)
    side = np.ones(len(x))
    side[np.cumsum(copies)[copies == 2] - 2] = -1.0
    return x, side


def judge_places(
    shaft: Shaft, profile: Profile, stations: tuple[Station, ...], loads: BeamLoads, factors: NotchFactors
) -> tuple[BeamLoads, Judged, Judged]:
    """What the beam carries and how it is judged at the stations, and how along all points of `loads`.

    A station is judged on both sides of its place and of every place it covers (`Station.also`),
    with one section and one set of notch factors; where it is used most is kept.
    Along the shaft the section is the plain one.
    """
    owner, point = places_within(stations, loads.x)
    count = len(owner)
    every = taken(loads, np.concatenate([point, np.arange(len(loads.x))]))
    d, bore, finish = _sections(profile, every, stations, owner)
    kf = np.ones((len(LOAD_SORTS), len(d)))
    kf[:, :count] = factors.kf[:, owner]
    fatigue = Fatigue(kf[LOAD_ROWS["bending"]], kf[LOAD_ROWS["tension"]], kf[LOAD_ROWS["torsion"]])
    judged = judge(shaft, station_stresses(every, d, bore, shaft.duty.turning), fatigue, d, bore, finish)
    worst = _worst_of_each(owner, judged.utilisation[:count], judged.n[:count], judged.greatest[:count])
    return taken(every, worst), taken(judged, worst), taken(judged, slice(count, None))


def places_within(stations: tuple[Station, ...], x: Array) -> tuple[Index, Index]:
    """Station and point (indices) of everything that may govern a station: both sides of all its places."""
    owner = np.array([i for i, station in enumerate(stations) for _ in (station.x, *station.also)], dtype=np.intp)
    at = np.array([place for station in stations for place in (station.x, *station.also)])
    left, right = np.searchsorted(x, at, "left"), np.searchsorted(x, at, "right") - 1
    return np.concatenate([owner, owner]), np.concatenate([right, left])


def _sections(
    profile: Profile, loads: BeamLoads, stations: tuple[Station, ...], owner: Index
) -> tuple[Array, Array, Index]:
    """Net diameter, bore and finish at all points; the first belong to the stations in `owner`."""
    segment = profile.segment_at(loads.x, loads.side)
    d, bore, finish = profile.diameter_at(loads.x, segment), profile.bore[segment], profile.finish[segment]
    sites = [(i, station.site) for i, station in enumerate(stations) if station.site is not None]
    if sites:
        row_of = np.full(len(stations), -1)
        row_of[[i for i, _ in sites]] = np.arange(len(sites))
        row = row_of[owner]
        notched = np.flatnonzero(row >= 0)
        row = row[notched]
        d[notched] = np.array([site.d for _, site in sites])[row]
        bore[notched] = np.array([site.bore for _, site in sites])[row]
        finish[notched] = np.array([FINISH_NUMBER[site.finish] for _, site in sites])[row]
    return d, bore, finish


def _worst_of_each(owner: Index, utilisation: Array, n: Array, greatest: Array) -> Index:
    """For each owner the entry with the largest utilisation; of those equal but for rounding, the one with the
    least n, then the largest stress."""
    most_used, least_n = utilisation.astype(np.float32), -n.astype(np.float32)
    order = np.lexsort((greatest, least_n, most_used, owner))
    return order[np.searchsorted(owner[order], np.arange(owner.max() + 1), "right") - 1]


_NOT_ALONG_X = {"reactions", "axial_reaction", "torque_left_over"}


def taken(record: Any, index: Any) -> Any:
    """A record of arrays over points, with the points `index` chosen; anything else is kept."""
    values = dict(vars(record))
    for name, value in values.items():
        if isinstance(value, np.ndarray):
            if name not in _NOT_ALONG_X:
                values[name] = value[..., index] if isinstance(index, slice) else value.take(index, axis=-1)
        elif is_dataclass(value):
            values[name] = taken(value, index)
    return type(record)(**values)
