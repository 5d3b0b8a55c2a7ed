"""q and Kf against printed values and against one another."""

import numpy as np
import pytest

from shaftcore.notch_sensitivity import (
    fatigue_factor,
    material_length,
    neuber_q,
    neuber_root_a,
    peterson_a,
    peterson_q,
    sensitivity,
    sensitivity_steps,
)

KSI = 6.894757


@pytest.mark.parametrize(
    ("sut_ksi", "root_a_root_inch"),
    [(50, 0.130), (60, 0.108), (80, 0.080), (100, 0.062), (120, 0.049), (140, 0.039), (160, 0.031), (200, 0.018)],
)
def test_neuber_constant_against_the_old_table(sut_ksi: float, root_a_root_inch: float) -> None:
    """√a of steels in √in by S_ut: R. Norton, Machine Design, table of Neuber's constant (from memory).

    The table has three decimals and the textbooks' cubic was fitted to it: 4 thousandths of √in.
    """
    found = neuber_root_a(sut_ksi * KSI) / np.sqrt(25.4)
    assert found == pytest.approx(root_a_root_inch, abs=0.004)


@pytest.mark.parametrize("sut", [400.0, 700.0, 1000.0, 1400.0])
@pytest.mark.parametrize("torsion", [False, True])
def test_neuber_cubic_is_the_us_one_in_other_units(sut: float, torsion: bool) -> None:
    """The same fit in ksi and √in (Shigley's textbooks, 9e eq. 6-35, from memory): agreement to their digits."""
    ksi = sut / KSI
    us = (0.190, -2.51e-3, 1.35e-5, -2.67e-8) if torsion else (0.246, -3.08e-3, 1.51e-5, -2.67e-8)
    expected = sum(c * ksi**power for power, c in enumerate(us)) * np.sqrt(25.4)
    assert neuber_root_a(sut, torsion) == pytest.approx(expected, abs=0.012)


def test_neuber_constant_falls_with_strength_and_is_held_outside_its_range() -> None:
    for torsion, high in ((False, 1700.0), (True, 1500.0)):
        a = [neuber_root_a(s, torsion) for s in np.linspace(340, high, 80)]
        assert np.all(np.diff(a) < 0)
        assert a[-1] > 0
        assert neuber_root_a(250.0, torsion) == a[0]
        assert neuber_root_a(2900.0, torsion) == a[-1]


def test_printed_sensitivities() -> None:
    """9e Ex. 6-6: S_ut 690 MPa, r 3 mm gives q 0.84 and q_s 0.88 off the chart (from memory), read to 0.01."""
    assert neuber_q(3.0, 690.0) == pytest.approx(0.84, abs=0.011)
    assert neuber_q(3.0, 690.0, torsion=True) == pytest.approx(0.88, abs=0.011)


def test_peterson_constant_at_its_reference() -> None:
    """a = 0.0254 mm (0.001 in) at S_ut 2070 MPa (300 ksi); about 0.01 in at 85 ksi (R. E. Peterson, from memory)."""
    assert peterson_a(2070.0) == pytest.approx(0.0254, rel=1e-12)
    assert peterson_a(85 * KSI) / 25.4 == pytest.approx(0.0097, abs=2e-4)
    assert peterson_a(650.0, torsion=True) == pytest.approx(0.6 * peterson_a(650.0))


def test_q_is_one_half_at_its_own_length() -> None:
    for rule in ("neuber", "peterson"):
        for torsion in (False, True):
            a = material_length(rule, 600.0, torsion)
            assert sensitivity(rule, a, 600.0, torsion) == pytest.approx(0.5)


def test_rules_tend_to_one_and_to_zero() -> None:
    for q in (neuber_q, peterson_q):
        assert q(1e9, 600.0) == pytest.approx(1.0, abs=1e-4)
        assert q(1e-12, 600.0) == pytest.approx(0.0, abs=1e-5)


def test_rules_agree_on_common_fillets() -> None:
    """Neuber and Peterson, both fitted to notched-bar tests, differ by up to 0.14 for 400 to 1400 MPa, r 1 to 4 mm."""
    for sut in (400.0, 700.0, 1000.0, 1400.0):
        r = np.linspace(1.0, 4.0, 13)
        assert np.abs(neuber_q(r, sut) - peterson_q(r, sut)).max() < 0.14


def test_fatigue_factor() -> None:
    """R. Budynas, K. Nisbett 9e Ex. 7-2: Kt 4.3, q 0.65 gives 3.15 (printed rounded)."""
    assert fatigue_factor(4.3, 0.65) == pytest.approx(3.15, abs=0.006)
    assert fatigue_factor(2.5, 0.0) == 1.0
    assert fatigue_factor(2.5, 1.0) == 2.5


@pytest.mark.parametrize("rule", ["neuber", "peterson"])
@pytest.mark.parametrize("torsion", [False, True])
def test_steps_end_in_q(rule: str, torsion: bool) -> None:
    assert sensitivity_steps(rule, 1.3, 900.0, torsion, "q")[-1].value == sensitivity(rule, 1.3, 900.0, torsion)
