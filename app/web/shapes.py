"""What the form of a definition looks like, read off the definition's own fields.

One field, one definition: labels, units, ranges and alternatives come from the pydantic models; here they are
sorted into the few kinds of control that a page has. Used by ``form_data`` (what was typed) and ``form_view``.
"""

from __future__ import annotations

import types
from collections.abc import Callable
from dataclasses import dataclass
from functools import cache
from typing import Annotated, Any, Literal, Union, get_args, get_origin

from pydantic import BaseModel, Discriminator, Tag

from app.reference import coolant_materials, foods, limit_presets, materials
from app.stores.definition import Contents, Enclosure, Face, Layer
from app.stores.fields import Ask, Quantity

Kind = Literal["quantity", "number", "whole", "text", "choice", "flag", "numbers", "group", "list", "either", "carried"]


@dataclass(frozen=True)
class Option:
    """One alternative: its key, and the model that it asks for, or none when the key itself is the value."""

    key: str
    model: type[BaseModel] | None


@dataclass(frozen=True)
class Shape:
    """The kind of control of one field, and what it needs: model, item, alternatives or choices."""

    kind: Kind
    model: type[BaseModel] | None = None
    item: Shape | None = None
    options: tuple[Option, ...] = ()
    choices: tuple[str, ...] = ()
    option_of: Callable[[Any], str] | None = None


@dataclass(frozen=True)
class FormField:
    """One field of a model: name, words, control, and whether it may be left out."""

    name: str
    ask: Ask
    shape: Shape
    is_optional: bool
    default: Any


WAYS: dict[type[BaseModel], dict[str, tuple[str, ...]]] = {
    Enclosure: {"faces": ("faces",), "overall": ("overall",)},
    Face: {"layers": ("layers", "films_w_per_m2_k"), "u_value": ("u_w_per_m2_k",)},
    Layer: {
        "material": ("material",),
        "own": ("conductivity_w_per_m_k", "density_kg_per_m3", "specific_heat_j_per_kg_k"),
    },
    Contents: {
        "food": ("food",),
        "composition": ("composition", "initial_freezing_c"),
        "substance": ("substance", "freezing_c"),
    },
}
"""Ways of giving the same thing: of each model, the names of the ways and the fields that belong to each."""

LABELS = {
    "faces": "Walls, ceiling and floor",
    "overall": "One figure for the whole store",
    "layers": "Layers",
    "u_value": "U-value",
    "material": "Material of the table",
    "own": "Own values",
    "food": "Food of the table",
    "composition": "Food by its composition",
    "substance": "Water, medicine or other",
    "heat_leak": "Heat leak",
    "k_value": "K-value",
    "energy_use": "Energy use",
    "rise_time": "Temperature-rise time",
    "room": "The room",
    "outdoors": "Outdoors",
    "ground": "The ground (not yet)",
    "fixed": "A fixed temperature",
    "box": "Box",
    "cylinder": "Upright cylinder",
    "water": "Water",
    "aqueous": "Watery solution, medicine, blood",
    "plain": "Other, without melting",
    "curve": "Other, by a measured enthalpy curve",
    "packs": "Single packs",
    "cartons": "Cartons in blocks",
    "pallet": "Pallets",
    "carcass": "Hanging carcasses",
    "bottles": "Standing bottles",
    "bulk": "Loose in one heap or bin",
    "exposed": "By area and depth",
    "preset": "Published limit",
    "above": "Not warmer than",
    "below": "Not colder than",
    "mean_kinetic": "Mean kinetic temperature",
    "thawed": "Share melted",
    "growth": "Growth (not yet)",
    "constant": "One temperature",
    "ramp": "Even change",
    "day": "Day swing",
    "series": "Series of temperatures",
    "drift": "Drifts after its cooling stops",
    "walls": "Walls",
    "ceiling": "Ceiling",
    "floor": "Floor",
    "warmest": "Warmest point",
    "mean": "Mean",
    "coldest": "Coldest point",
    "top": "Top (not yet)",
    "middle": "Middle",
    "bottom": "Bottom (not yet)",
    "measured": "measured",
    "data_sheet": "data sheet",
    "estimated": "estimated",
    "typical": "typical",
}
"""Words for keys that stand in the contract."""

_NOT_ASKED = {"shape", "definition_version", "kind", "added_at_h", "wrapping_w_per_k", "curtain_effectiveness"}
"""Set by another field, or not worked out yet."""

_ROWS: dict[str, Callable[[], tuple[Any, ...]]] = {
    "material": materials,
    "food": foods,
    "test_load_food": foods,
    "coolant": coolant_materials,
    "preset": limit_presets,
}


@cache
def fields_of(model: type[BaseModel]) -> tuple[FormField, ...]:
    """The fields of a model that the form asks for, in order."""
    found = []
    for name, field in model.model_fields.items():
        if name in _NOT_ASKED:
            continue
        ask = next((mark for mark in field.metadata if isinstance(mark, Ask)), Ask(LABELS.get(name, name)))
        discriminator = field.discriminator
        shape = _shape(field.annotation, _chooser(discriminator) if discriminator else None)
        found.append(FormField(name, ask, shape, not field.is_required(), field.get_default()))
    return tuple(found)


def table_choices(name: str) -> tuple[tuple[str, str], ...] | None:
    """Keys and labels of the table that a field chooses from; none for other fields."""
    rows = _ROWS.get(name)
    return None if rows is None else tuple((row.key, row.label) for row in rows())


def _shape(annotation: Any, choose: Callable[[Any], str] | None = None) -> Shape:
    base, marks = _stripped(annotation)
    for mark in marks:
        if isinstance(mark, Discriminator):
            choose = _chooser(mark.discriminator)
    origin = get_origin(base)
    if origin in (Union, types.UnionType):
        members = [part for part in get_args(base) if part is not types.NoneType]
        if len(members) == 1:
            return _shape(members[0], choose)
        if choose is None:
            return Shape("carried")
        return Shape("either", options=tuple(o for part in members for o in _options(part)), option_of=choose)
    if origin is Literal:
        return Shape("choice", choices=tuple(str(value) for value in get_args(base)))
    if origin is tuple:
        item = get_args(base)[0]
        if _stripped(item)[0] is float:
            return Shape("numbers")
        inner = _shape(item)
        return Shape("carried") if inner.kind == "carried" else Shape("list", item=inner)
    return _plain_shape(base)


def _plain_shape(base: Any) -> Shape:
    if isinstance(base, type) and issubclass(base, Quantity):
        return Shape("quantity")
    if isinstance(base, type) and issubclass(base, BaseModel):
        return Shape("group", model=base)
    kinds: dict[Any, Kind] = {float: "number", int: "whole", str: "text", bool: "flag"}
    return Shape(kinds.get(base, "carried"))


def _stripped(annotation: Any) -> tuple[Any, list[Any]]:
    marks: list[Any] = []
    while get_origin(annotation) is Annotated:
        annotation, *more = get_args(annotation)
        marks += more
    return annotation, marks


def _options(member: Any) -> list[Option]:
    base, marks = _stripped(member)
    if get_origin(base) is Literal:
        return [Option(str(value), None) for value in get_args(base)]
    tag = next((mark.tag for mark in marks if isinstance(mark, Tag)), None)
    if tag is None:
        tag = get_args(base.model_fields["kind"].annotation)[0]
    return [Option(tag.removeprefix("tag:"), base)]


def _chooser(discriminator: Any) -> Callable[[Any], str]:
    """Which option a value of a document is: by its named field, or by the contract's own rule."""

    def option(value: Any) -> str:
        if isinstance(value, str):
            return value
        if isinstance(discriminator, str):
            return str(value.get(discriminator, ""))
        return str(discriminator(value) or "").removeprefix("tag:")

    return option
