"""What food is made of: density, specific heat and conductivity of its components.

``foods`` mixes them.
"""

from __future__ import annotations

from app.errors import UnknownKey

# value at 0 °C, per °C, per °C²: Choi and Okos (1986), ASHRAE Refrigeration 2006, ch. 9, Tables 1 and 2
_DENSITY = {
    "protein": (1329.9, -0.51840, 0.0),
    "fat": (925.59, -0.41757, 0.0),
    "carbohydrate": (1599.1, -0.31046, 0.0),
    "fibre": (1311.5, -0.36589, 0.0),
    "ash": (2423.8, -0.28063, 0.0),
    "water": (997.18, 3.1439e-3, -3.7574e-3),
    "ice": (916.89, -0.13071, 0.0),
}
# Two constants circulate for liquid water, 4176.2 and 4128.9: only 4176.2 gives the handbook's own products.
# Its polynomial for below 0 °C is left out: unfrozen water in food is covered by the freezing range.
_SPECIFIC_HEAT = {
    "protein": (2008.2, 1.2089, -1.3129e-3),
    "fat": (1984.2, 1.4733, -4.8008e-3),
    "carbohydrate": (1548.8, 1.9625, -5.9399e-3),
    "fibre": (1845.9, 1.8306, -4.6509e-3),
    "ash": (1092.6, 1.8896, -3.6817e-3),
    "water": (4176.2, -9.0864e-2, 5.4731e-3),
    "ice": (2062.3, 6.0769, 0.0),
}
_CONDUCTIVITY = {
    "protein": (0.17881, 1.1958e-3, -2.7178e-6),
    "fat": (0.18071, -2.7604e-4, -1.7749e-7),
    "carbohydrate": (0.20141, 1.3874e-3, -4.3312e-6),
    "fibre": (0.18331, 1.2497e-3, -3.1683e-6),
    "ash": (0.32962, 1.4011e-3, -2.9069e-6),
    "water": (0.57109, 1.7625e-3, -6.7036e-6),
    "ice": (2.2196, -6.2489e-3, 1.0154e-4),
}


def component_specific_heat_j_per_kg_k(component: str, temperature_c: float) -> float:
    """Specific heat of one component of food. [J/kg·K]

    Parameters
    ----------
    component : str
        ``water``, ``ice``, ``protein``, ``fat``, ``carbohydrate``, ``fibre`` or ``ash``. [-]
    temperature_c : float
        Of the component. [°C]

    Returns
    -------
    float
        Specific heat. [J/kg·K]

    Raises
    ------
    UnknownKey
        Another component.

    Notes
    -----
    Valid -40 to 150 °C, ice to 0 °C; liquid water from 0 °C.

    Examples
    --------
    >>> component_specific_heat_j_per_kg_k("water", 5.0)
    4175.9

    References
    ----------
    Choi and Okos (1986), ASHRAE Handbook Refrigeration 2006, ch. 9, Tables 1 and 2.
    """
    return _polynomial(_SPECIFIC_HEAT, component, temperature_c)


def component_density_kg_per_m3(component: str, temperature_c: float) -> float:
    """Density of one component of food. [kg/m³]

    Parameters
    ----------
    component : str
        As for the specific heat. [-]
    temperature_c : float
        Of the component. [°C]

    Returns
    -------
    float
        Density. [kg/m³]

    Raises
    ------
    UnknownKey
        Another component.

    Notes
    -----
    Valid -40 to 150 °C.

    Examples
    --------
    >>> component_density_kg_per_m3("ice", -20.0)
    919.5

    References
    ----------
    Choi and Okos (1986), ASHRAE Handbook Refrigeration 2006, ch. 9, Tables 1 and 2.
    """
    return _polynomial(_DENSITY, component, temperature_c)


def component_conductivity_w_per_m_k(component: str, temperature_c: float) -> float:
    """Thermal conductivity of one component of food. [W/m·K]

    Parameters
    ----------
    component : str
        As for the specific heat. [-]
    temperature_c : float
        Of the component. [°C]

    Returns
    -------
    float
        Conductivity. [W/m·K]

    Raises
    ------
    UnknownKey
        Another component.

    Notes
    -----
    Valid -40 to 150 °C.

    Examples
    --------
    >>> component_conductivity_w_per_m_k("water", 0.0)
    0.5711

    References
    ----------
    Choi and Okos (1986), ASHRAE Handbook Refrigeration 2006, ch. 9, Tables 1 and 2.
    """
    return _polynomial(_CONDUCTIVITY, component, temperature_c)


def _polynomial(table: dict[str, tuple[float, float, float]], component: str, temperature_c: float) -> float:
    if component not in table:
        raise UnknownKey("component", component, tuple(table))
    constant, linear, square = table[component]
    return constant + linear * temperature_c + square * temperature_c**2
