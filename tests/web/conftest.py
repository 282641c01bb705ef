"""A client of the whole app, without a network."""

from __future__ import annotations

import warnings
from collections.abc import Iterator

import pytest

with warnings.catch_warnings():
    # the test client would rather stand on another HTTP library; ours does all that is asked of it here
    warnings.filterwarnings("ignore", message="Using `httpx` with")
    from fastapi.testclient import TestClient

from fastapi.middleware.gzip import GZipMiddleware

from app.main import create_app
from app.settings import Settings


@pytest.fixture(scope="package")
def client() -> Iterator[TestClient]:
    """Without compression: it drops what the templates tell the test client of themselves."""
    app = create_app(Settings())
    app.user_middleware = [layer for layer in app.user_middleware if layer.cls is not GZipMiddleware]
    with TestClient(app) as found:
        yield found


@pytest.fixture(scope="package")
def compressing_client() -> Iterator[TestClient]:
    with TestClient(create_app(Settings())) as found:
        yield found
