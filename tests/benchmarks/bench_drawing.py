"""Processor time of laying out and painting the bench at 1400x900, beside plainly filling the same picture.

Run by hand: python tests/benchmarks/bench_drawing.py
"""

import itertools
import os
import sys
import time
from pathlib import Path

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
sys.path.insert(0, str(Path(__file__).parents[2]))

import numpy as np
from PySide6.QtGui import QColor, QImage, QPainter
from PySide6.QtWidgets import QApplication

from app.bench.drawing import Drawing
from app.bench.stage import Plan, Stage, Type
from app.bench.view import BenchView
from app.document import Document
from app.ruler import Ruler
from app.theme import LIGHT, load_type
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import RadialForce, Segment, Shaft, Support, Torque

WIDTH, HEIGHT, ROUNDS = 1400, 900, 60


def long_shaft() -> Shaft:
    """20 segments, 19 shoulders, 20 grooves, 2 supports, 18 loads: 60 stations or about."""
    segments = tuple(
        Segment(f"s{i}", 60, 60 + 6 * min(i, 19 - i), shoulder=Shoulder(1.5) if i not in (9, 19) else None)
        for i in range(20)
    )
    begins = list(itertools.accumulate((s.length for s in segments), initial=0.0))[:-1]
    return Shaft(
        segments=segments,
        raisers=tuple(Groove(f"g{i}", x + 30, 0.8, 1) for i, x in enumerate(begins)),
        supports=(Support("A", 10, "Left", True), Support("B", 1190, "Right")),
        loads=(
            *(RadialForce(f"f{i}", 75 + 60 * i, 900, 45.0 * (i % 8), name=f"Disc {i}") for i in range(15)),
            Torque("t1", 220, 3e5, name="Drive"),
            Torque("t2", 1000, -3e5, name="Pump"),
        ),
    )


def milliseconds(times: list[float]) -> str:
    least, middle, late = (1e3 * float(value) for value in (min(times), np.median(times), np.percentile(times, 95)))
    return f"least {least:5.2f}  median {middle:5.2f}  p95 {late:5.2f} ms"


def main() -> None:
    app = QApplication([])
    load_type()
    document = Document()
    view = BenchView(document, Ruler(), LIGHT)
    view.resize(WIDTH, HEIGHT)
    view.show()
    document.load(long_shaft(), None)
    app.processEvents()
    assert document.scene.results is not None
    print(f"{len(document.shaft.segments)} segments, {len(document.scene.results.stations)} stations")
    for ratio in (1, 2):
        _measure(view, ratio)


def _measure(view: BenchView, ratio: int) -> None:
    image = QImage(WIDTH * ratio, HEIGHT * ratio, QImage.Format.Format_RGB32)
    image.setDevicePixelRatio(ratio)
    scene, letters = view.document.scene, Type()
    kept = Drawing(Stage(scene, Plan(scene.shaft), view.frame, LIGHT, ratio), letters).standings
    times: dict[str, list[float]] = {"fill only": [], "lay out, at rest": [], "lay out, in a gesture": [], "paint": []}
    for name, places in (("lay out, at rest", {}), ("lay out, in a gesture", kept)):
        for _ in range(ROUNDS if places else ROUNDS // 4):
            begin = time.thread_time()
            drawing = Drawing(Stage(scene, Plan(scene.shaft), view.frame, LIGHT, ratio), letters, places)
            times[name].append(time.thread_time() - begin)
    for _ in range(ROUNDS):
        drawing = Drawing(Stage(scene, Plan(scene.shaft), view.frame, LIGHT, ratio), letters, kept)
        for name in ("fill only", "paint"):
            begin = time.thread_time()
            with QPainter(image) as painter:
                painter.fillRect(0, 0, WIDTH, HEIGHT, QColor(LIGHT.paper))
                if name == "paint":
                    drawing.paint(painter)
            times[name].append(time.thread_time() - begin)
    for name, taken in times.items():
        share = np.median(taken) / np.median(times["fill only"])
        print(f"scale {ratio}  {name:22s} {milliseconds(taken)}  {share:5.1f} x filling")


if __name__ == "__main__":
    main()
