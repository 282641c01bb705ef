"""Answers in words: rounding, units and the sentence that comes first.

Numbers keep full precision everywhere else. Hold times are rounded down, never up: to 5 minutes below 6 hours, to
15 minutes below a day, to whole hours beyond. Called by the pages and by the command line.
"""

from __future__ import annotations

import math

from app.answers.answer import Answer, HandCheck, HoldTime, ItemAnswer, LimitAnswer, Status
from app.units import kwh_from_joules

RANGE_NOTICE = (
    "This is a best estimate, not a planning value: the range is not worked out yet. Act well before it, and measure."
)

_MINUS = "\N{MINUS SIGN}"
_STEPS_MIN = ((6.0, 5), (24.0, 15), (math.inf, 60))
_NOISE_H = 1e-9


def number_text(value: float, unit: str = "", digits: int = 3) -> str:
    """A number to so many significant figures, without an exponent, with its unit and the true minus sign."""
    text = "0"
    if not math.isfinite(value):
        return "no finite number"
    if value != 0.0:
        places = digits - 1 - math.floor(math.log10(abs(value)))
        text = f"{round(value, places):.{max(places, 0)}f}"
        text = text.rstrip("0").rstrip(".") if "." in text else text
    return f"{text.replace('-', _MINUS)} {unit}".rstrip()


def fixed_text(value: float, places: int) -> str:
    """A number to so many decimal places, with the true minus sign and without a negative zero."""
    text = f"{value:.{places}f}"
    return text.lstrip("-") if float(text) == 0.0 else text.replace("-", _MINUS)


def temperature_text(temperature_c: float) -> str:
    """A temperature to a tenth of a degree, with its unit."""
    return f"{fixed_text(temperature_c, 1)} °C"


def share_text(share: float) -> str:
    """A share in whole per cent; what is there but small is not called nothing."""
    return "below 1 %" if 0.0 < share < 0.005 else f"{fixed_text(100.0 * share, 0)} %"


def energy_text(heat_j: float) -> str:
    """Heat in megajoules and kilowatt-hours."""
    return f"{number_text(heat_j / 1e6, 'MJ')} ({number_text(kwh_from_joules(heat_j), 'kWh')})"


def hours_text(duration_h: float) -> str:
    """A time rounded down: "21 h 15 min", "3 h 5 min", "52 h", "less than 5 min"."""
    if not math.isfinite(duration_h):
        return "without end"
    step_min = next(step for below_h, step in _STEPS_MIN if duration_h < below_h)
    minutes = step_min * math.floor((duration_h + _NOISE_H) * 60 / step_min)
    hours, rest = divmod(minutes, 60)
    if minutes == 0:
        return "less than 5 min"
    if hours == 0:
        return f"{rest} min"
    return f"{hours} h {rest} min" if rest else f"{hours} h"


def time_text(time_h: float | None, horizon_h: float) -> str:
    """When something happens, rounded down; ``None`` means not within the horizon."""
    return f"Not within {number_text(horizon_h, 'h')}" if time_h is None else hours_text(time_h)


def hold_text(hold: HoldTime, status: Status, horizon_h: float) -> str:
    """The hold time of an item."""
    return "Already past" if status == "already_past" else time_text(hold.best_estimate, horizon_h)


def limit_name(limit: str) -> str:
    """A limit's own words with the true minus sign."""
    return limit.replace(" -", f" {_MINUS}")


def limit_text(limit: LimitAnswer, horizon_h: float) -> str:
    """What becomes of a limit; with a dwell, when it was first passed too."""
    if limit.status == "already_past":
        return "already past at the start"
    if limit.best_estimate_h is None:
        return f"kept for {number_text(horizon_h, 'h')}"
    first_h, broken_h = limit.first_crossing_h, limit.best_estimate_h
    first = "" if first_h is None or first_h > broken_h - 0.01 else f" (first passed after {hours_text(first_h)})"
    return f"broken after {hours_text(broken_h)}{first}"


def sentence(answer: Answer) -> str:
    """The answer in one or two sentences, the number first."""
    best_h, ends = answer.hold_time_h.best_estimate, answer.ends_with
    if best_h is None or ends is None:
        return (
            f"With the door shut, {answer.store} keeps every limit for the {number_text(answer.horizon_h, 'h')} that "
            "were looked at (best estimate)."
        )
    if answer.status == "already_past":
        return f"{answer.store} is already past a limit at the start: {ends.item}, {limit_name(ends.limit)}."
    return (
        f"With the door shut, {answer.store} holds for about {hours_text(best_h)} (best estimate). "
        f"The first to break a limit: {ends.item}, {limit_name(ends.limit)}."
    )


def by_failure(items: tuple[ItemAnswer, ...]) -> tuple[ItemAnswer, ...]:
    """Items in the order in which they fail; those that do not fail come last."""

    def when_h(item: ItemAnswer) -> float:
        hold_h = item.hold_time_h.best_estimate
        return math.inf if hold_h is None else hold_h

    return tuple(sorted(items, key=when_h))


def hand_check_rows(check: HandCheck) -> tuple[tuple[str, str, str], ...]:
    """The hand check as rows: what, its value with unit, and how it is worked out in words."""
    rows = [
        ("Heat leak", number_text(check.heat_leak_w_per_k, "W/K"), "heat that comes in per degree, all paths added"),
        (
            "Heat capacity",
            number_text(check.heat_capacity_j_per_k / 1000.0, "kJ/K"),
            "mass × specific heat at the start: contents, coolants, fittings, and what is felt of the walls",
        ),
    ]
    if check.time_constant_h is not None:
        rows.append(("Time constant", hours_text(check.time_constant_h), "heat capacity / heat leak"))
    if check.closed_form_h is not None:
        rows += [
            ("Heat to the limit", energy_text(check.to_limit_j), "heat that everything inside takes up to the limit"),
            ("Of that, melting", energy_text(check.melting_j), "ice that melts on the way × its heat of fusion"),
            (
                "Time to the limit",
                hours_text(check.closed_form_h),
                "that heat, slice by slice, / (heat leak × difference to the room), all at one pace",
            ),
        ]
    rows += [
        (f"Delay of the {name}", hours_text(delay_h), "thickness² / diffusivity, layer by layer")
        for name, delay_h in check.wall_delays_h
    ]
    return tuple(rows)


def answer_text(answer: Answer) -> str:
    """The whole answer as plain text, for a terminal."""
    horizon_h = answer.horizon_h
    air = [f"  air, {limit_name(one.limit)}: {limit_text(one, horizon_h)}" for one in answer.air_limits]
    heat = [
        f"  {path.path}: {share_text(path.share)} ({number_text(path.w_at_start, 'W')} at the start)"
        for path in answer.heat_in.paths
    ]
    cautions = [caution.text for caution in answer.cautions if caution.code != "best_estimate_only"]
    parts = {
        "What fails when:": [_item_line(item, horizon_h) for item in by_failure(answer.items)],
        "Limits on the air:": air,
        "Where the heat comes in:": heat,
        "Hand check:": [f"  {what}: {value} ({how})" for what, value, how in hand_check_rows(answer.hand_check)],
        "Cautions:": [f"  {text}" for text in cautions],
        "Assumed:": [f"  {one.field}: {assumed_text(one.value)} ({one.source})" for one in answer.assumed],
    }
    blocks = [[sentence(answer), RANGE_NOTICE], *([title, *lines] for title, lines in parts.items() if lines)]
    blocks.append([f"Engine {answer.engine_version}. Fingerprint {answer.fingerprint}."])
    return "\n\n".join("\n".join(block) for block in blocks)


def assumed_text(value: float | str | None) -> str:
    """A value that was assumed."""
    return number_text(value) if isinstance(value, (int, float)) else str(value)


def _item_line(item: ItemAnswer, horizon_h: float) -> str:
    if not item.limits:
        return f"  {item.name}: no limit"
    limits = "; ".join(f"{limit_name(limit.limit)}: {limit_text(limit, horizon_h)}" for limit in item.limits)
    return f"  {item.name}: {hold_text(item.hold_time_h, item.status, horizon_h)} ({limits})"
