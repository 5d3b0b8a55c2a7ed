"""What is kept of a picture from one repaint to the next, so that a pull paints only what it changes."""

from PySide6.QtCore import QRectF, Qt
from PySide6.QtGui import QColor, QPainter, QPixmap

from app.bench.changes import changed_columns
from app.bench.drawing import Drawing


class KeptPicture:
    """The picture painted last, and by itself the layer of marks and foot that lies over the shaft.

    The layer holds for every drawing with the same marks and foot; the picture is brought up to
    date in the columns in which its drawing and the next one differ.
    """

    def __init__(self) -> None:
        self._painted: Drawing | None = None
        self._over: tuple[Drawing, QPixmap] | None = None
        self._picture: tuple[Drawing, QPixmap] | None = None

    def paint(self, painter: QPainter, drawing: Drawing) -> None:
        """A picture whose marks move at every step is painted straight away, any other from what is kept."""
        before, self._painted = self._painted, drawing
        if drawing.stage.scene.live and not (before is not None and drawing.same_over(before)):
            _paint_whole(painter, drawing)
        else:
            painter.drawPixmap(0, 0, self._picture_of(drawing))
        drawing.paint_words(painter)

    def _picture_of(self, drawing: Drawing) -> QPixmap:
        """All but the words of the chosen raiser."""
        before = self._picture
        columns = None if before is None else changed_columns(drawing, before[0])
        if before is None or columns is None:
            picture = _sheet(drawing)
            with QPainter(picture) as painter:
                _paint_whole(painter, drawing)
        else:
            picture = before[1]
            if before[0] is not drawing:
                self._paint_columns(picture, drawing, *columns)
        self._picture = drawing, picture
        return picture

    def _paint_columns(self, picture: QPixmap, drawing: Drawing, begin: int, end: int) -> None:
        room = QRectF(begin, 0, end - begin, drawing.stage.frame.height)
        with QPainter(picture) as painter:
            painter.setClipRect(room)
            painter.fillRect(room, QColor(drawing.stage.theme.paper))
            drawing.paint_shaft(painter)
            painter.drawPixmap(0, 0, self._over_of(drawing))

    def _over_of(self, drawing: Drawing) -> QPixmap:
        """Marks and foot on clear ground."""
        if self._over is None or not drawing.same_over(self._over[0]):
            over = _sheet(drawing)
            over.fill(Qt.GlobalColor.transparent)
            with QPainter(over) as painter:
                drawing.paint_over(painter)
            self._over = drawing, over
        return self._over[1]


def _paint_whole(painter: QPainter, drawing: Drawing) -> None:
    frame = drawing.stage.frame
    painter.fillRect(QRectF(0.0, 0.0, frame.width, frame.height), QColor(drawing.stage.theme.paper))
    drawing.paint_shaft(painter)
    drawing.paint_over(painter)


def _sheet(drawing: Drawing) -> QPixmap:
    """A pixmap of the bench's size in device pixels."""
    frame, ratio = drawing.stage.frame, drawing.stage.pixel_ratio
    sheet = QPixmap(round(frame.width * ratio), round(frame.height * ratio))
    sheet.setDevicePixelRatio(ratio)
    return sheet
