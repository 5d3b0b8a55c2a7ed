"""Shaft files: nothing lost, every problem named, the old file kept, schema and reader of one mind."""

import copy
import dataclasses
import json
import math
import os
import subprocess
import sys
from pathlib import Path
from typing import Any

import jsonschema
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from shaftcore import whole_file
from shaftcore.declared import Part, declared
from shaftcore.errors import FileAccessError, ShaftFileError
from shaftcore.notches.groove import Groove
from shaftcore.notches.shoulder import Shoulder
from shaftcore.shaft import AxialForce, RadialForce, Segment, Shaft, Support, Torque
from shaftcore.shaft_file import PAGE, SCHEMA, read_shaft, shaft_from_bytes, shaft_from_text, shaft_to_text, write_shaft
from shaftcore.shaft_file.file_numbers import Number, in_file, internal
from shaftcore.shaft_file.json_text import LARGEST_FILE
from shaftcore.shaft_file.page import page_text
from shaftcore.shaft_file.schema import schema_text, shaft_schema
from shaftcore.shaft_file.versions import migrated
from shaftcore.units import DIMENSIONS
from tests.core.random_shafts import records, sound_shafts

SHAFT = Shaft(
    segments=(
        Segment("seat", 60.0, 40.0, shoulder=Shoulder(2.0, bearing_corner=2.1)),
        Segment("body", 90.0, 52.0, end_diameter=48.0, bore=12.5, finish="ground"),
    ),
    raisers=(Groove("ring groove", 100.0, 1.5, 0.8),),
    supports=(
        Support("left", 10.0, locating=True),
        Support("right", 140.0, "right-hand bearing", False, 2.5e5, -0.02, 0.005),
    ),
    loads=(
        RadialForce("pull", 75.0, 4200.0, 30.0, amplitude=100.0),
        Torque("in", 5.0, 123_456.789, 0.1 + 0.2),
        Torque("out", 130.0, -123_456.789, -0.1 - 0.2),
        AxialForce("push", 20.0, -900.0),
    ),
)
TEXT = shaft_to_text(SHAFT)
VALIDATOR = jsonschema.Draft202012Validator(shaft_schema())
SLOW = settings(max_examples=150, deadline=None, suppress_health_check=list(HealthCheck))


def problems(text: str) -> dict[str, tuple[str, str, str]]:
    with pytest.raises(ShaftFileError) as caught:
        shaft_from_text(text, "demo.shaft.json")
    assert caught.value.place == "demo.shaft.json"
    for problem in caught.value.problems:
        assert problem.value
        assert problem.allowed
        assert problem.remedy
        assert str(problem).isprintable()
        assert len(str(problem)) < 1000
    return {p.path: (p.value, p.allowed, p.remedy) for p in caught.value.problems}


def refused(content: bytes) -> ShaftFileError | None:
    """Why the reader refuses the content; any other error passes on and fails the test."""
    try:
        shaft_from_bytes(content)
    except ShaftFileError as error:
        return error
    return None


def changed(*path: Any, to: Any) -> str:
    """The sound file with one value changed."""
    content = json.loads(TEXT)
    inner = content
    for key in path[:-1]:
        inner = inner[key]
    inner[path[-1]] = to
    return json.dumps(content)


# nothing lost ---------------------------------------------------------------------------------------


@SLOW
@given(sound_shafts())
def test_a_shaft_comes_back_bit_equal(shaft: Shaft) -> None:
    text = shaft_to_text(shaft)
    again = shaft_from_text(text)
    assert again == shaft
    assert shaft_to_text(again) == text


@given(st.floats(-1e300, 1e300), st.sampled_from(sorted(DIMENSIONS)))
def test_every_number_comes_back_bit_equal(value: float, name: str) -> None:
    unit = DIMENSIONS[name].file
    text = in_file(value, unit)
    assert internal(Number(text), unit) == value
    assert json.loads(text) == pytest.approx(unit.shown(value), rel=1e-15)


def test_numbers_are_shifted_by_their_digits() -> None:
    # 0.3 N·m as typed must be exactly 300 N·mm; by hand
    unit = DIMENSIONS["torque"].file
    assert internal(Number("0.3"), unit) == 300.0
    assert internal(Number("1.1"), unit) == 1100.0
    assert in_file(0.1 + 0.2, unit) == "0.00030000000000000003"
    assert in_file(-0.0, unit) == "0.0"
    assert internal(Number("1e-99999999999999999999999"), unit) == 0.0


def test_equal_shafts_give_equal_bytes() -> None:
    first = dataclasses.replace(SHAFT.segments[1], length=90, bore=12.5)
    same = dataclasses.replace(SHAFT, segments=(SHAFT.segments[0], first))
    assert same == SHAFT
    assert shaft_to_text(same) == TEXT
    assert TEXT.endswith("}\n")
    assert json.loads(TEXT)["loads"][1]["torque_Nm"] == 123.456789


def test_keys_stand_in_the_order_of_the_declarations() -> None:
    assert list(json.loads(TEXT))[2:] == list(declared(Shaft))
    assert next(iter(json.loads(TEXT)["loads"][0])) == "kind"


def test_an_unfinished_shaft_may_be_saved_and_opened(tmp_path: Path) -> None:
    path = tmp_path / "empty.shaft.json"
    write_shaft(Shaft(), path)
    assert read_shaft(path) == Shaft()


def test_whole_numbers_and_a_byte_order_mark_are_read() -> None:
    text = TEXT.replace('"length_mm": 60.0', '"length_mm": 60').replace("40.0", "4e1")
    assert shaft_from_bytes(b"\xef\xbb\xbf" + text.encode()) == SHAFT


def test_texts_lists_and_what_may_be_none_may_be_left_out() -> None:
    content = json.loads(shaft_to_text(Shaft(segments=(Segment("a"),))))
    for key in ("title", "raisers", "supports", "loads"):
        del content[key]
    for key in ("shoulder", "end_diameter_mm"):
        del content["segments"][0][key]
    assert shaft_from_text(json.dumps(content)) == Shaft(segments=(Segment("a"),))


# every problem named ----------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("path", "value", "place", "says"),
    [
        (("segments", 0, "length_mm"), 0, "segments[0].length_mm", "0.01 to 100000 mm"),
        (("segments", 1, "diameter_mm"), -5, "segments[1].diameter_mm", "0.1 to 10000 mm"),
        (("segments", 1, "diameter_mm"), math.nan, "segments[1].diameter_mm", "NaN"),
        (("segments", 1, "diameter_mm"), math.inf, "segments[1].diameter_mm", "Infinity"),
        (("segments", 1, "diameter_mm"), 1e308, "segments[1].diameter_mm", "1e+308"),
        (("segments", 1, "diameter_mm"), 10**400, "segments[1].diameter_mm", "1000"),
        (("segments", 1, "diameter_mm"), True, "segments[1].diameter_mm", "true"),
        (("segments", 1, "diameter_mm"), "52", "segments[1].diameter_mm", '"52"'),
        (("segments", 1, "diameter_mm"), None, "segments[1].diameter_mm", "null"),
        (("segments", 1, "diameter_mm"), [1], "segments[1].diameter_mm", "a list of 1"),
        (("loads", 1, "torque_Nm"), 1e306, "loads[1].torque_Nm", "-100000000 to 100000000 N·m"),
        (("loads", 1, "torque_Nm"), 1.01e8, "loads[1].torque_Nm", "-100000000 to 100000000 N·m"),
        (("segments", 0, "finish"), "grounded", "segments[0].finish", 'write "ground"'),
        (("segments", 0, "finish"), 3, "segments[0].finish", '"hot-rolled"'),
        (("duty", "turning"), 1, "duty.turning", "true or false"),
        (("title", "part"), "x" * 101, "title.part", "at most 100"),
        (("title", "part"), "a\u0007b", "title.part", "control characters"),
        (("title", "part"), "\ud800", "title.part", "control characters"),
        (("title", "part"), {}, "title.part", "an object"),
        (("segments", 0, "id"), "", "segments[0].id", "1 to 40"),
        (("segments", 1, "id"), "seat", "segments[1].id", "not used by segments[0]"),
        (("loads", 0, "kind"), "torqe", "loads[0].kind", 'write "torque"'),
        (("loads", 0, "kind"), ["torque"], "loads[0].kind", "radial force"),
        (("loads", 0), 5, "loads[0]", "an object"),
        (("loads",), {}, "loads", "a list"),
        (("material",), None, "material", "an object"),
        (("segments", 0, "shoulder"), 2.0, "segments[0].shoulder", "an object"),
        (("segments", 0, "shoulder", "radius_mm"), 900, "segments[0].shoulder", "along the shaft"),
        (("segments", 0, "shoulder"), None, "segments[0].shoulder", "fillet radius"),
        (("segments", 1, "bore_mm"), 48, "segments[1].bore_mm", "less than 40"),
        (("raisers", 0, "x_mm"), 59.5, "raisers[0]", "along the shaft"),
        (("loads", 0, "x_mm"), 151, "loads[0].x_mm", "0 to 150 mm"),
        (("material", "yield_strength_MPa"), 651, "material.yield_strength_MPa", "650 MPa"),
        (("format",), "drawing", "format", "filletwright shaft"),
        (("supports", 1, "stiffness_N_per_mm"), 0.5, "supports[1].stiffness_N_per_mm", "1 to 1000000000 N/mm"),
        (("supports", 1, "offset_y_mm"), None, "supports[1].offset_y_mm", "-10 to 10 mm"),
        (("version",), 3, "version", "newer version"),
        (("version",), 0, "version", "1 to 2"),
        (("version",), True, "version", "1 to 2"),
        (("version",), "1", "version", "1 to 2"),
    ],
)
def test_what_is_amiss_is_named(path: tuple[Any, ...], value: Any, place: str, says: str) -> None:
    found = problems(changed(*path, to=value))
    assert place in found
    assert says in " ".join(found[place])


def test_overlapping_raisers_are_named() -> None:
    content = json.loads(TEXT)
    content["raisers"].append({**content["raisers"][0], "id": "second", "x_mm": 100.5})
    (place, (value, allowed, _)), *more = problems(json.dumps(content)).items()
    assert not more
    assert place in ("raisers[0]", "raisers[1]")
    assert "before" in value
    assert "not overlap" in allowed


def test_all_problems_are_gathered() -> None:
    text = TEXT.replace('"length_mm": 60.0', '"lenght_mm": 60.0').replace('"turning": true', '"turning": 0')
    text = text.replace('"force_N": 4200.0,\n', "").replace('"diameter_mm": 40.0', '"diameter_mm": 40.0, "colour": 1')
    found = problems(text)
    assert list(found) == ["duty.turning", "segments[0].lenght_mm", "segments[0].colour", "loads[0].force_N"]
    assert found["segments[0].lenght_mm"][2] == 'write "length_mm"'
    assert found["segments[0].colour"][2] == "remove it"
    assert found["loads[0].force_N"][0] == "missing"


def test_a_field_given_twice_is_named() -> None:
    found = problems(TEXT.replace('"locating": true', '"locating": true, "locating": false'))
    assert found["supports[0].locating"][0] == "given more than once"


@pytest.mark.parametrize(
    ("content", "says"),
    [
        (b"", "nothing in it"),
        (b" \n", "nothing in it"),
        (b"\xef\xbb\xbf", "nothing in it"),
        (b'{\n  "format": ,\n', "line 2, column 13"),
        (b"[1, 2]", "a list of 2"),
        (b"null", "null"),
        (b"{}", "format"),
        (b"\xff\xfe{\x00}\x00", "byte 1 is no UTF-8"),
        (TEXT.encode("utf-16"), "no UTF-8"),
        (b"[" * 500_000, "nested too deep"),
        (b'{"a":' * 500_000, "nested too deep"),
        (b"%PDF-1.4 \x00\x01", "line 1, column 1"),
        (b"{" + b'"' + b"k" * 300_000 + b'": 1}', "format"),
        (b" " * (LARGEST_FILE + 1), "20 MB"),
    ],
)
def test_what_is_no_shaft_file_is_refused(content: bytes, says: str) -> None:
    with pytest.raises(ShaftFileError) as caught:
        shaft_from_bytes(content, "x.json")
    assert str(caught.value).startswith("x.json: ")
    assert says in str(caught.value)


def test_a_million_segments_are_refused_as_too_many() -> None:
    text = TEXT.replace('"segments": [', '"segments": [' + "{}," * 1_000_000)
    assert problems(text)["segments"][:2] == ("1000002 entries", "1000 at most")


def test_a_hundred_thousand_unknown_fields_do_not_flood_the_message() -> None:
    content = json.loads(TEXT) | {f"field {n}": n for n in range(100_000)}
    assert len(problems(json.dumps(content))) <= 200


def test_strange_keys_are_shown_in_one_printable_line() -> None:
    for key in ("a\nb", "\ud800", "k" * 5000, "", "\x1b[31m"):
        assert problems(changed(key, to=1))


# mutations: schema and reader of one mind ----------------------------------------------------------------

STRANGE = st.one_of(
    st.none(),
    st.booleans(),
    st.integers(),
    st.floats(),
    st.text(max_size=5),
    st.sampled_from([[], {}, [[]], -1, 0, 1e308, 1e-320, 10**30, "torque", "ground"]),
)


def places(value: Any, path: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    keys = list(value) if isinstance(value, dict) else list(range(len(value))) if isinstance(value, list) else []
    return [found for key in keys for found in [(*path, key), *places(value[key], (*path, key))]]


@st.composite
def mutations(draw: st.DrawFn) -> Any:
    """A sound file's content with one to three things replaced, removed, added, moved or doubled."""
    content = json.loads(TEXT)
    for _ in range(draw(st.integers(1, 3))):
        all_places = places(content)
        if not all_places:
            break
        *inner, last = draw(st.sampled_from(all_places))
        holder = content
        for key in inner:
            holder = holder[key]
        deed = draw(st.sampled_from(["replace", "remove", "add", "double", "swap"]))
        if deed == "replace":
            holder[last] = draw(STRANGE)
        elif deed == "remove":
            del holder[last]
        elif deed == "swap":
            holder[last] = (
                copy.deepcopy(draw(st.sampled_from([content["segments"], content["title"]])))
                if ("segments" in content and "title" in content)
                else None
            )
        elif isinstance(holder, list):
            holder.append(copy.deepcopy(holder[last]))
        else:
            holder[draw(st.sampled_from(["kind", "x_mm", "new", *map(str, holder)]))] = draw(STRANGE)
    return content


@settings(SLOW, max_examples=300)
@given(mutations())
def test_the_reader_refuses_what_the_schema_refuses(content: Any) -> None:
    valid = VALIDATOR.is_valid(content)
    text = json.dumps(content)
    if refused(text.encode()) is None:
        assert valid
        shaft = shaft_from_text(text)
        assert shaft_from_text(shaft_to_text(shaft)) == shaft


@settings(SLOW, max_examples=300)
@given(st.data())
def test_the_reader_raises_nothing_but_its_own_error(data: st.DataObject) -> None:
    content = bytearray(TEXT.encode())
    for _ in range(data.draw(st.integers(1, 4))):
        at = data.draw(st.integers(0, len(content) - 1))
        length = data.draw(st.integers(0, 40))
        content[at : at + length] = data.draw(st.binary(max_size=4) | st.sampled_from([b"{", b"]", b"NaN", b"-9e9"]))
    refusal = refused(bytes(content))
    assert refusal is None or str(refusal).isprintable()


@SLOW
@given(records(Shaft))
def test_shafts_in_range_but_of_any_shape_are_read_or_refused(shaft: Shaft) -> None:
    text = shaft_to_text(shaft)
    assert VALIDATOR.is_valid(json.loads(text))
    refusal = refused(text.encode())
    assert refusal.problems if refusal else shaft_from_text(text) == shaft


# schema and page -------------------------------------------------------------------------------------------


def test_the_stored_schema_and_page_are_those_of_the_declarations() -> None:
    assert SCHEMA.read_text(encoding="utf-8") == schema_text()
    assert PAGE.read_text(encoding="utf-8") == page_text()


def test_the_schema_is_valid_and_takes_the_sound_file() -> None:
    jsonschema.Draft202012Validator.check_schema(shaft_schema())
    VALIDATOR.validate(json.loads(TEXT))


@pytest.mark.parametrize(
    ("path", "value"),
    [
        (("segments", 0, "length_mm"), 0),
        (("segments", 0, "length_mm"), True),
        (("segments", 0, "finish"), "painted"),
        (("segments", 0, "colour"), "red"),
        (("segments", 0, "id"), ""),
        (("segments", 0, "shoulder"), {}),
        (("loads", 0, "kind"), "wind"),
        (("loads", 0, "angle_deg"), 361),
        (("title", "part"), "\x00"),
        (("version",), 1),
        (("supports", 0, "offset_z_mm"), 11),
        (("raisers",), [None]),
    ],
)
def test_the_schema_refuses(path: tuple[Any, ...], value: Any) -> None:
    assert not VALIDATOR.is_valid(json.loads(changed(*path, to=value)))


def test_every_record_inside_a_shaft_is_in_the_schema() -> None:
    kinds = {kind for part in declared(Shaft).values() if isinstance(part, Part) for kind in part.kinds}
    assert kinds
    assert {kind.__name__ for kind in kinds} <= set(shaft_schema()["$defs"])


def test_the_command_that_writes_schema_and_page_runs() -> None:
    before = SCHEMA.read_bytes(), PAGE.read_bytes()
    subprocess.run([sys.executable, "-m", "shaftcore.shaft_file"], check=True, cwd=PAGE.parents[1])
    assert (SCHEMA.read_bytes(), PAGE.read_bytes()) == before


# versions ---------------------------------------------------------------------------------------------------


def _renamed(content: dict[str, Any]) -> dict[str, Any]:
    return {**content, "duty": {"turning": content["rotates"]}}


def _shifted(content: dict[str, Any]) -> dict[str, Any]:
    return {**content, "length": content["length"] * 10}


def test_older_versions_are_carried_over_step_by_step() -> None:
    chain = {1: _renamed, 2: _shifted}
    old = {"format": "filletwright shaft", "version": Number("1"), "rotates": True, "length": Number("2")}
    new = migrated(old, chain, newest=3)
    assert new["duty"] == {"turning": True}
    assert new["length"] == 20
    assert new["version"] == 3
    assert migrated({**old, "version": Number("3")}, chain, newest=3)["length"] == 2


def test_an_old_file_that_cannot_be_carried_over_is_refused() -> None:
    with pytest.raises(ShaftFileError, match="a sound file of version 1"):
        migrated({"format": "filletwright shaft", "version": Number("1")}, {1: _renamed}, newest=2)


def of_version_1() -> dict[str, Any]:
    """The file as the first version wrote it: supports without stiffness and offsets."""
    content = json.loads(TEXT) | {"version": 1}
    for support in content["supports"]:
        for key in ("stiffness_N_per_mm", "offset_y_mm", "offset_z_mm"):
            del support[key]
    return content


def test_a_file_of_version_1_opens_with_rigid_supports_in_line() -> None:
    rigid = tuple(dataclasses.replace(s, stiffness=None, offset_y=0.0, offset_z=0.0) for s in SHAFT.supports)
    shaft = shaft_from_text(json.dumps(of_version_1()))
    assert shaft == dataclasses.replace(SHAFT, supports=rigid)
    written = json.loads(shaft_to_text(shaft))
    assert written["version"] == 2
    assert [support["offset_z_mm"] for support in written["supports"]] == [0.0, 0.0]


def test_a_field_that_version_1_did_not_know_is_refused_there() -> None:
    content = of_version_1()
    content["supports"][1]["offset_y_mm"] = 0.1
    assert "a sound file of version 1" in problems(json.dumps(content))[""][1]


@pytest.mark.parametrize("supports", [None, 7, [None, 7, "A", []], {}])
def test_wrong_supports_of_version_1_are_named_as_ever(supports: Any) -> None:
    assert any(path.startswith("supports") for path in problems(json.dumps(of_version_1() | {"supports": supports})))


def test_a_field_given_twice_in_version_1_is_named() -> None:
    text = json.dumps(of_version_1()).replace('"locating": true', '"locating": true, "locating": false')
    assert problems(text)["supports[0].locating"][0] == "given more than once"


# saving -----------------------------------------------------------------------------------------------------


def test_saving_replaces_the_file_and_leaves_nothing_beside_it(tmp_path: Path) -> None:
    path = tmp_path / "a.shaft.json"
    path.write_text("old", encoding="utf-8")
    path.chmod(0o640)
    write_shaft(SHAFT, path)
    assert path.read_text(encoding="utf-8") == TEXT
    assert path.stat().st_mode & 0o777 == 0o640
    assert os.listdir(tmp_path) == ["a.shaft.json"]


@pytest.mark.parametrize("deed", ["fsync", "replace"])
def test_a_failed_save_leaves_the_old_file(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, deed: str) -> None:
    path = tmp_path / "a.shaft.json"
    path.write_text("old", encoding="utf-8")

    def full(*_: Any) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(whole_file.os, deed, full)
    with pytest.raises(FileAccessError, match=r"the disk is full.*untouched"):
        write_shaft(SHAFT, path)
    assert path.read_text(encoding="utf-8") == "old"
    assert os.listdir(tmp_path) == ["a.shaft.json"]


def test_a_stopped_save_leaves_the_old_file(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = tmp_path / "a.shaft.json"
    path.write_text("old", encoding="utf-8")

    def stop(*_: Any) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr(whole_file.os, "replace", stop)
    with pytest.raises(KeyboardInterrupt):
        write_shaft(SHAFT, path)
    assert path.read_text(encoding="utf-8") == "old"
    assert os.listdir(tmp_path) == ["a.shaft.json"]


def test_a_read_only_file_is_not_written_over(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = tmp_path / "a.shaft.json"
    path.write_text("old", encoding="utf-8")
    monkeypatch.setattr(whole_file.os, "access", lambda *_: False)
    with pytest.raises(FileAccessError, match="permission is denied"):
        write_shaft(SHAFT, path)
    assert path.read_text(encoding="utf-8") == "old"


def test_saving_through_a_link_keeps_the_link(tmp_path: Path) -> None:
    (tmp_path / "real").mkdir()
    link = tmp_path / "link.shaft.json"
    link.symlink_to(tmp_path / "real" / "a.shaft.json")
    write_shaft(SHAFT, link)
    assert link.is_symlink()
    assert read_shaft(link) == SHAFT


@pytest.mark.parametrize("name", ["no folder/a.json", ".", "a\0b", "x" * 300])
def test_places_that_cannot_be_written_or_read_are_said(tmp_path: Path, name: str) -> None:
    for deed in (lambda path: write_shaft(SHAFT, path), read_shaft):
        with pytest.raises(FileAccessError) as caught:
            deed(tmp_path / name)
        assert "could not be" in str(caught.value)
        assert "Errno" not in str(caught.value)
    assert os.listdir(tmp_path) == []


def test_the_file_name_begins_the_message(tmp_path: Path) -> None:
    path = tmp_path / "broken.shaft.json"
    path.write_text("{", encoding="utf-8")
    with pytest.raises(ShaftFileError, match=r"^broken\.shaft\.json: line 1, column 2"):
        read_shaft(path)
