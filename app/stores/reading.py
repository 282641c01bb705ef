"""Read a definition: every fault at once, each with its field, what was given and what is allowed.

``read_definition`` is the only way into a ``StoreDefinition``; faults of single fields come first, and when
there are none, what does not fit together (``together``).
"""

from __future__ import annotations

import hashlib
import json
from typing import Any

from pydantic import ValidationError

from app.errors import DefinitionRefused, FieldFault
from app.stores.definition import StoreDefinition
from app.stores.fault_words import field_fault
from app.stores.together import faults_together


def read_definition(document: object) -> StoreDefinition:
    """The checked definition of a JSON document.

    Raises ``DefinitionRefused`` with every fault that was found.
    """
    try:
        definition = StoreDefinition.model_validate(document)
    except ValidationError as refused:
        faults = [field_fault(document, error) for error in refused.errors(include_url=False)]
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


def _without_echoes(faults: list[FieldFault]) -> list[FieldFault]:
    """Without "give at least one" of a list whose own members have faults: the reader counts only what is whole."""
    paths = [fault.field for fault in faults]
    return [
        fault
        for fault in faults
        if not (": give at least " in fault.message and any(p.startswith(fault.field + "[") for p in paths))
    ]
