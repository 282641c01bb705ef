"""One lump, exact series and mean kinetic temperature: limits, directions and refusals."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.errors import InputOutOfRange, UnknownKey
from app.physics.kinetic import mean_kinetic_c
from app.physics.lumped import day_swing, effective_film_w_per_m2_k, melting_time_s, warming_time_s
from app.physics.transient import body_share, half_space_flux_rise_k, half_space_step_share, series_coefficients


def warming(**changes: float) -> float:
    numbers = {
        "heat_capacity_j_per_k": 1e6, "heat_leak_w_per_k": 10.0, "surroundings_c": 25.0, "start_c": -20.0, "end_c": 0.0,
    }  # fmt: skip
    return warming_time_s(**(numbers | changes))


def test_63_percent_take_one_time_constant():
    assert warming(end_c=25.0 - 45.0 / math.e) == pytest.approx(1e5)
    assert warming(end_c=-20.0) == 0.0


def test_more_capacity_and_less_leak_take_longer():
    assert warming(heat_capacity_j_per_k=2e6) == pytest.approx(2.0 * warming())
    assert warming(heat_leak_w_per_k=20.0) == pytest.approx(0.5 * warming())
    assert warming(surroundings_c=35.0) < warming()


def test_lump_cools_too():
    assert warming(start_c=20.0, surroundings_c=-20.0, end_c=0.0) == pytest.approx(1e5 * math.log(2.0))


@pytest.mark.parametrize("changes", [{"end_c": 25.0}, {"end_c": 30.0}, {"end_c": -21.0}, {"surroundings_c": -20.0}])
def test_temperature_that_is_never_reached_is_refused(changes):
    with pytest.raises(InputOutOfRange, match="end_c is"):
        warming(**changes)


def test_nothing_melts_in_surroundings_as_cold():
    with pytest.raises(InputOutOfRange, match="surroundings_c is 0"):
        melting_time_s(melting_j=1e6, heat_leak_w_per_k=5.0, surroundings_c=0.0, melting_c=0.0)


def test_slow_lump_feels_little_of_the_day_a_quarter_late():
    swing, lag_s = day_swing(time_constant_s=1e8, swing_k=8.0, period_s=86400.0)
    assert swing < 0.01
    assert lag_s == pytest.approx(86400.0 / 4.0, rel=1e-3)
    assert day_swing(time_constant_s=1.0, swing_k=8.0, period_s=86400.0)[0] == pytest.approx(8.0, rel=1e-6)


def test_good_conductor_has_its_film_alone():
    for shape in ("slab", "cylinder", "sphere"):
        film = effective_film_w_per_m2_k(film_w_per_m2_k=8.0, length_m=0.1, conductivity_w_per_m_k=1e6, shape=shape)
        assert film == pytest.approx(8.0, rel=1e-6)


def test_shapes_that_are_none_are_refused():
    with pytest.raises(UnknownKey, match="no shape called 'cone'.*slab"):
        effective_film_w_per_m2_k(film_w_per_m2_k=8.0, length_m=0.1, conductivity_w_per_m_k=1.0, shape="cone")
    with pytest.raises(UnknownKey, match="no shape called 'cone'.*slab"):
        series_coefficients(shape="cone", biot=1.0, terms=3)
    with pytest.raises(InputOutOfRange, match="biot is 0"):
        body_share(shape="slab", biot=0.0, fourier=0.1, position=0.0)


@pytest.mark.parametrize("shape", ["slab", "cylinder", "sphere"])
def test_roots_of_the_series_rise_by_about_pi(shape):
    roots, _ = series_coefficients(shape=shape, biot=3.0, terms=30)
    steps = roots[1:] - roots[:-1]
    assert all(2.0 < step < 4.0 for step in steps)
    assert steps[-1] == pytest.approx(math.pi, rel=2e-3)


@pytest.mark.parametrize(("shape", "sides"), [("slab", 1.0), ("cylinder", 2.0), ("sphere", 3.0)])
def test_small_biot_number_is_one_lump(shape, sides):
    _, mean = body_share(shape=shape, biot=1e-3, fourier=400.0, position=0.0)
    assert mean == pytest.approx(math.exp(-sides * 1e-3 * 400.0), rel=1e-3)


def test_flux_into_a_half_space_is_what_it_stores():
    # integral of the rise over the depth, times density and specific heat, is flux times time
    depths = [0.002 * (i + 0.5) for i in range(1000)]
    rises = [
        half_space_flux_rise_k(
            flux_w_per_m2=10.0, conductivity_w_per_m_k=1.0, diffusivity_m2_per_s=1e-6, depth_m=x, time_s=20000.0
        )
        for x in depths
    ]
    assert sum(rises) * 0.002 * 1.0 / 1e-6 == pytest.approx(10.0 * 20000.0, rel=1e-4)


def test_step_at_the_face_has_not_reached_the_depth():
    assert half_space_step_share(depth_m=1.0, diffusivity_m2_per_s=1e-6, time_s=3600.0) == pytest.approx(1.0)


@given(st.lists(st.tuples(st.floats(-20.0, 40.0), st.floats(0.01, 100.0)), min_size=1, max_size=8))
def test_mean_kinetic_temperature_lies_between_mean_and_peak(stretches):
    temperatures, durations = zip(*stretches, strict=True)
    found = mean_kinetic_c(temperatures, durations)
    plain = sum(t * d for t, d in stretches) / sum(durations)
    assert plain - 1e-9 <= found <= max(temperatures) + 1e-9


def test_more_activation_energy_counts_peaks_more():
    low, high = (mean_kinetic_c([5.0, 25.0], [1.0, 1.0], energy) for energy in (50.0, 120.0))
    assert low < high
