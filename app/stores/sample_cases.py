"""The worked cases in sample_cases/: one file, three uses. Run by the tests, opened in the app, quoted in README."""

from __future__ import annotations

import json
from dataclasses import dataclass
from functools import cache
from pathlib import Path
from typing import Any

from app.errors import UnknownKey

FOLDER = Path(__file__).parents[2] / "sample_cases"


@dataclass(frozen=True)
class SampleCase:
    """A worked case: its file's name, its story, its definition as JSON, and the checks on its answer.

    A check has ``quantity`` (a path in the answer's document), ``value``, ``tolerance`` and ``source``.
    """

    key: str
    title: str
    story: str
    store_type: str
    store: dict[str, Any]
    checks: tuple[dict[str, Any], ...]


@cache
def sample_cases() -> tuple[SampleCase, ...]:
    """All cases, by title."""
    cases = []
    for path in FOLDER.glob("*.json"):
        document = json.loads(path.read_text(encoding="utf-8"))
        cases.append(
            SampleCase(
                path.stem,
                document["title"],
                document["story"],
                document["store_type"],
                document["store"],
                tuple(document["checks"]),
            )
        )
    return tuple(sorted(cases, key=lambda case: case.title))


def sample_case(key: str) -> SampleCase:
    """One case by the name of its file. Raises ``UnknownKey``."""
    for case in sample_cases():
        if case.key == key:
            return case
    raise UnknownKey("sample case", key, tuple(case.key for case in sample_cases()))
