"""The fields of a definition in the words of the form: for what was assumed, and for inputs read back on paper."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from app.answers import wording
from app.stores import StoreDefinition, definition_document
from app.web.form import Form, form_of, labels_around
from app.web.form_tree import Control, Listing, Node, walk
from app.web.form_values import typed_of
from app.web.form_words import KNOWN, WAYS


@dataclass(frozen=True)
class InputRow:
    """One input, read back."""

    name: str
    value: str


@dataclass(frozen=True)
class FieldWords:
    """Labels and units by field path, for one definition."""

    form: Form
    places: Mapping[str, Node]

    def label(self, path: str) -> str:
        """A field's label, behind those of the groups around it."""
        node = self.places.get(path)
        own = node.label if node is not None and node.label else path
        return ": ".join([*labels_around(path, self.places), own])

    def unit(self, path: str) -> str:
        """A field's unit; none where it has none."""
        node = self.places.get(path)
        return node.unit if isinstance(node, Control) else ""

    def inputs(self) -> tuple[InputRow, ...]:
        """Everything that was given, in the order of the form, with how it is known."""
        nodes = [node for part in self.form.sections for top in (*part.nodes, *part.folded) for node in walk(top)]
        return tuple(
            InputRow(self.label(node.path), _said(node))
            for node in nodes
            if isinstance(node, Control) and node.value and node.label not in _SAID_BY_OTHERS
        )


_SAID_BY_OTHERS = frozenset(WAYS[name].label for name in ("Face", "Layer"))
"""Choices of the form that the fields beneath them say again."""


def field_words(definition: StoreDefinition) -> FieldWords:
    """The words for the fields of a definition."""
    form = form_of(typed_of(definition_document(definition)))
    return FieldWords(form, {node.path: node for node in walk(form.root) if not isinstance(node, Listing)})


def _said(control: Control) -> str:
    """What was given, in words."""
    labels = {option.value: option.label for option in control.options}
    if control.options:
        return labels.get(control.value, control.value)
    if control.kind == "numbers":
        values = control.value.split()
        return f"{len(values)} values, {values[0]} to {values[-1]} {control.unit}".rstrip()
    value = f"{_typographic(control.value)} {control.unit}".rstrip()
    spread = f" ± {control.plus_minus}" if control.plus_minus else ""
    known = f" ({KNOWN.get(control.known, control.known)})" if control.known else ""
    return f"{value}{spread}{known}"


def _typographic(text: str) -> str:
    """A number's text as on paper; other texts as they are."""
    try:
        number = float(text)
    except ValueError:
        return text
    return wording.number_text(number, digits=6)
