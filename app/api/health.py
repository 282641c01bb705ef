"""``GET /api/v1/health``: that the program runs, and which engine."""

from __future__ import annotations

from fastapi import APIRouter

from app.engine import ENGINE_VERSION

router = APIRouter(tags=["Health"])


@router.get("/health")
def read_health() -> dict[str, str]:
    """Says that the program answers."""
    return {"status": "ok", "engine_version": ENGINE_VERSION}
