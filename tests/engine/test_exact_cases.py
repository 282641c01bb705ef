"""The engine against exact solutions, at the precision that answers use.

Sources: closed forms and series, evaluated with 40 digits, unless a test names another (all computed). The
tolerance of most is set by the error that one step may make (0.001 K in contents); what is reached is smaller.
"""

from __future__ import annotations

import math

import numpy as np
import pytest
from scipy.integrate import quad
from scipy.optimize import brentq
from scipy.special import erf, erfc

from app.engine import build_network, march, passed_above
from app.engine.histories import Constant, Day, Drift, Ramp, Series
from app.engine.network import (
    BODY_TEMPERATURE,
    MEAN,
    MELTED,
    SURFACE,
    Body,
    Boundary,
    CellLink,
    FilmLink,
    FixedLink,
    SteadyFilmLink,
    Watch,
)
from app.physics import FREEZING, LINEAR, EnthalpyCurve, FilmLaw, Segment
from tests.engine.building import (
    HOUR_S,
    at_hours,
    even_curve,
    lump,
    melting_curve,
    run_hours,
    slab_bodies,
    trace,
)

CLOSE_K = 2e-3
CLOSE_S = 2.0


def broken_h(run, column: int, level: float) -> float:
    passed = passed_above(trace(run, column), level)
    assert passed.broken_s is not None
    return passed.broken_s / HOUR_S


def test_one_lump_follows_the_exponential():
    network = lump(capacity_j_per_k=1e6, conductance_w_per_k=10.0, start_c=-20.0, surroundings=Constant(25.0))
    run = run_hours(network, 72)
    hours = np.array([1.0, 10.0, 27.0, 60.0])
    exact = 25.0 - 45.0 * np.exp(-hours * HOUR_S / 1e5)
    assert at_hours(run, 0, *hours) == pytest.approx(exact, abs=CLOSE_K)


def test_water_warms_melts_and_warms_as_three_closed_forms():
    # 100 kg, -25 to +8 °C, 5 W/K, 30 °C outside: m c/UA ln, m L/(UA dT), m c/UA ln
    network = build_network(
        [Body("ice", 0, None, melting_curve(2100.0, 4186.0, 334000.0), 100.0, -25.0, 0.001)],
        [Boundary(0, 0, 5.0, "wall")],
        [Constant(30.0)],
        [Watch("ice", BODY_TEMPERATURE, 0, 0), Watch("melted", MELTED, 0, 0)],
    )
    run = run_hours(network, 90)
    assert broken_h(run, 0, 8.0) * HOUR_S == pytest.approx(274090.54101422, abs=CLOSE_S)
    melted = trace(run, 1)
    assert passed_above(melted, 1e-6).broken_s == pytest.approx(25457.703749953, abs=CLOSE_S)
    assert passed_above(melted, 1 - 1e-6).broken_s == pytest.approx(25457.703749953 + 222666.66666667, abs=CLOSE_S)
    # temperature stands still while it melts
    assert at_hours(run, 0, 30.0, 60.0) == pytest.approx([0.0, 0.0], abs=1e-9)


def test_day_swing_on_a_lump():
    network = lump(36.0 * HOUR_S * 5.0, 5.0, -20.0, Day(25.0, 8.0, peak_s=0.0, start_s=0.0))
    run = run_hours(network, 72)
    expected = [-7.3967843490875, 1.9395650252389, 13.203713293325]
    assert at_hours(run, 0, 12, 24, 48) == pytest.approx(expected, abs=CLOSE_K)
    assert broken_h(run, 0, -5.0) == pytest.approx(15.549583375212, abs=CLOSE_S / HOUR_S)
    assert broken_h(run, 0, 0.0) == pytest.approx(21.78952058807, abs=CLOSE_S / HOUR_S)


def test_ramp_on_a_lump():
    network = lump(20.0 * HOUR_S * 5.0, 5.0, -18.0, Ramp(20.0, 20.0 + 0.5 * 100.0, 100.0 * HOUR_S))
    run = run_hours(network, 30)
    assert at_hours(run, 0, 10, 24) == pytest.approx([-1.9828584719537, 13.566562066458], abs=CLOSE_K)
    assert broken_h(run, 0, 0.0) == pytest.approx(11.504454710456, abs=CLOSE_S / HOUR_S)


def test_square_wave_settles_to_its_periodic_state():
    times, temperatures = [], []
    for day in range(12):
        for start, value in ((0.0, 34.0), (10.0, 22.0)):
            at = (24.0 * day + start) * HOUR_S
            times += [at + 1.0, at + (10.0 if value == 34.0 else 14.0) * HOUR_S]
            temperatures += [value, value]
    run = run_hours(lump(30.0 * HOUR_S * 5.0, 5.0, 27.0, Series(tuple(times), tuple(temperatures))), 288)
    # ramps of one second in place of jumps, and what is left of the start: exp(-264/30) of 1.2 K
    assert at_hours(run, 0, 264 + 10, 264 + 24) == pytest.approx([28.177234776224, 25.873676505339], abs=5e-3)


def test_drifting_room_is_the_outer_of_two_lumps():
    # a room that follows 30 °C with 4 h, and a lump of 20 h in it
    network = lump(20.0 * HOUR_S * 5.0, 5.0, -18.0, Drift(10.0, Constant(30.0), 4.0 * HOUR_S))
    run = run_hours(network, 30)
    hours = np.array([3.0, 12.0, 30.0])
    slow, fast = 20.0, 4.0
    part = -20.0 * fast / (fast - slow)
    exact = 30.0 + part * np.exp(-hours / fast) + (-48.0 - part) * np.exp(-hours / slow)
    assert at_hours(run, 0, *hours) == pytest.approx(exact, abs=CLOSE_K)


@pytest.mark.parametrize(
    "outer",
    [
        Day(20.0, 6.0, peak_s=15 * HOUR_S, start_s=3 * HOUR_S),
        Ramp(10.0, 30.0, 6 * HOUR_S),
        Series((0.0, 2 * HOUR_S, 9 * HOUR_S), (10.0, 25.0, 5.0)),
    ],
)
def test_drift_towards_any_history_solves_its_equation(outer):
    from app.engine.histories import pieces_of, temperature_c

    tau = 5.0 * HOUR_S
    pieces = pieces_of(Drift(12.0, outer, tau))
    times = np.linspace(60.0, 30 * HOUR_S, 400)
    slope = (temperature_c(pieces, times + 1.0) - temperature_c(pieces, times - 1.0)) / 2.0
    pull = (temperature_c(pieces_of(outer), times) - temperature_c(pieces, times)) / tau
    assert slope == pytest.approx(pull, abs=1e-6)  # central difference over 2 s
    assert temperature_c(pieces, np.zeros(1))[0] == pytest.approx(12.0)


def test_air_and_product():
    network = build_network(
        [
            Body("air", 0, None, even_curve(5e4), 1.0, -20.0, 0.02),
            Body("product", 0, FixedLink(60.0), even_curve(4e6), 1.0, -20.0, 0.001),
        ],
        [Boundary(0, 0, 20.0, "wall")],
        [Constant(30.0)],
        [Watch("air", BODY_TEMPERATURE, 0, 0), Watch("product", BODY_TEMPERATURE, 1, 1)],
    )
    run = run_hours(network, 30)
    expected = [-19.448124518586, -12.668906489047, -6.3285596539336]
    assert at_hours(run, 1, 1, 12, 24) == pytest.approx(expected, abs=CLOSE_K)
    assert at_hours(run, 0, 1, 12) == pytest.approx([-7.2101642217675, -2.0763326445972], abs=CLOSE_K)
    assert broken_h(run, 1, -12.0) == pytest.approx(13.178682247024, abs=CLOSE_S / HOUR_S)
    assert broken_h(run, 1, -5.0) == pytest.approx(26.779163412936, abs=CLOSE_S / HOUR_S)


def test_many_bodies_follow_the_matrix_exponential():
    from scipy.linalg import expm

    rng = np.random.default_rng(7)
    n = 12
    parents = [0] + [int(rng.integers(0, i)) for i in range(1, n)]
    links = rng.uniform(2.0, 80.0, n)
    capacities = rng.uniform(2e4, 4e6, n)
    outside = rng.uniform(0.0, 5.0, n)
    matrix = np.zeros((n, n))
    for i in range(n):
        matrix[i, i] -= outside[i]
        if i > 0:
            p = parents[i]
            matrix[i, i] -= links[i]
            matrix[p, p] -= links[i]
            matrix[i, p] += links[i]
            matrix[p, i] += links[i]
    start = rng.uniform(-30.0, 5.0, n)
    network = build_network(
        [
            Body(
                f"b{i}",
                parents[i],
                FixedLink(links[i]) if i else None,
                even_curve(capacities[i]),
                1.0,
                start[i],
                0.001,
            )
            for i in range(n)
        ],
        [Boundary(i, 0, outside[i], "wall") for i in range(n)],
        [Constant(21.0)],
        [Watch(f"b{i}", BODY_TEMPERATURE, i, i) for i in range(n)],
    )
    run = run_hours(network, 24)
    for hours in (0.5, 6.0, 24.0):
        exact = 21.0 + expm(matrix / capacities[:, None] * hours * HOUR_S) @ (start - 21.0)
        found = np.array([at_hours(run, i, hours)[0] for i in range(n)])
        assert found == pytest.approx(exact, abs=3e-3)  # steps in between: 0.001 K a step, and the cubic


WALLS = [
    # k, rho, c, thickness, content per m², T at 12 h and 24 h, hours to -15 and -10
    (0.025, 40.0, 1400.0, 0.1, 5e4, -10.679248510972, -3.1049444410518, 6.1207567877628, 12.98072310758),
    (0.04, 120.0, 1800.0, 0.2, 1e5, -16.265651569391, -12.92448583087, 16.426919694684, 35.342994843227),
]


def wall_with_contents(k, rho, c, thickness, content, cells):
    """Content lumped on the inside face of a wall that starts from its steady line, film 25 outside."""
    half = 0.5 * thickness / cells
    edges = np.linspace(0.0, thickness, cells + 1)
    total = thickness / k + 1.0 / 25.0
    starts = [-20.0 + 50.0 * (0.5 * (a + b) / k) / total for a, b in zip(edges[:-1], edges[1:], strict=True)]
    curve = even_curve(c, k, rho)
    content_body = Body("content", 0, None, even_curve(content), 1.0, -20.0, 0.001)
    wall = slab_bodies("wall", 0, SteadyFilmLink(1.0, 1e9, half), curve, 1.0, edges, starts, 1)
    return build_network(
        [content_body, *wall],
        [Boundary(cells, 0, 1.0 / (half / k + 1.0 / 25.0), "wall")],
        [Constant(30.0)],
        [Watch("content", BODY_TEMPERATURE, 0, 0)],
    )


@pytest.mark.parametrize("wall", WALLS)
def test_wall_with_contents(wall):
    *numbers, at_12, at_24, to_15, to_10 = wall
    run = run_hours(wall_with_contents(*numbers, cells=12), 40)
    # 12 cells: error of space about (1/12)² of the wall's part in the storage
    assert at_hours(run, 0, 12, 24) == pytest.approx([at_12, at_24], abs=8e-3)
    assert broken_h(run, 0, -15.0) == pytest.approx(to_15, rel=1e-3)
    assert broken_h(run, 0, -10.0) == pytest.approx(to_10, rel=1e-3)


def test_wall_cells_converge_with_the_second_order():
    *numbers, _, at_24, _, _ = WALLS[1]
    errors = []
    for cells in (4, 8, 16):
        run = march(wall_with_contents(*numbers, cells=cells), 24 * HOUR_S)
        errors.append(abs(run.traces[-1, 0] - at_24))
    orders = np.log2(np.array(errors[:-1]) / np.array(errors[1:]))
    assert np.all(orders > 1.7)
    assert np.all(orders < 2.3)


def pallet(cells):
    """Half of a slab 1.2 m thick behind 0.25 W/m²K, equal cells."""
    curve = even_curve(2000.0, 1.4, 1000.0)
    edges = np.linspace(0.0, 0.6, cells + 1)
    half = 0.3 / cells
    cell_bodies = slab_bodies("pallet", 0, SteadyFilmLink(1.0, 0.25, half), curve, 1.0, edges, [-20.0] * cells, 1)
    air = Body("air", 0, None, even_curve(1.0), 1e-3, 30.0, 0.02)
    return build_network(
        [air, *cell_bodies],
        [Boundary(0, 0, 1e9, "room")],
        [Constant(30.0)],
        [
            Watch("surface", SURFACE, 1, cells),
            Watch("mean", MEAN, 1, cells),
            Watch("centre", BODY_TEMPERATURE, cells, cells),
        ],
    )


def test_pallet_behind_a_wall_has_its_surface_mean_and_centre():
    run = run_hours(pallet(24), 72)
    assert at_hours(run, 0, 6, 24, 72) == pytest.approx(
        [-18.784881206635, -17.614808476096, -15.808338393402], abs=5e-3
    )
    assert at_hours(run, 1, 6, 24, 72) == pytest.approx(
        [-19.778662967489, -19.128888261211, -17.449055827102], abs=CLOSE_K
    )
    assert at_hours(run, 2, 24, 72) == pytest.approx([-19.79116312081, -18.270328064684], abs=5e-3)


@pytest.mark.parametrize(
    ("biot", "exact", "error_percent"),
    # rows 3 and 10 of the table of decay rates of equal cells with a film (computed)
    [
        (0.1, 0.3110528482, {3: -0.176, 10: -0.016}),
        (1.0, 0.860333589, {3: -1.176, 10: -0.107}),
        (10.0, 1.428870011, {3: -2.206, 10: -0.2}),
    ],
)
def test_decay_rate_of_equal_cells_is_as_published_for_them(biot, exact, error_percent):
    for cells, percent in error_percent.items():
        curve = even_curve(1000.0, 1.0, 1000.0)
        edges = np.linspace(0.0, 1.0, cells + 1)
        body = slab_bodies("slab", 0, SteadyFilmLink(1.0, biot, 0.5 / cells), curve, 1.0, edges, [-20.0] * cells, 1)
        network = build_network(
            [Body("air", 0, None, even_curve(1.0), 1e-3, 0.0, 0.02), *body],
            [Boundary(0, 0, 1e9, "room")],
            [Constant(0.0)],
            [Watch("mean", MEAN, 1, cells)],
        )
        times = np.array([2.0, 3.0]) * 1e6 * (1.0 if biot >= 1 else 6.0)
        run = march(network, times[1])
        values = trace(run, 0).at(times)
        rate = math.log(values[0] / values[1]) / (times[1] - times[0]) * 1e6
        # the longest steps of the run add up to about 0.02 %
        assert 100.0 * (rate / exact**2 - 1.0) == pytest.approx(percent, abs=0.03)


def test_film_that_goes_with_the_fourth_root_of_the_difference():
    # Source: Bejan & Kraus (eds), Heat Transfer Handbook, eq. 3.286 (published); C 2e5 J/K, 4 W/m²K at 45 K, 6 m²
    law = FilmLaw(base=0.0, gain=math.sqrt(4.0 / 45.0**0.25), exponent=1.0 / 8.0, reference_c=0.0, per_k=0.0)
    body = Body("lump", 0, FilmLink(6.0, law, 0.0, 0.0), even_curve(2e5), 1.0, -20.0, 0.001)
    network = build_network(
        [Body("air", 0, None, even_curve(1.0), 1e-3, 25.0, 0.02), body],
        [Boundary(0, 0, 1e9, "room")],
        [Constant(25.0)],
        [Watch("lump", BODY_TEMPERATURE, 1, 1)],
    )
    run = run_hours(network, 14)
    assert at_hours(run, 0, 4, 12) == pytest.approx([14.29860383553, 23.380708713683], abs=CLOSE_K)
    assert broken_h(run, 0, 0.0) * HOUR_S == pytest.approx(5276.4061762756, abs=CLOSE_S)


@pytest.mark.parametrize(("ice_kg", "end_c", "melted_kg"), [(5.0, 0.0, 2.6676646706587), (2.0, 4.1855372517792, 2.0)])
def test_ice_in_a_closed_box_with_a_product(ice_kg, end_c, melted_kg):
    ice = melting_curve(2100.0, 4186.0, 334000.0)
    network = build_network(
        [
            Body("product", 0, None, even_curve(3600.0), 20.0, 15.0, 0.001),
            Body("ice", 0, FixedLink(50.0), ice, ice_kg, -18.0, 0.001),
        ],
        [Boundary(0, 0, 0.0, "wall")],
        [Constant(20.0)],
        [Watch("product", BODY_TEMPERATURE, 0, 0), Watch("melted", MELTED, 1, 1)],
    )
    run = run_hours(network, 200)
    assert run.traces[-1, 0] == pytest.approx(end_c, abs=1e-3)
    assert run.traces[-1, 1] * ice_kg == pytest.approx(melted_kg, rel=1e-4)


def test_food_that_melts_over_a_range_takes_the_integral_of_its_curve():
    # one lump, 4 W/K, 25 °C: time = integral of dH / UA(Ta - T), whatever the curve
    b, c = 3e5 * 1.7, 1900.0
    top = c * 38.3 + b * (1.0 / -40.0 + 1.0 / 1.7)
    curve = EnthalpyCurve(
        (
            Segment(FREEZING, -40.0, -1.7, 0.0, top, c, b, 0.6, 0.0),
            Segment(LINEAR, -1.7, 100.0, top, top + 3500.0 * 101.7, 3500.0),
        ),
        0.5,
        1.5,
        1000.0,
    )
    network = build_network(
        [Body("food", 0, None, curve, 50.0, -22.0, 0.001)],
        [Boundary(0, 0, 4.0, "wall")],
        [Constant(25.0)],
        [Watch("food", BODY_TEMPERATURE, 0, 0)],
    )
    run = run_hours(network, 400)
    for level in (-18.0, -10.0, -3.0, 4.0):
        in_ice = quad(lambda t: (c + b / t**2) / (25.0 - t), -22.0, min(level, -1.7), epsabs=1e-10)[0]
        above = 3500.0 * math.log(26.7 / (25.0 - level)) if level > -1.7 else 0.0
        exact_h = 50.0 / 4.0 * (in_ice + above) / HOUR_S
        assert broken_h(run, 0, level) == pytest.approx(exact_h, abs=CLOSE_S / HOUR_S)


@pytest.mark.parametrize(
    ("wall_c", "start_c", "front_m"),
    # cases F1, F3 (freezing) and M1 (melting) of the two-phase solution of Neumann (Carslaw & Jaeger, ch. XI)
    [(-25.0, 8.0, 0.161368997), (-10.0, 2.0, 0.108364), (30.0, -25.0, 0.06982088075)],
)
def test_front_of_melting_moves_as_neumann_says(wall_c, start_c, front_m):
    curve = melting_curve(2050.0, 4200.0, 333600.0)
    edges = np.concatenate([np.linspace(0.0, 0.3, 151), np.linspace(0.3, 2.0, 60)[1:]])
    cells = len(edges) - 1
    first = SteadyFilmLink(1.0, 1e9, 0.5 * (edges[1] - edges[0]))
    body = slab_bodies("water", 0, first, curve, 1.0, edges, [start_c] * cells, 1)
    network = build_network(
        [Body("face", 0, None, even_curve(1.0), 1e-3, wall_c, 0.02), *body],
        [Boundary(0, 0, 1e9, "face")],
        [Constant(wall_c)],
        [Watch("melted", MELTED, 1, cells)],
    )
    run = run_hours(network, 24)
    solid = 1.0 - run.traces[-1, 0] if start_c < 0.0 else None
    if solid is None:
        # nothing was frozen at the start, so MELTED is no measure: count the cells' ice from their heat
        energies = run.energies_j[1:]
        ice = np.clip(1.0 - energies / (333600.0 * network.bodies["mass_kg"][1:]), 0.0, 1.0)
        moved = float(np.sum(ice * np.diff(edges)))
    else:
        moved = 2.0 * run.traces[-1, 0]
    # cells of 2 mm, and the cell that melts conducts like its mixture: the front is known to half a cell
    assert moved == pytest.approx(front_m, abs=1e-3)


def neumann_lambda(wall_c: float, start_c: float) -> float:
    """Root of the two-phase equation for ice 2.22/2050 and water 0.58/4200, 917 kg/m³, 333600 J/kg."""
    ice, water = (2.22, 2050.0), (0.58, 4200.0)
    (k1, c1), (k2, c2) = (ice, water) if wall_c < 0.0 else (water, ice)
    ratio = (k1 / c1) / (k2 / c2)
    stefan = c1 * abs(wall_c) / 333600.0

    def residual(x: float) -> float:
        beyond = (k2 / k1) * math.sqrt(ratio) * abs(start_c / wall_c) * math.exp(-x * x * ratio)
        return math.exp(-x * x) / erf(x) - beyond / erfc(x * math.sqrt(ratio)) - x * math.sqrt(math.pi) / stefan

    return float(brentq(residual, 1e-3, 3.0))


def test_the_fronts_above_are_those_of_the_equation():
    for wall_c, start_c, front_m in [(-25.0, 8.0, 0.161368997), (30.0, -25.0, 0.06982088075)]:
        k, c = (2.22, 2050.0) if wall_c < 0.0 else (0.58, 4200.0)
        front = 2.0 * neumann_lambda(wall_c, start_c) * math.sqrt(k / (917.0 * c) * 86400.0)
        assert front == pytest.approx(front_m, rel=1e-6)


def test_thawing_of_tylose_slabs_with_one_melting_point():
    # Source: enthalpy finite-volume run of four slabs, all latent heat at -0.6 °C, centre to 0 °C (computed)
    curve = melting_curve(1.9e3, 3.71e3, 209e3, -0.6, 1.65, 0.55, 1000.0)
    for thickness, film, air_c, start_c, expected_h in [
        (0.0525, 30.0, 13.0, -25.0, 7.3173),
        (0.026, 15.0, 40.0, -28.0, 1.8238),
    ]:
        cells = 40
        edges = np.linspace(0.0, thickness / 2.0, cells + 1)
        link = SteadyFilmLink(1.0, film, 0.25 * thickness / cells)
        body = slab_bodies("slab", 0, link, curve, 1.0, edges, [start_c] * cells, 1)
        network = build_network(
            [Body("air", 0, None, even_curve(1.0), 1e-3, air_c, 0.02), *body],
            [Boundary(0, 0, 1e9, "room")],
            [Constant(air_c)],
            [Watch("centre", BODY_TEMPERATURE, cells, cells)],
        )
        assert broken_h(run_hours(network, 12), 0, 0.0) == pytest.approx(expected_h, rel=0.01)


def test_cell_link_is_half_of_each_in_series():
    curve_a, curve_b = even_curve(1e5, 0.5), even_curve(1e5, 2.0)
    network = build_network(
        [
            Body("a", 0, None, curve_a, 1.0, 0.0, 0.001),
            Body("b", 0, CellLink(0.1, 0.2), curve_b, 1.0, 10.0, 0.001),
        ],
        [Boundary(0, 0, 0.0, "wall")],
        [Constant(0.0)],
        [Watch("b", BODY_TEMPERATURE, 1, 1)],
    )
    conductance = 1.0 / (0.1 / 2.0 + 0.2 / 0.5)
    run = march(network, 4 * HOUR_S)
    exact = 5.0 + 5.0 * math.exp(-2.0 * conductance / 1e5 * 4 * HOUR_S)
    assert run.traces[-1, 0] == pytest.approx(exact, abs=1e-4)
