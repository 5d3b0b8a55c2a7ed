"""Why a change was refused, said by the names the user sees instead of the paths of the file."""

import re
from typing import Any

from shaftcore.declared import declared, file_key
from shaftcore.records import Problem
from shaftcore.shaft import Shaft

_STEP = re.compile(r"(\w+)(?:\[(\d+)\])?")


def refusal_words(shaft: Shaft, problem: Problem) -> str:
    """The place by its name, then value, allowed range and what to do."""
    place = _place(shaft, problem.path)
    value = f"{problem.value}; " if problem.value else ""
    return f"{place}: {value}allowed is {problem.allowed}. {problem.remedy[:1].upper()}{problem.remedy[1:]}."


def _place(shaft: Shaft, path: str) -> str:
    record: Any = shaft
    words: list[str] = []
    for name, index in _STEP.findall(path):
        if not index:
            record = _field(record, name, words)
        else:
            entries = getattr(record, name)
            record = entries[int(index)] if int(index) < len(entries) else None
            if record is not None:
                words.append(f"{record.label} {record.id}")
        if record is None:
            break
    return ", ".join(words) or "The shaft"


def _field(record: Any, key: str, words: list[str]) -> Any:
    """Put the field's label among the words and return what stands in the field."""
    for name, declaration in declared(record).items():
        if file_key(name, declaration) == key:
            words.append(declaration.label.lower() if words else declaration.label)
            value = getattr(record, name)
            return value if hasattr(type(value), "label") else None
    return None
