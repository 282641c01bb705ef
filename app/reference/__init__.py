"""Reference tables: materials, foods, coolants, limits and doors, each row with its source."""

from app.reference.rows import PresetLimit
from app.reference.tables import (
    coolant_material,
    coolant_materials,
    food,
    foods,
    limit_preset,
    limit_presets,
    material,
    materials,
    opening_kind,
    source,
    sources,
)

__all__ = [
    "PresetLimit",
    "coolant_material",
    "coolant_materials",
    "food",
    "foods",
    "limit_preset",
    "limit_presets",
    "material",
    "materials",
    "opening_kind",
    "source",
    "sources",
]
