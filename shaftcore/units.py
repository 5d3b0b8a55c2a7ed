"""The only conversion numbers of the project.

Inside, everything is mm, N, N·mm, MPa, °C, degree, t/mm³. A *dimension* says how a number of that
sort is written in the file (always SI) and shown or typed in either system.
Inch, pound-force and their kin: exact by the international yard and pound (25.4 mm, 4.4482216152605 N).
"""

from dataclasses import dataclass
from typing import Literal

System = Literal["SI", "US"]
SYSTEMS: tuple[System, ...] = ("SI", "US")

INCH = 25.4
POUND_FORCE = 4.4482216152605


@dataclass(frozen=True)
class Unit:
    """A unit as read by people: internal = (shown - zero) * factor."""

    symbol: str
    factor: float = 1.0
    zero: float = 0.0
    decimals: int = 2

    def shown(self, internal: float) -> float:
        return internal / self.factor + self.zero

    def internal(self, shown: float) -> float:
        return (shown - self.zero) * self.factor


@dataclass(frozen=True)
class Dimension:
    """How numbers of one sort are written: `suffix` ends the file key, `file` is the unit there."""

    suffix: str
    file: Unit
    si: Unit
    us: Unit

    def unit(self, system: System) -> Unit:
        return self.si if system == "SI" else self.us


def _same(suffix: str, unit: Unit, us: Unit | None = None) -> Dimension:
    return Dimension(suffix, unit, unit, us or unit)


DIMENSIONS: dict[str, Dimension] = {
    "length": _same("_mm", Unit("mm"), Unit("in", INCH, decimals=4)),
    "force": _same("_N", Unit("N", decimals=0), Unit("lbf", POUND_FORCE, decimals=1)),
    "torque": _same("_Nm", Unit("N·m", 1e3, decimals=1), Unit("lbf·in", POUND_FORCE * INCH, decimals=0)),
    "stress": _same("_MPa", Unit("MPa", decimals=1), Unit("ksi", 1e3 * POUND_FORCE / INCH**2, decimals=2)),
    "modulus": Dimension(
        "_MPa",
        Unit("MPa"),
        Unit("GPa", 1e3, decimals=1),
        Unit("Msi", 1e6 * POUND_FORCE / INCH**2, decimals=2),
    ),
    "stiffness": _same("_N_per_mm", Unit("N/mm", decimals=0), Unit("lbf/in", POUND_FORCE / INCH, decimals=0)),
    "temperature": _same("_C", Unit("°C", decimals=0), Unit("°F", 5 / 9, 32, decimals=0)),
    "angle": _same("_deg", Unit("°", decimals=1)),
    "ratio": _same("", Unit("", decimals=3)),
    "share": Dimension("", Unit(""), Unit("%", 0.01, decimals=3), Unit("%", 0.01, decimals=3)),
    "deflection": _same("_mm", Unit("mm", decimals=4), Unit("in", INCH, decimals=6)),
    "slope": Dimension("_rad", Unit("rad"), Unit("mrad", 1e-3, decimals=3), Unit("mrad", 1e-3, decimals=3)),
}


def dimension(name: str) -> Dimension:
    """The dimension of that name; KeyError is a programming slip, never the user's."""
    return DIMENSIONS[name]


ALSO_READ: dict[str, tuple[Unit, ...]] = {
    "length": (Unit("cm", 10.0), Unit("m", 1e3), Unit("µm", 1e-3), Unit("ft", 12 * INCH)),
    "force": (Unit("kN", 1e3), Unit("lb", POUND_FORCE)),
    "torque": (Unit("kN·m", 1e6), Unit("N·mm"), Unit("lbf·ft", 12 * POUND_FORCE * INCH)),
    "stress": (Unit("GPa", 1e3), Unit("N/mm²"), Unit("psi", POUND_FORCE / INCH**2)),
    "stiffness": (Unit("N/µm", 1e3), Unit("kN/mm", 1e3)),
    "angle": (Unit("deg"),),
    "temperature": (Unit("C"), Unit("F", 5 / 9, 32)),
}
"""Units that may be typed besides those shown."""


def readable_units(name: str) -> tuple[Unit, ...]:
    """Every unit in which a number of that dimension may be typed."""
    sort = DIMENSIONS[name]
    return (sort.si, sort.us, sort.file, *ALSO_READ.get(name, ()))
