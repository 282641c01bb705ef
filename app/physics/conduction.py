"""Conduction where it is not plain: edges and corners of boxes, round walls, blocks of pieces, swings.

Called by ``stores`` for areas, for the conductivity of a stack and for the depth that a day's swing reaches.
"""

from __future__ import annotations

import math

from app.errors import InputOutOfRange

EDGE_SHAPE_FACTOR = 0.54
"""Per metre of edge where two walls of equal thickness meet (handbook tables of conduction shape factors)."""

CORNER_SHAPE_FACTOR = 0.15
"""Per corner, times the thickness."""

_AIR_CONDUCTIVITY_W_PER_M_K = 0.024


def edge_area_m2(*, edge_length_m: float, thickness_m: float) -> float:
    """Area by which the edges of a box add to the conduction through its walls. [m²]

    Parameters
    ----------
    edge_length_m : float
        Inside length of the edges. [m]
    thickness_m : float
        Of the walls that meet. [m]

    Returns
    -------
    float
        Area to be added to the inside area. [m²]

    Notes
    -----
    Inside dimensions greater than a fifth of the thickness.

    Examples
    --------
    >>> edge_area_m2(edge_length_m=10.0, thickness_m=0.1)
    0.54

    References
    ----------
    Conduction shape factors, Incropera et al., 6th ed., Table 4.1, case 8.
    """
    return EDGE_SHAPE_FACTOR * edge_length_m * thickness_m


def corner_area_m2(*, corners: float, thickness_m: float) -> float:
    """Area by which the corners of a box add to the conduction through its walls. [m²]

    Parameters
    ----------
    corners : float
        Number of corners where three walls meet. [-]
    thickness_m : float
        Of the walls. [m]

    Returns
    -------
    float
        Area to be added to the inside area. [m²]

    Notes
    -----
    Inside dimensions greater than a fifth of the thickness.

    Examples
    --------
    >>> corner_area_m2(corners=8, thickness_m=0.1)
    0.012

    References
    ----------
    Conduction shape factors, Incropera et al., 6th ed., Table 4.1, case 9.
    """
    return CORNER_SHAPE_FACTOR * corners * thickness_m**2


def log_mean_area_m2(*, inside_m2: float, outside_m2: float) -> float:
    """Area that conducts through a cylinder's wall. [m²]

    Parameters
    ----------
    inside_m2 : float
        Inner area. [m²]
    outside_m2 : float
        Outer area, at least the inner. [m²]

    Returns
    -------
    float
        Logarithmic mean. [m²]

    Notes
    -----
    Long cylinders.

    Examples
    --------
    >>> log_mean_area_m2(inside_m2=1.0, outside_m2=1.2)
    1.097

    References
    ----------
    Incropera et al., 6th ed., sec. 3.3.
    """
    if outside_m2 <= inside_m2 * (1.0 + 1e-9):
        return inside_m2
    return (outside_m2 - inside_m2) / math.log(outside_m2 / inside_m2)


def block_conductivity_w_per_m_k(*, solid_w_per_m_k: float, filled: float) -> float:
    """Conductivity of a stack of pieces with air between them. [W/m·K]

    Parameters
    ----------
    solid_w_per_m_k : float
        Of the pieces. [W/m·K]
    filled : float
        Share of the volume that the pieces fill, above 0 to 1. [-]

    Returns
    -------
    float
        Of the stack. [W/m·K]

    Raises
    ------
    InputOutOfRange
        Share not above 0 or more than 1.

    Notes
    -----
    Air as pores in a continuous solid; radiation across the gaps is not counted.

    Examples
    --------
    >>> block_conductivity_w_per_m_k(solid_w_per_m_k=1.4, filled=0.8)
    1.0271

    References
    ----------
    Maxwell and Eucken's relation for dispersed pores.
    """
    if not 0.0 < filled <= 1.0:
        raise InputOutOfRange("filled", filled, "", 0.0, 1.0)
    solid, air, pores = solid_w_per_m_k, _AIR_CONDUCTIVITY_W_PER_M_K, 1.0 - filled
    return solid * (2 * solid + air - 2 * pores * (solid - air)) / (2 * solid + air + pores * (solid - air))


def penetration_depth_m(*, diffusivity_m2_per_s: float, period_s: float) -> float:
    """Depth at which a periodic swing has fallen to 37 %. [m]

    Parameters
    ----------
    diffusivity_m2_per_s : float
        Of the material. [m²/s]
    period_s : float
        Of the swing. [s]

    Returns
    -------
    float
        ``sqrt(a P / pi)``. [m]

    Notes
    -----
    Half-space.

    Examples
    --------
    >>> penetration_depth_m(diffusivity_m2_per_s=7.5e-7, period_s=86400)
    0.1436

    References
    ----------
    ISO 13786:2017, periodic penetration depth.
    """
    return math.sqrt(diffusivity_m2_per_s * period_s / math.pi)
