"""Whether a shaft can be: every field in its range, every thing in its place, and what is still missing."""

import itertools
import math
from collections.abc import Callable, Iterator

from shaftcore.errors import UnsoundShaftError
from shaftcore.field_problems import field_problems
from shaftcore.geometry import faces_of
from shaftcore.notch_sites import Seating, seatings
from shaftcore.records import Problem
from shaftcore.shaft import LONGEST, Segment, Shaft, things

SLACK = 1e-9
"""Share of the shaft's length by which places may miss one another by rounding."""

LEAST_BEARING_SPREAD = 1e-4
"""Share of the shaft's length below which two neighbouring supports count as one place."""

GROOVE_ON_TAPER = 0.1
"""Share of a groove's depth by which the radius of a taper may change across its mouth: the fits
for Kt are for a groove between equal diameters (common practice, no source)."""

HALVINGS = 12
"""How often the stretch between a size that can be and one that cannot is halved."""


def problems_of(shaft: Shaft) -> tuple[Problem, ...]:
    """Everything wrong with the shaft, then everything missing; () where it can be analysed.

    Geometry is looked at only once every field is in its range, raisers once all lie on the shaft.
    """
    return _examined(shaft)[0]


def require_ready(shaft: Shaft) -> tuple[Seating, ...]:
    """The raisers as they sit on the shaft. Raises UnsoundShaftError unless it can be analysed."""
    problems, seated = _examined(shaft)
    if problems:
        raise UnsoundShaftError(problems)
    return seated


def can_be(shaft: Shaft) -> bool:
    """Nothing is wrong with the shaft, whatever may still be missing."""
    return all(problem.severity != "wrong" for problem in problems_of(shaft))


def nearest_sound(shaft_with: Callable[[float], Shaft], sound: float, refused: float, unit: float = 1.0) -> float:
    """The value nearest `refused`, on from `sound`, whose shaft can be: by halving, on round numbers.

    `shaft_with(sound)` can be, `shaft_with(refused)` cannot; `unit` is the size of the unit whose
    numbers are to be round, in internal units.
    """
    low, high = sound / unit, refused / unit
    for _ in range(HALVINGS):
        middle = _round_between(low, high)
        if can_be(shaft_with(middle * unit)):
            low = middle
        else:
            high = middle
    return low * unit


def _round_between(low: float, high: float) -> float:
    """A number of few digits about midway, by ratio where both are of one sign."""
    middle = math.copysign(math.sqrt(low * high), low) if low * high > 0 else (low + high) / 2
    room = min(abs(middle - low), abs(high - middle)) / 2
    decimals = -math.floor(math.log10(room)) if room > 0 else 0
    return round(middle, decimals) if room > 0 else middle


def _examined(shaft: Shaft) -> tuple[tuple[Problem, ...], tuple[Seating, ...]]:
    wrong = field_problems(shaft)
    if wrong:
        return wrong, ()
    faces = faces_of(shaft)
    amiss = (*_id_problems(shaft), *_segment_problems(shaft), *_strength_problems(shaft), *_off_the_shaft(shaft, faces))
    seated = seatings(shaft) if shaft.segments and not amiss else ()
    return (*amiss, *_raiser_problems(shaft, faces, seated), *_missing(shaft)), seated


def _id_problems(shaft: Shaft) -> Iterator[Problem]:
    groups = ("segments", "raisers", "supports", "loads")
    if len(things(shaft)) == sum(len(getattr(shaft, group)) for group in groups):
        return
    seen: dict[str, str] = {}
    for group in groups:
        for index, thing in enumerate(getattr(shaft, group)):
            path = f"{group}[{index}]"
            if thing.id in seen:
                yield Problem(
                    f"{path}.id", f'"{thing.id}"', f"a name not used by {seen[thing.id]}", "rename one of the two"
                )
            seen.setdefault(thing.id, path)


def _segment_problems(shaft: Shaft) -> Iterator[Problem]:
    for index, segment in enumerate(shaft.segments):
        thinnest = min(segment.diameter, segment.right_diameter)
        if segment.bore >= thinnest:
            yield Problem(
                f"segments[{index}].bore_mm", f"{segment.bore:g} mm", f"less than {thinnest:g} mm", "reduce the bore"
            )
    if shaft.length > LONGEST:
        yield Problem("segments", f"{shaft.length:g} mm in all", f"up to {LONGEST:.0f} mm in all", "shorten some")
    for index, (left, right) in enumerate(itertools.pairwise(shaft.segments)):
        if left.right_diameter != right.diameter and left.shoulder is None:
            yield Problem(
                f"segments[{index}].shoulder",
                f"none at a step of {abs(right.diameter - left.right_diameter) / 2:g} mm",
                "a shoulder with a fillet radius",
                "add the shoulder, or give both segments one diameter",
            )
        yield from _face_problems(index, left, right)


def _face_problems(index: int, left: Segment, right: Segment) -> Iterator[Problem]:
    """A bore wider than the neighbour is thick leaves the two segments unconnected."""
    for widest, other, bored in ((left.bore, right.diameter, index), (right.bore, left.right_diameter, index + 1)):
        if widest >= other:
            yield Problem(
                f"segments[{bored}].bore_mm",
                f"{widest:g} mm",
                f"less than {other:g} mm, the diameter across the face",
                "reduce the bore, or move the face",
            )


def _strength_problems(shaft: Shaft) -> Iterator[Problem]:
    material = shaft.material
    if material.yield_strength > material.tensile_strength:
        yield Problem(
            "material.yield_strength_MPa",
            f"{material.yield_strength:g} MPa",
            f"at most the tensile strength {material.tensile_strength:g} MPa",
            "check both strengths",
        )


def _off_the_shaft(shaft: Shaft, faces: tuple[float, ...]) -> Iterator[Problem]:
    if not shaft.segments:
        return
    end = faces[-1]
    for group in ("raisers", "supports", "loads"):
        for index, thing in enumerate(getattr(shaft, group)):
            if thing.x > end * (1 + SLACK):
                yield Problem(
                    f"{group}[{index}].x_mm",
                    f"{thing.x:g} mm",
                    f"0 to {end:g} mm, the length of the shaft",
                    "move it onto the shaft or lengthen the shaft",
                )


def _raiser_problems(shaft: Shaft, faces: tuple[float, ...], seated: tuple[Seating, ...]) -> Iterator[Problem]:
    """Raisers that leave no material, do not fit their segment, or run into one another."""
    slack = SLACK * max(1.0, faces[-1])
    spans = []
    for seating in seated:
        amiss = _misfit(shaft, seating, faces, slack)
        if amiss:
            yield amiss
        else:
            spans.append((*seating.site.span, seating.path))
    spans.sort()
    for (_, end, one), (begin, _, other) in itertools.pairwise(spans):
        if begin < end - slack:
            yield Problem(
                other,
                f"begins at x {begin:.4g} mm, before {one} ends at {end:.4g} mm",
                "raisers that do not overlap",
                "reduce a radius or move one of them",
            )


def _misfit(shaft: Shaft, seating: Seating, faces: tuple[float, ...], slack: float) -> Problem | None:
    """Why a raiser cannot sit where it is, looked at alone."""
    site, (low, high) = seating.site, faces[seating.segment : seating.segment + 2]
    if site.d <= site.bore:
        words = f"leaves {site.d:g} mm over a bore of {site.bore:g} mm"
        return Problem(seating.path, words, "some material", "make it shallower")
    begin, end = site.span
    if begin < low - slack or end > high + slack:
        return Problem(
            seating.path,
            f"takes {end - begin:.4g} mm along the shaft, x {begin:.4g} to {end:.4g} mm",
            f"inside its segment, x {low:.4g} to {high:.4g} mm",
            "reduce the radius, move it or lengthen the segment",
        )
    if seating.kind.goes == "on a diameter":
        return _on_too_steep_a_taper(shaft.segments[seating.segment], seating)
    return None


def _on_too_steep_a_taper(segment: Segment, seating: Seating) -> Problem | None:
    site = seating.site
    rise = abs(segment.right_diameter - segment.diameter) / 2 * (site.span[1] - site.span[0]) / segment.length
    if rise <= GROOVE_ON_TAPER * (seating.around.left_diameter - site.d) / 2:
        return None
    return Problem(
        seating.path,
        f"sits on a taper whose radius changes by {rise:.3g} mm across it",
        f"at most {GROOVE_ON_TAPER:.0%} of its depth, since Kt is known between equal diameters only",
        "move it to a cylinder, or make the taper flatter",
    )


def _missing(shaft: Shaft) -> Iterator[Problem]:
    if not shaft.segments:
        yield Problem("segments", "none", "at least one", "draw the first segment", "missing")
    places = sorted({support.x for support in shaft.supports})
    if len(places) < 2:
        words = f"{len(places)} place(s)"
        yield Problem("supports", words, "two supports or more, at different places", "set two supports", "missing")
    else:
        yield from _too_near(shaft)
    locating = sum(support.locating for support in shaft.supports)
    if len(places) >= 2 and locating != 1:
        yield Problem(
            "supports",
            f"{locating} of them hold the shaft along its axis",
            "exactly one",
            "choose the locating support",
            "missing",
        )


def _too_near(shaft: Shaft) -> Iterator[Problem]:
    """Supports that all but share a place: what each of them carries could not be told."""
    least = LEAST_BEARING_SPREAD * shaft.length
    placed = sorted((support.x, support.id) for support in shaft.supports)
    for (left, one), (right, other) in itertools.pairwise(placed):
        if right - left < least:
            words = f"{one} and {other} {right - left:.3g} mm apart"
            yield Problem("supports", words, f"at least {least:.3g} mm", "move them apart", "missing")
