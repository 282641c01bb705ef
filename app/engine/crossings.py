"""When a limit is passed: reads the traces of a run.

A trace holds five points of every step, so within a step a quantity is the polynomial of fourth degree
through them. Passes up and down inside one step are caught at the polynomial's extrema. Times in seconds.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy.interpolate import CubicHermiteSpline
from scipy.optimize import brentq

from app.units import GAS_CONSTANT_J_PER_MOL_K, ZERO_CELSIUS_K

Floats = NDArray[np.float64]

_NODES = np.linspace(0.0, 1.0, 5)
_TO_POWERS = np.linalg.inv(np.vander(_NODES, 5, increasing=True))
_LOOKS = 16
"""Pieces of a step in which a sign change is looked for."""

_ROUNDING = 1e-9
"""Ice that stands at 0 °C is not above 0 °C: a level must be passed by more than rounding."""


@dataclass(frozen=True)
class Passed:
    """When a limit was first passed, and when it was broken: the end of the time it may be passed. [s]"""

    first_s: float | None
    broken_s: float | None


class Trace:
    """One traced quantity of one run, to be read at any time.

    ``times_s`` has shape (4 n_steps + 1,), the steps' starts and ends and three times between; ``values`` alike.
    """

    def __init__(self, times_s: Floats, values: Floats) -> None:
        self.starts_s = times_s[:-1:4]
        self.lengths_s: Floats = times_s[4::4] - self.starts_s
        self.end_s = float(times_s[-1])
        steps = np.lib.stride_tricks.sliding_window_view(values, 5)[::4]
        self.powers: Floats = np.asarray(steps @ _TO_POWERS.T, dtype=np.float64)
        self.first = float(values[0])

    def at(self, times_s: Floats) -> Floats:
        """Values at given times within the run, shape as ``times_s``."""
        step = np.clip(np.searchsorted(self.starts_s, times_s, side="right") - 1, 0, len(self.starts_s) - 1)
        share = (times_s - self.starts_s[step]) / self.lengths_s[step]
        values = np.polynomial.polynomial.polyval(share, self.powers[step].T, tensor=False)
        return np.asarray(values, dtype=np.float64)

    def looks(self) -> tuple[Floats, Floats]:
        """Times and values on a fine grid, ``_LOOKS`` pieces a step, and at every extremum. [s, -]"""
        shares = np.linspace(0.0, 1.0, _LOOKS, endpoint=False)
        times = (self.starts_s[:, None] + self.lengths_s[:, None] * shares).ravel()
        times = np.union1d(np.append(times, self.end_s), self._extrema_s())
        return times, self.at(times)

    def _extrema_s(self) -> Floats:
        """Times of the extrema inside steps whose slope changes sign at the nodes."""
        slopes = self.powers[:, 1:] * np.arange(1, 5)
        at_nodes = np.vander(_NODES, 4, increasing=True) @ slopes.T
        turning = np.flatnonzero(np.any(at_nodes[:-1] * at_nodes[1:] < 0.0, axis=0))
        found = [np.empty(0)]
        for step in turning:
            roots = np.polynomial.polynomial.polyroots(np.trim_zeros(slopes[step], "b"))
            real = roots.real[(abs(roots.imag) < 1e-12) & (roots.real > 0.0) & (roots.real < 1.0)]
            found.append(self.starts_s[step] + self.lengths_s[step] * real)
        return np.concatenate(found)


def passed_above(trace: Trace, level: float, longer_than_s: float = 0.0) -> Passed:
    """When a quantity rises above a level, and when it has stayed there longer than is allowed."""
    times, values = trace.looks()
    return _passed(times, values, lambda t: float(trace.at(np.array([t]))[0]), level, longer_than_s)


def passed_below(trace: Trace, level: float, longer_than_s: float = 0.0) -> Passed:
    """When a quantity falls below a level, and when it has stayed there longer than is allowed."""
    times, values = trace.looks()
    return _passed(times, -values, lambda t: -float(trace.at(np.array([t]))[0]), -level, longer_than_s)


class MeanKinetic:
    """Mean kinetic temperature over a window that trails the present.

    The hours of the window that lie before time zero count at the temperature of time zero, which is what was
    held. Source of the mean: Arrhenius mean of USP <1160>.
    """

    def __init__(self, trace: Trace, window_s: float, activation_j_per_mol: float) -> None:
        self.window_s = window_s
        self.over_k = activation_j_per_mol / GAS_CONSTANT_J_PER_MOL_K
        self.reference_k = trace.first + ZERO_CELSIUS_K
        times, temperatures_c = trace.looks()
        ends = times[1:]
        middles = 0.5 * (times[:-1] + ends)
        rates = self._rate(temperatures_c)
        gained = (ends - times[:-1]) / 6.0 * (rates[:-1] + 4.0 * self._rate(trace.at(middles)) + rates[1:])
        self.times_s = times
        self.sum = CubicHermiteSpline(times, np.concatenate([[0.0], np.cumsum(gained)]), rates)

    def at(self, time_s: float) -> float:
        """Mean kinetic temperature of the window that ends at a time. [°C]"""
        since = time_s - self.window_s
        # before time zero the rate is 1, its value at the start
        before = float(self.sum(since)) if since > 0.0 else since
        mean_rate = (float(self.sum(time_s)) - before) / self.window_s
        return self.over_k / (self.over_k / self.reference_k - math.log(mean_rate)) - ZERO_CELSIUS_K

    def passed_above(self, level_c: float) -> Passed:
        """When the mean rises above a level."""
        values = np.array([self.at(time) for time in self.times_s])
        return _passed(self.times_s, values, self.at, level_c, 0.0)

    def _rate(self, temperature_c: Floats) -> Floats:
        """Rate of the reaction against that at the start."""
        rates: Floats = np.exp(self.over_k * (1.0 / self.reference_k - 1.0 / (temperature_c + ZERO_CELSIUS_K)))
        return rates


def _passed(
    times: Floats, values: Floats, value_at: Callable[[float], float], level: float, longer_than_s: float
) -> Passed:
    """First rise above a level, and the end of the first stretch above it that lasts too long."""
    level += _ROUNDING
    above = values > level
    since_s = 0.0 if above[0] else None
    first_s = since_s
    for index in np.flatnonzero(above[1:] != above[:-1]):
        at_s = float(brentq(lambda t: value_at(t) - level, times[index], times[index + 1], xtol=1e-3))
        if since_s is None:
            since_s = at_s
            first_s = at_s if first_s is None else first_s
        elif at_s - since_s >= longer_than_s:
            break
        else:
            since_s = None
    if since_s is None or since_s + longer_than_s > times[-1]:
        return Passed(first_s, None)
    return Passed(first_s, since_s + longer_than_s)
