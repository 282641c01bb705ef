"""The heat leak of a whole store from one figure: W/K, K on the mean area, or the appliance's energy use.

The temperature-rise time, which needs runs of the model, is in ``rise_time``. Called by ``network_of``.
"""

from __future__ import annotations

import math

from app.stores.enclosure import outside_area_m2
from app.stores.geometry import FaceSize
from app.stores.shell import Enclosure, EnergyUse, HeatLeak, KValue
from app.units import joules_from_kwh, seconds_from_hours

USUAL_WALL_THICKNESS_M = 0.06
"""Wall of an appliance whose thickness was not given (common practice: 40 to 80 mm)."""


def overall_heat_leak_w_per_k(enclosure: Enclosure, sizes: dict[str, FaceSize], other_w_per_k: float) -> float:
    """Conductance from the inside air to the room that the given figure means. [W/K]

    A figure for the whole store counts doors, bridges and seals too; what is given for them besides,
    ``other_w_per_k``, is taken off again where the figure was measured with them: K and energy use.
    """
    overall = enclosure.overall
    if isinstance(overall, HeatLeak):
        return overall.heat_leak_w_per_k.value
    if isinstance(overall, KValue):
        return max(overall.k_w_per_m2_k.value * mean_area_m2(enclosure, sizes) - other_w_per_k, 0.0)
    assert isinstance(overall, EnergyUse)  # a rise time has been solved before
    heat_j = joules_from_kwh(overall.energy_kwh_per_day.value) * overall.cop.value
    difference_k = overall.at_room_c.value - overall.inside_c.value
    return max(heat_j / seconds_from_hours(24.0) / difference_k - other_w_per_k, 0.0)


def mean_area_m2(enclosure: Enclosure, sizes: dict[str, FaceSize]) -> float:
    """Geometric mean of inside and outside area, on which K is defined (ATP, Annex 1)."""
    overall = enclosure.overall
    assert overall is not None
    given = overall.wall_thickness_m
    thickness_m = given.value if given else USUAL_WALL_THICKNESS_M
    inside_m2 = sum(size.inside_m2 for size in sizes.values())
    outside_m2 = sum(outside_area_m2(size, thickness_m) for size in sizes.values())
    if overall.inside_area_m2 is not None:
        outside_m2 *= overall.inside_area_m2.value / inside_m2
        inside_m2 = overall.inside_area_m2.value
    return math.sqrt(inside_m2 * outside_m2)
