"""What the givens offer is what the formulas know: choices stand above the registries and may not drift from them."""

from shaftcore.declared import Choice, declared
from shaftcore.mean_stress_rules import RULES
from shaftcore.notches.kinds import KINDS
from shaftcore.shaft import Judgement
from shaftcore.strength_factors import FINISH_TABLES
from shaftcore.surface import FINISHES


def _offered(field: str) -> list[str]:
    declaration = declared(Judgement)[field]
    assert isinstance(declaration, Choice)
    return [value for value, _ in declaration.options]


def test_mean_stress_rules() -> None:
    assert _offered("mean_stress_rule") == list(RULES)


def test_sources_of_kt_are_known_to_every_raiser() -> None:
    for kind in KINDS.values():
        assert set(_offered("kt_source")) == set(kind.fits), kind.key


def test_finish_tables_hold_every_finish() -> None:
    assert set(_offered("finish_table")) == set(FINISH_TABLES)
    for table, rows in FINISH_TABLES.items():
        assert set(rows) == {name for name, _ in FINISHES}, table
