"""Ground and thick bodies as half-spaces: worked examples (Incropera, Cengel, Geankoplis), ISO depths of swings."""

import math

import pytest
from scipy.optimize import brentq

from app.physics.conduction import penetration_depth_m
from app.physics.transient import (
    half_space_depth_m,
    half_space_film_share,
    half_space_flux_rise_k,
    half_space_step_share,
)
from app.units import seconds_from_hours
from tests.published.cases import case, printed


@pytest.mark.parametrize("name", ["T3-INC5.6", "T3-CEN4.6", "T3-CENsnow"])
def test_depth_that_frost_reaches(name):
    # Source: Incropera et al., 6th ed., Example 5.6; Cengel, Heat Transfer, Example 4-6 and the snow-cover problem
    # (inputs published; printed answer of 5.6 from memory, of the problem computed)
    given, expected = case(name)
    diffusivity = given.get("alpha") or given["k"] / (given["rho"] * given["c"])
    share = (given["T"] - given["Ts"]) / (given["Ti"] - given["Ts"])
    depth = half_space_depth_m(share=share, diffusivity_m2_per_s=diffusivity, time_s=given["t_s"])
    assert depth == pytest.approx(expected["x_m"], rel=1e-7)
    left = half_space_step_share(depth_m=depth, diffusivity_m2_per_s=diffusivity, time_s=given["t_s"])
    assert left == pytest.approx(share, rel=1e-12)


def test_printed_depths_of_frost():
    # printed 0.68 m (from memory); printed 0.78 m is a chart reading of 0.80 m (published)
    assert case("T3-INC5.6")[1]["x_m"] == pytest.approx(printed("T3-INC5.6")["x_m"], abs=0.005)
    assert printed("T3-CEN4.6")["x_m"] / case("T3-CEN4.6")[1]["x_m"] == pytest.approx(0.974, abs=0.001)


def test_ground_that_freezes_under_cold_air():
    # Source: Geankoplis, 4th ed., Example 5.3-1 (from memory); printed -5.44 °C and 0.0293 m are chart readings
    given, expected = case("T3-GEA5.3.1")

    def at_c(depth_m: float) -> float:
        share = half_space_film_share(
            film_w_per_m2_k=given["h"],
            conductivity_w_per_m_k=given["k"],
            diffusivity_m2_per_s=given["alpha"],
            depth_m=depth_m,
            time_s=given["t_s"],
        )
        return given["Ti"] + (given["Tinf"] - given["Ti"]) * share

    assert at_c(0.0) == pytest.approx(expected["T_surface_C"], rel=1e-6)
    assert brentq(at_c, 0.0, 0.1) == pytest.approx(expected["x_0C_m"], rel=1e-6)
    assert printed("T3-GEA5.3.1")["T_surface_C"] == pytest.approx(at_c(0.0), abs=0.3)


def test_copper_slab_under_constant_flux():
    # Source: Incropera et al., 6th ed., Example 5.10 (published)
    given, expected = case("T3-INC5.10")
    for depth, key in ((0.0, "T0_C"), (given["x"], "Tx_C")):
        rise = half_space_flux_rise_k(
            flux_w_per_m2=given["q"],
            conductivity_w_per_m_k=given["k"],
            diffusivity_m2_per_s=given["alpha"],
            depth_m=depth,
            time_s=given["t"],
        )
        assert given["Ti"] + rise == pytest.approx(expected[key], rel=1e-7)
    assert expected["Tx_C"] == pytest.approx(printed("T3-INC5.10")["Tx_C"], abs=0.05)


@pytest.mark.parametrize("name", ["T3-DELTA-clay", "T3-DELTA-sand"])
def test_depth_that_the_year_reaches(name):
    # Source: ISO 13370:2007, Annex H (from memory)
    given, expected = case(name)
    depth = penetration_depth_m(diffusivity_m2_per_s=given["lambda"] / given["rho_c"], period_s=given["period_s"])
    assert depth == pytest.approx(expected["delta_m"], rel=1e-9)
    assert round(depth, 1) == printed(name)["delta_m"]


def test_depth_that_the_day_reaches_in_concrete():
    # Source: definition in ISO 13786 (computed)
    given, expected = case("T3-DELTA-concrete24h")
    diffusivity = given["lambda"] / (given["rho"] * given["c"])
    depth = penetration_depth_m(diffusivity_m2_per_s=diffusivity, period_s=given["period_s"])
    assert depth == pytest.approx(expected["delta_m"], rel=1e-9)


def test_wave_of_the_year_in_the_soil():
    # Source: exact solution of the half-space with a periodic face (computed)
    given, expected = case("T3-SOILWAVE")
    period_s = seconds_from_hours(24.0) * given["period_d"]
    depth = penetration_depth_m(diffusivity_m2_per_s=given["alpha"], period_s=period_s)
    assert depth == pytest.approx(expected["delta_m"], rel=1e-9)
    assert math.exp(-1.0 / depth) == pytest.approx(expected["ratio_1m"], rel=1e-9)


def test_strong_film_is_a_step():
    # limit: a film without resistance is a step at the face; erfcx keeps it from overflowing
    share = half_space_film_share(
        film_w_per_m2_k=1e7, conductivity_w_per_m_k=1.0, diffusivity_m2_per_s=1e-6, depth_m=0.05, time_s=5000.0
    )
    step = half_space_step_share(depth_m=0.05, diffusivity_m2_per_s=1e-6, time_s=5000.0)
    assert share == pytest.approx(1.0 - step, abs=1e-5)
