"""The numbers under the hairline and at a station, in figures and in words."""

import math

import numpy as np

from app.traces.tracks import TRACKS, Line, Track
from shaftcore.notches._contract import Array
from shaftcore.number_text import shown, unit_symbol, with_unit
from shaftcore.results import Results
from shaftcore.units import System


def value_at(x: Array, values: Array, place: float) -> float | None:
    """A trace's value at a place, read on the right side of a jump; None off the shaft.

    Between points it is read off the straight line; an endless value stays endless.
    """
    if not x[0] <= place <= x[-1]:
        return None
    i = int(np.searchsorted(x, place, "right")) - 1
    left = float(values[i])
    if place == x[i] or i + 1 == len(x):
        return left
    right = float(values[i + 1])
    if not np.isfinite(left + right):
        return float("inf")
    return left + (right - left) * (place - float(x[i])) / float(x[i + 1] - x[i])


def line_text(track: Track, line: Line, results: Results, place: float, system: System) -> str:
    """What a line reads at a place, without its unit; "" off the shaft."""
    value = value_at(results.along.x, line.along(results), place)
    return "" if value is None else _text(track, line, value, system)


def widest_text(track: Track, line: Line, reach: float, system: System) -> str:
    """The longest text that a reading of up to `reach` (internal units) either way may need."""
    text = _text(track, line, -abs(reach), system)
    return max(text, _text(track, line, float("inf"), system), key=len) if track.capped else text


def station_text(track: Track, results: Results, station: int, system: System) -> str:
    """The marked values of a station, its notch taken in; "" where the track has no marks."""
    parts = [
        f"{line.label} {_text(track, line, float(line.at_stations(results)[station]), system)}"
        for line in track.lines
        if line.at_stations is not None
    ]
    place = results.stations[station]
    notched = "" if place.site is None else ", notched"
    return f"station {place.number}{notched}: {', '.join(parts)}" if parts else ""


def _text(track: Track, line: Line, value: float, system: System) -> str:
    return shown(value, line.dimension, system, track.decimals, track.signed)


def least_text(results: Results, system: System) -> str:
    """The smallest margin of the shaft and where it is; of a shaft without stress there is none."""
    if not math.isfinite(results.least_margin):
        return "no station is stressed"
    least = shown(results.least_margin, "share", system, 1, True)
    return f"least {least} at station {results.stations[results.governing].number}"


def nearest_station(results: Results, place: float) -> int | None:
    """Index of the station nearest to a place; None where there is none."""
    if not results.stations:
        return None
    return int(np.argmin([abs(station.x - place) for station in results.stations]))


def in_words(results: Results, station: int, keys: list[str], system: System) -> str:
    """What the shown tracks read at a station, for those who listen to the window."""
    place = results.stations[station]
    said = [f"Station {place.number}, {place.label}, x {with_unit(place.x, 'length', system)}."]
    for track in TRACKS:
        if track.key in keys:
            parts = [part for line in track.lines if (part := _line_in_words(track, line, results, station, system))]
            said.append(f"{track.label}: {', '.join(parts)}.")
    return " ".join(said)


def _line_in_words(track: Track, line: Line, results: Results, station: int, system: System) -> str:
    along = line.along(results)
    if line.optional and not along.any():
        return ""
    place = results.stations[station].x
    marked = line.at_stations
    value = value_at(results.along.x, along, place) if marked is None else float(marked(results)[station])
    return f"{line.label} {with_unit(value, line.dimension, system, track.decimals)}"


def head_words(track: Track, dimensions: tuple[str, ...], system: System) -> str:
    """The track's name with its units, as it stands over it."""
    parts = [f"{head}, {unit_symbol(name, system)}" for head, name in zip(track.heads, dimensions, strict=False)]
    return " · ".join(parts)
