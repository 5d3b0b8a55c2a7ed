"""Paper, page furniture, headings that become bookmarks, and room kept for charts."""

from dataclasses import dataclass
from typing import Any

from reportlab.lib.colors import HexColor
from reportlab.lib.pagesizes import A4, landscape, letter
from reportlab.lib.units import mm
from reportlab.pdfbase.pdfmetrics import stringWidth
from reportlab.platypus import (
    BaseDocTemplate,
    CondPageBreak,
    Flowable,
    Frame,
    NextPageTemplate,
    PageBreak,
    PageTemplate,
    Paragraph,
)

from shaftcore.sheet.lettering import REGULAR, plain, styles
from shaftcore.sheet.palette import FAINT, RULE
from shaftcore.units import System

SIDE, TOP, FOOT = 18 * mm, 20 * mm, 18 * mm
LEAST_BEGUN, LEAST_CHAPTER = 27 * mm, 50 * mm
UPRIGHT, ACROSS = "upright", "across"


@dataclass(frozen=True)
class Paper:
    """The page in points and the room on it for text."""

    size: tuple[float, float]

    @property
    def width(self) -> float:
        return self.size[0] - 2 * SIDE

    @property
    def height(self) -> float:
        return self.size[1] - TOP - FOOT


def papers(system: System) -> dict[str, Paper]:
    """Upright and across: A4, and Letter for readers of inches."""
    size = A4 if system == "SI" else letter
    return {UPRIGHT: Paper(size), ACROSS: Paper(landscape(size))}


@dataclass(frozen=True)
class Furniture:
    """What stands on every page: words above, words below, and the count of pages."""

    above: str
    below: str
    pages: int


class Heading(Paragraph):  # type: ignore[misc]  # the library has no types
    """A heading that also stands in the bookmarks."""

    def __init__(self, text: str, level: int = 0) -> None:
        super().__init__(text, styles()["chapter" if level == 0 else "section"])
        self.words, self.level = text, level

    def draw(self) -> None:
        self.canv.bookmarkHorizontal(self.words, 0, self.height)
        self.canv.addOutlineEntry(self.words, self.words, level=self.level, closed=self.level == 0)
        super().draw()


class ChartRoom(Flowable):  # type: ignore[misc]  # the library has no types
    """Room (points) for a chart that is laid into the finished page; knows where it came to stand."""

    def __init__(self, name: str, width: float, height: float) -> None:
        super().__init__()
        self.name, self.width, self.height = name, width, height

    def wrap(self, *_: float) -> tuple[float, float]:
        return self.width, self.height

    def draw(self) -> None:
        x, y = self.canv.absolutePosition(0, 0)
        self.canv.chart_places[self.name] = (self.canv.getPageNumber() - 1, x, y)


class SheetTemplate(BaseDocTemplate):  # type: ignore[misc]  # the library has no types
    """Both papers with their furniture; collects the places of charts."""

    def __init__(self, file: Any, system: System, furniture: Furniture, stopped: Any) -> None:
        both = papers(system)
        super().__init__(
            file, pagesize=both[UPRIGHT].size, invariant=1, initialFontName=REGULAR, lang="en", pageCompression=1
        )
        self.furniture, self.stopped = furniture, stopped
        self.chart_places: dict[str, tuple[int, float, float]] = {}
        self.addPageTemplates([self._template(name, paper) for name, paper in both.items()])

    def _template(self, name: str, paper: Paper) -> PageTemplate:
        frame = Frame(SIDE, FOOT, paper.width, paper.height, 0, 0, 0, 0, id=name)
        return PageTemplate(name, [frame], pagesize=paper.size, onPage=self._furnish)

    def _furnish(self, canvas: Any, _: Any) -> None:
        self.stopped()
        canvas.chart_places = self.chart_places
        width, height = canvas._pagesize
        canvas.setFont(REGULAR, 6.8)
        canvas.setFillColor(HexColor(FAINT))
        page = f"page {canvas.getPageNumber()} of {self.furniture.pages}"
        room = width - 2 * SIDE - 30 * mm
        canvas.drawString(SIDE, height - 12 * mm, _cut(self.furniture.above, room + 30 * mm))
        canvas.drawString(SIDE, 10 * mm, _cut(self.furniture.below, room))
        canvas.drawRightString(width - SIDE, 10 * mm, page)
        canvas.setStrokeColor(HexColor(RULE))
        canvas.setLineWidth(0.4)
        canvas.line(SIDE, height - 14 * mm, width - SIDE, height - 14 * mm)
        canvas.line(SIDE, 14 * mm, width - SIDE, 14 * mm)


def _cut(text: str, room: float) -> str:
    """A single line that ends in … where the room ends."""
    text = plain(text)
    if stringWidth(text, REGULAR, 6.8) <= room:
        return text
    while text and stringWidth(text + "…", REGULAR, 6.8) > room:
        text = text[:-1]
    return text + "…"


def chapter(head: str) -> list[Flowable]:
    """The heading of a chapter, on the next page where too little room is left."""
    return [CondPageBreak(LEAST_CHAPTER), Heading(head)]


def section(head: str, *body: Flowable) -> list[Flowable]:
    """A small heading with what it heads, begun on the next page where only the heading would fit."""
    return [CondPageBreak(LEAST_BEGUN), Heading(head, 1), *body]


def turn_to(paper: str) -> list[Flowable]:
    """Go on on a new page of the given paper."""
    return [NextPageTemplate(paper), PageBreak()]
