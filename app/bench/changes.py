"""Where two pictures differ, so that a live picture is painted anew only there."""

import math
from typing import TYPE_CHECKING

import numpy as np

if TYPE_CHECKING:
    from app.bench.drawing import Drawing

SPARE = 8
"""Pixels beside a raiser that its lines and the faces that seat there may take."""


def changed_columns(now: "Drawing", before: "Drawing") -> tuple[int, int] | None:
    """The pixels of x from and up to which shaft, marks and foot differ; None where all of them may.

    Marks are the same ones only while the view, plain sizes and the choice are: then nothing but
    raisers, colours, ticks and the chosen station's line is left to differ.
    """
    same_lines = now.station_x == before.station_x and np.array_equal(now.columns > 1, before.columns > 1)
    seated, seated_before = now.stage.plan.seated, before.stage.plan.seated
    if not (now.same_over(before) and same_lines and len(seated) == len(seated_before)):
        return None
    pairs = zip(seated, seated_before, strict=True)
    moved = [s for pair in pairs if pair[0].record != pair[1].record for s in pair]
    places = [now.stage.frame.x(x) for seating in moved for x in seating.site.span]
    recoloured = np.flatnonzero(now.colours != before.colours) / now.stage.pixel_ratio
    if len(recoloured):
        places += [float(recoloured[0]), float(recoloured[-1])]
    if not places:
        return 0, 0
    return math.floor(min(places)) - SPARE, math.ceil(max(places)) + SPARE
