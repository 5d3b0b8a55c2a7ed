"""How the stresses of a section are joined, against the mechanics they stand for."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from shaftcore.equivalent_stress import (
    Fatigue,
    Nominal,
    axial_alone,
    equivalent_amplitude,
    equivalent_mean,
    greatest_stress,
    torsion_alternates,
)
from shaftcore.notches._contract import Array

ONE = Fatigue(np.array(1.0), np.array(1.0), np.array(1.0))
NOTHING = Nominal(*(np.array(0.0) for _ in range(6)))


def stresses(**given_stresses: float) -> Nominal:
    return replace(NOTHING, **{name: np.array(value) for name, value in given_stresses.items()})


def von_mises(normal: float, shear: float) -> float:
    """Distortion energy of a surface point from the full stress tensor, by its deviator."""
    tensor = np.array([[normal, shear, 0.0], [shear, 0.0, 0.0], [0.0, 0.0, 0.0]])
    deviator = tensor - np.eye(3) * np.trace(tensor) / 3
    return float(np.sqrt(1.5 * np.sum(deviator**2)))


def test_plain_stresses_give_the_distortion_energy() -> None:
    s = stresses(bending_amplitude=80.0, torsion_amplitude=30.0, bending_mean=50.0, axial_mean=20.0, torsion_mean=45.0)
    assert equivalent_amplitude(s, ONE) == pytest.approx(von_mises(80.0, 30.0))
    assert equivalent_mean(s, ONE) == pytest.approx(von_mises(70.0, 45.0))
    assert greatest_stress(s, ONE) == pytest.approx(von_mises(150.0, 75.0))


def test_each_factor_goes_with_its_own_load() -> None:
    k = Fatigue(np.array(2.0), np.array(3.0), np.array(1.5))
    s = stresses(
        bending_amplitude=10.0, axial_amplitude=17.0, torsion_amplitude=4.0,
        bending_mean=5.0, axial_mean=7.0, torsion_mean=6.0,
    )  # fmt: skip
    assert equivalent_amplitude(s, k) == pytest.approx(von_mises(2 * 10 + 3 * 17 / 0.85, 1.5 * 4))
    assert equivalent_mean(s, k) == pytest.approx(von_mises(2 * 5 + 3 * 7, 1.5 * 6))
    assert equivalent_mean(s, k, notch_on_steady_torque=False) == pytest.approx(von_mises(2 * 5 + 3 * 7, 6))
    assert greatest_stress(s, k) == pytest.approx(von_mises(2 * 15 + 3 * 24, 1.5 * 10))
    assert greatest_stress(s, k, notched=False) == pytest.approx(von_mises(15 + 24, 10))


def test_published_example_of_both_parts() -> None:
    """9e Ex. 7-1: M 1260 lbf·in reversed, T 1100 lbf·in steady, d 1.1 in, Kf 1.58, Kfs 1.37: 15235 and 9988 psi."""
    bending, torsion = 32 * 1260 / (np.pi * 1.1**3), 16 * 1100 / (np.pi * 1.1**3)
    k = Fatigue(np.array(1.58), np.array(1.0), np.array(1.37))
    s = stresses(bending_amplitude=bending, torsion_mean=torsion)
    assert equivalent_amplitude(s, k) == pytest.approx(15235, abs=1)
    assert equivalent_mean(s, k) == pytest.approx(9988, abs=1)


def test_compressive_mean_counts_as_none() -> None:
    """Common practice: compression is not credited; tension left beside it and torsion still count."""
    assert equivalent_mean(stresses(axial_mean=-40.0), ONE) == 0.0
    assert equivalent_mean(stresses(axial_mean=-40.0, torsion_mean=10.0), ONE) == pytest.approx(von_mises(0.0, 10.0))
    assert equivalent_mean(stresses(axial_mean=-40.0, bending_mean=60.0), ONE) == pytest.approx(20.0)


def test_compression_relieves_by_its_nominal_size_only() -> None:
    k = Fatigue(np.array(2.0), np.array(3.0), np.array(1.5))
    assert equivalent_mean(stresses(axial_mean=-40.0, bending_mean=60.0), k) == pytest.approx(2 * 60 - 40)
    assert equivalent_mean(stresses(axial_mean=40.0, bending_mean=60.0), k) == pytest.approx(2 * 60 + 3 * 40)


def test_yield_looks_at_the_side_that_is_worse() -> None:
    """Under compression the greatest stress is on the pressed side of the bend: sizes add."""
    assert greatest_stress(stresses(axial_mean=-40.0, bending_mean=60.0), ONE) == pytest.approx(100.0)


@given(
    st.lists(st.floats(0.0, 400.0), min_size=6, max_size=6),
    st.lists(st.floats(1.0, 5.0), min_size=3, max_size=3),
    st.floats(1.0, 4.0),
)
def test_scaling_and_size(parts: list[float], factors: list[float], scale: float) -> None:
    s, k = Nominal(*map(np.array, parts)), Fatigue(*map(np.array, factors))
    larger = Nominal(*(np.array(scale * part) for part in parts))
    for join in (equivalent_amplitude, equivalent_mean, greatest_stress):
        assert join(larger, k) == pytest.approx(scale * float(join(s, k)), rel=1e-9, abs=1e-12)
        assert join(s, k) >= join(s, ONE) - 1e-9
    assert greatest_stress(s, k) <= equivalent_amplitude(s, k) + equivalent_mean(s, k) + 1e-9


def _row(**columns: list[float]) -> Nominal:
    none: Array = np.zeros(len(next(iter(columns.values()))))
    return Nominal(*(np.array(columns.get(name, none)) for name in (
        "bending_amplitude", "bending_mean", "axial_amplitude", "axial_mean", "torsion_amplitude", "torsion_mean",
    )))  # fmt: skip


def test_what_alternates_is_told_apart_from_rounding() -> None:
    s = _row(axial_amplitude=[10.0, 10.0, 10.0, 0.0], bending_amplitude=[0.0, 1e-12, 1.0, 0.0])
    assert axial_alone(s).tolist() == [True, True, False, False]
    s = _row(bending_amplitude=[10.0, 10.0, 10.0], torsion_amplitude=[0.0, 1e-12, 1e-3])
    assert torsion_alternates(s).tolist() == [False, False, True]
