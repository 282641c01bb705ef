"""Every field of the contract: nonsense in it is a fault of that field, complete and in its own words."""

from __future__ import annotations

import json
from typing import Any

import pytest

from app.errors import DefinitionRefused, FieldFault
from app.stores import StoreDefinition, read_definition
from tests.stores.wide import (
    NOT_READ_YET,
    Document,
    Path,
    all_fields,
    changed,
    item,
    leaves,
    required_places,
    simple,
    used_fields,
    wide_documents,
    without,
    written,
)

WIDE = wide_documents()
KEYS = ("material", "food", "coolant", "preset", "test_load_food")
TEXTS = ("name", "organism")
CHOICES = ("shape", "in_face", "beyond", "place", "at", "substance")

NOT_NUMBERS: tuple[Any, ...] = ("heavy", "5", "nan", "", True, [], [5.0], {}, {"value": "5"}, {"value": None})
NOT_FINITE: tuple[Any, ...] = (float("nan"), float("inf"), -float("inf"), {"value": float("nan")})
NOT_IN_RANGE: tuple[Any, ...] = (1e300, -1e300, {"value": 1e300}, 10**400, -(10**5000))
NOT_LISTS: tuple[Any, ...] = ("many", 5, True, {"0": 1})
NOT_GROUPS: tuple[Any, ...] = ("all", 5, True, [], [[]])
NOT_TEXTS: tuple[Any, ...] = (5, 5.0, True, [], {}, "\ud800")


def faults_of(document: Any) -> tuple[FieldFault, ...]:
    with pytest.raises(DefinitionRefused) as refused:
        read_definition(document)
    return refused.value.faults


def nonsense_for(path: Path, value: Any) -> tuple[Any, ...]:
    """What no field of this kind takes, by what stands in it now."""
    name = path[-1]
    if isinstance(value, bool):
        return ("no", 1, 0.0, [], {})
    if isinstance(value, (int, float)) or (isinstance(value, dict) and "value" in value):
        return () if name == "definition_version" else NOT_NUMBERS + NOT_FINITE + NOT_IN_RANGE
    if isinstance(value, list):
        return NOT_LISTS
    if isinstance(value, dict):
        return NOT_GROUPS
    if name in KEYS:
        return (*NOT_TEXTS, "", "no_such_thing", "x" * 100_000)
    if name == "name":
        return (*NOT_TEXTS, "", "   ", "two\nlines", "nul\0", "x" * 81)
    return NOT_TEXTS if name in TEXTS else (*NOT_TEXTS, "", "no_such_choice")


def test_the_wide_documents_use_every_field_of_the_contract() -> None:
    used = set().union(*(used_fields(StoreDefinition.model_validate(document)) for document in WIDE.values()))
    assert all_fields() - used == set()


@pytest.mark.parametrize("name", WIDE)
def test_nonsense_in_any_field_is_a_fault_of_that_field(name: str) -> None:
    for path, value in leaves(WIDE[name]):
        for nonsense in nonsense_for(path, value):
            fields = {fault.field for fault in faults_of(changed(WIDE[name], path, nonsense))}
            here = written(path)
            assert any(field == here or field.startswith((f"{here}.", f"{here}[")) for field in fields), here


@pytest.mark.parametrize("name", WIDE)
def test_every_fault_is_complete_and_fit_for_json(name: str) -> None:
    for path, value in leaves(WIDE[name]):
        for nonsense in nonsense_for(path, value):
            for fault in faults_of(changed(WIDE[name], path, nonsense)):
                assert fault.field
                assert fault.allowed
                assert fault.message.endswith((".", "?"))
                assert "input should" not in fault.message.lower()
                assert len(json.dumps([fault.message, fault.given, fault.allowed], allow_nan=False)) < 1000


@pytest.mark.parametrize("name", WIDE)
def test_an_unknown_field_anywhere_is_refused_with_its_name(name: str) -> None:
    groups = [path for path, value in leaves(WIDE[name]) if isinstance(value, dict)]
    for path in [(), *groups]:
        if path and path[-1] in NOT_READ_YET:
            continue
        faults = faults_of(changed(WIDE[name], (*path, "colour"), "red"))
        assert f"{written(path)}.colour".lstrip(".") in {fault.field for fault in faults}


@pytest.mark.parametrize("name", WIDE)
def test_every_required_field_that_is_missing_says_so(name: str) -> None:
    required = required_places(WIDE[name])
    assert len(required) >= 10
    for path in required:
        faults = {fault.field: fault for fault in faults_of(without(WIDE[name], path))}
        assert faults[written(path)].message.endswith(" is missing."), written(path)
        assert faults[written(path)].given is None


def test_a_fault_speaks_the_words_and_the_range_of_its_own_field() -> None:
    document = simple()
    document["contents"][0]["stacking"]["height_m"] = "high"
    document["contents"][0]["limits"][0]["temperature_c"] = "cold"
    assert faults_of(document) == (
        FieldFault("contents[0].stacking.height_m", "Height must be a number, like 2.5.", "high", "0.002 to 20 m"),
        FieldFault(
            "contents[0].limits[0].temperature_c",
            "Not warmer than must be a number, like 2.5.",
            "cold",
            "-120 to 60 °C",
        ),
    )


@pytest.mark.parametrize(
    ("kind", "given"), [({"kind": "heap"}, "heap"), ({}, None), ({"kind": 5}, "5"), ({"kind": None}, None)]
)
def test_an_unknown_kind_is_a_fault_of_the_word_that_chooses(kind: Document, given: object) -> None:
    document = simple()
    document["contents"][0]["stacking"] = kind
    (fault,) = faults_of(document)
    assert fault.field == "contents[0].stacking.kind"
    assert "packs, cartons, pallet, carcass, bottles, bulk, exposed" in fault.message
    assert str(fault.given) == str(given)


def test_a_bad_overall_figure_has_faults_of_the_one_way_that_was_meant() -> None:
    document = simple()
    document["enclosure"]["overall"] = {"k_w_per_m2_k": "good"}
    assert [fault.field for fault in faults_of(document)] == ["enclosure.overall.k_w_per_m2_k"]


def test_a_count_out_of_range_is_not_taken_for_per_cent() -> None:
    (fault,) = faults_of(changed(simple(), ("contents", 0, "stacking", "count"), 5_000_000))
    assert fault.message == "How many is 5e+06; it must be 1 to 100000."


def test_the_unknown_name_of_a_field_comes_with_the_nearest_of_its_own_group() -> None:
    document = simple()
    document["contents"][0]["mass"] = 3.0
    (fault,) = faults_of(document)
    assert fault.message == "There is no field called 'mass' here. Nearest: mass_kg."


def test_a_document_nested_without_end_is_refused() -> None:
    deep: Document = {}
    for _ in range(5000):
        deep = {"below": deep}
    for path in (("surroundings", "ground"), ("contents", 0, "colour"), ("contents", 0, "mass_kg"), ("start",)):
        assert faults_of(changed(simple(), path, deep))


def test_names_that_are_no_text_are_refused() -> None:
    assert faults_of(changed(simple(), ("contents", 0, 5), 3))


@pytest.mark.parametrize(
    ("path", "member", "most"),
    [
        (("contents",), None, 60),
        (("coolants",), {"name": "ice", "coolant": "ice", "mass_kg": 0.01}, 40),
        (("air_limits",), {"kind": "above", "temperature_c": 8.0}, 12),
        (("enclosure", "openings"), {"name": "lid", "width_m": 0.05, "height_m": 0.05}, 20),
        (("enclosure", "fittings"), {"material": "steel_sheet", "mass_kg": 1.0}, 40),
    ],
)
def test_a_list_that_is_too_long_is_refused_and_the_longest_is_read(path: Path, member: Any, most: int) -> None:
    small = {"kind": "packs", "count": 1, "width_m": 0.05, "depth_m": 0.05, "height_m": 0.05}
    member = member or item("milk", food="milk_whole", mass_kg=0.1, stacking=small)
    members = [member | ({"name": f"{k}"} if "name" in member else {}) for k in range(most + 1)]
    limited = changed(simple(), ("air_limits",), [{"kind": "above", "temperature_c": 8.0}])
    (fault,) = faults_of(changed(limited, path, members))
    assert fault.field == written(path)
    assert fault.message.endswith(f"at most {most} are possible.")
    assert read_definition(changed(limited, path, members[:most]))


def test_a_series_of_twenty_thousand_times_is_read_and_no_longer_one() -> None:
    def series(count: int) -> Document:
        values = {"time_h": [0.25 * k for k in range(count)], "temperature_c": [20.0] * count}
        return changed(simple(), ("surroundings", "room"), {"kind": "series"} | values)

    assert read_definition(series(20000))
    fields = {fault.field for fault in faults_of(series(20001))}
    assert fields == {"surroundings.room.time_h", "surroundings.room.temperature_c"}
