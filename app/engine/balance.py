"""The heat balance of one network, and its solution leaf to root: the innermost loops of the engine.

Compiled. All working values of a run stand in the rows of one array, ``rows``, one column a body; the names
of the rows are below. A body's temperature is read from its enthalpy on the segment it is ``locked`` to for the
step, which goes on smoothly past the segment's ends, so that every step is a smooth problem; ``steps`` cuts
steps at the breaks.
"""

from typing import Any

import numpy as np

from app.compiled import compiled, compiled_inline
from app.engine.network import FILM, SERIES, Floats, Records, Whole
from app.physics import (
    LINEAR,
    film_flow_w,
    segment_ice,
    segment_ice_slope,
    segment_slope,
    segment_temperature,
)

STAGE = 0
"""First of the six rows of stages: heat flows before a stage is solved, changes of enthalpy after. [W, J]"""

ENERGY, NEW, AT, START_W, START_SLOPE, PUSHED, OWN, FROM_PARENT, DIAGONAL, INVERSE, LIFT, THIRD, FOURTH = range(6, 19)
"""Enthalpies [J], flows [W], temperature slopes [K/J], derivatives and pivots [1/s, s], continuation [J]."""

TEMPERATURE, RESISTIVITY, SLOPE, RESISTIVITY_SLOPE = range(19, 23)
"""What ``read_states`` and ``read_slopes`` write. [°C, m·K/W, K/J, m·K/W per J]"""

ROWS = 23


@compiled
def read_states(bodies: Records, segments: Records, locked: Whole, rows: Floats, energy_row: int) -> None:
    """Temperature and thermal resistivity of every body from a row of enthalpies."""
    for i in range(bodies.shape[0]):
        body = bodies[i]
        segment = segments[locked[i]]
        energy_j = rows[energy_row, i]
        if segment["shape"] == LINEAR:
            temperature_c = segment["start_c"] + (energy_j - segment["start_j"]) * segment["k_per_j"]
        else:
            temperature_c = segment_temperature(
                segment["shape"],
                segment["start_c"],
                segment["start_j"],
                segment["capacity_j_per_k"],
                segment["bend"],
                energy_j,
            )
        rows[TEMPERATURE, i] = temperature_c
        change = body["conductivity_solid"] - body["conductivity_liquid"]
        if change != 0.0:
            ice = ice_share(segment, energy_j, temperature_c)
            rows[RESISTIVITY, i] = 1.0 / (body["conductivity_liquid"] + change * ice)
        else:
            rows[RESISTIVITY, i] = body["resistivity"]


@compiled
def read_slopes(bodies: Records, segments: Records, locked: Whole, rows: Floats, energy_row: int) -> None:
    """Slopes with enthalpy of what ``read_states`` has just written for the same row."""
    for i in range(bodies.shape[0]):
        body = bodies[i]
        segment = segments[locked[i]]
        temperature_c = rows[TEMPERATURE, i]
        slope = segment_slope(
            segment["shape"], segment["start_c"], segment["capacity_j_per_k"], segment["bend"], temperature_c
        )
        rows[SLOPE, i] = slope
        change = body["conductivity_solid"] - body["conductivity_liquid"]
        by_ice = segment_ice_slope(
            segment["shape"],
            segment["start_c"],
            segment["end_c"],
            segment["start_j"],
            segment["end_j"],
            segment["ice_start"],
            segment["ice_end"],
            rows[energy_row, i],
            temperature_c,
            slope,
        )
        rows[RESISTIVITY_SLOPE, i] = -rows[RESISTIVITY, i] * rows[RESISTIVITY, i] * change * by_ice


@compiled
def ice_share(segment: Any, energy_j: float, temperature_c: float) -> float:
    """Share of full freezing on a segment."""
    return segment_ice(
        segment["shape"],
        segment["start_c"],
        segment["end_c"],
        segment["start_j"],
        segment["end_j"],
        segment["ice_start"],
        segment["ice_end"],
        energy_j,
        temperature_c,
    )


@compiled_inline
def plain_conductance_w_per_k(body: Any, rows: Floats, i: int) -> float:
    """Conductance of a link without a film of its own: given, or a resistance and two paths in series."""
    conductance = body["conductance_w_per_k"]
    if body["link"] == SERIES:
        conductance = 1.0 / (
            body["resistance_k_per_w"]
            + body["near_path_per_m"] * rows[RESISTIVITY, i]
            + body["far_path_per_m"] * rows[RESISTIVITY, body["parent"]]
        )
    return conductance


@compiled
def film_link_flow_w(body: Any, rows: Floats, i: int) -> tuple[float, float, float]:
    """Heat flow from the air into a surface, and its change with the two temperatures. [W, W/K, W/K]"""
    return film_flow_w(
        rows[TEMPERATURE, i],
        rows[TEMPERATURE, body["parent"]],
        body["area_m2"],
        body["base"],
        body["gain"],
        body["is_sixth"],
        body["reference_c"],
        body["per_k"],
        body["emissivity"],
        body["near_path_per_m"] * rows[RESISTIVITY, i],
    )


@compiled
def link_flow_w(body: Any, rows: Floats, i: int) -> float:
    """Heat flow from the parent into body ``i``. [W]"""
    if body["link"] == FILM:
        return film_link_flow_w(body, rows, i)[0]
    difference = rows[TEMPERATURE, body["parent"]] - rows[TEMPERATURE, i]
    return plain_conductance_w_per_k(body, rows, i) * difference


@compiled
def rates(bodies: Records, boundaries: Records, drive_c: Floats, rows: Floats, rate_row: int, path_w: Floats) -> None:
    """Net heat flow into every body into a row, and heat from outside by path. [W]"""
    n = bodies.shape[0]
    for i in range(n):
        rows[rate_row, i] = 0.0
    for i in range(n - 1, 0, -1):
        body = bodies[i]
        parent = body["parent"]
        if body["link"] == FILM:
            flow = film_link_flow_w(body, rows, i)[0]
        else:
            difference = rows[TEMPERATURE, parent] - rows[TEMPERATURE, i]
            flow = plain_conductance_w_per_k(body, rows, i) * difference
        rows[rate_row, i] += flow
        rows[rate_row, parent] -= flow
    for p in range(path_w.shape[0]):
        path_w[p] = 0.0
    for b in range(boundaries.shape[0]):
        boundary = boundaries[b]
        i = boundary["body"]
        flow = boundary["conductance_w_per_k"] * (drive_c[boundary["drive"]] - rows[TEMPERATURE, i])
        rows[rate_row, i] += flow
        path_w[boundary["path"]] += flow


@compiled
def linearise(bodies: Records, boundaries: Records, rows: Floats) -> None:
    """Derivatives of the heat balance by enthalpy into OWN, FROM_PARENT and DIAGONAL. [1/s]

    OWN is d(flow from the parent) / d(own enthalpy), FROM_PARENT the same by the parent's enthalpy.
    """
    n = bodies.shape[0]
    for i in range(n):
        rows[DIAGONAL, i] = 0.0
    for i in range(n - 1, 0, -1):
        body = bodies[i]
        parent = body["parent"]
        difference = rows[TEMPERATURE, parent] - rows[TEMPERATURE, i]
        if body["link"] == FILM:
            flow, by_own, by_parent = film_link_flow_w(body, rows, i)
        else:
            by_parent = plain_conductance_w_per_k(body, rows, i)
            by_own = -by_parent
            flow = by_parent * difference
        own = by_own * rows[SLOPE, i]
        from_parent = by_parent * rows[SLOPE, parent]
        # resistivity changes as ice melts: d flow / d resistance = flow times d flow / d own temperature
        change = flow * by_own
        own += change * body["near_path_per_m"] * rows[RESISTIVITY_SLOPE, i]
        from_parent += change * body["far_path_per_m"] * rows[RESISTIVITY_SLOPE, parent]
        rows[OWN, i] = own
        rows[FROM_PARENT, i] = from_parent
        rows[DIAGONAL, i] += own
        rows[DIAGONAL, parent] -= from_parent
    for b in range(boundaries.shape[0]):
        i = boundaries[b]["body"]
        rows[DIAGONAL, i] -= boundaries[b]["conductance_w_per_k"] * rows[SLOPE, i]


@compiled
def eliminate(bodies: Records, rows: Floats, shift_per_s: float) -> None:
    """Factor ``W = shift I - J`` from the leaves to the root: INVERSE pivots and LIFT per body."""
    n = bodies.shape[0]
    for i in range(n):
        rows[INVERSE, i] = shift_per_s - rows[DIAGONAL, i]
    for i in range(n - 1, 0, -1):
        inverse = 1.0 / rows[INVERSE, i]
        lift = rows[OWN, i] * inverse
        rows[INVERSE, i] = inverse
        rows[LIFT, i] = lift
        rows[INVERSE, bodies[i]["parent"]] += lift * rows[FROM_PARENT, i]
    rows[INVERSE, 0] = 1.0 / rows[INVERSE, 0]


@compiled
def solve(bodies: Records, rows: Floats, right_row: int) -> None:
    """Solve ``W k = right`` in place of a row, leaf to root and back."""
    n = bodies.shape[0]
    for i in range(n - 1, 0, -1):
        rows[right_row, bodies[i]["parent"]] -= rows[LIFT, i] * rows[right_row, i]
    rows[right_row, 0] *= rows[INVERSE, 0]
    for i in range(1, n):
        above = rows[FROM_PARENT, i] * rows[right_row, bodies[i]["parent"]]
        rows[right_row, i] = (rows[right_row, i] + above) * rows[INVERSE, i]


@compiled
def drive_temperatures(
    pieces: Records, piece_starts: Whole, current: Whole, time_s: float, drive_c: Floats, drive_k_per_s: Floats
) -> None:
    """Temperature of each of the surroundings on its current piece, and its rate. [°C, K/s]"""
    for d in range(drive_c.shape[0]):
        piece = pieces[piece_starts[d] + current[d]]
        since = time_s - piece["start_s"]
        value = piece["level_c"] + piece["slope_k_per_s"] * since
        rate = piece["slope_k_per_s"]
        if piece["decay_k"] != 0.0:
            decay = piece["decay_k"] * np.exp(-piece["decay_per_s"] * since)
            value += decay
            rate -= piece["decay_per_s"] * decay
        turn = piece["turn_per_s"]
        if turn != 0.0:
            cosine, sine = np.cos(turn * since), np.sin(turn * since)
            value += piece["cosine_k"] * cosine + piece["sine_k"] * sine
            rate += turn * (piece["sine_k"] * cosine - piece["cosine_k"] * sine)
        drive_c[d] = value
        drive_k_per_s[d] = rate
