"""n by every mean-stress rule: published values, limit cases, and laws that hold for the whole family."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from shaftcore.mean_stress_rules import RULES, MeanStressRule, gerber, goodman, yield_factor

EVERY_RULE = pytest.mark.parametrize("rule", list(RULES.values()), ids=list(RULES))
STRESS = st.floats(1e-3, 1500.0)


def test_published_factors() -> None:
    """9e Ex. 7-1: σa' 15235, σm' 9988 psi, Se 29.3, Sut 105, Sy 82 kpsi: Goodman 1.63, Gerber 1.87.

    The source solves Gerber for the diameter with rounded sums on the way; its inputs give 1.863.
    """
    amplitude, mean, endurance = np.array(15235.0), np.array(9988.0), np.array(29.3e3)
    assert goodman(amplitude, mean, endurance, 105e3, 82e3) == pytest.approx(1.63, abs=5e-3)
    assert gerber(amplitude, mean, endurance, 105e3, 82e3) == pytest.approx(1.87, abs=8e-3)


@EVERY_RULE
@given(amplitude=STRESS, mean=STRESS, endurance=st.floats(50, 700))
def test_the_factor_satisfies_its_own_line(
    rule: MeanStressRule, amplitude: float, mean: float, endurance: float
) -> None:
    """n times both stresses lies on the published curve, written here once more in its implicit form."""
    tensile = 900.0
    n = float(rule.factor(np.array(amplitude), np.array(mean), np.array(endurance), tensile, 600.0))
    a, m = n * amplitude / endurance, n * mean / tensile
    curves = {"goodman": a + m, "gerber": a + m**2}
    assert curves[rule.key] == pytest.approx(1.0, rel=1e-9)


@EVERY_RULE
@given(amplitude=STRESS, mean=STRESS, scale=st.floats(1.01, 5.0))
def test_heavier_loads_never_raise_n(rule: MeanStressRule, amplitude: float, mean: float, scale: float) -> None:
    light = float(rule.factor(np.array(amplitude), np.array(mean), np.array(250.0), 900.0, 600.0))
    heavy = float(rule.factor(np.array(scale * amplitude), np.array(scale * mean), np.array(250.0), 900.0, 600.0))
    assert heavy == pytest.approx(light / scale, rel=1e-9)


@EVERY_RULE
def test_limit_cases(rule: MeanStressRule) -> None:
    """Amplitude alone is held against Se, mean alone against Sut, nothing against nothing."""
    amplitude, mean = np.array([100.0, 0.0, 0.0]), np.array([0.0, 300.0, 0.0])
    n = rule.factor(amplitude, mean, np.full(3, 250.0), 900.0, 600.0)
    assert n[:2] == pytest.approx([2.5, 3.0])
    assert np.isinf(n[2])


@given(amplitude=STRESS, mean=STRESS)
def test_the_straight_line_lies_inside_the_parabola(amplitude: float, mean: float) -> None:
    """Goodman is the careful one of the two wherever neither part alone exceeds its strength at n."""
    args = (np.array(amplitude), np.array(mean), np.array(250.0), 900.0, 600.0)
    assert float(goodman(*args)) <= float(gerber(*args)) * (1 + 1e-12)


def test_yield() -> None:
    """9e Ex. 7-1: n_y 4.50 from Sy 82 kpsi and the greatest stress 18.22 kpsi."""
    assert yield_factor(np.array(18.22), 82.0) == pytest.approx(4.50, abs=5e-3)
    assert np.isinf(yield_factor(np.array(0.0), 82.0))
