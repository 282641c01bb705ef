"""The answer as words and drawn charts, ready for the templates."""

from __future__ import annotations

import csv
import io
from collections.abc import Sequence
from dataclasses import dataclass

from app.answers import Answer, ItemAnswer, LimitAnswer, plain_limits, wording
from app.stores import StoreDefinition
from app.web.charts import Chart, Curve, chart
from app.web.field_words import FieldWords, field_words

_SERIOUS = frozenset({"already_past", "medicine", "frozen_coolant_near_freeze_sensitive", "shorter_than_air_settles"})
_MOST_ROWS = 33
_MOST_CURVES = 5


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
    melting: str
    warmest: str
    shells: str


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
    bar: str


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
    """The whole answer in words. ``figure`` is its one number, ``status`` a word for how urgent it is."""

    status: str
    figure: str
    sentence: str
    range_notice: str
    serious: tuple[str, ...]
    wide_chart: Chart
    narrow_chart: Chart
    chart_caption: str
    items: tuple[ItemRow, ...]
    air_limits: tuple[LimitRow, ...]
    coolants: tuple[CoolantRow, ...]
    horizon: str
    heat_caption: str
    paths: tuple[PathRow, ...]
    hand_check: tuple[WorkingRow, ...]
    cautions: tuple[str, ...]
    assumed: tuple[AssumedRow, ...]
    series_names: tuple[str, ...]
    series_rows: tuple[tuple[str, ...], ...]
    evidence: str


def answer_view(definition: StoreDefinition, answer: Answer) -> AnswerView:
    """An answer in words."""
    levels, horizon_h = levels_of(definition), answer.horizon_h
    names, columns = series_columns(answer)
    words = field_words(definition)
    every = max(1, -(-len(answer.series.time_h) // _MOST_ROWS))
    return AnswerView(
        status=answer.status,
        figure=_figure(answer),
        sentence=wording.sentence(answer),
        range_notice=wording.RANGE_NOTICE,
        serious=tuple(caution.text for caution in answer.cautions if caution.code in _SERIOUS),
        wide_chart=_chart(answer, levels, "wide"),
        narrow_chart=_chart(answer, levels, "narrow"),
        chart_caption=_chart_caption(answer),
        items=tuple(_item_row(item, horizon_h) for item in wording.by_failure(answer.items)),
        air_limits=tuple(_limit_row(limit, horizon_h) for limit in answer.air_limits),
        coolants=tuple(
            CoolantRow(
                one.name,
                wording.number_text(one.left_kg_at_horizon, "kg"),
                wording.time_text(one.gone_at_h, horizon_h),
            )
            for one in answer.coolants
        ),
        horizon=wording.number_text(horizon_h, "h"),
        heat_caption=f"{wording.energy_text(answer.heat_in.total_j)} in {wording.number_text(horizon_h, 'h')}",
        paths=_paths(answer),
        hand_check=tuple(WorkingRow(*row) for row in wording.hand_check_rows(answer.hand_check)),
        cautions=tuple(one.text for one in answer.cautions if one.code not in _SERIOUS | {"best_estimate_only"}),
        assumed=_assumed(answer, words),
        series_names=("Hours", *names),
        series_rows=tuple(
            (
                wording.fixed_text(answer.series.time_h[k], 1),
                *(wording.fixed_text(column[k], 1) for column in columns),
            )
            for k in range(0, len(answer.series.time_h), every)
        ),
        evidence=(
            f"Engine {answer.engine_version}. Fingerprint of the question {answer.fingerprint[:16]}. The heat of the "
            f"run adds up to within {answer.energy_balance_error:.0e} of what moved."
        ),
    )


def levels_of(definition: StoreDefinition) -> tuple[tuple[float, str], ...]:
    """The temperatures of all limits, with their words, each once."""
    limits = [limit for contents in definition.contents for limit in contents.limits]
    plains = [plain for limit in (*limits, *definition.air_limits) for plain in plain_limits(limit)]
    levels = {one.level: f"limit {wording.number_text(one.level, '°C')}" for one in plains if one.kind != "thawed"}
    return tuple(sorted(levels.items()))


def series_csv(answer: Answer) -> str:
    """The temperatures of a run as comma-separated values."""
    names, columns = series_columns(answer)
    out = io.StringIO()
    writer = csv.writer(out)
    writer.writerow(["time_h", *(f"{name} [°C]" for name in names)])
    for k, time_h in enumerate(answer.series.time_h):
        writer.writerow([f"{time_h:.6g}", *(f"{column[k]:.6g}" for column in columns)])
    return out.getvalue()


def series_columns(answer: Answer) -> tuple[list[str], list[Sequence[float]]]:
    """Names and values of everything in the series, in the order of failure."""
    names: list[str] = ["Air inside"]
    columns: list[Sequence[float]] = [answer.series.air_c]
    for item in wording.by_failure(answer.items):
        series = answer.series.items[item.name]
        names += [f"{item.name}, warmest", f"{item.name}, mean"]
        columns += [series.warmest_c, series.mean_c]
    for name, values in answer.series.coolants.items():
        names.append(name)
        columns.append(values)
    return [*names, "Room"], [*columns, answer.series.room_c]


def _figure(answer: Answer) -> str:
    if answer.status == "already_past":
        return "Already past"
    best_h = answer.hold_time_h.best_estimate
    return f"Over {wording.number_text(answer.horizon_h, 'h')}" if best_h is None else wording.hours_text(best_h)


def _chart_caption(answer: Answer) -> str:
    hidden = len(answer.items) + len(answer.coolants) + 1 - _MOST_CURVES
    more = f" {hidden} more are in the table." if hidden > 0 else ""
    return (
        "Air, the point of each item at which its limit is judged, and the coolants, from the loss of power. Dotted "
        f"lines across are the limits; the upright line is the end of the hold time.{more}"
    )


def _chart(answer: Answer, levels: Sequence[tuple[float, str]], variant: str) -> Chart:
    curves = [Curve("Air inside", answer.series.air_c, is_thin=True)]
    curves += [_item_curve(answer, item) for item in wording.by_failure(answer.items)]
    curves += [Curve(name, values) for name, values in answer.series.coolants.items()]
    best_h = answer.hold_time_h.best_estimate
    return chart(
        title=f"Temperatures in {answer.store}, in °C over hours since power loss",
        variant=variant,
        time_h=answer.series.time_h,
        curves=curves[:_MOST_CURVES],
        levels=levels,
        moments=() if best_h is None else ((best_h, wording.hours_text(best_h)),),
    )


def _item_curve(answer: Answer, item: ItemAnswer) -> Curve:
    """The point of an item at which its first limit is judged; its warmest point where nothing fails."""
    series = answer.series.items[item.name]
    first = [one for one in item.limits if one.best_estimate_h == item.hold_time_h.best_estimate]
    if first and first[0].best_estimate_h is not None and first[0].limit.endswith("mean point"):
        return Curve(f"{item.name}, mean", series.mean_c)
    return Curve(item.name, series.warmest_c)


def _item_row(item: ItemAnswer, horizon_h: float) -> ItemRow:
    return ItemRow(
        name=item.name,
        holds=wording.hold_text(item.hold_time_h, item.status, horizon_h) if item.limits else "no limit",
        limits=tuple(_limit_row(limit, horizon_h) for limit in item.limits),
        melting=_melting(item),
        warmest=f"Warmest point after {wording.number_text(horizon_h, 'h')}: "
        f"{wording.temperature_text(item.warmest_c_at_horizon)}.",
        shells=f"Biot number {wording.number_text(item.biot, digits=2)}, {item.shells} "
        f"{'shell' if item.shells == 1 else 'shells'}.",
    )


def _melting(item: ItemAnswer) -> str:
    starts_h, melted_h = item.melting_starts_h, item.melted_h
    if starts_h is None:
        return "No ice begins to melt."
    ends = "not all melts" if melted_h is None else f"all has melted after {wording.hours_text(melted_h)}"
    return f"Ice begins to melt after {wording.hours_text(starts_h)}; {ends}."


def _limit_row(limit: LimitAnswer, horizon_h: float) -> LimitRow:
    return LimitRow(
        text=wording.limit_name(limit.limit),
        outcome=wording.limit_text(limit, horizon_h),
        holds=(
            "Already past" if limit.status == "already_past" else wording.time_text(limit.best_estimate_h, horizon_h)
        ),
        source=limit.source or "",
    )


def _paths(answer: Answer) -> tuple[PathRow, ...]:
    return tuple(
        PathRow(
            name=path.path.capitalize(),
            share=wording.share_text(path.share),
            start=wording.number_text(path.w_at_start, "W"),
            bar=f"{100.0 * min(max(path.share, 0.0), 1.0):.1f}",
        )
        for path in answer.heat_in.paths
    )


def _assumed(answer: Answer, words: FieldWords) -> tuple[AssumedRow, ...]:
    rows = []
    for one in answer.assumed:
        unit = words.unit(one.field)
        value = f"{wording.assumed_text(one.value)} {unit}".strip()
        rows.append(AssumedRow(words.label(one.field), value, one.source))
    return tuple(rows)
