"""Shafts that can be analysed, drawn at random for property tests."""

import itertools
import math
from dataclasses import replace

from hypothesis import strategies as st

from shaftcore.notches.arc import largest_arc_radius
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import AxialForce, Duty, Judgement, Material, RadialForce, Segment, Shaft, Support, Torque

SHARES = st.integers(0, 1000).map(lambda share: share / 1000)
FINISHES = st.sampled_from(["ground", "machined", "hot-rolled", "as-forged"])


def numbers(low: float, high: float) -> st.SearchStrategy[float]:
    """Plain numbers as people type them: a thousandth of the range apart, never all but nought."""
    return st.integers(0, 1000).map(lambda step: round(low + (high - low) * step / 1000, 6))


@st.composite
def sound_shafts(
    draw: st.DrawFn, tapers: bool = True, grooves: bool = True, axial: bool = True, offsets: bool = True
) -> Shaft:
    """One to six segments with shoulders, grooves, bores, tapers, on two to four supports, and balanced loads."""
    segments = _with_shoulders(draw, [_segment(draw, i, tapers) for i in range(draw(st.integers(1, 6)))])
    shaft = Shaft(material=draw(materials()), duty=draw(duties()), judgement=draw(judgements()), segments=segments)
    raisers = _grooves(draw, shaft) if grooves else ()
    supports = _supports(draw, shaft.length, offsets)
    return replace(shaft, raisers=raisers, supports=supports, loads=_loads(draw, shaft, axial))


def materials() -> st.SearchStrategy[Material]:
    return st.builds(
        lambda tensile, share, poisson: Material(
            tensile_strength=tensile, yield_strength=max(share * tensile, 100.0), poisson_ratio=poisson
        ),
        numbers(300, 1600),
        numbers(0.5, 0.95),
        numbers(0.0, 0.49),
    )


def duties() -> st.SearchStrategy[Duty]:
    return st.builds(Duty, turning=st.booleans(), temperature=numbers(-40, 500))


def judgements() -> st.SearchStrategy[Judgement]:
    return st.builds(
        Judgement,
        mean_stress_rule=st.sampled_from(["goodman", "gerber"]),
        kt_source=st.sampled_from(["chart polynomial", "din 743-2"]),
        sensitivity=st.sampled_from(["neuber", "peterson"]),
        finish_table=st.sampled_from(["older", "newer"]),
        reliability=st.sampled_from([0.5, 0.9, 0.99, 0.9999]),
        notch_on_steady_torque=st.booleans(),
        notch_on_yield=st.booleans(),
    )


def _segment(draw: st.DrawFn, index: int, tapers: bool) -> Segment:
    end = draw(numbers(20, 120)) if tapers and draw(st.booleans()) else None
    bore = draw(st.sampled_from([0.0, 0.0, 6.0, 14.0]))
    return Segment(f"s{index}", draw(numbers(20, 300)), draw(numbers(20, 120)), end, bore, draw(FINISHES))


def _with_shoulders(draw: st.DrawFn, segments: list[Segment]) -> tuple[Segment, ...]:
    """Every step gets a fillet that takes up to 0.35 of the thinner segment, whether full or cut by the step."""
    for i, (left, right) in enumerate(itertools.pairwise(segments)):
        step = right.diameter - left.right_diameter
        if step:
            room = 0.35 * (left if step > 0 else right).length
            largest = min(largest_arc_radius(room, abs(step) / 2), 50.0)
            radius = max(draw(st.floats(0.02, 1.0)) * largest, 0.01)
            finish = draw(st.one_of(st.none(), FINISHES))
            segments[i] = replace(left, shoulder=Shoulder(radius=min(radius, largest), finish=finish))
    return tuple(segments)


def _grooves(draw: st.DrawFn, shaft: Shaft) -> tuple[Groove, ...]:
    """A groove in the middle of some cylinders, no deeper than a tenth of the diameter."""
    begin, found = 0.0, []
    for segment in shaft.segments:
        if segment.end_diameter is None and draw(st.booleans()):
            depth = draw(st.floats(0.005, 0.1)) * segment.diameter
            largest = min(largest_arc_radius(0.1 * segment.length, depth), 50.0)
            radius = max(draw(st.floats(0.05, 1.0)) * largest, 0.02)
            found.append(Groove(f"g{segment.id}", begin + segment.length / 2, depth, radius))
        begin += segment.length
    return tuple(found)


def _supports(draw: st.DrawFn, length: float, offsets: bool) -> tuple[Support, ...]:
    """Two to four supports at least an eighth of the length apart, in any order, one of them locating."""
    count = draw(st.sampled_from([2, 2, 3, 4]))
    places = draw(st.lists(st.integers(0, 8), min_size=count, max_size=count, unique=True))
    aside = draw(st.sampled_from([0.0, 0.0, 0.0625])) * length
    locating = draw(st.integers(0, count - 1))
    off = st.sampled_from([0.0, 0.0, 0.02, -0.05]) if offsets else st.just(0.0)
    springs = st.sampled_from([None, None, None, 5e3, 2e5, 1e7])
    return tuple(
        Support(
            "ABCD"[i],
            min(place / 8 * length + aside, length),
            locating=i == locating,
            stiffness=draw(springs),
            offset_y=draw(off),
            offset_z=draw(off),
        )
        for i, place in enumerate(places)
    )


def _loads(draw: st.DrawFn, shaft: Shaft, axial: bool) -> tuple[RadialForce | Torque | AxialForce, ...]:
    forces = [
        RadialForce(
            f"f{i}",
            draw(SHARES) * shaft.length,
            draw(numbers(-20e3, 20e3)),
            draw(numbers(-180, 180)),
            draw(st.sampled_from([0.0, 0.0, 500.0, 4e3])),
        )
        for i in range(draw(st.integers(0, 4)))
    ]
    torque, swing = draw(numbers(-1e6, 1e6)), draw(st.sampled_from([0.0, 2e5]))
    torques = [
        Torque("t1", draw(SHARES) * shaft.length, torque, swing),
        Torque("t2", draw(SHARES) * shaft.length, -torque, -swing),
    ]
    pushes = [
        AxialForce(f"a{i}", draw(SHARES) * shaft.length, draw(numbers(-20e3, 20e3)), draw(st.sampled_from([0.0, 3e3])))
        for i in range(draw(st.integers(0, 2)) if axial else 0)
    ]
    return (*forces, *torques[: 2 * draw(st.integers(0, 1))], *pushes)


def mirrored(shaft: Shaft) -> Shaft:
    """The same shaft seen from behind: left and right change places."""
    length = shaft.length
    segments = [
        replace(
            segment,
            diameter=segment.right_diameter,
            end_diameter=None if segment.end_diameter is None else segment.diameter,
            shoulder=before.shoulder if before else None,
        )
        for before, segment in zip([None, *shaft.segments[:-1]], shaft.segments, strict=True)
    ]
    loads = [
        replace(load, x=length - load.x, force=-load.force, amplitude=-load.amplitude)
        if isinstance(load, AxialForce)
        else replace(load, x=length - load.x)
        for load in shaft.loads
    ]
    return replace(
        shaft,
        segments=tuple(reversed(segments)),
        raisers=tuple(replace(raiser, x=length - raiser.x) for raiser in shaft.raisers),
        supports=tuple(replace(support, x=length - support.x) for support in shaft.supports),
        loads=tuple(loads),
    )


def scaled(shaft: Shaft, k: float) -> Shaft:
    """All lengths times k, forces times k², torques times k³, stiffnesses times k: every nominal stress stays."""

    def longer(record, *names):
        return replace(record, **{n: getattr(record, n) * k for n in names if getattr(record, n) is not None})

    segments = [longer(segment, "length", "diameter", "end_diameter", "bore") for segment in shaft.segments]
    segments = [replace(s, shoulder=s.shoulder and longer(s.shoulder, "radius")) for s in segments]
    return replace(
        shaft,
        segments=tuple(segments),
        raisers=tuple(longer(groove, "x", "depth", "radius") for groove in shaft.raisers),
        supports=tuple(longer(support, "x", "stiffness", "offset_y", "offset_z") for support in shaft.supports),
        loads=tuple(longer(load, "x") for load in with_loads_times(shaft, k**2, k**3).loads),
    )


def with_loads_times(shaft: Shaft, on_forces: float, on_torques: float) -> Shaft:
    """The shaft with all its forces and torques, amplitudes included, multiplied."""
    return replace(
        shaft,
        loads=tuple(
            replace(load, torque=load.torque * on_torques, amplitude=load.amplitude * on_torques)
            if isinstance(load, Torque)
            else replace(load, force=load.force * on_forces, amplitude=load.amplitude * on_forces)
            for load in shaft.loads
        ),
    )


def turned(shaft: Shaft, degrees: float) -> Shaft:
    """The shaft with all its loads, and the offsets of its supports, turned about the axis."""
    cos, sin = math.cos(math.radians(degrees)), math.sin(math.radians(degrees))
    return replace(
        shaft,
        supports=tuple(
            replace(s, offset_y=cos * s.offset_y - sin * s.offset_z, offset_z=sin * s.offset_y + cos * s.offset_z)
            for s in shaft.supports
        ),
        loads=tuple(
            replace(load, angle=math.remainder(load.angle + degrees, 360)) if isinstance(load, RadialForce) else load
            for load in shaft.loads
        ),
    )
