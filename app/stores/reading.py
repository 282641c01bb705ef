"""Read a definition: every fault at once, each with its field, what was given and what is allowed.

``read_definition`` is the only way into a ``StoreDefinition``; faults of single fields come first, and when
there are none, what does not fit together (``together``).
"""

from __future__ import annotations

import difflib
import hashlib
import json
from typing import Any, cast, get_args

from pydantic import BaseModel, ValidationError
from pydantic_core import ErrorDetails

from app.errors import DefinitionRefused, FieldFault
from app.stores.definition import StoreDefinition
from app.stores.fields import Ask
from app.stores.together import faults_together

_NUMBER_ERRORS = {"model_type", "float_type", "float_parsing", "model_attributes_type"}
_WHOLE_ERRORS = {"int_type", "int_parsing", "int_from_float"}


def read_definition(document: object) -> StoreDefinition:
    """The checked definition of a JSON document.

    Raises ``DefinitionRefused`` with every fault that was found.
    """
    try:
        definition = StoreDefinition.model_validate(document)
    except ValidationError as refused:
        faults = [_fault(document, error) for error in refused.errors(include_url=False)]
        raise DefinitionRefused(tuple(dict.fromkeys(_without_echoes(faults)))) from refused
    except RecursionError as refused:
        raise DefinitionRefused(
            (FieldFault("", "The document is nested too deeply.", "", "a definition"),)
        ) from refused
    faults = faults_together(definition)
    if faults:
        raise DefinitionRefused(tuple(faults))
    return definition


def definition_document(definition: StoreDefinition) -> dict[str, Any]:
    """The JSON document of a definition, without what is left at its default."""
    document: dict[str, Any] = definition.model_dump(mode="json", exclude_none=True, exclude_defaults=True)
    document["definition_version"] = definition.definition_version
    for limits in [document.get("air_limits", []), *(c.get("limits", []) for c in document["contents"])]:
        for limit in limits:
            if "preset" not in limit:
                continue
            limit.pop("kind", None)
    return document


def fingerprint(definition: StoreDefinition, options: dict[str, Any], engine_version: str) -> str:
    """SHA-256 of the question: definition, options and engine, as canonical JSON."""
    question = {
        "definition": definition.model_dump(mode="json"),
        "options": options,
        "engine_version": engine_version,
    }
    text = json.dumps(question, sort_keys=True, separators=(",", ":"), ensure_ascii=False)
    return hashlib.sha256(text.encode()).hexdigest()


def _fault(document: object, error: ErrorDetails) -> FieldFault:
    path, given = _place(document, error)
    name = path.rsplit(".", 1)[-1].split("[")[0]
    ask = _ask_at(error["loc"])
    label = ask.label if ask else name.replace("_", " ").capitalize() or "The document"
    allowed = ask.allowed if ask else ""
    return FieldFault(path, _message(error, label, name, ask), _shown(given), _allowed(error, allowed))


def _place(document: object, error: ErrorDetails) -> tuple[str, object]:
    """Path of the field in the document, without the names of alternatives, and what stands there."""
    node, path = document, ""
    loc = error["loc"]
    for index, part in enumerate(loc):
        last = index + 1 == len(loc)
        if isinstance(part, int) and isinstance(node, (list, tuple)) and part < len(node):
            node, path = node[part], f"{path}[{part}]"
        elif isinstance(node, dict) and part in node:
            node, path = node[part], f"{path}.{part}"
        elif last and isinstance(node, dict) and error["type"] == "missing":
            node, path = None, f"{path}.{part}"
    return path.lstrip("."), None if error["type"] == "missing" else node


def _message(error: ErrorDetails, label: str, name: str, ask: Ask | None) -> str:
    kind = error["type"]
    if kind == "out_of_range":
        return error["msg"]
    if kind == "missing":
        return f"{label} is missing."
    if kind == "extra_forbidden":
        nearest = difflib.get_close_matches(name, _FIELD_NAMES, n=3)
        hint = f" Nearest: {', '.join(nearest)}." if nearest else ""
        return f"There is no field called {name!r} here.{hint}"
    if kind == "finite_number":
        return f"{label} must be a finite number, like 2.5."
    if kind in _WHOLE_ERRORS:
        return f"{label} must be a whole number, like 3."
    if kind in _NUMBER_ERRORS and ask is not None and (ask.unit or ask.low is not None):
        return f"{label} must be a number, like 2.5."
    if kind in ("union_tag_invalid", "union_tag_not_found", "literal_error"):
        return f"{label} must be one of {_choices(error)}."
    if kind in ("too_short", "too_long", "string_too_short", "string_too_long", "greater_than_equal"):
        return f"{label}: {error['msg'][0].lower()}{error['msg'][1:]}."
    if kind in _NUMBER_ERRORS or kind in ("tuple_type", "dict_type", "string_type", "bool_type"):
        return f"{label} is not of the right kind: {error['msg'][0].lower()}{error['msg'][1:]}."
    return f"{label}: {error['msg']}."


def _choices(error: ErrorDetails) -> str:
    context = error.get("ctx", {})
    text = str(context.get("expected", context.get("expected_tags", ""))).replace("tag:", "")
    return text or "the kinds that the contract names"


def _allowed(error: ErrorDetails, allowed: str) -> str:
    context = error.get("ctx", {})
    if "allowed" in context:
        return str(context["allowed"])
    if "expected" in context or "expected_tags" in context:
        return _choices(error)
    return allowed


def _shown(given: object) -> object:
    """What was given, fit for a JSON answer: short, and without numbers that JSON has no word for."""
    if isinstance(given, float) and given not in (float("inf"), float("-inf")) and given == given:
        return given
    if given is None or isinstance(given, (bool, int)):
        return given
    text = given if isinstance(given, str) else repr(given)
    return text if len(text) <= 80 else text[:77] + "..."


def _without_echoes(faults: list[FieldFault]) -> list[FieldFault]:
    """Without "too short" of a list whose own members have faults: the reader counts only what is whole."""
    paths = [fault.field for fault in faults]
    return [
        fault
        for fault in faults
        if not ("should have at least" in fault.message and any(p.startswith(fault.field + "[") for p in paths))
    ]


def _ask_at(loc: tuple[int | str, ...]) -> Ask | None:
    """The ask of the field at a place in the models, on the alternative that the place names."""
    models, ask = [cast(type[BaseModel], StoreDefinition)], None
    for part in loc:
        if isinstance(part, int):
            continue
        fields = [model.model_fields[part] for model in models if part in model.model_fields]
        if not fields:
            # not a field but the name of an alternative
            models = [model for model in models if _is_kind(model, part)] or models
            continue
        ask = next((mark for field in fields for mark in field.metadata if isinstance(mark, Ask)), None)
        models = [model for field in fields for model in _models_in(field.annotation)]
    return ask


def _is_kind(model: type[BaseModel], tag: str) -> bool:
    kind = model.model_fields.get("kind")
    return kind is not None and tag in get_args(kind.annotation)


def _models_in(annotation: Any) -> list[type[BaseModel]]:
    """All models that an annotation mentions."""
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return [annotation]
    return [model for part in get_args(annotation) for model in _models_in(part)]


def _all_field_names() -> frozenset[str]:
    names: set[str] = set()
    waiting, seen = [cast(type[BaseModel], StoreDefinition)], set()
    while waiting:
        model = waiting.pop()
        seen.add(model)
        for name, field in model.model_fields.items():
            names.add(name)
            waiting += [inner for inner in _models_in(field.annotation) if inner not in seen]
    return frozenset(names)


_FIELD_NAMES = _all_field_names()
