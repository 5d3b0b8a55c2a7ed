"""The beam against anaStruct, a general solver for plane frames (slope-deflection elements, no shear).

Each plane is solved on its own there, with one element between neighbouring faces, loads and
supports. What shear adds to deflection and slope is taken out by hand: under shear force V alone a
cross-section slips by -V/(k G A) a length, and the slip line is turned so that it meets the supports.
"""

import itertools
import math

import numpy as np
import pytest
from anastruct import SystemElements
from hypothesis import assume, given, settings
from hypothesis import strategies as st
from sound_shafts import sound_shafts

from shaftcore.evaluation import evaluate
from shaftcore.geometry import profile_of
from shaftcore.section_properties import area, second_moment, shear_coefficient
from shaftcore.shaft import RadialForce, Shaft

AXIAL_STIFFNESS = 1e9


def nodes_of(shaft: Shaft, forces: list[RadialForce]) -> np.ndarray:
    """x of every face, support and force."""
    return np.unique([*profile_of(shaft).faces, *(s.x for s in shaft.supports), *(f.x for f in forces)])


def frame(shaft: Shaft, x: np.ndarray, forces: list[RadialForce], plane: int) -> SystemElements:
    """The solved frame of one plane under the mean forces, with nodes x."""
    profile, system = profile_of(shaft), SystemElements()
    for begin, end in itertools.pairwise(x):
        segment = profile.segment_at(np.array([(begin + end) / 2]), np.ones(1))
        inertia = second_moment(profile.left[segment], profile.bore[segment])[0]
        system.add_element([[begin, 0], [end, 0]], EI=shaft.material.elastic_modulus * inertia, EA=AXIAL_STIFFNESS)
    node = {place: i for i, place in enumerate(x.tolist(), start=1)}
    first, second = sorted(shaft.supports, key=lambda s: s.x)
    system.add_support_hinged(node[first.x])
    system.add_support_roll(node[second.x])
    at: dict[float, float] = {}
    for f in forces:
        at[f.x] = at.get(f.x, 0.0) + upward(f, plane)
    for place, size in at.items():
        system.point_load(node[place], Fy=size)
    system.solve()
    return system


def upward(f: RadialForce, plane: int) -> float:
    return f.force * (math.cos, math.sin)[plane](math.radians(f.angle))


def slip(shaft: Shaft, x: np.ndarray, shear: np.ndarray) -> tuple[np.ndarray, float]:
    """Deflection at nodes x by shear alone, and the turn of the whole shaft that goes with it."""
    profile, material = profile_of(shaft), shaft.material
    segment = profile.segment_at((x[:-1] + x[1:]) / 2, np.ones(len(x) - 1))
    d, bore = profile.left[segment], profile.bore[segment]
    stiff = material.elastic_modulus / (2 + 2 * material.poisson_ratio) * area(d, bore)
    stiff = stiff * shear_coefficient(d, bore, material.poisson_ratio)
    line = np.concatenate([[0.0], np.cumsum(-shear * np.diff(x) / stiff)])
    (a, at_a), (b, at_b) = ((s.x, line[np.searchsorted(x, s.x)]) for s in shaft.supports)
    turn = -(at_b - at_a) / (b - a)
    return line - at_a + turn * (x - a), turn


@settings(max_examples=120, deadline=None)
@given(sound_shafts(tapers=False, grooves=False, axial=False), st.sampled_from([0, 1]))
def test_stepped_shafts_bend_as_the_frame_does(shaft: Shaft, plane: int):
    forces = [load for load in shaft.loads if isinstance(load, RadialForce)]
    x = nodes_of(shaft, forces)
    assume(any(abs(upward(f, plane)) > 1 for f in forces))
    assume(np.diff(x).min() > 0.004 * shaft.length)  # the frame loses digits where stubby elements meet long ones
    loads, system = evaluate(shaft).along, frame(shaft, x, forces, plane)
    rows = np.searchsorted(loads.x, x, "right") - 1
    nodes = [system.get_node_results_system(i) for i in range(1, len(x) + 1)]

    for i, support in enumerate(shaft.supports):
        reaction = -nodes[int(np.searchsorted(x, support.x))]["Fy"]
        assert loads.reactions[0, plane, i] == pytest.approx(reaction, abs=1e-6 * _bulk(loads.reactions))

    inner = range(1, len(x) - 1)
    for i in inner:  # anaStruct's y points down, so its moments have the other sign, as have its turns
        moment = -system.get_element_results(i + 1, verbose=True)["M"][0]
        assert loads.moment[0, plane, rows[i]] == pytest.approx(moment, abs=1e-6 * _bulk(loads.moment))

    by_shear, turn = slip(shaft, x, loads.shear[0, plane, rows[:-1]])
    lift = np.array([-node["uy"] for node in nodes]) + by_shear
    np.testing.assert_allclose(loads.deflection[0, plane, rows], lift, atol=1e-6 * _bulk(loads.deflection))
    slope = np.array([-node["phi_z"] for node in nodes]) + turn
    np.testing.assert_allclose(loads.slope[0, plane, rows], slope, atol=1e-6 * _bulk(loads.slope))


def _bulk(values: np.ndarray) -> float:
    return float(np.abs(values[0]).max()) + 1e-9
