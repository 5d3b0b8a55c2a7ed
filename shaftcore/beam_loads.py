"""Reactions, internal forces, deflection and slope of the shaft as a beam.

Two bending planes (y up, z towards the viewer) and two load sets (mean, amplitude) are carried as
leading axes. Moments are positive where they stretch the lower side, V is the sum of forces to
the left, T the sum of torques to the left, N positive in tension. The section of the beam is the
plain one, grooves and fillets left out; a step stiffens in full from its face on.
"""

import math
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from shaftcore.geometry import Profile
from shaftcore.notches._contract import Array
from shaftcore.section_properties import area, second_moment, shear_coefficient
from shaftcore.shaft import AxialForce, RadialForce, Shaft, Torque

_GAUSS_X, _GAUSS_W = (np.array(values) for values in np.polynomial.legendre.leggauss(3))
_GAUSS_X = (_GAUSS_X + 1) / 2
_GAUSS_MOMENTS = _GAUSS_W / 2 * np.array([_GAUSS_X**0, _GAUSS_X, _GAUSS_X**2])
"""Weights of the integrals over an interval of length 1 of f, f s and f s²."""

ROUNDING = 1e-13
"""Share of the sum of all loads below which a sum of them is rounding."""

BALANCE_FIRST = 2.0**20
"""Weight of the equations of balance beside those of the bent line, whose entries are about 1: the
solver takes the heaviest first, and so the reactions balance the loads to rounding."""


@dataclass(frozen=True, eq=False)
class PointLoads:
    """Loads at places x (n) with any leading axes of `size` (..., n), as running sums."""

    x: Array
    size: Array

    @cached_property
    def _sums(self) -> tuple[Array, Array, Array]:
        """Places in order, running sums of sizes and of sizes times place."""
        order = np.argsort(self.x, kind="stable")
        x, size = self.x[order], self.size[..., order]
        return x, _running(size), _running(size * x)

    def passed(self, x: Array, right: NDArray[np.bool_] | None = None) -> tuple[Array, Array]:
        """Sum of sizes, and of sizes times place, of all loads left of each x.

        Loads at x itself count where `right` is true (everywhere if left out).
        """
        at, total, first_moment = self._sums
        count = np.searchsorted(at, x, "right")
        if right is not None:
            count = np.where(right, count, np.searchsorted(at, x, "left"))
        return total.take(count, axis=-1), first_moment.take(count, axis=-1)

    def felt(self, x: Array, right: NDArray[np.bool_]) -> tuple[Array, Array]:
        """Sum of sizes, and of sizes times lever arm, of all loads left of each x; none where they cancel
        but for rounding, beyond the last load, say."""
        force, first_moment = self.passed(x, right)
        moment = force * x - first_moment
        rounding = ROUNDING * np.abs(self.size).sum(-1, keepdims=True)
        reach = max(np.abs(x).max(), np.abs(self.x).max(initial=0.0))
        return np.where(np.abs(force) > rounding, force, 0.0), np.where(np.abs(moment) > rounding * reach, moment, 0.0)


def together(*sorts: PointLoads) -> PointLoads:
    """Loads of several sorts in one record: the rows of each (all leading axes in one) below those before."""
    rows = [math.prod(loads.size.shape[:-1]) for loads in sorts]
    size = np.zeros((sum(rows), sum(len(loads.x) for loads in sorts)))
    row = column = 0
    for count, loads in zip(rows, sorts, strict=True):
        ends = row + count, column + len(loads.x)
        size[row : ends[0], column : ends[1]] = loads.size.reshape(count, -1) if len(loads.x) else 0.0
        row, column = ends
    return PointLoads(np.concatenate([loads.x for loads in sorts]), size)


@dataclass(frozen=True, eq=False)
class Bed:
    """What the supports do to the beam: x, stiffness (N/mm, inf for rigid), offset (set, plane, support; mm)."""

    x: Array
    stiffness: Array
    offset: Array


@dataclass(frozen=True, eq=False)
class BeamLoads:
    """Everything the beam carries, at points x with their side (-1 left of x, +1 right).

    Axes: set (mean, amplitude), plane (y, z), point. N, T have no plane. Deflection (mm) and
    slope (rad, of the section) hold for mean loads and mean plus amplitude alike by set.
    `reactions` (set, plane, support) in N; `axial_reaction` and `torque_left_over` (set).
    """

    x: Array
    side: Array
    shear: Array
    moment: Array
    normal: Array
    torque: Array
    deflection: Array
    slope: Array
    reactions: Array
    axial_reaction: Array
    torque_left_over: Array


def beam_loads(shaft: Shaft, profile: Profile, x: Array, side: Array) -> BeamLoads:
    """Internal forces at points x (n, rising) seen from their side (n).

    `x` must hold every face, load and support among its values, so that between neighbouring
    points the section and the loads are smooth. Raises numpy.linalg.LinAlgError where the
    supports leave the shaft free to move (checked before by `soundness`).
    """
    right = side > 0
    radial, bed = _radial_loads(shaft), bed_of(shaft)
    fresh = np.concatenate([[True], x[1:] > x[:-1]])
    flexure, at = Flexure(shaft, profile, x[fresh]), np.cumsum(fresh) - 1
    reactions, deflection, slope = borne(flexure, radial, bed)
    carried = PointLoads(np.concatenate([radial.x, bed.x]), np.concatenate([radial.size, reactions], axis=-1))
    torque_loads, axial_loads, axial_reaction = _loads_along(shaft)
    force, moment = together(carried, axial_loads, torque_loads).felt(x, right)
    return BeamLoads(
        x=x,
        side=side,
        shear=force[:4].reshape(2, 2, -1),
        moment=moment[:4].reshape(2, 2, -1),
        normal=0.0 - force[4:6],
        torque=force[6:],
        deflection=deflection.take(at, axis=-1),
        slope=slope.take(at, axis=-1),
        reactions=reactions,
        axial_reaction=axial_reaction,
        torque_left_over=torque_loads.size.sum(axis=-1),
    )


def bed_of(shaft: Shaft) -> Bed:
    """The supports as the beam feels them; offsets are fixed in space and steady, so they swing with nothing."""
    supports = shaft.supports
    stiffness = np.array([np.inf if s.stiffness is None else s.stiffness for s in supports])
    none = [0.0] * len(supports)
    steady = [[s.offset_y for s in supports], [s.offset_z for s in supports]]
    return Bed(np.array([s.x for s in supports]), stiffness, np.array([steady, [none, none]]))


def _radial_loads(shaft: Shaft) -> PointLoads:
    """All forces pulsate in phase: each amplitude points the way its mean does, however that is written."""
    forces = [load for load in shaft.loads if isinstance(load, RadialForce)]
    size = np.array([[f.force, -f.amplitude if f.force < 0 else f.amplitude] for f in forces]).reshape(-1, 2).T
    angle = np.radians([f.angle for f in forces])
    planes = np.array([np.cos(angle), np.sin(angle)])
    planes[np.abs(planes) < ROUNDING] = 0.0  # a force straight down has no share across
    return PointLoads(np.array([f.x for f in forces]), size[:, None, :] * planes[None])


def _loads_along(shaft: Shaft) -> tuple[PointLoads, PointLoads, Array]:
    torques = [load for load in shaft.loads if isinstance(load, Torque)]
    axials = [load for load in shaft.loads if isinstance(load, AxialForce)]
    twist = np.array([[t.torque, t.amplitude] for t in torques]).reshape(-1, 2).T
    push = np.array([[a.force, a.amplitude] for a in axials]).reshape(-1, 2).T
    reaction = -push.sum(axis=1)
    held = [s.x for s in shaft.supports if s.locating][:1]
    at = np.array([a.x for a in axials] + held)
    push = np.concatenate([push, reaction[:, None]], axis=1) if held else push
    return PointLoads(np.array([t.x for t in torques], dtype=float), twist), PointLoads(at, push), reaction


class Flexure:
    """How the stepped beam bends, on a mesh x (mm) whose intervals are smooth.

    What an interval adds to slope and deflection is linear in the moment and the shear force at its
    left end. Three Gauss points an interval integrate 1/EI times powers of the distance s from
    there: exact on a cylinder, and to rounding on the short intervals of a taper.
    """

    def __init__(self, shaft: Shaft, profile: Profile, x: Array) -> None:
        self.x, step = x, np.diff(x)
        segment = profile.segment_at(x[:-1], np.ones(len(step)))
        d, bore = profile.diameter_at(x[:-1] + step * _GAUSS_X[:, None], segment), profile.bore[segment]
        modulus, poisson = shaft.material.elastic_modulus, shaft.material.poisson_ratio
        stiff = modulus / (2 * (1 + poisson)) * shear_coefficient(d, bore, poisson) * area(d, bore)
        # integrals over s of 1/EI, s/EI and s²/EI, each over a power of the step, and of 1/kGA
        plain, first, second = _GAUSS_MOMENTS @ (1 / (modulus * second_moment(d, bore)))
        slip = _GAUSS_MOMENTS[0] @ (1 / stiff)
        self.step = step
        self.slope_by_moment, self.slope_by_shear = step * plain, step**2 * first
        self.lift_by_moment = step**2 * (plain - first)
        self.lift_by_shear = step**3 * (first - second) - step * slip

    def bend(self, loads: PointLoads) -> tuple[Array, Array]:
        """Deflection and slope (..., m) under `loads` where both are 0 at x[0]."""
        shear, first_moment = loads.passed(self.x[:-1])
        moment = shear * self.x[:-1] - first_moment
        slope = _running(moment * self.slope_by_moment + shear * self.slope_by_shear)
        lift = slope[..., :-1] * self.step + moment * self.lift_by_moment + shear * self.lift_by_shear
        return _running(lift), slope


def _running(values: Array) -> Array:
    sums = np.zeros((*values.shape[:-1], values.shape[-1] + 1))
    np.cumsum(values, axis=-1, out=sums[..., 1:])
    return sums


def borne(flexure: Flexure, loads: PointLoads, bed: Bed) -> tuple[Array, Array, Array]:
    """Reactions (set, plane, support), deflection and slope (set, plane, m) of the beam on its bed.

    By the force method: unknown are the reactions and the rigid-body deflection and slope at the
    left end; the equations are deflection = offset - R/k at each support, and force and moment
    balance. The bent line is the sum of what loads and reactions each do, all bent in one call.
    """
    every, every_slope = flexure.bend(together(loads, PointLoads(bed.x, np.eye(len(bed.x)))))
    units, shape = len(bed.x), (*loads.size.shape[:-1], -1)
    free, free_slope = every[:-units].reshape(shape), every_slope[:-units].reshape(shape)
    unit, unit_slope = every[-units:], every_slope[-units:]
    reactions, start = _balance(flexure, loads, bed, free, unit)
    arm = flexure.x - flexure.x[0]
    deflection = free + reactions @ unit + start[..., :1] + start[..., 1:] * arm
    return reactions, deflection, free_slope + reactions @ unit_slope + start[..., 1:]


def _balance(flexure: Flexure, loads: PointLoads, bed: Bed, free: Array, unit: Array) -> tuple[Array, Array]:
    """Reactions (..., n) and rigid-body deflection and slope at x[0] (..., 2)."""
    n, begin, length = len(bed.x), flexure.x[0], flexure.x[-1] - flexure.x[0]
    at = np.searchsorted(flexure.x, bed.x)
    give = unit[:, at].T + np.diag(1 / bed.stiffness)
    scale = 1 / max(float(np.abs(give).max()), 1e-300)
    arm = (bed.x - begin) / length
    matrix = np.zeros((n + 2, n + 2))
    matrix[:n, :n] = give * scale
    matrix[:n, n], matrix[:n, n + 1] = 1.0, arm
    matrix[n, :n], matrix[n + 1, :n] = BALANCE_FIRST, BALANCE_FIRST * arm
    sums = [
        -BALANCE_FIRST * values.sum(-1)[..., None] for values in (loads.size, loads.size * (loads.x - begin) / length)
    ]
    known = np.concatenate([(bed.offset - free[..., at]) * scale, *sums], axis=-1)
    solved = np.linalg.solve(matrix, known.reshape(-1, n + 2).T).T.reshape(known.shape)
    reactions, start = solved[..., :n], solved[..., n:] / scale / np.array([1.0, length])
    if not bed.offset.any():
        return reactions, start
    # a shaft that only tilts on its offsets is carried by no force, not by what is left of large ones
    rounding = ROUNDING * np.abs(known[..., :n]).max(axis=-1, keepdims=True)
    return np.where(np.abs(reactions) > rounding, reactions, 0.0), start
