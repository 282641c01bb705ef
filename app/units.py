"""Conversions at the edge of the program, and the physical constants, each written once.

Inside, one unit per quantity: degrees Celsius, seconds, joules, watts, kilograms, metres. Hours,
kilowatt-hours and Fahrenheit live in definitions, forms and reports only and are converted here.
"""

from scipy import constants

ZERO_CELSIUS_K: float = constants.zero_Celsius
STEFAN_BOLTZMANN_W_PER_M2_K4: float = constants.Stefan_Boltzmann
STANDARD_GRAVITY_M_PER_S2: float = constants.g
STANDARD_PRESSURE_PA: float = constants.atm
GAS_CONSTANT_J_PER_MOL_K: float = constants.R

_SECONDS_PER_HOUR: float = constants.hour
_JOULES_PER_KWH: float = 1000.0 * constants.hour


def kelvin_from_celsius(temperature_c: float) -> float:
    """Absolute temperature of a Celsius one. [K]"""
    return temperature_c + ZERO_CELSIUS_K


def celsius_from_kelvin(temperature_k: float) -> float:
    """Celsius temperature of an absolute one. [°C]"""
    return temperature_k - ZERO_CELSIUS_K


def fahrenheit_from_celsius(temperature_c: float) -> float:
    """Fahrenheit temperature of a Celsius one. [°F]"""
    return 1.8 * temperature_c + 32.0


def celsius_from_fahrenheit(temperature_f: float) -> float:
    """Celsius temperature of a Fahrenheit one. [°C]"""
    return (temperature_f - 32.0) / 1.8


def seconds_from_hours(time_h: float) -> float:
    """Seconds in so many hours. [s]"""
    return time_h * _SECONDS_PER_HOUR


def hours_from_seconds(time_s: float) -> float:
    """Hours in so many seconds. [h]"""
    return time_s / _SECONDS_PER_HOUR


def joules_from_kwh(energy_kwh: float) -> float:
    """Joules in so many kilowatt-hours. [J]"""
    return energy_kwh * _JOULES_PER_KWH


def kwh_from_joules(energy_j: float) -> float:
    """Kilowatt-hours in so many joules. [kWh]"""
    return energy_j / _JOULES_PER_KWH


def seconds_from_minutes(time_min: float) -> float:
    """Seconds in so many minutes. [s]"""
    return time_min * constants.minute
