"""The whole job on the bench, by pointer and by keyboard alone, with the events Qt itself sends."""

from collections.abc import Callable
from dataclasses import replace

import pytest
from PySide6.QtCore import QByteArray, QEvent, QMimeData, QPointF, QRectF, Qt
from PySide6.QtGui import QDragEnterEvent, QDropEvent, QMouseEvent, QPainter, QPixmap
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QVBoxLayout, QWidget
from pytestqt.qtbot import QtBot

import app.document
from app.bench.drags import Drag
from app.bench.hand import BenchHand, make_hand
from app.bench.hits import Grip
from app.bench.placing import rested_place
from app.bench.readout import drag_lines, draw_readout
from app.bench.sizes import size_of
from app.bench.thing_menu import thing_menu
from app.bench.tools import MIME, TOOLS
from app.bench.view import BenchView
from app.document import Document
from app.kit import Kit
from app.ruler import Ruler
from app.theme import DARK, LIGHT
from shaftcore import edits
from shaftcore.errors import UnsoundShaftError
from shaftcore.evaluation import evaluate
from shaftcore.preferred import R40
from shaftcore.radius_window import SMALLEST, RadiusWindow, radius_window
from shaftcore.shaft import MOST_SUPPORTS, Shaft, Support, things

Key, NONE, LEFT = Qt.Key, Qt.MouseButton.NoButton, Qt.MouseButton.LeftButton
CTRL, SHIFT, PLAIN = (
    Qt.KeyboardModifier.ControlModifier,
    Qt.KeyboardModifier.ShiftModifier,
    Qt.KeyboardModifier.NoModifier,
)


def loaded_shaft() -> Shaft:
    """An invented agitator shaft: three steps, two bearings, one force, torque in and out."""
    shaft = Shaft()
    for length, diameter in ((60.0, 40.0), (120.0, 55.0), (70.0, 45.0)):
        shaft = edits.add_segment(shaft, length, diameter)
    for x in (20.0, 230.0):
        shaft, _ = edits.add_support(shaft, x)
    shaft, _ = edits.add_load(shaft, "radial force", 120.0, 4000.0)
    shaft, _ = edits.add_load(shaft, "torque", 40.0, 2e5)
    return edits.add_load(shaft, "torque", 200.0, -2e5)[0]


class Desk:
    """Bench and kit in a window, with the pointer's and the keyboard's events."""

    def __init__(self, qtbot: QtBot, shaft: Shaft) -> None:
        self.document, self.ruler = Document(), Ruler()
        self.bench = BenchView(self.document, self.ruler, LIGHT)
        self.hand: BenchHand = make_hand(self.bench, self.document)
        self.bench.hand = self.hand
        self.kit = Kit(self.document, self.bench, LIGHT)
        self.refusals: list[str] = []
        self.document.refused.connect(self.refusals.append)
        window = QWidget()
        column = QVBoxLayout(window)
        column.addWidget(self.bench)
        column.addWidget(self.kit)
        self.window = window
        qtbot.addWidget(window)
        window.resize(1000, 460)
        window.show()
        self.document.load(shaft, None)
        self.bench.fit()
        window.activateWindow()
        self.bench.setFocus()
        qtbot.waitUntil(self.bench.hasFocus, timeout=2000)

    @property
    def shaft(self) -> Shaft:
        return self.document.shaft

    def mouse(
        self,
        kind: QEvent.Type,
        pos: QPointF,
        button: Qt.MouseButton = NONE,
        held: Qt.MouseButton = NONE,
        modifiers: Qt.KeyboardModifier = PLAIN,
    ) -> None:
        event = QMouseEvent(kind, pos, QPointF(self.bench.mapToGlobal(pos)), button, held, modifiers)
        QApplication.sendEvent(self.bench, event)

    def press(self, pos: QPointF, modifiers: Qt.KeyboardModifier = PLAIN) -> None:
        self.mouse(QEvent.Type.MouseButtonPress, pos, LEFT, LEFT, modifiers)

    def move(self, pos: QPointF, held: bool = True, modifiers: Qt.KeyboardModifier = PLAIN) -> None:
        self.mouse(QEvent.Type.MouseMove, pos, NONE, LEFT if held else NONE, modifiers)

    def release(self, pos: QPointF, modifiers: Qt.KeyboardModifier = PLAIN) -> None:
        self.mouse(QEvent.Type.MouseButtonRelease, pos, LEFT, NONE, modifiers)

    def pull(self, start: QPointF, by: QPointF, modifiers: Qt.KeyboardModifier = PLAIN, let_go: bool = True) -> None:
        self.press(start, modifiers)
        for share in (0.25, 0.5, 0.75, 1.0):
            self.move(start + by * share, True, modifiers)
        if let_go:
            self.release(start + by, modifiers)

    def click(self, pos: QPointF) -> None:
        self.move(pos, held=False)
        self.press(pos)
        self.release(pos)

    def keys(self, *keys: Qt.Key | str, modifiers: Qt.KeyboardModifier = PLAIN) -> None:
        """Keys go to whatever has the keyboard at that moment, letter by letter."""
        for key in keys:
            for one in key if isinstance(key, str) else (key,):
                QTest.keyClick(QApplication.focusWidget() or self.bench, one, modifiers)

    def grip(self, sort: str, id: str, name: str) -> Grip:
        return next(grip for grip in self.hand.grips if grip.chosen == (sort, id) and grip.name == name)

    def at(self, sort: str, id: str, name: str) -> QPointF:
        """A place on a grip where no other one is nearer: of a line, near its begin."""
        grip = self.grip(sort, id, name)
        if grip.x2 is None or grip.y2 is None:
            return QPointF(grip.x, grip.y)
        return QPointF(grip.x + 0.3 * (grip.x2 - grip.x), grip.y + 0.3 * (grip.y2 - grip.y))

    def radius(self, index: int) -> float:
        shoulder = self.shaft.segments[index].shoulder
        assert shoulder is not None
        return shoulder.radius

    def margin(self, place: str) -> float:
        results = self.document.scene.results
        assert results is not None
        index = next(i for i, s in enumerate(results.stations) if (s.kind, s.place) == ("shoulder", place))
        return float(results.judged.margin[index])


@pytest.fixture
def desk(qtbot: QtBot) -> Desk:
    return Desk(qtbot, loaded_shaft())


@pytest.fixture
def empty(qtbot: QtBot) -> Desk:
    return Desk(qtbot, Shaft())


def sizes(shaft: Shaft) -> list[tuple[float, float]]:
    return [(segment.length, segment.diameter) for segment in shaft.segments]


# sketching --------------------------------------------------------------------------------------------


def test_a_shaft_is_drawn_by_clicks_and_esc_ends(empty: Desk) -> None:
    bench = empty.bench
    empty.click(bench.to_screen(0, 0))
    empty.move(bench.to_screen(99.0, 20.2), held=False)
    assert sizes(empty.shaft) == [(100.0, 40.0)]
    empty.click(bench.to_screen(99.0, 20.2))
    empty.click(bench.to_screen(100.0 + 124.0, 25.3))
    empty.move(bench.to_screen(300.0, 15.0), held=False)
    assert len(empty.shaft.segments) == 3
    empty.keys(Key.Key_Escape)
    assert sizes(empty.shaft) == [(100.0, 40.0), (125.0, 50.0)]
    assert empty.document.undo_stack.count() == 2
    assert empty.shaft.segments[0].shoulder is not None
    empty.document.undo_stack.undo()
    assert sizes(empty.shaft) == [(100.0, 40.0)]


def test_a_step_pulled_with_the_button_held_stands_on_release(empty: Desk) -> None:
    empty.pull(empty.bench.to_screen(0, 0), QPointF(200, -60))
    empty.keys(Key.Key_Return)
    assert len(empty.shaft.segments) == 1
    assert empty.hand.gesture is None


def test_typed_numbers_fix_length_and_diameter(empty: Desk) -> None:
    empty.click(empty.bench.to_screen(0, 0))
    empty.move(empty.bench.to_screen(50, 30), held=False)
    empty.keys("82,5", Key.Key_Tab, "47.5")
    empty.move(empty.bench.to_screen(250, 10), held=False)
    assert sizes(empty.shaft) == [(82.5, 47.5)]
    empty.click(empty.bench.to_screen(250, 10))
    empty.move(empty.bench.to_screen(150, 20), held=False)
    empty.keys("30")
    assert empty.shaft.segments[1].length == 30.0
    empty.keys(Key.Key_Return, Key.Key_Return)
    assert sizes(empty.shaft)[0] == (82.5, 47.5)
    assert empty.shaft.segments[1].length == 30.0


def test_a_shaft_is_drawn_by_keyboard_alone(empty: Desk) -> None:
    empty.keys("D", "100", Key.Key_Tab, "40", Key.Key_Return, "60", Key.Key_Tab, "50", Key.Key_Return)
    empty.keys(Key.Key_Return)
    assert sizes(empty.shaft) == [(100.0, 40.0), (60.0, 50.0)]
    assert empty.hand.gesture is None
    assert [empty.document.undo_stack.text(i) for i in range(2)] == [
        "Draw s1: 100 mm long, diameter 40 mm",
        "Draw s2: 60 mm long, diameter 50 mm",
    ]


def test_typed_numbers_are_in_the_units_of_the_user(empty: Desk) -> None:
    empty.document.set_system("US")
    empty.keys("D", "4", Key.Key_Tab, "1.5", Key.Key_Return, Key.Key_Return)
    assert sizes(empty.shaft) == [(pytest.approx(101.6), pytest.approx(38.1))]


def test_a_wrong_number_is_said_and_nothing_is_drawn(empty: Desk) -> None:
    empty.keys("D", "0")
    assert "Length" in empty.hand.refusal
    empty.keys(Key.Key_Backspace, "70", Key.Key_Tab, "30", Key.Key_Return, Key.Key_Escape)
    assert sizes(empty.shaft) == [(70.0, 30.0)]


def test_ctrl_pulls_freely(empty: Desk) -> None:
    empty.click(empty.bench.to_screen(0, 0))
    pos = empty.bench.to_screen(101.3, 20.4)
    empty.move(pos, held=False, modifiers=CTRL)
    x, y = empty.bench.to_shaft(pos)
    assert sizes(empty.shaft) == [(pytest.approx(x, abs=0.5), pytest.approx(2 * y, abs=1.0))]
    assert empty.shaft.segments[0].length not in R40
    empty.keys(Key.Key_Escape)


def test_backspace_takes_the_last_step_of_a_sketch_back(empty: Desk) -> None:
    empty.keys("D", "100", Key.Key_Tab, "40", Key.Key_Return, "60", Key.Key_Tab, "50", Key.Key_Return)
    empty.keys(Key.Key_Backspace)
    assert sizes(empty.shaft) == [(100.0, 40.0)]
    empty.keys("30", Key.Key_Tab, "45", Key.Key_Return, Key.Key_Escape)
    assert sizes(empty.shaft) == [(100.0, 40.0), (30.0, 45.0)]


def test_the_bench_shows_more_when_a_sketch_nears_its_edge(empty: Desk) -> None:
    empty.click(empty.bench.to_screen(0, 0))
    before = empty.ruler.end
    empty.move(QPointF(empty.bench.width() - 100, 150), held=False)
    assert empty.ruler.end == before
    empty.move(QPointF(empty.bench.width() - 10, 150), held=False)
    assert empty.ruler.end > 1.2 * before
    empty.keys(Key.Key_Escape)


def test_a_sketch_goes_on_at_the_right_hand_end(desk: Desk) -> None:
    before = sizes(desk.shaft)
    desk.keys("D", "35", Key.Key_Tab, "30", Key.Key_Return, Key.Key_Escape)
    assert sizes(desk.shaft) == [*before, (35.0, 30.0)]
    assert desk.shaft.segments[2].shoulder is not None


# dragging ----------------------------------------------------------------------------------------------


def test_pulling_a_fillet_changes_the_margin_live_and_commits_one_step(desk: Desk) -> None:
    radius, margin = desk.radius(0), desk.margin("s1")
    seen: list[float] = []
    desk.document.shown.connect(lambda scene: seen.append(scene.shaft.segments[0].shoulder.radius))
    desk.pull(desk.at("shoulder", "s1", "radius"), QPointF(-38, -38))
    assert desk.radius(0) == 2.5
    assert radius < desk.radius(0)
    assert desk.margin("s1") > margin
    assert len(set(seen)) > 2
    assert desk.document.undo_stack.count() == 1
    assert desk.document.undo_stack.undoText() == "Fillet radius s1|s2 to 2.5 mm"
    desk.document.undo_stack.undo()
    assert (desk.radius(0), desk.margin("s1")) == (radius, margin)
    desk.document.undo_stack.redo()
    assert desk.radius(0) == 2.5
    assert desk.margin("s1") == pytest.approx(
        float(evaluate(desk.shaft).judged.margin[evaluate(desk.shaft).station_of("s1")])  # type: ignore[index]
    )


def test_a_click_on_a_grip_chooses_and_changes_nothing(desk: Desk) -> None:
    before = desk.shaft
    desk.click(desk.at("shoulder", "s1", "radius"))
    assert desk.document.scene.chosen == ("shoulder", "s1")
    assert desk.shaft == before
    assert desk.document.undo_stack.count() == 0


def test_esc_takes_a_drag_back(desk: Desk) -> None:
    before = desk.shaft
    desk.pull(desk.at("shoulder", "s1", "radius"), QPointF(-40, -40), let_go=False)
    assert desk.shaft != before
    desk.keys(Key.Key_Escape)
    assert desk.shaft == before
    assert not desk.document.in_gesture
    desk.release(QPointF(10, 10))
    assert desk.document.undo_stack.count() == 0


def test_a_number_typed_during_a_drag_stands_whatever_the_pointer_does(desk: Desk) -> None:
    start = desk.at("shoulder", "s1", "radius")
    desk.pull(start, QPointF(-30, -30), let_go=False)
    desk.keys("2,25")
    desk.move(start + QPointF(-90, -90))
    assert desk.radius(0) == 2.25
    desk.release(start + QPointF(-90, -90))
    assert desk.radius(0) == 2.25
    assert desk.document.undo_stack.undoText() == "Fillet radius s1|s2 to 2.25 mm"


def test_ctrl_leaves_preferred_radii_aside(desk: Desk) -> None:
    start = desk.at("shoulder", "s1", "radius")
    desk.pull(start, QPointF(-31, -29), CTRL)
    free = desk.radius(0)
    assert free not in edits.FIRST_RADII
    desk.document.undo_stack.undo()
    desk.pull(start, QPointF(-31, -29))
    assert desk.radius(0) != free


@pytest.mark.parametrize(("way", "limit"), [(1.0, 179.0), (-1.0, 61.0)])
def test_pulled_past_what_can_be_a_thing_goes_to_its_limit_and_says_why(desk: Desk, way: float, limit: float) -> None:
    """A groove 1 mm deep, r 1 mm, has its middle 1 mm or more from both ends of its segment, x 60 to 180 mm."""
    desk.document.load(edits.add_raiser(loaded_shaft(), "groove", 100.0)[0], None)
    start = desk.at("groove", "g1", "x")
    desk.pull(start, QPointF(20 * way, 0), let_go=False)
    face = start + QPointF((limit + way - 100.0) * desk.ruler.scale, 0)
    desk.move(face)
    gesture = desk.hand.gesture
    assert isinstance(gesture, Drag)
    assert gesture.value == pytest.approx(limit, abs=0.05)
    assert 61.0 <= gesture.value <= 179.0
    assert desk.hand.refusal
    with pytest.raises(UnsoundShaftError):
        evaluate(gesture.size.apply(gesture.base, limit + 0.05 * way))
    reached = gesture.value
    desk.move(face + QPointF(0.5 * way, 0))
    assert gesture.value == reached
    assert desk.hand.refusal
    desk.move(start + QPointF((120.0 - 59.0 * way - 100.0) * desk.ruler.scale, 0))
    desk.move(start + QPointF((120.0 - 60.0 * way - 100.0) * desk.ruler.scale, 0))
    assert gesture.value == pytest.approx(120.0 - 59.0 * way, abs=0.05)
    beyond = face + QPointF(30 * way * desk.ruler.scale, 0)
    desk.move(beyond)
    assert desk.hand.refusal == ""
    desk.move(face)
    assert gesture.value == pytest.approx(limit + 2 * way, abs=2.5)
    desk.move(beyond)
    desk.release(beyond)
    assert desk.document.undo_stack.count() == 1
    assert not desk.document.in_gesture


@pytest.mark.parametrize("way", [1.0, -1.0])
def test_no_segment_is_pulled_thinner_than_the_hand_can_tell(desk: Desk, way: float) -> None:
    desk.pull(desk.at("segment", "s1", "length"), QPointF(2000 * way, 0))
    thin = desk.shaft.segments[0 if way < 0 else 1]
    assert thin.length == pytest.approx(4.0 / desk.ruler.scale, rel=0.2)
    assert desk.shaft.length == loaded_shaft().length


def test_a_fillet_jumps_to_the_radius_its_step_has_room_for(desk: Desk) -> None:
    """The arc of r 25 mm takes the whole length of a short segment of 25 mm: found to the digit, and kept."""
    desk.document.load(edits.add_segment(edits.add_segment(Shaft(), 25.0, 100.0), 100.0, 200.0), None)
    desk.bench.fit()
    start, pulls = desk.at("shoulder", "s1", "radius"), desk.grip("shoulder", "s1", "radius").direction
    desk.press(start)
    desk.move(start + QPointF(*pulls) * 60.0)
    desk.move(start + QPointF(*pulls) * 900.0)
    assert desk.radius(0) == 25.0
    assert "fillet" in desk.hand.refusal.lower() or "shoulder" in desk.hand.refusal.lower()
    desk.release(start + QPointF(*pulls) * 900.0)
    assert desk.radius(0) == 25.0
    assert desk.document.undo_stack.undoText() == "Fillet radius s1|s2 to 25 mm"


def test_a_typed_number_that_cannot_be_is_refused_not_bent_and_waits_to_be_mended(desk: Desk) -> None:
    before, start = desk.shaft, desk.at("shoulder", "s1", "radius")
    for mended in (True, False):
        desk.pull(start, QPointF(-20, -20), let_go=False)
        desk.keys("900")
        assert desk.hand.refusal
        assert desk.radius(0) == 90.0
        desk.release(start + QPointF(-20, -20))
        desk.keys(Key.Key_Return)
        assert isinstance(desk.hand.gesture, Drag)
        assert desk.document.undo_stack.count() == 0
        if mended:
            desk.keys(Key.Key_Backspace, Key.Key_Return)
            assert desk.radius(0) == 90.0
            desk.document.undo_stack.undo()
            desk.document.undo_stack.clear()
        else:
            desk.click(start + QPointF(200, 0))
            assert desk.hand.gesture is None
        assert desk.shaft == before


@pytest.mark.expects_error
def test_a_drag_survives_a_failure_inside_the_analysis(desk: Desk, monkeypatch: pytest.MonkeyPatch) -> None:
    before = desk.shaft
    start = desk.at("shoulder", "s1", "radius")
    desk.pull(start, QPointF(-40, -40), let_go=False)

    def broken(shaft: Shaft) -> None:
        raise ZeroDivisionError("planted")

    with monkeypatch.context() as patched:
        patched.setattr(app.document, "evaluate", broken)
        desk.move(start + QPointF(-80, -80))
        assert desk.hand.gesture is None
        assert desk.shaft == before
        desk.release(start + QPointF(-80, -80))
    for box in QApplication.topLevelWidgets():
        if box is not desk.window:
            box.close()
    desk.bench.setFocus()
    desk.pull(start, QPointF(-38, -38))
    assert desk.radius(0) == 2.5
    assert desk.document.undo_stack.count() == 1


def test_undo_rests_during_a_drag(desk: Desk) -> None:
    desk.document.change(edits.replace_shoulder(desk.shaft, "s1", radius=1.2), "Fillet")
    undo = desk.document.undo_stack.createUndoAction(desk.bench)
    assert undo.isEnabled()
    desk.pull(desk.at("shoulder", "s1", "radius"), QPointF(-50, -50), let_go=False)
    shown = desk.shaft
    assert not undo.isEnabled()
    desk.keys(Key.Key_Z, modifiers=CTRL)
    undo.trigger()
    assert desk.shaft == shown
    desk.release(QPointF(10, 10))
    assert undo.isEnabled()
    undo.trigger()
    assert desk.radius(0) == 1.2


def test_a_step_taken_back_under_a_drag_ends_it_in_good_order(desk: Desk) -> None:
    before = desk.shaft
    desk.document.change(edits.replace_shoulder(desk.shaft, "s1", radius=1.2), "Fillet")
    start = desk.at("shoulder", "s1", "radius")
    desk.pull(start, QPointF(-50, -50), let_go=False)
    desk.document.undo_stack.undo()
    assert desk.shaft == before
    desk.move(start + QPointF(-90, -90))
    desk.release(start)
    assert desk.shaft == before
    assert desk.hand.gesture is None
    assert desk.document.undo_stack.index() == 0


def test_an_outline_pulls_the_diameter(desk: Desk) -> None:
    by = 5.0 * desk.ruler.scale / 2
    desk.pull(desk.at("segment", "s2", "diameter"), QPointF(0, -by))
    assert desk.shaft.segments[1].diameter == 60.0
    assert desk.document.undo_stack.undoText() == "Diameter s2 to 60 mm"


def test_a_face_is_pulled_between_its_neighbours_and_with_shift_all_moves_along(desk: Desk) -> None:
    start, scale = desk.at("segment", "s1", "length"), desk.ruler.scale
    desk.pull(start, QPointF(7.0 * scale, 0))
    assert desk.shaft.segments[0].length == 67.0
    assert desk.shaft.length == pytest.approx(250.0)
    desk.document.undo_stack.undo()
    desk.pull(start, QPointF(7.0 * scale, 0), SHIFT)
    assert desk.shaft.segments[0].length == 67.0
    assert desk.shaft.length == pytest.approx(257.0)
    assert things(desk.shaft)["B"].x == pytest.approx(237.0)  # type: ignore[union-attr]


def test_supports_and_loads_are_pulled_sideways(desk: Desk) -> None:
    desk.pull(desk.at("support", "B", "x"), QPointF(-9.0 * desk.ruler.scale, 0))
    assert things(desk.shaft)["B"].x == pytest.approx(221.0, abs=2.0)  # type: ignore[union-attr]
    desk.pull(desk.at("radial force", "F1", "x"), QPointF(20.0 * desk.ruler.scale, 0))
    assert things(desk.shaft)["F1"].x == pytest.approx(140.0, abs=2.0)  # type: ignore[union-attr]


def test_a_support_pulled_beyond_the_end_stops_there_and_says_so(desk: Desk) -> None:
    desk.pull(desk.at("support", "B", "x"), QPointF(60.0 * desk.ruler.scale, 0), let_go=False)
    assert isinstance(desk.hand.gesture, Drag)
    assert desk.hand.gesture.value == things(desk.shaft)["B"].x == desk.shaft.length  # type: ignore[union-attr]
    desk.hand.gesture.enter()
    assert desk.document.undo_stack.undoText() == "Position B to 250 mm"


def test_a_place_typed_off_the_shaft_is_refused_not_bent(desk: Desk) -> None:
    start = desk.at("support", "B", "x")
    desk.pull(start, QPointF(-9.0, 0), let_go=False)
    pulled = things(desk.shaft)["B"].x  # type: ignore[union-attr]
    desk.keys("900", Key.Key_Return)
    assert "900 mm" in desk.refusals[-1]
    assert things(desk.shaft)["B"].x != desk.shaft.length  # type: ignore[union-attr]
    desk.keys(Key.Key_Escape, Key.Key_Escape)
    assert things(desk.shaft)["B"].x == 230.0 != pulled  # type: ignore[union-attr]
    desk.document.choose(("support", "B"))
    desk.hand.keys.open_number("x")
    desk.keys("900", Key.Key_Return)
    assert things(desk.shaft)["B"].x == 230.0  # type: ignore[union-attr]
    assert "900 mm" in desk.refusals[-1]


def test_the_free_end_of_an_arrow_pulls_the_force(desk: Desk) -> None:
    grip = desk.grip("radial force", "F1", "force")
    desk.pull(QPointF(grip.x, grip.y), QPointF(*grip.direction) * 83.0)
    assert desk.shaft.loads[0].force == 8000.0  # type: ignore[union-attr]


@pytest.mark.parametrize("key", [tool.key for tool in TOOLS if tool.goes == "on a diameter"])
def test_every_size_handle_of_every_raiser_pulls_its_size(desk: Desk, key: str) -> None:
    shaft, id = edits.add_raiser(desk.shaft, key, 100.0)
    desk.document.load(shaft, None)
    for grip in [grip for grip in desk.hand.grips if grip.chosen == (key, id) and grip.law == "ratio"]:
        before = getattr(things(desk.shaft)[id], grip.name)
        desk.pull(QPointF(grip.x, grip.y), QPointF(*grip.direction) * 60.0)
        assert getattr(things(desk.shaft)[id], grip.name) > before
        desk.document.undo_stack.undo()
    desk.pull(desk.at(key, id, "x"), QPointF(10.0 * desk.ruler.scale, 0))
    assert things(desk.shaft)[id].x == pytest.approx(110.0, abs=2.0)  # type: ignore[union-attr]


def test_every_grip_is_taken_hold_of_within_nine_pixels(desk: Desk) -> None:
    for grip in desk.hand.grips:
        if not grip.is_line:
            taken = desk.hand.grips[0].__class__
            assert isinstance(grip, taken)
            assert grip.distance(QPointF(grip.x + 9.0, grip.y)) <= 11.0
            desk.move(QPointF(grip.x, grip.y), held=False)
            assert desk.bench.cursor().shape() in (
                Qt.CursorShape.SizeHorCursor,
                Qt.CursorShape.SizeVerCursor,
                Qt.CursorShape.SizeBDiagCursor,
                Qt.CursorShape.SizeFDiagCursor,
            )


def test_a_drag_of_a_fillet_shows_its_radius_window(desk: Desk) -> None:
    desk.pull(desk.at("shoulder", "s1", "radius"), QPointF(-20, -20), let_go=False)
    results = desk.document.scene.results
    assert results is not None
    gesture = desk.hand.gesture
    assert isinstance(gesture, Drag)
    assert gesture.window == radius_window(evaluate(loaded_shaft()), "s1")
    desk.bench.grab()
    desk.keys(Key.Key_Escape)


def test_one_analysis_for_each_move_that_changes_something(desk: Desk, monkeypatch: pytest.MonkeyPatch) -> None:
    counted: list[Shaft] = []
    real: Callable[[Shaft], object] = app.document.evaluate

    def counting(shaft: Shaft) -> object:
        counted.append(shaft)
        return real(shaft)

    start = desk.at("shoulder", "s1", "radius")
    desk.press(start)
    desk.move(start + QPointF(-10, -10), modifiers=CTRL)
    monkeypatch.setattr(app.document, "evaluate", counting)
    for step in range(11, 21):
        desk.move(start + QPointF(-step, -step), modifiers=CTRL)
    assert len(counted) == 10
    desk.move(start + QPointF(-20, -20), modifiers=CTRL)
    desk.release(start + QPointF(-20, -20), modifiers=CTRL)
    assert len(counted) == 10


# keyboard alone ------------------------------------------------------------------------------------------


def test_arrows_walk_and_change_and_steps_of_one_size_merge(desk: Desk) -> None:
    before = desk.shaft
    for _ in range(20):
        desk.keys(Key.Key_Right)
        if desk.document.scene.chosen == ("shoulder", "s1"):
            break
    assert desk.document.scene.chosen == ("shoulder", "s1")
    results = desk.document.scene.results
    assert results is not None
    assert desk.document.scene.station == results.station_of("s1")
    radius = desk.radius(0)
    desk.keys(Key.Key_Up, Key.Key_Up)
    assert desk.radius(0) in edits.FIRST_RADII or desk.radius(0) > radius
    desk.keys(Key.Key_Up, modifiers=CTRL)
    assert desk.document.undo_stack.count() == 1
    assert f"{desk.radius(0):g}" in desk.document.undo_stack.undoText()
    desk.document.undo_stack.undo()
    assert desk.shaft == before


def test_left_and_right_pass_every_station_and_every_thing(desk: Desk) -> None:
    desk.keys(Key.Key_Home)
    seen = []
    for _ in range(60):
        seen.append((desk.document.scene.chosen, desk.document.scene.station))
        desk.keys(Key.Key_Right)
    results = desk.document.scene.results
    assert results is not None
    stations = {(s.kind, s.place) for s in results.stations}
    assert stations <= {chosen for chosen, _ in seen}
    assert set(things(desk.shaft)) <= {chosen[1] for chosen, _ in seen if chosen}


def test_enter_opens_the_number_and_a_refusal_stays_beside_it(desk: Desk) -> None:
    desk.click(desk.at("shoulder", "s1", "radius"))
    desk.keys(Key.Key_Return)
    field = desk.hand.number_field
    assert field is not None
    assert field.field.hasFocus()
    desk.keys("500", Key.Key_Return)
    assert desk.hand.number_field is field
    assert field.field.problem
    assert desk.shaft == loaded_shaft()
    field.field.selectAll()
    desk.keys("1,5", Key.Key_Return)
    assert desk.radius(0) == 1.5
    assert desk.hand.number_field is None
    assert desk.bench.hasFocus()


def test_the_number_field_can_be_seen_while_nothing_is_wrong(desk: Desk) -> None:
    desk.click(desk.at("shoulder", "s1", "radius"))
    desk.keys(Key.Key_Return)
    field = desk.hand.number_field
    assert field is not None
    for typed in ("2", Key.Key_Backspace, "3"):
        desk.keys(typed)
        QApplication.processEvents()
        assert desk.bench.rect().contains(field.geometry())
        assert field.rect().contains(field.field.geometry())
        assert field.field.height() >= field.field.sizeHint().height()


def test_all_of_a_long_refusal_can_be_read_in_the_number_field(desk: Desk) -> None:
    desk.mouse(QEvent.Type.MouseButtonDblClick, desk.at("shoulder", "s1", "radius"), LEFT, LEFT)
    field = desk.hand.number_field
    assert field is not None
    desk.keys("999", Key.Key_Return)
    words = field.field.words_label
    assert words.text()
    QApplication.processEvents()
    assert words.height() >= words.heightForWidth(words.width())
    assert desk.bench.rect().contains(field.geometry())
    assert desk.hand.refusal == ""


def test_esc_leaves_the_number_as_it_was(desk: Desk) -> None:
    desk.click(desk.at("shoulder", "s1", "radius"))
    desk.keys(Key.Key_Return, "3", Key.Key_Escape, Key.Key_Escape)
    assert desk.hand.number_field is None
    assert desk.shaft == loaded_shaft()


def test_a_digit_opens_the_number_with_it(desk: Desk) -> None:
    desk.click(desk.at("segment", "s2", "diameter"))
    desk.keys("60", Key.Key_Return)
    assert desk.shaft.segments[1].diameter == 60.0


def test_tab_goes_through_the_sizes_and_then_on(desk: Desk) -> None:
    desk.click(desk.at("segment", "s2", "diameter"))
    names = [desk.hand.keys.size.name]  # type: ignore[union-attr]
    while desk.bench.hasFocus() and len(names) < 10:
        desk.keys(Key.Key_Tab)
        if desk.bench.hasFocus():
            names.append(desk.hand.keys.size.name)  # type: ignore[union-attr]
    assert names == ["diameter", "end_diameter", "bore", "length"]
    assert not desk.bench.hasFocus()


def test_delete_takes_the_chosen_thing_off(desk: Desk) -> None:
    desk.click(desk.at("radial force", "F1", "x"))
    desk.keys(Key.Key_Delete)
    assert "F1" not in things(desk.shaft)
    assert desk.document.scene.chosen is None
    assert desk.document.undo_stack.undoText() == "Radial force F1 taken off"
    desk.click(desk.at("shoulder", "s1", "radius"))
    desk.keys(Key.Key_Delete)
    assert desk.shaft.segments[0].shoulder is not None
    assert any("differ" in words for words in desk.refusals)


# kit ---------------------------------------------------------------------------------------------------


def test_supports_and_loads_are_put_on_by_key_and_click(empty: Desk) -> None:
    empty.keys("D", "200", Key.Key_Tab, "40", Key.Key_Return, Key.Key_Return)
    assert empty.document.scene.missing
    for key, x in (("S", 20.0), ("S", 180.0), ("R", 100.0)):
        empty.keys(key)
        assert empty.hand.gesture is not None
        empty.click(empty.bench.to_screen(x + 0.4, 3.0))
    assert [support.x for support in empty.shaft.supports] == [20.0, 180.0]
    assert [support.locating for support in empty.shaft.supports] == [True, False]
    assert empty.document.scene.results is not None
    assert empty.document.scene.chosen == ("radial force", "F1")
    assert empty.shaft.loads[0].force > 0  # type: ignore[union-attr]
    empty.keys("2500", Key.Key_Return)
    assert empty.shaft.loads[0].force == 2500.0  # type: ignore[union-attr]


def test_things_are_put_on_by_keyboard_alone(empty: Desk) -> None:
    empty.keys("D", "200", Key.Key_Tab, "40", Key.Key_Return, Key.Key_Return)
    empty.keys("S", "15", Key.Key_Return, "S", "185", Key.Key_Return, "T", Key.Key_Right, Key.Key_Return)
    assert [support.x for support in empty.shaft.supports] == [15.0, 185.0]
    assert empty.shaft.loads[0].x == 105.0
    empty.keys("120", Key.Key_Return)
    assert empty.shaft.loads[0].torque == 120e3  # type: ignore[union-attr]


@pytest.mark.parametrize("tool", [tool for tool in TOOLS if tool.place], ids=lambda tool: tool.key)
def test_every_entry_of_the_kit_can_be_dropped_on_the_bench(qtbot: QtBot, tool: object) -> None:
    shaft = loaded_shaft()
    desk = Desk(qtbot, edits.remove_thing(shaft, "A"))
    before, key = desk.shaft, tool.key  # type: ignore[attr-defined]
    data = QMimeData()
    data.setData(MIME, QByteArray(key.encode()))
    pos = desk.bench.to_screen(90.0, 5.0)
    enter = QDragEnterEvent(pos.toPoint(), Qt.DropAction.CopyAction, data, LEFT, PLAIN)
    QApplication.sendEvent(desk.bench, enter)
    assert enter.isAccepted()
    drop = QDropEvent(pos, Qt.DropAction.CopyAction, data, LEFT, PLAIN)
    QApplication.sendEvent(desk.bench, drop)
    assert drop.isAccepted()
    assert desk.shaft != before
    assert desk.document.scene.chosen is not None
    assert desk.hand.keys.size is not None
    assert desk.document.undo_stack.count() == 1


def test_esc_puts_an_entry_back(desk: Desk) -> None:
    action = desk.kit.actions_by_key["support"]
    desk.keys("S")
    assert action.isChecked()
    desk.keys(Key.Key_Escape)
    assert not action.isChecked()
    assert desk.hand.gesture is None
    action.trigger()
    assert action.isChecked()
    action.trigger()
    assert not action.isChecked()
    assert desk.shaft == loaded_shaft()


def test_a_third_support_is_put_on_and_shares_the_load(desk: Desk) -> None:
    before = desk.document.scene.results
    desk.keys("S")
    desk.click(desk.bench.to_screen(100.0, 0.0))
    assert [support.x for support in desk.shaft.supports][2:] == [100.0]
    assert [support.locating for support in desk.shaft.supports] == [True, False, False]
    assert not desk.refusals
    after = desk.document.scene.results
    assert before is not None
    assert after is not None
    assert after.along.reactions.shape[-1] == before.along.reactions.shape[-1] + 1
    assert desk.document.scene.chosen == ("support", desk.shaft.supports[2].id)
    assert desk.hand.keys.size is not None
    assert desk.hand.keys.size.name == "x"


def test_one_support_more_than_can_be_is_refused_in_words(desk: Desk) -> None:
    shaft = desk.shaft
    many = tuple(Support(f"B{i}", shaft.length * i / MOST_SUPPORTS, locating=i == 0) for i in range(MOST_SUPPORTS))
    desk.document.load(replace(shaft, supports=many), None)
    desk.keys("S")
    desk.click(desk.bench.to_screen(101.0, 0.0))
    assert len(desk.shaft.supports) == MOST_SUPPORTS
    assert any(str(MOST_SUPPORTS) in words for words in desk.refusals)
    desk.bench.grab()
    desk.keys(Key.Key_Escape)


def test_all_sizes_of_a_support_are_reached_and_typed_by_key(desk: Desk) -> None:
    desk.click(desk.at("support", "B", "x"))
    names = [desk.hand.keys.size.name]  # type: ignore[union-attr]
    for _ in range(3):
        desk.keys(Key.Key_Tab)
        names.append(desk.hand.keys.size.name)  # type: ignore[union-attr]
    assert names == ["x", "stiffness", "offset_y", "offset_z"]
    desk.keys("0", ".", "0", "2", Key.Key_Return)
    assert desk.shaft.supports[1].offset_z == 0.02


def test_every_entry_has_name_letter_and_words(desk: Desk) -> None:
    actions = desk.kit.actions_by_key
    assert set(actions) == {tool.key for tool in TOOLS}
    letters = [action.shortcut().toString() for action in actions.values()]
    assert len(set(letters)) == len(letters)
    for action in actions.values():
        assert action.text()
        assert action.toolTip()
        assert desk.kit.bar.widgetForAction(action).accessibleName()


# menu --------------------------------------------------------------------------------------------------


def test_the_menu_of_a_thing_offers_its_sizes_and_changes(desk: Desk) -> None:
    desk.click(desk.at("shoulder", "s1", "radius"))
    menu = thing_menu(desk.hand, desk.hand.keys, 60.0)
    assert menu is not None
    corners = next(action.menu() for action in menu.actions() if action.menu() is not None)
    next(action for action in corners.actions() if action.text().startswith("1.5 mm")).trigger()  # type: ignore[union-attr]
    assert desk.shaft.segments[0].shoulder.bearing_corner == 1.5  # type: ignore[union-attr]

    desk.click(desk.bench.to_screen(110.0, 5.0))
    menu = thing_menu(desk.hand, desk.hand.keys, 110.0)
    assert menu is not None
    by_text = {action.text().replace("&", ""): action for action in menu.actions()}
    assert any(text.startswith("Bore: ") for text in by_text)
    by_text["Split here"].trigger()
    assert [segment.length for segment in desk.shaft.segments] == [60.0, 50.0, 70.0, 70.0]

    desk.click(desk.at("support", "B", "x"))
    menu = thing_menu(desk.hand, desk.hand.keys, 230.0)
    assert menu is not None
    next(action for action in menu.actions() if "locating" in action.text()).trigger()
    assert [support.locating for support in desk.shaft.supports] == [False, True]


# what is shown and the rest ------------------------------------------------------------------------------


def test_the_readout_of_a_fillet_names_size_factors_worst_place_and_window(desk: Desk) -> None:
    weak = edits.replace_thing(desk.shaft, "F1", force=14000.0)
    desk.document.load(edits.replace_shoulder(weak, "s1", radius=0.6, bearing_corner=2.1), None)
    size = size_of(desk.shaft, ("shoulder", "s1"), "radius")
    results = desk.document.scene.results
    assert size is not None
    assert results is not None
    window = radius_window(results, "s1")
    lines = [text for _, text in drag_lines(desk.document.scene, size, 0.6, "", window)]
    assert lines[0].startswith("Fillet radius s1|s2")
    assert "0.6 mm" in lines[0]
    assert "Kt" in lines[1]
    assert "margin" in lines[2]
    assert results.stations[results.governing].label in lines[3]
    assert window.needed is not None
    shown = float(lines[4].split(": ")[1].split(" mm needed")[0])
    assert window.needed <= shown < window.needed + 0.01
    assert "2 mm allowed (bearing corner" in lines[4]
    for needed, words in ((None, "no radius"), (SMALLEST, "any radius"), (3.001, "empty: 3.01 mm needed")):
        other = RadiusWindow("s1", needed, 2.0, window.limited_by)
        assert words in drag_lines(desk.document.scene, size, 0.6, "", other)[4][1]
    typed = drag_lines(desk.document.scene, size, 0.6, "1,", window)
    assert "1,▏" in typed[0][1]


def test_the_readout_keeps_clear_of_what_is_pulled(desk: Desk) -> None:
    room, pulled = QRectF(0, 0, 600, 300), QPointF(320, 160)
    canvas = QPixmap(600, 300)
    painter = QPainter(canvas)
    for pointer in (QPointF(300, 140), QPointF(340, 180), QPointF(300, 180), QPointF(580, 290)):
        box = draw_readout(painter, [("size", "Fillet radius 2.5 mm"), ("plain", "n 2")], pointer, room, LIGHT, pulled)
        assert room.contains(box)
        assert not box.contains(pulled)
        assert not box.contains(pointer)
    painter.end()


def test_the_readout_finds_a_place_off_the_handle_near_an_edge(qtbot: QtBot) -> None:
    """Wider than what is left beside the handle, it goes above or below it, off a lens too."""
    room, pulled, lens = QRectF(0, 0, 860, 325), QPointF(481, 116), QRectF(8, 180, 230, 80)
    canvas = QPixmap(860, 325)
    with QPainter(canvas) as painter:
        for pointer in (QPointF(500, 60), QPointF(470, 130), QPointF(481, 116)):
            box = draw_readout(painter, [("size", "r = 1 mm " * 7)], pointer, room, LIGHT, pulled, lens)
            assert box.width() > 360
            assert not box.contains(pulled)
            assert not box.contains(pointer)
            assert not box.intersects(lens)


def test_the_readout_says_at_which_station_its_factors_are(desk: Desk) -> None:
    size = size_of(desk.shaft, ("segment", "s1"), "diameter")
    assert size is not None
    lines = [text for _, text in drag_lines(desk.document.scene, size, 40.0, "", None)]
    assert lines[1] == "at Shoulder s1|s2:"
    own = size_of(desk.shaft, ("shoulder", "s1"), "radius")
    assert own is not None
    assert not any(text.startswith("at ") for _, text in drag_lines(desk.document.scene, own, 1.0, "", None))


def test_things_come_to_rest_on_faces_and_middles_and_freely_with_ctrl(desk: Desk) -> None:
    near = 5.0 / desk.ruler.scale
    assert rested_place(desk.shaft, 60.0 + near, desk.ruler.scale, "SI", True) == 60.0
    assert rested_place(desk.shaft, 60.0 + near, desk.ruler.scale, "SI", False) > 60.0
    assert rested_place(desk.shaft, 120.0 - near, desk.ruler.scale, "SI", False) == 120.0
    desk.document.change(edits.remove_thing(desk.shaft, "B"), "B taken off")
    desk.keys("S")
    desk.press(desk.bench.to_screen(60.0 + near, 0.0), CTRL)
    assert things(desk.shaft)["B"].x == pytest.approx(60.0 + near, abs=0.3)  # type: ignore[union-attr]


def test_shift_keeps_the_entry_in_hand(desk: Desk) -> None:
    desk.keys("R")
    for x in (80.0, 150.0):
        desk.press(desk.bench.to_screen(x, 0.0), SHIFT)
        desk.release(desk.bench.to_screen(x, 0.0), SHIFT)
    assert {"F2", "F3"} <= set(things(desk.shaft))
    assert desk.hand.gesture is not None
    desk.click(desk.bench.to_screen(200.0, 0.0))
    assert desk.hand.gesture is None


def test_each_end_of_a_taper_is_pulled_by_its_half_of_the_outline(desk: Desk) -> None:
    desk.document.change(edits.replace_thing(desk.shaft, "s2", end_diameter=50.0), "Taper")
    up = QPointF(0, -5.0 * desk.ruler.scale / 2)
    desk.pull(desk.at("segment", "s2", "end_diameter"), up)
    segment = desk.shaft.segments[1]
    assert (segment.diameter, segment.end_diameter) == (55.0, 55.0)
    desk.document.undo_stack.undo()
    desk.pull(desk.at("segment", "s2", "diameter"), up)
    segment = desk.shaft.segments[1]
    assert (segment.diameter, segment.end_diameter) == (60.0, 50.0)


def test_a_fillet_is_pulled_by_its_lower_arc_too(desk: Desk) -> None:
    upper, lower = (g for g in desk.hand.grips if g.chosen == ("shoulder", "s1") and g.name == "radius")
    assert upper.y + lower.y == pytest.approx(2 * desk.bench.axis_px())
    desk.pull(QPointF(lower.x, lower.y), QPointF(*lower.direction) * 54.0)
    assert desk.radius(0) == 2.5


def test_two_quick_clicks_open_the_number(desk: Desk) -> None:
    desk.mouse(QEvent.Type.MouseButtonDblClick, desk.at("segment", "s1", "length"), LEFT, LEFT)
    field = desk.hand.number_field
    assert field is not None
    assert field.field.accessibleName() == "Length s1"
    desk.press(desk.bench.to_screen(110.0, 0.0))
    assert desk.hand.number_field is None


def test_the_middle_button_moves_the_picture(desk: Desk) -> None:
    begin, middle = desk.ruler.begin, Qt.MouseButton.MiddleButton
    desk.mouse(QEvent.Type.MouseButtonPress, QPointF(300, 100), middle, middle)
    desk.mouse(QEvent.Type.MouseMove, QPointF(340, 100), NONE, middle)
    desk.mouse(QEvent.Type.MouseButtonRelease, QPointF(340, 100), middle, NONE)
    assert desk.ruler.begin == pytest.approx(begin - 40.0 / desk.ruler.scale)
    desk.move(QPointF(380, 100), held=False)
    assert desk.ruler.begin == pytest.approx(begin - 40.0 / desk.ruler.scale)


def test_a_letter_does_not_end_a_drag_and_a_new_file_does(desk: Desk) -> None:
    start = desk.at("shoulder", "s1", "radius")
    desk.pull(start, QPointF(-40, -40), let_go=False)
    desk.keys("S")
    assert isinstance(desk.hand.gesture, Drag)
    other = edits.add_segment(Shaft(), 10.0, 5.0)
    desk.document.load(other, None)
    assert desk.hand.gesture is None
    desk.release(start)
    assert desk.shaft == other


def test_steps_of_two_sizes_stay_two_and_there_and_back_is_none(desk: Desk) -> None:
    desk.click(desk.at("segment", "s2", "diameter"))
    desk.keys(Key.Key_Up, Key.Key_Tab, Key.Key_Tab, Key.Key_Tab, Key.Key_Up)
    assert desk.document.undo_stack.count() == 2
    desk.document.load(loaded_shaft(), None)
    before = desk.shaft
    desk.document.choose(("segment", "s1"))
    desk.keys(Key.Key_Up, Key.Key_Down)
    assert desk.shaft == before
    assert desk.document.undo_stack.count() == 0


def test_the_whole_overlay_draws_in_both_themes_at_rest_and_in_every_gesture(desk: Desk) -> None:
    for theme in (LIGHT, DARK):
        desk.bench.set_theme(theme)
        desk.kit.set_theme(theme)
        plain = desk.bench.grab().toImage()
        desk.move(desk.at("segment", "s2", "diameter"), held=False)
        assert desk.bench.grab().toImage() != plain
        desk.keys(Key.Key_Right)
        desk.bench.grab()
        for letter in ("D", "S"):
            desk.keys(letter, "5")
            desk.bench.grab()
            desk.keys(Key.Key_Escape)
        assert not desk.kit.grab().isNull()
