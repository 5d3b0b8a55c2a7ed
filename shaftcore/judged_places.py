"""Where the shaft is judged: along its whole length, and each station wherever it is worst off."""

from collections.abc import Sequence
from dataclasses import is_dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from shaftcore.beam_loads import BeamLoads
from shaftcore.equivalent_stress import Fatigue
from shaftcore.geometry import FINISH_NUMBER, Profile
from shaftcore.margins import judge, station_stresses
from shaftcore.notch_factors import NotchFactors
from shaftcore.notches._contract import LOAD_SORTS, Array
from shaftcore.results import Judged
from shaftcore.shaft import Shaft
from shaftcore.stations import Station

STRETCHES = 300
"""Even stretches of the traces, whose ends stand beside both sides of every face, load, support and station."""

Index = NDArray[np.intp]
Places = tuple[Index, Index]
"""Station and point of everything that may govern a station."""


def trace_points(shaft: Shaft, profile: Profile, stations: tuple[Station, ...]) -> tuple[Array, Array]:
    """Points x (mm) of the traces with their side (-1 left, +1 right), sorted.

    Places where something jumps, and stations, stand twice.
    """
    jumps = [*(s.x for s in stations), *(s.x for s in shaft.supports), *(load.x for load in shaft.loads)]
    twice = _rising([profile.faces[1:-1], jumps])
    even = np.arange(STRETCHES) * (profile.faces[-1] / STRETCHES)
    once = _rising([even, profile.faces[-1:], twice])
    copies = np.ones(len(once), dtype=np.intp)
    copies[np.searchsorted(once, twice)] = 2
    x = np.repeat(once, copies)
    side = np.ones(len(x))
    side[np.cumsum(copies)[copies == 2] - 2] = -1.0
    return x, side


def _rising(parts: list[Any]) -> Array:
    """All different numbers of the parts in order; a stable sort makes use of the order there is."""
    every = np.concatenate(parts)
    every.sort(kind="stable")
    return every[np.concatenate([[True], every[1:] > every[:-1]])]


def judge_places(
    shaft: Shaft,
    profile: Profile,
    stations: tuple[Station, ...],
    places: Places,
    loads: BeamLoads,
    factors: NotchFactors,
) -> tuple[BeamLoads, Judged, Judged]:
    """What the beam carries and how it is judged at the stations, and how along all points of `loads`.

    A station is judged on both sides of its place and of every place it covers (`Station.also`),
    with one section and one set of notch factors; where it is used most is kept.
    Along the shaft the section is the plain one.
    """
    owner, point = places
    count = len(owner)
    every = np.concatenate([point, np.arange(len(loads.x))])
    d, bore, finish = _sections(profile, loads.x[every], loads.side[every], stations, owner)
    kf = np.ones((len(LOAD_SORTS), len(d)))
    kf[:, :count] = factors.kf[:, owner]
    nominal = station_stresses(loads, every, d, bore, shaft.duty.turning)
    judged = judge(shaft, nominal, Fatigue(*kf), d, bore, finish)
    worst = _worst_of_each(owner, judged.utilisation[:count], judged.n[:count], judged.greatest[:count])
    return taken(loads, point[worst]), taken(judged, worst), taken(judged, slice(count, None))


def places_within(stations: Sequence[Station], x: Array) -> Places:
    """Station and point (indices) of everything that may govern a station: both sides of all its places."""
    owner = np.repeat(np.arange(len(stations)), [1 + len(station.also) for station in stations])
    at = np.array([place for station in stations for place in (station.x, *station.also)])
    left, right = np.searchsorted(x, at, "left"), np.searchsorted(x, at, "right") - 1
    return np.concatenate([owner, owner]), np.concatenate([right, left])


def _sections(
    profile: Profile, x: Array, side: Array, stations: tuple[Station, ...], owner: Index
) -> tuple[Array, Array, Index]:
    """Net diameter, bore and finish at all points; the first belong to the stations in `owner`."""
    segment = profile.segment_at(x, side)
    d, bore, finish = profile.diameter_at(x, segment), profile.bore[segment], profile.finish[segment]
    sites = {i: station.site for i, station in enumerate(stations) if station.site is not None}
    net = np.zeros((3, len(stations)))
    net[:, list(sites)] = [*zip(*((s.d, s.bore, FINISH_NUMBER[s.finish]) for s in sites.values()), strict=True)]
    notched = np.flatnonzero(net[0, owner])
    d[notched], bore[notched], finish[notched] = net[:, owner[notched]]
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
