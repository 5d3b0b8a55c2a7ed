"""What every kind of stress raiser declares, and nothing more.

A raiser kind is a record: words, sizes, where it goes, published fits for Kt with the range of
each, outline, handles. Evaluation, bench, forms, file, sheet and manual read it from here.
"""

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any, Literal, NamedTuple

import numpy as np
from numpy.typing import NDArray

from shaftcore.calculation_lines import Line
from shaftcore.records import ValidRange

Array = NDArray[np.float64]
Sizes = Mapping[str, Array]
LoadSort = Literal["bending", "tension", "torsion"]
LOAD_SORTS: tuple[LoadSort, ...] = ("bending", "tension", "torsion")


class Around(NamedTuple):
    """The plain shaft just left and right of a place (mm)."""

    x: float
    left_diameter: float
    right_diameter: float
    left_bore: float
    right_bore: float
    left_finish: str
    right_finish: str


class Site(NamedTuple):
    """One raiser set on the shaft, ready for the formulas.

    `d` and `bore` (mm) bound the net section the nominal stress is taken on; `sizes` holds what
    the kind's fits ask for, in mm; `span` is the stretch of shaft the raiser takes up.
    """

    kind: str
    place: str
    x: float
    d: float
    bore: float
    finish: str
    sizes: Mapping[str, float]
    span: tuple[float, float]


@dataclass(frozen=True)
class Handle:
    """A point of the upper outline by which one size is dragged.

    Pulling along `direction` (a unit vector in x, radius) makes the size grow.
    """

    size: str
    x: float
    y: float
    direction: tuple[float, float]


@dataclass(frozen=True)
class Fit:
    """A published formula for Kt under one load.

    `value(sizes)` gives Kt on the net section for arrays of one shape, continued in a sensible
    way outside `ranges`, which name the parameters of `RaiserKind.parameters`. `formula` is the
    text of the formula; `steps(sizes, symbol)` writes the same out line by line for one set of
    sizes, ending with Kt under the given symbol. `seams(sizes)` gives the root radii, along a last
    axis of their own, at which pieces of the fit meet and may jump. `low_by` lists (r/d, share): how far finite
    elements lie above the fit at worst for fillets about that sharp, 0 where the fit is safe; ()
    where nothing is known. `low_when_cut` lists the same over r/h for arcs larger than their step.
    """

    source: str
    value: Callable[[Sizes], Array]
    ranges: tuple[ValidRange, ...]
    formula: str
    steps: Callable[[Mapping[str, float], str], tuple[Line, ...]]
    low_by: tuple[tuple[float, float], ...] = ()
    low_when_cut: tuple[tuple[float, float], ...] = ()
    seams: Callable[[Sizes], Array] = field(default=lambda sizes: np.empty((*sizes["r"].shape, 0)))

    @cached_property
    def low_knots(self) -> tuple[Array, Array, float]:
        """`low_by` as two arrays, and the growth per log(d/r) beyond the sharpest root known."""
        sharpness, share = np.array(self.low_by).T
        return sharpness, share, max(float((share[0] - share[1]) / np.log(sharpness[1] / sharpness[0])), 0.0)


class Fits(dict[LoadSort, Fit]):
    """The fits of one source, one for every sort of load in the order of LOAD_SORTS.

    `kt(sizes)` gives Kt (3, n, m) of n raisers for root radii `r` (3, n, m), the other sizes (n, 1);
    `seams(sizes)` the root radii (3, n, k) at which pieces of the fits meet, of n raisers. A family
    of like fits may give both in one formula each.
    """

    def kt(self, sizes: Sizes) -> Array:
        return np.array([fit.value({**sizes, "r": r}) for fit, r in zip(self.values(), sizes["r"], strict=True)])

    def seams(self, sizes: Sizes) -> Array:
        return np.array([fit.seams(sizes) for fit in self.values()])


@dataclass(frozen=True)
class RaiserKind:
    """Everything the program knows about one kind of raiser.

    `size_symbols` and `size_labels` name the sizes of its sites; `derived` holds, for each size that
    follows from others, its formula in words and as a template of a calculation line. `remark` says
    in a few words, without numbers, what is peculiar about a site; "" where nothing is.
    """

    key: str
    label: str
    record: type
    goes: Literal["at a step", "on a diameter"]
    words: str
    size_symbols: Mapping[str, str]
    size_labels: Mapping[str, str]
    derived: Mapping[str, tuple[str, str]]
    site: Callable[[Any, str, Around], Site]
    parameters: Callable[[Sizes], Sizes]
    fits: Mapping[str, Fits]
    outline: Callable[[Any, Around], Array]
    handles: Callable[[Any, Around], tuple[Handle, ...]]
    remark: Callable[[Site], str] = field(default=lambda site: "")
