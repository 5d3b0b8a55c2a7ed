"""Labels along a line, moved apart so that none covers another, in as many rows as they need."""

import numpy as np

from shaftcore.notches._contract import Array

TAG = 7.5
"""Room (mm) for the mark of a support or load."""


def spread(wanted: Array, gap: float, low: float, high: float) -> Array:
    """Positions (n, sorted as `wanted`) at least `gap` apart, within low..high where there is room, near the wanted.

    The places nearest in the sense of least squares under the gaps: isotonic regression by pooling
    neighbours (pool adjacent violators).
    """
    n = len(wanted)
    if not n:
        return np.empty(0)
    gap = min(gap, (high - low) / max(n - 1, 1))
    offsets = gap * np.arange(n)
    pools: list[tuple[float, int]] = []
    for value in wanted - offsets:
        mean, count = float(value), 1
        while pools and pools[-1][0] > mean:
            before, many = pools.pop()
            mean, count = (before * many + mean * count) / (many + count), many + count
        pools.append((mean, count))
    kept = np.concatenate([np.full(count, mean) for mean, count in pools])
    return np.clip(kept, low, high - offsets[-1]) + offsets


def rows_needed(count: int, gap: float, room: float, most: int) -> int:
    """In how many rows `count` labels of width `gap` stand in `room`."""
    return min(max(int(np.ceil(count * gap / room)), 1), most)
