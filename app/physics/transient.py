"""Exact solutions of heat on its way into solids: half-space, slab, cylinder and sphere.

They serve the hand check and the tests; the engine cuts bodies into cells instead.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy.optimize import brentq
from scipy.special import erfc, erfcx, erfinv, j0, j1, jn_zeros

from app.errors import InputOutOfRange, UnknownKey


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


def series_coefficients(*, shape: str, biot: float, terms: int) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Roots and weights of the series for a body behind a film. [-]

    Parameters
    ----------
    shape : str
        ``slab``, ``cylinder`` or ``sphere``. [-]
    biot : float
        Film times half thickness or radius over conductivity, greater than 0. [-]
    terms : int
        Of the series. [-]

    Returns
    -------
    tuple of ndarray
        Roots and weights, shape (terms,) each. [-]

    Raises
    ------
    UnknownKey
        Another shape.
    InputOutOfRange
        Biot number not greater than 0.

    Notes
    -----
    The first term alone is within 2 % above a Fourier number of 0.2.

    Examples
    --------
    >>> roots, weights = series_coefficients(shape="slab", biot=1.0, terms=1)
    >>> round(float(roots[0]), 4), round(float(weights[0]), 4)
    (0.8603, 1.1191)

    References
    ----------
    Incropera et al., 6th ed., sec. 5.5 and 5.6 with Table 5.1; Carslaw and Jaeger.
    """
    if shape not in _SERIES:
        raise UnknownKey("shape", shape, tuple(_SERIES))
    if not biot > 0.0:
        raise InputOutOfRange("biot", biot, "", 0.0, None)
    series = _SERIES[shape]
    ends = series.brackets(terms)
    roots = np.array(
        [brentq(series.equation, low, high, args=(biot,), xtol=1e-14) for low, high in ends], dtype=np.float64
    )
    return roots, series.weight(roots)


def body_share(*, shape: str, biot: float, fourier: float, position: float, terms: int = 40) -> tuple[float, float]:
    """What is left of the first difference in a slab, cylinder or sphere behind a film. [-]

    Parameters
    ----------
    shape : str
        ``slab`` (films on both sides), ``cylinder`` or ``sphere``. [-]
    biot : float
        Film times half thickness or radius over conductivity. [-]
    fourier : float
        Diffusivity times time over half thickness or radius squared. [-]
    position : float
        0 in the middle, 1 at the surface. [-]
    terms : int
        Of the series. [-]

    Returns
    -------
    tuple of float
        Share at the position, and its mean over the body. [-]

    Raises
    ------
    UnknownKey
        Another shape.
    InputOutOfRange
        Biot number not greater than 0.

    Notes
    -----
    Fourier numbers above about 0.001 with 40 terms.

    Examples
    --------
    >>> at_surface, mean = body_share(shape="slab", biot=0.312989, fourier=5.64, position=1.0)
    >>> round(at_surface, 4)
    0.183

    References
    ----------
    Incropera et al., 6th ed., eq. 5.39, 5.47 and 5.48; Carslaw and Jaeger.
    """
    roots, weights = series_coefficients(shape=shape, biot=biot, terms=terms)
    left = weights * np.exp(-roots * roots * fourier)
    series = _SERIES[shape]
    return float(np.sum(left * series.profile(roots * position))), float(np.sum(left * series.mean(roots)))


_Values = NDArray[np.float64]


@dataclass(frozen=True)
class _Series:
    """The eigenvalue problem of one shape."""

    equation: Callable[[float, float], float]
    brackets: Callable[[int], list[tuple[float, float]]]
    weight: Callable[[_Values], _Values]
    profile: Callable[[_Values], _Values]
    mean: Callable[[_Values], _Values]


def _slab_brackets(terms: int) -> list[tuple[float, float]]:
    return [(n * math.pi + 1e-9, (n + 0.5) * math.pi) for n in range(terms)]


def _cylinder_brackets(terms: int) -> list[tuple[float, float]]:
    lows = [1e-9, *(float(z) for z in jn_zeros(1, terms))]
    return list(zip(lows, (float(z) for z in jn_zeros(0, terms)), strict=False))


def _sphere_brackets(terms: int) -> list[tuple[float, float]]:
    return [(n * math.pi + 1e-9, (n + 1.0) * math.pi) for n in range(terms)]


def _sphere_profile(z: _Values) -> _Values:
    return np.sinc(z / math.pi)


_SERIES = {
    "slab": _Series(
        lambda z, biot: z * math.sin(z) - biot * math.cos(z),
        _slab_brackets,
        lambda z: 4.0 * np.sin(z) / (2.0 * z + np.sin(2.0 * z)),
        np.cos,
        lambda z: np.sin(z) / z,
    ),
    "cylinder": _Series(
        lambda z, biot: float(z * j1(z) - biot * j0(z)),
        _cylinder_brackets,
        lambda z: 2.0 * j1(z) / (z * (j0(z) ** 2 + j1(z) ** 2)),
        j0,
        lambda z: 2.0 * j1(z) / z,
    ),
    "sphere": _Series(
        lambda z, biot: z * math.cos(z) - (1.0 - biot) * math.sin(z),
        _sphere_brackets,
        lambda z: 4.0 * (np.sin(z) - z * np.cos(z)) / (2.0 * z - np.sin(2.0 * z)),
        _sphere_profile,
        lambda z: 3.0 * (np.sin(z) - z * np.cos(z)) / z**3,
    ),
}
