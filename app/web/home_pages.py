"""The first page: what the program is, and where to start."""

from __future__ import annotations

from dataclasses import dataclass

from fastapi import APIRouter, Request
from fastapi.responses import Response

from app.stores import SampleCase, StoreType, sample_cases, store_types
from app.web.templates import templates

router = APIRouter(include_in_schema=False)


@dataclass(frozen=True)
class HomePage:
    """The first page, with the fault of a file that could not be opened."""

    title: str
    types: tuple[StoreType, ...]
    cases: tuple[SampleCase, ...]
    fault: str


@router.get("/")
def show_home(request: Request) -> Response:
    """What the program is, and where to start."""
    return home_page(request)


def home_page(request: Request, fault: str = "") -> Response:
    """The first page, with the fault of a file that could not be opened."""
    title = "Error: the file could not be opened" if fault else "How long does it stay cold?"
    page = HomePage(title, store_types(), sample_cases(), fault)
    return templates.TemplateResponse(request, "home/home.html", {"page": page}, status_code=422 if fault else 200)
