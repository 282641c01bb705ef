"""The store as a person describes it, and as JSON: the contract of the API, checked.

Field names are the contract's. Every field carries an ``Ask``: label, unit, range, hint. What belongs together
across fields is checked in ``reading``; numbers are turned into physics in ``network_of``.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import Annotated, Any, Literal

from pydantic import Discriminator, Field, Tag

from app.stores.asks import CONDUCTIVITY, DENSITY, FILM, MASS, SPECIFIC_HEAT, fraction, hours, length, temperature
from app.stores.fields import KEY, NAME, Ask, Number, Part, Quantity, Whole
from app.stores.rooms import TemperatureHistory
from app.stores.shell import Enclosure, KValue


class Composition(Part):
    """Mass fractions of a food that is not in the table; carbohydrate without fibre."""

    water: Annotated[Quantity, fraction("Water")]
    protein: Annotated[Quantity, fraction("Protein")] = Quantity(value=0.0)
    fat: Annotated[Quantity, fraction("Fat")] = Quantity(value=0.0)
    carbohydrate: Annotated[Quantity, fraction("Carbohydrate without fibre")] = Quantity(value=0.0)
    fibre: Annotated[Quantity, fraction("Fibre")] = Quantity(value=0.0)
    ash: Annotated[Quantity, fraction("Ash")] = Quantity(value=0.0)


class PlainSubstance(Part):
    """Something that only warms."""

    specific_heat_j_per_kg_k: Annotated[Number, SPECIFIC_HEAT]
    conductivity_w_per_m_k: Annotated[Number, CONDUCTIVITY]
    density_kg_per_m3: Annotated[Number, DENSITY]


class CurveSubstance(Part):
    """Something whose enthalpy was measured: increasing, straight between its points."""

    temperature_c: Annotated[
        tuple[Number, ...], Field(min_length=2, max_length=200), temperature("Temperatures", -150.0, 150.0)
    ]
    enthalpy_j_per_kg: Annotated[
        tuple[Number, ...],
        Field(min_length=2, max_length=200),
        Ask("Enthalpies", "J/kg", "joules per kilogram", -1e7, 1e7),
    ]
    conductivity_w_per_m_k: Annotated[Number, CONDUCTIVITY]
    density_kg_per_m3: Annotated[Number, DENSITY]


def _substance_kind(given: Any) -> str:
    if isinstance(given, str):
        return "tag:named"
    names = given if isinstance(given, dict) else getattr(type(given), "model_fields", {})
    return "tag:curve" if "temperature_c" in names or "enthalpy_j_per_kg" in names else "tag:plain"


Substance = Annotated[
    Annotated[Literal["water", "aqueous"], Tag("tag:named")]
    | Annotated[PlainSubstance, Tag("tag:plain")]
    | Annotated[CurveSubstance, Tag("tag:curve")],
    Discriminator(_substance_kind),
]

_COUNT = Ask("How many", "", "", 1, 100000)
_WIDTH = length("Width", 0.002, 50.0)
_DEPTH = length("Depth", 0.002, 50.0)
_HEIGHT = length("Height", 0.002, 20.0)


class Packs(Part):
    """Single packs with air all round each."""

    kind: Literal["packs"]
    count: Annotated[Whole, _COUNT]
    width_m: Annotated[Quantity, _WIDTH]
    depth_m: Annotated[Quantity, _DEPTH]
    height_m: Annotated[Quantity, _HEIGHT]


class Cartons(Part):
    """Cartons stacked close together into one or more blocks."""

    kind: Literal["cartons"]
    count: Annotated[Whole, _COUNT]
    width_m: Annotated[Quantity, _WIDTH]
    depth_m: Annotated[Quantity, _DEPTH]
    height_m: Annotated[Quantity, _HEIGHT]
    blocks: Annotated[Whole, Ask("Number of blocks", "", "", 1, 1000)] = 1


class Pallet(Part):
    """Loaded pallets; the dimensions are those of one load."""

    kind: Literal["pallet"]
    count: Annotated[Whole, _COUNT] = 1
    width_m: Annotated[Quantity, _WIDTH]
    depth_m: Annotated[Quantity, _DEPTH]
    height_m: Annotated[Quantity, _HEIGHT]


class Carcass(Part):
    """Hanging carcasses or sides, as cylinders."""

    kind: Literal["carcass"]
    count: Annotated[Whole, _COUNT] = 1
    length_m: Annotated[Quantity, length("Length", 0.05, 5.0)]
    diameter_m: Annotated[Quantity, length("Diameter", 0.01, 2.0)]


class Bottles(Part):
    """Standing bottles with air between them."""

    kind: Literal["bottles"]
    count: Annotated[Whole, _COUNT]
    diameter_m: Annotated[Quantity, length("Diameter", 0.005, 1.0)]
    height_m: Annotated[Quantity, length("Height", 0.01, 2.0)]


class Bulk(Part):
    """Loose in one heap, bin or tank."""

    kind: Literal["bulk"]
    width_m: Annotated[Quantity, _WIDTH]
    depth_m: Annotated[Quantity, _DEPTH]
    height_m: Annotated[Quantity, _HEIGHT]


class Exposed(Part):
    """By the area that meets the air and the depth behind it."""

    kind: Literal["exposed"]
    area_m2: Annotated[Quantity, Ask("Area in the air", "m²", "square metres", 0.0001, 100000.0)]
    half_thickness_m: Annotated[Quantity, length("Depth behind the surface", 0.0005, 5.0)]


Stacking = Annotated[Packs | Cartons | Pallet | Carcass | Bottles | Bulk | Exposed, Field(discriminator="kind")]


class Packaging(Part):
    """Boxes, bottles, pallets: material that warms with the contents."""

    material: Annotated[str, Ask("Material"), KEY]
    mass_kg: Annotated[Quantity, MASS]


Point = Literal["warmest", "mean", "coldest"]
_LONGER = hours("For longer than", hint="In one stretch.")


class PresetLimit(Part):
    """A published limit, by its name in the table."""

    kind: Literal["preset"] = "preset"
    preset: Annotated[str, Ask("Published limit"), KEY]


class AboveLimit(Part):
    """Not warmer than a temperature, or not for long."""

    kind: Literal["above"]
    temperature_c: Annotated[Number, temperature("Not warmer than")]
    longer_than_h: Annotated[Number, _LONGER] = 0.0
    at: Annotated[Point, Ask("Judged at")] = "warmest"


class BelowLimit(Part):
    """Not colder than a temperature, or not for long."""

    kind: Literal["below"]
    temperature_c: Annotated[Number, temperature("Not colder than")]
    longer_than_h: Annotated[Number, _LONGER] = 0.0
    at: Annotated[Point, Ask("Judged at")] = "coldest"


class MeanKineticLimit(Part):
    """Mean kinetic temperature over a trailing window."""

    kind: Literal["mean_kinetic"]
    temperature_c: Annotated[Number, temperature("Mean kinetic temperature not above")]
    window_h: Annotated[Number, hours("Window", 0.1, 8760.0)] = 24.0
    activation_kj_per_mol: Annotated[Number, Ask("Activation energy", "kJ/mol", "kilojoules per mole", 10, 500)] = (
        83.144
    )
    at: Annotated[Point, Ask("Judged at")] = "warmest"


class ThawedLimit(Part):
    """Not more than a share of the ice of the start melted."""

    kind: Literal["thawed"]
    share: Annotated[Number, fraction("Melted share not above")]


class GrowthLimit(Part):
    """Predicted growth of an organism: known to the contract, not worked out yet."""

    kind: Literal["growth"]
    organism: Annotated[str, Ask("Organism"), KEY]
    log10: Annotated[Number, Ask("Growth", "log10", "", 0.0, 12.0)]


def _limit_kind(given: Any) -> str | None:
    kind = given.get("kind") if isinstance(given, dict) else getattr(given, "kind", None)
    if kind is None and isinstance(given, dict) and "preset" in given:
        return "preset"
    return kind if isinstance(kind, str) else None


Limit = Annotated[
    Annotated[PresetLimit, Tag("preset")]
    | Annotated[AboveLimit, Tag("above")]
    | Annotated[BelowLimit, Tag("below")]
    | Annotated[MeanKineticLimit, Tag("mean_kinetic")]
    | Annotated[ThawedLimit, Tag("thawed")]
    | Annotated[GrowthLimit, Tag("growth")],
    Discriminator(_limit_kind),
]


class Contents(Part):
    """One item or lot: what it is, how much, how it stands, what it must not pass."""

    name: Annotated[str, Ask("Name"), NAME]
    food: Annotated[str | None, Ask("Food of the table"), KEY] = None
    composition: Annotated[Composition | None, Ask("Composition")] = None
    initial_freezing_c: Annotated[Quantity | None, temperature("Freezing begins at", -38.0, -0.05)] = None
    substance: Annotated[Substance | None, Ask("Substance")] = None
    freezing_c: Annotated[Quantity | None, temperature("Freezing point", -38.0, 0.0)] = None
    mass_kg: Annotated[Quantity, MASS]
    start_c: Annotated[Quantity, temperature("Temperature at the start", hint="What was held, not the set point.")]
    stacking: Annotated[Stacking, Ask("How it stands")]
    packaging: Annotated[tuple[Packaging, ...], Ask("Packaging"), Field(max_length=10)] = ()
    film_w_per_m2_k: Annotated[Quantity | None, FILM] = None
    place: Annotated[Literal["top", "middle", "bottom"], Ask("Place")] = "middle"
    limits: Annotated[tuple[Limit, ...], Ask("Limits"), Field(max_length=12)] = ()


class Coolant(Part):
    """Ice, packs and plates that take up heat."""

    name: Annotated[str, Ask("Name"), NAME]
    coolant: Annotated[str, Ask("Coolant of the table"), KEY]
    mass_kg: Annotated[Quantity, MASS]
    start_c: Annotated[Quantity | None, temperature("Temperature at the start")] = None
    area_m2: Annotated[Quantity | None, Ask("Area in the air", "m²", "square metres", 0.0001, 10000.0)] = None
    film_w_per_m2_k: Annotated[Quantity | None, FILM] = None
    added_at_h: Annotated[Number, hours("Added at")] = 0.0
    wrapping_w_per_k: Annotated[Quantity | None, Ask("Wrapping", "W/K", "watts per kelvin", 0.001, 1000.0)] = None


class Surroundings(Part):
    """What is around the store."""

    room: Annotated[TemperatureHistory, Ask("Room around the store")]
    outdoors: Annotated[TemperatureHistory | None, Ask("Outdoors")] = None
    ground: Annotated[dict[str, Any] | None, Ask("Ground under the floor")] = None
    sun: Annotated[dict[str, Any] | None, Ask("Sun on roof and walls")] = None


class Start(Part):
    """The state at the loss of power."""

    air_c: Annotated[Quantity | None, temperature("Air inside at the start")] = None


class Outage(Part):
    """How long to look, and what happens meanwhile."""

    horizon_h: Annotated[Number, hours("Look ahead", 0.5, 2400.0)] = 96.0
    door_openings: Annotated[tuple[dict[str, Any], ...], Ask("Door openings"), Field(max_length=1000)] = ()
    power: Annotated[tuple[dict[str, Any], ...], Ask("Generator or power back"), Field(max_length=100)] = ()


class StoreDefinition(Part):
    """One store: the document of the contract."""

    definition_version: Annotated[Literal[1], Ask("Version of the definition")] = 1
    name: Annotated[str, Ask("Name of the store"), NAME] = "Store"
    enclosure: Annotated[Enclosure, Ask("Size and walls")]
    contents: Annotated[tuple[Contents, ...], Ask("Contents"), Field(min_length=1, max_length=60)]
    coolants: Annotated[tuple[Coolant, ...], Ask("Coolants"), Field(max_length=40)] = ()
    air_limits: Annotated[tuple[Limit, ...], Ask("Limits on the air"), Field(max_length=12)] = ()
    surroundings: Annotated[Surroundings, Ask("Surroundings")]
    start: Annotated[Start, Ask("At the start")] = Start()
    outage: Annotated[Outage, Ask("The outage")] = Outage()

    def given_but_unused(self) -> tuple[str, ...]:
        """Fields that were given and are described, but change no answer of this store."""
        found = []
        for where in ("room", "outdoors"):
            history = getattr(self.surroundings, where)
            for path, place in _places(f"surroundings.{where}", history):
                found += [f"{path}.{name}" for name in _NOT_USED_OF_PLACES if getattr(place, name) is not None]
        faces = self.enclosure.faces
        beyond = () if faces is None else (faces.walls.beyond, faces.ceiling.beyond, faces.floor.beyond)
        if self.surroundings.outdoors is not None and "outdoors" not in beyond:
            found.append("surroundings.outdoors")
        overall = self.enclosure.overall
        if overall is not None and not isinstance(overall, KValue):
            found += [f"enclosure.overall.{name}" for name in _USED_FOR_K if getattr(overall, name) is not None]
        return tuple(found)


_NOT_USED_OF_PLACES = ("relative_humidity", "volume_m3", "air_changes_per_h")
_USED_FOR_K = ("inside_area_m2", "wall_thickness_m")


def _places(path: str, history: Any) -> Iterator[tuple[str, Any]]:
    """A history and the one that it drifts towards, with their paths."""
    if history is not None:
        yield path, history
        yield from _places(f"{path}.towards", getattr(history, "towards", None))
