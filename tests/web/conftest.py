"""A client of the whole app, without a network."""

from __future__ import annotations

import warnings
from collections.abc import Iterator

import pytest

with warnings.catch_warnings():
    # the test client would rather stand on another HTTP library; ours does all that is asked of it here
    warnings.filterwarnings("ignore", message="Using `httpx` with")
    from fastapi.testclient import TestClient

from app.main import create_app
from app.settings import Settings


@pytest.fixture(scope="package")
def client() -> Iterator[TestClient]:
    with TestClient(create_app(Settings())) as found:
        yield found
