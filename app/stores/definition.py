"""The store as a person describes it, and as JSON: the contract of the API, checked.

Field names are the contract's. Every field carries an ``Ask``: label, unit, range, hint. What belongs together
across fields is checked in ``reading``; numbers are turned into physics in ``network_of``.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import Annotated, Any, Literal

from pydantic import Discriminator, Field, Tag

from app.stores.fields import KEY, NAME, Ask, Number, Part, Quantity, Whole

# A length, mass or temperature that many fields share; each use gives its own label.


def _length(label: str, low: float, high: float, hint: str = "") -> Ask:
    return Ask(label, "m", "metres", low, high, hint)


def _temperature(label: str, low: float = -120.0, high: float = 60.0, hint: str = "") -> Ask:
    return Ask(label, "°C", "degrees Celsius", low, high, hint)


def _hours(label: str, low: float = 0.0, high: float = 8760.0, hint: str = "") -> Ask:
    return Ask(label, "h", "hours", low, high, hint)


def _fraction(label: str, hint: str = "") -> Ask:
    return Ask(label, "", "as a fraction of 1", 0.0, 1.0, hint)


_CONDUCTIVITY = Ask("Conductivity", "W/m·K", "watts per metre and kelvin", 0.001, 500.0)
_DENSITY = Ask("Density", "kg/m³", "kilograms per cubic metre", 1.0, 12000.0)
_SPECIFIC_HEAT = Ask("Specific heat", "J/kg·K", "joules per kilogram and kelvin", 100.0, 10000.0)
_FILM = Ask(
    "Film coefficient",
    "W/m²·K",
    "watts per square metre and kelvin",
    0.05,
    10000.0,
    "Convection and radiation together, held constant.",
)
_U_VALUE = Ask("U-value", "W/m²·K", "watts per square metre and kelvin", 0.01, 10.0, "Air to air, films included.")
_MASS = Ask("Mass", "kg", "kilograms", 0.001, 1_000_000.0)


class BoxInside(Part):
    """Inside dimensions of a box."""

    width: Annotated[Quantity, _length("Inside width", 0.05, 200.0)]
    depth: Annotated[Quantity, _length("Inside depth", 0.05, 200.0)]
    height: Annotated[Quantity, _length("Inside height", 0.05, 40.0)]


class CylinderInside(Part):
    """Inside dimensions of an upright cylinder."""

    diameter: Annotated[Quantity, _length("Inside diameter", 0.05, 50.0)]
    height: Annotated[Quantity, _length("Inside height", 0.05, 40.0)]


class Layer(Part):
    """One layer of a face: a material of the table, or its own numbers."""

    thickness_m: Annotated[Quantity, _length("Thickness of the layer", 0.00005, 1.5)]
    material: Annotated[str | None, Ask("Material"), KEY] = None
    conductivity_w_per_m_k: Annotated[Quantity | None, _CONDUCTIVITY] = None
    density_kg_per_m3: Annotated[Quantity | None, _DENSITY] = None
    specific_heat_j_per_kg_k: Annotated[Quantity | None, _SPECIFIC_HEAT] = None


class FixedTemperature(Part):
    """Beyond a face: something that keeps one temperature."""

    temperature_c: Annotated[Quantity, _temperature("Temperature beyond the face", -60.0, 80.0)]


class Films(Part):
    """Film coefficients on the two sides of a face."""

    inside: Annotated[Quantity, _FILM]
    outside: Annotated[Quantity, _FILM]


def _beyond_kind(given: Any) -> str:
    return "tag:fixed" if isinstance(given, (dict, FixedTemperature)) else "tag:named"


Beyond = Annotated[
    Annotated[Literal["room", "outdoors", "ground"], Tag("tag:named")] | Annotated[FixedTemperature, Tag("tag:fixed")],
    Discriminator(_beyond_kind),
]


class Face(Part):
    """Walls, ceiling or floor: layers from outside to inside, or a U-value."""

    layers: Annotated[
        tuple[Layer, ...] | None, Ask("Layers, from outside to inside"), Field(min_length=1, max_length=12)
    ] = None
    u_w_per_m2_k: Annotated[Quantity | None, _U_VALUE] = None
    films_w_per_m2_k: Annotated[Films | None, Ask("Films")] = None
    beyond: Annotated[Beyond, Ask("What lies beyond")] = "room"


class Faces(Part):
    """The faces of a store; all four walls together, or the round wall of a cylinder."""

    walls: Face
    ceiling: Face
    floor: Face


class _OverallPart(Part):
    """What any overall figure may say of the wall besides."""

    wall_mass_kg: Annotated[Quantity | None, Ask("Mass of the walls", "kg", "kilograms", 0.01, 1e6)] = None
    inside_area_m2: Annotated[Quantity | None, Ask("Inside area", "m²", "square metres", 0.01, 1e5)] = None
    wall_thickness_m: Annotated[Quantity | None, _length("Thickness of the walls", 0.001, 1.0)] = None


class HeatLeak(_OverallPart):
    """The whole store by its heat leak."""

    heat_leak_w_per_k: Annotated[Quantity, Ask("Heat leak", "W/K", "watts per kelvin", 0.001, 10000.0)]


class KValue(_OverallPart):
    """The whole store by its K-value on the mean area."""

    k_w_per_m2_k: Annotated[Quantity, Ask("K-value", "W/m²·K", "watts per square metre and kelvin", 0.02, 10.0)]


class EnergyUse(_OverallPart):
    """The whole store by the energy that its appliance uses."""

    energy_kwh_per_day: Annotated[Quantity, Ask("Energy use", "kWh/day", "kilowatt-hours per day", 0.01, 500.0)]
    at_room_c: Annotated[Quantity, _temperature("Room in the energy test", 0.0, 50.0)]
    inside_c: Annotated[Quantity, _temperature("Inside in the energy test", -95.0, 20.0)]
    cop: Annotated[Quantity, Ask("Coefficient of performance", "", "", 0.2, 8.0, "Cold made per energy used.")]


class RiseTime(_OverallPart):
    """The whole store by the time in which it warmed with the power off."""

    rise_time_h: Annotated[Quantity, _hours("Temperature-rise time", 0.05, 1000.0)]
    from_c: Annotated[Quantity, _temperature("From")]
    to_c: Annotated[Quantity, _temperature("To")]
    at_room_c: Annotated[Quantity, _temperature("Room in the test", 0.0, 50.0)]
    test_load_kg: Annotated[Quantity, Ask("Test load", "kg", "kilograms", 0.1, 100000.0)]
    test_load_food: Annotated[str, Ask("What the test load is"), KEY] = "test_package"


_OVERALL_MARKS = {
    "heat_leak_w_per_k": "tag:heat_leak",
    "k_w_per_m2_k": "tag:k_value",
    "energy_kwh_per_day": "tag:energy_use",
    "rise_time_h": "tag:rise_time",
}


def _overall_kind(given: Any) -> str:
    names = given if isinstance(given, dict) else getattr(type(given), "model_fields", {})
    return next((tag for name, tag in _OVERALL_MARKS.items() if name in names), "tag:heat_leak")


Overall = Annotated[
    Annotated[HeatLeak, Tag("tag:heat_leak")]
    | Annotated[KValue, Tag("tag:k_value")]
    | Annotated[EnergyUse, Tag("tag:energy_use")]
    | Annotated[RiseTime, Tag("tag:rise_time")],
    Discriminator(_overall_kind),
]


class Opening(Part):
    """A door or lid: its leaf and its seals."""

    name: Annotated[str, Ask("Name of the opening"), NAME]
    in_face: Annotated[Literal["walls", "ceiling", "floor"], Ask("In which face")] = "walls"
    width_m: Annotated[Quantity, _length("Width of the opening", 0.05, 20.0)]
    height_m: Annotated[Quantity, _length("Height of the opening", 0.05, 20.0)]
    u_w_per_m2_k: Annotated[Quantity | None, _U_VALUE] = None
    seal_leak_m3_per_h: Annotated[
        Quantity | None, Ask("Leak of the seals, door shut", "m³/h", "cubic metres an hour", 0.0, 5000.0)
    ] = None
    curtain_effectiveness: Annotated[Quantity | None, _fraction("Effectiveness of the curtain")] = None


class Fitting(Part):
    """Racks, liner, coil: bare material inside that must warm too."""

    material: Annotated[str, Ask("Material"), KEY]
    mass_kg: Annotated[Quantity, _MASS]


def _inside_kind(given: Any) -> str:
    names = given if isinstance(given, dict) else getattr(type(given), "model_fields", {})
    return "tag:cylinder" if "diameter" in names else "tag:box"


Inside = Annotated[
    Annotated[BoxInside, Tag("tag:box")] | Annotated[CylinderInside, Tag("tag:cylinder")],
    Discriminator(_inside_kind),
]


class Enclosure(Part):
    """The insulated shell, by its faces or by one overall figure."""

    shape: Annotated[Literal["box", "cylinder"], Ask("Shape")] = "box"
    inside_m: Annotated[Inside, Ask("Inside dimensions")]
    faces: Annotated[Faces | None, Ask("Faces")] = None
    overall: Annotated[Overall | None, Ask("Overall figure")] = None
    openings: Annotated[tuple[Opening, ...], Ask("Openings"), Field(max_length=20)] = ()
    bridges_w_per_k: Annotated[Quantity | None, Ask("Thermal bridges", "W/K", "watts per kelvin", 0.0, 10000.0)] = None
    fittings: Annotated[tuple[Fitting, ...], Ask("Fittings"), Field(max_length=40)] = ()
    edge_factors: Annotated[bool, Ask("Count edges and corners"), Field(strict=True)] = True


class Composition(Part):
    """Mass fractions of a food that is not in the table; carbohydrate without fibre."""

    water: Annotated[Quantity, _fraction("Water")]
    protein: Annotated[Quantity, _fraction("Protein")] = Quantity(value=0.0)
    fat: Annotated[Quantity, _fraction("Fat")] = Quantity(value=0.0)
    carbohydrate: Annotated[Quantity, _fraction("Carbohydrate without fibre")] = Quantity(value=0.0)
    fibre: Annotated[Quantity, _fraction("Fibre")] = Quantity(value=0.0)
    ash: Annotated[Quantity, _fraction("Ash")] = Quantity(value=0.0)


class PlainSubstance(Part):
    """Something that only warms."""

    specific_heat_j_per_kg_k: Annotated[Number, _SPECIFIC_HEAT]
    conductivity_w_per_m_k: Annotated[Number, _CONDUCTIVITY]
    density_kg_per_m3: Annotated[Number, _DENSITY]


class CurveSubstance(Part):
    """Something whose enthalpy was measured: increasing, straight between its points."""

    temperature_c: Annotated[
        tuple[Number, ...], Field(min_length=2, max_length=200), _temperature("Temperatures", -150.0, 150.0)
    ]
    enthalpy_j_per_kg: Annotated[
        tuple[Number, ...],
        Field(min_length=2, max_length=200),
        Ask("Enthalpies", "J/kg", "joules per kilogram", -1e7, 1e7),
    ]
    conductivity_w_per_m_k: Annotated[Number, _CONDUCTIVITY]
    density_kg_per_m3: Annotated[Number, _DENSITY]


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
_WIDTH = _length("Width", 0.002, 50.0)
_DEPTH = _length("Depth", 0.002, 50.0)
_HEIGHT = _length("Height", 0.002, 20.0)


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
    length_m: Annotated[Quantity, _length("Length", 0.05, 5.0)]
    diameter_m: Annotated[Quantity, _length("Diameter", 0.01, 2.0)]


class Bottles(Part):
    """Standing bottles with air between them."""

    kind: Literal["bottles"]
    count: Annotated[Whole, _COUNT]
    diameter_m: Annotated[Quantity, _length("Diameter", 0.005, 1.0)]
    height_m: Annotated[Quantity, _length("Height", 0.01, 2.0)]


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
    half_thickness_m: Annotated[Quantity, _length("Depth behind the surface", 0.0005, 5.0)]


Stacking = Annotated[Packs | Cartons | Pallet | Carcass | Bottles | Bulk | Exposed, Field(discriminator="kind")]


class Packaging(Part):
    """Boxes, bottles, pallets: material that warms with the contents."""

    material: Annotated[str, Ask("Material"), KEY]
    mass_kg: Annotated[Quantity, _MASS]


Point = Literal["warmest", "mean", "coldest"]
_LONGER = _hours("For longer than", hint="In one stretch.")


class PresetLimit(Part):
    """A published limit, by its name in the table."""

    kind: Literal["preset"] = "preset"
    preset: Annotated[str, Ask("Published limit"), KEY]


class AboveLimit(Part):
    """Not warmer than a temperature, or not for long."""

    kind: Literal["above"]
    temperature_c: Annotated[Number, _temperature("Not warmer than")]
    longer_than_h: Annotated[Number, _LONGER] = 0.0
    at: Annotated[Point, Ask("Judged at")] = "warmest"


class BelowLimit(Part):
    """Not colder than a temperature, or not for long."""

    kind: Literal["below"]
    temperature_c: Annotated[Number, _temperature("Not colder than")]
    longer_than_h: Annotated[Number, _LONGER] = 0.0
    at: Annotated[Point, Ask("Judged at")] = "coldest"


class MeanKineticLimit(Part):
    """Mean kinetic temperature over a trailing window."""

    kind: Literal["mean_kinetic"]
    temperature_c: Annotated[Number, _temperature("Mean kinetic temperature not above")]
    window_h: Annotated[Number, _hours("Window", 0.1, 8760.0)] = 24.0
    activation_kj_per_mol: Annotated[Number, Ask("Activation energy", "kJ/mol", "kilojoules per mole", 10, 500)] = (
        83.144
    )
    at: Annotated[Point, Ask("Judged at")] = "warmest"


class ThawedLimit(Part):
    """Not more than a share of the ice of the start melted."""

    kind: Literal["thawed"]
    share: Annotated[Number, _fraction("Melted share not above")]


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
    initial_freezing_c: Annotated[Quantity | None, _temperature("Freezing begins at", -38.0, -0.05)] = None
    substance: Annotated[Substance | None, Ask("Substance")] = None
    freezing_c: Annotated[Quantity | None, _temperature("Freezing point", -38.0, 0.0)] = None
    mass_kg: Annotated[Quantity, _MASS]
    start_c: Annotated[Quantity, _temperature("Temperature at the start", hint="What was held, not the set point.")]
    stacking: Annotated[Stacking, Ask("How it stands")]
    packaging: Annotated[tuple[Packaging, ...], Ask("Packaging"), Field(max_length=10)] = ()
    film_w_per_m2_k: Annotated[Quantity | None, _FILM] = None
    place: Annotated[Literal["top", "middle", "bottom"], Ask("Place")] = "middle"
    limits: Annotated[tuple[Limit, ...], Ask("Limits"), Field(max_length=12)] = ()


class Coolant(Part):
    """Ice, packs and plates that take up heat."""

    name: Annotated[str, Ask("Name"), NAME]
    coolant: Annotated[str, Ask("Coolant of the table"), KEY]
    mass_kg: Annotated[Quantity, _MASS]
    start_c: Annotated[Quantity | None, _temperature("Temperature at the start")] = None
    area_m2: Annotated[Quantity | None, Ask("Area in the air", "m²", "square metres", 0.0001, 10000.0)] = None
    film_w_per_m2_k: Annotated[Quantity | None, _FILM] = None
    added_at_h: Annotated[Number, _hours("Added at")] = 0.0
    wrapping_w_per_k: Annotated[Quantity | None, Ask("Wrapping", "W/K", "watts per kelvin", 0.001, 1000.0)] = None


class _Place(Part):
    """What any room may say besides its temperature; not used yet."""

    volume_m3: Annotated[Quantity | None, Ask("Volume of the room", "m³", "cubic metres", 0.1, 1e7)] = None
    air_changes_per_h: Annotated[Quantity | None, Ask("Air changes", "1/h", "per hour", 0.0, 1000.0)] = None


class _History(_Place):
    """What a room may say whose temperature is not a list; not used yet."""

    relative_humidity: Annotated[Quantity | None, _fraction("Relative humidity")] = None


_AROUND = ("Temperature", -60.0, 70.0)


class ConstantHistory(_History):
    """One temperature all the time."""

    kind: Literal["constant"]
    temperature_c: Annotated[Quantity, _temperature(*_AROUND)]


class RampHistory(_History):
    """An even change, then level."""

    kind: Literal["ramp"]
    from_c: Annotated[Quantity, _temperature("From", -60.0, 70.0)]
    to_c: Annotated[Quantity, _temperature("To", -60.0, 70.0)]
    over_h: Annotated[Quantity, _hours("In", 0.01)]


class DayHistory(_History):
    """A day swing."""

    kind: Literal["day"]
    mean_c: Annotated[Quantity, _temperature("Mean of the day", -60.0, 70.0)]
    swing_k: Annotated[Quantity, Ask("Swing either side of the mean", "K", "kelvin", 0.0, 40.0)]
    peak_hour: Annotated[Quantity, Ask("Warmest at", "h", "o'clock", 0.0, 24.0)] = Quantity(value=15.0)
    start_hour: Annotated[Quantity, Ask("Power is lost at", "h", "o'clock", 0.0, 24.0)] = Quantity(value=12.0)


class SeriesHistory(_Place):
    """Temperatures at times, straight between them."""

    kind: Literal["series"]
    time_h: Annotated[tuple[Number, ...], Field(min_length=2, max_length=20000), _hours("Times")]
    temperature_c: Annotated[
        tuple[Number, ...], Field(min_length=2, max_length=20000), _temperature("Temperatures", -60.0, 70.0)
    ]
    relative_humidity: Annotated[
        tuple[Number, ...] | None, Field(max_length=20000), _fraction("Relative humidity at those times")
    ] = None


SteadyHistory = Annotated[ConstantHistory | RampHistory | DayHistory | SeriesHistory, Field(discriminator="kind")]


class DriftHistory(_History):
    """A room that drifts towards another temperature after its own cooling has stopped."""

    kind: Literal["drift"]
    start_c: Annotated[Quantity, _temperature("At the start", -60.0, 70.0)]
    towards: Annotated[SteadyHistory, Ask("Towards")]
    time_constant_h: Annotated[Quantity, _hours("Time constant", 0.05, 1000.0)]


TemperatureHistory = Annotated[
    ConstantHistory | RampHistory | DayHistory | SeriesHistory | DriftHistory, Field(discriminator="kind")
]


class Surroundings(Part):
    """What is around the store."""

    room: Annotated[TemperatureHistory, Ask("Room around the store")]
    outdoors: Annotated[TemperatureHistory | None, Ask("Outdoors")] = None
    ground: Annotated[dict[str, Any] | None, Ask("Ground under the floor")] = None
    sun: Annotated[dict[str, Any] | None, Ask("Sun on roof and walls")] = None


class Start(Part):
    """The state at the loss of power."""

    air_c: Annotated[Quantity | None, _temperature("Air inside at the start")] = None


class Outage(Part):
    """How long to look, and what happens meanwhile."""

    horizon_h: Annotated[Number, _hours("Look ahead", 0.5, 2400.0)] = 96.0
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
