"""Refusals name things as the window does."""

from app.refusal import refusal_words
from shaftcore.records import Problem
from shaftcore.shaft import RadialForce, Segment, Shaft, Shoulder, Support

SHAFT = Shaft(
    segments=(Segment("seat", shoulder=Shoulder(radius=2.0)), Segment("body", diameter=60.0)),
    supports=(Support("A"),),
    loads=(RadialForce("F1"),),
)


def _words(path: str) -> str:
    return refusal_words(SHAFT, Problem(path, "9 mm", "0 to 5 mm", "reduce it"))


def test_places_are_named_by_label_and_id() -> None:
    assert _words("segments[1].length_mm") == "Segment body, length: 9 mm; allowed is 0 to 5 mm. Reduce it."
    assert _words("segments[0].shoulder.radius_mm").startswith(
        "Segment seat, shoulder at the right-hand face, fillet radius: "
    )
    assert _words("segments[0].shoulder").startswith("Segment seat, shoulder at the right-hand face: ")
    assert _words("loads[0].force_N").startswith("Radial force F1, force: ")
    assert _words("material.tensile_strength_MPa").startswith("Material, tensile strength: ")
    assert _words("supports").startswith("Supports: ")
    assert _words("").startswith("The shaft: ")


def test_a_path_that_leads_nowhere_is_borne() -> None:
    assert _words("segments[7].length_mm").startswith("The shaft: ")
    assert _words("nonsense").startswith("The shaft: ")
