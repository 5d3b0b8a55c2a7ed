"""Lines of a station's stress concentration: Kt by the fit's own steps, q, Kf and where Kf is held."""

from collections.abc import Iterator

import numpy as np

from shaftcore.calculation_lines import Line, given, line
from shaftcore.notch_factors import LOAD_ROWS
from shaftcore.notch_sensitivity import fatigue_factor, sensitivity, sensitivity_steps
from shaftcore.notches._contract import Fit, LoadSort, Site
from shaftcore.notches.kinds import KINDS
from shaftcore.results import Results

SYMBOLS: dict[LoadSort, tuple[str, str, str]] = {
    "bending": ("Kt,b", "q", "Kf,b"),
    "tension": ("Kt,ax", "q", "Kf,ax"),
    "torsion": ("Kts", "q_s", "Kfs"),
}


def acting(results: Results, i: int) -> tuple[LoadSort, ...]:
    """The sorts of load that stress the station at all."""
    s = results.judged.nominal
    stress = {
        "bending": s.bending_amplitude[i] + s.bending_mean[i],
        "tension": s.axial_amplitude[i] + abs(s.axial_mean[i]),
        "torsion": s.torsion_amplitude[i] + s.torsion_mean[i],
    }
    return tuple(sort for sort in LOAD_ROWS if stress[sort])


def notch_lines(results: Results, i: int, sort: LoadSort, site: Site) -> Iterator[Line]:
    """Kt, q and Kf of one raiser under one load."""
    judgement, tensile = results.shaft.judgement, results.shaft.material.tensile_strength
    fit = KINDS[site.kind].fits[judgement.kt_source][sort]
    row, torsion = LOAD_ROWS[sort], sort == "torsion"
    kt_symbol, q_symbol, kf_symbol = SYMBOLS[sort]
    kt, q = float(results.factors.kt[row, i]), float(results.factors.q[row, i])
    yield from _flagged(fit, site, kt_symbol, _fit_flags(results, i, row, fit, site))
    yield from sensitivity_steps(judgement.sensitivity, site.sizes["r"], tensile, torsion, q_symbol)
    held = bool(results.factors.held[row, i])
    own = float(fatigue_factor(kt, q))
    yield _factor_line(f"{kf_symbol},r" if held else kf_symbol, kt_symbol, q_symbol, kt, q, own)
    if held:
        yield from _held_lines(results, i, sort, fit, site)


def _factor_line(symbol: str, kt_symbol: str, q_symbol: str, kt: float, q: float, kf: float, flag: str = "") -> Line:
    return line(
        symbol, "Fatigue factor", f"1 + {q_symbol} ({kt_symbol} − 1)", "1 + {q} × ({kt} − 1)", kf, "ratio", "shigley",
        flag, q=q, kt=kt,
    )  # fmt: skip


def _held_lines(results: Results, i: int, sort: LoadSort, fit: Fit, site: Site) -> Iterator[Line]:
    """The radius at which Kf peaks, and Kf there: sharper roots keep it."""
    row = LOAD_ROWS[sort]
    kt_symbol, q_symbol, kf_symbol = (f"{symbol}*" for symbol in SYMBOLS[sort])
    radius = float(results.factors.radius[row, i])
    sizes = {**site.sizes, "r": radius}
    yield given(
        "r*", "Root radius at which Kf peaks", radius, "length", "practice",
        "the rule would let Kf fall again for sharper roots; it is held at its peak",
        formula="largest Kf of all r",
    )  # fmt: skip
    yield from fit.steps(sizes, kt_symbol)
    judgement, tensile = results.shaft.judgement, results.shaft.material.tensile_strength
    torsion = sort == "torsion"
    yield from sensitivity_steps(judgement.sensitivity, radius, tensile, torsion, q_symbol)
    kt = float(np.maximum(fit.value({name: np.array(size) for name, size in sizes.items()}), 1.0))
    q = float(sensitivity(judgement.sensitivity, radius, tensile, torsion))
    kf = float(results.factors.kf[row, i])
    yield _factor_line(kf_symbol.rstrip("*"), kt_symbol, q_symbol, kt, q, kf, "held at its peak")


def _fit_flags(results: Results, i: int, row: int, fit: Fit, site: Site) -> str:
    remark = KINDS[site.kind].remark(site)
    flags = [remark] if remark else []
    if results.factors.outside[row, i]:
        flags.append(f"outside the range of the fit, {', '.join(map(str, fit.ranges))}")
    low = float(results.factors.low_by[row, i])
    if low > 0.005:
        flags.append(f"finite elements give up to {low:.0%} more for a root this sharp")
    return "; ".join(flags)


def _flagged(fit: Fit, site: Site, symbol: str, flag: str) -> Iterator[Line]:
    """The fit's own lines; the last, Kt itself, carries the flags of its use here."""
    *lines, last = fit.steps(site.sizes, symbol)
    yield from lines
    words = "; ".join(part for part in (last.flag, flag) if part)
    yield Line(**{**vars(last), "flag": words})
