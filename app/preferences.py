"""What the program remembers between sittings: window state, recent files, choices of view."""

from pathlib import Path

from PySide6.QtCore import QByteArray, QSettings

MOST_RECENT = 8


class Preferences:
    """A thin, typed face over QSettings; unreadable entries count as never written."""

    def __init__(self, settings: QSettings | None = None) -> None:
        self._settings = settings or QSettings("Filletwright", "Filletwright")

    def words(self, key: str, default: str) -> str:
        value = self._settings.value(key, default)
        return value if isinstance(value, str) else default

    def lines(self, key: str, default: list[str]) -> list[str]:
        """A list of lines; an empty one stays empty."""
        value = self._settings.value(key)
        return [line for line in value.split("\n") if line] if isinstance(value, str) else default

    def state(self, key: str) -> QByteArray | None:
        value = self._settings.value(key)
        return value if isinstance(value, QByteArray) else None

    def keep(self, key: str, value: str | list[str] | QByteArray) -> None:
        self._settings.setValue(key, "\n".join(value) if isinstance(value, list) else value)

    def recent_files(self) -> list[Path]:
        """Newest first; files that are gone are left out."""
        return [Path(name) for name in self.lines("recent", []) if Path(name).is_file()]

    def note_file(self, path: Path) -> None:
        """Put a file at the head of the recent ones."""
        name = str(path.resolve())
        others = [known for known in self.lines("recent", []) if known != name]
        self.keep("recent", [name, *others][:MOST_RECENT])

    def folder(self) -> str:
        """Where file dialogs begin."""
        return self.words("folder", str(Path.home()))
