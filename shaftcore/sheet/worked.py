"""The governing station worked line by line, as a checker with a pocket calculator follows it."""

from reportlab.lib.colors import HexColor
from reportlab.platypus import Flowable, Table

from shaftcore.sheet.edition import Edition
from shaftcore.sheet.lettering import para, safe, typeset
from shaftcore.sheet.pages import UPRIGHT, Heading, papers, section
from shaftcore.sheet.palette import FAINT, INK, RULE
from shaftcore.sheet.tables import PAD, plain_table
from shaftcore.sources import SOURCES
from shaftcore.workings import Chapter, Line, workings_of

SHARES = (0.24, 0.43, 0.2, 0.13)


def worked(edition: Edition) -> list[Flowable]:
    """The flowables of the chapter."""
    governing = edition.results.governing
    story: list[Flowable] = [
        Heading("6 The governing station worked"),
        para(f"S{safe(edition.place(edition.results.stations[governing]))[1:]}.", "lead"),
        para("Numbers put in are in mm, N, N·mm and MPa; other units of the result stand below it.", "faint"),
    ]
    for chapter in workings_of(edition.results, governing):
        story += section(chapter.title, _lines(edition, chapter))
    return story


def cited(edition: Edition) -> list[str]:
    """Keys of the sources that the worked lines cite, in order."""
    chapters = workings_of(edition.results, edition.results.governing)
    keys = (line.source for chapter in chapters for line in chapter.lines)
    return [key for key in dict.fromkeys(keys) if key in SOURCES]


def _lines(edition: Edition, chapter: Chapter) -> Table:
    width = papers(edition.system)[UPRIGHT].width
    head = [para(words, "head") for words in ("Quantity", "Formula, with numbers put in", "Result", "Source")]
    return plain_table(
        [head, *(_row(edition, line) for line in chapter.lines)],
        [width * share for share in SHARES],
        ("LINEABOVE", (0, 0), (-1, 0), 0.5, HexColor(INK)),
        ("LINEBELOW", (0, 0), (-1, 0), 0.4, HexColor(FAINT)),
        ("LINEBELOW", (0, 1), (-1, -1), 0.25, HexColor(RULE)),
        ("LEFTPADDING", (0, 0), (-1, -1), PAD),
        ("RIGHTPADDING", (0, 0), (-1, -1), PAD),
        ("TOPPADDING", (0, 0), (-1, -1), 2.4),
        ("BOTTOMPADDING", (0, 0), (-1, -1), 3),
        repeatRows=1,
    )


def _row(edition: Edition, line: Line) -> list[list[Flowable]]:
    way = [para(f"{typeset(line.symbol)} = {typeset(line.formula)}", "cell")]
    if line.numbers:
        way.append(para(f"= {typeset(line.numbers)}", "cell"))
    if line.flag:
        way.append(para(typeset(line.flag), "cell_flag"))
    source = SOURCES[line.source].short if line.source in SOURCES else line.source
    return [
        [para(typeset(line.label), "cell")],
        way,
        [para(f"= {words}", style) for words, style in _result(edition, line)],
        [para(safe(source), "cell_faint")],
    ]


def _result(edition: Edition, line: Line) -> list[tuple[str, str]]:
    """The result as calculated and, where the reader's unit is another, in that one."""
    also = line.restated(edition.system)
    return [(typeset(line.result), "cell"), *([(safe(also), "cell_faint")] if also else [])]
