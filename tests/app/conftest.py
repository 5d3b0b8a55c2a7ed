"""What every test of the window needs: own settings, and no error swallowed in silence."""

import logging
from collections.abc import Iterator

import pytest
from PySide6.QtCore import QSettings

from app.preferences import Preferences
from app.theme import load_type


@pytest.fixture(scope="session", autouse=True)
def _type(qapp: object) -> None:
    load_type()


@pytest.fixture(autouse=True)
def _no_unexpected_error(caplog: pytest.LogCaptureFixture, request: pytest.FixtureRequest) -> Iterator[None]:
    """An exception that `guarded` turned into a message fails the test, unless it is marked as meant."""
    yield
    if request.node.get_closest_marker("expects_error") is None:
        slips = [record for record in caplog.get_records("call") if record.levelno >= logging.ERROR]
        assert not slips, [record.exc_info or record.getMessage() for record in slips]


@pytest.fixture
def preferences(tmp_path: object) -> Preferences:
    return Preferences(QSettings(f"{tmp_path}/settings.ini", QSettings.Format.IniFormat))
