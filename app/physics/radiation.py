"""Heat that surfaces send each other by radiation, per degree of difference.

Called by ``films`` and by ``stores``.
"""

from __future__ import annotations

from app.units import STEFAN_BOLTZMANN_W_PER_M2_K4, ZERO_CELSIUS_K


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
