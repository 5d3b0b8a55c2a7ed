"""Everything the user stated: material, duty, judgement, segments, raisers, supports, loads."""

from collections.abc import Sequence
from typing import Any

import numpy as np
from reportlab.lib.units import mm
from reportlab.platypus import Flowable, Spacer

from shaftcore.geometry import faces_of
from shaftcore.notches.kinds import KINDS
from shaftcore.number_text import NOTHING, shown, unit_symbol
from shaftcore.results import Results
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.lettering import para, safe, typeset
from shaftcore.sheet.pages import UPRIGHT, Heading, papers, section
from shaftcore.sheet.tables import Field, entry_rows, plain_table, record_fields, ruled_table
from shaftcore.units import System


def load_marks(results: Results) -> list[str]:
    """The mark of every load in drawing and tables."""
    return [f"L{i}" for i in range(1, len(results.shaft.loads) + 1)]


def support_marks(results: Results) -> list[str]:
    """The mark of every support in drawing and tables."""
    return [f"B{i}" for i in range(1, len(results.shaft.supports) + 1)]


def givens(edition: Edition) -> list[Flowable]:
    """The flowables of the chapter."""
    width = papers(edition.system)[UPRIGHT].width
    shaft = edition.results.shaft
    story: list[Flowable] = [Heading("2 Givens")]
    left = [*_entries(edition, shaft.material, width / 2), Spacer(1, 3 * mm), *_entries(edition, shaft.duty, width / 2)]
    right = _entries(edition, shaft.judgement, width / 2)
    pair = plain_table(
        [[left, right]],
        [width / 2 - 3 * mm, width / 2 + 3 * mm],
        ("LEFTPADDING", (0, 0), (0, 0), 0),
        ("LEFTPADDING", (1, 0), (1, 0), 6 * mm),
        ("RIGHTPADDING", (0, 0), (-1, -1), 0),
        ("TOPPADDING", (0, 0), (-1, -1), 0),
    )
    story.append(pair)
    for head, fields in (
        ("Segments, left to right", _segments(edition)),
        ("Shoulders", _shoulders(edition)),
        *_raisers(edition),
        ("Supports and their reactions", _supports(edition)),
        *_loads(edition),
    ):
        if fields and fields[0].cells:
            story += section(head, ruled_table(fields, width))
    story.append(Spacer(1, 2 * mm))
    story.append(para(AXES, "faint"))
    return story


AXES = (
    "x runs along the shaft from its left end, y points up, z towards the viewer. Angles of forces: 0° points up, "
    "90° towards the viewer, 180° down. Reactions are the forces of the supports on the shaft; a rigid support gives "
    "way to none. Torques are positive where they go in, axial forces where they point to the right."
)


def _entries(edition: Edition, record: Any, width: float) -> list[Flowable]:
    rows = entry_rows(record, edition.system)
    cells = [[para(label, "cell_faint"), para(safe(value), "cell")] for label, value in rows]
    table = plain_table(
        cells,
        [width * 0.52 - 3 * mm, width * 0.48],
        ("LEFTPADDING", (0, 0), (0, -1), 0),
        ("TOPPADDING", (0, 0), (-1, -1), 1.2),
        ("BOTTOMPADDING", (0, 0), (-1, -1), 1.4),
    )
    return [Heading(record.label, 1), table]


def _lengths(values: Sequence[float], system: System) -> list[str]:
    return [shown(float(value), "length", system) for value in values]


def _segments(edition: Edition) -> list[Field]:
    segments, system = edition.results.shaft.segments, edition.system
    faces = faces_of(edition.results.shaft)
    unit = unit_symbol("length", system)
    begin = Field(f"from x<br/>{unit}", _lengths(faces[:-1], system))
    end = Field(f"to x<br/>{unit}", _lengths(faces[1:], system))
    fields = record_fields(segments, system)
    return [fields[0], begin, end, *fields[1:]]


def _shoulders(edition: Edition) -> list[Field]:
    results, system = edition.results, edition.system
    shaft, unit = results.shaft, unit_symbol("length", edition.system)
    records = {segment.id: segment.shoulder for segment in shaft.segments if segment.shoulder}
    sites = [s for s in results.stations if s.site is not None and s.place in records]
    if not sites:
        return []
    seated = {place for place, shoulder in records.items() if shoulder.bearing_corner}
    limits = {limit.place: limit for limit in results.seat_limits if limit.place in seated}
    fields = [
        Field("No.", [str(s.number) for s in sites]),
        Field("Place", [s.label for s in sites], False),
        Field(f"x<br/>{unit}", _lengths([s.x for s in sites], system)),
        Field(f"d<br/>{unit}", _lengths([s.site.sizes["d"] for s in sites if s.site], system)),
        Field(f"D<br/>{unit}", _lengths([s.site.sizes["D"] for s in sites if s.site], system)),
        *record_fields([records[s.place] for s in sites], system),
    ]
    if limits:
        found = [limits.get(s.place) for s in sites]
        allowed = [shown(limit.allowed if limit else None, "length", system) for limit in found]
        fields.append(Field(f"Largest fillet<br/>{unit}", allowed))
        reasons = [limit.reason.written(system) if limit else NOTHING for limit in found]
        fields.append(Field("limited by", reasons, False, symbols=True))
    return fields


def _raisers(edition: Edition) -> list[tuple[str, list[Field]]]:
    raisers = edition.results.shaft.raisers
    found = []
    for kind in KINDS.values():
        records = [raiser for raiser in raisers if raiser.kind == kind.key]
        if records:
            found.append((f"Raisers: {kind.label}", record_fields(records, edition.system)))
    return found


def _supports(edition: Edition) -> list[Field]:
    results, system = edition.results, edition.system
    supports = results.shaft.supports
    unit = unit_symbol("force", system)
    reactions = results.along.reactions
    fields = [Field("Mark", support_marks(results), False), *record_fields(supports, system)]
    for part, words in enumerate(("mean", "pulsation")):
        if part == 0 or np.any(reactions[part]):
            planes = (*reactions[part], np.hypot(*reactions[part]))
            for name, values in zip(map(typeset, ("R_y", "R_z", "R")), planes, strict=True):
                fields.append(Field(f"{name} {words}<br/>{unit}", [shown(float(v), "force", system) for v in values]))
    if np.any(results.along.axial_reaction):
        axial = float(results.along.axial_reaction[0])
        held = [s.locating for s in supports]
        fields.append(
            Field(f"{typeset('R_x')} mean<br/>{unit}", [shown(axial if h else None, "force", system) for h in held])
        )
    return fields


def _loads(edition: Edition) -> list[tuple[str, list[Field]]]:
    loads = list(zip(load_marks(edition.results), edition.results.shaft.loads, strict=True))
    found = []
    for cls in dict.fromkeys(type(load) for _, load in loads):
        chosen = [(mark, load) for mark, load in loads if type(load) is cls]
        fields = record_fields([load for _, load in chosen], edition.system)
        found.append((f"Loads: {cls.label.lower()}", [Field("Mark", [mark for mark, _ in chosen], False), *fields]))
    return found
