"""From the bytes of a file to plain JSON values, with all that may be amiss on the way."""

import json
from collections import Counter
from typing import Any, NoReturn

from shaftcore.errors import ShaftFileError
from shaftcore.records import Problem
from shaftcore.shaft_file.file_numbers import Number

LARGEST_FILE = 20_000_000
"""Bytes; a shaft with every list at its most stays well below."""

SHOWN = 60
"""Characters of a wrong value that a message repeats."""


WORDS = {"None": "null", "True": "true", "False": "false", "nan": "NaN", "inf": "Infinity", "-inf": "-Infinity"}


class Object(dict[str, Any]):
    """A JSON object that remembers which keys it was given more than once."""

    doubled: tuple[str, ...] = ()

    def __init__(self, pairs: list[tuple[str, Any]]) -> None:
        super().__init__(pairs)
        if len(self) < len(pairs):
            counts = Counter(key for key, _ in pairs)
            self.doubled = tuple(key for key, count in counts.items() if count > 1)


def decoded(content: bytes) -> str:
    """The text of a file (a byte order mark is passed over). Raises ShaftFileError."""
    if len(content) > LARGEST_FILE:
        _refuse("more than 20 MB", "a file of 20 MB at most", "open a shaft file; no shaft needs this much")
    try:
        return content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        _refuse(f"byte {error.start + 1} is no UTF-8", "text in UTF-8", "save it as UTF-8 or restore an earlier copy")


def parsed(text: str) -> Object:
    """The object a file's text stands for. Raises ShaftFileError."""
    if len(text) > LARGEST_FILE:
        _refuse("more than 20 MB", "a file of 20 MB at most", "open a shaft file; no shaft needs this much")
    if not text.strip():
        _refuse("nothing in it", "a shaft file", "restore an earlier copy of the file")
    try:
        content = json.loads(text, object_pairs_hook=Object, parse_float=Number, parse_int=Number)
    except json.JSONDecodeError as error:
        words = error.msg[:1].lower() + error.msg[1:]
        _refuse(
            f"line {error.lineno}, column {error.colno}: {words}", "JSON", "mend it there or restore an earlier copy"
        )
    except RecursionError:
        _refuse("lists or objects nested too deep", "the nesting of a shaft file", "restore an earlier copy")
    if not isinstance(content, Object):
        _refuse(shown(content), "an object { … }", "open a shaft file")
    return content


def shown(value: Any) -> str:
    """A value of the file as a message repeats it: short, on one line, in printable characters."""
    if isinstance(value, str):
        return f'"{_cut(repr(value[: SHOWN + 1])[1:-1])}"'
    if isinstance(value, dict):
        return "an object"
    if isinstance(value, list):
        return f"a list of {len(value)}"
    return _cut(value.text if isinstance(value, Number) else WORDS.get(str(value), str(value)))


def key_shown(key: str) -> str:
    """A key of the file as it stands in a path, quoted where it is no plain word."""
    return key if key.isascii() and key.isidentifier() and len(key) <= SHOWN else shown(key)


def _cut(text: str) -> str:
    return text if len(text) <= SHOWN else text[: SHOWN - 1] + "…"


def _refuse(value: str, allowed: str, remedy: str) -> NoReturn:
    raise ShaftFileError([Problem("", value, allowed, remedy)])
