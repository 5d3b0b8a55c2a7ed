"""A published worked example as it is written down beside this module."""

import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from pathlib import Path

HERE = Path(__file__).parent


@dataclass(frozen=True)
class Published:
    """One figure of the source, and how near the program must come and why no nearer."""

    quantity: str
    value: float
    tolerance: float
    reason: str


@dataclass(frozen=True)
class Example:
    name: str
    source: str
    edition: str
    inputs: Mapping[str, float]
    published: tuple[Published, ...]


def read(path: Path) -> Example:
    """The example in a file; ValueError where source, edition, or the reason of a tolerance is missing."""
    content = tomllib.loads(path.read_text(encoding="utf-8"))
    for key in ("source", "edition", "inputs", "published"):
        if not content.get(key):
            raise ValueError(f"{path.name} has no {key}")
    published = tuple(Published(**entry) for entry in content["published"])
    for entry in published:
        if not entry.reason or not entry.tolerance > 0:
            raise ValueError(f"{path.name}: {entry.quantity} has no tolerance with a reason")
    return Example(path.stem, content["source"], content["edition"], content["inputs"], published)


EXAMPLES: dict[str, Example] = {path.stem: read(path) for path in sorted(HERE.glob("*.toml"))}
