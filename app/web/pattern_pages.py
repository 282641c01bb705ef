"""One page with every part of the pages in every state, for looking at changes."""

from __future__ import annotations

from dataclasses import dataclass

from fastapi import APIRouter, Request
from fastapi.responses import Response

from app.errors import FieldFault
from app.stores import store_type
from app.web.form import Form, form_of
from app.web.form_values import typed_of
from app.web.templates import templates

router = APIRouter(include_in_schema=False)


@dataclass(frozen=True)
class PatternPage:
    """The form of a kind of store: as it comes, with faults, and empty."""

    title: str
    forms: tuple[Form, ...]


@router.get("/patterns")
def show_patterns(request: Request) -> Response:
    """Every part of the pages in every state."""
    typed = typed_of(store_type("chest_freezer").store)
    typed.put("contents[0].mass_kg", "heavy")
    typed.put("coolants[0]:item", "")
    faults = (
        FieldFault("contents[0].mass_kg", "Mass must be a number, like 2.5.", "heavy", "0.001 to 1e+06 kg"),
        FieldFault("coolants[0].coolant", "Coolant of the table is missing.", None, ""),
        FieldFault("contents[0].limits", "Give at least one limit.", None, ""),
    )
    page = PatternPage("Patterns", (form_of(typed_of(store_type("chest_freezer").store)), form_of(typed, faults)))
    return templates.TemplateResponse(request, "patterns.html", {"page": page})
