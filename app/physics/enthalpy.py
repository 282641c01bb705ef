"""Enthalpy curves: temperature as a monotone function of enthalpy, and back.

Sensible, latent and mixed loads are one case here: a curve is a row of segments, each with a closed form in
both directions, and a pure substance that melts is a segment whose temperature stands still. Foods
(``foods``) and water, salts and phase-change materials (``melting``) hand out curves; the engine reads them.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

from app.compiled import compiled

LINEAR = 0
"""Constant capacity: ``h - h0 = c (t - t0)``. With c = inf the temperature stands still."""

QUADRATIC = 1
"""Capacity that changes evenly with temperature: ``h - h0 = c (t - t0) + b (t - t0)² / 2``."""

FREEZING = 2
"""Water that freezes out of a solution: ``h - h0 = c (t - t0) + b (1/t0 - 1/t)``, t below 0 °C."""


@dataclass(frozen=True)
class Segment:
    """One segment of an enthalpy curve, per kilogram.

    ``shape`` is LINEAR, QUADRATIC or FREEZING; ``capacity_j_per_kg_k`` is c and ``bend`` is b of its formula.
    ``ice_start`` and ``ice_end`` are the kilograms of ice (or unmelted solid) per kilogram at the two ends;
    in between ice goes with enthalpy, on a FREEZING segment with ``1 - freezing_c / t``.
    """

    shape: int
    start_c: float
    end_c: float
    start_j_per_kg: float
    end_j_per_kg: float
    capacity_j_per_kg_k: float
    bend: float = 0.0
    ice_start: float = 0.0
    ice_end: float = 0.0

    def slope_k_per_j(self, temperature_c: float) -> float:
        """How fast temperature rises with enthalpy at a temperature of the segment; 0 on a plateau. [K kg/J]"""
        return segment_slope(self.shape, self.start_c, self.capacity_j_per_kg_k, self.bend, temperature_c)


@dataclass(frozen=True)
class EnthalpyCurve:
    """Temperature against enthalpy of one kilogram of something; the ends go on beyond the last points.

    ``conductivity_solid_w_per_m_k`` holds where ``ice`` equals ``ice_full``, ``conductivity_liquid_w_per_m_k``
    where there is none; in between it goes with the ice. ``latent_j_per_kg`` is the heat of fusion of its ice.
    """

    segments: tuple[Segment, ...]
    conductivity_liquid_w_per_m_k: float
    conductivity_solid_w_per_m_k: float
    density_kg_per_m3: float
    latent_j_per_kg: float = 333.6e3

    @property
    def ice_full(self) -> float:
        """Ice per kilogram at the cold end. [kg/kg]"""
        return self.segments[0].ice_start

    def enthalpy_j_per_kg(self, temperature_c: float) -> float:
        """Enthalpy at a temperature; on a plateau that of its lower, frozen end. [J/kg]"""
        segment = self.segments[-1]
        for candidate in self.segments:
            if temperature_c <= candidate.end_c:
                segment = candidate
                break
        return segment_enthalpy(
            segment.shape,
            segment.start_c,
            segment.start_j_per_kg,
            segment.capacity_j_per_kg_k,
            segment.bend,
            temperature_c,
        )

    def segment_at(self, enthalpy_j_per_kg: float) -> int:
        """Index of the segment that holds an enthalpy; beyond the ends the first or the last."""
        for index, segment in enumerate(self.segments):
            if enthalpy_j_per_kg < segment.end_j_per_kg:
                return index
        return len(self.segments) - 1

    def temperature_c(self, enthalpy_j_per_kg: float) -> float:
        """Temperature at an enthalpy. [°C]"""
        segment = self.segments[self.segment_at(enthalpy_j_per_kg)]
        return segment_temperature(
            segment.shape,
            segment.start_c,
            segment.start_j_per_kg,
            segment.capacity_j_per_kg_k,
            segment.bend,
            enthalpy_j_per_kg,
        )

    def ice_kg_per_kg(self, enthalpy_j_per_kg: float) -> float:
        """Ice, or unmelted solid, at an enthalpy. [kg/kg]"""
        segment = self.segments[self.segment_at(enthalpy_j_per_kg)]
        return segment_ice(
            segment.shape,
            segment.start_c,
            segment.end_c,
            segment.start_j_per_kg,
            segment.end_j_per_kg,
            segment.ice_start,
            segment.ice_end,
            enthalpy_j_per_kg,
            self.temperature_c(enthalpy_j_per_kg),
        )

    def with_capacity(self, extra_j_per_kg_k: float) -> EnthalpyCurve:
        """The curve with something beside it that only warms, such as packaging, per kilogram of contents.

        Where the temperature stands still, what lies beside stands still too.
        """
        if extra_j_per_kg_k == 0.0:
            return self
        anchor_c = self.segments[0].end_c
        return replace(self, segments=tuple(_beside(s, extra_j_per_kg_k, anchor_c) for s in self.segments))


def _beside(segment: Segment, extra_j_per_kg_k: float, anchor_c: float) -> Segment:
    return replace(
        segment,
        start_j_per_kg=segment.start_j_per_kg + extra_j_per_kg_k * (segment.start_c - anchor_c),
        end_j_per_kg=segment.end_j_per_kg + extra_j_per_kg_k * (segment.end_c - anchor_c),
        capacity_j_per_kg_k=segment.capacity_j_per_kg_k + extra_j_per_kg_k,
    )


@compiled
def segment_enthalpy(
    shape: int, start_c: float, start_j: float, capacity: float, bend: float, temperature_c: float
) -> float:
    """Enthalpy at a temperature on one segment; on a plateau that of its start. [J or J/kg]"""
    if capacity == math.inf:
        return start_j
    rise = temperature_c - start_c
    if shape == QUADRATIC:
        return start_j + capacity * rise + 0.5 * bend * rise * rise
    if shape == FREEZING:
        return start_j + capacity * rise + bend * (1.0 / start_c - 1.0 / temperature_c)
    return start_j + capacity * rise


@compiled
def segment_temperature(
    shape: int, start_c: float, start_j: float, capacity: float, bend: float, enthalpy_j: float
) -> float:
    """Temperature at an enthalpy on one segment. [°C]

    Goes on smoothly beyond the segment's ends, so that a step may look past them.
    """
    gained = enthalpy_j - start_j
    if shape == QUADRATIC:
        # c r + b r²/2 = gained, solved so that b = 0 is no special case
        return start_c + 2.0 * gained / (capacity + _quadratic_root(capacity, bend, gained))
    if shape == FREEZING:
        # c t² - (gained + c t0 - b/t0) t - b = 0, the root below 0 °C
        middle = gained + capacity * start_c - bend / start_c
        root = math.sqrt(middle * middle + 4.0 * capacity * bend)
        if middle > 0.0:
            return -2.0 * bend / (middle + root)
        return (middle - root) / (2.0 * capacity)
    return start_c + gained / capacity


@compiled
def segment_slope(shape: int, start_c: float, capacity: float, bend: float, temperature_c: float) -> float:
    """How fast temperature rises with enthalpy on one segment, at a temperature; 0 on a plateau. [K/J]"""
    if shape == QUADRATIC:
        return 1.0 / max(capacity + bend * (temperature_c - start_c), 0.5 * capacity)
    if shape == FREEZING:
        return 1.0 / (capacity + bend / (temperature_c * temperature_c))
    return 1.0 / capacity


@compiled
def _quadratic_root(capacity: float, bend: float, gained: float) -> float:
    """Capacity at the end of a rise; far off the segment, where the parabola turns, half of that at its start."""
    return math.sqrt(max(capacity * capacity + 2.0 * bend * gained, 0.25 * capacity * capacity))


@compiled
def segment_ice(
    shape: int,
    start_c: float,
    end_c: float,
    start_j: float,
    end_j: float,
    ice_start: float,
    ice_end: float,
    enthalpy_j: float,
    temperature_c: float,
) -> float:
    """Ice at an enthalpy on one segment, held between its ends. [kg/kg]"""
    if ice_start == ice_end or enthalpy_j <= start_j:
        return ice_start
    if enthalpy_j >= end_j:
        return ice_end
    if shape == FREEZING:
        # ice = m (1 - tf/t) is straight in 1/t
        share = (1.0 / temperature_c - 1.0 / start_c) / (1.0 / end_c - 1.0 / start_c)
    else:
        share = (enthalpy_j - start_j) / (end_j - start_j)
    return ice_start + (ice_end - ice_start) * share


@compiled
def segment_ice_slope(
    shape: int,
    start_c: float,
    end_c: float,
    start_j: float,
    end_j: float,
    ice_start: float,
    ice_end: float,
    enthalpy_j: float,
    temperature_c: float,
    k_per_j: float,
) -> float:
    """Change of ice with enthalpy on one segment; 0 beyond its ends. [kg/kg per J]"""
    if ice_start == ice_end or enthalpy_j <= start_j or enthalpy_j >= end_j:
        return 0.0
    if shape == FREEZING:
        by_inverse = (ice_end - ice_start) / (1.0 / end_c - 1.0 / start_c)
        return -by_inverse / (temperature_c * temperature_c) * k_per_j
    return (ice_end - ice_start) / (end_j - start_j)
