"""The pages: what people see. They hold no arithmetic; all answers come from ``answers``."""

from __future__ import annotations

import secrets
from collections.abc import Awaitable, Callable
from typing import Any

from fastapi import APIRouter, Request
from fastapi.responses import Response
from starlette.exceptions import HTTPException

from app.errors import AppError, TooBusy, UnknownKey
from app.web import home_pages, store_pages
from app.web.templates import templates

Handler = Callable[[Request, Exception], Awaitable[Response]]

router = APIRouter()
router.include_router(home_pages.router)
router.include_router(store_pages.router)


def handlers(for_api: dict[Any, Handler]) -> dict[Any, Handler]:
    """Error handlers of the whole app: the API's own under /api/v1, pages elsewhere."""
    return {error: _split(handler) for error, handler in for_api.items()}


def _split(for_api: Handler) -> Handler:
    async def handle(request: Request, error: Exception) -> Response:
        if request.url.path.startswith("/api/v1"):
            return await for_api(request, error)
        return error_page(request, error)

    return handle


def error_page(request: Request, error: Exception) -> Response:
    """An error as a page that says what to do next."""
    status, text = 500, f"The program failed. Quote the number {secrets.token_hex(4)}."
    headers: dict[str, str] = {}
    if isinstance(error, HTTPException):
        status, text = error.status_code, str(error.detail)
    elif isinstance(error, UnknownKey):
        status, text = 404, str(error)
    elif isinstance(error, TooBusy):
        status, text, headers = 503, str(error), {"Retry-After": str(error.retry_after_s)}
    elif isinstance(error, AppError):
        text = str(error)
    page = {"title": "Error", "heading": "This did not work", "text": text}
    return templates.TemplateResponse(request, "errors/error.html", {"page": page}, status_code=status, headers=headers)


__all__ = ["error_page", "handlers", "router"]
