"""From a definition to its network: areas, resistances, overall figures, directions, convergence."""

from __future__ import annotations

import math
from copy import deepcopy
from typing import Any

import numpy as np
import pytest

from app.answers import hold_time
from app.engine import march
from app.stores import enclosure, loads, read_definition, sample_case, sample_cases, store_network
from app.stores.geometry import Block, box_block, box_faces, cylinder_block, near_cubic_stack, slab_block
from app.stores.rise_time import heat_leak_of_rise_time_w_per_k


def freezer(**enclosure_change: Any) -> dict[str, Any]:
    document = deepcopy(sample_case("food-bank-freezer").store)
    document["enclosure"] |= enclosure_change
    return document


def hours(document: dict[str, Any]) -> float:
    found = hold_time(read_definition(document)).hold_time_h.best_estimate
    assert found is not None
    return found


def test_edges_and_corners_of_a_box_are_those_of_the_shape_factors():
    # Source: conduction shape factors, Incropera et al., 6th ed., Table 4.1: 0.54 a metre of edge, 0.15 L a corner
    sizes = box_faces(2.0, 3.0, 2.5)
    assert sum(size.edge_m for size in sizes.values()) == pytest.approx(4 * (2.0 + 3.0 + 2.5))
    assert sum(size.corners for size in sizes.values()) == pytest.approx(8.0)
    thickness = 0.1
    area = sum(enclosure.conduction_area_m2(size, thickness, True) for size in sizes.values())
    inside = 2 * (2 * 3 + 2 * 2.5 + 3 * 2.5)
    assert area / thickness == pytest.approx(inside / thickness + 0.54 * 30.0 + 8 * 0.15 * thickness)
    outside = sum(enclosure.outside_area_m2(size, thickness) for size in sizes.values())
    assert outside == pytest.approx(2 * (2.2 * 3.2 + 2.2 * 2.7 + 3.2 * 2.7))


def test_face_without_edges_has_the_u_value_of_its_layers():
    layers = [{"conductivity_w_per_m_k": 0.025, "thickness_m": 0.1}]
    face = {"layers": layers, "beyond": "room"}
    document = freezer(faces={"walls": face, "ceiling": face, "floor": face}, edge_factors=False, openings=[])
    store = store_network(read_definition(document))
    # Source: ISO 6946, surface resistances sideways 0.13, down 0.17, up 0.10 on both sides of an inner face
    walls = 2 * (2.7 + 3.3) * 2.3
    assert store.path_w_per_k["walls"] == pytest.approx(walls / (0.13 + 4.0 + 0.13))
    assert store.path_w_per_k["ceiling"] == pytest.approx(2.7 * 3.3 / (0.17 + 4.0 + 0.17))
    assert store.path_w_per_k["floor"] == pytest.approx(2.7 * 3.3 / (0.10 + 4.0 + 0.10))


def test_k_value_stands_on_the_geometric_mean_of_the_areas():
    # Source: ATP Agreement, Annex 1: K = W / (S dT), S = sqrt(Si Se)
    overall = {"k_w_per_m2_k": 0.4, "wall_thickness_m": 0.1}
    document = freezer(overall=overall, openings=[])
    del document["enclosure"]["faces"]
    inside = 2 * (2.7 * 3.3 + 2.7 * 2.3 + 3.3 * 2.3)
    outside = 2 * (2.9 * 3.5 + 2.9 * 2.5 + 3.5 * 2.5)
    assert store_network(read_definition(document)).heat_leak_w_per_k == pytest.approx(
        0.4 * math.sqrt(inside * outside)
    )


def test_energy_use_is_reproduced():
    overall = {"energy_kwh_per_day": 3.0, "at_room_c": 25.0, "inside_c": -18.0, "cop": 1.3}
    document = freezer(overall=overall)
    del document["enclosure"]["faces"]
    leak = store_network(read_definition(document)).heat_leak_w_per_k
    assert leak * 43.0 * 24.0 / 1000.0 / 1.3 == pytest.approx(3.0)


def test_rise_time_is_reproduced_by_the_model():
    document = sample_case("household-chest-freezer").store
    definition = read_definition(document)
    leak = heat_leak_of_rise_time_w_per_k(definition, definition.enclosure.overall)
    test = deepcopy(document)
    test["enclosure"]["overall"] = {"heat_leak_w_per_k": leak, "wall_mass_kg": 26.0}
    test["contents"] = [
        {
            "name": "test load", "food": "test_package", "mass_kg": 90.0, "start_c": -18.0,
            "stacking": {
                "kind": "cartons", "count": 180, "width_m": 0.1, "depth_m": 0.1, "height_m": 0.05, "blocks": 1,
            },
            "limits": [{"kind": "above", "temperature_c": -9.0, "at": at} for at in ("warmest", "mean")],
        }
    ]  # fmt: skip
    test["surroundings"] = {"room": {"kind": "constant", "temperature_c": 25.0}}
    warmest, mean = (limit.best_estimate_h for limit in hold_time(read_definition(test)).items[0].limits)
    # the middle of the outer packages lies between the surface and the mean of the load
    assert warmest < 32.0 < mean


def test_nothing_flows_into_a_store_in_a_room_of_its_own_temperature():
    document = freezer()
    document["surroundings"]["room"]["temperature_c"] = -20.0
    store = store_network(read_definition(document))
    run = march(store.network, 36000.0)
    assert np.abs(run.path_start_w).max() < 1e-9
    assert run.traces[-1, store.air_column] == pytest.approx(-20.0, abs=1e-9)


def test_walls_start_from_their_steady_line():
    store = store_network(read_definition(freezer()))
    run = march(store.network, 1.0)
    # the first flows are those of the steady state: conductance times difference, path by path
    flows = dict(zip(store.network.path_names, run.path_start_w, strict=True))
    for path, conductance in store.path_w_per_k.items():
        assert flows[path] == pytest.approx(conductance * 42.0, rel=1e-9)


def test_door_takes_its_area_off_the_wall():
    without = store_network(read_definition(freezer(openings=[])))
    with_door = store_network(read_definition(freezer()))
    share = 1.0 - 0.9 * 2.0 / (2 * (2.7 + 3.3) * 2.3)
    assert with_door.path_w_per_k["walls"] == pytest.approx(share * without.path_w_per_k["walls"])


@pytest.mark.parametrize("foam_m", [0.06, 0.08, 0.12, 0.2])
def test_thicker_walls_never_shorten_it(foam_m):
    document = freezer()
    for name in ("walls", "ceiling"):
        document["enclosure"]["faces"][name]["layers"][1]["thickness_m"] = foam_m
    thicker = deepcopy(document)
    for name in ("walls", "ceiling"):
        thicker["enclosure"]["faces"][name]["layers"][1]["thickness_m"] = foam_m * 1.2
    assert hours(thicker) > hours(document)


def test_cooler_room_and_colder_start_never_shorten_it_and_leaks_never_lengthen_it():
    base = hours(freezer())
    cooler = freezer()
    cooler["surroundings"]["room"]["temperature_c"] = 18.0
    colder = freezer()
    for contents in colder["contents"]:
        contents["start_c"] = -24.0
    leakier = freezer()
    leakier["enclosure"]["openings"][0]["seal_leak_m3_per_h"] = 15.0
    assert hours(cooler) > base
    assert hours(colder) > base
    assert hours(leakier) < base


@pytest.mark.parametrize("case", sample_cases(), ids=lambda case: case.key)
def test_twice_as_many_shells_and_cells_move_it_by_less_than_half_a_per_cent(case, monkeypatch):
    definition = read_definition(case.store)
    coarse = hold_time(definition).hold_time_h.best_estimate
    honest = loads.shell_count
    monkeypatch.setattr(loads, "shell_count", lambda biot: honest(biot) * 2 if honest(biot) > 1 else 1)
    monkeypatch.setattr(enclosure, "_CELL_OF_DAY", enclosure._CELL_OF_DAY / 2.0)
    monkeypatch.setattr(enclosure, "_MOST_CELLS", 2 * enclosure._MOST_CELLS)
    assert hold_time(definition).hold_time_h.best_estimate == pytest.approx(coarse, rel=5e-3)


BLOCKS: list[Block] = [
    slab_block(4.0, 0.05, height_m=1.0), box_block(3, 0.4, 0.3, 0.2, stands=False),
    box_block(1, 1.2, 0.8, 1.6, stands=True), cylinder_block(12, 0.09, 0.25, height_m=0.25),
]  # fmt: skip


@pytest.mark.parametrize("block", BLOCKS)
@pytest.mark.parametrize("count", [1, 2, 8, 16])
def test_shells_hold_the_whole_volume_along_one_path(block, count):
    shells = block.shells(count)
    assert sum(shell.volume_share for shell in shells) == pytest.approx(1.0)
    assert all(shell.outward_per_m > 0.0 for shell in shells)
    assert block.volume_share_outside(block.half_thickness_m) == pytest.approx(1.0)


def test_one_lump_lies_behind_the_path_of_an_even_warming():
    # Source: parabolic profile: L/3k for a slab, r/4k for a long cylinder
    assert slab_block(2.0, 0.3, height_m=1.0).shells(1)[0].outward_per_m == pytest.approx(0.3 / 3 / 2.0, rel=1e-3)
    long = cylinder_block(1, 0.1, 50.0, height_m=1.0)
    assert long.shells(1)[0].outward_per_m == pytest.approx(0.05 / 4 / long.area_m2, rel=1e-2)


def test_box_that_stands_is_the_upper_half_of_one_twice_as_high():
    standing, whole = box_block(1, 1.0, 0.8, 0.5, stands=True), box_block(1, 1.0, 0.8, 1.0, stands=False)
    assert standing.area_m2 == pytest.approx(whole.area_m2 / 2.0)
    assert standing.volume_m3 == pytest.approx(whole.volume_m3 / 2.0)


@pytest.mark.parametrize("count", [1, 7, 20, 60, 399])
def test_stack_keeps_the_volume_of_its_boxes(count):
    sides = near_cubic_stack(count, 0.4, 0.3, 0.15)
    assert math.prod(sides) == pytest.approx(count * 0.4 * 0.3 * 0.15)
