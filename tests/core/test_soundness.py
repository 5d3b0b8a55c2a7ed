"""Every impossible shaft gets a problem that names the place, the value, what is allowed and what to do."""

from dataclasses import replace

import pytest
from hypothesis import HealthCheck, assume, given, settings
from hypothesis import strategies as st

from shaftcore.errors import UnsoundShaftError
from shaftcore.evaluation import evaluate
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import AxialForce, Material, RadialForce, Segment, Shaft, Support, Torque
from shaftcore.soundness import can_be, nearest_sound, problems_of

SOUND = Shaft(
    segments=(Segment("a", 60.0, 30.0, shoulder=Shoulder(2.0)), Segment("b", 80.0, 40.0, bore=10.0)),
    raisers=(Groove("g", 100.0, 1.0, 1.0),),
    supports=(Support("A", 5.0, locating=True), Support("B", 130.0)),
    loads=(RadialForce("f", 70.0, 500.0),),
)


def with_segment(index: int, **fields: object) -> Shaft:
    segments = list(SOUND.segments)
    segments[index] = replace(segments[index], **fields)
    return replace(SOUND, segments=tuple(segments))


def with_groove(**fields: object) -> Shaft:
    return replace(SOUND, raisers=(replace(SOUND.raisers[0], **fields),))


def tapered(slope: float, **groove: float) -> Shaft:
    """A groove in the middle of a taper of 100 mm length and the given change of diameter a length."""
    return replace(
        SOUND,
        segments=(Segment("a", 100.0, 40.0, 40.0 + 100 * slope),),
        raisers=(Groove(**{"id": "g", "x": 50.0, "depth": 2.0, "radius": 1.0, **groove}),),
        supports=(Support("A", 5.0, locating=True), Support("B", 95.0)),
    )


WRONG = {
    "zero length": (with_segment(0, length=0.0), "segments[0].length_mm", "0 mm"),
    "negative diameter": (with_segment(1, diameter=-40.0), "segments[1].diameter_mm", "-40 mm"),
    "NaN": (with_segment(0, length=float("nan")), "segments[0].length_mm", "nan"),
    "infinite": (with_segment(0, diameter=float("inf")), "segments[0].diameter_mm", "inf"),
    "1e308": (with_segment(0, length=1e308), "segments[0].length_mm", "1e+308 mm"),
    "whole number beyond all floats": (with_segment(0, length=10**400), "segments[0].length_mm", "inf"),
    "word for a number": (with_segment(0, length="long"), "segments[0].length_mm", "'long'"),
    "yes for a number": (with_segment(0, length=True), "segments[0].length_mm", "True"),
    "unknown finish": (with_segment(0, finish="shiny"), "segments[0].finish", "'shiny'"),
    "a support among the segments": (replace(SOUND, segments=(Support("A"),)), "segments[0]", "Support"),
    "a list for a tuple": (replace(SOUND, loads=[]), "loads", "[]"),
    "a million segments": (replace(SOUND, segments=(Segment("a"),) * 1_000_000), "segments", "1000000 entries"),
    "negative fillet": (with_segment(0, shoulder=Shoulder(-1.0)), "segments[0].shoulder.radius_mm", "-1 mm"),
    "no fillet at a step": (with_segment(0, shoulder=None), "segments[0].shoulder", "a step of 5 mm"),
    "bore through the wall": (with_segment(1, bore=40.0), "segments[1].bore_mm", "40 mm"),
    "bore wider than the neighbour": (with_segment(1, bore=32.0), "segments[1].bore_mm", "32 mm"),
    "arc longer than its segment": (
        with_segment(0, shoulder=Shoulder(500.0)),
        "segments[0].shoulder",
        "along the shaft",
    ),
    "groove across a face": (with_groove(x=60.5), "raisers[0]", "along the shaft"),
    "groove over the end": (with_groove(x=139.5), "raisers[0]", "along the shaft"),
    "groove in the fillet": (with_groove(x=57.5, radius=1.5), "segments[0].shoulder", "begins at"),
    "grooves in one place": (
        replace(SOUND, raisers=(SOUND.raisers[0], Groove("h", 101.0, 1.0, 1.0))),
        "raisers[1]",
        "begins at",
    ),
    "groove through the wall": (with_groove(depth=15.0, radius=5.0), "raisers[0]", "over a bore of 10 mm"),
    "groove on a steep taper": (tapered(0.5), "raisers[0]", "taper"),
    "groove beyond the end": (with_groove(x=200.0), "raisers[0].x_mm", "200 mm"),
    "more supports than anyone can line up": (
        replace(SOUND, supports=tuple(Support(f"B{i}", 5.0 * i, locating=i == 0) for i in range(21))),
        "supports",
        "21 entries",
    ),
    "stiffness of nothing": (
        replace(SOUND, supports=(SOUND.supports[0], Support("B", 130.0, stiffness=0.0))),
        "supports[1].stiffness_N_per_mm",
        "0 N/mm",
    ),
    "offset beyond small deflections": (
        replace(SOUND, supports=(SOUND.supports[0], Support("B", 130.0, offset_z=-11.0))),
        "supports[1].offset_z_mm",
        "-11 mm",
    ),
    "support beyond the end": (
        replace(SOUND, supports=(*SOUND.supports[:1], Support("B", 140.1))),
        "supports[1].x_mm",
        "140.1 mm",
    ),
    "load beyond the end": (replace(SOUND, loads=(RadialForce("f", 1e4),)), "loads[0].x_mm", "10000 mm"),
    "two things of one name": (replace(SOUND, loads=(RadialForce("A", 20.0),)), "loads[0].id", '"A"'),
    "stronger in yield than in fracture": (
        replace(SOUND, material=Material(tensile_strength=500.0, yield_strength=600.0)),
        "material.yield_strength_MPa",
        "600 MPa",
    ),
}

MISSING = {
    "no segment": (Shaft(), "segments"),
    "no support": (replace(SOUND, supports=()), "supports"),
    "both supports in one place": (replace(SOUND, supports=(Support("A", 9.0), Support("B", 9.0))), "supports"),
    "supports all but in one place": (
        replace(SOUND, supports=(Support("A", 9.0, locating=True), Support("B", 9.001))),
        "supports",
    ),
    "two of three supports all but in one place": (
        replace(SOUND, supports=(Support("A", 9.0, locating=True), Support("B", 90.0), Support("C", 9.01))),
        "supports",
    ),
    "no locating support": (replace(SOUND, supports=(Support("A", 9.0), Support("B", 90.0))), "supports"),
    "two locating supports": (
        replace(SOUND, supports=(Support("A", 9.0, locating=True), Support("B", 90.0, locating=True))),
        "supports",
    ),
}


def test_a_sound_shaft_has_no_problem():
    assert problems_of(SOUND) == ()


def test_any_number_of_supports_apart_is_sound():
    many = tuple(Support(f"B{i}", 140.0 * i / 19, locating=i == 7) for i in range(20))
    assert problems_of(replace(SOUND, supports=many)) == ()


def test_supports_too_near_one_another_are_named():
    near = (Support("A", 9.0, locating=True), Support("B", 90.0), Support("C", 9.01))
    (problem,) = problems_of(replace(SOUND, supports=near))
    assert problem.value == "A and C 0.01 mm apart"
    assert problem.allowed == "at least 0.014 mm"


@pytest.mark.parametrize("case", WRONG)
def test_what_cannot_be_is_named(case: str):
    shaft, path, value = WRONG[case]
    problems = [problem for problem in problems_of(shaft) if problem.path == path]
    assert problems, problems_of(shaft)
    assert value in problems[0].value
    assert problems[0].allowed
    assert problems[0].remedy
    assert problems[0].severity == "wrong"
    with pytest.raises(UnsoundShaftError, match="allowed"):
        evaluate(shaft)


def test_a_support_too_many_is_refused_with_what_to_do() -> None:
    many = tuple(Support(f"B{i}", 5.0 * i, locating=i == 0) for i in range(21))
    (problem,) = problems_of(replace(SOUND, supports=many))
    assert (problem.path, problem.value, problem.allowed) == ("supports", "21 entries", "20 at most")
    assert problem.remedy == "remove one, or join neighbours into one of their common stiffness"


@pytest.mark.parametrize("case", MISSING)
def test_what_is_missing_is_named(case: str):
    shaft, path = MISSING[case]
    problems = problems_of(shaft)
    assert any(problem.path == path for problem in problems)
    assert {problem.severity for problem in problems} == {"missing"}
    with pytest.raises(UnsoundShaftError):
        evaluate(shaft)


def test_equal_numbers_of_another_sort_are_told_apart():
    """1.0 is a length, True is none, though the two are equal."""
    assert not problems_of(with_segment(1, bore=1.0))
    assert problems_of(with_segment(1, bore=True))
    assert not problems_of(with_segment(1, bore=1))


def test_partial_fillets_and_grooves_on_flat_tapers_are_allowed():
    assert not problems_of(with_segment(0, shoulder=Shoulder(8.0)))
    assert not problems_of(tapered(1 / 12))


def test_raisers_may_touch():
    spans = (Groove("g", 100.0, 1.0, 1.0), Groove("h", 102.0, 1.0, 1.0))
    assert not problems_of(replace(SOUND, raisers=spans))


WILD = st.one_of(
    st.sampled_from(
        [0.0, -1.0, float("nan"), float("inf"), -float("inf"), 1e308, -1e308, 5e-324, 1e-9, 0, 7, True, None]
    ),
    st.floats(),
    st.floats(0.01, 300.0),
    st.floats(0.01, 300.0),
    st.floats(0.01, 300.0),
)


@st.composite
def wild_shafts(draw: st.DrawFn) -> Shaft:
    segments = tuple(
        Segment(
            f"s{i}",
            draw(WILD),
            draw(WILD),
            draw(st.one_of(st.none(), WILD)),
            draw(st.one_of(st.just(0.0), WILD)),
            shoulder=draw(st.one_of(st.none(), st.builds(Shoulder, radius=WILD))),
        )
        for i in range(draw(st.integers(0, 3)))
    )
    raisers = tuple(Groove(f"g{i}", draw(WILD), draw(WILD), draw(WILD)) for i in range(draw(st.integers(0, 2))))
    return Shaft(
        segments=segments,
        raisers=raisers,
        supports=(Support("A", draw(WILD), locating=draw(st.booleans())), Support("B", draw(WILD), locating=True)),
        loads=(RadialForce("f", draw(WILD), draw(WILD), draw(WILD)), Torque("t", draw(WILD), draw(WILD))),
    )


@settings(max_examples=300, deadline=None, suppress_health_check=[HealthCheck.too_slow])
@given(wild_shafts())
def test_a_wild_shaft_is_analysed_or_refused_and_never_crashes(shaft: Shaft):
    if problems_of(shaft):
        with pytest.raises(UnsoundShaftError, match="allowed"):
            evaluate(shaft)
    else:
        assert (evaluate(shaft).judged.n >= 0).all()


SIZES = st.sampled_from([0.01, 0.1, 1.0, 37.0, 900.0, 1e4])
FORCES = st.sampled_from([0.0, 1e-12, -1e-300, 250.0, -1e8, 1e8])


@settings(max_examples=150, deadline=None)
@given(st.data())
def test_the_corners_of_what_is_allowed_are_analysed(data: st.DataObject):
    """Tiny and huge sizes and loads together: finite results, or a problem; never NaN or a crash."""
    draw = data.draw
    lengths, diameters = [[draw(SIZES) for _ in range(3)] for _ in range(2)]
    segments = tuple(
        Segment(f"s{i}", length, max(d, 0.1), shoulder=Shoulder(0.002))
        for i, (length, d) in enumerate(zip(lengths, diameters, strict=True))
    )
    end = sum(lengths)
    shares = st.sampled_from([0.0, 1e-9, 0.3, 0.5, 1.0])
    shaft = Shaft(
        segments=segments,
        supports=(Support("A", draw(shares) * end, locating=True), Support("B", draw(shares) * end)),
        loads=(
            RadialForce("f", draw(shares) * end, draw(FORCES), 33.0, abs(draw(FORCES))),
            Torque("t", draw(shares) * end, draw(FORCES), draw(FORCES)),
            AxialForce("a", draw(shares) * end, draw(FORCES), draw(FORCES)),
        ),
    )
    assume(not problems_of(shaft))
    results = evaluate(shaft)
    assert (results.judged.n >= 0).all()
    assert (results.along.deflection == results.along.deflection).all()


@pytest.mark.parametrize(
    ("sound", "refused", "limit"),
    [
        (10.0, 400.0, 30.0),  # solid down to a bore as wide as the neighbour is thick: the bound itself cannot be
        (10.0, 31.0, 30.0),
    ],
)
def test_the_nearest_size_that_can_be_is_below_its_bound_by_little(sound: float, refused: float, limit: float):
    found = nearest_sound(lambda bore: with_segment(1, bore=bore), sound, refused)
    assert can_be(with_segment(1, bore=found))
    assert limit - 0.002 * limit < found < limit


@settings(deadline=None)
@given(refused=st.floats(80.01, 3000.0), sound=st.floats(1.0, 70.0), unit=st.sampled_from([1.0, 25.0]))
def test_the_limit_is_found_from_wherever_it_is_sought(refused: float, sound: float, unit: float):
    """A groove 1 mm deep and wide may stand up to 79 mm along a segment that begins at 60 mm and is 80 mm long."""
    end = 60.0 + 80.0 - 1.0
    found = nearest_sound(lambda along: with_groove(x=60.0 + along), sound, refused, unit)
    assert can_be(with_groove(x=60.0 + found))
    assert sound <= found <= end - 60.0 + 1e-6
    # twelve halvings by ratio, each off the middle by an eighth at most through rounding
    assert found >= (end - 60.0) * (refused / sound) ** -(0.625**12)
    assert len(f"{found / unit:.10g}") <= 8


def test_what_is_missing_does_not_stop_a_size():
    assert can_be(replace(SOUND, supports=()))
    assert not can_be(with_segment(1, bore=40.0))
