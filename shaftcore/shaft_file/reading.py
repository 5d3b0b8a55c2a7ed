"""From the text of a shaft file to a Shaft, all problems of the file gathered on the way.

No field is listed here: the declarations of the records say what may stand where.
"""

import difflib
from collections.abc import Iterable
from pathlib import Path
from typing import Any

from shaftcore.declared import Choice, Declaration, Part, Quantity, declared, file_key, may_be_left_out
from shaftcore.errors import ShaftFileError
from shaftcore.field_problems import plain_problem
from shaftcore.records import Problem
from shaftcore.shaft import Shaft
from shaftcore.shaft_file.file_numbers import internal
from shaftcore.shaft_file.json_text import LARGEST_FILE, Object, decoded, key_shown, parsed, shown
from shaftcore.shaft_file.versions import migrated
from shaftcore.soundness import problems_of
from shaftcore.whole_file import read_at_most

MOST_PROBLEMS = 200
"""A file with more problems than this is no shaft file; the rest is not looked for."""


def read_shaft(path: Path) -> Shaft:
    """The shaft of a file; it may be unfinished. Raises FileAccessError or ShaftFileError."""
    return shaft_from_bytes(read_at_most(path, LARGEST_FILE + 1), path.name)


def shaft_from_bytes(content: bytes, name: str = "") -> Shaft:
    """The shaft of a file's bytes; `name` begins the messages. Raises ShaftFileError."""
    try:
        return _shaft(decoded(content))
    except ShaftFileError as error:
        raise ShaftFileError(error.problems, name) from error


def shaft_from_text(text: str, name: str = "") -> Shaft:
    """The shaft of a file's text; `name` begins the messages. Raises ShaftFileError."""
    try:
        return _shaft(text)
    except ShaftFileError as error:
        raise ShaftFileError(error.problems, name) from error


def _shaft(text: str) -> Shaft:
    content = migrated(parsed(text))
    reader = _Reader()
    shaft = reader.record(Shaft, content, "", also=("format", "version"))
    if reader.problems:
        raise ShaftFileError(reader.problems)
    wrong = [problem for problem in problems_of(shaft) if problem.severity == "wrong"]
    if wrong:
        raise ShaftFileError(wrong)
    return shaft


class _Reader:
    """Walks the file beside the declarations. What could not be read is noted and stands in as None."""

    def __init__(self) -> None:
        self.problems: list[Problem] = []

    def note(self, path: str, value: str, allowed: str, remedy: str) -> None:
        if len(self.problems) < MOST_PROBLEMS:
            self.problems.append(Problem(path, value, allowed, remedy))

    def record(self, cls: type, content: Any, path: str, also: tuple[str, ...] = ()) -> Any:
        """One record of that class; `path` is "" or ends in a dot, `also` names keys that are no fields."""
        if not isinstance(content, dict):
            self.note(path.rstrip("."), shown(content), "an object { … }", f"give the {_label(cls)} as an object")
            return None
        keys = {file_key(name, declaration): (name, declaration) for name, declaration in declared(cls).items()}
        meant = self._foreign_keys(content, path, [*keys, *also])
        values = {}
        for key, (name, declaration) in keys.items():
            if key in content:
                values[name] = self._field(declaration, content[key], path + key)
            elif key not in meant and not may_be_left_out(declaration):
                self.note(path + key, "missing", _allowed(declaration), f'add "{key}"; nothing is assumed for it')
        return None if self.problems else cls(**values)

    def _foreign_keys(self, content: dict[str, Any], path: str, known: list[str]) -> set[str]:
        """Note keys that are unknown or doubled; the known keys that the unknown ones seem to mean."""
        meant = set()
        for key in content.doubled if isinstance(content, Object) else ():
            self.note(path + key_shown(key), "given more than once", "each field once", "keep the one that is right")
        for key in content:
            if key not in known:
                absent = [word for word in known if word not in content]
                near = nearest(key, absent or known)
                meant.update(near)
                remedy = f'write "{near[0]}"' if near else "remove it"
                self.note(path + key_shown(key), "unknown field", _listed(known), remedy)
                if len(self.problems) >= MOST_PROBLEMS:
                    break
        return meant

    def _field(self, declaration: Declaration, content: Any, path: str) -> Any:
        if isinstance(declaration, Part):
            if content is None and declaration.optional:
                return None
            if declaration.many:
                return self._list(declaration, content, path)
            return self._one_of(declaration, content, path)
        value = content
        if isinstance(declaration, Quantity) and isinstance(content, float):
            value = internal(content, declaration.dimension.file)
        problem = plain_problem(declaration, value)
        if problem is not None:
            near = nearest(content, [v for v, _ in declaration.options]) if isinstance(declaration, Choice) else []
            self.note(path, shown(content), problem.allowed, f'write "{near[0]}"' if near else problem.remedy)
        return value

    def _list(self, part: Part, content: Any, path: str) -> tuple[Any, ...]:
        if not isinstance(content, list):
            self.note(path, shown(content), "a list [ … ]", "put the entries into square brackets")
            return ()
        if len(content) > part.most:
            self.note(path, f"{len(content)} entries", f"{part.most} at most", part.too_many)
            return ()
        return tuple(self._one_of(part, entry, f"{path}[{index}]") for index, entry in enumerate(content))

    def _one_of(self, part: Part, content: Any, path: str) -> Any:
        """A record of the part's only class, or of the one its "kind" names."""
        kinds = {getattr(cls, "kind", ""): cls for cls in part.kinds}
        if "" in kinds or not isinstance(content, dict):
            return self.record(part.kinds[0], content, f"{path}.")
        kind = content.get("kind")
        cls = kinds.get(kind) if isinstance(kind, str) else None
        if cls is not None:
            return self.record(cls, content, f"{path}.", also=("kind",))
        near = nearest(kind, kinds)
        remedy = f'write "{near[0]}"' if near else "say which kind it is"
        self.note(f"{path}.kind", shown(kind) if "kind" in content else "missing", _listed(kinds), remedy)
        return None


def nearest(word: Any, words: Iterable[str]) -> list[str]:
    """The right word most like a wrong one, as a list of one or none."""
    return difflib.get_close_matches(word[:80], list(words), 1) if isinstance(word, str) else []


def _label(cls: type) -> str:
    return str(getattr(cls, "label", cls.__name__)).lower()


def _allowed(declaration: Declaration) -> str:
    if isinstance(declaration, Quantity):
        return declaration.allowed(in_file=True)
    return "an object { … }" if isinstance(declaration, Part) else declaration.allowed()


def _listed(words: Iterable[str]) -> str:
    return ", ".join(f'"{word}"' for word in words)
