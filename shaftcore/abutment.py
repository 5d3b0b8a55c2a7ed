"""How large a fillet may be where a rolling bearing seats against the shoulder.

Bearing corner r_s,min -> largest shaft fillet r_a,max and smallest abutment height h_min, mm
(DIN 5418, ISO 582, bearing catalogues; written from memory, makers differ by about 0.3 mm in height).
"""

CORNERS: tuple[tuple[float, float, float], ...] = (
    (0.15, 0.15, 0.6),
    (0.2, 0.2, 0.8),
    (0.3, 0.3, 1.0),
    (0.6, 0.6, 2.0),
    (1.0, 1.0, 2.5),
    (1.1, 1.0, 3.25),
    (1.5, 1.5, 4.0),
    (2.0, 2.0, 4.5),
    (2.1, 2.0, 5.5),
    (3.0, 2.5, 6.5),
    (4.0, 3.0, 8.0),
    (5.0, 4.0, 10.0),
    (6.0, 5.0, 13.0),
    (7.5, 6.0, 16.0),
    (9.5, 8.0, 20.0),
)


def largest_fillet(corner: float) -> float:
    """r_a,max (mm) for a bearing corner: the row of the largest tabulated corner not above it."""
    return _row(corner)[1]


def least_abutment(corner: float) -> float:
    """h_min (mm) for a bearing corner."""
    return _row(corner)[2]


def _row(corner: float) -> tuple[float, float, float]:
    return max((row for row in CORNERS if row[0] <= corner), default=CORNERS[0])
