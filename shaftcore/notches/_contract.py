"""What every kind of stress raiser declares, and nothing more.

A raiser kind is a record: words, sizes, where it goes, published fits for Kt with the range of
each, outline, handles. Evaluation, bench, forms, file, sheet and manual read it from here.
"""

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any, Literal

import numpy as np
from numpy.typing import NDArray

from shaftcore.calculation_lines import Line
from shaftcore.phrase import Phrase
from shaftcore.records import ValidRange

Array = NDArray[np.float64]
Sizes = Mapping[str, Array]
LoadSort = Literal["bending", "tension", "torsion"]
LOAD_SORTS: tuple[LoadSort, ...] = ("bending", "tension", "torsion")


@dataclass(frozen=True)
class Around:
    """The plain shaft just left and right of a place (mm)."""

    x: float
    left_diameter: float
    right_diameter: float
    left_bore: float
    right_bore: float
    left_finish: str
    right_finish: str


@dataclass(frozen=True)
class Site:
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
    sizes, ending with Kt under the given symbol. `seams(sizes)` gives the root radii, one array
    each, at which pieces of the fit meet and may jump. `low_by` lists (r/d, share): how far finite
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
    seams: Callable[[Sizes], tuple[Array, ...]] = field(default=lambda sizes: ())


@dataclass(frozen=True)
class RaiserKind:
    """Everything the program knows about one kind of raiser.

    `size_symbols` and `size_labels` name the sizes of its sites; `derived` holds, for each size that
    follows from others, its formula in words and as a template of a calculation line. `remarks`
    gives key and words of what must be noticed about a site.
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
    fits: Mapping[str, Mapping[LoadSort, Fit]]
    outline: Callable[[Any, Around], Array]
    handles: Callable[[Any, Around], tuple[Handle, ...]]
    remarks: Callable[[Site], tuple[tuple[str, Phrase], ...]] = field(default=lambda site: ())
