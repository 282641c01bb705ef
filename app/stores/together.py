"""What must fit together in a definition whose single fields are right, and what is not worked out yet.

Each check looks at one thing and yields faults with the path of the field to change. Called by ``reading``.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from typing import Any

from app.errors import FieldFault, UnknownKey
from app.reference import coolant_material, food, limit_preset, material
from app.stores.definition import (
    Contents,
    CurveSubstance,
    DriftHistory,
    EnergyUse,
    Face,
    Limit,
    RiseTime,
    SeriesHistory,
    StoreDefinition,
)
from app.stores.geometry import box_faces, cylinder_faces

_PLAUSIBLE_KG_PER_M3 = (20.0, 8000.0)

Faults = Iterator[FieldFault]


def faults_together(definition: StoreDefinition) -> list[FieldFault]:
    """All faults of a definition as a whole, in the order of the form."""
    return [fault for check in _CHECKS for fault in check(definition)]


def _ways(definition: StoreDefinition) -> Faults:
    """Exactly one way of giving each thing."""
    enclosure = definition.enclosure
    if (enclosure.faces is None) == (enclosure.overall is None):
        yield FieldFault("enclosure.faces", "Give either the faces or one overall figure.", None, "one of the two")
    is_round = hasattr(enclosure.inside_m, "diameter")
    if is_round != (enclosure.shape == "cylinder"):
        wanted = "diameter and height" if enclosure.shape == "cylinder" else "width, depth and height"
        yield FieldFault("enclosure.inside_m", f"A {enclosure.shape} has {wanted}.", None, wanted)
    for name, face in _faces(definition):
        yield from _face_ways(f"enclosure.faces.{name}", face, definition)
    for k, contents in enumerate(definition.contents):
        yield from _contents_ways(f"contents[{k}]", contents)


def _face_ways(path: str, face: Face, definition: StoreDefinition) -> Faults:
    if (face.layers is None or not face.layers) == (face.u_w_per_m2_k is None):
        yield FieldFault(path, "Give either layers or a U-value.", None, "one of the two")
    for j, layer in enumerate(face.layers or ()):
        own = layer.conductivity_w_per_m_k is not None
        if own == (layer.material is not None):
            yield FieldFault(
                f"{path}.layers[{j}].material",
                "Give either a material or the layer's own conductivity.",
                layer.material,
                "one of the two",
            )
        if (layer.density_kg_per_m3 is None) != (layer.specific_heat_j_per_kg_k is None):
            yield FieldFault(
                f"{path}.layers[{j}].density_kg_per_m3",
                "Give density and specific heat together, or neither.",
                None,
                "both or neither",
            )
        if layer.material is not None:
            yield from _known(f"{path}.layers[{j}].material", material, layer.material)
    if face.beyond == "outdoors" and definition.surroundings.outdoors is None:
        yield FieldFault(f"{path}.beyond", "Give surroundings.outdoors for a face outdoors.", "outdoors", "room")
    if face.beyond == "ground":
        yield _not_yet(f"{path}.beyond", "A floor on the ground", "ground")


def _contents_ways(path: str, contents: Contents) -> Faults:
    given = [name for name in ("food", "composition", "substance") if getattr(contents, name) is not None]
    if len(given) != 1:
        yield FieldFault(
            f"{path}.food",
            "Give what it is: a food, a composition or a substance, one of them.",
            ", ".join(given),
            "one of food, composition, substance",
        )
    if contents.composition is not None and contents.initial_freezing_c is None:
        yield FieldFault(
            f"{path}.initial_freezing_c",
            "A composition needs the temperature where freezing begins.",
            None,
            "-38 to -0.05 °C",
        )
    if contents.substance == "aqueous" and contents.freezing_c is None:
        yield FieldFault(f"{path}.freezing_c", "A solution needs its freezing point.", None, "-38 to 0 °C")
    if contents.food is not None:
        yield from _known(f"{path}.food", food, contents.food)
    for j, packaging in enumerate(contents.packaging):
        yield from _known(f"{path}.packaging[{j}].material", material, packaging.material)
    if contents.composition is not None:
        shares = contents.composition
        total = sum(getattr(shares, name).value for name in type(shares).model_fields)
        if not 0.95 <= total <= 1.05:
            yield FieldFault(
                f"{path}.composition", f"The fractions add up to {total:.3g}.", total, "a sum of 0.95 to 1.05"
            )
    if isinstance(contents.substance, CurveSubstance):
        yield from _curve(f"{path}.substance", contents.substance)


def _curve(path: str, curve: CurveSubstance) -> Faults:
    temperatures, heats = curve.temperature_c, curve.enthalpy_j_per_kg
    if len(temperatures) != len(heats):
        yield FieldFault(
            f"{path}.enthalpy_j_per_kg",
            "Give as many enthalpies as temperatures.",
            len(heats),
            f"{len(temperatures)} values",
        )
        return
    if any(b <= a for a, b in zip(heats[:-1], heats[1:], strict=True)):
        yield FieldFault(f"{path}.enthalpy_j_per_kg", "Enthalpies must rise.", None, "rising values")
    falls = any(b < a for a, b in zip(temperatures[:-1], temperatures[1:], strict=True))
    if falls or temperatures[0] == temperatures[1] or temperatures[-1] == temperatures[-2]:
        yield FieldFault(
            f"{path}.temperature_c",
            "Temperatures must not fall, nor begin or end with a plateau.",
            None,
            "values that never fall",
        )


def _names(definition: StoreDefinition) -> Faults:
    """Names of tables, and names that tell things apart."""
    for k, coolant in enumerate(definition.coolants):
        path = f"coolants[{k}].coolant"
        if coolant.coolant == "dry_ice":
            yield _not_yet(path, "Dry ice", coolant.coolant)
        else:
            yield from _known(path, coolant_material, coolant.coolant)
    for k, fitting in enumerate(definition.enclosure.fittings):
        yield from _known(f"enclosure.fittings[{k}].material", material, fitting.material)
    overall = definition.enclosure.overall
    if isinstance(overall, RiseTime):
        yield from _known("enclosure.overall.test_load_food", food, overall.test_load_food)
    for path, limit in _limits(definition):
        if limit.kind == "preset":
            yield from _known(f"{path}.preset", limit_preset, limit.preset)
    seen: set[str] = set()
    named = [(f"contents[{k}].name", c.name) for k, c in enumerate(definition.contents)]
    named += [(f"coolants[{k}].name", c.name) for k, c in enumerate(definition.coolants)]
    for path, name in named:
        if name in seen:
            yield FieldFault(
                path, f"There are two things called {name!r}. Give each its own name.", name, "another name"
            )
        seen.add(name)


def _limits_given(definition: StoreDefinition) -> Faults:
    """Something must be asked, and the air has no middle and no ice."""
    if not any(True for _ in _limits(definition)):
        yield FieldFault(
            "contents[0].limits",
            "Give at least one limit: without one nothing ends.",
            None,
            "a published limit, or one of your own",
        )
    for k, limit in enumerate(definition.air_limits):
        if limit.kind == "thawed":
            yield FieldFault(
                f"air_limits[{k}].kind",
                "Air has no ice that could melt.",
                "thawed",
                "above, below, mean_kinetic or a preset",
            )


def _sizes(definition: StoreDefinition) -> Faults:
    """Openings fit their faces; contents fit the inside and weigh what such a volume can."""
    inside = definition.enclosure.inside_m
    if hasattr(inside, "diameter"):
        sizes = cylinder_faces(inside.diameter.value, inside.height.value)
        volume = sizes["floor"].inside_m2 * inside.height.value
    else:
        sizes = box_faces(inside.width.value, inside.depth.value, inside.height.value)
        volume = inside.width.value * inside.depth.value * inside.height.value
    openings: dict[str, float] = {}
    for k, opening in enumerate(definition.enclosure.openings):
        area = opening.width_m.value * opening.height_m.value
        openings[opening.in_face] = openings.get(opening.in_face, 0.0) + area
        room = sizes[opening.in_face].inside_m2
        if openings[opening.in_face] > room:
            yield FieldFault(
                f"enclosure.openings[{k}].width_m",
                f"The openings are larger than the {opening.in_face}.",
                opening.width_m.value,
                f"at most {room:.3g} m² together",
            )
    total = 0.0
    for k, contents in enumerate(definition.contents):
        stacked = _stacked_m3(contents)
        if stacked is None:
            continue
        total += stacked
        low, high = _PLAUSIBLE_KG_PER_M3
        mass = contents.mass_kg.value
        if not low <= mass / stacked <= high:
            yield FieldFault(
                f"contents[{k}].mass_kg",
                f"{mass:g} kg in {stacked:.3g} m³ is {mass / stacked:.3g} kg/m³. Check the mass, the count and the "
                "dimensions.",
                mass,
                f"{low * stacked:.3g} to {high * stacked:.3g} kg in this volume",
            )
        if total > volume * 1.001:
            yield FieldFault(
                f"contents[{k}].stacking",
                f"The contents take {total:.3g} m³; inside there are {volume:.3g} m³.",
                None,
                "what fits inside",
            )


def _stacked_m3(contents: Contents) -> float | None:
    """Volume that the contents take, where their stacking tells it."""
    stacking: Any = contents.stacking
    if stacking.kind == "exposed":
        return None
    count = getattr(stacking, "count", 1)
    if stacking.kind in ("bottles", "carcass"):
        length = stacking.height_m if stacking.kind == "bottles" else stacking.length_m
        return float(count * math.pi / 4.0 * stacking.diameter_m.value**2 * length.value)
    return float(count * stacking.width_m.value * stacking.depth_m.value * stacking.height_m.value)


def _histories(definition: StoreDefinition) -> Faults:
    """Series rise in time and have as many temperatures as times; values that make sense together."""
    for where in ("room", "outdoors"):
        history = getattr(definition.surroundings, where)
        path = f"surroundings.{where}"
        if isinstance(history, DriftHistory):
            history, path = history.towards, f"{path}.towards"
        if isinstance(history, SeriesHistory):
            yield from _series(path, history)
    overall = definition.enclosure.overall
    if overall is None:
        return
    if isinstance(overall, EnergyUse) and overall.inside_c.value >= overall.at_room_c.value:
        yield FieldFault(
            "enclosure.overall.inside_c",
            "Inside must be colder than the room of the energy test.",
            overall.inside_c.value,
            f"below {overall.at_room_c.value:g} °C",
        )
    if isinstance(overall, RiseTime) and not overall.from_c.value < overall.to_c.value < overall.at_room_c.value:
        yield FieldFault(
            "enclosure.overall.to_c",
            "The end of the rise must lie between its start and the room.",
            overall.to_c.value,
            f"between {overall.from_c.value:g} and {overall.at_room_c.value:g} °C",
        )


def _series(path: str, series: SeriesHistory) -> Faults:
    if len(series.time_h) != len(series.temperature_c):
        yield FieldFault(
            f"{path}.temperature_c",
            "Give as many temperatures as times.",
            len(series.temperature_c),
            f"{len(series.time_h)} values",
        )
    if any(b <= a for a, b in zip(series.time_h[:-1], series.time_h[1:], strict=True)):
        yield FieldFault(f"{path}.time_h", "Times must rise.", None, "rising values")
    if series.time_h[0] < 0.0:
        yield FieldFault(f"{path}.time_h", "Times count from the loss of power.", series.time_h[0], "0 or later")
    if not all(-90.0 <= value <= 90.0 for value in series.temperature_c):
        yield FieldFault(f"{path}.temperature_c", "Temperatures are out of range.", None, "-90 to 90 °C")


def _later(definition: StoreDefinition) -> Faults:
    """What the contract knows and this version does not work out yet."""
    for k, opening in enumerate(definition.enclosure.openings):
        if opening.curtain_effectiveness is not None and opening.curtain_effectiveness.value > 0.0:
            yield _not_yet(
                f"enclosure.openings[{k}].curtain_effectiveness",
                "A curtain",
                opening.curtain_effectiveness.value,
            )
    for k, contents in enumerate(definition.contents):
        if contents.place != "middle":
            yield _not_yet(f"contents[{k}].place", "Warmer and colder places in the store", contents.place)
    for k, coolant in enumerate(definition.coolants):
        if coolant.added_at_h > 0.0:
            yield _not_yet(f"coolants[{k}].added_at_h", "A coolant added during the outage", coolant.added_at_h)
        if coolant.wrapping_w_per_k is not None:
            yield _not_yet(f"coolants[{k}].wrapping_w_per_k", "Wrapping of a coolant", coolant.wrapping_w_per_k.value)
    for path, limit in _limits(definition):
        if limit.kind == "growth":
            yield _not_yet(f"{path}.kind", "Growth of organisms", "growth")
    for name, what in (("ground", "A floor on the ground"), ("sun", "Sun on roof and walls")):
        if getattr(definition.surroundings, name) is not None:
            yield _not_yet(f"surroundings.{name}", what, "given")
    for name, what in (("door_openings", "Door openings"), ("power", "A generator, or power back")):
        if getattr(definition.outage, name):
            yield _not_yet(f"outage.{name}", what, "given")


def _not_yet(path: str, what: str, given: object) -> FieldFault:
    return FieldFault(path, f"{what}: not worked out yet. Leave it out for now.", given, "left out")


def _known(path: str, look_up: Callable[[str], object], key: str) -> Faults:
    try:
        look_up(key)
    except UnknownKey as unknown:
        nearest = f"nearest: {', '.join(unknown.nearest)}" if unknown.nearest else "a name of the table"
        yield FieldFault(path, str(unknown), key, nearest)


def _faces(definition: StoreDefinition) -> Iterator[tuple[str, Face]]:
    faces = definition.enclosure.faces
    if faces is not None:
        yield from (("walls", faces.walls), ("ceiling", faces.ceiling), ("floor", faces.floor))


def _limits(definition: StoreDefinition) -> Iterator[tuple[str, Limit]]:
    for k, contents in enumerate(definition.contents):
        for j, limit in enumerate(contents.limits):
            yield f"contents[{k}].limits[{j}]", limit
    for k, limit in enumerate(definition.air_limits):
        yield f"air_limits[{k}]", limit


_CHECKS: tuple[Callable[[StoreDefinition], Faults], ...] = (
    _ways,
    _names,
    _limits_given,
    _sizes,
    _histories,
    _later,
)
