"""The beam against closed forms and published examples.

"Published" figures: R. Budynas, K. Nisbett, Shigley's Mechanical Engineering Design, and its solutions
manual. Where a source knows no shear deformation, its share is taken out by the closed form of the
same case (shear line -V/(k G A) a length) or made negligible by a beam long for its depth, as said.
"""

import itertools
from dataclasses import replace

import numpy as np
import pytest
from scipy.integrate import quad

from shaftcore.beam_loads import Bed, Flexure, PointLoads, beam_loads, borne
from shaftcore.evaluation import evaluate
from shaftcore.geometry import profile_of
from shaftcore.notches.shoulder import Shoulder
from shaftcore.section_properties import area, second_moment, shear_coefficient
from shaftcore.shaft import Duty, Material, RadialForce, Segment, Shaft, Support, Torque
from shaftcore.units import INCH, POUND_FORCE

STEEL = Material(elastic_modulus=200e3, poisson_ratio=0.3)
DOWN = 180.0


def simple(span: float, d: float, *forces: RadialForce, material: Material = STEEL, ends=None) -> Shaft:
    """A plain shaft on supports at its ends, or at the two places `ends`."""
    a, b = ends or (0.0, span)
    supports = (Support("A", a, locating=True), Support("B", b))
    return Shaft(material=material, segments=(Segment("s", span, d),), supports=supports, loads=forces)


def at(shaft: Shaft, x: float, name: str = "deflection", side: int = 1) -> float:
    """A quantity of the mean loads in the upright plane."""
    loads = evaluate(shaft).along
    row = np.flatnonzero((loads.x == x) & (loads.side == side))[0]
    return float(getattr(loads, name)[0, 0, row])


def stiffness(d: float, material: Material) -> tuple[float, float]:
    """EI and kGA."""
    modulus, nu = material.elastic_modulus, material.poisson_ratio
    size, solid = np.array(d), np.array(0.0)
    shear = modulus / (2 + 2 * nu) * area(size, solid) * shear_coefficient(size, solid, nu)
    return float(modulus * second_moment(size, solid)), float(shear)


def test_simply_supported_shaft_with_one_force():
    """Solution of Shigley 8e problem 7-8: span 11 in, 1449 lbf at 9 in, d 1.875 in, E 30e6 psi: 4.342e-4 rad.

    With one section throughout, the slip under one force between simple supports sums to nought, so
    shear leaves the turn of the sections alone.
    """
    psi = POUND_FORCE / INCH**2
    material = Material(elastic_modulus=30e6 * psi, poisson_ratio=0.3)
    force = RadialForce("f", 9 * INCH, 1449 * POUND_FORCE, DOWN)
    shaft = simple(11 * INCH, 1.875 * INCH, force, material=material)
    assert evaluate(shaft).along.slope[0, 0, -1] == pytest.approx(4.3424e-4, rel=1e-5)


@pytest.mark.parametrize(("place", "d", "length"), [(0.5, 40.0, 400.0), (0.3, 60.0, 250.0), (0.85, 25.0, 900.0)])
def test_deflection_under_a_force_is_bending_plus_shear(place: float, d: float, length: float):
    """y = F a² b²/(3 EI L) + F a b/(kGA L) under the force; the second term is Timoshenko's (statics)."""
    a, b, force = place * length, length - place * length, 5000.0
    bending, shear = stiffness(d, STEEL)
    shaft = simple(length, d, RadialForce("f", a, force, DOWN))
    expected = -force * a * b * (a * b / (3 * bending * length) + 1 / (shear * length))
    assert at(shaft, a) == pytest.approx(expected, rel=1e-9)
    assert at(shaft, a, "moment") == pytest.approx(force * a * b / length, rel=1e-12)
    assert at(shaft, a, "shear", -1) == pytest.approx(force * b / length, rel=1e-12)
    assert at(shaft, a, "shear", 1) == pytest.approx(-force * a / length, rel=1e-12)


def test_overhang():
    """Force F at the end of an overhang c beyond a span L: y = F c² (L + c)/(3 EI) + F (c/kGA)(1 + c/L)."""
    span, c, force, d = 300.0, 120.0, 2000.0, 35.0
    bending, shear = stiffness(d, STEEL)
    shaft = simple(span + c, d, RadialForce("f", span + c, force, DOWN), ends=(0.0, span))
    expected = -force * c * (c * (span + c) / (3 * bending) + (1 + c / span) / shear)
    loads = evaluate(shaft).along
    assert loads.deflection[0, 0, -1] == pytest.approx(expected, rel=1e-9)
    assert at(shaft, span, "moment") == pytest.approx(-force * c, rel=1e-12)
    np.testing.assert_allclose(loads.reactions[0, 0], [-force * c / span, force * (1 + c / span)], rtol=1e-12)


def test_published_moment_of_a_stepped_shaft():
    """Shigley 9e example 6-9: span 550 mm, 6.8 kN at 325 mm; shoulder x = 250 mm: M 695.5 N·m, Kf σ 335.1 MPa, d 32."""
    segments = (Segment("a", 250.0, 32.0, shoulder=Shoulder(3.0)), Segment("b", 300.0, 38.0))
    supports = (Support("A", 0.0, locating=True), Support("B", 550.0))
    shaft = Shaft(segments=segments, supports=supports, loads=(RadialForce("f", 325.0, 6800.0, DOWN),))
    results = evaluate(shaft)
    row = results.station_of("a")
    assert results.at.moment[0, 0, row] == pytest.approx(695.5e3, rel=2e-4)
    assert 1.55 * results.judged.nominal.bending_amplitude[row] == pytest.approx(335.1, rel=3e-4)


def test_stepped_beam_solved_exactly():
    """E 200 GPa, L 350, I 1.25e5 mm⁴ to x = 225, then 4e5; 3 kN at 150: y -0.092992, slopes -8.7709e-4, 6.4668e-4.

    Solved exactly by hand without shear. Its share here is found by the slip line: V/(kGA) summed over
    both diameters, turned to meet the supports.
    """
    d1, d2 = ((64 / np.pi * inertia) ** 0.25 for inertia in (1.25e5, 4e5))
    segments = (Segment("a", 225.0, d1, shoulder=Shoulder(1.0)), Segment("b", 125.0, d2))
    supports = (Support("A", 0.0, locating=True), Support("B", 350.0))
    shaft = Shaft(material=STEEL, segments=segments, supports=supports, loads=(RadialForce("f", 150.0, 3000.0, DOWN),))
    (_, s1), (_, s2) = stiffness(d1, STEEL), stiffness(d2, STEEL)
    left, right = 3000 * 200 / 350, 3000 * 150 / 350
    line = np.cumsum([-left * 150 / s1, right * 75 / s1, right * 125 / s2])
    turn = -line[-1] / 350
    assert at(shaft, 150.0) - (line[0] + 150 * turn) == pytest.approx(-0.092992, abs=5e-7)
    slopes = evaluate(shaft).along.slope[0, 0, [0, -1]] - turn
    np.testing.assert_allclose(slopes, [-8.7709e-4, 6.4668e-4], atol=5e-9)


@pytest.mark.parametrize(("first", "last", "bore"), [(40.0, 60.0, 0.0), (80.0, 25.0, 10.0), (30.0, 30.01, 0.0)])
def test_taper_is_integrated(first: float, last: float, bore: float):
    """Deflection under a force on a tapered shaft by the unit-load integral, adaptive quadrature of scipy."""
    length, a, force = 400.0, 150.0, 4000.0
    segments = (Segment("t", length, first, last, bore),)
    supports = (Support("A", 0.0, locating=True), Support("B", length))
    shaft = Shaft(material=STEEL, segments=segments, supports=supports, loads=(RadialForce("f", a, force, DOWN),))

    def flexibility(x: float) -> float:
        d, inner = np.array(first + (last - first) * x / length), np.array(bore)
        unit = x * (length - a) / length if x < a else a * (length - x) / length
        slope = (length - a) / length if x < a else -a / length
        shear = STEEL.elastic_modulus / 2.6 * area(d, inner) * shear_coefficient(d, inner, 0.3)
        return float(unit**2 / (STEEL.elastic_modulus * second_moment(d, inner)) + slope**2 / shear)

    exact = -force * (quad(flexibility, 0, a, epsrel=1e-12)[0] + quad(flexibility, a, length, epsrel=1e-12)[0])
    assert at(shaft, a) == pytest.approx(exact, rel=1e-8)


def test_shear_coefficient_in_its_limits():
    """Cowper 1966: 6(1+ν)/(7+6ν) for the solid round, 2(1+ν)/(4+3ν) for the thin tube."""
    for nu in (0.0, 0.3, 0.49):
        solid = shear_coefficient(np.array(50.0), np.array(0.0), nu)
        tube = shear_coefficient(np.array(50.0), np.array(50.0 * (1 - 1e-9)), nu)
        assert solid == pytest.approx(6 * (1 + nu) / (7 + 6 * nu), rel=1e-14)
        assert tube == pytest.approx(2 * (1 + nu) / (4 + 3 * nu), rel=1e-8)


def test_section_properties_against_integrals():
    """A, I and the moduli of a hollow section against quadrature of their definitions."""
    d, bore = np.array(57.0), np.array(23.0)
    ring = quad(lambda r: 2 * np.pi * r, bore / 2, d / 2)[0]
    inertia = quad(lambda r: np.pi * r**3, bore / 2, d / 2)[0]
    assert area(d, bore) == pytest.approx(ring, rel=1e-12)
    assert second_moment(d, bore) == pytest.approx(inertia, rel=1e-12)


def test_both_planes_are_the_same_beam():
    """A force at 90 degrees does in z what it does in y at 0 degrees."""
    up = evaluate(simple(400.0, 40.0, RadialForce("f", 150.0, 900.0, 0.0))).along
    front = evaluate(simple(400.0, 40.0, RadialForce("f", 150.0, 900.0, 90.0))).along
    np.testing.assert_allclose(front.moment[:, 1], up.moment[:, 0], atol=1e-9)
    np.testing.assert_allclose(front.deflection[:, 1], up.deflection[:, 0], rtol=1e-12, atol=1e-15)
    np.testing.assert_allclose(front.moment[:, 0], 0.0, atol=1e-9)


def test_torque_runs_between_where_it_goes_in_and_out():
    shaft = simple(300.0, 40.0, Torque("in", 50.0, 80e3, 5e3), Torque("out", 220.0, -80e3, -5e3))
    loads = evaluate(shaft).along
    between = (loads.x > 50) & (loads.x < 220)
    assert set(loads.torque[0, between]) == {80e3}
    assert set(loads.torque[1, between]) == {5e3}
    assert not loads.torque[:, (loads.x < 50) | (loads.x > 220)].any()


def test_a_force_pulsates_the_same_however_it_is_written():
    """-F at θ + 180 degrees is F at θ; pulsations of all forces are in phase."""
    still = Duty(turning=False)
    other = RadialForce("g", 250.0, 2000.0, 0.0, 700.0)
    one = simple(400.0, 40.0, RadialForce("f", 150.0, 1000.0, 30.0, 300.0), other)
    same = simple(400.0, 40.0, RadialForce("f", 150.0, -1000.0, -150.0, 300.0), other)
    results = [
        evaluate(Shaft(duty=still, segments=s.segments, supports=s.supports, loads=s.loads)) for s in (one, same)
    ]
    np.testing.assert_allclose(results[0].judged.n, results[1].judged.n, rtol=1e-12)
    np.testing.assert_allclose(results[0].at.moment, results[1].at.moment, rtol=1e-12, atol=1e-9)


def test_offset_and_yielding_supports():
    """One span on springs k and on set-off supports: the beam follows rigidly, y = offset - R/k there."""
    shaft = simple(400.0, 40.0)
    x = np.linspace(0.0, 400.0, 9)
    flexure = Flexure(shaft, profile_of(shaft), x)
    size = np.zeros((2, 2, 1))
    size[0, 0, 0] = -1000.0
    bed = Bed(np.array([0.0, 400.0]), np.array([5e4, 2e4]), np.array([[[0.1, -0.2], [0.0, 0.0]], np.zeros((2, 2))]))
    reactions, deflection, _ = borne(flexure, PointLoads(np.array([100.0]), size), bed)
    np.testing.assert_allclose(reactions[0, 0], [750.0, 250.0], rtol=1e-12)
    np.testing.assert_allclose(deflection[0, 0, [0, -1]], [0.1 - 750 / 5e4, -0.2 - 250 / 2e4], rtol=1e-10)
    np.testing.assert_allclose(deflection[1], 0.0, atol=1e-15)
    bare = borne(flexure, PointLoads(np.array([100.0]), np.zeros((2, 2, 1))), bed)
    np.testing.assert_allclose(bare[1][0, 0], 0.1 - 0.3 * x / 400, atol=1e-12)
    assert not bare[0].any()


LONG, THIN = 4000.0, 20.0
"""A beam 200 times as long as it is thick: shear adds less than 1e-3 to what bending alone gives."""


def on_three(middle: Support, *forces: RadialForce) -> Shaft:
    """A long thin beam on rigid supports at its ends and on `middle`; listed out of order on purpose."""
    ends = Support("A", 0.0, locating=True), Support("C", LONG)
    return Shaft(
        material=STEEL, segments=(Segment("s", LONG, THIN),), supports=(ends[1], middle, ends[0]), loads=forces
    )


def reactions(shaft: Shaft) -> np.ndarray:
    """Mean reactions in the upright plane, by the supports' places."""
    order = np.argsort([support.x for support in shaft.supports])
    return evaluate(shaft).along.reactions[0, 0][order]


def test_two_equal_spans_under_a_force_amid_the_first():
    """13/32, 22/32 and -3/32 of the force, moment over the middle -3/32 F l: tables of continuous beams.

    By the three-moment equation 4 M l = -6 (F l²/16) by hand.
    """
    force, span = 3200.0, LONG / 2
    shaft = on_three(Support("B", span), RadialForce("f", span / 2, force, DOWN))
    np.testing.assert_allclose(reactions(shaft), [1300.0, 2200.0, -300.0], rtol=1e-3)
    assert at(shaft, span, "moment") == pytest.approx(-3 / 32 * force * span, rel=1e-3)


def test_two_unequal_spans():
    """Spans l and 2 l, force amid the longer: 2 M (l + 2 l) = -3 F (2 l)²/8, so M = -F l/4; by hand."""
    force, span = 900.0, LONG / 3
    shaft = on_three(Support("B", span), RadialForce("f", 2 * span, force, DOWN))
    first, last = -force / 4, force / 2 - force / 8
    np.testing.assert_allclose(reactions(shaft), [first, force - first - last, last], rtol=1e-3)
    assert at(shaft, span, "moment") == pytest.approx(-force * span / 4, rel=1e-3)


def test_two_equal_spans_under_an_even_row_of_forces():
    """Near enough an even load q: 3/8, 10/8, 3/8 of q l and -q l²/8 over the middle (tables of continuous beams)."""
    span, count = LONG / 2, 400
    row = [RadialForce(f"f{i}", (i + 0.5) * LONG / count, 10.0, DOWN) for i in range(count)]
    shaft = on_three(Support("B", span), *row)
    load = 10.0 * count / 2
    np.testing.assert_allclose(reactions(shaft), [0.375 * load, 1.25 * load, 0.375 * load], rtol=1e-3)
    assert at(shaft, span, "moment") == pytest.approx(-load * span / 8, rel=1e-3)


@pytest.mark.parametrize("rigidity", [1e-3, 1.0, 40.0])
def test_middle_spring(rigidity: float):
    """Force over a middle spring c: it takes F/(1 + f/(1/c)) with the flexibility f = L³/48EI + L/4kGA of the beam.

    By the flexibilities of beam and spring side by side; shear is counted, so to rounding.
    """
    force, (bending, shear) = 5000.0, stiffness(THIN, STEEL)
    flexibility = LONG**3 / (48 * bending) + LONG / (4 * shear)
    spring = max(rigidity / flexibility, 1.0)
    shaft = on_three(Support("B", LONG / 2, stiffness=spring), RadialForce("f", LONG / 2, force, DOWN))
    share = flexibility * spring / (1 + flexibility * spring)
    np.testing.assert_allclose(reactions(shaft), [(1 - share) * force / 2, share * force, (1 - share) * force / 2])
    assert at(shaft, LONG / 2) == pytest.approx(-share * force / spring, rel=1e-9)


@pytest.mark.parametrize("plane", [0, 1])
def test_sunk_middle_support(plane: int):
    """Two spans l, the middle seat lower by s, no load: M = 3 E I s/l² over it and R = -6 E I s/l³ (superposition).

    The same beam pulled down amid 2 l by P = 48 E I s/(2 l)³; with shear the flexibility is as above.
    """
    sunk, span, (bending, shear) = 0.25, LONG / 2, stiffness(THIN, STEEL)
    name = ("offset_y", "offset_z")[plane]
    shaft = on_three(Support("B", span, **{name: -sunk}))
    loads = evaluate(shaft).along
    pull = sunk / (LONG**3 / (48 * bending) + LONG / (4 * shear))
    over = loads.moment[0, plane, loads.x == span]
    np.testing.assert_allclose(over, pull * LONG / 4, rtol=1e-9)
    np.testing.assert_allclose(over, 3 * bending * sunk / span**2, rtol=1e-3)
    np.testing.assert_allclose(loads.reactions[0, plane], [pull / 2, -pull, pull / 2], rtol=1e-9)
    assert not loads.reactions[0, 1 - plane].any()
    assert not loads.reactions[1].any()


def test_bending_by_offsets_turns_with_no_shaft():
    """It is fixed in space: amplitude on a turning shaft, mean on one that stands still."""
    shaft = on_three(Support("B", LONG / 2, offset_y=-0.5))
    turning = evaluate(shaft).judged.nominal
    standing = evaluate(replace(shaft, duty=Duty(turning=False))).judged.nominal
    bent = turning.bending_amplitude
    assert bent.max() > 0
    np.testing.assert_array_equal(standing.bending_mean, bent)
    assert not standing.bending_amplitude.any()
    assert not turning.bending_mean.any()


def test_reactions_go_with_their_supports_in_any_order():
    places = (("A", 0.0, None), ("B", 900.0, 3e3), ("C", 2500.0, None), ("D", LONG, 8e4))
    supports = [Support(id, x, locating=id == "A", stiffness=c, offset_y=0.01 * x / LONG) for id, x, c in places]
    loads = (RadialForce("f", 1500.0, 700.0, 200.0), RadialForce("g", 3000.0, 300.0, 80.0, 50.0))
    found = []
    for order in itertools.permutations(supports):
        shaft = Shaft(material=STEEL, segments=(Segment("s", LONG, 60.0),), supports=order, loads=loads)
        along = evaluate(shaft).along
        found.append({s.id: along.reactions[:, :, i] for i, s in enumerate(order)})
    for id in "ABCD":
        for other in found[1:]:
            np.testing.assert_allclose(other[id], found[0][id], rtol=1e-9, atol=1e-9)


def test_four_springs_alike_under_a_stiff_shaft_share_by_statics():
    """A shaft that hardly bends on equal springs at 0, l, 2 l, 3 l: by equilibrium.

    Rivet-group formula R = F/n + F e (x - m)/Σ(x - m)²; by hand Σ = 5 l².
    """
    span, force, e = 100.0, 8000.0, 40.0
    supports = [Support("ABCD"[i], i * span, locating=i == 0, stiffness=100.0) for i in range(4)]
    shaft = Shaft(
        material=STEEL,
        segments=(Segment("s", 3 * span, 200.0),),
        supports=tuple(supports),
        loads=(RadialForce("f", 1.5 * span + e, force, DOWN),),
    )
    expected = [force / 4 + force * e * (i - 1.5) * span / (5 * span**2) for i in range(4)]
    np.testing.assert_allclose(reactions(shaft), expected, rtol=1e-4)


def test_points_beside_a_load_see_their_side():
    shaft = simple(300.0, 40.0, RadialForce("f", 100.0, 600.0, DOWN))
    x, side = np.array([0.0, 100.0, 100.0, 300.0]), np.array([1.0, -1.0, 1.0, -1.0])
    loads = beam_loads(shaft, profile_of(shaft), x, side)
    np.testing.assert_allclose(loads.shear[0, 0], [400.0, 400.0, -200.0, -200.0])
