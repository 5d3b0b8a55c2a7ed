"""Conversion numbers stand in units.py alone; whatever is cited is in the bibliography."""

import ast
import re
from collections.abc import Iterator

import pytest
from imports import sources_under

from shaftcore.mean_stress_rules import RULES
from shaftcore.notches.kinds import KINDS
from shaftcore.sources import SOURCES

CONVERSIONS = (25.4, 0.0254, 4.4482216152605, 6.894757, 0.1129848, 112.9848, 1.355818, 0.45359237, 9.80665, 14.50377)
"""mm and m an inch, N a pound-force, MPa a ksi, N·m and N·mm a lbf·in, N·m a lbf·ft, kg a pound, g, ksi 100 MPa."""

PUBLISHED = {("shaftcore.notch_sensitivity", 0.0254)}
"""Constants of published formulas that look like one: Peterson's a is 0.0254 mm at 2070 MPa."""


def conversions_in(module: str, source: str) -> Iterator[str]:
    """Numbers of a source text that turn one unit into another, to four digits."""
    for node in ast.walk(ast.parse(source)):
        number = node.value if isinstance(node, ast.Constant) and type(node.value) is float else 0.0
        near = any(abs(number - known) < 2e-4 * known for known in CONVERSIONS)
        if near and (module, number) not in PUBLISHED:
            yield f"line {node.lineno}: {number}"
        if isinstance(node, ast.BinOp) and re.search(r"\b(9 / 5|5 / 9)\b", ast.unparse(node)):
            yield f"line {node.lineno}: {ast.unparse(node)}"


MODULES = {**sources_under("shaftcore"), **sources_under("app")}


@pytest.mark.parametrize("module", [module for module in MODULES if module != "shaftcore.units"])
def test_conversion_numbers_stand_in_units_alone(module: str):
    assert list(conversions_in(module, MODULES[module])) == []


@pytest.mark.parametrize(
    "planted", ["x = d / 25.4", "f = 4.448 * p", "s = 6.895", "t = c * 9 / 5 + 32", "m = 0.0254 * n"]
)
def test_a_planted_conversion_is_caught(planted: str):
    assert list(conversions_in("anywhere", planted))


def test_conversions_are_where_they_belong():
    assert list(conversions_in("shaftcore.units", MODULES["shaftcore.units"]))


def cited() -> dict[str, str]:
    """Every citation key in the data of the core, with who cites it."""
    fits = {
        f"{kind.label}, {name}, {sort}": fit.source
        for kind in KINDS.values()
        for name, group in kind.fits.items()
        for sort, fit in group.items()
    }
    return fits | {rule.label: rule.source for rule in RULES.values()} | dict(_named_sources())


def _named_sources() -> Iterator[tuple[str, str]]:
    """Keys bound to a name SOURCE, and keys looked up in SOURCES, in the core and in the window."""
    for module, text in MODULES.items():
        for node in ast.walk(ast.parse(text)):
            key = None
            if isinstance(node, ast.Assign) and ast.unparse(node.targets[0]) == "SOURCE":
                key = node.value
            elif isinstance(node, ast.Subscript) and ast.unparse(node.value) == "SOURCES":
                key = node.slice
            if isinstance(key, ast.Constant):
                yield f"{module}, line {node.lineno}", key.value


@pytest.mark.parametrize("who", cited())
def test_whatever_is_cited_is_in_the_bibliography(who: str):
    assert cited()[who] in SOURCES


def test_every_source_says_what_it_is():
    for key, source in SOURCES.items():
        assert source.short, key
        assert len(source.full) > len(source.short) / 2, key
