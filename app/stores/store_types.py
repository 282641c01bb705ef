"""Kinds of stores to start a description from, with values that are typical of the kind and marked so."""

from __future__ import annotations

import json
from dataclasses import dataclass
from functools import cache
from pathlib import Path
from typing import Any

from app.errors import UnknownKey

_FOLDER = Path(__file__).parent / "types"


@dataclass(frozen=True)
class StoreType:
    """A kind of store: its label, one line on it, where its values come from, and a definition to start from."""

    key: str
    label: str
    about: str
    source: str
    store: dict[str, Any]


@cache
def store_types() -> tuple[StoreType, ...]:
    """All kinds, in the order of their files."""
    types = []
    for path in sorted(_FOLDER.glob("*.json")):
        document = json.loads(path.read_text(encoding="utf-8"))
        key = path.stem.split("-", 1)[1]
        types.append(StoreType(key, document["label"], document["about"], document["source"], document["store"]))
    return tuple(types)


def store_type(key: str) -> StoreType:
    """One kind by its key. Raises ``UnknownKey``."""
    for kind in store_types():
        if kind.key == key:
            return kind
    raise UnknownKey("store type", key, tuple(kind.key for kind in store_types()))
