"""Numbers as they are typed and shown, and the field that takes them.

Conversions are checked against the tables of NIST Special Publication 811 (2008), appendix B.9.
"""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from pytestqt.qtbot import QtBot

from app.quantity_field import QuantityField
from shaftcore.declared import Quantity
from shaftcore.errors import QuantityError
from shaftcore.number_text import GROUP, brief, editable, in_full, shown, unit_symbol, with_unit
from shaftcore.typed_numbers import parse
from shaftcore.units import DIMENSIONS, SYSTEMS, System, readable_units

LENGTH = Quantity("Length", "length", 0.0, 1e5, above=True)
STRENGTH = Quantity("Tensile strength", "stress", 200.0, 3000.0)
TORQUE = Quantity("Torque", "torque", -1e11, 1e11)
FORCE = Quantity("Force", "force", -1e8, 1e8)
CORNER = Quantity("Corner", "length", 0.15, 9.5, optional=True)


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("12,5", 12.5),
        ("12.5", 12.5),
        (" 1 200 ", 1200.0),
        ("1\u202f200,5", 1200.5),
        ("1,200.5", 1200.5),
        ("1.200,5", 1200.5),
        ("1,2", 1.2),
        ("0,125", 0.125),
        ("1200,125", 1200.125),
        (".5", 0.5),
        ("5.", 5.0),
        ("1e3", 1000.0),
        ("12 mm", 12.0),
        ("12mm", 12.0),
        ("0.5 in", 12.7),
        ('0.5"', 12.7),
        ("2 ft", 609.6),
        ("1.5 cm", 15.0),
    ],
)
def test_what_people_type_for_a_length_is_read(text: str, value: float) -> None:
    assert parse(text, LENGTH, "SI") == pytest.approx(value, rel=1e-12)


@pytest.mark.parametrize(
    ("text", "declaration", "value"),
    [
        ("110 ksi", STRENGTH, 110 * 6.894757),
        ("110 KSI", STRENGTH, 110 * 6.894757),
        ("95000 psi", STRENGTH, 95 * 6.894757),
        ("650 N/mm2", STRENGTH, 650.0),
        ("1 lbf·in", TORQUE, 112.9848),
        ("1 lbf in", TORQUE, 112.9848),
        ("1 lbf·ft", TORQUE, 1355.818),
        ("−2,5 kNm", TORQUE, -2.5e6),
        ("3 N.m", TORQUE, 3000.0),
        ("1 lbf", FORCE, 4.448222),
        ("5 kN", FORCE, 5000.0),
    ],
)
def test_units_of_either_system_are_converted(text: str, declaration: Quantity, value: float) -> None:
    for system in SYSTEMS:
        assert parse(text, declaration, system) == pytest.approx(value, rel=1e-6)


def test_the_end_of_a_range_is_met_in_either_unit() -> None:
    assert parse("3937.00787401575 in", LENGTH, "SI") == 1e5


def test_a_bare_number_is_in_the_unit_of_the_system() -> None:
    assert parse("2", LENGTH, "US") == pytest.approx(50.8)
    assert parse("0,125", LENGTH, "US") == pytest.approx(3.175)


@pytest.mark.parametrize(
    "text",
    [
        "",
        "abc",
        "nan",
        "inf",
        "-inf",
        "1.2.3",
        "1,2,3",
        "12 00",
        "5 5",
        "--5",
        "1_000",
        "12 N",
        "1e999",
        "0",
        "-3",
        "100001",
        "1e6",
    ],
)
def test_nonsense_and_what_is_out_of_range_is_refused_with_place_and_range(text: str) -> None:
    with pytest.raises(QuantityError) as caught:
        parse(text, LENGTH, "SI")
    words = str(caught.value)
    assert words.startswith("Length: ")
    assert "above 0 up to 100000 mm" in words
    assert text.strip("- ") in words or not text


def test_the_range_is_told_in_the_unit_that_is_read() -> None:
    with pytest.raises(QuantityError, match=r"105 is out of range\. Allowed: 200 to 3000 MPa"):
        parse("105", STRENGTH, "SI")
    with pytest.raises(QuantityError, match=r"Allowed: 29\.0075 to 435\.113 ksi"):
        parse("10", STRENGTH, "US")


@pytest.mark.parametrize("system", SYSTEMS)
def test_a_lone_comma_before_three_digits_is_not_guessed_at(system: System) -> None:
    with pytest.raises(QuantityError, match=r"two ways\. Write 1200, or 1\.200"):
        parse("1,200", LENGTH, system)


@given(st.floats(1e-3, 1e5), st.sampled_from(SYSTEMS))
def test_what_a_field_shows_reads_back(value: float, system: str) -> None:
    declaration = Quantity("Length", "length", 0.0, 2e5)
    assert parse(editable(value, declaration, system), declaration, system) == pytest.approx(value, rel=1e-5)  # type: ignore[arg-type]


@pytest.mark.parametrize("name", sorted(DIMENSIONS))
def test_every_unit_that_may_be_typed_is_read_back(name: str) -> None:
    declaration = Quantity("Some", name, -math.inf, math.inf)
    for unit in readable_units(name):
        if unit.symbol:
            assert parse(f"3 {unit.symbol}", declaration, "SI") == pytest.approx(unit.internal(3))


def test_numbers_are_shown_with_fixed_decimals_groups_and_a_true_minus() -> None:
    assert shown(12.5, "length", "SI") == "12.50"
    assert shown(-1234.5, "length", "SI") == "−1234.50"
    assert shown(12345.6, "length", "SI") == f"12{GROUP}345.60"
    assert shown(-1e-9, "length", "SI") == "0.00"
    assert shown(0.123, "share", "SI", 1, signed=True) == "+12.3"
    assert shown(-1e-6, "share", "SI", 1, signed=True) == "−0.0"
    assert shown(math.inf, "ratio", "SI") == "unloaded"
    assert shown(None, "length", "SI") == "–"
    assert shown(7, "", "SI") == "7"
    assert shown(100, "temperature", "US") == "212"
    assert with_unit(25.4, "length", "US") == "1.0000\u00a0in"
    assert with_unit(90, "angle", "SI") == "90.0°"
    assert with_unit(0.25, "share", "SI", 1, signed=True) == "+25.0\u00a0%"
    assert with_unit(math.inf, "share", "SI") == "unloaded"
    assert brief(1200.50, "length", "SI") == "1200.5"
    assert brief(1200, "force", "SI") == "1200"
    assert unit_symbol("stress", "US") == "ksi"


def test_what_was_typed_is_written_in_full_and_what_was_converted_to_a_few_digits() -> None:
    assert in_full(0.125, "length", "SI") == "0.125"
    assert in_full(-12345.678, "length", "SI") == f"−12{GROUP}345.678"
    assert in_full(25.0, "length", "US", kept=4) == "0.9843"
    assert in_full(1e10, "torque", "SI") == f"10{GROUP}000{GROUP}000"
    assert in_full(math.pi * 1e6, "length", "SI", kept=4) == f"3{GROUP}142{GROUP}000"
    assert in_full(-0.0, "length", "SI") == "0"
    assert editable(math.pi * 1e6, LENGTH, "SI") == "3141590"


# the field ----------------------------------------------------------------------------------------


@pytest.fixture
def field(qtbot: QtBot) -> QuantityField:
    made = QuantityField(LENGTH)
    made.words_label.setParent(made)
    made.set_value(40.0)
    qtbot.addWidget(made)
    made.show()
    return made


def _type(field: QuantityField, text: str, key: Qt.Key | None = None) -> None:
    field.selectAll()
    QTest.keyClicks(field, text)
    if key is not None:
        QTest.keyClick(field, key)


def test_enter_takes_a_number(field: QuantityField, qtbot: QtBot) -> None:
    with qtbot.waitSignal(field.committed) as caught:
        _type(field, "1,5 in", Qt.Key.Key_Return)
    assert caught.args == [pytest.approx(38.1)]


def test_leaving_takes_a_number(field: QuantityField, qtbot: QtBot) -> None:
    _type(field, "41")
    with qtbot.waitSignal(field.committed) as caught:
        field.editingFinished.emit()
    assert caught.args == [41.0]


def test_what_is_wrong_is_said_while_typing_and_nothing_is_taken(field: QuantityField, qtbot: QtBot) -> None:
    with qtbot.assertNotEmitted(field.committed):
        _type(field, "12x")
        assert "not known here" in field.problem
        assert field.problem in field.accessibleDescription()
        QTest.keyClick(field, Qt.Key.Key_Return)
    assert field.text() == "12x"
    _type(field, "12")
    assert field.problem == ""


def test_escape_takes_the_typing_back(field: QuantityField, qtbot: QtBot) -> None:
    with qtbot.assertNotEmitted(field.committed):
        _type(field, "77x", Qt.Key.Key_Escape)
    assert (field.text(), field.problem) == ("40", "")


def test_a_refused_number_stays_with_its_reason_and_may_be_offered_again(field: QuantityField, qtbot: QtBot) -> None:
    field.committed.connect(lambda _: field.refuse("too long for its neighbours"))
    _type(field, "50", Qt.Key.Key_Return)
    field.set_value(40.0)  # the shaft still has it
    assert (field.text(), field.problem) == ("50", "too long for its neighbours")
    with qtbot.waitSignal(field.committed):
        QTest.keyClick(field, Qt.Key.Key_Return)


def test_the_other_system_is_echoed_and_shown_when_switched(field: QuantityField) -> None:
    assert "= 1.5748 in" in field.toolTip()
    _type(field, "25.4")
    assert "= 1 in" in field.toolTip()
    field.set_system("US")
    assert field.text() == "1.5748"
    assert "= 40 mm" in field.toolTip()


def test_an_untouched_number_keeps_digits_that_are_not_shown(field: QuantityField, qtbot: QtBot) -> None:
    field.set_value(math.pi)
    field.set_system("US")
    with qtbot.assertNotEmitted(field.committed):
        field.setFocus()
        QTest.keyClick(field, Qt.Key.Key_Return)
    assert field.value == math.pi


def test_an_optional_number_may_be_none(qtbot: QtBot) -> None:
    field = QuantityField(CORNER)
    qtbot.addWidget(field)
    field.set_value(1.0)
    for text in ("", "none"):
        with qtbot.waitSignal(field.committed) as caught:
            field.setText("1")
            field.selectAll()
            QTest.keyClick(field, Qt.Key.Key_Delete)
            QTest.keyClicks(field, text)
            QTest.keyClick(field, Qt.Key.Key_Return)
        assert caught.args == [None]


def test_the_field_speaks_its_name(field: QuantityField) -> None:
    assert field.accessibleName() == "Length"
    assert "in mm" in field.accessibleDescription()
