"""`filletwright` and `python -m app`: the commands without a window, or the window itself."""

import os
import shlex
import sys
from pathlib import Path

LIKENESS_HELP = """usage: filletwright likeness SHAFT.json OUT.png

Write the window with this shaft as a picture; no display is needed."""


def main(argv: list[str] | None = None) -> int:
    """Run one command; returns the exit status."""
    words = sys.argv[1:] if argv is None else argv
    import shaftcore.command as command

    if words and words[0] == "likeness":
        return _likeness(words[1:])
    if words and (words[0] in command.COMMANDS or words[0].startswith("-")):
        return command.main(words)
    if len(words) > 1:
        print(
            f"filletwright: {words[0]!r} is no command, and one shaft file at a time can be opened, not {len(words)}; "
            "see filletwright --help",
            file=sys.stderr,
        )
        return 2
    if not _display_there():
        print(_no_display(words[0] if words else "SHAFT.json"), file=sys.stderr)
        return 2
    from app.start import open_window

    return open_window(Path(words[0]) if words else None)


def _display_there() -> bool:
    if not sys.platform.startswith("linux") or os.environ.get("QT_QPA_PLATFORM"):
        return True
    return bool(os.environ.get("DISPLAY") or os.environ.get("WAYLAND_DISPLAY"))


def _no_display(shaft: str) -> str:
    """One line that can be typed off, with the program as it was called."""
    called = Path(sys.argv[0])
    program = "python -m app" if called.suffix == ".py" else shlex.quote(str(called))
    return (
        "filletwright: there is no display here; to write the margin sheet without one: "
        f"{program} sheet {shlex.quote(shaft)} OUT.pdf"
    )


def _likeness(words: list[str]) -> int:
    if words and words[0] in ("-h", "--help"):
        print(LIKENESS_HELP)
        return 0
    if len(words) != 2 or words[0].startswith("-"):
        print("filletwright: likeness needs SHAFT.json and OUT.png; see filletwright likeness --help", file=sys.stderr)
        return 2
    os.environ["QT_QPA_PLATFORM"] = "offscreen"
    from app.start import write_likeness

    return write_likeness(Path(words[0]), Path(words[1]))


if __name__ == "__main__":
    sys.exit(main())
