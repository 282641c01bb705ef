"""What fields of many models ask for: lengths, temperatures, times, and the properties of materials.

Each use gives its own label where it needs one. Called by ``definition``, ``shell`` and ``rooms``.
"""

from __future__ import annotations

from app.stores.fields import Ask


def length(label: str, low: float, high: float, hint: str = "") -> Ask:
    """A length. [m]"""
    return Ask(label, "m", "metres", low, high, hint)


def temperature(label: str, low: float = -120.0, high: float = 60.0, hint: str = "") -> Ask:
    """A temperature. [°C]"""
    return Ask(label, "°C", "degrees Celsius", low, high, hint)


def hours(label: str, low: float = 0.0, high: float = 8760.0, hint: str = "") -> Ask:
    """A time. [h]"""
    return Ask(label, "h", "hours", low, high, hint)


def fraction(label: str, hint: str = "") -> Ask:
    """A share of a whole. [-]"""
    return Ask(label, "", "as a fraction of 1", 0.0, 1.0, hint)


CONDUCTIVITY = Ask("Conductivity", "W/m·K", "watts per metre and kelvin", 0.001, 500.0)
DENSITY = Ask("Density", "kg/m³", "kilograms per cubic metre", 1.0, 12000.0)
SPECIFIC_HEAT = Ask("Specific heat", "J/kg·K", "joules per kilogram and kelvin", 100.0, 10000.0)
FILM = Ask(
    "Film coefficient",
    "W/m²·K",
    "watts per square metre and kelvin",
    0.05,
    10000.0,
    "Convection and radiation together, held constant.",
)
U_VALUE = Ask("U-value", "W/m²·K", "watts per square metre and kelvin", 0.01, 10.0, "Air to air, films included.")
MASS = Ask("Mass", "kg", "kilograms", 0.001, 1_000_000.0)
