"""A step in diameter with a circular fillet.

Full fillets (r up to the step height h) end tangent to the face; larger radii give an arc cut by
the step, which leaves no flat face for anything to seat against.
"""

import math
from dataclasses import dataclass
from typing import ClassVar

import numpy as np

from shaftcore.declared import choice, quantity
from shaftcore.notches._contract import Around, Array, Fits, Handle, RaiserKind, Site
from shaftcore.notches.arc import DIN_RANGES, SIZE_LABELS, SIZE_SYMBOLS, arc_along, arc_turn, parameters
from shaftcore.notches.chart_polynomial import CORNER_IN_SHEAR, Chart, ChartFits, Piece
from shaftcore.notches.din_form import FormConstants, din_fit
from shaftcore.surface import FINISHES

BENDING: tuple[Piece, ...] = (
    (0.1, 2.0, ((0.947, 1.206, -0.131), (0.022, -3.405, 0.915), (0.869, 1.777, -0.555), (-0.810, 0.422, -0.260))),
    (2.0, 20.0, ((1.232, 0.832, -0.008), (-3.813, 0.968, -0.260), (7.423, -4.868, 0.869), (-3.839, 3.070, -0.600))),
)
TENSION: tuple[Piece, ...] = (
    (0.1, 2.0, ((0.926, 1.157, -0.099), (0.012, -3.036, 0.961), (-0.302, 3.977, -1.744), (0.365, -2.098, 0.878))),
    (2.0, 20.0, ((1.200, 0.860, -0.022), (-1.805, -0.346, -0.038), (2.198, -0.486, 0.165), (-0.593, -0.028, -0.106))),
)
TORSION: tuple[Piece, ...] = (
    (0.25, 4.0, ((0.905, 0.783, -0.075), (-0.437, -1.969, 0.553), (1.557, 1.073, -0.578), (-1.061, 0.171, 0.086))),
)

FITS: dict[str, Fits] = {
    "chart polynomial": ChartFits(
        bending=Chart(BENDING, low_by=((0.01, 0.139), (0.03, 0.085), (0.05, 0.068), (0.1, 0.033), (0.2, 0.007))),
        tension=Chart(TENSION, low_by=((0.01, 0.289), (0.03, 0.242), (0.05, 0.196), (0.1, 0.137), (0.2, 0.096))),
        torsion=Chart(
            TORSION, low_by=((0.01, 0.0), (0.03, 0.0), (0.05, 0.0), (0.1, 0.0), (0.2, 0.0)), growth=CORNER_IN_SHEAR
        ),
    ),
    "din 743-2": Fits(
        bending=din_fit(
            FormConstants(0.62, 5.8, 0.2, 3),
            DIN_RANGES,
            low_by=((0.01, 0.185), (0.03, 0.12), (0.05, 0.086), (0.1, 0.047), (0.2, 0.024)),
            low_when_cut=((1.0, 0.0), (1.5, 0.09), (2.0, 0.14), (3.0, 0.2), (4.0, 0.24), (5.0, 0.255)),
        ),
        tension=din_fit(
            FormConstants(0.62, 3.5),
            DIN_RANGES,
            low_by=((0.01, 0.261), (0.03, 0.216), (0.05, 0.189), (0.1, 0.149), (0.2, 0.112)),
        ),
        torsion=din_fit(
            FormConstants(3.4, 19.0, 1.0, 2),
            DIN_RANGES,
            low_by=((0.01, 0.093), (0.03, 0.049), (0.05, 0.028), (0.1, 0.01), (0.2, 0.0)),
        ),
    ),
}


LARGEST_RADIUS = 1000.0
"""The largest fillet (mm) that may be entered."""


@dataclass(frozen=True)
class Shoulder:
    """The fillet where the diameter steps at a segment's right-hand face, and what seats there."""

    label: ClassVar[str] = "Shoulder"
    radius: float = quantity("Fillet radius", "length", 0.001, LARGEST_RADIUS, symbol="r")
    finish: str | None = choice(
        "Finish of the fillet", FINISHES, default=None, optional=True, none_words="as the thinner segment"
    )
    bearing_corner: float | None = quantity(
        "Corner of the seated bearing",
        "length",
        0.15,
        9.5,
        default=None,
        symbol="r_s,min",
        optional=True,
        words="Smallest corner dimension of the ring that seats against this shoulder (ISO 582); "
        "it caps the fillet. None where nothing seats.",
    )


def _thin_side(around: Around) -> tuple[float, float, float, str]:
    """(small d, large D, sense, finish): sense is -1 where the thin segment lies to the left."""
    if around.left_diameter <= around.right_diameter:
        return around.left_diameter, around.right_diameter, -1.0, around.left_finish
    return around.right_diameter, around.left_diameter, 1.0, around.right_finish


def _site(shoulder: Shoulder, place: str, around: Around) -> Site:
    d, large, sense, finish = _thin_side(around)
    h = (large - d) / 2
    end = around.x + sense * arc_along(shoulder.radius, h)
    return Site(
        kind="shoulder",
        place=place,
        x=around.x,
        d=d,
        bore=max(around.left_bore, around.right_bore),
        finish=shoulder.finish or finish,
        sizes={"d": d, "D": large, "h": h, "r": shoulder.radius},
        span=(min(end, around.x), max(end, around.x)),
    )


def _outline(shoulder: Shoulder, around: Around) -> Array:
    """Points (x, radius) of the arc, from left to right, foot and top of the step included."""
    d, large, sense, _ = _thin_side(around)
    h, r = (large - d) / 2, shoulder.radius
    turn = np.linspace(0.0, arc_turn(r, h), 17)
    start = around.x + sense * arc_along(r, h)
    x = start - sense * r * np.sin(turn)
    y = d / 2 + r * (1 - np.cos(turn))
    points = np.column_stack([x, y])
    points = np.vstack([points, [around.x, large / 2]])
    return points if sense < 0 else points[::-1]


def _handles(shoulder: Shoulder, around: Around) -> tuple[Handle, ...]:
    d, large, sense, _ = _thin_side(around)
    h, r = (large - d) / 2, shoulder.radius
    turn = arc_turn(r, h) / 2
    x = around.x + sense * (arc_along(r, h) - r * math.sin(turn))
    slant = math.sqrt(0.5)
    return (Handle("radius", x, d / 2 + r * (1 - math.cos(turn)), (sense * slant, slant)),)


def _remark(site: Site) -> str:
    return "arc cut by the step, no seating face" if site.sizes["r"] > site.sizes["h"] else ""


KIND = RaiserKind(
    key="shoulder",
    label="Shoulder",
    record=Shoulder,
    goes="at a step",
    words="A step in diameter; the fillet is its radius.",
    size_symbols=SIZE_SYMBOLS,
    size_labels=SIZE_LABELS,
    derived={"h": ("(D − d)/2", "({D} − {d})/2")},
    site=_site,
    parameters=parameters,
    fits=FITS,
    outline=_outline,
    handles=_handles,
    remark=_remark,
)
