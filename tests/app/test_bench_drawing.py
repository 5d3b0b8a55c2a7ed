"""The drawing on the bench: where things lie, what is shown, that nothing lies on anything else."""

import itertools
from dataclasses import replace

import matplotlib
import numpy as np
import pytest
from PySide6.QtCore import QEvent, QPoint, QPointF, QRectF, Qt
from PySide6.QtGui import QImage, QPainter, QWheelEvent
from PySide6.QtWidgets import QApplication
from pytestqt.qtbot import QtBot

from app.bench.changes import changed_columns
from app.bench.colour_scale import TABLE, TOP, colours_of
from app.bench.drawing import Drawing
from app.bench.foot import mark_step, shown_stations
from app.bench.labels import Board, Wanted
from app.bench.stage import FOOT, Plan, Stage, Type
from app.bench.symbols import glyphs_of
from app.bench.utilisation_band import LEAST_STRETCH, failing_places, utilisation_columns
from app.bench.view import BenchView
from app.bench.words import description, load_words, support_words
from app.document import Document
from app.ruler import Ruler
from app.theme import DARK, LIGHT
from shaftcore.notches._contract import Array
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import AxialForce, RadialForce, Segment, Shaft, Support, Torque


def stepped(force: float = 4000.0) -> Shaft:
    """A stepped, partly bored shaft with a groove, both bearings and every sort of load."""
    return Shaft(
        segments=(
            Segment("a", 60, 40, shoulder=Shoulder(1.5, bearing_corner=2.0)),
            Segment("b", 140, 60, bore=20),
            Segment("c", 80, 60, end_diameter=50, shoulder=Shoulder(2.0)),
            Segment("d", 60, 36),
        ),
        raisers=(Groove("g", 120, 1.0, 1.0),),
        supports=(Support("A", 25, "Pump end", True), Support("B", 315, "Drive end")),
        loads=(
            RadialForce("down", 150, force, 180, name="Wheel"),
            RadialForce("up", 90, force / 4, 0),
            RadialForce("near", 230, force / 4, 90, name="Chain"),
            RadialForce("far", 270, force / 4, 270),
            Torque("in", 150, 2e5, name="Wheel"),
            Torque("out", 335, -2e5, name="Coupling"),
            AxialForce("along", 150, -500, name="Wheel"),
        ),
    )


@pytest.fixture
def bench(qtbot: QtBot) -> BenchView:
    view = BenchView(Document(), Ruler(), LIGHT)
    qtbot.addWidget(view)
    view.resize(860, 330)
    view.show()
    return view


def stage_of(view: BenchView, ratio: float = 1.0) -> Stage:
    scene = view.document.scene
    return Stage(scene, Plan(scene.shaft), view.frame, view.theme, ratio)


# where things lie -----------------------------------------------------------------------------


def test_places_go_to_the_screen_and_back(bench: BenchView) -> None:
    bench.document.load(stepped(), None)
    for place in ((0.0, 0.0), (150.0, 30.0), (340.0, -18.0)):
        assert bench.to_shaft(bench.to_screen(*place)) == pytest.approx(place, abs=1e-9)
    assert bench.to_screen(0.0, 10.0).y() < bench.axis_px(), "above the axis is up"
    one, other = bench.to_screen(0, 0), bench.to_screen(100, 100)
    assert other.x() - one.x() == pytest.approx(one.y() - other.y()), "one scale along and across"


def test_radii_of_many_places_are_those_of_each() -> None:
    plan = Plan(stepped())
    places = np.concatenate([np.linspace(-5.0, 345.0, 141), plan.faces])
    assert plan.radii_at(places).tolist() == pytest.approx([plan.radius_at(float(x)) for x in places])


def test_zoom_keeps_the_place_under_the_pointer(bench: BenchView) -> None:
    bench.document.load(stepped(), None)
    pos = QPointF(300.0, 90.0)
    before = bench.to_shaft(pos)
    bench.zoom_about(3.0, pos)
    assert bench.to_shaft(pos) == pytest.approx(before)
    bench.fit()
    assert bench.ruler.fitted
    assert bench.axis_px() < bench.height() / 2


def test_a_shaft_is_fitted_when_loaded_and_left_alone_during_a_gesture(bench: BenchView) -> None:
    shaft = stepped()
    bench.document.load(shaft, None)
    assert bench.to_screen(0, 0).x() > 0
    assert bench.to_screen(shaft.length, 0).x() < bench.width()
    scale = bench.ruler.scale
    longer = Shaft(segments=(*shaft.segments, Segment("e", 300, 36)), supports=shaft.supports, loads=shaft.loads)
    assert bench.document.preview(longer)
    assert bench.ruler.scale == scale, "the picture must not jump under the hand"
    bench.document.commit("lengthen")
    assert bench.ruler.scale < scale


def test_the_users_own_zoom_stays_after_a_change(bench: BenchView) -> None:
    shaft = stepped()
    bench.document.load(shaft, None)
    bench.zoom_about(2.0, QPointF(400, 120))
    scale = bench.ruler.scale
    longer = Shaft(segments=(*shaft.segments, Segment("e", 300, 36)), supports=shaft.supports)
    assert bench.document.change(longer, "lengthen")
    assert bench.ruler.scale == scale


@pytest.mark.parametrize("sense", [1.0, -1.0])
def test_however_the_view_is_moved_some_of_the_shaft_stays_in_sight(bench: BenchView, sense: float) -> None:
    bench.document.load(stepped(), None)
    foot = bench.height() - FOOT
    for zoom in (1.0, 8.0):
        bench.zoom_about(zoom, QPointF(700.0, 5.0))
        for _ in range(80):
            bench.pan_by(sense * 60.0, 0.0)
        left, right = bench.to_screen(0, 0).x(), bench.to_screen(bench.document.shaft.length, 0).x()
        assert right > 40.0
        assert left < bench.width() - 40.0
        for _ in range(80):
            bench.pan_by(0.0, sense * 60.0)
        seen = [x for x in np.linspace(0.0, 340.0, 200) if 0 <= bench.to_screen(float(x), 0).x() <= bench.width()]
        radius = max(Plan(bench.document.shaft).radius_at(float(x)) for x in seen)
        assert bench.to_screen(0, radius).y() < foot - 30.0
        assert bench.to_screen(0, -radius).y() > 30.0


def test_the_foot_stands_over_a_shaft_larger_than_the_bench(bench: BenchView) -> None:
    bench.document.load(stepped(), None)
    bench.zoom_about(20.0, bench.to_screen(40.0, 0.0))
    image = bench.grab().toImage()
    stage = stage_of(bench)
    assert bench.to_screen(0.0, -20.0).y() > bench.height(), "the shaft reaches beyond the foot"
    rows = range(round(stage.foot) + 1, bench.height())
    assert all(image.pixelColor(2, y).name() == LIGHT.paper for y in rows)
    assert image.pixelColor(2, round(stage.foot) - 2).name() == LIGHT.metal


# colour and band ------------------------------------------------------------------------------


def test_colour_scale_is_cividis() -> None:
    """Reference: matplotlib's own table, of which ours keeps every fourth colour (3/255 off at most)."""
    reference = np.rint(np.array(matplotlib.colormaps["cividis"].colors) * 255).astype(int)
    ours = np.stack([(TABLE >> shift) & 255 for shift in (16, 8, 0)], axis=1).astype(int)
    assert np.abs(ours - reference).max() <= 3


def test_colours_brighten_with_utilisation_and_hold_at_the_ends() -> None:
    colours = colours_of(np.linspace(0.0, TOP, 64))
    light = sum(weight * ((colours >> shift) & 255) for weight, shift in ((0.3, 16), (0.59, 8), (0.11, 0)))
    assert np.all(np.diff(light) > 0)
    assert colours_of(np.array([np.inf, 99.0])).tolist() == [TABLE[-1]] * 2
    assert colours_of(np.array([-1.0]))[0] == TABLE[0]


@pytest.mark.parametrize("ratio", [1.0, 2.0])
def test_band_shows_each_raisers_utilisation_wide_enough_to_see(bench: BenchView, ratio: float) -> None:
    bench.document.load(stepped(), None)
    results, stage = bench.document.scene.results, stage_of(bench, ratio)
    assert results is not None
    columns = utilisation_columns(stage)
    assert len(columns) == round(bench.width() * ratio)
    raisers = [i for i, station in enumerate(results.stations) if station.site is not None]
    assert len(raisers) == 3
    for i in raisers:
        shown = np.flatnonzero(columns == results.judged.utilisation[i]) / ratio
        assert shown.max() - shown.min() + 1 / ratio >= LEAST_STRETCH - 1
    assert np.isnan(columns[0])


def test_ticks_stand_only_where_an_asked_factor_is_missed(bench: BenchView) -> None:
    bench.document.load(stepped(100.0), None)
    sound = stage_of(bench)
    assert sound.scene.results is not None
    assert sound.scene.results.sound
    assert failing_places(sound, utilisation_columns(sound)) == []
    bench.document.load(stepped(20_000.0), None)
    failing = stage_of(bench)
    columns = utilisation_columns(failing)
    places = failing_places(failing, columns)
    assert places
    assert all(columns[int(x)] > 1 for x, _ in places)


# words ----------------------------------------------------------------------------------------


def callout_rooms(bench: BenchView) -> list[tuple[str, QRectF]]:
    drawing = Drawing(stage_of(bench), Type())
    return [(callout.key, callout.room) for callout in drawing.callouts]


@pytest.mark.parametrize("size", [(860, 330), (1400, 420), (700, 220)])
@pytest.mark.parametrize("system", ["SI", "US"])
def test_words_lie_on_nothing_and_inside_the_widget(bench: BenchView, size: tuple[int, int], system: str) -> None:
    bench.resize(*size)
    bench.document.load(stepped(), None)
    bench.document.set_system(system)  # type: ignore[arg-type]
    stage, rooms = stage_of(bench), callout_rooms(bench)
    assert rooms
    glyph_rooms = [room for glyph in glyphs_of(stage) for room in glyph.rooms]
    for key, room in rooms:
        assert bench.rect().contains(room.toRect()), key
        assert not any(room.intersects(other) for other in glyph_rooms), key
    for (one, a), (other, b) in itertools.combinations(rooms, 2):
        assert not a.intersects(b), (one, other)


def test_every_support_and_load_is_named_where_there_is_room(bench: BenchView) -> None:
    bench.resize(1400, 420)
    bench.document.load(stepped(), None)
    named = {thing for key, _ in callout_rooms(bench) for thing in key.split("+")}
    shaft = bench.document.shaft
    assert named == {thing.id for thing in (*shaft.supports, *shaft.loads)}


def test_a_board_refuses_what_has_no_room() -> None:
    board = Board(300, 0, 40)
    first = board.place(Wanted("a", 80, 14, QPointF(150, 40), True), 14)
    assert first is not None
    board.take(QRectF(0, 0, 300, 40))
    assert board.place(Wanted("b", 80, 14, QPointF(150, 40), True), 14) is None


def test_a_board_cleared_of_labels_keeps_what_lies_on_it() -> None:
    board = Board(300, 0, 200)
    board.take(QRectF(0, 90, 300, 20))
    wanted = Wanted("a", 80, 14, QPointF(150, 90), True)
    beside = replace(wanted, key="b", anchor=QPointF(205, 90))
    first, second = board.place(wanted, 14), board.place(beside, 14)
    board.clear_labels()
    again = board.place(beside, 14)
    assert first is not None
    assert second is not None
    assert again is not None
    assert not first.intersects(second)
    assert again.intersects(first), "where the first label stood is free again"
    assert max(first.bottom(), second.bottom(), again.bottom()) <= 90


def test_words_keep_their_place_during_a_gesture(bench: BenchView) -> None:
    bench.document.load(stepped(), None)
    still = Drawing(stage_of(bench), Type())
    live = Drawing(stage_of(bench), Type(), still.standings)
    assert [callout.room for callout in live.callouts] == [callout.room for callout in still.callouts]


@pytest.mark.parametrize(
    ("load", "words"),
    [
        (RadialForce("f", 0, 1200, 180), "↓ 1200 N"),
        (RadialForce("f", 0, -1200, 180), "↑ 1200 N"),
        (RadialForce("f", 0, 1200, 90), "1200 N at 90°, towards you"),
        (RadialForce("f", 0, 1200, -90), "1200 N at 270°, away from you"),
        (RadialForce("f", 0, 1200, 30, amplitude=100), "1200 N ± 100 at 30°"),
        (Torque("t", 0, -85_000), "torque out 85 N·m"),
        (AxialForce("a", 0, -700), "← 700 N"),
    ],
)
def test_loads_say_size_and_direction(load: RadialForce | Torque | AxialForce, words: str) -> None:
    assert load_words(load, "SI").replace("\u00a0", " ") == words


def test_a_screen_reader_is_told_what_is_drawn(bench: BenchView) -> None:
    assert "Draw the first segment" in bench.accessibleDescription()
    bench.document.load(stepped(), None)
    assert "4 segments, 2 supports, 7 loads" in bench.accessibleDescription()
    bench.document.choose(("groove", "g"))
    assert "Chosen: station" in bench.accessibleDescription()
    assert "Groove g" in bench.accessibleDescription()


def test_an_unfinished_shaft_says_what_is_missing(bench: BenchView) -> None:
    segments = stepped().segments
    bench.document.load(Shaft(segments=segments), None)
    assert "Set two supports" in description(bench.document.scene)
    both = (Support("A", 25), Support("B", 315))
    bench.document.load(Shaft(segments=segments, supports=both), None)
    assert "locating" in description(bench.document.scene)


# foot -----------------------------------------------------------------------------------------


def test_marks_of_x_stand_on_round_numbers() -> None:
    for px_per_unit in np.geomspace(1e-3, 1e4, 57):
        step = mark_step(float(px_per_unit), 90.0)
        assert step * px_per_unit * (1 + 1e-9) >= 90.0
        assert step * px_per_unit <= 2.5 * 90.0 * (1 + 1e-9)
        assert f"{step:e}"[0] in "125"


def test_crowded_station_numbers_are_thinned_but_never_the_chosen_or_governing(bench: BenchView) -> None:
    shaft = stepped()
    crowd = tuple(RadialForce(f"f{i}", 61.0 + 2 * i, 10, 180) for i in range(50))
    bench.document.load(Shaft(segments=shaft.segments, supports=shaft.supports, loads=crowd), None)
    results = bench.document.scene.results
    assert results is not None
    bench.document.choose(None, 7)
    stage, letters = stage_of(bench), Type()
    shown = shown_stations(stage, letters)
    assert {7, results.governing} <= set(shown)
    assert len(shown) < len(results.stations)
    spans = sorted((stage.frame.x(results.stations[i].x), letters.width(str(i + 1)) / 2) for i in shown)
    assert all(a + half < b - other for (a, half), (b, other) in itertools.pairwise(spans))


def test_a_support_without_a_name_goes_by_its_id(bench: BenchView) -> None:
    bench.resize(1400, 420)
    shaft = stepped()
    bench.document.load(replace(shaft, supports=(Support("A", 25, locating=True), Support("B", 315, "Far"))), None)
    lines = [line for callout in Drawing(stage_of(bench), Type()).callouts for line in callout.lines]
    assert "A, locating" in lines
    assert "Far, floating" in lines


def test_a_support_says_its_stiffness_and_offsets(bench: BenchView) -> None:
    support = Support("A", 25, locating=True, stiffness=1.25e5, offset_y=-0.005, offset_z=0.02)
    assert support_words(support, "SI").replace("\u202f", "").replace("\u00a0", " ") == (
        "locating, spring 125000 N/mm, 0.005 mm down, 0.02 mm towards you"
    )
    assert "lbf/in" in support_words(support, "US")
    assert support_words(Support("A", 25), "SI") == "floating"


def test_a_springy_support_stands_on_folds_and_takes_more_room(bench: BenchView) -> None:
    shaft = stepped()
    first, *rest = shaft.supports
    on_spring = replace(shaft, supports=(replace(first, stiffness=1e5), *rest))
    rigid, springy = (glyphs_of(_stage_with(bench, made))[0] for made in (shaft, on_spring))
    assert len(springy.lines) == len(rigid.lines) + 2
    assert springy.rooms[0].height() > rigid.rooms[0].height()
    drawn = [line.boundingRect() for line in springy.lines]
    above, below = springy.rooms
    assert above.top() <= min(box.top() for box in drawn)
    assert below.bottom() >= max(box.bottom() for box in drawn)


def _stage_with(bench: BenchView, shaft: Shaft) -> Stage:
    bench.document.load(shaft, None)
    return stage_of(bench)


def test_supports_that_are_too_near_are_told_to_be_pulled_apart(bench: BenchView) -> None:
    near = (Support("A", 25, locating=True), Support("B", 315), Support("C", 25.001))
    bench.document.load(replace(stepped(), supports=near), None)
    assert "Move them apart" in description(bench.document.scene)
    assert "Pull one of the two" in description(bench.document.scene)


# pixels ---------------------------------------------------------------------------------------


def picture(bench: BenchView, ratio: float = 1.0) -> QImage:
    stage = stage_of(bench, ratio)
    image = QImage(round(bench.width() * ratio), round(bench.height() * ratio), QImage.Format.Format_RGB32)
    image.setDevicePixelRatio(ratio)
    image.fill(stage.theme.paper)
    with QPainter(image) as painter:
        Drawing(stage, Type()).paint(painter)
    return image


@pytest.mark.parametrize("theme", [LIGHT, DARK])
@pytest.mark.parametrize("ratio", [1.0, 2.0, 3.0])
def test_metal_bore_and_band_are_where_the_shaft_is(bench: BenchView, theme, ratio: float) -> None:  # type: ignore[no-untyped-def]
    bench.set_theme(theme)
    bench.document.load(stepped(), None)
    image = picture(bench, ratio)

    def colour(x: float, y: float) -> str:
        at = bench.to_screen(x, y)
        return image.pixelColor(round(at.x() * ratio), round(at.y() * ratio)).name()

    assert colour(75, 5) == theme.metal
    assert colour(75, -5) == theme.paper, "the bore is laid open in the lower half"
    assert colour(75, 45) == theme.paper
    stage = stage_of(bench, ratio)
    row = colours_of(utilisation_columns(stage))
    at = bench.to_screen(105, 30)
    below = image.pixel(round(at.x() * ratio), round((at.y() + 3) * ratio))
    assert below == row[round(at.x() * ratio)]


def test_choosing_shows_and_hover_costs_no_new_layout(bench: BenchView) -> None:
    bench.document.load(stepped(), None)
    before = bench.grab().toImage()
    for thing in (("segment", "b"), ("shoulder", "a"), ("groove", "g"), ("support", "A"), ("torque", "in")):
        bench.document.choose(thing)
        assert bench.grab().toImage() != before, thing
    laid_out = bench._drawing
    bench.document.point_at(100.0)
    bench.grab()
    assert bench._drawing is laid_out


def live_shafts() -> list[tuple[tuple[str, str], Shaft]]:
    """What is chosen, and the shaft a pull on it shows: fillet, groove, diameter, length, bore, load, support."""
    shaft = stepped()
    a, b, c, d = shaft.segments
    down, *loads = shaft.loads
    left, right = shaft.supports
    return [
        (("shoulder", "a"), replace(shaft, segments=(replace(a, shoulder=Shoulder(1.0, bearing_corner=2.0)), b, c, d))),
        (("shoulder", "a"), replace(shaft, segments=(replace(a, shoulder=Shoulder(1.5, bearing_corner=4.0)), b, c, d))),
        (("groove", "g"), replace(shaft, raisers=(Groove("g", 130, 1.5, 1.2),))),
        (("segment", "b"), replace(shaft, segments=(a, replace(b, diameter=70), replace(c, diameter=70), d))),
        (("segment", "a"), replace(shaft, segments=(replace(a, length=50), replace(b, length=150), c, d))),
        (("segment", "b"), replace(shaft, segments=(a, replace(b, bore=30), c, d))),
        (("radial force", "down"), replace(shaft, loads=(replace(down, force=9000.0, x=180.0), *loads))),
        (("support", "A"), replace(shaft, supports=(replace(left, x=35.0), right))),
    ]


@pytest.mark.parametrize("theme", [LIGHT, DARK])
@pytest.mark.parametrize(("chosen", "shaft"), live_shafts())
def test_what_is_shown_live_is_the_whole_picture(bench: BenchView, theme, chosen, shaft: Shaft) -> None:  # type: ignore[no-untyped-def]
    """The bench that lived through the gesture beside one that drew the last scene from nothing."""
    bench.set_theme(theme)
    bench.document.load(stepped(), None)
    bench.document.choose(chosen)
    bench.grab()
    assert bench._drawing is not None
    kept = bench._drawing.standings
    for shown in (shaft, replace(stepped(), raisers=()), shaft):
        assert bench.document.preview(shown)
        live = pixels(bench.grab().toImage())
    image = QImage(bench.size(), QImage.Format.Format_RGB32)
    image.fill(theme.paper)
    with QPainter(image) as painter:
        Drawing(stage_of(bench), Type(), kept).paint(painter)
    assert np.abs(live - pixels(image)).max() <= 3, "but for the rounding of half covered pixels"
    bench.document.commit("pulled")
    bench.grab()
    words = {callout.key: callout.lines for callout in bench._drawing.callouts}
    assert words == {callout.key: callout.lines for callout in Drawing(stage_of(bench), Type()).callouts}


def test_a_pulled_fillet_is_painted_in_its_own_columns_only(bench: BenchView) -> None:
    bench.document.load(stepped(), None)
    bench.document.choose(("shoulder", "a"))
    first, *others = stepped().segments
    drawn = []
    for radius in (1.0, 1.2, 1.4):
        segments = (replace(first, shoulder=Shoulder(radius, bearing_corner=2.0)), *others)
        assert bench.document.preview(replace(stepped(), segments=segments))
        bench.grab()
        drawn.append(bench._drawing)
    one, other = drawn[-2:]
    assert one is not None
    assert other is not None
    assert one.marks is other.marks
    columns = changed_columns(other, one)
    assert columns is not None
    assert columns[0] < bench.to_screen(60.0, 0.0).x() < columns[1]
    assert columns[1] - columns[0] < 60
    bench.document.choose(("segment", "b"))
    bench.grab()
    assert bench._drawing is not None
    assert changed_columns(bench._drawing, other) is None, "another choice changes the whole picture"


def pixels(image: QImage) -> Array:
    """Red, green and blue of an image, (height, width, 3)."""
    image = image.convertToFormat(QImage.Format.Format_RGB32)
    rows = np.frombuffer(image.constBits(), np.uint8).reshape(image.height(), image.bytesPerLine())
    return rows[:, : 4 * image.width()].reshape(image.height(), -1, 4)[..., :3].astype(float)


# events ---------------------------------------------------------------------------------------


class Recorder:
    """A hand that takes nothing and remembers what it was told."""

    def __init__(self) -> None:
        self.told: list[str] = []

    def __getattr__(self, name: str):  # type: ignore[no-untyped-def]
        return lambda *given: self.told.append(name)


def test_pointer_and_keys_reach_the_hand_and_what_it_leaves_fits_again(bench: BenchView, qtbot: QtBot) -> None:
    bench.document.load(stepped(), None)
    hand = Recorder()
    bench.hand = hand  # type: ignore[assignment]
    bench.zoom_about(2.0, QPointF(400, 120))
    qtbot.keyClick(bench, Qt.Key.Key_0)
    assert bench.ruler.fitted
    bench.zoom_about(2.0, QPointF(400, 120))
    qtbot.mouseClick(bench, Qt.MouseButton.LeftButton, pos=QPoint(10, 10))
    assert not bench.ruler.fitted
    qtbot.mouseDClick(bench, Qt.MouseButton.LeftButton, pos=QPoint(10, 10))
    assert bench.ruler.fitted
    bench.grab()
    assert {"key", "press", "release", "double_click", "overlay"} <= set(hand.told)


def test_wheel_pans_and_with_ctrl_zooms_about_the_pointer(bench: BenchView) -> None:
    bench.document.load(stepped(), None)
    pos = QPointF(300.0, 100.0)

    def turn(modifier: Qt.KeyboardModifier) -> None:
        event = QWheelEvent(
            pos, pos, QPoint(), QPoint(0, 120), Qt.MouseButton.NoButton, modifier, Qt.ScrollPhase.NoScrollPhase, False
        )
        QApplication.sendEvent(bench, event)

    place, scale = bench.to_shaft(pos), bench.ruler.scale
    turn(Qt.KeyboardModifier.ControlModifier)
    assert bench.ruler.scale > scale
    assert bench.to_shaft(pos) == pytest.approx(place)
    scale = bench.ruler.scale
    turn(Qt.KeyboardModifier.NoModifier)
    assert bench.ruler.scale == scale
    assert bench.to_shaft(pos)[0] < place[0]


def test_the_pointer_is_told_to_everyone(bench: BenchView, qtbot: QtBot) -> None:
    bench.document.load(stepped(), None)
    heard: list[float | None] = []
    bench.document.hovered.connect(heard.append)
    at = bench.to_screen(100.0, 0.0).toPoint()
    qtbot.mouseMove(bench, at)
    QApplication.sendEvent(bench, QEvent(QEvent.Type.Leave))
    assert heard[0] == pytest.approx(100.0, abs=1.0 / bench.ruler.scale)
    assert heard[-1] is None
