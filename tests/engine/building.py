"""Small networks for tests: one-liners for curves, bodies and slabs."""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np

from app.engine import Network, Run, Trace, build_network, march
from app.engine.histories import History
from app.engine.network import BODY_TEMPERATURE, Body, Boundary, CellLink, Link, Watch
from app.physics import LINEAR, EnthalpyCurve, Segment

HOUR_S = 3600.0


def even_curve(
    specific_heat_j_per_kg_k: float, conductivity_w_per_m_k: float = 1.0, density_kg_per_m3: float = 1000.0
) -> EnthalpyCurve:
    """Constant capacity, no melting."""
    segment = Segment(LINEAR, 0.0, 1000.0, 0.0, 1000.0 * specific_heat_j_per_kg_k, specific_heat_j_per_kg_k)
    return EnthalpyCurve((segment,), conductivity_w_per_m_k, conductivity_w_per_m_k, density_kg_per_m3)


def melting_curve(
    solid_j_per_kg_k: float,
    liquid_j_per_kg_k: float,
    latent_j_per_kg: float,
    melting_c: float = 0.0,
    solid_w_per_m_k: float = 2.22,
    liquid_w_per_m_k: float = 0.58,
    density_kg_per_m3: float = 917.0,
) -> EnthalpyCurve:
    """A pure substance: constant capacities on both sides of a plateau."""
    depth, height = 100.0 * solid_j_per_kg_k, 100.0 * liquid_j_per_kg_k
    return EnthalpyCurve(
        (
            Segment(LINEAR, melting_c - 100.0, melting_c, -depth, 0.0, solid_j_per_kg_k, 0.0, 1.0, 1.0),
            Segment(LINEAR, melting_c, melting_c, 0.0, latent_j_per_kg, math.inf, 0.0, 1.0, 0.0),
            Segment(
                LINEAR,
                melting_c,
                melting_c + 100.0,
                latent_j_per_kg,
                latent_j_per_kg + height,
                liquid_j_per_kg_k,
                0.0,
                0.0,
                0.0,
            ),
        ),
        liquid_w_per_m_k,
        solid_w_per_m_k,
        density_kg_per_m3,
    )


def lump(capacity_j_per_k: float, conductance_w_per_k: float, start_c: float, surroundings: History) -> Network:
    """One body joined to one surroundings."""
    return build_network(
        [Body("lump", 0, None, even_curve(capacity_j_per_k), 1.0, start_c, 0.001)],
        [Boundary(0, 0, conductance_w_per_k, "wall")],
        [surroundings],
        [Watch("lump", BODY_TEMPERATURE, 0, 0)],
    )


def slab_bodies(
    name: str,
    parent: int,
    first_link: Link | None,
    curve: EnthalpyCurve,
    area_m2: float,
    edges_m: Sequence[float],
    starts_c: Sequence[float],
    first_body: int,
) -> list[Body]:
    """A chain of cells between given depths, the first hung on ``parent``."""
    bodies = []
    for j, (near, far) in enumerate(zip(edges_m[:-1], edges_m[1:], strict=True)):
        half = 0.5 * (far - near) / area_m2
        link: Link | None = first_link
        if j > 0:
            link = CellLink(half, 0.5 * (edges_m[j] - edges_m[j - 1]) / area_m2)
        mass_kg = curve.density_kg_per_m3 * area_m2 * (far - near)
        above = parent if j == 0 else first_body + j - 1
        bodies.append(Body(f"{name} {j + 1}", above, link, curve, mass_kg, starts_c[j], 0.001))
    return bodies


def trace(run: Run, column: int) -> Trace:
    """One traced quantity of a run."""
    return Trace(run.trace_s, run.traces[:, column])


def at_hours(run: Run, column: int, *hours: float) -> np.ndarray:
    """Values of a traced quantity at some hours."""
    return trace(run, column).at(np.array(hours) * HOUR_S)


def run_hours(network: Network, hours: float) -> Run:
    """A run with the precision that answers use."""
    return march(network, hours * HOUR_S)
