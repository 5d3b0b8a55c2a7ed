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
        across.setSizes([230, 690])
        across.setStretchFactor(1, 1)
        self.setCentralWidget(across)
        self.resize(920, 640)
        self.search.textChanged.connect(self._searched)
        self.contents.currentItemChanged.connect(self._picked)
        self.browser.anchorClicked.connect(self._followed)
        self._list(list(PAGES))

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
        self._list(pages_with(words))
        if words and self.contents.count():
            self.contents.setCurrentRow(0)
            self.browser.find(words.split()[0])

    @guarded
    def _picked(self, item: QListWidgetItem | None, _: QListWidgetItem | None) -> None:
        if item is not None:
            self.browser.setMarkdown(page_text(item.data(Qt.ItemDataRole.UserRole)))

    @guarded
    def _followed(self, url: QUrl) -> None:
        key = url.path() or url.toString().removeprefix("page:")
        if key in BY_KEY:
            self.open_page(key)
