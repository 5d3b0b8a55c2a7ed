"""How the number of one station came about, line by line, as data: from the loads there to its margins.

The values are those of `Results`; `numbers` of each line is the way to them by pocket calculator.
"""

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from shaftcore.calculation_lines import Line, line
from shaftcore.mean_stress_rules import RULES
from shaftcore.notch_workings import acting, notch_lines
from shaftcore.results import Results
from shaftcore.strength_workings import strength_lines
from shaftcore.stress_workings import (
    greatest_line,
    joined_lines,
    load_lines,
    nominal_lines,
    reaction_lines,
    section_lines,
)

__all__ = ["Chapter", "Line", "workings_of"]


@dataclass(frozen=True)
class Chapter:
    """A few lines under one title."""

    title: str
    lines: tuple[Line, ...]


def workings_of(results: Results, station: int) -> tuple[Chapter, ...]:
    """The chapters of one station (index into `results.stations`), in the order of the evaluation.

    Lines that do not apply are left out, chapters without a line too: a plain section has no Kt,
    and an unloaded one no factor.
    """
    return tuple(Chapter(title, lines) for title, lines in _chapters(results, station) if lines)


def _chapters(results: Results, i: int) -> Iterator[tuple[str, tuple[Line, ...]]]:
    yield "Section and loads", (*section_lines(results, i), *reaction_lines(results, i), *load_lines(results, i))
    yield "Nominal stresses on the net section", tuple(nominal_lines(results, i))
    site = results.stations[i].site
    if site is not None:
        for sort in acting(results, i):
            yield f"Stress concentration in {sort}", tuple(notch_lines(results, i, sort, site))
    yield "Endurance limit", tuple(strength_lines(results, i))
    yield "Equivalent stresses", tuple(joined_lines(results, i))
    rule = RULES[results.shaft.judgement.mean_stress_rule]
    yield f"Fatigue factor after {rule.label}", tuple(_fatigue_lines(results, i))
    yield "Yield", tuple(_yield_lines(results, i))


def _fatigue_lines(results: Results, i: int) -> Iterator[Line]:
    judged, material = results.judged, results.shaft.material
    rule = RULES[results.shaft.judgement.mean_stress_rule]
    if not np.isfinite(judged.n[i]):
        return
    yield line(
        "n", f"Factor, fatigue, from {rule.formula}", rule.solved, rule.numbers, float(judged.n[i]), "ratio",
        rule.source, amplitude=judged.amplitude[i], mean=judged.mean[i], endurance=judged.strength.endurance[i],
        tensile=material.tensile_strength, yielding=material.yield_strength,
    )  # fmt: skip
    asked = results.shaft.judgement.asked_factor
    yield _margin_line("margin", "n/n_asked − 1", float(judged.margin[i]), float(judged.n[i]), asked)


def _yield_lines(results: Results, i: int) -> Iterator[Line]:
    judged, strength = results.judged, results.shaft.material.yield_strength
    yield greatest_line(results, i)
    n = float(judged.n_yield[i])
    if np.isfinite(n):
        greatest = float(judged.greatest[i])
        yield line(
            "n_y", "Factor, yield", "S_y/σ_max'", "{sy}/{s}", n, "ratio", "shigley", sy=strength, s=greatest
        )  # fmt: skip
        asked = results.shaft.judgement.asked_yield_factor
        yield _margin_line("margin_y", "n_y/n_y,asked − 1", float(judged.yield_margin[i]), n, asked)


def _margin_line(symbol: str, formula: str, margin: float, n: float, asked: float) -> Line:
    flag = "" if margin >= 0 else "the asked factor is not reached"
    return line(symbol, "Margin", formula, "{n}/{asked} − 1", margin, "share", "judgement", flag, n=n, asked=asked)
