"""Walls, ceiling, floor, doors and leaks of a store as bodies and conductances.

Layered faces become chains of cells from the inside surface outwards, with edge and corner factors, starting
from the steady temperatures of normal running; faces known by a U-value and every kind of leak become plain
conductances. Called by ``network_of``.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

from app.engine.network import Body, Boundary, FixedLink
from app.physics.conduction import corner_area_m2, edge_area_m2, log_mean_area_m2, penetration_depth_m
from app.physics.melting import constant_curve
from app.reference import material
from app.stores.geometry import FaceSize
from app.stores.shell import Face, Layer
from app.units import hours_from_seconds, seconds_from_hours

_CELL_OF_DAY = 0.15
"""Thickest cell of a layer, as a share of the depth that a day's swing reaches in it."""

_MOST_CELLS = 12

WALL_TOLERANCE_K = 0.1
"""Temperature error allowed in a cell of a wall in one step."""

_THIN_LAYER = (1000.0, 1.0)
"""Specific heat and density of a layer that was given without: it stores next to nothing."""


@dataclass(frozen=True)
class Surroundings:
    """What lies beyond a face: the number of its history, its temperature at the start, its film."""

    history: int
    start_c: float
    film_m2_k_per_w: float


@dataclass(frozen=True)
class LayerValues:
    """A layer in numbers."""

    thickness_m: float
    conductivity_w_per_m_k: float
    density_kg_per_m3: float
    specific_heat_j_per_kg_k: float

    @property
    def diffusivity_m2_per_s(self) -> float:
        return self.conductivity_w_per_m_k / (self.density_kg_per_m3 * self.specific_heat_j_per_kg_k)

    @property
    def resistance_m2_k_per_w(self) -> float:
        return self.thickness_m / self.conductivity_w_per_m_k


@dataclass(frozen=True)
class FacePart:
    """A face as the network takes it, and the working behind it.

    ``delay_h`` is the sum of x²/a over its layers; ``felt_inside_j_per_k`` the part of its heat capacity that the
    inside feels: each cell by the square of its share of the resistance from outside (a third of the
    insulation, all of the inner skin).
    """

    bodies: tuple[Body, ...]
    boundaries: tuple[Boundary, ...]
    conductance_w_per_k: float
    delay_h: float
    felt_inside_j_per_k: float


def layer_values(layer: Layer) -> LayerValues:
    """A layer's own numbers where they were given, else those of its material."""
    if layer.material is not None:
        known = material(layer.material)
        return LayerValues(
            layer.thickness_m.value,
            known.conductivity_w_per_m_k,
            known.density_kg_per_m3,
            known.specific_heat_j_per_kg_k,
        )
    assert layer.conductivity_w_per_m_k is not None  # the definition has checked it
    heat, density = layer.specific_heat_j_per_kg_k, layer.density_kg_per_m3
    return LayerValues(
        layer.thickness_m.value,
        layer.conductivity_w_per_m_k.value,
        density.value if density else _THIN_LAYER[1],
        heat.value if heat else _THIN_LAYER[0],
    )


def conduction_area_m2(size: FaceSize, thickness_m: float, with_edges: bool) -> float:
    """Area that conducts through a face of some thickness: log-mean for a round wall, edges and corners added."""
    area = size.inside_m2
    if size.is_round_wall:
        height_m = size.inside_m2 / (2.0 * math.pi * size.radius_m)
        area = log_mean_area_m2(
            inside_m2=size.inside_m2, outside_m2=2.0 * math.pi * (size.radius_m + thickness_m) * height_m
        )
    if with_edges:
        area += edge_area_m2(edge_length_m=size.edge_m, thickness_m=thickness_m)
        area += corner_area_m2(corners=size.corners, thickness_m=thickness_m)
    return area


def outside_area_m2(size: FaceSize, thickness_m: float) -> float:
    """Outer area of a face of some thickness."""
    if size.is_round_wall:
        return size.inside_m2 * (1.0 + thickness_m / size.radius_m)
    return size.inside_m2 + 2.0 * thickness_m * size.edge_m + 3.0 * size.corners * thickness_m**2


def layered_face(
    name: str,
    face: Face,
    size: FaceSize,
    opening_m2: float,
    with_edges: bool,
    first_body: int,
    inside_film_m2_k_per_w: float,
    beyond: Surroundings,
    inside_c: float,
) -> FacePart:
    """Cells of a layered face, from inside to outside, hung on the air (body 0)."""
    layers = [layer_values(layer) for layer in reversed(face.layers or ())]
    thickness_m = sum(layer.thickness_m for layer in layers)
    closed = 1.0 - opening_m2 / size.inside_m2
    area_m2 = conduction_area_m2(size, thickness_m, with_edges) * closed
    inside_w_per_k = size.inside_m2 * closed / inside_film_m2_k_per_w
    flat_as_inside = not with_edges and not size.is_round_wall
    outside_m2 = size.inside_m2 if flat_as_inside else outside_area_m2(size, thickness_m)
    outside_w_per_k = outside_m2 * closed / max(beyond.film_m2_k_per_w, 1e-9)
    cells = [cell for layer in layers for cell in _cells(layer)]
    halves = [cell.resistance_m2_k_per_w / 2.0 / area_m2 for cell in cells]
    resistances = [1.0 / inside_w_per_k + halves[0]]
    resistances += [halves[j - 1] + halves[j] for j in range(1, len(cells))]
    out = halves[-1] + 1.0 / outside_w_per_k
    total = sum(resistances) + out
    bodies, passed, felt = [], 0.0, 0.0
    for j, cell in enumerate(cells):
        passed += resistances[j]
        mass_kg = cell.density_kg_per_m3 * cell.thickness_m * area_m2
        felt += mass_kg * cell.specific_heat_j_per_kg_k * (1.0 - passed / total) ** 2
        bodies.append(
            Body(
                name=f"{name}, cell {j + 1}",
                parent=0 if j == 0 else first_body + j - 1,
                link=FixedLink(1.0 / resistances[j]),
                curve=constant_curve(
                    specific_heat_j_per_kg_k=cell.specific_heat_j_per_kg_k,
                    conductivity_w_per_m_k=cell.conductivity_w_per_m_k,
                    density_kg_per_m3=cell.density_kg_per_m3,
                ),
                mass_kg=mass_kg,
                start_c=inside_c + (beyond.start_c - inside_c) * passed / total,
                tolerance_k=WALL_TOLERANCE_K,
            )
        )
    boundary = Boundary(first_body + len(cells) - 1, beyond.history, 1.0 / out, name)
    delay_s = sum(layer.thickness_m**2 / layer.diffusivity_m2_per_s for layer in layers)
    return FacePart(tuple(bodies), (boundary,), 1.0 / total, hours_from_seconds(delay_s), felt)


def _cells(layer: LayerValues) -> list[LayerValues]:
    """Equal cells of a layer, thin against what a day's swing reaches."""
    day_depth_m = penetration_depth_m(
        diffusivity_m2_per_s=layer.diffusivity_m2_per_s, period_s=seconds_from_hours(24.0)
    )
    count = min(max(math.ceil(layer.thickness_m / (_CELL_OF_DAY * day_depth_m)), 1), _MOST_CELLS)
    return [
        LayerValues(
            layer.thickness_m / count,
            layer.conductivity_w_per_m_k,
            layer.density_kg_per_m3,
            layer.specific_heat_j_per_kg_k,
        )
    ] * count
