"""Heat transfer at surfaces: still air along plates and cylinders, radiation, standard surface resistances.

The relations of the handbooks stand here as published; ``FilmLaw`` is the same relations in the form the engine
evaluates in its innermost loop, where only the two temperatures change. Called by ``stores`` and the engine.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from app.compiled import compiled
from app.errors import InputOutOfRange
from app.units import (
    STANDARD_GRAVITY_M_PER_S2,
    STANDARD_PRESSURE_PA,
    STEFAN_BOLTZMANN_W_PER_M2_K4,
    ZERO_CELSIUS_K,
)

AIR_SPECIFIC_HEAT_J_PER_KG_K = 1006.0
"""Of dry air at constant pressure, -100 to 60 °C, within 0.3 % (ASHRAE Fundamentals, ch. 1)."""

_AIR_GAS_CONSTANT_J_PER_KG_K = 287.055
_SUTHERLAND_VISCOSITY = (1.716e-5, 110.4)
_SUTHERLAND_CONDUCTIVITY = (0.0241, 194.0)
_USUAL_DIFFERENCE_K = 5.0

_SURFACE_RESISTANCE_M2_K_PER_W = {"up": 0.10, "sideways": 0.13, "down": 0.17, "outside": 0.04}

_AIR_LAYER_MM = (0.0, 5.0, 7.0, 10.0, 15.0, 25.0, 50.0, 100.0, 300.0)
_AIR_LAYER_M2_K_PER_W = {
    "up": (0.0, 0.11, 0.13, 0.15, 0.16, 0.16, 0.16, 0.16, 0.16),
    "sideways": (0.0, 0.11, 0.13, 0.15, 0.17, 0.18, 0.18, 0.18, 0.18),
    "down": (0.0, 0.11, 0.13, 0.15, 0.17, 0.19, 0.21, 0.22, 0.23),
}


@dataclass(frozen=True)
class AirProperties:
    """Dry air at one temperature and standard pressure."""

    density_kg_per_m3: float
    conductivity_w_per_m_k: float
    viscosity_m2_per_s: float
    diffusivity_m2_per_s: float

    @property
    def prandtl(self) -> float:
        """Viscosity over diffusivity. [-]"""
        return self.viscosity_m2_per_s / self.diffusivity_m2_per_s


def air_density_kg_per_m3(temperature_c: float) -> float:
    """Density of dry air at standard pressure, as an ideal gas. [kg/m³]

    Parameters
    ----------
    temperature_c : float
        Air temperature. [°C]

    Returns
    -------
    float
        Density. [kg/m³]

    Raises
    ------
    InputOutOfRange
        Outside -100 to 100 °C.

    Notes
    -----
    Within 0.2 % of the equation of state for -100 to 100 °C.

    Examples
    --------
    >>> air_density_kg_per_m3(20.0)
    1.204

    References
    ----------
    Ideal-gas law with the gas constant of dry air, ASHRAE Fundamentals (2017), ch. 1.
    """
    if not -100.0 <= temperature_c <= 100.0:
        raise InputOutOfRange("temperature_c", temperature_c, "°C", -100.0, 100.0)
    return STANDARD_PRESSURE_PA / (_AIR_GAS_CONSTANT_J_PER_KG_K * (temperature_c + ZERO_CELSIUS_K))


def air_properties(temperature_c: float) -> AirProperties:
    """Density, conductivity, viscosity and diffusivity of dry air at standard pressure.

    Parameters
    ----------
    temperature_c : float
        Air temperature. [°C]

    Returns
    -------
    AirProperties
        Density, conductivity, kinematic viscosity, thermal diffusivity. [kg/m³, W/m·K, m²/s, m²/s]

    Raises
    ------
    InputOutOfRange
        Outside -100 to 100 °C.

    Notes
    -----
    Sutherland's laws; within 2 % of reference data for -90 to 60 °C.

    Examples
    --------
    >>> round(air_properties(0.0).conductivity_w_per_m_k, 4)
    0.0241

    References
    ----------
    W. Sutherland, Philosophical Magazine 36 (1893); constants of F. White, Viscous Fluid Flow (from memory).
    """
    density = air_density_kg_per_m3(temperature_c)
    kelvin = temperature_c + ZERO_CELSIUS_K
    warm = (kelvin / ZERO_CELSIUS_K) ** 1.5
    viscosity, s = _SUTHERLAND_VISCOSITY
    viscosity *= warm * (ZERO_CELSIUS_K + s) / (kelvin + s)
    conductivity, s = _SUTHERLAND_CONDUCTIVITY
    conductivity *= warm * (ZERO_CELSIUS_K + s) / (kelvin + s)
    return AirProperties(
        density, conductivity, viscosity / density, conductivity / (density * AIR_SPECIFIC_HEAT_J_PER_KG_K)
    )


def rayleigh_number(
    *,
    difference_k: float,
    length_m: float,
    expansion_per_k: float,
    viscosity_m2_per_s: float,
    diffusivity_m2_per_s: float,
) -> float:
    """Strength of natural convection. [-]

    Parameters
    ----------
    difference_k : float
        Between surface and fluid; its sign is ignored. [K]
    length_m : float
        Height of a plate, diameter of a cylinder, area over perimeter of a flat plate. [m]
    expansion_per_k : float
        One over the absolute film temperature, for a gas. [1/K]
    viscosity_m2_per_s : float
        Kinematic viscosity. [m²/s]
    diffusivity_m2_per_s : float
        Thermal diffusivity. [m²/s]

    Returns
    -------
    float
        ``g beta dT L³ / (nu a)``. [-]

    Notes
    -----
    Any Newtonian fluid.

    Examples
    --------
    >>> rayleigh_number(difference_k=209, length_m=0.71, expansion_per_k=0.0025,
    ...     viscosity_m2_per_s=26.4e-6, diffusivity_m2_per_s=38.3e-6) / 1e9
    1.814

    References
    ----------
    Incropera et al., Fundamentals of Heat and Mass Transfer, 6th ed., sec. 9.2.
    """
    pull = STANDARD_GRAVITY_M_PER_S2 * expansion_per_k * abs(difference_k) * length_m**3
    return pull / (viscosity_m2_per_s * diffusivity_m2_per_s)


def vertical_plate_nusselt(rayleigh: float, prandtl: float) -> float:
    """Natural convection along an upright plate, laminar and turbulent. [-]

    Parameters
    ----------
    rayleigh : float
        On the height, up to 1e12. [-]
    prandtl : float
        Of the fluid. [-]

    Returns
    -------
    float
        Nusselt number on the height. [-]

    Raises
    ------
    InputOutOfRange
        Above a Rayleigh number of 1e12 or below 0.

    Notes
    -----
    All Rayleigh numbers up to 1e12.

    Examples
    --------
    >>> vertical_plate_nusselt(1.8143775e9, 0.69)
    147.2

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.26.
    """
    _in_range("rayleigh", rayleigh, 0.0, 1e12)
    return (0.825 + 0.387 * rayleigh ** (1.0 / 6.0) / _prandtl_factor(prandtl, 0.492) ** (8.0 / 27.0)) ** 2


def laminar_plate_nusselt(rayleigh: float, prandtl: float) -> float:
    """Natural convection along an upright plate while the flow is laminar. [-]

    Parameters
    ----------
    rayleigh : float
        On the height, up to 1e9. [-]
    prandtl : float
        Of the fluid. [-]

    Returns
    -------
    float
        Nusselt number on the height. [-]

    Raises
    ------
    InputOutOfRange
        Above a Rayleigh number of 1e9 or below 0.

    Notes
    -----
    Slightly better than the relation for all flows, for laminar flow only.

    Examples
    --------
    >>> laminar_plate_nusselt(1.0e8, 0.71)
    52.1

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.27.
    """
    _in_range("rayleigh", rayleigh, 0.0, 1e9)
    return 0.68 + 0.670 * rayleigh**0.25 / _prandtl_factor(prandtl, 0.492) ** (4.0 / 9.0)


def stirring_plate_nusselt(rayleigh: float) -> float:
    """Natural convection where it stirs: upper side of a warm plate, underside of a cold one. [-]

    Parameters
    ----------
    rayleigh : float
        On area over perimeter, 1e4 to 1e11. [-]

    Returns
    -------
    float
        Nusselt number on area over perimeter. [-]

    Raises
    ------
    InputOutOfRange
        Outside 1e4 to 1e11.

    Notes
    -----
    Laminar up to 1e7, turbulent above.

    Examples
    --------
    >>> stirring_plate_nusselt(1e6)
    17.08

    References
    ----------
    Incropera et al., 6th ed., eq. 9.30 and 9.31.
    """
    _in_range("rayleigh", rayleigh, 1e4, 1e11)
    return 0.54 * rayleigh**0.25 if rayleigh <= 1e7 else 0.15 * rayleigh ** (1.0 / 3.0)


def still_plate_nusselt(rayleigh: float) -> float:
    """Natural convection where layers are stable: underside of a warm plate, upper side of a cold one. [-]

    Parameters
    ----------
    rayleigh : float
        On area over perimeter, 1e5 to 1e10. [-]

    Returns
    -------
    float
        Nusselt number on area over perimeter. [-]

    Raises
    ------
    InputOutOfRange
        Outside 1e5 to 1e10.

    Notes
    -----
    Laminar throughout.

    Examples
    --------
    >>> still_plate_nusselt(1e6)
    8.538

    References
    ----------
    Incropera et al., 6th ed., eq. 9.32.
    """
    _in_range("rayleigh", rayleigh, 1e5, 1e10)
    return 0.27 * rayleigh**0.25


def horizontal_cylinder_nusselt(rayleigh: float, prandtl: float) -> float:
    """Natural convection around a lying cylinder. [-]

    Parameters
    ----------
    rayleigh : float
        On the diameter, up to 1e12. [-]
    prandtl : float
        Of the fluid. [-]

    Returns
    -------
    float
        Nusselt number on the diameter. [-]

    Raises
    ------
    InputOutOfRange
        Above 1e12 or below 0.

    Notes
    -----
    Long cylinders.

    Examples
    --------
    >>> horizontal_cylinder_nusselt(1e6, 0.71)
    14.54

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.34.
    """
    _in_range("rayleigh", rayleigh, 0.0, 1e12)
    return (0.60 + 0.387 * rayleigh ** (1.0 / 6.0) / _prandtl_factor(prandtl, 0.559) ** (8.0 / 27.0)) ** 2


def tall_enclosure_nusselt(rayleigh: float, prandtl: float, slenderness: float) -> float:
    """Natural convection across an upright gap, such as between panes. [-]

    Parameters
    ----------
    rayleigh : float
        On the width of the gap, 1e4 to 1e7. [-]
    prandtl : float
        Of the fluid. [-]
    slenderness : float
        Height over width, 10 to 40. [-]

    Returns
    -------
    float
        Nusselt number on the width. [-]

    Raises
    ------
    InputOutOfRange
        Outside the two ranges.

    Notes
    -----
    Never below pure conduction, 1.

    Examples
    --------
    >>> tall_enclosure_nusselt(10502.13411, 0.7344, 40.0)
    1.4007

    References
    ----------
    MacGregor and Emery (1969) in Incropera et al., 6th ed., eq. 9.52.
    """
    _in_range("rayleigh", rayleigh, 1e4, 1e7)
    _in_range("slenderness", slenderness, 10.0, 40.0)
    return max(1.0, 0.42 * rayleigh**0.25 * prandtl**0.012 * slenderness**-0.3)


def radiation_film_w_per_m2_k(*, surface_c: float, surroundings_c: float, emissivity: float) -> float:
    """Radiation between a surface and what it sees, per degree of difference. [W/m²·K]

    Parameters
    ----------
    surface_c : float
        Surface temperature. [°C]
    surroundings_c : float
        Temperature of what it sees. [°C]
    emissivity : float
        Effective emissivity, 0 to 1. [-]

    Returns
    -------
    float
        ``eps sigma (T1² + T2²)(T1 + T2)``. [W/m²·K]

    Notes
    -----
    Exact for grey surfaces; ``4 eps sigma T³`` where the two temperatures are equal.

    Examples
    --------
    >>> radiation_film_w_per_m2_k(surface_c=-20.0, surroundings_c=-20.0, emissivity=0.9)
    3.312

    References
    ----------
    Incropera et al., 6th ed., eq. 1.9.
    """
    one, two = surface_c + ZERO_CELSIUS_K, surroundings_c + ZERO_CELSIUS_K
    return emissivity * STEFAN_BOLTZMANN_W_PER_M2_K4 * (one**2 + two**2) * (one + two)


def facing_emissivity(one: float, other: float) -> float:
    """Effective emissivity of two surfaces that face each other. [-]

    Parameters
    ----------
    one : float
        Emissivity of the one surface. [-]
    other : float
        Emissivity of the other. [-]

    Returns
    -------
    float
        ``1 / (1/e1 + 1/e2 - 1)``. [-]

    Notes
    -----
    Large parallel surfaces.

    Examples
    --------
    >>> facing_emissivity(0.9, 0.9)
    0.818

    References
    ----------
    Incropera et al., 6th ed., ch. 13.
    """
    return 1.0 / (1.0 / one + 1.0 / other - 1.0)


def surface_resistance_m2_k_per_w(direction: str) -> float:
    """Standard surface resistance by the direction of the heat. [m²·K/W]

    Parameters
    ----------
    direction : str
        ``up``, ``sideways``, ``down`` for still air indoors, ``outside`` for outdoors. [-]

    Returns
    -------
    float
        Convection and radiation together. [m²·K/W]

    Notes
    -----
    Building surfaces of high emissivity.

    Examples
    --------
    >>> surface_resistance_m2_k_per_w("sideways")
    0.13

    References
    ----------
    ISO 6946:2017, Table 7 (0.13 and 0.04 published, the others from memory).
    """
    return _SURFACE_RESISTANCE_M2_K_PER_W[direction]


def still_air_layer_m2_k_per_w(thickness_m: float, direction: str) -> float:
    """Resistance of an unventilated air layer between surfaces of high emissivity. [m²·K/W]

    Parameters
    ----------
    thickness_m : float
        Of the layer, 0 to 0.3. [m]
    direction : str
        Of the heat: ``up``, ``sideways`` or ``down``. [-]

    Returns
    -------
    float
        Resistance, straight between the table's thicknesses. [m²·K/W]

    Raises
    ------
    InputOutOfRange
        Thicker than 0.3 m.

    Notes
    -----
    Wide layers without ventilation.

    Examples
    --------
    >>> still_air_layer_m2_k_per_w(0.02, "sideways")
    0.175

    References
    ----------
    ISO 6946:2017, Table 8 (from memory).
    """
    _in_range("thickness_m", thickness_m, 0.0, 0.3)
    return float(np.interp(thickness_m * 1000.0, _AIR_LAYER_MM, _AIR_LAYER_M2_K_PER_W[direction]))


@dataclass(frozen=True)
class FilmLaw:
    """Natural convection as the engine evaluates it, for one surface in air.

    ``h = (base + gain |dT|^exponent)² (1 - per_k (film - reference_c))``, in W/m²·K, with the film at the mean of
    air and surface. With exponent 1/6 this is exactly the relation of Churchill and Chu for the air of the
    reference temperature, and, with base 0, a law of the third root; with 1/8 and base 0 of the fourth root.
    """

    base: float
    gain: float
    exponent: float
    reference_c: float
    per_k: float

    def convection_w_per_m2_k(self, surface_c: float, air_c: float) -> float:
        """Convection alone between a surface and the air. [W/m²·K]"""
        rise: float = abs(air_c - surface_c) ** self.exponent
        film_c = 0.5 * (surface_c + air_c)
        return (self.base + self.gain * rise) ** 2 * (1.0 - self.per_k * (film_c - self.reference_c))

    def film_w_per_m2_k(self, *, surface_c: float, air_c: float, emissivity: float) -> float:
        """Convection and radiation between a surface and the air. [W/m²·K]"""
        radiation = radiation_film_w_per_m2_k(
            surface_c=surface_c, surroundings_c=air_c, emissivity=emissivity
        )
        return self.convection_w_per_m2_k(surface_c, air_c) + radiation


def vertical_plate_law(*, height_m: float, reference_c: float) -> FilmLaw:
    """Convection along an upright plate in air, in the engine's form.

    Parameters
    ----------
    height_m : float
        Of the plate, greater than 0. [m]
    reference_c : float
        Film temperature at which it is exact. [°C]

    Returns
    -------
    FilmLaw
        Churchill and Chu's relation for air. [W/m²·K]

    Raises
    ------
    InputOutOfRange
        Height not greater than 0, or air outside -100 to 100 °C.

    Notes
    -----
    Exact in the difference; within 1 % for film temperatures 25 K to either side of the reference.

    Examples
    --------
    >>> law = vertical_plate_law(height_m=2.0, reference_c=-15.0)
    >>> law.convection_w_per_m2_k(-20.0, -10.0)
    3.304

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.26.
    """
    if not height_m > 0.0:
        raise InputOutOfRange("height_m", height_m, "m", 0.0, None)

    def parts(at_c: float) -> tuple[float, float]:
        air = air_properties(at_c)
        per_difference = rayleigh_number(
            difference_k=1.0,
            length_m=height_m,
            expansion_per_k=1.0 / (at_c + ZERO_CELSIUS_K),
            viscosity_m2_per_s=air.viscosity_m2_per_s,
            diffusivity_m2_per_s=air.diffusivity_m2_per_s,
        )
        scale = math.sqrt(air.conductivity_w_per_m_k / height_m)
        factor = _prandtl_factor(air.prandtl, 0.492) ** (8.0 / 27.0)
        return 0.825 * scale, 0.387 * per_difference ** (1.0 / 6.0) / factor * scale

    return _law(parts, reference_c)


def horizontal_cylinder_law(*, diameter_m: float, reference_c: float) -> FilmLaw:
    """Convection around a lying cylinder in air, in the engine's form.

    Parameters
    ----------
    diameter_m : float
        Of the cylinder, greater than 0. [m]
    reference_c : float
        Film temperature at which it is exact. [°C]

    Returns
    -------
    FilmLaw
        Churchill and Chu's relation for air. [W/m²·K]

    Raises
    ------
    InputOutOfRange
        Diameter not greater than 0, or air outside -100 to 100 °C.

    Notes
    -----
    Exact in the difference; within 1 % for film temperatures 25 K to either side of the reference.

    Examples
    --------
    >>> law = horizontal_cylinder_law(diameter_m=0.1, reference_c=0.0)
    >>> law.convection_w_per_m2_k(-5.0, 5.0)
    4.0

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.34.
    """
    if not diameter_m > 0.0:
        raise InputOutOfRange("diameter_m", diameter_m, "m", 0.0, None)

    def parts(at_c: float) -> tuple[float, float]:
        air = air_properties(at_c)
        per_difference = rayleigh_number(
            difference_k=1.0,
            length_m=diameter_m,
            expansion_per_k=1.0 / (at_c + ZERO_CELSIUS_K),
            viscosity_m2_per_s=air.viscosity_m2_per_s,
            diffusivity_m2_per_s=air.diffusivity_m2_per_s,
        )
        scale = math.sqrt(air.conductivity_w_per_m_k / diameter_m)
        factor = _prandtl_factor(air.prandtl, 0.559) ** (8.0 / 27.0)
        return 0.60 * scale, 0.387 * per_difference ** (1.0 / 6.0) / factor * scale

    return _law(parts, reference_c)


@compiled
def film_flow_w(
    surface_c: float,
    air_c: float,
    area_m2: float,
    base: float,
    gain: float,
    is_sixth: float,
    reference_c: float,
    per_k: float,
    emissivity: float,
    series_k_per_w: float,
) -> tuple[float, float, float]:
    """Heat flow from still air into a body behind its surface, and its change with the two temperatures.

    Parameters
    ----------
    surface_c : float
        Temperature of the body, behind the series resistance. [°C]
    air_c : float
        Temperature of air and walls. [°C]
    area_m2 : float
        Surface. [m²]
    base : float
        Of the ``FilmLaw``. [-]
    gain : float
        Of the ``FilmLaw``. [-]
    is_sixth : float
        Greater than 0 where the law's exponent is 1/6, else it is 1/8. [-]
    reference_c : float
        Of the ``FilmLaw``. [°C]
    per_k : float
        Of the ``FilmLaw``. [1/K]
    emissivity : float
        Of the surface. [-]
    series_k_per_w : float
        Resistance between the surface and the body's temperature. [K/W]

    Returns
    -------
    tuple of float
        Flow into the body, and its derivatives by surface and by air temperature. [W, W/K, W/K]

    Notes
    -----
    The film is taken at the difference between air and body: where much of it lies in the series resistance
    it is a little high, so the body warms a little fast.

    Examples
    --------
    >>> flow, _, _ = film_flow_w(0.0, 10.0, 1.0, 2.0, 0.0, 1.0, 0.0, 0.0, 0.0, 0.0)
    >>> flow
    40.0

    References
    ----------
    ``FilmLaw`` and the exact law of radiation in series with a resistance.
    """
    difference = air_c - surface_c
    size = abs(difference)
    if is_sixth > 0.0:
        rise, exponent = np.cbrt(math.sqrt(size)), 1.0 / 6.0
    else:
        rise, exponent = math.sqrt(math.sqrt(math.sqrt(size))), 1.0 / 8.0
    root = base + gain * rise
    warmth = max(1.0 - per_k * (0.5 * (surface_c + air_c) - reference_c), 0.2)
    bend = -0.5 * per_k * root * root if warmth > 0.2 else 0.0
    one, two = surface_c + ZERO_CELSIUS_K, air_c + ZERO_CELSIUS_K
    squares = one * one + two * two
    grey = STEFAN_BOLTZMANN_W_PER_M2_K4 * emissivity
    film = area_m2 * max(root * root * warmth + grey * squares * (one + two), _LEAST_FILM_W_PER_M2_K)
    conductance = 1.0 / (1.0 / film + series_k_per_w)
    share = conductance / film
    # difference times the change of the film with |difference|, and with each temperature
    steep = 2.0 * root * gain * rise * exponent * warmth
    by_surface = area_m2 * (-steep + difference * (bend + grey * (2.0 * one * (one + two) + squares)))
    by_air = area_m2 * (steep + difference * (bend + grey * (2.0 * two * (one + two) + squares)))
    return (
        conductance * difference,
        -conductance + share * share * by_surface,
        conductance + share * share * by_air,
    )


_LEAST_FILM_W_PER_M2_K = 1e-6
"""Keeps a law without base or radiation above 0 where there is no difference."""


def _law(parts: object, reference_c: float) -> FilmLaw:
    """The law at the reference, with its slope in film temperature at the usual difference."""
    rise = _USUAL_DIFFERENCE_K ** (1.0 / 6.0)

    def film(at_c: float) -> float:
        base, gain = parts(at_c)  # type: ignore[operator]
        value: float = (base + gain * rise) ** 2
        return value

    base, gain = parts(reference_c)  # type: ignore[operator]
    per_k = (film(reference_c - 10.0) - film(reference_c + 10.0)) / (20.0 * film(reference_c))
    return FilmLaw(base, gain, 1.0 / 6.0, reference_c, per_k)


def _prandtl_factor(prandtl: float, constant: float) -> float:
    return 1.0 + (constant / prandtl) ** (9.0 / 16.0)


def _in_range(name: str, value: float, low: float, high: float) -> None:
    if not low <= value <= high:
        raise InputOutOfRange(name, value, "", low, high)
