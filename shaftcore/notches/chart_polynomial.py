"""Kt = C1 + C2 x + C3 x² + C4 x³ with x = 2h/D and each C = a + b √q + c q, q = h/r.

The published form of the fits to the Peterson charts (W. D. Pilkey). Inside the ranges of q the
fit is used as published. Sharper than the last range (q large) Kt is carried on as a power of q,
the steepest growth a sharp corner can have, so the continuation is on the safe side: 1/2, that of
a crack, or 1/3, that of a right-angled inner corner in shear along its edge (the Laplace equation
in a wedge of 270 degrees). Blunter than the first range (q small) the excess Kt - 1 is carried on
as √q, so that Kt tends to 1 as the step vanishes.
"""

from collections.abc import Mapping, Sequence

import numpy as np

from shaftcore.calculation_lines import Line, line
from shaftcore.notches._contract import Array, Fit, Sizes
from shaftcore.records import ValidRange

Coefficients = tuple[tuple[float, float, float], ...]
Piece = tuple[float, float, Coefficients]
"""One stretch of q: from, to, and the (a, b, c) of C1..C4."""

CRACK, CORNER_IN_SHEAR = 1 / 2, 1 / 3
"""Powers of h/r with which the stress at a sharp root can grow."""

SOURCE = "pilkey"
FORMULA = "C1 + C2 (2h/D) + C3 (2h/D)² + C4 (2h/D)³"


def _piece_at(pieces: Sequence[Piece], q: Array) -> Array:
    """The (a, b, c) of C1..C4 at each q, shape (..., 4, 3)."""
    ends = np.array([end for _, end, _ in pieces[:-1]])
    return np.array([coefficients for _, _, coefficients in pieces])[np.searchsorted(ends, q)]


def _coefficients(pieces: Sequence[Piece], q: Array) -> Array:
    """C1..C4 at each q, shape (..., 4)."""
    table, root = _piece_at(pieces, q), np.sqrt(q)
    return table[..., 0] + table[..., 1] * root[..., None] + table[..., 2] * q[..., None]


def _kt_inside(pieces: Sequence[Piece], x: Array, q: Array) -> Array:
    """The polynomial of the stretch each q lies in, with what goes with 1, √q and q gathered first.

    x may have fewer axes filled than q: many radii are tried on one step.
    """
    root, x = np.sqrt(q), x[..., None]
    kt: Array = np.zeros_like(q)
    for _, end, coefficients in reversed(pieces):
        c1, c2, c3, c4 = np.array(coefficients)
        gathered = c1 + x * (c2 + x * (c3 + x * c4))
        here = gathered[..., 0] + root * (gathered[..., 1] + root * gathered[..., 2])
        kt = np.where(q <= end, here, kt)
    return kt


def chart_kt(pieces: Sequence[Piece], growth: float, sizes: Sizes) -> Array:
    """Kt for arrays `D` (large diameter), `h` (step height or depth), `r` (root radius), all mm > 0."""
    q = sizes["h"] / sizes["r"]
    low, high = pieces[0][0], pieces[-1][1]
    held = np.minimum(np.maximum(q, low), high)
    kt = np.maximum(_kt_inside(pieces, 2 * sizes["h"] / sizes["D"], held), 1.0)
    return np.where(q < low, 1 + (kt - 1) * np.sqrt(q / held), kt * (q / held) ** growth)


def chart_steps(pieces: Sequence[Piece], growth: float, sizes: Mapping[str, float], symbol: str) -> tuple[Line, ...]:
    """The fit written out for one raiser: ratios, C1..C4, Kt, and how it is carried on out of range."""
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
    raw = float(_kt_inside(pieces, np.array(x), np.array(held)))
    c1, c2, c3, c4 = (float(value) for value in c)
    numbers = "{c1} + {c2} × {x} + {c3} × {x}^2 + {c4} × {x}^3"
    last = symbol if held == q and raw >= 1 else f"{symbol},0"
    lines.append(
        line(last, "Stress concentration", FORMULA, numbers, raw, "ratio", SOURCE, x=x, c1=c1, c2=c2, c3=c3, c4=c4)
    )
    return (*lines, *_carried_on(symbol, raw, q, held, growth))


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


def chart_fit(pieces: Sequence[Piece], low_by: tuple[tuple[float, float], ...] = (), growth: float = CRACK) -> Fit:
    """The fit over all its stretches of q as one `Fit`; `growth` is its power of h/r beyond the last."""
    return Fit(
        source=SOURCE,
        value=lambda sizes: chart_kt(pieces, growth, sizes),
        ranges=(ValidRange("h/r", pieces[0][0], pieces[-1][1]),),
        formula=f"Kt = {FORMULA}",
        steps=lambda sizes, symbol: chart_steps(pieces, growth, sizes, symbol),
        low_by=low_by,
        seams=lambda sizes: tuple(sizes["h"] / end for end in (pieces[0][0], *(end for _, end, _ in pieces))),
    )
