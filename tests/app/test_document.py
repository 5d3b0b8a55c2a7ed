"""The document: what a change costs."""

from dataclasses import replace

import pytest
from pytestqt.qtbot import QtBot

import app.document
from app.document import Document
from shaftcore.demo import demo_shafts
from shaftcore.edits import replace_shoulder
from shaftcore.shaft import Shaft
from shaftcore.shaft_file import read_shaft


def test_a_change_is_analysed_once_and_a_refused_one_leaves_all_as_it_was(
    qtbot: QtBot, monkeypatch: pytest.MonkeyPatch
) -> None:
    shaft = read_shaft(demo_shafts()[0])
    document = Document()
    document.load(shaft, None)
    real, seen = app.document.evaluate, []

    def counted(asked: Shaft) -> object:
        seen.append(asked)
        return real(asked)

    monkeypatch.setattr(app.document, "evaluate", counted)
    after = replace_shoulder(shaft, shaft.segments[0].id, radius=1.25)
    assert document.change(after, "Fillet")
    assert seen == [after]
    assert document.scene.results is not None
    assert document.scene.results.shaft == document.shaft == after
    shown = document.scene
    assert not document.change(replace(after, supports=(replace(after.supports[0], x=1e7),)), "Off the shaft")
    assert document.scene is shown
    assert document.undo_stack.count() == 1
    document.undo_stack.undo()
    assert document.shaft == shaft
    assert not document.modified
