"""Pages as a whole: their contract with the templates, their forms, their refusals, their weight."""

from __future__ import annotations

import json
from dataclasses import fields
from typing import Any

import pytest
from fastapi.testclient import TestClient
from hypothesis import given
from hypothesis import strategies as st

from app.errors import EnergyNotConserved, TooBusy
from app.main import STATIC
from app.stores import definition_document, read_definition, sample_case, sample_cases, store_types
from app.web.error_pages import ErrorPage
from app.web.form import form_of
from app.web.form_values import typed_of
from app.web.home_pages import HomePage
from app.web.plan_view import PlanPage
from app.web.reference_pages import ApiPage, TablePage
from app.web.store_pages import StorePage, read_form
from app.web.typed import read_typed
from tests.web.pages import Page

FREEZER = "/store?sample=food-bank-freezer"
NAMES = [name for name, _ in typed_of(sample_case("food-bank-freezer").store).flat()] + ["outage:json", ":json"]
WALL = "enclosure.faces.walls.layers[1].thickness_m"


def typed_form(client: TestClient, path: str = FREEZER) -> dict[str, str]:
    return Page(client.get(path).text).typed()


@pytest.mark.parametrize(
    ("path", "template", "page"),
    [
        ("/", "home/home.html", HomePage),
        (FREEZER, "store/describe.html", StorePage),
        ("/store", "store/describe.html", StorePage),
        ("/reference/foods", "reference/table.html", TablePage),
        ("/reference/limits", "reference/table.html", TablePage),
        ("/api", "reference/api.html", ApiPage),
        ("/nothing", "errors/error.html", ErrorPage),
    ],
)
def test_a_page_gives_its_template_one_dataclass_and_nothing_else(
    client: TestClient, path: str, template: str, page: type[Any]
) -> None:
    response: Any = client.get(path)
    assert response.template.name == template
    assert set(response.context) == {"request", "page"}
    assert isinstance(response.context["page"], page)
    assert all(hasattr(response.context["page"], one.name) for one in fields(page))


@pytest.mark.parametrize("path", ["/", FREEZER, "/store?type=chest_freezer", "/patterns", "/reference/limits", "/api"])
def test_a_page_has_one_heading_a_title_and_no_id_twice(client: TestClient, path: str) -> None:
    html = client.get(path).text
    assert html.count("<h1>") == 1
    assert "<main id=" in html
    assert " style=" not in html
    assert "<script>" not in html
    ids = Page(html).ids
    if path != "/patterns":  # which shows the same form twice
        assert len(ids) == len(set(ids))


@pytest.mark.parametrize("path", [FREEZER, "/store?type=medicine_refrigerator", "/store?sample=fish-exporter-box"])
def test_every_control_has_a_name_that_can_be_heard(client: TestClient, path: str) -> None:
    page = Page(client.get(path).text)
    for control in page.fields:
        if control.attributes.get("type") == "hidden":
            continue
        heard = control.attributes.get("aria-label") or page.labels.get(control.attributes.get("id", ""))
        assert heard, control.attributes
    assert page.labels[WALL] == "Thickness of the layer, in metres" if "food-bank" in path else True


def test_every_kind_of_store_and_every_case_opens(client: TestClient) -> None:
    for kind in store_types():
        assert client.get(f"/store?type={kind.key}").status_code == 200
    for case in sample_cases():
        response = client.get(f"/store?sample={case.key}")
        assert response.status_code == 200
        assert "best estimate" in response.text


def test_a_page_with_all_that_it_loads_weighs_less_than_150_kilobytes(compressing_client: TestClient) -> None:
    names = [path.relative_to(STATIC).as_posix() for path in STATIC.rglob("*") if path.is_file()]
    pages = [compressing_client.get(FREEZER), *(compressing_client.get(f"/static/{name}") for name in names)]
    assert len(names) > 10
    assert 0 < sum(page.num_bytes_downloaded for page in pages) < 150_000
    assert pages[0].headers["content-encoding"] == "gzip"
    assert len(pages[0].content) < 150_000  # even where nothing between here and the reader compresses


def test_a_thinner_wall_shortens_the_hold_time_on_the_page(client: TestClient) -> None:
    typed = typed_form(client)
    before: Any = client.post("/store", data=typed)
    after: Any = client.post("/store", data=typed | {WALL: "0,06"})
    assert before.status_code == after.status_code == 200
    figures = [response.context["page"].answer.figure for response in (after, before)]
    assert figures[0] < figures[1]  # both of the form "5 h 10 min"
    assert 'value="0,06"' in after.text


def test_the_page_and_the_api_give_the_same_number(client: TestClient) -> None:
    page: Any = client.post("/store", data=typed_form(client))
    answer = client.post("/api/v1/hold-time", json={"store": sample_case("food-bank-freezer").store}).json()
    assert answer["fingerprint"][:16] in page.context["page"].answer.evidence


def test_bad_input_is_answered_with_all_faults_at_once_and_everything_typed_still_there(client: TestClient) -> None:
    typed = typed_form(client) | {WALL: "60", "contents[0].mass_kg": "<heavy>", "contents[1].name": ""}
    response: Any = client.post("/store", data=typed)
    assert response.status_code == 422
    assert "<title>Error: " in response.text
    assert {fault.path for fault in response.context["page"].form.faults} == {
        WALL,
        "contents[0].mass_kg",
        "contents[1].name",
    }
    page = Page(response.text)
    assert page.typed() == typed
    for fault in response.context["page"].form.faults:
        assert f"#{fault.path}" in page.hrefs
        assert fault.path in page.ids
        assert response.text.count("Did you enter mm or cm?") == 2  # in the summary, and by the field
    wrong = [one for one in page.fields if one.attributes.get("aria-invalid") == "true"]
    assert [one.attributes["aria-describedby"].split()[-1] for one in wrong] == [
        f"{one.attributes['id']}.error" for one in wrong
    ]


def test_adding_removing_and_changing_need_no_script(client: TestClient) -> None:
    typed = typed_form(client)
    added = Page(client.post("/store", data=typed | {"do": "add:coolants"}).text).typed()
    assert "coolants[0].coolant" in added
    removed = Page(client.post("/store", data=added | {"do": "remove:coolants[0]"}).text).typed()
    assert removed == typed
    changed = Page(client.post("/store", data=typed | {"do": "change:x", "enclosure:way": "heat_leak"}).text).typed()
    assert "enclosure.overall.heat_leak_w_per_k" in changed
    back = Page(client.post("/store", data=changed | {"do": "change:x", "enclosure:way": "faces"}).text).typed()
    assert back[WALL] == typed[WALL]


@pytest.mark.parametrize(
    "do",
    ["add:", "add:" + "a." * 5000, "remove:contents[99]", "add:contents[0]", "remove:", "add:[3]", "do:it", "add:x:y"],
)
def test_no_button_value_breaks_the_page(client: TestClient, do: str) -> None:
    assert client.post("/store", data={"name": "A", "do": do}).status_code in (200, 422)


def test_a_saved_description_opens_again_as_the_same_definition(client: TestClient) -> None:
    saved = client.post("/store/definition", data=typed_form(client))
    assert saved.headers["content-disposition"] == 'attachment; filename="food-bank-freezer.json"'
    definition = read_definition(saved.json())
    assert definition == read_definition(sample_case("food-bank-freezer").store)
    opened = client.post("/store/open", files={"file": ("a.json", saved.content)})
    assert opened.status_code == 200
    again = client.post("/store/definition", data=Page(opened.text).typed())
    assert again.json() == definition_document(definition)


@pytest.mark.parametrize(
    "content",
    [b"", b"{", b"[1]", b"\xff\xfe", b"{}", b'{"enclosure": 3}', b'{"contents": [[]], "enclosure": {"faces": [1]}}']
    + [b"[" * 100000, b'{"name": NaN, "enclosure": {"inside_m": {"width": 1' + b"0" * 400 + b"}}}"],
)
def test_a_file_that_is_no_definition_is_refused_in_words(client: TestClient, content: bytes) -> None:
    response = client.post("/store/open", files={"file": ("a.json", content)})
    assert response.status_code == 422
    assert "<title>Error: " in response.text


def test_an_opened_file_with_faults_fills_the_form_and_names_them(client: TestClient) -> None:
    store = json.loads(json.dumps(sample_case("food-bank-freezer").store))
    store["contents"][0]["mass_kg"] = "much"
    store["contents"][1]["food"] = "moon_cheese"
    response: Any = client.post("/store/open", files={"file": ("a.json", json.dumps(store).encode())})
    assert response.status_code == 422
    assert Page(response.text).typed()["contents[0].mass_kg"] == "much"
    assert {fault.path for fault in response.context["page"].form.faults} == {"contents[0].mass_kg"}


def test_the_series_downloads_as_comma_separated_values(client: TestClient) -> None:
    response = client.post("/store/series.csv", data=typed_form(client))
    lines = response.text.splitlines()
    assert lines[0].startswith("time_h,Air inside [°C],")
    assert lines[1].startswith("0,-20,")
    assert len(lines) == 1 + 96 * 4 + 1


def test_the_plan_has_times_people_log_inputs_and_says_what_it_is_worth(client: TestClient) -> None:
    response: Any = client.post("/store/plan", data=typed_form(client))
    assert response.template.name == "plan/plan.html"
    page = response.context["page"]
    assert isinstance(page, PlanPage)
    assert "not a planning value" in response.text
    assert page.log_names[0] == "Air inside"
    assert all(len(row.predicted) == len(page.log_names) for row in page.log_rows)
    assert any(row.name == "Item 1: Boxed meat: Mass" and row.value == "900 kg ± 90" for row in page.inputs)
    assert page.fingerprint in response.text


def test_live_answers_say_what_is_missing_and_never_fail_the_page(client: TestClient) -> None:
    typed = typed_form(client)
    assert "data-answer" in client.post("/store/answer", data=typed).text
    missing = client.post("/store/answer", data=typed | {WALL: ""})
    assert missing.status_code == 200
    assert "No answer yet. Walls, Layer 2: Enter the thickness of the layer, in metres." in missing.text
    assert "data-answer" not in missing.text


def test_what_is_typed_is_shown_as_text_and_not_as_markup(client: TestClient) -> None:
    typed = typed_form(client) | {"name": "<script>alert(1)</script>", "contents[0].name": '"><img src=x>'}
    html = client.post("/store", data=typed).text
    assert "<script>alert" not in html
    assert "<img src=x>" not in html


def test_the_limits_page_prints_the_standing_notice(client: TestClient) -> None:
    assert "Planning aid only." in client.get("/reference/limits").text


def test_unknown_things_are_not_found(client: TestClient) -> None:
    for path in ("/store?sample=nothing", "/store?type=nothing", "/reference/nothing"):
        assert client.get(path).status_code == 404


def test_a_run_that_is_refused_keeps_the_form_and_shows_no_number(
    client: TestClient, monkeypatch: pytest.MonkeyPatch
) -> None:
    def refuse(_: object) -> None:
        raise EnergyNotConserved(0.1, 1e-6)

    typed = typed_form(client)
    monkeypatch.setattr("app.web.store_pages.hold_time", refuse)
    response: Any = client.post("/store", data=typed)
    assert response.status_code == 422
    assert "does not add up" in response.text
    assert response.context["page"].answer is None
    assert Page(response.text).typed() == typed


def test_a_full_queue_is_said_with_when_to_try_again(client: TestClient, monkeypatch: pytest.MonkeyPatch) -> None:
    async def full(*_: object) -> None:
        raise TooBusy(2)

    typed = typed_form(client)
    monkeypatch.setattr(client.app.state.workers, "ask", full)  # type: ignore[attr-defined]
    response = client.post("/store", data=typed)
    assert response.status_code == 503
    assert response.headers["retry-after"] == "2"


def test_a_post_that_another_site_makes_is_refused(client: TestClient) -> None:
    response = client.post("/store", data={"name": "A"}, headers={"Sec-Fetch-Site": "cross-site"})
    assert response.status_code == 403


@given(
    st.lists(
        st.tuples(
            st.from_regex(r"[a-z_.:\[\]0-9]{0,30}", fullmatch=True) | st.sampled_from(NAMES),
            st.text(max_size=12) | st.sampled_from(["1", "-5", "1,500", "series", "own", "{}", "[1]"]),
        ),
        max_size=12,
    )
)
def test_no_post_whatever_is_in_it_breaks_the_form(pairs: list[tuple[str, str]]) -> None:
    typed = read_typed(pairs)
    form = form_of(typed, read_form(typed).faults)
    assert form.faults
