"""Natural convection and radiation at surfaces in the form the engine evaluates in its innermost loop.

There only the two temperatures change: a ``FilmLaw`` holds the rest of a published relation of ``convection`` as
numbers. Called by ``stores``, which chooses a law for each surface, and by the engine.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from app.compiled import compiled
from app.errors import InputOutOfRange
from app.physics.air import air_properties
from app.physics.convection import prandtl_factor, rayleigh_number
from app.physics.radiation import radiation_film_w_per_m2_k
from app.units import STEFAN_BOLTZMANN_W_PER_M2_K4, ZERO_CELSIUS_K

_USUAL_DIFFERENCE_K = 5.0
"""Between surface and air in a store without power; where a law is fitted to the warmth of the film."""

_SURFACE_ROUNDS = 4
"""Of Newton's method for a surface between film and resistance: 1e-7 of the flow up to ten times the film's."""

_LEAST_FILM_W_PER_M2_K = 1e-6
"""Keeps a law without base or radiation above 0 where there is no difference."""


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
        radiation = radiation_film_w_per_m2_k(surface_c=surface_c, surroundings_c=air_c, emissivity=emissivity)
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
    Within 2 % of the relation with reference air, for differences of 1 to 40 K and film temperatures 25 K to
    either side of the reference; 1 % within 15 K of it.

    Examples
    --------
    >>> law = vertical_plate_law(height_m=2.0, reference_c=-15.0)
    >>> law.convection_w_per_m2_k(-20.0, -10.0)
    3.325

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.26.
    """
    if not height_m > 0.0:
        raise InputOutOfRange("height_m", height_m, "m", 0.0, None)

    return _root_law(0.825, 0.387, 0.492, height_m, reference_c)


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
    Within 2 % of the relation with reference air, for differences of 1 to 40 K and film temperatures 25 K to
    either side of the reference; 1 % within 15 K of it.

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

    return _root_law(0.60, 0.387, 0.559, diameter_m, reference_c)


def stirring_plate_law(*, area_over_perimeter_m: float, reference_c: float) -> FilmLaw:
    """Convection where it stirs, in the engine's form: underside of a cold plate, upper side of a warm one.

    Parameters
    ----------
    area_over_perimeter_m : float
        Of the plate, greater than 0. [m]
    reference_c : float
        Film temperature at which it is exact. [°C]

    Returns
    -------
    FilmLaw
        Fourth root up to a Rayleigh number of 1e7 at 5 K, third root above. [W/m²·K]

    Raises
    ------
    InputOutOfRange
        Rayleigh number at 5 K outside 1e4 to 1e11, or air outside -100 to 100 °C.

    Notes
    -----
    Within 2 % of the relation for film temperatures 25 K to either side of the reference. The root is chosen
    once, at 5 K: where the relation changes root between, up to 15 %.

    Examples
    --------
    >>> law = stirring_plate_law(area_over_perimeter_m=0.5, reference_c=0.0)
    >>> law.convection_w_per_m2_k(-2.5, 2.5)
    3.271

    References
    ----------
    Incropera et al., 6th ed., eq. 9.30 and 9.31.
    """
    rayleigh = _rayleigh_per_k(area_over_perimeter_m, reference_c) * _USUAL_DIFFERENCE_K
    if not 1e4 <= rayleigh <= 1e11:
        raise InputOutOfRange("rayleigh", rayleigh, "", 1e4, 1e11)
    if rayleigh <= 1e7:
        return _power_law(0.54, 1.0 / 4.0, area_over_perimeter_m, reference_c)
    return _power_law(0.15, 1.0 / 3.0, area_over_perimeter_m, reference_c)


def still_plate_law(*, area_over_perimeter_m: float, reference_c: float) -> FilmLaw:
    """Convection over stable layers, in the engine's form: upper side of a cold plate, underside of a warm one.

    Parameters
    ----------
    area_over_perimeter_m : float
        Of the plate, greater than 0. [m]
    reference_c : float
        Film temperature at which it is exact. [°C]

    Returns
    -------
    FilmLaw
        A law of the fourth root. [W/m²·K]

    Raises
    ------
    InputOutOfRange
        Rayleigh number at 5 K outside 1e5 to 1e10, or air outside -100 to 100 °C.

    Notes
    -----
    Within 2 % of the relation for film temperatures 25 K to either side of the reference.

    Examples
    --------
    >>> law = still_plate_law(area_over_perimeter_m=0.5, reference_c=0.0)
    >>> law.convection_w_per_m2_k(-2.5, 2.5)
    1.280

    References
    ----------
    Incropera et al., 6th ed., eq. 9.32.
    """
    rayleigh = _rayleigh_per_k(area_over_perimeter_m, reference_c) * _USUAL_DIFFERENCE_K
    if not 1e5 <= rayleigh <= 1e10:
        raise InputOutOfRange("rayleigh", rayleigh, "", 1e5, 1e10)
    return _power_law(0.27, 1.0 / 4.0, area_over_perimeter_m, reference_c)


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
    The film is taken at the surface itself, whose temperature follows from the balance of film and resistance.

    Examples
    --------
    >>> flow, _, _ = film_flow_w(0.0, 10.0, 1.0, 2.0, 0.0, 1.0, 0.0, 0.0, 0.0, 0.0)
    >>> flow
    40.0

    References
    ----------
    ``FilmLaw`` and the exact law of radiation in series with a resistance.
    """
    at_c = surface_c
    flow, by_surface, by_air = _surface_flow_w(
        at_c, air_c, area_m2, base, gain, is_sixth, reference_c, per_k, emissivity
    )
    if series_k_per_w <= 0.0:
        return flow, by_surface, by_air
    inward = 1.0 / series_k_per_w
    for _ in range(_SURFACE_ROUNDS):
        at_c -= (inward * (at_c - surface_c) - flow) / (inward - by_surface)
        flow, by_surface, by_air = _surface_flow_w(
            at_c, air_c, area_m2, base, gain, is_sixth, reference_c, per_k, emissivity
        )
    share = inward / (inward - by_surface)
    return inward * (at_c - surface_c), share * by_surface, share * by_air


@compiled
def _surface_flow_w(
    surface_c: float,
    air_c: float,
    area_m2: float,
    base: float,
    gain: float,
    is_sixth: float,
    reference_c: float,
    per_k: float,
    emissivity: float,
) -> tuple[float, float, float]:
    """Heat flow from still air into a surface, and its change with the two temperatures. [W, W/K, W/K]"""
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
    # difference times the change of the film with |difference|, and with each temperature
    steep = 2.0 * root * gain * rise * exponent * warmth
    by_surface = area_m2 * (-steep + difference * (bend + grey * (2.0 * one * (one + two) + squares)))
    by_air = area_m2 * (steep + difference * (bend + grey * (2.0 * two * (one + two) + squares)))
    return film * difference, -film + by_surface, film + by_air


def _root_law(base: float, gain: float, prandtl_constant: float, length_m: float, reference_c: float) -> FilmLaw:
    """``Nu = (base + gain Ra^(1/6) / (1 + (constant/Pr)^(9/16))^(8/27))²`` in the engine's form."""

    def parts(at_c: float) -> tuple[float, float]:
        air = air_properties(at_c)
        factor = prandtl_factor(air.prandtl, prandtl_constant) ** (8.0 / 27.0)
        scale = math.sqrt(air.conductivity_w_per_m_k / length_m)
        return base * scale, gain * _rayleigh_per_k(length_m, at_c) ** (1.0 / 6.0) / factor * scale

    return _law(parts, 1.0 / 6.0, reference_c)


def _power_law(factor: float, power: float, length_m: float, reference_c: float) -> FilmLaw:
    """``Nu = factor Ra^power`` in the engine's form."""

    def parts(at_c: float) -> tuple[float, float]:
        film = factor * air_properties(at_c).conductivity_w_per_m_k / length_m
        return 0.0, math.sqrt(film * _rayleigh_per_k(length_m, at_c) ** power)

    return _law(parts, power / 2.0, reference_c)


def _law(parts: Callable[[float], tuple[float, float]], exponent: float, reference_c: float) -> FilmLaw:
    """The law at the reference, with its slope in film temperature at the usual difference."""
    rise = _USUAL_DIFFERENCE_K**exponent

    def film(at_c: float) -> float:
        base, gain = parts(at_c)
        return float((base + gain * rise) ** 2)

    per_k = (film(reference_c - 10.0) - film(reference_c + 10.0)) / (20.0 * film(reference_c))
    return FilmLaw(*parts(reference_c), exponent, reference_c, per_k)


def _rayleigh_per_k(length_m: float, film_c: float) -> float:
    """Rayleigh number of air for a difference of 1 K."""
    air = air_properties(film_c)
    return rayleigh_number(
        difference_k=1.0,
        length_m=length_m,
        expansion_per_k=1.0 / (film_c + ZERO_CELSIUS_K),
        viscosity_m2_per_s=air.viscosity_m2_per_s,
        diffusivity_m2_per_s=air.diffusivity_m2_per_s,
    )
