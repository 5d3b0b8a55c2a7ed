"""A steel and the band of diameters at heat treatment: picking one writes its strengths into the material."""

from dataclasses import replace

from PySide6.QtWidgets import QComboBox, QGridLayout, QLabel, QWidget

from app.document import Document, Scene
from app.error_messages import guarded
from app.panels.dress import GAP, quiet
from app.panels.editors import ChoiceField
from shaftcore.declared import Choice, Quantity
from shaftcore.number_text import editable, unit_symbol
from shaftcore.shaft import Material, Shaft
from shaftcore.steels import STEELS, steel_material
from shaftcore.units import System

OWN = "own values"
STEEL = Choice("Steel", tuple((name, name) for name in STEELS), optional=True, none_words=OWN)
BAND = Quantity("Diameter at heat treatment", "length", 0.0, 1e4)
WORDS = "Lower bounds of the standard. State the values of your material's own certificate wherever there is one."


class SteelPicker(QWidget):
    """Shows the steel whose strengths the material has; none of them where the user's own stand there."""

    fills = Material
    """The record it writes."""

    def __init__(self, document: Document) -> None:
        super().__init__()
        self._document = document
        self.steel = ChoiceField(STEEL)
        self.band = QComboBox()
        self.band.setAccessibleName(BAND.label)
        self.band.setPlaceholderText("no steel chosen")
        grid = QGridLayout(self)
        grid.setContentsMargins(0, 0, 0, 0)
        grid.setHorizontalSpacing(2 * GAP)
        grid.setVerticalSpacing(GAP)
        grid.setColumnStretch(0, 4)
        grid.setColumnStretch(1, 5)
        for row, (words, field) in enumerate(((STEEL.label, self.steel), (BAND.label, self.band))):
            label = QLabel(words)
            label.setWordWrap(True)
            label.setBuddy(field)
            grid.addWidget(label, row, 0)
            grid.addWidget(field, row, 1)
        grid.addWidget(quiet(WORDS), 2, 0, 1, 2)
        self.steel.committed.connect(self._steel_picked)
        self.band.activated.connect(self._band_picked)

    def show_scene(self, scene: Scene) -> None:
        """The steel and band that give the shaft's strengths."""
        name = _steel_of(scene.shaft.material)
        self.steel.set_value(name)
        self.band.clear()
        self.band.setEnabled(name is not None)
        if name is None:
            return
        low = 0.0
        for high, _, _ in STEELS[name].rows:
            self.band.addItem(_band_words(low, high, scene.system), high)
            if steel_material(name, high).source == scene.shaft.material.source:
                self.band.setCurrentIndex(self.band.count() - 1)
            low = high

    @guarded
    def _steel_picked(self, name: str | None) -> None:
        if name is None:
            self._take(replace(self._document.shaft.material, name="steel", source=""))
        else:
            self._take(steel_material(name, min(_thickest(self._document.shaft), STEELS[name].thickest)))

    @guarded
    def _band_picked(self, index: int) -> None:
        name = _steel_of(self._document.shaft.material)
        if name is not None:
            self._take(steel_material(name, self.band.itemData(index)))

    def _take(self, material: Material) -> None:
        """The strengths and where they come from; the stiffness stays as it was given."""
        before = self._document.shaft.material
        kept = replace(material, elastic_modulus=before.elastic_modulus, poisson_ratio=before.poisson_ratio)
        self._document.change(replace(self._document.shaft, material=kept), f"Material: {kept.name}", "material.steel")


def _steel_of(material: Material) -> str | None:
    """The steel of the list that has these strengths under this name and source."""
    if material.name not in STEELS:
        return None
    stated = (material.source, material.tensile_strength, material.yield_strength)
    for high, _, _ in STEELS[material.name].rows:
        listed = steel_material(material.name, high)
        if stated == (listed.source, listed.tensile_strength, listed.yield_strength):
            return material.name
    return None


def _thickest(shaft: Shaft) -> float:
    """The largest diameter of the shaft (mm), or a usual one while nothing is drawn."""
    return max((max(s.diameter, s.right_diameter) for s in shaft.segments), default=50.0)


def _band_words(low: float, high: float, system: System) -> str:
    top = f"{editable(high, BAND, system)} {unit_symbol('length', system)}"
    return f"above {editable(low, BAND, system)} up to {top}" if low else f"up to {top}"
