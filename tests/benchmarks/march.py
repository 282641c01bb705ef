"""How fast the engine is, as ratios to scipy.integrate.solve_ivp in the same run.

Run with ``python -m tests.benchmarks.march``. The store is a walk-in freezer room of about 60 bodies (walls,
ceiling, floor, fittings, three loads in shells, ice) in a room with a day swing, marched over 72 h. Both sides
find the moment at which the first load's surface shell passes its limit; the baseline takes the loosest
tolerance whose error is below 0.1 % of that time, for the best of LSODA, BDF and Radau. No threshold is asserted.
"""

from __future__ import annotations

import statistics
import time
import tracemalloc
from collections.abc import Callable
from dataclasses import replace
from functools import partial
from typing import Any

import numpy as np

from app.engine import Network, Precision, Trace, march, march_many, passed_above
from app.engine.network import BODY_TEMPERATURE, WATCH
from app.stores import read_definition, store_network
from tests.benchmarks.baseline import Baseline, GaveUp

HORIZON_S = 72 * 3600.0
LIMIT_C = -15.0


def definition(mass_kg: float = 400.0, foam_m: float = 0.1, items: int = 3) -> dict[str, Any]:
    """The benchmark's store; loads may be added and its wall and mass varied."""
    steel = {"material": "steel_sheet", "thickness_m": 0.0006}
    foam = {"material": "pir_foam", "thickness_m": foam_m}
    panel = {"layers": [steel, foam, steel], "beyond": "room"}
    floor = {"layers": [{"material": "concrete", "thickness_m": 0.1}, foam], "beyond": "room"}
    stacking = {"kind": "cartons", "count": 40, "width_m": 0.4, "depth_m": 0.3, "height_m": 0.15, "blocks": 2}
    foods = ["beef_lean", "peas_green", "cod"]
    return {
        "enclosure": {
            "inside_m": {"width": 4.0, "depth": 3.5, "height": 2.5},
            "faces": {"walls": panel, "ceiling": panel, "floor": floor},
            "openings": [
                {"name": "door", "width_m": 0.9, "height_m": 2.0, "u_w_per_m2_k": 0.3, "seal_leak_m3_per_h": 1.5}
            ],
            "fittings": [{"material": "steel_sheet", "mass_kg": 100.0}],
        },
        "contents": [
            {
                "name": f"load {k + 1}",
                "food": foods[k % 3],
                "mass_kg": mass_kg,
                "start_c": -20.0,
                "stacking": stacking,
                "limits": [{"kind": "above", "temperature_c": LIMIT_C}],
            }
            for k in range(items)
        ],
        "coolants": [{"name": "ice", "coolant": "ice", "mass_kg": 20.0, "start_c": -20.0}],
        "surroundings": {"room": {"kind": "day", "mean_c": 24.0, "swing_k": 4.0, "start_hour": 3.0}},
        "start": {"air_c": -20.0},
        "outage": {"horizon_h": 72.0},
    }


def network_for(**varied: Any) -> tuple[Network, int]:
    """The network of a variant, watched at the outer shell of the first load, and that body's number."""
    store = store_network(read_definition(definition(**varied)))
    body = store.items[0].first_body
    watch = np.array([(BODY_TEMPERATURE, body, body, 0, 0, 0.0)], dtype=WATCH)
    return replace(store.network, watches=watch, watch_names=("outer shell",)), body


def crossing_s(network: Network, precision: Precision | None = None) -> float:
    """When the watched body passes the limit. [s]"""
    run = march(network, HORIZON_S, precision)
    found = passed_above(Trace(run.trace_s, run.traces[:, 0]), LIMIT_C).broken_s
    assert found is not None  # the benchmark's store warms past its limit
    return found


def seconds(function: Callable[[], object], repeats: int) -> float:
    """Median time of a call. [s]"""
    times = []
    for _ in range(repeats):
        start = time.perf_counter()
        function()
        times.append(time.perf_counter() - start)
    return statistics.median(times)


def best_baseline(network: Network, body: int, exact_s: float) -> tuple[float, str]:
    """Time of the fastest solve_ivp setting whose error is below 0.1 %, and which it is."""
    baseline = Baseline(network)
    found: list[tuple[float, str]] = []
    for method in ("LSODA", "BDF", "Radau"):
        for rtol in (1e-2, 1e-3) if method == "Radau" else (3e-2, 1e-2, 1e-3, 1e-4):
            start = time.perf_counter()
            try:
                result = baseline.solve(body, LIMIT_C, HORIZON_S, method, rtol)
            except GaveUp:
                print(f"  {method:6s} rtol {rtol:.0e}: given up after {baseline.most_evaluations:,} evaluations")
                continue
            took = time.perf_counter() - start
            error = abs(result.crossed_s - exact_s) / exact_s
            print(f"  {method:6s} rtol {rtol:.0e}: {1e3 * took:8.1f} ms, error {100 * error:.4f} %")
            if error < 1e-3:
                found.append((took, f"{method} at {rtol:.0e}"))
                break
    return min(found)


def main() -> None:
    """Print the ratios."""
    network, body = network_for()
    exact_s = crossing_s(network, Precision(tolerance=1e-3, longest_step_s=600.0))
    own_error = abs(crossing_s(network) - exact_s) / exact_s
    print(f"One store of {len(network.bodies)} bodies over 72 h, limit passed after {exact_s / 3600:.3f} h")
    took, which = best_baseline(network, body, exact_s)
    own = seconds(lambda: march(network, HORIZON_S), 201)
    print(f"  engine: {1e3 * own:.3f} ms, error {100 * own_error:.4f} %")
    print(f"  ratio to the best of solve_ivp ({which}): {took / own:.0f}")

    variants = [network_for(mass_kg=300.0 + 0.2 * k, foam_m=0.08 + 4e-5 * k)[0] for k in range(1000)]
    start = time.perf_counter()
    march_many(variants, HORIZON_S)
    each = (time.perf_counter() - start) / len(variants)
    print(f"1,000 variants in one batch: {1e3 * each:.3f} ms each, ratio {took / each:.0f}")

    tracemalloc.start()
    march(network, HORIZON_S)
    print(f"peak of memory in one run: {tracemalloc.get_traced_memory()[1] / 1e3:.0f} kB")
    tracemalloc.stop()

    print("cost against bodies and horizon")
    for items in (1, 2, 4, 8):
        grown, _ = network_for(items=items, mass_kg=60.0) if items > 4 else network_for(items=items)
        times = [1e3 * seconds(partial(march, grown, hours * 3600.0), 51) for hours in (24, 72, 216)]
        print(f"  {len(grown.bodies):4d} bodies: " + ", ".join(f"{t:.3f} ms" for t in times) + " for 24, 72, 216 h")


if __name__ == "__main__":
    main()
