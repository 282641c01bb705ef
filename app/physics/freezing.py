"""Where the water of food begins to freeze, and how much of it is ice below.

``foods`` builds the enthalpy curve on it.
"""

from __future__ import annotations

import math

from app.errors import UnknownKey
from app.units import celsius_from_kelvin

# kelvin at no water, per water, per water²: Chang and Tao (1981) in ASHRAE Refrigeration 2006, ch. 9
_FREEZING_POINT_K = {
    "meat": (271.18, 1.47, 0.0),
    "fruit or vegetable": (287.56, -49.19, 37.07),
    "juice": (120.47, 327.35, -176.49),
}


def usual_freezing_c(*, kind: str, water: float) -> float:
    """Where a food of a kind begins to freeze, when nobody has measured it. [°C]

    Parameters
    ----------
    kind : str
        ``meat``, ``fruit or vegetable`` or ``juice``. [-]
    water : float
        Water of the unfrozen food, 0.4 to 0.95. [kg/kg]

    Returns
    -------
    float
        Initial freezing point. [°C]

    Raises
    ------
    UnknownKey
        Another kind.

    Notes
    -----
    Within about 1 K of measured points; a measured one is better.

    Examples
    --------
    >>> usual_freezing_c(kind="meat", water=0.73)
    -0.897

    References
    ----------
    Chang and Tao (1981) in ASHRAE Handbook Refrigeration 2006, ch. 9.
    """
    if kind not in _FREEZING_POINT_K:
        raise UnknownKey("kind of food", kind, tuple(_FREEZING_POINT_K))
    constant, linear, square = _FREEZING_POINT_K[kind]
    return celsius_from_kelvin(constant + linear * water + square * water**2)


def ice_fraction(*, free_water: float, initial_freezing_c: float, temperature_c: float) -> float:
    """Ice in a kilogram of food. [kg/kg]

    Parameters
    ----------
    free_water : float
        Water that can freeze, kilograms per kilogram of food. [-]
    initial_freezing_c : float
        Where freezing begins, below 0. [°C]
    temperature_c : float
        Of the food. [°C]

    Returns
    -------
    float
        ``x (1 - tf / t)``, none above the freezing point. [kg/kg]

    Notes
    -----
    Ideal solution; models of ice content differ by 5 to 20 %.

    Examples
    --------
    >>> ice_fraction(free_water=0.741, initial_freezing_c=-2.2, temperature_c=-18.0)
    0.650

    References
    ----------
    Miles (1974), Chen (1985) in ASHRAE Handbook Refrigeration 2006, ch. 9.
    """
    if temperature_c >= initial_freezing_c:
        return 0.0
    return free_water * (1.0 - initial_freezing_c / temperature_c)


def ice_fraction_by_tchigeov(*, water: float, initial_freezing_c: float, temperature_c: float) -> float:
    """Ice in a kilogram of food by an empirical relation, for comparison. [kg/kg]

    Parameters
    ----------
    water : float
        Water of the unfrozen food. [-]
    initial_freezing_c : float
        Where freezing begins, below 0. [°C]
    temperature_c : float
        Of the food. [°C]

    Returns
    -------
    float
        ``1.105 x / (1 + 0.7138 / ln(tf - t + 1))``. [kg/kg]

    Notes
    -----
    Between the freezing point and -45 °C.

    Examples
    --------
    >>> ice_fraction_by_tchigeov(water=0.8122, initial_freezing_c=-2.2, temperature_c=-18.0)
    0.716

    References
    ----------
    Tchigeov (1979) in ASHRAE Handbook Refrigeration 2006, ch. 9.
    """
    if temperature_c >= initial_freezing_c:
        return 0.0
    return 1.105 * water / (1.0 + 0.7138 / math.log(initial_freezing_c - temperature_c + 1.0))
