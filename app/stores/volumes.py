"""Whether things fit: openings into their faces, contents and coolants into the store, masses into their volumes.

Catches a count or a length in the wrong unit that no range of a single field can. Called by ``together``.
"""

from __future__ import annotations

import math
from typing import Any

from app.errors import FieldFault, UnknownKey
from app.reference import coolant_material
from app.stores.definition import Contents, Coolant, StoreDefinition
from app.stores.geometry import FaceSize, box_faces, cylinder_faces
from app.stores.later import Faults
from app.stores.shell import BoxInside, RiseTime

_PLAUSIBLE_KG_PER_M3 = (20.0, 8000.0)
"""From light dry goods in cartons to metal parts, in the volume in which they stand."""

_TEST_LOAD_KG_PER_M3 = 1000.0
"""Test packages have about the density of water."""

_ROUNDING = 1.001


def sizes(definition: StoreDefinition) -> Faults:
    """Faults of things that are too large for where they are, or too heavy or light for their size."""
    inside = definition.enclosure.inside_m
    if isinstance(inside, BoxInside):
        width, depth, height = inside.width.value, inside.depth.value, inside.height.value
        faces, inside_m3 = box_faces(width, depth, height), width * depth * height
    else:
        faces = cylinder_faces(inside.diameter.value, inside.height.value)
        inside_m3 = faces["floor"].inside_m2 * inside.height.value
    yield from _openings(definition, faces)
    for k, contents in enumerate(definition.contents):
        yield from _mass(f"contents[{k}].mass_kg", contents)
    yield from _filling(definition, inside_m3)
    overall = definition.enclosure.overall
    if isinstance(overall, RiseTime):
        mass_kg = overall.test_load_kg.value
        if mass_kg / _TEST_LOAD_KG_PER_M3 > inside_m3 * _ROUNDING:
            message = f"A test load of {mass_kg:g} kg does not fit into {inside_m3:.3g} m³."
            allowed = f"at most {inside_m3 * _TEST_LOAD_KG_PER_M3:.3g} kg"
            yield FieldFault("enclosure.overall.test_load_kg", message, mass_kg, allowed)


def _openings(definition: StoreDefinition, faces: dict[str, FaceSize]) -> Faults:
    taken_m2: dict[str, float] = {}
    for k, opening in enumerate(definition.enclosure.openings):
        name, face_m2 = opening.in_face, faces[opening.in_face].inside_m2
        taken_m2[name] = taken_m2.get(name, 0.0) + opening.width_m.value * opening.height_m.value
        if taken_m2[name] > face_m2 * _ROUNDING:
            message = f"The openings are larger than the {name}."
            allowed = f"at most {face_m2:.3g} m² together"
            yield FieldFault(f"enclosure.openings[{k}].width_m", message, opening.width_m.value, allowed)


def _mass(path: str, contents: Contents) -> Faults:
    stacked_m3 = _stacked_m3(contents)
    low, high = _PLAUSIBLE_KG_PER_M3
    mass_kg = contents.mass_kg.value
    if stacked_m3 is not None and not low <= mass_kg / stacked_m3 <= high:
        message = (
            f"{mass_kg:g} kg in {stacked_m3:.3g} m³ is {mass_kg / stacked_m3:.3g} kg/m³. Check the mass, the count "
            "and the dimensions."
        )
        allowed = f"{low * stacked_m3:.3g} to {high * stacked_m3:.3g} kg in this volume"
        yield FieldFault(path, message, mass_kg, allowed)


def _filling(definition: StoreDefinition, inside_m3: float) -> Faults:
    """The one fault of the first thing for which there is no more space."""
    parts = [(f"contents[{k}].stacking", _stacked_m3(one) or 0.0) for k, one in enumerate(definition.contents)]
    parts += [(f"coolants[{k}].mass_kg", _coolant_m3(one)) for k, one in enumerate(definition.coolants)]
    total_m3 = sum(volume_m3 for _, volume_m3 in parts)
    filled_m3 = 0.0
    for path, volume_m3 in parts:
        filled_m3 += volume_m3
        if filled_m3 > inside_m3 * _ROUNDING:
            message = f"All that is inside takes {total_m3:.3g} m³; the store has {inside_m3:.3g} m³."
            yield FieldFault(path, message, None, "what fits inside")
            return


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


def _coolant_m3(coolant: Coolant) -> float:
    try:
        return coolant.mass_kg.value / coolant_material(coolant.coolant).density_kg_per_m3
    except UnknownKey:  # it has a fault of its own
        return 0.0
