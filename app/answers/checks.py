"""Hold an answer against the checks that a sample case lists."""

from __future__ import annotations

import re
from typing import Any

_STEP = re.compile(r"([^.\[\]]+)|\[(\d+)\]")


def failed_checks(document: dict[str, Any], checks: tuple[dict[str, Any], ...]) -> list[str]:
    """What is off: one line for every check of which the answer is not within its tolerance.

    A check names a ``quantity`` by its path in the answer's document, the ``value`` that is expected and the
    ``tolerance`` either side of it; words must be the same.
    """
    faults = []
    for check in checks:
        found = value_at(document, check["quantity"])
        wanted, tolerance = check["value"], check.get("tolerance", 0.0)
        if isinstance(wanted, (int, float)) and isinstance(found, (int, float)):
            if abs(found - wanted) <= tolerance:
                continue
        elif found == wanted:
            continue
        faults.append(f"{check['quantity']} is {found}, expected {wanted} within {tolerance}")
    return faults


def value_at(document: Any, path: str) -> Any:
    """What stands at a path like ``items[0].hold_time_h.best_estimate``. Raises ``KeyError`` or ``IndexError``."""
    for name, index in _STEP.findall(path):
        document = document[int(index)] if index else document[name]
    return document
