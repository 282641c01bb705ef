"""The film of the engine: its derivatives, its limits, and that it is the law that it is made from."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.optimize import brentq

from app.errors import InputOutOfRange
from app.physics import FilmLaw, film_flow_w
from app.physics.films import horizontal_cylinder_law, still_plate_law, stirring_plate_law, vertical_plate_law
from app.physics.radiation import facing_emissivity, radiation_film_w_per_m2_k

WALL = vertical_plate_law(height_m=2.0, reference_c=-10.0)
FLOOR = still_plate_law(area_over_perimeter_m=0.5, reference_c=-10.0)


def flow(
    surface_c: float, air_c: float, law: FilmLaw = WALL, *, emissivity: float = 0.9, series_k_per_w: float = 0.0
) -> tuple[float, float, float]:
    """Flow onto 2 m² and its derivatives."""
    is_sixth = 1.0 if law.exponent > 0.15 else 0.0
    return film_flow_w(
        surface_c, air_c, 2.0, law.base, law.gain, is_sixth, law.reference_c, law.per_k, emissivity, series_k_per_w
    )


@pytest.mark.parametrize("law", [WALL, FLOOR, horizontal_cylinder_law(diameter_m=0.1, reference_c=0.0)])
@pytest.mark.parametrize(("surface_c", "air_c"), [(-20.0, -5.0), (4.0, 3.0), (30.0, -30.0)])
def test_flow_is_film_times_area_times_difference(law, surface_c, air_c):
    film = law.film_w_per_m2_k(surface_c=surface_c, air_c=air_c, emissivity=0.9)
    assert flow(surface_c, air_c, law)[0] == pytest.approx(2.0 * film * (air_c - surface_c), rel=1e-12)


@pytest.mark.parametrize("law", [WALL, FLOOR])
@pytest.mark.parametrize(("body_c", "air_c"), [(-20.0, -5.0), (4.0, 3.0), (30.0, -30.0), (-70.0, 30.0)])
@pytest.mark.parametrize(("series_k_per_w", "close"), [(0.001, 1e-7), (0.05, 1e-7), (0.3, 1e-6), (3.0, 1e-5)])
def test_film_in_series_is_taken_at_the_surface_itself(law, body_c, air_c, series_k_per_w, close):
    def surplus_w(at_c: float) -> float:
        film = law.film_w_per_m2_k(surface_c=at_c, air_c=air_c, emissivity=0.9)
        return 2.0 * film * (air_c - at_c) - (at_c - body_c) / series_k_per_w

    surface_c = brentq(surplus_w, min(body_c, air_c), max(body_c, air_c), xtol=1e-12)
    found, _, _ = flow(body_c, air_c, law, series_k_per_w=series_k_per_w)
    # four rounds of Newton; the last case has 50 times the resistance of its film, far beyond any shell
    assert found == pytest.approx((surface_c - body_c) / series_k_per_w, rel=close)


@given(
    st.floats(-80.0, 40.0), st.floats(0.01, 60.0), st.booleans(), st.sampled_from([WALL, FLOOR]),
    st.sampled_from([0.0, 0.1, 0.9]), st.sampled_from([0.0, 0.05, 0.5]),
)  # fmt: skip
def test_derivatives_are_exact(surface_c, difference_k, falls, law, emissivity, series_k_per_w):
    air_c = surface_c - difference_k if falls else surface_c + difference_k
    given_too = {"law": law, "emissivity": emissivity, "series_k_per_w": series_k_per_w}
    _, by_surface, by_air = flow(surface_c, air_c, **given_too)
    # differences of fourth order over a hundredth of the difference: 1e-8 of the slope
    step = 0.01 * difference_k

    def slope(of_surface: float, of_air: float) -> float:
        at = [
            flow(surface_c + of_surface * n * step, air_c + of_air * n * step, **given_too)[0] for n in (-2, -1, 1, 2)
        ]
        return (at[0] - 8.0 * at[1] + 8.0 * at[2] - at[3]) / (12.0 * step)

    assert by_surface == pytest.approx(slope(1.0, 0.0), rel=1e-6)
    assert by_air == pytest.approx(slope(0.0, 1.0), rel=1e-6)


@pytest.mark.parametrize("law", [WALL, FLOOR])
@pytest.mark.parametrize("emissivity", [0.0, 0.9])
def test_without_a_difference_nothing_flows_and_the_slopes_are_opposite(law, emissivity):
    found, by_surface, by_air = flow(-20.0, -20.0, law, emissivity=emissivity)
    assert found == 0.0
    assert by_surface == -by_air
    assert by_air > 0.0
    assert math.isfinite(by_air)


@given(st.floats(-85.0, 45.0), st.floats(-85.0, 45.0))
def test_heat_flows_from_warm_to_cold_and_the_film_stays_above_zero(surface_c, air_c):
    found, by_surface, by_air = flow(surface_c, air_c)
    assert found * (air_c - surface_c) >= 0.0
    if surface_c != air_c:
        assert abs(found) > 0.0
    # a warmer surface takes less, warmer air gives more
    assert by_surface < 0.0 < by_air


def test_far_from_its_reference_a_law_keeps_a_fifth_of_its_film():
    hot, _, _ = film_flow_w(900.0, 1000.0, 1.0, 2.0, 0.0, 1.0, 0.0, 0.01, 0.0, 0.0)
    assert hot == pytest.approx(0.2 * 4.0 * 100.0)


def test_plain_formula_runs_uncompiled_to_the_same_number():
    arguments = (-20.0, -5.0, 2.0, WALL.base, WALL.gain, 1.0, WALL.reference_c, WALL.per_k, 0.9, 0.1)
    assert film_flow_w.py_func(*arguments) == pytest.approx(film_flow_w(*arguments), rel=1e-14)


def test_taller_plate_has_a_weaker_film_and_more_difference_a_stronger_one():
    films = [vertical_plate_law(height_m=h, reference_c=0.0).convection_w_per_m2_k(0.0, 5.0) for h in (0.1, 0.5, 3.0)]
    assert films == sorted(films, reverse=True)
    assert WALL.convection_w_per_m2_k(0.0, 2.0) < WALL.convection_w_per_m2_k(0.0, 20.0)


def test_underside_of_a_cold_plate_stirs_more_than_its_top():
    stirring = stirring_plate_law(area_over_perimeter_m=0.5, reference_c=-10.0)
    assert stirring.convection_w_per_m2_k(-15.0, -5.0) > 2.0 * FLOOR.convection_w_per_m2_k(-15.0, -5.0)


def test_root_of_a_flat_plate_goes_with_its_size():
    assert stirring_plate_law(area_over_perimeter_m=0.1, reference_c=0.0).exponent == 1.0 / 8.0
    assert stirring_plate_law(area_over_perimeter_m=1.0, reference_c=0.0).exponent == 1.0 / 6.0


@pytest.mark.parametrize("law", [stirring_plate_law, still_plate_law])
def test_plate_too_small_for_the_relation_is_refused(law):
    with pytest.raises(InputOutOfRange, match="rayleigh is .* allowed"):
        law(area_over_perimeter_m=0.01, reference_c=0.0)


def test_sizes_that_are_none_are_refused():
    with pytest.raises(InputOutOfRange, match="height_m is 0 m"):
        vertical_plate_law(height_m=0.0, reference_c=0.0)
    with pytest.raises(InputOutOfRange, match="diameter_m is -1 m"):
        horizontal_cylinder_law(diameter_m=-1.0, reference_c=0.0)


def test_radiation_is_the_difference_of_fourth_powers():
    film = radiation_film_w_per_m2_k(surface_c=-20.0, surroundings_c=30.0, emissivity=0.9)
    whole = 0.9 * 5.670374419e-8 * (303.15**4 - 253.15**4)
    assert film * 50.0 == pytest.approx(whole, rel=1e-9)


def test_shiny_surface_rules_between_two():
    assert facing_emissivity(1.0, 0.05) == pytest.approx(0.05)
    assert facing_emissivity(0.9, 0.05) < 0.05
