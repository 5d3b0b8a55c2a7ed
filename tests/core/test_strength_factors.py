"""Marin factors against printed values of the textbooks."""

import math

import numpy as np
import pytest

from shaftcore.strength_factors import (
    FINISH_TABLES,
    finish_factors,
    in_fahrenheit,
    plain_endurance,
    reliability_factor,
    reliability_quantile,
    size_diameter,
    size_factor,
    temperature_factor,
)
from shaftcore.surface import FINISHES

KSI = 6.894757
COLUMN = {name: index for index, (name, _) in enumerate(FINISHES)}


@pytest.mark.parametrize(("finish", "ka"), [("machined", 0.860), ("as-forged", 0.540), ("ground", 0.929)])
def test_finish_factor_of_the_older_table(finish: str, ka: float) -> None:
    """R. Budynas, K. Nisbett 9e Ex. 6-3 and beside it: S_ut 520 MPa, three decimals printed."""
    assert finish_factors("older", 520.0)[COLUMN[finish]] == pytest.approx(ka, abs=6e-4)


@pytest.mark.parametrize(
    ("table", "finish", "ksi"),
    [
        ("older", "ground", (1.34, -0.085)),
        ("older", "machined", (2.70, -0.265)),
        ("older", "hot-rolled", (14.4, -0.718)),
        ("older", "as-forged", (39.9, -0.995)),
        ("newer", "ground", (1.21, -0.067)),
        ("newer", "machined", (2.00, -0.217)),
        ("newer", "hot-rolled", (11.0, -0.650)),
        ("newer", "as-forged", (12.7, -0.758)),
    ],
)
def test_finish_factors_are_the_us_ones_in_other_units(table: str, finish: str, ksi: tuple[float, float]) -> None:
    """The same tables in ksi (9e table 6-2, 11e table 6-2; from memory); constants rounded to three digits."""
    factor, power = FINISH_TABLES[table][finish]
    assert power == ksi[1]
    assert factor == pytest.approx(ksi[0] * KSI**-power, rel=6e-3)


def test_finish_factor_never_helps() -> None:
    assert finish_factors("older", 200.0).max() == 1.0
    for table in FINISH_TABLES:
        assert np.all(np.diff([finish_factors(table, s) for s in (300.0, 600.0, 1200.0)], axis=0) <= 0)


@pytest.mark.parametrize(
    ("d", "turning", "kb"),
    [
        (32.0, True, 0.858),
        (27.94, True, 0.870),
        (50.0, True, 0.816),
        (100.0, True, 0.733),
    ],
)
def test_size_factor(d: float, turning: bool, kb: float) -> None:
    """(d/7.62)^-0.107 and 1.51 d^-0.157: 9e Ex. 6-9 and 7-1 print 0.858 and 0.870; the rest worked by hand."""
    assert size_factor(size_diameter(d, turning)) == pytest.approx(kb, abs=3e-3)


def test_size_factor_of_a_standing_bar() -> None:
    """9e Ex. 6-4: 32 mm bar, turning 0.86, not turning (0.37 d = 11.84 mm) 0.95; two decimals printed."""
    assert size_factor(size_diameter(32.0, turning=True)) == pytest.approx(0.86, abs=6e-3)
    assert size_diameter(32.0, turning=False) == pytest.approx(11.84)
    assert size_factor(size_diameter(32.0, turning=False)) == pytest.approx(0.95, abs=6e-3)


def test_standing_share_is_the_area_rule() -> None:
    """0.37 is where the area stressed above 95 % equals that of a turning bar: 0.01046 d² = 0.0766 d_e²."""
    half_angle = math.acos(0.95)
    segments = 2 * (half_angle - math.sin(half_angle) * math.cos(half_angle)) / 4
    ring = math.pi / 4 * (1 - 0.95**2)
    assert float(size_diameter(1.0, turning=False)) == pytest.approx(math.sqrt(segments / ring), abs=2e-3)


def test_alternating_torsion_takes_the_whole_diameter_of_a_standing_shaft() -> None:
    assert size_diameter([40.0, 40.0], False, [True, False]).tolist() == pytest.approx([40.0, 14.8])


def test_size_factor_at_its_ends() -> None:
    """No gain below 7.6 mm (R. Norton: 1 up to 8 mm), 1 under axial load alone, 0.6 for very thick (R. Norton)."""
    assert size_factor(2.0) == 1.0
    assert size_factor(7.0) == 1.0
    assert size_factor(9.0) < 1.0
    assert size_factor([80.0, 80.0], [True, False]).tolist() == pytest.approx([1.0, 1.51 * 80**-0.157])
    assert size_factor(360.0) == pytest.approx(0.6, abs=2e-3)
    assert np.all(np.diff(size_factor(np.linspace(8.0, 1000.0, 400))) < 0), "rises nowhere, 51 and 254 mm included"


@pytest.mark.parametrize(
    ("celsius", "kd"), [(20, 1.0), (100, 1.02), (200, 1.02), (300, 0.975), (400, 0.9), (500, 0.768)]
)
def test_temperature_factor(celsius: float, kd: float) -> None:
    """Table of strength ratios beside the fit (9e table 6-4); the fit is within 0.6 % of the table."""
    assert temperature_factor(celsius) == pytest.approx(kd, abs=6e-3)


def test_temperature_factor_at_its_ends() -> None:
    assert temperature_factor(-40.0) == 1.0
    assert temperature_factor(538.0) == pytest.approx(temperature_factor(537.7), abs=2e-3)
    assert in_fahrenheit(100.0) == pytest.approx(212.0)


@pytest.mark.parametrize(
    ("reliability", "ke"),
    [(0.5, 1.0), (0.9, 0.897), (0.95, 0.868), (0.99, 0.814), (0.999, 0.753), (0.9999, 0.702)],
)
def test_reliability_factor(reliability: float, ke: float) -> None:
    """9e table 6-5, three decimals printed (its z at 90 % is a slip, its factor is not)."""
    assert reliability_factor(reliability) == pytest.approx(ke, abs=7e-4)


def test_normal_quantile() -> None:
    """Any table of the normal distribution: 1.6449 at 95 %, 2.3263 at 99 %."""
    assert reliability_quantile(0.95) == pytest.approx(1.6449, abs=5e-5)
    assert reliability_quantile(0.99) == pytest.approx(2.3263, abs=5e-5)


def test_plain_endurance() -> None:
    """Half the tensile strength, 700 MPa from 1400 on (9e eq. 6-8)."""
    assert plain_endurance(690.0) == 345.0
    assert plain_endurance(1400.0) == 700.0
    assert plain_endurance(2200.0) == 700.0
