"""The table station by station: every quantity of the nomenclature list, in parts that fit the page."""

from reportlab.lib.units import mm
from reportlab.platypus import CondPageBreak, Flowable, Spacer

from shaftcore.nomenclature import BY_KEY, COLUMNS, Column
from shaftcore.number_text import NOTHING, shown, unit_symbol, with_unit
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.lettering import para, safe, typeset
from shaftcore.sheet.pages import ACROSS, Heading, papers, turn_to
from shaftcore.sheet.tables import Field, ruled_table

NAMED = ("station", "place")
MOST = 16
"""Columns of numbers that fit beside number and place."""

ROW = 4.1 * mm
ROWS_AROUND = 9
"""Rows' worth of height that a part's heading, head and legend take."""
MOST_KEPT = 0.7
"""Share of a page below which a part is not begun anew on the next."""

PARTS: tuple[tuple[str, tuple[str, ...]], ...] = (
    (
        "Margins, section and internal loads",
        (
            *("x", "margin", "yield_margin", "n", "n_yield", "utilisation", "d", "bore", "large_d", "radius"),
            *("moment", "moment_amplitude", "torque", "torque_amplitude", "normal"),
        ),
    ),
    (
        "Nominal stresses and notch factors",
        (
            *("bending_amplitude", "bending_mean", "axial_amplitude", "axial_mean"),
            *("torsion_amplitude", "torsion_mean", "kt_bending", "kt_axial", "kt_torsion"),
            *("q_bending", "q_torsion", "kf_bending", "kf_axial", "kf_torsion"),
        ),
    ),
    (
        "Strength, equivalent stresses, deflection, reactions and notices",
        (
            *("ka", "kb", "kd", "ke", "endurance", "amplitude", "mean", "greatest", "deflection", "slope"),
            *("reaction", "reaction_amplitude", "flags"),
        ),
    ),
)


def parts() -> list[tuple[str, tuple[Column, ...]]]:
    """Head and columns of each part; quantities not yet given a place follow in parts of their own."""
    placed = {key for _, keys in PARTS for key in keys} | set(NAMED)
    more = [column for column in COLUMNS if column.key not in placed]
    rest = [("Further quantities", tuple(more[i : i + MOST])) for i in range(0, len(more), MOST)]
    return [*((head, tuple(BY_KEY[key] for key in keys if key in BY_KEY)) for head, keys in PARTS), *rest]


def station_tables(edition: Edition) -> list[Flowable]:
    """The flowables of the chapter; parts that fit one page stand together on it."""
    width = papers(edition.system)[ACROSS].width
    story: list[Flowable] = []
    story += [*turn_to(ACROSS), Heading("5 Station by station")]
    high = min((len(edition.results.stations) + ROWS_AROUND) * ROW, MOST_KEPT * papers(edition.system)[ACROSS].height)
    for head, columns in parts():
        story += [CondPageBreak(high), Heading(head, 1)]
        fields = [_field(BY_KEY[key], edition, number=key == "station") for key in NAMED]
        fields += [_field(column, edition, number=column.key != "flags") for column in columns]
        story.append(ruled_table(fields, width, size=6.4, marked=(edition.results.governing,)))
        story += [Spacer(1, 2 * mm), para(_legend(columns), "faint")]
    story.append(para(_common(edition), "faint"))
    return story


def _field(column: Column, edition: Edition, number: bool) -> Field:
    unit = unit_symbol(column.dimension, edition.system)
    head = typeset(column.symbol) if column.symbol else safe(column.label)
    cells = edition.cells(column.key)
    return Field(f"{head}<br/>{unit}" if unit else head, [cell or NOTHING for cell in cells], number)


def _legend(columns: tuple[Column, ...]) -> str:
    words = "; ".join(
        f"{c.symbol}: {c.label[0].lower() + c.label[1:]}" + (f" ({c.words})" if c.words else "")
        for c in columns
        if c.symbol
    )
    return typeset(f"{words}. The tinted row governs; – where a quantity has no meaning.")


def _common(edition: Edition) -> str:
    strength = edition.results.judged.strength
    plain = with_unit(strength.plain, "stress", edition.system)
    kc, kf = (shown(value, "ratio", edition.system) for value in (strength.kc, strength.kf))
    return typeset(
        f"The same at every station: plain endurance limit S_e' = {plain}, load factor k_c = {kc}, own factor "
        f"k_f = {kf}. S_e = k_a k_b k_c k_d k_e k_f S_e'."
    )
