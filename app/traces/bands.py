"""How the tracks share the height of the widget."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

HEAD = 20.0
"""Pixels over each plot for its name and its key."""
FOOT = 20.0
"""Pixels under the last plot for the numbers of the x axis."""
GAP = 5.0
LEAST_PLOT = 30.0
GRIP = 4.0
"""A border can be taken hold of within this many pixels."""


@dataclass(frozen=True)
class Band:
    """Where one track stands: its head from `top`, its plot from `plot_top` to `plot_bottom`, pixels."""

    key: str
    top: float
    plot_top: float
    plot_bottom: float

    @property
    def height(self) -> float:
        return self.plot_bottom - self.plot_top


def bands_of(keys: Sequence[str], weights: Mapping[str, float], height: float) -> tuple[Band, ...]:
    """The tracks one under the other; plots share what heads and foot leave, by their weights."""
    room = max(height - FOOT - len(keys) * (HEAD + GAP), LEAST_PLOT * len(keys))
    spare = room - LEAST_PLOT * len(keys)
    total = sum(weights.get(key, 1.0) for key in keys)
    found, top = [], 0.0
    for key in keys:
        plot_top = round(top + HEAD)
        bottom = round(plot_top + LEAST_PLOT + spare * weights.get(key, 1.0) / total)
        found.append(Band(key, top, plot_top, bottom))
        top = bottom + GAP
    return tuple(found)


def least_height(count: int) -> int:
    return int(FOOT + count * (HEAD + GAP + LEAST_PLOT))


def border_at(bands: Sequence[Band], y: float) -> int | None:
    """Index of the track whose upper border lies at y; the first has none."""
    return next((i for i, band in enumerate(bands) if i and abs(y - (band.top - GAP / 2)) <= GRIP), None)


def with_border_moved(bands: Sequence[Band], index: int, by: float) -> dict[str, float]:
    """New weights after the upper border of track `index` has been moved down by pixels."""
    spare = {band.key: max(band.height - LEAST_PLOT, 0.0) for band in bands}
    above, below = bands[index - 1].key, bands[index].key
    by = min(max(by, -spare[above]), spare[below])
    spare[above], spare[below] = spare[above] + by, spare[below] - by
    total = sum(spare.values()) or 1.0
    return {key: max(value / total * len(bands), 1e-6) for key, value in spare.items()}
