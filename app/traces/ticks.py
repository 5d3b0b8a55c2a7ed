"""Round numbers for the axes, and how they are written."""

import numpy as np
from matplotlib.ticker import MaxNLocator

from app.traces.limits import Scale
from shaftcore.notches._contract import Array
from shaftcore.number_text import shown

LEAST_APART = 17.0
"""Pixels between two numbers of a vertical axis."""
LEAST_OF_TWO = 12.0
"""The same where there would be one number only."""
FINER = 4
"""Numbers of steps that are tried for two that can be read."""
UNDER_HEAD = 5.0
"""Pixels below the upper end that stay free of numbers, since the track's head stands above."""


def inner_ticks(limits: tuple[float, float], most: int) -> Array:
    """Round numbers inside the limits."""
    ticks = np.asarray(MaxNLocator(nbins=most, steps=[1, 2, 2.5, 5, 10]).tick_values(*limits))
    inside = ticks[(ticks >= limits[0]) & (ticks <= limits[1])]
    return np.where(np.abs(inside) < 1e-9 * max(map(abs, limits)), 0.0, inside)


def value_ticks(scale: Scale, height: float, apart: float = LEAST_APART) -> Array:
    """Round numbers of a vertical axis of that many pixels; a capped one is numbered at its end too."""
    most = max(1, int(height / apart))
    if scale.cap is not None:
        ticks = inner_ticks(scale.limits, most)
        step = ticks[1] - ticks[0] if len(ticks) > 1 else scale.cap
        return np.append(ticks[ticks < scale.cap - 0.4 * step], scale.cap)
    low, high = scale.limits
    top = high - (high - low) * UNDER_HEAD / height
    choices = [found[found <= top] for found in (inner_ticks((low, high), most + more) for more in range(FINER))]
    least = LEAST_OF_TWO * (high - low) / height
    # one number alone gives no scale
    return next((ticks for ticks in choices if len(ticks) > 1 and np.diff(ticks).min() >= least), choices[0])


def labels(ticks: Array, cap: float | None = None) -> list[str]:
    """Numbers with no more decimals than their step needs; the end of a capped axis says what it is."""
    step = float(np.diff(ticks).min()) if len(ticks) > 1 else abs(float(ticks[0])) if len(ticks) else 1.0
    decimals = max(0, -int(np.floor(np.log10(step) + 1e-9))) if step > 0 else 0
    if step > 0 and abs(step * 10**decimals - round(step * 10**decimals)) > 1e-6:
        decimals += 1
    words = [shown(float(tick), "ratio", "SI", decimals) for tick in ticks]
    return [
        f"over {text}" if cap is not None and tick == cap else text for tick, text in zip(ticks, words, strict=True)
    ]
