"""What would be passed over in silence, or cannot be meant, is refused at the field to change."""

from __future__ import annotations

from typing import Any

import pytest

from app.errors import DefinitionRefused, FieldFault
from app.stores import read_definition
from tests.stores.wide import Document, changed, item, simple


def fault_of(document: Document) -> FieldFault:
    with pytest.raises(DefinitionRefused) as refused:
        read_definition(document)
    (fault,) = refused.value.faults
    return fault


def with_faces(**walls: Any) -> Document:
    document = simple()
    plain = {"u_w_per_m2_k": 0.4}
    del document["enclosure"]["overall"]
    document["enclosure"]["faces"] = {"walls": walls, "ceiling": plain, "floor": plain}
    return document


def with_contents(**given: Any) -> Document:
    document = simple()
    document["contents"] = [item("lot", **given)]
    document["air_limits"] = [{"kind": "above", "temperature_c": 8.0}]
    return document


def test_an_empty_list_of_layers_is_no_way_of_giving_a_face() -> None:
    fault = fault_of(with_faces(layers=[], u_w_per_m2_k=0.3))
    assert fault.field == "enclosure.faces.walls.layers"
    assert "at least one" in fault.message


def test_films_beside_a_u_value_are_refused_and_not_counted_twice() -> None:
    fault = fault_of(with_faces(u_w_per_m2_k=0.3, films_w_per_m2_k={"inside": 8.0, "outside": 20.0}))
    assert fault.field == "enclosure.faces.walls.films_w_per_m2_k"


def test_own_numbers_beside_a_material_are_refused_and_not_ignored() -> None:
    layer = {"material": "pir_foam", "thickness_m": 0.1, "density_kg_per_m3": 60.0}
    fault = fault_of(with_faces(layers=[layer]))
    assert fault.field == "enclosure.faces.walls.layers[0].density_kg_per_m3"


@pytest.mark.parametrize("density", [None, 35.0])
def test_foam_in_milliwatts_is_asked_about(density: float | None) -> None:
    own = {} if density is None else {"density_kg_per_m3": density, "specific_heat_j_per_kg_k": 1400.0}
    fault = fault_of(with_faces(layers=[{"conductivity_w_per_m_k": 23.0, "thickness_m": 0.08} | own]))
    assert fault.field == "enclosure.faces.walls.layers[0].conductivity_w_per_m_k"
    assert fault.message.endswith("Did you enter mW/m·K?")


def test_a_thin_sheet_of_metal_by_its_own_numbers_is_read() -> None:
    sheet = {"conductivity_w_per_m_k": 50.0, "thickness_m": 0.001}
    heavy = {"conductivity_w_per_m_k": 160.0, "thickness_m": 0.004, "density_kg_per_m3": 2700.0}
    foam = {"material": "pir_foam", "thickness_m": 0.08}
    assert read_definition(with_faces(layers=[sheet, foam, heavy | {"specific_heat_j_per_kg_k": 900.0}]))


@pytest.mark.parametrize(
    ("given", "field"),
    [
        ({"food": "milk_whole", "initial_freezing_c": -2.0}, "initial_freezing_c"),
        ({"food": "milk_whole", "freezing_c": -2.0}, "freezing_c"),
        ({"substance": "water", "freezing_c": -2.0}, "freezing_c"),
        ({"substance": "aqueous", "freezing_c": -2.0, "initial_freezing_c": -2.0}, "initial_freezing_c"),
    ],
)
def test_a_freezing_point_that_would_change_nothing_is_refused(given: Document, field: str) -> None:
    assert fault_of(with_contents(**given)).field == f"contents[0].{field}"


def test_an_enthalpy_curve_in_kilojoules_is_asked_about() -> None:
    curve = {"temperature_c": [-40.0, -20.0, 20.0], "enthalpy_j_per_kg": [0.0, 40.0, 400.0]}
    fault = fault_of(with_contents(substance=curve | {"conductivity_w_per_m_k": 1.0, "density_kg_per_m3": 900.0}))
    assert fault.field == "contents[0].substance.enthalpy_j_per_kg"
    assert fault.message.endswith("Did you enter kJ/kg?")


def test_a_melting_plateau_in_a_curve_is_read() -> None:
    curve = {"temperature_c": [-40.0, 0.0, 0.0, 20.0], "enthalpy_j_per_kg": [0.0, 8e4, 4.1e5, 4.9e5]}
    assert read_definition(with_contents(substance=curve | {"conductivity_w_per_m_k": 1.0, "density_kg_per_m3": 900.0}))


def test_contents_that_do_not_fit_are_one_fault_of_the_first_that_is_too_much() -> None:
    document = with_contents(food="milk_whole")
    crate = {"kind": "cartons", "count": 3, "width_m": 0.6, "depth_m": 0.6, "height_m": 0.4}
    document["contents"] = [item(f"{k}", food="bread", mass_kg=60.0, stacking=crate) for k in range(4)]
    fault = fault_of(document)
    # 0.96 m³ inside, 0.43 m³ a lot: the third is too much
    assert fault.field == "contents[2].stacking"
    assert "takes 1.73 m³; the store has 0.96 m³" in fault.message


def test_coolants_take_space_too() -> None:
    document = simple() | {"coolants": [{"name": "ice", "coolant": "ice", "mass_kg": 2000.0}]}
    assert fault_of(document).field == "coolants[0].mass_kg"


def test_a_rise_time_test_load_that_does_not_fit_is_a_fault_of_the_load() -> None:
    document = simple()
    rise = {"rise_time_h": 20.0, "from_c": -18.0, "to_c": -9.0, "at_room_c": 25.0, "test_load_kg": 2000.0}
    document["enclosure"]["overall"] = rise
    fault = fault_of(document)
    assert (fault.field, fault.given) == ("enclosure.overall.test_load_kg", 2000.0)


def test_two_openings_of_one_name_are_refused() -> None:
    door = {"name": "door", "width_m": 0.3, "height_m": 0.4}
    fault = fault_of(changed(simple(), ("enclosure", "openings"), [door, door]))
    assert fault.field == "enclosure.openings[1].name"


def test_what_is_described_and_changes_no_answer_is_listed() -> None:
    document = simple()
    place = {"relative_humidity": 0.5, "volume_m3": 80.0, "air_changes_per_h": 0.5}
    room = {"kind": "constant", "temperature_c": 30.0} | place
    document["surroundings"] = {
        "room": {"kind": "drift", "start_c": 20.0, "towards": room, "time_constant_h": 5.0, "volume_m3": 40.0},
        "outdoors": {"kind": "constant", "temperature_c": 5.0},
    }
    document["enclosure"]["overall"]["wall_thickness_m"] = 0.06
    assert read_definition(document).given_but_unused() == (
        "surroundings.room.volume_m3",
        "surroundings.room.towards.relative_humidity",
        "surroundings.room.towards.volume_m3",
        "surroundings.room.towards.air_changes_per_h",
        "surroundings.outdoors",
        "enclosure.overall.wall_thickness_m",
    )


def test_what_is_used_is_not_listed_as_unused() -> None:
    assert read_definition(simple()).given_but_unused() == ()
    outside = with_faces(u_w_per_m2_k=0.3, beyond="outdoors")
    outside["surroundings"]["outdoors"] = {"kind": "constant", "temperature_c": 5.0}
    assert read_definition(outside).given_but_unused() == ()
    k_value = changed(simple(), ("enclosure", "overall"), {"k_w_per_m2_k": 0.4, "wall_thickness_m": 0.06})
    assert read_definition(k_value).given_but_unused() == ()
