"""The answer to "how long does it hold?": statuses, order, hand check, heat paths, what is assumed."""

from __future__ import annotations

import json
from copy import deepcopy
from typing import Any

import numpy as np
import pytest

from app.answers import Answer, hold_time
from app.answers.checks import failed_checks
from app.stores import read_definition, sample_case, sample_cases

SIMPLE: dict[str, Any] = {
    "name": "test store",
    "enclosure": {"inside_m": {"width": 1.0, "depth": 1.0, "height": 1.0}, "overall": {"heat_leak_w_per_k": 1.5}},
    "contents": [
        {
            "name": "brine",
            "substance": {
                "specific_heat_j_per_kg_k": 3400.0,
                "conductivity_w_per_m_k": 50.0,
                "density_kg_per_m3": 1000.0,
            },
            "mass_kg": 100.0,
            "start_c": -20.0,
            "film_w_per_m2_k": 500.0,
            "stacking": {"kind": "exposed", "area_m2": 4.0, "half_thickness_m": 0.025},
            "limits": [{"kind": "above", "temperature_c": -15.0}],
        }
    ],
    "surroundings": {"room": {"kind": "constant", "temperature_c": 25.0}},
    "outage": {"horizon_h": 48.0},
}


def answer_to(change: dict[str, Any] | None = None, **contents: Any) -> Answer:
    document = deepcopy(SIMPLE) | (change or {})
    document["contents"][0] |= contents
    return hold_time(read_definition(document))


@pytest.mark.parametrize("case", sample_cases(), ids=lambda case: case.key)
def test_every_sample_case_keeps_its_checks(case):
    assert case.checks
    document = hold_time(read_definition(case.store)).as_document()
    assert failed_checks(document, case.checks) == []
    json.dumps(document, allow_nan=False)


def test_a_check_that_is_off_is_reported():
    case = sample_case("food-bank-freezer")
    document = hold_time(read_definition(case.store)).as_document()
    wrong = ({"quantity": "hold_time_h.best_estimate", "value": 1.0, "tolerance": 0.1},)
    assert len(failed_checks(document, wrong)) == 1


def test_one_lump_is_the_calculators_answer():
    answer = answer_to()
    # 100 kg, 3400 J/kg K and the air; 1.5 W/K; films and inside resistance are next to nothing
    exact_h = (100.0 * 3400.0 + 1.39 * 1006.0) / 1.5 * np.log(45.0 / 40.0) / 3600.0
    assert answer.hold_time_h.best_estimate == pytest.approx(exact_h, rel=2e-3)
    assert answer.hand_check.closed_form_h == pytest.approx(exact_h, rel=6e-3)  # it leaves the air out
    assert answer.hand_check.heat_leak_w_per_k == pytest.approx(1.5)
    assert answer.hand_check.time_constant_h == pytest.approx(100.0 * 3400.0 / 1.5 / 3600.0, rel=6e-3)


def test_best_estimate_alone_is_never_called_a_planning_value():
    hold = answer_to().hold_time_h
    assert hold.best_estimate is not None
    assert (hold.planning, hold.median, hold.low, hold.high, hold.sampling_error_h) == (None,) * 5


def test_a_limit_that_is_not_reached_is_beyond_the_horizon():
    answer = answer_to(limits=[{"kind": "above", "temperature_c": 24.0}])
    assert (answer.status, answer.hold_time_h.best_estimate, answer.ends_with) == ("beyond_horizon", None, None)
    assert answer.items[0].limits[0].status == "beyond_horizon"


def test_a_limit_that_is_past_at_the_start_is_answered_with_zero():
    answer = answer_to(limits=[{"kind": "above", "temperature_c": -21.0}])
    assert (answer.status, answer.hold_time_h.best_estimate) == ("already_past", 0.0)
    assert "already_past" in [caution.code for caution in answer.cautions]


def test_a_dwell_ends_its_length_after_the_first_crossing():
    limit = {"kind": "above", "temperature_c": -15.0, "longer_than_h": 3.0}
    first = answer_to().hold_time_h.best_estimate
    dwelt = answer_to(limits=[limit]).items[0].limits[0]
    assert dwelt.first_crossing_h == pytest.approx(first, abs=1e-3)
    assert dwelt.best_estimate_h == pytest.approx(first + 3.0, abs=1e-3)


def test_below_is_broken_by_a_cold_room():
    answer = answer_to(
        {"surroundings": {"room": {"kind": "constant", "temperature_c": -30.0}}},
        start_c=5.0,
        limits=[{"kind": "below", "temperature_c": 2.0}],
    )
    assert answer.status == "fails"
    assert "room_colder" in [caution.code for caution in answer.cautions]


def test_mean_kinetic_limit_comes_after_the_plain_one():
    plain = answer_to(start_c=5.0, limits=[{"kind": "above", "temperature_c": 8.0}])
    kinetic = answer_to(start_c=5.0, limits=[{"kind": "mean_kinetic", "temperature_c": 8.0}])
    assert kinetic.hold_time_h.best_estimate > plain.hold_time_h.best_estimate


def test_thawed_share_counts_the_ice_of_the_start():
    answer = answer_to(
        substance="water",
        start_c=-5.0,
        mass_kg=10.0,
        limits=[{"kind": "thawed", "share": 0.5}],
        stacking={"kind": "exposed", "area_m2": 2.0, "half_thickness_m": 0.005},
    )
    item = answer.items[0]
    assert item.melting_starts_h < answer.hold_time_h.best_estimate < item.melted_h
    # half of the ice takes half of the time between: the leak hardly changes while it melts
    middle = 0.5 * (item.melting_starts_h + item.melted_h)
    assert answer.hold_time_h.best_estimate == pytest.approx(middle, rel=0.05)


def test_the_first_to_fail_ends_the_store():
    document = deepcopy(SIMPLE)
    second = deepcopy(document["contents"][0]) | {
        "name": "other",
        "limits": [{"kind": "above", "temperature_c": -19.0}],
    }
    document["contents"].append(second)
    answer = hold_time(read_definition(document))
    assert answer.ends_with.item == "other"
    assert answer.hold_time_h.best_estimate == min(item.hold_time_h.best_estimate for item in answer.items)


def test_air_limits_end_the_store_too():
    answer = answer_to({"air_limits": [{"kind": "above", "temperature_c": -19.5}]})
    assert answer.ends_with.item == "air"


def test_an_air_preset_is_judged_on_the_air_wherever_it_stands():
    eggs = answer_to(start_c=4.0, limits=[{"preset": "us_food_code_eggs"}])
    air = answer_to({"air_limits": [{"kind": "above", "temperature_c": 7.2}]}, start_c=4.0, limits=[])
    assert eggs.hold_time_h.best_estimate == pytest.approx(air.hold_time_h.best_estimate, abs=0.02)


def test_shares_of_the_heat_add_up_and_the_balance_closes():
    answer = hold_time(read_definition(sample_case("food-bank-freezer").store))
    assert sum(path.share for path in answer.heat_in.paths) == pytest.approx(1.0)
    assert answer.energy_balance_error < 1e-9
    assert {"walls", "ceiling", "floor", "door, leaf", "door, seals"} == {p.path for p in answer.heat_in.paths}


def test_ice_lengthens_it_and_is_gone_when_it_says():
    start = {"start_c": 2.0, "limits": [{"kind": "above", "temperature_c": 6.0}]}
    without = answer_to(**start)
    with_ice = answer_to({"coolants": [{"name": "ice", "coolant": "ice", "mass_kg": 10.0, "start_c": 0.0}]}, **start)
    assert with_ice.hold_time_h.best_estimate > without.hold_time_h.best_estimate + 5.0
    assert with_ice.coolants[0].gone_at_h is not None
    assert with_ice.coolants[0].left_kg_at_horizon == pytest.approx(0.0, abs=1e-9)


def test_series_starts_with_the_start_and_ends_at_the_horizon():
    answer = answer_to()
    assert answer.series.time_h[0] == 0.0
    assert answer.series.time_h[-1] == pytest.approx(48.0)
    assert answer.series.items["brine"].mean_c[0] == pytest.approx(-20.0, abs=1e-6)
    assert np.all(np.diff(answer.series.items["brine"].mean_c) > 0.0)


def test_what_was_not_given_is_listed_with_its_source():
    document = deepcopy(sample_case("food-bank-freezer").store)
    del document["enclosure"]["openings"][0]["seal_leak_m3_per_h"]
    answer = hold_time(read_definition(document))
    found = [row for row in answer.assumed if row.field == "enclosure.openings[0].seal_leak_m3_per_h"]
    assert len(found) == 1
    assert found[0].source


def test_the_same_question_has_the_same_fingerprint_and_another_has_not():
    assert answer_to().fingerprint == answer_to().fingerprint
    assert answer_to().fingerprint != answer_to(mass_kg=101.0).fingerprint


def test_wall_of_60_mm_holds_the_food_bank_freezer_for_less():
    thick = sample_case("food-bank-freezer").store
    thin = deepcopy(thick)
    for name in ("walls", "ceiling"):
        thin["enclosure"]["faces"][name]["layers"][1]["thickness_m"] = 0.06
    before, after = (hold_time(read_definition(s)).hold_time_h.best_estimate for s in (thick, thin))
    assert after < before


def test_doors_that_leak_more_than_the_whole_store_are_pointed_out():
    enclosure = {
        "inside_m": {"width": 1.0, "depth": 1.0, "height": 1.0},
        "overall": {"k_w_per_m2_k": 0.03},
        "openings": [{"name": "door", "width_m": 0.6, "height_m": 0.9, "u_w_per_m2_k": 2.0, "seal_leak_m3_per_h": 2.0}],
    }
    codes = [caution.code for caution in answer_to({"enclosure": enclosure}).cautions]
    assert "walls_count_as_tight" in codes
    assert "walls_count_as_tight" not in [caution.code for caution in answer_to().cautions]
