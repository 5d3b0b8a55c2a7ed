"""What stands beside the pointer while something is pulled: the size, what it does, and why not further."""

import math

from PySide6.QtCore import QPointF, QRectF, QSizeF, Qt
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPainter, QPen

from app import symbol_text
from app.bench.sizes import Size
from app.bench.sketch import FIELDS, Sketch
from app.document import Scene, station_for
from app.theme import Theme, text_font
from shaftcore.nomenclature import BY_KEY
from shaftcore.number_text import with_unit
from shaftcore.radius_window import SMALLEST, RadiusWindow
from shaftcore.results import Results
from shaftcore.units import System

Lines = list[tuple[str, str]]
"""(role, text): role is "size", "plain", "symbols" (set as in print) or "refusal"."""

AT_STATION = (("kt_bending", "kt_torsion"), ("n", "margin"))
"""Station quantities by row of the readout."""
PADDING, BESIDE, WIDEST, CLEAR = 8.0, 16.0, 380.0, 15.0

STEP_NOISE = 1e-6
"""Share of the last shown digit that a conversion may lose without the number being rounded down by one."""


def drag_lines(scene: Scene, size: Size, value: float | None, typed: str, window: RadiusWindow | None) -> Lines:
    """Size, Kt, n and margin there, the worst station, and the radius window."""
    symbol = f"{size.declaration.symbol} = " if size.declaration.symbol else ""
    text = f"{typed}▏ {size.unit(scene.system)}" if typed else size.shown(value, scene.system)
    lines: Lines = [("size", f"{size.declaration.label} {size.place}   {symbol}{text}")]
    if scene.results is None:
        return lines
    index = station_for(scene.results, size.chosen)
    if index is not None:
        station = scene.results.stations[index]
        if (station.kind, station.place) != size.chosen:
            lines.append(("plain", f"at {station.label}:"))
        lines += [("symbols", row) for row in _station_rows(scene, scene.results, index)]
    worst = scene.results.governing
    margin = with_unit(scene.results.least_margin, "share", scene.system, 1, signed=True)
    lines.append(("plain", f"worst: {scene.results.stations[worst].label}   margin {margin}"))
    if window is not None:
        lines.append(("symbols", _window_words(scene, size, window)))
    return lines


def sketch_lines(scene: Scene, sketch: Sketch, typed: str) -> Lines:
    """Length and diameter of the step being pulled; the one typed numbers go to is marked."""
    lines: Lines = []
    for name in FIELDS:
        declaration = sketch.declaration(name)
        unit = declaration.dimension.unit(scene.system)
        here = name == sketch.name
        value = sketch.sizes().get(name)
        text = f"{unit.shown(value):.6g}" if value is not None else "–"
        text = f"{typed}▏" if here and typed else text
        fixed = "  fixed" if name in sketch.fixed else ""
        lines.append(("size" if here else "plain", f"{declaration.label}  {text} {unit.symbol}{fixed}"))
    other = sketch.declaration(FIELDS[1 - FIELDS.index(sketch.name)]).label.lower()
    return [
        *lines,
        ("plain", f"a number fixes it   Tab: {other}"),
        ("plain", "click or Enter: next step   Esc: done"),
    ]


def draw_readout(
    painter: QPainter,
    lines: Lines,
    pointer: QPointF,
    room: QRectF,
    theme: Theme,
    clear: QPointF | None = None,
    taken: QRectF | None = None,
) -> QRectF:
    """Draw the lines in a quiet box beside the pointer and inside `room`, off `clear` and `taken` where it can be."""
    plain, strong = text_font(9.0), text_font(9.0, bold=True)
    height = QFontMetricsF(plain).height() + 2
    lines = [(role, part) for role, text in lines for part in wrapped(role, text, plain)]
    wide = max(_width(role, text, strong if role == "size" else plain) for role, text in lines)
    size = QSizeF(wide + 2 * PADDING, len(lines) * height + 2 * PADDING)
    box = _beside(pointer, size, room, clear, taken)
    painter.setPen(QPen(QColor(theme.rule)))
    painter.setBrush(QColor(theme.raised))
    painter.drawRect(box)
    painter.setBrush(Qt.BrushStyle.NoBrush)
    y = box.top() + PADDING + QFontMetricsF(plain).ascent()
    for role, text in lines:
        painter.setPen(QColor(theme.caution if role == "refusal" else theme.ink))
        at = QPointF(box.left() + PADDING, y)
        if role == "symbols":
            symbol_text.draw(painter, at, text, plain)
        else:
            painter.setFont(strong if role == "size" else plain)
            painter.drawText(at, text)
        y += height
    return box


def _beside(pointer: QPointF, size: QSizeF, room: QRectF, clear: QPointF | None, other: QRectF | None) -> QRectF:
    """A box below, above, right or left of the pointer that leaves both open; below right if none does."""
    points = [point for point in (pointer, clear) if point is not None]
    taken = [QRectF(point - QPointF(CLEAR, CLEAR), QSizeF(2 * CLEAR, 2 * CLEAR)) for point in points]
    taken += [other] if other is not None else []
    boxes = [_kept_in(QRectF(corner, size), room) for corner in _corners(points, size)]
    free = (box for box in boxes if not any(box.intersects(rect) for rect in taken))
    return next(free, None) or min(boxes, key=lambda box: sum(box.intersects(rect) for rect in taken))


def _corners(points: list[QPointF], size: QSizeF) -> list[QPointF]:
    """Upper left corners of boxes about the first point, then of such as stand off all of them."""
    xs, ys = [point.x() for point in points], [point.y() for point in points]
    found = []
    for right, left, below, above in ((xs[0], xs[0], ys[0], ys[0]), (max(xs), min(xs), max(ys), min(ys))):
        for x in (right + BESIDE, left - BESIDE - size.width()):
            found += [QPointF(x, y) for y in (below + BESIDE, above - BESIDE - size.height())]
    return found


def _kept_in(box: QRectF, room: QRectF) -> QRectF:
    box.moveLeft(max(min(box.left(), room.right() - box.width() - 2), room.left() + 2))
    box.moveTop(max(min(box.top(), room.bottom() - box.height() - 2), room.top() + 2))
    return box


def _station_rows(scene: Scene, results: Results, index: int) -> list[str]:
    rows = []
    for keys in AT_STATION:
        entries = []
        for key in keys:
            column = BY_KEY[key]
            value = column.values(results)[index]
            if value is None or (key.startswith("kt") and results.stations[index].site is None):
                continue
            signed = column.dimension == "share"
            text = with_unit(value, column.dimension, scene.system, 1 if signed else 2, signed)
            entries.append(f"{column.symbol} {text}")
        if entries:
            rows.append("   ".join(entries))
    return rows


def _window_words(scene: Scene, size: Size, window: RadiusWindow) -> str:
    allowed = f"{allowed_shown(size, window.allowed, scene.system)} allowed ({window.limited_by.written(scene.system)})"
    if window.needed is None:
        return f"no radius reaches the asked factors; {allowed}"
    if window.needed <= SMALLEST:
        return f"any radius reaches the asked factors; {allowed}"
    needed = needed_shown(size, window.needed, scene.system)
    head = "radius window is empty" if window.empty else "radius window"
    return f"{head}: {needed} needed, {allowed}"


def needed_shown(size: Size, needed: float, system: System) -> str:
    """The needed size rounded up: the number shown must be one that lasts."""
    unit = size.declaration.dimension.unit(system)
    return f"{math.ceil(unit.shown(needed) * 10**unit.decimals) / 10**unit.decimals:g} {unit.symbol}"


def allowed_shown(size: Size, allowed: float, system: System) -> str:
    """The allowed size rounded down: the number shown must be one that fits."""
    unit = size.declaration.dimension.unit(system)
    steps = unit.shown(allowed) * 10**unit.decimals
    return f"{math.floor(steps + STEP_NOISE) / 10**unit.decimals:g} {unit.symbol}"


def _width(role: str, text: str, font: QFont) -> float:
    return symbol_text.width(text, font) if role == "symbols" else symbol_text.plain_width(text, font)


def wrapped(role: str, text: str, font: QFont, widest: float = WIDEST) -> list[str]:
    """The text in lines no wider than they may be."""
    if _width(role, text, font) <= widest:
        return [text]
    lines = [""]
    for word in text.split(" "):
        longer = f"{lines[-1]} {word}" if lines[-1] else word
        if lines[-1] and _width(role, longer, font) > widest:
            lines.append(word)
        else:
            lines[-1] = longer
    return lines
