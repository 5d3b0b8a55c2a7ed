"""From nominal stresses and fatigue factors to n and margin, at any points of the shaft at once."""

import numpy as np
from numpy.typing import NDArray

from shaftcore.beam_loads import BeamLoads
from shaftcore.equivalent_stress import (
    Fatigue,
    Nominal,
    axial_alone,
    equivalent_amplitude,
    equivalent_mean,
    greatest_stress,
    torsion_alternates,
)
from shaftcore.mean_stress_rules import RULES, yield_factor
from shaftcore.notches._contract import Array
from shaftcore.results import Judged, Strength
from shaftcore.section_properties import area, bending_modulus, torsion_modulus
from shaftcore.shaft import Shaft
from shaftcore.strength_factors import (
    finish_factors,
    plain_endurance,
    reliability_factor,
    size_diameter,
    size_factor,
    temperature_factor,
)


def station_stresses(loads: BeamLoads, point: NDArray[np.intp], d: Array, bore: Array, turning: bool) -> Nominal:
    """Nominal stresses (MPa) on net sections `d`, `bore` (n) under what the beam carries at points (n) of `loads`.

    On a turning shaft a load fixed in space bends every fibre to and fro, so the whole moment,
    pulsation included, is amplitude. On one that stands still mean and pulsation count apart,
    both taken at the fibre that has the most of each.
    """
    moment = np.hypot(loads.moment[:, 0], loads.moment[:, 1])
    bending = moment.take(point, axis=-1) / bending_modulus(d, bore)
    axial = loads.normal.take(point, axis=-1) / area(d, bore)
    torsion = np.abs(loads.torque.take(point, axis=-1)) / torsion_modulus(d, bore)
    return Nominal(
        bending_amplitude=bending[0] + bending[1] if turning else bending[1],
        bending_mean=np.zeros_like(bending[0]) if turning else bending[0],
        axial_amplitude=np.abs(axial[1]),
        axial_mean=axial[0],
        torsion_amplitude=torsion[1],
        torsion_mean=torsion[0],
    )


def strength_at(shaft: Shaft, d: Array, finish: NDArray[np.intp], nominal: Nominal) -> Strength:
    """Endurance limit at each point: `finish` numbers the finishes as in `surface.FINISHES`.

    A size factor belongs to what alternates there, hence the stresses.
    """
    judgement, tensile = shaft.judgement, shaft.material.tensile_strength
    plain = plain_endurance(tensile)
    ka = finish_factors(judgement.finish_table, tensile)[finish]
    size = size_diameter(d, shaft.duty.turning, torsion_alternates(nominal))
    kb = size_factor(size, axial_alone(nominal))
    kd = temperature_factor(shaft.duty.temperature)
    ke = reliability_factor(judgement.reliability)
    endurance = ka * kb * (kd * ke * judgement.user_factor * plain)
    return Strength(plain, ka, kb, size, 1.0, kd, ke, judgement.user_factor, endurance)


def judge(shaft: Shaft, nominal: Nominal, fatigue: Fatigue, d: Array, bore: Array, finish: NDArray[np.intp]) -> Judged:
    """n, margins and utilisation at points given by net section, stresses and fatigue factors."""
    judgement, material = shaft.judgement, shaft.material
    strength = strength_at(shaft, d, finish, nominal)
    amplitude = equivalent_amplitude(nominal, fatigue)
    mean = equivalent_mean(nominal, fatigue, judgement.notch_on_steady_torque)
    greatest = greatest_stress(nominal, fatigue, judgement.notch_on_yield)
    rule = RULES[judgement.mean_stress_rule]
    n = rule.factor(amplitude, mean, strength.endurance, material.tensile_strength, material.yield_strength)
    n_yield = yield_factor(greatest, material.yield_strength)
    asked, asked_yield = judgement.asked_factor, judgement.asked_yield_factor
    return Judged(
        d=d,
        bore=bore,
        finish=finish,
        nominal=nominal,
        amplitude=amplitude,
        mean=mean,
        greatest=greatest,
        strength=strength,
        n=n,
        margin=n / asked - 1,
        n_yield=n_yield,
        yield_margin=n_yield / asked_yield - 1,
        utilisation=np.maximum(asked / n, asked_yield / n_yield),
    )
