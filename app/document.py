"""The one shaft in the window: what is shown, how it changes, how changes are taken back.

Views are given a `Scene` and draw it; they ask for changes here and keep no truth of their own.
A gesture previews any number of shafts, then commits or cancels; what is committed is what was
last previewed.
"""

from dataclasses import dataclass, replace
from pathlib import Path

from PySide6.QtCore import QObject, Signal, Slot
from PySide6.QtGui import QUndoCommand, QUndoStack

from app.error_messages import guarded
from app.refusal import refusal_words
from shaftcore.errors import UnsoundShaftError
from shaftcore.evaluation import evaluate
from shaftcore.records import Problem
from shaftcore.results import Results
from shaftcore.shaft import Shaft, things
from shaftcore.units import System

Selection = tuple[str, str]
"""What is chosen: a word for the sort of thing ("shoulder", "groove", "support", "segment", ...) and its id."""


@dataclass(frozen=True)
class Scene:
    """All a view needs. `results` is None while the shaft is unfinished; `missing` says why.

    `live` is true during a gesture: views then draw the quick way.
    """

    shaft: Shaft = Shaft()
    results: Results | None = None
    missing: tuple[Problem, ...] = ()
    chosen: Selection | None = None
    station: int | None = None
    system: System = "SI"
    live: bool = False


def station_for(results: Results | None, chosen: Selection | None) -> int | None:
    """Index of a thing's station: one of its own kind, else any that bears its id, else the one it falls into."""
    if results is None or chosen is None:
        return None
    own = (i for i, station in enumerate(results.stations) if (station.kind, station.place) == chosen)
    index = next(own, None)
    if index is None:
        index = results.station_of(chosen[1])
    return _station_shared_by(results, chosen[1]) if index is None else index


def _station_shared_by(results: Results, id: str) -> int | None:
    """Index of the station that is named after something else in the same spot."""
    x = getattr(things(results.shaft).get(id), "x", None)
    return next((i for i, station in enumerate(results.stations) if x in (station.x, *station.also)), None)


class ChangeShaft(QUndoCommand):
    """One named step: the shaft before and after. Steps with the same key on end merge."""

    def __init__(self, document: "Document", before: Shaft, after: Shaft, words: str, merge: str | None) -> None:
        super().__init__(words)
        self._document, self.before, self.after, self.merge = document, before, after, merge

    @guarded
    def undo(self) -> None:
        self._document._settle(self.before)

    @guarded
    def redo(self) -> None:
        self._document._settle(self.after)

    def id(self) -> int:
        return -1 if self.merge is None else hash(self.merge) & 0x7FFFFFFF

    def mergeWith(self, other: QUndoCommand) -> bool:  # noqa: N802 (Qt's name)
        if not isinstance(other, ChangeShaft) or other.merge != self.merge:
            return False
        self.after = other.after
        self.setText(other.text())
        self.setObsolete(self.after == self.before)
        return True


class Document(QObject):
    """Holder of the shaft and its results. All signals carry what views need to redraw."""

    shown = Signal(object)
    """A Scene to draw."""
    refused = Signal(str)
    """A change that could not be taken, in words; the scene stays."""
    hovered = Signal(object)
    """x in mm under the pointer, or None."""
    renamed = Signal()
    """Path or modified mark changed."""

    def __init__(self) -> None:
        super().__init__()
        self.scene = Scene()
        self.path: Path | None = None
        self.undo_stack = QUndoStack(self)
        self.undo_stack.cleanChanged.connect(self._clean_changed)
        self._settled, self._settled_scene = Shaft(), self.scene
        self._previewed: Shaft | None = None
        self._settle(Shaft())

    # what is shown -----------------------------------------------------------------------------

    @property
    def shaft(self) -> Shaft:
        """The shaft on the screen, preview included."""
        return self.scene.shaft

    @property
    def modified(self) -> bool:
        return not self.undo_stack.isClean()

    @property
    def in_gesture(self) -> bool:
        return self._previewed is not None

    def choose(self, chosen: Selection | None, station: int | None = None) -> None:
        """Choose a thing on the shaft, or a station; the one is found from the other."""
        results = self.scene.results
        if station is None:
            station = station_for(results, chosen)
        if chosen is None and station is not None and results is not None:
            chosen = (results.stations[station].kind, results.stations[station].place)
        self._show(replace(self.scene, chosen=chosen, station=station))

    def set_system(self, system: System) -> None:
        self._show(replace(self.scene, system=system))

    def point_at(self, x: float | None) -> None:
        self.hovered.emit(x)

    # changes ------------------------------------------------------------------------------------

    def preview(self, shaft: Shaft) -> bool:
        """Show a shaft during a gesture. False, with the reason in `refused`, where it cannot be."""
        scene = self._scene_of(shaft, live=True)
        if scene is None:
            return False
        begins, self._previewed = not self.in_gesture, shaft
        if begins:
            self._rest_undo()
        self._show(scene)
        return True

    def commit(self, words: str) -> None:
        """End a gesture and keep what was last previewed as one step."""
        after, self._previewed = self._previewed, None
        if after is None or after == self._settled:
            self.cancel()
            return
        self.undo_stack.push(ChangeShaft(self, self._settled, after, words, None))

    def cancel(self) -> None:
        """End a gesture and take it back; nothing is computed, so that it works after any failure."""
        self._previewed = None
        self._rest_undo()
        back = replace(self._settled_scene, chosen=self.scene.chosen, station=None, system=self.scene.system)
        self._show(_with_choice_kept(back, self.scene))

    def change(self, shaft: Shaft, words: str, merge: str | None = None) -> bool:
        """One step outside a gesture; steps that share `merge` become one. False where refused."""
        if self.in_gesture:
            self.cancel()
        if shaft == self._settled:
            return True
        scene = self._scene_of(shaft, live=False)
        if scene is None:
            return False
        self.scene = scene  # analysed once: the step that is pushed settles on it
        self.undo_stack.push(ChangeShaft(self, self._settled, shaft, words, merge))
        return True

    def load(self, shaft: Shaft, path: Path | None) -> None:
        """Begin anew with a shaft read from `path`, or an unsaved one."""
        self.undo_stack.clear()
        self.path, self._previewed = path, None
        self.scene = Scene(system=self.scene.system)
        self._settle(shaft)
        self.renamed.emit()

    def saved_as(self, path: Path) -> None:
        self.path = path
        self.undo_stack.setClean()
        self.renamed.emit()

    @Slot(bool)
    def _clean_changed(self, _: bool) -> None:
        self.renamed.emit()

    # inside ---------------------------------------------------------------------------------------

    def _scene_of(self, shaft: Shaft, live: bool) -> Scene | None:
        if shaft is self.scene.shaft and (self.scene.results is not None or self.scene.missing):
            return replace(self.scene, live=live)
        results: Results | None = None
        missing: tuple[Problem, ...] = ()
        try:
            results = evaluate(shaft)
        except UnsoundShaftError as error:
            wrong = [problem for problem in error.problems if problem.severity == "wrong"]
            if wrong:
                self.refused.emit(refusal_words(shaft, wrong[0]))
                return None
            missing = error.problems
        scene = replace(self.scene, shaft=shaft, results=results, missing=missing, live=live)
        return _with_choice_kept(scene, self.scene)

    def _settle(self, shaft: Shaft) -> None:
        scene = self._scene_of(shaft, live=False)
        if scene is not None:
            self._settled, self._settled_scene, self._previewed = shaft, scene, None
            self._rest_undo()
            self._show(scene)

    def _rest_undo(self) -> None:
        """Actions made from the undo stack are off during a gesture and as the stack has them after it."""
        self.undo_stack.canUndoChanged.emit(self.undo_stack.canUndo() and not self.in_gesture)
        self.undo_stack.canRedoChanged.emit(self.undo_stack.canRedo() and not self.in_gesture)

    def _show(self, scene: Scene) -> None:
        self.scene = scene
        self.shown.emit(scene)


def _with_choice_kept(scene: Scene, before: Scene) -> Scene:
    """The same station chosen after a change, found by its thing and, among several, by rank."""
    if before.station is None or before.results is None or scene.results is None:
        return replace(scene, station=None if scene.results is None else scene.station)
    old = before.results.stations[before.station]
    if scene.chosen is not None and scene.chosen[1] != old.place:  # a guest in another's station
        return replace(scene, station=station_for(scene.results, scene.chosen))
    same_old = [i for i, s in enumerate(before.results.stations) if (s.kind, s.place) == (old.kind, old.place)]
    same = [i for i, s in enumerate(scene.results.stations) if (s.kind, s.place) == (old.kind, old.place)]
    rank = same_old.index(before.station)
    return replace(scene, station=same[min(rank, len(same) - 1)] if same else None)
