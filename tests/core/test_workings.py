"""The workings can be followed: every line's numbers give its value, and the last ones are the results."""

import ast
import math
import operator
import re
from dataclasses import replace

import numpy as np
import pytest
from varied_shafts import VARIED

from shaftcore.calculation_lines import Line, line, written
from shaftcore.evaluation import evaluate
from shaftcore.nomenclature import BY_KEY
from shaftcore.notches.shoulder import Shoulder
from shaftcore.results import Results
from shaftcore.sources import SOURCES
from shaftcore.units import DIMENSIONS
from shaftcore.workings import workings_of

SIX_DIGITS = 2e-4
"""Numbers are printed with six digits; the sums of the chart polynomials lose up to two of them."""

RESULTS: dict[str, Results] = {name: evaluate(shaft) for name, shaft in VARIED.items()}
STATIONS = [(name, i) for name, results in RESULTS.items() for i in range(len(results.stations))]

_OPERATIONS = {
    ast.Add: operator.add,
    ast.Sub: operator.sub,
    ast.Mult: operator.mul,
    ast.Div: operator.truediv,
    ast.Pow: operator.pow,
}


def by_pocket_calculator(numbers: str) -> float:
    """The printed sum worked out; anything but digits, + − × / ^ √ π and parentheses is refused."""
    text = numbers.replace("×", "*").replace("−", "-").replace("√(", "sqrt(").replace("^", "**").replace("π", "pi")
    return _worked(ast.parse(text, mode="eval").body)


def _worked(node: ast.expr) -> float:
    if isinstance(node, ast.BinOp):
        return _OPERATIONS[type(node.op)](_worked(node.left), _worked(node.right))
    if isinstance(node, ast.UnaryOp) and isinstance(node.op, ast.USub):
        return -_worked(node.operand)
    if isinstance(node, ast.Call) and isinstance(node.func, ast.Name) and node.func.id == "sqrt":
        return math.sqrt(_worked(node.args[0]))
    if isinstance(node, ast.Name) and node.id == "pi":
        return math.pi
    if isinstance(node, ast.Constant) and isinstance(node.value, int | float):
        return float(node.value)
    raise AssertionError(f"not for a pocket calculator: {ast.dump(node)}")


def lines_of(name: str, i: int) -> list[Line]:
    return [entry for chapter in workings_of(RESULTS[name], i) for entry in chapter.lines]


@pytest.mark.parametrize(("name", "i"), STATIONS)
def test_numbers_of_every_line_give_its_value(name: str, i: int) -> None:
    for entry in lines_of(name, i):
        # a margin is a difference of near equals: six digits of n leave 1e-5 of it
        slack = 1e-5 if entry.symbol.startswith("margin") else 1e-9
        assert by_pocket_calculator(entry.numbers) == pytest.approx(entry.value, rel=SIX_DIGITS, abs=slack), entry
        assert entry.source in SOURCES
        assert entry.dimension in DIMENSIONS or not entry.dimension
        assert entry.label
        assert entry.formula


@pytest.mark.parametrize(("name", "i"), STATIONS)
def test_lines_agree_with_the_results(name: str, i: int) -> None:
    results, last = RESULTS[name], {entry.symbol: entry.value for entry in lines_of(name, i)}
    judged = results.judged
    for symbol, found in (
        ("σ_b,a", judged.nominal.bending_amplitude),
        ("σ_ax,m", judged.nominal.axial_mean),
        ("τ_m", judged.nominal.torsion_mean),
        ("Kf,b", results.factors.kf[0]),
        ("Kf,ax", results.factors.kf[1]),
        ("Kfs", results.factors.kf[2]),
        ("k_a", judged.strength.ka),
        ("k_b", judged.strength.kb),
        ("S_e", judged.strength.endurance),
        ("σ_a'", judged.amplitude),
        ("σ_m'", judged.mean),
        ("σ_max'", judged.greatest),
        ("n", judged.n),
        ("margin", judged.margin),
        ("n_y", judged.n_yield),
        ("margin_y", judged.yield_margin),
    ):
        if symbol in last:
            assert last[symbol] == pytest.approx(found[i], rel=1e-12)
    assert ("n" in last) == bool(np.isfinite(judged.n[i]))
    assert ("n_y" in last) == bool(np.isfinite(judged.n_yield[i]))


@pytest.mark.parametrize(("name", "i"), STATIONS)
def test_symbols_that_a_line_uses_stand_above_it(name: str, i: int) -> None:
    """A checker finds each Kt, q, Kf and stress of a formula among the lines before it."""
    seen: set[str] = set()
    for entry in lines_of(name, i):
        for symbol in ("Kt,b", "Kt,ax", "Kts", "q_s"):
            if f"({symbol} − 1)" in entry.formula or f"+ {symbol} (" in entry.formula:
                assert symbol in seen, entry
        seen.add(entry.symbol)


@pytest.mark.parametrize(("name", "i"), STATIONS)
def test_loads_go_by_the_symbols_of_the_nomenclature(name: str, i: int) -> None:
    entries = lines_of(name, i)
    results, symbols = RESULTS[name], {entry.symbol: entry for entry in entries}
    for key in ("moment", "moment_amplitude", "torque", "torque_amplitude", "normal"):
        column = BY_KEY[key]
        value = column.values(results)[i]
        assert column.symbol not in symbols or symbols[column.symbol].value == pytest.approx(value), column.symbol
        assert not value or column.symbol in symbols
    assert not [entry for entry in entries if re.search(r"(?<![_\w])[A-Z],", entry.symbol + entry.formula)]


def test_an_arc_cut_by_its_step_is_remarked_and_noticed_where_something_seats() -> None:
    """On 40/41 mm an arc of r = 8 ends on no face; only a bearing that seats there minds."""
    seated = VARIED["partial fillet"]
    thin = replace(seated.segments[0], shoulder=Shoulder(8.0))
    for shaft, noticed in ((seated, True), (replace(seated, segments=(thin, *seated.segments[1:])), False)):
        results = evaluate(shaft)
        i = results.station_of("thin")
        assert any(notice.key == "no seating face" and notice.station == i for notice in results.notices) is noticed
        assert any("no seating face" in line.flag for chapter in workings_of(results, i) for line in chapter.lines)
    full = evaluate(replace(seated, segments=(replace(thin, shoulder=Shoulder(0.4)), *seated.segments[1:])))
    assert not any("no seating face" in line.flag for chapter in workings_of(full, i) for line in chapter.lines)


def test_a_plain_section_has_no_notch_lines() -> None:
    for name, i in STATIONS:
        notched = any(entry.symbol.startswith("Kf") for entry in lines_of(name, i))
        results = RESULTS[name]
        loaded = results.judged.amplitude[i] > 0 or results.judged.mean[i] > 0 or results.judged.greatest[i] > 0
        assert notched == (results.stations[i].site is not None and bool(loaded))


def test_every_condition_is_met_somewhere() -> None:
    """The shafts above reach every remark; without this the tests could pass by looking away."""
    flags = "\n".join(entry.flag for name, i in STATIONS for entry in lines_of(name, i))
    for words in (
        "held at its peak",
        "sharper than the fit",
        "blunter than the fit",
        "outside the range of the fit",
        "nearer end",
        "stands still",
        "the whole moment alternates",
        "compressive normal mean",
        "relieves by its nominal size",
        "left off the steady torque",
        "without Kf",
        "axial load alone",
        "power is carried on",
        "not above 1",
        "at its bound",
        "unloaded",
        "asked factor is not reached",
        "finite elements give up to",
    ):
        assert words in flags, words


def test_a_held_factor_shows_the_radius_it_is_held_at() -> None:
    results = RESULTS["sharp"]
    i = next(i for i, station in enumerate(results.stations) if station.kind == "shoulder")
    assert results.factors.held[0, i]
    chapter = next(c for c in workings_of(results, i) if c.title.endswith("bending"))
    values = {entry.symbol: entry.value for entry in chapter.lines}
    assert values["r*"] > values.get("r", results.stations[i].site.sizes["r"])  # type: ignore[union-attr]
    assert values["Kf,b"] > values["Kf,b,r"]


@pytest.mark.parametrize(
    ("number", "text"),
    [
        (32.0, "32"),
        (695454.54, "695455"),
        (1234567.8, "1234570"),
        (-0.265, "(−0.265)"),
        (4.11e-10, "(4.11 × 10^−10)"),
        (0.0, "0"),
        (-0.0, "0"),
        (1e-5, "0.00001"),
        (-2e20, "(−(2 × 10^20))"),
    ],
)
def test_numbers_are_written_for_people(number: float, text: str) -> None:
    assert written(number) == text
    assert by_pocket_calculator(text) == pytest.approx(number, rel=1e-5)


def test_signs_read_well() -> None:
    entry = line("y", "sum", "a + b x", "{a} + {b} × {x}^2 + {c}^2", 1.0, "", "practice", a=1.0, b=-2.0, x=3.0, c=-4.0)
    assert entry.numbers == "1 − 2 × 3^2 + (−4)^2"


def test_a_line_without_a_finite_value_is_refused() -> None:
    with pytest.raises(ValueError, match="no finite value"):
        line("n", "factor", "1/0", "1/0", math.inf, "", "practice")


@pytest.mark.parametrize(
    ("value", "dimension", "result", "restated"),
    [
        (-2.5e5, "torque", "−250000\u00a0N·mm", "−250.0\u00a0N·m"),
        (-2e20, "stress", "−2 × 10^20\u00a0MPa", ""),
        (0.125, "share", "0.125", "12.500\u00a0%"),
        (1.5, "ratio", "1.5", ""),
    ],
)
def test_a_result_stands_in_the_unit_it_was_worked_in_and_in_the_readers(
    value: float, dimension: str, result: str, restated: str
) -> None:
    entry = line("y", "value", "x", "{x}", value, dimension, "practice", x=value)
    assert entry.result == result
    assert entry.restated("SI") == restated
    assert line("l", "length", "l", "{x}", 25.4, "length", "practice", x=25.4).restated("US") == "1.0000\u00a0in"
