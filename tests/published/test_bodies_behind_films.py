"""Slab, cylinder and sphere behind a film: tables and worked examples of the handbooks, cells against the series.

Each test names its source; printed figures that come from charts or linear interpolation are shown as they are.
"""

import math

import numpy as np
import pytest
from scipy.linalg import eigh

from app.physics.lumped import warming_time_s
from app.physics.transient import body_share, series_coefficients
from app.units import seconds_from_hours
from tests.published.cases import case, printed


def test_roots_and_weights_of_the_first_term():
    # Source: eigenvalue equations of Incropera et al., 6th ed., sec. 5.5-5.6 (computed); Table 5.1 agrees to 4 digits
    _, expected = case("T2-COEF")
    for biot, *columns in expected["rows"]:
        for index, shape in enumerate(("slab", "cylinder", "sphere")):
            roots, weights = series_coefficients(shape=shape, biot=biot, terms=1)
            found = [float(roots[0]), float(weights[0])]
            assert found == pytest.approx(columns[2 * index : 2 * index + 2], rel=1e-8)


@pytest.mark.parametrize("shape", ["slab", "cylinder", "sphere"])
@pytest.mark.parametrize("biot", [0.05, 1.0, 40.0])
def test_series_begins_at_the_start_temperature(shape, biot):
    middle, mean = body_share(shape=shape, biot=biot, fourier=1e-3, position=0.0, terms=60)
    assert middle == pytest.approx(1.0, abs=1e-6)
    # what has left through the film is at most the film's heat at full difference
    sides = {"slab": 1.0, "cylinder": 2.0, "sphere": 3.0}[shape]
    assert 1.0 - sides * biot * 1e-3 < mean < 1.0


@pytest.mark.parametrize("shape", ["slab", "cylinder", "sphere"])
def test_mean_falls_as_the_film_takes_heat_away(shape):
    sides = {"slab": 1.0, "cylinder": 2.0, "sphere": 3.0}[shape]
    biot, at, step = 2.0, 0.15, 1e-5
    surface, _ = body_share(shape=shape, biot=biot, fourier=at, position=1.0)
    before = body_share(shape=shape, biot=biot, fourier=at - step, position=1.0)[1]
    after = body_share(shape=shape, biot=biot, fourier=at + step, position=1.0)[1]
    # central difference: third derivative times step²
    assert (before - after) / (2.0 * step) == pytest.approx(sides * biot * surface, rel=1e-6)


def test_pipeline_wall():
    # Source: Incropera et al., 6th ed., Example 5.4 (published)
    given, expected = case("T2-INC5.4")
    biot = given["h"] * given["L"] / given["k"]
    fourier = given["alpha"] * given["t"] / given["L"] ** 2
    difference = given["Ti"] - given["Tinf"]
    roots, weights = series_coefficients(shape="slab", biot=biot, terms=1)
    assert roots[0] == pytest.approx(expected["zeta1"], rel=1e-8)
    assert weights[0] == pytest.approx(expected["C1"], rel=1e-8)
    middle, _ = body_share(shape="slab", biot=biot, fourier=fourier, position=0.0)
    surface, _ = body_share(shape="slab", biot=biot, fourier=fourier, position=1.0)
    assert given["Tinf"] + difference * middle == pytest.approx(expected["T_x0_C"], rel=1e-6)
    assert given["Tinf"] + difference * surface == pytest.approx(expected["T_xL_C"], rel=1e-6)
    flux = given["h"] * difference * surface
    assert flux == pytest.approx(expected["q_W_m2"], rel=1e-6)
    # the printed working takes the root from the table by linear interpolation: 0.1 K and 0.6 % off the exact one
    assert given["Tinf"] + difference * middle == pytest.approx(printed("T2-INC5.4")["T_x0_C"], abs=0.11)
    assert flux == pytest.approx(printed("T2-INC5.4")["q_W_m2"], rel=0.0065)


def _fourier_until(shape: str, biot: float, share: float) -> float:
    """Fourier number at which the middle has so much of its difference left, with the first term alone."""
    roots, weights = series_coefficients(shape=shape, biot=biot, terms=1)
    return float(math.log(weights[0] / share) / roots[0] ** 2)


def test_sphere_quenched_in_air_and_water():
    # Source: Incropera et al., 6th ed., Example 5.5 (published)
    given, expected = case("T2-INC5.5")
    air_s = warming_time_s(
        heat_capacity_j_per_k=given["rho"] * given["c"] * given["r0"] / 3.0,
        heat_leak_w_per_k=given["ha"],
        surroundings_c=given["Tinf"],
        start_c=given["Ti1"],
        end_c=given["T1"],
    )
    assert air_s == pytest.approx(expected["t_air_s"], rel=1e-6)
    biot = given["hw"] * given["r0"] / given["k"]
    share = (given["T_centre"] - given["Tinf"]) / (given["T1"] - given["Tinf"])
    water_s = _fourier_until("sphere", biot, share) * given["r0"] ** 2 / given["alpha"]
    assert water_s == pytest.approx(expected["t_water_s"], rel=1e-6)
    assert air_s == pytest.approx(printed("T2-INC5.5")["t_air_s"], abs=0.15)
    # printed 3.08 s: root read off the table by linear interpolation, 3.4 % above the exact 2.979 s
    assert printed("T2-INC5.5")["t_water_s"] / water_s == pytest.approx(1.034, abs=0.001)


def test_egg_in_boiling_water():
    # Source: Cengel, Heat Transfer, Example 4-3 (from memory)
    given, expected = case("T2-CEN4.3")
    radius = given["D"] / 2.0
    biot = given["h"] * radius / given["k"]
    share = (given["T_centre"] - given["Tinf"]) / (given["Ti"] - given["Tinf"])
    fourier = _fourier_until("sphere", biot, share)
    assert fourier == pytest.approx(expected["Fo"], rel=1e-6)
    time_s = fourier * radius**2 / given["alpha"]
    assert time_s == pytest.approx(expected["t_s"], rel=1e-6)
    assert time_s == pytest.approx(printed("T2-CEN4.3")["t_s"], rel=0.003)  # the book rounds root and weight


def test_brass_plate_in_an_oven():
    # Source: Cengel, Heat Transfer, Example 4-4 (published); printed 282 °C is a chart reading
    given, expected = case("T2-CEN4.4")
    biot = given["h"] * given["L_half"] / given["k"]
    fourier = given["alpha"] * given["t"] / given["L_half"] ** 2
    difference = given["Ti"] - given["Tinf"]
    surface, _ = body_share(shape="slab", biot=biot, fourier=fourier, position=1.0)
    middle, _ = body_share(shape="slab", biot=biot, fourier=fourier, position=0.0)
    assert given["Tinf"] + difference * surface == pytest.approx(expected["Ts_C"], rel=1e-6)
    assert given["Tinf"] + difference * middle == pytest.approx(expected["Tc_C"], rel=1e-6)
    assert printed("T2-CEN4.4")["Ts_C"] - expected["Ts_C"] == pytest.approx(2.4, abs=0.05)


def test_can_of_pea_puree():
    # Source: Geankoplis, Transport Processes and Separation Process Principles, 4th ed., Example 5.3-3 (published)
    given, expected = case("T2-GEA5.3.3")
    radius = given["D"] / 2.0
    share, _ = body_share(
        shape="cylinder",
        biot=given["h"] * radius / given["k"],
        fourier=given["alpha"] * given["t"] / radius**2,
        position=0.0,
    )
    assert share == pytest.approx(expected["Y"], rel=1e-6)
    assert given["Tinf"] + (given["Ti"] - given["Tinf"]) * share == pytest.approx(expected["T_centre_C"], rel=1e-6)
    # printed 0.13 is read off a chart: 1.7 K off
    assert printed("T2-GEA5.3.3")["Y"] - share == pytest.approx(0.0195, abs=0.0005)


def test_decay_rate_of_equal_cells():
    # Source: rate of N equal cells behind a film and half a cell, against the exact root (computed)
    given, expected = case("T2-FVN")
    for column, biot in enumerate(given["Bi"]):
        exact = series_coefficients(shape="slab", biot=biot, terms=1)[0][0] ** 2
        for cells in (1, 2, 3, 5, 10):
            width = 1.0 / cells
            inner = np.full(cells - 1, 1.0 / width)
            outer = np.zeros(cells)
            outer[0] = 1.0 / (1.0 / biot + width / 2.0)
            matrix = np.diag(outer + np.append(inner, 0.0) + np.append(0.0, inner))
            matrix -= np.diag(inner, 1) + np.diag(inner, -1)
            slowest = float(eigh(matrix, width * np.eye(cells), eigvals_only=True)[0])
            percent = 100.0 * (slowest / exact - 1.0)
            assert percent == pytest.approx(expected[f"err_pct_N{cells}"][column], abs=0.002)


def test_pallet_behind_a_wall():
    # Source: series of a slab with 40 terms (computed)
    given, expected = case("T10-PALLET-a")
    biot = given["h"] * given["half_thickness"] / given["k"]
    assert biot == pytest.approx(expected["Bi"], rel=1e-9)
    difference = given["T0"] - given["Ta"]
    for hours in (6, 24, 72):
        fourier = given["k"] / given["rho_c"] * seconds_from_hours(hours) / given["half_thickness"] ** 2
        surface, mean = body_share(shape="slab", biot=biot, fourier=fourier, position=1.0)
        middle, _ = body_share(shape="slab", biot=biot, fourier=fourier, position=0.0)
        found = [given["Ta"] + difference * share for share in (middle, surface, mean)]
        wanted = [expected[f"{point}_{hours}h"] for point in ("Tc", "Ts", "Tm")]
        assert found == pytest.approx(wanted, rel=1e-8)


def test_first_term_alone_is_within_two_percent_above_a_fourier_number_of_a_fifth():
    # Source: Incropera et al., 6th ed., sec. 5.5.2 (published)
    for shape in ("slab", "cylinder", "sphere"):
        for biot in (0.1, 1.0, 10.0, 100.0):
            roots, weights = series_coefficients(shape=shape, biot=biot, terms=1)
            first = weights[0] * math.exp(-(roots[0] ** 2) * 0.2)
            all_terms, _ = body_share(shape=shape, biot=biot, fourier=0.2, position=0.0)
            assert first == pytest.approx(all_terms, rel=0.02)


def test_deep_inside_a_thick_slab_the_half_space_holds():
    # at a Fourier number of 0.02 the middle of the slab has not noticed the film
    from app.physics.transient import half_space_film_share

    position = 0.9
    share, _ = body_share(shape="slab", biot=3.0, fourier=0.02, position=position, terms=60)
    come = half_space_film_share(
        film_w_per_m2_k=3.0, conductivity_w_per_m_k=1.0, diffusivity_m2_per_s=1.0, depth_m=1.0 - position, time_s=0.02
    )
    assert 1.0 - share == pytest.approx(come, abs=1e-6)
