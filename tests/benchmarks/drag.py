"""Speed of the live drag: from a pointer move to the last finished repaint, against a full draw of the traces.

Run by hand: ``python tests/benchmarks/drag.py``, and again with ``QT_SCALE_FACTOR=2``; on a busy
machine ``--cpu`` counts the thread's processor time instead of time gone by. A window of
1400x900 shows the bench and four traces of a shaft with 20 segments and 60 stations; moves of the
pointer drag a fillet by its handle, each with the real analysis. The second row is the whole
window. The reference is a full matplotlib draw of the same traces in the same run: once with the
axes at hand, as the program draws on release, and once with figure and axes made anew.
"""

import os
import statistics
import sys
import tempfile
import time
from collections import defaultdict
from collections.abc import Callable
from pathlib import Path
from typing import Any

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
sys.path.insert(0, str(Path(__file__).parents[2]))

from PySide6.QtCore import QEvent, QPointF, QSettings, Qt
from PySide6.QtGui import QMouseEvent
from PySide6.QtWidgets import QApplication, QVBoxLayout, QWidget

import app.document as document_module
from app.bench.hand import make_hand
from app.bench.view import BenchView
from app.document import Document
from app.main_window import MainWindow
from app.preferences import Preferences
from app.ruler import Ruler
from app.theme import LIGHT, apply_theme, load_type
from app.traces.frame import Chart
from app.traces.view import TraceView
from shaftcore.notch_sites import seatings
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import AxialForce, Material, RadialForce, Segment, Shaft, Support, Torque

clock = time.thread_time if "--cpu" in sys.argv else time.perf_counter
WARM_UP, MOVES, DRAWS = 20, 200, 9
SPENT: dict[str, float] = defaultdict(float)
PAINTS: dict[str, int] = defaultdict(int)


def the_shaft() -> Shaft:
    """Invented: 20 segments, 19 shoulders, a groove in each segment, 20 loads and 2 supports."""
    diameters = [40 + 4 * min(i, 19 - i) + 2 * (i % 2) for i in range(20)]
    segments = tuple(
        Segment(f"s{i}", 60.0, float(d), shoulder=Shoulder(0.8) if i < 19 else None) for i, d in enumerate(diameters)
    )
    grooves = tuple(Groove(f"g{i}", x=60.0 * i + 20, depth=1.0, radius=1.5) for i in range(20))
    forces = tuple(RadialForce(f"f{i}", x=60.0 * i + 40, force=150.0 + 40 * i, angle=17.0 * i) for i in range(17))
    others = (
        Torque("t1", x=130.0, torque=250e3, amplitude=20e3),
        Torque("t2", x=1090.0, torque=-250e3, amplitude=-20e3),
        AxialForce("a1", x=650.0, force=2500.0),
    )
    supports = (Support("A", x=90.0, locating=True), Support("B", x=1130.0))
    steel = Material(tensile_strength=800.0, yield_strength=550.0)
    return Shaft(material=steel, segments=segments, raisers=grooves, supports=supports, loads=forces + others)


def timed(owner: Any, name: str, part: str) -> None:
    """Add the time spent in a function to `part`, and count its calls."""
    inner: Callable[..., Any] = getattr(owner, name)

    def outer(*args: Any, **kwargs: Any) -> Any:
        begin = clock()
        try:
            return inner(*args, **kwargs)
        finally:
            SPENT[part] += clock() - begin
            PAINTS[part] += 1

    setattr(owner, name, outer)


def fillet_at(bench: BenchView, document: Document, place: str) -> QPointF:
    """Where the fillet's handle lies on the bench."""
    seated = next(s for s in seatings(document.shaft) if s.place == place)
    handle = seated.kind.handles(seated.record, seated.around)[0]
    return bench.to_screen(handle.x, handle.y)


def send(widget: QWidget, kind: QEvent.Type, pos: QPointF, held: bool) -> None:
    button = Qt.MouseButton.NoButton if kind == QEvent.Type.MouseMove else Qt.MouseButton.LeftButton
    buttons = Qt.MouseButton.LeftButton if held else Qt.MouseButton.NoButton
    where = widget.mapToGlobal(pos)
    event = QMouseEvent(kind, pos, where, button, buttons, Qt.KeyboardModifier.ControlModifier)
    QApplication.sendEvent(widget, event)


def drag(bench: BenchView, document: Document) -> tuple[list[float], dict[str, float], dict[str, int]]:
    """Seconds of every move, and seconds and calls of each part over all of them."""
    start = fillet_at(bench, document, "s6")
    send(bench, QEvent.Type.MouseMove, start, held=False)
    send(bench, QEvent.Type.MouseButtonPress, start, held=True)
    seconds: list[float] = []
    radii: set[float] = set()
    for move in range(WARM_UP + MOVES):
        if move == WARM_UP:
            SPENT.clear()
            PAINTS.clear()
        step = 2.0 + 7 * move % 31
        begin = clock()
        send(bench, QEvent.Type.MouseMove, start + QPointF(-step, -step), held=True)
        QApplication.processEvents()
        seconds.append(clock() - begin)
        radii.add(document.shaft.segments[6].shoulder.radius)  # type: ignore[union-attr]
    spent, paints = dict(SPENT), dict(PAINTS)
    if not document.in_gesture or len(radii) < MOVES // 10:
        raise SystemExit(f"The pointer did not drag the fillet: {len(radii)} different radii.")
    send(bench, QEvent.Type.MouseButtonRelease, start, held=False)
    QApplication.processEvents()
    document.undo_stack.undo()
    QApplication.processEvents()
    return seconds[WARM_UP:], spent, paints


def full_draws(traces: TraceView) -> tuple[float, float]:
    """Median seconds of a full matplotlib draw of what the traces show: with axes at hand, and from nothing."""
    frame = traces.picture.frame
    if frame is None:
        raise SystemExit("The traces have not been painted.")
    plots, view = frame.plots, frame.view
    chart = Chart(plots, view)
    return median_of(lambda: chart.draw(plots, view)), median_of(lambda: Chart(plots, view).draw(plots, view))


def median_of(work: Callable[[], object]) -> float:
    work()
    seconds = []
    for _ in range(DRAWS):
        begin = clock()
        work()
        seconds.append(clock() - begin)
    return statistics.median(seconds)


def bench_and_traces(document: Document) -> tuple[QWidget, BenchView, TraceView]:
    window, ruler = QWidget(), Ruler()
    bench, traces = BenchView(document, ruler, LIGHT), TraceView(document, ruler, LIGHT)
    bench.hand = make_hand(bench, document)
    column = QVBoxLayout(window)
    column.setContentsMargins(0, 0, 0, 0)
    column.setSpacing(0)
    column.addWidget(bench, 4)
    column.addWidget(traces, 5)
    window.resize(1400, 900)
    return window, bench, traces


def report(name: str, window: QWidget, bench: BenchView, traces: TraceView, document: Document) -> None:
    window.show()
    document.load(the_shaft(), None)
    for _ in range(5):
        QApplication.processEvents()
    results = document.scene.results
    if results is None:
        raise SystemExit("The shaft could not be analysed.")
    seconds, spent, paints = drag(bench, document)
    at_hand, anew = full_draws(traces)
    middle, late = statistics.median(seconds), statistics.quantiles(seconds, n=20)[18]
    print(f"{name}: {len(results.shaft.segments)} segments, {len(results.stations)} stations, {len(seconds)} moves")
    print(f"  move to repaint   median {middle * 1e3:6.2f} ms   p95 {late * 1e3:6.2f} ms")
    print(f"  full draw, axes at hand   {at_hand * 1e3:6.2f} ms   p95 of a move / this {late / at_hand:.3f}")
    print(f"  full draw, from nothing   {anew * 1e3:6.2f} ms   p95 of a move / this {late / anew:.3f}")
    for part, total in spent.items():
        print(f"    {part:<16} {total / len(seconds) * 1e3:6.2f} ms a move, {paints[part] / len(seconds):.2f} calls")
    window.hide()


def main() -> None:
    application = QApplication([])
    load_type()
    apply_theme(application, LIGHT)
    timed(document_module, "evaluate", "analysis")
    timed(BenchView, "paintEvent", "bench paint")
    timed(TraceView, "paintEvent", "traces paint")
    timed(TraceView, "_show", "traces take")
    document = Document()
    window, bench, traces = bench_and_traces(document)
    print(f"scale {window.devicePixelRatioF():g}")
    report("bench and traces", window, bench, traces, document)
    with tempfile.TemporaryDirectory() as folder:
        settings = QSettings(f"{folder}/settings.ini", QSettings.Format.IniFormat)
        whole = MainWindow(Preferences(settings), LIGHT)
        whole.resize(1400, 900)
        report("whole window", whole, whole.bench, whole.traces, whole.document)


if __name__ == "__main__":
    main()
