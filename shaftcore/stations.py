"""The places that are judged: every raiser, every load and support, the ends of tapers and bore steps."""

from dataclasses import dataclass

import numpy as np

from shaftcore.geometry import Profile
from shaftcore.notch_sites import Seating
from shaftcore.notches._contract import Site
from shaftcore.shaft import Shaft

TAPER_PLACES = (0.0, 0.25, 0.5, 0.75, 1.0)
SAME_PLACE = 1e-6
"""Two places nearer than this (mm) are one."""


@dataclass(frozen=True)
class Station:
    """One judged place; numbered from 1 by x. `site` is None where the section is plain.

    `place` is the id of the thing it belongs to (for a shoulder, the segment left of the face).
    """

    number: int
    x: float
    kind: str
    place: str
    label: str
    site: Site | None


def place_stations(shaft: Shaft, profile: Profile, seated: tuple[Seating, ...]) -> tuple[Station, ...]:
    """All stations from left to right. A plain place inside a raiser's stretch is the raiser's."""
    sites = [seating.site() for seating in seated]
    found: list[tuple[float, str, str, str, Site | None]] = [
        (site.x, site.kind, site.place, _site_label(shaft, site), site) for site in sites
    ]
    spans = np.array([site.span for site in sites]).reshape(-1, 2)
    taken = [site.x for site in sites]
    for x, place, label in _plain_places(shaft, profile):
        inside = bool(np.any((spans[:, 0] - SAME_PLACE <= x) & (x <= spans[:, 1] + SAME_PLACE)))
        if inside or any(abs(x - other) < SAME_PLACE for other in taken):
            continue
        taken.append(x)
        found.append((x, "plain", place, label, None))
    found.sort(key=lambda row: row[0])
    return tuple(Station(number, *row) for number, row in enumerate(found, start=1))


def _site_label(shaft: Shaft, site: Site) -> str:
    if site.kind == "shoulder":
        ids = [segment.id for segment in shaft.segments]
        return f"Shoulder {site.place}|{ids[ids.index(site.place) + 1]}"
    return f"{site.kind.capitalize()} {site.place}"


def _plain_places(shaft: Shaft, profile: Profile) -> list[tuple[float, str, str]]:
    places = []
    for support in shaft.supports:
        places.append((support.x, support.id, f"Support {support.name or support.id}"))
    for load in shaft.loads:
        places.append((load.x, load.id, f"{load.label} {load.name or load.id}"))
    for index, segment in enumerate(shaft.segments):
        begin, end = profile.faces[index : index + 2]
        if segment.right_diameter != segment.diameter:
            for share in TAPER_PLACES:
                x = float(begin + share * (end - begin))
                places.append((x, segment.id, f"Taper {segment.id}"))
        following = shaft.segments[index + 1] if index + 1 < len(shaft.segments) else None
        if following and following.bore != segment.bore:
            places.append((float(end), segment.id, f"Bore step {segment.id}|{following.id}"))
    return places
