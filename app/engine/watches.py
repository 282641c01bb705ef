"""What is traced during a run: temperatures of bodies, the points of an item, and what has melted. Compiled."""

from typing import Any

from app.compiled import compiled
from app.engine.balance import RESISTIVITY, TEMPERATURE, ice_share, link_flow_w, read_states
from app.engine.network import (
    BODY_TEMPERATURE,
    COLDEST,
    MEAN,
    MELTED,
    SOLID_LEFT,
    SURFACE,
    WARMEST,
    Floats,
    Records,
    Whole,
)
from app.physics import segment_temperature


@compiled
def watched_values(
    bodies: Records,
    segments: Records,
    watches: Records,
    locked: Whole,
    rows: Floats,
    energy_row: int,
    trace: Floats,
    point: int,
) -> None:
    """Write the value of every watch at a row of enthalpies into a row of the trace, from column 1 on."""
    read_states(bodies, segments, locked, rows, energy_row)
    for w in range(watches.shape[0]):
        watch = watches[w]
        quantity = watch["quantity"]
        if quantity == BODY_TEMPERATURE:
            value = rows[TEMPERATURE, watch["first_body"]]
        elif quantity == MEAN:
            value = _mean_c(segments, watch, rows, energy_row)
        elif quantity == SOLID_LEFT:
            value = _solid_share(bodies, segments, watch, locked, rows, energy_row)
        elif quantity == MELTED:
            value = 1.0
            if watch["full"] > 0.0:
                left = _solid_share(bodies, segments, watch, locked, rows, energy_row)
                value = 1.0 - left / watch["full"]
        else:
            value = _extreme_c(bodies, watch, rows)
        trace[point, w + 1] = value


@compiled
def _mean_c(segments: Records, watch: Any, rows: Floats, energy_row: int) -> float:
    """Temperature that the item's heat would give it if it were even. [°C]"""
    total_j = 0.0
    for i in range(watch["first_body"], watch["last_body"] + 1):
        total_j += rows[energy_row, i]
    s = watch["first_segment"]
    last = s + watch["segments"] - 1
    while s < last and total_j >= segments[s]["end_j"]:
        s += 1
    segment = segments[s]
    return segment_temperature(
        segment["shape"],
        segment["start_c"],
        segment["start_j"],
        segment["capacity_j_per_k"],
        segment["bend"],
        total_j,
    )


@compiled
def _solid_share(bodies: Records, segments: Records, watch: Any, locked: Whole, rows: Floats, energy_row: int) -> float:
    """Ice in the item as a share of what it holds when frozen through, by mass of its bodies."""
    solid_kg = 0.0
    mass_kg = 0.0
    for i in range(watch["first_body"], watch["last_body"] + 1):
        share = ice_share(segments[locked[i]], rows[energy_row, i], rows[TEMPERATURE, i])
        solid_kg += share * bodies[i]["mass_kg"]
        mass_kg += bodies[i]["mass_kg"]
    return solid_kg / mass_kg


@compiled
def _extreme_c(bodies: Records, watch: Any, rows: Floats) -> float:
    """Temperature of the item's surface, or the warmest or coldest of its surface and its bodies. [°C]"""
    first = watch["first_body"]
    flow_w = link_flow_w(bodies[first], rows, first)
    found = rows[TEMPERATURE, first] + flow_w * bodies[first]["near_path_per_m"] * rows[RESISTIVITY, first]
    if watch["quantity"] == SURFACE:
        return found
    for i in range(first, watch["last_body"] + 1):
        if watch["quantity"] == WARMEST:
            found = max(found, rows[TEMPERATURE, i])
        elif watch["quantity"] == COLDEST:
            found = min(found, rows[TEMPERATURE, i])
    return found
