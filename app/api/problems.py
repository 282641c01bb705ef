"""The one shape of every error of the API: RFC 9457 problem details, with all faults by field."""

from __future__ import annotations

import logging
import secrets
from typing import Any

from fastapi import Request
from fastapi.exceptions import RequestValidationError
from fastapi.responses import JSONResponse
from starlette.exceptions import HTTPException

from app.engine import ENGINE_VERSION
from app.errors import (
    AppError,
    DefinitionRefused,
    EnergyNotConserved,
    FieldFault,
    InputOutOfRange,
    NotYet,
    SolverStopped,
    TooBusy,
    UnknownKey,
)

MEDIA_TYPE = "application/problem+json"

_LOG = logging.getLogger("stillcold")

_TITLES = {
    400: "The request cannot be read",
    404: "There is nothing at this address",
    405: "This method is not allowed here",
    413: "The request is too large",
    422: "The request has faults",
    500: "Something went wrong",
    503: "Too busy",
}


def problem(
    status: int, detail: str, faults: tuple[FieldFault, ...] = (), *, title: str | None = None
) -> dict[str, Any]:
    """The body of an error."""
    return {
        "type": "about:blank",
        "title": title or _TITLES.get(status, "The request failed"),
        "status": status,
        "detail": detail,
        "engine_version": ENGINE_VERSION,
        "errors": [{"field": f.field, "message": f.message, "given": f.given, "allowed": f.allowed} for f in faults],
    }


def problem_of(error: Exception) -> dict[str, Any]:
    """The body that stands for an error of the program's own; unexpected ones are logged and get a number."""
    if isinstance(error, DefinitionRefused):
        return problem(422, f"{len(error.faults)} fault(s) in the definition.", error.faults)
    if isinstance(error, NotYet):
        return problem(422, str(error), (FieldFault(error.field, str(error), None, "left out"),))
    if isinstance(error, UnknownKey):
        return problem(404, str(error))
    if isinstance(error, InputOutOfRange):
        return problem(422, str(error), (FieldFault(error.name, str(error), error.value, ""),))
    if isinstance(error, TooBusy):
        return problem(503, str(error))
    if isinstance(error, (SolverStopped, EnergyNotConserved)):
        _LOG.error("run refused: %s", error)
        return problem(500, str(error), title="The run was refused")
    number = secrets.token_hex(4)
    _LOG.error("unexpected error %s", number, exc_info=error)
    return problem(500, f"The program failed. Quote the number {number}.")


def problem_response(body: dict[str, Any], headers: dict[str, str] | None = None) -> JSONResponse:
    """A body of an error as a response."""
    return JSONResponse(body, body["status"], media_type=MEDIA_TYPE, headers=headers)


async def app_error(_: Request, error: Exception) -> JSONResponse:
    """Handler of the program's own errors, and of any that nobody foresaw."""
    headers = {"Retry-After": str(error.retry_after_s)} if isinstance(error, TooBusy) else None
    return problem_response(problem_of(error), headers)


async def http_error(_: Request, error: Exception) -> JSONResponse:
    """Handler of what the framework refuses: unknown addresses, methods, sizes."""
    assert isinstance(error, HTTPException)
    return problem_response(problem(error.status_code, str(error.detail)), dict(error.headers or {}))


async def request_error(_: Request, error: Exception) -> JSONResponse:
    """Handler of requests that do not have the shape of their route."""
    assert isinstance(error, RequestValidationError)
    faults = tuple(
        FieldFault(
            ".".join(str(part) for part in fault["loc"] if part != "body"), fault["msg"], _plain(fault.get("input")), ""
        )
        for fault in error.errors()
    )
    return problem_response(problem(422, f"{len(faults)} fault(s) in the request.", faults))


def _plain(given: object) -> object:
    return given if isinstance(given, (str, int, bool)) and len(str(given)) < 80 else None


HANDLERS: dict[Any, Any] = {
    Exception: app_error,
    AppError: app_error,
    HTTPException: http_error,
    RequestValidationError: request_error,
}
