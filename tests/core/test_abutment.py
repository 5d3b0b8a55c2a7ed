"""Bearing corners: rows of DIN 5418 and ISO 582 (from memory) and the laws the table must obey."""

import numpy as np
import pytest

from shaftcore.abutment import CORNERS, largest_fillet, least_abutment


@pytest.mark.parametrize(
    ("corner", "fillet", "abutment"),
    [
        (0.3, 0.3, 1.0),
        (0.6, 0.6, 2.0),
        (1.1, 1.0, 3.25),
        (1.5, 1.5, 4.0),
        (2.1, 2.0, 5.5),
        (3.0, 2.5, 6.5),
        (4.0, 3.0, 8.0),
    ],
)
def test_rows(corner: float, fillet: float, abutment: float) -> None:
    """Rows that stand alike in every rolling-bearing catalogue."""
    assert largest_fillet(corner) == fillet
    assert least_abutment(corner) == abutment


def test_the_whole_table_is_the_printed_one() -> None:
    """Typed a second time from the standard's columns as handed down, to catch a slip of the keys."""
    corners = [0.15, 0.2, 0.3, 0.6, 1, 1.1, 1.5, 2, 2.1, 3, 4, 5, 6, 7.5, 9.5]
    fillets = [0.15, 0.2, 0.3, 0.6, 1, 1, 1.5, 2, 2, 2.5, 3, 4, 5, 6, 8]
    heights = [0.6, 0.8, 1, 2, 2.5, 3.25, 4, 4.5, 5.5, 6.5, 8, 10, 13, 16, 20]
    assert [list(column) for column in zip(*CORNERS, strict=True)] == [corners, fillets, heights]


def test_a_fillet_never_exceeds_its_corner_and_grows_with_it() -> None:
    corner, fillet, height = np.array(CORNERS).T
    assert np.all(fillet <= corner)
    assert np.all(np.diff(corner) > 0)
    assert np.all(np.diff(fillet) >= 0)
    assert np.all(np.diff(height) > 0)
    assert np.all(height > fillet), "else no flat face is left to seat against"


def test_between_rows_the_smaller_corner_counts() -> None:
    assert largest_fillet(2.9) == largest_fillet(2.1)
    assert largest_fillet(20.0) == 8.0
    assert largest_fillet(0.15) == 0.15
