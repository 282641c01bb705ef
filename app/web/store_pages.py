"""Describe a store, get its answer, print its plan. Stateless: what was typed travels in the form."""

from __future__ import annotations

import json
import logging
import re
from dataclasses import dataclass
from datetime import UTC, datetime
from typing import Any

from fastapi import APIRouter, Request
from fastapi.responses import Response
from starlette.datastructures import UploadFile

from app.answers import Answer, hold_time
from app.errors import AppError, DefinitionRefused, FieldFault, TooBusy
from app.stores import (
    StoreDefinition,
    definition_document,
    read_definition,
    sample_case,
    store_type,
)
from app.web.answer_view import AnswerView, answer_view, series_csv
from app.web.drawing import Drawing, drawing_of
from app.web.form import Form, form_of
from app.web.form_tree import form_tree
from app.web.form_values import document_of, typed_of
from app.web.form_words import BLANKS
from app.web.home_pages import home_page
from app.web.plan_view import plan_page
from app.web.templates import templates
from app.web.typed import Typed, is_path, join, read_typed, steps
from app.workers import Workers

router = APIRouter(include_in_schema=False)

_LOG = logging.getLogger("stillcold")

_MOST_FIELDS = 20000
_LARGEST_FILE_BYTES = 2_000_000


@dataclass(frozen=True)
class StorePage:
    """The page on which a store is described and answered.

    ``is_unanswered``: the form changed its shape, so that the answer is to be asked for again.
    """

    title: str
    heading: str
    story: str
    form: Form
    answer: AnswerView | None
    drawing: Drawing | None
    is_unanswered: bool = False


@dataclass(frozen=True)
class LiveAnswer:
    """The answer to what is being typed, or what is missing for one."""

    line: str
    answer: AnswerView | None


@dataclass(frozen=True)
class Read:
    """A form that was read: the definition, or the faults."""

    typed: Typed
    definition: StoreDefinition | None
    faults: tuple[FieldFault, ...] = ()


@router.get("/store")
async def show_store(request: Request, type: str = "", sample: str = "") -> Response:
    """A form filled from a worked case or a kind of store; worked cases come with their answer."""
    if sample:
        case = sample_case(sample)
        return await _answered(request, read_form(typed_of(case.store)), case.title, case.story)
    kind = store_type(type or "walk_in_freezer_room")
    story = f"{kind.about} Values marked typical are those of the kind, not of your store: replace what you know."
    read = read_form(typed_of(kind.store))
    return _shown(request, read, f"Describe a store: {kind.label}", f"{story} {kind.source}")


@router.post("/store")
async def answer_store(request: Request) -> Response:
    """Work out the answer, or change the form: add, remove, another way of giving something."""
    typed, do = await _typed_form(request)
    action, _, path = do.partition(":")
    if action not in ("add", "remove", "change"):
        return await _answered(request, read_form(typed))
    if action == "add" and path and is_path(path):
        _add(typed, path)
    if action == "remove" and path and is_path(path):
        typed.remove(path)
    return _shown(request, Read(typed, None), is_unanswered=True)


@router.post("/store/answer")
async def live_answer(request: Request) -> Response:
    """The answer to what is being typed, as a part of the page; or in a line what is missing for one."""
    typed, _ = await _typed_form(request)
    read, answer = await _answer(request, read_form(typed))
    if read.definition is None or answer is None:
        faults = form_of(typed, read.faults).faults
        where = f"{faults[0].where}: " if faults[0].where else ""
        more = f" And {len(faults) - 1} more." if len(faults) > 1 else ""
        live = LiveAnswer(f"No answer yet. {where}{faults[0].message}{more}", None)
    else:
        view = answer_view(read.definition, answer)
        live = LiveAnswer(view.sentence, view)
    return templates.TemplateResponse(request, "store/_live.html", {"live": live})


@router.post("/store/definition")
async def save_definition(request: Request) -> Response:
    """The description as a file in the contract's JSON; a form with faults is shown again."""
    typed, _ = await _typed_form(request)
    read = read_form(typed)
    if read.definition is None:
        return _shown(request, read)
    text = json.dumps(definition_document(read.definition), indent=2, ensure_ascii=False) + "\n"
    return _download(text, "application/json", _file_name(read.definition, "json"))


@router.post("/store/series.csv")
async def save_series(request: Request) -> Response:
    """The temperatures as comma-separated values."""
    typed, _ = await _typed_form(request)
    read, answer = await _answer(request, read_form(typed))
    if read.definition is None or answer is None:
        return _shown(request, read)
    return _download(series_csv(answer), "text/csv; charset=utf-8", _file_name(read.definition, "csv"))


@router.post("/store/plan")
async def print_plan(request: Request) -> Response:
    """The outage plan of the store, made to be printed."""
    typed, _ = await _typed_form(request)
    read, answer = await _answer(request, read_form(typed))
    if read.definition is None or answer is None:
        return _shown(request, read)
    page = plan_page(read.definition, answer, made_at=datetime.now(UTC))
    return templates.TemplateResponse(request, "plan/plan.html", {"page": page})


@router.post("/store/open")
async def open_definition(request: Request) -> Response:
    """A saved description: the form filled with it, and its answer or its faults."""
    async with request.form(max_files=1, max_fields=10) as form:
        upload = form.get("file")
        raw = await upload.read(_LARGEST_FILE_BYTES + 1) if isinstance(upload, UploadFile) else b""
    if not raw or len(raw) > _LARGEST_FILE_BYTES:
        text = "Choose a file first." if not raw else "The file is larger than 2 MB."
        return home_page(request, fault=text)
    try:
        document: Any = json.loads(raw, parse_constant=str)
    except (ValueError, RecursionError):
        return home_page(request, fault="The file is not a description in JSON.")
    if isinstance(document, dict) and "enclosure" not in document and isinstance(document.get("store"), dict):
        document = document["store"]
    if not isinstance(document, dict):
        return home_page(request, fault="The file is JSON, but not the description of a store.")
    return await _answered(request, _read(typed_of(document), document, ()))


def read_form(typed: Typed) -> Read:
    """The definition that a form describes, or all its faults."""
    document, faults = document_of(form_tree(typed))
    return _read(typed, document, faults)


def _read(typed: Typed, document: dict[str, Any], faults: tuple[FieldFault, ...]) -> Read:
    """Faults of texts stand before what the definition says of the same field."""
    try:
        definition = read_definition(document)
    except DefinitionRefused as refused:
        mine = {fault.field for fault in faults}
        return Read(typed, None, (*faults, *(fault for fault in refused.faults if _bare(fault.field) not in mine)))
    return Read(typed, None, faults) if faults else Read(typed, definition)


def _bare(path: str) -> str:
    return path.removesuffix(".value")


def _add(typed: Typed, path: str) -> None:
    """One more group: the next of a list, or one that may be left out."""
    numbers = typed.at(path).items()
    is_single = str(steps(path)[-1]) in ("films_w_per_m2_k", "outdoors")
    here = path if is_single else join(path, numbers[-1] + 1 if numbers else 0)
    typed.put(f"{here}:item", "")
    for name, text in BLANKS.get(str(steps(path)[-1]), {}).items():
        typed.put(join(here, name), text)


async def _typed_form(request: Request) -> tuple[Typed, str]:
    """The texts of a posted form, and what its button does."""
    async with request.form(max_fields=_MOST_FIELDS, max_files=0) as form:
        pairs = [(name, text) for name, text in form.multi_items() if isinstance(text, str)]
    do = next((text for name, text in pairs if name == "do"), "")
    return read_typed((name, text) for name, text in pairs if name != "do"), do


async def _answer(request: Request, read: Read) -> tuple[Read, Answer | None]:
    """The answer of a form that was read; a run that is refused becomes a fault of the form."""
    if read.definition is None:
        return read, None
    workers: Workers = request.app.state.workers
    try:
        return read, await workers.ask(hold_time, read.definition)
    except TooBusy:
        raise
    except AppError as refused:
        _LOG.error("no answer: %s", refused)
        fault = FieldFault("", f"{refused} No number is shown rather than a wrong one.", None, "")
        return Read(read.typed, None, (fault,)), None


async def _answered(request: Request, read: Read, heading: str = "", story: str = "") -> Response:
    """The page of a store with its answer; with faults it is shown again, nothing typed is lost."""
    read, answer = await _answer(request, read)
    return _shown(request, read, heading, story, answer)


def _shown(
    request: Request,
    read: Read,
    heading: str = "",
    story: str = "",
    answer: Answer | None = None,
    *,
    is_unanswered: bool = False,
) -> Response:
    heading = heading or read.typed.said("name") or "Store"
    known = read.definition
    page = StorePage(
        title=f"Error: {heading}" if read.faults else heading,
        heading=heading,
        story=story,
        form=form_of(read.typed, read.faults),
        answer=answer_view(known, answer) if known is not None and answer is not None else None,
        drawing=drawing_of(known) if known is not None else None,
        is_unanswered=is_unanswered,
    )
    status = 422 if read.faults else 200
    return templates.TemplateResponse(request, "store/describe.html", {"page": page}, status_code=status)


def _download(text: str, media_type: str, name: str) -> Response:
    headers = {"Content-Disposition": f'attachment; filename="{name}"'}
    return Response(text, media_type=media_type, headers=headers)


def _file_name(definition: StoreDefinition, ending: str) -> str:
    plain = re.sub(r"[^a-z0-9]+", "-", definition.name.lower()).strip("-") or "store"
    return f"{plain}.{ending}"
