"""The JSON Schema (draft 2020-12) of shaft files, made from the declarations."""

import json
from typing import Any

from shaftcore.declared import (
    TEXT_PATTERN,
    Choice,
    Declaration,
    Part,
    Quantity,
    Switch,
    declared,
    file_key,
    may_be_left_out,
)
from shaftcore.shaft import Shaft
from shaftcore.shaft_file.file_numbers import in_file
from shaftcore.shaft_file.versions import FORMAT, VERSION

Schema = dict[str, Any]


def shaft_schema() -> Schema:
    """The schema of a whole shaft file. What depends on several fields at once is left to the reader."""
    top = _record(Shaft)
    return {
        "$schema": "https://json-schema.org/draft/2020-12/schema",
        "title": "Filletwright shaft file",
        **top,
        "properties": {
            "format": {"const": FORMAT},
            "version": {"type": "integer", "const": VERSION},
            **top["properties"],
        },
        "required": ["format", "version", *top["required"]],
        "$defs": {name: _record(cls) for name, cls in sorted(inner_records().items())},
    }


def schema_text() -> str:
    """The schema as it is stored beside this package."""
    return json.dumps(shaft_schema(), indent=2, ensure_ascii=False) + "\n"


def inner_records(cls: type = Shaft) -> dict[str, type]:
    """Name -> class of every record that stands inside a shaft, at any depth, in the order of the file."""
    found: dict[str, type] = {}
    for declaration in declared(cls).values():
        for kind in declaration.kinds if isinstance(declaration, Part) else ():
            found |= {kind.__name__: kind} | inner_records(kind)
    return found


def _record(cls: type) -> Schema:
    fields = {file_key(name, declaration): declaration for name, declaration in declared(cls).items()}
    kind = getattr(cls, "kind", None)
    head: Schema = {} if kind is None else {"kind": {"const": kind}}
    return {
        "type": "object",
        "properties": head | {key: _described(declaration) for key, declaration in fields.items()},
        "required": [*head, *(key for key, declaration in fields.items() if not may_be_left_out(declaration))],
        "additionalProperties": False,
    }


def _described(declaration: Declaration) -> Schema:
    words = " — ".join(part for part in (declaration.label, declaration.words) if part)
    return {"description": words, **_value(declaration)}


def _value(declaration: Declaration) -> Schema:
    if isinstance(declaration, Quantity):
        return _number(declaration)
    if isinstance(declaration, Choice):
        return {"enum": [value for value, _ in declaration.options] + [None] * declaration.optional}
    if isinstance(declaration, Switch):
        return {"type": "boolean"}
    if isinstance(declaration, Part):
        return _part(declaration)
    return {
        "type": "string",
        "minLength": declaration.shortest,
        "maxLength": declaration.longest,
        "pattern": TEXT_PATTERN,
    }


def _number(quantity: Quantity) -> Schema:
    low, high = (float(in_file(end, quantity.dimension.file)) for end in (quantity.low, quantity.high))
    return {
        "type": ["number", "null"] if quantity.optional else "number",
        "exclusiveMinimum" if quantity.above else "minimum": low,
        "maximum": high,
    }


def _part(part: Part) -> Schema:
    links = [{"$ref": f"#/$defs/{kind.__name__}"} for kind in part.kinds]
    inner = links[0] if len(links) == 1 else {"oneOf": links}
    if part.many:
        return {"type": "array", "maxItems": part.most, "items": inner}
    return {"anyOf": [inner, {"type": "null"}]} if part.optional else inner
