"""A definition's temperature history as the engine's."""

from __future__ import annotations

from app.engine.histories import Constant, Day, Drift, History, Ramp, Series
from app.stores.rooms import TemperatureHistory
from app.units import seconds_from_hours


def history_of(given: TemperatureHistory) -> History:
    """The engine's closed form of a history of a definition: constant, ramp, day, series or drift."""
    if given.kind == "drift":
        towards = history_of(given.towards)
        assert not isinstance(towards, Drift)  # the definition has checked it
        return Drift(given.start_c.value, towards, seconds_from_hours(given.time_constant_h.value))
    if given.kind == "ramp":
        return Ramp(given.from_c.value, given.to_c.value, seconds_from_hours(given.over_h.value))
    if given.kind == "day":
        return Day(
            given.mean_c.value,
            given.swing_k.value,
            seconds_from_hours(given.peak_hour.value),
            seconds_from_hours(given.start_hour.value),
        )
    if given.kind == "series":
        times = tuple(seconds_from_hours(hours) for hours in given.time_h)
        return Series(times, tuple(given.temperature_c))
    return Constant(given.temperature_c.value)
