"""What is answered before any window is there."""

import os
import subprocess
import sys
from pathlib import Path

import pytest

from app.__main__ import main


def test_the_picture_command_explains_itself(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["likeness", "--help"]) == 0
    assert "OUT.png" in capsys.readouterr().out


@pytest.mark.parametrize("words", [["likeness"], ["likeness", "a.json"], ["likeness", "a", "b", "c"]])
def test_the_picture_command_wrongly_used_says_how(words: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    assert main(words) == 2
    said = capsys.readouterr()
    assert "SHAFT.json and OUT.png" in said.err
    assert said.out == ""


def test_a_misspelt_command_is_named(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["chekc", "a.json"]) == 2
    assert "'chekc' is no command" in capsys.readouterr().err


def test_without_a_display_the_command_that_needs_none_is_named(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], tmp_path: Path
) -> None:
    for name in ("DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM"):
        monkeypatch.delenv(name, raising=False)
    monkeypatch.setattr("sys.platform", "linux")
    monkeypatch.setattr("sys.argv", ["/usr/bin/filletwright"])
    assert main([str(tmp_path / "a.json")]) == 2
    assert "/usr/bin/filletwright sheet" in capsys.readouterr().err


def test_without_a_display_one_line_names_the_command_that_needs_none() -> None:
    screens = ("DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM")
    bare = {key: value for key, value in os.environ.items() if key not in screens}
    command = [sys.executable, "-m", "app", "my shaft.shaft.json"]
    done = subprocess.run(command, capture_output=True, text=True, timeout=60, check=False, env=bare)
    assert done.returncode == 2
    assert done.stderr.count("\n") == 1
    assert "python -m app sheet 'my shaft.shaft.json' OUT.pdf" in done.stderr
