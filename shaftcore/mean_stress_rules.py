"""Factor n by the mean-stress rules, amplitude and mean growing together. Arrays; inf where no stress."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from shaftcore.notches._contract import Array


@dataclass(frozen=True)
class MeanStressRule:
    """A rule: `factor(amplitude, mean, endurance, tensile, yield)` gives n, all MPa; mean >= 0.

    `solved` is the formula solved for n, `numbers` the same as a template with the names of the
    arguments in braces.
    """

    key: str
    label: str
    formula: str
    solved: str
    numbers: str
    source: str
    factor: Callable[[Array, Array, Array, float, float], Array]


def goodman(amplitude: Array, mean: Array, endurance: Array, tensile: float, yielding: float) -> Array:
    """1/n = σa'/Se + σm'/Sut."""
    return _inverse(amplitude / endurance + mean / tensile)


def gerber(amplitude: Array, mean: Array, endurance: Array, tensile: float, yielding: float) -> Array:
    """n σa'/Se + (n σm'/Sut)² = 1, solved for n in the form that stays exact as either stress vanishes."""
    a, b = amplitude / endurance, mean / tensile
    return 2 * _inverse(a + np.sqrt(a**2 + 4 * b**2))


def _inverse(use: Array) -> Array:
    with np.errstate(divide="ignore"):
        return 1 / np.asarray(use, dtype=float)


RULES: dict[str, MeanStressRule] = {
    rule.key: rule
    for rule in (
        MeanStressRule(
            "goodman",
            "Goodman",
            "1/n = σa'/Se + σm'/Sut",
            "1/(σa'/Se + σm'/Sut)",
            "1/({amplitude}/{endurance} + {mean}/{tensile})",
            "goodman",
            goodman,
        ),
        MeanStressRule(
            "gerber",
            "Gerber",
            "n σa'/Se + (n σm'/Sut)² = 1",
            "2/(σa'/Se + √((σa'/Se)² + 4 (σm'/Sut)²))",
            "2/({amplitude}/{endurance} + √(({amplitude}/{endurance})^2 + 4 × ({mean}/{tensile})^2))",
            "gerber",
            gerber,
        ),
    )
}


def yield_factor(greatest: Array, yield_strength: float) -> Array:
    """n_y = Sy/σmax'."""
    return yield_strength * _inverse(greatest)
