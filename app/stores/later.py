"""What the contract knows and this version does not work out yet, and the parts that the checks share.

A field whose effect is missing is refused by its name: an answer without it would look complete. Called by
``together``.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator

from app.errors import FieldFault, UnknownKey
from app.stores.definition import Limit, StoreDefinition

Faults = Iterator[FieldFault]


def later(definition: StoreDefinition) -> Faults:
    """The fields that are used and have no effect yet."""
    for k, opening in enumerate(definition.enclosure.openings):
        curtain = opening.curtain_effectiveness
        if curtain is not None and curtain.value > 0.0:
            yield not_yet(f"enclosure.openings[{k}].curtain_effectiveness", "A curtain", curtain.value)
    for k, contents in enumerate(definition.contents):
        if contents.place != "middle":
            yield not_yet(f"contents[{k}].place", "Warmer and colder places in the store", contents.place)
    for k, coolant in enumerate(definition.coolants):
        if coolant.added_at_h > 0.0:
            yield not_yet(f"coolants[{k}].added_at_h", "A coolant added during the outage", coolant.added_at_h)
        if coolant.wrapping_w_per_k is not None:
            yield not_yet(f"coolants[{k}].wrapping_w_per_k", "Wrapping of a coolant", coolant.wrapping_w_per_k.value)
    for path, limit in limits_of(definition):
        if limit.kind == "growth":
            yield not_yet(f"{path}.kind", "Growth of organisms", "growth")
    for name, what in (("ground", "A floor on the ground"), ("sun", "Sun on roof and walls")):
        if getattr(definition.surroundings, name) is not None:
            yield not_yet(f"surroundings.{name}", what, "given")
    for name, what in (("door_openings", "Door openings"), ("power", "A generator, or power back")):
        if getattr(definition.outage, name):
            yield not_yet(f"outage.{name}", what, "given")


def not_yet(path: str, what: str, given: object) -> FieldFault:
    """The fault of a field that is right but has no effect yet."""
    return FieldFault(path, f"{what}: not worked out yet. Leave it out for now.", given, "left out")


def known_key(path: str, look_up: Callable[[str], object], key: str) -> Faults:
    """A fault when a name is in no table, with the nearest names."""
    try:
        look_up(key)
    except UnknownKey as unknown:
        nearest = f"nearest: {', '.join(unknown.nearest)}" if unknown.nearest else "a name of the table"
        yield FieldFault(path, str(unknown), key, nearest)


def limits_of(definition: StoreDefinition) -> Iterator[tuple[str, Limit]]:
    """Every limit with its path."""
    for k, contents in enumerate(definition.contents):
        for j, limit in enumerate(contents.limits):
            yield f"contents[{k}].limits[{j}]", limit
    for k, limit in enumerate(definition.air_limits):
        yield f"air_limits[{k}]", limit
