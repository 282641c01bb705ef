"""Every page: weight, accessibility, no sideways scrolling, light and dark, no foreign hosts."""

from __future__ import annotations

import re

import pytest
from axe_playwright_python.sync_playwright import Axe
from playwright.sync_api import expect

PAGES = [
    "/",
    "/store?type=walk_in_freezer_room",
    "/store?sample=food-bank-freezer",
    "/store?sample=warehouse-freezer-store",
    "/reference/limits",
    "/reference/foods",
    "/reference/materials",
    "/reference/coolants",
    "/api",
    "/patterns",
]
HEAVIEST_BYTES = 150_000


@pytest.mark.parametrize("width", [390, 1280])
@pytest.mark.parametrize("path", PAGES)
def test_accessibility_checker_finds_nothing_serious(opened, path, width):
    page = opened(path, width)
    found = Axe().run(page, options={"runOnly": ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"]})
    serious = [
        f"{fault['id']}: {fault['nodes'][0]['html'][:120]}"
        for fault in found.response["violations"]
        if fault["impact"] in ("serious", "critical")
    ]
    assert serious == []


@pytest.mark.parametrize("path", PAGES)
def test_dark_page_has_enough_contrast(browser, address, path):
    context = browser.new_context(color_scheme="dark", viewport={"width": 1280, "height": 900})
    page = context.new_page()
    page.goto(address + path)
    found = Axe().run(page, options={"runOnly": ["color-contrast"]})
    context.close()
    assert [fault["nodes"][0]["html"][:120] for fault in found.response["violations"]] == []


@pytest.mark.parametrize("path", PAGES)
def test_page_does_not_scroll_sideways_on_a_phone(opened, path):
    page = opened(path, 390)
    assert page.evaluate("document.documentElement.scrollWidth") <= 390


@pytest.mark.parametrize("path", PAGES)
def test_page_weighs_less_than_its_limit_and_asks_no_foreign_host(browser, address, path):
    context = browser.new_context()
    page = context.new_page()
    session = context.new_cdp_session(page)
    session.send("Network.enable")
    sizes: list[float] = []
    hosts: list[str] = []
    session.on("Network.loadingFinished", lambda event: sizes.append(event["encodedDataLength"]))
    page.on("request", lambda request: hosts.append(request.url))
    page.goto(address + path)
    page.wait_for_load_state("networkidle")
    context.close()
    assert sum(sizes) < HEAVIEST_BYTES
    assert all(url.startswith((address, "data:")) for url in hosts)


@pytest.mark.parametrize("path", ["/", "/store?sample=food-bank-freezer"])
def test_keyboard_reaches_the_content_first(opened, path):
    page = opened(path)
    page.keyboard.press("Tab")
    assert "Skip" in page.evaluate("document.activeElement.innerText")
    page.keyboard.press("Enter")
    expect(page).to_have_url(re.compile("#main$"))
