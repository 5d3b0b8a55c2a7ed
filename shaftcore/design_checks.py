"""Notices: what the user must see beside numbers that were computed all the same."""

from collections.abc import Iterator, Sequence
from operator import itemgetter

import numpy as np
from numpy.typing import NDArray

from shaftcore.abutment import largest_fillet, least_abutment
from shaftcore.beam_loads import BeamLoads
from shaftcore.geometry import faces_of
from shaftcore.judged_places import Places
from shaftcore.notch_factors import NotchFactors
from shaftcore.notch_sensitivity import NEUBER_RANGE
from shaftcore.notch_sites import Seating
from shaftcore.notches._contract import LOAD_SORTS, Site
from shaftcore.notches.arc import largest_arc_radius
from shaftcore.notches.kinds import KINDS
from shaftcore.notches.shoulder import LARGEST_RADIUS
from shaftcore.phrase import Phrase
from shaftcore.records import Notice
from shaftcore.results import Judged, SeatLimit
from shaftcore.second_looks import second_looks
from shaftcore.shaft import Shaft, Torque
from shaftcore.sources import SOURCES
from shaftcore.stations import Station
from shaftcore.strength_factors import SIZE_HIGH, SIZE_LOW
from shaftcore.support_checks import support_notices

BALANCE = 1e-6
"""Torque left over below this share of the largest torque is rounding of the entries."""

TAPER_WORTH_SAYING = 0.1
"""Share of a step by which a taper may rise under its fillet before it is worth a notice."""

HOT = 200.0
"""Service temperature (°C) above which the strengths of steel at room temperature say too little."""


def seat_limits(shaft: Shaft, seated: Sequence[Seating]) -> tuple[SeatLimit, ...]:
    """What caps each shoulder's fillet: what may be entered and the room on the thin side; where a bearing
    seats, its corner and the step, too."""
    faces = faces_of(shaft)
    neighbours: dict[int, list[tuple[float, float]]] = {}
    for seating in seated:
        neighbours.setdefault(seating.segment, []).append(seating.site.span)
    return tuple(
        _seat_limit(seating, faces, neighbours[seating.segment]) for seating in seated if seating.kind.key == "shoulder"
    )


def _seat_limit(seating: Seating, faces: Sequence[float], spans: Sequence[tuple[float, float]]) -> SeatLimit:
    room, step, corner = _room(seating, faces, spans), seating.site.sizes["h"], seating.record.bearing_corner
    caps: list[tuple[float, str, tuple[float, ...]]] = [
        (largest_arc_radius(room, step), "{:length} free along the thinner segment", (room,)),
        (LARGEST_RADIUS, "the largest radius that may be entered", ()),
    ]
    if corner:
        caps.insert(0, (step, "step height {:length}, or nothing is left to seat on", (step,)))
        caps.insert(0, (largest_fillet(corner), "bearing corner r_s,min {:length}", (corner,)))
    allowed, words, quantities = min(caps, key=itemgetter(0))
    return SeatLimit(seating.place, allowed, Phrase(words, quantities))


def _room(seating: Seating, faces: Sequence[float], spans: Sequence[tuple[float, float]]) -> float:
    """Length (mm) free of other raisers from a shoulder's face along its thinner segment."""
    low, high = faces[seating.segment : seating.segment + 2]
    face, own = seating.around.x, seating.site.span
    if face == high:
        return face - max([low, *(span[1] for span in spans if span != own)])
    return min([high, *(span[0] for span in spans if span != own)]) - face


def notices_of(
    shaft: Shaft,
    stations: Sequence[Station],
    seated: Sequence[Seating],
    places: Places,
    loads: BeamLoads,
    factors: NotchFactors,
    judged: Judged,
) -> tuple[Notice, ...]:
    """All notices, those that make the margins provisional first."""
    return (
        *_balance(shaft, loads),
        *_shaft_wide(shaft),
        *support_notices(shaft, stations, loads),
        *_seats(seated, stations),
        *_bore_steps(shaft, stations),
        *_fillets_on_tapers(shaft, seated, stations),
        *second_looks(shaft, stations, places, loads, factors, judged),
        *_station_flags(shaft, stations, factors, judged),
    )


def _balance(shaft: Shaft, loads: BeamLoads) -> Iterator[Notice]:
    torques = [load for load in shaft.loads if isinstance(load, Torque)]
    for left_over, largest, word in (
        (loads.torque_left_over[0], max((abs(t.torque) for t in torques), default=0.0), "mean torques"),
        (loads.torque_left_over[1], max((abs(t.amplitude) for t in torques), default=0.0), "torque amplitudes"),
    ):
        if abs(left_over) > BALANCE * largest:
            side = "more goes in than comes out" if left_over > 0 else "more comes out than goes in"
            yield Notice(
                "unbalanced torque",
                Phrase(
                    f"The {word} do not balance by {{:torque}} ({side}); every margin is provisional "
                    "until a torque elsewhere makes up for it.",
                    (abs(left_over),),
                ),
                provisional=True,
            )


def _shaft_wide(shaft: Shaft) -> Iterator[Notice]:
    tensile = shaft.material.tensile_strength
    if not shaft.loads:
        words = Phrase("No load is set on the shaft yet, so no station is stressed.")
        yield Notice("no load", words, provisional=True)
    if shaft.judgement.sensitivity == "neuber":
        for sort, limits in NEUBER_RANGE.items():
            if not limits.low <= tensile <= limits.high:
                yield Notice(
                    "outside a fit",
                    Phrase(
                        f"Neuber's constant in {sort} is fitted for {limits.symbol} from {{:stress}} to {{:stress}}; "
                        "{:stress} is held at the nearer end.",
                        (limits.low, limits.high, tensile),
                    ),
                )
    if shaft.duty.temperature > HOT:
        yield Notice(
            "hot service",
            Phrase(
                "At {:temperature} tensile and yield strength are taken as entered; only the endurance limit is "
                "lowered (k_d). Enter strengths that hold at this temperature; creep is not judged.",
                (shaft.duty.temperature,),
            ),
        )
    if shaft.judgement.user_factor != 1 and not shaft.judgement.user_factor_reason:
        yield Notice("reason missing", Phrase("The own factor on the endurance limit has no reason beside it."))


def _seats(seated: Sequence[Seating], stations: Sequence[Station]) -> Iterator[Notice]:
    """What keeps a bearing from seating against its shoulder."""
    seats = [seating for seating in seated if seating.kind.key == "shoulder" and seating.record.bearing_corner]
    where = _shoulder_stations(stations) if seats else {}
    for seating in seats:
        for key, words in _seat_faults(seating.record.bearing_corner, seating.site.sizes["r"], seating.site.sizes["h"]):
            yield Notice(key, words, seating.place, where[seating.place])


def _seat_faults(corner: float, r: float, step: float) -> Iterator[tuple[str, Phrase]]:
    if r > largest_fillet(corner):
        words = (
            "Fillet r {:length} is larger than {:length}, the most a bearing corner r_s,min {:length} lets seat "
            "(DIN 5418): the ring would ride on the fillet."
        )
        yield "fillet too large for its bearing", Phrase(words, (r, largest_fillet(corner), corner))
    if step < least_abutment(corner):
        words = (
            "Step height {:length} is below {:length}, the usual least abutment for a bearing corner "
            "r_s,min {:length} (catalogue value)."
        )
        yield "low abutment", Phrase(words, (step, least_abutment(corner), corner))
    if r > step:
        words = (
            "Fillet r {:length} is larger than the step height {:length}: "
            "the arc is cut by the step and leaves no seating face."
        )
        yield "no seating face", Phrase(words, (r, step))


def _shoulder_stations(stations: Sequence[Station]) -> dict[str, int]:
    return {station.place: i for i, station in enumerate(stations) if station.kind == "shoulder"}


def _bore_steps(shaft: Shaft, stations: Sequence[Station]) -> Iterator[Notice]:
    faces = zip(shaft.segments, shaft.segments[1:], faces_of(shaft)[1:], strict=False)
    steps = [(left.bore, right.bore, face) for left, right, face in faces if left.bore != right.bore]
    where = {x: i for i, station in enumerate(stations) for x in (station.x, *station.also)} if steps else {}
    for one, other, face in steps:
        yield Notice(
            "bore step",
            Phrase(
                "The bore steps from {:length} to {:length}; its inner corner is judged without a stress "
                "concentration of its own.",
                (one, other),
            ),
            stations[where[face]].place,
            where[face],
        )


def _fillets_on_tapers(shaft: Shaft, seated: Sequence[Seating], stations: Sequence[Station]) -> Iterator[Notice]:
    tapered = [s for s in seated if s.kind.key == "shoulder" and shaft.segments[s.segment].end_diameter is not None]
    where = _shoulder_stations(stations) if tapered else {}
    for seating in tapered:
        segment, site = shaft.segments[seating.segment], seating.site
        rise = abs(segment.right_diameter - segment.diameter) / 2 * (site.span[1] - site.span[0]) / segment.length
        if rise > TAPER_WORTH_SAYING * site.sizes["h"]:
            yield Notice(
                "fillet on a taper",
                Phrase(
                    "Kt is that of a step between cylinders; here the thinner side changes its radius by {:length} "
                    "under the fillet.",
                    (rise,),
                ),
                seating.place,
                where[seating.place],
            )


def _station_flags(
    shaft: Shaft, stations: Sequence[Station], factors: NotchFactors, judged: Judged
) -> Iterator[Notice]:
    """Where a factor or a fit is used beyond what it was made for, station by station."""
    size = judged.strength.size_diameter
    off_size: NDArray[np.bool_] = (size < SIZE_LOW) | (size > SIZE_HIGH)
    outside, held = np.any(factors.outside, axis=0), np.any(factors.held, axis=0)
    for i in np.flatnonzero(off_size | outside | held | (judged.bore > 0)).tolist():
        place, site = stations[i].place, stations[i].site
        if off_size[i]:
            yield Notice("outside a fit", _off_size_words(float(size[i])), place, i)
        if site is None:
            continue
        if outside[i]:
            yield Notice(
                "outside a fit", _outside_words(site, shaft.judgement.kt_source, factors.outside[:, i]), place, i
            )
        if held[i]:
            words = "For a root this sharp the formulas would let Kf fall again; it is held at its peak."
            yield Notice("Kf held", Phrase(words), place, i)
        if site.bore > 0:
            words = (
                f"Kt is that of a solid shaft; the section is bored d_i/d = {site.bore / site.d:.2f}. "
                "The nominal stress counts the bore."
            )
            yield Notice("bored section", Phrase(words), place, i)


def _off_size_words(size: float) -> Phrase:
    end = "it is 1." if size < SIZE_LOW else "its power is carried on."
    words = "The size factor is fitted for {:length} to {:length}; for {:length} " + end
    return Phrase(words, (SIZE_LOW, SIZE_HIGH, size))


def _outside_words(site: Site, source: str, outside: NDArray[np.bool_]) -> Phrase:
    """For which sorts of load (3) the fits are used outside which ranges, and what the raiser has."""
    kind = KINDS[site.kind]
    fits = {sort: kind.fits[source][sort] for sort, beyond in zip(LOAD_SORTS, outside, strict=True) if beyond}
    ranges = "; ".join(f"{sort}: {', '.join(map(str, fit.ranges))}" for sort, fit in fits.items())
    measures = kind.parameters({name: np.array(value) for name, value in site.sizes.items()})
    symbols = dict.fromkeys(r.symbol for fit in fits.values() for r in fit.ranges)
    have = ", ".join(f"{symbol} = {float(measures[symbol]):.3g}" for symbol in symbols)
    name = SOURCES[next(iter(fits.values())).source].short
    return Phrase(
        f"Kt after {name} is used outside its range ({ranges}); here {have}. "
        "The value is carried on from the nearest end."
    )
