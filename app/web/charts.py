"""Charts as numbers for the templates: scales, ticks, paths, labels. Drawn as SVG by a macro, in two widths."""

from __future__ import annotations

import json
import math
from collections.abc import Sequence
from dataclasses import dataclass

STYLES = (("a", "", "#0f6b78"), ("b", "9 4", "#a1440d"), ("c", "2 4", "#4d5bb0"), ("d", "12 3 2 3", "#6a7b15"))
"""Style name, dashes and a plain colour; lines differ by dashes first."""


@dataclass(frozen=True)
class Curve:
    """One quantity over time: its name, its values, and whether it is drawn thin."""

    name: str
    values: tuple[float, ...]
    is_thin: bool = False


@dataclass(frozen=True)
class Tick:
    """A mark on an axis, or a level across the chart."""

    at: float
    text: str


@dataclass(frozen=True)
class Mark:
    """A moment, as a line down the chart with a word beside it."""

    at: float
    text: str
    anchor: str
    shift: float


@dataclass(frozen=True)
class Line:
    """One curve, drawn."""

    path: str
    text: str
    style: str
    dashes: str
    colour: str
    thickness: float
    label_x: float
    label_y: float
    anchor: str


@dataclass(frozen=True)
class Chart:
    """Everything the macro draws, in the units of its view box."""

    id: str
    variant: str
    title: str
    width: int
    height: int
    left: float
    right: float
    top: float
    bottom: float
    x_ticks: tuple[Tick, ...]
    y_ticks: tuple[Tick, ...]
    levels: tuple[Tick, ...]
    marks: tuple[Mark, ...]
    lines: tuple[Line, ...]
    readings: str


def chart(
    *,
    title: str,
    variant: str,
    time_h: Sequence[float],
    curves: Sequence[Curve],
    levels: Sequence[tuple[float, str]],
    moments: Sequence[tuple[float, str]],
) -> Chart:
    """A chart of curves over hours; ``variant`` is wide or narrow."""
    width, height = (880, 430) if variant == "wide" else (400, 420)
    left, right, top, bottom = 62.0, width - 14.0, 30.0, height - 52.0
    end_h = time_h[-1]
    values = [value for curve in curves for value in curve.values] + [level for level, _ in levels]
    y_steps = ticks(min(values), max(values), 7)
    low, high = min(y_steps[0], min(values)), max(y_steps[-1], max(values))

    def x(hours: float) -> float:
        return round(left + (right - left) * hours / end_h, 1)

    def y(value: float) -> float:
        return round(bottom - (bottom - top) * (value - low) / (high - low), 1)

    x_steps = [step for step in ticks(0.0, end_h, 8 if variant == "wide" else 5) if 0.0 <= step <= end_h]
    return Chart(
        id=f"chart-{variant}",
        variant=variant,
        title=title,
        width=width,
        height=height,
        left=left,
        right=right,
        top=top,
        bottom=bottom,
        x_ticks=tuple(Tick(x(step), _plain(step)) for step in x_steps),
        y_ticks=tuple(Tick(y(step), _plain(step)) for step in y_steps if low <= step <= high),
        levels=tuple(Tick(y(level), text) for level, text in levels),
        marks=tuple(
            Mark(x(at), text, "end" if at > 0.6 * end_h else "start", -6.0 if at > 0.6 * end_h else 6.0)
            for at, text in moments
        ),
        lines=_lines(curves, time_h, x, y),
        readings=_readings(time_h, curves, left, right, width, end_h),
    )


def ticks(low: float, high: float, about: int) -> list[float]:
    """Round values that cover a range, about as many as wanted."""
    span = max(high - low, 1e-6)
    rough = span / about
    power = 10.0 ** math.floor(math.log10(rough))
    step = next(factor * power for factor in (1.0, 2.0, 2.5, 5.0, 10.0) if factor * power >= rough * (1 - 1e-9))
    first, last = math.floor(low / step + 1e-9), math.ceil(high / step - 1e-9)
    return [round(k * step, 10) for k in range(first, last + 1)]


def _lines(curves: Sequence[Curve], time_h: Sequence[float], x: object, y: object) -> tuple[Line, ...]:
    """Curves with their names, each set where the curve stands apart from those before it."""
    drawn = []
    count = len(time_h)
    for index, curve in enumerate(curves):
        style, dashes, colour = STYLES[index % len(STYLES)]
        points = [f"{x(t)} {y(v)}" for t, v in zip(time_h, curve.values, strict=True)]  # type: ignore[operator]
        share = 0.45 + 0.5 * (index + 1) / (len(curves) + 1)
        at = min(int(share * count), count - 1)
        drawn.append(
            Line(
                path="M" + "L".join(points),
                text=curve.name,
                style=style,
                dashes=dashes,
                colour=colour,
                thickness=1.6 if curve.is_thin else 2.8,
                label_x=x(time_h[at]),  # type: ignore[operator]
                label_y=y(curve.values[at]) - 7.0,  # type: ignore[operator]
                anchor="end" if share > 0.7 else "middle",
            )
        )
    return tuple(drawn)


def _readings(
    time_h: Sequence[float], curves: Sequence[Curve], left: float, right: float, width: int, end_h: float
) -> str:
    """The same data for the read-out by pointer and keys."""
    return json.dumps(
        {
            "time_h": [round(t, 3) for t in time_h],
            "names": [curve.name for curve in curves],
            "values": [[round(value, 2) for value in curve.values] for curve in curves],
            "left": left,
            "right": right,
            "width": width,
            "end_h": end_h,
        },
        separators=(",", ":"),
    )


def _plain(value: float) -> str:
    return f"{value:g}".replace("-", "\u2212")
