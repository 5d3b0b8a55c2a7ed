"""Where the arrow keys lead: every station and every thing on the shaft, from left to right."""

from dataclasses import dataclass

from app.document import Scene, Selection
from shaftcore.geometry import faces_of
from shaftcore.notch_sites import seatings


@dataclass(frozen=True)
class Stop:
    """A place the keyboard can choose; `station` is None for a thing without one of its own."""

    x: float
    chosen: Selection
    station: int | None = None


def stops_of(scene: Scene) -> tuple[Stop, ...]:
    """Stations, then things that are no station of their own, by x; a segment stands at its middle."""
    shaft, found = scene.shaft, []
    if scene.results is not None:
        found = [Stop(s.x, (s.kind, s.place), i) for i, s in enumerate(scene.results.stations)]
    known = {stop.chosen[1] for stop in found if stop.chosen[1] not in {s.id for s in shaft.segments}}
    if scene.results is None:
        found += [Stop(s.around.x, (s.kind.key, s.place)) for s in seatings(shaft)]
        known |= {raiser.id for raiser in shaft.raisers}
    found += [Stop(support.x, ("support", support.id)) for support in shaft.supports if support.id not in known]
    found += [Stop(load.x, (load.kind, load.id)) for load in shaft.loads if load.id not in known]
    faces = faces_of(shaft)
    for index, segment in enumerate(shaft.segments):
        found.append(Stop((faces[index] + faces[index + 1]) / 2, ("segment", segment.id)))
    return tuple(sorted(found, key=lambda stop: stop.x))


def next_stop(scene: Scene, right: bool) -> Stop | None:
    """The stop beside the chosen one; with nothing chosen the first or the last."""
    stops = stops_of(scene)
    if not stops:
        return None
    here = _index_of(scene, stops)
    if here is None:
        return stops[0 if right else -1]
    return stops[min(max(here + (1 if right else -1), 0), len(stops) - 1)]


def _index_of(scene: Scene, stops: tuple[Stop, ...]) -> int | None:
    if scene.chosen is None:
        return None
    same = [i for i, stop in enumerate(stops) if stop.chosen[1] == scene.chosen[1]]
    exact = [i for i in same if stops[i].chosen == scene.chosen]
    stationed = [i for i in exact if stops[i].station == scene.station]
    return next(iter([*stationed, *exact, *same]), None)
