"""Everything that Stillcold itself raises.

AppError
├── InputOutOfRange      a number outside what a relation or a field allows
├── UnknownKey           a name that is in no table, with the nearest ones
├── NotYet               a field of the contract that this version does not work out yet
├── DefinitionRefused    a store definition with one or more faults, all of them listed
├── TableFault           a reference table that fails its own checks when it is loaded
├── SolverStopped        a run that did not reach its end
├── EnergyNotConserved   a run whose heat does not add up
└── TooBusy              the queue of questions is full; ask again later

Physics and engine raise; the API and the pages translate, in one handler each.
"""

from __future__ import annotations

from dataclasses import dataclass


class AppError(Exception):
    """Base of every error of this program; its text is fit to be shown to a person."""


class InputOutOfRange(AppError):
    """A number outside what is allowed: says which, what was given and what is allowed."""

    def __init__(self, name: str, value: float, unit: str, low: float | None, high: float | None) -> None:
        self.name, self.value, self.unit, self.low, self.high = name, value, unit, low, high
        super().__init__(f"{name} is {value:g} {unit}".rstrip() + f"; allowed: {allowed_range(unit, low, high)}.")


def allowed_range(unit: str, low: float | None, high: float | None) -> str:
    """Say a range in words, with its unit: "0.005 to 0.5 m", "at least 0 K", "any number"."""
    tail = f" {unit}" if unit else ""
    if low is not None and high is not None:
        return f"{_plain(low)} to {_plain(high)}{tail}"
    if low is not None:
        return f"at least {_plain(low)}{tail}"
    if high is not None:
        return f"at most {_plain(high)}{tail}"
    return "any finite number"


def _plain(number: float) -> str:
    """A number without an exponent, as people write it."""
    text = f"{number:g}"
    return f"{number:.9f}".rstrip("0").rstrip(".") if "e" in text else text


class UnknownKey(AppError):
    """A name that is in no table: says which table and which names come nearest."""

    def __init__(self, kind: str, key: str, nearest: tuple[str, ...]) -> None:
        self.kind, self.key, self.nearest = kind, key, nearest
        hint = f" Nearest: {', '.join(nearest)}." if nearest else ""
        super().__init__(f"There is no {kind} called {key!r}.{hint}")


@dataclass(frozen=True)
class FieldFault:
    """One fault of one field of a definition, in the words of the form and of the API.

    ``field`` is the path, like ``contents[1].mass_kg``; ``given`` what was given; ``allowed`` what is.
    """

    field: str
    message: str
    given: object
    allowed: str


class DefinitionRefused(AppError):
    """A definition with faults; ``faults`` lists all of them, in the order of the form."""

    def __init__(self, faults: tuple[FieldFault, ...]) -> None:
        self.faults = faults
        super().__init__("; ".join(f"{fault.field}: {fault.message}" for fault in faults))


class NotYet(AppError):
    """A field of the contract that is not worked out yet."""

    def __init__(self, field: str, what: str) -> None:
        self.field, self.what = field, what
        super().__init__(f"{field}: {what} is not worked out yet.")


class TableFault(AppError):
    """A reference table that fails its checks: names the file, the row and the column."""

    def __init__(self, file: str, row: int, message: str) -> None:
        self.file, self.row = file, row
        super().__init__(f"{file}, row {row}: {message}")


class SolverStopped(AppError):
    """A run that did not reach its end: the time it reached, and why it stopped."""

    def __init__(self, reached_s: float, reason: str) -> None:
        self.reached_s, self.reason = reached_s, reason
        super().__init__(f"The run stopped at {reached_s:.0f} s: {reason}.")


class EnergyNotConserved(AppError):
    """A run whose heat in, heat stored and heat moved do not agree."""

    def __init__(self, closure_error_fraction: float, limit_fraction: float) -> None:
        self.closure_error_fraction, self.limit_fraction = closure_error_fraction, limit_fraction
        super().__init__(
            f"The heat of this run does not add up: error {closure_error_fraction:.1e} of the heat that "
            f"moved; at most {limit_fraction:.0e} is allowed. The run was refused."
        )


class TooBusy(AppError):
    """More questions are waiting than the machine can answer soon."""

    def __init__(self, retry_after_s: int) -> None:
        self.retry_after_s = retry_after_s
        super().__init__(f"Too many questions are waiting. Try again in {retry_after_s} s.")
