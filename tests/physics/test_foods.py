"""Food curves: directions, ends and refusals. The handbook's figures are in tests/published."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.errors import InputOutOfRange, UnknownKey
from app.physics.components import component_specific_heat_j_per_kg_k
from app.physics.foods import (
    Composition,
    bound_water_fraction,
    conductivity_bounds_w_per_m_k,
    conductivity_w_per_m_k,
    density_kg_per_m3,
    food_curve,
    specific_heat_j_per_kg_k,
)
from app.physics.freezing import ice_fraction, ice_fraction_by_tchigeov, usual_freezing_c

MEAT = Composition(water=0.74, protein=0.20, fat=0.05, ash=0.01)


def heat_j_per_kg(composition: Composition, from_c: float, to_c: float, *, begins_c: float = -1.5) -> float:
    curve = food_curve(composition, initial_freezing_c=begins_c)
    return curve.enthalpy_j_per_kg(to_c) - curve.enthalpy_j_per_kg(from_c)


def test_more_water_takes_more_heat_to_thaw():
    heats = [heat_j_per_kg(Composition(water=w, fat=1.0 - w), -20.0, 5.0) for w in (0.2, 0.4, 0.6, 0.8, 0.95)]
    assert heats == sorted(heats)


def test_lower_freezing_point_brings_heat_of_melting_to_lower_temperatures():
    to_minus_12 = [heat_j_per_kg(MEAT, -25.0, -12.0, begins_c=begins_c) for begins_c in (-0.5, -1.5, -5.0, -10.0)]
    assert to_minus_12 == sorted(to_minus_12)


def test_protein_binds_water_that_does_not_freeze():
    assert bound_water_fraction(MEAT) == pytest.approx(0.08)
    assert bound_water_fraction(Composition(water=0.1, protein=0.9)) == 0.1
    lean = food_curve(MEAT, initial_freezing_c=-1.5)
    assert lean.ice_full == pytest.approx((0.74 - 0.08) * (1.0 - 1.5 / 40.0))


def test_curve_goes_on_below_its_freezing_range_with_the_heat_of_solids_and_ice():
    # MEAT at -40 °C: 0.74 of ice and bound water at 1819 J/kg·K, protein 1958, fat 1918, ash 1011 (Choi and Okos)
    found = (heat_j_per_kg(MEAT, -40.0 - 0.01, -40.0)) / 0.01
    assert found == pytest.approx(0.74 * 1819.2 + 0.20 * 1957.7 + 0.05 * 1917.6 + 0.01 * 1011.1, rel=1e-3)
    assert heat_j_per_kg(MEAT, -80.0, -60.0) < heat_j_per_kg(MEAT, -60.0, -40.0)


def test_apparent_heat_at_minus_18_is_well_above_that_of_frozen_food():
    # the reason for a curve: the safe limit of frozen food lies inside the freezing range
    assert heat_j_per_kg(MEAT, -18.0, -17.0) > 1.4 * heat_j_per_kg(MEAT, -41.0, -40.0)


@given(st.floats(0.2, 0.95), st.floats(0.0, 1.0), st.floats(-40.0, -5.0))
def test_conductivity_lies_between_its_bounds(water, share, at_c):
    composition = Composition(water=water, protein=(1.0 - water) * share, fat=(1.0 - water) * (1.0 - share))
    ice = ice_fraction(free_water=0.9 * water, initial_freezing_c=-1.0, temperature_c=at_c)
    along, across = conductivity_bounds_w_per_m_k(composition, ice, at_c)
    assert across <= conductivity_w_per_m_k(composition, ice, at_c) <= along


def test_conductivity_of_one_component_is_its_own():
    water = Composition(water=1.0)
    assert conductivity_w_per_m_k(water, 0.0, 20.0) == pytest.approx(0.6037, abs=0.0005)


def test_frozen_food_conducts_better_and_is_lighter():
    curve = food_curve(MEAT, initial_freezing_c=-1.5)
    assert curve.conductivity_solid_w_per_m_k > 2.0 * curve.conductivity_liquid_w_per_m_k
    assert density_kg_per_m3(MEAT, 0.6, -20.0) < density_kg_per_m3(MEAT, 0.0, 0.0)


def test_fractions_that_do_not_quite_add_up_are_filled_beside_the_water():
    short = Composition(water=0.70, protein=0.20, fat=0.06)
    assert short.scaled()["water"] == 0.70
    assert sum(short.scaled().values()) == pytest.approx(1.0)
    assert short.scaled()["protein"] == pytest.approx(0.20 * 0.30 / 0.26)
    assert Composition(water=0.97).scaled()["water"] == 1.0
    assert specific_heat_j_per_kg_k(Composition(water=1.0), 5.0) == pytest.approx(4175.9, abs=0.1)


@pytest.mark.parametrize("fractions", [{"water": 0.5}, {"water": 0.9, "fat": 0.2}])
def test_composition_that_is_not_one_is_refused(fractions):
    with pytest.raises(InputOutOfRange, match=r"sum of the fractions is .*; allowed: 0.95 to 1.05"):
        Composition(**fractions)


@pytest.mark.parametrize("water", [-0.1, 1.1, float("nan")])
def test_fraction_that_is_none_is_refused(water):
    with pytest.raises(InputOutOfRange, match="water is"):
        Composition(water=water, fat=0.5, protein=0.5)


@pytest.mark.parametrize("begins_c", [0.0, 1.0, -0.01, -39.0, float("nan")])
def test_freezing_point_of_no_food_is_refused(begins_c):
    with pytest.raises(InputOutOfRange, match="initial_freezing_c is"):
        food_curve(MEAT, initial_freezing_c=begins_c)


def test_no_ice_above_the_freezing_point():
    at = {"initial_freezing_c": -2.0, "temperature_c": -2.0}
    assert ice_fraction(free_water=0.7, **at) == 0.0
    assert ice_fraction_by_tchigeov(water=0.7, **at) == 0.0


def test_unknown_components_and_kinds_are_refused_with_the_known_ones():
    with pytest.raises(UnknownKey, match="no component called 'starch'.*carbohydrate"):
        component_specific_heat_j_per_kg_k("starch", 5.0)
    with pytest.raises(UnknownKey, match="no kind of food called 'fish'.*meat"):
        usual_freezing_c(kind="fish", water=0.8)
