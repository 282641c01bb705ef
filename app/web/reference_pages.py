"""The tables with their sources, and the description of the JSON API."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass
from typing import Any

from fastapi import APIRouter, Request
from fastapi.responses import Response
from pydantic import BaseModel
from starlette.exceptions import HTTPException

from app.answers import STANDING_NOTICE, wording
from app.reference import coolant_materials, foods, limit_presets, materials
from app.stores import StoreDefinition
from app.web.schema import Question, questions
from app.web.templates import templates

router = APIRouter(include_in_schema=False)


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


@dataclass(frozen=True)
class _Table:
    title: str
    rows: Callable[[], tuple[Any, ...]]
    columns: Mapping[str, Callable[[Any], str]]


def _number(value: float | None) -> str:
    return "not known" if value is None else wording.number_text(value, digits=4)


def _between(low: float, high: float) -> str:
    return _number(low) if low == high else f"{_number(low)} to {_number(high)}"


def _limits(preset: Any) -> str:
    return "; ".join(_limit(one) for one in preset.limits)


def _once(preset: Any, name: str) -> str:
    """What the limits of a preset say under one name, the same words once."""
    return "; ".join(dict.fromkeys(getattr(one, name) for one in preset.limits))


def _limit(limit: Any) -> str:
    longer = f" for longer than {_number(limit.longer_than_h)} h" if limit.longer_than_h else ""
    window = f" over {_number(limit.window_h)} h" if limit.kind == "mean_kinetic" else ""
    at = "air" if limit.on == "air" else f"{limit.at} point"
    return f"{limit.kind.replace('_', ' ')} {_number(limit.temperature_c)} °C{window}{longer}, {at}"


_TABLES: Mapping[str, _Table] = {
    "materials": _Table(
        "Materials",
        materials,
        {
            "Material": lambda row: row.label,
            "Conductivity, W/m·K": lambda row: _number(row.conductivity_w_per_m_k),
            "Its range": lambda row: _between(row.conductivity_low_w_per_m_k, row.conductivity_high_w_per_m_k),
            "Density, kg/m³": lambda row: _number(row.density_kg_per_m3),
            "Specific heat, J/kg·K": lambda row: _number(row.specific_heat_j_per_kg_k),
            "Source": lambda row: f"{row.source_text} ({row.status})",
            "Note": lambda row: row.note,
            "Key": lambda row: row.key,
        },
    ),
    "foods": _Table(
        "Foods",
        foods,
        {
            "Food": lambda row: row.label,
            "Water": lambda row: _number(row.water_fraction),
            "Protein": lambda row: _number(row.protein_fraction),
            "Fat": lambda row: _number(row.fat_fraction),
            "Carbohydrate": lambda row: _number(row.carbohydrate_fraction),
            "Fibre": lambda row: _number(row.fibre_fraction),
            "Ash": lambda row: _number(row.ash_fraction),
            "Freezing begins, °C": lambda row: _number(row.initial_freezing_c),
            "Source": lambda row: f"{row.source_text} (composition {row.status}, freezing {row.freezing_status})",
            "Note": lambda row: row.note,
            "Key": lambda row: row.key,
        },
    ),
    "coolants": _Table(
        "Coolants",
        coolant_materials,
        {
            "Coolant": lambda row: row.label,
            "Melts at, °C": lambda row: _number(row.melting_c),
            "Over, K": lambda row: _number(row.melting_range_k),
            "Heat of fusion, kJ/kg": lambda row: _number(row.latent_j_per_kg / 1000.0),
            "Its range": lambda row: _between(row.latent_low_j_per_kg / 1000.0, row.latent_high_j_per_kg / 1000.0),
            "Density, kg/m³": lambda row: _number(row.density_kg_per_m3),
            "Source": lambda row: f"{row.source_text} ({row.status})",
            "Note": lambda row: row.note,
            "Key": lambda row: row.key,
        },
    ),
    "limits": _Table(
        "Published limits",
        limit_presets,
        {
            "Limit": lambda row: row.label,
            "What is judged": _limits,
            "Published in": lambda row: f"{row.body}: {row.document}, {row.edition}, {row.limits[0].clause}".rstrip(
                ", "
            ),
            "In its own words": lambda row: _once(row, "original"),
            "Status and note": lambda row: f"{_once(row, 'status').capitalize()}. {_once(row, 'note')}",
            "Key": lambda row: row.key,
        },
    ),
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


@router.get("/reference/{table}")
def show_table(request: Request, table: str) -> Response:
    """One table, every row with its source."""
    if table not in _TABLES:
        raise HTTPException(404, "There is no such table.")
    shown = _TABLES[table]
    rows = tuple(tuple(cell(row) for cell in shown.columns.values()) for row in shown.rows())
    page = TablePage(
        title=shown.title,
        caption=f"{len(rows)} rows",
        notice=STANDING_NOTICE if table == "limits" else "",
        links=tuple(TableLink(f"/reference/{key}", one.title, key == table) for key, one in _TABLES.items()),
        columns=tuple(shown.columns),
        rows=rows,
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


def _field_rows(model: type[BaseModel], path: str) -> Iterator[FieldRow]:
    """All fields of the definition, nested ones behind their parents, alternatives one after the other."""
    for question in questions(model):
        at = f"{path}.{question.name}".lstrip(".") + ("[]" if question.kind in ("list", "numbers") else "")
        needed = "needed" if question.required else "optional"
        yield FieldRow(at, question.ask.label, _allowed(question), needed)
        for variant in question.variants:
            is_only = len(question.variants) == 1
            if variant.model is not None:
                yield from _field_rows(variant.model, at if is_only else f"{at} ({variant.key})")


def _allowed(question: Question) -> str:
    ask = question.ask
    if ask.low is not None or ask.high is not None:
        return ask.allowed
    words = question.words or tuple(variant.key for variant in question.variants if len(question.variants) > 1)
    return ", ".join(words) or ask.unit
