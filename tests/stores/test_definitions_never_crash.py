"""Whatever valid store is asked about, an answer comes back whole: finite, consistent, and fit for JSON."""

from __future__ import annotations

import json
import math
from collections.abc import Iterator
from typing import Any

from hypothesis import HealthCheck, given, settings

from app.answers import Answer, hold_time
from app.stores import read_definition
from tests.strategies import definitions


def numbers_in(document: Any) -> Iterator[float]:
    if isinstance(document, dict):
        for part in document.values():
            yield from numbers_in(part)
    elif isinstance(document, (list, tuple)):
        for part in document:
            yield from numbers_in(part)
    elif isinstance(document, float):
        yield document


def check_statuses(answer: Answer) -> None:
    """A number where something fails, zero where it was past at the start, none where nothing happens."""
    asked = [(answer.status, answer.hold_time_h.best_estimate)]
    asked += [(item.status, item.hold_time_h.best_estimate) for item in answer.items]
    limits = [limit for item in answer.items for limit in item.limits] + list(answer.air_limits)
    asked += [(limit.status, limit.best_estimate_h) for limit in limits]
    for status, hours in asked:
        if status == "fails":
            assert hours is not None
            assert 0.0 < hours <= answer.horizon_h * (1.0 + 1e-9)
        elif status == "already_past":
            assert hours == 0.0
        else:
            assert status == "beyond_horizon"
            assert hours is None
    broken = [limit.best_estimate_h for limit in limits if limit.best_estimate_h is not None]
    assert answer.hold_time_h.best_estimate == min(broken, default=None)
    assert (answer.ends_with is None) == (answer.status == "beyond_horizon")


@settings(max_examples=40, deadline=None, suppress_health_check=list(HealthCheck))
@given(document=definitions())
def test_every_valid_store_is_answered_whole(document):
    answer = hold_time(read_definition(document))
    told = answer.as_document()
    json.dumps(told, allow_nan=False)
    assert all(math.isfinite(number) for number in numbers_in(told))
    # a share of the heat that moved; where none does, of the rounding of the heat that is stored
    assert answer.energy_balance_error < (1e-9 if abs(answer.heat_in.total_j) > 1.0 else 1e-7)
    check_statuses(answer)


@settings(max_examples=3, deadline=None, suppress_health_check=list(HealthCheck))
@given(document=definitions(by_rise_time=True))
def test_stores_known_by_their_rise_time_are_answered_too(document):
    told = hold_time(read_definition(document)).as_document()
    assert all(math.isfinite(number) for number in numbers_in(told))
