"""Round sections against numerical integration and published limits."""

import numpy as np
import pytest

from shaftcore.section_properties import area, bending_modulus, second_moment, shear_coefficient, torsion_modulus

SECTIONS = pytest.mark.parametrize(("d", "bore"), [(40.0, 0.0), (40.0, 25.0), (120.0, 118.0)])


def _integral(d: float, bore: float, power: int) -> float:
    """Sum of 2 pi rho^power over the ring, by Gauss points: exact for these powers."""
    x, w = np.polynomial.legendre.leggauss(6)
    rho = (d + bore) / 4 + (d - bore) / 4 * x
    return float(np.sum(w * 2 * np.pi * rho**power) * (d - bore) / 4)


@SECTIONS
def test_area_and_moments_by_integration(d: float, bore: float) -> None:
    polar = _integral(d, bore, 3)
    assert area(d, bore) == pytest.approx(_integral(d, bore, 1))  # type: ignore[arg-type]
    assert second_moment(d, bore) == pytest.approx(polar / 2)  # type: ignore[arg-type]
    assert bending_modulus(d, bore) == pytest.approx(polar / 2 / (d / 2))  # type: ignore[arg-type]
    assert torsion_modulus(d, bore) == pytest.approx(polar / (d / 2))  # type: ignore[arg-type]


def test_published_moduli() -> None:
    """9e Ex. 6-9: I/c of a 32 mm round is 3.217e3 mm³, four digits printed."""
    assert bending_modulus(np.array(32.0), np.array(0.0)) == pytest.approx(3217.0, abs=0.5)


def test_shear_coefficient_limits() -> None:
    """G. R. Cowper 1966: 6(1+ν)/(7+6ν) solid, 2(1+ν)/(4+3ν) for the thin tube; 0.886 and 0.531 at ν 0.3."""
    solid, tube = shear_coefficient(np.array(50.0), np.array([0.0, 49.9999]), 0.3)
    assert solid == pytest.approx(0.886, abs=5e-4)
    assert tube == pytest.approx(2 * 1.3 / (4 + 0.9), abs=1e-5)
    assert tube == pytest.approx(0.531, abs=5e-4)
