"""The time loop of one network: stages, error control, breaks of curves, traces. Compiled.

Called by ``march`` only. ``rows`` is the working space that ``balance`` describes.
"""

import math
from typing import Any

import numpy as np

from app.compiled import compiled
from app.engine.balance import (
    AT,
    ENERGY,
    FOURTH,
    NEW,
    PUSHED,
    ROWS,
    SLOPE,
    STAGE,
    START_SLOPE,
    START_W,
    THIRD,
    drive_temperatures,
    eliminate,
    linearise,
    rates,
    read_slopes,
    read_states,
    solve,
)
from app.engine.network import Floats, Records, Whole
from app.engine.rosenbrock import ALPHA, GAMMA, PUSH, STAGES, A, C
from app.engine.rosenbrock import FOURTH as FOURTH_WEIGHTS
from app.engine.rosenbrock import THIRD as THIRD_WEIGHTS
from app.engine.watches import watched_values

FINISHED, NOT_FINITE, STEP_TOO_SMALL = 0, 1, 2

TRACED_POINTS = 4
"""Points traced in every step, its end among them."""

_FIRST_STEP_S = 5.0
_SHORTEST_STEP_S = 1e-6
_SHORTEST_CUT_S = 1e-3
_SAFETY = 0.9
_GROWTH_LIMIT = 6.0
_SHRINK_LIMIT = 0.2
_SECOND_SHRINK = 0.35


@compiled
def march_one(
    bodies: Records,
    segments: Records,
    boundaries: Records,
    pieces: Records,
    piece_starts: Whole,
    stops_s: Floats,
    watches: Records,
    n_paths: int,
    horizon_s: float,
    tolerance: float,
    longest_step_s: float,
) -> tuple[int, float, int, int, Floats, Floats, Floats, float, Floats]:
    """March one network to the horizon: status, time reached, counts, trace, energies and heat by path.

    The trace has the time in column 0 and the watches behind it, one row a point.
    """
    rows = np.zeros((ROWS, bodies.shape[0]))
    for i in range(bodies.shape[0]):
        rows[ENERGY, i] = bodies[i]["start_j"]
    locked = bodies["first_segment"] + bodies["start_segment"]
    path_w = np.zeros((STAGES + 1, n_paths))
    path_j = np.zeros(n_paths)
    path_start_w = np.zeros(n_paths)
    drives = np.zeros((2, piece_starts.shape[0] - 1))
    piece = np.zeros(piece_starts.shape[0] - 1, dtype=np.int64)
    trace = np.zeros((1 + 200 * TRACED_POINTS, watches.shape[0] + 1))
    time, moved_j, step = 0.0, 0.0, min(_FIRST_STEP_S, longest_step_s)
    next_stop, points, steps, refused, status = 0, 1, 0, 0, FINISHED
    last_error, last_h = 0.01, 0.0

    while time < horizon_s:
        while next_stop < stops_s.shape[0] and stops_s[next_stop] <= time:
            next_stop += 1
        end = min(horizon_s, stops_s[next_stop]) if next_stop < stops_s.shape[0] else horizon_s
        _choose_pieces(pieces, piece_starts, piece, time)
        _begin_step(bodies, segments, boundaries, pieces, piece_starts, piece, locked, rows, drives, path_w, time)
        if steps == 0:
            for p in range(n_paths):
                path_start_w[p] = path_w[0, p]
            watched_values(bodies, segments, watches, locked, rows, ENERGY, trace, 0)
        h = min(step, longest_step_s)
        planned, error, is_cut, was_refused = h, 0.0, False, False
        while True:
            if time + h > end - 1e-6 * h:
                h = end - time
            _stages(
                bodies,
                segments,
                boundaries,
                pieces,
                piece_starts,
                piece,
                locked,
                rows,
                drives,
                path_w,
                time,
                h,
            )
            error = _error(bodies, rows) / tolerance
            if not error <= 1.0:
                refused += 1
                is_cut = False
                shrink = max(_SHRINK_LIMIT, _SAFETY * error**-0.25) if math.isfinite(error) else _SHRINK_LIMIT
                # an error that does not follow the step's length is a fast change that the step must resolve
                h *= shrink if not was_refused else min(shrink, _SECOND_SHRINK)
                was_refused = True
                planned = h
                if h < _SHORTEST_STEP_S:
                    status = STEP_TOO_SMALL if math.isfinite(error) else NOT_FINITE
                    break
                continue
            _continue(rows)
            share = _first_break(bodies, segments, locked, rows)
            if share >= 1.0 or share * h < _SHORTEST_CUT_S:
                break
            refused += 1
            is_cut = True
            h *= share
        if status != FINISHED:
            break
        if points + TRACED_POINTS > trace.shape[0]:
            trace = _longer(trace)
        for part in range(TRACED_POINTS):
            _between(rows, (part + 1) / TRACED_POINTS)
            trace[points, 0] = time + (part + 1) / TRACED_POINTS * h
            watched_values(bodies, segments, watches, locked, rows, AT, trace, points)
            points += 1
        _add_path_heat(boundaries, rows, path_w, path_j, h)
        moved_j += _accept(bodies, segments, locked, rows)
        steps += 1
        if not is_cut:
            change = _step_change(error, last_error, last_h / h)
            step = max(h * change, planned) if h < planned else h * change
            if was_refused:
                step = min(step, h)
            last_error, last_h = max(error, 0.01), h
        time = end if h == end - time else time + h
    return (
        status,
        time,
        steps,
        refused,
        trace[:points].copy(),
        rows[ENERGY].copy(),
        path_j,
        moved_j,
        path_start_w,
    )


@compiled
def _step_change(error: float, last_error: float, last_share: float) -> float:
    """Factor from one step to the next: by its error, and by how the error has changed since the last step.

    ``last_share`` is the last step's length over this one's, 0 for the first. Source: predictive controller of
    K. Gustafsson in E. Hairer, G. Wanner, Solving Ordinary Differential Equations II, section IV.8.
    """
    error = max(error, 1e-8)
    by_error = error**0.25 / _SAFETY
    by_trend = last_share * (error * error / last_error) ** 0.25 / _SAFETY
    return 1.0 / min(max(by_error, by_trend, 1.0 / _GROWTH_LIMIT), 1.0 / _SHRINK_LIMIT)


@compiled
def _choose_pieces(pieces: Records, piece_starts: Whole, piece: Whole, time: float) -> None:
    """Move every history on to the piece that is valid from now on."""
    for d in range(piece.shape[0]):
        last = piece_starts[d + 1] - 1 - piece_starts[d]
        while piece[d] < last and pieces[piece_starts[d] + piece[d] + 1]["start_s"] <= time:
            piece[d] += 1


@compiled
def _begin_step(
    bodies: Records,
    segments: Records,
    boundaries: Records,
    pieces: Records,
    piece_starts: Whole,
    piece: Whole,
    locked: Whole,
    rows: Floats,
    drives: Floats,
    path_w: Floats,
    time: float,
) -> None:
    """Read the balance and its derivatives at the start of a step, on the segments and pieces then valid."""
    drive_temperatures(pieces, piece_starts, piece, time, drives[0], drives[1])
    read_states(bodies, segments, locked, rows, ENERGY)
    read_slopes(bodies, segments, locked, rows, ENERGY)
    rates(bodies, boundaries, drives[0], rows, START_W, path_w[0])
    linearise(bodies, boundaries, rows)
    for i in range(bodies.shape[0]):
        rows[START_SLOPE, i] = rows[SLOPE, i]
        rows[PUSHED, i] = 0.0
    for p in range(path_w.shape[1]):
        path_w[STAGES, p] = 0.0
    for b in range(boundaries.shape[0]):
        boundary = boundaries[b]
        pushed = boundary["conductance_w_per_k"] * drives[1, boundary["drive"]]
        rows[PUSHED, boundary["body"]] += pushed
        path_w[STAGES, boundary["path"]] += pushed


@compiled
def _stages(
    bodies: Records,
    segments: Records,
    boundaries: Records,
    pieces: Records,
    piece_starts: Whole,
    piece: Whole,
    locked: Whole,
    rows: Floats,
    drives: Floats,
    path_w: Floats,
    time: float,
    h: float,
) -> None:
    """The six stages of a step of ``h`` seconds, and the new energies."""
    n = bodies.shape[0]
    eliminate(bodies, rows, 1.0 / (GAMMA * h))
    for stage in range(STAGES):
        if stage == 0:
            for i in range(n):
                rows[STAGE, i] = rows[START_W, i]
        else:
            _combine(rows, A[stage], stage)
            drive_temperatures(pieces, piece_starts, piece, time + ALPHA[stage] * h, drives[0], drives[1])
            read_states(bodies, segments, locked, rows, AT)
            rates(bodies, boundaries, drives[0], rows, STAGE + stage, path_w[stage])
        for j in range(stage):
            weight = C[stage, j] / h
            for i in range(n):
                rows[STAGE + stage, i] += weight * rows[STAGE + j, i]
        if PUSH[stage] != 0.0:
            for i in range(n):
                rows[STAGE + stage, i] += PUSH[stage] * h * rows[PUSHED, i]
        solve(bodies, rows, STAGE + stage)
    for i in range(n):
        rows[NEW, i] = rows[AT, i] + rows[STAGE + STAGES - 1, i]


@compiled
def _combine(rows: Floats, weights: Floats, count: int) -> None:
    """Enthalpies at a stage: start plus weighted earlier stages, into the row AT."""
    n = rows.shape[1]
    for i in range(n):
        rows[AT, i] = rows[ENERGY, i]
    for j in range(count):
        for i in range(n):
            rows[AT, i] += weights[j] * rows[STAGE + j, i]


@compiled
def _error(bodies: Records, rows: Floats) -> float:
    """Error of the step against the bodies' tolerances, 1 at the limit; not finite if anything is not."""
    error = 0.0
    for i in range(bodies.shape[0]):
        body = bodies[i]
        off_k = abs(rows[STAGE + STAGES - 1, i]) * max(rows[START_SLOPE, i], body["least_k_per_j"])
        if not math.isfinite(off_k):
            return math.inf
        error = max(error, off_k / body["tolerance_k"])
    return error


@compiled
def _continue(rows: Floats) -> None:
    """The two rows that make the step a cubic in time."""
    for i in range(rows.shape[1]):
        third, fourth = 0.0, 0.0
        for j in range(STAGES - 1):
            third += THIRD_WEIGHTS[j] * rows[STAGE + j, i]
            fourth += FOURTH_WEIGHTS[j] * rows[STAGE + j, i]
        rows[THIRD, i] = third
        rows[FOURTH, i] = fourth


@compiled
def _between(rows: Floats, share: float) -> None:
    """Enthalpies at a share of the step, into the row AT."""
    for i in range(rows.shape[1]):
        rows[AT, i] = _one_between(rows, i, share)


@compiled
def _one_between(rows: Floats, i: int, share: float) -> float:
    rest = 1.0 - share
    return rest * rows[ENERGY, i] + share * (rows[NEW, i] + rest * (rows[THIRD, i] + share * rows[FOURTH, i]))


@compiled
def _first_break(bodies: Records, segments: Records, locked: Whole, rows: Floats) -> float:
    """Share of the step at which a body first passes a break of its curve by more than is allowed, else 1."""
    first = 1.0
    for i in range(bodies.shape[0]):
        s = locked[i]
        over_j = segments[s]["end_tolerance_j"]
        if rows[NEW, i] > segments[s]["end_j"] + over_j:
            first = min(first, _share_at(rows, i, segments[s]["end_j"] + 0.5 * over_j))
        if s > bodies[i]["first_segment"]:
            under_j = segments[s - 1]["end_tolerance_j"]
            if rows[NEW, i] < segments[s]["start_j"] - under_j:
                first = min(first, _share_at(rows, i, segments[s]["start_j"] - 0.5 * under_j))
    return first


@compiled
def _share_at(rows: Floats, i: int, target_j: float) -> float:
    """Share of the step at which a body's enthalpy is at a target between its start and its end."""
    low, high = 0.0, 1.0
    rises = rows[NEW, i] > rows[ENERGY, i]
    for _ in range(50):
        middle = 0.5 * (low + high)
        if (_one_between(rows, i, middle) < target_j) == rises:
            low = middle
        else:
            high = middle
    return high


@compiled
def _add_path_heat(boundaries: Records, rows: Floats, path_w: Floats, path_j: Floats, h: float) -> None:
    """Heat that came in by each path during the step, by the same stages as the bodies' heat."""
    n_paths = path_j.shape[0]
    heat_j = np.zeros((STAGES, n_paths))
    for stage in range(STAGES):
        for p in range(n_paths):
            heat_j[stage, p] = path_w[stage, p] + PUSH[stage] * h * path_w[STAGES, p]
            for j in range(stage):
                heat_j[stage, p] += C[stage, j] / h * heat_j[j, p]
        for b in range(boundaries.shape[0]):
            boundary = boundaries[b]
            i = boundary["body"]
            drop = boundary["conductance_w_per_k"] * rows[START_SLOPE, i] * rows[STAGE + stage, i]
            heat_j[stage, boundary["path"]] -= drop
        for p in range(n_paths):
            heat_j[stage, p] *= GAMMA * h
            path_j[p] += heat_j[stage, p] * (A[STAGES - 1, stage] if stage < STAGES - 1 else 1.0)


@compiled
def _accept(bodies: Records, segments: Records, locked: Whole, rows: Floats) -> float:
    """Take the step: new energies, new segments. Returns the heat that moved."""
    moved_j = 0.0
    for i in range(bodies.shape[0]):
        gained_j = rows[NEW, i] - rows[ENERGY, i]
        moved_j += abs(gained_j)
        rows[ENERGY, i] = rows[NEW, i]
        first = bodies[i]["first_segment"]
        last = first + bodies[i]["segments"] - 1
        s = locked[i]
        # a body at a break and moving over it goes on with the next segment
        if gained_j > 0.0:
            while s < last and rows[NEW, i] >= segments[s]["end_j"] - _slack_j(segments[s]):
                s += 1
        else:
            while s > first and rows[NEW, i] <= segments[s]["start_j"] + _slack_j(segments[s - 1]):
                s -= 1
        locked[i] = s
    return moved_j


@compiled
def _slack_j(segment: Any) -> float:
    return segment["end_tolerance_j"] if math.isfinite(segment["end_tolerance_j"]) else 0.0


@compiled
def _longer(trace: Floats) -> Floats:
    """The same trace with room for twice as many points."""
    longer = np.zeros((2 * trace.shape[0], trace.shape[1]))
    for point in range(trace.shape[0]):
        for column in range(trace.shape[1]):
            longer[point, column] = trace[point, column]
    return longer
