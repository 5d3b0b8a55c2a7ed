"""Symbols set with subscripts and powers."""

import pytest

from app.symbol_text import rich
from shaftcore.nomenclature import COLUMNS


@pytest.mark.parametrize(
    ("plain", "set_text"),
    [
        ("σ_b,a", "σ<sub>b,a</sub>"),
        ("σ_a'", "σ<sub>a</sub>′"),
        ("Kt,b", "K<sub>t,b</sub>"),
        ("Kts,0", "K<sub>ts,0</sub>"),
        ("Kfs^2 τ_a^2", "K<sub>fs</sub><sup>2</sup> τ<sub>a</sub><sup>2</sup>"),
        ("M_y² + M_z²", "M<sub>y</sub>² + M<sub>z</sub>²"),
        ("S_ut²", "S<sub>ut</sub>²"),
        ("ϑ_F⁴ + β_σ", "ϑ<sub>F</sub>⁴ + β<sub>σ</sub>"),
        ("d² Kt", "d² K<sub>t</sub>"),
        ("C1 + C2 (2h/D)", "C<sub>1</sub> + C<sub>2</sub> (2h/D)"),
        ("|T_a|", "|T<sub>a</sub>|"),
        ("650^(−0.265)", "650<sup>−0.265</sup>"),
        ("n_y,asked, 2", "n<sub>y,asked</sub>, 2"),
        ("35^3 < x", "35<sup>3</sup> &lt; x"),
        ("KEY to 12 mm", "KEY to 12 mm"),
    ],
)
def test_plain_symbols_become_print(plain: str, set_text: str) -> None:
    assert rich(plain) == set_text


def test_no_symbol_of_the_nomenclature_keeps_an_underscore() -> None:
    assert not [column.symbol for column in COLUMNS if "_" in rich(column.symbol)]
