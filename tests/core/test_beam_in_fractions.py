"""Reactions against the same beam solved in exact fractions: supports close together, soft beside rigid, off line.

The plain beam on its supports has a closed form (Macaulay's brackets, shear included), so exact
arithmetic gives the reactions without any loss of digits, however near the supports stand.
"""

from fractions import Fraction

import numpy as np
import pytest

from shaftcore.beam_loads import Bed, Flexure, PointLoads, borne
from shaftcore.geometry import profile_of
from shaftcore.section_properties import area, second_moment, shear_coefficient
from shaftcore.shaft import Segment, Shaft

LENGTH, D = 1000.0, 40.0
BEDS = {
    "spread": (0.0, 170.0, 430.0, 800.0, 1000.0),
    "pairs": (100.0, 100.1, 500.0, 500.1, 900.0, 900.1),
    "all in one corner": (300.0, 300.1, 300.2, 300.3),
    "two": (250.0, 251.0),
}
SHAFT = Shaft(segments=(Segment("s", LENGTH, D),))


def solved(matrix: list[list[Fraction]], right: list[Fraction]) -> list[Fraction]:
    """Gauss elimination without rounding."""
    rows = [[*row, value] for row, value in zip(matrix, right, strict=True)]
    for i in range(len(rows)):
        pivot = next(r for r in range(i, len(rows)) if rows[r][i])
        rows[i], rows[pivot] = rows[pivot], rows[i]
        rows[i] = [value / rows[i][i] for value in rows[i]]
        for r in range(len(rows)):
            if r != i:
                rows[r] = [a - rows[r][i] * b for a, b in zip(rows[r], rows[i], strict=True)]
    return [row[-1] for row in rows]


def bending_and_shearing() -> tuple[Fraction, Fraction]:
    """1/EI and 1/kGA of the beam, as the floats they are."""
    modulus, nu = SHAFT.material.elastic_modulus, SHAFT.material.poisson_ratio
    d, solid = np.array(D), np.array(0.0)
    stiff = modulus / (2 + 2 * nu) * area(d, solid) * shear_coefficient(d, solid, nu)
    return Fraction(float(1 / (modulus * second_moment(d, solid)))), Fraction(float(1 / stiff))


def exact(x: list[float], stiffness: list[float], offset: list[float], loads: list[tuple[float, float]]) -> list[float]:
    bending, shearing = bending_and_shearing()

    def bent(at: float, by: float) -> Fraction:
        arm = max(Fraction(at) - Fraction(by), Fraction(0))
        return arm**3 / 6 * bending - arm * shearing

    rows, right = [], []
    for i, place in enumerate(x):
        yielding = [1 / Fraction(stiffness[i]) if j == i and np.isfinite(stiffness[i]) else 0 for j in range(len(x))]
        rows.append([bent(place, other) + give for other, give in zip(x, yielding, strict=True)] + [1, Fraction(place)])
        right.append(Fraction(offset[i]) - sum(bent(place, at) * Fraction(force) for at, force in loads))
    rows += [[*[Fraction(1)] * len(x), 0, 0], [*map(Fraction, x), 0, 0]]
    right += [-sum(Fraction(force) for _, force in loads), -sum(Fraction(at) * Fraction(force) for at, force in loads)]
    return [float(value) for value in solved(rows, right)[: len(x)]]


@pytest.mark.parametrize("places", BEDS.values(), ids=BEDS)
@pytest.mark.parametrize("seed", range(8))
def test_reactions_are_those_of_exact_arithmetic(places: tuple[float, ...], seed: int):
    rng = np.random.default_rng(seed)
    x = rng.permutation(places)
    soft = 10.0 ** rng.uniform(0, 9, len(x))
    stiffness = np.where(rng.random(len(x)) < (seed % 3) / 2, soft, np.inf)
    offset = np.where(rng.random(len(x)) < 0.4, rng.uniform(-0.1, 0.1, len(x)), 0.0)
    at, force = rng.uniform(0, LENGTH, 3), rng.uniform(-2e3, 2e3, 3)
    flexure = Flexure(SHAFT, profile_of(SHAFT), np.unique([0.0, LENGTH, *x, *at, *np.linspace(0, LENGTH, 201)]))
    steady = np.zeros((2, 2, len(x)))
    steady[0, 0] = offset
    loads = PointLoads(at, np.broadcast_to(force, (2, 2, 3)))
    found = borne(flexure, loads, Bed(x, stiffness, steady))[0]
    for mine, seat in ((found[0, 0], offset), (found[1, 1], 0 * offset)):
        due = np.array(exact(x.tolist(), stiffness.tolist(), seat.tolist(), list(zip(at, force, strict=True))))
        np.testing.assert_allclose(mine, due, atol=1e-7 * np.abs(due).max())
        assert abs(mine.sum() + force.sum()) <= 1e-13 * (np.abs(due).sum() + np.abs(force).sum())
