"""Whether and when each limit of an item, or of the air, is broken in a run.

A preset becomes the limits that it stands for; every limit is then read from the trace of the point it is
judged at. Called by ``hold_time``.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from app.answers.answer import LimitAnswer, Status
from app.engine import MeanKinetic, Passed, Trace, passed_above, passed_below
from app.engine.network import BODY_TEMPERATURE, COLDEST, MEAN, MELTED, WARMEST
from app.reference import PresetLimit, limit_preset
from app.stores import Limit
from app.stores.definition import AboveLimit, BelowLimit, MeanKineticLimit
from app.units import hours_from_seconds, seconds_from_hours

AIR = BODY_TEMPERATURE
"""Quantity of a limit that is judged on the air, whatever it belongs to."""

_JUDGED = (AboveLimit, BelowLimit, MeanKineticLimit, PresetLimit)

_POINTS = {"warmest": WARMEST, "mean": MEAN, "coldest": COLDEST}

USUAL_ACTIVATION_KJ_PER_MOL = 83.144
"""Of the mean kinetic temperature (USP <1160>)."""

_SAME_INSTANT_S = 1.0
"""A limit that is broken within this time of the loss of power was broken at the start."""


@dataclass(frozen=True)
class PlainLimit:
    """One limit in numbers. ``quantity`` says which trace it is judged on; ``text`` says it in words."""

    kind: str
    quantity: int
    level: float
    longer_than_h: float
    window_h: float
    activation_kj_per_mol: float
    text: str
    source: str | None


def plain_limits(limit: Limit) -> tuple[PlainLimit, ...]:
    """The limits in numbers that one limit of a definition means: a preset may mean several."""
    if limit.kind != "preset":
        return (_plain(limit, None),)
    preset = limit_preset(limit.preset)
    where = f"{preset.body}, {preset.document}, {preset.edition}".rstrip(", ")
    return tuple(_plain(one, where) for one in preset.limits)


def _plain(limit: Limit | PresetLimit, source: str | None) -> PlainLimit:
    """One limit in numbers and words; a preset's rows have the same names as a definition's own limits."""
    if limit.kind == "thawed":
        text = f"more than {100.0 * limit.share:g} % of the ice melted"
        return PlainLimit("thawed", MELTED, limit.share, 0.0, 0.0, 0.0, text, source)
    assert isinstance(limit, _JUDGED)  # presets are opened before, and growth is refused by the definition
    longer_h = getattr(limit, "longer_than_h", 0.0)
    text = f"{limit.kind.replace('_', ' ')} {limit.temperature_c:g} °C"
    if limit.kind == "mean_kinetic":
        text = f"mean kinetic temperature over {limit.window_h:g} h above {limit.temperature_c:g} °C"
    if longer_h > 0.0:
        text += f" for longer than {longer_h:g} h"
    on_air = getattr(limit, "on", "contents") == "air"
    return PlainLimit(
        kind=limit.kind,
        quantity=AIR if on_air else _POINTS[limit.at],
        level=limit.temperature_c,
        longer_than_h=longer_h,
        window_h=getattr(limit, "window_h", 0.0),
        activation_kj_per_mol=getattr(limit, "activation_kj_per_mol", USUAL_ACTIVATION_KJ_PER_MOL),
        text=f"{text}, air" if on_air else f"{text}, {limit.at} point",
        source=source,
    )


def judged(limit: PlainLimit, trace_of: Callable[[int], Trace]) -> LimitAnswer:
    """What becomes of one limit in a run; ``trace_of`` gives the trace of a quantity."""
    passed = _passed(limit, trace_of(limit.quantity))
    broken_h = None if passed.broken_s is None else hours_from_seconds(passed.broken_s)
    first_h = None if passed.first_s is None else hours_from_seconds(passed.first_s)
    status: Status = "fails"
    if passed.broken_s is None:
        status = "beyond_horizon"
    elif passed.broken_s < _SAME_INSTANT_S:
        status, broken_h, first_h = "already_past", 0.0, 0.0
    return LimitAnswer(limit.text, status, broken_h, first_h, limit.source)


def _passed(limit: PlainLimit, trace: Trace) -> Passed:
    longer_s = seconds_from_hours(limit.longer_than_h)
    if limit.kind == "below":
        return passed_below(trace, limit.level, longer_s)
    if limit.kind == "mean_kinetic":
        mean = MeanKinetic(trace, seconds_from_hours(limit.window_h), limit.activation_kj_per_mol * 1000.0)
        return mean.passed_above(limit.level)
    return passed_above(trace, limit.level, longer_s)
