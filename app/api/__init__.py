"""The JSON API: routes by noun, one error shape."""

from fastapi import APIRouter

from app.api import health, hold_times, reference
from app.api.problems import HANDLERS, problem, problem_of, problem_response

router = APIRouter(prefix="/api/v1")
for noun in (hold_times, reference, health):
    router.include_router(noun.router)

__all__ = ["HANDLERS", "problem", "problem_of", "problem_response", "router"]
