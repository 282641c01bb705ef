"""One field, one definition: quantities, the ranges in the JSON schema, and the fingerprint of a question."""

from __future__ import annotations

import re
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.stores import StoreDefinition, definition_document, fingerprint, read_definition
from app.stores.fields import Quantity
from tests.stores.wide import simple

SCHEMA = StoreDefinition.model_json_schema()["$defs"]


@given(
    value=st.floats(allow_nan=False, allow_infinity=False),
    spread=st.none() | st.floats(0.0, 1e6),
    known=st.sampled_from([None, "measured", "data_sheet", "estimated", "typical"]),
)
def test_a_quantity_is_written_bare_when_nothing_else_is_known(
    value: float, spread: float | None, known: str | None
) -> None:
    quantity = Quantity.model_validate({"value": value, "plus_minus": spread, "known": known})
    written = quantity.model_dump(mode="json")
    assert (written == value) if spread is None and known is None else (written["value"] == value)
    assert Quantity.model_validate(written) == quantity


def test_a_number_is_read_the_same_bare_or_as_an_object() -> None:
    bare, whole = simple(), simple()
    whole["contents"][0]["mass_kg"] = {"value": 18.0}
    assert read_definition(bare) == read_definition(whole)
    assert definition_document(read_definition(whole))["contents"][0]["mass_kg"] == 18.0


def test_how_a_number_is_known_is_kept() -> None:
    document = simple()
    document["contents"][0]["mass_kg"] = {"value": 18.0, "plus_minus": 0.5, "known": "measured"}
    again = definition_document(read_definition(document))["contents"][0]["mass_kg"]
    assert again == {"value": 18.0, "plus_minus": 0.5, "known": "measured"}


def test_nothing_changes_a_definition_after_it_was_read() -> None:
    definition = read_definition(simple())
    with pytest.raises(ValueError, match="frozen"):
        definition.name = "other"  # type: ignore[misc]


def test_the_fingerprint_is_that_of_the_question_and_not_of_its_spelling() -> None:
    plain, spelt = simple(), simple()
    spelt["definition_version"] = 1
    spelt["outage"] = {"horizon_h": 96.0}
    spelt["contents"][0]["mass_kg"] = {"value": 18}
    turned = dict(reversed(list(spelt.items())))
    minus = simple()
    minus["contents"][0]["limits"][0]["longer_than_h"] = -0.0
    stores = (plain, spelt, turned, minus)
    prints = {fingerprint(read_definition(one), {"confidence": 0.9}, "1") for one in stores}
    assert len(prints) == 1
    assert re.fullmatch("[0-9a-f]{64}", prints.pop())


def test_the_fingerprint_changes_with_definition_options_and_engine() -> None:
    first, other = simple(), simple()
    other["contents"][0]["mass_kg"] = 18.000000000000004
    questions = [
        (first, {"confidence": 0.9}, "1"),
        (other, {"confidence": 0.9}, "1"),
        (first, {"confidence": 0.8}, "1"),
        (first, {"confidence": 0.9}, "2"),
    ]
    prints = {fingerprint(read_definition(store), options, engine) for store, options, engine in questions}
    assert len(prints) == len(questions)


@pytest.mark.parametrize(
    ("model", "field", "low", "high"),
    [
        ("Layer", "thickness_m", 0.00005, 1.5),
        ("Contents", "mass_kg", 0.001, 1e6),
        ("Contents", "initial_freezing_c", -38.0, -0.05),
        ("Packs", "count", 1, 100000),
        ("Outage", "horizon_h", 0.5, 2400.0),
    ],
)
def test_the_schema_says_the_range_that_is_checked(model: str, field: str, low: float, high: float) -> None:
    said = SCHEMA[model]["properties"][field]
    assert (said["minimum"], said["maximum"]) == (low, high)
    assert "Allowed: " in said["description"]


def test_the_schema_says_how_long_a_list_may_be_and_what_each_of_it() -> None:
    said = SCHEMA["SeriesHistory"]["properties"]["time_h"]
    assert (said["minItems"], said["maxItems"]) == (2, 20000)
    assert (said["items"]["minimum"], said["items"]["maximum"]) == (0.0, 8760.0)


def test_the_schema_lets_a_quantity_be_a_bare_number() -> None:
    bare, whole = SCHEMA["Quantity"]["anyOf"]
    assert bare == {"type": "number"}
    assert whole["required"] == ["value"]


def test_every_field_of_the_schema_is_described() -> None:
    def undescribed(model: str, schema: dict[str, Any]) -> list[str]:
        fields = schema.get("properties", {}).items()
        # walls, ceiling and floor say what they are; kind chooses the model, which has a description
        plain = {"kind", "walls", "ceiling", "floor"}
        return [f"{model}.{name}" for name, said in fields if "description" not in said and name not in plain]

    models = {name: schema for name, schema in SCHEMA.items() if name != "Quantity"}
    assert [one for name, schema in models.items() for one in undescribed(name, schema)] == []
    assert all(schema.get("description") for schema in SCHEMA.values())
