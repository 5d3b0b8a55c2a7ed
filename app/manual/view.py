"""The manual's window: contents and search at the left, the page at the right."""

from PySide6.QtCore import Qt, QUrl
from PySide6.QtWidgets import (
    QLineEdit,
    QListWidget,
    QListWidgetItem,
    QMainWindow,
    QSplitter,
    QTextBrowser,
    QVBoxLayout,
    QWidget,
)

from app.error_messages import guarded
from app.manual.book import BY_KEY, PAGES, Page, page_text, pages_with

FRAME = 8
"""Pixels around the titles of the pages."""
NOTHING_FOUND = "No page has these words"


class ManualWindow(QMainWindow):
    """Shows the pages of the book; links between pages are written ``[words](page:key)``."""

    def __init__(self, parent: QWidget) -> None:
        super().__init__(parent, Qt.WindowType.Window)
        self.setWindowTitle("Manual — Filletwright")
        self.search = QLineEdit()
        self.search.setPlaceholderText("Search the manual")
        self.search.setAccessibleName("Search the manual")
        self.search.setClearButtonEnabled(True)
        self.contents = QListWidget()
        self.contents.setAccessibleName("Pages of the manual")
        self.browser = QTextBrowser()
        self.browser.setAccessibleName("Page of the manual")
        self.browser.setOpenLinks(False)
        self.browser.document().setDocumentMargin(24)
        side = QWidget()
        column = QVBoxLayout(side)
        column.setContentsMargins(8, 8, 8, 8)
        column.addWidget(self.search)
        column.addWidget(self.contents, 1)
        across = QSplitter()
        across.addWidget(side)
        across.addWidget(self.browser)
        across.setChildrenCollapsible(False)
        across.setStretchFactor(1, 1)
        self.setCentralWidget(across)
        self.resize(960, 640)
        self.search.textChanged.connect(self._searched)
        self.contents.currentItemChanged.connect(self._picked)
        self.browser.anchorClicked.connect(self._followed)
        self._list(list(PAGES))
        self.contents.setMinimumWidth(self.contents.sizeHintForColumn(0) + 2 * FRAME)
        across.setSizes([0, self.width()])  # the titles as wide as they are, the rest for the page

    def open_page(self, key: str) -> None:
        """Show a page and bring the window to the front."""
        self.search.clear()
        row = next(i for i, page in enumerate(PAGES) if page.key == key)
        self.contents.setCurrentRow(row)
        self.show()
        self.raise_()
        self.activateWindow()

    def _list(self, pages: list[Page]) -> None:
        self.contents.clear()
        for page in pages:
            item = QListWidgetItem(page.title)
            item.setData(Qt.ItemDataRole.UserRole, page.key)
            self.contents.addItem(item)

    @guarded
    def _searched(self, words: str) -> None:
        found = pages_with(words)
        self._list(found)
        if not found:
            nothing = QListWidgetItem(NOTHING_FOUND)
            nothing.setFlags(Qt.ItemFlag.NoItemFlags)
            self.contents.addItem(nothing)
        elif words:
            self.contents.setCurrentRow(0)

    @guarded
    def _picked(self, item: QListWidgetItem | None, _: QListWidgetItem | None) -> None:
        if item is not None:
            self.browser.setMarkdown(page_text(item.data(Qt.ItemDataRole.UserRole)))
            self._mark(self.search.text())

    def _mark(self, words: str) -> None:
        """Go to the searched words, or to the first of them where they do not stand together."""
        for sought in (words.strip(), *words.split()[:1]):
            if sought and self.browser.find(sought):
                return

    @guarded
    def _followed(self, url: QUrl) -> None:
        key = url.path() or url.toString().removeprefix("page:")
        if key in BY_KEY:
            self.open_page(key)
