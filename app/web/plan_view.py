"""The outage plan of one store: what to do by when, who, a log sheet, and what it was worked out for."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime

import numpy as np

from app.answers import Answer, wording
from app.stores import StoreDefinition
from app.web.answer_view import AnswerView, answer_view
from app.web.field_words import InputRow, field_words

ROLES = ("In charge", "Deputy", "Electrician", "Owner of the place where contents can go", "Authority or pharmacist")

_DECIDE_SHARE = 0.5
_MOVE_SHARE = 0.75
"""Shares of the best estimate by which to have decided and to have begun to move (our own rule of caution)."""

_MOST_ITEMS_IN_LOG = 3
_LOG_ROWS = 24
_LOG_STEPS_H = (0.25, 0.5, 1.0, 2.0, 3.0, 4.0, 6.0, 8.0, 12.0, 24.0)


@dataclass(frozen=True)
class Step:
    """One thing to do, and by when."""

    when: str
    what: str


@dataclass(frozen=True)
class LogRow:
    """One line of the log sheet."""

    when: str
    predicted: tuple[str, ...]


@dataclass(frozen=True)
class PlanPage:
    """The plan, ready for the template."""

    title: str
    store: str
    made_at: str
    engine_version: str
    fingerprint: str
    answer: AnswerView
    steps: tuple[Step, ...]
    roles: tuple[str, ...]
    log_names: tuple[str, ...]
    log_rows: tuple[LogRow, ...]
    inputs: tuple[InputRow, ...]


def plan_page(definition: StoreDefinition, answer: Answer, *, made_at: datetime) -> PlanPage:
    """The plan of a store; ``made_at`` is the time of the request."""
    names, rows = _log(answer)
    return PlanPage(
        title=f"Outage plan: {definition.name}",
        store=definition.name,
        made_at=f"{made_at:%-d %B %Y, %H:%M %Z}",
        engine_version=answer.engine_version,
        fingerprint=answer.fingerprint[:16],
        answer=answer_view(definition, answer),
        steps=_steps(answer),
        roles=ROLES,
        log_names=names,
        log_rows=rows,
        inputs=field_words(definition).inputs(),
    )


def _steps(answer: Answer) -> tuple[Step, ...]:
    best_h = answer.hold_time_h.best_estimate
    steps = [
        Step("0 h", "Write down the time. Shut the door, hang a sign on it, keep it shut. Tell the person in charge."),
        Step("0 h", "Read the thermometers from outside, and write them into the log at every time that it names."),
    ]
    if best_h:
        decide_h, move_h = _DECIDE_SHARE * best_h, _MOVE_SHARE * best_h
        steps += [
            Step(wording.hours_text(decide_h), "Have decided: ice, a generator, or another place. Ask if it is free."),
            Step(wording.hours_text(move_h), "Without power still: carry it out, in the order of the table below."),
        ]
    steps += _ends(answer)
    if best_h is None:
        steps.append(Step(wording.number_text(answer.horizon_h, "h"), "The model looked no further. Work it out anew."))
    steps.append(
        Step("Power back", "Write down the time. Keep the door shut until all is cold. Judge every lot by its log.")
    )
    return tuple(steps)


def _ends(answer: Answer) -> list[Step]:
    """What is due when a limit is reached, in the order of failure."""
    steps = []
    for item in wording.by_failure(answer.items):
        hold_h = item.hold_time_h.best_estimate
        if hold_h is not None:
            when = "0 h" if hold_h == 0.0 else wording.hours_text(hold_h)
            steps.append(Step(when, f"{item.name} reaches its limit (best estimate). Keep it apart, mark it, ask."))
    return steps


def _log(answer: Answer) -> tuple[tuple[str, ...], tuple[LogRow, ...]]:
    """The log sheet: air and the first items to fail, at even times until well past the end of the hold time."""
    series = answer.series
    first = [item.name for item in wording.by_failure(answer.items)][:_MOST_ITEMS_IN_LOG]
    columns: list[Sequence[float]] = [series.air_c, *(series.items[name].warmest_c for name in first)]
    best_h = answer.hold_time_h.best_estimate
    until_h = series.time_h[-1] if best_h is None else min(series.time_h[-1], max(2.0 * best_h, 2.0))
    step_h = next((step for step in _LOG_STEPS_H if until_h / step < _LOG_ROWS), _LOG_STEPS_H[-1])
    times = np.arange(0.0, until_h + 1e-9, step_h)
    read = [np.interp(times, series.time_h, column) for column in columns]
    rows = tuple(
        LogRow(f"{time_h:g}", tuple(wording.fixed_text(float(column[k]), 1) for column in read))
        for k, time_h in enumerate(times)
    )
    return ("Air inside", *first), rows
