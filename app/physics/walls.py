"""Walls as the building standards see them: surface resistances, air layers, U-value, response to a daily swing.

Called by ``stores`` for resistances; the periodic values serve the hand check and the tests.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from app.errors import InputOutOfRange, UnknownKey
from app.physics.conduction import penetration_depth_m
from app.units import hours_from_seconds

_SURFACE_RESISTANCE_M2_K_PER_W = {"up": 0.10, "sideways": 0.13, "down": 0.17, "outside": 0.04}

_AIR_LAYER_MM = (0.0, 5.0, 7.0, 10.0, 15.0, 25.0, 50.0, 100.0, 300.0)
_AIR_LAYER_M2_K_PER_W = {
    "up": (0.0, 0.11, 0.13, 0.15, 0.16, 0.16, 0.16, 0.16, 0.16),
    "sideways": (0.0, 0.11, 0.13, 0.15, 0.17, 0.18, 0.18, 0.18, 0.18),
    "down": (0.0, 0.11, 0.13, 0.15, 0.17, 0.19, 0.21, 0.22, 0.23),
}


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


def surface_resistance_m2_k_per_w(direction: str) -> float:
    """Standard surface resistance by the direction of the heat. [m²·K/W]

    Parameters
    ----------
    direction : str
        ``up``, ``sideways``, ``down`` for still air indoors, ``outside`` for outdoors. [-]

    Returns
    -------
    float
        Convection and radiation together. [m²·K/W]

    Raises
    ------
    UnknownKey
        Another direction.

    Notes
    -----
    Building surfaces of high emissivity.

    Examples
    --------
    >>> surface_resistance_m2_k_per_w("sideways")
    0.13

    References
    ----------
    ISO 6946:2017, Table 7 (0.13 and 0.04 published, the others from memory).
    """
    if direction not in _SURFACE_RESISTANCE_M2_K_PER_W:
        raise UnknownKey("direction", direction, tuple(_SURFACE_RESISTANCE_M2_K_PER_W))
    return _SURFACE_RESISTANCE_M2_K_PER_W[direction]


def still_air_layer_m2_k_per_w(thickness_m: float, direction: str) -> float:
    """Resistance of an unventilated air layer between surfaces of high emissivity. [m²·K/W]

    Parameters
    ----------
    thickness_m : float
        Of the layer, 0 to 0.3. [m]
    direction : str
        Of the heat: ``up``, ``sideways`` or ``down``. [-]

    Returns
    -------
    float
        Resistance, straight between the table's thicknesses. [m²·K/W]

    Raises
    ------
    InputOutOfRange
        Thicker than 0.3 m.
    UnknownKey
        Another direction.

    Notes
    -----
    Wide layers without ventilation.

    Examples
    --------
    >>> still_air_layer_m2_k_per_w(0.02, "sideways")
    0.175

    References
    ----------
    ISO 6946:2017, Table 8 (from memory).
    """
    if not 0.0 <= thickness_m <= 0.3:
        raise InputOutOfRange("thickness_m", thickness_m, "m", 0.0, 0.3)
    if direction not in _AIR_LAYER_M2_K_PER_W:
        raise UnknownKey("direction", direction, tuple(_AIR_LAYER_M2_K_PER_W))
    return float(np.interp(thickness_m * 1000.0, _AIR_LAYER_MM, _AIR_LAYER_M2_K_PER_W[direction]))


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


def combined_resistance_m2_k_per_w(
    shares: Sequence[float],
    layers_m2_k_per_w: Sequence[Sequence[float]],
    *,
    inside_m2_k_per_w: float,
    outside_m2_k_per_w: float,
) -> float:
    """Resistance of a wall with something else in part of it, such as studs between insulation. [m²·K/W]

    Parameters
    ----------
    shares : sequence of float
        Share of the area of each section, adding up to 1; shape (n,). [-]
    layers_m2_k_per_w : sequence of sequence of float
        Resistance of each layer in each section, one row a layer; shape (layers, n). [m²·K/W]
    inside_m2_k_per_w : float
        Inside surface resistance. [m²·K/W]
    outside_m2_k_per_w : float
        Outside surface resistance. [m²·K/W]

    Returns
    -------
    float
        Mean of the highest (no heat moves sideways) and the lowest (it moves freely). [m²·K/W]

    Raises
    ------
    InputOutOfRange
        Shares that do not add up to 1.

    Notes
    -----
    Not for metal that passes through the insulation.

    Examples
    --------
    >>> panel = [[0.0923, 0.0923], [4.0, 1.0769], [0.0923, 0.0923]]
    >>> combined_resistance_m2_k_per_w([0.85, 0.15], panel, inside_m2_k_per_w=0.13, outside_m2_k_per_w=0.04)
    3.265

    References
    ----------
    ISO 6946:2017, combined method, sec. 6.7.2.
    """
    if abs(sum(shares) - 1.0) > 1e-6:
        raise InputOutOfRange("sum of shares", sum(shares), "", 1.0, 1.0)
    share, layers = np.asarray(shares), np.asarray(layers_m2_k_per_w)
    surfaces = inside_m2_k_per_w + outside_m2_k_per_w
    highest = 1.0 / np.sum(share / (surfaces + layers.sum(axis=0)))
    lowest = surfaces + np.sum(1.0 / np.sum(share / layers, axis=1))
    return float(0.5 * (highest + lowest))


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


def _layer_matrix(layer: SolidLayer, period_s: float) -> NDArray[np.complex128]:
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
