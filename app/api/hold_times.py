"""``POST /api/v1/hold-time`` and ``/hold-times``: how long stores hold."""

from __future__ import annotations

import asyncio
from dataclasses import dataclass
from typing import Annotated, Any

from fastapi import APIRouter, Depends, Request

from app.answers import hold_time
from app.api.body import json_body
from app.api.problems import problem_of
from app.engine import ENGINE_VERSION
from app.errors import DefinitionRefused, FieldFault
from app.stores import StoreDefinition, read_definition
from app.workers import Workers

MOST_STORES = 1000

_AT_ONCE = 8
"""Questions of one request that are in the queue together: others keep getting their turn."""

router = APIRouter(tags=["Hold time"])

_FIELDS = ("store", "confidence", "samples", "series_step_min")

_EXAMPLE = {
    "requestBody": {
        "required": True,
        "content": {
            "application/json": {
                "schema": {
                    "type": "object",
                    "required": ["store"],
                    "additionalProperties": False,
                    "properties": {
                        "store": {"type": "object", "description": "A store definition."},
                        "confidence": {"type": "number", "minimum": 0.5, "maximum": 0.99, "default": 0.9},
                        "samples": {"type": ["integer", "null"], "description": "Null or 0: no spread yet."},
                        "series_step_min": {"type": "number", "minimum": 1, "maximum": 1440, "default": 15},
                    },
                }
            }
        },
    }
}
_EXAMPLES = {
    "requestBody": {
        "required": True,
        "content": {
            "application/json": {
                "schema": {
                    "type": "array",
                    "maxItems": MOST_STORES,
                    "items": {"type": "object", "description": "A body of /hold-time."},
                }
            }
        },
    }
}


@dataclass(frozen=True)
class _Question:
    store: StoreDefinition
    confidence: float
    series_step_min: float


@router.post("/hold-time", openapi_extra=_EXAMPLE)
async def ask_hold_time(request: Request, body: Annotated[Any, Depends(json_body)]) -> dict[str, Any]:
    """How long one store keeps its limits with the door shut: the best estimate, and the evidence behind it."""
    return await _workers(request).ask(_answer, body)


@router.post("/hold-times", openapi_extra=_EXAMPLES)
async def ask_hold_times(request: Request, body: Annotated[Any, Depends(json_body)]) -> dict[str, Any]:
    """The same for many stores, answers in order; one that is refused does not fail the rest."""
    if not isinstance(body, list) or len(body) > MOST_STORES:
        given = len(body) if isinstance(body, list) else None
        fault = FieldFault("", "Send a list of questions.", given, f"a list of at most {MOST_STORES}")
        raise DefinitionRefused((fault,))
    workers = _workers(request)
    answers: list[dict[str, Any]] = []
    for start in range(0, len(body), _AT_ONCE):
        asked = [workers.ask(_answer_or_problem, question) for question in body[start : start + _AT_ONCE]]
        answers += await asyncio.gather(*asked)
    return {"engine_version": ENGINE_VERSION, "answers": answers}


def _workers(request: Request) -> Workers:
    workers: Workers = request.app.state.workers
    return workers


def _answer(body: Any) -> dict[str, Any]:
    question = _question(body)
    answer = hold_time(question.store, confidence=question.confidence, series_step_min=question.series_step_min)
    return answer.as_document()


def _answer_or_problem(body: Any) -> dict[str, Any]:
    try:
        return _answer(body)
    except Exception as error:  # noqa: BLE001  one bad store must not fail the others
        return problem_of(error)


def _question(body: Any) -> _Question:
    """The question in a body; every fault of the options and of the store at once."""
    if not isinstance(body, dict):
        raise DefinitionRefused((FieldFault("", "Send an object with a store.", None, "an object"),))
    faults = [
        FieldFault(name, f"There is no field called {name!r} here.", None, ", ".join(_FIELDS))
        for name in body
        if name not in _FIELDS
    ]
    confidence = _number(body, "confidence", 0.9, 0.5, 0.99, faults)
    step_min = _number(body, "series_step_min", 15.0, 1.0, 1440.0, faults)
    if body.get("samples") not in (None, 0) or isinstance(body.get("samples"), bool):
        message = "The spread is not worked out yet: ask for the best estimate."
        faults.append(FieldFault("samples", message, str(body["samples"])[:40], "null or 0"))
    store: StoreDefinition | None = None
    try:
        if "store" not in body:
            faults.append(FieldFault("store", "The store is missing.", None, "a store definition"))
        else:
            store = read_definition(body["store"])
    except DefinitionRefused as refused:
        faults += [FieldFault(f"store.{f.field}".rstrip("."), f.message, f.given, f.allowed) for f in refused.faults]
    if faults or store is None:
        raise DefinitionRefused(tuple(faults))
    return _Question(store, confidence, step_min)


def _number(
    body: dict[str, Any], name: str, default: float, low: float, high: float, faults: list[FieldFault]
) -> float:
    value = body.get(name, default)
    if isinstance(value, bool) or not isinstance(value, (int, float)) or not low <= value <= high:
        faults.append(FieldFault(name, f"{name} must be {low:g} to {high:g}.", str(value)[:40], f"{low:g} to {high:g}"))
        return default
    return float(value)
