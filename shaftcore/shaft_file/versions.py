"""The format's name and version, and how files of older versions are carried over."""

from collections.abc import Callable, Mapping
from typing import Any

from shaftcore.errors import ShaftFileError
from shaftcore.records import Problem
from shaftcore.shaft_file.file_numbers import Number
from shaftcore.shaft_file.json_text import shown

FORMAT = "filletwright shaft"
VERSION = 2

Migration = Callable[[dict[str, Any]], dict[str, Any]]


NEW_IN_2 = ("stiffness_N_per_mm", "offset_y_mm", "offset_z_mm")


def _in_line(content: dict[str, Any]) -> dict[str, Any]:
    """Supports of version 1 are rigid and in line: their offsets are 0."""
    supports = content.get("supports", [])
    for support in supports if isinstance(supports, list) else ():
        if isinstance(support, dict):
            if any(key in support for key in NEW_IN_2):
                raise ValueError("no field of version 1")
            support.update(offset_y_mm=0.0, offset_z_mm=0.0)
    return content


MIGRATIONS: Mapping[int, Migration] = {1: _in_line}
"""By version n: what turns the content of a file of version n into one of version n + 1.

A migration is given the whole object of the file, numbers as floats, and returns the new one (it may be the same).
"""


def migrated(
    content: dict[str, Any], migrations: Mapping[int, Migration] = MIGRATIONS, newest: int = VERSION
) -> dict[str, Any]:
    """The content as of the newest version. Raises ShaftFileError for a foreign or unknown version."""
    if content.get("format") != FORMAT:
        raise ShaftFileError(
            [Problem("format", _shown(content, "format"), f'"{FORMAT}"', "open a shaft file of this program")]
        )
    version = _version(content, newest)
    if version > newest:
        raise ShaftFileError(
            [Problem("version", str(version), f"up to {newest}", "open it with a newer version of the program")]
        )
    for step in range(version, newest):
        try:
            content = migrations[step](content)
        except (LookupError, TypeError, ValueError, AttributeError) as error:
            raise ShaftFileError(
                [
                    Problem(
                        "", f"version {step}", f"a sound file of version {step}", "restore an earlier copy of the file"
                    )
                ]
            ) from error
    return {**content, "version": newest}


def _version(content: dict[str, Any], newest: int) -> int:
    value = content.get("version")
    if isinstance(value, Number) and value.text.isascii() and value.text.isdigit() and 1 <= value < 1e6:
        return int(value.text)
    raise ShaftFileError(
        [Problem("version", _shown(content, "version"), f"a whole number, 1 to {newest}", "state the version")]
    )


def _shown(content: dict[str, Any], key: str) -> str:
    return shown(content[key]) if key in content else "missing"
