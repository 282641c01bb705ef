"""The engine against an independent march of the same network by scipy.integrate.solve_ivp.

The right-hand side is the benchmark's own, written with whole arrays and exact curves.
"""

from __future__ import annotations

import pytest

from app.engine import march
from tests.benchmarks.baseline import Baseline
from tests.benchmarks.march import HORIZON_S, LIMIT_C, crossing_s, network_for


@pytest.mark.parametrize(("method", "rtol"), [("LSODA", 1e-4), ("BDF", 1e-4)])
def test_limit_is_passed_when_solve_ivp_says(method, rtol):
    network, body = network_for(items=1)
    other = Baseline(network).solve(body, LIMIT_C, HORIZON_S / 6.0, method, rtol)
    # both are far below a tenth of a per cent of the hold time
    assert crossing_s(network) == pytest.approx(other.crossed_s, rel=1e-3)


def test_right_hand_side_is_that_of_the_engine_at_the_start():
    network, _ = network_for()
    run = march(network, 1.0)
    start = network.bodies["start_j"].astype(float)
    rates = Baseline(network)(0.0, start)
    assert rates.sum() == pytest.approx(run.path_start_w.sum(), rel=1e-9)
