"""Charts as numbers for the templates: scales, ticks, paths, labels. Drawn as SVG by a macro, in two widths."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

STYLES = (
    ("a", "", "#0f6b78"),
    ("b", "10 4", "#a1440d"),
    ("c", "3 4", "#4d5bb0"),
    ("d", "14 4 3 4", "#6a7b15"),
    ("e", "6 3 2 3 2 3", "#8a2f6b"),
)
"""Style, dashes and a plain colour; lines differ by their dashes and carry their names."""

_TOLERANCE = 0.3
"""How far a drawn line may pass a point of its curve, in units of the view box."""

_LINE_HEIGHT = 17.0
_HOUR_STEPS = (0.25, 0.5, 1.0, 2.0, 3.0, 4.0, 6.0, 12.0, 24.0, 48.0)


@dataclass(frozen=True)
class Curve:
    """One quantity over time: its name, its values, and whether it is drawn thin."""

    name: str
    values: Sequence[float]
    is_thin: bool = False


@dataclass(frozen=True)
class Tick:
    """A mark on an axis."""

    at: float
    text: str


@dataclass(frozen=True)
class Level:
    """A line across the chart, with its words near its right end."""

    at: float
    text: str
    text_at: float


@dataclass(frozen=True)
class Mark:
    """A moment, as a line down the chart with a word beside it."""

    at: float
    text: str
    text_at: float
    anchor: str


@dataclass(frozen=True)
class Line:
    """One curve, drawn, with its name where it ends."""

    points: str
    text: str
    style: str
    dashes: str
    colour: str
    thickness: float
    label_x: float
    label_y: float


@dataclass(frozen=True)
class Chart:
    """Everything the macro draws, in the units of its view box; ``scale`` tells the read-out how to read it."""

    id: str
    variant: str
    title: str
    width: int
    height: int
    left: float
    right: float
    top: float
    bottom: float
    tick_x: float
    tick_y: float
    axis_y: float
    x_ticks: tuple[Tick, ...]
    y_ticks: tuple[Tick, ...]
    levels: tuple[Level, ...]
    marks: tuple[Mark, ...]
    lines: tuple[Line, ...]
    end_h: float
    low_c: float
    high_c: float


@dataclass(frozen=True)
class _Frame:
    left: float
    right: float
    top: float
    bottom: float
    end_h: float
    low: float
    high: float

    def x(self, time_h: float) -> float:
        return round(self.left + (self.right - self.left) * time_h / self.end_h, 1)

    def y(self, value: float) -> float:
        return round(self.bottom - (self.bottom - self.top) * (value - self.low) / (self.high - self.low), 1)


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
    is_wide = variant == "wide"
    width, height, names = (880, 440, 170.0) if is_wide else (400, 420, 112.0)
    values = [value for curve in curves for value in curve.values] + [level for level, _ in levels]
    y_steps = ticks(min(values), max(values), 6)
    frame = _Frame(52.0, width - names, 44.0, height - 52.0, time_h[-1], y_steps[0], y_steps[-1])
    x_steps = hour_ticks(frame.end_h, 8 if is_wide else 4)
    return Chart(
        id=f"chart-{variant}",
        variant=variant,
        title=title,
        width=width,
        height=height,
        left=frame.left,
        right=frame.right,
        top=frame.top,
        bottom=frame.bottom,
        tick_x=frame.left - 8.0,
        tick_y=frame.bottom + 20.0,
        axis_y=frame.bottom + 42.0,
        x_ticks=tuple(Tick(frame.x(step), plain_number(step)) for step in x_steps),
        y_ticks=tuple(Tick(frame.y(step), plain_number(step)) for step in y_steps),
        levels=_levels(frame, levels),
        marks=tuple(_mark(frame, at_h, text) for at_h, text in moments),
        lines=_lines(frame, time_h, curves, longest=16 if is_wide else 11),
        end_h=frame.end_h,
        low_c=frame.low,
        high_c=frame.high,
    )


def ticks(low: float, high: float, about: int) -> list[float]:
    """Round values that cover a range, about as many as wanted."""
    rough = max(high - low, 1e-6) / about
    power = 10.0 ** math.floor(math.log10(rough))
    step = next(factor * power for factor in (1.0, 2.0, 2.5, 5.0, 10.0) if factor * power >= rough * (1 - 1e-9))
    first, last = math.floor(low / step + 1e-9), math.ceil(high / step - 1e-9)
    return [round(k * step, 10) for k in range(first, max(last, first + 1) + 1)]


def hour_ticks(end_h: float, most: int) -> list[float]:
    """Hours that people count in, from 0 to the end."""
    step_h = next((step for step in _HOUR_STEPS if end_h / step <= most), math.ceil(end_h / most / 24.0) * 24.0)
    return [k * step_h for k in range(int(end_h / step_h + 1e-9) + 1)]


def plain_number(value: float) -> str:
    """A tick's number with the true minus sign."""
    return f"{value:g}".replace("-", "\N{MINUS SIGN}")


def _mark(frame: _Frame, at_h: float, text: str) -> Mark:
    is_late = at_h > 0.55 * frame.end_h
    at = frame.x(at_h)
    return Mark(at, text, at - 6.0 if is_late else at + 6.0, "end" if is_late else "start")


def _levels(frame: _Frame, levels: Sequence[tuple[float, str]]) -> tuple[Level, ...]:
    heights = [frame.y(level) for level, _ in levels]
    words = _spread([height - 6.0 for height in heights], frame.top - 6.0, frame.bottom - 6.0)
    return tuple(Level(at, text, round(y, 1)) for at, (_, text), y in zip(heights, levels, words, strict=True))


def _lines(frame: _Frame, time_h: Sequence[float], curves: Sequence[Curve], longest: int) -> tuple[Line, ...]:
    ends = [frame.y(curve.values[-1]) + 5.0 for curve in curves]
    label_y = _spread(ends, frame.top + 5.0, frame.bottom + 5.0)
    lines = []
    for index, curve in enumerate(curves):
        style, dashes, colour = STYLES[index % len(STYLES)]
        points = fewer_points([(frame.x(t), frame.y(v)) for t, v in zip(time_h, curve.values, strict=True)])
        name = curve.name if len(curve.name) <= longest else f"{curve.name[: longest - 1]}…"
        lines.append(
            Line(
                points=" ".join(f"{x:g},{y:g}" for x, y in points),
                text=name,
                style=style,
                dashes=dashes,
                colour=colour,
                thickness=1.6 if curve.is_thin else 2.8,
                label_x=frame.right + 8.0,
                label_y=round(label_y[index], 1),
            )
        )
    return tuple(lines)


def fewer_points(points: list[tuple[float, float]], tolerance: float = _TOLERANCE) -> list[tuple[float, float]]:
    """The points that a line needs to pass within a tolerance of all of them (Douglas and Peucker 1973)."""
    keep = {0, len(points) - 1}
    open_ends = [(0, len(points) - 1)]
    while open_ends:
        first, last = open_ends.pop()
        off = [_off(points[k], points[first], points[last]) for k in range(first + 1, last)]
        if off and max(off) > tolerance:
            far = first + 1 + off.index(max(off))
            keep.add(far)
            open_ends += [(first, far), (far, last)]
    return [points[k] for k in sorted(keep)]


def _off(point: tuple[float, float], start: tuple[float, float], end: tuple[float, float]) -> float:
    """How far a point lies above or below a line."""
    run = end[0] - start[0]
    slope = (end[1] - start[1]) / run if run else 0.0
    return abs(point[1] - start[1] - slope * (point[0] - start[0]))


def _spread(wanted: list[float], low: float, high: float) -> list[float]:
    """Heights near those wanted, in the same order, a line apart where there is room."""
    gap = min(_LINE_HEIGHT, (high - low) / max(len(wanted) - 1, 1))
    order = sorted(range(len(wanted)), key=lambda k: wanted[k])
    placed, floor = list(wanted), low
    for k in order:
        placed[k] = floor = max(wanted[k], floor)
        floor += gap
    ceiling = high
    for k in reversed(order):
        placed[k] = ceiling = min(placed[k], ceiling)
        ceiling -= gap
    return placed
