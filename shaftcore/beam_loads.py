"""Reactions, internal forces, deflection and slope of the shaft as a beam.

Two bending planes (y up, z towards the viewer) and two load sets (mean, amplitude) are carried as
leading axes. Moments are positive where they stretch the lower side, V is the sum of forces to
the left, T the sum of torques to the left, N positive in tension. The section of the beam is the
plain one, grooves and fillets left out; a step stiffens in full from its face on.
"""

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from shaftcore.geometry import Profile
from shaftcore.notches._contract import Array
from shaftcore.section_properties import area, second_moment, shear_coefficient
from shaftcore.shaft import AxialForce, RadialForce, Shaft, Torque

_GAUSS_X, _GAUSS_W = (np.array(values) for values in np.polynomial.legendre.leggauss(3))
_GAUSS_X, _GAUSS_W = (_GAUSS_X + 1) / 2, _GAUSS_W / 2

ROUNDING = 1e-13
"""Share of the sum of all loads below which a sum of them is rounding."""


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

    def sums(self, x: Array, right: NDArray[np.bool_] | None = None) -> tuple[Array, Array]:
        """Sum of sizes, and of sizes times lever arm, of all loads left of each x.

        Loads at x itself count where `right` is true (everywhere if left out).
        """
        at, total, first_moment = self._sums
        count = np.searchsorted(at, x, "right")
        if right is not None:
            count = np.where(right, count, np.searchsorted(at, x, "left"))
        force = total.take(count, axis=-1)
        return force, force * x - first_moment.take(count, axis=-1)

    def felt(self, x: Array, right: NDArray[np.bool_]) -> tuple[Array, Array]:
        """As `sums`, with none where the loads cancel but for rounding: beyond the last load, say."""
        force, moment = self.sums(x, right)
        rounding = ROUNDING * np.abs(self.size).sum(-1, keepdims=True)
        reach = max(np.abs(x).max(), np.abs(self.x).max(initial=0.0))
        return np.where(np.abs(force) > rounding, force, 0.0), np.where(np.abs(moment) > rounding * reach, moment, 0.0)


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
    """Internal forces at points x (n) seen from their side (n).

    `x` must hold every face, load and support among its values, so that between neighbouring
    points the section and the loads are smooth. Raises numpy.linalg.LinAlgError where the
    supports leave the shaft free to move (checked before by `soundness`).
    """
    right = side > 0
    radial, bed = _radial_loads(shaft), bed_of(shaft)
    flexure = Flexure(shaft, profile, np.unique(x))
    reactions, deflection, slope = borne(flexure, radial, bed)
    carried = PointLoads(np.concatenate([radial.x, bed.x]), np.concatenate([radial.size, reactions], axis=-1))
    shear, moment = carried.felt(x, right)
    torque_loads, axial_loads, axial_reaction = _loads_along(shaft)
    at = np.searchsorted(flexure.x, x)
    return BeamLoads(
        x=x,
        side=side,
        shear=shear,
        moment=moment,
        normal=0.0 - axial_loads.felt(x, right)[0],
        torque=torque_loads.felt(x, right)[0],
        deflection=deflection[..., at],
        slope=slope[..., at],
        reactions=reactions,
        axial_reaction=axial_reaction,
        torque_left_over=torque_loads.size.sum(axis=-1),
    )


def bed_of(shaft: Shaft) -> Bed:
    """The supports as the beam feels them; offsets are fixed in space and steady, so they swing with nothing."""
    supports = shaft.supports
    stiffness = np.array([np.inf if s.stiffness is None else s.stiffness for s in supports])
    offset = np.zeros((2, 2, len(supports)))
    offset[0] = [[s.offset_y for s in supports], [s.offset_z for s in supports]]
    return Bed(np.array([s.x for s in supports]), stiffness, offset)


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
    """How the stepped beam bends, on a mesh x (m) whose intervals are smooth."""

    def __init__(self, shaft: Shaft, profile: Profile, x: Array) -> None:
        self.x = x
        self.step = np.diff(x)
        self.places = x[:-1, None] + self.step[:, None] * _GAUSS_X
        flat = self.places.ravel()
        segment = profile.segment_at(flat, np.ones_like(flat))
        d, bore = profile.diameter_at(flat, segment), profile.bore[segment]
        material = shaft.material
        modulus = material.elastic_modulus
        shear_modulus = modulus / (2 * (1 + material.poisson_ratio))
        shape = self.places.shape
        self.bending = (1 / (modulus * second_moment(d, bore))).reshape(shape)
        stiff = shear_modulus * shear_coefficient(d, bore, material.poisson_ratio) * area(d, bore)
        self.shearing = (1 / stiff).reshape(shape)

    def bend(self, loads: PointLoads) -> tuple[Array, Array]:
        """Deflection and slope (..., m) under `loads` where both are 0 at x[0].

        Three Gauss points an interval integrate M/EI: exact on a cylinder, and to rounding on the
        short intervals of a taper.
        """
        shear, moment = loads.sums(self.places.ravel())
        shape = (*shear.shape[:-1], *self.places.shape)
        curve = moment.reshape(shape) * self.bending
        slip = shear.reshape(shape) * self.shearing
        slope = _running(self.step * (curve @ _GAUSS_W))
        lift = slope[..., :-1] - slip @ _GAUSS_W + self.step * (curve @ (_GAUSS_W * (1 - _GAUSS_X)))
        return _running(self.step * lift), slope


def _running(values: Array) -> Array:
    sums = np.zeros((*values.shape[:-1], values.shape[-1] + 1))
    np.cumsum(values, axis=-1, out=sums[..., 1:])
    return sums


def borne(flexure: Flexure, loads: PointLoads, bed: Bed) -> tuple[Array, Array, Array]:
    """Reactions (set, plane, support), deflection and slope (set, plane, m) of the beam on its bed.

    By the force method: unknown are the reactions and the rigid-body deflection and slope at the
    left end; the equations are deflection = offset - R/k at each support, and force and moment
    balance. The bent line is the sum of what loads and reactions each do.
    """
    free, free_slope = flexure.bend(loads)
    unit, unit_slope = flexure.bend(PointLoads(bed.x, np.eye(len(bed.x))))
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
    matrix[n, :n], matrix[n + 1, :n] = 1.0, arm
    moment = (loads.size * (loads.x - begin) / length).sum(-1)
    known = [(bed.offset - free[..., at]) * scale, -loads.size.sum(-1)[..., None], -moment[..., None]]
    right = np.concatenate(known, axis=-1)
    solved = np.linalg.solve(matrix, right[..., None])[..., 0]
    reactions, start = solved[..., :n], solved[..., n:] / scale / np.array([1.0, length])
    # a shaft that only tilts on its offsets is carried by no force, not by what is left of large ones
    rounding = ROUNDING * np.abs(right).max(axis=-1, keepdims=True)
    return np.where(np.abs(reactions) > rounding, reactions, 0.0), start
