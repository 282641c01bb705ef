"""The answer about one store, as frozen dataclasses named like the JSON contract.

``as_document`` turns an answer into the contract's JSON document; pages read the same dataclasses.
Numbers are kept at full precision here: rounding belongs to ``wording``.
"""

from __future__ import annotations

from dataclasses import asdict, dataclass
from typing import Any, Literal

Status = Literal["fails", "beyond_horizon", "already_past"]


@dataclass(frozen=True)
class HoldTime:
    """Hold time with what is known of its spread; ``None``: not worked out, or beyond the horizon. [h]"""

    best_estimate: float | None
    planning: float | None = None
    median: float | None = None
    low: float | None = None
    high: float | None = None
    confidence: float | None = None
    sampling_error_h: float | None = None


@dataclass(frozen=True)
class LimitAnswer:
    """What became of one limit of one item. ``first_crossing_h`` comes before the end of a dwell."""

    limit: str
    status: Status
    best_estimate_h: float | None
    first_crossing_h: float | None
    source: str | None = None


@dataclass(frozen=True)
class ItemAnswer:
    """What becomes of one item of the contents."""

    name: str
    hold_time_h: HoldTime
    status: Status
    limits: tuple[LimitAnswer, ...]
    biot: float
    shells: int
    melting_starts_h: float | None
    melted_h: float | None
    warmest_c_at_horizon: float
    mean_kinetic_c: float


@dataclass(frozen=True)
class HeatPath:
    """One way by which heat comes in: its share of the total and its flow at the start."""

    path: str
    share: float
    w_at_start: float


@dataclass(frozen=True)
class HeatIn:
    """Heat that came in from outside over the horizon."""

    total_j: float
    paths: tuple[HeatPath, ...]


@dataclass(frozen=True)
class HandCheck:
    """Working that can be checked with a calculator: the whole store as one lump."""

    heat_leak_w_per_k: float
    heat_capacity_j_per_k: float
    time_constant_h: float | None
    to_limit_j: float
    melting_j: float
    closed_form_h: float | None
    wall_delays_h: tuple[tuple[str, float], ...] = ()


@dataclass(frozen=True)
class CoolantAnswer:
    """What is left of one coolant at the horizon, and when its last ice was gone."""

    name: str
    left_kg_at_horizon: float
    gone_at_h: float | None


@dataclass(frozen=True)
class ItemSeries:
    """Temperatures of one item at the times of the series. [°C]"""

    mean_c: tuple[float, ...]
    warmest_c: tuple[float, ...]


@dataclass(frozen=True)
class Series:
    """The run on an even grid of times, for the chart and the table."""

    time_h: tuple[float, ...]
    air_c: tuple[float, ...]
    items: dict[str, ItemSeries]
    coolants: dict[str, tuple[float, ...]]
    room_c: tuple[float, ...]


@dataclass(frozen=True)
class Caution:
    """Something that the person must know before acting on the number; the most serious come first."""

    code: str
    text: str


@dataclass(frozen=True)
class Assumed:
    """A value that the person did not give and that the model took, with where it comes from."""

    field: str
    value: float | str | None
    source: str


@dataclass(frozen=True)
class EndsWith:
    """The item and the limit that end the hold time of the store."""

    item: str
    limit: str


@dataclass(frozen=True)
class Answer:
    """The answer to "how long does this store hold?"."""

    engine_version: str
    fingerprint: str
    store: str
    hold_time_h: HoldTime
    status: Status
    ends_with: EndsWith | None
    items: tuple[ItemAnswer, ...]
    air_limits: tuple[LimitAnswer, ...]
    heat_in: HeatIn
    energy_balance_error: float
    hand_check: HandCheck
    drivers: tuple[Any, ...]
    coolants: tuple[CoolantAnswer, ...]
    series: Series
    cautions: tuple[Caution, ...]
    assumed: tuple[Assumed, ...]
    horizon_h: float

    def as_document(self) -> dict[str, Any]:
        """The contract's JSON document of this answer, at full precision."""
        return asdict(self)
