"""What must fit together in a definition whose single fields are right.

Each check looks at one thing and yields faults with the path of the field to change. Volumes and what is not
worked out yet have modules of their own, ``volumes`` and ``later``. Called by ``reading``.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator

from app.errors import FieldFault
from app.reference import coolant_material, food, limit_preset, material, materials
from app.stores.definition import Contents, CurveSubstance, StoreDefinition
from app.stores.later import Faults, known_key, later, limits_of, not_yet
from app.stores.rooms import DriftHistory, SeriesHistory
from app.stores.shell import EnergyUse, Face, Layer, RiseTime
from app.stores.volumes import sizes

_LEAST_J_PER_KG_K = 100.0
"""Below the specific heat of every solid and liquid that is stored cold (lead 128 J/kg·K, from memory)."""

_INSULATION_AT_MOST_W_PER_M_K = 5.0
_METAL_AT_LEAST_KG_PER_M3 = 1500.0
_THICK_FOR_METAL_M = 0.03

_CLOSEST_TIMES_H = 1e-6
"""Closer times are one time twice; a few milliseconds make a sudden change."""


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
    if (face.layers is None) == (face.u_w_per_m2_k is None):
        yield FieldFault(path, "Give either layers or a U-value.", None, "one of the two")
    elif face.u_w_per_m2_k is not None and face.films_w_per_m2_k is not None:
        message = "A U-value has the films in it already: leave them out, or give layers."
        yield FieldFault(f"{path}.films_w_per_m2_k", message, None, "left out beside a U-value")
    for j, layer in enumerate(face.layers or ()):
        yield from _layer_ways(f"{path}.layers[{j}]", layer)
    if face.beyond == "outdoors" and definition.surroundings.outdoors is None:
        yield FieldFault(f"{path}.beyond", "Give surroundings.outdoors for a face outdoors.", "outdoors", "room")
    if face.beyond == "ground":
        yield not_yet(f"{path}.beyond", "A floor on the ground", "ground")


def _layer_ways(path: str, layer: Layer) -> Faults:
    """A material of the table or the layer's own numbers, and those like something that exists."""
    conductivity, density = layer.conductivity_w_per_m_k, layer.density_kg_per_m3
    if (conductivity is None) == (layer.material is None):
        message = "Give either a material or the layer's own conductivity."
        yield FieldFault(f"{path}.material", message, layer.material, "one of the two")
    elif layer.material is not None:
        yield from known_key(f"{path}.material", material, layer.material)
        yield from _metal_thickness(f"{path}.thickness_m", layer.material, layer.thickness_m.value)
        for name in ("density_kg_per_m3", "specific_heat_j_per_kg_k"):
            given = getattr(layer, name)
            if given is not None:
                message = "A material brings its own. Leave it out, or give all three numbers in place of the material."
                yield FieldFault(f"{path}.{name}", message, given.value, "left out beside a material")
    elif (density is None) != (layer.specific_heat_j_per_kg_k is None):
        message = "Give density and specific heat together, or neither."
        yield FieldFault(f"{path}.density_kg_per_m3", message, None, "both or neither")
    elif conductivity is not None and conductivity.value > _INSULATION_AT_MOST_W_PER_M_K:
        is_light = density is not None and density.value < _METAL_AT_LEAST_KG_PER_M3
        if is_light or (density is None and layer.thickness_m.value >= _THICK_FOR_METAL_M):
            message = (
                f"{conductivity.value:g} W/m·K is a metal's, and this layer is too light or too thick for one. "
                "Did you enter mW/m·K?"
            )
            allowed = f"at most {_INSULATION_AT_MOST_W_PER_M_K:g} W/m·K in such a layer"
            yield FieldFault(f"{path}.conductivity_w_per_m_k", message, conductivity.value, allowed)


def _metal_thickness(path: str, key: str, thickness_m: float) -> Faults:
    """A sheet of metal as thick as a panel would store more heat than all that is inside."""
    is_metal = any(row.key == key and row.conductivity_w_per_m_k > _INSULATION_AT_MOST_W_PER_M_K for row in materials())
    if is_metal and thickness_m >= _THICK_FOR_METAL_M:
        message = f"{thickness_m:g} m is too thick for a sheet of metal. Did you enter mm?"
        yield FieldFault(path, message, thickness_m, f"less than {_THICK_FOR_METAL_M:g} m of metal")


def _contents_ways(path: str, contents: Contents) -> Faults:
    given = [name for name in ("food", "composition", "substance") if getattr(contents, name) is not None]
    if len(given) != 1:
        message = "Give what it is: a food, a composition or a substance, one of them."
        yield FieldFault(f"{path}.food", message, ", ".join(given), "one of food, composition, substance")
    yield from _freezing(path, contents)
    if contents.food is not None:
        yield from known_key(f"{path}.food", food, contents.food)
    for j, packaging in enumerate(contents.packaging):
        yield from known_key(f"{path}.packaging[{j}].material", material, packaging.material)
    if contents.composition is not None:
        shares = contents.composition
        total = sum(getattr(shares, name).value for name in type(shares).model_fields)
        if not 0.95 <= total <= 1.05:
            message = f"The fractions add up to {total:.3g}."
            yield FieldFault(f"{path}.composition", message, total, "a sum of 0.95 to 1.05")
    if isinstance(contents.substance, CurveSubstance):
        yield from _curve(f"{path}.substance", contents.substance)


def _freezing(path: str, contents: Contents) -> Faults:
    """A freezing point where one is needed, and none where it would change nothing."""
    initial, point = contents.initial_freezing_c, contents.freezing_c
    if contents.composition is not None and initial is None:
        message = "A composition needs the temperature where freezing begins."
        yield FieldFault(f"{path}.initial_freezing_c", message, None, "-38 to -0.05 °C")
    if contents.composition is None and initial is not None:
        message = "Only a composition takes the temperature where freezing begins; a food of the table brings its own."
        yield FieldFault(f"{path}.initial_freezing_c", message, initial.value, "left out")
    if contents.substance == "aqueous" and point is None:
        yield FieldFault(f"{path}.freezing_c", "A solution needs its freezing point.", None, "-38 to 0 °C")
    if contents.substance != "aqueous" and point is not None:
        message = "Only an aqueous substance takes a freezing point."
        yield FieldFault(f"{path}.freezing_c", message, point.value, "left out")


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
    steps = list(zip(temperatures[:-1], temperatures[1:], heats[:-1], heats[1:], strict=True))
    if any(h1 <= h0 for _, _, h0, h1 in steps):
        yield FieldFault(f"{path}.enthalpy_j_per_kg", "Enthalpies must rise.", None, "rising values")
    elif any(h1 - h0 < _LEAST_J_PER_KG_K * (t1 - t0) for t0, t1, h0, h1 in steps):
        message = "Enthalpies rise more slowly than those of any substance. Did you enter kJ/kg?"
        yield FieldFault(f"{path}.enthalpy_j_per_kg", message, None, f"at least {_LEAST_J_PER_KG_K:g} J/kg for each K")
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
            yield not_yet(path, "Dry ice", coolant.coolant)
        else:
            yield from known_key(path, coolant_material, coolant.coolant)
    for k, fitting in enumerate(definition.enclosure.fittings):
        yield from known_key(f"enclosure.fittings[{k}].material", material, fitting.material)
    overall = definition.enclosure.overall
    if isinstance(overall, RiseTime):
        yield from known_key("enclosure.overall.test_load_food", food, overall.test_load_food)
    for path, limit in limits_of(definition):
        if limit.kind == "preset":
            yield from known_key(f"{path}.preset", limit_preset, limit.preset)
    things = [(f"contents[{k}].name", c.name) for k, c in enumerate(definition.contents)]
    things += [(f"coolants[{k}].name", c.name) for k, c in enumerate(definition.coolants)]
    yield from _told_apart("things", things)
    openings = enumerate(definition.enclosure.openings)
    yield from _told_apart("openings", [(f"enclosure.openings[{k}].name", opening.name) for k, opening in openings])


def _told_apart(what: str, named: list[tuple[str, str]]) -> Faults:
    seen: set[str] = set()
    for path, name in named:
        if name in seen:
            message = f"There are two {what} called {name!r}. Give each its own name."
            yield FieldFault(path, message, name, "another name")
        seen.add(name)


def _limits_given(definition: StoreDefinition) -> Faults:
    """Something must be asked, and the air has no middle and no ice."""
    if not any(True for _ in limits_of(definition)):
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
    times = series.time_h
    for name in ("temperature_c", "relative_humidity"):
        values = getattr(series, name)
        if values is not None and len(values) != len(times):
            words = "Give as many values as times."
            yield FieldFault(f"{path}.{name}", words, len(values), f"{len(times)} values")
    if any(b - a < _CLOSEST_TIMES_H for a, b in zip(times[:-1], times[1:], strict=True)):
        allowed = f"rising values, at least {_CLOSEST_TIMES_H:.6f} h apart"
        yield FieldFault(f"{path}.time_h", "Times must rise.", None, allowed)


def _faces(definition: StoreDefinition) -> Iterator[tuple[str, Face]]:
    faces = definition.enclosure.faces
    if faces is not None:
        yield from (("walls", faces.walls), ("ceiling", faces.ceiling), ("floor", faces.floor))


_CHECKS: tuple[Callable[[StoreDefinition], Faults], ...] = (
    _ways,
    _names,
    _limits_given,
    sizes,
    _histories,
    later,
)
