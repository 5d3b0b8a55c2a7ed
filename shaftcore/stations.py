"""The places that are judged: every raiser, every load and support, the ends of tapers and bore steps."""

import math
from bisect import bisect_right
from typing import NamedTuple

from shaftcore.geometry import Profile
from shaftcore.notch_sites import Seating
from shaftcore.notches._contract import Site
from shaftcore.shaft import Segment, Shaft

FEWEST_TAPER_STRETCHES = 4
TAPER_GROWTH = 0.15
"""Share by which the diameter may change from one place on a taper to the next: between two such
places the bending stress rises by less than 1 % above both."""

SAME_PLACE = 1e-6
"""Two places nearer than this (mm) are one."""


class Station(NamedTuple):
    """One judged place; numbered from 1 by x. `site` is None where the section is plain.

    `place` is the id of the thing it belongs to (for a shoulder, the segment left of the face).
    `also` lists the places of loads, supports and the like that fall into the same station: its
    section and its notch are judged under what the shaft carries there, too.
    """

    number: int
    x: float
    kind: str
    place: str
    label: str
    site: Site | None
    also: tuple[float, ...] = ()


_Place = tuple[int, float, str, str]
"""A plain place: rank among those in one spot, x, id, label."""


def place_stations(shaft: Shaft, profile: Profile, seated: tuple[Seating, ...]) -> tuple[Station, ...]:
    """All stations from left to right, given raisers that do not overlap.

    A plain place inside a raiser's stretch is the raiser's; of plain places in one spot the one of
    lowest rank (supports, loads, tapers, bore steps) names the station.
    """
    sites = sorted((seating.site for seating in seated), key=lambda site: site.span)
    inside, spots = _shared_out(_plain_places(shaft, profile), sites)
    following = {a.id: b.id for a, b in zip(shaft.segments, shaft.segments[1:], strict=False)}
    found: list[tuple[float, str, str, str, Site | None, tuple[float, ...]]] = [
        (site.x, site.kind, site.place, _site_label(site, following), site, tuple(also))
        for site, also in zip(sites, inside, strict=True)
    ]
    for spot in spots:
        _, x, place, label = min(spot)
        found.append((x, "plain", place, label, None, tuple({other[1] for other in spot} - {x})))
    found.sort(key=lambda row: row[0])
    return tuple(Station(number, *row) for number, row in enumerate(found, start=1))


def _shared_out(places: list[_Place], sites: list[Site]) -> tuple[list[list[float]], list[list[_Place]]]:
    """The x of the places inside each site's stretch, and the other places gathered by spot."""
    begins = [site.span[0] - SAME_PLACE for site in sites]
    inside: list[list[float]] = [[] for _ in sites]
    spots: list[list[_Place]] = []
    for place in sorted(places, key=lambda place: place[1]):
        x = place[1]
        before = bisect_right(begins, x) - 1
        if before >= 0 and x <= sites[before].span[1] + SAME_PLACE:
            inside[before].append(x)
        elif spots and x - spots[-1][0][1] < SAME_PLACE:
            spots[-1].append(place)
        else:
            spots.append([place])
    return inside, spots


def _site_label(site: Site, following: dict[str, str]) -> str:
    if site.kind == "shoulder":
        return f"Shoulder {site.place}|{following[site.place]}"
    return f"{site.kind.capitalize()} {site.place}"


def _plain_places(shaft: Shaft, profile: Profile) -> list[_Place]:
    found = [(s.x, s.id, f"Support {s.name or s.id}") for s in shaft.supports]
    found += [(load.x, load.id, f"{load.label} {load.name or load.id}") for load in shaft.loads]
    faces = profile.faces.tolist()
    for segment, begin, end in zip(shaft.segments, faces, faces[1:], strict=False):
        if segment.right_diameter != segment.diameter:
            found += [(x, segment.id, f"Taper {segment.id}") for x in _taper_places(segment, begin, end)]
    for left, right, face in zip(shaft.segments, shaft.segments[1:], faces[1:], strict=False):
        if left.bore != right.bore:
            found.append((face, left.id, f"Bore step {left.id}|{right.id}"))
    return [(rank, *place) for rank, place in enumerate(found)]


def _taper_places(segment: Segment, begin: float, end: float) -> list[float]:
    growth = math.log1p((segment.right_diameter - segment.diameter) / segment.diameter)
    stretches = max(FEWEST_TAPER_STRETCHES, math.ceil(abs(growth) / math.log1p(TAPER_GROWTH)))
    shares = (math.expm1(growth * step / stretches) / math.expm1(growth) for step in range(stretches))
    return [*(begin + share * (end - begin) for share in shares), end]
