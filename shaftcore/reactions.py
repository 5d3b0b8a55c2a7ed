"""What each support does to the shaft: the numbers of one support, and the same in words."""

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from shaftcore.phrase import Phrase
from shaftcore.results import Results


@dataclass(frozen=True)
class Reaction:
    """Forces of one support on the shaft (N), each as (mean, pulsation); `along` is (0, 0) unless it locates."""

    y: tuple[float, float]
    z: tuple[float, float]
    along: tuple[float, float]

    @property
    def across(self) -> tuple[float, float]:
        """The resultants of both planes."""
        return float(np.hypot(self.y[0], self.z[0])), float(np.hypot(self.y[1], self.z[1]))

    def angle(self, part: int) -> float:
        """Where the resultant points, 0 to 360 degrees: 0 up, 90 towards the viewer."""
        return round(float(np.degrees(np.arctan2(self.z[part], self.y[part]))), 6) % 360.0


def reaction_of(results: Results, id: str) -> Reaction | None:
    """The reaction of the support with this id; None where there is no such support."""
    row = next((i for i, support in enumerate(results.shaft.supports) if support.id == id), None)
    if row is None:
        return None
    y, z = (tuple(results.along.reactions[:, plane, row].tolist()) for plane in (0, 1))
    along = results.along.axial_reaction if results.shaft.supports[row].locating else np.zeros(2)
    return Reaction(y, z, tuple((along + 0.0).tolist()))


def reactions_at(results: Results, station: int) -> Iterator[tuple[str, Reaction]]:
    """Name and reaction of every support that falls into a station."""
    places = (results.stations[station].x, *results.stations[station].also)
    for support in results.shaft.supports:
        found = reaction_of(results, support.id) if support.x in places else None
        if found is not None:
            yield support.name or support.id, found


def reaction_words(reaction: Reaction) -> tuple[Phrase, ...]:
    """One phrase each for the mean, the pulsation and the force along the shaft; what is zero is left out."""
    found = []
    for part, words in enumerate(("Presses on the shaft with", "Pulsation")):
        size = reaction.across[part]
        if size or not part:
            planes = (reaction.y[part], reaction.z[part])
            at = " at {:angle}" if size else ""
            quantities = (size, *([reaction.angle(part)] if size else []), *planes)
            found.append(Phrase(f"{words} {{:force}}{at}: R_y {{:force}}, R_z {{:force}}.", quantities))
    mean, swing = reaction.along
    if mean or swing:
        way = " to the right" if mean > 0 else " to the left" if mean < 0 else ""
        swings = ", pulsation {:force}" if swing else ""
        found.append(Phrase(f"Along the shaft {{:force}}{way}{swings}.", (abs(mean), *([abs(swing)] if swing else []))))
    return tuple(found)
