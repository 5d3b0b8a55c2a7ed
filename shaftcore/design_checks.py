"""Notices: what the user must see beside numbers that were computed all the same."""

from collections.abc import Iterator, Sequence

import numpy as np

from shaftcore.abutment import largest_fillet, least_abutment
from shaftcore.beam_loads import BeamLoads
from shaftcore.geometry import faces_of
from shaftcore.notch_factors import NotchFactors
from shaftcore.notch_sensitivity import NEUBER_RANGE
from shaftcore.notch_sites import Seating
from shaftcore.notches._contract import LOAD_SORTS
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
    low, high = faces[seating.segment : seating.segment + 2]
    face, own, step = seating.around.x, seating.site.span, seating.site.sizes["h"]
    if face == high:
        room = face - max([low, *(end for begin, end in spans if (begin, end) != own)])
    else:
        room = min([high, *(begin for begin, end in spans if (begin, end) != own)]) - face
    caps = [
        (LARGEST_RADIUS, Phrase("the largest radius that may be entered")),
        (largest_arc_radius(room, step), Phrase("{:length} free along the thinner segment", (room,))),
    ]
    corner = seating.record.bearing_corner
    if corner:
        caps.append((step, Phrase("step height {:length}, or nothing is left to seat on", (step,))))
        caps.append((largest_fillet(corner), Phrase("bearing corner r_s,min {:length}", (corner,))))
    allowed, reason = min(reversed(caps), key=lambda cap: cap[0])
    return SeatLimit(seating.place, allowed, reason)


def notices_of(
    shaft: Shaft,
    stations: Sequence[Station],
    seated: Sequence[Seating],
    loads: BeamLoads,
    factors: NotchFactors,
    judged: Judged,
) -> tuple[Notice, ...]:
    """All notices, those that make the margins provisional first."""
    return (
        *_balance(shaft, loads),
        *_shaft_wide(shaft),
        *support_notices(shaft, stations, loads),
        *_seats(shaft, seated, stations),
        *_bore_steps(shaft, stations),
        *_fillets_on_tapers(shaft, seated, stations),
        *second_looks(shaft, stations, loads, factors, judged),
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


def _seats(shaft: Shaft, seated: Sequence[Seating], stations: Sequence[Station]) -> Iterator[Notice]:
    index = {station.place: i for i, station in enumerate(stations) if station.kind == "shoulder"}
    for seating in seated:
        if seating.kind.key != "shoulder" or not seating.record.bearing_corner:
            continue
        corner, r = seating.record.bearing_corner, seating.record.radius
        step = abs(seating.around.left_diameter - seating.around.right_diameter) / 2
        where = index[seating.place]
        if r > largest_fillet(corner):
            yield Notice(
                "fillet too large for its bearing",
                Phrase(
                    "Fillet r {:length} is larger than {:length}, the most a bearing corner r_s,min {:length} "
                    "lets seat (DIN 5418): the ring would ride on the fillet.",
                    (r, largest_fillet(corner), corner),
                ),
                seating.place,
                where,
            )
        if step < least_abutment(corner):
            yield Notice(
                "low abutment",
                Phrase(
                    "Step height {:length} is below {:length}, the usual least abutment for a bearing corner "
                    "r_s,min {:length} (catalogue value).",
                    (step, least_abutment(corner), corner),
                ),
                seating.place,
                where,
            )


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
    where = {station.place: i for i, station in enumerate(stations) if station.kind == "shoulder"} if tapered else {}
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
    source = shaft.judgement.kt_source
    size = judged.strength.size_diameter
    too_small_or_large = (size < SIZE_LOW) | (size > SIZE_HIGH)
    outsides, held = factors.outside.T.tolist(), np.any(factors.held, axis=0).tolist()
    for i, station in enumerate(stations):
        if too_small_or_large[i]:
            yield Notice(
                "outside a fit",
                Phrase(
                    "The size factor is fitted for {:length} to {:length}; for {:length} "
                    + ("it is 1." if size[i] < SIZE_LOW else "its power is carried on."),
                    (SIZE_LOW, SIZE_HIGH, float(size[i])),
                ),
                station.place,
                i,
            )
        if station.site is None:
            continue
        kind = KINDS[station.kind]
        for key, words in kind.remarks(station.site):
            yield Notice(key, words, station.place, i)
        fits = kind.fits[source]
        outside = [sort for sort, is_outside in zip(LOAD_SORTS, outsides[i], strict=True) if is_outside]
        if outside:
            ranges = "; ".join(f"{sort}: {', '.join(map(str, fits[sort].ranges))}" for sort in outside)
            measures = kind.parameters({name: np.array(value) for name, value in station.site.sizes.items()})
            have = ", ".join(
                f"{symbol} = {float(measures[symbol]):.3g}"
                for symbol in dict.fromkeys(r.symbol for sort in outside for r in fits[sort].ranges)
            )
            yield Notice(
                "outside a fit",
                Phrase(
                    f"Kt after {SOURCES[fits[outside[0]].source].short} is used outside its range ({ranges}); "
                    f"here {have}. The value is carried on from the nearest end."
                ),
                station.place,
                i,
            )
        if held[i]:
            yield Notice(
                "Kf held",
                Phrase("For a root this sharp the formulas would let Kf fall again; it is held at its peak."),
                station.place,
                i,
            )
        if station.site.bore > 0:
            yield Notice(
                "bored section",
                Phrase(
                    f"Kt is that of a solid shaft; the section is bored d_i/d = "
                    f"{station.site.bore / station.site.d:.2f}. The nominal stress counts the bore."
                ),
                station.place,
                i,
            )
