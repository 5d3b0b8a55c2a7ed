"""Whether a shaft can be: every field in its range, every thing in its place, and what is still missing."""

import itertools
import math
from collections.abc import Iterator
from functools import lru_cache
from typing import Any

from shaftcore.declared import Choice, Part, Quantity, Switch, Text, declared, file_key
from shaftcore.errors import UnsoundShaftError
from shaftcore.geometry import faces_of
from shaftcore.notch_sites import Seating, seatings
from shaftcore.records import Problem
from shaftcore.shaft import LONGEST, Shaft

SLACK = 1e-9


def problems_of(shaft: Shaft) -> tuple[Problem, ...]:
    """Everything wrong with the shaft, then everything missing; () where it can be analysed.

    Geometry is looked at only once every field is in its range.
    """
    wrong = tuple(_field_problems(shaft, ""))
    if wrong:
        return wrong
    return (*_id_problems(shaft), *_geometry_problems(shaft), *_place_problems(shaft), *_missing(shaft))


def require_ready(shaft: Shaft) -> None:
    """Raise UnsoundShaftError unless the shaft can be analysed."""
    found = problems_of(shaft)
    if found:
        raise UnsoundShaftError(found)


def _field_problems(record: Any, path: str) -> Iterator[Problem]:
    for name, problem in _own_problems(record):
        yield Problem(path + name, problem.value, problem.allowed, problem.remedy)
    for name, declaration in declared(record).items():
        if isinstance(declaration, Part):
            value = getattr(record, name)
            if declaration.many:
                if len(value) > declaration.most:
                    yield Problem(
                        path + name,
                        f"{len(value)} entries",
                        f"{declaration.most} at most",
                        "remove some or join them",
                    )
                    continue
                for index, entry in enumerate(value):
                    yield from _field_problems(entry, f"{path}{name}[{index}].")
            elif value is not None:
                yield from _field_problems(value, f"{path}{name}.")


@lru_cache(maxsize=8192)
def _own_problems(record: Any) -> tuple[tuple[str, Problem], ...]:
    """Problems of a record's plain fields; remembered, since edits replace few records at a time."""
    return tuple(
        (file_key(name, declaration), problem)
        for name, declaration in declared(record).items()
        if (problem := plain_problem(declaration, getattr(record, name))) is not None
    )


def plain_problem(declaration: Any, value: Any) -> Problem | None:
    """What is wrong with the value of one field (internal units), its path left empty; None for a part."""
    if isinstance(declaration, Part) or (value is None and getattr(declaration, "optional", False)):
        return None
    if isinstance(declaration, Quantity):
        return _number_problem(declaration, value)
    if isinstance(declaration, Choice):
        fits, remedy = value in [v for v, _ in declaration.options], "choose one of these"
    elif isinstance(declaration, Switch):
        fits, remedy = isinstance(value, bool), "give one of these"
    else:
        fits = isinstance(value, str) and declaration.holds(value)
        remedy = _text_remedy(declaration, value)
    return None if fits else Problem("", f"{value!r:.60}", declaration.allowed(), remedy)


def _number_problem(quantity: Quantity, value: Any) -> Problem | None:
    allowed = quantity.allowed(in_file=True)
    if isinstance(value, bool) or not isinstance(value, (int, float)):
        return Problem("", f"{value!r:.60}", allowed, "give a number")
    if quantity.holds(value):
        return None
    unit = quantity.dimension.file
    shown = f"{unit.shown(value):.6g} {unit.symbol}".rstrip() if math.isfinite(value) else str(value)
    return Problem("", shown, allowed, "give a number in this range")


def _text_remedy(text: Text, value: Any) -> str:
    if not isinstance(value, str):
        return "give a text"
    if len(value) < text.shortest:
        return "give it a name of its own"
    return "shorten it" if len(value) > text.longest else "remove the control characters"


def _id_problems(shaft: Shaft) -> Iterator[Problem]:
    seen: dict[str, str] = {}
    for group in ("segments", "raisers", "supports", "loads"):
        for index, thing in enumerate(getattr(shaft, group)):
            path = f"{group}[{index}].id"
            if thing.id in seen:
                yield Problem(path, f'"{thing.id}"', f"a name not used by {seen[thing.id]}", "rename one of the two")
            seen.setdefault(thing.id, path.removesuffix(".id"))


def _geometry_problems(shaft: Shaft) -> Iterator[Problem]:
    for index, segment in enumerate(shaft.segments):
        path = f"segments[{index}]"
        thinnest = min(segment.diameter, segment.right_diameter)
        if segment.bore >= thinnest:
            yield Problem(f"{path}.bore_mm", f"{segment.bore:g} mm", f"less than {thinnest:g} mm", "reduce the bore")
        if index + 1 < len(shaft.segments):
            step = shaft.segments[index + 1].diameter - segment.right_diameter
            if step and segment.shoulder is None:
                yield Problem(
                    f"{path}.shoulder",
                    f"none at a step of {abs(step) / 2:g} mm",
                    "a shoulder with a fillet radius",
                    "add the shoulder, or give both segments one diameter",
                )
            bore = max(segment.bore, shaft.segments[index + 1].bore)
            thin = min(segment.right_diameter, shaft.segments[index + 1].diameter)
            if bore >= thin and segment.bore < thinnest:
                yield Problem(
                    f"{path}.bore_mm", f"{bore:g} mm beside the face", f"less than {thin:g} mm", "shorten the bore"
                )
    if shaft.length > LONGEST:
        yield Problem("segments", f"{shaft.length:g} mm in all", f"up to {LONGEST:.0f} mm in all", "shorten some")
    if shaft.material.yield_strength > shaft.material.tensile_strength:
        yield Problem(
            "material.yield_strength_MPa",
            f"{shaft.material.yield_strength:g} MPa",
            f"at most the tensile strength {shaft.material.tensile_strength:g} MPa",
            "check both strengths",
        )


def _place_problems(shaft: Shaft) -> Iterator[Problem]:
    if not shaft.segments:
        return
    length = shaft.length
    for group in ("raisers", "supports", "loads"):
        for index, thing in enumerate(getattr(shaft, group)):
            if thing.x > length * (1 + SLACK):
                yield Problem(
                    f"{group}[{index}].x_mm",
                    f"{thing.x:g} mm",
                    f"0 to {length:g} mm, the length of the shaft",
                    "move it onto the shaft or lengthen the shaft",
                )
    if all(raiser.x <= length * (1 + SLACK) for raiser in shaft.raisers):
        yield from _raiser_problems(shaft)


def _path_of(shaft: Shaft, seating: Seating) -> str:
    for index, raiser in enumerate(shaft.raisers):
        if raiser.id == seating.place:
            return f"raisers[{index}]"
    return next(f"segments[{i}].shoulder" for i, segment in enumerate(shaft.segments) if segment.id == seating.place)


def _raiser_problems(shaft: Shaft) -> Iterator[Problem]:
    """Raisers that leave no material, do not fit their segment, or run into one another."""
    faces = faces_of(shaft)
    spans = []
    for seating in seatings(shaft):
        site, path = seating.site(), _path_of(shaft, seating)
        if site.d <= site.bore:
            yield Problem(
                path, f"leaves {site.d:g} mm over a bore of {site.bore:g} mm", "some material", "make it shallower"
            )
            continue
        begin, end = site.span
        room = next(
            (
                (faces[i], faces[i + 1])
                for i in range(len(shaft.segments))
                if faces[i] - SLACK <= (begin + end) / 2 <= faces[i + 1] + SLACK
            ),
            (faces[0], faces[-1]),
        )
        slack = SLACK * max(1.0, faces[-1])
        if begin < room[0] - slack or end > room[1] + slack:
            yield Problem(
                path,
                f"takes {end - begin:.4g} mm along the shaft, x {begin:.4g} to {end:.4g} mm",
                f"inside its segment, x {room[0]:.4g} to {room[1]:.4g} mm",
                "reduce the radius, move it or lengthen the segment",
            )
        else:
            spans.append((begin, end, path))
    spans.sort()
    for (_, end, one), (begin, _, other) in itertools.pairwise(spans):
        if begin < end - SLACK * max(1.0, faces[-1]):
            yield Problem(
                other,
                f"begins at x {begin:.4g} mm, before {one} ends at {end:.4g} mm",
                "raisers that do not overlap",
                "reduce a radius or move one of them",
            )


def _missing(shaft: Shaft) -> Iterator[Problem]:
    if not shaft.segments:
        yield Problem("segments", "none", "at least one", "draw the first segment", "missing")
    places = {support.x for support in shaft.supports}
    if len(places) < 2:
        yield Problem(
            "supports", f"{len(places)} place(s)", "two supports at different places", "set two supports", "missing"
        )
    locating = sum(support.locating for support in shaft.supports)
    if len(places) >= 2 and locating != 1:
        yield Problem(
            "supports",
            f"{locating} of them hold the shaft along its axis",
            "exactly one",
            "choose the locating support",
            "missing",
        )
