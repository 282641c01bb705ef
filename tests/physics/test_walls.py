"""Walls, areas and stacks: limits, directions and refusals. Published values are in tests/published."""

import math

import pytest

from app.errors import InputOutOfRange, UnknownKey
from app.physics.air import air_density_kg_per_m3, air_properties
from app.physics.conduction import (
    block_conductivity_w_per_m_k,
    corner_area_m2,
    edge_area_m2,
    log_mean_area_m2,
    penetration_depth_m,
)
from app.physics.convection import (
    horizontal_cylinder_nusselt,
    laminar_plate_nusselt,
    still_plate_nusselt,
    stirring_plate_nusselt,
    tall_enclosure_nusselt,
    vertical_plate_nusselt,
)
from app.physics.walls import (
    SolidLayer,
    combined_resistance_m2_k_per_w,
    dynamic_wall,
    still_air_layer_m2_k_per_w,
    surface_resistance_m2_k_per_w,
    transmittance_w_per_m2_k,
)

PANEL = SolidLayer(0.1, 0.022, 40.0, 1400.0)
SURFACES = {"inside_m2_k_per_w": 0.13, "outside_m2_k_per_w": 0.04}


def test_edges_and_corners_bring_a_cube_near_its_exact_conduction():
    # Source: cube with walls as thick as a quarter of its inside, 6 L²/t + 12 x 0.54 L + 8 x 0.15 t (published
    # shape factors); areas at mid-wall would give 6 (L + t)²/t, which is 9 % more
    inside, wall = 1.0, 0.25
    area = 6.0 * inside**2 + edge_area_m2(edge_length_m=12.0 * inside, thickness_m=wall)
    area += corner_area_m2(corners=8, thickness_m=wall)
    assert area == pytest.approx(6.0 + 12 * 0.54 * 0.25 + 8 * 0.15 * 0.0625)
    assert 6.0 < area < 6.0 * (inside + wall) ** 2


def test_log_mean_area_lies_between_and_meets_the_plane_wall():
    assert 1.0 < log_mean_area_m2(inside_m2=1.0, outside_m2=2.0) < math.sqrt(2.0) * 1.03
    assert log_mean_area_m2(inside_m2=1.0, outside_m2=1.0) == 1.0
    assert log_mean_area_m2(inside_m2=1.0, outside_m2=1.0 + 1e-6) == pytest.approx(1.0, abs=1e-6)


def test_stack_conducts_as_its_pieces_when_full_and_less_with_gaps():
    assert block_conductivity_w_per_m_k(solid_w_per_m_k=1.2, filled=1.0) == pytest.approx(1.2)
    found = [block_conductivity_w_per_m_k(solid_w_per_m_k=1.2, filled=f) for f in (0.3, 0.5, 0.7, 0.9)]
    assert found == sorted(found)
    assert found[0] > 0.024
    assert block_conductivity_w_per_m_k(solid_w_per_m_k=0.024, filled=0.5) == pytest.approx(0.024)


@pytest.mark.parametrize("filled", [0.0, 1.1, float("nan")])
def test_share_that_fills_nothing_is_refused(filled):
    with pytest.raises(InputOutOfRange, match="filled is"):
        block_conductivity_w_per_m_k(solid_w_per_m_k=1.0, filled=filled)


def test_swing_reaches_twice_as_deep_in_four_times_the_period():
    once, twice = (penetration_depth_m(diffusivity_m2_per_s=5e-7, period_s=p) for p in (86400.0, 4 * 86400.0))
    assert twice == pytest.approx(2.0 * once)


def test_layers_add_up_in_any_order():
    one = transmittance_w_per_m2_k([0.5, 4.0, 0.2], **SURFACES)
    assert transmittance_w_per_m2_k([4.0, 0.2, 0.5], **SURFACES) == pytest.approx(one)
    assert one == pytest.approx(1.0 / 4.87)


def test_combined_method_of_an_even_wall_is_its_plain_resistance():
    found = combined_resistance_m2_k_per_w([0.3, 0.7], [[2.0, 2.0], [1.0, 1.0]], **SURFACES)
    assert found == pytest.approx(3.17)


def test_studs_take_away_resistance():
    plain = combined_resistance_m2_k_per_w([0.85, 0.15], [[4.0, 4.0]], **SURFACES)
    assert combined_resistance_m2_k_per_w([0.85, 0.15], [[4.0, 1.1]], **SURFACES) < plain


def test_shares_that_leave_a_gap_are_refused():
    with pytest.raises(InputOutOfRange, match="sum of shares is 0.9"):
        combined_resistance_m2_k_per_w([0.5, 0.4], [[1.0, 1.0]], **SURFACES)


def test_slow_swing_passes_a_wall_as_if_it_were_steady():
    wall = dynamic_wall([PANEL], **SURFACES, period_s=1e9)
    assert wall.periodic_w_per_m2_k == pytest.approx(wall.u_w_per_m2_k, rel=1e-6)
    assert wall.decrement == pytest.approx(1.0, rel=1e-6)


def test_heavier_wall_passes_less_of_the_day_and_later():
    light = dynamic_wall([PANEL], **SURFACES, period_s=86400.0)
    heavy = dynamic_wall([PANEL, SolidLayer(0.2, 1.8, 2400.0, 1000.0)], **SURFACES, period_s=86400.0)
    assert heavy.decrement < light.decrement
    assert heavy.lag_h > light.lag_h


def test_swing_passes_a_wall_alike_from_both_sides():
    # the periodic transmittance is that of the reversed wall (reciprocity)
    layers = [PANEL, SolidLayer(0.2, 1.8, 2400.0, 1000.0)]
    there = dynamic_wall(layers, **SURFACES, period_s=86400.0)
    back = dynamic_wall(layers[::-1], inside_m2_k_per_w=0.04, outside_m2_k_per_w=0.13, period_s=86400.0)
    assert back.periodic_w_per_m2_k == pytest.approx(there.periodic_w_per_m2_k, rel=1e-9)


def test_wide_air_layer_insulates_best_when_heat_goes_down():
    found = [still_air_layer_m2_k_per_w(0.1, way) for way in ("up", "sideways", "down")]
    assert found == sorted(found)
    assert still_air_layer_m2_k_per_w(0.0, "up") == 0.0


def test_thickness_and_direction_outside_the_table_are_refused():
    with pytest.raises(InputOutOfRange, match="thickness_m is 0.4 m"):
        still_air_layer_m2_k_per_w(0.4, "up")
    with pytest.raises(UnknownKey, match="no direction called 'left'"):
        still_air_layer_m2_k_per_w(0.1, "left")
    with pytest.raises(UnknownKey, match="no direction called 'left'"):
        surface_resistance_m2_k_per_w("left")


@pytest.mark.parametrize(
    ("relation", "beyond"),
    [
        (lambda ra: vertical_plate_nusselt(ra, 0.71), 2e12),
        (lambda ra: laminar_plate_nusselt(ra, 0.71), 2e9),
        (stirring_plate_nusselt, 5e3),
        (stirring_plate_nusselt, 2e11),
        (still_plate_nusselt, 5e4),
        (still_plate_nusselt, 2e10),
        (lambda ra: horizontal_cylinder_nusselt(ra, 0.71), -1.0),
        (lambda ra: tall_enclosure_nusselt(ra, 0.71, 20.0), 5e3),
        (lambda slenderness: tall_enclosure_nusselt(1e5, 0.71, slenderness), 50.0),
    ],
)
def test_relations_of_convection_refuse_what_lies_outside_their_range(relation, beyond):
    with pytest.raises(InputOutOfRange, match="rayleigh|slenderness"):
        relation(beyond)


def test_two_relations_for_an_upright_plate_agree_while_it_is_laminar():
    # Source: Incropera et al., 6th ed., sec. 9.6.1 (published); at 1e9, where the flow turns, they are 25 % apart
    for rayleigh in (1e4, 1e6, 1e7):
        assert laminar_plate_nusselt(rayleigh, 0.71) == pytest.approx(vertical_plate_nusselt(rayleigh, 0.71), rel=0.08)


def test_conduction_is_the_least_across_a_gap():
    assert tall_enclosure_nusselt(1e4, 0.71, 40.0) >= 1.0


def test_air_of_no_room_is_refused():
    with pytest.raises(InputOutOfRange, match="temperature_c is -150 °C; allowed: -100 to 100 °C"):
        air_density_kg_per_m3(-150.0)
    with pytest.raises(InputOutOfRange, match="temperature_c is 200 °C"):
        air_properties(200.0)


def test_colder_air_is_denser_and_conducts_less():
    cold, warm = air_properties(-20.0), air_properties(30.0)
    assert cold.density_kg_per_m3 > warm.density_kg_per_m3
    assert cold.conductivity_w_per_m_k < warm.conductivity_w_per_m_k
    assert cold.prandtl == pytest.approx(0.71, abs=0.01)
