"""What was typed, as flat names and texts; and the way between that and a definition's document.

A name is the field's path; behind a colon stand ``known`` and ``plus_minus`` of a number, ``way`` of a choice
between alternatives and ``count`` of a list. Nothing typed is ever lost: pages are drawn from these texts.
"""

from __future__ import annotations

import json
import re
from dataclasses import dataclass, field
from typing import Any

from pydantic import BaseModel

from app.errors import FieldFault
from app.stores import StoreDefinition
from app.web.shapes import WAYS, FormField, Shape, fields_of

Typed = dict[str, str]

_NUMBER = re.compile(
    r"^([+-]?\d+(?:[.,]\d*)?(?:[eE][+-]?\d+)?|[+-]?[.,]\d+)\s*[^\d\s].*$|^([+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:[eE][+-]?\d+)?)$"
)
_AMBIGUOUS = re.compile(r"^[+-]?[1-9]\d{0,2},\d{3}$")


def typed_of(document: dict[str, Any]) -> Typed:
    """The texts of a form that shows a document."""
    typed: Typed = {}
    _flatten_group(StoreDefinition, document, "", typed)
    return typed


@dataclass
class Parsed:
    """A document as far as the texts make one, and the faults of texts that are no numbers."""

    document: dict[str, Any]
    faults: list[FieldFault] = field(default_factory=list)


def document_of(typed: Typed) -> Parsed:
    """The document that the texts describe. What was left blank is left out."""
    parsed = Parsed({})
    parsed.document = _group(StoreDefinition, typed, "", parsed.faults) or {}
    inside = parsed.document.get("enclosure", {}).get("inside_m", {})
    if isinstance(inside, dict) and typed.get("enclosure.inside_m:way") == "cylinder":
        parsed.document["enclosure"]["shape"] = "cylinder"
    return parsed


def with_added(typed: Typed, path: str) -> Typed:
    """The texts with one more, empty entry in a list."""
    return typed | {f"{path}:count": str(count_of(typed, path) + 1)}


def without(typed: Typed, path: str, index: int) -> Typed:
    """The texts without one entry of a list; those behind it move up."""
    count = count_of(typed, path)
    kept: Typed = {f"{path}:count": str(max(count - 1, 0))}
    start = f"{path}["
    for name, text in typed.items():
        if not name.startswith(start):
            kept.setdefault(name, text)
            continue
        at, rest = name[len(start) :].split("]", 1)
        if int(at) != index:
            kept[f"{start}{int(at) - (int(at) > index)}]{rest}"] = text
    return kept


def count_of(typed: Typed, path: str) -> int:
    """Number of entries of a list."""
    text = typed.get(f"{path}:count", "0")
    return min(int(text), 500) if text.isdigit() else 0


def number_of(text: str) -> float | str:
    """The number that a person wrote, or what is wrong with it.

    Takes a comma for a point, a unit behind the number, and the true minus sign; asks about 1,500.
    """
    plain = text.strip().replace("\u2212", "-").replace("\u00a0", " ")
    if _AMBIGUOUS.match(plain):
        return f"{text} could mean {plain.replace(',', '.')} or {plain.replace(',', '')}: write it without the comma."
    match = _NUMBER.match(plain)
    if match is None:
        return "must be a number, like 2.5"
    return float((match.group(1) or match.group(2)).replace(",", "."))


def way_of(model: type[BaseModel], typed: Typed, path: str) -> str:
    """Which of the ways of a model is chosen: the one typed, else the first."""
    ways = WAYS[model]
    chosen = typed.get(f"{path}:way", "")
    return chosen if chosen in ways else next(iter(ways))


def asked(model: type[BaseModel], typed: Typed, path: str) -> tuple[FormField, ...]:
    """The fields of a model that the chosen way asks for."""
    if model not in WAYS:
        return fields_of(model)
    ways = WAYS[model]
    chosen = way_of(model, typed, path)
    hidden = {name for way, names in ways.items() if way != chosen for name in names}
    return tuple(one for one in fields_of(model) if one.name not in hidden)


def join(path: str, name: str) -> str:
    """The path of a field of the part at a path."""
    return f"{path}.{name}" if path else name


def _flatten_group(model: type[BaseModel], document: dict[str, Any], path: str, typed: Typed) -> None:
    if model in WAYS:
        given = [way for way, names in WAYS[model].items() if any(document.get(name) is not None for name in names)]
        typed[f"{path}:way"] = given[0] if given else next(iter(WAYS[model]))
    for one in fields_of(model):
        value = document.get(one.name)
        if value is not None:
            _flatten(one.shape, value, join(path, one.name), typed)
    if model is StoreDefinition:
        typed[":given"] = "yes"


def _flatten(shape: Shape, value: Any, path: str, typed: Typed) -> None:
    if shape.kind == "quantity" and isinstance(value, dict):
        typed[path] = _text(value.get("value"))
        typed[f"{path}:known"] = str(value.get("known") or "")
        typed[f"{path}:plus_minus"] = _text(value.get("plus_minus"))
    elif shape.kind == "group" and shape.model is not None and isinstance(value, dict):
        typed[f"{path}:way"] = "given"
        _flatten_group(shape.model, value, path, typed)
    elif shape.kind == "list" and shape.item is not None:
        typed[f"{path}:count"] = str(len(value))
        for index, entry in enumerate(value):
            _flatten(shape.item, entry, f"{path}[{index}]", typed)
    elif shape.kind == "either" and shape.option_of is not None:
        key = shape.option_of(value)
        if key == "named":
            key = str(value)
        typed[f"{path}:way"] = key
        model = next((option.model for option in shape.options if option.key == key), None)
        if model is not None:
            _flatten_group(model, value, path, typed)
    elif shape.kind == "numbers":
        typed[path] = " ".join(_text(number) for number in value)
    elif shape.kind == "carried":
        typed[path] = json.dumps(value)
    elif shape.kind == "flag":
        typed[path] = "yes" if value else "no"
    else:
        typed[path] = _text(value)


def _text(value: Any) -> str:
    if value is None:
        return ""
    return f"{value:.12g}" if isinstance(value, float) else str(value)


def _group(model: type[BaseModel], typed: Typed, path: str, faults: list[FieldFault]) -> dict[str, Any] | None:
    document: dict[str, Any] = {}
    for one in asked(model, typed, path):
        value = _value(one, typed, join(path, one.name), faults)
        if value is not None:
            document[one.name] = value
    return document


def _value(one: FormField, typed: Typed, path: str, faults: list[FieldFault]) -> Any:
    shape = one.shape
    if shape.kind == "list" and shape.item is not None:
        entries = range(count_of(typed, path))
        return [_entry(shape.item, typed, f"{path}[{index}]", faults) for index in entries] or None
    if shape.kind in ("group", "either"):
        if one.is_optional and typed.get(f"{path}:way", "") == "" and one.name not in ("faces", "overall"):
            return None
        return _entry(shape, typed, path, faults)
    return _leaf(one, typed, path, faults)


def _entry(shape: Shape, typed: Typed, path: str, faults: list[FieldFault]) -> Any:
    """A group or an alternative."""
    if shape.kind == "group" and shape.model is not None:
        return _group(shape.model, typed, path, faults)
    key = typed.get(f"{path}:way", "") or shape.options[0].key
    option = next((option for option in shape.options if option.key == key), shape.options[0])
    if option.model is None:
        return option.key
    document = _group(option.model, typed, path, faults) or {}
    if "kind" in option.model.model_fields and option.key != "preset":
        document["kind"] = option.key
    return document


def _leaf(one: FormField, typed: Typed, path: str, faults: list[FieldFault]) -> Any:
    kind, text = one.shape.kind, typed.get(path, "").strip()
    if text == "":
        return None
    if kind in ("text", "choice"):
        return text
    if kind == "flag":
        return text == "yes"
    if kind == "carried":
        return json.loads(text)
    if kind == "numbers":
        return [_number(one, part, path, faults) for part in re.split(r"[\s;]+", text)]
    number = _number(one, text, path, faults)
    if kind == "whole" and isinstance(number, float) and number.is_integer():
        return int(number)
    if kind == "quantity":
        return _quantity(one, number, typed, path, faults)
    return number


def _quantity(one: FormField, number: float | None, typed: Typed, path: str, faults: list[FieldFault]) -> Any:
    known = typed.get(f"{path}:known", "")
    spread_text = typed.get(f"{path}:plus_minus", "").strip()
    if number is None or (known == "" and spread_text == ""):
        return number
    quantity: dict[str, Any] = {"value": number}
    if known:
        quantity["known"] = known
    if spread_text:
        quantity["plus_minus"] = _number(one, spread_text, path, faults)
    return quantity


def _number(one: FormField, text: str, path: str, faults: list[FieldFault]) -> float | None:
    number = number_of(text)
    if isinstance(number, float):
        return number
    words = number if number.startswith(text) else f"{one.ask.label} {number}."
    faults.append(FieldFault(path, words, text, one.ask.allowed))
    return None
