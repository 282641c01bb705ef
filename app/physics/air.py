"""Properties of dry air at standard pressure, as far as films and the air of a store need them.

Moisture is left out: it changes the density by less than 2 % at any room. Called by ``films`` and by ``stores``.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

from app.errors import InputOutOfRange
from app.units import STANDARD_PRESSURE_PA, ZERO_CELSIUS_K

AIR_SPECIFIC_HEAT_J_PER_KG_K = 1006.0
"""Of dry air at constant pressure, -100 to 60 °C, within 0.3 % (ASHRAE Fundamentals, ch. 1)."""

_AIR_GAS_CONSTANT_J_PER_KG_K = 287.055

# Lemmon and Jacobsen (2004), dilute gas: molar mass, size and well depth of an air molecule, collision integral
_MOLAR_MASS_G_PER_MOL = 28.9586
_MOLECULE_NM = 0.360
_WELL_DEPTH_K = 103.3
_COLLISION = (0.431, -0.4623, 0.08406, 0.005341, -0.00331)
_CRITICAL_K = 132.6312


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
    Dilute gas, which at standard pressure is within 1 % of dense air for -90 to 60 °C.

    Examples
    --------
    >>> round(air_properties(0.0).conductivity_w_per_m_k, 4)
    0.0243

    References
    ----------
    Lemmon and Jacobsen (2004), Int. J. Thermophysics 25:21-69, dilute-gas terms (constants from memory).
    """
    density = air_density_kg_per_m3(temperature_c)
    kelvin = temperature_c + ZERO_CELSIUS_K
    viscosity_upa_s = _dilute_viscosity_upa_s(kelvin)
    tau = _CRITICAL_K / kelvin
    conductivity = (1.308 * viscosity_upa_s + 1.405 * tau**-1.1 - 1.036 * tau**-0.3) / 1000.0
    return AirProperties(
        density_kg_per_m3=density,
        conductivity_w_per_m_k=conductivity,
        viscosity_m2_per_s=viscosity_upa_s * 1e-6 / density,
        diffusivity_m2_per_s=conductivity / (density * AIR_SPECIFIC_HEAT_J_PER_KG_K),
    )


def _dilute_viscosity_upa_s(kelvin: float) -> float:
    """Dynamic viscosity of thin air, which at 1 atm is that of air within 0.5 %. [µPa·s]"""
    reduced = math.log(kelvin / _WELL_DEPTH_K)
    collision = math.exp(sum(b * reduced**i for i, b in enumerate(_COLLISION)))
    return 0.0266958 * math.sqrt(_MOLAR_MASS_G_PER_MOL * kelvin) / (_MOLECULE_NM**2 * collision)
