"""Published worked examples: each file beside this module is computed with the program and compared."""

from collections.abc import Callable, Mapping
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest
from example_file import EXAMPLES, read

from shaftcore.equivalent_stress import Fatigue, Nominal, equivalent_amplitude, equivalent_mean, greatest_stress
from shaftcore.evaluation import evaluate
from shaftcore.mean_stress_rules import RULES, yield_factor
from shaftcore.notch_factors import notch_factors
from shaftcore.notch_sensitivity import fatigue_factor
from shaftcore.notches._contract import Site
from shaftcore.notches.shoulder import Shoulder
from shaftcore.results import Results
from shaftcore.section_properties import bending_modulus, torsion_modulus
from shaftcore.shaft import Judgement, Material, RadialForce, Segment, Shaft, Support, Torque
from shaftcore.strength_factors import finish_factors, reliability_factor, temperature_factor
from shaftcore.surface import FINISHES
from shaftcore.units import dimension

Inputs = Mapping[str, float]
Found = dict[str, float]

INCH = dimension("length").us
LBF_INCH = dimension("torque").us
KSI = dimension("stress").us
BARE = Nominal(*(np.zeros(1) for _ in range(6)))


def _at_shoulder(results: Results) -> int:
    return next(i for i, station in enumerate(results.stations) if station.kind == "shoulder")


def shoulder_under_bending_and_torque(given: Inputs) -> Found:
    """A shaft whose shoulder lies where its one force makes the given moment, run as a whole."""
    moment, torque = LBF_INCH.internal(given["moment_lbf_in"]), LBF_INCH.internal(given["torque_lbf_in"])
    shaft = Shaft(
        material=Material(
            tensile_strength=KSI.internal(given["tensile_ksi"]), yield_strength=KSI.internal(given["yield_ksi"])
        ),
        judgement=Judgement(reliability=given["reliability"]),
        segments=(
            Segment("thin", 200.0, INCH.internal(given["d_in"]), shoulder=Shoulder(INCH.internal(given["radius_in"]))),
            Segment("thick", 200.0, INCH.internal(given["large_in"])),
        ),
        supports=(Support("left", 0.0, locating=True), Support("right", 400.0)),
        loads=(
            RadialForce("force", 200.0, moment / 100.0),
            Torque("in", 50.0, torque),
            Torque("out", 350.0, -torque),
        ),
    )
    results = evaluate(shaft)
    i = _at_shoulder(results)
    nominal = Nominal(*(values[i : i + 1] for values in vars(results.judged.nominal).values()))
    k = Fatigue(np.array([given["kf"]]), np.ones(1), np.array([given["kfs"]]))
    amplitude, mean = equivalent_amplitude(nominal, k), equivalent_mean(nominal, k)
    endurance = results.judged.strength.endurance[i]
    tensile, yielding = shaft.material.tensile_strength, shaft.material.yield_strength
    stated = np.array([KSI.internal(given["endurance_ksi"])])
    n = {rule.label: rule.factor(amplitude, mean, stated, tensile, yielding)[0] for rule in RULES.values()}
    return {
        "S_e, ksi": KSI.shown(endurance),
        "σ_a', psi": 1e3 * KSI.shown(amplitude[0]),
        "σ_m', psi": 1e3 * KSI.shown(mean[0]),
        "n, Goodman": n["Goodman"],
        "n, Gerber": n["Gerber"],
        "n_y": yield_factor(greatest_stress(nominal, k), yielding)[0],
        "Kt,b": results.factors.kt[0, i],
        "Kts": results.factors.kt[2, i],
        "q": results.factors.q[0, i],
        "q_s": results.factors.q[2, i],
    }


def rotating_shaft_on_two_bearings(given: Inputs) -> Found:
    shaft = Shaft(
        material=Material(tensile_strength=given["tensile_mpa"], yield_strength=given["yield_mpa"]),
        judgement=Judgement(reliability=given["reliability"]),
        segments=(
            Segment("thin", given["shoulder_at_mm"], given["d_mm"], shoulder=Shoulder(given["radius_mm"])),
            Segment("thick", given["span_mm"] - given["shoulder_at_mm"], given["large_mm"]),
        ),
        supports=(Support("left", 0.0, locating=True), Support("right", given["span_mm"])),
        loads=(RadialForce("force", given["force_at_mm"], given["force_n"]),),
    )
    results = evaluate(shaft)
    i = _at_shoulder(results)
    return {
        "M at the shoulder, N·m": np.hypot(*results.at.moment[0, :, i]) / 1e3,
        "Kf σ_b,a, MPa": given["kf"] * results.judged.nominal.bending_amplitude[i],
        "S_e, MPa": results.judged.strength.endurance[i],
        "Kt,b": results.factors.kt[0, i],
        "q": results.factors.q[0, i],
        "Kf,b": results.factors.kf[0, i],
    }


def ring_groove(given: Inputs) -> Found:
    d, moment = np.array([INCH.internal(given["d_in"])]), LBF_INCH.internal(given["moment_lbf_in"])
    kf = fatigue_factor([given["kt"]], given["q"])
    nominal = replace(BARE, bending_amplitude=moment / bending_modulus(d, np.zeros(1)))
    amplitude = equivalent_amplitude(nominal, Fatigue(kf, np.ones(1), np.ones(1)))
    strengths = [KSI.internal(given[name]) for name in ("endurance_ksi", "tensile_ksi", "yield_ksi")]
    n = RULES["goodman"].factor(amplitude, np.zeros(1), *strengths)  # type: ignore[arg-type]
    return {"Kf": kf[0], "σ_a', psi": 1e3 * KSI.shown(amplitude[0]), "n": n[0]}


def diameter_for_a_factor_of_two(given: Inputs) -> Found:
    """With fixed Se every stress falls as d³, so the diameter follows from n at one inch."""
    inch, none = np.array([INCH.internal(1.0)]), np.zeros(1)
    w, wt = bending_modulus(inch, none), torsion_modulus(inch, none)
    load = {name: LBF_INCH.internal(value) for name, value in given.items() if name.endswith("lbf_in")}
    nominal = Nominal(
        bending_amplitude=load["moment_amplitude_lbf_in"] / w,
        bending_mean=load["moment_mean_lbf_in"] / w,
        axial_amplitude=none,
        axial_mean=none,
        torsion_amplitude=load["torque_amplitude_lbf_in"] / wt,
        torsion_mean=load["torque_mean_lbf_in"] / wt,
    )
    k = Fatigue(np.array([given["kf"]]), np.ones(1), np.array([given["kfs"]]))
    strengths = [KSI.internal(given[name]) for name in ("endurance_ksi", "tensile_ksi", "yield_ksi")]
    found = {}
    for rule in RULES.values():
        n = rule.factor(equivalent_amplitude(nominal, k), equivalent_mean(nominal, k), *strengths)  # type: ignore[arg-type]
        found[f"d, {rule.label}, in"] = (given["n"] / n[0]) ** (1 / 3)
    return found


def stepped_shaft_in_bending(given: Inputs) -> Found:
    d, large, r = (INCH.internal(given[name]) for name in ("d_in", "large_in", "radius_in"))
    sizes = {"d": d, "D": large, "h": (large - d) / 2, "r": r}
    site = Site("shoulder", "step", 0.0, d, 0.0, "machined", sizes, (0.0, 0.0))
    found = notch_factors([site], Judgement(), KSI.internal(given["tensile_ksi"]))
    return {
        "Kf from the given Kt and q": float(fatigue_factor(given["kt"], given["q"])),
        "Kt,b": found.kt[0, 0],
        "q": found.q[0, 0],
        "Kf,b": found.kf[0, 0],
    }


def endurance_factors(given: Inputs) -> Found:
    ka = dict(zip([name for name, _ in FINISHES], finish_factors("older", given["tensile_mpa"]), strict=True))
    return (
        {f"k_a, {finish}": float(value) for finish, value in ka.items()}
        | {f"k_e, {percent:g} %": reliability_factor(percent / 100) for percent in (90, 95, 99, 99.9, 99.99)}
        | {f"k_d, {celsius} °C": temperature_factor(celsius) for celsius in (20, 200, 400, 500)}
    )


COMPUTED: dict[str, Callable[[Inputs], Found]] = {
    compute.__name__: compute
    for compute in (
        shoulder_under_bending_and_torque,
        rotating_shaft_on_two_bearings,
        ring_groove,
        diameter_for_a_factor_of_two,
        stepped_shaft_in_bending,
        endurance_factors,
    )
}


def test_every_file_is_computed_and_every_computation_has_its_file() -> None:
    assert set(EXAMPLES) == set(COMPUTED)


@pytest.mark.parametrize("name", sorted(EXAMPLES))
def test_published_figures(name: str) -> None:
    example = EXAMPLES[name]
    found = COMPUTED[name](example.inputs)
    for figure in example.published:
        assert found[figure.quantity] == pytest.approx(figure.value, abs=figure.tolerance), figure


@pytest.mark.parametrize("cut", ["source", "edition", "reason"])
def test_an_example_without_its_source_is_refused(cut: str, tmp_path: Path) -> None:
    whole = 'source = "book"\nedition = "1st"\n[inputs]\na = 1\n[[published]]\nquantity = "q"\nvalue = 1.0\n'
    whole += 'tolerance = 0.1\nreason = "rounded"\n'
    path = tmp_path / "case.toml"
    path.write_text(whole, encoding="utf-8")
    assert read(path).published[0].value == 1.0
    lines = [f'{cut} = ""' if line.startswith(cut) else line for line in whole.splitlines()]
    path.write_text("\n".join(lines), encoding="utf-8")
    with pytest.raises(ValueError, match=cut):
        read(path)
