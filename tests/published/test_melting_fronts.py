"""Fronts of freezing and melting: exact solutions of Stefan and Neumann, on which engine tests build."""

import pytest

from tests.proofs.exact import Neumann, stefan_root
from tests.published.cases import case, cases_of


def test_roots_of_the_one_phase_solution():
    # Source: exact solution of Stefan, Carslaw & Jaeger, Conduction of Heat in Solids, ch. XI (computed)
    given, expected = case("T4-STEFAN")
    found = [stefan_root(stefan) for stefan in given["Ste"]]
    assert found == pytest.approx(expected["lambda_"], rel=1e-9)


@pytest.mark.parametrize("name", cases_of("T4-NEU"))
def test_front_of_the_two_phase_solution(name):
    # Source: exact solution of Neumann, Carslaw & Jaeger, ch. XI, with 40 digits (computed)
    given, expected = case(name)
    solid, liquid = (given["k_s"], given["c_s"]), (given["k_l"], given["c_l"])
    growing, shrinking = (solid, liquid) if given["mode"] == "freeze" else (liquid, solid)
    solution = Neumann(
        given["T_wall"], given["T_initial"], given["T_m"], given["L_f"], given["rho_both"], *growing, *shrinking
    )
    assert solution.root == pytest.approx(expected["lambda"], rel=1e-8)
    assert solution.front_m(given["t_s"]) == pytest.approx(expected["X_24h_m"], rel=1e-8)
    # the two phases meet at the melting point, and start from wall and first temperature
    front = solution.front_m(given["t_s"])
    assert solution.temperature_c(front * (1 - 1e-9), given["t_s"]) == pytest.approx(given["T_m"], abs=1e-6)
    assert solution.temperature_c(front * (1 + 1e-9), given["t_s"]) == pytest.approx(given["T_m"], abs=1e-6)
    assert solution.temperature_c(0.0, given["t_s"]) == pytest.approx(given["T_wall"])
    assert solution.temperature_c(20.0, given["t_s"]) == pytest.approx(given["T_initial"], abs=1e-6)
