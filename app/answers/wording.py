"""Answers in words: rounding, units and the sentence that comes first.

Numbers keep full precision everywhere else. Hold times are rounded down, never up: to 5 minutes below 6 hours, to
15 minutes below a day, to whole hours beyond. Called by the pages and by the command line.
"""

from __future__ import annotations

import math

from app.answers.answer import Answer, HandCheck, ItemAnswer
from app.units import kwh_from_joules

MINUS = "\N{MINUS SIGN}"

NOT_A_PLANNING_VALUE = (
    "This is a best estimate, not a planning value: the range is not worked out yet. Act well before it, and measure."
)

_STEPS_MIN = ((6.0, 5), (24.0, 15), (math.inf, 60))
_NOISE_H = 1e-9


def number_words(value: float, figures: int = 3) -> str:
    """A number to so many significant figures, without an exponent, with the true minus sign."""
    if value == 0.0 or not math.isfinite(value):
        return "0" if value == 0.0 else "no finite number"
    places = figures - 1 - math.floor(math.log10(abs(value)))
    text = f"{round(value, places):.{max(places, 0)}f}"
    text = text.rstrip("0").rstrip(".") if "." in text else text
    return text.replace("-", MINUS)


def fixed_words(value: float, places: int) -> str:
    """A number to so many decimal places, with the true minus sign and without a negative zero."""
    text = f"{value:.{places}f}"
    return text.lstrip("-") if float(text) == 0.0 else text.replace("-", MINUS)


def temperature_words(temperature_c: float) -> str:
    """A temperature to a tenth of a degree, with its unit."""
    return f"{fixed_words(temperature_c, 1)} °C"


def duration_words(duration_h: float) -> str:
    """A time rounded down: "21 h 15 min", "3 h 5 min", "52 h", "less than 5 min"."""
    step_min = next(step for below_h, step in _STEPS_MIN if duration_h < below_h)
    minutes = step_min * math.floor((duration_h + _NOISE_H) * 60 / step_min)
    hours, rest = divmod(minutes, 60)
    if minutes == 0:
        return "less than 5 min"
    if hours == 0:
        return f"{rest} min"
    return f"{hours} h {rest} min" if rest else f"{hours} h"


def hold_words(hold_h: float | None, horizon_h: float) -> str:
    """A hold time in words; ``None`` means that the limit is not reached within the horizon."""
    if hold_h is None:
        return f"Not within {number_words(horizon_h)} h"
    return "Already past" if hold_h == 0.0 else duration_words(hold_h)


def limit_words(limit: str) -> str:
    """A limit's text with the true minus sign."""
    return limit.replace(" -", f" {MINUS}")


def answer_sentence(answer: Answer) -> str:
    """The answer in one or two sentences, the number first."""
    best_h, ends = answer.hold_time_h.best_estimate, answer.ends_with
    if best_h is None or ends is None:
        return (
            f"With the door shut, {answer.store} keeps every limit for the {number_words(answer.horizon_h)} h that "
            "were looked at (best estimate)."
        )
    if answer.status == "already_past":
        return f"{answer.store} is past a limit from the start: {ends.item}, {limit_words(ends.limit)}."
    return (
        f"With the door shut, {answer.store} holds for about {duration_words(best_h)} (best estimate). "
        f"Then {ends.item} is the first to break a limit: {limit_words(ends.limit)}."
    )


def hand_check_rows(check: HandCheck) -> tuple[tuple[str, str, str], ...]:
    """The hand check as rows: what, how it is worked out in words, and its value with unit."""
    closed = "no such limit" if check.closed_form_h is None else duration_words(check.closed_form_h)
    rows = [
        ("Heat leak", "heat that comes in per degree of difference", f"{number_words(check.heat_leak_w_per_k)} W/K"),
        (
            "Heat capacity",
            "mass x specific heat of all that warms, at the start",
            f"{number_words(check.heat_capacity_j_per_k / 1000.0)} kJ/K",
        ),
        ("Time constant", "heat capacity / heat leak", _finite_hours(check.time_constant_h)),
        ("Heat to the limit", "from the start to the limit, all together", _heat(check.to_limit_j)),
        ("Of that, melting", "ice that melts before the limit x heat of fusion", _heat(check.melting_j)),
        ("Time to the limit by hand", "heat slice by slice / (heat leak x difference to the room)", closed),
    ]
    rows += [
        (f"Delay of the {name}", "thickness squared / diffusivity, layer by layer", _finite_hours(delay_h))
        for name, delay_h in check.wall_delays_h
    ]
    return tuple(rows)


def answer_text(answer: Answer) -> str:
    """The whole answer as plain text, for a terminal."""
    blocks = [
        [answer_sentence(answer), NOT_A_PLANNING_VALUE],
        ["What fails when:", *(_item_line(item, answer.horizon_h) for item in answer.items)],
        [
            "Where the heat comes in:",
            *(
                f"  {path.path}: {fixed_words(100.0 * path.share, 0)} % ({number_words(path.w_at_start)} W at the start)"
                for path in answer.heat_in.paths
            ),
        ],
        ["Hand check:", *(f"  {what}: {value} ({how})" for what, how, value in hand_check_rows(answer.hand_check))],
        ["Cautions:", *(f"  {caution.text}" for caution in answer.cautions)],
        ["Assumed:", *(f"  {one.field}: {_assumed(one.value)} ({one.source})" for one in answer.assumed)],
        [f"Engine {answer.engine_version}. Fingerprint {answer.fingerprint}."],
    ]
    if answer.air_limits:
        lines = [
            f"  air, {limit_words(one.limit)}: {hold_words(one.best_estimate_h, answer.horizon_h)}"
            for one in answer.air_limits
        ]
        blocks.insert(2, ["Limits on the air:", *lines])
    return "\n\n".join("\n".join(block) for block in blocks if len(block) > 1 or not block[0].endswith(":"))


def _item_line(item: ItemAnswer, horizon_h: float) -> str:
    held = hold_words(item.hold_time_h.best_estimate, horizon_h)
    limits = "; ".join(
        f"{limit_words(limit.limit)}: {hold_words(limit.best_estimate_h, horizon_h)}" for limit in item.limits
    )
    return f"  {item.name}: {held}" + (f" ({limits})" if limits else " (no limit)")


def _heat(heat_j: float) -> str:
    return f"{number_words(heat_j / 1e6)} MJ ({number_words(kwh_from_joules(heat_j))} kWh)"


def _finite_hours(duration_h: float) -> str:
    return duration_words(duration_h) if math.isfinite(duration_h) else "without end"


def _assumed(value: float | str | None) -> str:
    return number_words(value) if isinstance(value, float) else str(value)
