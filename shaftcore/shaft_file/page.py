"""The page that describes the format to people, its tables made from the declarations."""

from shaftcore.declared import Choice, Declaration, Part, Quantity, Switch, declared, file_key, may_be_left_out
from shaftcore.shaft import Shaft
from shaftcore.shaft_file.schema import inner_records
from shaftcore.shaft_file.versions import FORMAT, VERSION

HEAD = f"""# Shaft files

A shaft file ends in `.shaft.json` and holds one shaft as JSON in UTF-8, in SI units. The unit is part of
each key: `length_mm`, `torque_Nm`. `shaft_file.schema.json` beside this page is its JSON Schema (draft 2020-12).

- The file is one object. It begins with `"format": "{FORMAT}"` and `"version": {VERSION}`.
- x runs along the shaft from its left end, y points up, z towards the viewer.
- No number and no choice is ever assumed: each must be stated. Texts, lists and what may be `null` may be left out.
- An unknown field, a field given twice, NaN, Infinity or a number outside its range refuses the file.
  The message names every place at fault, what may stand there and what to do.
- Beyond these tables the shaft must be possible: every step has a shoulder, an arc fits its segment, raisers do not
  overlap, a bore leaves material, everything lies on the shaft, ids differ.
- A file whose shaft is not finished (no supports yet, say) is sound and opens; it cannot be analysed.
- Older versions are carried over when read; saving writes version {VERSION}. Equal shafts give equal bytes.
- Files above 20 MB are refused.

This page and the schema are made from the declarations of the records by

    python -m shaftcore.shaft_file
"""


def page_text() -> str:
    """The whole page."""
    sections = [_section("The whole file", Shaft)]
    sections += [_section(_title(cls), cls) for cls in inner_records().values()]
    return "\n".join([HEAD, *sections])


def _title(cls: type) -> str:
    kind = getattr(cls, "kind", None)
    label = str(getattr(cls, "label", cls.__name__))
    return label if kind is None else f'{label} (`"kind": "{kind}"`)'


def _section(title: str, cls: type) -> str:
    rows = [_row(file_key(name, declaration), declaration) for name, declaration in declared(cls).items()]
    head = ["| Field | May be | What it is |", "|---|---|---|"]
    return "\n".join([f"## {title}", "", *head, *rows, ""])


def _row(key: str, declaration: Declaration) -> str:
    words = ". ".join(part.rstrip(".") for part in (declaration.label, declaration.words) if part)
    left_out = "; may be left out" if may_be_left_out(declaration) else ""
    return f"| `{key}` | {_allowed(declaration)}{left_out} | {words}. |"


def _allowed(declaration: Declaration) -> str:
    if isinstance(declaration, Quantity):
        return declaration.allowed(in_file=True).replace(", or none", ", or `null`")
    if isinstance(declaration, Choice):
        return ", ".join(f"`{value}`" for value, _ in declaration.options) + ", or `null`" * declaration.optional
    if isinstance(declaration, Switch):
        return "`true`, `false`"
    if isinstance(declaration, Part):
        kinds = " or ".join(str(getattr(kind, "label", kind.__name__)) for kind in declaration.kinds)
        many = f"list of {declaration.most} at most: {kinds}" if declaration.many else kinds
        return many + ", or `null`" * declaration.optional
    return declaration.allowed()
