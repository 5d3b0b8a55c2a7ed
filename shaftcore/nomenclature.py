"""The one list of station quantities: key, symbol, name, dimension and where it comes from.

Ledger columns, CSV heads, the sheet's table and the manual are made from this list.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np

from shaftcore.declared import Quantity
from shaftcore.notch_factors import LOAD_ROWS
from shaftcore.notches._contract import LoadSort
from shaftcore.number_text import Entry, writer
from shaftcore.reactions import reactions_at
from shaftcore.results import Results
from shaftcore.units import System


@dataclass(frozen=True)
class Column:
    """One quantity of every station; `values(results)` gives floats (internal units) or words.

    NaN in `values` never happens; inf stands for "unloaded", and where a quantity has no meaning
    (a notch size at a plain section) the entry is None.
    """

    key: str
    symbol: str
    label: str
    dimension: str
    values: Callable[[Results], Sequence[Entry]]
    words: str = ""
    decimals: int | None = None
    signed: bool = False

    @property
    def csv_head(self) -> str:
        """Key with the unit as in the file, for the CSV head."""
        return (
            self.key if not self.dimension else self.key + Quantity(self.label, self.dimension, 0, 0).dimension.suffix
        )

    def writer(self, system: System) -> Callable[[Entry], str]:
        """A function that writes its values, in the unit of `system` and without it."""
        return writer(self.dimension, system, self.decimals, self.signed)


def _size(name: str) -> Callable[[Results], Sequence[float | None]]:
    return lambda r: [None if s.site is None else s.site.sizes.get(name) for s in r.stations]


def _notch(field: str, sort: LoadSort) -> Callable[[Results], Sequence[float]]:
    row = LOAD_ROWS[sort]
    return lambda r: getattr(r.factors, field)[row].tolist()


def _judged(field: str) -> Callable[[Results], Sequence[float]]:
    return lambda r: getattr(r.judged, field).tolist()


def _nominal(field: str) -> Callable[[Results], Sequence[float]]:
    return lambda r: getattr(r.judged.nominal, field).tolist()


def _strength(field: str) -> Callable[[Results], Sequence[float]]:
    return lambda r: np.broadcast_to(getattr(r.judged.strength, field), len(r.stations)).tolist()


def _reactions(part: int) -> Callable[[Results], Sequence[float | None]]:
    """The largest reaction across the shaft at each station, None where no support stands."""

    def values(results: Results) -> Sequence[float | None]:
        at = [[reaction.across[part] for _, reaction in reactions_at(results, i)] for i in range(len(results.stations))]
        return [max(found, default=None) for found in at]

    return values


def _flags(results: Results) -> Sequence[str]:
    return ["; ".join(dict.fromkeys(notice.key for notice in said)) for said in results.notices_by_station()]


COLUMNS: tuple[Column, ...] = (
    Column("station", "No.", "Station", "", lambda r: [s.number for s in r.stations]),
    Column("place", "", "Place", "", lambda r: [s.label for s in r.stations]),
    Column("x", "x", "Position", "length", lambda r: [s.x for s in r.stations]),
    Column("margin", "margin", "Margin, fatigue", "share", _judged("margin"), "n/n_asked - 1", 1, True),
    Column("yield_margin", "margin_y", "Margin, yield", "share", _judged("yield_margin"), "n_y/n_y,asked - 1", 1, True),
    Column("n", "n", "Factor, fatigue", "ratio", _judged("n")),
    Column("n_yield", "n_y", "Factor, yield", "ratio", _judged("n_yield")),
    Column("utilisation", "u", "Utilisation", "share", _judged("utilisation"), "larger of n_asked/n of both checks", 1),
    Column("d", "d", "Net diameter", "length", _judged("d"), "of the section the nominal stress is taken on"),
    Column("bore", "d_i", "Bore", "length", _judged("bore")),
    Column("large_d", "D", "Large diameter", "length", _size("D")),
    Column("radius", "r", "Root radius", "length", _size("r")),
    Column("moment", "M", "Bending moment, mean", "torque", lambda r: np.hypot(*r.at.moment[0]).tolist()),
    Column(
        "moment_amplitude", "M_a", "Bending moment, pulsation", "torque", lambda r: np.hypot(*r.at.moment[1]).tolist()
    ),
    Column("torque", "T", "Torque, mean", "torque", lambda r: r.at.torque[0].tolist()),
    Column("torque_amplitude", "T_a", "Torque, amplitude", "torque", lambda r: r.at.torque[1].tolist()),
    Column("normal", "N", "Axial force, mean", "force", lambda r: r.at.normal[0].tolist(), "positive in tension"),
    Column("reaction", "R", "Reaction, mean", "force", _reactions(0), "of the support there, across the shaft"),
    Column("reaction_amplitude", "R_a", "Reaction, pulsation", "force", _reactions(1)),
    Column("bending_amplitude", "σ_b,a", "Bending stress, amplitude", "stress", _nominal("bending_amplitude")),
    Column("bending_mean", "σ_b,m", "Bending stress, mean", "stress", _nominal("bending_mean")),
    Column("axial_amplitude", "σ_ax,a", "Axial stress, amplitude", "stress", _nominal("axial_amplitude")),
    Column("axial_mean", "σ_ax,m", "Axial stress, mean", "stress", _nominal("axial_mean")),
    Column("torsion_amplitude", "τ_a", "Torsion stress, amplitude", "stress", _nominal("torsion_amplitude")),
    Column("torsion_mean", "τ_m", "Torsion stress, mean", "stress", _nominal("torsion_mean")),
    Column("kt_bending", "Kt,b", "Stress concentration, bending", "ratio", _notch("kt", "bending")),
    Column("kt_axial", "Kt,ax", "Stress concentration, axial", "ratio", _notch("kt", "tension")),
    Column("kt_torsion", "Kts", "Stress concentration, torsion", "ratio", _notch("kt", "torsion")),
    Column("q_bending", "q", "Notch sensitivity, bending", "ratio", _notch("q", "bending")),
    Column("q_torsion", "q_s", "Notch sensitivity, torsion", "ratio", _notch("q", "torsion")),
    Column("kf_bending", "Kf,b", "Fatigue factor, bending", "ratio", _notch("kf", "bending")),
    Column("kf_axial", "Kf,ax", "Fatigue factor, axial", "ratio", _notch("kf", "tension")),
    Column("kf_torsion", "Kfs", "Fatigue factor, torsion", "ratio", _notch("kf", "torsion")),
    Column("ka", "k_a", "Finish factor", "ratio", _strength("ka")),
    Column("kb", "k_b", "Size factor", "ratio", _strength("kb")),
    Column("kd", "k_d", "Temperature factor", "ratio", _strength("kd")),
    Column("ke", "k_e", "Reliability factor", "ratio", _strength("ke")),
    Column("endurance", "S_e", "Endurance limit", "stress", _strength("endurance")),
    Column("amplitude", "σ_a'", "Equivalent amplitude", "stress", _judged("amplitude")),
    Column("mean", "σ_m'", "Equivalent mean", "stress", _judged("mean")),
    Column("greatest", "σ_max'", "Greatest equivalent stress", "stress", _judged("greatest")),
    Column("deflection", "w", "Deflection, mean loads", "deflection", lambda r: np.hypot(*r.at.deflection[0]).tolist()),
    Column("slope", "φ", "Slope, mean loads", "slope", lambda r: np.hypot(*r.at.slope[0]).tolist()),
    Column("flags", "", "Notices", "", _flags),
)
BY_KEY: dict[str, Column] = {column.key: column for column in COLUMNS}
