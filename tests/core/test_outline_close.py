"""What is drawn of a raiser seen closely: other sizes, the edge beside it, the ring that seats there."""

import numpy as np
import pytest

from shaftcore import edits
from shaftcore.notch_sites import Seating, seatings
from shaftcore.outline import outline_between, outline_with, ring_corner, upper_outline
from shaftcore.shaft import Shaft


def stepped(left: float, right: float, corner: float | None) -> tuple[Shaft, Seating]:
    shaft = edits.add_segment(edits.add_segment(Shaft(), 40.0, left), 50.0, right)
    shaft = edits.replace_shoulder(shaft, "s1", radius=1.0, bearing_corner=corner)
    return shaft, seatings(shaft)[0]


@pytest.mark.parametrize(("left", "right", "along"), [(30.0, 40.0, -1.0), (40.0, 30.0, 1.0)])
def test_the_corner_of_a_ring_is_an_arc_between_seat_and_face(left: float, right: float, along: float):
    """ISO 582: the arc touches bore and side face, its radius is the corner dimension."""
    points = ring_corner(stepped(left, right, 2.0)[1])
    assert points is not None
    arc = points[1:-1]
    centre = np.array([40.0 + along * 2.0, 15.0 + 2.0])
    assert np.hypot(*(arc - centre).T) == pytest.approx(2.0)
    assert arc[0] == pytest.approx([40.0 + along * 2.0, 15.0])
    assert arc[-1] == pytest.approx([40.0, 17.0])
    assert points[0, 1] == 15.0
    assert points[-1, 0] == 40.0


@pytest.mark.parametrize(("radius", "rides"), [(1.9, False), (2.0, False), (2.2, True)])
def test_a_ring_rides_on_a_fillet_larger_than_its_corner(radius: float, rides: bool):
    _, seating = stepped(30.0, 40.0, 2.0)
    ring, fillet = ring_corner(seating), outline_with(seating, "radius", radius)
    assert ring is not None
    centre = np.array([ring[1, 0], ring[-2, 1]])
    in_corner = np.all((fillet - centre) * (1, -1) >= 0, axis=1)
    assert bool(np.any(np.hypot(*(fillet[in_corner] - centre).T) < 2.0 - 1e-9)) == rides


def test_without_a_corner_no_ring_is_drawn():
    assert ring_corner(stepped(30.0, 40.0, None)[1]) is None


def test_the_edge_beside_a_raiser_is_the_shafts_own():
    shaft, seating = stepped(30.0, 40.0, None)
    assert outline_between(shaft, seating) == pytest.approx(upper_outline(shaft))
    grooved, id = edits.add_raiser(shaft, "groove", 65.0)
    groove = next(s for s in seatings(grooved) if s.place == id)
    between = outline_between(grooved, groove)
    assert between[0] == pytest.approx([40.0, 20.0])
    assert between[-1] == pytest.approx([90.0, 20.0])
    assert between[1:-1] == pytest.approx(groove.kind.outline(groove.record, groove.around))
