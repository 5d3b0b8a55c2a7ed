"""What is remembered comes back as it was kept."""

from pathlib import Path

from app.preferences import MOST_RECENT, Preferences


def test_an_empty_list_is_not_the_default(preferences: Preferences) -> None:
    assert preferences.lines("opened", ["ledger"]) == ["ledger"]
    preferences.keep("opened", [])
    assert preferences.lines("opened", ["ledger"]) == []
    preferences.keep("opened", ["a", "b"])
    assert preferences.lines("opened", []) == ["a", "b"]


def test_recent_files_newest_first_without_those_gone(preferences: Preferences, tmp_path: Path) -> None:
    files = [tmp_path / f"{i}.shaft.json" for i in range(MOST_RECENT + 3)]
    for file in files:
        file.write_text("{}")
        preferences.note_file(file)
    preferences.note_file(files[5])
    files[-1].unlink()
    recent = preferences.recent_files()
    assert recent[0] == files[5].resolve()
    assert files[-1].resolve() not in recent
    assert len(recent) == MOST_RECENT - 1
    assert len(set(recent)) == len(recent)
