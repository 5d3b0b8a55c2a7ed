"""The beam against Pynite, a general solver for space frames (slender elements, no shear).

Each plane is solved on its own there, with one element between neighbouring faces, loads and
supports. Shear is put in by hand: under shear force V alone a cross-section slips by -V/(k G A) a
length. The seats are moved against this slip, so that the frame, bent alone, meets them only if
it finds the same reactions; then the slip is added to what it finds for the deflection.
"""

import itertools
import math

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st
from Pynite import FEModel3D
from sound_shafts import sound_shafts

from shaftcore.evaluation import evaluate
from shaftcore.geometry import profile_of
from shaftcore.section_properties import area, second_moment, shear_coefficient
from shaftcore.shaft import RadialForce, Shaft

NOTHING = 1e-9
"""Deflection (mm), slope (rad), moment (of reaction times length) that are none: rounding where nothing bends."""

CASE = "Combo 1"
"""The name Pynite gives the one load combination there is."""


def nodes_of(shaft: Shaft, forces: list[RadialForce]) -> np.ndarray:
    """x of every face, support and force."""
    return np.unique([*profile_of(shaft).faces, *(s.x for s in shaft.supports), *(f.x for f in forces)])


def frame(shaft: Shaft, x: np.ndarray, forces: list[RadialForce], plane: int, seats: list[float]) -> FEModel3D:
    """The solved frame of one plane under the mean forces on `seats`, with nodes x and members between them.

    A spring on a seat that is off by s pushes with c s where the shaft does not give.
    """
    profile, model = profile_of(shaft), FEModel3D()
    modulus = shaft.material.elastic_modulus
    model.add_material("steel", modulus, modulus / (2 + 2 * shaft.material.poisson_ratio), 0.3, 1.0)
    for i, place in enumerate(x):
        model.add_node(f"N{i}", place, 0, 0)
    for i, (begin, end) in enumerate(itertools.pairwise(x)):
        segment = profile.segment_at(np.array([(begin + end) / 2]), np.ones(1))
        d, bore = profile.left[segment], profile.bore[segment]
        inertia = second_moment(d, bore)[0]
        model.add_section(f"S{i}", area(d, bore)[0], inertia, inertia, 2 * inertia)
        model.add_member(f"M{i}", f"N{i}", f"N{i + 1}", "steel", f"S{i}")
    for i, (support, seat) in enumerate(zip(shaft.supports, seats, strict=True)):
        node = f"N{int(np.searchsorted(x, support.x))}"
        model.def_support(node, i == 0, support.stiffness is None, True, i == 0, False, False)
        if support.stiffness is None:
            model.def_node_disp(node, "DY", seat)
        else:
            model.def_support_spring(node, "DY", support.stiffness)
            model.add_node_load(node, "FY", support.stiffness * seat)
    for f in forces:
        model.add_node_load(f"N{int(np.searchsorted(x, f.x))}", "FY", upward(f, plane))
    model.analyze_linear(check_statics=False)
    return model


def upward(f: RadialForce, plane: int) -> float:
    return f.force * (math.cos, math.sin)[plane](math.radians(f.angle))


def slip(shaft: Shaft, x: np.ndarray, shear: np.ndarray) -> np.ndarray:
    """Deflection at nodes x by shear alone, from 0 at the left end."""
    profile, material = profile_of(shaft), shaft.material
    segment = profile.segment_at((x[:-1] + x[1:]) / 2, np.ones(len(x) - 1))
    d, bore = profile.left[segment], profile.bore[segment]
    stiff = material.elastic_modulus / (2 + 2 * material.poisson_ratio) * area(d, bore)
    stiff = stiff * shear_coefficient(d, bore, material.poisson_ratio)
    return np.concatenate([[0.0], np.cumsum(-shear * np.diff(x) / stiff)])


@settings(max_examples=300, deadline=None)
@given(sound_shafts(tapers=False, grooves=False, axial=False), st.sampled_from([0, 1]))
def test_stepped_shafts_on_any_supports_bend_as_the_frame_does(shaft: Shaft, plane: int):
    forces = [load for load in shaft.loads if isinstance(load, RadialForce)]
    x = nodes_of(shaft, forces)
    assume(any(abs(upward(f, plane)) > 1 for f in forces))
    assume(np.diff(x).min() > 0.01 * shaft.length)  # stiffness goes by the cube of the length: the frame loses digits
    loads = evaluate(shaft).along
    rows = np.searchsorted(loads.x, x, "right") - 1
    by_shear = slip(shaft, x, loads.shear[0, plane, rows[:-1]])
    at = [int(np.searchsorted(x, support.x)) for support in shaft.supports]
    off = [(support.offset_y, support.offset_z)[plane] for support in shaft.supports]
    model = frame(shaft, x, forces, plane, [seat - by_shear[i] for seat, i in zip(off, at, strict=True)])
    nodes = [model.nodes[f"N{i}"] for i in range(len(x))]

    for i, (support, node) in enumerate(zip(shaft.supports, at, strict=True)):
        lift = nodes[node].DY[CASE] + by_shear[node]
        reaction = nodes[node].RxnFY[CASE] if support.stiffness is None else support.stiffness * (off[i] - lift)
        assert loads.reactions[0, plane, i] == pytest.approx(reaction, abs=1e-6 * _bulk(loads.reactions))

    near = 1e-6 * _bulk(loads.moment) + NOTHING * shaft.length * _bulk(loads.reactions)
    for i in range(1, len(x) - 1):  # Pynite's moments have the other sign
        moment = -model.members[f"M{i}"].moment("Mz", 0.0, CASE)
        assert loads.moment[0, plane, rows[i]] == pytest.approx(moment, abs=near)

    lifts = np.array([node.DY[CASE] for node in nodes]) + by_shear
    np.testing.assert_allclose(loads.deflection[0, plane, rows], lifts, atol=1e-6 * _bulk(loads.deflection) + NOTHING)
    slope = np.array([node.RZ[CASE] for node in nodes])
    np.testing.assert_allclose(loads.slope[0, plane, rows], slope, atol=1e-6 * _bulk(loads.slope) + NOTHING)


def _bulk(values: np.ndarray) -> float:
    return float(np.abs(values[0]).max()) + 1e-9
