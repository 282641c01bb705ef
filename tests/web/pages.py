"""Read a page as a browser would: its controls with their names, labels and values."""

from __future__ import annotations

from dataclasses import dataclass, field
from html.parser import HTMLParser

_VOID = {"input", "meta", "link", "img", "br", "line", "rect", "polyline"}


@dataclass
class Field:
    """One control of a form."""

    tag: str
    attributes: dict[str, str]
    text: str = ""
    values: list[str] = field(default_factory=list)

    @property
    def value(self) -> str:
        return self.attributes.get("value", "") if self.tag == "input" else self.text


class Page(HTMLParser):
    """Controls, labels and ids of a page."""

    def __init__(self, html: str) -> None:
        super().__init__()
        self.fields: list[Field] = []
        self.labels: dict[str, str] = {}
        self.ids: list[str] = []
        self.hrefs: list[str] = []
        self.text: list[str] = []
        self._label: str | None = None
        self._open: Field | None = None
        self.feed(html)

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        found = {name: value or "" for name, value in attrs}
        self.ids += [found["id"]] if "id" in found else []
        self.hrefs += [found["href"]] if tag == "a" else []
        if tag == "label":
            self._label = found["for"]
            self.labels[self._label] = ""
        if tag in ("input", "select", "textarea"):
            self._open = Field(tag, found)
            self.fields.append(self._open)
        if tag == "option" and self._open is not None:
            self._open.values.append(found["value"])
            if "selected" in found or len(self._open.values) == 1:
                self._open.text = found["value"]

    def handle_endtag(self, tag: str) -> None:
        if tag == "label":
            self._label = None
        if tag in ("select", "textarea"):
            self._open = None

    def handle_data(self, data: str) -> None:
        self.text.append(data)
        if self._label is not None:
            self.labels[self._label] += data
        if self._open is not None and self._open.tag == "textarea":
            self._open.text += data.removeprefix("\n")

    def typed(self) -> dict[str, str]:
        """What the form of the page would post."""
        named = [one for one in self.fields if "name" in one.attributes and one.attributes.get("type") != "file"]
        return {one.attributes["name"]: one.value for one in named}
