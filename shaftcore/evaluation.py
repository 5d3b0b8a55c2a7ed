"""The whole computation as one sentence: a described shaft goes in, its margins come out.

shaft -> raisers and stations -> beam loads -> nominal stresses -> notch factors -> margins -> Results
"""

from dataclasses import is_dataclass
from typing import Any

import numpy as np

from shaftcore.beam_loads import beam_loads
from shaftcore.design_checks import notices_of, seat_limits
from shaftcore.geometry import profile_of
from shaftcore.judged_places import judge_places, places_within, trace_points
from shaftcore.notch_factors import notch_factors
from shaftcore.results import Results
from shaftcore.shaft import Shaft
from shaftcore.soundness import require_ready
from shaftcore.stations import place_stations


def evaluate(shaft: Shaft) -> Results:
    """Analyse a whole shaft.

    Raises UnsoundShaftError with every problem where the shaft is wrong or not finished.
    """
    seated = require_ready(shaft)
    profile = profile_of(shaft)
    stations = place_stations(shaft, profile, seated)
    loads = beam_loads(shaft, profile, *trace_points(shaft, profile, stations))
    factors = notch_factors([station.site for station in stations], shaft.judgement, shaft.material.tensile_strength)
    places = places_within(stations, loads.x)
    at, judged, judged_along = judge_places(shaft, profile, stations, places, loads, factors)
    results = Results(
        shaft=shaft,
        stations=stations,
        at=at,
        factors=factors,
        judged=judged,
        along=loads,
        judged_along=judged_along,
        seat_limits=seat_limits(shaft, seated),
        notices=notices_of(shaft, stations, seated, places, loads, factors, judged),
    )
    _lock(results)
    return results


def _lock(record: Any) -> None:
    """Make every array of the results read-only."""
    for value in vars(record).values():
        if isinstance(value, np.ndarray):
            value.setflags(write=False)
        elif is_dataclass(value) and not isinstance(value, Shaft):
            _lock(value)
