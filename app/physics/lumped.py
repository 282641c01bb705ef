"""Closed forms for a store as one lump: the working that a calculator can follow.

The hand check and the tests use them; the network knows more.
"""

from __future__ import annotations

import math

from app.errors import InputOutOfRange, UnknownKey


def warming_time_s(
    *,
    heat_capacity_j_per_k: float,
    heat_leak_w_per_k: float,
    surroundings_c: float,
    start_c: float,
    end_c: float,
) -> float:
    """Time in which a lump warms from one temperature to another. [s]

    Parameters
    ----------
    heat_capacity_j_per_k : float
        Of the lump. [J/K]
    heat_leak_w_per_k : float
        Between lump and surroundings. [W/K]
    surroundings_c : float
        Constant. [°C]
    start_c : float
        First temperature. [°C]
    end_c : float
        Last temperature, between the first and the surroundings. [°C]

    Returns
    -------
    float
        ``C / UA ln((Ts - T0) / (Ts - T1))``. [s]

    Raises
    ------
    InputOutOfRange
        End not between start and surroundings.

    Notes
    -----
    Constant capacity, no melting.

    Examples
    --------
    >>> warming_time_s(heat_capacity_j_per_k=210e3, heat_leak_w_per_k=5, surroundings_c=30, start_c=-25, end_c=0)
    25457.7

    References
    ----------
    Incropera et al., 6th ed., eq. 5.5.
    """
    left = (surroundings_c - end_c) / (surroundings_c - start_c) if surroundings_c != start_c else math.nan
    if not 0.0 < left <= 1.0:
        raise InputOutOfRange("end_c", end_c, "°C", min(start_c, surroundings_c), max(start_c, surroundings_c))
    return -heat_capacity_j_per_k / heat_leak_w_per_k * math.log(left)


def melting_time_s(*, melting_j: float, heat_leak_w_per_k: float, surroundings_c: float, melting_c: float) -> float:
    """Time in which a plateau lasts. [s]

    Parameters
    ----------
    melting_j : float
        Heat of fusion of all that melts. [J]
    heat_leak_w_per_k : float
        Between lump and surroundings. [W/K]
    surroundings_c : float
        Constant, above the melting point. [°C]
    melting_c : float
        Melting point. [°C]

    Returns
    -------
    float
        ``L / UA (Ts - Tm)``. [s]

    Raises
    ------
    InputOutOfRange
        Surroundings not warmer than the melting point.

    Notes
    -----
    One melting point.

    Examples
    --------
    >>> melting_time_s(melting_j=33.4e6, heat_leak_w_per_k=5, surroundings_c=30, melting_c=0)
    222666.7

    References
    ----------
    Heat balance.
    """
    if not surroundings_c > melting_c:
        raise InputOutOfRange("surroundings_c", surroundings_c, "°C", melting_c, None)
    return melting_j / (heat_leak_w_per_k * (surroundings_c - melting_c))


def day_swing(*, time_constant_s: float, swing_k: float, period_s: float) -> tuple[float, float]:
    """Swing of a lump in surroundings that swing, and how late it comes. [K, s]

    Parameters
    ----------
    time_constant_s : float
        Capacity over leak. [s]
    swing_k : float
        Half of the difference between the warmest and the coldest surroundings. [K]
    period_s : float
        Of the swing. [s]

    Returns
    -------
    tuple of float
        Swing of the lump and its lag. [K, s]

    Notes
    -----
    After the start has been forgotten.

    Examples
    --------
    >>> swing, lag = day_swing(time_constant_s=36 * 3600, swing_k=8, period_s=86400)
    >>> round(swing, 4), round(lag / 3600, 4)
    (0.8441, 5.5962)

    References
    ----------
    First-order response to a sine.
    """
    turned = 2.0 * math.pi / period_s * time_constant_s
    return swing_k / math.sqrt(1.0 + turned**2), math.atan(turned) * period_s / (2.0 * math.pi)


def effective_film_w_per_m2_k(
    *, film_w_per_m2_k: float, length_m: float, conductivity_w_per_m_k: float, shape: str
) -> float:
    """Film that lets one lump stand for a body with an inside resistance. [W/m²·K]

    Parameters
    ----------
    film_w_per_m2_k : float
        At the surface. [W/m²·K]
    length_m : float
        Half thickness of a slab, radius of a cylinder or sphere. [m]
    conductivity_w_per_m_k : float
        Of the body. [W/m·K]
    shape : str
        ``slab``, ``cylinder`` or ``sphere``. [-]

    Returns
    -------
    float
        ``1 / (1/h + L/(n k))`` with n 3, 4, 5. [W/m²·K]

    Raises
    ------
    UnknownKey
        Another shape.

    Notes
    -----
    Slowest rate within 1.3 % up to a Biot number of 1.

    Examples
    --------
    >>> effective_film_w_per_m2_k(film_w_per_m2_k=1.0, length_m=1.0, conductivity_w_per_m_k=1.0, shape="slab")
    0.75

    References
    ----------
    Parabolic profile; similar corrections in Ostrogorsky (2009), J. Heat Transfer 131:011303.
    """
    parts = {"slab": 3.0, "cylinder": 4.0, "sphere": 5.0}
    if shape not in parts:
        raise UnknownKey("shape", shape, tuple(parts))
    return 1.0 / (1.0 / film_w_per_m2_k + length_m / (parts[shape] * conductivity_w_per_m_k))
