"""How long does this store hold? The definition marched through the outage, and its limits judged.

``hold_time`` is the one question of this package that has no spread yet: it gives the best estimate. Reads the
traces of one run; rounding and words are elsewhere (``wording``).
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from app.answers.answer import (
    Answer,
    Assumed,
    CoolantAnswer,
    EndsWith,
    HeatIn,
    HeatPath,
    HoldTime,
    ItemAnswer,
    ItemSeries,
    LimitAnswer,
    Series,
    Status,
)
from app.answers.cautions import cautions_for
from app.answers.hand_check import hand_check
from app.answers.limits_kept import AIR, USUAL_ACTIVATION_KJ_PER_MOL, PlainLimit, judged, plain_limits
from app.engine import ENGINE_VERSION, MeanKinetic, Run, Trace, march, passed_above
from app.engine.histories import pieces_of, temperature_c
from app.engine.network import MEAN, MELTED, SOLID_LEFT, WARMEST
from app.stores import PlacedItem, StoreDefinition, StoreNetwork, fingerprint, store_network
from app.units import hours_from_seconds, seconds_from_hours, seconds_from_minutes

MELTING_STARTS_SHARE = 0.05
"""Melting has started when so much of the ice of the start is gone, and has ended when all but so little is."""

MELTED_SHARE = 0.999


@dataclass(frozen=True)
class _Judged:
    """One limit with what became of it."""

    plain: PlainLimit
    answer: LimitAnswer


def hold_time(definition: StoreDefinition, *, confidence: float = 0.9, series_step_min: float = 15.0) -> Answer:
    """The best estimate of how long a store keeps its limits, with the evidence behind it.

    ``confidence`` is part of the question's fingerprint; until the spread is worked out no quantile is given.
    Raises ``SolverStopped`` or ``EnergyNotConserved`` in place of an answer that does not stand.
    """
    store = store_network(definition)
    horizon_h = definition.outage.horizon_h
    run = march(store.network, seconds_from_hours(horizon_h))
    by_item = [_judge_item(run, item, store.air_column) for item in store.items]
    air = [
        _Judged(plain, judged(plain, lambda _: _trace(run, store.air_column)))
        for limit in store.air_limits
        for plain in plain_limits(limit)
    ]
    ends = _first(
        [(item.name, one) for item, all_ in zip(store.items, by_item, strict=True) for one in all_]
        + [("air", one) for one in air]
    )
    best_h = None if ends is None else ends[1].answer.best_estimate_h
    options = {"confidence": confidence, "samples": 0, "series_step_min": series_step_min}
    return Answer(
        engine_version=ENGINE_VERSION,
        fingerprint=fingerprint(definition, options, ENGINE_VERSION),
        store=definition.name,
        hold_time_h=HoldTime(best_h, confidence=confidence),
        status="beyond_horizon" if ends is None else ends[1].answer.status,
        ends_with=None if ends is None else EndsWith(ends[0], ends[1].plain.text),
        items=tuple(_item_answer(run, item, all_) for item, all_ in zip(store.items, by_item, strict=True)),
        air_limits=tuple(one.answer for one in air),
        heat_in=_heat_in(store, run),
        energy_balance_error=run.closure_error_fraction,
        hand_check=hand_check(store, _limit_c(ends), horizon_h if best_h is None else max(best_h, 0.1)),
        drivers=(),
        coolants=tuple(_coolant_answer(run, coolant) for coolant in store.coolants),
        series=_series(store, run, seconds_from_minutes(series_step_min)),
        cautions=cautions_for(definition, store, best_h),
        assumed=tuple(Assumed(a.field, a.value, a.source) for a in store.assumed),
        horizon_h=horizon_h,
    )


def _trace(run: Run, column: int) -> Trace:
    return Trace(run.trace_s, run.traces[:, column])


def _judge_item(run: Run, item: PlacedItem, air_column: int) -> list[_Judged]:
    def trace_of(quantity: int) -> Trace:
        return _trace(run, air_column if quantity == AIR else item.columns[quantity])

    plains = [plain for limit in item.limits for plain in plain_limits(limit)]
    return [_Judged(plain, judged(plain, trace_of)) for plain in plains]


def _first(named: list[tuple[str, _Judged]]) -> tuple[str, _Judged] | None:
    """The limit that is broken first, with the name of what it belongs to."""
    broken = [pair for pair in named if pair[1].answer.best_estimate_h is not None]
    return min(broken, key=lambda pair: pair[1].answer.best_estimate_h or 0.0, default=None)


def _limit_c(ends: tuple[str, _Judged] | None) -> float | None:
    if ends is None or ends[1].plain.kind not in ("above", "mean_kinetic"):
        return None
    return ends[1].plain.level


def _item_answer(run: Run, item: PlacedItem, limits: list[_Judged]) -> ItemAnswer:
    first = _first([(item.name, one) for one in limits])
    warmest = _trace(run, item.columns[WARMEST])
    kinetic = MeanKinetic(warmest, warmest.end_s, USUAL_ACTIVATION_KJ_PER_MOL * 1000.0)
    starts_h, melted_h = _melting(run, item, MELTED)
    status: Status = "beyond_horizon" if first is None else first[1].answer.status
    return ItemAnswer(
        name=item.name,
        hold_time_h=HoldTime(None if first is None else first[1].answer.best_estimate_h),
        status=status,
        limits=tuple(one.answer for one in limits),
        biot=item.load.biot,
        shells=len(item.load.bodies),
        melting_starts_h=starts_h,
        melted_h=melted_h,
        warmest_c_at_horizon=float(run.traces[-1, item.columns[WARMEST]]),
        mean_kinetic_c=kinetic.at(warmest.end_s),
    )


def _melting(run: Run, item: PlacedItem, quantity: int) -> tuple[float | None, float | None]:
    """When the ice that an item held at the start begins to go, and when it is gone; none where it held none."""
    if not item.holds_ice:
        return None, None
    melted = _trace(run, item.columns[quantity])
    times = [passed_above(melted, share).first_s for share in (MELTING_STARTS_SHARE, MELTED_SHARE)]
    starts_h, melted_h = (None if time is None else hours_from_seconds(time) for time in times)
    return starts_h, melted_h


def _coolant_answer(run: Run, coolant: PlacedItem) -> CoolantAnswer:
    left = float(run.traces[-1, coolant.columns[SOLID_LEFT]]) * coolant.load.mass_kg
    return CoolantAnswer(coolant.name, max(left, 0.0), _melting(run, coolant, MELTED)[1])


def _heat_in(store: StoreNetwork, run: Run) -> HeatIn:
    total_j = float(run.path_j.sum())
    names = store.network.path_names
    paths = [
        HeatPath(name, float(run.path_j[p]) / total_j if total_j else 0.0, float(run.path_start_w[p]))
        for p, name in enumerate(names)
    ]
    return HeatIn(total_j, tuple(sorted(paths, key=lambda path: -path.share)))


def _series(store: StoreNetwork, run: Run, step_s: float) -> Series:
    end_s = float(run.trace_s[-1])
    times = np.append(np.arange(0.0, end_s - 0.5 * step_s, step_s), end_s)

    def values(column: int) -> tuple[float, ...]:
        return tuple(float(value) for value in _trace(run, column).at(times))

    return Series(
        time_h=tuple(hours_from_seconds(float(time)) for time in times),
        air_c=values(store.air_column),
        items={
            item.name: ItemSeries(values(item.columns[MEAN]), values(item.columns[WARMEST])) for item in store.items
        },
        coolants={coolant.name: values(coolant.columns[MEAN]) for coolant in store.coolants},
        room_c=tuple(float(value) for value in temperature_c(pieces_of(store.room), times)),
    )
