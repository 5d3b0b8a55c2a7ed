"""What the drawing says in words: labels of loads and supports, what to do next, the chosen station."""

import math
from collections.abc import Callable
from typing import Any

from app.bench.tools import BY_KEY as TOOLS
from app.bench.tools import DRAW
from app.document import Scene
from shaftcore.number_text import beside_unit, brief, in_full, with_unit
from shaftcore.results import Results
from shaftcore.shaft import AxialForce, RadialForce, Shaft, Support, Torque
from shaftcore.units import System

PLUS_MINUS = " ± "
NEXT_STEP = {
    "segments": (
        "Draw the first segment",
        f"Press on the centre line, or {DRAW.letter}, and pull out length and diameter; a typed number fixes each.",
    ),
    "supports": (
        "",
        f"Take a support from the kit, or press {TOOLS['support'].letter}, and click or type where it goes.",
    ),
}
"""By the field that is missing: heading ("" for the problem's own remedy) and how it is done here."""

OTHER_STEPS = {
    "locating": "Choose a support and switch it to locating.",
    "apart": "Pull one of the two supports along the shaft, or take it off.",
}
"""By a word of the remedy: how to go on where supports are there but cannot do their work."""


def quantity(value: float, dimension_name: str, system: System) -> str:
    """A number with its unit, without the noughts at its end."""
    return beside_unit(brief(value, dimension_name, system), dimension_name, system)


def load_words(load: Any, system: System) -> str:
    """Size and direction of a load, short."""
    return _LOAD_WORDS[type(load)](load, system)


def _radial(load: RadialForce, system: System) -> str:
    size = quantity(abs(load.force), "force", system) + _pulsation(load.amplitude, "force", system)
    angle = (load.angle + (180.0 if load.force < 0 else 0.0)) % 360.0
    upright = {0.0: "↑ ", 180.0: "↓ "}.get(angle)
    if upright:
        return upright + size
    depth = {90.0: ", towards you", 270.0: ", away from you"}.get(angle, "")
    return f"{size} at {quantity(angle, 'angle', system)}{depth}"


def _torque(load: Torque, system: System) -> str:
    way = "in " if load.torque > 0 else "out " if load.torque < 0 else ""
    return f"torque {way}" + quantity(abs(load.torque), "torque", system) + _pulsation(load.amplitude, "torque", system)


def _axial(load: AxialForce, system: System) -> str:
    way = "→ " if load.force > 0 else "← " if load.force < 0 else "↔ "
    return way + quantity(abs(load.force), "force", system) + _pulsation(load.amplitude, "force", system)


_LOAD_WORDS: dict[type, Callable[[Any, System], str]] = {RadialForce: _radial, Torque: _torque, AxialForce: _axial}


def _pulsation(amplitude: float, dimension_name: str, system: System) -> str:
    return PLUS_MINUS + brief(abs(amplitude), dimension_name, system) if amplitude else ""


def support_words(support: Support, system: System) -> str:
    """What sort of support it is, with its stiffness and offsets where it has any."""
    words = ["locating" if support.locating else "floating"]
    if support.stiffness is not None:
        words.append(f"spring {_entered(support.stiffness, 'stiffness', system)}")
    for offset, ways in ((support.offset_y, ("up", "down")), (support.offset_z, ("towards you", "away from you"))):
        if offset:
            words.append(f"{_entered(abs(offset), 'length', system)} {ways[offset < 0]}")
    return ", ".join(words)


def _entered(value: float, dimension_name: str, system: System) -> str:
    """A number with its unit and all its digits: what is entered as 0.005 mm must not read as 0."""
    return beside_unit(in_full(value, dimension_name, system), dimension_name, system)


def next_step(scene: Scene) -> tuple[str, str] | None:
    """Heading and how to go on while the shaft is unfinished; None once it is analysed."""
    if not scene.missing:
        return None
    problem = scene.missing[0]
    head, how = NEXT_STEP.get(problem.path, ("", ""))
    for remedy, words in OTHER_STEPS.items():
        how = words if remedy in problem.remedy else how
    return head or problem.remedy[:1].upper() + problem.remedy[1:], how


# for a screen reader --------------------------------------------------------------------------


def description(scene: Scene) -> str:
    """The drawing in words: the shaft, then the chosen station or what is still to do."""
    parts = [shaft_words(scene.shaft, scene.system)]
    step = next_step(scene)
    if step is not None:
        parts.append(f"{step[0]}. {step[1]}")
    if scene.results is not None:
        index = scene.results.governing if scene.station is None else scene.station
        parts.append(station_words(scene.results, index, scene.system, scene.station is not None))
    return " ".join(parts)


def shaft_words(shaft: Shaft, system: System) -> str:
    if not shaft.segments:
        return "No shaft yet."
    largest = max(max(s.diameter, s.right_diameter) for s in shaft.segments)
    return (
        f"Shaft {with_unit(shaft.length, 'length', system)} long, up to "
        f"{with_unit(largest, 'length', system)} in diameter: {_count(len(shaft.segments), 'segment')}, "
        f"{_count(len(shaft.supports), 'support')}, {_count(len(shaft.loads), 'load')}."
    )


def station_words(results: Results, index: int, system: System, chosen: bool) -> str:
    station, judged = results.stations[index], results.judged
    head = "Chosen" if chosen else "Governing"
    return (
        f"{head}: station {station.number} of {len(results.stations)}, {station.label}, at "
        f"{with_unit(station.x, 'length', system)}. Margin {_margin(float(judged.margin[index]))} in fatigue, "
        f"{_margin(float(judged.yield_margin[index]))} in yield."
    )


def _margin(margin: float) -> str:
    if not math.isfinite(margin):
        return "without limit, unloaded"
    return f"{'plus' if margin >= 0 else 'minus'} {abs(margin):.1%}".replace("%", " per cent")


def _count(count: int, word: str) -> str:
    return f"{count} {word}{'' if count == 1 else 's'}"
