"""Kt = C1 + C2 x + C3 x² + C4 x³ with x = 2h/D and each C = a + b √q + c q, q = h/r.

The published form of the fits to the Peterson charts (W. D. Pilkey). Inside the ranges of q the
fit is used as published. Sharper than the last range (q large) Kt is carried on as a power of q,
the steepest growth a sharp corner can have, so the continuation is on the safe side: 1/2, that of
a crack, or 1/3, that of a right-angled inner corner in shear along its edge (the Laplace equation
in a wedge of 270 degrees). Blunter than the first range (q small) the excess Kt - 1 is carried on
as √q, so that Kt tends to 1 as the step vanishes.
"""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from shaftcore.calculation_lines import Line, line
from shaftcore.notches._contract import LOAD_SORTS, Array, Fit, Fits, Sizes
from shaftcore.records import ValidRange

Coefficients = tuple[tuple[float, float, float], ...]
Piece = tuple[float, float, Coefficients]
"""One stretch of q: from, to, and the (a, b, c) of C1..C4."""

CRACK, CORNER_IN_SHEAR = 1 / 2, 1 / 3
"""Powers of h/r with which the stress at a sharp root can grow."""

SOURCE = "pilkey"
FORMULA = "C1 + C2 (2h/D) + C3 (2h/D)² + C4 (2h/D)³"


Low = tuple[tuple[float, float], ...]


@dataclass(frozen=True)
class Chart:
    """A fit as published for one load, and its power of h/r beyond the last stretch; `low_by` as in `Fit`."""

    pieces: tuple[Piece, ...]
    low_by: Low = ()
    growth: float = CRACK


class _Table(NamedTuple):
    """Charts in arrays whose last axis, left out for a single one, runs over the charts.

    `c` holds the coefficients (4 powers of x, 3 powers of √q, stretches), `ends` where each stretch
    ends, `low` where the first begins; charts of fewer stretches have their last one twice.
    """

    c: Array
    ends: Array
    low: Array
    growth: Array


def _table(charts: Sequence[Chart]) -> _Table:
    most = max(len(chart.pieces) for chart in charts)
    pieces = [[*chart.pieces, *[chart.pieces[-1]] * (most - len(chart.pieces))] for chart in charts]
    coefficients = np.array([[piece for *_, piece in row] for row in pieces])
    return _Table(
        c=np.ascontiguousarray(coefficients.transpose(2, 3, 1, 0)),
        ends=np.array([[end for _, end, _ in row] for row in pieces]).T,
        low=np.array([row[0][0] for row in pieces]),
        growth=np.array([chart.growth for chart in charts]),
    )


def _single(chart: Chart) -> _Table:
    return _Table(*(values[..., 0] for values in _table([chart])))


def _piece_at(pieces: Sequence[Piece], q: Array) -> Array:
    """The (a, b, c) of C1..C4 at each q, shape (..., 4, 3)."""
    ends = np.array([end for _, end, _ in pieces[:-1]])
    return np.array([coefficients for _, _, coefficients in pieces])[np.searchsorted(ends, q)]


def _coefficients(pieces: Sequence[Piece], q: Array) -> Array:
    """C1..C4 at each q, shape (..., 4)."""
    table, root = _piece_at(pieces, q), np.sqrt(q)
    return table[..., 0] + table[..., 1] * root[..., None] + table[..., 2] * q[..., None]


def _kt_inside(c: Array, ends: Array, x: Array, q: Array) -> Array:
    """The polynomial of the stretch each q lies in, with what goes with 1, √q and q gathered first.

    x may have fewer axes filled than q: many radii are tried on one step.
    """
    c1, c2, c3, c4 = c
    with_1, with_root, with_q = c1 + x * (c2 + x * (c3 + x * c4))
    root = np.sqrt(q)
    each = with_1 + root * (with_root + root * with_q)
    kt = each[-1]
    for end, here in zip(ends[-2::-1], each[-2::-1], strict=True):
        kt = np.where(q <= end, here, kt)
    return kt


def _chart_kt(table: _Table, sizes: Sizes) -> Array:
    """Kt for arrays `D` (large diameter), `h` (step height or depth), `r` (root radius), all mm > 0.

    Of several charts `r` and Kt have the charts as their first axis.
    """
    q = sizes["h"] / sizes["r"]
    axes = (1,) * (q.ndim - table.low.ndim)
    c, ends, low, growth = (values.reshape(values.shape + axes) for values in table)
    held = np.minimum(np.maximum(q, low), ends[-1])
    kt = np.maximum(_kt_inside(c, ends, 2 * sizes["h"] / sizes["D"], held), 1.0)
    beyond = q / held
    return np.where(q < low, 1 + (kt - 1) * np.sqrt(beyond), kt * beyond**growth)


def chart_steps(chart: Chart, sizes: Mapping[str, float], symbol: str) -> tuple[Line, ...]:
    """The fit written out for one raiser: ratios, C1..C4, Kt, and how it is carried on out of range."""
    pieces, table = chart.pieces, _single(chart)
    x, q = 2 * sizes["h"] / sizes["D"], sizes["h"] / sizes["r"]
    low, high = pieces[0][0], pieces[-1][1]
    held = min(max(q, low), high)
    lines = [
        line("2h/D", "Relative step", "2 h/D", "2 × {h}/{D}", x, "", SOURCE, h=sizes["h"], D=sizes["D"]),
        line("h/r", "Sharpness", "h/r", "{h}/{r}", q, "", SOURCE, h=sizes["h"], r=sizes["r"]),
    ]
    if held != q:
        end = f"outside {low:g} ≤ h/r ≤ {high:g}: coefficients of the nearer end"
        lines.append(line("q_0", "Sharpness in range", "nearer end of the range", "{q}", held, "", SOURCE, end, q=held))
    c = _coefficients(pieces, np.array(held))
    for number, (row, value) in enumerate(zip(_piece_at(pieces, np.array(held)), c, strict=True), start=1):
        lines.append(_coefficient_line(f"C{number}", row, held, float(value)))
    raw = float(_kt_inside(table.c, table.ends, np.array(x), np.array(held)))
    c1, c2, c3, c4 = (float(value) for value in c)
    numbers = "{c1} + {c2} × {x} + {c3} × {x}^2 + {c4} × {x}^3"
    last = symbol if held == q and raw >= 1 else f"{symbol},0"
    lines.append(
        line(last, "Stress concentration", FORMULA, numbers, raw, "ratio", SOURCE, x=x, c1=c1, c2=c2, c3=c3, c4=c4)
    )
    return (*lines, *_carried_on(symbol, raw, q, held, chart.growth))


def _coefficient_line(symbol: str, row: Array, q: float, value: float) -> Line:
    a, b, c = (float(number) for number in row)
    return line(
        symbol, "Coefficient", "a + b √(h/r) + c (h/r)", "{a} + {b} × √({q}) + {c} × {q}", value, "", SOURCE,
        a=a, b=b, c=c, q=q,
    )  # fmt: skip


def _carried_on(symbol: str, raw: float, q: float, held: float, growth: float) -> tuple[Line, ...]:
    """The lines that follow the polynomial where it is not yet Kt itself."""
    if held == q:
        if raw >= 1:
            return ()
        return (
            line(symbol, "Stress concentration", "1, the least", "1", 1.0, "ratio", SOURCE, "fit below 1: 1 taken"),
        )
    kt = max(raw, 1.0)
    if q > held:
        power = f"1/{1 / growth:.0f}"
        formula, numbers = f"Kt,0 ((h/r)/q_0)^({power})", f"{{kt}} × ({{q}}/{{held}})^({power})"
        value = kt * (q / held) ** growth
        flag = f"sharper than the fit: carried on as (h/r)^({power}), the steepest a sharp corner can grow"
    else:
        formula, numbers = "1 + (Kt,0 − 1) √((h/r)/q_0)", "1 + ({kt} − 1) × √({q}/{held})"
        value = 1 + (kt - 1) * np.sqrt(q / held)
        flag = "blunter than the fit: the excess over 1 is carried on as √(h/r)"
    return (
        line(symbol, "Stress concentration", formula, numbers, value, "ratio", SOURCE, flag, kt=kt, q=q, held=held),
    )


def chart_fit(chart: Chart) -> Fit:
    """The fit over all its stretches of q as one `Fit`."""
    pieces, table = chart.pieces, _single(chart)
    seams = np.array([table.low, *table.ends])
    return Fit(
        source=SOURCE,
        value=lambda sizes: _chart_kt(table, sizes),
        ranges=(ValidRange("h/r", pieces[0][0], pieces[-1][1]),),
        formula=f"Kt = {FORMULA}",
        steps=lambda sizes, symbol: chart_steps(chart, sizes, symbol),
        low_by=chart.low_by,
        seams=lambda sizes: sizes["h"][..., None] / seams,
    )


class ChartFits(Fits):
    """The fits to the charts for all sorts of load, by one formula."""

    def __init__(self, **charts: Chart) -> None:
        super().__init__({sort: chart_fit(charts[sort]) for sort in LOAD_SORTS})
        self._table = _table([charts[sort] for sort in LOAD_SORTS])
        self._seams = np.vstack([self._table.low, self._table.ends]).T[:, None]

    def kt(self, sizes: Sizes) -> Array:
        return _chart_kt(self._table, sizes)

    def seams(self, sizes: Sizes) -> Array:
        return sizes["h"][:, None] / self._seams
