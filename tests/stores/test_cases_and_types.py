"""The stores that come with the program: complete, told apart, and honest about what is only typical."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import pytest

from app.errors import UnknownKey
from app.stores import read_definition, sample_case, sample_cases, store_type, store_types
from app.stores.fields import Part, Quantity

EIGHT = {
    "reach_in_refrigerator",
    "chest_freezer",
    "walk_in_cold_room",
    "walk_in_freezer_room",
    "warehouse_room",
    "medicine_refrigerator",
    "ultra_low_freezer",
    "insulated_box",
}


def quantities(part: Any) -> Iterator[Quantity]:
    if isinstance(part, Quantity):
        yield part
    elif isinstance(part, tuple):
        for below in part:
            yield from quantities(below)
    elif isinstance(part, Part):
        for name in part.model_fields_set:
            yield from quantities(getattr(part, name))


def test_there_is_a_type_for_every_kind_of_store() -> None:
    assert {kind.key for kind in store_types()} == EIGHT


@pytest.mark.parametrize("kind", store_types(), ids=lambda kind: kind.key)
def test_every_number_of_a_type_is_marked_typical_and_says_why(kind: Any) -> None:
    definition = read_definition(kind.store)
    given = list(quantities(definition))
    assert len(given) >= 10
    assert {quantity.known for quantity in given} == {"typical"}
    assert definition.given_but_unused() == ()
    assert kind.label
    assert kind.about.endswith(".")
    assert kind.source.endswith(".")


@pytest.mark.parametrize("case", sample_cases(), ids=lambda case: case.key)
def test_a_case_has_a_story_a_known_type_and_uses_all_that_it_gives(case: Any) -> None:
    assert store_type(case.store_type).key == case.store_type
    assert case.story.endswith(".")
    assert case.checks
    assert read_definition(case.store).given_but_unused() == ()


def test_cases_are_at_least_eight_of_many_types_and_told_apart() -> None:
    cases = sample_cases()
    assert len(cases) >= 8
    assert len({case.title for case in cases}) == len(cases)
    assert len({case.store["name"] for case in cases}) == len(cases)
    assert {case.store_type for case in cases} == EIGHT


def test_unknown_cases_and_types_are_refused_with_the_ones_that_are_there() -> None:
    with pytest.raises(UnknownKey, match="no sample case called 'nowhere'.*food-bank-freezer"):
        sample_case("nowhere")
    with pytest.raises(UnknownKey, match="no store type called 'nowhere'.*chest_freezer"):
        store_type("nowhere")
