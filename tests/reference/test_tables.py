"""The tables as they stand: complete, joined to their sources, and equal to what the sources say."""

from __future__ import annotations

import csv
import re
from importlib.resources import files

import pytest

from app.errors import UnknownKey
from app.physics.foods import Composition, food_curve
from app.physics.melting import WATER_LATENT_J_PER_KG, phase_change_curve
from app.reference import (
    coolant_material,
    coolant_materials,
    food,
    foods,
    limit_preset,
    limit_presets,
    material,
    materials,
    opening_kind,
    source,
    sources,
)
from app.reference.bounds import FOOD_GROUPS, LIMIT_GROUPS, MATERIAL_CLASSES
from app.reference.tables import opening_kinds

TABLES = {
    "materials": (materials, 40),
    "foods": (foods, 60),
    "coolants": (coolant_materials, 25),
    "limits": (limit_presets, 70),
    "openings": (opening_kinds, 5),
    "sources": (sources, 40),
}


def cells_of(table: str) -> list[dict[str, str]]:
    """The cells of a table as they stand in its file."""
    text = files("app.reference").joinpath(f"{table}.csv").read_text(encoding="utf-8")
    return list(csv.DictReader(text.splitlines()))


@pytest.mark.parametrize("table", TABLES)
def test_every_table_loads_with_no_fewer_rows_than_promised(table):
    rows, promised = TABLES[table]
    assert len(rows()) >= promised


@pytest.mark.parametrize("table", TABLES)
def test_keys_are_plain_words_joined_by_underscores(table):
    keys = [row.key for row in TABLES[table][0]()]
    assert [key for key in keys if not re.fullmatch(r"[a-z][a-z0-9]*(_[a-z0-9]+)*", key)] == []


@pytest.mark.parametrize("table", ["materials", "foods", "coolants", "limits", "openings"])
def test_no_two_rows_of_a_list_to_choose_from_read_the_same(table):
    labels = [row.label for row in TABLES[table][0]()]
    assert sorted(set(labels)) == sorted(labels)


def test_every_source_is_used_and_every_used_source_is_there():
    used = {
        cell
        for table in ("materials", "foods", "coolants", "limits", "openings")
        for cells in cells_of(table)
        for name, cell in cells.items()
        if name.endswith("source_key")
    }
    assert used == {row.source_key for row in sources()}


def test_every_group_has_rows():
    assert {row.group for row in materials()} == set(MATERIAL_CLASSES)
    assert {row.group for row in foods()} == set(FOOD_GROUPS)
    assert {preset.group for preset in limit_presets()} == set(LIMIT_GROUPS)


@pytest.mark.parametrize("look_up", [material, food, coolant_material, limit_preset, opening_kind, source])
def test_an_unknown_key_is_refused(look_up):
    with pytest.raises(UnknownKey, match="called 'zzzzzz'"):
        look_up("zzzzzz")


def test_a_misspelt_key_is_refused_with_the_nearest_ones():
    with pytest.raises(UnknownKey, match="There is no material called 'pir_fome'. Nearest: pir_foam") as refused:
        material("pir_fome")
    assert refused.value.nearest[0] == "pir_foam"


@pytest.mark.parametrize("key", ["steel_sheet", "pir_foam", "xps_foam", "concrete", "cardboard"])
def test_materials_named_in_the_contract_are_there(key):
    assert material(key).key == key


def test_a_row_tells_its_source_in_words():
    assert food("cod").source_text == "ASHRAE Handbook Refrigeration, 2006, ch. 9, Table 3 (from memory, published)"


# Materials


def test_insulation_conducts_less_than_wood_and_wood_less_than_metal():
    wood = material("softwood").conductivity_w_per_m_k
    assert all(row.conductivity_w_per_m_k < wood for row in materials() if row.group == "insulation")
    assert all(row.conductivity_w_per_m_k > 50 * wood for row in materials() if row.group == "metal")


# Source: ISO 10456:2007 class values (published): PUR 0.022 and 0.025, EPS 0.036; ASHRAE Handbook Fundamentals
# (published): sawdust 0.065, brick 0.72 and 1.3, sand-aggregate concrete 1.73.
@pytest.mark.parametrize(
    ("key", "conductivity"),
    [
        ("pur_foam_new", 0.022),
        ("pur_foam", 0.025),
        ("eps_foam", 0.036),
        ("sawdust", 0.065),
        ("brick_common", 0.72),
        ("brick_face", 1.3),
        ("concrete_sand_aggregate", 1.73),
    ],
)
def test_published_conductivities_stand_as_printed(key, conductivity):
    assert material(key).conductivity_w_per_m_k == conductivity


# Source: Cengel and Boles, Thermodynamics, Table A-3 (published)
@pytest.mark.parametrize(
    ("key", "density", "heat"), [("aluminium_pure", 2700, 902), ("copper", 8900, 386), ("hardwood", 721, 1260)]
)
def test_published_heat_capacities_stand_as_printed(key, density, heat):
    row = material(key)
    assert (row.density_kg_per_m3, row.specific_heat_j_per_kg_k) == (density, heat)


# Foods


def composition_of(row) -> Composition:
    """The fractions of a row, as the physics takes them."""
    return Composition(
        water=row.water_fraction,
        protein=row.protein_fraction,
        fat=row.fat_fraction,
        carbohydrate=row.carbohydrate_fraction,
        fibre=row.fibre_fraction,
        ash=row.ash_fraction,
    )


def test_the_handbooks_latent_heat_is_334_kj_per_kg_of_its_water():
    # Source: ASHRAE Handbook Refrigeration 2006, ch. 9, Table 3: its column is 334 x water, to 1 kJ/kg (computed)
    rows = [row for row in foods() if row.handbook_latent_j_per_kg is not None]
    assert len(rows) > 55
    for row in rows:
        assert row.handbook_latent_j_per_kg == pytest.approx(334e3 * row.water_fraction, abs=1000.0), row.key


def test_carbohydrate_is_without_fibre():
    # Source: ASHRAE Handbook Refrigeration 2006, ch. 9, Table 3: peas 14.46 % carbohydrate, 5.10 % of it fibre
    assert food("peas_green").carbohydrate_fraction == pytest.approx(0.0936, abs=1e-9)
    assert food("peas_green").fibre_fraction == pytest.approx(0.051, abs=1e-9)


def test_every_food_has_an_enthalpy_curve():
    for row in foods():
        curve = food_curve(composition_of(row), initial_freezing_c=row.initial_freezing_c)
        assert curve.enthalpy_j_per_kg(5.0) > curve.enthalpy_j_per_kg(-18.0), row.key


def test_the_misprinted_specific_heats_of_chicken_are_left_out():
    assert food("chicken").handbook_specific_heat_above_j_per_kg_k is None
    assert "misprint" in food("chicken").note


# Source: enthalpy of cellulose test packages, kJ/kg above -40 °C (from memory)
TEST_PACKAGE_KJ_PER_KG = {
    -30: 19, -25: 28, -20: 41, -18: 48, -15: 58, -10: 79, -9: 85, -5: 122, -3: 169, -2: 233, -1: 282, 0: 285,
    5: 304, 10: 322, 20: 358,
}  # fmt: skip


@pytest.mark.parametrize("at_c", TEST_PACKAGE_KJ_PER_KG)
def test_the_test_package_takes_up_what_its_enthalpy_table_says(at_c):
    row = food("test_package")
    curve = food_curve(composition_of(row), initial_freezing_c=row.initial_freezing_c)
    heat = curve.enthalpy_j_per_kg(at_c) - curve.enthalpy_j_per_kg(-18.0)
    expected = 1000.0 * (TEST_PACKAGE_KJ_PER_KG[at_c] - TEST_PACKAGE_KJ_PER_KG[-18])
    # 4 kJ/kg: what is left between one freezing point with an ideal solution and the table; 3.9 at 0 °C
    assert heat == pytest.approx(expected, abs=4000.0)


# Coolants


def test_every_coolant_has_an_enthalpy_curve_with_its_latent_heat():
    for row in coolant_materials():
        curve = phase_change_curve(
            melting_c=row.melting_c,
            melting_range_k=row.melting_range_k,
            latent_j_per_kg=row.latent_j_per_kg,
            specific_heat_solid_j_per_kg_k=row.specific_heat_solid_j_per_kg_k,
            specific_heat_liquid_j_per_kg_k=row.specific_heat_liquid_j_per_kg_k,
            conductivity_solid_w_per_m_k=row.conductivity_solid_w_per_m_k,
            conductivity_liquid_w_per_m_k=row.conductivity_liquid_w_per_m_k,
            density_kg_per_m3=row.density_kg_per_m3,
        )
        taken_up = curve.enthalpy_j_per_kg(row.melting_c + 5.0) - curve.enthalpy_j_per_kg(row.melting_c - 5.0)
        sensible = 5.0 * (row.specific_heat_solid_j_per_kg_k + row.specific_heat_liquid_j_per_kg_k)
        assert taken_up == pytest.approx(row.latent_j_per_kg + sensible, rel=1e-9), row.key


def test_ice_of_the_table_and_ice_of_the_physics_melt_alike():
    assert coolant_material("ice").latent_j_per_kg == pytest.approx(WATER_LATENT_J_PER_KG, rel=1e-6)


def test_no_salt_solution_stores_more_latent_heat_than_its_share_of_water_by_far():
    for row in coolant_materials():
        if row.kind != "eutectic":
            continue
        salt = float(re.search(r"([\d.]+) %", row.label)[1]) / 100.0
        # hydrates add a little to the ice; ammonium sulfate is known to read high and says so in its note
        if row.key != "ammonium_sulfate_eutectic":
            assert row.latent_j_per_kg < 1.05 * (1.0 - salt) * WATER_LATENT_J_PER_KG, row.key


def test_salt_solutions_without_measured_properties_follow_the_rules_in_their_notes():
    by_rule = [row for row in coolant_materials() if row.note.endswith("salt.") and "density 1000" in row.note]
    assert len(by_rule) >= 10
    for row in by_rule:
        salt = float(re.search(r"([\d.]+) %", row.label)[1]) / 100.0
        # 5 J/kg·K, 5 kg/m³ and 0.005 W/m·K: the table is rounded to tens and to hundredths
        assert row.density_kg_per_m3 == pytest.approx(1000 + 850 * salt, abs=5.0), row.key
        assert row.specific_heat_liquid_j_per_kg_k == pytest.approx(4190 * (1 - salt), abs=5.0), row.key
        assert row.specific_heat_solid_j_per_kg_k == pytest.approx(2000 - 700 * salt, abs=5.0), row.key
        assert row.conductivity_solid_w_per_m_k == pytest.approx(2.2 - 2.0 * salt, abs=0.0051), row.key
        assert row.conductivity_liquid_w_per_m_k == pytest.approx(0.57 - 0.37 * salt, abs=0.0051), row.key


# Source: Melinder, Properties of Secondary Working Fluids, 2nd ed., at 10 °C (computed): salt share, specific heat
@pytest.mark.parametrize(
    ("key", "salt", "heat"),
    [
        ("sodium_chloride_eutectic", 0.23, 3330),
        ("magnesium_chloride_eutectic", 0.20, 3080),
        ("potassium_carbonate_eutectic", 0.39, 2720),
        ("calcium_chloride_eutectic", 0.29, 2770),
    ],
)
def test_specific_heats_of_brines_are_the_measured_ones_and_the_rule_for_the_others_is_near_them(key, salt, heat):
    assert coolant_material(key).specific_heat_liquid_j_per_kg_k == heat
    # 9 %: what the notes of the rows by rule claim; largest for magnesium chloride, 8.8 %
    assert 4190.0 * (1.0 - salt) == pytest.approx(heat, rel=0.09)


# Limits

# Sources: the documents that each row names (published)
PUBLISHED_LIMITS = {
    "us_food_code_cold": [("above", 5.0, 0.0)],
    "us_home_2h": [("above", 4.4, 2.0)],
    "us_refreeze": [("above", 4.4, 0.0)],
    "frozen_food_minus_18": [("above", -18.0, 0.0)],
    "frozen_food_minus_15": [("above", -15.0, 0.0)],
    "frozen_food_minus_12": [("above", -12.0, 0.0)],
    "uk_chill_8_4h": [("above", 8.0, 4.0)],
    "au_2h4h": [("above", 5.0, 4.0)],
    "cdc_fridge": [("above", 8.0, 0.0), ("below", 2.0, 0.0)],
    "cdc_freezer": [("above", -15.0, 0.0), ("below", -50.0, 0.0)],
    "who_holdover": [("above", 8.0, 0.0), ("below", 2.0, 0.0)],
    "who_range": [("above", 20.0, 0.0), ("mean_kinetic", 8.0, 0.0), ("below", -0.5, 0.0), ("below", 0.0, 1.0)],
    "fda_red_cells": [("above", 6.0, 0.0), ("below", 1.0, 0.0)],
    "fda_red_cells_transport": [("above", 10.0, 0.0), ("below", 1.0, 0.0)],
    "fda_fresh_frozen_plasma": [("above", -18.0, 0.0)],
    "fda_frozen_red_cells": [("above", -65.0, 0.0)],
    "fda_platelets": [("above", 24.0, 0.0), ("below", 20.0, 0.0)],
    "eu_red_cells": [("above", 6.0, 0.0), ("below", 2.0, 0.0)],
    "usp_controlled_cold": [
        ("above", 15.0, 0.0),
        ("above", 8.0, 24.0),
        ("mean_kinetic", 8.0, 0.0),
        ("below", 2.0, 0.0),
    ],
}


@pytest.mark.parametrize("key", PUBLISHED_LIMITS)
def test_published_limits_stand_as_printed(key):
    limits = limit_preset(key).limits
    assert [(one.kind, one.temperature_c, one.longer_than_h) for one in limits] == PUBLISHED_LIMITS[key]


def test_a_limit_in_fahrenheit_is_never_rounded_to_the_warm_side():
    checked = 0
    for preset in limit_presets():
        for limit in preset.limits:
            printed = re.search(r"(?:above|at|air|^) ?(-?\d+) °F", limit.original)
            if printed is None or limit.kind != "above":
                continue
            exact_c = (float(printed[1]) - 32.0) / 1.8
            # 0.05 K: the bodies themselves print whole tenths
            assert exact_c - 0.05 < limit.temperature_c <= exact_c, preset.key
            checked += 1
    assert checked >= 5


def test_ceilings_are_judged_at_the_warmest_point_and_floors_at_the_coldest():
    for preset in limit_presets():
        for limit in preset.limits:
            assert limit.at == ("coldest" if limit.kind == "below" else "warmest"), preset.key


def test_the_floor_of_a_band_lies_below_its_ceiling():
    bands = 0
    for preset in limit_presets():
        floors = [limit.temperature_c for limit in preset.limits if limit.kind == "below"]
        ceilings = [limit.temperature_c for limit in preset.limits if limit.kind != "below"]
        if floors and ceilings:
            assert max(floors) < min(ceilings), preset.key
            bands += 1
    assert bands >= 20


def test_every_limit_names_who_says_so_and_where():
    for preset in limit_presets():
        assert preset.body, preset.key
        assert preset.document, preset.key
        assert all(limit.source_text and limit.original for limit in preset.limits), preset.key


def test_platelets_say_that_cold_harms_them():
    assert "Cold damages platelets" in limit_preset("fda_platelets").limits[0].note


# Doors


def test_a_sheet_that_rolls_up_is_worse_than_a_sliding_door_and_that_worse_than_a_gasket():
    leaks = [opening_kind(key).leak_l_per_s_m for key in ("solid_swing_door", "solid_sliding_door", "roll_up_door")]
    assert leaks == sorted(leaks)
    assert opening_kind("solid_swing_door").u_w_per_m2_k < opening_kind("glass_door").u_w_per_m2_k
