"""The one window: bench and traces share an x axis at the left, ledger and workings stand at the right."""

from collections.abc import Callable
from pathlib import Path

from PySide6.QtCore import Qt
from PySide6.QtGui import QCloseEvent, QDragEnterEvent, QDropEvent
from PySide6.QtWidgets import QApplication, QLabel, QMainWindow, QSplitter, QVBoxLayout, QWidget

from app.actions import build_actions
from app.bench.hand import make_hand
from app.bench.view import BenchView
from app.document import Document, Scene
from app.error_messages import guarded, report, tell
from app.file_dialogs import SHAFT_FILTER, SHAFT_SUFFIX, Unsaved, ask_open, ask_save, ask_unsaved
from app.fold import Fold
from app.fold_column import FoldColumn
from app.kit import Kit
from app.long_work import LongWork
from app.manual.view import ManualWindow
from app.menus import Menus
from app.outputs import write_ledger, write_picture, write_sheet
from app.panels.givens import Givens
from app.panels.ledger import Ledger
from app.panels.notices import Notices
from app.panels.thing import ThingPanel
from app.panels.workings import Workings
from app.preferences import Preferences
from app.ruler import Ruler
from app.status_line import status_words
from app.theme import DARK, LIGHT, Theme, apply_theme
from app.traces.view import TraceView
from app.window_state import remember, restore
from shaftcore.errors import FilletwrightError
from shaftcore.shaft import Shaft
from shaftcore.shaft_file import read_shaft, write_shaft

SMALLEST = (1000, 620)


class MainWindow(QMainWindow):
    """Arranges the parts and carries out the commands; what is shown lives in the document."""

    def __init__(self, preferences: Preferences, desktop: Theme) -> None:
        super().__init__()
        self.preferences, self._desktop = preferences, desktop
        self.theme = self._theme_by_choice()
        self.document = Document()
        self.ruler = Ruler()
        self.bench = BenchView(self.document, self.ruler, self.theme)
        self.bench.hand = make_hand(self.bench, self.document)
        self.kit = Kit(self.document, self.bench, self.theme)
        self.traces = TraceView(self.document, self.ruler, self.theme)
        self.ledger = Ledger(self.document, self.theme)
        self.workings = Workings(self.document, self.theme)
        self.givens = Givens(self.document, self.theme)
        self.thing = ThingPanel(self.document, self.theme)
        self.notices = Notices(self.document, self.theme)
        self._manual: ManualWindow | None = None
        self._arrange()
        self.actions_by_key = build_actions(self, self._slots())
        self.menus = Menus(self)
        self._status = QLabel()
        self._status.setAccessibleName("Governing station")
        self._status.setContentsMargins(0, 0, 12, 0)
        self.statusBar().addPermanentWidget(self._status)
        self.statusBar().setSizeGripEnabled(False)
        self.document.shown.connect(self._shown)
        self.document.refused.connect(self._refused)
        self.document.renamed.connect(self._renamed)
        self.setAcceptDrops(True)
        self.setMinimumSize(*SMALLEST)
        self.set_theme(self.theme)
        restore(self)
        self._renamed()
        self._shown(self.document.scene)

    # arrangement ----------------------------------------------------------------------------------

    def _arrange(self) -> None:
        below = QWidget()
        stack = QVBoxLayout(below)
        stack.setContentsMargins(0, 0, 0, 0)
        stack.setSpacing(0)
        stack.addWidget(self.kit)
        stack.addWidget(self.traces, 1)
        self.left = QSplitter(Qt.Orientation.Vertical)
        self.left.addWidget(self.bench)
        self.left.addWidget(below)
        self.left.setStretchFactor(0, 4)
        self.left.setStretchFactor(1, 5)
        self.folds = {
            "ledger": Fold("Ledger", self.ledger),
            "chosen": Fold("Chosen on the bench", self.thing, opened=False),
            "givens": Fold("Givens", self.givens, opened=False),
            "workings": Fold("Workings", self.workings),
            "notices": Fold("Notices", self.notices, opened=False),
        }
        self.right = FoldColumn(list(zip(self.folds.values(), (5, 3, 5, 5, 2), strict=True)))
        self.across = QSplitter(Qt.Orientation.Horizontal)
        self.across.addWidget(self.left)
        self.across.addWidget(self.right)
        self.across.setStretchFactor(0, 5)
        self.across.setStretchFactor(1, 3)
        for splitter in (self.left, self.right, self.across):
            splitter.setChildrenCollapsible(False)
        self.setCentralWidget(self.across)
        self.resize(1366, 768)
        self.across.setSizes([860, 506])
        self.left.setSizes([330, 390])

    def set_theme(self, theme: Theme) -> None:
        self.theme = theme
        app = QApplication.instance()
        if isinstance(app, QApplication):
            apply_theme(app, theme)
        for part in (
            self.bench,
            self.kit,
            self.traces,
            self.ledger,
            self.workings,
            self.givens,
            self.thing,
            self.notices,
        ):
            part.set_theme(theme)

    def choose_theme(self, name: str) -> None:
        """ "light", "dark" or "" for the desktop's own."""
        self.preferences.keep("theme", name)
        self.set_theme(self._theme_by_choice())

    def _theme_by_choice(self) -> Theme:
        return {"light": LIGHT, "dark": DARK}.get(self.preferences.words("theme", ""), self._desktop)

    # what is shown --------------------------------------------------------------------------------

    @guarded
    def _shown(self, scene: Scene) -> None:
        self._status.setText(status_words(scene))
        if scene.live:
            return
        count = len(scene.missing) + (len(scene.results.notices) if scene.results else 0)
        self.folds["notices"].set_title(f"Notices ({count})" if count else "Notices")
        for key in ("sheet", "ledger_csv"):
            self.actions_by_key[key].setEnabled(scene.results is not None)

    @guarded
    def _refused(self, words: str) -> None:
        self.statusBar().showMessage(words, 8000)

    @guarded
    def _renamed(self) -> None:
        name = self.document.path.name if self.document.path else "unnamed shaft"
        self.setWindowTitle(f"{name}[*] — Filletwright")
        self.setWindowModified(self.document.modified)

    # commands -------------------------------------------------------------------------------------

    def _slots(self) -> dict[str, Callable[[], object]]:
        return {
            "new": self.begin_new,
            "open": self.ask_open,
            "save": self.save,
            "save_as": self.save_as,
            "sheet": lambda: write_sheet(self),
            "ledger_csv": lambda: write_ledger(self),
            "likeness": lambda: write_picture(self),
            "quit": self.close,
            "fit": self.fit,
            "closer": lambda: self.ruler.zoom(1.25, self.bench.width() / 2),
            "farther": lambda: self.ruler.zoom(0.8, self.bench.width() / 2),
            "next_part": self.next_part,
            "manual": lambda: self.open_manual("start"),
            "cautions": lambda: self.open_manual("cautions"),
            "about": self.tell_about,
        }

    def begin_new(self) -> None:
        if self._may_leave():
            self.document.load(Shaft(), None)
            self.bench.setFocus()

    def ask_open(self) -> None:
        path = ask_open(self, self.preferences.folder())
        if path is not None:
            self.open_file(path)

    def open_file(self, path: Path) -> bool:
        """Open a shaft file in place of the present one; what is wrong with it is said, nothing is lost."""
        try:
            shaft = read_shaft(path)
        except FilletwrightError as error:
            report(error, self)
            return False
        if not self._may_leave():
            return False
        self.document.load(shaft, path)
        self.bench.setFocus()
        self._note_file(path)
        return True

    def open_copy(self, path: Path) -> None:
        """Open a demo shaft as an unnamed one, so that the demo itself stays as it is."""
        if self._may_leave():
            self.document.load(read_shaft(path), None)
            self.bench.setFocus()

    def save(self) -> bool:
        return self._save_to(self.document.path) if self.document.path else self.save_as()

    def save_as(self) -> bool:
        suggestion = self.document.path or Path(self.preferences.folder()) / f"shaft{SHAFT_SUFFIX}"
        path = ask_save(self, "Save the shaft", suggestion, SHAFT_FILTER, SHAFT_SUFFIX)
        return path is not None and self._save_to(path)

    def _save_to(self, path: Path) -> bool:
        try:
            write_shaft(self.document.shaft, path)
        except FilletwrightError as error:
            report(error, self)
            return False
        self.document.saved_as(path)
        self._note_file(path)
        return True

    def _note_file(self, path: Path) -> None:
        self.preferences.note_file(path)
        self.preferences.keep("folder", str(path.resolve().parent))

    def fit(self) -> None:
        self.bench.fit()

    def next_part(self) -> None:
        """Give the keyboard to the next open part of the window."""
        parts: list[QWidget] = [self.bench, self.kit, self.traces]
        parts += [fold.content for fold in self.folds.values() if fold.opened]
        now = QApplication.focusWidget()
        at = next((i for i, part in enumerate(parts) if now and (part is now or part.isAncestorOf(now))), -1)
        stops = map(_first_stop, parts[at + 1 :] + parts[: at + 1])
        stop = next((stop for stop in stops if stop is not None), None)
        if stop is not None:
            stop.setFocus(Qt.FocusReason.ShortcutFocusReason)

    def open_manual(self, page: str) -> None:
        if self._manual is None:
            self._manual = ManualWindow(self)
        self._manual.open_page(page)

    def tell_about(self) -> None:
        from shaftcore import VERSION

        tell(
            f"Filletwright {VERSION}",
            "Sizes rotating shafts: diameters, shoulders and fillets with a fatigue margin at every station.\n\n"
            "A design aid. Results defer to the codes in force and to a licensed engineer's judgement.\n\n"
            "© the Filletwright authors, MIT licence.",
            self,
        )

    # manners of a window --------------------------------------------------------------------------

    def _may_leave(self) -> bool:
        """True once unsaved changes are saved or given up."""
        if not self.document.modified:
            return True
        name = self.document.path.name if self.document.path else "this shaft"
        answer = ask_unsaved(self, name)
        return self.save() if answer is Unsaved.SAVE else answer is Unsaved.DROP

    @guarded
    def closeEvent(self, event: QCloseEvent) -> None:  # noqa: N802 (Qt's name)
        if self._may_leave():
            for work in self.findChildren(LongWork):
                work.stop_and_wait()  # a thread that outlives its window ends the process the hard way
            remember(self)
            event.accept()
        else:
            event.ignore()

    @guarded
    def dragEnterEvent(self, event: QDragEnterEvent) -> None:  # noqa: N802 (Qt's name)
        if any(url.isLocalFile() for url in event.mimeData().urls()):
            event.acceptProposedAction()

    @guarded
    def dropEvent(self, event: QDropEvent) -> None:  # noqa: N802 (Qt's name)
        files = [url.toLocalFile() for url in event.mimeData().urls() if url.isLocalFile()]
        if files:
            self.open_file(Path(files[0]))


def _first_stop(part: QWidget) -> QWidget | None:
    """The first widget of a part that takes the keyboard; None where there is none."""
    inner: QWidget | None = part
    while inner is not None:
        at_home = inner is part or part.isAncestorOf(inner)
        if at_home and inner.isVisible() and inner.isEnabled() and inner.focusPolicy() & Qt.FocusPolicy.TabFocus:
            return inner
        inner = inner.nextInFocusChain()
        if inner is part:
            return None
    return None
