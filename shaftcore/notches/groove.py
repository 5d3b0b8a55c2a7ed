"""A round-bottomed groove round the shaft: a full arc where it is as deep as its radius or deeper."""

import math
from dataclasses import dataclass
from typing import ClassVar

import numpy as np

from shaftcore.declared import choice, quantity, text
from shaftcore.notches._contract import Around, Array, Fits, Handle, RaiserKind, Site
from shaftcore.notches.arc import DIN_RANGES, SIZE_LABELS, SIZE_SYMBOLS, arc_along, parameters
from shaftcore.notches.chart_polynomial import Chart, ChartFits, Piece
from shaftcore.notches.din_form import FormConstants, din_fit
from shaftcore.surface import FINISHES

BENDING: tuple[Piece, ...] = (
    (0.25, 2.0, ((0.594, 2.958, -0.520), (0.422, -10.545, 2.692), (0.501, 14.375, -4.486), (-0.613, -6.573, 2.177))),
    (2.0, 50.0, ((0.965, 1.926, 0.0), (-2.773, -4.414, -0.017), (4.785, 4.681, 0.096), (-1.995, -2.241, -0.074))),
)
TENSION: tuple[Piece, ...] = (
    (0.1, 2.0, ((0.89, 2.208, -0.094), (-0.923, -6.678, 1.638), (2.893, 6.390, -2.526), (-1.912, -1.944, 1.009))),
    (2.0, 50.0, ((1.037, 1.967, 0.002), (-2.679, -2.980, -0.053), (3.090, 2.124, 0.165), (-0.424, -1.153, -0.106))),
)
TORSION: tuple[Piece, ...] = (
    (0.25, 2.0, ((0.966, 1.056, -0.022), (-0.192, -4.037, 0.674), (0.808, 5.321, -1.231), (-0.567, -2.364, 0.566))),
    (2.0, 50.0, ((1.089, 0.924, 0.018), (-1.504, -2.141, -0.047), (2.486, 2.289, 0.091), (-1.056, -1.104, -0.059))),
)

FITS: dict[str, Fits] = {
    "chart polynomial": ChartFits(
        bending=Chart(BENDING, low_by=((0.02, 0.107), (0.05, 0.081), (0.1, 0.069), (0.2, 0.001))),
        tension=Chart(TENSION, low_by=((0.02, 0.124), (0.05, 0.103), (0.1, 0.089), (0.2, 0.075))),
        torsion=Chart(TORSION, low_by=((0.02, 0.108), (0.05, 0.054), (0.1, 0.023), (0.2, 0.002))),
    ),
    "din 743-2": Fits(
        bending=din_fit(
            FormConstants(0.2, 2.75), DIN_RANGES, low_by=((0.02, 0.094), (0.05, 0.026), (0.1, 0.0), (0.2, 0.0))
        ),
        tension=din_fit(
            FormConstants(0.22, 1.37), DIN_RANGES, low_by=((0.02, 0.117), (0.05, 0.065), (0.1, 0.033), (0.2, 0.014))
        ),
        torsion=din_fit(
            FormConstants(0.7, 10.3), DIN_RANGES, low_by=((0.02, 0.126), (0.05, 0.04), (0.1, 0.0), (0.2, 0.0))
        ),
    ),
}


@dataclass(frozen=True)
class Groove:
    """A round-bottomed groove, its middle at `x`."""

    kind: ClassVar[str] = "groove"
    label: ClassVar[str] = "Round groove"
    id: str = text("Id", longest=40, shortest=1, words="Name of this thing inside the file, unique on the shaft.")
    x: float = quantity("Position", "length", 0.0, 1e8, symbol="x", default=0.0)
    depth: float = quantity("Depth", "length", 0.001, 5000.0, symbol="h", default=1.0)
    radius: float = quantity("Root radius", "length", 0.001, 1000.0, symbol="r", default=1.0)
    finish: str | None = choice(
        "Finish of the groove", FINISHES, default=None, optional=True, none_words="as its segment"
    )


def _site(groove: Groove, place: str, around: Around) -> Site:
    large = min(around.left_diameter, around.right_diameter)
    d = large - 2 * groove.depth
    half = arc_along(groove.radius, groove.depth)
    return Site(
        kind="groove",
        place=place,
        x=around.x,
        d=d,
        bore=max(around.left_bore, around.right_bore),
        finish=groove.finish or around.left_finish,
        sizes={"d": d, "D": large, "h": groove.depth, "r": groove.radius},
        span=(around.x - half, around.x + half),
    )


def _outline(groove: Groove, around: Around) -> Array:
    large, half, r = (
        min(around.left_diameter, around.right_diameter),
        arc_along(groove.radius, groove.depth),
        groove.radius,
    )
    x = half * np.sin(np.linspace(-math.pi / 2, math.pi / 2, 25))
    y = large / 2 - groove.depth + r - np.sqrt(np.maximum(r**2 - x**2, 0.0))
    points = np.column_stack([around.x + x, y])
    ends = np.array([[around.x - half, large / 2], [around.x + half, large / 2]])
    return np.vstack([ends[:1], points, ends[1:]])


def _handles(groove: Groove, around: Around) -> tuple[Handle, ...]:
    large, half = min(around.left_diameter, around.right_diameter), arc_along(groove.radius, groove.depth)
    root = large / 2 - groove.depth
    return (
        Handle("depth", around.x, root, (0.0, -1.0)),
        Handle("radius", around.x + half, large / 2, (1.0, 0.0)),
    )


KIND = RaiserKind(
    key="groove",
    label="Round groove",
    record=Groove,
    goes="on a diameter",
    words="A round-bottomed groove turned into one diameter.",
    size_symbols=SIZE_SYMBOLS,
    size_labels=SIZE_LABELS,
    derived={"d": ("D − 2 h", "{D} − 2 × {h}")},
    site=_site,
    parameters=parameters,
    fits=FITS,
    outline=_outline,
    handles=_handles,
)
