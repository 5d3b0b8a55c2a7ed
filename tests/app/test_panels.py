"""The panels beside the drawing: each follows the document and asks it for changes."""

from dataclasses import replace
from typing import Any

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QAbstractButton, QComboBox, QLineEdit, QPlainTextEdit, QWidget
from pytestqt.qtbot import QtBot

from app.document import Document
from app.panels.editors import ChoiceField, Editor, LineField, SwitchField, TextField
from app.panels.givens import Givens, given_parts
from app.panels.ledger import Ledger
from app.panels.ledger_model import FIRST_COLUMNS
from app.panels.notices import Notices
from app.panels.record_form import Home, RecordForm
from app.panels.thing import ThingPanel
from app.panels.workings import Workings
from app.quantity_field import QuantityField
from app.theme import DARK, LIGHT
from shaftcore.declared import Part, declared
from shaftcore.edits import replace_shoulder, replace_thing
from shaftcore.nomenclature import BY_KEY
from shaftcore.notches.groove import Groove
from shaftcore.notches.kinds import RAISER_RECORDS
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import LOAD_RECORDS, RadialForce, Segment, Shaft, Support, Torque, things
from shaftcore.steels import STEELS

SHAFT = Shaft(
    segments=(
        Segment("s1", 60, 40, shoulder=Shoulder(1.5)),
        Segment("s2", 80, 50, shoulder=Shoulder(0.6, bearing_corner=0.3)),
        Segment("s3", 100, 64, shoulder=Shoulder(2.0)),
        Segment("s4", 60, 45),
    ),
    raisers=(Groove("g1", 190, 1.0, 0.8),),
    supports=(Support("A", 30, "left", True), Support("B", 270, "right")),
    loads=(RadialForce("F1", 170, 7000, name="wheel"), Torque("T1", 170, 2e5), Torque("T2", 5, -2e5)),
)


@pytest.fixture
def document(qtbot: QtBot) -> Document:
    made = Document()
    made.load(SHAFT, None)
    return made


def _shown(qtbot: QtBot, panel: QWidget, width: int = 480, height: int = 420) -> None:
    qtbot.addWidget(panel)
    panel.resize(width, height)
    with qtbot.waitActive(panel):  # without a window manager a window must ask for the keyboard
        panel.show()
        panel.activateWindow()


# ledger ---------------------------------------------------------------------------------------------


@pytest.fixture
def ledger(document: Document, qtbot: QtBot) -> Ledger:
    made = Ledger(document, LIGHT)
    _shown(qtbot, made, 500)
    return made


def _column(ledger: Ledger, key: str) -> list[str]:
    column = [c.key for c in ledger.model.columns].index(key)
    return [ledger.model.index(row, column).data() for row in range(ledger.model.rowCount())]


def _utilisation(document: Document) -> list[int]:
    assert document.scene.results is not None
    return [int(i) for i in np.argsort(-document.scene.results.judged.utilisation, kind="stable")]


def test_the_ledger_has_one_row_a_station_governing_first_or_by_position(ledger: Ledger, document: Document) -> None:
    assert ledger.model.rows == _utilisation(document)
    assert ledger.model.mark(0).governs
    ledger.order = "x"
    assert _column(ledger, "station") == [str(i + 1) for i in range(len(ledger.model.rows))]
    assert ledger.order == "x"


def test_a_narrow_ledger_shows_the_telling_columns_without_scrolling(ledger: Ledger) -> None:
    table = ledger.table
    for column, key in enumerate(ledger.columns[:5]):
        right = table.columnViewportPosition(column) + table.columnWidth(column)
        assert right <= table.viewport().width(), key
    assert ledger.columns[:5] == ["station", "place", "n", "margin", "yield_margin"]


def test_columns_are_chosen_moved_and_remembered(ledger: Ledger) -> None:
    assert ledger.columns == list(FIRST_COLUMNS)
    ledger.columns = ["margin", "n", "no such column", "kf_torsion"]
    assert ledger.columns == ["margin", "n", "kf_torsion"]
    ledger.table.heads.moveSection(2, 0)
    assert ledger.columns == ["kf_torsion", "margin", "n"]
    ledger.columns = ["x", "n"]
    assert ledger.columns == ["x", "n"]
    ledger.columns = ["nothing known"]
    assert ledger.columns == ["x", "n"]


def test_the_picker_ticks_columns(ledger: Ledger) -> None:
    ledger.columns_action.trigger()
    items = {ledger.picker.list.item(i).data(Qt.ItemDataRole.UserRole): i for i in range(ledger.picker.list.count())}
    assert set(items) == set(BY_KEY)
    ledger.picker.list.item(items["torque"]).setCheckState(Qt.CheckState.Checked)
    assert ledger.columns[-1] == "torque"
    ledger.picker.list.item(items["x"]).setCheckState(Qt.CheckState.Unchecked)
    assert "x" not in ledger.columns
    ledger.picker.usual.click()
    assert ledger.columns == list(FIRST_COLUMNS)
    ledger.picker.close()


def test_search_keeps_what_matches_and_says_when_nothing_does(ledger: Ledger, document: Document) -> None:
    everything = ledger.model.rowCount()
    QTest.keyClicks(ledger.search, "shoulder s1")
    assert _column(ledger, "place") == ["Shoulder s1|s2"]
    ledger.search.clear()
    QTest.keyClicks(ledger.search, "bearing corner")  # words of a notice
    assert _column(ledger, "place") == ["Shoulder s2|s3"]
    ledger.search.setText("no such place")
    assert (ledger.model.rowCount(), "no such place" in ledger.table.empty_words) == (0, True)
    ledger.table.grab()
    document.change(replace_thing(document.shaft, "F1", force=6500.0), "Force")
    assert (ledger.model.rowCount(), "no such place" in ledger.table.empty_words) == (0, True)
    document.change(replace(document.shaft, supports=()), "Take the supports away")
    assert "set two supports" in ledger.table.empty_words
    document.undo_stack.undo()
    ledger.search.clear()
    assert ledger.model.rowCount() == everything


def test_copy_gives_tab_separated_text_with_heads_and_units(ledger: Ledger, document: Document) -> None:
    ledger.columns = ["station", "place", "margin", "amplitude"]
    ledger.table.selectRow(1)
    ledger.copy_action.trigger()
    lines = QGuiApplication.clipboard().text().splitlines()
    assert lines[0].split("\t") == ["No.", "Place", "margin (%)", "σ_a' (MPa)"]
    assert len(lines) == 2
    results, station = document.scene.results, ledger.model.rows[1]
    assert results is not None
    cells = lines[1].split("\t")
    assert cells[1] == results.stations[station].label
    assert float(cells[2]) == pytest.approx(100 * results.judged.margin[station], abs=0.051)
    assert float(cells[3]) == pytest.approx(results.judged.amplitude[station], abs=0.051)
    document.change(replace(SHAFT, judgement=replace(SHAFT.judgement, asked_factor=20.0)), "Ask more")
    ledger.copy_all_action.trigger()
    lines = QGuiApplication.clipboard().text().splitlines()
    assert len(lines) == 1 + len(ledger.model.rows)
    assert float(lines[1].split("\t")[2]) < 0


def test_copy_follows_moved_heads(ledger: Ledger) -> None:
    ledger.columns = ["station", "place", "n"]
    ledger.table.heads.moveSection(2, 0)
    ledger.copy_all_action.trigger()
    assert QGuiApplication.clipboard().text().splitlines()[0] == "n\tNo.\tPlace"


def test_choosing_a_row_chooses_the_station_everywhere_and_back(ledger: Ledger, document: Document) -> None:
    ledger.table.setFocus()
    ledger.table.selectRow(0)
    QTest.keyClick(ledger.table, Qt.Key.Key_Down)
    station = ledger.model.rows[1]
    assert document.scene.station == station
    assert document.scene.chosen is not None
    assert document.scene.results is not None
    assert document.scene.chosen[1] == document.scene.results.stations[station].place
    document.choose(("segment", "s2"))
    assert document.scene.chosen == ("segment", "s2")  # the row that follows chooses nothing by itself
    document.choose(None, ledger.model.rows[3])
    assert ledger.table.currentIndex().row() == 3
    document.choose(None)
    assert not ledger.table.selectionModel().hasSelection()


def test_a_thing_in_the_station_of_another_is_shown_there_until_it_has_its_own(
    ledger: Ledger, document: Document
) -> None:
    document.choose(("load", "T1"))  # stands where F1 does
    assert document.scene.results is not None
    assert ledger.model.rows[ledger.table.currentIndex().row()] == document.scene.station
    assert document.scene.station == document.scene.results.station_of("F1")
    document.change(replace_thing(document.shaft, "T1", x=200.0), "Torque")
    assert document.scene.results.station_of("T1") == document.scene.station is not None


def test_columns_widened_by_an_outsize_number_become_narrow_again(ledger: Ledger, document: Document) -> None:
    widths = [ledger.table.columnWidth(column) for column in range(ledger.model.columnCount())]
    sound = document.shaft
    document.change(replace(sound, loads=(replace(sound.loads[0], force=1e-30),)), "Force")
    assert ledger.table.heads.length() > 1.5 * sum(widths)
    document.change(sound, "Force")
    after = [ledger.table.columnWidth(column) for column in range(ledger.model.columnCount())]
    assert all(new < 2 * old for new, old in zip(after, widths, strict=True))


def test_a_drag_changes_numbers_without_reset_and_sorts_when_it_ends(ledger: Ledger, document: Document) -> None:
    resets: list[int] = []
    blocks: list[tuple[int, int]] = []
    ledger.model.modelReset.connect(lambda: resets.append(1))
    ledger.model.dataChanged.connect(lambda a, b: blocks.append((a.row(), b.row())))
    before, order = _column(ledger, "n"), list(ledger.model.rows)
    for radius in (2.0, 4.0, 5.0):
        assert document.preview(replace_shoulder(SHAFT, "s1", radius=radius))
    assert ledger.model.rows == order != _utilisation(document)
    assert not resets
    results = document.scene.results
    assert results is not None
    moved = order.index(results.station_of("s1") or 0)
    assert blocks == [(moved, moved)] * 3
    after = _column(ledger, "n")
    assert [i for i in range(len(after)) if after[i] != before[i]] == [moved]
    assert float(after[moved]) == pytest.approx(results.judged.n[order[moved]], abs=5e-4)
    document.commit("Drag a fillet")
    assert ledger.model.rows == _utilisation(document)
    assert not resets


def test_new_stations_are_shown_during_a_drag(ledger: Ledger, document: Document) -> None:
    count = ledger.model.rowCount()
    document.preview(replace(SHAFT, loads=(*SHAFT.loads, RadialForce("F9", 100, 500))))
    assert ledger.model.rowCount() == count + 1
    document.cancel()
    assert ledger.model.rowCount() == count


def test_units_of_the_ledger_follow_the_system(ledger: Ledger, document: Document) -> None:
    millimetres = [float(x) for x in _column(ledger, "x")]
    document.set_system("US")
    assert ledger.model.unit(ledger.columns.index("x")) == "in"
    assert [float(x) for x in _column(ledger, "x")] == pytest.approx([x / 25.4 for x in millimetres], abs=1e-4)


def test_rows_that_fail_are_marked_in_words_too(ledger: Ledger, document: Document) -> None:
    document.change(replace(SHAFT, judgement=replace(SHAFT.judgement, asked_factor=20.0)), "Ask more")
    assert ledger.model.fails(0)
    assert "falls short" in ledger.model.mark(0).words().lower()
    assert "falls short" in ledger.model.headerData(0, Qt.Orientation.Vertical, Qt.ItemDataRole.ToolTipRole).lower()


def test_an_unfinished_shaft_empties_the_ledger_and_says_what_is_missing(ledger: Ledger, document: Document) -> None:
    document.change(replace(SHAFT, supports=()), "Take the supports away")
    assert ledger.model.rowCount() == 0
    assert "set two supports" in ledger.table.empty_words
    ledger.grab()
    document.undo_stack.undo()
    assert ledger.model.rowCount() > 0


def test_notices_beside_the_rows_are_in_the_units_that_are_read(ledger: Ledger, document: Document) -> None:
    """The fillet of 0.6 mm at a bearing corner of 0.3 mm: 0.6/25.4 and 0.3/25.4 in."""
    row = _column(ledger, "place").index("Shoulder s2|s3")
    assert "Fillet r 0.6\u00a0mm is larger" in ledger.model.mark(row).words()
    document.set_system("US")
    row = _column(ledger, "place").index("Shoulder s2|s3")
    assert "Fillet r 0.02362\u00a0in is larger than 0.01181\u00a0in" in ledger.model.mark(row).words()
    assert " mm" not in ledger.model.mark(row).words().replace("\u00a0", " ")


# workings -------------------------------------------------------------------------------------------


@pytest.fixture
def workings(document: Document, qtbot: QtBot) -> Workings:
    made = Workings(document, LIGHT)
    _shown(qtbot, made)
    return made


def test_workings_show_the_governing_station_until_one_is_chosen(workings: Workings, document: Document) -> None:
    results = document.scene.results
    assert results is not None
    assert workings.text.toPlainText().splitlines()[0].endswith(results.stations[results.governing].label)
    document.choose(("shoulder", "s1"))
    assert "Shoulder s1|s2" in workings.text.toPlainText().splitlines()[0]
    index = results.station_of("s1")
    assert index is not None
    assert f"= {results.judged.n[index]:.6g}" in workings.text.toPlainText()
    assert "K_" not in workings.text.toPlainText()
    assert "vertical-align:sub" in workings.text.toHtml()


def test_workings_follow_a_drag_at_a_measured_pace_and_end_up_right(
    workings: Workings, document: Document, qtbot: QtBot
) -> None:
    document.choose(("shoulder", "s1"))
    assert "Root radius = 1.5" in workings.text.toPlainText()
    document.preview(replace_shoulder(SHAFT, "s1", radius=1.4))
    assert "Root radius = 1.4" in workings.text.toPlainText()
    document.preview(replace_shoulder(SHAFT, "s1", radius=1.3))
    assert "Root radius = 1.4" in workings.text.toPlainText()  # too soon
    qtbot.waitUntil(lambda: "Root radius = 1.3" in workings.text.toPlainText(), timeout=2000)
    document.preview(replace_shoulder(SHAFT, "s1", radius=1.2))
    document.cancel()
    fresh = Workings(document, LIGHT)
    _shown(qtbot, fresh)
    assert workings.text.toPlainText() == fresh.text.toPlainText()
    assert "Root radius = 1.5" in workings.text.toPlainText()
    document.preview(replace_shoulder(SHAFT, "s1", radius=1.1))  # the pace does not jam after a cancel
    qtbot.waitUntil(lambda: "Root radius = 1.1" in workings.text.toPlainText(), timeout=2000)


def test_workings_echo_results_in_the_system_that_is_read(workings: Workings, document: Document) -> None:
    assert "ksi" not in workings.text.toPlainText()
    document.set_system("US")
    assert "ksi" in workings.text.toPlainText()


# forms ----------------------------------------------------------------------------------------------

RECORDS = [*given_parts().values(), Segment, Support, Shoulder, *LOAD_RECORDS, *RAISER_RECORDS]


@pytest.mark.parametrize("record", RECORDS, ids=lambda record: record.__name__)
def test_a_form_has_an_editor_for_every_declared_field(record: type, document: Document, qtbot: QtBot) -> None:
    form = RecordForm(document, LIGHT, record, lambda: Home("", lambda _: None, lambda shaft, *_: shaft))
    qtbot.addWidget(form)
    fields = declared(record)
    assert set(form.editors) == {name for name, declaration in fields.items() if not isinstance(declaration, Part)}
    assert set(form.parts) == {name for name, declaration in fields.items() if isinstance(declaration, Part)}
    for name, editor in form.editors.items():
        assert editor.accessibleName() == fields[name].label


def _enter(editor: Editor, value: Any) -> Any:
    """Give an editor another value by keyboard or click; returns what the record must hold then."""
    if isinstance(editor, QuantityField):
        low, high = editor.declaration.low, editor.declaration.high
        wanted = round(min(max((value or 1.0) * 1.01, low), high), 6) if value or low > 0 else (low + high) / 1e3
        unit = editor.declaration.dimension.si
        editor.selectAll()
        QTest.keyClicks(editor, f"{unit.shown(wanted):.9g}")
        QTest.keyClick(editor, Qt.Key.Key_Return)
        return pytest.approx(wanted)
    if isinstance(editor, ChoiceField):
        index = (editor.currentIndex() + 1) % editor.count()
        editor.setCurrentIndex(index)
        editor.activated.emit(index)
        return editor.itemData(index)
    if isinstance(editor, SwitchField):
        editor.click()
        return not value
    if isinstance(editor, LineField):
        editor.selectAll()
        QTest.keyClicks(editor, "something else")
        QTest.keyClick(editor, Qt.Key.Key_Return)
        return "something else"
    assert isinstance(editor, TextField)
    editor.setFocus()
    editor.setPlainText("several\nlines")
    editor.clearFocus()
    return "several\nlines"


GIVEN_FIELDS = [(group, name) for group, record in given_parts().items() for name in declared(record)]


@pytest.mark.parametrize(("group", "name"), GIVEN_FIELDS, ids=lambda part: str(part))
def test_every_given_is_changed_in_one_step_and_taken_back(
    group: str, name: str, document: Document, qtbot: QtBot
) -> None:
    givens = Givens(document, LIGHT)
    _shown(qtbot, givens)
    before = getattr(getattr(document.shaft, group), name)
    wanted = _enter(givens.forms[group].editors[name], before)
    assert getattr(getattr(document.shaft, group), name) == wanted
    assert before != wanted
    assert document.undo_stack.count() == 1
    document.undo_stack.undo()
    assert document.shaft == SHAFT
    assert givens.forms[group].editors[name].words_label.text() == ""


def test_a_given_that_is_refused_says_why_beside_itself_and_changes_nothing(document: Document, qtbot: QtBot) -> None:
    givens = Givens(document, LIGHT)
    _shown(qtbot, givens)
    field = givens.forms["material"].editors["yield_strength"]
    assert isinstance(field, QuantityField)
    field.selectAll()
    QTest.keyClicks(field, "900")
    QTest.keyClick(field, Qt.Key.Key_Return)
    assert "tensile strength" in field.problem
    assert field.words_label.isVisible()
    assert field.text() == "900"
    assert document.shaft == SHAFT


def test_units_are_switched_everywhere_at_any_time(document: Document, qtbot: QtBot) -> None:
    givens = Givens(document, LIGHT)
    _shown(qtbot, givens)
    givens.units.setCurrentIndex(1)
    givens.units.activated.emit(1)
    assert document.scene.system == "US"
    field = givens.forms["material"].editors["tensile_strength"]
    assert isinstance(field, QuantityField)
    assert float(field.text()) == pytest.approx(650 / 6.894757, rel=1e-5)
    assert document.shaft == SHAFT


@pytest.mark.parametrize("name", sorted(STEELS))
def test_a_steel_is_picked_for_a_band_of_diameters(name: str, document: Document, qtbot: QtBot) -> None:
    stiff = replace(SHAFT, material=replace(SHAFT.material, elastic_modulus=211e3, poisson_ratio=0.28))
    document.load(stiff, None)
    givens = Givens(document, LIGHT)
    _shown(qtbot, givens)
    assert givens.steel.steel.currentData() is None  # the user's own values
    index = givens.steel.steel.findData(name)
    givens.steel.steel.activated.emit(index)
    rows = STEELS[name].rows
    band = next(i for i, row in enumerate(rows) if row[0] >= 64)  # the shaft's largest diameter
    material = document.shaft.material
    assert (material.name, material.tensile_strength, material.yield_strength) == (name, *rows[band][1:])
    assert givens.steel.band.currentIndex() == band
    givens.steel.band.activated.emit(0)
    assert document.shaft.material.tensile_strength == rows[0][1]
    assert (document.shaft.material.elastic_modulus, document.shaft.material.poisson_ratio) == (211e3, 0.28)
    document.change(replace(document.shaft, material=replace(document.shaft.material, yield_strength=333.0)), "Own")
    assert givens.steel.steel.currentData() is None


# the chosen thing -----------------------------------------------------------------------------------


@pytest.fixture
def thing(document: Document, qtbot: QtBot) -> ThingPanel:
    made = ThingPanel(document, LIGHT)
    _shown(qtbot, made)
    return made


def _type(panel: ThingPanel, record: type, name: str, text: str) -> None:
    field = panel.forms[record].editors[name]
    assert isinstance(field, QuantityField | LineField)
    assert field.isVisible()
    field.selectAll()
    QTest.keyClicks(field, text)
    QTest.keyClick(field, Qt.Key.Key_Return)


@pytest.mark.parametrize(
    ("chosen", "record", "name", "text", "value"),
    [
        (("segment", "s2"), Segment, "diameter", "52", 52.0),
        (("groove", "g1"), Groove, "depth", "1,2", 1.2),
        (("support", "A"), Support, "x", "31", 31.0),
        (("radial force", "F1"), RadialForce, "force", "6 kN", 6000.0),
        (("plain", "F1"), RadialForce, "force", "6 kN", 6000.0),  # a station of the load
    ],
)
def test_the_sizes_of_the_chosen_thing_are_typed(
    thing: ThingPanel, document: Document, chosen: tuple[str, str], record: type, name: str, text: str, value: float
) -> None:
    document.choose(chosen)
    _type(thing, record, name, text)
    assert getattr(things(document.shaft)[chosen[1]], name) == pytest.approx(value)
    assert document.shaft == replace_thing(SHAFT, chosen[1], **{name: value})


def test_a_shoulder_is_typed_alone_and_within_its_segment(thing: ThingPanel, document: Document) -> None:
    document.choose(("shoulder", "s1"))
    _type(thing, Shoulder, "radius", "1.8")
    assert document.shaft == replace_shoulder(SHAFT, "s1", radius=1.8)
    document.choose(("segment", "s1"))
    part = thing.forms[Segment].parts["shoulder"]
    field = part.editors["radius"]
    assert isinstance(field, QuantityField)
    assert field.value == 1.8
    field.selectAll()
    QTest.keyClicks(field, "1.6")
    QTest.keyClick(field, Qt.Key.Key_Return)
    assert document.shaft == replace_shoulder(SHAFT, "s1", radius=1.6)


def test_a_typed_length_moves_what_lies_behind_it(thing: ThingPanel, document: Document) -> None:
    document.choose(("segment", "s1"))
    _type(thing, Segment, "length", "70")
    assert things(document.shaft)["B"].x == 280  # type: ignore[union-attr]
    assert document.shaft.length == SHAFT.length + 10


def test_fields_stand_as_close_under_each_other_after_a_longer_form_was_shown(
    thing: ThingPanel, document: Document
) -> None:
    thing.resize(480, 900)
    document.choose(("shoulder", "s1"))
    QTest.qWait(20)
    form = thing.forms[Shoulder]
    editors = list(form.editors.values())
    places = [editor.y() for editor in editors]
    for chosen in (("segment", "s1"), ("load", "F1"), ("shoulder", "s1")):
        document.choose(chosen)
        QTest.qWait(20)
    assert [editor.y() for editor in editors] == places


def test_a_renamed_thing_stays_chosen(thing: ThingPanel, document: Document) -> None:
    document.choose(("segment", "s3"))
    _type(thing, Segment, "id", "seat")
    assert document.scene.chosen == ("segment", "seat")
    assert "seat" in thing.title.text()
    _type(thing, Segment, "id", "s1")
    assert "Rename" in thing.forms[Segment].editors["id"].words_label.text()


def test_a_chosen_support_says_what_it_carries(thing: ThingPanel, document: Document) -> None:
    document.choose(("support", "A"))
    assert thing.said.isVisible()
    assert thing.said.text().startswith("Presses on the shaft with")
    assert "R_y" in thing.said.text()
    before = thing.said.text()
    document.change(replace_thing(document.shaft, "F1", force=9000.0), "More")
    assert thing.said.text() != before
    form = thing.forms[Support]
    assert form.editors["stiffness"].placeholderText() == "rigid"  # type: ignore[union-attr]
    form.editors["stiffness"].committed.emit(2e5)
    form.editors["offset_y"].committed.emit(-0.01)
    assert (document.shaft.supports[0].stiffness, document.shaft.supports[0].offset_y) == (2e5, -0.01)
    document.choose(("segment", "s1"))
    assert not thing.said.isVisible()
    document.change(replace(document.shaft, supports=document.shaft.supports[:1]), "Take one off")
    document.choose(("support", "A"))
    assert not thing.said.isVisible()


def test_nothing_chosen_says_what_to_do(thing: ThingPanel, document: Document) -> None:
    document.choose(None)
    assert thing.nothing.isVisible()
    document.choose(("segment", "s1"))
    assert not thing.nothing.isVisible()
    document.change(replace_thing(SHAFT, "s1", length=61.0), "Longer")
    assert not thing.nothing.isVisible()


# notices --------------------------------------------------------------------------------------------


def test_notices_lead_to_their_place_and_provisional_ones_come_first(document: Document, qtbot: QtBot) -> None:
    notices = Notices(document, LIGHT)
    _shown(qtbot, notices)
    document.change(replace(SHAFT, loads=SHAFT.loads[:-1]), "Take a torque away")
    assert notices.entries[0].urgent
    assert "do not balance" in notices.entries[0].text
    results = document.scene.results
    assert results is not None
    assert len(notices.entries) == len(results.notices)
    row = next(i for i, entry in enumerate(notices.entries) if entry.station is not None)
    notices.list.setCurrentIndex(notices.model.index(row))
    notices.list.setFocus()
    QTest.keyClick(notices.list, Qt.Key.Key_Return)
    assert document.scene.station == notices.entries[row].station
    notices.grab()


def test_what_is_missing_stands_among_the_notices(document: Document, qtbot: QtBot) -> None:
    notices = Notices(document, LIGHT)
    _shown(qtbot, notices)
    document.change(replace(SHAFT, supports=SHAFT.supports[:1]), "Take a support away")
    assert [entry.head for entry in notices.entries] == ["Missing"]
    assert "two supports" in notices.entries[0].text


# manners --------------------------------------------------------------------------------------------


@pytest.fixture(params=[Ledger, Workings, Givens, ThingPanel, Notices])
def panel(request: pytest.FixtureRequest, document: Document, qtbot: QtBot) -> QWidget:
    made = request.param(document, LIGHT)
    document.choose(("segment", "s2"))
    _shown(qtbot, made)
    return made


def test_every_control_has_an_accessible_name(panel: QWidget) -> None:
    sorts = (QLineEdit, QComboBox, QAbstractButton, QPlainTextEdit)
    controls = [c for sort in sorts for c in panel.findChildren(sort) if c.isVisible() and c.metaObject().className()]
    unnamed = [c for c in controls if not c.accessibleName() and not c.parent().accessibleName() and c.text() == ""]
    assert panel.accessibleName()
    assert not unnamed


@pytest.mark.parametrize("sort", [Ledger, Givens, ThingPanel])
def test_tab_walks_from_top_to_bottom_and_left_to_right(sort: Any, document: Document, qtbot: QtBot) -> None:
    panel = sort(document, LIGHT)
    document.choose(("segment", "s2"))
    _shown(qtbot, panel)
    places, widget = [], panel.nextInFocusChain()
    while widget is not panel:
        wants_tab = bool(widget.focusPolicy() & Qt.FocusPolicy.TabFocus) and widget.focusProxy() is None
        if panel.isAncestorOf(widget) and widget.isVisible() and widget.isEnabled() and wants_tab:
            at = widget.mapTo(panel, widget.rect().center())
            places.append((at.y(), at.x()))
        widget = widget.nextInFocusChain()
    assert len(places) >= 4
    assert places == sorted(places)


def test_a_panel_is_drawn_in_both_themes_and_for_an_empty_shaft(panel: Any, document: Document) -> None:
    light = panel.grab().toImage()
    panel.set_theme(DARK)
    assert panel.grab().toImage() != light
    document.load(Shaft(), None)
    panel.grab()
