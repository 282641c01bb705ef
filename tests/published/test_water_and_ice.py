"""Water and ice against the reference equations of IAPWS, and other coolants against published figures."""

import pytest
from iapws import IAPWS95
from iapws._iapws import _Ice

from app.physics.melting import WATER_LATENT_J_PER_KG, aqueous_curve, phase_change_curve, water_curve
from app.units import STANDARD_PRESSURE_PA, kelvin_from_celsius

PRESSURE_MPA = STANDARD_PRESSURE_PA / 1e6


def test_reference_ice_is_the_published_one():
    # Source: IAPWS R10-06, Table 6, normal pressure melting point (published)
    ice = _Ice(273.152519, 0.101325)
    assert [ice["cp"], ice["rho"], ice["h"]] == pytest.approx([2.09671391024, 916.721463419, -333.354873637])


def ice_j_per_kg(at_c: float) -> float:
    return 1000.0 * float(_Ice(kelvin_from_celsius(at_c), PRESSURE_MPA)["h"])


def water_j_per_kg(at_c: float) -> float:
    return 1000.0 * float(IAPWS95(T=kelvin_from_celsius(at_c), P=PRESSURE_MPA).h)


def test_heat_of_fusion():
    # Source: IAPWS-95 and IAPWS R10-06 at 0 °C and 1 atm (evaluated): 333.43 kJ/kg
    assert water_j_per_kg(0.0) - ice_j_per_kg(0.0) == pytest.approx(WATER_LATENT_J_PER_KG, rel=1e-4)


@pytest.mark.parametrize("at_c", [-80.0, -60.0, -40.0, -25.0, -18.0, -10.0, -5.0])
def test_ice_that_warms_to_zero(at_c):
    # Source: IAPWS R10-06 (evaluated); the straight line for the specific heat is within 0.15 % of its heat
    curve = water_curve()
    found = curve.enthalpy_j_per_kg(0.0) - curve.enthalpy_j_per_kg(at_c)
    assert found == pytest.approx(ice_j_per_kg(0.0) - ice_j_per_kg(at_c), rel=0.0015)


@pytest.mark.parametrize("at_c", [2.0, 4.0, 8.0, 15.0, 25.0, 40.0])
def test_water_that_warms(at_c):
    # Source: IAPWS-95 (evaluated); one specific heat is within 0.7 % of its heat
    curve = water_curve()
    found = curve.enthalpy_j_per_kg(at_c) - curve.segments[1].end_j_per_kg
    assert found == pytest.approx(water_j_per_kg(at_c) - water_j_per_kg(0.0), rel=0.007)


def test_ice_from_a_freezer_to_cool_water():
    # Source: IAPWS (evaluated): 370.0 kJ/kg from -18 °C to water at 0 °C, 386.8 to water at 4 °C
    curve = water_curve()
    to_water = curve.segments[1].end_j_per_kg - curve.enthalpy_j_per_kg(-18.0)
    assert to_water == pytest.approx(370.0e3, rel=0.0005)
    assert curve.enthalpy_j_per_kg(4.0) - curve.enthalpy_j_per_kg(-18.0) == pytest.approx(386.8e3, rel=0.0005)


def test_saline_for_injection():
    # Source: 0.9 % NaCl freezes at -0.52 °C, Lange's Handbook, 15th ed. (published, interpolated); 4.1 kJ/kg·K
    # and 330 kJ/kg from memory
    curve = aqueous_curve(freezing_c=-0.52)
    assert curve.segments[1].capacity_j_per_kg_k == pytest.approx(4100.0, rel=0.02)
    assert curve.ice_full * curve.latent_j_per_kg == pytest.approx(330e3, rel=0.01)


def test_plasma():
    # Source: plasma, 91 % water, freezes at -0.55 °C, 3.93 kJ/kg·K liquid, about 300 kJ/kg (from memory)
    curve = aqueous_curve(freezing_c=-0.55, water_fraction=0.91)
    assert curve.segments[1].capacity_j_per_kg_k == pytest.approx(3930.0, rel=0.01)
    assert curve.ice_full * curve.latent_j_per_kg == pytest.approx(300e3, rel=0.01)


@pytest.mark.parametrize(
    ("water_percent", "freezing_c", "specific_heat"),
    [(80.0, -7.2, 3960.0), (70.0, -12.8, 3830.0), (60.0, -20.6, 3670.0)],
)
def test_propylene_glycol(water_percent, freezing_c, specific_heat):
    # Source: Melinder (2010), Properties of Secondary Working Fluids, IIR (computed with CoolProp). The rule of
    # water and 1.3 kJ/kg·K of solids is meant for thin solutions: 9 to 18 % low here, so on the warm side.
    curve = aqueous_curve(freezing_c=freezing_c, water_fraction=water_percent / 100.0)
    off = curve.segments[1].capacity_j_per_kg_k / specific_heat - 1.0
    assert -0.18 < off < -0.08


def test_eutectic_brine_stands_still_while_it_melts():
    # Source: NaCl eutectic, -21.1 °C, Lange's Handbook (published), 222 to 236 kJ/kg (from memory)
    curve = phase_change_curve(
        melting_c=-21.1, melting_range_k=0.0, latent_j_per_kg=230e3, specific_heat_solid_j_per_kg_k=2000.0,
        specific_heat_liquid_j_per_kg_k=3330.0, conductivity_solid_w_per_m_k=2.0,
        conductivity_liquid_w_per_m_k=0.55, density_kg_per_m3=1170.0,
    )  # fmt: skip
    start = curve.enthalpy_j_per_kg(-21.1)
    assert [curve.temperature_c(start + share * 230e3) for share in (0.01, 0.5, 0.99)] == [-21.1] * 3
    assert curve.enthalpy_j_per_kg(-10.0) - start == pytest.approx(230e3 + 3330.0 * 11.1)
