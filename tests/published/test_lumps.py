"""One lump: worked examples of the handbooks (Incropera, Cengel) and closed forms.

Each test names its source; ``heat_cases.json`` holds the inputs, the exact answers and the printed figures.
"""

import math

import pytest
from scipy.optimize import brentq

from app.physics.conduction import log_mean_area_m2
from app.physics.lumped import day_swing, effective_film_w_per_m2_k, melting_time_s, warming_time_s
from app.physics.radiation import radiation_film_w_per_m2_k
from app.physics.transient import series_coefficients
from app.units import celsius_from_kelvin, hours_from_seconds, seconds_from_hours
from tests.proofs.exact import WallWithContents, day_c, power_film_c, ramp_c, two_bodies_c
from tests.published.cases import case, printed

EXACT = 1e-9
"""Relative; the same closed form evaluated twice."""

RADIATION_CONSTANT = 2e-4
"""Relative; the examples round the constant of Stefan and Boltzmann to 5.67e-8 and this moves them by less."""


def test_thermocouple_bead():
    # Source: Incropera et al., Fundamentals of Heat and Mass Transfer, 6th ed., Example 5.1 (published)
    given, expected = case("T1-INC5.1")
    diameter = 6.0 * given["h"] * given["tau_s"] / (given["rho"] * given["c"])
    area, volume = math.pi * diameter**2, math.pi * diameter**3 / 6.0
    time_s = warming_time_s(
        heat_capacity_j_per_k=given["rho"] * volume * given["c"],
        heat_leak_w_per_k=given["h"] * area,
        surroundings_c=given["Tinf"],
        start_c=given["Ti"],
        end_c=given["T"],
    )
    assert time_s == pytest.approx(expected["t_s"], rel=EXACT)
    assert time_s == pytest.approx(printed("T1-INC5.1")["t_s"], abs=0.005)


def test_thermocouple_that_is_to_show_99_percent():
    # Source: Cengel, Heat Transfer: A Practical Approach, Example 4-1 (published)
    given, expected = case("T1-CEN4.1")
    time_s = warming_time_s(
        heat_capacity_j_per_k=given["rho"] * given["cp"] * given["D"] / 6.0,
        heat_leak_w_per_k=given["h"],
        surroundings_c=1.0,
        start_c=0.0,
        end_c=1.0 - given["fraction_left"],
    )
    assert time_s == pytest.approx(expected["t_s"], rel=EXACT)
    assert round(time_s) == printed("T1-CEN4.1")["t_s"]


def test_body_whose_biot_number_makes_one_lump_a_rough_estimate():
    # Source: Cengel, Heat Transfer: A Practical Approach, Example 4-2 (from memory)
    given, expected = case("T1-CEN4.2")
    depth_m = (math.pi * given["D"] ** 2 / 4 * given["L"]) / (
        math.pi * given["D"] * given["L"] + math.pi * given["D"] ** 2 / 2
    )
    time_s = warming_time_s(
        heat_capacity_j_per_k=given["rho"] * given["cp"] * depth_m,
        heat_leak_w_per_k=given["h"],
        surroundings_c=given["Tinf"],
        start_c=given["Ti"],
        end_c=given["T"],
    )
    assert hours_from_seconds(time_s) == pytest.approx(expected["t_h"], rel=1e-9)
    assert hours_from_seconds(time_s) == pytest.approx(printed("T1-CEN4.2")["t_h"], abs=0.05)


def test_bead_between_hot_gas_and_colder_walls():
    # Source: Incropera et al., 6th ed., Example 5.2 (inputs published, printed answer from memory)
    given, expected = case("T1-INC5.2")
    gas_c, walls_c = celsius_from_kelvin(given["Tg_K"]), celsius_from_kelvin(given["Tsur_K"])

    def gain_w_per_m2(at_c: float) -> float:
        film = radiation_film_w_per_m2_k(surface_c=at_c, surroundings_c=walls_c, emissivity=given["eps"])
        return given["h"] * (gas_c - at_c) + film * (walls_c - at_c)

    steady_c = brentq(gain_w_per_m2, min(gas_c, walls_c), max(gas_c, walls_c))
    assert steady_c == pytest.approx(celsius_from_kelvin(expected["T_steady_K"]), abs=0.01)


def test_panel_that_cures_and_cools():
    # Source: Incropera et al., 6th ed., Example 5.3 (published): convection and radiation, 2 stages
    given, expected = case("T1-INC5.3")
    capacity = given["rho"] * given["c"] * given["thickness"] / 2.0

    def hours_to(start_c: float, end_c: float, room_c: float, film: float, steps: int = 4000) -> float:
        time_s = 0.0
        for i in range(steps):
            middle_c = start_c + (end_c - start_c) * (i + 0.5) / steps
            radiation = radiation_film_w_per_m2_k(surface_c=middle_c, surroundings_c=room_c, emissivity=given["eps"])
            time_s += capacity * (end_c - start_c) / steps / ((film + radiation) * (room_c - middle_c))
        return time_s

    cold_c, oven_c = celsius_from_kelvin(given["T0_K"]), celsius_from_kelvin(given["T_oven_K"])
    cure_s = hours_to(cold_c, celsius_from_kelvin(given["T_cure_K"]), oven_c, given["h_oven"])
    assert cure_s == pytest.approx(expected["t_cure_s"], rel=RADIATION_CONSTANT)
    assert round(cure_s) == printed("T1-INC5.3")["t_cure_s"]
    end_c = celsius_from_kelvin(given["Tend_K"])
    cool_s = hours_to(expected["T_end_oven_C"], end_c, cold_c, given["h_cool"])
    assert cure_s + given["hold_s"] + cool_s == pytest.approx(expected["t_total_s"], rel=RADIATION_CONSTANT)


@pytest.mark.parametrize(("shape", "key"), [("slab", "slab"), ("cylinder", "cyl"), ("sphere", "sph")])
def test_film_that_stands_for_a_body_with_an_inside(shape, key):
    # Source: parabolic profile; similar corrections in Ostrogorsky (2009), J. Heat Transfer 131:011303 (computed)
    given, expected = case("T2-EFFCAP")
    surface_per_volume = {"slab": 1.0, "cylinder": 2.0, "sphere": 3.0}[shape]
    for biot, rate in zip(given["Bi"], expected[f"{key}_corrected"], strict=True):
        film = effective_film_w_per_m2_k(film_w_per_m2_k=biot, length_m=1.0, conductivity_w_per_m_k=1.0, shape=shape)
        assert surface_per_volume * film == pytest.approx(rate, rel=EXACT)
        exact = series_coefficients(shape=shape, biot=biot, terms=1)[0][0] ** 2
        # the correction is exact to first order in the Biot number: at 1 it is 1.3 to 1.5 % off, at 2 about 4 %
        assert surface_per_volume * film == pytest.approx(exact, rel=0.022 * biot)


def test_water_warms_melts_and_warms():
    # Source: closed form (computed)
    given, expected = case("T10-PLATEAU")
    around = {"heat_leak_w_per_k": given["UA"], "surroundings_c": given["Ta"]}
    ice_s = warming_time_s(
        heat_capacity_j_per_k=given["m"] * given["c_ice"], start_c=given["T0"], end_c=given["Tm"], **around
    )
    melt_s = melting_time_s(melting_j=given["m"] * given["L"], melting_c=given["Tm"], **around)
    water_s = warming_time_s(
        heat_capacity_j_per_k=given["m"] * given["c_water"], start_c=given["Tm"], end_c=given["T_end"], **around
    )
    assert ice_s == pytest.approx(expected["t_warm_s"], rel=EXACT)
    assert melt_s == pytest.approx(expected["t_melt_s"], rel=EXACT)
    assert water_s == pytest.approx(expected["t_heat_s"], rel=EXACT)
    assert ice_s + melt_s + water_s == pytest.approx(expected["t_total_s"], rel=EXACT)


def test_day_swing_of_a_lump():
    # Source: closed form (computed)
    given, expected = case("T10-SINUS")
    tau_s, period_s = seconds_from_hours(given["tau_h"]), seconds_from_hours(given["period_h"])
    swing_k, lag_s = day_swing(time_constant_s=tau_s, swing_k=given["A"], period_s=period_s)
    assert swing_k == pytest.approx(expected["amplitude_K"], rel=EXACT)
    assert hours_from_seconds(lag_s) == pytest.approx(expected["lag_h"], rel=EXACT)
    for hours in (12, 24, 48):
        at_c = day_c(
            seconds_from_hours(hours),
            time_constant_s=tau_s,
            start_c=given["T0"],
            mean_c=given["Tm"],
            swing_k=given["A"],
            period_s=period_s,
        )
        assert at_c == pytest.approx(expected[f"T_{hours}h"], rel=EXACT)


def test_ramp_of_the_room_on_a_lump():
    # Source: closed form (computed)
    _, expected = case("T10-RAMP")
    for hours in (10, 24):
        at_c = ramp_c(
            hours, time_constant_s=20.0, start_c=-18.0, room_c=20.0, room_k_per_s=0.5
        )  # in hours throughout: only ratios of times count
        assert at_c == pytest.approx(expected[f"T_{hours}h"], rel=EXACT)


def test_film_that_goes_with_the_fourth_root():
    # Source: Bejan & Kraus (eds), Heat Transfer Handbook, eq. 3.286 (published); case computed
    given, expected = case("T10-NATCONV")
    for hours in (4, 12):
        at_c = power_film_c(
            seconds_from_hours(hours),
            start_c=given["T0"],
            room_c=given["Ta"],
            first_rate_per_s=given["h_i"] * given["A"] / given["C"],
            power=given["n"],
        )
        assert at_c == pytest.approx(expected[f"T_{hours}h"], rel=EXACT)


def test_air_and_a_product():
    # Source: exponential of a matrix (computed)
    given, expected = case("T10-TWONODE")
    for hours in (1, 12):
        air_c, product_c = two_bodies_c(
            seconds_from_hours(hours),
            air_j_per_k=given["C_air"],
            product_j_per_k=given["C_prod"],
            wall_w_per_k=given["G_amb_air"],
            film_w_per_k=given["G_air_prod"],
            start_c=given["T0"],
            room_c=given["Ta"],
        )
        assert air_c == pytest.approx(expected[f"T_air_{hours}h"], rel=EXACT)
        assert product_c == pytest.approx(expected[f"T_prod_{hours}h"], rel=EXACT)


@pytest.mark.parametrize("name", ["T10-WALLCONTENT-a", "T10-WALLCONTENT-c"])
def test_contents_behind_a_wall(name):
    # Source: series of the wall with a lumped content (computed)
    given, expected = case(name)
    wall = WallWithContents(
        given["k"],
        given["rho"],
        given["c"],
        given["L"],
        given["h_o"],
        given["C_content_per_m2"],
        given["T0_content"],
        given["Ta"],
    )
    assert wall.biot == pytest.approx(expected["Bi"], rel=EXACT)
    assert wall.roots(1)[0] == pytest.approx(expected["mu1"], rel=EXACT)
    assert hours_from_seconds(wall.slowest_s()) == pytest.approx(expected["tau1_h"], rel=EXACT)
    contents_c = wall.contents_c()
    for hours in (1, 6, 12, 24, 48):
        at_c = contents_c(seconds_from_hours(hours))
        assert at_c == pytest.approx(expected[f"T_{hours}h"], rel=1e-8)  # as far as 30 terms go


def test_wall_counts_as_a_third_of_its_capacity():
    # Source: Rayleigh quotient with the steady profile (computed); a lower bound of the exact time constant
    _, expected = case("T10-CEFF")
    for name, bound_h, exact_h in zip(
        ("T10-WALLCONTENT-a", "T10-WALLCONTENT-c"), expected["tau_rayleigh_h"], expected["tau_exact_h"], strict=True
    ):
        given, _ = case(name)
        inverse = given["k"] / (given["h_o"] * given["L"])
        share = ((1 + inverse) ** 3 - inverse**3) / (3 * (1 + inverse) ** 2)
        capacity = given["C_content_per_m2"] + given["rho"] * given["c"] * given["L"] * share
        tau_h = hours_from_seconds(capacity * (given["L"] / given["k"] + 1 / given["h_o"]))
        assert tau_h == pytest.approx(bound_h, rel=EXACT)
        assert exact_h * 0.99 < tau_h < exact_h


def test_round_wall_conducts_through_its_mean_area():
    # Source: Incropera et al., 6th ed., sec. 3.3: ln(r2/r1) / (2 pi L k) = thickness / (k A) (published)
    inner, outer = 2 * math.pi * 0.3, 2 * math.pi * 0.4
    area = log_mean_area_m2(inside_m2=inner, outside_m2=outer)
    assert 0.1 / area == pytest.approx(math.log(0.4 / 0.3) / (2 * math.pi), rel=EXACT)
