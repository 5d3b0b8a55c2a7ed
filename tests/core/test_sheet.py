"""The margin sheet read back from its PDF: numbers, fonts, pages, bookmarks, and files that stay whole."""

import dataclasses
import datetime
import io
import itertools
import re
import subprocess
import sys
from collections.abc import Callable, Iterator
from pathlib import Path
from typing import Any

import matplotlib
import numpy as np
import pypdf
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from shaftcore.errors import FileAccessError, StoppedError
from shaftcore.evaluation import evaluate
from shaftcore.nomenclature import COLUMNS, Column
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.results import Results
from shaftcore.shaft import AxialForce, Material, RadialForce, Segment, Shaft, Support, Title, Torque
from shaftcore.sheet import write_sheet
from shaftcore.sheet.drawing import shaft_drawing
from shaftcore.sheet.edition import Edition
from shaftcore.sheet.lettering import load_type, safe, typeset
from shaftcore.sheet.spread import spread
from shaftcore.sheet.station_tables import parts
from shaftcore.sheet.tables import Field, ruled_table
from shaftcore.sheet.utilisation_band import band_stretches
from shaftcore.units import System
from shaftcore.workings import workings_of

DAY = datetime.date(2026, 3, 4)
FONT_TYPE = matplotlib.rcParams["pdf.fonttype"]
"""As it stood before any sheet was written."""
HASH = "0123456789abcdef" * 4

SI_SHOWN = {
    "length": (1.0, 2),
    "force": (1.0, 0),
    "torque": (1e-3, 1),
    "stress": (1.0, 1),
    "ratio": (1.0, 3),
    "share": (100.0, 3),
    "deflection": (1.0, 4),
    "slope": (1e3, 3),
}
"""How tables show internal numbers (mm, N, N·mm, MPa) in SI: factor and decimals, written down a second time."""


def small_shaft(pull: float = 5200.0) -> Shaft:
    return Shaft(
        title=Title("Kiln charging gear", "Drum shaft", "B", "A. Writer", "C. Reader", "Turned fillets, Ra < 0.8 µm."),
        material=Material("quenched and tempered steel", 900.0, 650.0),
        segments=(
            Segment("a", 45.0, 40.0, shoulder=Shoulder(1.0, "ground", bearing_corner=1.0)),
            Segment("b", 90.0, 50.0, shoulder=Shoulder(2.0)),
            Segment("c", 110.0, 62.0, end_diameter=46.0, shoulder=Shoulder(1.5)),
            Segment("d", 60.0, 40.0, bore=12.0),
        ),
        raisers=(Groove("g1", x=95.0, depth=1.5, radius=1.0),),
        supports=(Support("left", 20.0, "fixed bearing", True), Support("right", 280.0, "floating bearing")),
        loads=(
            RadialForce("gear", 80.0, pull, 200.0, name="gear mesh"),
            RadialForce("belt", 210.0, 3100.0, -60.0, amplitude=400.0),
            Torque("in", 80.0, 320e3, 60e3),
            Torque("out", 210.0, -320e3, -60e3),
            AxialForce("push", 80.0, -900.0),
        ),
    )


def long_shaft() -> Shaft:
    """20 segments and 60 stations, unbalanced, with texts as long and as odd as the file allows."""
    segments = tuple(Segment(f"s{i}", 60.0 + i, 40.0 + 12 * (i % 2), shoulder=Shoulder(1.5)) for i in range(20))
    ends = list(itertools.accumulate(segment.length for segment in segments))
    odd = "<b>&amp; </para> \U0001f600 中文 %s {x} "
    return Shaft(
        title=Title((odd + "x" * 90)[:100], "W" * 100, "rev", "A" * 80, "<i>C", (odd * 30)[:1000]),
        segments=segments,
        raisers=tuple(Groove(f"g{i}", x=end - 30, depth=1.0, radius=0.4) for i, end in enumerate(ends)),
        supports=(Support("l", 8.0, "N" * 60, True), Support("r", ends[-1] - 8.0)),
        loads=(
            *(
                RadialForce(f"f{i}", end - 15.0, 300.0, 37.0 * i % 360, name="<u>" + "m" * 50)
                for i, end in enumerate(ends)
            ),
            Torque("t", 100.0, 90e3),
        ),
    )


def written(results: Results, path: Path, system: System = "SI", **more: Any) -> bytes:
    write_sheet(results, path, file_hash=HASH, date=DAY, system=system, **more)
    return path.read_bytes()


@pytest.fixture(scope="module")
def small() -> Results:
    return evaluate(small_shaft())


@pytest.fixture(scope="module")
def long() -> Results:
    return evaluate(long_shaft())


@pytest.fixture(scope="module")
def small_pdf(small: Results, tmp_path_factory: pytest.TempPathFactory) -> bytes:
    return written(small, tmp_path_factory.mktemp("sheet") / "small.pdf")


@pytest.fixture(scope="module")
def long_pdf(long: Results, tmp_path_factory: pytest.TempPathFactory) -> bytes:
    return written(long, tmp_path_factory.mktemp("sheet") / "long.pdf", "US")


def pages_of(pdf: bytes) -> list[str]:
    return [page.extract_text() for page in pypdf.PdfReader(io.BytesIO(pdf)).pages]


def chapter(pdf: bytes, title: str) -> list[str]:
    """The pages from one chapter's heading up to the page before the next one's."""
    reader = pypdf.PdfReader(io.BytesIO(pdf))
    tops = [entry for entry in reader.outline if not isinstance(entry, list)]
    starts = [reader.get_destination_page_number(entry) for entry in tops]
    index = [str(entry.title) for entry in tops].index(title)
    return pages_of(pdf)[starts[index] : starts[index + 1]]


# files ----------------------------------------------------------------------------------------


@dataclasses.dataclass(frozen=True)
class Export:
    """One more export of the same results: its bytes, what progress said, the drawing library's settings."""

    pdf: bytes
    said: list[tuple[float, str]]
    settings_before: dict[str, Any]
    settings_after: dict[str, Any]


@pytest.fixture(scope="module")
def again(small: Results, small_pdf: bytes, tmp_path_factory: pytest.TempPathFactory) -> Export:
    said: list[tuple[float, str]] = []
    before = dict(matplotlib.rcParams)
    path = tmp_path_factory.mktemp("sheet") / "again.pdf"
    pdf = written(small, path, progress=lambda share, words: said.append((share, words)))
    return Export(pdf, said, before, dict(matplotlib.rcParams))


def test_same_input_and_date_give_the_same_bytes(again: Export, small_pdf: bytes) -> None:
    assert again.pdf == small_pdf


@pytest.mark.parametrize("ask", [1, 4, 10])
def test_stopped_export_leaves_the_old_file(small: Results, tmp_path: Path, ask: int) -> None:
    path = tmp_path / "sheet.pdf"
    path.write_bytes(b"old")
    asked = itertools.count(1)
    with pytest.raises(StoppedError):
        written(small, path, stopped=lambda: next(asked) >= ask)
    assert path.read_bytes() == b"old"
    assert [p.name for p in tmp_path.iterdir()] == ["sheet.pdf"]


def test_place_that_cannot_be_written_is_said_in_words(small: Results, tmp_path: Path) -> None:
    with pytest.raises(FileAccessError, match="no such file or folder"):
        written(small, tmp_path / "no such folder" / "sheet.pdf")


def test_progress_runs_up_to_one_with_words(again: Export) -> None:
    shares = [share for share, _ in again.said]
    assert shares == sorted(shares)
    assert shares[-1] == 1.0
    assert all(words for _, words in again.said)


def test_import_is_quick_and_knows_no_window() -> None:
    code = (
        "import sys, shaftcore.sheet;"
        "print([m for m in ('reportlab', 'matplotlib', 'pypdf', 'PySide6', 'app') if m in sys.modules])"
    )
    said = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert said.stdout.strip() == "[]"


def test_drawing_library_is_left_as_it_was(again: Export) -> None:
    assert again.settings_after == again.settings_before
    assert again.settings_after["pdf.fonttype"] == FONT_TYPE


# pages ----------------------------------------------------------------------------------------


@pytest.mark.parametrize("pdf", ["small_pdf", "long_pdf"])
def test_every_page_counts_itself(pdf: str, request: pytest.FixtureRequest) -> None:
    pages = pages_of(request.getfixturevalue(pdf))
    for number, text in enumerate(pages, start=1):
        assert re.findall(r"page \d+ of \d+", text) == [f"page {number} of {len(pages)}"]


def fonts_of(resources: Any) -> Iterator[Any]:
    for font in (resources.get("/Font") or {}).values():
        yield font.get_object()
    for form in (resources.get("/XObject") or {}).values():
        assert form.get_object()["/Subtype"] != "/Image", "charts are vectors"
        yield from fonts_of(form.get_object().get("/Resources", {}))


@pytest.mark.parametrize("pdf", ["small_pdf", "long_pdf"])
def test_all_fonts_are_embedded_and_of_one_family(pdf: str, request: pytest.FixtureRequest) -> None:
    reader = pypdf.PdfReader(io.BytesIO(request.getfixturevalue(pdf)))
    found = [font for page in reader.pages for font in fonts_of(page["/Resources"])]
    assert found
    for font in found:
        assert "DejaVuSans" in font["/BaseFont"]
        holder = font["/DescendantFonts"][0].get_object() if "/DescendantFonts" in font else font
        assert "/FontFile2" in holder["/FontDescriptor"].get_object()
        assert "/ToUnicode" in font


def test_bookmarks_lead_to_their_headings(small_pdf: bytes) -> None:
    reader, pages = pypdf.PdfReader(io.BytesIO(small_pdf)), pages_of(small_pdf)

    def entries(outline: Any) -> Iterator[Any]:
        for entry in outline:
            yield from entries(entry) if isinstance(entry, list) else [entry]

    found = list(entries(reader.outline))
    for entry in found:
        assert str(entry.title) in pages[reader.get_destination_page_number(entry)]
    chapters = [str(entry.title) for entry in reader.outline if not isinstance(entry, list)]
    assert [title[0] for title in chapters] == list("12345678")
    places = [reader.get_destination_page_number(entry) for entry in found]
    assert places == sorted(places)


def test_tables_repeat_their_heads_on_every_page(long_pdf: bytes) -> None:
    pages = chapter(long_pdf, "5 Station by station")
    assert len(pages) > len(parts())
    for text in pages:
        assert re.search(r"No\.\s+Place", text)


def test_no_text_leaves_the_paper(long_pdf: bytes) -> None:
    for page in pypdf.PdfReader(io.BytesIO(long_pdf)).pages:
        width, height = float(page.mediabox.width), float(page.mediabox.height)
        seen: list[tuple[float, float]] = []

        def note(text: str, _: Any, tm: Any, __: Any, ___: Any, seen: list[tuple[float, float]] = seen) -> None:
            if text.strip():
                seen.append((tm[4], tm[5]))

        page.extract_text(visitor_text=note)
        assert seen
        assert all(0 <= x <= width and 0 <= y <= height for x, y in seen)


def test_paper_follows_the_units(small_pdf: bytes, long_pdf: bytes) -> None:
    """ISO 216: A4 is 210 by 297 mm; Letter is 8.5 by 11 inches; a point is 1/72 inch."""
    a4, letter = (pypdf.PdfReader(io.BytesIO(pdf)).pages[0].mediabox for pdf in (small_pdf, long_pdf))
    assert float(a4.width) == pytest.approx(210 / 25.4 * 72, abs=0.1)
    assert (float(letter.width), float(letter.height)) == (612, 792)


# content --------------------------------------------------------------------------------------


def as_shown(column: Column, value: Any) -> str:
    """A table entry written without the sheet's own code."""
    if value is None or value == "":
        return "–"
    if isinstance(value, str) or not column.dimension:
        return str(value)
    if value == np.inf:
        return "unloaded"
    factor, decimals = SI_SHOWN[column.dimension]
    text = format(round(value * factor, 9), f".{decimals if column.decimals is None else column.decimals}f")
    text = re.sub(r"\d+", lambda whole: grouped(whole[0]), text, count=1)
    if column.key in ("margin", "yield_margin"):
        return (text if text[0] == "-" else "+" + text).replace("-", "−")
    return (text if text.strip("-0.") else text.lstrip("-")).replace("-", "−")


def grouped(digits: str) -> str:
    """Five digits and more in threes from the right; the held space reads back as a plain one."""
    if len(digits) < 5:
        return digits
    return " ".join(reversed([digits[max(end - 3, 0) : end] for end in range(len(digits), 0, -3)]))


def test_every_number_of_every_station_stands_in_the_tables(small: Results, small_pdf: bytes) -> None:
    """Each part prints its rows cell by cell; the run of cells must be there, in order, once a station."""
    cells = [line.strip() for page in chapter(small_pdf, "5 Station by station") for line in page.splitlines()]
    joined = "\n".join(cells)
    number, place = ({c.key: c for c in COLUMNS}[key].values(small) for key in ("station", "place"))
    for _, columns in parts():
        plain = [column for column in columns if column.key != "flags"]
        for i in range(len(small.stations)):
            row = [str(number[i]), str(place[i]), *(as_shown(c, c.values(small)[i]) for c in plain)]
            assert "\n" + "\n".join(row) + "\n" in joined


def test_no_quantity_is_left_out_or_told_twice() -> None:
    told = [column.key for _, columns in parts() for column in columns]
    assert sorted([*told, "station", "place"]) == sorted(column.key for column in COLUMNS)


def test_first_page_names_what_governs_and_by_how_much(small: Results, small_pdf: bytes) -> None:
    text = " ".join(pages_of(small_pdf)[0].split())
    i = small.governing
    station, judged = small.stations[i], small.judged
    assert f"Station {station.number}, {station.label}, x = {station.x:.2f} mm, governs." in text
    assert f"{100 * judged.margin[i]:+.1f} %".replace("-", "−") in text.replace("\xa0", " ")
    assert f"Runner-up: station {small.stations[small.runner_up or 0].number}," in text
    for words in ("Kiln charging gear", "Drum shaft", "A. Writer", "C. Reader", "2026-03-04", HASH, "Filletwright"):
        assert words in text
    assert "rovisional" not in text


def test_margin_below_the_asked_factor_is_said_in_words(tmp_path: Path) -> None:
    results = evaluate(small_shaft(pull=40e3))
    text = " ".join(pages_of(written(results, tmp_path / "sheet.pdf"))[0].split()).replace("\xa0", " ")
    missing = [str(s.number) for s, m in zip(results.stations, results.judged.utilisation, strict=True) if m > 1]
    margin = f"{100 * results.judged.margin[results.governing]:.1f} %".replace("-", "−")
    assert f"Fatigue: margin {margin}, below the asked factor" in text
    assert f"{len(missing)} miss an asked factor: No. {', '.join(missing)}." in text


def test_provisional_results_say_so_on_the_first_page(long: Results, long_pdf: bytes) -> None:
    assert long.provisional
    first = " ".join(pages_of(long_pdf)[0].split())
    # 90 N·m at 0.1129848 N·m a lbf·in (NIST SP 811, B.8)
    assert "Provisional: The mean torques do not balance by 796.6 lbf·in" in first


def test_greek_letters_can_be_selected_in_text_and_charts(small_pdf: bytes) -> None:
    traces = chapter(small_pdf, "4 Along the shaft")[0]
    for letter in ("σa′", "σm′", "φ"):
        assert letter in traces
    assert "√((" in "".join(chapter(small_pdf, "6 The governing station worked"))


def test_worked_lines_all_stand_in_their_chapter(small: Results, small_pdf: bytes) -> None:
    text = re.sub(r"\s", "", "".join(pages_of(small_pdf)))
    for part in workings_of(small, small.governing):
        assert re.sub(r"\s", "", part.title) in text
        for line in part.lines:
            numbers = re.sub(r"\^\(([^()]*)\)", r"\1", line.numbers)  # a raised power needs no parentheses
            assert re.sub(r"[\s^]", "", numbers) in text


def test_notices_stand_with_their_station(small: Results, small_pdf: bytes) -> None:
    text = re.sub(r"\s+", "", "".join(chapter(small_pdf, "7 Notices and range flags") + pages_of(small_pdf)[-2:]))
    assert small.notices
    for notice in small.notices:
        assert re.sub(r"[\s_]+", "", notice.text) in text
        if notice.station is not None:
            station = small.stations[notice.station]
            assert f"No.{station.number},{station.label.replace(' ', '')}" in text


def test_reactions_hold_the_shaft(small: Results, small_pdf: bytes) -> None:
    """Forces across balance: the printed reactions in each plane are the loads turned round (statics)."""
    text = "".join(chapter(small_pdf, "2 Givens"))
    mean = small.along.reactions[0]
    loads = [(load.force, np.radians(load.angle)) for load in small.shaft.loads if isinstance(load, RadialForce)]
    for plane, part in zip(mean, (np.cos, np.sin), strict=True):
        assert plane.sum() == pytest.approx(-sum(force * part(angle) for force, angle in loads))
        for value in plane:
            assert f"{value:.0f}".replace("-", "−") in text


def test_stiffness_and_offsets_stand_beside_the_reactions(tmp_path: Path) -> None:
    shaft = small_shaft()
    left, right = shaft.supports
    middle = Support("middle", 150.0, stiffness=123_456.0, offset_y=-0.0375)
    results = evaluate(dataclasses.replace(shaft, supports=(left, right, middle)))
    text = " ".join("\n".join(chapter(written(results, tmp_path / "three.pdf"), "2 Givens")).split())
    table = text[text.index("Supports and their reactions") :]
    for words in ("Radial stiffness", "Offset upwards", "123 456", "−0.0375"):
        assert words in table.replace("\u202f", " ").replace("\u00a0", " "), words
    assert table.count("rigid") >= 2
    for value in results.along.reactions[0].ravel():
        assert f"{abs(value):.0f}" in table.replace("\u202f", "").replace("\u00a0", "").replace(" ", "")


def test_last_chapter_states_limits_call_outs_and_signatures(small_pdf: bytes) -> None:
    text = " ".join(" ".join(pages_of(small_pdf)[-2:]).split())
    for words in (
        "Load capacity of keys, splines",
        "fretting",
        "Critical speeds",
        "licensed engineer",
        "codes in force",
        "blend without step, no grinding burn",
        "Peterson's Stress Concentration Factors",
        "Prepared",
        "Checked",
        "Released",
    ):
        assert words in text


def test_odd_texts_are_printed_as_they_stand(long_pdf: bytes) -> None:
    first = pages_of(long_pdf)[0]
    assert "<b>&amp; </para>" in first
    assert "□" in first
    assert "{x}" in first


def test_us_units_convert_by_the_inch(long: Results, long_pdf: bytes) -> None:
    """25.4 mm to the inch (international yard and pound)."""
    text = "".join(chapter(long_pdf, "5 Station by station"))
    for station in long.stations:
        assert f"{station.x / 25.4:.4f}" in text


# drawing --------------------------------------------------------------------------------------


@pytest.mark.parametrize("results", ["small", "long"])
def test_drawing_numbers_every_station_and_marks_every_load(results: str, request: pytest.FixtureRequest) -> None:
    chosen = request.getfixturevalue(results)
    drawn, _ = shaft_drawing(Edition(chosen, "SI", HASH, DAY, "0"), 260.0, 150.0)
    words = [text.get_text() for text in drawn.axes[0].texts]
    for station in chosen.stations:
        assert words.count(str(station.number)) >= 1
    for i in range(1, len(chosen.shaft.loads) + 1):
        assert words.count(f"L{i}") == 1
    assert {"B1", "B2"} <= set(words)


def test_drawing_with_too_many_stations_says_how_many_are_numbered() -> None:
    segments = tuple(Segment(f"s{i}", 30.0, 40.0 + 4 * (i % 2), shoulder=Shoulder(1.5)) for i in range(300))
    supports = (Support("l", 0.0, locating=True), Support("r", 9000.0))
    results = evaluate(Shaft(segments=segments, supports=supports, loads=(RadialForce("f", 4500.0, 100.0),)))
    drawn, _ = shaft_drawing(Edition(results, "SI", HASH, DAY, "0"), 260.0, 150.0)
    words = [text.get_text() for text in drawn.axes[0].texts]
    numbers = [int(word) for word in words if word.isdigit() and int(word) <= len(results.stations)]
    assert results.stations[results.governing].number in numbers
    assert any("one station in" in word for word in words)


@settings(max_examples=60, deadline=None)
@given(st.lists(st.floats(0.0, 200.0), min_size=1, max_size=60), st.floats(0.1, 10.0))
def test_labels_keep_their_order_and_distance(places: list[float], gap: float) -> None:
    wanted = np.sort(np.array(places))
    got = spread(wanted, gap, 0.0, 200.0)
    room = min(gap, 200.0 / max(len(places) - 1, 1))
    assert np.all(np.diff(got) >= room - 1e-9)
    assert got[0] >= -1e-9
    assert got[-1] <= 200.0 + 1e-9


def test_labels_with_room_stay_where_they_want_to_be() -> None:
    wanted = np.array([10.0, 30.0, 80.0])
    assert spread(wanted, 5.0, 0.0, 100.0).tolist() == wanted.tolist()


def test_band_shows_each_raiser_its_own_utilisation(small: Results) -> None:
    edges, use = band_stretches(small, 0.5)
    assert edges[0] == 0.0
    assert edges[-1] == pytest.approx(small.shaft.length)
    for i, station in enumerate(small.stations):
        here = use[(edges[:-1] <= station.x) & (edges[1:] >= station.x)]
        assert here.max() >= small.judged.utilisation[i] - 1e-12
    assert use.max() == small.judged.utilisation.max()


# words and tables -----------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("text", "bare"),
    [("S_ut²", "Sut²"), ("σ_b,a", "σb,a"), ("Kt,b", "Kt,b"), ("d^4", "d4"), ("a < b & c", "a &lt; b &amp; c")],
)
def test_symbols_are_set_with_true_subscripts(text: str, bare: str) -> None:
    load_type()
    assert re.sub(r"<[^>]+>", "", typeset(text)) == bare


def test_a_power_sign_is_no_part_of_a_subscript() -> None:
    load_type()
    assert typeset("S_ut²").endswith("ut</sub>²")


def test_markup_of_the_user_is_only_text() -> None:
    load_type()
    assert safe("<para>\n\x00\ud800&") == "&lt;para&gt; □□&amp;"


@pytest.mark.parametrize("count", [1, 8, 16])
def test_tables_never_grow_beyond_their_page(count: int) -> None:
    load_type()
    number: Callable[[int], Field] = lambda i: Field(f"quantity {i}", ["−123456.7"])  # noqa: E731
    fields = [Field("place", ["W" * 300], False), *(number(i) for i in range(count))]
    table = ruled_table(fields, 700.0)
    width, _ = table.wrap(700.0, 1000.0)
    assert width == pytest.approx(700.0, abs=1e-6)


def test_shaft_without_loads_still_prints(tmp_path: Path) -> None:
    results = evaluate(dataclasses.replace(small_shaft(), loads=()))
    first = pages_of(written(results, tmp_path / "sheet.pdf"))[0]
    assert "unloaded" in first
    assert "Provisional: No load is set" in " ".join(first.split())
