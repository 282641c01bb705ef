"""Curves of ice, solutions, packs and the user's own points. Reference equations are in tests/published."""

import math

import pytest

from app.errors import InputOutOfRange
from app.physics.melting import aqueous_curve, constant_curve, curve_from_points, phase_change_curve, water_curve
from tests.physics.curves import pack


def test_water_melts_at_zero_and_nowhere_else():
    curve = water_curve()
    plateaus = [segment for segment in curve.segments if math.isinf(segment.capacity_j_per_kg_k)]
    assert [(segment.start_c, segment.end_c) for segment in plateaus] == [(0.0, 0.0)]
    assert curve.ice_kg_per_kg(-1.0) == 1.0
    assert curve.ice_kg_per_kg(0.25 * 333.43e3) == pytest.approx(0.75)
    assert curve.ice_kg_per_kg(333.5e3) == 0.0


def test_solution_near_pure_water_is_nearly_water():
    pure, water = aqueous_curve(freezing_c=0.0, water_fraction=1.0), water_curve()
    for low_c, high_c in ((-20.0, 5.0), (-5.0, 2.0)):
        heat = pure.enthalpy_j_per_kg(high_c) - pure.enthalpy_j_per_kg(low_c)
        reference = water.enthalpy_j_per_kg(high_c) - water.enthalpy_j_per_kg(low_c)
        assert heat == pytest.approx(reference, rel=0.02)


def test_stronger_solution_melts_sooner():
    weak, strong = aqueous_curve(freezing_c=-0.5), aqueous_curve(freezing_c=-3.0)
    assert strong.ice_kg_per_kg(strong.enthalpy_j_per_kg(-5.0)) < weak.ice_kg_per_kg(weak.enthalpy_j_per_kg(-5.0))


@pytest.mark.parametrize("freezing_c", [0.1, -39.0, float("nan")])
def test_freezing_point_of_no_solution_is_refused(freezing_c):
    with pytest.raises(InputOutOfRange, match="freezing_c is"):
        aqueous_curve(freezing_c=freezing_c)


@pytest.mark.parametrize("water", [0.0, 1.2])
def test_water_fraction_of_no_solution_is_refused(water):
    with pytest.raises(InputOutOfRange, match="water_fraction is"):
        aqueous_curve(freezing_c=-1.0, water_fraction=water)


def test_melting_range_is_centred_and_holds_the_heat_of_fusion():
    curve = pack(melting_c=5.0, range_k=2.0)
    assert (curve.segments[1].start_c, curve.segments[1].end_c) == (4.0, 6.0)
    sensible = 2.0 * (2000.0 + 3000.0) / 2.0
    assert curve.enthalpy_j_per_kg(6.0) - curve.enthalpy_j_per_kg(4.0) == pytest.approx(200e3 + sensible)
    assert curve.latent_j_per_kg == 200e3


@pytest.mark.parametrize(
    ("change", "words"),
    [
        ({"latent_j_per_kg": 0.0}, "latent_j_per_kg is 0"),
        ({"specific_heat_solid_j_per_kg_k": -1.0}, "solid_j_per_kg_k is -1"),
        ({"melting_range_k": -1.0}, "melting_range_k is -1 K"),
        ({"latent_j_per_kg": float("nan")}, "latent_j_per_kg is nan"),
    ],
)
def test_pack_that_cannot_be_is_refused(change, words):
    numbers = {
        "melting_c": -10.0, "melting_range_k": 0.0, "latent_j_per_kg": 2e5, "specific_heat_solid_j_per_kg_k": 2000.0,
        "specific_heat_liquid_j_per_kg_k": 3000.0, "conductivity_solid_w_per_m_k": 1.0,
        "conductivity_liquid_w_per_m_k": 0.5, "density_kg_per_m3": 1000.0,
    }  # fmt: skip
    with pytest.raises(InputOutOfRange, match=words):
        phase_change_curve(**(numbers | change))


def test_constant_curve_refuses_what_is_not_above_zero():
    with pytest.raises(InputOutOfRange, match="density_kg_per_m3 is 0"):
        constant_curve(specific_heat_j_per_kg_k=2000.0, conductivity_w_per_m_k=0.2, density_kg_per_m3=0.0)


def points(temperatures, enthalpies):
    return curve_from_points(
        temperature_c=temperatures,
        enthalpy_j_per_kg=enthalpies,
        conductivity_w_per_m_k=0.5,
        density_kg_per_m3=1000.0,
    )


def test_curve_through_points_is_straight_between_and_goes_on_beyond():
    curve = points([-20.0, -2.0, -2.0, 10.0], [0.0, 40e3, 280e3, 320e3])
    assert curve.temperature_c(20e3) == pytest.approx(-11.0)
    assert curve.temperature_c(150e3) == -2.0
    assert curve.temperature_c(-20e3) == pytest.approx(-29.0)
    assert curve.temperature_c(360e3) == pytest.approx(22.0)


@pytest.mark.parametrize(
    ("temperatures", "enthalpies", "words"),
    [([0.0], [0.0], "number of points is 1"), ([0.0, 1.0, 2.0], [0.0, 1e3], "number of enthalpies is 2"),
     ([0.0, 1.0], [5e3, 5e3], "enthalpy_j_per_kg is 5000"), ([0.0, -1.0], [0.0, 5e3], "temperature_c is -1"),
     ([0.0, 0.0, 1.0], [0.0, 1e3, 2e3], "temperature_c is 0"), ([0.0, 1.0, 1.0], [0.0, 1e3, 2e3], "temperature_c is")],
)  # fmt: skip
def test_points_that_make_no_curve_are_refused(temperatures, enthalpies, words):
    with pytest.raises(InputOutOfRange, match=words):
        points(temperatures, enthalpies)
