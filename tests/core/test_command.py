"""The commands without a window: what they say, where, with which exit status, and that they load no window."""

import csv
import dataclasses
import hashlib
import io
import json
import math
import subprocess
import sys
from pathlib import Path

import pytest

from shaftcore import VERSION, command
from shaftcore.evaluation import evaluate
from shaftcore.ledger_table import READ, ledger_csv, ledger_text
from shaftcore.nomenclature import BY_KEY, COLUMNS
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import RadialForce, Segment, Shaft, Support, Torque
from shaftcore.shaft_file import write_shaft
from shaftcore.units import dimension

SHAFT = Shaft(
    segments=(Segment("thin", 60.0, 40.0, shoulder=Shoulder(2.0)), Segment("thick", 90.0, 52.0)),
    raisers=(Groove("ring", 100.0, 1.5, 1.0),),
    supports=(Support("left", 10.0, locating=True), Support("right", 140.0)),
    loads=(
        RadialForce("pull", 75.0, 4200.0),
        Torque("in", 5.0, 120_000.0),
        Torque("out", 130.0, -120_000.0),
    ),
)
LOADED_TENFOLD = dataclasses.replace(SHAFT, loads=(RadialForce("pull", 75.0, 42_000.0), *SHAFT.loads[1:]))
SOURCE = Path(command.__file__).parents[1]


@pytest.fixture
def file(tmp_path: Path) -> Path:
    path = tmp_path / "demo.shaft.json"
    write_shaft(SHAFT, path)
    return path


@pytest.fixture
def overloaded(tmp_path: Path) -> Path:
    path = tmp_path / "overloaded.shaft.json"
    write_shaft(LOADED_TENFOLD, path)
    return path


def one_line(text: str) -> str:
    assert text.startswith("filletwright: ")
    assert text.count("\n") == 1
    assert "Traceback" not in text
    return text


# check --------------------------------------------------------------------------------------------


def test_check_says_that_a_file_is_sound(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert command.main(["check", str(file)]) == 0
    out, err = capsys.readouterr()
    assert out == "demo.shaft.json: sound and finished (segments 2, raisers 1, supports 2, loads 3)\n"
    assert err == ""


def test_check_names_every_problem_on_a_line_of_its_own(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    content = json.loads(file.read_text(encoding="utf-8"))
    content["segments"][0]["length_mm"] = -1
    content["loads"][1]["colour"] = "red"
    file.write_text(json.dumps(content), encoding="utf-8")
    assert command.main(["check", str(file)]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    lines = err.splitlines()
    assert len(lines) == 2
    assert lines[0].startswith("filletwright: demo.shaft.json: segments[0].length_mm: -1 — allowed: 0.01 to")
    assert "loads[1].colour: unknown field" in lines[1]


def test_check_says_what_is_missing(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    write_shaft(dataclasses.replace(SHAFT, supports=()), file)
    assert command.main(["check", str(file)]) == 2
    out, err = capsys.readouterr()
    assert "not finished" in out
    assert one_line(err).startswith("filletwright: demo.shaft.json: missing: supports: 0 place(s)")


# ledger -------------------------------------------------------------------------------------------


def test_ledger_prints_a_row_a_station(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    results = evaluate(SHAFT)
    assert command.main(["ledger", str(file)]) == 0
    out, err = capsys.readouterr()
    assert err == ""
    lines = out.splitlines()
    for station, line in zip(results.stations, lines[2:], strict=False):
        assert line.split()[0] == str(station.number)
        assert station.label in line
    governing = results.stations[results.governing]
    assert f"Governing: station {governing.number}, {governing.label}" in out
    assert "every station reaches the asked factors" in out


def test_ledger_columns_are_aligned() -> None:
    lines = ledger_text(evaluate(SHAFT)).splitlines()
    heads = [BY_KEY[key].symbol or BY_KEY[key].label for key in READ]
    begin = lines[0].index(heads[1] or "Place")
    assert {line[begin - 2 : begin] for line in lines} == {"  "}
    end = lines[0].index("margin") + len("margin")
    assert all(line[end : end + 2] == "  " for line in lines)


def test_a_missed_factor_gives_status_1(overloaded: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert not evaluate(LOADED_TENFOLD).sound
    assert command.main(["ledger", str(overloaded)]) == 1
    assert "not every station reaches" in capsys.readouterr().out


def test_an_unbalanced_torque_is_said(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    write_shaft(dataclasses.replace(SHAFT, loads=SHAFT.loads[:2]), file)
    command.main(["ledger", str(file)])
    out = capsys.readouterr().out
    assert "(provisional)" in out
    assert "120 N·m" in out


def test_the_csv_holds_every_column_in_full(file: Path, tmp_path: Path) -> None:
    out = tmp_path / "ledger.csv"
    assert command.main(["ledger", str(file), "--csv", str(out)]) == 0
    rows = list(csv.DictReader(io.StringIO(out.read_bytes().decode(), newline="")))
    results = evaluate(SHAFT)
    assert len(rows) == len(results.stations)
    for column in COLUMNS:
        for row, value in zip(rows, column.values(results), strict=True):
            written = row[column.csv_head]
            if value is None:
                assert written == ""
            elif isinstance(value, float) and math.isinf(value):
                assert written == "unloaded"
            elif isinstance(value, float):
                unit = dimension(column.dimension).file
                assert unit.internal(float(written)) == pytest.approx(value, rel=1e-14)
            else:
                assert written == str(value)


def test_the_csv_is_in_the_units_of_its_heads() -> None:
    """Checked by hand: 120 N·m of torque between 5 and 130 mm, the groove's net diameter 52 - 2 × 1.5 mm."""
    rows = list(csv.DictReader(io.StringIO(ledger_csv(evaluate(SHAFT)), newline="")))
    groove = next(row for row in rows if row["place"].startswith("Groove"))
    assert float(groove["torque_Nm"]) == pytest.approx(120.0)
    assert float(groove["d_mm"]) == 49.0
    assert float(groove["radius_mm"]) == 1.0
    # reaction at the right 4200 × 65/130 N, lever 40 mm: 84 N·m
    assert float(groove["moment_Nm"]) == pytest.approx(84.0)


def test_a_place_without_stress_is_written_unloaded() -> None:
    bare = dataclasses.replace(SHAFT, loads=(RadialForce("pull", 75.0, 4200.0),))
    results = evaluate(bare)
    row = next(csv.DictReader(io.StringIO(ledger_csv(results), newline="")))
    assert row["place"] == "Support left"
    assert row["n"] == row["margin"] == row["n_yield"] == "unloaded"
    for text in (ledger_csv(results), ledger_text(results)):
        assert "unloaded" in text
        assert "inf" not in text
        assert "nan" not in text.lower()


def test_columns_are_documented(capsys: pytest.CaptureFixture[str]) -> None:
    assert command.main(["ledger", "--columns"]) == 0
    lines = capsys.readouterr().out.splitlines()
    assert [line.split()[0] for line in lines] == [column.csv_head for column in COLUMNS]
    for column, line in zip(COLUMNS, lines, strict=True):
        assert column.label in line
        if column.dimension and dimension(column.dimension).file.symbol:
            assert f", {dimension(column.dimension).file.symbol}" in line


# sheet --------------------------------------------------------------------------------------------


def test_the_sheet_gets_results_hash_and_date(
    file: Path, overloaded: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    seen = {}
    monkeypatch.setattr("shaftcore.sheet.write_sheet", lambda results, path, **more: seen.update(more, path=path))
    assert command.main(["sheet", str(file), str(tmp_path / "a.pdf"), "--date", "2026-02-28"]) == 0
    assert seen["file_hash"] == hashlib.sha256(file.read_bytes()).hexdigest()
    assert seen["date"].isoformat() == "2026-02-28"
    assert seen["path"] == tmp_path / "a.pdf"
    assert command.main(["sheet", str(overloaded), str(tmp_path / "b.pdf")]) == 1


def test_the_sheet_is_written(file: Path, tmp_path: Path) -> None:
    out = tmp_path / "a.pdf"
    assert command.main(["sheet", str(file), str(out), "--date", "2026-02-28"]) == 0
    assert out.read_bytes().startswith(b"%PDF-")


# bad input ----------------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("words", "says"),
    [
        ([], "required: COMMAND"),
        (["polish"], "invalid choice: 'polish'"),
        (["check"], "required: SHAFT.json"),
        (["check", "nowhere.shaft.json"], "there is no such file"),
        (["check", "."], "it is a folder"),
        (["check", "{file}", "more"], "unrecognized arguments: more"),
        (["ledger", "{file}", "--cvs", "x"], "unrecognized arguments"),
        (["ledger", "{file}", "--csv", "{file}"], "is the shaft file itself"),
        (["ledger", "{file}", "--csv", "no/such/folder.csv"], "could not be saved"),
        (["sheet", "{file}", "{file}"], "is the shaft file itself"),
        (["sheet", "{file}", "out.pdf", "--date", "28.2.2026"], "YYYY-MM-DD"),
        (["sheet", "{file}", "no/such/folder.pdf"], "could not be saved"),
    ],
)
def test_bad_input_gets_one_clear_line(
    words: list[str], says: str, file: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.chdir(file.parent)
    before = file.read_bytes()
    assert command.main([word.replace("{file}", str(file)) for word in words]) == 2
    out, err = capsys.readouterr()
    assert says in one_line(err)
    assert out == ""
    assert file.read_bytes() == before


def test_an_unfinished_shaft_cannot_be_listed(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    write_shaft(Shaft(), file)
    assert command.main(["ledger", str(file)]) == 2
    err = capsys.readouterr().err
    assert all(line.startswith("filletwright: demo.shaft.json: missing: ") for line in err.splitlines())


def test_a_slip_of_the_program_shows_no_traceback(
    file: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    def slip(*_: object) -> None:
        raise KeyError("thing")

    monkeypatch.setattr(command, "evaluate", slip)
    assert command.main(["ledger", str(file)]) == 3
    assert "KeyError" in one_line(capsys.readouterr().err)


# the whole ------------------------------------------------------------------------------------------


def test_help_and_version(capsys: pytest.CaptureFixture[str]) -> None:
    assert command.main(["--version"]) == 0
    assert capsys.readouterr().out == f"filletwright {VERSION}\n"
    for words in (["--help"], *([name, "--help"] for name in command.COMMANDS)):
        assert command.main(words) == 0
        assert "exit status" in capsys.readouterr().out


def test_every_command_has_a_line_in_the_help(capsys: pytest.CaptureFixture[str]) -> None:
    command.main(["--help"])
    out = capsys.readouterr().out
    for name in (*command.COMMANDS, "likeness"):
        assert f"filletwright {name} SHAFT.json" in out


@pytest.mark.parametrize("entry", ["shaftcore.command", "app.__main__"])
def test_no_window_is_loaded(entry: str, file: Path, tmp_path: Path) -> None:
    """A fresh interpreter runs every command; afterwards no module of Qt is there."""
    runs = [["check", str(file)], ["ledger", str(file)], ["sheet", str(file), str(tmp_path / "out.pdf")]]
    script = (
        f"import sys; from {entry} import main\n"
        f"codes = [main(words) for words in {runs!r}]\n"
        "found = [name for name in sys.modules if name.split('.')[0] in ('PySide6', 'shiboken6')]\n"
        "print(codes, found)"
    )
    ended = subprocess.run([sys.executable, "-c", script], cwd=SOURCE, capture_output=True, text=True, check=True)
    assert ended.stdout.splitlines()[-1] == "[0, 0, 0] []"


def test_a_reader_that_goes_away_is_no_error(file: Path) -> None:
    script = f"import sys; from shaftcore.command import main; sys.exit(main(['ledger', {str(file)!r}]))"
    with subprocess.Popen(
        [sys.executable, "-c", script], cwd=SOURCE, stdout=subprocess.PIPE, stderr=subprocess.PIPE
    ) as running:
        assert running.stdout is not None
        assert running.stderr is not None
        running.stdout.close()
        complaints = running.stderr.read()
        assert running.wait() == 0
    assert complaints == b""
