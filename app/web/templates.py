"""The template environment: strict about unknown names, escapes everything, knows where static files are."""

from __future__ import annotations

from pathlib import Path

from fastapi.templating import Jinja2Templates
from jinja2 import Environment, FileSystemLoader, StrictUndefined

from app.engine import ENGINE_VERSION
from app.web.form_view import KNOWN_CHOICES

_FOLDER = Path(__file__).parents[2] / "templates"


class Urls:
    """Addresses of static files; the version makes browsers fetch them anew after an update."""

    def static(self, name: str) -> str:
        """Address of a static file."""
        return f"/static/{name}?v={ENGINE_VERSION}"


def _environment() -> Environment:
    environment = Environment(
        loader=FileSystemLoader(_FOLDER),
        autoescape=True,
        undefined=StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    environment.globals.update(urls=Urls(), known_choices=KNOWN_CHOICES)
    return environment


templates = Jinja2Templates(env=_environment())
