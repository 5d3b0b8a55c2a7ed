"""Type of the sheet: one family, its paragraph styles, and text made safe for them."""

import html
import threading
from collections.abc import Container
from functools import cache
from pathlib import Path

from reportlab.lib.colors import HexColor
from reportlab.lib.enums import TA_RIGHT
from reportlab.lib.styles import ParagraphStyle
from reportlab.pdfbase import pdfmetrics
from reportlab.pdfbase.ttfonts import TTFont
from reportlab.platypus import Paragraph

from shaftcore.lettering import Level, marked_up
from shaftcore.number_text import GROUP
from shaftcore.sheet.palette import FAINT, INK, RUST

REGULAR, BOLD, OBLIQUE = "Sheet", "Sheet-Bold", "Sheet-Oblique"
FACES = {REGULAR: "DejaVuSans.ttf", BOLD: "DejaVuSans-Bold.ttf", OBLIQUE: "DejaVuSans-Oblique.ttf"}
HELD = "\u00a0" + GROUP
"""Spaces that no line may end at; the paragraphs know only the first for what it is."""
MISSING = "□"
"""Stands for a character the type family does not have."""

TAGS: dict[Level, str] = {
    "on": "{}",
    "below": '<sub rise="18%" size="74%">{}</sub>',
    "above": '<super rise="36%" size="74%">{}</super>',
}
_LOCK = threading.Lock()


def load_type() -> None:
    """Make the family known, from the font files that come with matplotlib."""
    with _LOCK:
        if REGULAR in pdfmetrics.getRegisteredFontNames():
            return
        import matplotlib

        folder = Path(matplotlib.get_data_path()) / "fonts" / "ttf"
        for name, file in reversed(FACES.items()):
            pdfmetrics.registerFont(TTFont(name, str(folder / file)))
        pdfmetrics.registerFontFamily(REGULAR, REGULAR, BOLD, OBLIQUE, BOLD)


def plain(text: str) -> str:
    """The text with nothing in it that the family cannot print."""
    glyphs = pdfmetrics.getFont(REGULAR).face.charToGlyph
    return "".join(_printed(sign, glyphs) for sign in text)


def _printed(sign: str, glyphs: Container[int]) -> str:
    if sign in HELD:
        return HELD[0]
    if sign.isspace():
        return " "
    return sign if ord(sign) in glyphs and sign.isprintable() else MISSING


def safe(text: str) -> str:
    """A text of the user's as paragraph markup."""
    return html.escape(plain(text), quote=False)


def typeset(text: str) -> str:
    """Our own formulas and symbols as paragraph markup: true subscripts, powers raised, minus signs."""
    return marked_up(plain(text), TAGS)


@cache
def styles() -> dict[str, ParagraphStyle]:
    """All paragraph styles by name."""
    body = ParagraphStyle(
        "body",
        fontName=REGULAR,
        bulletFontName=REGULAR,
        fontSize=8.6,
        leading=12.6,
        textColor=HexColor(INK),
        splitLongWords=1,
        spaceAfter=4,
        allowWidows=0,
        allowOrphans=0,
    )
    made = [
        body,
        ParagraphStyle("title", body, fontName=BOLD, fontSize=19, leading=24, spaceAfter=2),
        ParagraphStyle("chapter", body, fontName=BOLD, fontSize=12, leading=16, spaceBefore=14, spaceAfter=6),
        ParagraphStyle("section", body, fontName=BOLD, fontSize=8.8, leading=12, spaceBefore=9, spaceAfter=3),
        ParagraphStyle("lead", body, fontSize=10, leading=15, spaceAfter=6),
        ParagraphStyle("caution", body, textColor=HexColor(RUST), spaceAfter=6, spaceBefore=4),
        ParagraphStyle("faint", body, fontSize=7.4, leading=10.6, textColor=HexColor(FAINT)),
        ParagraphStyle("cell", body, fontSize=7.4, leading=10.2, spaceAfter=0),
        ParagraphStyle("cell_faint", body, fontSize=7.0, leading=9.4, spaceAfter=0, textColor=HexColor(FAINT)),
        ParagraphStyle("cell_flag", body, fontSize=7.0, leading=9.4, spaceAfter=0, textColor=HexColor(RUST)),
        ParagraphStyle("head", body, fontSize=6.6, leading=8.4, spaceAfter=0, textColor=HexColor(FAINT)),
        ParagraphStyle(
            "head_right", body, fontSize=6.6, leading=8.4, spaceAfter=0, textColor=HexColor(FAINT), alignment=TA_RIGHT
        ),
        ParagraphStyle(
            "item", body, fontSize=8, leading=11.4, leftIndent=9, bulletIndent=0, bulletFontSize=8, spaceAfter=1.8
        ),
    ]
    return {style.name: style for style in made}


def para(markup: str, style: str = "body") -> Paragraph:
    """A paragraph of markup in one of the sheet's styles."""
    return Paragraph(markup, styles()[style])


@cache
def sized(style: str, size: float) -> ParagraphStyle:
    """A style at another size of type."""
    return ParagraphStyle(f"{style} {size:.1f}", styles()[style], fontSize=size, leading=1.34 * size)
