"""What one analysis of a whole shaft costs, and how that grows with its length. Run by hand:

    python tests/benchmarks/analysis.py

Each round analyses a shaft never seen before (one fillet differs, as during a drag), validation
included. The yardstick in the same run is a plain frame solution of the same beam: stiffness
matrices of the same number of elements assembled in numpy and solved dense, both planes at once,
deflections and moments only, no stresses, factors or notices. All times are processor times of the
one thread that numpy is held to: with more, the dense solution would have all processors, and the
ratio would say how many there are.
"""

import os
import statistics
import time
from collections.abc import Callable
from dataclasses import replace

os.environ |= dict.fromkeys(("OPENBLAS_NUM_THREADS", "OMP_NUM_THREADS", "MKL_NUM_THREADS"), "1")

import numpy as np

from shaftcore.evaluation import evaluate
from shaftcore.geometry import profile_of
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.radius_window import radius_window
from shaftcore.section_properties import second_moment
from shaftcore.shaft import RadialForce, Segment, Shaft, Support, Torque

STRETCH = 60.0
COUNTS = (20, 50, 100, 200, 500, 1000)


def long_shaft(count: int) -> Shaft:
    """`count` segments with a shoulder at each face, a groove on each, forces on all but the end ones."""
    segments = tuple(
        Segment(f"s{i}", STRETCH, 60.0 if i % 2 else 50.0, shoulder=Shoulder(1.5) if i < count - 1 else None)
        for i in range(count)
    )
    forces = [RadialForce(f"f{i}", i * STRETCH + 40, 4e4 / count, float(37 * i % 360)) for i in range(1, count - 1)]
    torques = [Torque("in", 30.0, 2e5), Torque("out", count * STRETCH - 25, -2e5)]
    return Shaft(
        segments=segments,
        raisers=tuple(Groove(f"g{i}", i * STRETCH + 20, 0.8, 0.6) for i in range(count)),
        supports=(Support("A", 10.0, locating=True), Support("B", count * STRETCH - 10)),
        loads=(*forces, *torques),
    )


def with_first_radius(shaft: Shaft, radius: float) -> Shaft:
    first = replace(shaft.segments[0], shoulder=Shoulder(radius))
    return replace(shaft, segments=(first, *shaft.segments[1:]))


def dense_frame(shaft: Shaft) -> np.ndarray:
    """Deflections and slopes (2 planes, nodes, 2) of the Euler beam by stiffness matrices, solved dense."""
    profile = profile_of(shaft)
    forces = [load for load in shaft.loads if isinstance(load, RadialForce)]
    x = np.unique([*profile.faces, *(s.x for s in shaft.supports), *(f.x for f in forces)])
    step, n = np.diff(x), len(x)
    segment = profile.segment_at(x[:-1], np.ones(n - 1))
    bending = shaft.material.elastic_modulus * second_moment(profile.left[segment], profile.bore[segment])
    matrix = np.zeros((2 * n, 2 * n))
    for i, (length, stiff) in enumerate(zip(step, bending, strict=True)):
        part = [
            [12, 6 * length, -12, 6 * length],
            [6 * length, 4 * length**2, -6 * length, 2 * length**2],
            [-12, -6 * length, 12, -6 * length],
            [6 * length, 2 * length**2, -6 * length, 4 * length**2],
        ]
        matrix[2 * i : 2 * i + 4, 2 * i : 2 * i + 4] += stiff / length**3 * np.array(part)
    pushed = np.zeros((2 * n, 2))
    for f in forces:
        angle = np.radians(f.angle)
        pushed[2 * np.searchsorted(x, f.x)] += f.force * np.array([np.cos(angle), np.sin(angle)])
    held = {2 * int(np.searchsorted(x, s.x)) for s in shaft.supports}
    free = [row for row in range(2 * n) if row not in held]
    bent = np.zeros_like(pushed)
    bent[free] = np.linalg.solve(matrix[np.ix_(free, free)], pushed[free])
    return bent.T.reshape(2, n, 2)


def milliseconds(run: Callable[[int], object], rounds: int) -> list[float]:
    """Sorted times of all rounds but the first three, which warm up."""
    times = []
    for i in range(rounds + 3):
        begin = time.thread_time()
        run(i)
        times.append((time.thread_time() - begin) * 1e3)
    return sorted(times[3:])


def main() -> None:
    heads = ("segments", "stations", "median ms", "p95 ms", "µs/station", "frame ms", "ratio")
    print(" ".join(f"{head:>10}" for head in heads))
    for count in COUNTS:
        shaft, rounds = long_shaft(count), max(20, 6000 // count)
        fresh = [with_first_radius(shaft, 1 + i * 1e-3) for i in range(rounds + 3)]
        times = milliseconds(lambda i, fresh=fresh: evaluate(fresh[i]), rounds)
        frame = statistics.median(milliseconds(lambda _, shaft=shaft: dense_frame(shaft), max(5, 400 // count)))
        median, p95, stations = statistics.median(times), times[int(0.95 * rounds)], len(evaluate(shaft).stations)
        numbers = (f"{value:10.3f}" for value in (median, p95, median / stations * 1e3, frame, median / frame))
        print(f"{count:10d} {stations:10d}", *numbers)
    results = evaluate(long_shaft(20))
    window = milliseconds(lambda _: radius_window(results, "s6"), 300)
    print(f"radius window of one shoulder: median {statistics.median(window):.3f} ms, p95 {window[285]:.3f} ms")


if __name__ == "__main__":
    main()
