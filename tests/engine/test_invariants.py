"""What must hold for any network: heat adds up, directions, limits, symmetry, convergence."""

from __future__ import annotations

import importlib
import math
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from app.engine import Precision, build_network, march, march_many, passed_above
from app.engine.histories import Constant, Day, Ramp
from app.engine.network import BODY_TEMPERATURE, MELTED, Body, Boundary, CellLink, FilmLink, FixedLink, Watch
from app.errors import EnergyNotConserved, SolverStopped
from app.physics import FREEZING, LINEAR, EnthalpyCurve, FilmLaw, Segment, segment_enthalpy
from tests.engine.building import HOUR_S, even_curve, lump, melting_curve, trace


def food_like_curve(freezing_c: float, latent_j_per_kg: float) -> EnthalpyCurve:
    b = -latent_j_per_kg * freezing_c
    top = segment_enthalpy(FREEZING, -40.0, 0.0, 1800.0, b, freezing_c)
    return EnthalpyCurve(
        (
            Segment(LINEAR, -90.0, -40.0, -50.0 * 1800.0, 0.0, 1800.0, 0.0, 0.6, 0.6),
            Segment(FREEZING, -40.0, freezing_c, 0.0, top, 1800.0, b, 0.6, 0.0),
            Segment(LINEAR, freezing_c, freezing_c + 100.0, top, top + 3.5e5, 3500.0),
        ),
        0.5,
        1.5,
        1000.0,
    )


LAW = FilmLaw(base=0.3, gain=1.0, exponent=1.0 / 6.0, reference_c=0.0, per_k=0.002)


@st.composite
def networks(draw):
    """Air, a wall of a few cells, and up to four loads, some in shells, some of which melt."""
    start_c = draw(st.floats(-35.0, 8.0))
    bodies = [Body("air", 0, None, even_curve(1005.0), draw(st.floats(0.05, 200.0)), start_c, 0.1)]
    boundaries = [Boundary(0, 0, draw(st.floats(0.01, 20.0)), "seals")]
    cells = draw(st.integers(0, 5))
    for j in range(cells):
        link = FixedLink(draw(st.floats(0.5, 50.0)))
        mass = draw(st.floats(0.1, 100.0))
        bodies.append(Body(f"wall {j}", 0 if j == 0 else len(bodies) - 1, link, even_curve(1400.0), mass, start_c, 0.1))
    if cells:
        boundaries.append(Boundary(len(bodies) - 1, 0, draw(st.floats(0.5, 50.0)), "wall"))
    watches = [Watch("air", BODY_TEMPERATURE, 0, 0)]
    for item in range(draw(st.integers(1, 4))):
        curve = draw(
            st.sampled_from(
                [
                    even_curve(3600.0, 0.5),
                    melting_curve(2050.0, 4200.0, 333600.0),
                    food_like_curve(-1.7, 2e5),
                    food_like_curve(-0.6, 2.8e5),
                    food_like_curve(-8.0, 1.5e5),
                ]
            )
        )
        area, shells = draw(st.floats(0.05, 20.0)), draw(st.integers(1, 6))
        mass, path = draw(st.floats(0.2, 500.0)), draw(st.floats(0.001, 0.1)) / area
        item_c = start_c + draw(st.floats(-5.0, 5.0))
        first = len(bodies)
        for j in range(shells):
            link = FilmLink(area, LAW, 0.9, path) if j == 0 else CellLink(path, path)
            bodies.append(
                Body(f"item {item}", 0 if j == 0 else len(bodies) - 1, link, curve, mass / shells, item_c, 0.01)
            )
        watches.append(Watch(f"surface {item}", BODY_TEMPERATURE, first, first))
        watches.append(Watch(f"melted {item}", MELTED, first, first + shells - 1))
    room = draw(
        st.one_of(
            st.builds(Constant, st.floats(10.0, 45.0)),
            st.builds(Day, st.floats(15.0, 35.0), st.floats(0.0, 10.0), st.floats(0.0, 86400.0), st.just(0.0)),
            st.builds(Ramp, st.floats(5.0, 20.0), st.floats(20.0, 40.0), st.floats(60.0, 86400.0)),
        )
    )
    return build_network(bodies, boundaries, [room], watches)


RUNS = settings(max_examples=60, deadline=None, suppress_health_check=[HealthCheck.too_slow])


@RUNS
@given(networks())
def test_heat_stored_is_heat_that_came_in(network):
    run = march(network, 24 * HOUR_S)
    stored = math.fsum(run.energies_j - network.bodies["start_j"])
    assert stored == pytest.approx(math.fsum(run.path_j), abs=1e-9 * np.abs(run.energies_j).sum() + 1e-6)
    assert run.closure_error_fraction < 1e-9


@RUNS
@given(networks())
def test_every_trace_is_finite_and_melted_shares_are_shares(network):
    run = march(network, 48 * HOUR_S)
    assert np.all(np.isfinite(run.traces))
    assert np.all(np.diff(run.trace_s) > 0.0)
    melted = [k for k, name in enumerate(network.watch_names) if name.startswith("melted")]
    assert np.all(run.traces[:, melted] <= 1.0 + 1e-12)


@RUNS
@given(networks())
def test_finer_steps_change_temperatures_little(network):
    coarse = march(network, 24 * HOUR_S)
    fine = march(network, 24 * HOUR_S, Precision(tolerance=0.03, longest_step_s=1800.0))
    loads = [k for k, name in enumerate(network.watch_names) if name.startswith("surface")]
    # what a run may be off: a few times the 0.01 K allowed in a step of a load
    assert coarse.traces[-1, loads] == pytest.approx(fine.traces[-1, loads], abs=0.1)


@RUNS
@given(networks(), st.floats(1.05, 3.0))
def test_more_leak_never_keeps_it_colder(network, factor):
    leakier = network.boundaries.copy()
    leakier["conductance_w_per_k"] *= factor
    warm = march(replace(network, boundaries=leakier), 24 * HOUR_S).energies_j.sum()
    # near the end both are at the room's temperature, within the 0.01 K that a step of a load may be off
    slack_j = 0.01 * 4200.0 * network.bodies["mass_kg"].sum()
    assert warm >= march(network, 24 * HOUR_S).energies_j.sum() - slack_j


@pytest.mark.parametrize("factor", [0.5, 2.0])
def test_scaling_all_masses_and_conductances_changes_no_temperature(factor):
    plain = lump(1e5, 3.0, -20.0, Constant(20.0))
    scaled = lump(1e5 * factor, 3.0 * factor, -20.0, Constant(20.0))
    assert march(plain, 36000.0).traces[-1] == pytest.approx(march(scaled, 36000.0).traces[-1], rel=1e-12)


def test_without_leak_nothing_changes_and_with_a_huge_one_it_is_the_room():
    assert march(lump(1e5, 0.0, -20.0, Constant(20.0)), 86400.0).traces[-1, 0] == -20.0
    assert march(lump(1e5, 1e6, -20.0, Constant(20.0)), 86400.0).traces[-1, 0] == pytest.approx(20.0, abs=1e-6)


def test_order_of_the_method_in_time_is_four():
    network = lump(36.0 * HOUR_S * 5.0, 5.0, -20.0, Day(25.0, 8.0, 0.0, 0.0))
    exact = 13.203713293325  # day swing on a lump, closed form
    errors = []
    for step_s in (14400.0, 7200.0):
        # nothing but the longest step limits the steps, and the first ones grow six-fold from 5 s
        run = march(network, 48 * HOUR_S, Precision(tolerance=1e9, longest_step_s=step_s))
        errors.append(abs(run.traces[-1, 0] - exact))
    assert math.log2(errors[0] / errors[1]) > 3.5


def test_many_stores_together_are_each_as_alone():
    networks_ = [lump(1e5 * (k + 1), 3.0, -20.0, Constant(20.0 + k)) for k in range(12)]
    together = march_many(networks_, 36000.0)
    for network, run in zip(networks_, together, strict=True):
        assert np.array_equal(run.traces, march(network, 36000.0).traces)


def test_a_run_whose_heat_does_not_close_is_refused(monkeypatch):
    # the package hands out a function of the module's name, so the module is asked for by its path
    module = importlib.import_module("app.engine.march")
    honest = module.march_one

    def leaking(*arguments):
        status, time, steps, refused, points, energies, path_j, moved, start_w = honest(*arguments)
        return status, time, steps, refused, points, energies, path_j * (1.0 + 1e-5), moved, start_w

    monkeypatch.setattr(module, "march_one", leaking)
    with pytest.raises(EnergyNotConserved, match="does not add up"):
        module.march(lump(1e5, 3.0, -20.0, Constant(20.0)), 36000.0)


def test_a_run_that_cannot_go_on_says_so():
    with pytest.raises(SolverStopped, match="no longer a number"):
        march(lump(1e5, math.nan, -20.0, Constant(20.0)), 36000.0)


def test_crossing_does_not_depend_on_how_long_the_run_goes_on():
    network = lump(1e6, 10.0, -20.0, Constant(25.0))
    short, long = (passed_above(trace(march(network, h * HOUR_S), 0), -15.0).broken_s for h in (10, 96))
    assert short == pytest.approx(long, abs=0.5)
