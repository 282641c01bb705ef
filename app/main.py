"""Make the app: the only place that puts settings, workers, pages and API together."""

from __future__ import annotations

import contextlib
from collections.abc import AsyncIterator
from pathlib import Path

from fastapi import FastAPI
from fastapi.middleware.gzip import GZipMiddleware
from fastapi.staticfiles import StaticFiles

from app import api, web
from app.answers import warm_up
from app.middleware import BodyLimit, SameOrigin, SecurityHeaders
from app.settings import Settings
from app.workers import Workers

STATIC = Path(__file__).parents[1] / "static"


def create_app(settings: Settings) -> FastAPI:
    """A complete app with these settings; nothing is opened before it starts."""
    workers = Workers(settings.workers, settings.queue_length, settings.retry_after_s)

    @contextlib.asynccontextmanager
    async def lifespan(_: FastAPI) -> AsyncIterator[None]:
        workers.start(warm_up)
        yield
        workers.close()

    app = FastAPI(
        title="Stillcold",
        description="How long cold stores stay inside their safe limits when the power fails.",
        version="1",
        docs_url=None,
        redoc_url=None,
        openapi_url="/api/v1/openapi.json",
        lifespan=lifespan,
    )
    app.state.workers = workers
    app.state.settings = settings
    for error, handler in web.handlers(api.HANDLERS).items():
        app.add_exception_handler(error, handler)
    app.include_router(api.router)
    app.include_router(web.router)
    app.mount("/static", StaticFiles(directory=STATIC), name="static")
    app.add_middleware(GZipMiddleware, minimum_size=1000)
    app.add_middleware(SecurityHeaders)
    app.add_middleware(SameOrigin)
    app.add_middleware(BodyLimit, limit_bytes=settings.body_limit_bytes)
    return app
