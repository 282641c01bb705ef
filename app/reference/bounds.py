"""What is plausible in the reference tables: a range for every column of numbers and, for materials, every group.

A decimal point that slipped, or a value in another unit, fails when the table is loaded. Called by ``reading``
and ``rows``.
"""

from __future__ import annotations

from dataclasses import dataclass

STATUS_WORDS = ("published", "computed", "common practice", "from memory", "estimate")
"""How a value is known, the strongest first. "From memory": check the printed document before quoting it."""

Range = tuple[float, float]

BOUNDS: dict[str, Range] = {
    "density_kg_per_m3": (5.0, 9500.0),
    "specific_heat_j_per_kg_k": (300.0, 2800.0),
    "conductivity_w_per_m_k": (0.002, 450.0),
    "conductivity_low_w_per_m_k": (0.002, 450.0),
    "conductivity_high_w_per_m_k": (0.002, 450.0),
    "water_fraction": (0.02, 0.98),
    "protein_fraction": (0.0, 0.5),
    "fat_fraction": (0.0, 0.9),
    "carbohydrate_fraction": (0.0, 0.9),
    "fibre_fraction": (0.0, 0.3),
    "ash_fraction": (0.0, 0.1),
    "initial_freezing_c": (-20.0, -0.1),
    "handbook_specific_heat_above_j_per_kg_k": (2000.0, 4200.0),
    "handbook_specific_heat_below_j_per_kg_k": (1300.0, 3200.0),
    "handbook_latent_j_per_kg": (50e3, 330e3),
    "melting_c": (-60.0, 40.0),
    "melting_range_k": (0.0, 10.0),
    "latent_j_per_kg": (80e3, 340e3),
    "latent_low_j_per_kg": (80e3, 340e3),
    "latent_high_j_per_kg": (80e3, 340e3),
    "specific_heat_solid_j_per_kg_k": (1200.0, 2500.0),
    "specific_heat_liquid_j_per_kg_k": (1800.0, 4300.0),
    "conductivity_solid_w_per_m_k": (0.1, 2.5),
    "conductivity_liquid_w_per_m_k": (0.1, 0.7),
    "temperature_c": (-100.0, 40.0),
    "longer_than_h": (0.0, 168.0),
    "window_h": (0.0, 8760.0),
    "leak_l_per_s_m": (0.001, 10.0),
    "leak_low_l_per_s_m": (0.001, 10.0),
    "leak_high_l_per_s_m": (0.001, 10.0),
    "u_w_per_m2_k": (0.1, 7.0),
    "u_low_w_per_m2_k": (0.1, 7.0),
    "u_high_w_per_m2_k": (0.1, 7.0),
}
"""Lowest and highest plausible number of each column."""


@dataclass(frozen=True)
class MaterialClass:
    """What is plausible in one group of materials: a decimal point that slipped fails at load."""

    density_kg_per_m3: Range
    specific_heat_j_per_kg_k: Range
    conductivity_w_per_m_k: Range


MATERIAL_CLASSES = {
    "insulation": MaterialClass((5.0, 400.0), (600.0, 2200.0), (0.002, 0.12)),
    "metal": MaterialClass((2000.0, 9500.0), (300.0, 1000.0), (10.0, 450.0)),
    "structure": MaterialClass((300.0, 2800.0), (600.0, 2000.0), (0.05, 3.5)),
    "glass": MaterialClass((2000.0, 3000.0), (600.0, 1000.0), (0.5, 1.5)),
    "plastic": MaterialClass((850.0, 2100.0), (800.0, 2600.0), (0.1, 0.6)),
    "packaging": MaterialClass((100.0, 1300.0), (1000.0, 2600.0), (0.03, 0.3)),
    "ground": MaterialClass((1000.0, 3000.0), (600.0, 2500.0), (0.2, 5.0)),
}

FOOD_GROUPS = (
    "vegetables",
    "fruit",
    "fish",
    "meat",
    "poultry",
    "eggs",
    "dairy",
    "drinks",
    "bakery",
    "test load",
)
LIMIT_GROUPS = ("food", "vaccine", "blood", "pharmacy", "laboratory")
COOLANT_KINDS = ("water_ice", "eutectic", "phase_change")
LIMIT_KINDS = ("above", "below", "mean_kinetic")
POINTS = ("warmest", "mean", "coldest")
JUDGED_ON = ("contents", "air")
