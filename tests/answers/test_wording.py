"""Answers in words: rounding down, signs, statuses."""

from __future__ import annotations

from dataclasses import replace

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.answers import Answer, LimitAnswer, hold_time, wording
from app.answers.answer import HoldTime
from app.stores import read_definition, sample_case


@pytest.fixture(scope="module")
def answer() -> Answer:
    return hold_time(read_definition(sample_case("food-bank-freezer").store))


@pytest.mark.parametrize(
    ("time_h", "words"),
    [
        (0.05, "less than 5 min"),
        (0.99, "55 min"),
        (3.1, "3 h 5 min"),
        (6.0, "6 h"),
        (21.49, "21 h 15 min"),
        (23.99, "23 h 45 min"),
        (52.9, "52 h"),
        (float("inf"), "without end"),
    ],
)
def test_hold_times_are_rounded_down_in_steps_that_people_count_in(time_h: float, words: str) -> None:
    assert wording.hours_text(time_h) == words


@given(st.floats(0.1, 2000.0))
def test_a_rounded_time_is_never_longer_than_the_time_itself(time_h: float) -> None:
    words = wording.hours_text(time_h).split()
    said_h = sum(float(n) / (60.0 if unit == "min" else 1.0) for n, unit in zip(words[::2], words[1::2], strict=True))
    # 1e-6 h is four milliseconds: the noise of hours held as binary fractions
    assert time_h - 1.0 < said_h <= time_h + 1e-6


@pytest.mark.parametrize(
    ("value", "words"),
    [(0.0, "0"), (-15.0, "\u221215"), (0.000123456, "0.000123"), (3820.4, "3820"), (1e6, "1000000"), (99.96, "100")],
)
def test_numbers_have_three_figures_no_exponent_and_the_true_minus(value: float, words: str) -> None:
    assert wording.number_text(value) == words


def test_a_temperature_just_below_zero_has_no_minus_before_nought() -> None:
    assert wording.temperature_text(-0.01) == "0.0 °C"
    assert wording.temperature_text(-0.06) == "\u22120.1 °C"


def test_a_small_share_is_not_called_nothing() -> None:
    assert wording.share_text(0.001) == "below 1 %"
    assert wording.share_text(0.0) == "0 %"


def test_the_sentence_says_how_long_what_ends_it_and_that_it_is_a_best_estimate(answer: Answer) -> None:
    words = wording.sentence(answer)
    assert answer.ends_with is not None
    assert wording.hours_text(answer.hold_time_h.best_estimate or 0.0) in words
    assert answer.ends_with.item in words
    assert "best estimate" in words
    assert "planning value" in wording.RANGE_NOTICE


def test_not_within_the_horizon_is_an_answer_of_its_own(answer: Answer) -> None:
    held = replace(answer, hold_time_h=HoldTime(None), status="beyond_horizon", ends_with=None)
    assert "keeps every limit for the 96 h" in wording.sentence(held)
    assert wording.time_text(None, 96.0) == "Not within 96 h"


def test_a_limit_that_is_past_at_the_start_is_said_first(answer: Answer) -> None:
    past = replace(answer, hold_time_h=HoldTime(0.0), status="already_past")
    assert "already past a limit at the start" in wording.sentence(past)
    assert wording.hold_text(HoldTime(0.0), "already_past", 96.0) == "Already past"


def test_a_dwell_names_the_first_crossing_too() -> None:
    limit = LimitAnswer("above 4.4 °C for longer than 2 h, warmest point", "fails", 5.0, 3.0)
    assert wording.limit_text(limit, 96.0) == "broken after 5 h (first passed after 3 h)"


def test_the_text_for_a_terminal_holds_every_part(answer: Answer) -> None:
    text = wording.answer_text(answer)
    for part in ("What fails when:", "Where the heat comes in:", "Hand check:", "Cautions:", answer.fingerprint):
        assert part in text
    assert all(item.name in text for item in answer.items)


def test_items_come_in_the_order_in_which_they_fail(answer: Answer) -> None:
    times = [item.hold_time_h.best_estimate for item in wording.by_failure(answer.items)]
    assert times == sorted(times, key=lambda time_h: float("inf") if time_h is None else time_h)
