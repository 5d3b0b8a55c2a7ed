"""The traces: same pixels as the bench, live lines where a full draw puts them, calm at every end."""

import itertools
import math
import os
import subprocess
import sys
from collections.abc import Iterator
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest
from PySide6.QtCore import QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QImage, QMouseEvent, QWheelEvent
from PySide6.QtWidgets import QApplication

import app.traces.frame as frame_module
from app.document import Document
from app.ruler import LEFT_MARGIN, RIGHT_MARGIN, Ruler
from app.theme import DARK, LIGHT
from app.traces.bands import GAP, bands_of, with_border_moved
from app.traces.limits import Scale, scales_of
from app.traces.live import FAR_OUT, Polyline, changed_tracks, strands, to_pixels
from app.traces.pace import Pace
from app.traces.reading import least_text, station_text, value_at
from app.traces.ticks import labels, value_ticks
from app.traces.tracks import BY_KEY, TRACKS, Curve, curves_of
from app.traces.view import TraceView
from shaftcore.shaft import AxialForce, Material, RadialForce, Segment, Shaft, Shoulder, Support, Torque
from shaftcore.units import INCH

AT_EVERY_SCALE = "axes_and_ruler_agree or land_where"


def a_shaft(radius: float = 2.0, force: float = 9000.0) -> Shaft:
    """Invented: three segments, ends that nothing loads, force, torque and thrust."""
    return Shaft(
        material=Material(tensile_strength=750.0, yield_strength=480.0),
        segments=(
            Segment("a", 80.0, 40.0, shoulder=Shoulder(radius)),
            Segment("b", 120.0, 52.0, shoulder=Shoulder(2.0)),
            Segment("c", 60.0, 44.0),
        ),
        supports=(Support("A", x=20.0, locating=True), Support("B", x=230.0)),
        loads=(
            RadialForce("f", x=120.0, force=force, angle=135.0),
            Torque("t1", x=120.0, torque=300e3),
            Torque("t2", x=245.0, torque=-300e3),
            AxialForce("n", x=120.0, force=2000.0),
        ),
    )


@pytest.fixture
def document(qtbot: object) -> Document:
    return Document()


@pytest.fixture
def view(document: Document, qtbot: object) -> Iterator[TraceView]:
    ruler = Ruler()
    traces = TraceView(document, ruler, LIGHT)
    traces.resize(900, 460)
    ruler.set_size(900, 300)
    document.load(a_shaft(), None)
    ruler.fit(260.0, 52.0)
    traces.show()
    yield traces
    traces.close()


def picture(view: TraceView) -> QImage:
    return view.grab().toImage()


def with_radius(document: Document, radius: float, force: float = 9000.0) -> None:
    assert document.preview(a_shaft(radius, force))


# where things lie -------------------------------------------------------------------------------


def test_axes_and_ruler_agree(view: TraceView) -> None:
    for zoom in (1.0, 3.7, 0.4):
        view.ruler.zoom(zoom, 300.0)
        picture(view)
        assert view.picture.frame is not None
        for mappings in view.picture.frame.mappings:
            for mapping in mappings:
                for x in np.linspace(view.ruler.begin, view.ruler.end, 7).tolist():
                    assert abs(mapping.x0 + x * mapping.kx - view.ruler.to_px(x)) < 0.5
                assert mapping.x0 + view.ruler.begin * mapping.kx == pytest.approx(LEFT_MARGIN, abs=0.5)
                assert mapping.x0 + view.ruler.end * mapping.kx == pytest.approx(900 - RIGHT_MARGIN, abs=0.5)


@pytest.mark.parametrize("scale", ["1", "1.5", "2"])
def test_agreement_holds_at_every_scale_of_the_screen(scale: str) -> None:
    """The scale factor is read when Qt starts, so each has a process of its own."""
    here = Path(__file__)
    done = subprocess.run(
        [sys.executable, "-m", "pytest", "-q", "-p", "no:cacheprovider", "-k", AT_EVERY_SCALE, str(here)],
        env={**os.environ, "QT_SCALE_FACTOR": scale},
        cwd=here.parents[2],
        capture_output=True,
        text=True,
        check=False,
    )
    assert done.returncode == 0, done.stdout + done.stderr


def dark_rows(image: QImage, px: float, top: float, bottom: float) -> tuple[float, float]:
    """Middle of the darkest stretch of a column of pixels, and its height, in logical pixels."""
    ratio = image.devicePixelRatio()
    column = round(px * ratio)
    dark = [
        y for y in range(round(top * ratio), round(bottom * ratio)) if image.pixelColor(column, y).lightness() < 110
    ]
    return (float(np.mean(dark)) + 0.5) / ratio, len(dark) / ratio


def test_live_lines_land_where_a_full_draw_puts_them(view: TraceView, document: Document) -> None:
    """The resultant moment's line is sought in both pictures, pixel by pixel."""
    settled = picture(view)
    with_radius(document, 2.001)
    live = picture(view)
    frame = view.picture.frame
    assert frame is not None
    curve = view.picture.curves[0][0]
    xs, ys = to_pixels(frame.mappings[0][0], curve.x, curve.y)
    for px in (290.0, 333.0, 377.0, 421.0, 520.0):
        expected = float(np.interp((round(px * settled.devicePixelRatio()) + 0.5) / settled.devicePixelRatio(), xs, ys))
        for image in (settled, live):
            middle, height = dark_rows(image, px, expected - 4, expected + 4)
            assert abs(middle - expected) < 0.8
            assert 0 < height < 5


def test_polyline_buffer_is_the_painters_own_memory() -> None:
    polyline = Polyline()
    x = np.arange(5.0)
    polygon = polyline.fill(x, x**2)
    assert [polygon[i].toTuple() for i in range(5)] == [(i, i * i) for i in range(5)]
    again = polyline.fill(x[:3], -x[:3])
    assert again is polygon
    assert again[2].toTuple() == (2.0, -2.0)
    assert again[4].toTuple() == (2.0, -2.0)  # what is left over adds no stroke
    assert polyline.fill(np.arange(50.0), np.zeros(50))[49].toTuple() == (49.0, 0.0)


@pytest.mark.parametrize("width", [1.0, 1.6, 2.0, 3.2, 4.8, 9.0])
def test_strands_make_the_width_without_gaps(width: float) -> None:
    right, down = np.array(strands(width)).T
    for across in (right, down):
        assert np.ptp(across) + 1.0 == pytest.approx(width, abs=0.31)
        assert np.diff(np.sort(across)).max(initial=0.0) <= 1.2


def test_tracks_share_the_height_and_borders_move(view: TraceView) -> None:
    keys = view.shown_tracks
    bands = bands_of(keys, {}, 460.0)
    assert all(later.top >= earlier.plot_bottom for earlier, later in itertools.pairwise(bands))
    assert bands[-1].plot_bottom <= 460.0
    moved = bands_of(keys, with_border_moved(bands, 2, 25.0), 460.0)
    assert moved[1].height == pytest.approx(bands[1].height + 25.0, abs=1.5)
    assert moved[2].height == pytest.approx(bands[2].height - 25.0, abs=1.5)
    assert moved[0].height == pytest.approx(bands[0].height, abs=1.5)
    squeezed = bands_of(keys, with_border_moved(bands, 2, 5000.0), 460.0)
    assert squeezed[2].height == pytest.approx(30.0, abs=1.5)
    assert squeezed[3].height == pytest.approx(bands[3].height, abs=1.5)


def test_border_is_dragged_by_the_pointer(view: TraceView, qtbot) -> None:  # type: ignore[no-untyped-def]
    picture(view)
    assert view.picture.frame is not None
    before = view.picture.frame.plots[0].band.height
    y = round(view.picture.frame.plots[1].band.top - GAP / 2)
    qtbot.mousePress(view, Qt.MouseButton.LeftButton, pos=QPoint(400, y))
    qtbot.mouseMove(view, QPoint(400, y + 20))
    with qtbot.waitSignal(view.tracks_changed):
        qtbot.mouseRelease(view, Qt.MouseButton.LeftButton, pos=QPoint(400, y + 20))
    picture(view)
    assert view.picture.frame.plots[0].band.height == pytest.approx(before + 20, abs=1.5)
    heights = view.track_heights
    view.set_track_heights({**heights, "no such track": 3.0})
    assert view.track_heights == heights


# numbers ------------------------------------------------------------------------------------------


def test_everything_drawn_is_finite(document: Document) -> None:
    document.load(a_shaft(), None)
    results = document.scene.results
    assert results is not None
    assert np.isinf(results.judged_along.margin).any()  # the ends carry nothing
    for track in TRACKS:
        for curve in curves_of(track, results, "SI"):
            for values in (curve.x, curve.y, curve.mark_x, curve.mark_y):
                assert np.isfinite(values).all()


def test_values_are_read_on_the_right_of_a_jump() -> None:
    x, y = np.array([0.0, 10.0, 10.0, 20.0]), np.array([0.0, 5.0, 50.0, 70.0])
    assert value_at(x, y, 5.0) == 2.5
    assert value_at(x, y, 10.0) == 50.0
    assert value_at(x, y, 15.0) == 60.0
    assert value_at(x, y, 20.0) == 70.0
    assert value_at(x, y, -0.1) is None
    assert value_at(x, y, 20.1) is None
    endless = np.array([math.inf, math.inf, 1.0, 2.0])
    assert value_at(x, endless, 5.0) == math.inf
    assert value_at(x, endless, 10.0) == 1.0


def test_a_station_is_read_with_its_notch(document: Document) -> None:
    document.load(a_shaft(), None)
    results = document.scene.results
    assert results is not None
    at_shoulder = results.station_of("a")
    assert at_shoulder is not None
    margin = results.judged.margin[at_shoulder]
    assert f"{at_shoulder + 1}, notched: fatigue {100 * margin:+.1f}" in station_text(
        BY_KEY["margin"], results, at_shoulder, "SI"
    ).replace("−", "-")
    at_load = results.station_of("f")
    assert at_load is not None
    assert "notched" not in station_text(BY_KEY["margin"], results, at_load, "SI")
    assert station_text(BY_KEY["moment"], results, at_shoulder, "SI") == ""


def test_units_switch(view: TraceView, document: Document) -> None:
    picture(view)
    si = {key: curves[0].y for key, curves in zip(view.shown_tracks, view.picture.curves, strict=True)}
    document.set_system("US")
    picture(view)
    us = {key: curves[0].y for key, curves in zip(view.shown_tracks, view.picture.curves, strict=True)}
    # 1 lbf·in = 0.112985 N·m, 1 ksi = 6.894757 MPa (NIST SP 811, appendix B)
    assert us["moment"] == pytest.approx(si["moment"] / 0.1129848, rel=1e-6, abs=1e-6)
    assert us["stress"] == pytest.approx(si["stress"] / 6.894757, rel=1e-6, abs=1e-9)
    assert us["margin"] == pytest.approx(si["margin"])
    assert view.picture.frame is not None
    assert view.picture.heads[0].words.endswith("lbf·in")
    mapping = view.picture.frame.mappings[0][0]
    assert abs(mapping.x0 + INCH * mapping.kx - view.ruler.to_px(INCH)) < 0.5


def test_second_scale_has_the_same_zero(view: TraceView) -> None:
    picture(view)
    assert view.picture.frame is not None
    torque, force = view.picture.frame.mappings[view.shown_tracks.index("torque")]
    assert torque.y0 == pytest.approx(force.y0, abs=0.01)
    assert torque.ky != pytest.approx(force.ky)


def test_margin_axis_shows_its_end_and_the_zero_line(document: Document) -> None:
    for force in (500.0, 9000.0, 40_000.0):
        document.load(a_shaft(force=force), None)
        assert document.scene.results is not None
        track = BY_KEY["margin"]
        curves = curves_of(track, document.scene.results, "SI")
        (scale,) = scales_of(track, curves, "SI")
        least = min(curve.mark_y.min() for curve in curves)
        assert scale.cap in (100.0, 200.0, 300.0)
        assert scale.limits[0] < min(least, 0.0)
        low, high = scale.limits
        assert low >= -100.0 - 0.05 * (high - low)  # a margin of n/n_asked - 1 cannot be below -100 %
        assert all(scale.pinned(curve.mark_y).max() <= scale.limits[1] for curve in curves)


def test_numbers_at_the_axes_are_round_apart_and_told_apart() -> None:
    for low, high, height in (
        (-3.0, 1700.0, 40.0),
        (-0.0004, 0.0011, 80.0),
        (-250.0, 2.5e6, 300.0),
        (-1e-9, 1e-7, 50.0),
    ):
        scale = Scale("stress", (low, high))
        ticks = value_ticks(scale, height)
        assert len(ticks) >= 1
        assert ticks.min() >= low
        assert ticks.max() < high
        if len(ticks) > 1:
            assert np.diff(ticks).min() / (high - low) * height >= 10
        words = labels(ticks)
        assert len(set(words)) == len(ticks)
        spaces = str.maketrans("−", "-", "\u202f")
        assert [float(text.translate(spaces)) for text in words] == pytest.approx(ticks.tolist(), rel=1e-6)
    for low, high in ((-1900.0, 2000.0), (-1800.0, 2300.0), (-1500.0, 2000.0)):  # a step of 2000 leaves 0 alone
        assert len(value_ticks(Scale("moment", (low, high)), 55.0)) >= 2
    capped = Scale("share", (-16.0, 330.0), 300.0)
    assert labels(value_ticks(capped, 80.0), 300.0)[-1] == "over 300"


# while dragging -------------------------------------------------------------------------------------


def test_a_fillet_drag_repaints_only_what_depends_on_it(view: TraceView, document: Document) -> None:
    picture(view)
    before = view.picture.curves
    with_radius(document, 3.0)
    changed = changed_tracks(before, view.picture.curves)
    assert changed is not None
    assert [view.shown_tracks[i] for i in changed] == ["stress", "margin"]
    assert changed_tracks(before, before) == []


def test_frame_rests_during_a_drag_and_grows_when_a_line_leaves_it(view: TraceView, document: Document) -> None:
    times = iter([0.0, 0.05, 0.3])
    view.picture.pace = Pace(0.2, lambda: next(times))
    picture(view)
    frame = view.picture.frame
    with_radius(document, 2.5)
    picture(view)
    assert view.picture.frame is frame
    with_radius(document, 2.5, force=18_000.0)
    picture(view)
    grown = view.picture.frame
    assert grown is not None
    assert frame is not None
    assert grown is not frame
    top = max(curve.y.max() for curve in view.picture.curves[0])
    assert grown.plots[0].scales[0].limits[1] > top
    with_radius(document, 2.5, force=60_000.0)  # too soon
    picture(view)
    assert view.picture.frame is grown
    view._grow_if_outgrown()
    picture(view)
    assert view.picture.frame is not grown


def test_growth_catches_up_by_itself(view: TraceView, document: Document, qtbot) -> None:  # type: ignore[no-untyped-def]
    picture(view)
    with_radius(document, 2.0, force=20_000.0)
    picture(view)
    with_radius(document, 2.0, force=90_000.0)
    assert view.picture.outgrown()
    qtbot.waitUntil(lambda: not (picture(view), view.picture.outgrown())[1], timeout=3000)


@pytest.mark.parametrize("end", ["cancel", "commit"])
def test_the_pace_is_not_jammed_after_a_gesture(view: TraceView, document: Document, end: str) -> None:
    now = [0.0]
    view.picture.pace = Pace(0.2, lambda: now[0])
    picture(view)
    with_radius(document, 2.0, force=30_000.0)
    document.cancel() if end == "cancel" else document.commit("Stronger force")
    picture(view)
    now[0] = 1.0
    with_radius(document, 2.0, force=200_000.0)
    picture(view)
    assert not view.picture.outgrown()


@pytest.mark.expects_error
def test_a_failing_draw_is_told_once_and_the_next_scene_is_drawn(
    view: TraceView, document: Document, monkeypatch: pytest.MonkeyPatch
) -> None:
    told: list[Exception] = []
    monkeypatch.setattr("app.error_messages.report", told.append)
    draw = frame_module.Chart.draw

    def broken(*_: object) -> None:
        raise ZeroDivisionError("provoked")

    monkeypatch.setattr(frame_module.Chart, "draw", broken)
    view.ruler.pan(5.0)
    picture(view)
    picture(view)
    assert len(told) == 1
    monkeypatch.setattr(frame_module.Chart, "draw", draw)
    with_radius(document, 3.0)
    picture(view)
    assert view.picture.frame is not None
    assert len(told) == 1


def test_ghost_shows_the_design_as_it_was(view: TraceView, document: Document) -> None:
    picture(view)
    with_radius(document, 2.0, force=8000.0)
    image = picture(view)
    frame = view.picture.frame
    assert frame is not None
    before = view.picture._ghost[0][0]
    x, y = to_pixels(frame.mappings[0][0], before.x, before.y)
    now_x, now_y = to_pixels(frame.mappings[0][0], view.picture.curves[0][0].x, view.picture.curves[0][0].y)
    peak = int(np.argmin(y))
    assert np.interp(x[peak], now_x, now_y) - y[peak] > 4
    ratio = image.devicePixelRatio()
    near = [
        image.pixelColor(round(x[peak] * ratio), round(y[peak] * ratio) + step).lightness() for step in range(-2, 3)
    ]
    assert 120 < min(near) < 220  # paler than ink, darker than paper


def test_coordinates_stay_in_the_painters_reach() -> None:
    from app.traces.plots import Mapping

    x, y = to_pixels(Mapping(0.0, 1e9, 0.0, -1e12), np.array([0.0, 5.0]), np.array([1.0, -1.0]))
    assert np.abs(x).max() <= FAR_OUT
    assert np.abs(y).max() <= FAR_OUT


# manners ----------------------------------------------------------------------------------------------


def test_pointer_reads_and_chooses(view: TraceView, document: Document, qtbot) -> None:  # type: ignore[no-untyped-def]
    picture(view)
    heard: list[float | None] = []
    document.hovered.connect(heard.append)
    px = round(view.ruler.to_px(120.0))
    at = QPointF(px, 60)
    none, free = Qt.MouseButton.NoButton, Qt.KeyboardModifier.NoModifier
    QApplication.sendEvent(view, QMouseEvent(QEvent.Type.MouseMove, at, view.mapToGlobal(at), none, none, free))
    assert heard[-1] == pytest.approx(view.ruler.to_mm(px))
    still = picture(view)
    document.point_at(200.0)
    assert picture(view) != still
    qtbot.mouseClick(view, Qt.MouseButton.LeftButton, pos=QPoint(px, 60))
    results = document.scene.results
    assert results is not None
    assert document.scene.station is not None
    assert results.stations[document.scene.station].x == 120.0
    assert "Station" in view.accessibleDescription()
    assert "N·m" in view.accessibleDescription()


def test_the_hairline_rests_during_a_gesture(view: TraceView, document: Document) -> None:
    with_radius(document, 3.0)
    still = picture(view)
    document.point_at(200.0)
    assert picture(view) == still
    document.commit("Larger fillet")
    settled = picture(view)
    document.point_at(None)
    assert picture(view) != settled


def test_wheel_pans_and_zooms_the_ruler(view: TraceView) -> None:
    def turn(keys: Qt.KeyboardModifier) -> None:
        where = QPointF(400.0, 100.0)
        wheel = QWheelEvent(
            where, where, QPoint(), QPoint(0, 120), Qt.MouseButton.NoButton, keys, Qt.ScrollPhase.NoScrollPhase, False
        )
        QApplication.sendEvent(view, wheel)

    under = view.ruler.to_mm(400.0)
    scale = view.ruler.scale
    turn(Qt.KeyboardModifier.ControlModifier)
    assert view.ruler.scale == pytest.approx(1.2 * scale)
    assert view.ruler.to_mm(400.0) == pytest.approx(under)
    turn(Qt.KeyboardModifier.NoModifier)
    assert view.ruler.to_mm(460.0) == pytest.approx(under)


def test_keys_step_through_stations_and_tracks(view: TraceView, document: Document) -> None:
    picture(view)
    by_words = {action.text(): action for action in view.actions()}
    assert all(action.shortcut().toString() for action in view.actions())
    by_words["Next station"].trigger()
    assert document.scene.station == 0
    by_words["Last station"].trigger()
    results = document.scene.results
    assert results is not None
    assert document.scene.station == len(results.stations) - 1
    by_words["Previous station"].trigger()
    assert document.scene.station == len(results.stations) - 2
    assert view.picture.frame is not None
    before = view.picture.frame.plots[0].band.height
    by_words["Taller track"].trigger()
    picture(view)
    assert view.picture.frame.plots[0].band.height > before


def test_any_tracks_can_be_shown(view: TraceView, document: Document) -> None:
    assert view.shown_tracks == ["moment", "torque", "stress", "margin"]
    keys = [key for key, _ in view.available_tracks()]
    for shown in (keys, ["slope"], [], ["margin", "no such track", "margin"]):
        view.show_tracks(shown)
        view.set_theme(DARK)
        assert not picture(view).isNull()
        with_radius(document, 2.5)
        picture(view)
        document.cancel()
    assert view.shown_tracks == ["margin"]


def test_unfinished_shafts_say_what_is_next(view: TraceView, document: Document) -> None:
    document.load(Shaft(), None)
    picture(view)
    assert "draw the first segment" in view.accessibleDescription()
    only = replace(a_shaft(), supports=())
    assert document.preview(only)
    picture(view)
    document.commit("Supports taken off")
    picture(view)
    assert "two supports" in view.accessibleDescription()
    assert document.preview(a_shaft())
    picture(view)
    assert [isinstance(curve, Curve) for curve in view.picture.curves[0]]


def test_unloaded_shaft_is_drawn(view: TraceView, document: Document) -> None:
    document.load(replace(a_shaft(), loads=()), None)
    document.choose(None, 0)
    document.point_at(33.0)
    assert not picture(view).isNull()
    assert "unloaded" in view.accessibleDescription()


def test_a_shaft_without_stress_has_no_least_margin(document: Document) -> None:
    document.load(a_shaft(), None)
    for loads, words in ((document.shaft.loads, "at station"), ((), "no station is stressed")):
        document.change(replace(document.shaft, loads=loads), "Loads")
        assert document.scene.results is not None
        assert words in least_text(document.scene.results, "SI")
