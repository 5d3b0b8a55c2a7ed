"""Preferred sizes against the standards' own rules, and how a pulled number comes to rest on them."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from shaftcore.declared import Quantity, declared
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.preferred import (
    BEARING_BORES,
    FIRST_RADII,
    R5,
    R10,
    R20,
    R40,
    RADII,
    finely,
    round_step,
    rounded,
    snapped,
    sort_of,
    stepped,
)
from shaftcore.shaft import RadialForce, Segment, Support
from shaftcore.units import INCH


@pytest.mark.parametrize(("series", "steps"), [(R5, 5), (R10, 10), (R20, 20), (R40, 40)])
def test_series_lie_where_iso_3_allows(series: tuple[float, ...], steps: int) -> None:
    """ISO 3: preferred numbers depart from 10^(i/n) by -1.01 % to +1.26 %, as rounded there."""
    assert len(series) == steps
    for index, number in enumerate(series):
        assert -0.01015 <= number / 10 ** (index / steps) - 1 <= 0.01265


def test_r10_and_r20_as_the_handbooks_of_the_trade_print_them() -> None:
    assert R10 == (1, 1.25, 1.6, 2, 2.5, 3.15, 4, 5, 6.3, 8)
    assert set(R20) - set(R10) == {1.12, 1.4, 1.8, 2.24, 2.8, 3.55, 4.5, 5.6, 7.1, 9}


def test_bores_from_20_to_480_are_five_times_a_whole_number() -> None:
    """ISO 15: from 20 to 480 mm the bore is five times the bore code."""
    assert all(bore % 5 == 0 for bore in BEARING_BORES if 20 <= bore <= 480)
    assert {10, 12, 15, 17, 20, 25, 110, 120, 200, 220} <= set(BEARING_BORES)


def test_radii_first_choice_is_within_all_and_rises() -> None:
    """First choice of DIN 250 (from memory) up to 25 mm."""
    assert FIRST_RADII[:11] == (0.2, 0.4, 0.6, 1, 1.6, 2.5, 4, 6, 10, 16, 25)
    assert list(RADII) == sorted(set(RADII))


@pytest.mark.parametrize(
    ("record", "name", "sort"),
    [
        (Shoulder, "radius", "radius"),
        (Shoulder, "bearing_corner", "corner"),
        (Groove, "radius", "radius"),
        (Groove, "depth", "length"),
        (Segment, "diameter", "diameter"),
        (Segment, "end_diameter", "diameter"),
        (Segment, "bore", "diameter"),
        (Segment, "length", "length"),
        (Support, "x", "place"),
        (RadialForce, "force", "number"),
        (RadialForce, "angle", "turn"),
    ],
)
def test_each_size_steps_by_its_own_row(record: type, name: str, sort: str) -> None:
    declaration = declared(record)[name]
    assert isinstance(declaration, Quantity)
    assert sort_of(name, declaration) == sort


def test_pulled_sizes_rest_on_preferred_ones() -> None:
    assert snapped(2.41, "radius", 0.05) == 2.5
    assert snapped(34.6, "diameter", 0.5) == 35.0
    assert snapped(107.0, "length", 3.0) == 106.0
    assert snapped(-1130.0, "number", 30.0, "SI", "force") == -1120.0


def test_far_out_only_coarse_sizes_are_offered() -> None:
    assert snapped(37.0, "length", 10.0) in R5 or snapped(37.0, "length", 10.0) == 40.0
    assert snapped(143.0, "length", 40.0) == 160.0


def test_close_up_round_sizes_lie_between() -> None:
    assert snapped(183.2, "length", 0.4) == pytest.approx(183.0)
    assert snapped(83.4, "place", 1.6) == 84.0


def test_us_lengths_rest_on_halves_of_halves() -> None:
    rest = snapped(1.27 * INCH, "length", 0.05 * INCH, "US") / INCH
    assert rest == pytest.approx(1.25)
    assert snapped(0.13 * INCH, "radius", 0.01, "US") / INCH * 64 == pytest.approx(8)


@given(
    st.sampled_from(["radius", "diameter", "length", "number"]),
    st.floats(0.5, 150.0),
    st.sampled_from(["SI", "US"]),
)
def test_steps_up_and_down_again_pass_the_same_sizes(sort: str, value: float, system: str) -> None:
    up = stepped(value, sort, True, system)  # type: ignore[arg-type]
    assert up > value
    down = stepped(up, sort, False, system)  # type: ignore[arg-type]
    assert down <= value * (1 + 1e-6)
    assert stepped(down, sort, True, system) == pytest.approx(up)  # type: ignore[arg-type]


def test_steps_of_negative_and_of_no_size() -> None:
    assert stepped(-1000.0, "number", True, "SI", "force") == pytest.approx(-900.0)
    assert stepped(-1000.0, "number", False, "SI", "force") == pytest.approx(-1120.0)
    assert stepped(0.0, "number", True, "SI", "force") > 0
    assert stepped(0.0, "number", False, "SI", "force") < 0
    assert stepped(172.0, "turn", True, "SI", "angle") == 180.0


def test_at_the_end_of_a_row_a_size_stays() -> None:
    assert stepped(0.2, "radius", False) == 0.2
    assert stepped(0.1, "radius", False) == 0.1
    assert stepped(RADII[-1], "radius", True) == RADII[-1]


def test_fine_steps_are_about_a_fiftieth_and_round() -> None:
    assert finely(2.5, True) == pytest.approx(2.55)
    assert finely(50.0, False) == pytest.approx(49.0)
    assert finely(-50.0, True) == pytest.approx(-49.0)


@given(st.floats(1e-6, 1e6))
def test_round_steps_are_one_two_or_five(least: float) -> None:
    step = round_step(least)
    lead = step / 10 ** math.floor(math.log10(step) + 1e-9)
    assert step >= least * (1 - 1e-6)
    assert step <= 2.5 * least * (1 + 1e-6)
    assert min(abs(lead - whole) for whole in (1, 2, 5, 10)) < 1e-6


@given(st.floats(0.5, 500.0), st.floats(0.01, 5.0))
def test_freely_pulled_sizes_stay_within_what_the_hand_can_tell(value: float, resolution: float) -> None:
    free = rounded(value, resolution)
    assert abs(free - value) <= resolution / 4
    assert len(f"{free:.10g}".replace(".", "").lstrip("0")) <= 6
