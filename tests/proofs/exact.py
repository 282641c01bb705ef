"""Exact solutions that the engine is held against, each with the formula's source.

Plain numbers in SI units and °C; the published check values of the same solutions are in ``tests/published``.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from scipy.linalg import expm
from scipy.optimize import brentq
from scipy.special import erf, erfc, erfcx


def ramp_c(time_s: float, *, time_constant_s: float, start_c: float, room_c: float, room_k_per_s: float) -> float:
    """A lump in surroundings that rise evenly: ``T = a + b (t - tau) + (T0 - a + b tau) e^(-t/tau)``."""
    lag_k = room_k_per_s * time_constant_s
    left = (start_c - room_c + lag_k) * math.exp(-time_s / time_constant_s)
    return room_c + room_k_per_s * time_s - lag_k + left


def day_c(
    time_s: float, *, time_constant_s: float, start_c: float, mean_c: float, swing_k: float, period_s: float
) -> float:
    """A lump in surroundings ``mean + swing cos(w t)``, from its start on."""
    w = 2.0 * math.pi / period_s
    x = w * time_constant_s
    part = swing_k / (1.0 + x * x)
    steady = part * (math.cos(w * time_s) + x * math.sin(w * time_s))
    return mean_c + steady + (start_c - mean_c - part) * math.exp(-time_s / time_constant_s)


def power_film_c(time_s: float, *, start_c: float, room_c: float, first_rate_per_s: float, power: float) -> float:
    """A lump whose film goes with a power of the difference (Bejan & Kraus, Heat Transfer Handbook, eq. 3.286)."""
    share = (1.0 + power * first_rate_per_s * time_s) ** (-1.0 / power)
    return room_c + (start_c - room_c) * float(share)


def two_bodies_c(
    time_s: float,
    *,
    air_j_per_k: float,
    product_j_per_k: float,
    wall_w_per_k: float,
    film_w_per_k: float,
    start_c: float,
    room_c: float,
) -> tuple[float, float]:
    """Air and a product in it, by the exponential of the 2 x 2 matrix."""
    rates = np.array(
        [
            [-(wall_w_per_k + film_w_per_k) / air_j_per_k, film_w_per_k / air_j_per_k],
            [film_w_per_k / product_j_per_k, -film_w_per_k / product_j_per_k],
        ]
    )
    air_c, product_c = room_c + expm(rates * time_s) @ np.full(2, start_c - room_c)
    return float(air_c), float(product_c)


def stefan_root(stefan: float) -> float:
    """``l e^(l²) erf l = Ste / sqrt(pi)`` (Carslaw & Jaeger, Conduction of Heat in Solids, ch. XI)."""
    return float(brentq(lambda z: z * math.exp(z * z) * erf(z) - stefan / math.sqrt(math.pi), 1e-9, 5.0, xtol=1e-15))


@dataclass(frozen=True)
class Neumann:
    """A half-space that melts or freezes from its face; 1 is the growing phase, 2 the shrinking one.

    Carslaw & Jaeger, Conduction of Heat in Solids, ch. XI; equal densities.
    """

    wall_c: float
    start_c: float
    melting_c: float
    latent_j_per_kg: float
    density_kg_per_m3: float
    conductivity_1: float
    specific_heat_1: float
    conductivity_2: float
    specific_heat_2: float

    @property
    def diffusivity_1(self) -> float:
        return self.conductivity_1 / (self.density_kg_per_m3 * self.specific_heat_1)

    @property
    def diffusivity_2(self) -> float:
        return self.conductivity_2 / (self.density_kg_per_m3 * self.specific_heat_2)

    @property
    def root(self) -> float:
        """lambda of ``X = 2 lambda sqrt(a1 t)``."""
        stefan = self.specific_heat_1 * abs(self.melting_c - self.wall_c) / self.latent_j_per_kg
        spread = math.sqrt(self.diffusivity_1 / self.diffusivity_2)
        other = (
            self.conductivity_2
            / self.conductivity_1
            * spread
            * abs((self.start_c - self.melting_c) / (self.melting_c - self.wall_c))
        )

        def balance(z: float) -> float:
            pull = other / float(erfcx(z * spread))
            return math.exp(-z * z) / float(erf(z)) - pull - z * math.sqrt(math.pi) / stefan

        return float(brentq(balance, 1e-9, 5.0, xtol=1e-15))

    def front_m(self, time_s: float) -> float:
        """How deep the front has come."""
        return 2.0 * self.root * math.sqrt(self.diffusivity_1 * time_s)

    def temperature_c(self, depth_m: float, time_s: float) -> float:
        """Temperature at a depth."""
        root = self.root
        near = depth_m / (2.0 * math.sqrt(self.diffusivity_1 * time_s))
        if near < root:
            return self.wall_c + (self.melting_c - self.wall_c) * float(erf(near) / erf(root))
        spread = math.sqrt(self.diffusivity_1 / self.diffusivity_2)
        return self.start_c + (self.melting_c - self.start_c) * float(erfc(near * spread) / erfc(root * spread))


@dataclass(frozen=True)
class WallWithContents:
    """Contents lumped on the inside of a wall that starts from its steady line; a film outside.

    Series of ``X = cos mu x + (Bi/mu) sin mu x`` over ``x`` from the outer face, with
    ``tan mu = (Bi - R mu²) / (mu (1 + R Bi))`` and the contents as a weight R at x = 1.
    """

    conductivity_w_per_m_k: float
    density_kg_per_m3: float
    specific_heat_j_per_kg_k: float
    thickness_m: float
    film_w_per_m2_k: float
    contents_j_per_m2_k: float
    start_c: float
    room_c: float

    @property
    def biot(self) -> float:
        return self.film_w_per_m2_k * self.thickness_m / self.conductivity_w_per_m_k

    @property
    def ratio(self) -> float:
        """R: heat capacity of the contents over that of the wall."""
        wall = self.density_kg_per_m3 * self.specific_heat_j_per_kg_k * self.thickness_m
        return self.contents_j_per_m2_k / wall

    def roots(self, terms: int) -> list[float]:
        """The first eigenvalues mu."""
        biot, ratio = self.biot, self.ratio

        def balance(mu: float) -> float:
            return math.sin(mu) * mu * (1.0 + ratio * biot) - (biot - ratio * mu * mu) * math.cos(mu)

        roots: list[float] = []
        low = 1e-6
        while len(roots) < terms:
            # roots lie about pi apart, except for two where the contents' own swing passes: search in small steps
            high = low + 0.05
            if balance(low) * balance(high) < 0.0:
                roots.append(float(brentq(balance, low, high, xtol=1e-15)))
            low = high
        return roots

    def slowest_s(self) -> float:
        """Time constant of the slowest term."""
        diffusivity = self.conductivity_w_per_m_k / (self.density_kg_per_m3 * self.specific_heat_j_per_kg_k)
        return self.thickness_m**2 / (diffusivity * self.roots(1)[0] ** 2)

    def contents_c(self, terms: int = 30) -> Callable[[float], float]:
        """Temperature of the contents as a function of time in seconds."""
        biot, ratio = self.biot, self.ratio
        x, weights = np.polynomial.legendre.leggauss(400)
        x, weights = 0.5 * (x + 1.0), 0.5 * weights
        mu = np.array(self.roots(terms))[:, None]
        shape = np.cos(mu * x) + biot / mu * np.sin(mu * x)
        end = (np.cos(mu) + biot / mu * np.sin(mu))[:, 0]
        line = (self.start_c - self.room_c) * (1.0 / biot + x) / (1.0 / biot + 1.0)
        amount = (shape * line) @ weights + ratio * (self.start_c - self.room_c) * end
        norm = shape**2 @ weights + ratio * end**2
        slowest_s = self.slowest_s()
        rates = (mu[:, 0] / mu[0, 0]) ** 2 / slowest_s

        def temperature_c(time_s: float) -> float:
            return self.room_c + float(np.sum(amount / norm * end * np.exp(-rates * time_s)))

        return temperature_c
