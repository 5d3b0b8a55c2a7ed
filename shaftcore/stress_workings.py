"""Lines of a station's stresses: loads at the section, nominal stresses, and how they are joined."""

from collections.abc import Iterator

import numpy as np

from shaftcore.calculation_lines import Line, given, line
from shaftcore.equivalent_stress import ROUNDING
from shaftcore.notches.kinds import KINDS
from shaftcore.reactions import reactions_at
from shaftcore.results import Results

MEAN, AMPLITUDE = 0, 1


def section_lines(results: Results, i: int) -> Iterator[Line]:
    """The section the nominal stress is taken on."""
    site = results.stations[i].site
    if site is not None:
        kind = KINDS[site.kind]
        for name, symbol in kind.size_symbols.items():
            if name not in kind.derived:
                yield given(symbol, kind.size_labels[name], site.sizes[name], "length")
        for name, (formula, numbers) in kind.derived.items():
            symbol, label = kind.size_symbols[name], kind.size_labels[name]
            yield line(symbol, label, formula, numbers, site.sizes[name], "length", "given", **site.sizes)
    else:
        yield given("d", "Diameter", float(results.judged.d[i]), "length")
    if results.judged.bore[i]:
        yield given("d_i", "Bore", float(results.judged.bore[i]), "length")


def reaction_lines(results: Results, i: int) -> Iterator[Line]:
    """What the supports at the station do to the shaft; what is zero is left out."""
    # on more supports than two equilibrium alone does not tell what each carries
    formula = "by equilibrium and the bent line" if len(results.shaft.supports) > 2 else ""
    for name, reaction in reactions_at(results, i):
        for part, words in ((MEAN, "mean"), (AMPLITUDE, "pulsation")):
            for axis, sizes in (("x", reaction.along), ("y", reaction.y), ("z", reaction.z)):
                if sizes[part]:
                    symbol = f"R_{axis}{',a' * part}"
                    label = f"Reaction of support {name} along {axis}, {words}"
                    how = "" if axis == "x" else formula
                    yield given(symbol, label, sizes[part], "force", "statics", formula=how)


def load_lines(results: Results, i: int) -> Iterator[Line]:
    """Moments of both planes and their resultant, torque and axial force; what is zero is left out."""
    at = results.at
    for part, mark, words in ((MEAN, "", "mean"), (AMPLITUDE, ",a", "pulsation")):
        y, z = _without_rounding(float(at.moment[part, 0, i]), float(at.moment[part, 1, i]))
        if y or z:
            yield given(f"M_y{mark}", f"Bending moment in the xy plane, {words}", y, "torque", "statics")
            yield given(f"M_z{mark}", f"Bending moment in the xz plane, {words}", z, "torque", "statics")
            yield line(
                "M_a" if part else "M", f"Bending moment, {words}", f"√(M_y{mark}² + M_z{mark}²)", "√({y}^2 + {z}^2)",
                float(np.hypot(y, z)), "torque", "statics", y=y, z=z,
            )  # fmt: skip
    for part, mark, words in ((MEAN, "", "mean"), (AMPLITUDE, "_a", "amplitude")):
        torque, normal = float(at.torque[part, i]), float(at.normal[part, i])
        if torque:
            yield given(f"T{mark}", f"Torque, {words}", torque, "torque", "statics")
        if normal:
            sign = "" if mark else ", positive in tension"
            yield given(f"N{mark}", f"Axial force, {words}{sign}", normal, "force", "statics")


def _without_rounding(y: float, z: float) -> tuple[float, float]:
    """Both moments, the one that is only left over from summing forces as 0."""
    least = ROUNDING * max(abs(y), abs(z))
    return (y if abs(y) > least else 0.0), (z if abs(z) > least else 0.0)


def nominal_lines(results: Results, i: int) -> Iterator[Line]:
    """Nominal stresses on the net section; those that are zero are left out."""
    nominal, at = results.judged.nominal, results.at
    moment = np.hypot(at.moment[:, 0, i], at.moment[:, 1, i])
    both = results.shaft.duty.turning and moment[AMPLITUDE] > 0
    if results.shaft.duty.turning:
        flag = "the shaft turns under a load fixed in space: the whole moment alternates"
        acting, letters = float(moment.sum()), "(M + M_a)" if both else "M"
        text = "({m} + {ma})" if both else "{acting}"
        yield from _stress(
            results, i, "σ_b,a", "Bending stress, amplitude", 32, letters, text, float(nominal.bending_amplitude[i]),
            flag, acting=acting, m=float(moment[MEAN]), ma=float(moment[AMPLITUDE]),
        )  # fmt: skip
    else:
        for symbol, words, letter, part, value in (
            ("σ_b,a", "amplitude", "M_a", AMPLITUDE, nominal.bending_amplitude),
            ("σ_b,m", "mean", "M", MEAN, nominal.bending_mean),
        ):
            yield from _stress(
                results, i, symbol, f"Bending stress, {words}", 32, letter, "{m}", float(value[i]), "",
                m=float(moment[part]),
            )  # fmt: skip
    yield from _axial_lines(results, i)
    for symbol, words, letter, part, value in (
        ("τ_a", "amplitude", "|T_a|", AMPLITUDE, nominal.torsion_amplitude),
        ("τ_m", "mean", "|T|", MEAN, nominal.torsion_mean),
    ):
        yield from _stress(
            results, i, symbol, f"Torsion stress, {words}", 16, letter, "{t}", float(value[i]), "",
            t=abs(float(at.torque[part, i])),
        )  # fmt: skip


def _stress(
    results: Results, i: int, symbol: str, label: str, factor: int, letter: str, text: str, value: float, flag: str,
    **loads: float,
) -> Iterator[Line]:  # fmt: skip
    """Stress from a moment or torque over the section modulus."""
    if not value:
        return
    d, bore = float(results.judged.d[i]), float(results.judged.bore[i])
    section = (" d/(π (d⁴ − d_i⁴))", " × {d}/(π × ({d}^4 − {bore}^4))") if bore else ("/(π d³)", "/(π × {d}^3)")
    yield line(
        symbol, label, f"{factor} {letter}{section[0]}", f"{factor} × {text}{section[1]}",
        value, "stress", "statics", flag, d=d, bore=bore, **loads,
    )  # fmt: skip


def _axial_lines(results: Results, i: int) -> Iterator[Line]:
    d, bore = float(results.judged.d[i]), float(results.judged.bore[i])
    section = ("(d² − d_i²)", "({d}^2 − {bore}^2)") if bore else ("d²", "{d}^2")
    for symbol, words, letter, part, value in (
        ("σ_ax,a", "amplitude", "|N_a|", AMPLITUDE, results.judged.nominal.axial_amplitude),
        ("σ_ax,m", "mean", "N", MEAN, results.judged.nominal.axial_mean),
    ):
        if value[i]:
            force = float(results.at.normal[part, i])
            yield line(
                symbol, f"Axial stress, {words}", f"4 {letter}/(π {section[0]})",
                f"4 × {{n}}/(π × {section[1]})", float(value[i]), "stress", "statics",
                n=abs(force) if part == AMPLITUDE else force, d=d, bore=bore,
            )  # fmt: skip


def joined_lines(results: Results, i: int) -> Iterator[Line]:
    """Equivalent amplitude and mean."""
    s, judged, kf = results.judged.nominal, results.judged, results.factors.kf[:, i]
    unloaded = "" if judged.amplitude[i] or judged.mean[i] else "unloaded: no factor can be stated"
    yield line(
        "σ_a'", "Equivalent amplitude", "√((Kf,b σ_b,a + Kf,ax σ_ax,a/0.85)² + 3 (Kfs τ_a)²)",
        "√(({kb} × {b} + {kx} × {x}/0.85)^2 + 3 × ({ks} × {t})^2)", float(judged.amplitude[i]), "stress", "shigley",
        unloaded, kb=kf[0], b=s.bending_amplitude[i], kx=kf[1], x=s.axial_amplitude[i], ks=kf[2],
        t=s.torsion_amplitude[i],
    )  # fmt: skip
    steady = results.shaft.judgement.notch_on_steady_torque
    relieved = s.axial_mean[i] < 0
    kx = 1.0 if relieved else kf[1]
    compressed = kf[0] * s.bending_mean[i] + kx * s.axial_mean[i] < 0
    axial = "σ_ax,m" if relieved else "Kf,ax σ_ax,m"
    normal = ("", "") if compressed else (f"(Kf,b σ_b,m + {axial})² + ", "({kb} × {b} + {kx} × {x})^2 + ")
    torsion = ("3 (Kfs τ_m)²", "3 × ({ks} × {t})^2") if steady else ("3 τ_m²", "3 × {t}^2")
    flags = ["compressive normal mean counts as none"] * bool(compressed)
    flags += ["compression relieves by its nominal size only"] * bool(relieved and not compressed)
    flags += ["Kfs left off the steady torque, as chosen"] * (not steady and bool(s.torsion_mean[i]))
    yield line(
        "σ_m'", "Equivalent mean", f"√({normal[0]}{torsion[0]})", f"√({normal[1]}{torsion[1]})",
        float(judged.mean[i]), "stress", "shigley", "; ".join(flags), kb=kf[0], b=s.bending_mean[i], kx=kx,
        x=s.axial_mean[i], ks=kf[2], t=s.torsion_mean[i],
    )  # fmt: skip


def greatest_line(results: Results, i: int) -> Line:
    """The greatest distortion-energy stress of the cycle, for the yield check."""
    s, kf = results.judged.nominal, results.factors.kf[:, i]
    put_in = {
        "bm": s.bending_mean[i], "ba": s.bending_amplitude[i], "xm": abs(s.axial_mean[i]), "xa": s.axial_amplitude[i],
        "tm": s.torsion_mean[i], "ta": s.torsion_amplitude[i],
    }  # fmt: skip
    if results.shaft.judgement.notch_on_yield:
        formula = "√((Kf,b (σ_b,m + σ_b,a) + Kf,ax (|σ_ax,m| + σ_ax,a))² + 3 (Kfs (τ_m + τ_a))²)"
        numbers = "√(({kb} × ({bm} + {ba}) + {kx} × ({xm} + {xa}))^2 + 3 × ({ks} × ({tm} + {ta}))^2)"
        flag = ""
    else:
        formula = "√((σ_b,m + σ_b,a + |σ_ax,m| + σ_ax,a)² + 3 (τ_m + τ_a)²)"
        numbers = "√(({bm} + {ba} + {xm} + {xa})^2 + 3 × ({tm} + {ta})^2)"
        flag = "nominal stresses, without Kf, as chosen"
    return line(
        "σ_max'", "Greatest equivalent stress", formula, numbers, float(results.judged.greatest[i]), "stress",
        "shigley", flag, kb=kf[0], kx=kf[1], ks=kf[2], **put_in,
    )  # fmt: skip
