"""Symbols and formulas taken apart as print sets them: what stands on the line, below it, above it.

The core writes symbols as plain text: ``σ_b,a``, ``Kt,b``, ``σ_a'``, ``S_ut²``, ``d^4``. Window and
sheet set the runs found here, each with its own means.
"""

import html
import re
from collections.abc import Mapping
from functools import lru_cache
from typing import Literal

Level = Literal["on", "below", "above"]

_SIGN = r"[^\W_²³¹⁰-₉]"
"""A letter or digit on the line; Python counts small raised and lowered ones as letters too."""
_LETTER = r"[^\W\d_²³¹⁰-₉]"
_PIECE = re.compile(
    rf"(?<!{_LETTER})(?P<kay>K)(?P<kind>[tf]s?)(?P<sort>(?:[,_][a-z0-9]+)*)(?!{_LETTER})"  # Kt,b and Kfs
    rf"|(?P<base>{_LETTER}+)_(?P<under>{_SIGN}+(?:,{_SIGN}+)*)"  # σ_b,a
    r"|(?<!\w)(?P<letter>[A-Za-z])(?P<number>\d)(?!\d)"  # C1
    rf"|\^(?P<power>[−-]?{_SIGN}+(?:\.\d+)?)|\^\((?P<inner>[^()]*)\)"  # d^4 and x^(1/3)
)


@lru_cache(maxsize=2048)
def pieces(text: str) -> tuple[tuple[str, Level], ...]:
    """The text in runs, each on the line, below it or above it; minus, root and prime as in print."""
    text = text.replace(" - ", " − ").replace("sqrt(", "√(").replace("'", "′")
    found: list[tuple[str, Level]] = []
    end = 0
    for match in _PIECE.finditer(text):
        found += [(text[end : match.start()], "on"), *_set(match)]
        end = match.end()
    found.append((text[end:], "on"))
    return tuple((run, level) for run, level in found if run)


def _set(match: re.Match[str]) -> list[tuple[str, Level]]:
    power = match["power"] or match["inner"]
    if power:
        return [(power.replace("-", "−"), "above")]
    if match["kay"]:
        return [("K", "on"), (match["kind"] + match["sort"].replace("_", ","), "below")]
    if match["letter"]:
        return [(match["letter"], "on"), (match["number"], "below")]
    return [(match["base"], "on"), (match["under"], "below")] if match["base"] else []


def marked_up(text: str, tags: Mapping[Level, str]) -> str:
    """The text as markup; each tag has ``{}`` where its run goes."""
    return "".join(tags[level].format(html.escape(run, quote=False)) for run, level in pieces(text))
