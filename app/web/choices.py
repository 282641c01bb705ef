"""What can be chosen in a field: the rows of the reference tables, and the words of the definition, with labels."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import cache

from app.reference import coolant_materials, foods, limit_presets, materials
from app.web.form_words import CHOICES, YES_NO
from app.web.schema import Question


@dataclass(frozen=True)
class Option:
    """One thing to choose; ``group`` gathers rows of one kind."""

    value: str
    label: str
    group: str = ""


@dataclass(frozen=True)
class OptionGroup:
    """Options of one kind, under its name."""

    label: str
    options: tuple[Option, ...]


def grouped(options: tuple[Option, ...]) -> tuple[OptionGroup, ...]:
    """Options with those of one kind together; the kinds in the order in which they first appear."""
    kinds = dict.fromkeys(option.group for option in options)
    return tuple(OptionGroup(kind, tuple(one for one in options if one.group == kind)) for kind in kinds)


def options_of(question: Question, value: str) -> tuple[Option, ...]:
    """What can be chosen in a field; none where it is typed. A value that nobody knows stays to be seen."""
    if question.kind == "choice":
        labels = CHOICES.get(question.name, {})
        options = tuple(Option(word, labels.get(word, word)) for word in question.words)
    elif question.kind == "yes_no":
        options = tuple(Option(word, label) for word, label in YES_NO.items())
    elif question.name in _TABLES:
        options = (Option("", "Choose one"), *_TABLES[question.name]())
    else:
        return ()
    if value and value not in {option.value for option in options}:
        options += (Option(value, f"{value} (not known)"),)
    return options


@cache
def _materials() -> tuple[Option, ...]:
    return tuple(Option(row.key, row.label, _kind(row.group)) for row in materials())


@cache
def _foods() -> tuple[Option, ...]:
    return tuple(Option(row.key, row.label, _kind(row.group)) for row in foods())


@cache
def _coolants() -> tuple[Option, ...]:
    return tuple(Option(row.key, row.label) for row in coolant_materials())


@cache
def _presets() -> tuple[Option, ...]:
    return tuple(Option(row.key, row.label, _kind(row.group)) for row in limit_presets())


_TABLES: Mapping[str, Callable[[], tuple[Option, ...]]] = {
    "material": _materials,
    "food": _foods,
    "test_load_food": _foods,
    "coolant": _coolants,
    "preset": _presets,
}


def _kind(group: str) -> str:
    return group.replace("_", " ").capitalize()
