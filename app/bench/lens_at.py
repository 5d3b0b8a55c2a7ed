"""Which lens the bench shows: one for the size in hand, or for the raiser that is chosen."""

from collections.abc import Sequence
from typing import Any

from PySide6.QtCore import QPointF, QRectF
from PySide6.QtGui import QPainter

from app.bench.close_up import close_up, has_close_up
from app.bench.drawing import Drawing
from app.bench.hits import Grip
from app.bench.lens import Lens
from app.bench.lens_room import lens_room, taken_of
from app.bench.lens_words import words_width
from app.bench.number_field import NumberField
from app.bench.overlay import window_of
from app.bench.sizes import Size, sizes_of
from app.bench.stage import Plan, Stage, Type
from app.bench.view import BenchView
from app.document import Scene
from shaftcore.radius_window import RadiusWindow


def lens_on(
    view: BenchView,
    scene: Scene,
    size: Size,
    grips: Sequence[Grip],
    window: RadiusWindow | None,
    over_others: bool,
    held: Sequence[QRectF] = (),
) -> Lens | None:
    """A lens for a size of the shaft at rest; None where there is no room, or nothing more to see.

    With `over_others` it may cover the words of other things, never what is `held`.
    """
    shown = close_up(scene.shaft, size, window)
    if shown is None:
        return None
    stage = Stage(scene, Plan(scene.shaft), view.frame, view.theme, view.devicePixelRatioF())
    own = [QPointF(grip.x, grip.y) for grip in grips if grip.chosen == size.chosen and not grip.is_line]
    taken = taken_of(stage, Drawing(stage, Type()), own)
    taken.held.extend(held)
    # at the same place as at rest where that can be, so that taking hold moves nothing
    ways = (False, True) if over_others else (False,)
    rooms = (lens_room(stage, taken, own[0].x(), words_width(shown), way) for way in ways)
    room = next((found for found in rooms if found is not None), None)
    if room is None:
        return None
    lens = Lens(shown, room, stage.frame.scale)
    return lens if lens.useful else None


class LensAtRest:
    """The lens of the chosen raiser while nothing is pulled, sought once for each picture.

    While a size is typed or stepped by keys it may cover the words of other things.
    """

    def __init__(self, view: BenchView) -> None:
        self._view = view
        self._scene: Scene | None = None
        self._given: tuple[Any, ...] = ()
        self.lens: Lens | None = None

    def seek(
        self, scene: Scene, size: Size | None, grips: Sequence[Grip], field: NumberField | None, keys: bool
    ) -> None:
        """Find the lens for the size in turn, or for the first of the chosen raiser that has one."""
        held = [] if field is None else [QRectF(field.geometry())]
        given = (size.key if size else "", self._view.frame, held, keys)
        if scene is self._scene and given == self._given:
            return
        self._scene, self._given, self.lens = scene, given, None
        sizes = (field.shown_size if field else size, *sizes_of(scene.shaft, scene.chosen))
        shown = next((one for one in sizes if one is not None and has_close_up(scene.shaft, one)), None)
        if shown is not None and shown.chosen == scene.chosen:
            window = window_of(scene.results, shown)
            self.lens = lens_on(self._view, scene, shown, grips, window, keys or field is not None, held)

    def paint(self, painter: QPainter, scene: Scene, field: NumberField | None) -> None:
        """Draw it, with the number being typed where one is."""
        lens = self.lens
        if lens is None:
            return
        size = lens.shown.size
        typed = field.typed if field is not None and field.shown_size.key == size.key else None
        value = size.value if typed is None else typed
        if value is not None:
            lens.paint(painter, value, self._view.theme, scene.system)
