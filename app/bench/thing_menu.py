"""The menu of a thing on the bench: its sizes, what else can be done with it, and taking it off."""

from collections.abc import Callable

from PySide6.QtGui import QAction
from PySide6.QtWidgets import QMenu

from app.bench.gesture import Holder
from app.bench.keys import Keys
from app.bench.sizes import Size, at_step, label_of, record_of, size_of, sizes_of
from app.error_messages import guarded
from shaftcore import edits
from shaftcore.abutment import CORNERS, largest_fillet
from shaftcore.shaft import Segment, Shaft, Support


def thing_menu(hand: Holder, keys: Keys, x: float) -> QMenu | None:
    """The menu of the chosen thing, asked for at x (mm); None where nothing is chosen."""
    scene = hand.document.scene
    record, chosen = record_of(scene.shaft, scene.chosen), scene.chosen
    if record is None or chosen is None:
        return None
    menu = QMenu(hand.view)
    menu.setAccessibleName(label_of(scene.shaft, chosen))
    menu.aboutToHide.connect(menu.deleteLater)
    menu.addAction(label_of(scene.shaft, chosen)).setEnabled(False)
    menu.addSeparator()
    for size in sizes_of(scene.shaft, chosen):
        # the head of the menu names the thing: only sizes of its neighbours say whose they are
        name = size.declaration.label if size.chosen == chosen else f"{size.declaration.label} {size.place}"
        _add(menu, f"{name}: {size.shown(size.value, scene.system)}…", _opener(hand, keys, size))
    menu.addSeparator()
    if isinstance(record, Segment):
        _segment_entries(menu, hand, record, x)
    elif isinstance(record, Support) and not record.locating:
        _change(menu, hand, "Make it the locating one", lambda shaft: edits.make_locating(shaft, record.id))
    elif at_step(chosen):
        _corner_entries(menu.addMenu("Bearing &corner"), hand, chosen[1])
    if not at_step(chosen):
        _add(menu, "Take &off", keys.remove)
    return menu


def _segment_entries(menu: QMenu, hand: Holder, segment: Segment, x: float) -> None:
    _change(menu, hand, "&Split here", lambda shaft: edits.split_segment(shaft, segment.id, x))
    if segment.end_diameter is None:
        _change(menu, hand, "Make it a &taper", lambda shaft: edits.make_taper(shaft, segment.id))
    else:
        _change(menu, hand, "Make it a c&ylinder", lambda shaft: edits.make_cylinder(shaft, segment.id))


def _corner_entries(menu: QMenu, hand: Holder, segment_id: str) -> None:
    """Corners of the bearings that may seat here, each with the fillet it leaves."""
    shaft, system = hand.document.shaft, hand.document.scene.system
    chosen = hand.document.scene.chosen
    size = None if chosen is None else size_of(shaft, chosen, "bearing_corner")
    if size is None:
        return
    for corner in (None, *(row[0] for row in CORNERS)):
        limit = "" if corner is None else f", fillet up to {size.shown(largest_fillet(corner), system)}"
        action = _change(
            menu,
            hand,
            "nothing seats here" if corner is None else size.shown(corner, system) + limit,
            _corner_edit(segment_id, corner),
            f"Bearing corner {size.place}",
        )
        action.setCheckable(True)
        action.setChecked(size.value == corner)


def _corner_edit(segment_id: str, corner: float | None) -> Callable[[Shaft], Shaft]:
    return lambda shaft: edits.replace_shoulder(shaft, segment_id, bearing_corner=corner)


def _opener(hand: Holder, keys: Keys, size: Size) -> Callable[[], object]:
    return lambda: hand.open_field(size, keys.anchor(size))


def _change(menu: QMenu, hand: Holder, text: str, edit: Callable[[Shaft], Shaft], words: str = "") -> QAction:
    document, chosen = hand.document, hand.document.scene.chosen
    name = f"{label_of(document.shaft, chosen)}: " if chosen and not words else ""
    step = f"{words}: {text}" if words else name + text.replace("&", "").lower()
    return _add(menu, text, lambda: hand.attempt(lambda: document.change(edit(document.shaft), step)))


def _add(menu: QMenu, text: str, slot: Callable[[], object]) -> QAction:
    action = menu.addAction(text)
    action.triggered.connect(guarded(lambda checked=False: slot()))
    return action
