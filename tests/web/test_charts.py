"""Charts as numbers: scales, ticks, fewer points, names that do not lie on each other."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.web.charts import Chart, Curve, chart, fewer_points, hour_ticks, ticks

TIMES = [0.25 * k for k in range(385)]


def warming_chart(names: int = 3) -> Chart:
    curves = [Curve(f"Item {k}", [20.0 - 40.0 * math.exp(-t / (10.0 + k)) for t in TIMES]) for k in range(names)]
    return chart(
        title="It", variant="narrow", time_h=TIMES, curves=curves, levels=[(-15.0, "limit")], moments=[(3.0, "3 h")]
    )


@given(st.floats(-200.0, 200.0), st.floats(0.001, 300.0))
def test_ticks_cover_the_range_with_a_handful_of_round_values(low: float, span: float) -> None:
    found = ticks(low, low + span, 6)
    assert found[0] <= low + 1e-6
    assert found[-1] >= low + span - 1e-6
    assert 2 <= len(found) <= 14


@pytest.mark.parametrize(("end_h", "step_h"), [(96.0, 12.0), (48.0, 6.0), (1.0, 0.25), (2400.0, 312.0)])
def test_hours_are_marked_as_people_count_them(end_h: float, step_h: float) -> None:
    assert hour_ticks(end_h, 8)[1] == step_h


def test_fewer_points_stay_within_the_tolerance_of_all() -> None:
    points = [(float(k), 100.0 * math.exp(-k / 40.0)) for k in range(400)]
    fewer = fewer_points(points, 0.3)
    assert len(fewer) < 60
    for x, y in points:
        (x0, y0), (x1, y1) = next((a, b) for a, b in zip(fewer, fewer[1:], strict=False) if a[0] <= x <= b[0])
        # the bound that the method keeps at every point that it leaves out
        assert abs(y0 + (y1 - y0) * (x - x0) / (x1 - x0) - y) <= 0.3 + 1e-9


def test_a_straight_line_needs_two_points() -> None:
    assert fewer_points([(0.0, 0.0), (1.0, 1.0), (2.0, 2.0)]) == [(0.0, 0.0), (2.0, 2.0)]


def test_names_at_the_ends_of_lines_do_not_lie_on_each_other() -> None:
    heights = sorted(line.label_y for line in warming_chart(5).lines)
    assert all(b - a >= 16.0 for a, b in zip(heights, heights[1:], strict=False))


def test_lines_differ_by_their_dashes_and_not_by_colour_alone() -> None:
    lines = warming_chart(5).lines
    assert len({line.dashes for line in lines}) == len(lines)


def test_a_flat_series_is_drawn_too() -> None:
    flat = chart(title="It", variant="wide", time_h=[0.0, 1.0], curves=[Curve("A", [5.0, 5.0])], levels=[], moments=[])
    assert flat.low_c <= 5.0 <= flat.high_c
    assert flat.low_c < flat.high_c
