"""Enthalpy curves of what is not food: water and ice, solutions, salts and phase-change materials, and the user's own.

A pure substance melts at one temperature: its plateau belongs to ice and eutectics, never to food. Called by
``stores.loads``.
"""

from __future__ import annotations

import math
from collections.abc import Sequence

from app.errors import InputOutOfRange
from app.physics.enthalpy import FREEZING, LINEAR, QUADRATIC, EnthalpyCurve, Segment, segment_enthalpy

WATER_LATENT_J_PER_KG = 333.43e3
"""Heat of fusion at 0 °C and 1 atm (computed from IAPWS-95 and IAPWS R10-06)."""

_ICE_AT_MINUS_90 = 1445.6
_ICE_PER_K = 7.208
"""Specific heat of ice at -90 °C and its rise per kelvin: a straight line fitted to IAPWS R10-06, within 0.2 %
of it from -80 to 0 °C."""

_WATER_J_PER_KG_K = 4190.0
"""Liquid water, 0 to 40 °C (IAPWS, within 0.7 %)."""

_SOLIDS_J_PER_KG_K = 1300.0
_HIGHEST_FREEZING_C = -0.05
_COLDEST_C = -90.0
_LIQUID_RANGE_K = 150.0


def water_curve() -> EnthalpyCurve:
    """Enthalpy curve of water and ice, 0 for ice at 0 °C.

    Returns
    -------
    EnthalpyCurve
        Ice with a heat that rises with temperature, a plateau at 0 °C, water. [J/kg]

    Notes
    -----
    -90 to 60 °C, within 0.7 % of the reference equations.

    Examples
    --------
    >>> ice = water_curve()
    >>> round((ice.enthalpy_j_per_kg(4.0) - ice.enthalpy_j_per_kg(-18.0)) / 1000.0)
    387

    References
    ----------
    IAPWS R10-06 (ice), IAPWS-95 (water), evaluated.
    """
    width = -_COLDEST_C
    end = _ICE_AT_MINUS_90 + _ICE_PER_K * width
    start_j = -0.5 * (_ICE_AT_MINUS_90 + end) * width
    latent = WATER_LATENT_J_PER_KG
    return EnthalpyCurve(
        (
            Segment(QUADRATIC, _COLDEST_C, 0.0, start_j, 0.0, _ICE_AT_MINUS_90, _ICE_PER_K, 1.0, 1.0),
            Segment(LINEAR, 0.0, 0.0, 0.0, latent, math.inf, 0.0, 1.0, 0.0),
            _liquid(0.0, latent, _WATER_J_PER_KG_K),
        ),
        conductivity_liquid_w_per_m_k=0.57,
        conductivity_solid_w_per_m_k=2.2,
        density_kg_per_m3=1000.0,
        latent_j_per_kg=WATER_LATENT_J_PER_KG,
    )


def aqueous_curve(*, freezing_c: float, water_fraction: float | None = None) -> EnthalpyCurve:
    """Enthalpy curve of a watery solution: medicines, blood components, glycol mixtures; 0 at its cold end.

    Parameters
    ----------
    freezing_c : float
        Where freezing begins, -38 to 0. [°C]
    water_fraction : float or None
        Water in a kilogram; without it that of dilute salt, 1.7 % solids per kelvin of depression. [kg/kg]

    Returns
    -------
    EnthalpyCurve
        Ice content follows the freezing curve of an ideal solution. [J/kg]

    Raises
    ------
    InputOutOfRange
        Freezing point or water fraction out of range.

    Notes
    -----
    Heat as water by its fraction, solids 1300 J/kg·K (common practice). Freezing points above -0.05 °C count as
    -0.05 °C.

    Examples
    --------
    >>> saline = aqueous_curve(freezing_c=-0.52)
    >>> round((saline.enthalpy_j_per_kg(8.0) - saline.enthalpy_j_per_kg(2.0)) / 1000.0, 1)
    25.0

    References
    ----------
    Raoult's law in the form of Miles (1974); freezing of dilute salt from Lange's Handbook, 15th ed.
    """
    if not -38.0 <= freezing_c <= 0.0:
        raise InputOutOfRange("freezing_c", freezing_c, "°C", -38.0, 0.0)
    begins_c = min(freezing_c, _HIGHEST_FREEZING_C)
    water = 1.0 + 0.017 * begins_c if water_fraction is None else water_fraction
    if not 0.05 <= water <= 1.0:
        raise InputOutOfRange("water_fraction", water, "", 0.05, 1.0)
    bend = -water * WATER_LATENT_J_PER_KG * begins_c
    solids = (1.0 - water) * _SOLIDS_J_PER_KG_K
    frozen = water * 0.5 * (2 * _ICE_AT_MINUS_90 + _ICE_PER_K * 1.5 * -_COLDEST_C) + solids
    top = segment_enthalpy(FREEZING, _COLDEST_C, 0.0, frozen, bend, begins_c)
    ice = water * (1.0 - begins_c / _COLDEST_C)
    return EnthalpyCurve(
        (
            Segment(FREEZING, _COLDEST_C, begins_c, 0.0, top, frozen, bend, ice, 0.0),
            _liquid(begins_c, top, water * _WATER_J_PER_KG_K + solids),
        ),
        conductivity_liquid_w_per_m_k=0.57 * water + 0.2 * (1.0 - water),
        conductivity_solid_w_per_m_k=2.2 * water + 0.2 * (1.0 - water),
        density_kg_per_m3=1000.0 + 300.0 * (1.0 - water),
        latent_j_per_kg=WATER_LATENT_J_PER_KG,
    )


def phase_change_curve(
    *,
    melting_c: float,
    melting_range_k: float,
    latent_j_per_kg: float,
    specific_heat_solid_j_per_kg_k: float,
    specific_heat_liquid_j_per_kg_k: float,
    conductivity_solid_w_per_m_k: float,
    conductivity_liquid_w_per_m_k: float,
    density_kg_per_m3: float,
) -> EnthalpyCurve:
    """Enthalpy curve of a salt eutectic or a phase-change material, 0 where melting begins.

    Parameters
    ----------
    melting_c : float
        Middle of the melting range. [°C]
    melting_range_k : float
        Width of the range, 0 for a plateau. [K]
    latent_j_per_kg : float
        Heat of fusion. [J/kg]
    specific_heat_solid_j_per_kg_k : float
        Below melting. [J/kg·K]
    specific_heat_liquid_j_per_kg_k : float
        Above melting. [J/kg·K]
    conductivity_solid_w_per_m_k : float
        Below melting. [W/m·K]
    conductivity_liquid_w_per_m_k : float
        Above melting. [W/m·K]
    density_kg_per_m3 : float
        Of both. [kg/m³]

    Returns
    -------
    EnthalpyCurve
        Solid, melting, liquid. [J/kg]

    Raises
    ------
    InputOutOfRange
        Latent heat or a specific heat not greater than 0, or a range below 0.

    Notes
    -----
    No sub-cooling: a pack is taken to freeze and melt at the same temperature.

    Examples
    --------
    >>> pack = phase_change_curve(melting_c=5.0, melting_range_k=2.0, latent_j_per_kg=180e3,
    ...     specific_heat_solid_j_per_kg_k=2000, specific_heat_liquid_j_per_kg_k=2200,
    ...     conductivity_solid_w_per_m_k=0.2, conductivity_liquid_w_per_m_k=0.15, density_kg_per_m3=800)
    >>> pack.enthalpy_j_per_kg(6.0) - pack.enthalpy_j_per_kg(4.0)
    184200.0

    References
    ----------
    Enthalpy method for melting (Voller and Cross 1981); a melting range of 2 K is common practice.
    """
    for name, value in (
        ("latent_j_per_kg", latent_j_per_kg),
        ("specific_heat_solid_j_per_kg_k", specific_heat_solid_j_per_kg_k),
        ("specific_heat_liquid_j_per_kg_k", specific_heat_liquid_j_per_kg_k),
    ):
        if not value > 0.0:
            raise InputOutOfRange(name, value, "", 0.0, None)
    if not melting_range_k >= 0.0:
        raise InputOutOfRange("melting_range_k", melting_range_k, "K", 0.0, None)
    begins_c, ends_c = melting_c - melting_range_k / 2.0, melting_c + melting_range_k / 2.0
    solid, liquid = specific_heat_solid_j_per_kg_k, specific_heat_liquid_j_per_kg_k
    sensible = 0.5 * (solid + liquid) * melting_range_k
    melted = latent_j_per_kg + sensible
    capacity = melted / melting_range_k if melting_range_k > 0.0 else math.inf
    depth_k = begins_c + 120.0
    return EnthalpyCurve(
        (
            Segment(LINEAR, begins_c - depth_k, begins_c, -solid * depth_k, 0.0, solid, 0.0, 1.0, 1.0),
            Segment(LINEAR, begins_c, ends_c, 0.0, melted, capacity, 0.0, 1.0, 0.0),
            _liquid(ends_c, melted, liquid),
        ),
        conductivity_liquid_w_per_m_k,
        conductivity_solid_w_per_m_k,
        density_kg_per_m3,
        latent_j_per_kg,
    )


def constant_curve(
    *, specific_heat_j_per_kg_k: float, conductivity_w_per_m_k: float, density_kg_per_m3: float
) -> EnthalpyCurve:
    """Enthalpy curve of something that only warms, 0 at 0 °C.

    Parameters
    ----------
    specific_heat_j_per_kg_k : float
        Greater than 0. [J/kg·K]
    conductivity_w_per_m_k : float
        Greater than 0. [W/m·K]
    density_kg_per_m3 : float
        Greater than 0. [kg/m³]

    Returns
    -------
    EnthalpyCurve
        One straight segment. [J/kg]

    Raises
    ------
    InputOutOfRange
        A value not greater than 0.

    Notes
    -----
    Where no ice melts.

    Examples
    --------
    >>> oil = constant_curve(specific_heat_j_per_kg_k=2000, conductivity_w_per_m_k=0.17, density_kg_per_m3=900)
    >>> oil.temperature_c(20e3)
    10.0

    References
    ----------
    Definition of the specific heat.
    """
    for name, value in (
        ("specific_heat_j_per_kg_k", specific_heat_j_per_kg_k),
        ("conductivity_w_per_m_k", conductivity_w_per_m_k),
        ("density_kg_per_m3", density_kg_per_m3),
    ):
        if not value > 0.0:
            raise InputOutOfRange(name, value, "", 0.0, None)
    return EnthalpyCurve(
        (_liquid(0.0, 0.0, specific_heat_j_per_kg_k),),
        conductivity_w_per_m_k,
        conductivity_w_per_m_k,
        density_kg_per_m3,
    )


def curve_from_points(
    *,
    temperature_c: Sequence[float],
    enthalpy_j_per_kg: Sequence[float],
    conductivity_w_per_m_k: float,
    density_kg_per_m3: float,
) -> EnthalpyCurve:
    """Enthalpy curve through given points, straight between them, its ends continued.

    Parameters
    ----------
    temperature_c : sequence of float
        Never falling; two equal ones make a plateau. Shape (n,), n at least 2. [°C]
    enthalpy_j_per_kg : sequence of float
        Rising. Shape (n,). [J/kg]
    conductivity_w_per_m_k : float
        At all temperatures. [W/m·K]
    density_kg_per_m3 : float
        At all temperatures. [kg/m³]

    Returns
    -------
    EnthalpyCurve
        One straight segment between any two points. [J/kg]

    Raises
    ------
    InputOutOfRange
        Fewer than two points, enthalpy that does not rise, temperature that falls or begins or ends level.

    Notes
    -----
    Without a share of ice: nothing is said of melting.

    Examples
    --------
    >>> curve = curve_from_points(temperature_c=[-10, 0, 0, 10], enthalpy_j_per_kg=[0, 20e3, 350e3, 392e3],
    ...     conductivity_w_per_m_k=0.5, density_kg_per_m3=1000)
    >>> curve.temperature_c(200e3)
    0.0

    References
    ----------
    The user's own data.
    """
    if len(temperature_c) != len(enthalpy_j_per_kg):
        wanted = len(temperature_c)
        raise InputOutOfRange("number of enthalpies", len(enthalpy_j_per_kg), "", wanted, wanted)
    points = list(zip(temperature_c, enthalpy_j_per_kg, strict=True))
    if len(points) < 2:
        raise InputOutOfRange("number of points", len(points), "", 2, None)
    segments = []
    for (from_c, from_j), (to_c, to_j) in zip(points[:-1], points[1:], strict=True):
        if not to_j > from_j:
            raise InputOutOfRange("enthalpy_j_per_kg", to_j, "J/kg", from_j, None)
        if to_c < from_c:
            raise InputOutOfRange("temperature_c", to_c, "°C", from_c, None)
        capacity = (to_j - from_j) / (to_c - from_c) if to_c > from_c else math.inf
        segments.append(Segment(LINEAR, from_c, to_c, from_j, to_j, capacity))
    if math.isinf(segments[0].capacity_j_per_kg_k) or math.isinf(segments[-1].capacity_j_per_kg_k):
        raise InputOutOfRange("temperature_c", points[0][0], "°C", None, points[1][0])
    return EnthalpyCurve(tuple(segments), conductivity_w_per_m_k, conductivity_w_per_m_k, density_kg_per_m3)


def _liquid(from_c: float, from_j: float, specific_heat: float) -> Segment:
    """What only warms, from a temperature on."""
    return Segment(
        LINEAR,
        from_c,
        from_c + _LIQUID_RANGE_K,
        from_j,
        from_j + specific_heat * _LIQUID_RANGE_K,
        specific_heat,
    )
