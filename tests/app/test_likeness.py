"""The picture of the window, made without a screen by a process of its own."""

import subprocess
import sys
from pathlib import Path

from PySide6.QtGui import QImage

from shaftcore.demo import demo_shafts


def _likeness(*words: str) -> subprocess.CompletedProcess[str]:
    command = [sys.executable, "-m", "app", "likeness", *words]
    return subprocess.run(command, capture_output=True, text=True, timeout=120, check=False)


def test_the_window_as_a_picture(tmp_path: Path) -> None:
    done = _likeness(str(demo_shafts()[0]), str(tmp_path / "window.png"))
    assert (done.returncode, done.stderr) == (0, "")
    picture = QImage(str(tmp_path / "window.png"))
    assert picture.width() >= 1000
    colours = {picture.pixel(x, y) for x in range(0, picture.width(), 7) for y in range(0, picture.height(), 7)}
    assert len(colours) > 20


def test_a_shaft_that_is_not_there_is_one_line_and_status_2(tmp_path: Path) -> None:
    done = _likeness(str(tmp_path / "none.shaft.json"), str(tmp_path / "window.png"))
    assert done.returncode == 2
    assert done.stderr.count("\n") == 1
    assert "none.shaft.json" in done.stderr
    assert not (tmp_path / "window.png").exists()
