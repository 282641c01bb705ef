"""``GET /api/v1/reference/...``: the tables, each row with its source."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import asdict
from typing import Any, Literal

from fastapi import APIRouter

from app.engine import ENGINE_VERSION
from app.reference import coolant_materials, foods, limit_presets, materials

router = APIRouter(tags=["Reference"])

_TABLES: dict[str, Callable[[], tuple[Any, ...]]] = {
    "materials": materials,
    "foods": foods,
    "coolants": coolant_materials,
    "limits": limit_presets,
}


@router.get("/reference/{table}")
def read_table(table: Literal["materials", "foods", "coolants", "limits"]) -> dict[str, Any]:
    """One table: materials, foods, coolants or limits."""
    return {"engine_version": ENGINE_VERSION, table: [asdict(row) for row in _TABLES[table]()]}
