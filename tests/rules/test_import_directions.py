"""A wall a machine checks: everything in the core imports only from its own layer or those above it."""

import pytest
from imports import imported_by, sources_under

LAYERS = (
    "words: errors records sources units surface calculation_lines declared abutment whole_file demo version "
    "lettering number_text typed_numbers phrase",
    "formulas of notches: notches",
    "the shaft described: shaft steels field_problems",
    "formulas: section_properties notch_sensitivity strength_factors equivalent_stress mean_stress_rules",
    "places and arrays: geometry notch_sites stations beam_loads notch_factors soundness",
    "the whole: results margins judged_places second_looks support_checks design_checks evaluation",
    "built on it: radius_window reactions nomenclature outline workings notch_workings strength_workings "
    "stress_workings",
    "edges: edits preferred shaft_file ledger_table sheet command",
)
"""The core from top to bottom; a new module is entered in the one layer where it belongs."""

LAYER_OF = {name: depth for depth, layer in enumerate(LAYERS) for name in layer.split(": ")[1].split()}
WINDOW = ("app", "PySide6", "shiboken6", "pytestqt")


def violations(modules: dict[str, str]) -> list[str]:
    """Every import of the core that goes downwards, to the window, or from or to a module in no layer."""
    found = []
    for module, source in modules.items():
        for target in imported_by(source, modules):
            reason = _reason(module, target)
            if reason:
                found.append(f"{module} imports {target}: {reason}")
    return found


def _reason(module: str, target: str) -> str:
    if target.startswith(".") or target.split(".")[0] in WINDOW:
        return "the core knows no window, and names its modules in full"
    if not target.startswith("shaftcore."):
        return ""
    own, other = module.split(".")[1], target.split(".")[1]
    if own not in LAYER_OF or other not in LAYER_OF:
        return f"{own if own not in LAYER_OF else other} stands in no layer"
    return "" if LAYER_OF[other] <= LAYER_OF[own] else "a layer below its own"


def test_every_module_of_the_core_stands_in_a_layer():
    names = {module.split(".")[1] for module in sources_under("shaftcore") if "." in module}
    assert names - set(LAYER_OF) == set()


def test_the_core_imports_only_upwards():
    assert violations(sources_under("shaftcore")) == []


@pytest.mark.parametrize(
    ("module", "planted"),
    [
        ("shaftcore.beam_loads", "from shaftcore.evaluation import evaluate"),
        ("shaftcore.units", "import shaftcore.shaft"),
        ("shaftcore.results", "def late():\n    from app.document import Document"),
        ("shaftcore.sheet.traces", "from PySide6.QtGui import QPainter"),
        ("shaftcore.margins", "from shaftcore import sheet"),
        ("shaftcore.margins", "from . import beam_loads"),
        ("shaftcore.margins", "from shaftcore.unheard_of import anything"),
    ],
)
def test_a_planted_violation_is_caught(module: str, planted: str):
    modules = sources_under("shaftcore")
    modules[module] += f"\n{planted}\n"
    assert [violation for violation in violations(modules) if violation.startswith(f"{module} imports")]


def test_modules_do_not_go_round_in_circles():
    modules = sources_under("shaftcore")
    needs = {m: {t for t in imported_by(s, modules, at_run_time=True) if t in modules} for m, s in modules.items()}
    while free := [module for module, wanted in needs.items() if not wanted & set(needs) - {module}]:
        for module in free:
            del needs[module]
    assert set(needs) == set(), "these import one another"


def test_the_window_is_started_by_nothing_in_the_core():
    """Qt stays out of the commands that need no window."""
    imported = {t.split(".")[0] for source in sources_under("shaftcore").values() for t in imported_by(source, {})}
    assert not imported & set(WINDOW)
