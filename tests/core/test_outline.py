"""The outline that bench and sheet draw: geometry any drawing office could check with a compass."""

import numpy as np
import pytest

from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.outline import bore_outline, upper_outline
from shaftcore.shaft import Segment, Shaft


def stepped(radius: float = 2.0) -> Shaft:
    return Shaft(
        segments=(
            Segment("a", length=40.0, diameter=30.0, shoulder=Shoulder(radius)),
            Segment("b", length=60.0, diameter=50.0, bore=10.0),
            Segment("c", length=30.0, diameter=50.0, end_diameter=36.0),
        ),
        raisers=(Groove("g", x=70.0, depth=3.0, radius=2.0),),
    )


def test_runs_from_end_to_end_left_to_right() -> None:
    points = upper_outline(stepped())
    assert tuple(points[0]) == (0.0, 15.0)
    assert tuple(points[-1]) == (130.0, 18.0)
    assert np.all(np.diff(points[:, 0]) >= -1e-12)


def test_fillet_points_lie_on_its_circle() -> None:
    """Circle of radius r, tangent to the thin segment and to the face: centre (x_face - r, d/2 + r)."""
    points = upper_outline(stepped(2.0))
    arc = points[(points[:, 0] > 38.0 + 1e-9) & (points[:, 0] < 40.0 - 1e-9) & (points[:, 1] < 17.0)]
    assert len(arc) > 10
    np.testing.assert_allclose(np.hypot(arc[:, 0] - 38.0, arc[:, 1] - 17.0), 2.0, rtol=1e-12)
    assert arc[:, 1].min() >= 15.0


def test_fillet_sits_on_the_thin_side_whichever_way_the_step_goes() -> None:
    down = Shaft(segments=(Segment("a", 40.0, 50.0, shoulder=Shoulder(2.0)), Segment("b", 60.0, 30.0)))
    points = upper_outline(down)
    assert np.all(points[points[:, 0] < 40.0][:, 1] == 25.0)
    arc = points[(points[:, 0] > 40.0 + 1e-9) & (points[:, 0] < 42.0 - 1e-9)]
    np.testing.assert_allclose(np.hypot(arc[:, 0] - 42.0, arc[:, 1] - 17.0), 2.0, rtol=1e-12)


def test_groove_reaches_its_depth_and_stays_a_circle() -> None:
    """A round groove deeper than its radius: half a circle about (x, root + r) between upright flanks."""
    points = upper_outline(stepped())
    inside = points[np.abs(points[:, 0] - 70.0) < 2.0 - 1e-9]
    assert points[np.argmin(np.abs(points[:, 0] - 70.0)), 1] == pytest.approx(22.0, abs=1e-12)
    np.testing.assert_allclose(np.hypot(inside[:, 0] - 70.0, inside[:, 1] - 24.0), 2.0, rtol=1e-12)


def test_taper_is_straight_between_its_ends() -> None:
    points = upper_outline(stepped())
    after = points[points[:, 0] >= 100.0 - 1e-9]
    np.testing.assert_allclose(np.interp(115.0, after[:, 0], after[:, 1]), (25.0 + 18.0) / 2)


def test_step_without_a_shoulder_is_a_sharp_corner() -> None:
    points = upper_outline(Shaft(segments=(Segment("a", 40.0, 30.0), Segment("b", 60.0, 50.0))))
    assert points.tolist() == [[0.0, 15.0], [40.0, 15.0], [40.0, 25.0], [100.0, 25.0]]


def test_outline_has_the_volume_of_the_solid_it_bounds() -> None:
    """Cone frustum after the school formula π h (R² + R r + r²)/3, the outline turned round the axis."""
    shaft = Shaft(segments=(Segment("a", 40.0, 50.0), Segment("b", 30.0, 50.0, end_diameter=36.0)))
    x, r = upper_outline(shaft).T
    turned = np.sum(np.pi * np.diff(x) * (r[1:] ** 2 + r[1:] * r[:-1] + r[:-1] ** 2) / 3)
    assert turned == pytest.approx(np.pi * 25**2 * 40 + np.pi * 30 * (25**2 + 25 * 18 + 18**2) / 3)


def test_bore_follows_the_segments() -> None:
    assert bore_outline(stepped()).tolist() == [[0, 0], [40, 0], [40, 5], [100, 5], [100, 0], [130, 0]]


def test_shaft_without_segments_has_no_outline() -> None:
    assert upper_outline(Shaft()).shape == (0, 2)
    assert bore_outline(Shaft()).shape == (0, 2)
