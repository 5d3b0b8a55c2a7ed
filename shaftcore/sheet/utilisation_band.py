"""How far the shaft is used along x: the plain section everywhere, each raiser over its own stretch."""

from typing import Any

import matplotlib
import numpy as np

from shaftcore.geometry import faces_of
from shaftcore.notches._contract import Array
from shaftcore.outline import upper_outline
from shaftcore.results import Results

FULL = 1.25
"""Utilisation at the end of the colour scale; more looks the same."""

FINENESS = 12
"""Stretches shorter than this part of `least` are not told apart, ends of raisers and faces always."""


def band_stretches(results: Results, least: float) -> tuple[Array, Array]:
    """Edges x (n + 1, mm) and the utilisation (n) between them.

    Raisers take their span, at least `least` mm of it about their place; where stretches meet,
    the larger utilisation counts.
    """
    spans, uses = _raiser_spans(results, least)
    between = np.concatenate([results.along.x, upper_outline(results.shaft)[:, 0]])
    seen = np.unique(np.floor(between * FINENESS / least), return_index=True)[1]
    edges = np.concatenate([between[seen], faces_of(results.shaft), spans.ravel()])
    edges = np.unique(np.clip(edges, 0.0, results.shaft.length))
    middle = (edges[1:] + edges[:-1]) / 2
    use = np.interp(middle, results.along.x, results.judged_along.utilisation)
    for (begin, end), value in zip(spans, uses, strict=True):
        inside = (middle >= begin) & (middle <= end)
        use[inside] = np.maximum(use[inside], value)
    return edges, use


def _raiser_spans(results: Results, least: float) -> tuple[Array, list[float]]:
    spans, uses = [], []
    for i, station in enumerate(results.stations):
        begin, end = station.site.span if station.site is not None else (station.x, station.x)
        if end - begin < least:
            middle = (begin + end) / 2
            begin, end = middle - least / 2, middle + least / 2
        spans.append((begin, end))
        uses.append(float(results.judged.utilisation[i]))
    return np.array(spans).reshape(-1, 2), uses


def colours(use: Array) -> Any:
    """One even, colour-blind-safe scale: RGBA (n, 4)."""
    return matplotlib.colormaps["cividis"](np.clip(use / FULL, 0.0, 1.0))
