"""Read a JSON body strictly: no NaN, no duplicate names, not too deep; faults say where."""

from __future__ import annotations

import json
from typing import Any, NoReturn

from fastapi import Request
from starlette.exceptions import HTTPException

_DEEPEST = 40


async def json_body(request: Request) -> Any:
    """The JSON document of a request. Raises ``HTTPException`` 400 with the place of the fault."""
    raw = await request.body()
    try:
        document = json.loads(raw, parse_constant=_refuse, object_pairs_hook=_once)
    except UnicodeDecodeError as fault:
        raise HTTPException(400, "The body is not UTF-8 text.") from fault
    except json.JSONDecodeError as fault:
        where = f"line {fault.lineno}, column {fault.colno}"
        raise HTTPException(400, f"The body is not JSON: {fault.msg} at {where}.") from fault
    except ValueError as fault:
        raise HTTPException(400, "The body holds a number that is too long to be read.") from fault
    except RecursionError as fault:
        raise HTTPException(400, "The body is nested too deeply.") from fault
    _check_depth(document, 0)
    return document


def _refuse(name: str) -> NoReturn:
    raise HTTPException(400, f"{name} is not a JSON number.")


def _once(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
    found: dict[str, Any] = {}
    for name, value in pairs:
        if name in found:
            raise HTTPException(400, f"The name {name!r} stands twice in one object.")
        found[name] = value
    return found


def _check_depth(document: Any, depth: int) -> None:
    if depth > _DEEPEST:
        raise HTTPException(400, f"The body is nested more than {_DEEPEST} deep.")
    children = document.values() if isinstance(document, dict) else document if isinstance(document, list) else ()
    for child in children:
        _check_depth(child, depth + 1)
