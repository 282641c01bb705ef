"""Natural convection along plates, around cylinders and across gaps, as the handbooks print it.

Each relation refuses what lies outside its published range. ``films`` brings them into the form that the engine
evaluates; the worked examples of the handbooks are checked against the relations here.
"""

from __future__ import annotations

from app.errors import InputOutOfRange
from app.units import STANDARD_GRAVITY_M_PER_S2


def rayleigh_number(
    *,
    difference_k: float,
    length_m: float,
    expansion_per_k: float,
    viscosity_m2_per_s: float,
    diffusivity_m2_per_s: float,
) -> float:
    """Strength of natural convection. [-]

    Parameters
    ----------
    difference_k : float
        Between surface and fluid; its sign is ignored. [K]
    length_m : float
        Height of a plate, diameter of a cylinder, area over perimeter of a flat plate. [m]
    expansion_per_k : float
        One over the absolute film temperature, for a gas. [1/K]
    viscosity_m2_per_s : float
        Kinematic viscosity. [m²/s]
    diffusivity_m2_per_s : float
        Thermal diffusivity. [m²/s]

    Returns
    -------
    float
        ``g beta dT L³ / (nu a)``. [-]

    Notes
    -----
    Any Newtonian fluid.

    Examples
    --------
    >>> rayleigh_number(difference_k=209, length_m=0.71, expansion_per_k=0.0025,
    ...     viscosity_m2_per_s=26.4e-6, diffusivity_m2_per_s=38.3e-6) / 1e9
    1.814

    References
    ----------
    Incropera et al., Fundamentals of Heat and Mass Transfer, 6th ed., sec. 9.2.
    """
    pull = STANDARD_GRAVITY_M_PER_S2 * expansion_per_k * abs(difference_k) * length_m**3
    return pull / (viscosity_m2_per_s * diffusivity_m2_per_s)


def vertical_plate_nusselt(rayleigh: float, prandtl: float) -> float:
    """Natural convection along an upright plate, laminar and turbulent. [-]

    Parameters
    ----------
    rayleigh : float
        On the height, up to 1e12. [-]
    prandtl : float
        Of the fluid. [-]

    Returns
    -------
    float
        Nusselt number on the height. [-]

    Raises
    ------
    InputOutOfRange
        Above a Rayleigh number of 1e12 or below 0.

    Notes
    -----
    All Rayleigh numbers up to 1e12.

    Examples
    --------
    >>> vertical_plate_nusselt(1.8143775e9, 0.69)
    147.2

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.26.
    """
    _in_range("rayleigh", rayleigh, 0.0, 1e12)
    return float((0.825 + 0.387 * rayleigh ** (1.0 / 6.0) / prandtl_factor(prandtl, 0.492) ** (8.0 / 27.0)) ** 2)


def laminar_plate_nusselt(rayleigh: float, prandtl: float) -> float:
    """Natural convection along an upright plate while the flow is laminar. [-]

    Parameters
    ----------
    rayleigh : float
        On the height, up to 1e9. [-]
    prandtl : float
        Of the fluid. [-]

    Returns
    -------
    float
        Nusselt number on the height. [-]

    Raises
    ------
    InputOutOfRange
        Above a Rayleigh number of 1e9 or below 0.

    Notes
    -----
    Slightly better than the relation for all flows, for laminar flow only.

    Examples
    --------
    >>> laminar_plate_nusselt(1.0e8, 0.71)
    52.1

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.27.
    """
    _in_range("rayleigh", rayleigh, 0.0, 1e9)
    return float(0.68 + 0.670 * rayleigh**0.25 / prandtl_factor(prandtl, 0.492) ** (4.0 / 9.0))


def stirring_plate_nusselt(rayleigh: float) -> float:
    """Natural convection where it stirs: upper side of a warm plate, underside of a cold one. [-]

    Parameters
    ----------
    rayleigh : float
        On area over perimeter, 1e4 to 1e11. [-]

    Returns
    -------
    float
        Nusselt number on area over perimeter. [-]

    Raises
    ------
    InputOutOfRange
        Outside 1e4 to 1e11.

    Notes
    -----
    Laminar up to 1e7, turbulent above.

    Examples
    --------
    >>> stirring_plate_nusselt(1e6)
    17.08

    References
    ----------
    Incropera et al., 6th ed., eq. 9.30 and 9.31.
    """
    _in_range("rayleigh", rayleigh, 1e4, 1e11)
    return float(0.54 * rayleigh**0.25 if rayleigh <= 1e7 else 0.15 * rayleigh ** (1.0 / 3.0))


def still_plate_nusselt(rayleigh: float) -> float:
    """Natural convection where layers are stable: underside of a warm plate, upper side of a cold one. [-]

    Parameters
    ----------
    rayleigh : float
        On area over perimeter, 1e5 to 1e10. [-]

    Returns
    -------
    float
        Nusselt number on area over perimeter. [-]

    Raises
    ------
    InputOutOfRange
        Outside 1e5 to 1e10.

    Notes
    -----
    Laminar throughout.

    Examples
    --------
    >>> still_plate_nusselt(1e6)
    8.538

    References
    ----------
    Incropera et al., 6th ed., eq. 9.32.
    """
    _in_range("rayleigh", rayleigh, 1e5, 1e10)
    return float(0.27 * rayleigh**0.25)


def horizontal_cylinder_nusselt(rayleigh: float, prandtl: float) -> float:
    """Natural convection around a lying cylinder. [-]

    Parameters
    ----------
    rayleigh : float
        On the diameter, up to 1e12. [-]
    prandtl : float
        Of the fluid. [-]

    Returns
    -------
    float
        Nusselt number on the diameter. [-]

    Raises
    ------
    InputOutOfRange
        Above 1e12 or below 0.

    Notes
    -----
    Long cylinders.

    Examples
    --------
    >>> horizontal_cylinder_nusselt(1e6, 0.71)
    14.54

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.34.
    """
    _in_range("rayleigh", rayleigh, 0.0, 1e12)
    return float((0.60 + 0.387 * rayleigh ** (1.0 / 6.0) / prandtl_factor(prandtl, 0.559) ** (8.0 / 27.0)) ** 2)


def tall_enclosure_nusselt(rayleigh: float, prandtl: float, slenderness: float) -> float:
    """Natural convection across an upright gap, such as between panes. [-]

    Parameters
    ----------
    rayleigh : float
        On the width of the gap, 1e4 to 1e7. [-]
    prandtl : float
        Of the fluid. [-]
    slenderness : float
        Height over width, 10 to 40. [-]

    Returns
    -------
    float
        Nusselt number on the width. [-]

    Raises
    ------
    InputOutOfRange
        Outside the two ranges.

    Notes
    -----
    Never below pure conduction, 1.

    Examples
    --------
    >>> tall_enclosure_nusselt(10502.13411, 0.7344, 40.0)
    1.4007

    References
    ----------
    MacGregor and Emery (1969) in Incropera et al., 6th ed., eq. 9.52.
    """
    _in_range("rayleigh", rayleigh, 1e4, 1e7)
    _in_range("slenderness", slenderness, 10.0, 40.0)
    return max(1.0, float(0.42 * rayleigh**0.25 * prandtl**0.012 * slenderness**-0.3))


def prandtl_factor(prandtl: float, constant: float) -> float:
    """How far the fluid departs from one of large Prandtl number, in Churchill and Chu's relations. [-]

    Parameters
    ----------
    prandtl : float
        Of the fluid. [-]
    constant : float
        0.492 for a plate, 0.559 for a cylinder. [-]

    Returns
    -------
    float
        ``1 + (constant / Pr)^(9/16)``. [-]

    Notes
    -----
    All fluids.

    Examples
    --------
    >>> prandtl_factor(0.69, 0.492)
    1.8268

    References
    ----------
    Churchill and Chu (1975) in Incropera et al., 6th ed., eq. 9.26 and 9.34.
    """
    return float(1.0 + (constant / prandtl) ** (9.0 / 16.0))


def _in_range(name: str, value: float, low: float, high: float) -> None:
    if not low <= value <= high:
        raise InputOutOfRange(name, value, "", low, high)
