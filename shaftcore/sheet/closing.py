"""The last chapters: notices, what was not checked, cautions, call-outs, sources, signatures."""

from collections.abc import Iterator, Sequence

from reportlab.lib.colors import HexColor
from reportlab.lib.units import mm
from reportlab.platypus import Flowable, KeepTogether, Spacer, Table

from shaftcore.mean_stress_rules import RULES
from shaftcore.notches.kinds import KINDS
from shaftcore.number_text import with_unit
from shaftcore.records import Notice
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.lettering import para, safe
from shaftcore.sheet.pages import UPRIGHT, Heading, chapter, papers, section
from shaftcore.sheet.palette import FAINT, RULE
from shaftcore.sheet.tables import PAD, Field, plain_table, ruled_table
from shaftcore.sheet.worked import cited
from shaftcore.sources import SOURCES
from shaftcore.surface import FINISHES

NOT_CHECKED = (
    "Load capacity of keys, splines, threads, press fits and other hub connections.",
    "Wear, fretting at fit edges, corrosion and any other attack on the surface.",
    "Critical speeds in bending and torsion, vibration and balance.",
    "Life and load capacity of the bearings, their seats and their housings.",
    "Stress raisers that are not entered: keyseats, holes, marks, threads, tool marks and handling damage.",
    "Finite life, cycle counts, starts and overloads beyond the loads entered; cracks that are already there.",
    "Buckling, creep, brittle fracture at low temperature, welds, and limits on deflection and slope.",
    "Codes of the trade: railway axles, lifting gear, marine and other regulated shafts have mandatory rules.",
)
CAUTIONS = (
    "This sheet is a design aid. It defers to the codes in force and to the judgement of a licensed engineer, "
    "who must check loads, material, geometry and results before a shaft is made or run.",
    "All stress concentration factors are elastic; they suit smooth steels in high-cycle fatigue.",
    "Corrosion, fretting and very long lives take the endurance limit away.",
    "A radius on the drawing is not the radius on the part, and each is judged as entered: for fatigue the smallest "
    "that can be made is the one to enter, for seating the largest.",
    "The margins do not make up for the published fits; a notice names a station that passes by the fit alone.",
    "Transverse shear and the shaft's own weight are not in the margins.",
    "Supports have no play, hinder no tilting and pull as well as push; on more than two of them the moments hang on "
    "stiffness and alignment as entered.",
    "Published fits hold in their ranges; values used outside are flagged in chapter 7. Near sharp roots finite "
    "elements can give higher factors than the published charts.",
    "Strengths are those entered; test pieces and large forgings can differ.",
)
STATED = ("given", "judgement")
"""Where a number is the user's own; no literature."""

NOTE = "blend without step, no grinding burn"


def notices(edition: Edition) -> list[Flowable]:
    """Chapter of notices and range flags, each with its station."""
    found = edition.results.notices
    story: list[Flowable] = [*chapter("7 Notices and range flags")]
    if not found:
        return [*story, para("None: every fit is used inside its range and nothing else calls for attention.")]
    fields = [
        Field("Station", [_where(edition, notice) for notice in found], False),
        Field("Sort", [notice.key + (", provisional" if notice.provisional else "") for notice in found], False),
        Field("Notice", [notice.words.written(edition.system) for notice in found], False, 60 * mm, symbols=True),
    ]
    return [*story, ruled_table(fields, papers(edition.system)[UPRIGHT].width)]


def _where(edition: Edition, notice: Notice) -> str:
    if notice.station is None:
        return "whole shaft"
    station = edition.results.stations[notice.station]
    return f"No. {station.number}, {station.label}"


def limits_and_release(edition: Edition) -> list[Flowable]:
    """What was not checked, cautions, call-outs for the drawing, sources, signatures."""
    return [
        *chapter("8 Limits, call-outs and release"),
        *section("Not checked", *_items(NOT_CHECKED)),
        *section("Cautions", *_items(CAUTIONS)),
        *_call_outs(edition),
        KeepTogether([*_sources(edition), Heading("Release", 1), Spacer(1, 1 * mm), _signatures(edition)]),
    ]


def _sources(edition: Edition) -> list[Flowable]:
    full = [SOURCES[key].full for key in sources_used(edition)]
    return [Heading("Sources", 1), *_items(full), Spacer(1, 3 * mm)]


def _items(lines: Sequence[str]) -> list[Flowable]:
    return [para(f"<bullet>–</bullet>{safe(line)}", "item") for line in lines]


def _call_outs(edition: Edition) -> list[Flowable]:
    results, system = edition.results, edition.system
    seated = [s for s in results.stations if s.site is not None and "r" in s.site.sizes]
    if not seated:
        return []
    held = {s.id for s in results.shaft.segments if s.shoulder and s.shoulder.bearing_corner}
    caps = {limit.place: limit.allowed for limit in results.seat_limits if limit.place in held}
    finish = dict(FINISHES)
    sites = [s.site for s in seated if s.site]
    fields = [
        Field("No.", [str(s.number) for s in seated]),
        Field("Place", [s.label for s in seated], False),
        Field("Smallest radius", [with_unit(site.sizes["r"], "length", system) for site in sites]),
        Field(
            "Largest radius",
            [with_unit(caps.get(s.place), "length", system) for s in seated],
        ),
        Field("Finish of the root", [finish[site.finish] for site in sites], False),
        Field("Note", [NOTE] * len(sites), False),
    ]
    table = ruled_table(fields, papers(system)[UPRIGHT].width)
    words = (
        "The margins hold for the smallest radius anywhere on the arc; up to the largest the seated "
        "bearing reaches its face."
    )
    return section("Call-outs for the drawing", table, Spacer(1, 1.5 * mm), para(words, "faint"))


def sources_used(edition: Edition) -> list[str]:
    """Keys of the sources behind the numbers of this sheet."""
    return [key for key in dict.fromkeys(_source_keys(edition)) if key in SOURCES and key not in STATED]


def _source_keys(edition: Edition) -> Iterator[str]:
    shaft = edition.results.shaft
    yield from ("statics", "cowper")
    for kind in KINDS.values():
        if any(s.kind == kind.key for s in edition.results.stations):
            yield from (fit.source for fit in kind.fits[shaft.judgement.kt_source].values())
    if any(segment.shoulder and segment.shoulder.bearing_corner for segment in shaft.segments):
        yield "din5418"
    yield from (shaft.judgement.sensitivity, RULES[shaft.judgement.mean_stress_rule].source, "shigley")
    yield from cited(edition)


def _signatures(edition: Edition) -> Table:
    title = edition.results.shaft.title
    width = papers(edition.system)[UPRIGHT].width / 3
    heads = [para(words, "section") for words in ("Prepared", "Checked", "Released")]
    names = [para(f"Name<br/>{safe(name)}", "cell_faint") for name in (title.author, title.checker, "")]
    rows = [heads, names, *([para(words, "cell_faint")] * 3 for words in ("Date", "Signature"))]
    boxes = [("BOX", (i, 0), (i, -1), 0.5, HexColor(FAINT)) for i in range(3)]
    return plain_table(
        rows,
        [width] * 3,
        *boxes,
        ("LINEABOVE", (0, 1), (-1, -1), 0.25, HexColor(RULE)),
        ("LEFTPADDING", (0, 0), (-1, -1), PAD),
        ("TOPPADDING", (0, 0), (-1, -1), 3),
        ("BOTTOMPADDING", (0, 0), (-1, -1), 5),
        rowHeights=[7.5 * mm, None, 9 * mm, 14 * mm],
    )
