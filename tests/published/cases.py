"""Worked examples and exact cases with their sources: what a case names, is where its figures come from.

``heat_cases.json`` holds them. ``expected`` is the formula or exact solution at full precision and ``published``
the figure printed in the source, with its own rounding, interpolation or chart reading; where the two differ a
``note`` says why, and the printed figure is shown, never bent.
"""

from __future__ import annotations

import json
from functools import cache
from pathlib import Path
from typing import Any


@cache
def _all_cases() -> dict[str, dict[str, Any]]:
    text = Path(__file__).with_name("heat_cases.json").read_text(encoding="utf-8")
    return {case["id"]: case for case in json.loads(text)}


def case(name: str) -> tuple[dict[str, Any], dict[str, Any]]:
    """Inputs of a case and what is expected of it."""
    found = _all_cases()[name]
    return found["inputs"], found["expected"]


def printed(name: str) -> dict[str, Any]:
    """What the source of a case prints."""
    figures: dict[str, Any] = _all_cases()[name]["published"]
    return figures


def cases_of(prefix: str) -> list[str]:
    """Names of the cases that begin so."""
    return [name for name in _all_cases() if name.startswith(prefix)]
