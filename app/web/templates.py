"""The template environment: strict about unknown names, escapes everything, knows where static files are."""

from __future__ import annotations

from pathlib import Path

from fastapi.templating import Jinja2Templates
from jinja2 import Environment, FileSystemLoader, StrictUndefined

from app.engine import ENGINE_VERSION
from app.web.form_words import KNOWN

_FOLDER = Path(__file__).parents[2] / "templates"


def static_url(name: str) -> str:
    """Address of a static file; the version makes browsers fetch it anew after an update."""
    return f"/static/{name}?v={ENGINE_VERSION}"


def tied(text: str) -> str:
    """A text whose temperatures do not part from their unit at the end of a line."""
    return text.replace(" °C", "\N{NO-BREAK SPACE}°C")


def environment() -> Environment:
    """The environment of all pages."""
    found = Environment(
        loader=FileSystemLoader(_FOLDER),
        autoescape=True,
        undefined=StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    found.filters["tied"] = tied
    found.globals.update(static_url=static_url, known_choices=KNOWN)
    return found


templates = Jinja2Templates(env=environment())
