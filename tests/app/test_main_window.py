"""The window's frame: opening, saving, asking, exporting, remembering."""

from pathlib import Path

import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import QMenu
from pytestqt.qtbot import QtBot

import app.file_dialogs as dialogs
import app.main_window as frame
import app.outputs as outputs
from app.actions import COMMANDS
from app.file_dialogs import Unsaved, ask_save
from app.main_window import MainWindow
from app.manual.book import PAGES, page_text, pages_with
from app.manual.view import NOTHING_FOUND
from app.preferences import Preferences
from app.theme import DARK, LIGHT
from shaftcore.demo import demo_shafts
from shaftcore.edits import replace_shoulder
from shaftcore.shaft_file import read_shaft, shaft_to_text

MENDED = next(path for path in demo_shafts() if "mended" in path.name)


@pytest.fixture
def window(qtbot: QtBot, preferences: Preferences) -> MainWindow:
    made = MainWindow(preferences, LIGHT)
    qtbot.addWidget(made, before_close_func=lambda w: w.document.undo_stack.setClean())
    made.resize(1366, 768)
    with qtbot.waitActive(made):  # without a window manager a window must ask for the keyboard
        made.show()
        made.activateWindow()
    return made


def _modify(window: MainWindow) -> None:
    shaft = window.document.shaft
    assert window.document.change(replace_shoulder(shaft, shaft.segments[0].id, radius=1.25), "Fillet")


def test_open_change_save_reopen(window: MainWindow, tmp_path: Path) -> None:
    path = tmp_path / "mine.shaft.json"
    path.write_bytes(MENDED.read_bytes())
    assert window.open_file(path)
    assert window.windowTitle().startswith("mine.shaft.json")
    assert not window.isWindowModified()
    _modify(window)
    assert window.isWindowModified()
    window.actions_by_key["save"].trigger()
    assert not window.isWindowModified()
    assert read_shaft(path) == window.document.shaft
    assert window.preferences.recent_files() == [path.resolve()]


def test_a_wrong_file_leaves_the_design(window: MainWindow, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    said = []
    monkeypatch.setattr(frame, "report", lambda error, parent: said.append(str(error)))
    window.open_file(MENDED)
    before = window.document.shaft
    wrong = tmp_path / "wrong.shaft.json"
    wrong.write_text(shaft_to_text(before).replace('"length_mm"', '"lenght_mm"', 1))
    assert not window.open_file(wrong)
    assert window.document.shaft is before
    assert "lenght_mm" in said[0]
    assert "length_mm" in said[0]


def test_demo_opens_as_an_unnamed_copy(window: MainWindow) -> None:
    window.open_copy(MENDED)
    assert window.document.path is None
    assert window.document.scene.results is not None


@pytest.mark.parametrize(("answer", "leaves"), [(Unsaved.DROP, True), (Unsaved.STAY, False)])
def test_unsaved_work_is_asked_about_once(
    window: MainWindow, monkeypatch: pytest.MonkeyPatch, answer: Unsaved, leaves: bool
) -> None:
    window.open_copy(MENDED)
    _modify(window)
    asked = []
    monkeypatch.setattr(frame, "ask_unsaved", lambda parent, name: asked.append(name) or answer)
    changed = window.document.shaft
    window.begin_new()
    assert len(asked) == 1
    assert (window.document.shaft == changed) is not leaves
    window.document.undo_stack.setClean()


def test_failed_save_keeps_the_modified_mark(
    window: MainWindow, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    said = []
    monkeypatch.setattr(frame, "report", lambda error, parent: said.append(str(error)))
    window.open_copy(MENDED)
    _modify(window)
    monkeypatch.setattr(frame, "ask_save", lambda *_: tmp_path / "no such folder" / "x.shaft.json")
    assert not window.save_as()
    assert window.document.modified
    assert "x.shaft.json" in said[0]


def test_sheet_is_written_off_the_interface_thread(window: MainWindow, qtbot: QtBot, tmp_path: Path) -> None:
    from datetime import date

    window.open_copy(MENDED)
    results = window.document.scene.results
    assert results is not None
    job = outputs.export_sheet(window, results, tmp_path / "out.pdf", date(2026, 1, 2), "SI")
    with qtbot.waitSignal(job.finished, timeout=30_000) as ended:
        pass
    assert ended.args == [True]
    assert (tmp_path / "out.pdf").read_bytes().startswith(b"%PDF")


def test_cancelled_sheet_leaves_no_file(window: MainWindow, qtbot: QtBot, tmp_path: Path) -> None:
    from datetime import date

    window.open_copy(MENDED)
    results = window.document.scene.results
    assert results is not None
    job = outputs.export_sheet(window, results, tmp_path / "out.pdf", date(2026, 1, 2), "SI")
    job.halt()
    with qtbot.waitSignal(job.finished, timeout=30_000) as ended:
        pass
    assert ended.args == [False]
    assert list(tmp_path.glob("out*")) == []


def test_closing_the_window_ends_the_work_that_is_going_on(window: MainWindow, qtbot: QtBot, tmp_path: Path) -> None:
    from datetime import date

    window.open_copy(MENDED)
    results = window.document.scene.results
    assert results is not None
    job = outputs.export_sheet(window, results, tmp_path / "out.pdf", date(2026, 1, 2), "SI")
    with qtbot.waitSignal(job.finished, timeout=30_000) as ended:
        window.close()
        assert not job.going_on
    assert ended.args == [False]
    assert list(tmp_path.glob("out*")) == []


def test_ledger_and_picture(window: MainWindow, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    window.open_copy(MENDED)
    for write, name in ((outputs.write_ledger, "a.csv"), (outputs.write_picture, "a.png")):
        monkeypatch.setattr(outputs, "ask_save", lambda *_, name=name: tmp_path / name)
        write(window)
        assert (tmp_path / name).stat().st_size > 100


@pytest.mark.parametrize(
    ("suffix", "typed", "got"),
    [
        (".shaft.json", "a", "a.shaft.json"),
        (".shaft.json", "a.json", "a.json"),
        (".shaft.json", "a.shaft.json", "a.shaft.json"),
        (".pdf", "a", "a.pdf"),
        (".pdf", "a.pdf", "a.pdf"),
        (".csv", "rev.2", "rev.2.csv"),
    ],
)
def test_a_name_without_an_ending_gets_it(monkeypatch: pytest.MonkeyPatch, suffix: str, typed: str, got: str) -> None:
    monkeypatch.setattr(dialogs.QFileDialog, "getSaveFileName", lambda *_: (typed, ""))
    assert ask_save(None, "", Path("x"), "", suffix) == Path(got)  # type: ignore[arg-type]


@pytest.mark.parametrize("yes", [True, False])
def test_a_file_met_by_the_added_ending_is_asked_about(
    monkeypatch: pytest.MonkeyPatch, tmp_path: Path, yes: bool
) -> None:
    (tmp_path / "a.shaft.json").write_text("mine")
    asked = []
    monkeypatch.setattr(dialogs.QFileDialog, "getSaveFileName", lambda *_: (str(tmp_path / "a"), ""))
    monkeypatch.setattr(dialogs, "ask_replace", lambda _, name: asked.append(name) or yes)
    path = ask_save(None, "", Path("x"), "", ".shaft.json")  # type: ignore[arg-type]
    assert asked == ["a.shaft.json"]
    assert path == (tmp_path / "a.shaft.json" if yes else None)


def test_undo_and_redo_from_the_menu(window: MainWindow, qtbot: QtBot) -> None:
    window.open_copy(MENDED)
    before = window.document.shaft
    _modify(window)
    after = window.document.shaft
    qtbot.keyClick(window, Qt.Key.Key_Z, Qt.KeyboardModifier.ControlModifier)
    assert window.document.shaft == before
    qtbot.keyClick(window, Qt.Key.Key_Z, Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.ShiftModifier)
    assert window.document.shaft == after


def test_window_state_comes_back(window: MainWindow, qtbot: QtBot) -> None:
    window.document.set_system("US")
    window.traces.show_tracks(["moment"] if "moment" in dict(window.traces.available_tracks()) else [])
    shown = list(window.traces.shown_tracks)
    window.folds["givens"].set_opened(True)
    window.folds["workings"].set_opened(False)
    window.close()
    again = MainWindow(window.preferences, LIGHT)
    qtbot.addWidget(again)
    assert again.document.scene.system == "US"
    assert list(again.traces.shown_tracks) == shown
    assert again.folds["givens"].opened
    assert not again.folds["workings"].opened


def test_a_part_that_is_opened_can_be_read_at_once(window: MainWindow, qtbot: QtBot) -> None:
    window.open_copy(MENDED)
    heights = window.right.sizes()
    for key in ("chosen", "givens", "notices"):
        fold = window.folds[key]
        fold.set_opened(True)
        open_ones = [other for other in window.folds.values() if other.opened]
        qtbot.waitUntil(lambda f=fold, o=open_ones: f.height() > 1.1 * sum(x.height() for x in o) / len(o))
        window.folds["workings"].set_opened(True)
        fold.set_opened(False)
        qtbot.waitUntil(lambda f=fold: f.height() == f.head.sizeHint().height())
        assert sum(window.right.sizes()) == sum(heights)
    left = [window.folds[key].height() for key in ("ledger", "workings")]
    assert left == pytest.approx([heights[0], heights[3]], abs=4)  # closing gives back what opening took


def test_every_command_has_an_action_and_no_shortcut_is_taken_twice(window: MainWindow) -> None:
    assert set(window.actions_by_key) == {command.key for command in COMMANDS}
    keys = [s.toString() for action in window.actions_by_key.values() for s in action.shortcuts() if s.toString()]
    assert len(keys) == len(set(keys))


def test_no_letter_stands_for_two_entries_of_a_menu(window: MainWindow) -> None:
    menus = [window.menuBar(), *window.menuBar().findChildren(QMenu)]
    assert len(menus) > 5
    for menu in menus:
        letters = [text[text.index("&") + 1].lower() for text in (a.text() for a in menu.actions()) if "&" in text]
        assert len(letters) == len(set(letters)), [action.text() for action in menu.actions()]


def test_f6_goes_round_the_parts(window: MainWindow, qtbot: QtBot) -> None:
    window.open_copy(MENDED)
    window.activateWindow()
    window.bench.setFocus()
    seen = set()
    for _ in range(8):
        window.next_part()
        focus = window.focusWidget()
        parts = (window.bench, window.ledger, window.workings)
        seen.add(next((p for p in parts if focus and p.isAncestorOf(focus)), focus))
    assert len(seen) >= 4


def test_f6_stops_only_where_the_keyboard_can_be_used(window: MainWindow) -> None:
    """An empty shaft, nothing chosen: that part has nothing to give the keyboard to and is passed over."""
    window.activateWindow()
    window.folds["chosen"].set_opened(True)
    window.begin_new()
    assert window.focusWidget() is window.bench
    parts = [window.bench, window.kit, window.traces, *(fold.content for fold in window.folds.values() if fold.opened)]
    for _ in range(2 * len(parts)):
        window.next_part()
        focus = window.focusWidget()
        assert focus is not None
        assert focus.isVisible()
        assert any(part is focus or part.isAncestorOf(focus) for part in parts)
    for _ in parts:
        if window.focusWidget() is not window.bench:
            window.next_part()
    assert window.focusWidget() is window.bench


def test_themes_change_while_running(window: MainWindow) -> None:
    window.open_copy(MENDED)
    window.choose_theme("dark")
    assert window.theme is DARK
    window.choose_theme("light")
    assert window.theme is LIGHT


def test_every_control_has_an_accessible_name(window: MainWindow) -> None:
    from PySide6.QtWidgets import QAbstractButton, QAbstractItemView, QComboBox, QLineEdit, QWidget

    window.open_copy(MENDED)
    nameless = [
        (type(w).__name__, w.objectName())
        for w in window.findChildren(QWidget)
        if isinstance(w, (QAbstractButton, QAbstractItemView, QComboBox, QLineEdit))
        and not w.objectName().startswith("qt_")
        and w.isVisible()
        and not (w.accessibleName() or getattr(w, "text", lambda: "")())
    ]
    assert nameless == []


def test_the_manual_has_every_page_and_finds_words(window: MainWindow) -> None:
    for page in PAGES:
        assert page_text(page.key).startswith("# ")
    assert "method" in {page.key for page in pages_with("Gerber")}
    window.open_manual("cautions")
    manual = window._manual
    assert manual is not None
    assert "licensed" in manual.browser.toPlainText()
    manual.search.setText("endurance")
    assert manual.contents.count() >= 2
    manual.search.setText("bearing corner")  # the words stand together further down than the first of them
    assert manual.browser.textCursor().selectedText().lower() == "bearing corner"
    manual.search.setText("no such words anywhere")
    assert [manual.contents.item(i).text() for i in range(manual.contents.count())] == [NOTHING_FOUND]
    manual.search.clear()
    assert manual.contents.count() == len(PAGES)
    manual.contents.setCurrentRow(1)
    assert manual.contents.width() >= manual.contents.sizeHintForColumn(0)
    assert not manual.contents.visibleRegion().isEmpty()
    assert not manual.contents.horizontalScrollBar().isVisible()


def test_links_of_the_manual_lead_somewhere() -> None:
    import re

    keys = {page.key for page in PAGES}
    for page in PAGES:
        assert set(re.findall(r"\(page:(\w+)\)", page_text(page.key))) <= keys
