"""When limits are passed: crossings, dwells, excursions inside a step, mean kinetic temperature."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.engine import MeanKinetic, Trace, passed_above, passed_below
from tests.engine.building import HOUR_S


def trace_of(function, step_s: float, steps: int) -> Trace:
    """A trace as a run leaves it, of a known function of time."""
    times = np.concatenate([[0.0], (np.arange(4 * steps) + 1) * step_s / 4.0])
    return Trace(times, np.array([function(t) for t in times]))


def test_crossing_of_an_exponential_is_found_within_a_second():
    trace = trace_of(lambda t: 25.0 - 45.0 * math.exp(-t / 90000.0), 7200.0, 40)
    exact = 90000.0 * math.log(45.0 / 40.0)
    # the polynomial of fourth degree over two hours of a 25-hour exponential is good to far below 1 s
    assert passed_above(trace, -15.0).broken_s == pytest.approx(exact, abs=0.1)


def test_never_reached_is_none_and_beyond_at_the_start_is_zero():
    trace = trace_of(lambda t: 1.0 + t * 1e-6, 3600.0, 10)
    assert passed_above(trace, 5.0).broken_s is None
    assert passed_above(trace, 5.0).first_s is None
    assert passed_above(trace, 0.5).broken_s == 0.0
    assert passed_below(trace, 5.0).broken_s == 0.0


def test_a_level_that_is_only_touched_is_not_passed():
    trace = trace_of(lambda _: 4.0, 3600.0, 3)
    assert passed_above(trace, 4.0).first_s is None


def test_pass_up_and_down_inside_one_step_is_caught():
    # a hump of 0.02 K above the level, ten minutes wide, between points of a two-hour step
    top = 3000.0
    trace = trace_of(lambda t: 8.02 - 0.02 * ((t - top) / 300.0) ** 2, 7200.0, 1)
    passed = passed_above(trace, 8.0)
    assert passed.first_s == pytest.approx(top - 300.0, abs=1.0)


@given(top_s=st.floats(200.0, 7000.0), width_s=st.floats(20.0, 2000.0))
def test_any_hump_of_a_parabola_is_caught(top_s, width_s):
    trace = trace_of(lambda t: 8.0 + 0.01 * (1.0 - ((t - top_s) / width_s) ** 2), 7200.0, 1)
    assert passed_above(trace, 8.0).first_s == pytest.approx(max(top_s - width_s, 0.0), abs=1.0)


def test_dwell_counts_one_stretch_and_ends_with_it():
    # a day swing above 8 °C for a known time every day
    def swing(t: float) -> float:
        return 6.0 + 3.0 * math.cos(2.0 * math.pi * t / 86400.0)

    half = math.acos(2.0 / 3.0) * 86400.0 / (2.0 * math.pi)
    trace = trace_of(swing, 3600.0, 96)
    short = passed_above(trace, 8.0, longer_than_s=1.5 * half)
    # the first stretch starts at the peak and lasts half as long as the later ones
    assert short.first_s == 0.0
    assert short.broken_s == pytest.approx(86400.0 - half + 1.5 * half, abs=1.0)
    assert passed_above(trace, 8.0, longer_than_s=2.1 * half).broken_s is None


def test_below_mirrors_above():
    trace = trace_of(lambda t: 10.0 - t / 3600.0, 3600.0, 12)
    assert passed_below(trace, 2.0, longer_than_s=3600.0).broken_s == pytest.approx(9 * HOUR_S, abs=0.1)


@pytest.mark.parametrize(
    ("series", "kinetic_c"),
    # Source: computed from the formula of USP <1160>, dH/R = 10 000 K
    [(((5.0, 12), (25.0, 12)), 19.698), (((2.0, 12), (8.0, 12)), 5.536), (((5.0, 21), (15.0, 3)), 7.107)],
)
def test_mean_kinetic_temperature_of_steps(series, kinetic_c):
    times, values = [0.0], [series[0][0]]
    for value, hours in series:
        start = times[-1]
        for k in range(1, hours * 4 + 1):
            times.append(start + k * 900.0)
            values.append(value)
    # each step of the trace holds one value: the jump lies between two steps
    jump = series[0][1] * 4
    values[jump] = series[0][0]
    trace = Trace(np.array(times), np.array(values))
    mean = MeanKinetic(trace, 24 * HOUR_S, 10000.0 * 8.314462618)
    # the one step over the jump is a polynomial, not a jump: an hour of it is smeared
    assert mean.at(24 * HOUR_S) == pytest.approx(kinetic_c, abs=0.35)


def test_mean_kinetic_temperature_of_a_steady_store_is_its_temperature():
    mean = MeanKinetic(trace_of(lambda _: 5.0, 3600.0, 30), 24 * HOUR_S, 83144.0)
    assert mean.at(10 * HOUR_S) == pytest.approx(5.0)
    assert mean.passed_above(8.0).broken_s is None


def test_mean_kinetic_limit_is_broken_when_the_trailing_window_says_so():
    def warming(t: float) -> float:
        return 5.0 + t / HOUR_S

    trace = trace_of(warming, 1800.0, 48)
    passed = MeanKinetic(trace, 24 * HOUR_S, 83144.0).passed_above(8.0)
    over_k = 83144.0 / 8.314462618
    grid = np.linspace(0.0, passed.broken_s, 20001)
    rates = np.exp(over_k * (1.0 / 278.15 - 1.0 / (np.array([warming(t) for t in grid]) + 273.15)))
    mean_rate = (np.trapezoid(rates, grid) + 24 * HOUR_S - passed.broken_s) / (24 * HOUR_S)
    kinetic_c = over_k / (over_k / 278.15 - math.log(mean_rate)) - 273.15
    assert kinetic_c == pytest.approx(8.0, abs=1e-4)
