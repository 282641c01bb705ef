"""The network of a store against hand sums: heat leaks, rise times, steady walls, and what must hold it longer."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from app.answers import hold_time
from app.engine import march
from app.errors import DefinitionRefused
from app.stores import enclosure, loads, read_definition, sample_case, sample_cases, store_network
from app.stores.geometry import near_cubic_stack
from app.stores.overall import USUAL_WALL_THICKNESS_M
from app.stores.rise_time import PACKAGE_M, heat_leak_of_rise_time_w_per_k
from app.stores.shell import RiseTime

Document = dict[str, Any]

FOAM = {
    "conductivity_w_per_m_k": 0.024,
    "density_kg_per_m3": 35.0,
    "specific_heat_j_per_kg_k": 1400.0,
}
PLY = {
    "conductivity_w_per_m_k": 0.13,
    "density_kg_per_m3": 500.0,
    "specific_heat_j_per_kg_k": 1600.0,
}


def layered(thickness_m: float = 0.08) -> Document:
    return {"layers": [PLY | {"thickness_m": 0.012}, FOAM | {"thickness_m": thickness_m}]}


def small_store(
    *, wall_m: float = 0.08, room_c: float = 25.0, mass_kg: float = 60.0, start_c: float = -18.0, limit_c: float = -9.0
) -> Document:
    """One cube of a metre with one block of meat."""
    return {
        "enclosure": {
            "inside_m": {"width": 1.0, "depth": 1.0, "height": 1.0},
            "faces": {"walls": layered(wall_m), "ceiling": layered(wall_m), "floor": layered(wall_m)},
            "edge_factors": False,
        },
        "contents": [
            {
                "name": "meat",
                "food": "beef_lean",
                "mass_kg": mass_kg,
                "start_c": start_c,
                "stacking": {"kind": "cartons", "count": 12, "width_m": 0.3, "depth_m": 0.2, "height_m": 0.2},
                "limits": [{"kind": "above", "temperature_c": limit_c}],
            }
        ],
        "surroundings": {"room": {"kind": "constant", "temperature_c": room_c}},
        "outage": {"horizon_h": 96.0},
    }


def with_overall(overall: Document, **more: Any) -> Document:
    document = small_store()
    del document["enclosure"]["faces"]
    document["enclosure"] |= {"overall": overall} | more
    return document


def network(document: Document) -> Any:
    return store_network(read_definition(document))


def hours_held(document: Document) -> float:
    """Hold time; the horizon where nothing fails before."""
    answer = hold_time(read_definition(document))
    best_h = answer.hold_time_h.best_estimate
    return answer.horizon_h if best_h is None else best_h


# heat leaks


@pytest.mark.parametrize(("name", "films"), [("walls", 0.13 + 0.13), ("ceiling", 0.17 + 0.17), ("floor", 0.10 + 0.10)])
def test_layered_face_is_the_hand_sum_of_its_resistances(name, films):
    # ISO 6946:2017, Table 7: surface resistances 0.13 sideways, 0.10 up, 0.17 down, inside values on both sides
    store = network(small_store())
    u = 1.0 / (films + 0.012 / 0.13 + 0.08 / 0.024)
    area_m2 = 4.0 if name == "walls" else 1.0
    assert store.path_w_per_k[name] == pytest.approx(u * area_m2, rel=1e-9)


def test_heat_leak_is_the_sum_of_its_paths():
    document = small_store()
    document["enclosure"]["faces"]["floor"] = {"u_w_per_m2_k": 0.4}
    document["enclosure"]["bridges_w_per_k"] = 0.5
    document["enclosure"]["openings"] = [
        {"name": "lid", "in_face": "ceiling", "width_m": 0.5, "height_m": 0.4, "u_w_per_m2_k": 0.6}
        | {"seal_leak_m3_per_h": 1.0}
    ]
    store = network(document)
    paths = store.path_w_per_k
    assert paths["floor"] == pytest.approx(0.4)
    assert paths["thermal bridges"] == pytest.approx(0.5)
    assert paths["lid, leaf"] == pytest.approx(0.6 * 0.2)
    # dry air at 25 °C: 1.184 kg/m³ and 1006 J/kg K (ideal gas at 101.325 kPa)
    assert paths["lid, seals"] == pytest.approx(1.0 / 3600.0 * 1.184 * 1006.0, rel=2e-3)
    assert store.heat_leak_w_per_k == pytest.approx(sum(paths.values()))


def test_door_takes_its_area_from_the_face_that_it_is_in():
    document = small_store()
    whole = network(document).path_w_per_k
    door = {"name": "door", "in_face": "walls", "width_m": 0.5, "height_m": 0.8, "u_w_per_m2_k": 0.5}
    document["enclosure"]["openings"] = [door]
    cut = network(document).path_w_per_k
    assert cut["walls"] / whole["walls"] == pytest.approx(1.0 - 0.4 / 4.0)
    assert (cut["ceiling"], cut["floor"]) == (whole["ceiling"], whole["floor"])


def test_edges_and_corners_let_in_more():
    document = small_store()
    plain = network(document).heat_leak_w_per_k
    document["enclosure"]["edge_factors"] = True
    assert network(document).heat_leak_w_per_k > plain


def test_k_value_counts_on_the_geometric_mean_of_inside_and_outside_area():
    # ATP agreement, Annex 1, appendix 1: S is the geometric mean of the inside and the outside surface area
    leak = network(with_overall({"k_w_per_m2_k": 0.4, "wall_thickness_m": 0.1})).heat_leak_w_per_k
    assert leak == pytest.approx(0.4 * math.sqrt(6.0 * 6.0 * 1.2**2), rel=1e-9)
    assumed = network(with_overall({"k_w_per_m2_k": 0.4}))
    assert "enclosure.overall.wall_thickness_m" in [row.field for row in assumed.assumed]
    by_hand = 0.4 * math.sqrt(6.0 * 6.0 * (1.0 + 2.0 * USUAL_WALL_THICKNESS_M) ** 2)
    assert assumed.heat_leak_w_per_k == pytest.approx(by_hand)


def test_energy_use_is_what_the_heat_leak_makes_the_appliance_use():
    leak = network(
        with_overall({"energy_kwh_per_day": 1.2, "at_room_c": 25.0, "inside_c": -18.0, "cop": 1.5})
    ).heat_leak_w_per_k
    used_kwh = leak * 43.0 * 24.0 / 1000.0 / 1.5
    assert used_kwh == pytest.approx(1.2)


@pytest.mark.parametrize("figure", ["k", "energy"])
def test_figure_of_the_whole_store_has_its_doors_and_bridges_in_it(figure):
    overall = {"k": {"k_w_per_m2_k": 0.4}, "energy": {"energy_kwh_per_day": 1.2, "cop": 1.5}}[figure]
    if figure == "energy":
        overall |= {"at_room_c": 25.0, "inside_c": -18.0}
    door = {"name": "door", "width_m": 0.3, "height_m": 0.5, "u_w_per_m2_k": 0.5, "seal_leak_m3_per_h": 0.1}
    plain = network(with_overall(overall)).heat_leak_w_per_k
    with_door = network(with_overall(overall, openings=[door], bridges_w_per_k=0.1))
    assert with_door.heat_leak_w_per_k == pytest.approx(plain)
    assert with_door.path_w_per_k["thermal bridges"] == pytest.approx(0.1)


# rise time


def rise_time_store(rise_time_h: float, mass_kg: float = 100.0) -> Document:
    return with_overall(
        {
            "rise_time_h": rise_time_h,
            "from_c": -18.0,
            "to_c": -9.0,
            "at_room_c": 25.0,
            "test_load_kg": mass_kg,
            "wall_mass_kg": 25.0,
        }
    )


def outer_layer_c(store: Any, bodies_j: np.ndarray) -> float:
    """Temperature of one layer of packages around a block of 200, from the heat in its shells."""
    load, first = store.items[0].load, store.items[0].first_body
    sides = near_cubic_stack(200, *PACKAGE_M)
    depth_m = PACKAGE_M[2]
    inner = (sides[0] - 2.0 * depth_m) * (sides[1] - 2.0 * depth_m) * (sides[2] - depth_m)  # it stands
    layer = 1.0 - inner / math.prod(sides)
    shares = np.array([body.mass_kg for body in load.bodies]) / load.mass_kg
    before = np.concatenate([[0.0], np.cumsum(shares)[:-1]])
    part = np.clip((layer - before) / shares, 0.0, 1.0)
    heats_j_per_kg = bodies_j[first : first + len(shares)] / (shares * load.mass_kg)
    return float(load.curve.temperature_c(float(np.sum(part * shares * heats_j_per_kg) / np.sum(part * shares))))


@pytest.mark.parametrize("rise_time_h", [12.0, 32.0])
def test_store_with_the_heat_leak_of_a_rise_time_takes_that_time(rise_time_h):
    definition = read_definition(rise_time_store(rise_time_h))
    overall = definition.enclosure.overall
    assert isinstance(overall, RiseTime)
    leak = heat_leak_of_rise_time_w_per_k(definition, overall)
    document = with_overall({"heat_leak_w_per_k": leak, "wall_mass_kg": 25.0})
    width, depth, height = PACKAGE_M
    document["contents"] = [
        {
            "name": "test load",
            "food": "test_package",
            "mass_kg": 100.0,
            "start_c": -18.0,
            "stacking": {"kind": "cartons", "count": 200, "width_m": width, "depth_m": depth, "height_m": height},
            "limits": [{"kind": "above", "temperature_c": -9.0}],
        }
    ]
    store = network(document)
    # 1 % on both sides of the stated time: the layer is read here by its heat, there between two shells
    early_c, late_c = (
        outer_layer_c(store, march(store.network, share * rise_time_h * 3600.0).energies_j) for share in (0.99, 1.01)
    )
    assert early_c < -9.0 < late_c


def test_longer_rise_time_means_a_smaller_leak():
    leaks = [network(rise_time_store(hours)).heat_leak_w_per_k for hours in (12.0, 24.0, 48.0)]
    assert leaks == sorted(leaks, reverse=True)


def test_rise_time_that_no_heat_leak_makes_is_refused():
    with pytest.raises(DefinitionRefused, match="No heat leak makes this load take this time"):
        network(rise_time_store(0.05))


# steady walls


@pytest.mark.parametrize("key", ["food-bank-freezer", "warehouse-freezer-store", "outreach-vaccine-carrier"])
def test_walls_start_on_the_line_of_steady_heat(key):
    """The same flow from the air through every cell out to the surroundings: nothing in a wall warms at first."""
    store = store_network(read_definition(sample_case(key).store))
    bodies, starts = store.network.bodies, start_temperatures_c(store)
    layered_faces = [name for name, _ in store.wall_delays_h]
    assert layered_faces
    run = march(store.network, 60.0)
    for name in layered_faces:
        cells = [k for k, body in enumerate(store.network.body_names) if body.startswith(f"{name}, cell")]
        flows_w = [bodies["conductance_w_per_k"][k] * (starts[k] - starts[bodies["parent"][k]]) for k in cells]
        at_start_w = run.path_start_w[store.network.path_names.index(name)]
        assert len(cells) >= 3
        assert flows_w == pytest.approx([at_start_w] * len(cells), rel=1e-6)


def start_temperatures_c(store: Any) -> list[float]:
    """From the heat that each body starts with; right for the bodies whose curve is straight."""
    starts = []
    for body in store.network.bodies:
        segment = store.network.segments[body["first_segment"] + body["start_segment"]]
        starts.append(float(segment["start_c"] + (body["start_j"] - segment["start_j"]) * segment["k_per_j"]))
    return starts


def test_store_as_warm_as_its_surroundings_stays_as_it_is():
    answer = hold_time(read_definition(small_store(room_c=5.0, start_c=5.0, limit_c=6.0)))
    assert answer.status == "beyond_horizon"
    assert answer.items[0].warmest_c_at_horizon == pytest.approx(5.0, abs=1e-9)
    assert np.array(answer.series.air_c) == pytest.approx(5.0, abs=1e-9)


def test_heat_into_steady_walls_hardly_changes_in_the_first_seconds():
    store = network(small_store(mass_kg=300.0))
    run = march(store.network, 10.0)
    through_w = store.heat_leak_w_per_k * (25.0 + 18.0)
    assert run.path_start_w.sum() == pytest.approx(through_w, rel=1e-9)
    assert run.path_j.sum() / 10.0 == pytest.approx(through_w, rel=1e-6)


# what never shortens a hold time

EASY = settings(max_examples=15, deadline=None, suppress_health_check=list(HealthCheck))
STORES = st.fixed_dictionaries(
    {
        "wall_m": st.floats(0.04, 0.15),
        "room_c": st.floats(10.0, 35.0),
        "mass_kg": st.floats(30.0, 120.0),
        "start_c": st.floats(-25.0, -12.0),
        "limit_c": st.floats(-8.0, 4.0),
    }
)
LITTLE_H = 0.02
"""Error of a hold time from the steps of a run."""


@EASY
@given(store=STORES, more=st.floats(0.005, 0.1))
def test_thicker_walls_never_shorten_the_hold_time(store, more):
    thicker = small_store(**store | {"wall_m": store["wall_m"] + more})
    assert hours_held(thicker) >= hours_held(small_store(**store)) - LITTLE_H


@EASY
@given(store=STORES, colder=st.floats(0.5, 15.0))
def test_colder_room_never_shortens_the_hold_time(store, colder):
    cooler = small_store(**store | {"room_c": store["room_c"] - colder})
    assert hours_held(cooler) >= hours_held(small_store(**store)) - LITTLE_H


@EASY
@given(store=STORES, times=st.floats(1.05, 1.6))
def test_more_of_the_same_never_shortens_the_hold_time(store, times):
    heavier = small_store(**store | {"mass_kg": store["mass_kg"] * times})
    assert hours_held(heavier) >= hours_held(small_store(**store)) - LITTLE_H


# fine enough


@pytest.mark.parametrize("case", sample_cases(), ids=lambda case: case.key)
def test_twice_as_many_shells_and_cells_move_the_hold_time_by_less_than_half_a_per_cent(case, monkeypatch):
    usual_h = hours_held(case.store)
    usual_count = loads.shell_count
    monkeypatch.setattr(loads, "shell_count", lambda biot: 2 * usual_count(biot))
    monkeypatch.setattr(enclosure, "_CELL_OF_DAY", enclosure._CELL_OF_DAY / 2.0)
    monkeypatch.setattr(enclosure, "_MOST_CELLS", 2 * enclosure._MOST_CELLS)
    assert hours_held(case.store) == pytest.approx(usual_h, rel=0.005)
