"""Definitions that between them use every field of the contract, and the walk over all that stands in them."""

from __future__ import annotations

import copy
from collections.abc import Iterator
from typing import Any

from pydantic import BaseModel

from app.stores import StoreDefinition, sample_case
from app.stores.fields import Quantity

Document = dict[str, Any]
Path = tuple[str | int, ...]


def simple() -> Document:
    """A small store without anything that could be left out."""
    return {
        "enclosure": {
            "inside_m": {"width": 1.0, "depth": 0.8, "height": 1.2},
            "overall": {"heat_leak_w_per_k": 1.5},
        },
        "contents": [item("milk", food="milk_whole", limits=[{"kind": "above", "temperature_c": 8.0}])],
        "surroundings": {"room": {"kind": "constant", "temperature_c": 25.0}},
    }


def item(name: str, **given: Any) -> Document:
    packs = {"kind": "packs", "count": 20, "width_m": 0.1, "depth_m": 0.1, "height_m": 0.1}
    return {"name": name, "mass_kg": 18.0, "start_c": 4.0, "stacking": packs} | given


def wide_documents() -> dict[str, Document]:
    """By name: a walk-in room with everything, and small stores in each of the other ways."""
    return {
        "everything": _everything(),
        "k value": _with_overall({"k_w_per_m2_k": 0.4}),
        "heat leak": _with_overall({"heat_leak_w_per_k": 1.1}),
        "energy use": _with_overall({"energy_kwh_per_day": 0.9, "at_room_c": 25.0, "inside_c": 5.0, "cop": 1.5}),
        "rise time": _with_overall(
            {"rise_time_h": 20.0, "from_c": -18.0, "to_c": -9.0, "at_room_c": 25.0, "test_load_kg": 40.0}
            | {"test_load_food": "test_package"}
        ),
        "cylinder": _cylinder(),
        "day and series": _rooms(),
        "drift and ramp": simple() | {"surroundings": {"room": _drift(), "outdoors": _ramp()}},
    }


NOT_READ_YET = ("ground", "sun", "door_openings", "power")
"""Refused as a whole, whatever stands in them, until they are worked out."""


def leaves(node: Any, path: Path = ()) -> Iterator[tuple[Path, Any]]:
    """Every place of a document below its root, with what stands there; a quantity is one place."""
    if path:
        yield path, node
    if path and path[-1] in NOT_READ_YET:
        return
    if isinstance(node, dict) and "value" not in node:
        for name, below in node.items():
            yield from leaves(below, (*path, name))
    elif isinstance(node, list):
        for number, below in enumerate(node):
            if isinstance(below, dict):
                yield from leaves(below, (*path, number))


def changed(document: Document, path: Path, value: Any) -> Document:
    """A copy with another value at a place."""
    copied = copy.deepcopy(document)
    node: Any = copied
    for part in path[:-1]:
        node = node[part]
    node[path[-1]] = value
    return copied


def without(document: Document, path: Path) -> Document:
    """A copy without a place."""
    copied = copy.deepcopy(document)
    node: Any = copied
    for part in path[:-1]:
        node = node[part]
    del node[path[-1]]
    return copied


def written(path: Path) -> str:
    """A place as faults write it."""
    return "".join(f"[{part}]" if isinstance(part, int) else f".{part}" for part in path).lstrip(".")


def required_places(document: Document) -> list[Path]:
    """Every place of a document that may not be left out; the word that chooses a kind is looked at elsewhere."""
    found = _required(StoreDefinition.model_validate(document), ())
    return [path for path in found if path[-1] != "kind" and path not in _MARKS_OF_WAYS]


_MARKS_OF_WAYS = {("enclosure", "overall", name) for name in ("k_w_per_m2_k", "energy_kwh_per_day", "rise_time_h")} | {
    ("enclosure", "inside_m", "diameter")
}
"""Without its mark another way is meant, whose own mark is then missing."""


def _required(part: Any, path: Path) -> list[Path]:
    if isinstance(part, tuple):
        return [one for number, below in enumerate(part) for one in _required(below, (*path, number))]
    if not isinstance(part, BaseModel) or isinstance(part, Quantity):
        return []
    fields = type(part).model_fields
    own = [(*path, name) for name, field in fields.items() if field.is_required()]
    return own + [one for name in fields for one in _required(getattr(part, name), (*path, name))]


def used_fields(part: Any) -> set[tuple[str, str]]:
    """Model and field of all that is given below a part of a definition."""
    found: set[tuple[str, str]] = set()
    if isinstance(part, tuple):
        return found.union(*(used_fields(below) for below in part))
    if isinstance(part, BaseModel):
        for name in part.model_fields_set:
            found |= {(type(part).__name__, name)} | used_fields(getattr(part, name))
    return found


def all_fields(model: type[BaseModel] = StoreDefinition) -> set[tuple[str, str]]:
    """Model and field of all that the contract knows."""
    definitions = model.model_json_schema()["$defs"] | {"StoreDefinition": model.model_json_schema()}
    return {
        (name, field)
        for name, schema in definitions.items()
        for field in schema.get("properties", {})
        if name != "Quantity"
    }


def _with_overall(overall: Document) -> Document:
    document = simple()
    wall = {"wall_mass_kg": 20.0, "inside_area_m2": 5.0, "wall_thickness_m": 0.06}
    document["enclosure"]["overall"] = wall | overall
    return document


def _everything() -> Document:
    store = copy.deepcopy(sample_case("food-bank-freezer").store)
    own = {"conductivity_w_per_m_k": {"value": 0.03, "plus_minus": 0.002}, "thickness_m": 0.08}
    own |= {"density_kg_per_m3": 32.0, "specific_heat_j_per_kg_k": 1400.0}
    store["definition_version"] = 1
    enclosure = store["enclosure"]
    enclosure["faces"]["floor"] = {
        "layers": [own],
        "beyond": {"temperature_c": {"value": -5.5, "known": "measured"}},
        "films_w_per_m2_k": {"inside": 6.0, "outside": 20.0},
    }
    enclosure["faces"]["ceiling"] = {"u_w_per_m2_k": 0.25, "beyond": "room"}
    enclosure |= {"edge_factors": False, "bridges_w_per_k": 0.4, "shape": "box"}
    enclosure["openings"] = [
        {"name": "door", "in_face": "walls", "width_m": 0.9, "height_m": 1.9, "u_w_per_m2_k": 0.4}
        | {"seal_leak_m3_per_h": 1.5, "curtain_effectiveness": 0.0}
    ]
    enclosure["fittings"] = [{"material": "steel_sheet", "mass_kg": 80.0}]
    store["contents"] = _all_contents()
    store["coolants"] = [
        {"name": "ice", "coolant": "ice", "mass_kg": 10.0, "start_c": -5.0, "area_m2": 0.8, "film_w_per_m2_k": 6.0}
        | {"added_at_h": 0.0, "wrapping_w_per_k": 0.8}
    ]
    store["air_limits"] = [{"kind": "above", "temperature_c": -10.0, "longer_than_h": 2.0, "at": "warmest"}]
    store["start"] = {"air_c": -20.0}
    store["surroundings"] |= {"ground": {"kind": "seasonal"}, "sun": {"on": "roof"}}
    store["outage"] = {"horizon_h": 72.0, "door_openings": [{"opening": "door"}], "power": [{"from_h": 3.0}]}
    return store


def _all_contents() -> list[Document]:
    size = {"width_m": 0.3, "depth_m": 0.3, "height_m": 0.2}
    plain = {"specific_heat_j_per_kg_k": 3400.0, "conductivity_w_per_m_k": 0.5, "density_kg_per_m3": 1000.0}
    curve = {"temperature_c": [-40.0, -20.0, -2.0, 20.0], "enthalpy_j_per_kg": [0.0, 4e4, 9e4, 3.9e5]}
    curve |= {"conductivity_w_per_m_k": 1.1, "density_kg_per_m3": 950.0}
    shares = {"water": 0.7, "protein": 0.1, "fat": 0.1, "carbohydrate": 0.05, "fibre": 0.03, "ash": 0.02}
    packaging = [{"material": "cardboard", "mass_kg": 1.0}]
    limits = [
        {"kind": "preset", "preset": "frozen_food_minus_15"},
        {"kind": "below", "temperature_c": -30.0, "longer_than_h": 1.5, "at": "mean"},
        {"kind": "mean_kinetic", "temperature_c": -12.0, "window_h": 12.0, "activation_kj_per_mol": 83.1}
        | {"at": "warmest"},
        {"kind": "thawed", "share": 0.1},
        {"kind": "growth", "organism": "listeria", "log10": 1.0},
    ]
    return [
        item("beef", food="beef_lean", packaging=packaging, place="middle", limits=limits, film_w_per_m2_k=7.0),
        item("mash", composition=shares, initial_freezing_c=-1.0, stacking={"kind": "cartons", "count": 3} | size),
        item("blocks", substance=plain, stacking={"kind": "pallet", "count": 1} | size),
        item("gel", substance=curve, stacking={"kind": "bulk"} | size),
        item("brine", substance="aqueous", freezing_c=-9.0, stacking=_bottles()),
        item("sides", food="lamb", stacking={"kind": "carcass", "count": 1, "length_m": 0.9, "diameter_m": 0.2}),
        item("water", substance="water", stacking={"kind": "exposed", "area_m2": 1.0, "half_thickness_m": 0.05}),
        item("pies", food="bread", stacking={"kind": "cartons", "count": 4, "blocks": 2} | size),
    ]


def _bottles() -> Document:
    return {"kind": "bottles", "count": 18, "diameter_m": 0.085, "height_m": 0.2}


def _cylinder() -> Document:
    document = simple()
    document["enclosure"] |= {"shape": "cylinder", "inside_m": {"diameter": 0.9, "height": 1.0}}
    return document


def _rooms() -> Document:
    day = {"kind": "day", "mean_c": 22.0, "swing_k": 6.0, "peak_hour": 15.0, "start_hour": 8.0}
    series = {"kind": "series", "time_h": [0.0, 6.0, 12.0], "temperature_c": [20.0, 25.0, 22.0]}
    series["relative_humidity"] = [0.5, 0.4, 0.5]
    place = {"volume_m3": 180.0, "air_changes_per_h": 0.5}
    return simple() | {"surroundings": {"room": day | place | {"relative_humidity": 0.5}, "outdoors": series | place}}


def _drift() -> Document:
    room = {"kind": "constant", "temperature_c": 30.0, "relative_humidity": 0.4}
    room |= {"volume_m3": 20.0, "air_changes_per_h": 1.0}
    drift = {"kind": "drift", "start_c": 18.0, "time_constant_h": 6.0, "towards": room}
    return drift | {"volume_m3": 20.0, "air_changes_per_h": 1.0, "relative_humidity": 0.4}


def _ramp() -> Document:
    ramp = {"kind": "ramp", "from_c": 5.0, "to_c": -2.0, "over_h": 10.0}
    return ramp | {"volume_m3": 20.0, "air_changes_per_h": 1.0, "relative_humidity": 0.4}
