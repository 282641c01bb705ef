"""Nonsense in every field of a definition: a fault that names the field, or a valid store; never anything else."""

from __future__ import annotations

import math
from collections.abc import Iterator
from copy import deepcopy
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from app.answers import hold_time
from app.errors import DefinitionRefused
from app.stores import definition_document, read_definition, sample_cases, store_types

DOCUMENTS = {case.key: case.store for case in sample_cases()} | {kind.key: kind.store for kind in store_types()}
Path = tuple[str | int, ...]


def leaves(node: Any, path: Path = ()) -> Iterator[Path]:
    """Paths of everything in a document, parts and leaves."""
    children = node.items() if isinstance(node, dict) else enumerate(node) if isinstance(node, list) else ()
    for key, child in children:
        yield (*path, key)
        yield from leaves(child, (*path, key))


def text(path: Path) -> str:
    return "".join(f"[{part}]" if isinstance(part, int) else f".{part}" for part in path).lstrip(".")


def at(document: Any, path: Path) -> Any:
    for part in path:
        document = document[part]
    return document


def with_value(document: Any, path: Path, value: Any) -> Any:
    changed = deepcopy(document)
    at(changed, path[:-1])[path[-1]] = value
    return changed


def faults_of(document: Any) -> list[str]:
    """Fields of the faults of a document; none when it is a store."""
    try:
        read_definition(document)
    except DefinitionRefused as refused:
        for fault in refused.faults:
            assert fault.message
        return [fault.field for fault in refused.faults]
    return []


NONSENSE = ["nonsense", math.nan, math.inf, 1e300, -1e300, 10**400, None, True, [], {}, {"value": "x"}]


@pytest.mark.parametrize("key", DOCUMENTS)
def test_nonsense_anywhere_is_refused_by_name_or_means_something(key):
    document = DOCUMENTS[key]
    for path in leaves(document):
        for value in NONSENSE:
            changed = with_value(document, path, value)
            for found in faults_of(changed):
                # the field itself, something inside it, or what stands around it
                named, here = found, text(path)
                assert named.startswith(here) or here.startswith(named.split("[")[0]) or _same_part(named, here), (
                    f"{here} = {value!r} is blamed on {named}"
                )


def _same_part(named: str, here: str) -> bool:
    """Whether a fault that shows only in what belongs together is blamed in the same part of the store."""
    return named.split(".")[0].split("[")[0] in (here.split(".")[0].split("[")[0], "enclosure", "contents", "coolants")


@pytest.mark.parametrize("value", ["nonsense", math.nan, math.inf, 1e300, 10**400, True, []])
def test_a_number_that_is_none_is_refused_at_that_very_field(value):
    for document in DOCUMENTS.values():
        for path in leaves(document):
            here = at(document, path)
            if isinstance(here, bool) or not isinstance(here, (int, float)) or path[-1] in ("value", "plus_minus"):
                continue
            found = faults_of(with_value(document, path, value))
            assert any(name == text(path) or text(path).startswith(name) for name in found), text(path)


def test_an_unknown_field_is_refused_wherever_it_stands():
    document = DOCUMENTS["food-bank-freezer"]
    for path in [(), *leaves(document)]:
        if isinstance(at(document, path), dict):
            changed = with_value(document, (*path, "surprise"), 1)
            assert any("surprise" in name for name in faults_of(changed)), text(path)


def test_two_wrong_fields_are_both_named():
    document = with_value(DOCUMENTS["food-bank-freezer"], ("contents", 0, "mass_kg"), "x")
    document["contents"][1]["start_c"] = 400
    assert {"contents[0].mass_kg", "contents[1].start_c"} <= set(faults_of(document))


@pytest.mark.parametrize(
    ("path", "value", "meant"),
    [
        (("enclosure", "inside_m", "width"), 2700, "mm"),
        (("enclosure", "faces", "walls", "layers", 1, "thickness_m"), 100, "mm"),
        (("enclosure", "faces", "walls", "layers", 1, "thickness_m"), 10, "cm"),
        (("contents", 0, "start_c"), 68, "°F"),
    ],
)
def test_a_slip_of_units_is_asked_about(path, value, meant):
    with pytest.raises(DefinitionRefused, match=meant):
        read_definition(with_value(DOCUMENTS["food-bank-freezer"], path, value))


@pytest.mark.parametrize(
    ("path", "value"),
    [
        (("surroundings", "ground"), {"kind": "seasonal"}),
        (("surroundings", "sun"), {}),
        (("outage", "door_openings"), [{"opening": "door", "at_h": 4.0, "open_s": 120}]),
        (("outage", "power"), [{"from_h": 12, "to_h": 16}]),
        (("enclosure", "faces", "floor", "beyond"), "ground"),
        (("enclosure", "openings", 0, "curtain_effectiveness"), 0.9),
        (("contents", 0, "place"), "top"),
        (("contents", 0, "limits", 0), {"kind": "growth", "organism": "x", "log10": 1}),
        (("coolants",), [{"name": "d", "coolant": "dry_ice", "mass_kg": 5}]),
        (("coolants",), [{"name": "i", "coolant": "ice", "mass_kg": 5, "added_at_h": 3}]),
    ],
)
def test_what_is_not_worked_out_yet_is_refused_and_never_ignored(path, value):
    with pytest.raises(DefinitionRefused, match="not worked out yet"):
        read_definition(with_value(DOCUMENTS["food-bank-freezer"], path, value))


@pytest.mark.parametrize("key", DOCUMENTS)
def test_definitions_go_round(key):
    first = read_definition(DOCUMENTS[key])
    document = definition_document(first)
    assert read_definition(document) == first
    assert definition_document(read_definition(document)) == document


@st.composite
def changed_stores(draw):
    """A worked case with a few of its numbers changed by a factor, as hypothesis likes them."""
    document = deepcopy(DOCUMENTS[draw(st.sampled_from(sorted(DOCUMENTS)))])
    numbers = [
        path
        for path in leaves(document)
        if isinstance(at(document, path), (int, float)) and not isinstance(at(document, path), bool)
    ]
    for path in draw(st.lists(st.sampled_from(numbers), min_size=1, max_size=4, unique=True)):
        node = at(document, path[:-1])
        if isinstance(node[path[-1]], float):
            node[path[-1]] *= draw(st.sampled_from([0.2, 0.5, 0.9, 1.1, 2.0, 4.0]))
        else:
            node[path[-1]] = max(1, round(node[path[-1]] * draw(st.sampled_from([0.5, 2.0]))))
    document["outage"] = {"horizon_h": 48.0}
    return document


def _valid(document: Any) -> bool:
    return faults_of(document) == []


@settings(max_examples=80, deadline=None)
@given(changed_stores().filter(_valid))
def test_every_valid_definition_gets_a_finite_answer(document):
    definition = read_definition(document)
    answer = hold_time(definition)
    assert answer.energy_balance_error < 1e-6
    hours = answer.hold_time_h.best_estimate
    assert (hours is None) == (answer.status == "beyond_horizon")
    assert hours is None or 0.0 <= hours <= 48.0
    numbers = [*answer.series.air_c, *(v for item in answer.series.items.values() for v in item.warmest_c)]
    assert all(math.isfinite(number) and -150.0 < number < 100.0 for number in numbers)
    assert read_definition(definition_document(definition)) == definition
