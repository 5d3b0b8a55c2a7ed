"""The shaft as the user describes it: frozen records of floats, strings and tuples.

Axes: x runs along the shaft from its left end, y points up, z towards the viewer. Forces at an
angle: 0 degrees points up, 90 towards the viewer, 180 down. Units inside: mm, N, N·mm, MPa, °C.
"""

from dataclasses import dataclass
from typing import ClassVar

from shaftcore.declared import choice, part, quantity, switch, text
from shaftcore.notches.kinds import RAISER_RECORDS, Raiser
from shaftcore.notches.shoulder import Shoulder
from shaftcore.surface import FINISHES

SHORTEST, LONGEST = 0.01, 100_000.0
"""Lengths (mm) of a segment; the whole shaft is no longer than the longest either."""

THINNEST, THICKEST = 0.1, 10_000.0
"""Diameters (mm), from a watch pivot to a kiln roller."""

LARGEST_FORCE = 1e8
LARGEST_TORQUE = 1e11
SOFTEST, STIFFEST = 1.0, 1e9
"""Radial stiffness (N/mm) of a support, from a rubber ring to beyond any bearing in its housing."""

FARTHEST_OFFSET = 10.0
"""mm by which a seat may lie beside the line of the others: far beyond what small deflections allow."""

MOST_SUPPORTS = 20
ID_WORDS = "Name of this thing inside the file, unique on the shaft."


@dataclass(frozen=True)
class Segment:
    """One stretch of the shaft, a cylinder or (with `end_diameter`) a cone, with its right-hand face."""

    label: ClassVar[str] = "Segment"
    id: str = text("Id", longest=40, shortest=1, words=ID_WORDS)
    length: float = quantity("Length", "length", SHORTEST, LONGEST, symbol="L", default=50.0)
    diameter: float = quantity("Diameter", "length", THINNEST, THICKEST, symbol="d", default=50.0)
    end_diameter: float | None = quantity(
        "Diameter at the right-hand end",
        "length",
        THINNEST,
        THICKEST,
        optional=True,
        default=None,
        words="Makes the segment a taper. None for a cylinder.",
    )
    bore: float = quantity("Bore", "length", 0.0, THICKEST, symbol="d_i", default=0.0, words="0 for solid.")
    finish: str = choice("Finish", FINISHES, default="machined")
    shoulder: Shoulder | None = part("Shoulder at the right-hand face", Shoulder, default=None, optional=True)

    @property
    def right_diameter(self) -> float:
        return self.diameter if self.end_diameter is None else self.end_diameter


@dataclass(frozen=True)
class Support:
    """A bearing: rigid or springy across the shaft, alike in every direction; rigid along it where it is locating."""

    label: ClassVar[str] = "Support"
    id: str = text("Id", longest=40, shortest=1, words=ID_WORDS)
    x: float = quantity("Position", "length", 0.0, LONGEST, symbol="x", default=0.0)
    name: str = text("Name", longest=60)
    locating: bool = switch("Holds the shaft along its axis", default=False)
    stiffness: float | None = quantity(
        "Radial stiffness",
        "stiffness",
        SOFTEST,
        STIFFEST,
        symbol="c",
        optional=True,
        default=None,
        none_words="rigid",
        words="Of bearing and housing together. None for rigid.",
    )
    offset_y: float = quantity(
        "Offset upwards",
        "length",
        -FARTHEST_OFFSET,
        FARTHEST_OFFSET,
        symbol="δ_y",
        default=0.0,
        words="The seat lies this far above the straight line through the others.",
    )
    offset_z: float = quantity(
        "Offset towards the viewer",
        "length",
        -FARTHEST_OFFSET,
        FARTHEST_OFFSET,
        symbol="δ_z",
        default=0.0,
        words="The seat lies this far towards the viewer from the straight line through the others.",
    )


@dataclass(frozen=True)
class RadialForce:
    """A force across the shaft, fixed in space."""

    kind: ClassVar[str] = "radial force"
    label: ClassVar[str] = "Radial force"
    id: str = text("Id", longest=40, shortest=1, words=ID_WORDS)
    x: float = quantity("Position", "length", 0.0, LONGEST, symbol="x", default=0.0)
    force: float = quantity("Force", "force", -LARGEST_FORCE, LARGEST_FORCE, symbol="F", default=0.0)
    angle: float = quantity(
        "Angle",
        "angle",
        -360.0,
        360.0,
        symbol="θ",
        default=180.0,
        words="0° points up, 90° towards the viewer, 180° down.",
    )
    amplitude: float = quantity(
        "Pulsation",
        "force",
        0.0,
        LARGEST_FORCE,
        symbol="F_a",
        default=0.0,
        words="The force swings by this much either side of its mean, all forces of the shaft in phase.",
    )
    name: str = text("Name", longest=60)


@dataclass(frozen=True)
class Torque:
    """A torque put into the shaft (positive) or taken out of it (negative)."""

    kind: ClassVar[str] = "torque"
    label: ClassVar[str] = "Torque"
    id: str = text("Id", longest=40, shortest=1, words=ID_WORDS)
    x: float = quantity("Position", "length", 0.0, LONGEST, symbol="x", default=0.0)
    torque: float = quantity(
        "Mean torque",
        "torque",
        -LARGEST_TORQUE,
        LARGEST_TORQUE,
        symbol="T",
        default=0.0,
        words="Positive goes in, negative comes out; all together make zero.",
    )
    amplitude: float = quantity(
        "Torque amplitude",
        "torque",
        -LARGEST_TORQUE,
        LARGEST_TORQUE,
        symbol="T_a",
        default=0.0,
        words="Alternating part, with the sign of its share at the same instant; all together make zero.",
    )
    name: str = text("Name", longest=60)


@dataclass(frozen=True)
class AxialForce:
    """A force along the shaft, positive to the right."""

    kind: ClassVar[str] = "axial force"
    label: ClassVar[str] = "Axial force"
    id: str = text("Id", longest=40, shortest=1, words=ID_WORDS)
    x: float = quantity("Position", "length", 0.0, LONGEST, symbol="x", default=0.0)
    force: float = quantity(
        "Mean force", "force", -LARGEST_FORCE, LARGEST_FORCE, symbol="F", default=0.0, words="Positive to the right."
    )
    amplitude: float = quantity("Force amplitude", "force", -LARGEST_FORCE, LARGEST_FORCE, symbol="F_a", default=0.0)
    name: str = text("Name", longest=60)


Load = RadialForce | Torque | AxialForce
LOAD_RECORDS: tuple[type, ...] = (RadialForce, Torque, AxialForce)


@dataclass(frozen=True)
class Material:
    """Strength and stiffness of the steel, as the user states them."""

    label: ClassVar[str] = "Material"
    name: str = text("Name", default="steel", longest=80)
    tensile_strength: float = quantity("Tensile strength", "stress", 200.0, 3000.0, symbol="S_ut", default=650.0)
    yield_strength: float = quantity("Yield strength", "stress", 100.0, 3000.0, symbol="S_y", default=430.0)
    elastic_modulus: float = quantity("Elastic modulus", "modulus", 50e3, 300e3, symbol="E", default=206e3)
    poisson_ratio: float = quantity("Poisson's ratio", "ratio", 0.0, 0.49, symbol="ν", default=0.3)
    source: str = text("Source of the strengths", longest=200)


@dataclass(frozen=True)
class Duty:
    """How the shaft works."""

    label: ClassVar[str] = "Duty"
    turning: bool = switch(
        "Shaft turns",
        default=True,
        words="Loads are fixed in space: on a turning shaft they bend it to and fro at every turn; "
        "on one that stands still each load counts with its own mean and pulsation.",
    )
    temperature: float = quantity("Service temperature", "temperature", -40.0, 538.0, symbol="ϑ", default=20.0)


@dataclass(frozen=True)
class Judgement:
    """By which published rules the shaft is judged, and which factors are asked for."""

    label: ClassVar[str] = "Judgement"
    asked_factor: float = quantity("Asked factor, fatigue", "ratio", 1.0, 20.0, symbol="n_asked", default=1.5)
    asked_yield_factor: float = quantity("Asked factor, yield", "ratio", 1.0, 20.0, symbol="n_y,asked", default=1.5)
    mean_stress_rule: str = choice(
        "Mean-stress rule", (("goodman", "Goodman"), ("gerber", "Gerber")), default="goodman"
    )
    kt_source: str = choice(
        "Kt of shoulders and grooves from",
        (
            ("chart polynomial", "polynomial fits to the Peterson charts"),
            ("din 743-2", "closed form of DIN 743-2"),
        ),
        default="chart polynomial",
    )
    sensitivity: str = choice(
        "Notch sensitivity after", (("neuber", "Neuber"), ("peterson", "Peterson")), default="neuber"
    )
    finish_table: str = choice(
        "Finish factors from", (("older", "the older table"), ("newer", "the newer table")), default="older"
    )
    reliability: float = quantity("Reliability", "share", 0.5, 0.999999, symbol="R", default=0.99)
    user_factor: float = quantity("Own factor on the endurance limit", "ratio", 0.01, 2.0, symbol="k_f", default=1.0)
    user_factor_reason: str = text("Reason for the own factor", longest=300)
    notch_on_steady_torque: bool = switch(
        "Concentration also on steady torque",
        default=True,
        words="Whether Kfs multiplies the steady part of the torsion as well: the careful choice, and the usual one.",
    )
    notch_on_yield: bool = switch(
        "Concentration also in the yield check",
        default=True,
        words="Whether Kf and Kfs multiply the stresses compared with the yield strength: the careful choice.",
    )


@dataclass(frozen=True)
class Title:
    """What the sheet's title block says."""

    label: ClassVar[str] = "Title block"
    project: str = text("Project", longest=100)
    part: str = text("Part", longest=100)
    revision: str = text("Revision", longest=40)
    author: str = text("Author", longest=80)
    checker: str = text("Checker", longest=80)
    remarks: str = text("Remarks", longest=1000)


@dataclass(frozen=True)
class Shaft:
    """A whole shaft. Equal content makes equal shafts; replaced, never edited."""

    label: ClassVar[str] = "Shaft"
    title: Title = part("Title block", Title, default=Title())
    material: Material = part("Material", Material, default=Material())
    duty: Duty = part("Duty", Duty, default=Duty())
    judgement: Judgement = part("Judgement", Judgement, default=Judgement())
    segments: tuple[Segment, ...] = part("Segments, left to right", Segment, default=(), many=True)
    raisers: tuple[Raiser, ...] = part("Raisers on the segments", *RAISER_RECORDS, default=(), many=True)
    supports: tuple[Support, ...] = part(
        "Supports",
        Support,
        default=(),
        many=True,
        most=MOST_SUPPORTS,
        too_many="remove one, or join neighbours into one of their common stiffness",
    )
    loads: tuple[Load, ...] = part("Loads", *LOAD_RECORDS, default=(), many=True)

    @property
    def length(self) -> float:
        return sum(segment.length for segment in self.segments)


def things(shaft: Shaft) -> dict[str, Segment | Raiser | Support | Load]:
    """Everything on the shaft that has an id, by id."""
    return {
        thing.id: thing for group in (shaft.segments, shaft.raisers, shaft.supports, shaft.loads) for thing in group
    }
