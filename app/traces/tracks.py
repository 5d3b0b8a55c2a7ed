"""What each track shows: its lines, their values from the results, and how they are told apart.

A track may carry a second dimension (axial force beside torque); it then has a second scale at
the right, with a common zero. Everything else in this folder is made from this list.
"""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from shaftcore.beam_loads import BeamLoads
from shaftcore.notches._contract import Array
from shaftcore.results import Judged, Results
from shaftcore.units import System, dimension

Values = Callable[[Results], Array]

MARGIN_CAP = 3.0
"""Largest margin (share) that a track shows; above lies what hardly works at all."""
FAR_ABOVE = 10.0
"""An unloaded place has an endless margin: its line leaves the track towards this one."""


@dataclass(frozen=True)
class Line:
    """One line of a track. `ink` counts the theme's trace colours; `dash` is on, off, ... in pixels.

    `at_stations` gives values to mark at the stations. An `optional` line is left out where it is
    zero everywhere.
    """

    label: str
    dimension: str
    along: Values
    ink: int
    dash: tuple[float, ...] = ()
    weight: float = 1.0
    at_stations: Values | None = None
    optional: bool = False


@dataclass(frozen=True)
class Track:
    """One chart. `decimals` of its numbers where the unit's own are too many; `capped` for the margin.

    `heads` are the words over it, one a dimension.
    """

    key: str
    label: str
    heads: tuple[str, ...]
    lines: tuple[Line, ...]
    decimals: int | None = None
    capped: bool = False
    signed: bool = False

    @property
    def dimensions(self) -> tuple[str, ...]:
        return tuple(dict.fromkeys(line.dimension for line in self.lines))


@dataclass(frozen=True, eq=False)
class Curve:
    """A line with its numbers, in the unit shown: along the shaft, and at stations where marked."""

    line: Line
    x: Array
    y: Array
    mark_x: Array
    mark_y: Array

    def same_as(self, other: "Curve") -> bool:
        pairs = ((self.x, other.x), (self.y, other.y), (self.mark_x, other.mark_x), (self.mark_y, other.mark_y))
        return self.line is other.line and all(np.array_equal(a, b) for a, b in pairs)


LONG, SHORT, DOTTED = (7.0, 3.0), (3.0, 2.5), (7.0, 2.5, 1.5, 2.5)
STRONG = 1.6


def _in_planes(dimension_name: str, field: str, whole: str) -> tuple[Line, ...]:
    """Resultant and both planes of a quantity with axes (set, plane, point), and its pulsation."""

    def take(pick: Callable[[Array], Array]) -> Values:
        def values(results: Results) -> Array:
            return pick(getattr(results.along, field))

        return values

    return (
        Line(whole, dimension_name, take(lambda v: np.hypot(v[0, 0], v[0, 1])), 0, weight=STRONG),
        Line("plane y", dimension_name, take(lambda v: v[0, 0]), 1, LONG),
        Line("plane z", dimension_name, take(lambda v: v[0, 1]), 2, SHORT),
        Line("pulsation", dimension_name, take(lambda v: np.hypot(v[1, 0], v[1, 1])), 3, DOTTED, optional=True),
    )


def _carried(field: str, load_set: int) -> Values:
    def values(results: Results) -> Array:
        loads: BeamLoads = results.along
        return getattr(loads, field)[load_set]

    return values


def _judged(field: str) -> tuple[Values, Values]:
    """A field of the judgement along the plain shaft, and at the stations with their notches."""

    def of(judged: Judged) -> Array:
        return getattr(judged, field)

    return (lambda results: of(results.judged_along)), (lambda results: of(results.judged))


def _judged_line(label: str, dimension_name: str, field: str, **look: object) -> Line:
    along, at_stations = _judged(field)
    return Line(label, dimension_name, along, at_stations=at_stations, **look)  # type: ignore[arg-type]


TRACKS: tuple[Track, ...] = (
    Track("moment", "Bending moment", ("Bending moment",), _in_planes("torque", "moment", "resultant")),
    Track(
        "torque",
        "Torque and axial force",
        ("Torque", "axial force"),
        (
            Line("torque", "torque", _carried("torque", 0), 0, weight=STRONG),
            Line("pulsation", "torque", _carried("torque", 1), 1, LONG, optional=True),
            Line("axial", "force", _carried("normal", 0), 2, SHORT, optional=True),
            Line("axial pulsation", "force", _carried("normal", 1), 3, DOTTED, optional=True),
        ),
    ),
    Track(
        "stress",
        "Stress amplitude and mean",
        ("Stress",),
        (
            _judged_line("amplitude", "stress", "amplitude", ink=0, weight=STRONG),
            _judged_line("mean", "stress", "mean", ink=1, dash=LONG),
        ),
    ),
    Track(
        "margin",
        "Margin",
        ("Margin",),
        (
            _judged_line("fatigue", "share", "margin", ink=0, weight=STRONG),
            _judged_line("yield", "share", "yield_margin", ink=2, dash=SHORT),
        ),
        decimals=1,
        capped=True,
        signed=True,
    ),
    Track("deflection", "Deflection", ("Deflection",), _in_planes("deflection", "deflection", "resultant")),
    Track("slope", "Slope", ("Slope",), _in_planes("slope", "slope", "resultant")),
)
BY_KEY: dict[str, Track] = {track.key: track for track in TRACKS}
DEFAULT_TRACKS = ("moment", "torque", "stress", "margin")


def curves_of(track: Track, results: Results, system: System) -> tuple[Curve, ...]:
    """Every line of the track that has something to show, in the units of `system`; all finite."""
    station_x = np.array([station.x for station in results.stations])
    nowhere = np.empty(0)
    found = []
    for line in track.lines:
        values = line.along(results)
        if line.optional and not values.any():
            continue
        marks = nowhere if line.at_stations is None else line.at_stations(results)
        y, mark_y = (_as_shown(track, line, numbers, system) for numbers in (values, marks))
        found.append(Curve(line, results.along.x, y, station_x if marks.size else nowhere, mark_y))
    return tuple(found)


def _as_shown(track: Track, line: Line, values: Array, system: System) -> Array:
    unit = dimension(line.dimension).unit(system)
    finite = np.minimum(values, FAR_ABOVE) if track.capped else values
    return finite / unit.factor + unit.zero
