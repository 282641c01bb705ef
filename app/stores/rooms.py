"""Temperatures around a store as a person describes them: the room, outdoors, and what a room drifts towards.

Part of the contract, checked field by field; ``histories_of`` turns them into the engine's closed forms. Called by
``definition``.
"""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field

from app.stores.asks import fraction, hours, temperature
from app.stores.fields import Ask, Number, Part, Quantity


class _Place(Part):
    """What any room may say besides its temperature; not used yet."""

    volume_m3: Annotated[Quantity | None, Ask("Volume of the room", "m³", "cubic metres", 0.1, 1e7)] = None
    air_changes_per_h: Annotated[Quantity | None, Ask("Air changes", "1/h", "per hour", 0.0, 1000.0)] = None


class _History(_Place):
    """What a room may say whose temperature is not a list; not used yet."""

    relative_humidity: Annotated[Quantity | None, fraction("Relative humidity")] = None


_AROUND = ("Temperature", -60.0, 70.0)


class ConstantHistory(_History):
    """One temperature all the time."""

    kind: Literal["constant"]
    temperature_c: Annotated[Quantity, temperature(*_AROUND)]


class RampHistory(_History):
    """An even change, then level."""

    kind: Literal["ramp"]
    from_c: Annotated[Quantity, temperature("From", -60.0, 70.0)]
    to_c: Annotated[Quantity, temperature("To", -60.0, 70.0)]
    over_h: Annotated[Quantity, hours("In", 0.01)]


class DayHistory(_History):
    """A day swing."""

    kind: Literal["day"]
    mean_c: Annotated[Quantity, temperature("Mean of the day", -60.0, 70.0)]
    swing_k: Annotated[Quantity, Ask("Swing either side of the mean", "K", "kelvin", 0.0, 40.0)]
    peak_hour: Annotated[Quantity, Ask("Warmest at", "h", "o'clock", 0.0, 24.0)] = Quantity(value=15.0)
    start_hour: Annotated[Quantity, Ask("Power is lost at", "h", "o'clock", 0.0, 24.0)] = Quantity(value=12.0)


class SeriesHistory(_Place):
    """Temperatures at times, straight between them."""

    kind: Literal["series"]
    time_h: Annotated[tuple[Number, ...], Field(min_length=2, max_length=20000), hours("Times")]
    temperature_c: Annotated[
        tuple[Number, ...], Field(min_length=2, max_length=20000), temperature("Temperatures", -60.0, 70.0)
    ]
    relative_humidity: Annotated[
        tuple[Number, ...] | None, Field(max_length=20000), fraction("Relative humidity at those times")
    ] = None


SteadyHistory = Annotated[ConstantHistory | RampHistory | DayHistory | SeriesHistory, Field(discriminator="kind")]


class DriftHistory(_History):
    """A room that drifts towards another temperature after its own cooling has stopped."""

    kind: Literal["drift"]
    start_c: Annotated[Quantity, temperature("At the start", -60.0, 70.0)]
    towards: Annotated[SteadyHistory, Ask("Towards")]
    time_constant_h: Annotated[Quantity, hours("Time constant", 0.05, 1000.0)]


TemperatureHistory = Annotated[
    ConstantHistory | RampHistory | DayHistory | SeriesHistory | DriftHistory, Field(discriminator="kind")
]
