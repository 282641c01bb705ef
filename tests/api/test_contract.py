"""The API from outside: names of the contract, one error shape, strict JSON, bad stores beside good ones."""

from __future__ import annotations

import json
import subprocess
import sys
from copy import deepcopy
from pathlib import Path
from typing import Any

import httpx
import pytest

from app.engine import ENGINE_VERSION
from app.main import create_app
from app.settings import Settings
from app.stores import sample_case, sample_cases

ROOT = Path(__file__).parents[2]


class Api:
    """The app in this process, asked over its ASGI interface."""

    def __init__(self, settings: Settings | None = None) -> None:
        self.app = create_app(settings or Settings())

    def send(self, method: str, path: str, **given: Any) -> httpx.Response:
        import asyncio

        async def once() -> httpx.Response:
            transport = httpx.ASGITransport(self.app, raise_app_exceptions=False)
            async with httpx.AsyncClient(transport=transport, base_url="http://test") as client:
                return await client.request(method, path, **given)

        return asyncio.run(once())

    def ask(self, body: Any) -> httpx.Response:
        return self.send("POST", "/api/v1/hold-time", json=body)


@pytest.fixture(scope="module")
def api() -> Api:
    return Api()


def store(key: str = "food-bank-freezer") -> dict[str, Any]:
    return deepcopy(sample_case(key).store)


def is_problem(response: httpx.Response, status: int) -> dict[str, Any]:
    assert response.status_code == status
    assert response.headers["content-type"] == "application/problem+json"
    body = response.json()
    assert {"type", "title", "status", "detail", "errors", "engine_version"} <= set(body)
    assert all({"field", "message", "given", "allowed"} == set(fault) for fault in body["errors"])
    return body


def test_answer_has_the_names_of_the_contract(api):
    body = api.ask({"store": store()}).json()
    wanted = {
        "engine_version", "store", "hold_time_h", "status", "ends_with", "items", "heat_in", "energy_balance_error",
        "hand_check", "drivers", "coolants", "series", "cautions", "assumed",
    }  # fmt: skip
    assert wanted <= set(body)
    hold = body["hold_time_h"]
    assert (hold["planning"], hold["median"], hold["low"], hold["high"]) == (None,) * 4
    item = {
        "name", "hold_time_h", "status", "limits", "biot", "shells", "melting_starts_h", "melted_h",
        "warmest_c_at_horizon", "mean_kinetic_c",
    }  # fmt: skip
    assert item <= set(body["items"][0])
    check = {"heat_leak_w_per_k", "heat_capacity_j_per_k", "time_constant_h", "to_limit_j", "melting_j"}
    assert check | {"closed_form_h"} <= set(body["hand_check"])
    assert len(body["series"]["time_h"]) == len(body["series"]["air_c"]) == len(body["series"]["room_c"])


def test_the_number_is_that_of_the_command_line(api):
    path = ROOT / "sample_cases" / "fish-exporter-box.json"
    printed = subprocess.run(
        [sys.executable, "-m", "app", "hold", str(path), "--json"], cwd=ROOT, capture_output=True, text=True, check=True
    )
    assert json.loads(printed.stdout) == api.ask({"store": store("fish-exporter-box")}).json()


def test_faults_are_listed_all_at_once_by_field(api):
    wrong = store()
    wrong["contents"][0]["mass_kg"] = "much"
    wrong["enclosure"]["faces"]["walls"]["layers"][1]["thickness_m"] = 100
    wrong["nonsense"] = 1
    body = is_problem(api.ask({"store": wrong, "confidence": 7, "more": 1}), 422)
    fields = {fault["field"] for fault in body["errors"]}
    assert {
        "confidence", "more", "store.nonsense", "store.contents[0].mass_kg",
        "store.enclosure.faces.walls.layers[1].thickness_m",
    } <= fields  # fmt: skip
    thick = next(fault for fault in body["errors"] if fault["field"].endswith("thickness_m"))
    assert "mm" in thick["message"]
    assert thick["given"] == 100
    assert thick["allowed"]


@pytest.mark.parametrize(
    ("text", "says"),
    [
        ("{", "line 1"), ('{"store": NaN}', "NaN"), ('{"store": Infinity}', "Infinity"),
        ('{"store": 1, "store": 2}', "twice"), ("[" * 100 + "]" * 100, "deep"), ("", "JSON"), ("9" * 5000, "too long"),
    ],
)  # fmt: skip
def test_what_is_no_json_is_said_with_its_place(api, text, says):
    body = is_problem(api.send("POST", "/api/v1/hold-time", content=text.encode()), 400)
    assert says in body["detail"]


@pytest.mark.parametrize("body", [[], 1, "x", {}, {"store": None}, {"store": []}, {"store": {}}])
def test_bodies_of_the_wrong_kind_are_refused(api, body):
    assert is_problem(api.ask(body), 422)["errors"]


def test_a_spread_is_refused_until_it_is_worked_out(api):
    body = is_problem(api.ask({"store": store(), "samples": 256}), 422)
    assert body["errors"][0]["field"] == "samples"
    assert api.ask({"store": store(), "samples": 0}).status_code == 200


def test_many_keep_their_order_and_a_bad_one_fails_alone(api):
    questions: list[Any] = [{"store": case.store} for case in sample_cases()]
    questions.insert(2, {"store": {"enclosure": 1}})
    body = api.send("POST", "/api/v1/hold-times", json=questions).json()
    assert len(body["answers"]) == len(questions)
    assert body["answers"][2]["status"] == 422
    names = [answer.get("store") for answer in body["answers"]]
    assert names[:2] == [case.store["name"] for case in sample_cases()[:2]]
    assert names[-1] == sample_cases()[-1].store["name"]


def test_too_many_are_refused(api):
    is_problem(api.send("POST", "/api/v1/hold-times", json=[{}] * 1001), 422)


@pytest.mark.parametrize("table", ["materials", "foods", "coolants", "limits"])
def test_tables_are_served_with_their_sources(api, table):
    body = api.send("GET", f"/api/v1/reference/{table}").json()
    assert body["engine_version"] == ENGINE_VERSION
    assert len(body[table]) > 20
    assert "source" in json.dumps(body[table][0])


def test_health_and_description(api):
    assert api.send("GET", "/api/v1/health").json() == {"status": "ok", "engine_version": ENGINE_VERSION}
    assert "/api/v1/hold-time" in api.send("GET", "/api/v1/openapi.json").json()["paths"]


def test_unknown_addresses_and_methods_have_the_same_shape(api):
    is_problem(api.send("GET", "/api/v1/nothing"), 404)
    is_problem(api.send("DELETE", "/api/v1/hold-time"), 405)
    is_problem(api.send("GET", "/api/v1/reference/clouds"), 422)


def test_a_body_that_is_too_large_is_refused():
    small = Api(Settings(body_limit_bytes=1000))
    response = small.send("POST", "/api/v1/hold-time", content=b"x" * 2000)
    assert response.status_code == 413
    assert response.headers["content-type"].startswith("application/problem+json")


def test_posts_of_another_site_are_refused(api):
    for headers in ({"Sec-Fetch-Site": "cross-site"}, {"Origin": "http://elsewhere.example"}):
        assert api.send("POST", "/api/v1/hold-time", json={}, headers=headers).status_code == 403
    same = {"Origin": "http://test", "Sec-Fetch-Site": "same-origin"}
    assert api.send("POST", "/api/v1/hold-time", json={"store": store()}, headers=same).status_code == 200


def test_every_response_carries_the_headers_that_keep_pages_closed(api):
    for path in ("/", "/api/v1/health", "/api/v1/nothing", "/static/css/tokens.css"):
        headers = api.send("GET", path).headers
        assert "default-src 'self'" in headers["content-security-policy"]
        assert headers["x-content-type-options"] == "nosniff"


def test_a_full_queue_is_answered_at_once_and_empties_again():
    import asyncio
    import threading

    from app.errors import TooBusy
    from app.workers import Workers

    async def fill() -> int:
        workers, gate = Workers(1, 1, 7), threading.Event()
        waiting = [asyncio.ensure_future(workers.ask(gate.wait, 5.0)) for _ in range(2)]
        await asyncio.sleep(0.05)
        with pytest.raises(TooBusy, match="7 s"):
            await workers.ask(int)
        gate.set()
        await asyncio.gather(*waiting)
        await asyncio.sleep(0.05)
        result = await workers.ask(lambda: 42)
        workers.close()
        return result

    assert asyncio.run(fill()) == 42


def test_an_unforeseen_error_shows_only_a_number(monkeypatch, caplog):
    import app.api.hold_times as module

    def fail(*_: Any, **__: Any) -> None:
        raise RuntimeError("secret words")

    monkeypatch.setattr(module, "hold_time", fail)
    response = Api().ask({"store": store()})
    body = is_problem(response, 500)
    assert "secret" not in response.text
    number = body["detail"].rsplit(" ", 1)[-1].strip(".")
    assert number in caplog.text
