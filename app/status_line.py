"""The one line at the foot of the window: which station governs, and by how much."""

from app.document import Scene


def status_words(scene: Scene) -> str:
    """Governing station, factor and margins; or what is missing."""
    results = scene.results
    if results is None:
        return scene.missing[0].remedy[:1].upper() + scene.missing[0].remedy[1:] if scene.missing else ""
    i = results.governing
    judged, station = results.judged, results.stations[i]
    if judged.utilisation[i] == 0:
        return "No station is stressed"
    margins = f"margin {judged.margin[i]:+.1%}   yield {judged.yield_margin[i]:+.1%}".replace("-", "−")
    words = f"Governing: {station.number} {station.label}   n {judged.n[i]:.2f}   {margins}"
    return f"{words}   provisional" if results.provisional else words
