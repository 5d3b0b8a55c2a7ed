"""What one analysis yields: arrays over the stations, lines along the shaft, notices."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from shaftcore.beam_loads import BeamLoads
from shaftcore.equivalent_stress import Nominal
from shaftcore.notch_factors import NotchFactors
from shaftcore.notches._contract import Array
from shaftcore.phrase import Phrase
from shaftcore.records import Notice
from shaftcore.shaft import Shaft
from shaftcore.stations import Station


@dataclass(frozen=True, eq=False)
class Strength:
    """Marin factors and limits at each point (arrays), MPa; the scalars hold for the whole shaft.

    `size_diameter` (mm) is the diameter kb was taken for.
    """

    plain: float
    ka: Array
    kb: Array
    size_diameter: Array
    kc: float
    kd: float
    ke: float
    kf: float
    endurance: Array


@dataclass(frozen=True, eq=False)
class Judged:
    """The chain from stress to margin at each point: net section (mm), stresses (MPa), factors.

    `finish` numbers the finishes as in `surface.FINISHES`.

    `margin` and `yield_margin` are n/n_asked - 1; `utilisation` is the larger of n_asked/n of
    both checks. An unloaded place has n = inf, margin inf and utilisation 0.
    """

    d: Array
    bore: Array
    finish: NDArray[np.intp]
    nominal: Nominal
    amplitude: Array
    mean: Array
    greatest: Array
    strength: Strength
    n: Array
    margin: Array
    n_yield: Array
    yield_margin: Array
    utilisation: Array


@dataclass(frozen=True, eq=False)
class SeatLimit:
    """What caps a shoulder's fillet: `place` as in its station, mm; `reason` in the reader's units."""

    place: str
    allowed: float
    reason: Phrase


@dataclass(frozen=True, eq=False)
class Results:
    """One analysed shaft; every array is read-only.

    `at` and `judged` run over `stations` (of the two sides of a station the more severe one is
    kept), `along` and `judged_along` over the points of the traces, plain section everywhere.
    """

    shaft: Shaft
    stations: tuple[Station, ...]
    at: BeamLoads
    factors: NotchFactors
    judged: Judged
    along: BeamLoads
    judged_along: Judged
    seat_limits: tuple[SeatLimit, ...]
    notices: tuple[Notice, ...]

    @property
    def governing(self) -> int:
        """Index of the station with the largest utilisation."""
        return int(np.argmax(self.judged.utilisation))

    @property
    def runner_up(self) -> int | None:
        """Index of the station that would govern next, None where there is only one."""
        order = np.argsort(-self.judged.utilisation, kind="stable")
        return int(order[1]) if len(order) > 1 else None

    @property
    def least_margin(self) -> float:
        """The smaller of the fatigue and the yield margin at the governing station."""
        i = self.governing
        return float(min(self.judged.margin[i], self.judged.yield_margin[i]))

    @property
    def provisional(self) -> bool:
        """True while loads do not balance."""
        return any(notice.provisional for notice in self.notices)

    def notices_by_station(self) -> list[list[Notice]]:
        """The notices of every station; those for the whole shaft are in none."""
        found: list[list[Notice]] = [[] for _ in self.stations]
        for notice in self.notices:
            if notice.station is not None:
                found[notice.station].append(notice)
        return found

    @property
    def sound(self) -> bool:
        """True where every station reaches both asked factors."""
        return bool(np.all(self.judged.margin >= 0) and np.all(self.judged.yield_margin >= 0))

    def station_of(self, place: str) -> int | None:
        """Index of the first station that belongs to the thing with this id."""
        return next((i for i, station in enumerate(self.stations) if station.place == place), None)
