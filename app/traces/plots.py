"""What is to be drawn, and what has been: no drawing here, so nothing heavy is imported."""

from dataclasses import dataclass

from PySide6.QtGui import QPixmap

from app.theme import Theme
from app.traces.bands import Band
from app.traces.limits import Scale
from app.traces.tracks import Curve, Track
from shaftcore.units import System

MARK_SIZE = 5.0
"""Pixels across the mark of a station."""


@dataclass(frozen=True)
class View:
    """Size in logical pixels, device pixels a logical one, the stretch of shaft in mm, looks, units."""

    width: float
    height: float
    ratio: float
    begin: float
    end: float
    theme: Theme
    system: System


@dataclass(frozen=True)
class Plot:
    """One track as it is to be drawn."""

    track: Track
    band: Band
    curves: tuple[Curve, ...]
    scales: tuple[Scale, ...]

    def scale_of(self, curve: Curve) -> int:
        return next(i for i, scale in enumerate(self.scales) if scale.dimension == curve.line.dimension)


@dataclass(frozen=True)
class Mapping:
    """From mm and a vertical unit to logical pixels, as the axes do it: px = x0 + x·kx, py = y0 + y·ky."""

    x0: float
    kx: float
    y0: float
    ky: float


@dataclass(frozen=True)
class Frame:
    """What was drawn: both pictures, and for every track the mapping of each of its scales.

    `second` has, for every track, the height (pixels) and words of the numbers of its second scale.
    """

    view: View
    plots: tuple[Plot, ...]
    bare: QPixmap
    full: QPixmap
    mappings: tuple[tuple[Mapping, ...], ...]
    second: tuple[tuple[tuple[float, str], ...], ...]
