"""Charts as vector pages: figures of a size in millimetres, written as PDF, laid into the finished sheet."""

import io
import threading
from collections.abc import Iterable, Iterator, Mapping, Sequence
from contextlib import contextmanager
from typing import Any

import matplotlib
import pypdf
from matplotlib.backends.backend_pdf import FigureCanvasPdf, PdfPages
from matplotlib.figure import Figure
from matplotlib.font_manager import FontProperties

from shaftcore.units import INCH

_WRITING = threading.Lock()


def letters(size: float, bold: bool = False) -> FontProperties:
    """The sheet's type family for texts in charts."""
    return FontProperties(family="DejaVu Sans", size=size, weight="bold" if bold else "normal")


def figure(width: float, height: float) -> Figure:
    """An empty figure of a size in mm."""
    made = Figure(figsize=(width / INCH, height / INCH), facecolor="none")
    FigureCanvasPdf(made)
    return made


def vector_pages(drawn: Iterable[Figure]) -> bytes:
    """The figures as pages of one PDF, fonts shared, the same bytes every time, their text selectable."""
    file = io.BytesIO()
    with _whole_fonts(), PdfPages(file, metadata={"CreationDate": None, "Creator": None, "Producer": None}) as pages:
        for one in drawn:
            pages.savefig(one)
    return file.getvalue()


@contextmanager
def _whole_fonts() -> Iterator[None]:
    """TrueType fonts instead of outlines, so that Greek letters stay selectable.

    The PDF writer reads this one setting from the library's own table; it stands there only
    while a page is written and touches nothing but PDF output.
    """
    with _WRITING:
        before = matplotlib.rcParams["pdf.fonttype"]
        matplotlib.rcParams["pdf.fonttype"] = 42
        try:
            yield
        finally:
            matplotlib.rcParams["pdf.fonttype"] = before


def lay_in(text: bytes, charts: bytes, places: Sequence[tuple[int, float, float]], about: Mapping[str, str]) -> bytes:
    """The sheet with each page of `charts` merged as vectors at its place (page, x, y in points)."""
    writer = pypdf.PdfWriter(clone_from=io.BytesIO(text))
    for chart, (page, x, y) in zip(pypdf.PdfReader(io.BytesIO(charts)).pages, places, strict=True):
        writer.pages[page].merge_transformed_page(chart, pypdf.Transformation().translate(x, y), over=True)
        writer.pages[page].compress_content_streams()
    writer.add_metadata(dict(about))
    writer.page_mode = "/UseOutlines"
    file = io.BytesIO()
    writer.write(file)
    return file.getvalue()


def bare(axes: Any) -> Any:
    """Axes with nothing drawn by themselves."""
    axes.set_axis_off()
    axes.patch.set_visible(False)
    return axes
