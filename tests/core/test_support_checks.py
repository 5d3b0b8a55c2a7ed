"""What is said about supports: hardly loaded ones, alignment of more than two, and reactions in words."""

from dataclasses import replace

import numpy as np
import pytest
from varied_shafts import THREE_BEARINGS

from shaftcore.evaluation import evaluate
from shaftcore.nomenclature import BY_KEY
from shaftcore.reactions import Reaction, reaction_of, reaction_words
from shaftcore.section_properties import area, second_moment, shear_coefficient
from shaftcore.shaft import AxialForce, RadialForce, Segment, Shaft, Support, Torque
from shaftcore.support_checks import moment_out_of_line
from shaftcore.units import INCH, POUND_FORCE, dimension
from shaftcore.workings import workings_of

LENGTH, D, FORCE = 900.0, 50.0, 6000.0


def on(*supports: Support, force: float = FORCE) -> Shaft:
    return Shaft(
        segments=(Segment("s", LENGTH, D),),
        supports=supports,
        loads=(RadialForce("f", 200.0, force),),
    )


A, B, C = Support("A", 0.0, locating=True), Support("B", LENGTH / 2), Support("C", LENGTH)


def notices(shaft: Shaft, key: str):
    return [notice for notice in evaluate(shaft).notices if notice.key == key]


def moment_of_one(offset: float) -> float:
    """Over the middle of two equal spans, the middle seat off by `offset`: P L/4, P by the flexibility amid L."""
    shaft = on(A, B, C)
    size, solid, nu = np.array(D), np.array(0.0), shaft.material.poisson_ratio
    modulus = shaft.material.elastic_modulus
    shear = modulus / (2 + 2 * nu) * area(size, solid) * shear_coefficient(size, solid, nu)
    flexibility = LENGTH**3 / (48 * modulus * second_moment(size, solid)) + LENGTH / (4 * shear)
    return float(offset / flexibility * LENGTH / 4)


def test_the_moment_of_a_support_out_of_line_is_that_of_the_closed_form():
    shaft = on(C, A, B)
    along = evaluate(shaft).along
    assert moment_out_of_line(shaft, along, 0.01).max() == pytest.approx(moment_of_one(0.01), rel=1e-9)
    assert moment_out_of_line(shaft, along, 0.02).max() == pytest.approx(moment_of_one(0.02), rel=1e-9)


def test_it_is_what_an_offset_adds_to_the_results():
    shaft = on(A, B, C)
    bent = on(A, replace(B, offset_y=0.01), C)
    one, other = evaluate(shaft).along, evaluate(bent).along
    added = np.abs(other.moment - one.moment)[0, 0]
    np.testing.assert_allclose(added, moment_out_of_line(shaft, one, 0.01), atol=1e-6 * added.max())


def test_inner_supports_add_each_the_worse_way():
    """Two inner supports: up and up, or up and down, whichever is worse at each place."""
    supports = (A, Support("B", 300.0), Support("D", 600.0), C)
    plain = evaluate(on(*supports)).along
    worst = np.zeros(len(plain.x))
    for way in (1.0, -1.0):
        off = replace(supports[1], offset_z=0.01), replace(supports[2], offset_z=way * 0.01)
        moment = evaluate(on(supports[0], *off, supports[3])).along.moment[0, 1]
        worst = np.maximum(worst, np.abs(moment - plain.moment[0, 1]))
    np.testing.assert_allclose(moment_out_of_line(on(*supports), plain, 0.01), worst, atol=1e-6 * worst.max())


def test_alignment_is_said_above_five_per_cent_of_the_largest_moment_only():
    largest = np.abs(evaluate(on(A, B, C)).along.moment[0, 0]).max() / FORCE
    force = moment_of_one(0.01) / largest / 0.05
    (found,) = notices(on(A, B, C, force=0.98 * force), "sensitive to alignment")
    assert found.station is None
    assert "5% of the largest" in found.text
    assert "0.01 mm" in found.text
    assert not notices(on(A, B, C, force=1.02 * force), "sensitive to alignment")
    assert not notices(on(A, C, force=0.5 * force), "sensitive to alignment"), "two supports are always in line"
    soft = replace(B, stiffness=100.0)
    assert not notices(on(A, soft, C, force=0.5 * force), "sensitive to alignment"), "a soft one gives way"
    assert not notices(on(A, B, C, force=0.0), "sensitive to alignment"), "no moment to compare with"


def test_a_support_that_carries_hardly_anything_is_named_at_its_station():
    """Force near the left support: the right one carries F a/L (statics)."""
    for share, said in ((0.009, True), (0.0101, False)):
        x = LENGTH * share / (1 + share)
        shaft = replace(on(A, replace(C, name="tail bearing")), loads=(RadialForce("f", x, FORCE),))
        found = notices(shaft, "unloaded support")
        assert bool(found) == said
        if said:
            assert found[0].place == "C"
            assert evaluate(shaft).stations[found[0].station].place == "C"
            assert "tail bearing carries 54 N" in found[0].text or "tail bearing carries 53" in found[0].text


def test_no_support_is_named_where_none_carries_anything():
    twist = (Torque("in", 10.0, 1e5), Torque("out", 800.0, -1e5))
    assert not notices(replace(on(A, B, C), loads=twist), "unloaded support")


# reactions ----------------------------------------------------------------------------------------------


def test_reactions_in_numbers_and_words():
    """3000 N down amid the span: 1500 N up at each end; 40 N ± 8 N to the right are held by the locating one."""
    loads = (RadialForce("f", LENGTH / 2, 3000.0, 180.0, 200.0), AxialForce("p", 100.0, 40.0, 8.0))
    results = evaluate(replace(on(A, C), loads=loads))
    held, free = reaction_of(results, "A"), reaction_of(results, "C")
    assert held is not None
    assert free is not None
    assert held.across == pytest.approx((1500.0, 100.0))
    assert held.angle(0) == pytest.approx(0.0, abs=1e-9)
    assert held.along == pytest.approx((-40.0, -8.0))
    assert free.along == (0.0, 0.0)
    words = [str(phrase) for phrase in reaction_words(held)]
    assert words == [
        "Presses on the shaft with 1500 N at 0°: R_y 1500 N, R_z 0 N.",
        "Pulsation 100 N at 0°: R_y 100 N, R_z 0 N.",
        "Along the shaft 40 N to the left, pulsation 8 N.",
    ]
    assert len(reaction_words(free)) == 2
    assert reaction_of(results, "f") is None


def test_angles_of_reactions_go_round_like_those_of_forces():
    for angle in (0.0, 45.0, 90.0, 180.0, 270.0, 300.0):
        loads = (RadialForce("f", 0.0, 100.0, angle), RadialForce("g", 450.0, 10.0))
        found = reaction_of(evaluate(replace(on(A, C), loads=loads)), "A")
        assert found is not None
        assert 0 <= found.angle(0) < 360
        turn = np.radians(found.angle(0))
        pointing = found.across[0] * np.array([np.cos(turn), np.sin(turn)])
        expected = np.array([5.0, 0.0]) - 100 * np.array([np.cos(np.radians(angle)), np.sin(np.radians(angle))])
        np.testing.assert_allclose(pointing, expected, atol=1e-5)
    assert reaction_words(Reaction((0.0, 0.0), (0.0, 0.0), (0.0, 0.0)))[0].written("SI").startswith("Presses")


def test_ledger_and_workings_state_the_reactions_at_the_supports_alone():
    results = evaluate(THREE_BEARINGS)
    values = BY_KEY["reaction"].values(results)
    places = {support.x: i for i, support in enumerate(THREE_BEARINGS.supports)}
    seen = 0
    for i, station in enumerate(results.stations):
        rows = [places[x] for x in (station.x, *station.also) if x in places]
        lines = {line.symbol: line for chapter in workings_of(results, i) for line in chapter.lines}
        assert (values[i] is not None) == bool(rows) == ("R_y" in lines)
        for row in rows:
            seen += 1
            y, z = results.along.reactions[0, :, row]
            assert values[i] == pytest.approx(np.hypot(y, z))
            assert lines["R_y"].value == pytest.approx(y)
            assert lines["R_z"].value == pytest.approx(z)
            assert "bent line" in lines["R_y"].formula
    assert seen == 3


def test_stiffness_in_inches_and_pounds():
    """1 N/mm is 5.710147 lbf/in (NIST SP 811: 1 lbf/in = 175.1268 N/m)."""
    unit = dimension("stiffness").us
    assert unit.symbol == "lbf/in"
    assert unit.internal(1.0) == pytest.approx(0.1751268, rel=1e-6)
    assert unit.factor == POUND_FORCE / INCH
