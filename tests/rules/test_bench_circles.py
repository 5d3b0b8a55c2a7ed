"""The bench's modules stand in an order: none needs another that needs it, not even for its types."""

from imports import imported_by, sources_under


def circle_in(modules: dict[str, str]) -> set[str]:
    """Modules that import one another, whatever the import is for."""
    needs = {m: {t for t in imported_by(s, modules) if t in modules} for m, s in modules.items()}
    while free := [module for module, wanted in needs.items() if not wanted & set(needs)]:
        for module in free:
            del needs[module]
    return set(needs)


def bench_modules() -> dict[str, str]:
    return {name: source for name, source in sources_under("app").items() if name.startswith("app.bench.")}


def test_the_bench_has_no_circle():
    assert circle_in(bench_modules()) == set()


def test_a_planted_circle_is_caught():
    modules = bench_modules()
    modules["app.bench.gesture"] += "\nif TYPE_CHECKING:\n    from app.bench.hand import BenchHand\n"
    assert {"app.bench.gesture", "app.bench.hand", "app.bench.drags"} <= circle_in(modules)
