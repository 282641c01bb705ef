"""The definition's models seen as questions: what kind of control each field needs.

Reads the pydantic models once, so that a field added to the definition appears in the form by itself. Called by
``form_tree`` and ``form_values``.
"""

from __future__ import annotations

import types
from dataclasses import dataclass
from functools import cache
from typing import Annotated, Any, Literal, Union, get_args, get_origin

from pydantic import BaseModel
from pydantic.fields import FieldInfo
from pydantic_core import PydanticUndefined

from app.stores.fields import Ask, Quantity

Kind = Literal[
    "quantity", "number", "whole", "text", "choice", "yes_no", "numbers", "group", "list", "variants", "other"
]


@dataclass(frozen=True)
class Variant:
    """One alternative of a field: a word that stands for itself, or a model."""

    key: str
    model: type[BaseModel] | None


@dataclass(frozen=True)
class Question:
    """One field of a model: its words, the control it needs, and what it holds."""

    name: str
    kind: Kind
    ask: Ask
    required: bool
    default: Any
    words: tuple[str, ...] = ()
    variants: tuple[Variant, ...] = ()

    @property
    def model(self) -> type[BaseModel]:
        """The model of a group, or of the members of a list with one kind of member."""
        model = self.variants[0].model
        assert model is not None  # only variants may be bare words
        return model

    @property
    def selector(self) -> str:
        """Name of the control that chooses between variants: the model's own ``kind``, or the form's ``:way``."""
        models = [variant.model for variant in self.variants if variant.model is not None]
        return "kind" if models and all("kind" in model.model_fields for model in models) else ":way"


@cache
def questions(model: type[BaseModel]) -> tuple[Question, ...]:
    """The fields of a model, in its order; ``kind``, which chooses the model itself, is left out."""
    return tuple(_question(name, field) for name, field in model.model_fields.items() if name != "kind")


def _question(name: str, field: FieldInfo) -> Question:
    ask = next((mark for mark in field.metadata if isinstance(mark, Ask)), None)
    ask = ask or Ask(name.replace("_", " ").capitalize())
    default = None if field.default is PydanticUndefined else field.default
    kind, words, variants = _kind(field.annotation)
    return Question(name, kind, ask, field.is_required(), default, words, variants)


def _kind(annotation: Any) -> tuple[Kind, tuple[str, ...], tuple[Variant, ...]]:
    members = _members(annotation)
    models = [member for member in members if _is_model(member)]
    words = tuple(str(word) for member in members if get_origin(member) is Literal for word in get_args(member))
    if Quantity in models:
        return "quantity", (), ()
    if models and len(models) == len(members) == 1:
        return "group", (), _variants(models)
    if models:
        return "variants", (), tuple(Variant(word, None) for word in words) + _variants(models)
    if words:
        return "choice", words, ()
    (only,) = members
    if get_origin(only) is tuple:
        return _list_kind(get_args(only)[0])
    simple: dict[Any, Kind] = {float: "number", int: "whole", str: "text", bool: "yes_no"}
    return simple.get(only, "other"), (), ()


def _list_kind(annotation: Any) -> tuple[Kind, tuple[str, ...], tuple[Variant, ...]]:
    members = _members(annotation)
    models = [member for member in members if _is_model(member)]
    if models:
        return "list", (), _variants(models)
    return ("numbers" if members == [float] else "other"), (), ()


def _variants(models: list[type[BaseModel]]) -> tuple[Variant, ...]:
    return tuple(Variant(_key(model), model) for model in models)


def _key(model: type[BaseModel]) -> str:
    """The literal of the model's ``kind``, else its name in small letters."""
    kind = model.model_fields.get("kind")
    if kind is not None:
        return str(get_args(kind.annotation)[0])
    return "".join(f"_{letter.lower()}" if letter.isupper() else letter for letter in model.__name__).strip("_")


def _is_model(member: Any) -> bool:
    return isinstance(member, type) and issubclass(member, BaseModel)


def _members(annotation: Any) -> list[Any]:
    """The members of a union, without ``None`` and without what is annotated to them."""
    origin = get_origin(annotation)
    if origin is Annotated:
        return _members(get_args(annotation)[0])
    if origin in (Union, types.UnionType):
        return [member for part in get_args(annotation) for member in _members(part) if member is not types.NoneType]
    return [annotation]
