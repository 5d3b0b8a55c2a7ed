"""From a Shaft to the text of its file: one order, one spelling of numbers, so equal shafts give equal bytes."""

import json
from pathlib import Path
from typing import Any

from shaftcore.declared import Declaration, Part, Quantity, declared, file_key
from shaftcore.shaft import Shaft
from shaftcore.shaft_file.file_numbers import in_file
from shaftcore.shaft_file.versions import FORMAT, VERSION
from shaftcore.whole_file import write_whole_file

STEP = "  "


def write_shaft(shaft: Shaft, path: Path) -> None:
    """Save whole or not at all. Raises FileAccessError; the file that was there is then untouched."""
    write_whole_file(path, shaft_to_text(shaft).encode())


def shaft_to_text(shaft: Shaft) -> str:
    """The text of the shaft's file, newline at the end."""
    fields = [("format", json.dumps(FORMAT)), ("version", str(VERSION)), *_fields(shaft, STEP)]
    return _braced("{}", [f"{json.dumps(key)}: {value}" for key, value in fields], "") + "\n"


def _fields(record: Any, indent: str) -> list[tuple[str, str]]:
    """(key in the file, text of the value) of every declared field; `indent` is that of the keys."""
    kind = getattr(record, "kind", None)
    head = [] if kind is None else [("kind", json.dumps(kind))]
    return head + [
        (file_key(name, declaration), _value(declaration, getattr(record, name), indent))
        for name, declaration in declared(record).items()
    ]


def _value(declaration: Declaration, value: Any, indent: str) -> str:
    if value is None:
        return "null"
    if isinstance(declaration, Quantity):
        return in_file(value, declaration.dimension.file)
    if not isinstance(declaration, Part):
        return json.dumps(value, ensure_ascii=False)
    if not declaration.many:
        return _object(value, indent)
    return _braced("[]", [_object(entry, indent + STEP) for entry in value], indent)


def _object(record: Any, indent: str) -> str:
    return _braced("{}", [f"{json.dumps(key)}: {value}" for key, value in _fields(record, indent + STEP)], indent)


def _braced(pair: str, lines: list[str], indent: str) -> str:
    if not lines:
        return pair
    inner = f",\n{indent}{STEP}".join(lines)
    return f"{pair[0]}\n{indent}{STEP}{inner}\n{indent}{pair[1]}"
