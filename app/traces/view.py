"""The traces widget: draws what the document shows, reads values under the pointer, asks for choices.

Settled scenes are drawn in full by the plotting library. During a gesture its still frame stays,
with the design as it was as a pale ghost, and the live lines are painted over it.
"""

import sys
from collections.abc import Iterable, Mapping

from PySide6.QtCore import QEvent, QRect, QRectF, Qt, QTimer, Signal
from PySide6.QtGui import QColor, QFocusEvent, QMouseEvent, QPainter, QPaintEvent, QRegion, QWheelEvent
from PySide6.QtWidgets import QWidget

from app.document import Document, Scene
from app.error_messages import guarded
from app.ruler import LEFT_MARGIN, RIGHT_MARGIN, Ruler
from app.theme import Theme, text_font
from app.traces.bands import FOOT, GAP, border_at, least_height, with_border_moved
from app.traces.keys import track_actions
from app.traces.live import plot_rect
from app.traces.overlay import paint_focus
from app.traces.picture import Picture
from app.traces.plots import View
from app.traces.reading import in_words, least_text, nearest_station
from app.traces.readout import NEAR_STATION, Readout
from app.traces.tracks import BY_KEY, DEFAULT_TRACKS, TRACKS

ZOOM_PER_NOTCH = 1.2
PAN_PER_NOTCH = 60.0
NOTCH = 120.0
"""One click of a wheel, in Qt's eighths of a degree."""
CATCH_UP = 220
"""Milliseconds after which a frame that could not grow at once is looked at again."""


class TraceView(QWidget):
    """Stacked charts over the ruler's x axis. Which tracks and how tall is the user's choice."""

    tracks_changed = Signal()
    """Which tracks are shown, or their heights, changed by the user's hand."""

    def __init__(self, document: Document, ruler: Ruler, theme: Theme) -> None:
        super().__init__()
        self.document, self.ruler, self.theme = document, ruler, theme
        self.picture = Picture([BY_KEY[key] for key in DEFAULT_TRACKS])
        self._scene = document.scene
        self._hovered: float | None = None
        self._border: tuple[int, float] | None = None
        self._pressed_at: float | None = None
        self._current = 0
        self._may_wait = True
        self._failed = False
        self._catch_up = QTimer(self)
        self._catch_up.setSingleShot(True)
        self._catch_up.timeout.connect(self._grow_if_outgrown)
        self.setMouseTracking(True)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setAttribute(Qt.WidgetAttribute.WA_OpaquePaintEvent)
        self.setAccessibleName("Traces along the shaft")
        self.setContextMenuPolicy(Qt.ContextMenuPolicy.ActionsContextMenu)
        self.addActions(track_actions(self))
        self._fit_height()
        document.shown.connect(self._show)
        document.hovered.connect(self._hover)
        ruler.moved.connect(self._ruler_moved)
        self._show(document.scene)

    # which tracks, and how tall -----------------------------------------------------------------------

    def available_tracks(self) -> list[tuple[str, str]]:
        """(key, label) of every track there is, in their order."""
        return [(track.key, track.label) for track in TRACKS]

    @property
    def shown_tracks(self) -> list[str]:
        return [track.key for track in self.picture.tracks]

    def show_tracks(self, keys: Iterable[str]) -> None:
        """Show these tracks from top to bottom; unknown keys are passed over."""
        self.picture.show_tracks([BY_KEY[key] for key in dict.fromkeys(keys) if key in BY_KEY], self._scene)
        self._current = 0
        self._fit_height()
        self._describe()
        self.tracks_changed.emit()
        self.update()

    @property
    def track_heights(self) -> dict[str, float]:
        """Shares of the height by track, as the user dragged them."""
        return dict(self.picture.weights)

    def set_track_heights(self, weights: Mapping[str, float]) -> None:
        self.picture.weights = {key: float(share) for key, share in weights.items() if key in BY_KEY and share > 0}
        self.update()

    def set_theme(self, theme: Theme) -> None:
        self.theme = theme
        self.update()

    def _fit_height(self) -> None:
        self.setMinimumHeight(least_height(max(len(self.picture.tracks), 1)))

    # what is shown --------------------------------------------------------------------------------------

    @guarded
    def _show(self, scene: Scene) -> None:
        chosen_moved = scene.station != self._scene.station
        self._scene, self._failed = scene, False
        changed = self.picture.take(scene)
        if changed is None or chosen_moved or self.picture.frame is None:
            self.update()
        elif changed:
            self._update_tracks(changed)
        if scene.live:
            self._grow_if_outgrown()
        else:
            self._describe()

    def _update_tracks(self, indices: Iterable[int]) -> None:
        frame = self.picture.frame
        if frame is None:
            return
        for index in indices:
            band = frame.plots[index].band
            self.update(QRect(0, int(band.top), self.width(), int(band.plot_bottom - band.top) + 3))

    @guarded
    def _grow_if_outgrown(self) -> None:
        """Widen the axes under a drag at most now and then; what has to wait is looked at again."""
        if not self._scene.live or not self.picture.outgrown():
            return
        if self.picture.grow():
            self.update()
        elif not self._catch_up.isActive():
            self._catch_up.start(CATCH_UP)

    @guarded
    def _ruler_moved(self) -> None:
        self.update()

    @guarded
    def _hover(self, x: float | None) -> None:
        before, self._hovered = self._hovered, x
        if self._scene.live:  # a gesture has the pointer; what it moves is read, not the place it is at
            return
        for place in (before, x):
            if place is not None:
                self.update(QRect(int(self.ruler.to_px(place)) - 2, 0, 5, self.height()))
        for head in self.picture.heads:
            self.update(head.rect(0.0, self.width()).toAlignedRect())
        self.update(QRect(0, self.height() - int(FOOT + GAP), self.width(), int(FOOT + GAP)))

    def _describe(self) -> None:
        results, station = self._scene.results, self._scene.station
        if results is None:
            words = self._missing_words()
        elif station is None:
            words = f"No station is chosen. {least_text(results, self._scene.system)}."
        else:
            words = in_words(results, station, self.shown_tracks, self._scene.system)
        self.setAccessibleDescription(words)

    def _missing_words(self) -> str:
        first = next(iter(self._scene.missing), None)
        return "The traces appear here." + (f" Next: {first.remedy}." if first else "")

    # painting ---------------------------------------------------------------------------------------------

    def _view(self) -> View:
        ruler = self.ruler
        end = ruler.to_mm(self.width() - RIGHT_MARGIN)
        size = float(self.width()), float(self.height())
        return View(*size, self.devicePixelRatioF(), ruler.begin, end, self.theme, self._scene.system)

    @guarded
    def paintEvent(self, event: QPaintEvent) -> None:  # noqa: N802
        painter = QPainter(self)
        try:
            self._paint(painter, event.region())
        except Exception:
            self._failed = True
            raise
        finally:
            painter.end()

    def _paint(self, painter: QPainter, region: QRegion) -> None:
        no_room = self.width() < LEFT_MARGIN + RIGHT_MARGIN + 20
        empty = self._scene.results is None or not self.picture.tracks
        if empty or no_room or self._failed or self._waits():
            painter.fillRect(region.boundingRect(), QColor(self.theme.paper))
            if empty:
                self._paint_words(painter)
            return
        frame = self.picture.ready(self._view())
        touched = [
            i
            for i, plot in enumerate(frame.plots)
            if region.intersects(plot_rect(plot.band, frame.view.width).toAlignedRect())
        ]
        self.picture.paint(painter, frame, touched)
        if self._scene.results is not None:
            hovered = None if self._scene.live else self._hovered
            readout = Readout(self._scene, self._scene.results, hovered, self.ruler)
            readout.paint(painter, frame, self.picture.heads, self.picture.curves, region)
        if self.hasFocus():
            paint_focus(painter, frame, self._current)

    def _waits(self) -> bool:
        """True once: a window comes up before the plotting library is loaded."""
        window = self.window().windowHandle()
        wait = self._may_wait and "app.traces.frame" not in sys.modules and window is not None and window.isExposed()
        self._may_wait = False
        if wait:
            QTimer.singleShot(0, self, self.update)
        return wait

    def _paint_words(self, painter: QPainter) -> None:
        words = self._missing_words() if self._scene.results is None else "No trace is shown. Choose some in the menu."
        painter.setFont(text_font())
        painter.setPen(QColor(self.theme.faint))
        inside = QRectF(self.rect()).adjusted(LEFT_MARGIN, 0, -RIGHT_MARGIN, 0)
        painter.drawText(inside, Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextWordWrap, words)

    # pointer ----------------------------------------------------------------------------------------------

    def _border_at(self, y: float) -> int | None:
        frame = self.picture.frame
        return None if frame is None else border_at([plot.band for plot in frame.plots], y)

    @guarded
    def mouseMoveEvent(self, event: QMouseEvent) -> None:  # noqa: N802
        pos = event.position()
        if self._border is not None and self.picture.frame is not None:
            index, y = self._border
            self._move_border(index, pos.y() - y)
            self._border = (index, pos.y())
            return
        over_border = self._border_at(pos.y()) is not None and not event.buttons()
        self.setCursor(Qt.CursorShape.SplitVCursor if over_border else Qt.CursorShape.ArrowCursor)
        inside = LEFT_MARGIN <= pos.x() <= self.width() - RIGHT_MARGIN
        self.document.point_at(self.ruler.to_mm(pos.x()) if inside else None)

    @guarded
    def mousePressEvent(self, event: QMouseEvent) -> None:  # noqa: N802
        if event.button() != Qt.MouseButton.LeftButton:
            return
        index = self._border_at(event.position().y())
        if index is not None:
            self._border = (index, event.position().y())
            return
        self._pressed_at = event.position().x()

    @guarded
    def mouseReleaseEvent(self, event: QMouseEvent) -> None:  # noqa: N802
        if self._border is not None:
            self._border = None
            self.tracks_changed.emit()
            return
        pressed, self._pressed_at = self._pressed_at, None
        results = self._scene.results
        if pressed is None or results is None or abs(event.position().x() - pressed) > NEAR_STATION:
            return
        station = nearest_station(results, self.ruler.to_mm(event.position().x()))
        if station is not None:
            self.document.choose(None, station)

    @guarded
    def leaveEvent(self, event: QEvent) -> None:  # noqa: N802
        self.document.point_at(None)

    @guarded
    def wheelEvent(self, event: QWheelEvent) -> None:  # noqa: N802
        turned = event.angleDelta()
        notches = (turned.y() or turned.x()) / NOTCH
        if event.modifiers() & Qt.KeyboardModifier.ControlModifier:
            self.ruler.zoom(ZOOM_PER_NOTCH**notches, event.position().x())
        else:
            self.ruler.pan(notches * PAN_PER_NOTCH)
        event.accept()

    @guarded
    def focusInEvent(self, event: QFocusEvent) -> None:  # noqa: N802
        self.update()

    @guarded
    def focusOutEvent(self, event: QFocusEvent) -> None:  # noqa: N802
        self.update()

    # keys ---------------------------------------------------------------------------------------------------

    def step_station(self, by: int) -> None:
        """Choose the station `by` further to the right; the first one where none is chosen."""
        results, station = self._scene.results, self._scene.station
        if results is not None and results.stations:
            wanted = 0 if station is None else min(max(station + by, 0), len(results.stations) - 1)
            self.document.choose(None, wanted)

    def step_track(self, by: int) -> None:
        """Make another track the current one."""
        self._current = min(max(self._current + by, 0), max(len(self.picture.tracks) - 1, 0))
        self.update()

    def make_taller(self, by: float) -> None:
        """Give the current track pixels of its neighbour's height."""
        self._move_border(self._current, -by) if self._current else self._move_border(1, by)
        self.tracks_changed.emit()

    def _move_border(self, index: int, by: float) -> None:
        frame = self.picture.frame
        if frame is not None and 0 < index < len(frame.plots):
            self.picture.weights |= with_border_moved([plot.band for plot in frame.plots], index, by)
            self.update()
