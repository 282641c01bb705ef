"""The heat leak that makes the model reproduce a temperature-rise time, as data sheets and tests state it.

The store is filled with its test load and left to warm in the test's room; the heat leak is found with which
the outer layer of packages, whose middle is what a test reads, takes the stated time from one temperature to
the other.
"""

from __future__ import annotations

import math

import numpy as np
from scipy.optimize import brentq

from app.engine import Network, march
from app.engine.network import MEAN, Watch, with_mean_watches
from app.errors import DefinitionRefused, FieldFault
from app.stores.definition import StoreDefinition
from app.stores.loads import contents_block
from app.stores.network_of import PlacedItem, StoreNetwork, network_of
from app.stores.reading import definition_document, read_definition
from app.stores.shell import RiseTime
from app.units import seconds_from_hours

PACKAGE_KG = 0.5
PACKAGE_M = (0.1, 0.1, 0.05)
"""Test package of the standards for household appliances (IEC 62552 series, from memory)."""

_LEAST_W_PER_K, _MOST_W_PER_K = 1e-3, 1e3


def store_network(definition: StoreDefinition) -> StoreNetwork:
    """The network of any store; one known by its rise time with the heat leak that reproduces it."""
    overall = definition.enclosure.overall
    if not isinstance(overall, RiseTime):
        return network_of(definition)
    return network_of(_with_heat_leak(definition, overall, heat_leak_of_rise_time_w_per_k(definition, overall)))


def heat_leak_of_rise_time_w_per_k(definition: StoreDefinition, overall: RiseTime) -> float:
    """Heat leak with which the model takes the stated time under the test's conditions. [W/K]

    Raises ``DefinitionRefused`` where no heat leak does: the test load is then too small or too large.
    """
    wanted_s = seconds_from_hours(overall.rise_time_h.value)

    def too_slow(log_leak: float) -> float:
        """Positive where the load is still colder than the end of the test at the stated time. [K]"""
        network, share = _test_network(definition, overall, math.exp(log_leak))
        fewer_c, more_c = march(network, wanted_s).traces[-1]
        return overall.to_c.value - float(fewer_c + share * (more_c - fewer_c))

    low, high = math.log(_LEAST_W_PER_K), math.log(_MOST_W_PER_K)
    if too_slow(low) < 0.0 or too_slow(high) > 0.0:
        raise DefinitionRefused(
            (
                FieldFault(
                    "enclosure.overall.rise_time_h",
                    "No heat leak makes this load take this time. Check the test load and the two temperatures.",
                    overall.rise_time_h.value,
                    "a time that the test load can take in the test's room",
                ),
            )
        )
    return math.exp(float(brentq(too_slow, low, high, xtol=1e-7)))


def _with_heat_leak(definition: StoreDefinition, overall: RiseTime, leak_w_per_k: float) -> StoreDefinition:
    document = definition_document(definition)
    document["enclosure"]["overall"] = _as_heat_leak(overall, leak_w_per_k)
    return read_definition(document)


def _as_heat_leak(overall: RiseTime, leak_w_per_k: float) -> dict[str, object]:
    """The same wall, known by its heat leak."""
    known: dict[str, object] = {"heat_leak_w_per_k": leak_w_per_k}
    given = {"wall_mass_kg": overall.wall_mass_kg, "inside_area_m2": overall.inside_area_m2}
    return known | {name: value.value for name, value in given.items() if value is not None}


def _test_network(definition: StoreDefinition, overall: RiseTime, leak_w_per_k: float) -> tuple[Network, float]:
    """The store under the test's conditions, watched at two depths; a layer of packages lies a share between."""
    document = definition_document(definition)
    enclosure = document["enclosure"] | {"overall": _as_heat_leak(overall, leak_w_per_k)}
    mass_kg = overall.test_load_kg.value
    width, depth, height = PACKAGE_M
    load = {
        "name": "test load",
        "food": overall.test_load_food,
        "mass_kg": mass_kg,
        "start_c": overall.from_c.value,
        "stacking": {
            "kind": "cartons",
            "count": max(round(mass_kg / PACKAGE_KG), 1),
            "width_m": width,
            "depth_m": depth,
            "height_m": height,
            "blocks": 1,
        },
        "limits": [{"kind": "above", "temperature_c": overall.to_c.value}],
    }
    test = read_definition(
        {
            "name": "rise-time test",
            "enclosure": enclosure,
            "contents": [load],
            "surroundings": {"room": {"kind": "constant", "temperature_c": overall.at_room_c.value}},
            "start": {"air_c": overall.from_c.value},
        }
    )
    store = network_of(test)
    placed = store.items[0]
    count, share = _shells_of_outer_packages(test, placed)
    first = placed.first_body
    watches = [
        Watch("fewer", MEAN, first, first + count - 1),
        Watch("more", MEAN, first, min(first + count, first + len(placed.load.bodies) - 1)),
    ]
    return with_mean_watches(store.network, watches, placed.load.curve), share


def _shells_of_outer_packages(test: StoreDefinition, load: PlacedItem) -> tuple[int, float]:
    """Shells that make up one layer of packages, whose mean is the middle of a package: how many, and a rest."""
    block = contents_block(test.contents[0])
    layer = block.volume_share_outside(min(PACKAGE_M[2], block.half_thickness_m))
    shares = np.cumsum([body.mass_kg for body in load.load.bodies]) / load.load.mass_kg
    count = max(int(np.searchsorted(shares, layer)), 1)
    if count >= len(shares):
        return len(shares), 0.0
    return count, float(np.clip((layer - shares[count - 1]) / (shares[count] - shares[count - 1]), 0.0, 1.0))
