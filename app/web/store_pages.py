"""Describe a store, get its answer, print its plan. Stateless: what was typed travels in the form."""

from __future__ import annotations

import json
import re
from dataclasses import dataclass
from datetime import datetime

from fastapi import APIRouter, Request
from fastapi.responses import PlainTextResponse, Response
from starlette.datastructures import FormData, UploadFile

from app.answers import Answer, hold_time, plain_limits
from app.answers.wording import sentence
from app.errors import DefinitionRefused, FieldFault
from app.stores import (
    StoreDefinition,
    definition_document,
    read_definition,
    sample_case,
    store_type,
)
from app.web.answer_view import AnswerView, answer_view, series_csv
from app.web.drawing import Drawing, drawing_of
from app.web.form_data import Typed, document_of, typed_of, with_added, without
from app.web.form_view import FormView, form_view
from app.web.home_pages import home_page
from app.web.plan_view import plan_page
from app.web.templates import templates
from app.workers import Workers

router = APIRouter(include_in_schema=False)

_MOST_FIELDS = 20000
_LARGEST_FILE_BYTES = 2_000_000
_REMOVE = re.compile(r"^(?P<path>.+)\[(?P<index>\d+)\]$")


@dataclass(frozen=True)
class StorePage:
    """The page on which a store is described and answered."""

    title: str
    heading: str
    story: str
    form: FormView
    answer: AnswerView | None
    drawing: Drawing | None


@dataclass(frozen=True)
class Read:
    """A form that was read: the definition, or the faults."""

    definition: StoreDefinition | None
    faults: tuple[FieldFault, ...]


@router.get("/store")
async def show_store(request: Request, type: str = "", sample: str = "") -> Response:
    """A form filled from a worked case or a kind of store; worked cases come with their answer."""
    if sample:
        case = sample_case(sample)
        typed = typed_of(case.store)
        return await _page(request, typed, read_form(typed), case.title, case.story)
    kind = store_type(type or "walk_in_freezer_room")
    story = f"{kind.about} Values marked typical are those of the kind: {kind.source} Replace what you know."
    typed = typed_of(kind.store)
    return await _page(request, typed, read_form(typed), f"Describe a store: {kind.label}", story, with_answer=False)


@router.post("/store")
async def answer_store(request: Request) -> Response:
    """Work out the answer, or change the form: add, remove, another way of giving something."""
    typed = await typed_form(request)
    do, _, target = typed.pop("do", "answer").partition(":")
    if do == "answer":
        return await _page(request, typed, read_form(typed), "", "")
    if do == "add":
        typed = with_added(typed, target)
    match = _REMOVE.match(target)
    if do == "remove" and match is not None:
        typed = without(typed, match["path"], int(match["index"]))
    return _form_only(request, typed)


@router.post("/store/answer")
async def live_answer(request: Request) -> Response:
    """One line for the form that is being typed: the sentence, or what is missing."""
    typed = await typed_form(request)
    read = read_form(typed)
    if read.definition is None:
        first = read.faults[0].message
        more = f" (and {len(read.faults) - 1} more)" if len(read.faults) > 1 else ""
        return PlainTextResponse(f"To get an answer: {first}{more}")
    return PlainTextResponse(sentence(await _answer(request, read.definition)))


@router.post("/store/definition")
async def save_definition(request: Request) -> Response:
    """The description as a file in the contract's JSON; a form with faults is shown again."""
    typed = await typed_form(request)
    read = read_form(typed)
    if read.definition is None:
        return await _page(request, typed, read, "", "")
    text = json.dumps(definition_document(read.definition), indent=2, ensure_ascii=False) + "\n"
    return _download(text, "application/json", _file_name(read.definition, "json"))


@router.post("/store/series.csv")
async def save_series(request: Request) -> Response:
    """The temperatures as comma-separated values."""
    typed = await typed_form(request)
    read = read_form(typed)
    if read.definition is None:
        return await _page(request, typed, read, "", "")
    answer = await _answer(request, read.definition)
    return _download(series_csv(answer), "text/csv; charset=utf-8", _file_name(read.definition, "csv"))


@router.post("/store/plan")
async def print_plan(request: Request) -> Response:
    """The outage plan of the store, made to be printed."""
    typed = await typed_form(request)
    read = read_form(typed)
    if read.definition is None:
        return await _page(request, typed, read, "", "")
    answer = await _answer(request, read.definition)
    made_at = datetime.now().astimezone().strftime("%Y-%m-%d %H:%M %Z")
    view = answer_view(answer, levels_of(read.definition))
    page = plan_page(read.definition, answer, view, made_at)
    return templates.TemplateResponse(request, "plan/plan.html", {"page": page})


@router.post("/store/open")
async def open_definition(request: Request) -> Response:
    """A saved description: the form filled with it and its answer, or why it cannot be opened."""
    form = await request.form(max_files=1, max_fields=10)
    upload = form.get("file")
    raw = await upload.read(_LARGEST_FILE_BYTES + 1) if isinstance(upload, UploadFile) else b""
    if not raw or len(raw) > _LARGEST_FILE_BYTES:
        text = "Choose a file first." if not raw else "The file is larger than 2 MB."
        return home_page(request, fault=text)
    try:
        document = json.loads(raw)
        definition = read_definition(document["store"] if "store" in document else document)
    except DefinitionRefused as refused:
        shown = "; ".join(f"{fault.field}: {fault.message}" for fault in refused.faults[:6])
        return home_page(request, fault=f"The description has faults. {shown}")
    except (ValueError, TypeError, RecursionError):
        return home_page(request, fault="The file is not a description in JSON.")
    typed = typed_of(definition_document(definition))
    return await _page(request, typed, Read(definition, ()), definition.name, "")


async def typed_form(request: Request) -> Typed:
    """The texts of a posted form."""
    form: FormData = await request.form(max_fields=_MOST_FIELDS, max_files=0)
    return {name: value for name, value in form.multi_items() if isinstance(value, str)}


def read_form(typed: Typed) -> Read:
    """The definition that a form describes, or all its faults."""
    parsed = document_of(typed)
    try:
        definition = read_definition(parsed.document)
    except DefinitionRefused as refused:
        mine = {fault.field for fault in parsed.faults}
        others = tuple(fault for fault in refused.faults if fault.field not in mine)
        return Read(None, (*parsed.faults, *others))
    return Read(None, tuple(parsed.faults)) if parsed.faults else Read(definition, ())


def levels_of(definition: StoreDefinition) -> tuple[tuple[float, str], ...]:
    """The temperatures of all limits, with their words, each once."""
    limits = [limit for contents in definition.contents for limit in contents.limits]
    plains = [plain for limit in (*limits, *definition.air_limits) for plain in plain_limits(limit)]
    levels = {
        plain.level: f"limit {plain.level:g} °C".replace("-", "\u2212")
        for plain in plains
        if plain.kind in ("above", "below")
    }
    return tuple(sorted(levels.items()))


async def _page(
    request: Request, typed: Typed, read: Read, heading: str, story: str, *, with_answer: bool = True
) -> Response:
    """The page of a store with its answer; with faults it is shown again, nothing typed is lost."""
    answer: AnswerView | None = None
    if read.definition is not None and with_answer:
        answer = answer_view(await _answer(request, read.definition), levels_of(read.definition))
    heading = heading or typed.get("name") or "Store"
    page = StorePage(
        title=f"Error: {heading}" if read.faults else heading,
        heading=heading,
        story=story,
        form=form_view(typed, read.faults),
        answer=answer,
        drawing=drawing_of(read.definition) if read.definition is not None else None,
    )
    status = 422 if read.faults else 200
    return templates.TemplateResponse(request, "store/describe.html", {"page": page}, status_code=status)


def _form_only(request: Request, typed: Typed) -> Response:
    """The form again after a change to its shape, without judging what is not filled in yet."""
    heading = typed.get("name") or "Store"
    page = StorePage(heading, heading, "", form_view(typed), None, None)
    return templates.TemplateResponse(request, "store/describe.html", {"page": page})


async def _answer(request: Request, definition: StoreDefinition) -> Answer:
    workers: Workers = request.app.state.workers
    return await workers.ask(hold_time, definition)


def _download(text: str, media_type: str, name: str) -> Response:
    headers = {"Content-Disposition": f'attachment; filename="{name}"'}
    return Response(text, media_type=media_type, headers=headers)


def _file_name(definition: StoreDefinition, ending: str) -> str:
    plain = re.sub(r"[^a-z0-9]+", "-", definition.name.lower()).strip("-") or "store"
    return f"{plain}.{ending}"
