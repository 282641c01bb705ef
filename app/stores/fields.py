"""What one field of a definition is: its words, unit and range, and how its number is known.

``Ask`` sits on the pydantic field and drives the form, the API schema, the error text and the printed inputs:
one field, one definition. ``Quantity`` is a number with how it is known.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated, Any, Literal

from pydantic import (
    AfterValidator,
    BaseModel,
    ConfigDict,
    Field,
    GetCoreSchemaHandler,
    GetJsonSchemaHandler,
    model_serializer,
    model_validator,
)
from pydantic_core import PydanticCustomError, core_schema

from app.errors import allowed_range
from app.units import celsius_from_fahrenheit

Known = Literal["measured", "data_sheet", "estimated", "typical"]
"""How a number is known; ``typical`` is the value of a kind of store, not of this one."""


def _without_negative_zero(number: float) -> float:
    """The same number; minus zero, which equals zero and is written otherwise, as zero."""
    return number + 0.0


Number = Annotated[float, Field(strict=True, allow_inf_nan=False), AfterValidator(_without_negative_zero)]
Whole = Annotated[int, Field(strict=True)]


NAME = Field(min_length=1, max_length=80, pattern=r"^[^\x00-\x1f]*[^\x00-\x20][^\x00-\x1f]*$")
"""A name that people read: one line, and not blank."""

KEY = Field(max_length=80)
"""A name of a table."""


class Part(BaseModel):
    """Base of every part of a definition: unknown fields are refused, nothing changes after reading."""

    model_config = ConfigDict(extra="forbid", frozen=True, allow_inf_nan=False)


def _bare_or_object(schema: dict[str, Any]) -> None:
    """Let the JSON schema of a quantity say that a bare number will do."""
    whole = dict(schema)
    schema.clear()
    schema.update(
        {
            "title": whole.pop("title"),
            "description": whole.pop("description"),
            "anyOf": [{"type": "number"}, whole],
        }
    )


class Quantity(Part):
    """A number, given bare or with its spread or with how it is known."""

    model_config = ConfigDict(json_schema_extra=_bare_or_object)

    value: Number
    plus_minus: Annotated[float, Field(strict=True, ge=0.0)] | None = None
    known: Known | None = None

    @model_validator(mode="before")
    @classmethod
    def _bare(cls, given: Any) -> Any:
        if isinstance(given, (int, float)) and not isinstance(given, bool):
            return {"value": given}
        return given

    @model_serializer
    def _short(self) -> Any:
        if self.plus_minus is None and self.known is None:
            return self.value
        parts = {"value": self.value, "plus_minus": self.plus_minus, "known": self.known}
        return {name: part for name, part in parts.items() if part is not None}


@dataclass(frozen=True)
class Ask:
    """The words, unit and range of one field.

    ``words`` is the unit in words for people who listen; ``hint`` helps to find the value.
    """

    label: str
    unit: str = ""
    words: str = ""
    low: float | None = None
    high: float | None = None
    hint: str = ""

    @property
    def allowed(self) -> str:
        """The range in words."""
        return allowed_range(self.unit, self.low, self.high)

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> core_schema.CoreSchema:
        if self.low is None and self.high is None:
            return handler(source)
        return core_schema.no_info_after_validator_function(self._checked, handler(source))

    def __get_pydantic_json_schema__(
        self, schema: core_schema.CoreSchema, handler: GetJsonSchemaHandler
    ) -> dict[str, Any]:
        described: dict[str, Any] = dict(handler(schema))
        words = f"{self.label}. {self.hint}".strip()
        if self.low is not None or self.high is not None:
            words += f" Allowed: {self.allowed}."
            bounds = {"minimum": self.low, "maximum": self.high}
            given = {name: bound for name, bound in bounds.items() if bound is not None}
            if "items" in described:
                described["items"] = described["items"] | given
            else:
                described |= given
        described["description"] = words
        return described

    def _checked(self, given: Any) -> Any:
        """The same value, or the fault of the first number in it that is out of range."""
        numbers = given if isinstance(given, tuple) else (given,)
        for k, part in enumerate(numbers):
            number = part.value if isinstance(part, Quantity) else part
            if number is not None and not self._fits(number):
                which = f", number {k + 1}," if isinstance(given, tuple) else ""
                raise self._out_of_range(which, number)
        return given

    def _out_of_range(self, which: str, number: float) -> PydanticCustomError:
        # a whole number may be larger than any float
        number = float(max(min(number, 1e308), -1e308))
        return PydanticCustomError(
            "out_of_range",
            "{label}{which} is {number}; it must be {allowed}.{slip}",
            {
                "label": self.label,
                "which": which,
                "number": f"{number:g}",
                "allowed": self.allowed,
                "slip": self._slip(number),
            },
        )

    def _fits(self, number: float) -> bool:
        return (self.low is None or number >= self.low) and (self.high is None or number <= self.high)

    def _slip(self, number: float) -> str:
        """The units that the person may have meant."""
        meant = [unit for own, factor, unit in _SLIPS if self.unit == own and self._fits(number * factor)]
        if self.high == 1.0 and self.unit == "" and self._fits(number / 100.0):
            meant.append("per cent")
        if self.unit == "°C" and self._fits(celsius_from_fahrenheit(number)):
            meant.append("°F")
        return f" Did you enter {' or '.join(meant)}?" if meant else ""


_SLIPS = (
    ("m", 0.001, "mm"),
    ("m", 0.01, "cm"),
    ("kg", 0.001, "grams"),
    ("kg/m³", 1000.0, "grams per cubic centimetre"),
    ("J/kg·K", 1000.0, "kilojoules"),
    ("J/kg", 1000.0, "kilojoules"),
    ("h", 1.0 / 60.0, "minutes"),
    ("kWh/day", 0.001, "Wh"),
    ("kWh/day", 1.0 / 365.0, "kWh per year"),
)
