"""The same network marched by scipy.integrate.solve_ivp in enthalpy form: what the engine is measured against.

Temperatures are read from enthalpies on the exact curves with whole-array NumPy; flows are whole-array too, so
that this is the baseline one would write with care. LSODA, BDF and Radau are offered; events find the limit.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from scipy.integrate import solve_ivp

from app.engine import Network
from app.engine.histories import temperature_c
from app.engine.network import FILM, SERIES
from app.physics import FREEZING, QUADRATIC
from app.units import STEFAN_BOLTZMANN_W_PER_M2_K4, ZERO_CELSIUS_K


@dataclass(frozen=True)
class Result:
    """Temperatures of the watched body at the crossing, and the work done."""

    crossed_s: float
    evaluations: int


class GaveUp(Exception):
    """A method that needs too many evaluations to be worth comparing."""


class Baseline:
    """Right-hand side of a network for solve_ivp."""

    most_evaluations = 20_000

    def __init__(self, network: Network) -> None:
        self.network = network
        self.evaluations = 0
        bodies = network.bodies
        self.n = len(bodies)
        self.parent = bodies["parent"]
        self.children = np.arange(1, self.n)
        last = bodies["first_segment"] + bodies["segments"] - 1
        self.first, self.last = bodies["first_segment"], last
        self.most = int(bodies["segments"].max())

    def states(self, energy_j: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
        """Temperature and resistivity of every body."""
        segments, bodies = self.network.segments, self.network.bodies
        index = self.first.copy()
        for _ in range(self.most - 1):
            index = np.where((index < self.last) & (energy_j >= segments["end_j"][index]), index + 1, index)
        s = segments[index]
        gained = energy_j - s["start_j"]
        at_c = s["start_c"] + gained * s["k_per_j"]
        freezing = s["shape"] == FREEZING
        if freezing.any():
            f, g = s[freezing], gained[freezing]
            middle = g + f["capacity_j_per_k"] * f["start_c"] - f["bend"] / f["start_c"]
            root = np.sqrt(middle**2 + 4.0 * f["capacity_j_per_k"] * f["bend"])
            at_c[freezing] = (middle - root) / (2.0 * f["capacity_j_per_k"])
        bent = s["shape"] == QUADRATIC
        if bent.any():
            f, g = s[bent], gained[bent]
            root = np.sqrt(f["capacity_j_per_k"] ** 2 + 2.0 * f["bend"] * g)
            at_c[bent] = f["start_c"] + 2.0 * g / (f["capacity_j_per_k"] + root)
        ice = np.where(s["ice_start"] == s["ice_end"], s["ice_start"], 0.0)
        melts = s["ice_start"] != s["ice_end"]
        with np.errstate(divide="ignore", invalid="ignore"):
            by_heat = np.clip(gained / (s["end_j"] - s["start_j"]), 0.0, 1.0)
            by_inverse = (1.0 / at_c - 1.0 / s["start_c"]) / (1.0 / s["end_c"] - 1.0 / s["start_c"])
        share = np.where(freezing, by_inverse, by_heat)
        ice = np.where(melts, s["ice_start"] + (s["ice_end"] - s["ice_start"]) * share, ice)
        conductivity = bodies["conductivity_liquid"]
        conductivity = conductivity + (bodies["conductivity_solid"] - conductivity) * ice
        return at_c, 1.0 / conductivity

    def __call__(self, time_s: float, energy_j: np.ndarray) -> np.ndarray:
        """Net heat flow into every body. [W]"""
        self.evaluations += 1
        if self.evaluations > self.most_evaluations:
            raise GaveUp
        network = self.network
        at_c, resistivity = self.states(energy_j)
        b = network.bodies[self.children]
        parent = self.parent[self.children]
        own, other = at_c[self.children], at_c[parent]
        path = b["near_path_per_m"] * resistivity[self.children] + b["far_path_per_m"] * resistivity[parent]
        conductance = b["conductance_w_per_k"].copy()
        series = b["link"] == SERIES
        conductance[series] = 1.0 / (b["resistance_k_per_w"] + path)[series]
        film = b["link"] == FILM
        if film.any():
            conductance[film] = _film_conductance(b[film], own[film], other[film], path[film])
        flow = conductance * (other - own)
        rate = np.zeros(self.n)
        rate[1:] += flow
        rate -= np.bincount(parent, weights=flow, minlength=self.n)
        now = np.array([time_s])
        drives = np.array(
            [
                temperature_c(network.pieces[a:z], now)[0]
                for a, z in zip(network.piece_starts[:-1], network.piece_starts[1:], strict=True)
            ]
        )
        outside = network.boundaries
        gained = outside["conductance_w_per_k"] * (drives[outside["drive"]] - at_c[outside["body"]])
        return rate + np.bincount(outside["body"], weights=gained, minlength=self.n)

    def solve(self, body: int, level_c: float, horizon_s: float, method: str, rtol: float) -> Result:
        """Time at which a body passes a temperature, marched over the whole horizon."""

        def passed(_: float, energy_j: np.ndarray) -> float:
            return float(self.states(energy_j)[0][body] - level_c)

        self.evaluations = 0
        start = self.network.bodies["start_j"].astype(float)
        scale = np.abs(self.network.bodies["mass_kg"]) * 2000.0
        done = solve_ivp(
            self,
            (0.0, horizon_s),
            start,
            method=method,
            rtol=rtol,
            atol=rtol * scale,
            events=passed,
            max_step=7200.0,
        )
        found = done.t_events[0]
        return Result(float(found[0]) if len(found) else np.nan, int(done.nfev))


def _film_conductance(b: np.ndarray, own: np.ndarray, air: np.ndarray, path: np.ndarray) -> np.ndarray:
    """Conductance from the air into each body: film at the surface, behind it the path to the body's middle."""
    surface = own
    exponent = np.where(b["is_sixth"] > 0.0, 1.0 / 6.0, 1.0 / 8.0)
    for _ in range(4):
        rise = np.abs(air - surface) ** exponent
        warmth = 1.0 - b["per_k"] * (0.5 * (surface + air) - b["reference_c"])
        convection = (b["base"] + b["gain"] * rise) ** 2 * warmth
        one, two = surface + ZERO_CELSIUS_K, air + ZERO_CELSIUS_K
        radiation = STEFAN_BOLTZMANN_W_PER_M2_K4 * b["emissivity"] * (one**2 + two**2) * (one + two)
        film = b["area_m2"] * (convection + radiation)
        surface = own + (air - own) * path / (path + 1.0 / film)
    return 1.0 / (1.0 / film + path)
