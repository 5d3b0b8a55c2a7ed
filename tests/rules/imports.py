"""Which module imports which, read from the source without running it."""

import ast
from collections.abc import Iterator, Mapping
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]


def sources_under(package: str) -> dict[str, str]:
    """Dotted module name -> source text of every module of a package."""
    found = {}
    for path in sorted((ROOT / package).rglob("*.py")):
        parts = path.relative_to(ROOT).with_suffix("").parts
        found[".".join(parts[:-1] if parts[-1] == "__init__" else parts)] = path.read_text(encoding="utf-8")
    return found


def imported_by(source: str, modules: Mapping[str, str], at_run_time: bool = False) -> Iterator[str]:
    """Dotted names a source text imports, inside functions too; `from a import b` is a.b where that is a module.

    `at_run_time` leaves out what is imported for the type checker alone.
    """
    tree = _RunTime().visit(ast.parse(source)) if at_run_time else ast.parse(source)
    for node in ast.walk(tree):
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            origin = "." * node.level + (node.module or "")
            names = [f"{origin}.{alias.name}" for alias in node.names]
            yield from (name if name in modules else origin for name in names)


class _RunTime(ast.NodeTransformer):
    def visit_If(self, node: ast.If) -> ast.AST:
        return ast.Pass() if ast.unparse(node.test) == "TYPE_CHECKING" else node
