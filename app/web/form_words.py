"""What the form adds to the definition's own words: ways of giving a thing, names of choices, what is folded away.

Data only, keyed by the names of models and fields; a field or a choice that is not named here still works.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from types import MappingProxyType

_NONE: Mapping[str, str] = MappingProxyType({})


@dataclass(frozen=True)
class Way:
    """One way of giving a thing: the fields that it shows, what it fixes, and which variant it means."""

    key: str
    label: str
    fields: tuple[str, ...]
    fixed: Mapping[str, str] = field(default_factory=lambda: _NONE)
    variant: Mapping[str, str] = field(default_factory=lambda: _NONE)


@dataclass(frozen=True)
class Ways:
    """The ways of one model, under the label of the control that chooses between them."""

    label: str
    ways: tuple[Way, ...]

    def of(self, key: str) -> Way:
        """A way by its key; the first when there is no such key."""
        return next((way for way in self.ways if way.key == key), self.ways[0])

    @property
    def names(self) -> frozenset[str]:
        """All fields that depend on the way."""
        return frozenset(name for way in self.ways for name in (*way.fields, *way.fixed))


def _overall(key: str, label: str) -> Way:
    return Way(key, label, ("overall",), variant={"overall": key})


WAYS: Mapping[str, Ways] = {
    "Enclosure": Ways(
        "How the insulation is known",
        (
            Way("faces", "Face by face: layers or U-values", ("faces",)),
            _overall("energy_use", "By the energy the appliance uses"),
            _overall("rise_time", "By a switch-off test, or the rise time of a data sheet"),
            _overall("k_value", "By the K-value of the whole body"),
            _overall("heat_leak", "By its heat leak"),
        ),
    ),
    "Face": Ways(
        "Known by",
        (Way("layers", "Its layers", ("layers",)), Way("u_value", "Its U-value", ("u_w_per_m2_k",))),
    ),
    "Layer": Ways(
        "Material from",
        (
            Way("table", "The table", ("material",)),
            Way(
                "own",
                "Own numbers",
                ("conductivity_w_per_m_k", "density_kg_per_m3", "specific_heat_j_per_kg_k"),
            ),
        ),
    ),
    "Contents": Ways(
        "What it is",
        (
            Way("food", "A food of the table", ("food",)),
            Way("composition", "A food by its composition", ("composition", "initial_freezing_c")),
            Way("water", "Water", (), fixed={"substance": "water"}),
            Way("aqueous", "A solution in water", ("freezing_c",), fixed={"substance": "aqueous"}),
            Way("plain", "Something that only warms", ("substance",), variant={"substance": "plain_substance"}),
            Way("curve", "Something with a measured curve", ("substance",), variant={"substance": "curve_substance"}),
        ),
    ),
}

LINKED: Mapping[str, tuple[str, Mapping[str, str]]] = {
    "inside_m": ("shape", {"box": "box_inside", "cylinder": "cylinder_inside"})
}
"""Variants that another field of the same model chooses."""

FOLDED: Mapping[str, frozenset[str]] = {
    "Enclosure": frozenset({"bridges_w_per_k", "edge_factors", "fittings"}),
    "Face": frozenset({"films_w_per_m2_k"}),
    "HeatLeak": frozenset({"wall_mass_kg", "inside_area_m2", "wall_thickness_m"}),
    "KValue": frozenset({"wall_mass_kg", "inside_area_m2", "wall_thickness_m"}),
    "EnergyUse": frozenset({"wall_mass_kg", "inside_area_m2", "wall_thickness_m"}),
    "RiseTime": frozenset({"wall_mass_kg", "inside_area_m2", "wall_thickness_m"}),
    "Contents": frozenset({"packaging", "film_w_per_m2_k"}),
    "Coolant": frozenset({"area_m2", "film_w_per_m2_k", "wrapping_w_per_k"}),
    "MeanKineticLimit": frozenset({"window_h", "activation_kj_per_mol"}),
}
"""Fields that few people need."""

UNLESS_GIVEN = frozenset(
    {
        "definition_version",
        "curtain_effectiveness",
        "place",
        "added_at_h",
        "relative_humidity",
        "volume_m3",
        "air_changes_per_h",
    }
)
"""Fields that change no answer yet: asked only where an opened definition has them."""

CHOICES: Mapping[str, Mapping[str, str]] = {
    "shape": {"box": "Box", "cylinder": "Upright cylinder"},
    "in_face": {"walls": "Walls", "ceiling": "Ceiling or top", "floor": "Floor"},
    "beyond": {
        "room": "The room around the store",
        "outdoors": "Outdoors",
        "ground": "The ground (not worked out yet)",
        "fixed_temperature": "Something that keeps one temperature",
    },
    "at": {"warmest": "Its warmest point", "mean": "Its mean", "coldest": "Its coldest point"},
    "stacking": {
        "packs": "Single packs, air all round each",
        "cartons": "Cartons close together, in blocks",
        "pallet": "Loaded pallets",
        "carcass": "Hanging carcasses or sides",
        "bottles": "Standing bottles or drums",
        "bulk": "Loose in one heap, bin or tank",
        "exposed": "By the area that meets the air",
    },
    "limits": {
        "preset": "A published limit",
        "above": "Not warmer than",
        "below": "Not colder than",
        "mean_kinetic": "Mean kinetic temperature",
        "thawed": "Share of ice melted",
        "growth": "Predicted growth (not worked out yet)",
    },
    "room": {
        "constant": "One temperature all the time",
        "ramp": "An even change, then level",
        "day": "Warmer by day, cooler by night",
        "series": "Temperatures at times",
        "drift": "Drifts once its own cooling has stopped",
    },
}
CHOICES = {
    **CHOICES,
    "air_limits": CHOICES["limits"],
    "outdoors": CHOICES["room"],
    "towards": CHOICES["room"],
}

YES_NO = {"yes": "Yes", "no": "No"}

KNOWN = {
    "": "not said",
    "measured": "measured",
    "data_sheet": "data sheet",
    "estimated": "estimated",
    "typical": "typical",
}

ITEMS: Mapping[str, tuple[str, str]] = {
    "layers": ("Layer", "Add a layer"),
    "openings": ("Opening", "Add a door or lid"),
    "fittings": ("Fitting", "Add a rack, liner or coil"),
    "contents": ("Item", "Add an item"),
    "packaging": ("Packaging", "Add packaging"),
    "limits": ("Limit", "Add a limit"),
    "coolants": ("Coolant", "Add a coolant"),
    "air_limits": ("Limit on the air", "Add a limit on the air"),
    "films_w_per_m2_k": ("Films", "Give the films"),
    "outdoors": ("Outdoors", "Describe outdoors"),
}
"""What one member of a list is called, and the words on the button that adds one."""

BLANKS: Mapping[str, Mapping[str, str]] = {
    "contents": {"limits[0]:item": ""},
}
"""What stands in a new member besides its empty fields."""

LABELS: Mapping[str, str] = {
    "enclosure": "",
    "surroundings": "",
    "start": "",
    "outage": "",
    "faces": "",
    "overall": "",
    "composition": "Composition, as fractions of 1",
    "substance": "Its own numbers",
    "walls": "Walls",
    "ceiling": "Ceiling",
    "floor": "Floor",
    "towards": "Towards",
    "inside": "Inside",
    "outside": "Outside",
}
"""Headings of groups where the field's own label would say too much or too little."""
