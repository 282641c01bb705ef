"""Properties of dry air at standard pressure, as far as films and the air of a store need them.

Moisture is left out: it changes the density by less than 2 % at any room. Called by ``films`` and by ``stores``.
"""

from __future__ import annotations

from dataclasses import dataclass

from app.errors import InputOutOfRange
from app.units import STANDARD_PRESSURE_PA, ZERO_CELSIUS_K

AIR_SPECIFIC_HEAT_J_PER_KG_K = 1006.0
"""Of dry air at constant pressure, -100 to 60 °C, within 0.3 % (ASHRAE Fundamentals, ch. 1)."""

_AIR_GAS_CONSTANT_J_PER_KG_K = 287.055
_SUTHERLAND_VISCOSITY = (1.716e-5, 110.4)
_SUTHERLAND_CONDUCTIVITY = (0.0241, 194.0)


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
