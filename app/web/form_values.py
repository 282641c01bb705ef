"""Between the form and the definition: a document spread out into typed texts, and texts gathered into a document.

What the form has no field for is carried along as JSON, so that opening and saving a definition loses nothing.
"""

from __future__ import annotations

import json
from collections.abc import Mapping
from typing import Any

from pydantic import BaseModel

from app.errors import FieldFault
from app.stores import StoreDefinition
from app.web.form_tree import Control, Group, Listing, Node
from app.web.form_words import LINKED, WAYS, Way
from app.web.numbers import read_number
from app.web.schema import Question, Variant, questions
from app.web.typed import Typed, join

_ABSENT: Any = object()

_QUANTITY = ("value", "plus_minus", "known")


def typed_of(document: Mapping[str, Any]) -> Typed:
    """The texts of a form that says what a document says."""
    root = Typed()
    _spread_model(StoreDefinition, dict(document), root, "")
    return root


def document_of(root: Group) -> tuple[dict[str, Any], tuple[FieldFault, ...]]:
    """The document that a form says, and the faults of texts that cannot be read."""
    faults: list[FieldFault] = []
    document = _group_value(root, faults)
    return (document if isinstance(document, dict) else {}), tuple(faults)


def number_text(value: float) -> str:
    """A number as the form shows it: exact, without a needless point."""
    return str(int(value)) if float(value).is_integer() and abs(value) < 1e15 else repr(float(value))


def _spread_model(model: type[BaseModel], document: dict[str, Any], root: Typed, path: str) -> None:
    """Spread one object; fields that fit no control are carried."""
    ways = WAYS.get(model.__name__)
    way = max(ways.ways, key=lambda one: _fit(one, model, document)) if ways else None
    if way is not None:
        root.put(f"{path}:way", way.key)
    carried = {}
    known = {question.name: question for question in questions(model)}
    for name, value in document.items():
        if name == "kind" or value is None or (name == "definition_version" and value == 1):
            continue
        if way and name in way.fixed and way.fixed[name] == value:
            continue
        question = known.get(name)
        is_hidden = ways is not None and way is not None and name in ways.names and name not in way.fields
        if question is None or is_hidden or not _spread(question, value, root, join(path, name), document):
            carried[name] = value
    if carried:
        root.put(f"{path}:json", json.dumps(carried, ensure_ascii=False, indent=1))


def _fit(way: Way, model: type[BaseModel], document: dict[str, Any]) -> int:
    """How well a way suits a document: fields that it has, or nothing where it contradicts."""
    if any(document.get(name) != value for name, value in way.fixed.items()):
        return -1
    for question in questions(model):
        wanted = way.variant.get(question.name)
        given = document.get(question.name)
        if wanted and (given is None or _variant_of(question, given) != wanted):
            return -1
    return sum(name in document for name in (*way.fields, *way.fixed))


def _spread(question: Question, value: Any, root: Typed, path: str, siblings: dict[str, Any]) -> bool:
    """Spread one field; says whether the form could take it."""
    if question.kind == "list":
        if not isinstance(value, list) or not all(isinstance(item, dict) for item in value):
            return False
        for number, item in enumerate(value):
            root.put(f"{path}[{number}]:item", "")
            _spread_member(question, item, root, join(path, number), "")
        return True
    if question.kind in ("group", "variants"):
        linked = LINKED.get(question.name)
        key = linked[1].get(siblings.get(linked[0], ""), next(iter(linked[1].values()))) if linked else ""
        return _spread_member(question, value, root, path, key)
    return _spread_leaf(question, value, root, path)


def _spread_member(question: Question, value: Any, root: Typed, path: str, forced: str) -> bool:
    words = {variant.key for variant in question.variants if variant.model is None}
    if isinstance(value, str) and value in words:
        root.put(f"{path}:way", value)
        return True
    if not isinstance(value, dict):
        return False
    key = forced or _variant_of(question, value)
    variant = next((one for one in question.variants if one.key == key), None)
    if len(question.variants) > 1 and not forced:
        root.put(join(path, question.selector), key)
    if variant is None or variant.model is None:
        root.put(f"{path}:json", json.dumps({k: v for k, v in value.items() if k != "kind"}, ensure_ascii=False))
        return True
    if not question.required:
        root.put(f"{path}:item", "")
    _spread_model(variant.model, value, root, path)
    return True


def _variant_of(question: Question, value: Any) -> str:
    """Key of the variant that a value is: by its kind, else by the fields that it has."""
    if not isinstance(value, dict):
        return str(value)
    if isinstance(value.get("kind"), str):
        return str(value["kind"])

    def shared(variant: Variant) -> int:
        return -1 if variant.model is None else len(set(value) & set(variant.model.model_fields))

    return max(question.variants, key=shared).key


def _spread_leaf(question: Question, value: Any, root: Typed, path: str) -> bool:
    if question.kind == "quantity" and isinstance(value, dict):
        if not set(value) <= set(_QUANTITY) or any(isinstance(part, (dict, list)) for part in value.values()):
            return False
        for name in _QUANTITY:
            if value.get(name) is not None:
                root.put(path if name == "value" else f"{path}.{name}", _text(value[name]))
        return "value" in value
    if question.kind == "numbers" and isinstance(value, list):
        if any(isinstance(number, (dict, list, bool)) for number in value):
            return False
        root.put(path, "\n".join(_text(number) for number in value))
        return True
    if question.kind == "yes_no":
        root.put(path, "yes" if value is True else "no")
        return isinstance(value, bool)
    if isinstance(value, (dict, list, bool)):
        return False
    root.put(path, _text(value))
    return True


def _text(value: Any) -> str:
    return number_text(value) if isinstance(value, float) else str(value)


def _group_value(group: Group, faults: list[FieldFault]) -> Any:
    if group.word:
        return group.word
    document: dict[str, Any] = dict(_carried(group, faults))
    for node in (*group.nodes, *group.folded):
        value = _value(node, faults)
        if value is not _ABSENT:
            document[node.name] = value
    document.update(group.fixed)
    return document


def _carried(group: Group, faults: list[FieldFault]) -> dict[str, Any]:
    if not group.carried.strip():
        return {}
    try:
        carried = json.loads(group.carried, parse_constant=str)
    except (ValueError, RecursionError):
        carried = None
    if isinstance(carried, dict):
        return carried
    message = "What was carried over from the file is not a JSON object any more."
    faults.append(FieldFault(f"{group.path}:json", message, group.carried[:80], "a JSON object, or nothing"))
    return {}


def _value(node: Node, faults: list[FieldFault]) -> Any:
    if isinstance(node, Group):
        return _group_value(node, faults)
    if isinstance(node, Listing):
        if node.is_single:
            return _group_value(node.items[0], faults) if node.items else _ABSENT
        return [_group_value(item, faults) for item in node.items] if node.items else _ABSENT
    if node.name.startswith(":") or not node.value.strip():
        return _ABSENT
    return _control_value(node, faults)


def _control_value(control: Control, faults: list[FieldFault]) -> Any:
    text = control.value.strip()
    if control.kind == "choice" and {option.value for option in control.options} == {"yes", "no"}:
        return text == "yes"
    if control.kind == "numbers":
        words = text.replace(";", " ").split()
        return [_number(control, control.path, word, faults) for word in words]
    if control.kind not in ("quantity", "number", "whole"):
        return text
    number = _number(control, control.path, text, faults)
    if control.kind == "whole":
        return int(number) if isinstance(number, float) and number.is_integer() else number
    if control.kind == "number" or not (control.plus_minus.strip() or control.known):
        return number
    quantity = {"value": number, "known": control.known or None}
    if control.plus_minus.strip():
        quantity["plus_minus"] = _number(control, f"{control.path}.plus_minus", control.plus_minus, faults)
    return {name: part for name, part in quantity.items() if part is not None}


def _number(control: Control, path: str, text: str, faults: list[FieldFault]) -> float | str:
    """The number of a text, or the text with a fault of its own."""
    label = f"± of {control.label}" if path.endswith(".plus_minus") else control.label
    read = read_number(text, label=label, unit=control.unit, words=control.words)
    if read.number is not None:
        return read.number
    faults.append(FieldFault(path, read.fault, text[:80], "a number"))
    return text
