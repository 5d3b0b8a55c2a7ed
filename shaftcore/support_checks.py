"""Notices of the supports: one that carries hardly anything, and more than two that must stand in line."""

import math
import operator
from collections.abc import Iterator, Sequence

import numpy as np

from shaftcore.beam_loads import BeamLoads, Bed, Flexure, PointLoads, bed_of, borne
from shaftcore.geometry import profile_of
from shaftcore.notches._contract import Array
from shaftcore.phrase import Phrase
from shaftcore.records import Notice
from shaftcore.shaft import Shaft
from shaftcore.stations import Station

HARDLY_LOADED = 0.01
"""Share of the largest reaction below which a support counts as unloaded (common practice, no source)."""

OUT_OF_LINE = 0.01
"""Offset (mm) of a seat that good workmanship leaves (common practice, no source)."""

ALIGNMENT_WORTH_SAYING = 0.05
"""Share of the largest moment that such an offset must add before it is worth a notice."""


def support_notices(shaft: Shaft, stations: Sequence[Station], loads: BeamLoads) -> Iterator[Notice]:
    """All notices of the supports; `loads` run along the shaft."""
    yield from _hardly_loaded(shaft, stations, loads)
    if len(shaft.supports) > 2:
        yield from _sensitive_to_alignment(shaft, loads)


def carried(loads: BeamLoads) -> list[float]:
    """The most each support carries across the shaft (N): mean and pulsation together."""
    (mean_y, mean_z), (swing_y, swing_z) = loads.reactions.tolist()
    return list(map(operator.add, map(math.hypot, mean_y, mean_z), map(math.hypot, swing_y, swing_z)))


def moment_out_of_line(shaft: Shaft, loads: BeamLoads, offset: float) -> Array:
    """Bending moment (N·mm) at the points of `loads` that inner supports add, each `offset` mm out of line.

    All inner supports are off at once, each the way that is worst there.
    """
    bed = bed_of(shaft)
    order = np.argsort(bed.x)
    inner = offset * np.eye(len(bed.x))[order[1:-1]]
    flexure = Flexure(shaft, profile_of(shaft), np.unique(loads.x))
    none = PointLoads(np.zeros(0), np.zeros((len(inner), 0)))
    reactions = borne(flexure, none, Bed(bed.x, bed.stiffness, inner))[0]
    moment = PointLoads(bed.x, reactions).felt(loads.x, loads.side > 0)[1]
    result: Array = np.abs(moment).sum(axis=0)
    return result


def _hardly_loaded(shaft: Shaft, stations: Sequence[Station], loads: BeamLoads) -> Iterator[Notice]:
    force = carried(loads)
    most = force.index(max(force))
    little = [row for row, size in enumerate(force) if size < HARDLY_LOADED * force[most]]
    where = {x: i for i, station in enumerate(stations) for x in (station.x, *station.also)} if little else {}
    for row in little:
        support, other = shaft.supports[row], shaft.supports[most]
        words = (
            f"Support {support.name or support.id} carries {{:force}} across the shaft, less than "
            f"{HARDLY_LOADED:.0%} of the {{:force}} at {other.name or other.id}. A rolling bearing may skid there, and "
            "small changes of load or alignment change which way it is loaded."
        )
        quantities = (force[row], force[most])
        yield Notice("unloaded support", Phrase(words, quantities), support.id, where[support.x])


def _sensitive_to_alignment(shaft: Shaft, loads: BeamLoads) -> Iterator[Notice]:
    largest = float(np.hypot(loads.moment[:, 0], loads.moment[:, 1]).sum(axis=0).max())
    added = float(moment_out_of_line(shaft, loads, OUT_OF_LINE).max())
    if largest > 0 and added > ALIGNMENT_WORTH_SAYING * largest:
        words = (
            f"{len(shaft.supports)} supports must stand in line: with each inner one {{:length}} off the line of the "
            f"others, the worse way, up to {{:torque}} of bending moment is added, {added / largest:.0%} of the "
            "largest there is. Enter the offsets that are to be expected, or see to the alignment."
        )
        yield Notice("sensitive to alignment", Phrase(words, (OUT_OF_LINE, added)))
