"""Random shafts for property tests, drawn from the declarations, so that a new field or kind is drawn too."""

import dataclasses
import functools
from typing import Any

from hypothesis import assume
from hypothesis import strategies as st

from shaftcore.declared import Choice, Declaration, Part, Quantity, Switch, declared
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import Segment, Shaft
from shaftcore.soundness import problems_of

FEW, LONG = 4, 12
CARRIED = st.characters(exclude_categories=("Cc", "Cs")) | st.sampled_from("\n\t")
"""Characters a text may hold."""


def values(declaration: Declaration) -> st.SearchStrategy[Any]:
    """Any value the declaration allows."""
    found: st.SearchStrategy[Any]
    if isinstance(declaration, Quantity):
        found = st.floats(declaration.low, declaration.high, exclude_min=declaration.above)
    elif isinstance(declaration, Choice):
        found = st.sampled_from([value for value, _ in declaration.options])
    elif isinstance(declaration, Switch):
        found = st.booleans()
    elif isinstance(declaration, Part):
        found = entries(declaration) if declaration.many else one_of(declaration)
    else:
        return st.text(CARRIED, min_size=declaration.shortest, max_size=min(declaration.longest, LONG))
    return st.none() | found if getattr(declaration, "optional", False) else found


def is_list(declaration: Declaration) -> bool:
    return isinstance(declaration, Part) and declaration.many


def one_of(part: Any) -> st.SearchStrategy[Any]:
    """A record of any kind that may stand in the part."""
    return st.one_of(*(records(kind) for kind in part.kinds))


def entries(part: Any, least: int = 0) -> st.SearchStrategy[tuple[Any, ...]]:
    """A few such records."""
    return st.lists(one_of(part), min_size=least, max_size=min(FEW, part.most)).map(tuple)


@functools.cache
def records(kind: type) -> st.SearchStrategy[Any]:
    """A record of that class with every field in its range."""
    return st.builds(kind, **{name: values(declaration) for name, declaration in declared(kind).items()})


@st.composite
def sound_shafts(draw: st.DrawFn) -> Shaft:
    """A shaft in which nothing is wrong (it may be unfinished)."""
    lists = {name: draw(entries(part, least=1)) for name, part in declared(Shaft).items() if is_list(part)}
    shaft = _brought_together(dataclasses.replace(draw(records(Shaft)), **lists))
    misplaced = {problem.path.split(".")[0] for problem in problems_of(shaft)}
    kept = tuple(raiser for i, raiser in enumerate(shaft.raisers) if f"raisers[{i}]" not in misplaced)
    shaft = dataclasses.replace(shaft, raisers=kept)
    assume(not any(problem.severity == "wrong" for problem in problems_of(shaft)))
    return shaft


def _brought_together(shaft: Shaft) -> Shaft:
    """Sizes that go with one another, places on the shaft, ids that differ: few draws are thrown away."""
    segments = tuple(_of_like_size(segment, index) for index, segment in enumerate(shaft.segments))
    length = sum(segment.length for segment in segments)
    groups: dict[str, Any] = {"segments": segments}
    for group in ("raisers", "supports", "loads"):
        things = getattr(shaft, group) if segments else ()
        groups[group] = tuple(_on_the_shaft(thing, f"{group}{i}", length) for i, thing in enumerate(things))
    lower = min(shaft.material.yield_strength, shaft.material.tensile_strength)
    return dataclasses.replace(shaft, material=dataclasses.replace(shaft.material, yield_strength=lower), **groups)


def _of_like_size(segment: Segment, index: int) -> Segment:
    shoulder = segment.shoulder or Shoulder(1.0)
    return dataclasses.replace(
        segment,
        id=f"segment {index}",
        length=30 + segment.length % 40,
        diameter=30 + segment.diameter % 40,
        end_diameter=None if segment.end_diameter is None else 30 + segment.end_diameter % 40,
        bore=segment.bore % 25,
        shoulder=dataclasses.replace(shoulder, radius=0.001 + shoulder.radius % 5),
    )


def _on_the_shaft(thing: Any, name: str, length: float) -> Any:
    """The thing set on the shaft; its own sizes, whatever they are called, at most about 1 mm."""
    small = {
        field: 0.001 + getattr(thing, field) % 1
        for field, declaration in declared(thing).items()
        if isinstance(declaration, Quantity) and declaration.dimension_name == "length"
    }
    return dataclasses.replace(thing, **small | {"id": name, "x": 5 + thing.x % (length - 10)})
