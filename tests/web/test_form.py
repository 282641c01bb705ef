"""The form: nothing is lost on the way from a definition through typed texts and back."""

from __future__ import annotations

import copy
import json
from typing import Any

import pytest

from app.errors import DefinitionRefused
from app.stores import read_definition, sample_case, sample_cases, store_types
from app.web.form import form_of
from app.web.form_tree import Control, form_tree, walk
from app.web.form_values import document_of, typed_of
from app.web.store_pages import read_form
from app.web.typed import Typed, read_typed

STORES = {case.key: case.store for case in sample_cases()} | {kind.key: kind.store for kind in store_types()}


def again(document: dict[str, Any]) -> dict[str, Any]:
    """A document after a trip through the form, as a browser would post it."""
    typed = read_typed(typed_of(document).flat())
    return document_of(form_tree(typed))[0]


@pytest.mark.parametrize("key", STORES)
def test_opening_and_saving_a_definition_loses_nothing(key: str) -> None:
    assert read_definition(again(STORES[key])) == read_definition(STORES[key])


def widened() -> dict[str, Any]:
    """A definition that uses rare ways: series, curves, own layers, films, a composition, every kind of limit."""
    store = copy.deepcopy(sample_case("food-bank-freezer").store)
    own = {"conductivity_w_per_m_k": {"value": 0.03, "plus_minus": 0.002}, "thickness_m": 0.08}
    store["enclosure"]["faces"]["floor"] = {
        "layers": [own],
        "beyond": {"temperature_c": -5.5},
        "films_w_per_m2_k": {"inside": 6.0, "outside": 20.0},
    }
    store["enclosure"]["faces"]["ceiling"] = {"u_w_per_m2_k": 0.25, "beyond": "outdoors"}
    store["enclosure"]["edge_factors"] = False
    curve = {
        "temperature_c": [-40.0, -20.0, -2.0, 0.5, 20.0],
        "enthalpy_j_per_kg": [0.0, 4e4, 9e4, 3.2e5, 3.9e5],
        "conductivity_w_per_m_k": 1.1,
        "density_kg_per_m3": 950.0,
    }
    first, second = store["contents"]
    del first["food"], second["food"]
    first["substance"] = curve
    second |= {"composition": {"water": 0.8, "protein": 0.2}, "initial_freezing_c": -1.0}
    first["limits"] = [
        {"kind": "below", "temperature_c": -30.0, "longer_than_h": 1.5, "at": "mean"},
        {"kind": "mean_kinetic", "temperature_c": -12.0, "window_h": 12.0},
        {"kind": "thawed", "share": 0.1},
    ]
    store["air_limits"] = [{"kind": "above", "temperature_c": -10.0}]
    store["surroundings"] = {
        "room": {
            "kind": "drift",
            "start_c": 18.0,
            "time_constant_h": 6.0,
            "volume_m3": 180.0,
            "towards": {"kind": "series", "time_h": [0.0, 1e-05, 30.0], "temperature_c": [20.0, 20.1, -3.0]},
        },
        "outdoors": {"kind": "ramp", "from_c": 5.0, "to_c": -2.0, "over_h": 10.0},
    }
    return store


def test_rare_ways_of_giving_things_survive_the_form() -> None:
    assert read_definition(again(widened())) == read_definition(widened())


def test_what_the_form_has_no_field_for_is_carried_and_shown() -> None:
    store = copy.deepcopy(sample_case("food-bank-freezer").store)
    store["outage"]["power"] = [{"from_h": 3, "to_h": 4}]
    store["contents"][0]["colour"] = "red"
    assert again(store)["outage"]["power"] == store["outage"]["power"]
    assert again(store)["contents"][0]["colour"] == "red"
    form = form_of(typed_of(store))
    assert form.sections[-1].key == "other"
    assert len(form.sections[-1].nodes) == 2


def test_two_ways_at_once_are_both_kept_for_the_definition_to_refuse() -> None:
    store = copy.deepcopy(sample_case("food-bank-freezer").store)
    store["enclosure"]["overall"] = {"heat_leak_w_per_k": 5.0}
    with pytest.raises(DefinitionRefused, match="either the faces or one overall figure"):
        read_definition(again(store))


def test_what_was_typed_for_another_way_is_kept() -> None:
    typed = typed_of(sample_case("food-bank-freezer").store)
    typed.put("enclosure:way", "heat_leak")
    kept = dict(form_of(typed).kept)
    assert kept["enclosure.faces.walls.layers[1].thickness_m"] == "0.1"


def test_an_added_group_is_numbered_and_a_removed_one_closes_the_gap() -> None:
    typed = typed_of(sample_case("food-bank-freezer").store)
    typed.remove("contents[0]")
    assert typed.get("contents").items() == [0]
    assert typed.at("contents[0].name").text == "Frozen peas"


def test_names_that_are_no_paths_are_passed_over_and_gaps_are_closed() -> None:
    typed = read_typed([("contents[900000].name", "A"), ("contents[7].name", "B"), ("<b>", "x"), ("a" * 500, "x")])
    assert [name for name, _ in typed.flat()] == ["contents[0].name", "contents[1].name"]
    assert typed.at("contents[0].name").text == "B"


def controls(typed: Typed) -> list[Control]:
    return [node for node in walk(form_tree(typed)) if isinstance(node, Control)]


def test_every_field_of_a_form_with_nonsense_in_it_says_so_at_its_place() -> None:
    document = widened()
    numbers = [one.path for one in controls(typed_of(document)) if one.kind in ("quantity", "number", "whole")]
    assert len(numbers) > 30
    for path in numbers:
        for nonsense in ("heavy", "1e300", "-1e300", "nan"):
            typed = typed_of(document)
            typed.put(path, nonsense)
            read = read_form(typed)
            form = form_of(typed, read.faults)
            assert path in {fault.path for fault in form.faults}, f"{path} = {nonsense}"
            assert dict(typed.flat())[path] == nonsense


def test_every_needed_field_that_is_left_blank_asks_for_itself() -> None:
    document = widened()
    needed = [one for one in controls(typed_of(document)) if one.required and not one.changes_form]
    for control in needed:
        typed = typed_of(document)
        typed.put(control.path, " ")
        faults = [fault for fault in form_of(typed, read_form(typed).faults).faults if fault.path == control.path]
        assert faults, control.path
        assert faults[0].message.startswith(("Enter the", "Choose the")), control.path


def test_an_empty_form_names_all_that_is_missing_at_once() -> None:
    faults = form_of(Typed(), read_form(Typed()).faults).faults
    assert len(faults) >= 4
    assert any("Enter the inside width, in metres." == fault.message for fault in faults)


def test_a_carried_part_that_is_no_json_any_more_is_a_fault_of_its_own() -> None:
    typed = typed_of(sample_case("food-bank-freezer").store)
    typed.put("outage:json", "{not json")
    read = read_form(typed)
    assert read.definition is None
    assert read.faults[0].field == "outage:json"
    assert json.dumps([fault.message for fault in read.faults])
