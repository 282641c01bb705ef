"""The first page, the tables, and the description of the API."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import asdict, dataclass
from typing import Any

from fastapi import APIRouter, Request
from fastapi.responses import Response
from starlette.exceptions import HTTPException

from app.answers import STANDING_NOTICE
from app.reference import coolant_materials, foods, limit_presets, materials, source
from app.stores import SampleCase, StoreDefinition, StoreType, sample_cases, store_types
from app.web.shapes import fields_of
from app.web.templates import templates

router = APIRouter(include_in_schema=False)

_TABLES: dict[str, tuple[str, Callable[[], tuple[Any, ...]]]] = {
    "materials": ("Materials", materials),
    "foods": ("Foods", foods),
    "coolants": ("Coolants", coolant_materials),
    "limits": ("Published limits", limit_presets),
}

_EXAMPLE = """curl -s http://127.0.0.1:8000/api/v1/hold-time \\
  -H 'Content-Type: application/json' \\
  -d '{"store": {
        "name": "Kitchen freezer",
        "enclosure": {"inside_m": {"width": 0.9, "depth": 0.5, "height": 0.7},
                      "overall": {"heat_leak_w_per_k": 0.9}},
        "contents": [{"name": "Meat", "food": "beef_lean", "mass_kg": 60, "start_c": -18,
                      "stacking": {"kind": "bulk", "width_m": 0.8, "depth_m": 0.45, "height_m": 0.25},
                      "limits": [{"kind": "above", "temperature_c": -12}]}],
        "surroundings": {"room": {"kind": "constant", "temperature_c": 24}}}}'"""


@dataclass(frozen=True)
class HomePage:
    """The first page."""

    title: str
    types: tuple[StoreType, ...]
    cases: tuple[SampleCase, ...]
    fault: str


@dataclass(frozen=True)
class TableLink:
    """A link between the tables."""

    href: str
    text: str
    is_here: bool


@dataclass(frozen=True)
class TablePage:
    """One table of the reference."""

    title: str
    heading: str
    caption: str
    notice: str
    links: tuple[TableLink, ...]
    columns: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]


@dataclass(frozen=True)
class RouteRow:
    """One route of the API."""

    method: str
    path: str
    about: str


@dataclass(frozen=True)
class FieldRow:
    """One field of the definition."""

    path: str
    label: str
    allowed: str
    needed: str


@dataclass(frozen=True)
class ApiPage:
    """The description of the API."""

    title: str
    example: str
    routes: tuple[RouteRow, ...]
    fields: tuple[FieldRow, ...]


@router.get("/")
def show_home(request: Request) -> Response:
    """What the program is, and where to start."""
    return home_page(request)


def home_page(request: Request, fault: str = "") -> Response:
    """The first page, with the fault of a file that could not be opened."""
    title = "Error: the file could not be opened" if fault else "How long does it stay cold?"
    page = HomePage(title, store_types(), sample_cases(), fault)
    return templates.TemplateResponse(request, "home/home.html", {"page": page}, status_code=422 if fault else 200)


@router.get("/reference/{table}")
def show_table(request: Request, table: str) -> Response:
    """One table, every row with its source."""
    if table not in _TABLES:
        raise HTTPException(404, "There is no such table.")
    heading, rows = _TABLES[table]
    columns, cells = _limit_cells() if table == "limits" else _cells(rows())
    page = TablePage(
        title=heading,
        heading=heading,
        caption=f"{len(cells)} rows; every row names its source",
        notice=STANDING_NOTICE if table == "limits" else "",
        links=tuple(TableLink(f"/reference/{key}", words, key == table) for key, (words, _) in _TABLES.items()),
        columns=columns,
        rows=cells,
    )
    return templates.TemplateResponse(request, "reference/table.html", {"page": page})


@router.get("/api")
def show_api(request: Request) -> Response:
    """The description of the JSON API, made from the API itself."""
    paths = request.app.openapi()["paths"]
    routes = tuple(
        RouteRow(method.upper(), path, described.get("description", ""))
        for path, methods in paths.items()
        for method, described in methods.items()
    )
    page = ApiPage("For machines: the JSON API", _EXAMPLE, routes, tuple(_field_rows(StoreDefinition, "")))
    return templates.TemplateResponse(request, "reference/api.html", {"page": page})


def _cells(rows: tuple[Any, ...]) -> tuple[tuple[str, ...], tuple[tuple[str, ...], ...]]:
    """Column names and cells of a table of dataclasses, label first, source in words last."""
    hidden = {"key", "label", "source_key"}
    names = [name for name in asdict(rows[0]) if name not in hidden]
    columns = ("Name", "Key", *(name.replace("_", " ") for name in names), "Source")
    cells = tuple(
        (row.label, row.key, *(_cell(getattr(row, name)) for name in names), source_words(row.source_key))
        for row in rows
    )
    return columns, cells


def _limit_cells() -> tuple[tuple[str, ...], tuple[tuple[str, ...], ...]]:
    columns = ("Name", "Key", "Limits", "Group", "Body", "Document", "Edition")
    cells = tuple(
        (
            p.label,
            p.key,
            "; ".join(_limit_words(limit) for limit in p.limits),
            p.group,
            p.body,
            p.document,
            p.edition,
        )
        for p in limit_presets()
    )
    return columns, cells


def _limit_words(limit: Any) -> str:
    words = f"{limit.kind.replace('_', ' ')} {_cell(limit.temperature_c)} °C"
    if limit.longer_than_h:
        words += f" longer than {limit.longer_than_h:g} h"
    return words


def source_words(key: str) -> str:
    """A source in one line."""
    found = source(key)
    return ", ".join(part for part in (found.authors, found.title, found.year) if part and part != "NA")


def _cell(value: Any) -> str:
    if value is None:
        return ""
    return f"{value:g}" if isinstance(value, float) else str(value)


def _field_rows(model: Any, path: str) -> list[FieldRow]:
    """All fields of the definition, nested ones behind their parents, alternatives one after the other."""
    rows = []
    for one in fields_of(model):
        at = f"{path}.{one.name}".lstrip(".")
        shape = one.shape.item if one.shape.kind == "list" and one.shape.item else one.shape
        at += "[]" if one.shape.kind == "list" else ""
        allowed = (
            one.ask.allowed if one.ask.low is not None or one.ask.high is not None else ", ".join(one.shape.choices)
        )
        if one.ask.unit and not allowed:
            allowed = one.ask.unit
        rows.append(FieldRow(at, one.ask.label, allowed, "optional" if one.is_optional else "needed"))
        if shape.model is not None:
            rows += _field_rows(shape.model, at)
        for option in shape.options:
            if option.model is not None:
                rows += _field_rows(option.model, f"{at} ({option.key})")
    return rows
