"""The answer as words and drawn charts, ready for the templates."""

from __future__ import annotations

from dataclasses import dataclass

from app.answers import Answer, ItemAnswer, LimitAnswer
from app.answers.wording import (
    RANGE_NOTICE,
    energy_text,
    hold_text,
    hours_text,
    limit_text,
    number_text,
    sentence,
    share_text,
    temperature_text,
    time_text,
)
from app.web.charts import Chart, Curve, chart

_SERIOUS = ("already_past", "medicine", "frozen_coolant_near_freeze_sensitive", "shorter_than_air_settles")
_MOST_ROWS = 49
_MOST_CURVES = 7


@dataclass(frozen=True)
class LimitRow:
    """One limit in words."""

    text: str
    outcome: str
    holds: str
    source: str


@dataclass(frozen=True)
class ItemRow:
    """One item in words."""

    name: str
    holds: str
    limits: tuple[LimitRow, ...]
    melting_starts: str
    melted: str
    warmest: str
    biot: str


@dataclass(frozen=True)
class CoolantRow:
    """One coolant in words."""

    name: str
    left: str
    gone: str


@dataclass(frozen=True)
class PathRow:
    """One heat path in words, and the length of its bar."""

    name: str
    share: str
    start: str
    bar: float


@dataclass(frozen=True)
class WorkingRow:
    """One line of the hand check."""

    name: str
    value: str
    how: str


@dataclass(frozen=True)
class AssumedRow:
    """One value that was not given."""

    field: str
    value: str
    source: str


@dataclass(frozen=True)
class AnswerView:
    """The whole answer in words."""

    sentence: str
    range_notice: str
    serious: tuple[str, ...]
    wide_chart: Chart
    narrow_chart: Chart
    chart_caption: str
    items: tuple[ItemRow, ...]
    air_limits: tuple[LimitRow, ...]
    coolants: tuple[CoolantRow, ...]
    heat_caption: str
    paths: tuple[PathRow, ...]
    hand_check: tuple[WorkingRow, ...]
    cautions: tuple[str, ...]
    assumed: tuple[AssumedRow, ...]
    series_names: tuple[str, ...]
    series_rows: tuple[tuple[str, ...], ...]
    evidence: str


def answer_view(answer: Answer, levels: tuple[tuple[float, str], ...]) -> AnswerView:
    """An answer in words; ``levels`` are the temperatures that its limits draw across the chart."""
    order = sorted(answer.items, key=lambda item: _rank(item))
    names, columns = _series(answer)
    every = max(1, -(-len(answer.series.time_h) // _MOST_ROWS))
    return AnswerView(
        sentence=sentence(answer),
        range_notice=RANGE_NOTICE,
        serious=tuple(caution.text for caution in answer.cautions if caution.code in _SERIOUS),
        wide_chart=_chart(answer, levels, "wide"),
        narrow_chart=_chart(answer, levels, "narrow"),
        chart_caption="Temperatures over the hours since power was lost; dotted across: limits; upright: when the "
        "store's time ends. Read single values with pointer, touch or the arrow keys, or in the table below.",
        items=tuple(_item_row(item, answer.horizon_h) for item in order),
        air_limits=tuple(_limit_row(limit, answer.horizon_h) for limit in answer.air_limits),
        coolants=tuple(
            CoolantRow(c.name, number_text(c.left_kg_at_horizon, "kg"), time_text(c.gone_at_h, answer.horizon_h))
            for c in answer.coolants
        ),
        heat_caption=f"{energy_text(answer.heat_in.total_j)} in {hours_text(answer.horizon_h)}",
        paths=tuple(
            PathRow(p.path, share_text(p.share), number_text(p.w_at_start, "W"), round(100 * max(p.share, 0.0), 1))
            for p in answer.heat_in.paths
        ),
        hand_check=_working(answer),
        cautions=tuple(caution.text for caution in answer.cautions),
        assumed=tuple(AssumedRow(a.field, _assumed_text(a.value), a.source) for a in answer.assumed),
        series_names=("Hours", *names),
        series_rows=tuple(
            (f"{answer.series.time_h[k]:.2f}", *(_degrees(column[k]) for column in columns))
            for k in range(0, len(answer.series.time_h), every)
        ),
        evidence=(
            f"Engine {answer.engine_version}. Question {answer.fingerprint[:16]}. The heat of the run adds up to "
            f"within {answer.energy_balance_error:.0e} of what moved."
        ),
    )


def series_csv(answer: Answer) -> str:
    """The temperatures of a run as comma-separated text, at full precision."""
    names, columns = _series(answer)
    quoted = ['"' + name.replace('"', '""') + '"' for name in ("time_h", *(f"{name} [degC]" for name in names))]
    lines = [",".join(quoted)]
    for k, hours in enumerate(answer.series.time_h):
        lines.append(",".join([f"{hours:.6g}", *(f"{column[k]:.6g}" for column in columns)]))
    return "\r\n".join(lines) + "\r\n"


def predicted_rows(answer: Answer, count: int) -> tuple[tuple[str, ...], tuple[tuple[str, ...], ...]]:
    """Names and rows of a log sheet: hours, then predicted air and items at evenly spaced times."""
    names, columns = _series(answer)
    shown = [k for k, name in enumerate(names) if "mean" not in name and name != "Room"][:4]
    last = len(answer.series.time_h) - 1
    picks = sorted({round(last * step / count) for step in range(count + 1)})
    rows = tuple((_clock(answer.series.time_h[at]), *(_degrees(columns[k][at]) for k in shown)) for at in picks)
    return tuple(names[k] for k in shown), rows


def _rank(item: ItemAnswer) -> float:
    hours = item.hold_time_h.best_estimate
    return float("inf") if hours is None else hours


def _series(answer: Answer) -> tuple[list[str], list[tuple[float, ...]]]:
    names, columns = ["Air inside"], [answer.series.air_c]
    for name, item in answer.series.items.items():
        names += [f"{name}, warmest", f"{name}, mean"]
        columns += [item.warmest_c, item.mean_c]
    for name, values in answer.series.coolants.items():
        names.append(name)
        columns.append(values)
    return [*names, "Room"], [*columns, answer.series.room_c]


def _chart(answer: Answer, levels: tuple[tuple[float, str], ...], variant: str) -> Chart:
    curves = [Curve("air", answer.series.air_c, is_thin=True)]
    curves += [Curve(name, item.warmest_c) for name, item in answer.series.items.items()]
    curves += [Curve(name, values) for name, values in answer.series.coolants.items()]
    hours = answer.hold_time_h.best_estimate
    moments = [] if hours is None else [(hours, hours_text(hours))]
    return chart(
        title=f"Temperatures in {answer.store}",
        variant=variant,
        time_h=answer.series.time_h,
        curves=curves[:_MOST_CURVES],
        levels=levels,
        moments=moments,
    )


def _item_row(item: ItemAnswer, horizon_h: float) -> ItemRow:
    return ItemRow(
        name=item.name,
        holds=hold_text(item.hold_time_h, item.status, horizon_h) if item.limits else "no limit",
        limits=tuple(_limit_row(limit, horizon_h) for limit in item.limits),
        melting_starts=time_text(item.melting_starts_h, horizon_h),
        melted=time_text(item.melted_h, horizon_h),
        warmest=temperature_text(item.warmest_c_at_horizon),
        biot=f"{number_text(item.biot, digits=2)}, {item.shells}",
    )


def _limit_row(limit: LimitAnswer, horizon_h: float) -> LimitRow:
    hours = limit.best_estimate_h
    holds = "Already past" if limit.status == "already_past" else time_text(hours, horizon_h)
    return LimitRow(limit.limit, limit_text(limit, horizon_h), holds, limit.source or "")


def _working(answer: Answer) -> tuple[WorkingRow, ...]:
    check = answer.hand_check
    rows = [
        WorkingRow("Heat leak", number_text(check.heat_leak_w_per_k, "W/K"), "all paths added: U times area, W/K"),
        WorkingRow(
            "Heat capacity",
            number_text(check.heat_capacity_j_per_k / 1e3, "kJ/K"),
            "mass times specific heat at the start, contents, coolants, fittings, and what is felt of the walls",
        ),
        WorkingRow("Time constant", number_text(check.time_constant_h, "h"), "heat capacity over heat leak"),
    ]
    if check.closed_form_h is not None:
        rows += [
            WorkingRow("Heat to the limit", energy_text(check.to_limit_j), "heat of everything inside up to the limit"),
            WorkingRow(
                "of it melting", energy_text(check.melting_j), "ice that melts on the way, at its heat of fusion"
            ),
            WorkingRow(
                "Closed form",
                hours_text(check.closed_form_h),
                "that heat over leak times difference to the room, everything at one pace",
            ),
        ]
    rows += [
        WorkingRow(f"Delay of {name}", number_text(hours, "h"), "thickness squared over diffusivity, layers added")
        for name, hours in check.wall_delays_h
    ]
    return tuple(rows)


def _assumed_text(value: float | str | None) -> str:
    return number_text(value) if isinstance(value, (int, float)) else str(value)


def _degrees(value: float) -> str:
    return f"{value + 0.0:.1f}".replace("-", "\u2212")


def _clock(hours: float) -> str:
    return f"{hours:.1f}"
