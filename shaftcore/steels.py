"""Strength of heat-treatable steels by diameter, as data.

Lower bounds of the tensile and yield strength after EN 10083 (quenched and tempered, +QT), written
from memory; the strength falls with the diameter at heat treatment. State the values of the
material's own certificate wherever there is one.
"""

from dataclasses import dataclass

from shaftcore.errors import QuantityError
from shaftcore.shaft import Material

FROM_MEMORY = "from memory, lower bounds"


@dataclass(frozen=True)
class Steel:
    """A steel; `rows` are (largest diameter mm, tensile strength MPa, yield strength MPa), thinnest first."""

    name: str
    standard: str
    rows: tuple[tuple[float, float, float], ...]

    @property
    def thickest(self) -> float:
        """The largest diameter (mm) the standard gives strengths for."""
        return self.rows[-1][0]


STEELS: dict[str, Steel] = {
    steel.name: steel
    for steel in (
        Steel("C45E+QT", "EN 10083-2", ((16, 700, 490), (40, 650, 430), (100, 630, 370))),
        Steel(
            "42CrMo4+QT",
            "EN 10083-3",
            ((16, 1100, 900), (40, 1000, 750), (100, 900, 650), (160, 800, 550), (250, 750, 500)),
        ),
        Steel(
            "34CrNiMo6+QT",
            "EN 10083-3",
            ((16, 1200, 1000), (40, 1100, 900), (100, 1000, 800), (160, 900, 700), (250, 800, 600)),
        ),
    )
}


def steel_material(name: str, diameter: float) -> Material:
    """The steel's material record for a diameter at heat treatment (mm).

    Raises QuantityError for an unknown steel or a diameter its standard gives no strength for.
    """
    steel = STEELS.get(name)
    if steel is None:
        raise QuantityError(f'"{name}" is no steel of the list; allowed: {", ".join(STEELS)}')
    if not 0 < diameter <= steel.thickest:
        raise QuantityError(
            f"{diameter:g} mm: {steel.standard} gives strengths of {name} above 0 up to {steel.thickest:g} mm; "
            "enter the strengths of your own material"
        )
    low = 0.0
    for high, tensile, yielding in steel.rows:
        if diameter <= high:
            span = f"diameter up to {high:g} mm" if low == 0 else f"diameter above {low:g} up to {high:g} mm"
            source = f"{steel.standard}, {span} ({FROM_MEMORY})"
            return Material(name=name, tensile_strength=tensile, yield_strength=yielding, source=source)
        low = high
    raise AssertionError("a diameter within the rows lies in one of them")
