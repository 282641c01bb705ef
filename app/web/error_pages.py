"""Errors as pages that say what to do next; under /api the API's own handlers keep their say."""

from __future__ import annotations

import logging
import secrets
from collections.abc import Awaitable, Callable, Mapping
from dataclasses import dataclass
from typing import Any

from fastapi import Request
from fastapi.exceptions import RequestValidationError
from fastapi.responses import Response
from starlette.exceptions import HTTPException

from app.errors import AppError, EnergyNotConserved, SolverStopped, TooBusy, UnknownKey
from app.web.templates import templates

Handler = Callable[[Request, Exception], Awaitable[Response]]

_LOG = logging.getLogger("stillcold")

_HEADINGS = {
    404: "There is nothing here",
    405: "This address is not made for that",
    413: "That was too large",
    503: "Too busy just now",
}


@dataclass(frozen=True)
class ErrorPage:
    """What went wrong, and what to do next."""

    title: str
    heading: str
    text: str


def handlers(for_api: Mapping[Any, Handler]) -> dict[Any, Handler]:
    """Error handlers of the whole app: the API's own under /api/v1, pages elsewhere."""
    return {error: _split(handler) for error, handler in for_api.items()}


def _split(for_api: Handler) -> Handler:
    async def handle(request: Request, error: Exception) -> Response:
        if request.url.path.startswith("/api/v1"):
            return await for_api(request, error)
        return error_page(request, error)

    return handle


def error_page(request: Request, error: Exception) -> Response:
    """An error as a page; what nobody foresaw goes to the log under a number."""
    status, text = 500, ""
    headers: dict[str, str] = {}
    if isinstance(error, HTTPException):
        status, text = error.status_code, str(error.detail)
        headers = dict(error.headers or {})
    elif isinstance(error, RequestValidationError):
        status, text = 422, "The address or the form holds something that this page cannot read."
    elif isinstance(error, UnknownKey):
        status, text = 404, str(error)
    elif isinstance(error, TooBusy):
        status, text, headers = 503, str(error), {"Retry-After": str(error.retry_after_s)}
    elif isinstance(error, (SolverStopped, EnergyNotConserved)):
        _LOG.error("run refused: %s", error)
        text = f"{error} No number is shown rather than a wrong one. Change the description and try again."
    elif isinstance(error, AppError):
        status, text = 422, str(error)
    else:
        number = secrets.token_hex(4)
        _LOG.error("unexpected error %s", number, exc_info=error)
        text = f"The program failed. Go back: what you typed is still there. Quote the number {number}."
    page = ErrorPage("Error", _HEADINGS.get(status, "This did not work"), text)
    return templates.TemplateResponse(request, "errors/error.html", {"page": page}, status_code=status, headers=headers)
