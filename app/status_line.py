"""The one line at the foot of the window: which station governs, and by how much."""

from app.document import Scene
from shaftcore.number_text import shown, with_unit


def status_words(scene: Scene) -> str:
    """Governing station, factor and margins; or what is missing."""
    results = scene.results
    if results is None:
        return scene.missing[0].remedy[:1].upper() + scene.missing[0].remedy[1:] if scene.missing else ""
    i = results.governing
    judged, station = results.judged, results.stations[i]
    if judged.utilisation[i] == 0:
        return "No station is stressed"
    margin, yielding = (
        with_unit(float(found[i]), "share", scene.system, 1, signed=True)
        for found in (judged.margin, judged.yield_margin)
    )
    n = shown(float(judged.n[i]), "ratio", scene.system, 2)
    words = f"Governing: {station.number} {station.label}   n {n}   margin {margin}   yield {yielding}"
    return f"{words}   provisional" if results.provisional else words
