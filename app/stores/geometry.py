"""Sizes: of an enclosure's faces, and of a block of contents seen as nested layers from its surface inwards.

Pure arithmetic on lengths, areas and volumes, called by ``enclosure`` and ``loads``. A block of contents is
reduced to one dimension by its depth: at depth x there is an inner surface of area A(x) that holds the volume
V(x). That is exact for slabs, long cylinders and spheres, and close for boxes.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from scipy.optimize import brentq


@dataclass(frozen=True)
class FaceSize:
    """One face of an enclosure: inside area, and the length of edge and number of corners that it owns.

    An edge is shared by two faces and counts half to each, a corner a third to each of three.
    """

    inside_m2: float
    edge_m: float
    corners: float
    is_round_wall: bool = False
    radius_m: float = 0.0


def box_faces(width_m: float, depth_m: float, height_m: float) -> dict[str, FaceSize]:
    """Walls (all four together), ceiling and floor of a box."""
    plan_m = 2.0 * (width_m + depth_m)
    flat = FaceSize(width_m * depth_m, plan_m / 2.0, 4.0 / 3.0)
    walls = FaceSize(plan_m * height_m, 4.0 * height_m + plan_m, 16.0 / 3.0)
    return {"walls": walls, "ceiling": flat, "floor": flat}


def cylinder_faces(diameter_m: float, height_m: float) -> dict[str, FaceSize]:
    """Round wall, ceiling and floor of an upright cylinder."""
    around_m = math.pi * diameter_m
    flat = FaceSize(math.pi * diameter_m**2 / 4.0, around_m / 2.0, 0.0)
    wall = FaceSize(around_m * height_m, around_m, 0.0, is_round_wall=True, radius_m=diameter_m / 2.0)
    return {"walls": wall, "ceiling": flat, "floor": flat}


@dataclass(frozen=True)
class Block:
    """Pieces of contents that are alike, seen from their surface inwards.

    ``area_at_m2`` gives the area of the inner surface at a depth, ``half_thickness_m`` the depth at which
    nothing is left, ``height_m`` the height of the surface that air runs along. Areas and volumes are those of
    all ``pieces`` together.
    """

    pieces: int
    half_thickness_m: float
    height_m: float
    area_at_m2: Callable[[float], float]
    volume_m3: float

    @property
    def area_m2(self) -> float:
        """Area of the surface in the air."""
        return self.area_at_m2(0.0)

    def volume_share_outside(self, depth_m: float) -> float:
        """Share of the volume that lies less deep than a depth."""
        table = self._table()
        return float(np.interp(depth_m, table.depth_m, table.outside_m3)) / float(table.outside_m3[-1])

    def shells(self, count: int) -> tuple[Shell, ...]:
        """The block cut into ``count`` layers, thin ones at the surface, outermost first."""
        if count == 1:
            return (self._lump(),)
        depths = self._table()
        edges_m = self.half_thickness_m * _graded(count)
        within = [float(np.interp(edge, depths.depth_m, depths.outside_m3)) for edge in edges_m]
        nodes_m = [
            float(np.interp(0.5 * (within[j] + within[j + 1]), depths.outside_m3, depths.depth_m)) for j in range(count)
        ]
        paths = [float(np.interp(depth, depths.depth_m, depths.path_per_m)) for depth in [*nodes_m, *edges_m]]
        node_path, edge_path = paths[:count], paths[count:]
        return tuple(
            Shell(
                volume_share=(within[j + 1] - within[j]) / within[-1],
                outward_per_m=node_path[j] - edge_path[j],
                inward_per_m=edge_path[j + 1] - node_path[j] if j + 1 < count else 0.0,
            )
            for j in range(count)
        )

    def _lump(self) -> Shell:
        """All of it as one body, whose mean lies behind the path that an even warming needs.

        Heat that passes depth x is what V(x) takes up, so the mean lags the surface by the path
        ``integral of V(x)² / A(x) dx / V(0)²``: L/3A for a slab, r/4A and r/5A for cylinder and sphere.
        """
        table = self._table()
        inside = table.outside_m3[-1] - table.outside_m3
        area = np.maximum(table.area_m2, 1e-12)
        path = float(np.trapezoid(inside**2 / area, table.depth_m)) / table.outside_m3[-1] ** 2
        return Shell(volume_share=1.0, outward_per_m=path, inward_per_m=0.0)

    def _table(self) -> _DepthTable:
        # ends just short of the middle, where the inner surface of a box or cylinder shrinks to nothing
        depth = self.half_thickness_m * (1.0 - (1.0 - np.linspace(0.0, 1.0, 401)) ** 2)
        area = np.array([self.area_at_m2(float(x)) for x in depth])
        slices = np.diff(depth)
        middle = np.array([self.area_at_m2(float(x)) for x in 0.5 * (depth[1:] + depth[:-1])])
        outside = np.concatenate([[0.0], np.cumsum(slices / 6.0 * (area[:-1] + 4.0 * middle + area[1:]))])
        path = np.concatenate([[0.0], np.cumsum(slices / np.maximum(middle, 1e-12))])
        return _DepthTable(depth, area, outside, path)


@dataclass(frozen=True)
class _DepthTable:
    """Along the depth: inner area, volume outside of it, and the path ``integral dx / A`` from the surface."""

    depth_m: np.ndarray
    area_m2: np.ndarray
    outside_m3: np.ndarray
    path_per_m: np.ndarray


@dataclass(frozen=True)
class Shell:
    """One layer of a block: its share of the volume, and the paths (length over area) to its two sides."""

    volume_share: float
    outward_per_m: float
    inward_per_m: float


def box_block(pieces: int, width_m: float, depth_m: float, height_m: float, *, stands: bool) -> Block:
    """Boxes in the air; one that ``stands`` on a floor or pallet gets no heat from below.

    Without heat from below a box is the upper half of one twice as high.
    """
    a, b = width_m / 2.0, depth_m / 2.0
    c, halves = (height_m, 0.5) if stands else (height_m / 2.0, 1.0)

    def area_at(x: float) -> float:
        inner = (a - x) * (b - x) + (a - x) * (c - x) + (b - x) * (c - x)
        return pieces * halves * 8.0 * max(inner, 0.0)

    return Block(pieces, min(a, b, c), height_m, area_at, pieces * width_m * depth_m * height_m)


def cylinder_block(pieces: int, diameter_m: float, length_m: float, *, height_m: float) -> Block:
    """Upright or hanging cylinders with air all round."""
    radius, half = diameter_m / 2.0, length_m / 2.0

    def area_at(x: float) -> float:
        side = 2.0 * math.pi * max(radius - x, 0.0) * 2.0 * max(half - x, 0.0)
        return pieces * (side + 2.0 * math.pi * max(radius - x, 0.0) ** 2)

    volume = pieces * math.pi * radius**2 * length_m
    return Block(pieces, min(radius, half), height_m, area_at, volume)


def slab_block(area_m2: float, half_thickness_m: float, *, height_m: float) -> Block:
    """A flat body of given exposed area and depth behind it."""
    return Block(1, half_thickness_m, height_m, lambda _: area_m2, area_m2 * half_thickness_m)


def near_cubic_stack(count: int, width_m: float, depth_m: float, height_m: float) -> tuple[float, float, float]:
    """Sides of the most compact stack of ``count`` equal boxes laid side by side. [m]

    Counts that make no full stack are spread evenly: the stack keeps the volume of its boxes.
    """
    best = (math.inf, (width_m, depth_m, height_m))
    for across in range(1, count + 1):
        for along in range(1, count // across + 1):
            high = count / (across * along)
            sides = (across * width_m, along * depth_m, high * height_m)
            surface = sides[0] * sides[1] + sides[1] * sides[2] + sides[0] * sides[2]
            best = min(best, (surface, sides))
    return best[1]


def _graded(count: int) -> np.ndarray:
    """Edges of ``count`` layers from 0 to 1, each layer thicker than the one outside it."""
    if count == 1:
        return np.array([0.0, 1.0])
    ratio = brentq(lambda q: q ** (count - 1) - _COARSEST, 1.0, _COARSEST)
    widths = ratio ** np.arange(count)
    return np.concatenate([[0.0], np.cumsum(widths) / widths.sum()])


_COARSEST = 6.0
"""Thickness of the innermost layer against the outermost."""
