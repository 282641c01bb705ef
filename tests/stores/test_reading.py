"""Reading a definition: whole cases, round trips, and every kind of nonsense in every field."""

from __future__ import annotations

import json
from collections.abc import Iterator
from copy import deepcopy
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings

from app.errors import DefinitionRefused, FieldFault
from app.stores import definition_document, fingerprint, read_definition, sample_cases, store_types
from tests.strategies import definitions

Document = dict[str, Any]
Keys = tuple[str | int, ...]

LAYERS = [
    {"material": "steel_sheet", "thickness_m": 0.0006},
    {
        "thickness_m": {"value": 0.1, "plus_minus": 0.005},
        "conductivity_w_per_m_k": 0.023,
        "density_kg_per_m3": 40.0,
        "specific_heat_j_per_kg_k": 1400.0,
    },
]

CARTONS = {"kind": "cartons", "count": 20, "width_m": 0.4, "depth_m": 0.3, "height_m": 0.2, "blocks": 2}

RICH: Document = {
    "definition_version": 1,
    "name": "Rich store",
    "enclosure": {
        "shape": "box",
        "inside_m": {"width": {"value": 3.0, "known": "measured"}, "depth": 2.5, "height": 2.3},
        "faces": {
            "walls": {
                "layers": LAYERS,
                "films_w_per_m2_k": {"inside": 8.0, "outside": 10.0},
                "beyond": "outdoors",
            },
            "ceiling": {"layers": LAYERS, "beyond": "room"},
            "floor": {"u_w_per_m2_k": 0.3, "beyond": {"temperature_c": 10.0}},
        },
        "openings": [
            {
                "name": "door",
                "in_face": "walls",
                "width_m": 0.9,
                "height_m": 2.0,
                "u_w_per_m2_k": 0.4,
                "seal_leak_m3_per_h": 1.0,
                "curtain_effectiveness": 0.0,
            }
        ],
        "bridges_w_per_k": 1.0,
        "fittings": [{"material": "steel_sheet", "mass_kg": 40.0}],
        "edge_factors": True,
    },
    "contents": [
        {
            "name": "meat",
            "food": "beef_lean",
            "mass_kg": {"value": 300.0, "plus_minus": 20.0, "known": "estimated"},
            "start_c": -18.0,
            "stacking": CARTONS,
            "packaging": [{"material": "cardboard", "mass_kg": 10.0}],
            "film_w_per_m2_k": 6.0,
            "place": "middle",
            "limits": [
                {"preset": "us_refreeze"},
                {"kind": "above", "temperature_c": -12.0, "longer_than_h": 1.0, "at": "mean"},
                {"kind": "below", "temperature_c": -40.0, "longer_than_h": 0.5, "at": "coldest"},
                {
                    "kind": "mean_kinetic",
                    "temperature_c": -10.0,
                    "window_h": 24.0,
                    "activation_kj_per_mol": 83.0,
                    "at": "warmest",
                },
                {"kind": "thawed", "share": 0.5},
            ],
        },
        {
            "name": "soup",
            "composition": {
                "water": 0.8,
                "protein": 0.05,
                "fat": 0.05,
                "carbohydrate": 0.08,
                "fibre": 0.01,
                "ash": 0.01,
            },
            "initial_freezing_c": -1.0,
            "mass_kg": 100.0,
            "start_c": -18.0,
            "stacking": {"kind": "bottles", "count": 100, "diameter_m": 0.1, "height_m": 0.2},
        },
        {
            "name": "brine",
            "substance": "aqueous",
            "freezing_c": -5.0,
            "mass_kg": 50.0,
            "start_c": -18.0,
            "stacking": {"kind": "bulk", "width_m": 0.5, "depth_m": 0.5, "height_m": 0.3},
        },
        {
            "name": "block",
            "substance": {
                "specific_heat_j_per_kg_k": 1000.0,
                "conductivity_w_per_m_k": 1.0,
                "density_kg_per_m3": 900.0,
            },
            "mass_kg": 50.0,
            "start_c": -18.0,
            "stacking": {"kind": "exposed", "area_m2": 1.0, "half_thickness_m": 0.05},
        },
        {
            "name": "measured",
            "substance": {
                "temperature_c": [-40.0, 0.0, 0.0, 40.0],
                "enthalpy_j_per_kg": [0.0, 8e4, 4e5, 5.6e5],
                "conductivity_w_per_m_k": 1.0,
                "density_kg_per_m3": 900.0,
            },
            "mass_kg": 50.0,
            "start_c": -18.0,
            "stacking": {"kind": "carcass", "count": 2, "length_m": 1.0, "diameter_m": 0.2},
        },
        {
            "name": "packs of water",
            "substance": "water",
            "mass_kg": 20.0,
            "start_c": -18.0,
            "stacking": {"kind": "packs", "count": 40, "width_m": 0.1, "depth_m": 0.1, "height_m": 0.06},
        },
        {
            "name": "pallet of peas",
            "food": "peas_green",
            "mass_kg": 200.0,
            "start_c": -18.0,
            "stacking": {"kind": "pallet", "count": 1, "width_m": 0.8, "depth_m": 0.8, "height_m": 0.6},
        },
    ],
    "coolants": [
        {
            "name": "plates",
            "coolant": "ice",
            "mass_kg": 20.0,
            "start_c": -10.0,
            "area_m2": 1.5,
            "film_w_per_m2_k": 6.0,
            "added_at_h": 0.0,
        }
    ],
    "air_limits": [{"kind": "above", "temperature_c": -10.0}],
    "surroundings": {
        "room": {
            "kind": "drift",
            "start_c": 20.0,
            "towards": {
                "kind": "day",
                "mean_c": 25.0,
                "swing_k": 5.0,
                "peak_hour": 15.0,
                "start_hour": 3.0,
                "relative_humidity": 0.5,
            },
            "time_constant_h": 6.0,
            "volume_m3": 100.0,
            "air_changes_per_h": 1.0,
        },
        "outdoors": {
            "kind": "series",
            "time_h": [0.0, 6.0, 12.0],
            "temperature_c": [10.0, 20.0, 12.0],
            "relative_humidity": [0.5, 0.4, 0.6],
        },
    },
    "start": {"air_c": -18.0},
    "outage": {"horizon_h": 48.0},
}

OVERALLS: tuple[Document, ...] = (
    {"heat_leak_w_per_k": 8.0, "wall_mass_kg": 100.0},
    {"k_w_per_m2_k": 0.3, "inside_area_m2": 40.0, "wall_thickness_m": 0.1},
    {"energy_kwh_per_day": 10.0, "at_room_c": 25.0, "inside_c": -18.0, "cop": 1.5},
    {
        "rise_time_h": 30.0,
        "from_c": -18.0,
        "to_c": -9.0,
        "at_room_c": 25.0,
        "test_load_kg": 500.0,
        "test_load_food": "test_package",
    },
)

NONSENSE: tuple[Any, ...] = ("nonsense", float("nan"), float("inf"), -float("inf"), 1e300, -1e300, 10**400, None)
NONSENSE += ([], {}, [[]], True, {"value": "x"}, {"value": 1e300}, "\x00", "")


def rich(overall: Document | None = None) -> Document:
    document = json.loads(json.dumps(RICH))  # without parts that two places share
    if overall is not None:
        del document["enclosure"]["faces"], document["surroundings"]["outdoors"]
        document["enclosure"]["overall"] = deepcopy(overall)
    return document


def all_rich() -> Iterator[Document]:
    yield rich()
    for overall in OVERALLS:
        yield rich(overall)


def leaves(part: Any, keys: Keys = ()) -> Iterator[Keys]:
    """The way to every leaf; a quantity with its spread counts as one leaf and each of its parts as another."""
    if isinstance(part, dict):
        if "value" in part:
            yield keys
        for name, below in part.items():
            yield from leaves(below, (*keys, name))
    elif isinstance(part, list):
        for k, below in enumerate(part):
            yield from leaves(below, (*keys, k))
    else:
        yield keys


def objects(part: Any, keys: Keys = ()) -> Iterator[Keys]:
    """The way to every object with named fields."""
    if isinstance(part, dict):
        yield keys
    for name, below in part.items() if isinstance(part, dict) else enumerate(part) if isinstance(part, list) else ():
        yield from objects(below, (*keys, name))


def path_of(keys: Keys) -> str:
    path = "".join(f"[{key}]" if isinstance(key, int) else f".{key}" for key in keys)
    return path.removesuffix(".value").lstrip(".")


def at(document: Document, keys: Keys) -> Any:
    for key in keys:
        document = document[key]  # type: ignore[index]
    return document


def changed(document: Document, keys: Keys, value: Any) -> Document:
    new = deepcopy(document)
    at(new, keys[:-1])[keys[-1]] = value
    return new


def without(document: Document, keys: Keys) -> Document:
    new = deepcopy(document)
    del at(new, keys[:-1])[keys[-1]]
    return new


def faults_of(document: Any) -> tuple[FieldFault, ...]:
    """The faults of a document; none when it is valid. Every other exception is a fault of the reader."""
    faults: tuple[FieldFault, ...] = ()
    try:
        read_definition(document)
        return ()
    except DefinitionRefused as refused:
        faults = refused.faults
    assert faults
    json.dumps([vars(fault) for fault in faults], allow_nan=False)
    for fault in faults:
        assert fault.message.endswith((".", "?"))
        assert fault.allowed
    return faults


def is_near(fault: FieldFault, path: str) -> bool:
    """The field itself, or the nearest one around it that can be named."""
    return path == fault.field or path.startswith((fault.field + ".", fault.field + "[")) or is_below(fault, path)


def is_below(fault: FieldFault, path: str) -> bool:
    return fault.field.startswith((path + ".", path + "["))


def fault_at(document: Document, path: str) -> FieldFault:
    faults = faults_of(document)
    found = [fault for fault in faults if fault.field == path]
    assert found, [fault.field for fault in faults]
    return found[0]


EVERY_LEAF = [(document, keys) for document in all_rich() for keys in leaves(document)]
"""Of the first document all, of the others the overall figure."""
EVERY_LEAF = [pair for pair in EVERY_LEAF if "faces" in pair[0]["enclosure"] or "overall" in pair[1]]


def test_rich_documents_are_valid():
    for document in all_rich():
        assert faults_of(document) == ()


@pytest.mark.parametrize("case", sample_cases(), ids=lambda case: case.key)
def test_sample_case_comes_back_the_same(case):
    check_round_trip(case.store)


@pytest.mark.parametrize("kind", store_types(), ids=lambda kind: kind.key)
def test_store_type_comes_back_the_same(kind):
    check_round_trip(kind.store)


@settings(max_examples=60, deadline=None, suppress_health_check=list(HealthCheck))
@given(document=definitions())
def test_any_store_comes_back_the_same(document):
    check_round_trip(document)


def check_round_trip(document: Document) -> None:
    definition = read_definition(document)
    written = definition_document(definition)
    again = read_definition(json.loads(json.dumps(written, allow_nan=False)))
    assert again == definition
    assert definition_document(again) == written
    assert fingerprint(again, {}, "1") == fingerprint(definition, {}, "1")


@pytest.mark.parametrize("value", NONSENSE, ids=lambda value: repr(value)[:20])
def test_nonsense_in_any_field_is_refused_by_its_name_or_is_no_nonsense_there(value):
    for document, keys in EVERY_LEAF:
        faults = faults_of(changed(document, keys, value))
        path = path_of(keys)
        wrong = [fault.field for fault in faults if not is_near(fault, path)]
        # what follows from a value that is right by itself is named where it has to be changed
        if wrong and any(is_near(fault, path) for fault in faults):
            continue
        assert not wrong or value is None, (path, value, wrong)
        if value is None:
            parent = path_of(keys[:-1])
            assert all(field.startswith(parent) for field in wrong), (path, wrong)


@pytest.mark.parametrize("value", ["nonsense", float("nan"), float("inf"), 1e300, -1e300, [], {}], ids=repr)
def test_no_number_is_ever_nonsense(value):
    for document, keys in EVERY_LEAF:
        old = at(document, keys)
        # a spread may be as wide as one likes
        if isinstance(old, float) and not (keys[-1] == "plus_minus" and value == 1e300):
            faults = faults_of(changed(document, keys, value))
            assert any(is_near(fault, path_of(keys)) for fault in faults), (path_of(keys), value)


def test_field_that_is_missing_is_named_or_was_not_needed():
    for document, keys in EVERY_LEAF:
        if isinstance(keys[-1], int):
            continue
        parent = path_of(keys[:-1])
        for fault in faults_of(without(document, keys)):
            assert fault.field.startswith(parent), (path_of(keys), fault)


def test_unknown_name_beside_any_field_is_named_with_its_place():
    for document in all_rich():
        for keys in objects(document):
            name = ".".join(part for part in (path_of((*keys, "x"))[:-2].rstrip("."), "colour") if part)
            faults = faults_of(changed(document, (*keys, "colour"), 1.0))
            assert [fault.field for fault in faults] == [name]
            assert "There is no field called 'colour' here." in faults[0].message


def test_lengths_in_millimetres_are_refused_or_asked_about():
    for document, keys in EVERY_LEAF:
        old = at(document, keys)
        if not isinstance(old, float) or not str(keys[-1]).endswith(("_m", "width", "depth", "height")):
            continue
        faults = faults_of(changed(document, keys, old * 1000.0))
        assert faults, path_of(keys)
        own = [fault for fault in faults if fault.field == path_of(keys)]
        assert all("mm" in fault.message for fault in own if "it must be" in fault.message), path_of(keys)


def test_every_fault_is_told_at_once():
    document = changed(rich(), ("contents", 0, "mass_kg"), "heavy")
    document = changed(document, ("surroundings", "room", "time_constant_h"), -1.0)
    document = changed(document, ("enclosure", "inside_m", "depth"), None)
    fields = [fault.field for fault in faults_of(document)]
    assert set(fields) == {"enclosure.inside_m.depth", "contents[0].mass_kg", "surroundings.room.time_constant_h"}


def test_everything_that_does_not_fit_together_is_told_at_once():
    document = changed(rich(), ("contents", 0, "food"), "beef")
    document = changed(document, ("surroundings", "outdoors", "time_h"), [0.0, 6.0, 6.0])
    assert {fault.field for fault in faults_of(document)} == {"contents[0].food", "surroundings.outdoors.time_h"}


@pytest.mark.parametrize("document", [None, [], "", 1.0, {}, {"contents": []}, [{}], b"", object()], ids=repr)
def test_what_is_no_definition_at_all_is_refused(document):
    with pytest.raises(DefinitionRefused, match="must be|is missing"):
        read_definition(document)


def test_document_nested_without_end_is_refused():
    deep: Any = {}
    for _ in range(100_000):
        deep = {"towards": deep, "kind": "drift"}
    assert faults_of(changed(rich(), ("surroundings", "room"), deep))


def test_fault_says_what_was_given_and_what_is_allowed():
    fault = fault_at(changed(rich(), ("contents", 0, "mass_kg"), -3.0), "contents[0].mass_kg")
    assert fault.given == -3.0
    assert fault.allowed == "0.001 to 1000000 kg"
    assert "-3" in fault.message


SLIPS = [
    (("enclosure", "inside_m", "width"), 600.0, "mm"),
    (("enclosure", "faces", "walls", "layers", 1, "thickness_m"), 100.0, "mm"),
    (("enclosure", "faces", "walls", "layers", 1, "thickness_m"), 10.0, "mm"),
    (("contents", 1, "composition", "water"), 80.0, "per cent"),
    (("contents", 0, "start_c"), 65.0, "°F"),
    (("contents", 3, "substance", "specific_heat_j_per_kg_k"), 3.4, "kilojoules"),
    (("contents", 3, "substance", "density_kg_per_m3"), 0.9, "grams per cubic centimetre"),
]


@pytest.mark.parametrize(("keys", "value", "meant"), SLIPS, ids=lambda part: str(part)[:40])
def test_slip_of_the_unit_is_asked_about(keys, value, meant):
    message = fault_at(changed(rich(), keys, value), path_of(keys)).message
    assert "Did you enter" in message
    assert meant in message.split("Did you enter")[1]


@pytest.mark.parametrize(
    ("keys", "value", "nearest"),
    [
        (("contents", 0, "food"), "beef_leen", "beef_lean"),
        (("enclosure", "fittings", 0, "material"), "stel_sheet", "steel_sheet"),
        (("enclosure", "faces", "walls", "layers", 0, "material"), "steel_shet", "steel_sheet"),
        (("contents", 0, "packaging", 0, "material"), "cardbord", "cardboard"),
        (("coolants", 0, "coolant"), "ice_pac", "ice_pack"),
        (("contents", 0, "limits", 0, "preset"), "us_refreze", "us_refreeze"),
    ],
)
def test_unknown_key_of_a_table_names_the_nearest(keys, value, nearest):
    fault = fault_at(changed(rich(), keys, value), path_of(keys))
    assert nearest in fault.message
    assert nearest in fault.allowed
    assert fault.given == value


def test_misspelt_field_names_the_nearest():
    fault = fault_at(changed(rich(), ("contents", 0, "mas_kg"), 3.0), "contents[0].mas_kg")
    assert "Nearest: mass_kg" in fault.message


LATER = [
    (("enclosure", "faces", "floor", "beyond"), "ground", "enclosure.faces.floor.beyond"),
    (("surroundings", "ground"), {"temperature_c": 10.0}, "surroundings.ground"),
    (("surroundings", "sun"), {"peak_w_per_m2": 800.0}, "surroundings.sun"),
    (("outage", "door_openings"), [{"at_h": 1.0}], "outage.door_openings"),
    (("outage", "power"), [{"from_h": 1.0}], "outage.power"),
    (("enclosure", "openings", 0, "curtain_effectiveness"), 0.8, "enclosure.openings[0].curtain_effectiveness"),
    (("coolants", 0, "coolant"), "dry_ice", "coolants[0].coolant"),
    (("contents", 0, "limits", 4), {"kind": "growth", "organism": "x", "log10": 1.0}, "contents[0].limits[4].kind"),
    (("contents", 0, "place"), "top", "contents[0].place"),
    (("coolants", 0, "added_at_h"), 3.0, "coolants[0].added_at_h"),
    (("coolants", 0, "wrapping_w_per_k"), 0.5, "coolants[0].wrapping_w_per_k"),
]


@pytest.mark.parametrize(("keys", "value", "path"), LATER, ids=[path for _, _, path in LATER])
def test_field_without_effect_yet_is_refused_by_its_name(keys, value, path):
    assert "not worked out yet" in fault_at(changed(rich(), keys, value), path).message


TOGETHER: list[tuple[str, Keys, Any, str, str]] = [
    ("two ways", ("enclosure", "overall"), OVERALLS[0], "enclosure.faces", "either the faces or one overall"),
    ("layers and U", ("enclosure", "faces", "walls", "u_w_per_m2_k"), 0.3, "enclosure.faces.walls", "either layers or"),
    ("two foods", ("contents", 0, "substance"), "water", "contents[0].food", "one of them"),
    ("cylinder", ("enclosure", "shape"), "cylinder", "enclosure.inside_m", "A cylinder has diameter and height"),
    (
        "box",
        ("enclosure", "inside_m"),
        {"diameter": 3.0, "height": 2.3},
        "enclosure.inside_m",
        "A box has width, depth and height",
    ),
    ("too many", ("contents", 0, "stacking", "count"), 2000, "contents[0].stacking", "the store has"),
    ("too heavy", ("contents", 0, "mass_kg"), 9000.0, "contents[0].mass_kg", "kg/m³"),
    ("door", ("enclosure", "openings", 0, "width_m"), 15.0, "enclosure.openings[0].width_m", "larger than the walls"),
    ("series", ("surroundings", "outdoors", "time_h"), [0.0, 6.0, 5.0], "surroundings.outdoors.time_h", "must rise"),
    (
        "series of two lengths",
        ("surroundings", "outdoors", "temperature_c"),
        [1.0, 2.0],
        "surroundings.outdoors.temperature_c",
        "as many values as times",
    ),
    ("fractions", ("contents", 1, "composition", "water"), 0.5, "contents[1].composition", "add up to 0.7"),
    (
        "curve falls",
        ("contents", 4, "substance", "temperature_c"),
        [-40.0, 0.0, -1.0, 40.0],
        "contents[4].substance.temperature_c",
        "must not fall",
    ),
    (
        "enthalpy falls",
        ("contents", 4, "substance", "enthalpy_j_per_kg"),
        [0.0, 8e4, 7e4, 5.6e5],
        "contents[4].substance.enthalpy_j_per_kg",
        "must rise",
    ),
    ("same name", ("contents", 1, "name"), "meat", "contents[1].name", "two things called 'meat'"),
    ("ice of air", ("air_limits", 0), {"kind": "thawed", "share": 0.5}, "air_limits[0].kind", "no ice"),
]


@pytest.mark.parametrize(
    ("keys", "value", "path", "words"), [row[1:] for row in TOGETHER], ids=[r[0] for r in TOGETHER]
)
def test_what_does_not_fit_together_is_said_in_words(keys, value, path, words):
    fault = fault_at(changed(rich(), keys, value), path)
    assert words in fault.message
    assert fault.allowed


def test_no_way_of_giving_the_walls_is_refused():
    assert "either the faces" in fault_at(without(rich(), ("enclosure", "faces")), "enclosure.faces").message


def test_face_outdoors_needs_the_outdoors():
    fault = fault_at(without(rich(), ("surroundings", "outdoors")), "enclosure.faces.walls.beyond")
    assert "surroundings.outdoors" in fault.message


def test_store_without_any_limit_is_refused():
    document = rich() | {"air_limits": []}
    document["contents"][0]["limits"] = []
    assert "at least one limit" in fault_at(document, "contents[0].limits").message


def test_solution_needs_its_freezing_point_and_a_composition_its_own():
    assert fault_at(without(rich(), ("contents", 2, "freezing_c")), "contents[2].freezing_c").given is None
    fault = fault_at(without(rich(), ("contents", 1, "initial_freezing_c")), "contents[1].initial_freezing_c")
    assert "where freezing begins" in fault.message


def test_energy_test_must_be_colder_inside_and_a_rise_must_rise():
    fault = fault_at(rich(OVERALLS[2] | {"inside_c": 20.0, "at_room_c": 20.0}), "enclosure.overall.inside_c")
    assert fault.allowed == "below 20 °C"
    assert fault_at(rich(OVERALLS[3] | {"to_c": -20.0}), "enclosure.overall.to_c").given == -20.0
