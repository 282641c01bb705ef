"""The insulated shell as a person describes it: size, faces or one overall figure, openings, fittings.

Part of the contract, checked field by field; ``together`` checks what belongs together, ``enclosure`` and
``overall`` turn it into conductances. Called by ``definition``.
"""

from __future__ import annotations

from typing import Annotated, Any, Literal

from pydantic import Discriminator, Field, Tag

from app.stores.asks import (
    CONDUCTIVITY,
    DENSITY,
    FILM,
    MASS,
    SPECIFIC_HEAT,
    U_VALUE,
    fraction,
    hours,
    length,
    temperature,
)
from app.stores.fields import KEY, NAME, Ask, Part, Quantity


class BoxInside(Part):
    """Inside dimensions of a box."""

    width: Annotated[Quantity, length("Inside width", 0.05, 200.0)]
    depth: Annotated[Quantity, length("Inside depth", 0.05, 200.0)]
    height: Annotated[Quantity, length("Inside height", 0.05, 40.0)]


class CylinderInside(Part):
    """Inside dimensions of an upright cylinder."""

    diameter: Annotated[Quantity, length("Inside diameter", 0.05, 50.0)]
    height: Annotated[Quantity, length("Inside height", 0.05, 40.0)]


class Layer(Part):
    """One layer of a face: a material of the table, or its own numbers."""

    thickness_m: Annotated[Quantity, length("Thickness of the layer", 0.00005, 1.5)]
    material: Annotated[str | None, Ask("Material"), KEY] = None
    conductivity_w_per_m_k: Annotated[Quantity | None, CONDUCTIVITY] = None
    density_kg_per_m3: Annotated[Quantity | None, DENSITY] = None
    specific_heat_j_per_kg_k: Annotated[Quantity | None, SPECIFIC_HEAT] = None


class FixedTemperature(Part):
    """Beyond a face: something that keeps one temperature."""

    temperature_c: Annotated[Quantity, temperature("Temperature beyond the face", -60.0, 80.0)]


class Films(Part):
    """Film coefficients on the two sides of a face."""

    inside: Annotated[Quantity, FILM]
    outside: Annotated[Quantity, FILM]


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
    u_w_per_m2_k: Annotated[Quantity | None, U_VALUE] = None
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
    wall_thickness_m: Annotated[Quantity | None, length("Thickness of the walls", 0.001, 1.0)] = None


class HeatLeak(_OverallPart):
    """The whole store by its heat leak."""

    heat_leak_w_per_k: Annotated[Quantity, Ask("Heat leak", "W/K", "watts per kelvin", 0.001, 10000.0)]


class KValue(_OverallPart):
    """The whole store by its K-value on the mean area."""

    k_w_per_m2_k: Annotated[Quantity, Ask("K-value", "W/m²·K", "watts per square metre and kelvin", 0.02, 10.0)]


class EnergyUse(_OverallPart):
    """The whole store by the energy that its appliance uses."""

    energy_kwh_per_day: Annotated[Quantity, Ask("Energy use", "kWh/day", "kilowatt-hours per day", 0.01, 500.0)]
    at_room_c: Annotated[Quantity, temperature("Room in the energy test", 0.0, 50.0)]
    inside_c: Annotated[Quantity, temperature("Inside in the energy test", -95.0, 20.0)]
    cop: Annotated[Quantity, Ask("Coefficient of performance", "", "", 0.2, 8.0, "Cold made per energy used.")]


class RiseTime(_OverallPart):
    """The whole store by the time in which it warmed with the power off."""

    rise_time_h: Annotated[Quantity, hours("Temperature-rise time", 0.05, 1000.0)]
    from_c: Annotated[Quantity, temperature("From")]
    to_c: Annotated[Quantity, temperature("To")]
    at_room_c: Annotated[Quantity, temperature("Room in the test", 0.0, 50.0)]
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
    width_m: Annotated[Quantity, length("Width of the opening", 0.05, 20.0)]
    height_m: Annotated[Quantity, length("Height of the opening", 0.05, 20.0)]
    u_w_per_m2_k: Annotated[Quantity | None, U_VALUE] = None
    seal_leak_m3_per_h: Annotated[
        Quantity | None, Ask("Leak of the seals, door shut", "m³/h", "cubic metres an hour", 0.0, 5000.0)
    ] = None
    curtain_effectiveness: Annotated[Quantity | None, fraction("Effectiveness of the curtain")] = None


class Fitting(Part):
    """Racks, liner, coil: bare material inside that must warm too."""

    material: Annotated[str, Ask("Material"), KEY]
    mass_kg: Annotated[Quantity, MASS]


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
