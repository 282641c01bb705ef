"""Temperatures of the surroundings as closed forms in time.

Every kind of history (constant, ramp, day swing, drift, series) becomes a row of pieces, each
``level + slope s + decay exp(-s/tau) + cosine cos(w s) + sine sin(w s)`` with s the seconds since its start,
so that the engine reads a temperature and its rate of change without interpolating tables, and knows the
times at which a step has to end.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

PIECE = np.dtype(
    [
        ("start_s", np.float64),
        ("level_c", np.float64),
        ("slope_k_per_s", np.float64),
        ("decay_k", np.float64),
        ("decay_per_s", np.float64),
        ("cosine_k", np.float64),
        ("sine_k", np.float64),
        ("turn_per_s", np.float64),
    ]
)
"""One piece of a history, as the engine reads it."""


@dataclass(frozen=True)
class Constant:
    """The same temperature all the time."""

    temperature_c: float


@dataclass(frozen=True)
class Ramp:
    """An even rise or fall from one temperature to another, which then stays."""

    from_c: float
    to_c: float
    over_s: float


@dataclass(frozen=True)
class Day:
    """A day swing: the mean, half of the difference between warmest and coldest, the hour of the peak."""

    mean_c: float
    swing_k: float
    peak_s: float
    start_s: float
    """Time of day at time zero."""
    period_s: float = 86400.0


@dataclass(frozen=True)
class Series:
    """Temperatures at given times, straight between them, the ends continued level."""

    time_s: tuple[float, ...]
    temperature_c: tuple[float, ...]


@dataclass(frozen=True)
class Drift:
    """A room that follows another history with one time constant, from a temperature of its own."""

    start_c: float
    towards: Constant | Ramp | Day | Series
    time_constant_s: float


History = Constant | Ramp | Day | Series | Drift


def pieces_of(history: History) -> NDArray[np.void]:
    """The pieces of a history, from time zero on, as an array of PIECE, shape (n_pieces,)."""
    if isinstance(history, Drift):
        return _followed(pieces_of(history.towards), history.start_c, history.time_constant_s)
    if isinstance(history, Day):
        turn = 2.0 * math.pi / history.period_s
        late = turn * (history.start_s - history.peak_s)
        swing = history.swing_k
        return np.array(
            [(0.0, history.mean_c, 0.0, 0.0, 0.0, swing * math.cos(late), -swing * math.sin(late), turn)],
            dtype=PIECE,
        )
    if isinstance(history, Constant):
        return _straight([0.0], [history.temperature_c])
    if isinstance(history, Ramp):
        return _straight([0.0, history.over_s], [history.from_c, history.to_c])
    return _straight(list(history.time_s), list(history.temperature_c))


def temperature_c(pieces: NDArray[np.void], time_s: NDArray[np.float64]) -> NDArray[np.float64]:
    """Temperature of a history at given times, shape as ``time_s``. [°C]"""
    index = np.maximum(np.searchsorted(pieces["start_s"], time_s, side="right") - 1, 0)
    piece = pieces[index]
    since = time_s - piece["start_s"]
    turned = piece["turn_per_s"] * since
    temperatures: NDArray[np.float64] = (
        piece["level_c"]
        + piece["slope_k_per_s"] * since
        + piece["decay_k"] * np.exp(-piece["decay_per_s"] * since)
        + piece["cosine_k"] * np.cos(turned)
        + piece["sine_k"] * np.sin(turned)
    )
    return temperatures


def _straight(time_s: list[float], at_c: list[float]) -> NDArray[np.void]:
    rows = []
    if time_s[0] > 0.0:
        rows.append((0.0, at_c[0], 0.0, 0.0, 0.0, 0.0, 0.0, 0.0))
    for k in range(len(time_s)):
        last = k + 1 == len(time_s)
        slope = 0.0 if last else (at_c[k + 1] - at_c[k]) / (time_s[k + 1] - time_s[k])
        rows.append((time_s[k], at_c[k], slope, 0.0, 0.0, 0.0, 0.0, 0.0))
    return np.array(rows, dtype=PIECE)


def _followed(outer: NDArray[np.void], start_c: float, tau_s: float) -> NDArray[np.void]:
    """Response of a first-order room to each piece: ``tau dT/dt = outer - T``, joined end to start."""
    inner = outer.copy()
    value_c = start_c
    for k, piece in enumerate(outer):
        turned = piece["turn_per_s"] * tau_s
        share = 1.0 / (1.0 + turned * turned)
        inner[k]["level_c"] = piece["level_c"] - piece["slope_k_per_s"] * tau_s
        inner[k]["cosine_k"] = share * (piece["cosine_k"] - turned * piece["sine_k"])
        inner[k]["sine_k"] = share * (piece["sine_k"] + turned * piece["cosine_k"])
        inner[k]["decay_k"] = value_c - inner[k]["level_c"] - inner[k]["cosine_k"]
        inner[k]["decay_per_s"] = 1.0 / tau_s
        if k + 1 < len(outer):
            value_c = float(temperature_c(inner[: k + 1], np.array([outer[k + 1]["start_s"]]))[0])
    return inner
