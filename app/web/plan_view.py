"""The outage plan of one store: what to do by when, who, a log sheet, and what it was worked out for."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from app.answers import Answer
from app.answers.wording import hours_text
from app.stores import StoreDefinition, definition_document
from app.web.answer_view import AnswerView, predicted_rows

ROLES = ("In charge", "Deputy", "Electrician", "Where contents can go", "Authority or pharmacist to ask")

_LOG_ROWS = 12
_DECIDE_SHARE = 0.5
_MOVE_SHARE = 0.75


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
class InputRow:
    """One input, read back."""

    name: str
    value: str


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


def plan_page(definition: StoreDefinition, answer: Answer, view: AnswerView, made_at: str) -> PlanPage:
    """The plan of a store; ``made_at`` is the time of the request, in words."""
    names, rows = predicted_rows(answer, _LOG_ROWS)
    return PlanPage(
        title=f"Outage plan: {definition.name}",
        store=definition.name,
        made_at=made_at,
        engine_version=answer.engine_version,
        fingerprint=answer.fingerprint[:16],
        answer=view,
        steps=_steps(answer),
        roles=ROLES,
        log_names=names,
        log_rows=tuple(LogRow(row[0], row[1:]) for row in rows),
        inputs=tuple(InputRow(*pair) for pair in _read_back(definition_document(definition), "")),
    )


def _steps(answer: Answer) -> tuple[Step, ...]:
    steps = [
        Step("0", "Note the time. Close the door, hang a sign on it, and keep it shut. Tell the person in charge."),
        Step("0", "Read the thermometers from outside and write them in the log."),
    ]
    hours = answer.hold_time_h.best_estimate
    if hours is None:
        steps.append(Step("each log time", "Read and write down. Nothing is due within the time looked at."))
        return tuple(steps)
    if hours > 0.0:
        steps += [
            Step(
                hours_text(_DECIDE_SHARE * hours), "Decide: ice, generator, or another place. Ask whether it is free."
            ),
            Step(hours_text(_MOVE_SHARE * hours), "Carry it out, if power is not back. Coldest and dearest first."),
        ]
    for item in sorted(answer.items, key=lambda i: i.hold_time_h.best_estimate or 0.0):
        if item.hold_time_h.best_estimate is not None:
            when = hours_text(item.hold_time_h.best_estimate)
            steps.append(Step(when, f"{item.name}: limit reached by the best estimate. Keep apart, mark, ask, decide."))
    steps.append(
        Step("power back", "Note the time. Do not open until it is cold again. Write down what each lot went through.")
    )
    return tuple(steps)


def _read_back(value: Any, path: str) -> list[tuple[str, str]]:
    """Every input with its path, flat, in the order of the contract."""
    if isinstance(value, dict) and "value" in value:
        spread = f" \u00b1 {value['plus_minus']:g}" if "plus_minus" in value else ""
        known = f" ({value['known'].replace('_', ' ')})" if "known" in value else ""
        return [(path, f"{value['value']:g}{spread}{known}")]
    if isinstance(value, dict):
        return [row for name, part in value.items() for row in _read_back(part, f"{path}.{name}".lstrip("."))]
    if isinstance(value, list) and value and isinstance(value[0], dict):
        return [row for index, part in enumerate(value) for row in _read_back(part, f"{path}[{index}]")]
    if isinstance(value, list):
        shown = ", ".join(f"{number:g}" for number in value[:12])
        return [(path, shown + (" ..." if len(value) > 12 else ""))]
    return [(path, f"{value:g}" if isinstance(value, float) else str(value))]
