"""The needed radius is the one with which the station just reaches both asked factors."""

from dataclasses import replace

import numpy as np
import pytest

from shaftcore.abutment import largest_fillet
from shaftcore.declared import declared
from shaftcore.errors import UnsoundShaftError
from shaftcore.evaluation import evaluate
from shaftcore.notches.shoulder import Shoulder
from shaftcore.phrase import Phrase
from shaftcore.radius_window import SMALLEST, RadiusWindow, radius_window
from shaftcore.shaft import Duty, Judgement, Material, RadialForce, Segment, Shaft, Support, Torque

JUDGEMENTS = [
    Judgement(),
    Judgement(kt_source="din 743-2", mean_stress_rule="gerber"),
    Judgement(sensitivity="peterson", asked_factor=1.7, notch_on_steady_torque=False),
    Judgement(asked_yield_factor=3.2, finish_table="newer"),
]


def shaft(judgement: Judgement, force: float = 9000.0, turning: bool = True, **shoulder: float) -> Shaft:
    """A shaft of 45 and 55 mm whose step lies under bending and torsion."""
    return Shaft(
        material=Material(tensile_strength=700.0, yield_strength=490.0),
        duty=Duty(turning=turning),
        judgement=judgement,
        segments=(
            Segment("a", 120.0, 45.0, finish="ground", shoulder=Shoulder(**{"radius": 1.0, **shoulder})),
            Segment("b", 180.0, 55.0),
        ),
        supports=(Support("A", 15.0, locating=True), Support("B", 280.0)),
        loads=(
            RadialForce("f", 170.0, force, 180.0, 0.3 * force),
            Torque("in", 20.0, 250e3, 60e3),
            Torque("out", 170.0, -250e3, -60e3),
        ),
    )


def with_radius(one: Shaft, radius: float) -> Shaft:
    a, b = one.segments
    return replace(one, segments=(replace(a, shoulder=replace(a.shoulder, radius=radius)), b))


def least_margin(one: Shaft, place: str = "a") -> float:
    results = evaluate(one)
    i = results.station_of(place)
    return float(min(results.judged.margin[i], results.judged.yield_margin[i]))


@pytest.mark.parametrize("judgement", JUDGEMENTS)
@pytest.mark.parametrize("force", [7000.0, 8000.0, 8500.0])
def test_with_the_needed_radius_the_margin_is_nought(judgement: Judgement, force: float):
    one = shaft(judgement, force)
    needed = radius_window(evaluate(one), "a").needed
    assert needed is not None
    assert SMALLEST < needed < 40
    assert 0 <= least_margin(with_radius(one, needed)) < 1e-4
    assert least_margin(with_radius(one, needed * (1 - 1e-3))) < 0


@pytest.mark.parametrize("judgement", JUDGEMENTS)
def test_against_trying_every_radius(judgement: Judgement):
    """Brute force: a radius is enough just where the analysis of the shaft with it says so."""
    one = shaft(judgement, 7500.0)
    window = radius_window(evaluate(one), "a")
    for radius in np.geomspace(0.06, min(window.allowed, 60.0), 60):
        reached = least_margin(with_radius(one, float(radius)))
        if abs(reached) > 2e-3:
            assert (reached > 0) == (window.needed is not None and radius >= window.needed), radius


@pytest.mark.parametrize("judgement", JUDGEMENTS)
def test_a_seam_of_the_fit_is_no_trap(judgement: Judgement):
    """At h/r = 2 the chart fit jumps; whichever load needs a radius near it, no radius above fails."""
    for force in np.linspace(6500.0, 9500.0, 25):
        one = shaft(judgement, float(force))
        needed = radius_window(evaluate(one), "a").needed
        if needed is not None:
            assert least_margin(with_radius(one, needed)) >= 0
            assert needed == SMALLEST or least_margin(with_radius(one, needed * (1 - 1e-3))) < 0


def test_an_idle_shoulder_needs_next_to_nothing_and_an_overloaded_one_cannot_be_helped():
    assert radius_window(evaluate(shaft(Judgement(), 10.0)), "a").needed == SMALLEST
    hopeless = radius_window(evaluate(shaft(Judgement(), 60e3)), "a")
    assert hopeless.needed is None
    assert hopeless.empty


def test_the_bearing_corner_closes_the_window():
    results = evaluate(shaft(Judgement(), 9500.0, bearing_corner=1.0))
    window = radius_window(results, "a")
    assert window.allowed == largest_fillet(1.0)
    assert "corner" in str(window.limited_by)
    assert window.needed > window.allowed
    assert window.empty
    assert not RadiusWindow("a", 0.8, 1.0, Phrase("")).empty


def test_a_low_step_limits_the_fillet_where_something_seats():
    one = shaft(Judgement(), 1000.0, bearing_corner=6.0)
    low = replace(one, segments=(one.segments[0], replace(one.segments[1], diameter=49.0)))
    window = radius_window(evaluate(low), "a")
    assert window.allowed == pytest.approx(2.0)
    assert "step" in str(window.limited_by)


def test_no_more_is_allowed_than_may_be_entered():
    """The arc of a low step runs far out; beyond what the field takes its room says nothing."""
    one = shaft(Judgement(), 1000.0)
    low = replace(one, segments=(one.segments[0], replace(one.segments[1], diameter=45.02)))
    window = radius_window(evaluate(low), "a")
    assert window.allowed == declared(Shoulder)["radius"].high
    assert least_margin(with_radius(low, window.allowed)) > 0
    with pytest.raises(UnsoundShaftError):
        evaluate(with_radius(low, window.allowed * 1.001))


def test_the_room_that_limits_a_fillet_is_the_free_length_of_the_thinner_segment():
    """Largest radius whose arc still ends on it: a chord of height h over the free length, (l²/h + h)/2."""
    one = shaft(Judgement(), 1000.0)
    thin, thick = one.segments[0], replace(one.segments[1], diameter=75.0)
    window = radius_window(evaluate(replace(one, segments=(thin, thick))), "a")
    h = (thick.diameter - thin.diameter) / 2
    assert window.allowed == pytest.approx((thin.length**2 / h + h) / 2)
    assert str(window.limited_by) == f"{thin.length:g} mm free along the thinner segment"
    assert window.limited_by.written("US") == "4.724\u00a0in free along the thinner segment"


def test_needed_radius_does_not_depend_on_the_radius_now():
    one = shaft(Judgement(), 7500.0)
    windows = [radius_window(evaluate(with_radius(one, r)), "a").needed for r in (0.2, 1.0, 3.0, 8.0)]
    np.testing.assert_allclose(windows, windows[0], rtol=1e-6)
