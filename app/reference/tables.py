"""Look-ups in the reference tables: materials, foods, coolants, limits, openings, and the sources of all of them.

Each table is a CSV file beside this module, read and checked once. An unknown key is refused with the nearest
ones. Other packages turn a row into plain numbers before they hand it to the physics.
"""

from __future__ import annotations

import difflib
from collections.abc import Iterable
from functools import cache
from importlib.resources import files
from typing import Protocol, TypeVar

from app.errors import UnknownKey
from app.reference.reading import presets_of, read_rows
from app.reference.rows import CoolantMaterial, Food, LimitPreset, LimitRow, Material, OpeningKind, Source

_NEAREST = 3


class _Keyed(Protocol):
    @property
    def key(self) -> str: ...


KeyedT = TypeVar("KeyedT", bound=_Keyed)


def materials() -> tuple[Material, ...]:
    """Every material of walls, fittings and packaging, in the order of the table."""
    return tuple(_materials().values())


def foods() -> tuple[Food, ...]:
    """Every food, in the order of the table."""
    return tuple(_foods().values())


def coolant_materials() -> tuple[CoolantMaterial, ...]:
    """Every coolant, in the order of the table."""
    return tuple(_coolant_materials().values())


def limit_presets() -> tuple[LimitPreset, ...]:
    """Every published limit, in the order of the table."""
    return tuple(_limit_presets().values())


def opening_kinds() -> tuple[OpeningKind, ...]:
    """Every kind of door, in the order of the table."""
    return tuple(_opening_kinds().values())


def sources() -> tuple[Source, ...]:
    """Every source, in the order of the table."""
    return tuple(_sources().values())


def material(key: str) -> Material:
    """A material by its key; raises ``UnknownKey``."""
    return _found("material", key, _materials())


def food(key: str) -> Food:
    """A food by its key; raises ``UnknownKey``."""
    return _found("food", key, _foods())


def coolant_material(key: str) -> CoolantMaterial:
    """A coolant by its key; raises ``UnknownKey``."""
    return _found("coolant", key, _coolant_materials())


def limit_preset(key: str) -> LimitPreset:
    """A published limit by its key; raises ``UnknownKey``."""
    return _found("published limit", key, _limit_presets())


def opening_kind(key: str) -> OpeningKind:
    """A kind of door by its key; raises ``UnknownKey``."""
    return _found("kind of door", key, _opening_kinds())


def source(key: str) -> Source:
    """A source by its key; raises ``UnknownKey``."""
    return _found("source", key, _sources())


@cache
def _materials() -> dict[str, Material]:
    return _by_key(read_rows("materials.csv", _text("materials.csv"), Material, _sources()))


@cache
def _foods() -> dict[str, Food]:
    return _by_key(read_rows("foods.csv", _text("foods.csv"), Food, _sources()))


@cache
def _coolant_materials() -> dict[str, CoolantMaterial]:
    return _by_key(read_rows("coolants.csv", _text("coolants.csv"), CoolantMaterial, _sources()))


@cache
def _limit_presets() -> dict[str, LimitPreset]:
    rows = read_rows("limits.csv", _text("limits.csv"), LimitRow, _sources())
    return _by_key(presets_of("limits.csv", rows))


@cache
def _opening_kinds() -> dict[str, OpeningKind]:
    return _by_key(read_rows("openings.csv", _text("openings.csv"), OpeningKind, _sources()))


@cache
def _sources() -> dict[str, Source]:
    return _by_key(read_rows("sources.csv", _text("sources.csv"), Source, None))


def _text(file: str) -> str:
    return files("app.reference").joinpath(file).read_text(encoding="utf-8")


def _by_key(rows: Iterable[KeyedT]) -> dict[str, KeyedT]:
    return {row.key: row for row in rows}


def _found(kind: str, key: str, table: dict[str, KeyedT]) -> KeyedT:
    row = table.get(key)
    if row is None:
        raise UnknownKey(kind, key, tuple(difflib.get_close_matches(key, table, n=_NEAREST, cutoff=0.5)))
    return row
