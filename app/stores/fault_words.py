"""Faults of single fields in the words of the form: which field, what was given, what is allowed, what may be meant.

Pydantic says where it stumbled and over what kind of thing; the field's own label and range come from its ``Ask``,
found by walking the models along the same way. Called by ``reading``.
"""

from __future__ import annotations

import difflib
import reprlib
import types
from dataclasses import dataclass, field
from typing import Annotated, Any, Literal, Union, get_args, get_origin

from annotated_types import MaxLen
from pydantic import BaseModel, Tag
from pydantic_core import ErrorDetails

from app.errors import FieldFault
from app.stores.definition import StoreDefinition
from app.stores.fields import Ask, Quantity

_LONGEST_SHOWN = 80


@dataclass
class _Place:
    """Where the walk along an error has come: the field, its words, and what stands there in the document."""

    given: object
    annotation: Any = StoreDefinition
    ask: Ask = field(default_factory=lambda: Ask("The document"))
    path: str = ""
    part: str = ""
    siblings: tuple[str, ...] = ()
    longest: int | None = None

    @property
    def label(self) -> str:
        """The field's label; of a part of a quantity, with the part."""
        return f"{self.ask.label}{self.part}"

    def step(self, part: str | int) -> None:
        """Go on by one part of an error's place: a member of a list, an alternative, or a field."""
        if isinstance(part, int):
            self._enter_member(part)
            return
        alternative = _alternatives(self.annotation).get(part)
        if alternative is not None:
            self.annotation = alternative
            return
        if _is_quantity(self.annotation):
            self._enter_part(part)
            return
        models = _models(self.annotation)
        self.siblings = tuple(name for model in models for name in model.model_fields)
        known = next((model.model_fields[part] for model in models if part in model.model_fields), None)
        self.path = f"{self.path}.{part}".lstrip(".")
        self.given = _below(self.given, part)
        self.part, self.annotation = "", known.annotation if known else None
        marks = known.metadata if known else []
        self.ask = next((mark for mark in marks if isinstance(mark, Ask)), Ask(part.replace("_", " ").capitalize()))
        self.longest = next((mark.max_length for mark in marks if isinstance(mark, MaxLen)), None)

    def _enter_member(self, number: int) -> None:
        self.path += f"[{number}]"
        self.given = _below(self.given, number)
        self.annotation = next((get_args(one)[0] for one in _members(self.annotation) if _is_list(one)), None)
        if not _models(self.annotation):
            self.part = f", number {number + 1},"

    def _enter_part(self, part: str) -> None:
        """Into a quantity: its value is the field itself, the rest has a name of its own."""
        if isinstance(self.given, dict):
            self.given = self.given.get(part)
        if part == "value":
            return
        self.path += f".{part}"
        self.siblings = tuple(Quantity.model_fields)
        known = Quantity.model_fields.get(part)
        self.part = {"plus_minus": ", plus or minus,", "known": ", how it is known,"}.get(part, "")
        self.annotation = known.annotation if known else None
        self.ask = Ask(self.ask.label, self.ask.unit, self.ask.words, 0.0 if part == "plus_minus" else None)

    def enter_kind(self) -> None:
        """To the word that chooses between alternatives, where it is this word that is wrong."""
        self.path += ".kind"
        self.given = _below(self.given, "kind")


def field_fault(document: object, error: ErrorDetails) -> FieldFault:
    """One fault that pydantic found in a document."""
    place = _Place(document)
    for part in error["loc"]:
        place.step(part)
    kind = error["type"]
    if kind in ("union_tag_invalid", "union_tag_not_found") and isinstance(place.given, dict):
        place.enter_kind()
    given = None if kind == "missing" else shown(place.given)
    return FieldFault(place.path, _message(error, place), given, _allowed(place, kind))


def shown(given: object) -> object:
    """What was given, fit for a JSON answer: short, and without numbers that JSON has no word for."""
    if isinstance(given, float) and given not in (float("inf"), float("-inf")) and given == given:
        return given
    if given is None or isinstance(given, bool) or (isinstance(given, int) and abs(given) < 10**16):
        return given
    if isinstance(given, str):
        text = given.encode("utf-8", "replace").decode("utf-8")
    else:
        text = _SHORT.repr(given)
    return text if len(text) <= _LONGEST_SHOWN else text[: _LONGEST_SHOWN - 3] + "..."


class _Short(reprlib.Repr):
    """Short texts of long things, also of whole numbers too long to be written out."""

    def repr_int(self, x: int, level: int) -> str:
        return super().repr_int(x, level) if abs(x) < 10**100 else "a very long number"


_SHORT = _Short()


def _message(error: ErrorDetails, place: _Place) -> str:
    kind = error["type"]
    if kind == "out_of_range":
        return error["msg"]
    if kind == "missing":
        return f"{place.label} is missing."
    if kind in ("extra_forbidden", "invalid_key"):
        return _unknown(error, place)
    if kind == "greater_than_equal":
        return f"{place.label} must be 0 or more."
    if kind == "finite_number":
        return f"{place.label} must be a finite number, like 2.5."
    if kind in ("too_short", "too_long"):
        return _wrong_count(error, place)
    if kind.startswith("string_"):
        return f"{place.label} must be {_text(place)}."
    return f"{place.label} must be {_wanted(place)}."


def _unknown(error: ErrorDetails, place: _Place) -> str:
    name = str(error["loc"][-1])
    nearest = difflib.get_close_matches(name, place.siblings, n=3)
    hint = f" Nearest: {', '.join(nearest)}." if nearest else ""
    return f"There is no field called {shown(name)!r} here.{hint}"


def _wrong_count(error: ErrorDetails, place: _Place) -> str:
    context = error.get("ctx", {})
    if error["type"] == "too_short":
        least = context["min_length"]
        return f"{place.label}: give at least {'one' if least == 1 else least}."
    return f"{place.label}: at most {context['max_length']} are possible."


def _wanted(place: _Place) -> str:
    """What the field takes, in words that end a sentence."""
    members = _members(place.annotation)
    words = _choices(place)
    if words:
        fields = " or ".join("{" + ", ".join(model.model_fields) + "}" for model in _models(place.annotation))
        other = f", or an object: {fields}" if fields and not place.path.endswith(".kind") else ""
        return f"one of {', '.join(words)}{other}"
    if _is_quantity(place.annotation) or float in members:
        return "a number, like 2.5"
    if int in members:
        return "a whole number, like 3"
    if bool in members:
        return "true or false"
    if str in members:
        return _text(place)
    if any(_is_list(member) for member in members):
        return "a list"
    return "an object with named fields"


def _text(place: _Place) -> str:
    return "text" if place.longest is None else f"one line of text, 1 to {place.longest} characters"


def _allowed(place: _Place, kind: str) -> str:
    """What the field takes, for a table of faults."""
    if kind in ("extra_forbidden", "invalid_key"):
        return f"one of {', '.join(place.siblings)}"
    members = _members(place.annotation)
    if _is_quantity(place.annotation) or float in members or int in members or place.ask.low is not None:
        return place.ask.allowed
    words = _choices(place)
    if words:
        return ", ".join(words)
    if place.longest is not None and any(_is_list(member) for member in members):
        return f"a list, at most {place.longest} long"
    return _wanted(place)


def _choices(place: _Place) -> tuple[str, ...]:
    """Words that the field can be: its own, or the kinds of its alternatives."""
    if place.path.endswith(".kind"):
        return tuple(_alternatives(place.annotation))
    literals = (one for one in _members(place.annotation) if get_origin(one) is Literal)
    return tuple(str(word) for one in literals for word in get_args(one))


def _alternatives(annotation: Any) -> dict[str, Any]:
    """Alternatives of a field that pydantic tells apart by a tag or by their ``kind``, by that word."""
    found: dict[str, Any] = {}
    members = _tagged(annotation)
    if len(members) < 2:
        return found
    for tag, member in members:
        kind = member.model_fields.get("kind") if _is_model(member) else None
        name = tag or (get_args(kind.annotation)[0] if kind is not None else None)
        if name is not None:
            found[name] = member
    return found


def _tagged(annotation: Any, tag: str | None = None) -> list[tuple[str | None, Any]]:
    """The members of a union, each with its tag; without ``None``."""
    origin = get_origin(annotation)
    if origin is Annotated:
        inner, *marks = get_args(annotation)
        return _tagged(inner, next((mark.tag for mark in marks if isinstance(mark, Tag)), tag))
    if origin in (Union, types.UnionType):
        return [pair for part in get_args(annotation) for pair in _tagged(part, tag)]
    return [] if annotation in (None, types.NoneType) else [(tag, annotation)]


def _members(annotation: Any) -> list[Any]:
    return [member for _, member in _tagged(annotation)]


def _models(annotation: Any) -> list[type[BaseModel]]:
    return [member for member in _members(annotation) if _is_model(member)]


def _is_model(member: Any) -> bool:
    return isinstance(member, type) and issubclass(member, BaseModel)


def _is_list(member: Any) -> bool:
    return get_origin(member) is tuple


def _is_quantity(annotation: Any) -> bool:
    return Quantity in _members(annotation)


def _below(given: object, part: str | int) -> object:
    if isinstance(given, dict):
        return given.get(part)
    if isinstance(given, (list, tuple)) and isinstance(part, int) and part < len(given):
        return given[part]
    return None
