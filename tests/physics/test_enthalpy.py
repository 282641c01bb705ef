"""Curves there and back again, and what any curve must keep: order, joints, heat of fusion."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad

from app.physics import QUADRATIC, segment_ice_slope, segment_slope, segment_temperature
from tests.physics.curves import CURVES, any_curve, lean_meat, pack

TEMPERATURES = st.floats(-85.0, 60.0)


def kinds(func):
    return pytest.mark.parametrize("curve", CURVES.values(), ids=CURVES.keys())(func)


@given(any_curve(), TEMPERATURES)
def test_temperature_to_enthalpy_and_back(curve, at_c):
    back_c = curve.temperature_c(curve.enthalpy_j_per_kg(at_c))
    # closed forms; what is lost is the rounding of the enthalpy, most where a curve is flattest
    assert back_c == pytest.approx(at_c, abs=1e-8)


@given(any_curve(), st.floats(-2e5, 8e5))
def test_enthalpy_to_temperature_and_back_away_from_a_plateau(curve, enthalpy):
    at_c = curve.temperature_c(enthalpy)
    plateaus = [s.start_c for s in curve.segments if math.isinf(s.capacity_j_per_kg_k)]
    coldest = curve.segments[0]
    if any(abs(at_c - plateau_c) < 1e-6 for plateau_c in plateaus) or at_c > 150.0:
        return
    if coldest.shape == QUADRATIC and enthalpy < coldest.start_j_per_kg:
        return  # below the coldest point only a steady continuation is asked for
    back = curve.enthalpy_j_per_kg(at_c)
    assert back == pytest.approx(enthalpy, abs=1e-3)


@given(any_curve(), st.floats(-3e5, 9e5), st.floats(1.0, 5e5))
def test_temperature_never_falls_as_enthalpy_rises(curve, enthalpy, more):
    # rounding aside
    assert curve.temperature_c(enthalpy + more) >= curve.temperature_c(enthalpy) - 1e-9


@given(any_curve(), st.floats(-3e5, 9e5), st.floats(1.0, 5e5))
def test_ice_never_grows_as_enthalpy_rises(curve, enthalpy, more):
    before, after = curve.ice_kg_per_kg(enthalpy), curve.ice_kg_per_kg(enthalpy + more)
    assert after <= before + 1e-12
    assert 0.0 <= after <= curve.ice_full + 1e-12


@kinds
def test_segments_join(curve):
    for before, after in zip(curve.segments[:-1], curve.segments[1:], strict=True):
        assert after.start_c == before.end_c
        assert after.start_j_per_kg == pytest.approx(before.end_j_per_kg, abs=1e-6)
        assert after.ice_start == pytest.approx(before.ice_end, abs=1e-12)
        just_below = curve.temperature_c(before.end_j_per_kg * (1.0 - 1e-12) - 1e-9)
        assert just_below == pytest.approx(before.end_c, abs=1e-6)


@kinds
def test_slope_is_the_change_of_temperature_with_enthalpy(curve):
    for segment in curve.segments:
        low, high = max(segment.start_j_per_kg, -4e5), min(segment.end_j_per_kg, 8e5)
        for share in (0.1, 0.5, 0.9):
            enthalpy = low + share * (high - low)
            step = 1e-4 * (high - low)
            rise = curve.temperature_c(enthalpy + step) - curve.temperature_c(enthalpy - step)
            slope = segment.slope_k_per_j(curve.temperature_c(enthalpy))
            # central difference over a five-thousandth of the segment
            assert slope == pytest.approx(rise / (2.0 * step), rel=1e-4, abs=1e-15)


@kinds
def test_ice_slope_is_the_change_of_ice_with_enthalpy(curve):
    for segment in curve.segments:
        if segment.ice_start == segment.ice_end:
            continue
        middle = 0.5 * (segment.start_j_per_kg + segment.end_j_per_kg)
        step = 1e-4 * (segment.end_j_per_kg - segment.start_j_per_kg)
        at_c = curve.temperature_c(middle)
        found = segment_ice_slope(
            segment.shape, segment.start_c, segment.end_c, segment.start_j_per_kg, segment.end_j_per_kg,
            segment.ice_start, segment.ice_end, middle, at_c, segment.slope_k_per_j(at_c),
        )  # fmt: skip
        change = curve.ice_kg_per_kg(middle + step) - curve.ice_kg_per_kg(middle - step)
        assert found == pytest.approx(change / (2.0 * step), rel=1e-4)


@given(any_curve())
def test_integral_of_the_capacity_is_the_enthalpy(curve):
    for segment in curve.segments:
        if math.isinf(segment.capacity_j_per_kg_k) or segment.start_c < -90.0 or segment.end_c > 100.0:
            continue
        integral, _ = quad(lambda t, s=segment: 1.0 / s.slope_k_per_j(t), segment.start_c, segment.end_c, limit=200)
        assert integral == pytest.approx(segment.end_j_per_kg - segment.start_j_per_kg, rel=1e-6)


@pytest.mark.parametrize("latent", [50e3, 333.43e3])
def test_width_of_a_plateau_is_the_heat_of_fusion(latent):
    curve = pack(melting_c=-10.0, range_k=0.0, latent_j_per_kg=latent)
    widths = [s.end_j_per_kg - s.start_j_per_kg for s in curve.segments if s.start_c == s.end_c]
    assert widths == pytest.approx([latent])
    assert curve.temperature_c(curve.enthalpy_j_per_kg(-10.0) + 0.5 * latent) == -10.0


def test_heat_of_fusion_of_food_is_spread_over_its_range():
    # all the ice at -40 °C melts on the way up: its heat, and the warming of the rest
    curve = lean_meat()
    freezing = curve.segments[1]
    sensible = freezing.capacity_j_per_kg_k * (freezing.end_c - freezing.start_c)
    assert freezing.end_j_per_kg - sensible == pytest.approx(
        freezing.bend * (1.0 / freezing.start_c - 1.0 / freezing.end_c)
    )
    assert freezing.end_j_per_kg - sensible == pytest.approx(curve.ice_full * curve.latent_j_per_kg)


@kinds
def test_something_beside_that_only_warms_adds_its_heat(curve):
    beside = curve.with_capacity(250.0)
    for low_c, high_c in ((-30.0, -25.0), (-24.0, -2.0), (8.0, 30.0)):
        alone = curve.enthalpy_j_per_kg(high_c) - curve.enthalpy_j_per_kg(low_c)
        together = beside.enthalpy_j_per_kg(high_c) - beside.enthalpy_j_per_kg(low_c)
        assert together - alone == pytest.approx(250.0 * (high_c - low_c), rel=1e-9, abs=1e-6)
    assert curve.with_capacity(0.0) is curve


@given(any_curve(), st.floats(-1e7, 1e7))
def test_far_beyond_the_ends_a_temperature_is_still_found(curve, enthalpy):
    segment = curve.segments[curve.segment_at(enthalpy)]
    at_c = segment_temperature(
        segment.shape, segment.start_c, segment.start_j_per_kg, segment.capacity_j_per_kg_k, segment.bend, enthalpy
    )
    slope = segment_slope(segment.shape, segment.start_c, segment.capacity_j_per_kg_k, segment.bend, at_c)
    assert math.isfinite(at_c)
    assert math.isfinite(slope)
    assert slope >= 0.0
