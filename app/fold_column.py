"""The right-hand column: parts that open and close, one above another, sharing its height."""

from collections.abc import Sequence
from functools import partial

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QSplitter

from app.error_messages import guarded
from app.fold import Fold


class FoldColumn(QSplitter):
    """A part that is opened takes more than an even share of the room, so that it can be read
    at once; the others shrink in proportion. What a closed one leaves goes to the open ones in proportion.
    """

    def __init__(self, folds: Sequence[tuple[Fold, int]]) -> None:
        """Folds from above with their shares of the height while nothing was opened or closed."""
        super().__init__(Qt.Orientation.Vertical)
        self._folds = [fold for fold, _ in folds]
        for place, (fold, share) in enumerate(folds):
            self.addWidget(fold)
            self.setStretchFactor(place, share)
            fold.folded.connect(partial(self._share, fold))

    @guarded
    def _share(self, turned: Fold, opened: bool) -> None:
        if self.isVisible():
            self.setSizes(self._heights(turned, opened))

    def _heights(self, turned: Fold, opened: bool) -> list[int]:
        before = self.sizes()
        closed = {fold: fold.head.sizeHint().height() for fold in self._folds if not fold.opened}
        room = sum(before) - sum(closed.values())
        kept = [fold for fold in self._folds if fold.opened and fold is not turned]
        taken = (2 * room // (len(kept) + 3) if kept else room) if opened else 0
        old = {fold: before[self._folds.index(fold)] for fold in kept}
        rest = (room - taken) / max(sum(old.values()), 1)
        return [closed.get(fold, taken if fold is turned else round(old.get(fold, 0) * rest)) for fold in self._folds]
