"""Where the demo shafts lie: in the folder beside this package, in the source as in an installed program."""

from pathlib import Path

FOLDER = Path(__file__).resolve().parents[1] / "demo_shafts"


def demo_shafts() -> list[Path]:
    """The demo shaft files, by name."""
    return sorted(FOLDER.glob("*.shaft.json"))
