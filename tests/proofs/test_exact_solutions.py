"""The engine against exact solutions at inputs of its own choice, and blocks of contents against their series."""

from __future__ import annotations

import numpy as np
import pytest

from app.engine import build_network
from app.engine.histories import Constant, Day, Ramp
from app.engine.network import (
    BODY_TEMPERATURE,
    MEAN,
    SURFACE,
    Body,
    Boundary,
    CellLink,
    FixedLink,
    Network,
    SteadyFilmLink,
    Watch,
)
from app.physics.transient import body_share
from app.stores.geometry import Block, box_block, cylinder_block
from tests.engine.building import HOUR_S, at_hours, even_curve, lump, melting_curve, run_hours, slab_bodies
from tests.proofs.exact import Neumann, WallWithContents, day_c, ramp_c, two_bodies_c

CLOSE_K = 3e-3
"""A step of the engine may be 0.001 K off; a few of them add up."""


@pytest.mark.parametrize("tau_h", [4.0, 15.0, 90.0])
def test_lump_in_a_ramp(tau_h):
    network = lump(tau_h * HOUR_S * 8.0, 8.0, -22.0, Ramp(18.0, 18.0 + 0.4 * 60.0, 60.0 * HOUR_S))
    run = run_hours(network, 40)
    for hours in (3.0, 17.0, 40.0):
        exact = ramp_c(hours, time_constant_s=tau_h, start_c=-22.0, room_c=18.0, room_k_per_s=0.4)
        assert at_hours(run, 0, hours)[0] == pytest.approx(exact, abs=CLOSE_K)


@pytest.mark.parametrize("tau_h", [3.0, 12.0, 60.0])
def test_lump_in_a_day(tau_h):
    network = lump(tau_h * HOUR_S * 8.0, 8.0, 5.0, Day(24.0, 7.0, peak_s=0.0, start_s=0.0))
    run = run_hours(network, 60)
    for hours in (2.0, 13.0, 31.0, 60.0):
        exact = day_c(
            hours * HOUR_S,
            time_constant_s=tau_h * HOUR_S,
            start_c=5.0,
            mean_c=24.0,
            swing_k=7.0,
            period_s=24.0 * HOUR_S,
        )
        assert at_hours(run, 0, hours)[0] == pytest.approx(exact, abs=CLOSE_K)


@pytest.mark.parametrize(("air", "product", "wall", "film"), [(3e4, 9e5, 6.0, 25.0), (2e6, 2e7, 30.0, 400.0)])
def test_air_and_a_product(air, product, wall, film):
    network = build_network(
        [
            Body("air", 0, None, even_curve(air), 1.0, 4.0, 0.01),
            Body("product", 0, FixedLink(film), even_curve(product), 1.0, 4.0, 0.001),
        ],
        [Boundary(0, 0, wall, "wall")],
        [Constant(32.0)],
        [Watch("air", BODY_TEMPERATURE, 0, 0), Watch("product", BODY_TEMPERATURE, 1, 1)],
    )
    run = run_hours(network, 48)
    for hours in (0.5, 8.0, 48.0):
        exact = two_bodies_c(
            hours * HOUR_S,
            air_j_per_k=air,
            product_j_per_k=product,
            wall_w_per_k=wall,
            film_w_per_k=film,
            start_c=4.0,
            room_c=32.0,
        )
        found = [at_hours(run, column, hours)[0] for column in (0, 1)]
        assert found[0] == pytest.approx(exact[0], abs=0.03)  # air is held to 0.01 K a step
        assert found[1] == pytest.approx(exact[1], abs=CLOSE_K)


def test_temperatures_on_both_sides_of_a_front_of_freezing():
    wall_c, start_c, hours = -30.0, 4.0, 12.0
    exact = Neumann(wall_c, start_c, 0.0, 333600.0, 917.0, 2.22, 2050.0, 0.58, 4200.0)
    curve = melting_curve(2050.0, 4200.0, 333600.0)
    edges = np.concatenate([np.linspace(0.0, 0.24, 121), np.linspace(0.24, 1.5, 50)[1:]])
    cells = len(edges) - 1
    first = SteadyFilmLink(1.0, 1e9, 0.5 * (edges[1] - edges[0]))
    water = slab_bodies("water", 0, first, curve, 1.0, edges, [start_c] * cells, 1)
    watched = [10, 30, 45, 75, 110]
    network = build_network(
        [Body("face", 0, None, even_curve(1.0), 1e-3, wall_c, 0.02), *water],
        [Boundary(0, 0, 1e9, "face")],
        [Constant(wall_c)],
        [Watch(f"cell {cell}", BODY_TEMPERATURE, cell, cell) for cell in watched],
    )
    run = run_hours(network, hours)
    front_m = exact.front_m(hours * HOUR_S)
    for column, cell in enumerate(watched):
        depth_m = 0.5 * (edges[cell - 1] + edges[cell])
        assert abs(depth_m - front_m) > 0.01
        # cells of 2 mm freeze one by one, so the ice behind the front lags and leads by up to half of one
        expected = exact.temperature_c(depth_m, hours * HOUR_S)
        assert run.traces[-1, column] == pytest.approx(expected, abs=0.25)


@pytest.mark.parametrize(
    "wall",
    [
        WallWithContents(0.007, 200.0, 800.0, 0.03, 12.0, 2e5, 5.0, 30.0),
        WallWithContents(0.035, 25.0, 1450.0, 0.15, 12.0, 8e3, -18.0, 28.0),
        WallWithContents(1.0, 1800.0, 900.0, 0.25, 12.0, 1e5, 2.0, 35.0),
    ],
    ids=["vacuum panel", "foam with little in it", "brick"],
)
def test_contents_behind_a_wall(wall):
    cells = 24
    half = 0.5 * wall.thickness_m / cells
    k, film = wall.conductivity_w_per_m_k, wall.film_w_per_m2_k
    edges = np.linspace(0.0, wall.thickness_m, cells + 1)
    slope = (wall.room_c - wall.start_c) / (wall.thickness_m / k + 1.0 / film) / k
    starts = [wall.start_c + slope * 0.5 * (a + b) for a, b in zip(edges[:-1], edges[1:], strict=True)]
    curve = even_curve(wall.specific_heat_j_per_kg_k, k, wall.density_kg_per_m3)
    layers = slab_bodies("wall", 0, SteadyFilmLink(1.0, 1e9, half), curve, 1.0, edges, starts, 1)
    network = build_network(
        [Body("contents", 0, None, even_curve(wall.contents_j_per_m2_k), 1.0, wall.start_c, 0.001), *layers],
        [Boundary(cells, 0, 1.0 / (half / k + 1.0 / film), "wall")],
        [Constant(wall.room_c)],
        [Watch("contents", BODY_TEMPERATURE, 0, 0)],
    )
    run = run_hours(network, 30)
    exact_c = wall.contents_c()
    for hours in (2.0, 9.0, 30.0):
        # 24 cells: error of space 1/24² of what the wall itself holds
        assert at_hours(run, 0, hours)[0] == pytest.approx(exact_c(hours * HOUR_S), abs=0.01)


def block_in_air(block: Block, shells: int, *, film_w_per_m2_k: float) -> Network:
    """A block of 1 W/m·K and 1e6 J/m³·K from 1 °C in air of 0 °C: its temperatures are shares."""
    parts = block.shells(shells)
    curve = even_curve(1000.0, 1.0, 1000.0)
    bodies = [
        Body(
            f"shell {j + 1}",
            max(j, 0),
            SteadyFilmLink(block.area_m2, film_w_per_m2_k, parts[0].outward_per_m)
            if j == 0
            else CellLink(parts[j].outward_per_m, parts[j - 1].inward_per_m),
            curve,
            1000.0 * block.volume_m3 * part.volume_share,
            1.0,
            1e-4,
        )
        for j, part in enumerate(parts)
    ]
    return build_network(
        [Body("air", 0, None, even_curve(1.0), 1e-3, 0.0, 1e-3), *bodies],
        [Boundary(0, 0, 1e9, "room")],
        [Constant(0.0)],
        [Watch("surface", SURFACE, 1, shells), Watch("mean", MEAN, 1, shells)],
    )


@pytest.mark.parametrize(("biot", "shells"), [(0.3, 4), (1.0, 6), (4.0, 8)])
@pytest.mark.parametrize("fourier", [0.1, 0.4, 1.0])
def test_long_cylinder_in_shells_follows_its_series(biot, shells, fourier):
    radius = 0.1
    block = cylinder_block(1, 2.0 * radius, 400.0 * radius, height_m=1.0)
    run = run_hours(block_in_air(block, shells, film_w_per_m2_k=biot / radius), 4.0)
    surface, mean = body_share(shape="cylinder", biot=biot, fourier=fourier, position=1.0)
    hours = fourier * radius**2 / 1e-6 / HOUR_S
    # graded shells, as many as a store takes for this Biot number
    assert at_hours(run, 1, hours)[0] == pytest.approx(mean, abs=0.01)
    assert at_hours(run, 0, hours)[0] == pytest.approx(surface, abs=0.02)


@pytest.mark.parametrize(("biot", "shells"), [(0.3, 4), (1.0, 6), (4.0, 8)])
@pytest.mark.parametrize("sides", [(0.2, 0.2, 0.2), (0.2, 0.3, 0.6)])
def test_box_in_nested_shells_follows_the_product_of_three_slabs(biot, shells, sides):
    # A box is exact only as three slabs at once; nested shells let heat in at corners as if a whole layer shared
    # it. That errs on the warm side, by 0.015, 0.03 and 0.045 of the difference at Biot numbers of 0.3, 1 and 4.
    film = biot / (min(sides) / 2.0)
    run = run_hours(block_in_air(box_block(1, *sides, stands=False), shells, film_w_per_m2_k=film), 6.0)
    for hours in (0.5, 1.5, 4.0):
        mean = 1.0
        for side in sides:
            fourier = 1e-6 * hours * HOUR_S / (side / 2.0) ** 2
            mean *= body_share(shape="slab", biot=film * side / 2.0, fourier=fourier, position=0.0)[1]
        error = at_hours(run, 1, hours)[0] - mean
        assert -0.045 < error < 0.002
