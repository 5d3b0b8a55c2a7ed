"""The lens: an enlarged raiser below the shaft, while its size is in hand and where there is room."""

import pytest
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QImage, QPainter
from PySide6.QtWidgets import QApplication
from pytestqt.qtbot import QtBot
from test_gestures import Desk, loaded_shaft

from app.bench.close_up import FAR, close_up, lens_frame
from app.bench.drags import Drag
from app.bench.drawing import Drawing
from app.bench.lens import Lens
from app.bench.lens_room import NEAR, Taken, lens_room
from app.bench.lens_words import lens_rows
from app.bench.overlay import window_of
from app.bench.readout import allowed_shown
from app.bench.sizes import Size, size_of
from app.bench.stage import Plan, Stage, Type
from app.theme import DARK, LIGHT
from shaftcore import edits
from shaftcore.notches.kinds import KINDS
from shaftcore.phrase import Phrase
from shaftcore.radius_window import RadiusWindow
from shaftcore.shaft import Shaft
from shaftcore.units import System

CAPPED = edits.replace_shoulder(loaded_shaft(), "s1", radius=0.6, bearing_corner=1.5)


LIMIT = Phrase("bearing corner")


@pytest.fixture
def desk(qtbot: QtBot) -> Desk:
    return Desk(qtbot, CAPPED)


def size_named(shaft: Shaft, sort: str, id: str, name: str) -> Size:
    found = size_of(shaft, (sort, id), name)
    assert found is not None
    return found


def stage_of(desk: Desk) -> Stage:
    return Stage(desk.document.scene, Plan(desk.shaft), desk.bench.frame, LIGHT, 1.0)


def dragged(desk: Desk, sort: str = "shoulder", id: str = "s1", name: str = "radius") -> Drag:
    desk.pull(desk.at(sort, id, name), QPointF(-12, -12), let_go=False)
    gesture = desk.hand.gesture
    assert isinstance(gesture, Drag)
    return gesture


def test_a_dragged_fillet_is_shown_enlarged_below_the_shaft(desk: Desk) -> None:
    at = desk.at("shoulder", "s1", "radius")
    lens = dragged(desk).lens
    assert lens is not None
    stage = stage_of(desk)
    assert lens.room.bottom() < stage.foot
    assert not lens.room.contains(at)
    for px in range(int(lens.room.left()), int(lens.room.right())):
        x = stage.frame.to_shaft(QPointF(px, 0))[0]
        lowest = stage.frame.y(-stage.plan.radius_at(x)) if 0 <= x <= desk.shaft.length else 0.0
        assert lens.room.top() > lowest
    pictures = []
    for by in (-12, -30):
        desk.move(at + QPointF(by, by))
        pictures.append(desk.bench.grab(lens.room.toRect()).toImage())
    assert pictures[0] != pictures[1]


def test_what_is_not_a_raisers_own_size_has_no_lens(desk: Desk) -> None:
    desk.pull(desk.at("segment", "s2", "diameter"), QPointF(0, -12), let_go=False)
    gesture = desk.hand.gesture
    assert isinstance(gesture, Drag)
    assert gesture.lens is None


@pytest.mark.parametrize("key", KINDS)
def test_every_handle_of_every_kind_has_a_close_view_at_its_stated_scale(key: str) -> None:
    """A millimetre takes as many pixels as the stated scale says, and all that moves lies in the picture."""
    shaft, kind = loaded_shaft(), KINDS[key]
    if kind.goes == "on a diameter":
        shaft, id = edits.add_raiser(shaft, key, 100.0)
    else:
        id = "s1"
    record = next(s for s in Plan(shaft).seated if (s.kind.key, s.place) == (key, id))
    room = QRectF(10, 200, 130, 90)
    for handle in kind.handles(record.record, record.around):
        size = size_named(shaft, key, id, handle.size)
        shown = close_up(shaft, size, None)
        assert shown is not None
        assert size.value is not None
        found = lens_frame(shown, size.value, room, 1.5)
        assert found is not None
        frame, times = found
        assert frame.scale == pytest.approx(1.5 * times)
        low, high = shown.region(size.value)
        for corner in (low, high):
            assert room.contains(frame.to_screen(*corner))
        assert room.contains(frame.to_screen(handle.x, handle.y))
        larger = lens_frame(shown, size.value, QRectF(0, 0, 260, 180), 1.5)
        assert larger is not None
        assert larger[1] > times


def test_nothing_is_enlarged_where_the_bench_shows_as_much() -> None:
    shown = close_up(CAPPED, size_named(CAPPED, "shoulder", "s1", "radius"), None)
    assert shown is not None
    assert lens_frame(shown, 0.6, QRectF(0, 0, 100, 80), 60.0) is None


def test_the_words_give_each_line_its_number_and_say_that_a_window_is_empty() -> None:
    size = size_named(CAPPED, "shoulder", "s1", "radius")

    def words(window: RadiusWindow | None, value: float = 1.0) -> list[str]:
        shown = close_up(CAPPED, size, window)
        assert shown is not None
        return [text for _, text in lens_rows(shown, value, "SI")]

    open_window, empty = (RadiusWindow("s1", needed, 1.5, LIMIT) for needed in (0.8, 2.0))
    assert words(open_window) == [
        "r 1 mm now",
        "r 0.8 mm needed",
        "r 1.5 mm allowed",
        "r_s,min 1.5 mm ring",
        "r 0.6 mm before",
    ]
    assert "the window is empty" in words(empty)
    assert "no radius is enough" in words(RadiusWindow("s1", None, 1.5, None))
    assert "any radius is enough" in words(RadiusWindow("s1", 0.05, 1.5, None))
    assert words(None, 0.6) == ["r 0.6 mm now", "r_s,min 1.5 mm ring"]


def test_a_limit_far_off_does_not_shrink_the_picture() -> None:
    size = size_named(CAPPED, "shoulder", "s1", "radius")
    near, far = (close_up(CAPPED, size, RadiusWindow("s1", 0.3, allowed, LIMIT)) for allowed in (0.6 * FAR, 0.61 * FAR))
    assert near is not None
    assert far is not None
    assert near.region(0.6)[0][0] < far.region(0.6)[0][0]


def test_a_lens_finds_the_largest_room_that_is_free(desk: Desk) -> None:
    stage = stage_of(desk)
    free = lens_room(stage, Taken([], []), 0.0, 150.0, False)
    assert free is not None
    assert free.left() >= NEAR
    right = QRectF(stage.frame.width / 2, 0, stage.frame.width, stage.frame.height)
    moved = lens_room(stage, Taken([right], []), 0.0, 150.0, False)
    assert moved is not None
    assert not moved.intersects(right)
    words = QRectF(0, stage.foot - 20, stage.frame.width, 15)
    assert lens_room(stage, Taken([], [words]), 0.0, 150.0, False) is None
    assert lens_room(stage, Taken([], [words]), 0.0, 150.0, True) is not None
    assert lens_room(stage, Taken([words], []), 0.0, 150.0, True) is None


def test_at_rest_the_lens_covers_no_words_and_while_typing_shows_the_number(desk: Desk) -> None:
    desk.window.resize(1000, 1200)
    desk.bench.fit()
    QApplication.processEvents()
    desk.click(desk.at("shoulder", "s1", "radius"))
    desk.bench.grab()
    lens = desk.hand.lens_at_rest.lens
    assert lens is not None
    for callout in Drawing(stage_of(desk), Type()).callouts:
        assert not callout.room.intersects(lens.room)
    gesture = dragged(desk)
    assert gesture.lens is not None
    assert gesture.lens.room == lens.room
    desk.keys(Qt.Key.Key_Escape)
    desk.keys(Qt.Key.Key_Return)
    before = desk.bench.grab().toImage()
    lens = desk.hand.lens_at_rest.lens
    assert lens is not None
    assert desk.hand.number_field is not None
    assert not lens.room.intersects(QRectF(desk.hand.number_field.geometry()))
    desk.keys("1.2")
    assert desk.bench.grab(lens.room.toRect()).toImage() != before.copy(lens.room.toRect())
    assert desk.radius(0) == 0.6


def test_where_no_corner_is_free_there_is_no_lens(desk: Desk) -> None:
    desk.window.resize(520, 300)
    desk.bench.fit()
    gesture = dragged(desk)
    assert gesture.lens is None
    desk.bench.grab()


def test_the_lens_draws_itself_in_both_themes_and_nothing_beside_its_room() -> None:
    weak = edits.replace_thing(CAPPED, "F1", force=16000.0)
    from shaftcore.evaluation import evaluate

    size = size_named(weak, "shoulder", "s1", "radius")
    window = window_of(evaluate(weak), size)
    assert window is not None
    assert window.empty
    shown = close_up(weak, size, window)
    assert shown is not None
    room = QRectF(20, 20, 260, 90)
    for theme in (LIGHT, DARK):
        lens = Lens(shown, room, 1.0)
        canvas = QImage(300, 130, QImage.Format.Format_RGB32)
        canvas.fill(Qt.GlobalColor.magenta)
        with QPainter(canvas) as painter:
            lens.paint(painter, 0.9, theme, "SI")
        inside = room.toRect().adjusted(-1, -1, 1, 1)
        colours = {canvas.pixelColor(x, y).name() for x in range(300) for y in range(130) if not inside.contains(x, y)}
        assert colours == {"#ff00ff"}
        assert canvas.copy(24, 24, 250, 80).pixelColor(5, 60).name() != "#ff00ff"
        assert {theme.metal, theme.raised} <= {
            canvas.pixelColor(x, y).name() for x in range(20, 280) for y in range(20, 110)
        }


@pytest.mark.parametrize(
    ("allowed", "system", "shown"),
    [
        (58.892857, "SI", "58.89 mm"),
        (1.15, "SI", "1.15 mm"),  # 114.99999999999999 hundredths in binary
        (2.0, "SI", "2 mm"),
        (0.099 * 25.4, "US", "0.099 in"),
        (1.0, "US", "0.0393 in"),  # 1/25.4 = 0.03937
    ],
)
def test_what_is_allowed_is_never_shown_as_more(allowed: float, system: System, shown: str) -> None:
    assert allowed_shown(size_named(CAPPED, "shoulder", "s1", "radius"), allowed, system) == shown
