"""Shafts of our own invention that between them use every branch of the strength formulas."""

from dataclasses import replace

from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import (
    AxialForce,
    Duty,
    Judgement,
    Material,
    RadialForce,
    Segment,
    Shaft,
    Support,
    Torque,
)

SUPPORTS = (Support("A", 20.0, locating=True), Support("B", 480.0))
LOADS = (
    RadialForce("F1", 150.0, 4200.0, 180.0, 600.0),
    RadialForce("F2", 330.0, -2500.0, 60.0),
    Torque("in", 100.0, 310e3, 45e3),
    Torque("out", 400.0, -310e3, -45e3),
    AxialForce("push", 250.0, -5200.0, 900.0),
)

TURNING = Shaft(
    material=Material(tensile_strength=690.0, yield_strength=520.0),
    segments=(
        Segment("journal", 60.0, 30.0, finish="ground", shoulder=Shoulder(1.2, finish="machined")),
        Segment("seat", 160.0, 38.0, shoulder=Shoulder(0.8)),
        Segment("collar", 20.0, 55.0, shoulder=Shoulder(2.5)),
        Segment("body", 200.0, 42.0, finish="hot-rolled", shoulder=Shoulder(1.0)),
        Segment("end", 60.0, 30.0),
    ),
    raisers=(Groove("ring", 130.0, 1.5, 0.2, finish="ground"), Groove("oil", 300.0, 2.0, 3.0)),
    supports=SUPPORTS,
    loads=LOADS,
)

CLOSED_FORM = replace(
    TURNING,
    judgement=Judgement(
        mean_stress_rule="gerber",
        kt_source="din 743-2",
        sensitivity="peterson",
        finish_table="newer",
        reliability=0.95,
        user_factor=0.9,
        user_factor_reason="wet service",
        notch_on_steady_torque=False,
    ),
    duty=Duty(temperature=180.0),
)

HOLLOW_TAPER = replace(
    TURNING,
    segments=(
        Segment("journal", 90.0, 120.0, bore=50.0, shoulder=Shoulder(3.0)),
        Segment("cone", 260.0, 180.0, end_diameter=130.0, bore=50.0, finish="as-forged", shoulder=Shoulder(2.0)),
        Segment("tail", 150.0, 110.0, bore=30.0),
    ),
    raisers=(),
    loads=(
        RadialForce("pull", 200.0, 90e3),
        Torque("in", 100.0, 9e6),
        Torque("out", 400.0, -9e6),
        AxialForce("thrust", 500.0, 60e3, 20e3),
    ),
)

STANDING = replace(
    TURNING,
    duty=Duty(turning=False),
    judgement=Judgement(sensitivity="peterson", mean_stress_rule="gerber", notch_on_yield=False),
    loads=(RadialForce("F1", 150.0, 4200.0, 180.0, 1600.0), AxialForce("push", 250.0, -250e3)),
)

STANDING_TWISTED = replace(STANDING, loads=LOADS, judgement=Judgement())

SHARP = replace(
    TURNING,
    material=Material(tensile_strength=420.0, yield_strength=260.0),
    judgement=Judgement(sensitivity="peterson", reliability=0.5),
    segments=(
        Segment("thin", 250.0, 40.0, shoulder=Shoulder(0.15)),
        Segment("thick", 250.0, 52.0),
    ),
    raisers=(Groove("scratch", 100.0, 2.0, 0.05),),
)

PARTIAL = replace(
    SHARP,
    material=Material(tensile_strength=1900.0, yield_strength=1600.0),
    judgement=Judgement(),
    segments=(
        Segment("thin", 250.0, 40.0, shoulder=Shoulder(8.0, bearing_corner=0.6)),
        Segment("thick", 250.0, 41.0),
    ),
    raisers=(Groove("shallow", 100.0, 0.1, 6.0), Groove("hollow", 400.0, 6.0, 2.9)),
)

BIG_AXIAL_ALONE = replace(
    TURNING,
    duty=Duty(temperature=-20.0),
    segments=(Segment("left", 250.0, 300.0, shoulder=Shoulder(5.0)), Segment("right", 250.0, 340.0)),
    raisers=(),
    loads=(AxialForce("swing", 450.0, 0.0, 2e6), Torque("in", 300.0, 8e7), Torque("out", 400.0, -8e7)),
)

BIG_BENT = replace(BIG_AXIAL_ALONE, loads=(RadialForce("weight", 300.0, 4e5),))

STANDING_PUSHED = replace(STANDING_TWISTED, judgement=Judgement(notch_on_steady_torque=False))

TINY = replace(
    TURNING,
    segments=(Segment("left", 250.0, 6.0, shoulder=Shoulder(0.3)), Segment("right", 250.0, 8.0, finish="ground")),
    raisers=(),
    duty=Duty(turning=False),
    loads=(RadialForce("tip", 300.0, 0.0, 180.0, 20.0),),
)

THREE_BEARINGS = replace(
    TURNING,
    supports=(
        Support("B", 480.0, "drive end", stiffness=4e5),
        Support("A", 20.0, locating=True),
        Support("C", 260.0, offset_y=-0.03, offset_z=0.01),
    ),
)

THREE_BEARINGS_STANDING = replace(THREE_BEARINGS, duty=Duty(turning=False))

VARIED: dict[str, Shaft] = {
    "turning": TURNING,
    "closed form": CLOSED_FORM,
    "hollow taper": HOLLOW_TAPER,
    "standing": STANDING,
    "standing twisted": STANDING_TWISTED,
    "standing pushed": STANDING_PUSHED,
    "sharp": SHARP,
    "partial fillet": PARTIAL,
    "big, axial alone": BIG_AXIAL_ALONE,
    "big, bent": BIG_BENT,
    "tiny": TINY,
    "three bearings": THREE_BEARINGS,
    "three bearings, standing": THREE_BEARINGS_STANDING,
}
