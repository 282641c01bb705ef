"""A real server and a real Chromium for the tests of this folder. A missing browser fails; nothing is skipped."""

from __future__ import annotations

import shutil
import socket
import threading
import time
from collections.abc import Callable, Iterator

import pytest
import uvicorn
from playwright.sync_api import Browser, Page, sync_playwright

from app.main import create_app
from app.settings import Settings

ARGUMENTS = [
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
]


@pytest.fixture(scope="session")
def address() -> Iterator[str]:
    """Where the app is served for these tests."""
    with socket.socket() as free:
        free.bind(("127.0.0.1", 0))
        port = free.getsockname()[1]
    config = uvicorn.Config(
        create_app(Settings()), host="127.0.0.1", port=port, log_level="warning", timeout_graceful_shutdown=2
    )
    server = uvicorn.Server(config)
    thread = threading.Thread(target=server.run, daemon=True)
    thread.start()
    while not server.started:
        time.sleep(0.05)
    yield f"http://127.0.0.1:{port}"
    server.should_exit = True
    thread.join(timeout=10)


@pytest.fixture(scope="session")
def browser() -> Iterator[Browser]:
    """Debian's Chromium, or whatever stands in its place on the path."""
    found = shutil.which("chromium") or shutil.which("chromium-browser") or shutil.which("google-chrome")
    assert found is not None, "Chromium is needed for these tests: apt-get install chromium"
    with sync_playwright() as playwright:
        chromium = playwright.chromium.launch(executable_path=found, args=ARGUMENTS)
        yield chromium
        chromium.close()


Opener = Callable[..., Page]


@pytest.fixture
def opened(browser: Browser, address: str) -> Iterator[Opener]:
    """Open a page of the app at a width; any error of a script fails the test."""
    contexts = []
    faults: list[str] = []

    def open_page(path: str, width: int = 1280, *, scripts: bool = True) -> Page:
        context = browser.new_context(viewport={"width": width, "height": 900}, java_script_enabled=scripts)
        contexts.append(context)
        page = context.new_page()
        page.on("pageerror", lambda error: faults.append(str(error)))
        page.on("console", lambda line: faults.append(line.text) if line.type == "error" else None)
        page.goto(address + path)
        return page

    yield open_page
    for context in contexts:
        context.close()
    # a refused form answers with 422, which the browser logs as a failed load; scripts must not fail
    assert [fault for fault in faults if "422" not in fault and "503" not in fault] == []
