"""Steady and periodic conduction through layers, shape factors, exact solutions of slab and half-space.

Called by ``stores`` for areas and resistances; the exact solutions serve the hand check and the tests.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from scipy.optimize import brentq
from scipy.special import erfc, erfcx, erfinv

from app.errors import InputOutOfRange
from app.units import hours_from_seconds

EDGE_SHAPE_FACTOR = 0.54
"""Per metre of edge where two walls of equal thickness meet (handbook tables of conduction shape factors)."""

CORNER_SHAPE_FACTOR = 0.15
"""Per corner, times the thickness."""

_AIR_CONDUCTIVITY_W_PER_M_K = 0.024


@dataclass(frozen=True)
class SolidLayer:
    """One layer of a wall, for periodic conduction."""

    thickness_m: float
    conductivity_w_per_m_k: float
    density_kg_per_m3: float
    specific_heat_j_per_kg_k: float


@dataclass(frozen=True)
class DynamicWall:
    """Periodic behaviour of a wall."""

    u_w_per_m2_k: float
    periodic_w_per_m2_k: float
    decrement: float
    lag_h: float
    inside_capacity_j_per_m2_k: float


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


def transmittance_w_per_m2_k(
    resistances_m2_k_per_w: Sequence[float], *, inside_m2_k_per_w: float, outside_m2_k_per_w: float
) -> float:
    """U-value of layers one behind the other. [W/m²·K]

    Parameters
    ----------
    resistances_m2_k_per_w : sequence of float
        Thickness over conductivity of each layer. [m²·K/W]
    inside_m2_k_per_w : float
        Inside surface resistance. [m²·K/W]
    outside_m2_k_per_w : float
        Outside surface resistance. [m²·K/W]

    Returns
    -------
    float
        One over the sum. [W/m²·K]

    Notes
    -----
    Plane layers without bridges.

    Examples
    --------
    >>> transmittance_w_per_m2_k([0.1 / 0.022], inside_m2_k_per_w=0.13, outside_m2_k_per_w=0.04)
    0.2121

    References
    ----------
    ISO 6946:2017, sec. 6.7.
    """
    return 1.0 / (inside_m2_k_per_w + sum(resistances_m2_k_per_w) + outside_m2_k_per_w)


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


def half_space_step_share(*, depth_m: float, diffusivity_m2_per_s: float, time_s: float) -> float:
    """What is left of the first difference at a depth after a step at the face. [-]

    Parameters
    ----------
    depth_m : float
        Below the face. [m]
    diffusivity_m2_per_s : float
        Of the material. [m²/s]
    time_s : float
        Since the step. [s]

    Returns
    -------
    float
        ``(T - Ts) / (Ti - Ts) = erf(x / 2 sqrt(a t))``. [-]

    Notes
    -----
    While the body is thicker than about 4 sqrt(a t).

    Examples
    --------
    >>> half_space_step_share(depth_m=0.6766, diffusivity_m2_per_s=1.3786e-7, time_s=5184000)
    0.4286

    References
    ----------
    Carslaw and Jaeger, Conduction of Heat in Solids; Incropera et al., 6th ed., eq. 5.57.
    """
    return 1.0 - float(erfc(depth_m / (2.0 * math.sqrt(diffusivity_m2_per_s * time_s))))


def half_space_depth_m(*, share: float, diffusivity_m2_per_s: float, time_s: float) -> float:
    """Depth at which a given share of the first difference is left after a step at the face. [m]

    Parameters
    ----------
    share : float
        ``(T - Ts) / (Ti - Ts)``, 0 to 1. [-]
    diffusivity_m2_per_s : float
        Of the material. [m²/s]
    time_s : float
        Since the step. [s]

    Returns
    -------
    float
        Depth. [m]

    Notes
    -----
    While the body is thicker than about 4 sqrt(a t).

    Examples
    --------
    >>> half_space_depth_m(share=15 / 35, diffusivity_m2_per_s=1.378579e-7, time_s=5184000)
    0.6766

    References
    ----------
    Carslaw and Jaeger, Conduction of Heat in Solids; Incropera et al., 6th ed., eq. 5.57.
    """
    return 2.0 * float(erfinv(share)) * math.sqrt(diffusivity_m2_per_s * time_s)


def half_space_flux_rise_k(
    *,
    flux_w_per_m2: float,
    conductivity_w_per_m_k: float,
    diffusivity_m2_per_s: float,
    depth_m: float,
    time_s: float,
) -> float:
    """Rise of temperature in a half-space whose face takes a constant flux. [K]

    Parameters
    ----------
    flux_w_per_m2 : float
        Into the face. [W/m²]
    conductivity_w_per_m_k : float
        Of the material. [W/m·K]
    diffusivity_m2_per_s : float
        Of the material. [m²/s]
    depth_m : float
        Below the face. [m]
    time_s : float
        Since the flux began. [s]

    Returns
    -------
    float
        Rise above the first temperature. [K]

    Notes
    -----
    While the body is thicker than about 4 sqrt(a t).

    Examples
    --------
    >>> half_space_flux_rise_k(flux_w_per_m2=3e5, conductivity_w_per_m_k=401, diffusivity_m2_per_s=117e-6,
    ...     depth_m=0.0, time_s=120)
    100.03

    References
    ----------
    Carslaw and Jaeger, Conduction of Heat in Solids; Incropera et al., 6th ed., eq. 5.59.
    """
    reach = math.sqrt(diffusivity_m2_per_s * time_s)
    near = 2.0 * flux_w_per_m2 * reach / math.sqrt(math.pi) / conductivity_w_per_m_k
    x = depth_m / (2.0 * reach)
    far = flux_w_per_m2 * depth_m / conductivity_w_per_m_k * float(erfc(x))
    return near * math.exp(-x * x) - far


def half_space_film_share(
    *,
    film_w_per_m2_k: float,
    conductivity_w_per_m_k: float,
    diffusivity_m2_per_s: float,
    depth_m: float,
    time_s: float,
) -> float:
    """How far a half-space behind a film has come towards the fluid. [-]

    Parameters
    ----------
    film_w_per_m2_k : float
        Film coefficient at the face. [W/m²·K]
    conductivity_w_per_m_k : float
        Of the material. [W/m·K]
    diffusivity_m2_per_s : float
        Of the material. [m²/s]
    depth_m : float
        Below the face. [m]
    time_s : float
        Since the fluid changed. [s]

    Returns
    -------
    float
        ``(T - Ti) / (Tf - Ti)``. [-]

    Notes
    -----
    While the body is thicker than about 4 sqrt(a t).

    Examples
    --------
    >>> half_space_film_share(film_w_per_m2_k=11.36, conductivity_w_per_m_k=0.865,
    ...     diffusivity_m2_per_s=4.65e-7, depth_m=0.0, time_s=18000)
    0.6218

    References
    ----------
    Carslaw and Jaeger, Conduction of Heat in Solids; Incropera et al., 6th ed., eq. 5.60.
    """
    reach = math.sqrt(diffusivity_m2_per_s * time_s)
    x, y = depth_m / (2.0 * reach), film_w_per_m2_k * reach / conductivity_w_per_m_k
    # exp(2xy + y²) erfc(x + y), written so that it does not overflow
    return float(erfc(x)) - math.exp(-x * x) * float(erfcx(x + y))


def slab_share(*, biot: float, fourier: float, position: float, terms: int = 40) -> tuple[float, float]:
    """What is left of the first difference in a slab behind films on both sides. [-]

    Parameters
    ----------
    biot : float
        Film times half thickness over conductivity. [-]
    fourier : float
        Diffusivity times time over half thickness squared. [-]
    position : float
        0 in the middle, 1 at the surface. [-]
    terms : int
        Of the series. [-]

    Returns
    -------
    tuple of float
        Share at the position, and its mean over the slab. [-]

    Notes
    -----
    Fourier numbers above about 0.001 with 40 terms.

    Examples
    --------
    >>> at_surface, mean = slab_share(biot=0.312989, fourier=5.64, position=1.0)
    >>> round(at_surface, 4)
    0.183

    References
    ----------
    Incropera et al., 6th ed., eq. 5.39; Carslaw and Jaeger.
    """
    here = mean = 0.0
    for n in range(terms):
        zeta = float(
            brentq(lambda z: z * math.sin(z) - biot * math.cos(z), n * math.pi + 1e-9, (n + 0.5) * math.pi)
        )
        weight = 4.0 * math.sin(zeta) / (2.0 * zeta + math.sin(2.0 * zeta)) * math.exp(-zeta * zeta * fourier)
        here += weight * math.cos(zeta * position)
        mean += weight * math.sin(zeta) / zeta
    return here, mean


def dynamic_wall(
    layers: Sequence[SolidLayer], *, inside_m2_k_per_w: float, outside_m2_k_per_w: float, period_s: float
) -> DynamicWall:
    """Periodic transmittance, decrement, lag and inside capacity of a layered wall.

    Parameters
    ----------
    layers : sequence of SolidLayer
        From inside to outside. [m, W/m·K, kg/m³, J/kg·K]
    inside_m2_k_per_w : float
        Inside surface resistance. [m²·K/W]
    outside_m2_k_per_w : float
        Outside surface resistance. [m²·K/W]
    period_s : float
        Of the swing. [s]

    Returns
    -------
    DynamicWall
        U, periodic transmittance, decrement, lag, inside capacity. [W/m²·K, W/m²·K, -, h, J/m²·K]

    Notes
    -----
    Plane walls; the decrement is the periodic over the steady transmittance.

    Examples
    --------
    >>> wall = dynamic_wall([SolidLayer(0.2, 2.0, 2400, 1000)], inside_m2_k_per_w=0.13,
    ...     outside_m2_k_per_w=0.04, period_s=86400)
    >>> round(wall.u_w_per_m2_k, 3)
    3.704

    References
    ----------
    ISO 13786:2017, heat transfer matrix (from memory).
    """
    matrix = np.array([[1.0, -outside_m2_k_per_w], [0.0, 1.0]], dtype=complex)
    for layer in reversed(layers):
        matrix = matrix @ _layer_matrix(layer, period_s)
    matrix = matrix @ np.array([[1.0, -inside_m2_k_per_w], [0.0, 1.0]], dtype=complex)
    z11, z12 = matrix[0, 0], matrix[0, 1]
    resistances = [layer.thickness_m / layer.conductivity_w_per_m_k for layer in layers]
    u = transmittance_w_per_m2_k(
        resistances, inside_m2_k_per_w=inside_m2_k_per_w, outside_m2_k_per_w=outside_m2_k_per_w
    )
    periodic = abs(1.0 / z12)
    lag_s = (-np.angle(-1.0 / z12) % (2.0 * math.pi)) * period_s / (2.0 * math.pi)
    capacity = period_s / (2.0 * math.pi) * abs((z11 - 1.0) / z12)
    return DynamicWall(u, periodic, periodic / u, hours_from_seconds(lag_s), capacity)


def _layer_matrix(layer: SolidLayer, period_s: float) -> np.ndarray:
    """Heat transfer matrix of one layer for a period."""
    k = layer.conductivity_w_per_m_k
    diffusivity = k / (layer.density_kg_per_m3 * layer.specific_heat_j_per_kg_k)
    depth = penetration_depth_m(diffusivity_m2_per_s=diffusivity, period_s=period_s)
    xi = layer.thickness_m / depth
    sh_c, ch_s = math.sinh(xi) * math.cos(xi), math.cosh(xi) * math.sin(xi)
    z11 = math.cosh(xi) * math.cos(xi) + 1j * math.sinh(xi) * math.sin(xi)
    z12 = -depth / (2.0 * k) * (sh_c + ch_s + 1j * (ch_s - sh_c))
    z21 = -k / depth * (sh_c - ch_s + 1j * (sh_c + ch_s))
    return np.array([[z11, z12], [z21, z11]])
