"""The x axis that bench and traces share: millimetres along the shaft to pixels, and back."""

from PySide6.QtCore import QObject, Signal

LEFT_MARGIN, RIGHT_MARGIN = 76.0, 20.0
"""Pixels kept free for axis labels and the edge, in bench and traces alike."""

CLOSEST_MM = 2.0

TALLEST_SHARE = 0.42
"""Share of the bench's height the largest diameter may take; the rest is for loads, words and marks."""


LEFT_IN_SIGHT = 40.0
"""Pixels of the shaft's length that stay in sight however the view is moved."""


class Ruler(QObject):
    """Where x lies on the screen. Bench and traces stand in one column, so one width serves both."""

    moved = Signal()

    def __init__(self) -> None:
        super().__init__()
        self.begin = 0.0
        self.scale = 1.0
        self.width = 800.0
        self.fitted = True
        self.length = 0.0
        """Of the shaft that is shown (mm); the view does not leave it. 0 leaves the view free."""
        self._length = 500.0
        self._tallest = 100.0
        self._height = 300.0

    def to_px(self, x: float) -> float:
        return LEFT_MARGIN + (x - self.begin) * self.scale

    def to_mm(self, px: float) -> float:
        return self.begin + (px - LEFT_MARGIN) / self.scale

    @property
    def end(self) -> float:
        """x (mm) at the right margin."""
        return self.to_mm(self.width - RIGHT_MARGIN)

    def set_size(self, width: float, height: float) -> None:
        """The bench's size in pixels; the shaft is fitted anew unless the user has zoomed."""
        self.width, self._height = width, height
        if self.fitted:
            self.fit(self._length, self._tallest)

    def fit(self, length: float, tallest: float) -> None:
        """Show a whole shaft of that length and largest diameter (mm), true to scale."""
        self._length, self._tallest, self.fitted = length, tallest, True
        across = max(self.width - LEFT_MARGIN - RIGHT_MARGIN, 50.0)
        self.scale = min(across / max(length, 1e-6), TALLEST_SHARE * self._height / max(tallest, 1e-6))
        self.begin = length / 2 - across / (2 * self.scale)
        self.moved.emit()

    def zoom(self, factor: float, at_px: float) -> None:
        """Zoom about a pixel; the x under it stays put."""
        fixed = self.to_mm(at_px)
        widest = (self.width - LEFT_MARGIN - RIGHT_MARGIN) / CLOSEST_MM
        self.scale = min(max(self.scale * factor, 1e-3), widest)
        self._move_to(fixed - (at_px - LEFT_MARGIN) / self.scale)

    def pan(self, px: float) -> None:
        self._move_to(self.begin - px / self.scale)

    def _move_to(self, begin: float) -> None:
        """Begin the view there, or as near as leaves some of the shaft in sight."""
        if self.length > 0:
            seen = min(LEFT_IN_SIGHT / self.scale, self.length)
            begin = min(max(begin, self.to_mm(LEFT_MARGIN) - self.end + seen), self.length - seen)
        self.begin, self.fitted = begin, False
        self.moved.emit()
