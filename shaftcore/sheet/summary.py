"""First page: title block, what governs and by how much, and whether the result is provisional."""

from typing import Any

import numpy as np
from reportlab.lib.colors import HexColor
from reportlab.lib.units import mm
from reportlab.platypus import Flowable, HRFlowable, Spacer, Table

from shaftcore.nomenclature import BY_KEY
from shaftcore.number_text import NOTHING, UNLOADED
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.lettering import para, safe, typeset
from shaftcore.sheet.pages import UPRIGHT, Heading, papers
from shaftcore.sheet.palette import INK, RULE
from shaftcore.sheet.tables import PAD, Field, plain_table, ruled_table

COMPARED = ("x", "n", "margin", "n_yield", "yield_margin", "utilisation")
SHOWN = 6
"""Stations listed on the first page."""


def summary(edition: Edition) -> list[Flowable]:
    """The flowables of the first page."""
    title = edition.results.shaft.title
    story: list[Flowable] = [
        para("Margin sheet", "title"),
        para(safe(" · ".join(filter(None, (title.part, title.project))) or "Shaft without a title"), "lead"),
        HRFlowable(width="100%", thickness=0.8, color=HexColor(INK), spaceBefore=2, spaceAfter=0),
        _title_block(edition),
        Heading("1 Outcome"),
    ]
    story += [para(f"<b>Provisional:</b> {typeset(words)}", "caution") for words in _provisional(edition)]
    story += [para(words, "lead") for words in _statement(edition)]
    story += [Spacer(1, 2 * mm), _compared(edition), Spacer(1, 2 * mm)]
    story += [para(words) for words in _notes(edition)]
    if title.remarks:
        story.append(para(f"Remarks: {safe(title.remarks)}", "cell"))
    return story


def _title_block(edition: Edition) -> Table:
    title = edition.results.shaft.title
    rows = (
        (("Project", title.project), ("Part", title.part), ("Revision", title.revision)),
        (("Author", title.author), ("Checker", title.checker), ("Date", edition.date.isoformat())),
    )
    cells: list[list[Any]] = [
        [[para(label, "head"), para(safe(text) or NOTHING, "cell")] for label, text in row] for row in rows
    ]
    made = f"Filletwright {edition.version}"
    cells.append([_entry("Program", made), _entry("Hash of the shaft file", edition.file_hash), ""])
    width = papers(edition.system)[UPRIGHT].width
    return plain_table(
        cells,
        [width * share for share in (0.38, 0.38, 0.24)],
        ("SPAN", (1, 2), (2, 2)),
        ("LINEBELOW", (0, 0), (-1, -1), 0.25, HexColor(RULE)),
        ("LINEBELOW", (0, -1), (-1, -1), 0.8, HexColor(INK)),
        ("LEFTPADDING", (0, 0), (0, -1), 0),
        ("LEFTPADDING", (1, 0), (-1, -1), PAD),
        ("RIGHTPADDING", (0, 0), (-1, -1), PAD),
        ("TOPPADDING", (0, 0), (-1, -1), 4),
        ("BOTTOMPADDING", (0, 0), (-1, -1), 4),
    )


def _entry(label: str, text: str) -> list[Flowable]:
    return [para(label, "head"), para(safe(text) or NOTHING, "cell")]


def _provisional(edition: Edition) -> list[str]:
    return [notice.words.written(edition.system) for notice in edition.results.notices if notice.provisional]


def _statement(edition: Edition) -> list[str]:
    results = edition.results
    governing = results.governing
    sentences = [f"<b>{_governs(edition, governing)}</b> {_margins(edition, governing)}"]
    if results.runner_up is not None:
        second = safe(edition.place(results.stations[results.runner_up]))
        sentences.append(f"Runner-up: {second}. {_margins(edition, results.runner_up)}")
    return sentences


def _governs(edition: Edition, i: int) -> str:
    place = safe(edition.place(edition.results.stations[i]))
    return f"{place[0].upper()}{place[1:]}, governs."


def _margins(edition: Edition, i: int) -> str:
    asked = edition.results.shaft.judgement
    return (
        f"Fatigue: {_against(edition, i, 'margin', 'n', asked.asked_factor)}. "
        f"Yield: {_against(edition, i, 'yield_margin', 'n_yield', asked.asked_yield_factor)}."
    )


def _against(edition: Edition, i: int, margin: str, factor: str, asked: float) -> str:
    if edition.cell(margin, i) == UNLOADED:
        return UNLOADED
    value = getattr(edition.results.judged, margin)[i]
    words = "below the asked factor" if value < 0 else "above the asked factor" if value > 0 else "just as asked"
    found = f"{typeset(BY_KEY[factor].symbol)}\u00a0=\u00a0{edition.cell(factor, i)}"
    return f"margin {edition.phrase(margin, i)}, {words} ({found}, asked\u00a0{asked:g})"


def _compared(edition: Edition) -> Table:
    """The most used stations, governing first."""
    results = edition.results
    rows = [int(i) for i in np.argsort(-results.judged.utilisation, kind="stable")[:SHOWN]]
    words = ["governing", "runner-up", *[""] * SHOWN][: len(rows)]
    fields = [
        Field("", words, False),
        Field("No.", [str(results.stations[i].number) for i in rows]),
        Field("Place", [results.stations[i].label for i in rows], False),
    ]
    for key in COMPARED:
        column = BY_KEY[key]
        symbol = "" if column.symbol.startswith("margin") else f" {typeset(column.symbol)}"
        fields.append(Field(safe(column.label) + symbol, [edition.phrase(key, i) for i in rows]))
    return ruled_table(fields, papers(edition.system)[UPRIGHT].width)


def _notes(edition: Edition) -> list[str]:
    results = edition.results
    judged, asked = results.judged, results.shaft.judgement
    missing = [
        str(s.number)
        for s, n, y in zip(results.stations, judged.margin, judged.yield_margin, strict=True)
        if n < 0 or y < 0
    ]
    total = len(results.stations)
    found = [
        f"Of {total} stations {len(missing)} miss an asked factor: No. {', '.join(missing)}."
        if missing
        else f"All {total} stations reach both asked factors.",
        typeset(
            f"Margin = n/n_asked − 1; asked are n = {asked.asked_factor:g} in fatigue and n_y = "
            f"{asked.asked_yield_factor:g} in yield. Zero just reaches what is asked, a negative margin falls short."
        ),
    ]
    if results.notices:
        found.append(f"Notices and range flags: {len(results.notices)}, all in chapter 7.")
    found.append(
        "A design aid: the codes in force and a licensed engineer's judgement decide. What was not checked, "
        "and the cautions, stand in chapter 8."
    )
    return found
