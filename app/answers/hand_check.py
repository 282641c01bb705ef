"""The working that a calculator can follow: the store as one heat leak and one heat capacity.

Every body is taken to warm at the pace of the whole, without films or shells between: heat leak, capacity, time
constant, heat to the limit, and the time in which the leak brings that heat. Printed beside the network's
answer, which knows more. Called by ``hold_time``.
"""

from __future__ import annotations

import numpy as np

from app.answers.answer import HandCheck
from app.engine.histories import pieces_of, temperature_c
from app.physics import EnthalpyCurve
from app.stores import StoreNetwork
from app.units import hours_from_seconds, seconds_from_hours

_PARTS = 400


def hand_check(store: StoreNetwork, limit_c: float | None, until_h: float) -> HandCheck:
    """Closed-form working for a store up to a temperature limit.

    ``until_h`` is the time over which the room's temperature is averaged: the hold time, or the horizon.
    """
    leak = store.heat_leak_w_per_k
    loads = [(item.load.curve, item.load.mass_kg, item.start_c) for item in (*store.items, *store.coolants)]
    capacity = (
        store.stored_in_walls_j_per_k
        + store.fittings_j_per_k
        + sum(
            mass_kg / max(_slope(curve, start_c), 1e-9)
            for curve, mass_kg, start_c in loads
            if _slope(curve, start_c) > 0
        )
    )
    time_constant_h = hours_from_seconds(capacity / leak) if leak > 0.0 else None
    if limit_c is None:
        return HandCheck(leak, capacity, time_constant_h, 0.0, 0.0, None, store.wall_delays_h)
    room_c = _mean_room_c(store, until_h)
    plain_j_per_k = store.stored_in_walls_j_per_k + store.fittings_j_per_k
    plain_j = plain_j_per_k * max(limit_c - store.start_air_c, 0.0)
    heats = [_heat_to(curve, mass_kg, start_c, limit_c) for curve, mass_kg, start_c in loads]
    to_limit_j = plain_j + sum(float(heat.sum()) for _, heat in heats)
    melting_j = sum(_melting_j(curve, mass_kg, start_c, limit_c) for curve, mass_kg, start_c in loads)
    closed_h: float | None = None
    if leak > 0.0 and room_c > limit_c:
        seconds = sum(float(np.sum(heat / (leak * (room_c - at_c)))) for at_c, heat in heats)
        if plain_j > 0.0:
            seconds += plain_j_per_k / leak * float(np.log((room_c - store.start_air_c) / (room_c - limit_c)))
        closed_h = hours_from_seconds(seconds)
    return HandCheck(leak, capacity, time_constant_h, to_limit_j, melting_j, closed_h, store.wall_delays_h)


def _slope(curve: EnthalpyCurve, at_c: float) -> float:
    """Rise of temperature with enthalpy; 0 on a plateau. [K kg/J]"""
    segment = curve.segments[curve.segment_at(curve.enthalpy_j_per_kg(at_c))]
    return segment.slope_k_per_j(at_c)


def _mean_room_c(store: StoreNetwork, until_h: float) -> float:
    times = np.linspace(0.0, seconds_from_hours(until_h), 201)
    return float(np.mean(temperature_c(pieces_of(store.room), times)))


def _heat_to(curve: EnthalpyCurve, mass_kg: float, start_c: float, limit_c: float) -> tuple[np.ndarray, np.ndarray]:
    """Slices of the heat from the start to the limit: temperature and joules of each."""
    start, end = curve.enthalpy_j_per_kg(start_c), curve.enthalpy_j_per_kg(limit_c)
    if end <= start:
        return np.zeros(0), np.zeros(0)
    edges = np.linspace(start, end, _PARTS + 1)
    middles = 0.5 * (edges[1:] + edges[:-1])
    return np.array([curve.temperature_c(float(h)) for h in middles]), np.diff(edges) * mass_kg


def _melting_j(curve: EnthalpyCurve, mass_kg: float, start_c: float, limit_c: float) -> float:
    """Heat of the ice that melts between the start and the limit, at 333.4 kJ for the kilogram of water ice."""
    start, end = curve.enthalpy_j_per_kg(start_c), curve.enthalpy_j_per_kg(limit_c)
    if end <= start:
        return 0.0
    return (curve.ice_kg_per_kg(start) - curve.ice_kg_per_kg(end)) * mass_kg * curve.latent_j_per_kg
