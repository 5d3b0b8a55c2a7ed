"""Kt, q and Kf of raisers on a shaft: Kf lies between 1 and Kt and never falls as the root gets sharper."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from notch_sizes import all_fits

from shaftcore.notch_factors import LOAD_ROWS, NotchFactors, notch_factors
from shaftcore.notch_sensitivity import fatigue_factor, sensitivity
from shaftcore.notches._contract import Site
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Judgement

KINDS_AND_SOURCES = sorted({(kind, source) for kind, source, _, _ in all_fits()})

KINK = 0.003
"""Where a fit passes a seam with a change of slope the peak may be missed by this share at most."""


def site(kind: str, ratio: float, r: float, d: float) -> Site:
    sizes = {"d": d, "D": d * ratio, "h": d * (ratio - 1) / 2, "r": r}
    return Site(kind, "here", 0.0, d, 0.0, "machined", sizes, (0.0, 0.0))


def factors_over(
    kind: str, judgement: Judgement, tensile: float, ratio: float, d: float, r: np.ndarray
) -> NotchFactors:
    return notch_factors([site(kind, ratio, radius, d) for radius in r], judgement, tensile)


@settings(max_examples=150, deadline=None)
@given(
    raiser=st.sampled_from(KINDS_AND_SOURCES),
    rule=st.sampled_from(["neuber", "peterson"]),
    tensile=st.floats(200, 3000),
    ratio=st.floats(1.005, 4.0),
    d=st.floats(3, 800),
)
def test_kf_never_falls_as_the_root_gets_sharper(
    raiser: tuple[str, str], rule: str, tensile: float, ratio: float, d: float
) -> None:
    kind, source = raiser
    r = np.geomspace(1e-3, d, 160)
    found = factors_over(kind, Judgement(kt_source=source, sensitivity=rule), tensile, ratio, d, r)
    bluntest_so_far = np.maximum.accumulate(found.kf[:, ::-1], axis=1)[:, ::-1]
    assert np.all(found.kf >= bluntest_so_far * (1 - KINK))
    assert np.all(found.kf >= 1)
    kt_at_most = np.maximum.accumulate(found.kt[:, ::-1], axis=1)[:, ::-1]
    # a held Kf may pass the own Kt only where the published fit itself drops at a seam, 4.5 % at most
    assert np.all(found.kf <= np.maximum(kt_at_most, found.kt * 1.045) * (1 + 1e-9))
    assert np.all(found.kf[~found.held] <= found.kt[~found.held] * (1 + 1e-12))
    assert np.all((found.q > 0) & (found.q < 1))


@pytest.mark.parametrize(("kind", "source"), KINDS_AND_SOURCES)
@pytest.mark.parametrize("tensile", [200.0, 600.0, 3000.0])
def test_the_peak_of_peterson_is_found_within_a_thousandth(kind: str, source: str, tensile: float) -> None:
    """Against a search over 20000 radii; weak steel peaks near 1.7 mm, strong steel near 0.01 mm."""
    judgement = Judgement(kt_source=source, sensitivity="peterson")
    sharp = factors_over(kind, judgement, tensile, 1.3, 60.0, np.array([1e-3]))
    r = np.geomspace(1e-3, 10.0, 20000)
    sizes = {"d": np.full_like(r, 60.0), "D": np.full_like(r, 78.0), "h": np.full_like(r, 9.0), "r": r}
    for sort, row in LOAD_ROWS.items():
        q = sensitivity("peterson", r, tensile, sort == "torsion")
        searched = fatigue_factor(np.maximum(KINDS[kind].fits[source][sort].value(sizes), 1), q)
        assert sharp.kf[row, 0] == pytest.approx(searched.max(), rel=1e-3)
        assert sharp.held[row, 0]
        assert sharp.radius[row, 0] == pytest.approx(r[searched.argmax()], rel=0.1)


def test_a_blunt_root_is_not_held() -> None:
    found = factors_over("shoulder", Judgement(), 650.0, 1.3, 50.0, np.array([2.0, 5.0]))
    assert not found.held.any()
    assert found.radius == pytest.approx(np.array([[2.0, 5.0]] * 3))
    assert found.kf == pytest.approx(1 + found.q * (found.kt - 1))


def test_a_jump_of_the_fit_is_held_too() -> None:
    """The groove polynomial drops by 4.4 % at h/r = 2; a search for a radius must not find a false root there."""
    d, ratio = 50.0, 3.0
    seam = d * (ratio - 1) / 4
    found = factors_over("groove", Judgement(), 1200.0, ratio, d, seam * np.array([1.0 + 1e-6, 1 - 1e-3]))
    assert found.kt[0, 1] < found.kt[0, 0] * 0.96
    assert found.held[0].tolist() == [False, True]
    assert found.kf[0, 1] >= found.kf[0, 0]


def test_outside_and_shortfall_are_reported() -> None:
    found = factors_over("shoulder", Judgement(), 650.0, 1.5, 100.0, np.array([1.0, 5.0, 10.0]))
    assert found.outside[LOAD_ROWS["bending"]].tolist() == [True, False, False]
    assert found.outside[LOAD_ROWS["torsion"]].tolist() == [True, True, False]
    low = dict(KINDS["shoulder"].fits["chart polynomial"]["bending"].low_by)
    assert found.low_by[0] == pytest.approx([low[0.01], low[0.05], low[0.1]])


def test_a_plain_section_is_left_alone() -> None:
    found = notch_factors([None, site("groove", 1.2, 1.0, 40.0), None], Judgement(), 650.0)
    assert found.kt[:, [0, 2]].tolist() == [[1.0, 1.0]] * 3
    assert found.kf[:, [0, 2]].tolist() == [[1.0, 1.0]] * 3
    assert np.all(found.kf[:, 1] > 1.2)
