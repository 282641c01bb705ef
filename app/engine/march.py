"""March networks through time: energies in, energies out, with the evidence that the heat adds up.

State is the enthalpy of every body; each store has its own steps, as long as its error allows. A step that
carries a body over a break of its enthalpy curve (melting begins or ends) is cut at the break; the surroundings
end steps at their own breaks. Heat by path is carried by the same stages, so that the balance closes to
rounding. Watched quantities are traced at several points of every step; ``crossings`` reads the traces.
"""

from __future__ import annotations

import math
import os
from collections.abc import Sequence
from concurrent.futures import ThreadPoolExecutor
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from app.engine.network import Network
from app.engine.steps import FINISHED, NOT_FINITE, STEP_TOO_SMALL, march_one
from app.errors import EnergyNotConserved, SolverStopped

ENGINE_VERSION = "1.0.0"
"""Changes whenever an answer may change; printed with every answer and part of its fingerprint."""

CLOSURE_LIMIT_FRACTION = 1e-6
"""A run whose heat does not close within this share of the heat that moved is refused."""

_REASONS = {
    NOT_FINITE: "a temperature was no longer a number",
    STEP_TOO_SMALL: "the step needed became too small to go on",
}


@dataclass(frozen=True)
class Precision:
    """How fine a run is: factor on every body's temperature tolerance, and the longest step. [-, s]"""

    tolerance: float = 1.0
    longest_step_s: float = 7200.0


@dataclass(frozen=True)
class Run:
    """One finished run of one network.

    ``trace_s`` has shape (4 n_steps + 1,): the start, then four points of every step; ``traces`` has shape
    (4 n_steps + 1, n_watches). ``energies_j`` has shape (n_bodies,) at the end; ``path_j`` (n_paths,) the heat
    that came in by each path, ``path_start_w`` its flow at time zero. ``closure_error_fraction`` compares
    heat stored with heat that came in, over the heat that moved.
    """

    trace_s: NDArray[np.float64]
    traces: NDArray[np.float64]
    energies_j: NDArray[np.float64]
    path_j: NDArray[np.float64]
    path_start_w: NDArray[np.float64]
    closure_error_fraction: float
    steps: int
    steps_refused: int


def march(network: Network, horizon_s: float, precision: Precision | None = None) -> Run:
    """Run one network from time zero to the horizon.

    Raises ``SolverStopped`` when a run does not reach its horizon and ``EnergyNotConserved`` when its heat
    does not close within ``CLOSURE_LIMIT_FRACTION``; an unfinished run is never returned.
    """
    precision = precision or Precision()
    status, reached_s, steps, refused, trace, energies_j, path_j, moved_j, path_start_w = march_one(
        network.bodies,
        network.segments,
        network.boundaries,
        network.pieces,
        network.piece_starts,
        network.stops_s,
        network.watches,
        len(network.path_names),
        float(horizon_s),
        float(precision.tolerance),
        float(precision.longest_step_s),
    )
    if status != FINISHED:
        raise SolverStopped(reached_s, _REASONS[status])
    stored_j = math.fsum(energies_j - network.bodies["start_j"])
    closure = abs(stored_j - math.fsum(path_j)) / max(moved_j, 1.0)
    if not closure <= CLOSURE_LIMIT_FRACTION:
        raise EnergyNotConserved(closure, CLOSURE_LIMIT_FRACTION)
    return Run(trace[:, 0], trace[:, 1:], energies_j, path_j, path_start_w, closure, steps, refused)


def march_many(networks: Sequence[Network], horizon_s: float, precision: Precision | None = None) -> list[Run]:
    """Run many networks, each with its own steps, on all cores; one run per network, in order.

    The compiled loop releases the interpreter lock, so plain threads share the work.
    """
    if len(networks) == 1:
        return [march(networks[0], horizon_s, precision)]
    with ThreadPoolExecutor(os.cpu_count()) as pool:
        return list(pool.map(lambda network: march(network, horizon_s, precision), networks))
