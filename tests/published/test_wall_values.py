"""Walls: worked build-ups, ISO 6946 and ISO 13786."""

import pytest

from app.physics.walls import (
    SolidLayer,
    combined_resistance_m2_k_per_w,
    dynamic_wall,
    still_air_layer_m2_k_per_w,
    surface_resistance_m2_k_per_w,
    transmittance_w_per_m2_k,
)
from tests.published.cases import case, printed

SURFACES = {"inside_m2_k_per_w": 0.13, "outside_m2_k_per_w": 0.04}


@pytest.mark.parametrize("name", ["T5-U1", "T5-U2"])
def test_worked_build_ups(name):
    # Source: Spanish building code (CTE), worked wall build-ups, method of ISO 6946 (published)
    given, expected = case(name)
    u = transmittance_w_per_m2_k([d / k for d, k in given["layers_d_lambda"]], **SURFACES)
    assert u == pytest.approx(expected["U"], rel=1e-7)
    assert round(u, 2) == printed(name)["U"]


def test_sandwich_panels():
    # Source: ISO 6946 (computed)
    given, expected = case("T5-PANEL")
    found = [transmittance_w_per_m2_k([d / k], **SURFACES) for d, k in given["d_lambda"]]
    assert found == pytest.approx(expected["U"], rel=1e-9)


def test_composite_brick_wall():
    # Source: Cengel, Heat Transfer, Example 3-6 (inputs published, printed answer from memory)
    given, expected = case("T5-CEN3.6")
    area = given["unit_area"]
    foam, plaster = given["foam"][0] / given["foam"][1], given["plaster"][0] / given["plaster"][1]
    depth, brick, brick_m = given["brick"]
    _, mortar, mortar_m, _ = given["mortar"]
    # bricks and mortar side by side, the rest plane: what the standard calls the lower limit
    beside = area / (brick_m * brick / depth + 2.0 * mortar_m * mortar / depth)
    resistance = (1.0 / given["h1"] + foam + 2.0 * plaster + 1.0 / given["h2"] + beside) / area
    assert beside == pytest.approx(0.25 / (0.22 * 0.72 / 0.16 + 0.03 * 0.22 / 0.16))
    assert resistance == pytest.approx(expected["R_total_K_W"], rel=1e-7)
    flow = (given["T1"] - given["T2"]) / resistance
    assert flow * given["wall_area"] / area == pytest.approx(expected["Q_wall_W"], rel=1e-7)
    # usual slip: conductances side by side added as if they were resistances; 262 W is right
    assert round(flow * given["wall_area"] / area) == printed("T5-CEN3.6")["Q_wall_W"]


def test_combined_method_on_the_brick_wall():
    # Source: ISO 6946 combined method, applied to Cengel's Example 3-6 (computed)
    given, expected = case("T5-ISO6946-A")
    resistance = combined_resistance_m2_k_per_w(
        given["fractions"],
        [[given["brick_R"], given["mortar_R"]], [given["common_R"] - 0.14, given["common_R"] - 0.14]],
        inside_m2_k_per_w=0.10,
        outside_m2_k_per_w=0.04,
    )
    assert resistance == pytest.approx(expected["R_T"], rel=1e-8)
    assert 1.0 / resistance == pytest.approx(expected["U"], rel=1e-8)


def test_combined_method_on_a_panel_with_studs():
    # Source: ISO 6946 combined method; build-up in the case's source (computed)
    _, expected = case("T5-ISO6946-B")
    plywood, wool, timber = 0.012 / 0.13, 0.14 / 0.035, 0.14 / 0.13
    layers = [[plywood, plywood], [wool, timber], [plywood, plywood]]
    resistance = combined_resistance_m2_k_per_w([0.85, 0.15], layers, **SURFACES)
    assert resistance == pytest.approx(expected["R_T"], rel=1e-8)


STEEL = SolidLayer(0.0006, 50.0, 7800.0, 450.0)
WALLS = {
    "T5-ISO13786-a": [STEEL, SolidLayer(0.1, 0.022, 40.0, 1400.0), STEEL],
    "T5-ISO13786-b": [SolidLayer(0.2, 1.8, 2400.0, 1000.0)],
    "T5-ISO13786-c": [SolidLayer(0.1, 0.022, 40.0, 1400.0), SolidLayer(0.22, 0.7, 1700.0, 1000.0)],
}


@pytest.mark.parametrize("name", WALLS)
def test_response_of_walls_to_the_day(name):
    # Source: matrix method of ISO 13786 with 40 digits (computed)
    given, expected = case(name)
    wall = dynamic_wall(
        WALLS[name],
        inside_m2_k_per_w=given["Rsi"],
        outside_m2_k_per_w=given["Rse"],
        period_s=given["period_s"],
    )
    assert wall.u_w_per_m2_k == pytest.approx(expected["U"], rel=1e-7)
    assert wall.periodic_w_per_m2_k == pytest.approx(expected["Y12"], rel=1e-7)
    assert wall.decrement == pytest.approx(expected["f"], rel=1e-7)
    assert wall.lag_h == pytest.approx(expected["lag_h"], rel=1e-7)
    assert wall.inside_capacity_j_per_m2_k == pytest.approx(1000.0 * expected["kappa1_kJ"], rel=1e-7)


def test_surface_resistances():
    # Source: ISO 6946:2017 (0.13 and 0.04 published, the others from memory)
    found = [surface_resistance_m2_k_per_w(direction) for direction in ("up", "sideways", "down", "outside")]
    assert found == [0.10, 0.13, 0.17, 0.04]


@pytest.mark.parametrize(
    ("thickness_mm", "up", "sideways", "down"),
    [(5, 0.11, 0.11, 0.11), (10, 0.15, 0.15, 0.15), (25, 0.16, 0.18, 0.19), (50, 0.16, 0.18, 0.21),
     (100, 0.16, 0.18, 0.22), (300, 0.16, 0.18, 0.23)],
)  # fmt: skip
def test_air_layers(thickness_mm, up, sideways, down):
    # Source: ISO 6946:2017, unventilated air layers of high emissivity (from memory)
    found = [still_air_layer_m2_k_per_w(thickness_mm / 1000.0, way) for way in ("up", "sideways", "down")]
    assert found == pytest.approx([up, sideways, down])
