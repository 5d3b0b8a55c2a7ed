"""Surface finishes by the names of the trade (values in the file, words shown)."""

FINISHES: tuple[tuple[str, str], ...] = (
    ("ground", "ground"),
    ("machined", "machined or cold-drawn"),
    ("hot-rolled", "hot-rolled"),
    ("as-forged", "as forged"),
)
