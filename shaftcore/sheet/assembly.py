"""The sheet put together: chapters in the order of the evaluation, charts laid in, pages counted."""

import io
from collections.abc import Callable

from reportlab.lib.units import mm
from reportlab.platypus import CondPageBreak, Flowable, Spacer

from shaftcore.sheet.chart_page import lay_in, vector_pages
from shaftcore.sheet.closing import limits_and_release, notices
from shaftcore.sheet.drawing import shaft_drawing
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.givens import givens
from shaftcore.sheet.lettering import load_type, para
from shaftcore.sheet.pages import ACROSS, UPRIGHT, ChartRoom, Furniture, Heading, SheetTemplate, papers, turn_to
from shaftcore.sheet.station_key import key_height, station_key
from shaftcore.sheet.station_tables import station_tables
from shaftcore.sheet.summary import summary
from shaftcore.sheet.traces import traces
from shaftcore.sheet.worked import worked

Say = Callable[[float, str], None]
Pause = Callable[[], None]

ABOUT_DRAWING = (
    "To scale; the size of a symbol says nothing. Numbers: stations, the framed one governs. B: supports, the locating "
    "one with cheeks at its sides, one that yields on the folds of a spring; L: loads, as in chapter 2. A circle with "
    "a dot is a force towards the viewer, with a cross one away from the viewer; a bow is a torque, its head above "
    "where it goes in, below where it comes out."
)

ABOUT_HEIGHT = 29.0
"""Height (mm) of the heading above the drawing and of the words below it."""

ROOM_FOR_GIVENS = 80 * mm
"""Material, duty and judgement stand side by side and are not parted from their heading."""


def sheet_bytes(edition: Edition, say: Say, pause: Pause) -> bytes:
    """The whole PDF. `pause` is called between steps and may raise to stop the work."""
    load_type()
    say(0.05, "Drawing the shaft")
    paper = papers(edition.system)[ACROSS]
    width = paper.width / mm
    drawing, height = shaft_drawing(edition, width, (paper.height - key_height(edition)) / mm - ABOUT_HEIGHT)
    rooms = {"drawing": (width, height), "traces": (width, paper.height / mm - 10)}
    pause()
    say(0.15, "Drawing the traces")
    figures = {"drawing": drawing, "traces": traces(edition, *rooms["traces"])}
    pause()
    charts = vector_pages(figures.values())
    pause()
    say(0.45, "Setting the pages")
    pages = _set(edition, rooms, 0, pause)[0]
    say(0.7, "Numbering the pages")
    _, text, places = _set(edition, rooms, pages, pause)
    say(0.85, "Laying in the drawings")
    return lay_in(text, charts, [places[name] for name in figures], _about(edition))


def _set(
    edition: Edition, rooms: dict[str, tuple[float, float]], pages: int, pause: Pause
) -> tuple[int, bytes, dict[str, tuple[int, float, float]]]:
    """Number of pages, the pages without charts, and where the charts belong."""
    title = edition.results.shaft.title
    above = " · ".join(filter(None, ("Margin sheet", title.part, title.revision and f"revision {title.revision}")))
    hashed = edition.file_hash and f"shaft file {edition.file_hash[:12]}"
    below = " · ".join(filter(None, (edition.date.isoformat(), hashed, title.project)))
    file = io.BytesIO()
    template = SheetTemplate(file, edition.system, Furniture(above, below, pages), pause)
    template.build(_story(edition, rooms))
    return template.page, file.getvalue(), template.chart_places


def _story(edition: Edition, rooms: dict[str, tuple[float, float]]) -> list[Flowable]:
    room = {name: ChartRoom(name, width * mm, height * mm) for name, (width, height) in rooms.items()}
    return [
        *summary(edition),
        CondPageBreak(ROOM_FOR_GIVENS),
        *givens(edition),
        *turn_to(ACROSS),
        Heading("3 The shaft and its stations"),
        room["drawing"],
        para(ABOUT_DRAWING, "faint"),
        Spacer(1, 2 * mm),
        station_key(edition),
        *turn_to(ACROSS),
        Heading("4 Along the shaft"),
        room["traces"],
        *station_tables(edition),
        *turn_to(UPRIGHT),
        *worked(edition),
        *notices(edition),
        *limits_and_release(edition),
    ]


def _about(edition: Edition) -> dict[str, str]:
    title = edition.results.shaft.title
    made = f"Filletwright {edition.version}"
    return {
        "/Title": " · ".join(filter(None, ("Margin sheet", title.part, title.project))),
        "/Author": title.author,
        "/Subject": "Fatigue and yield margins of a shaft",
        "/Creator": made,
        "/Producer": made,
        "/CreationDate": f"D:{edition.date:%Y%m%d}000000Z",
        "/ModDate": f"D:{edition.date:%Y%m%d}000000Z",
    }
