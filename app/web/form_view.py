"""The form as a tree of controls, ready for the templates: words, choices, what was typed, faults beside it."""

from __future__ import annotations

from dataclasses import dataclass, field

from pydantic import BaseModel

from app.errors import FieldFault
from app.stores import StoreDefinition
from app.web.form_data import Typed, asked, count_of, join, way_of
from app.web.shapes import LABELS, WAYS, FormField, Shape, table_choices

KNOWN_CHOICES = (("", "not said"), *((key, LABELS[key]) for key in ("measured", "data_sheet", "estimated", "typical")))

_FOLDED = {
    "bridges_w_per_k",
    "fittings",
    "edge_factors",
    "films_w_per_m2_k",
    "film_w_per_m2_k",
    "packaging",
    "outdoors",
    "air_limits",
    "wall_mass_kg",
    "inside_area_m2",
    "wall_thickness_m",
    "relative_humidity",
    "volume_m3",
    "air_changes_per_h",
    "place",
    "test_load_food",
    "area_m2_coolant",
}
"""Rarely used fields: they stand in a folded part unless something is typed in them."""


@dataclass(frozen=True)
class Control:
    """One control, or a group of them.

    ``kind`` is number, text, choice, flag, lines, group, list, hidden; ``error`` the fault beside it; ``way`` the
    choice between alternatives that stands above a group's children.
    """

    kind: str
    path: str
    label: str
    unit: str = ""
    words: str = ""
    hint: str = ""
    typed: str = ""
    error: str = ""
    is_optional: bool = False
    choices: tuple[tuple[str, str], ...] = ()
    has_spread: bool = False
    known: str = ""
    plus_minus: str = ""
    way: str = ""
    ways: tuple[tuple[str, str], ...] = ()
    children: tuple[Control, ...] = ()
    folded: tuple[Control, ...] = ()
    is_open: bool = False
    count: int = 0
    item_label: str = ""
    is_wide: bool = False

    @property
    def id(self) -> str:
        """An id for the page: the path in letters, digits and dashes."""
        return self.path.replace("[", "-").replace("]", "").replace(".", "-").replace(":", "-") or "store"

    def flat(self) -> list[Control]:
        """This control and all below it."""
        return [self, *(inner for child in (*self.children, *self.folded) for inner in child.flat())]


@dataclass(frozen=True)
class FormView:
    """The whole form: its sections in the order in which one walks round a store, and all faults."""

    sections: tuple[Control, ...]
    hidden: tuple[Control, ...]
    faults: tuple[FaultView, ...] = field(default=())


@dataclass(frozen=True)
class FaultView:
    """One fault for the summary on top: where it leads, and its words."""

    href: str
    text: str


def form_view(typed: Typed, faults: tuple[FieldFault, ...] = ()) -> FormView:
    """The controls of a definition's form, with what was typed and the faults that were found."""
    by_path: dict[str, str] = {}
    for fault in faults:
        by_path.setdefault(fault.field, fault.message)
    controls = {control.path: control for control in _controls(StoreDefinition, typed, "", by_path)}
    enclosure = controls.pop("enclosure")
    order = [_named(enclosure, "Size and walls, door"), controls["contents"], controls["coolants"]]
    order += [controls["surroundings"], controls["start"], controls["outage"], controls["air_limits"]]
    sections = (_section("name", "The store", (controls["name"],)), *order)
    shown = {control.path: control for section in sections for control in section.flat()}
    views = tuple(_fault_view(fault, shown) for fault in faults)
    hidden = tuple(control for section in sections for control in section.flat() if control.kind == "hidden")
    return FormView(sections, hidden, views)


def _section(path: str, label: str, children: tuple[Control, ...]) -> Control:
    return Control("group", f"{path}:section", label, children=children)


def _named(control: Control, label: str) -> Control:
    return Control(
        control.kind,
        control.path,
        label,
        error=control.error,
        way=control.way,
        ways=control.ways,
        children=control.children,
        folded=control.folded,
        is_open=control.is_open,
    )


def _fault_view(fault: FieldFault, shown: dict[str, Control]) -> FaultView:
    """A link to the control of a fault, or to the nearest one around it."""
    path = fault.field
    while path and path not in shown:
        cut = max(path.rfind("."), path.rfind("["))
        path = path[:cut] if cut > 0 else ""
    href = f"#{shown[path].id}" if path else "#form"
    return FaultView(href, fault.message)


def _controls(model: type[BaseModel], typed: Typed, path: str, errors: dict[str, str]) -> list[Control]:
    return [_control(one, typed, join(path, one.name), errors) for one in asked(model, typed, path)]


def _control(one: FormField, typed: Typed, path: str, errors: dict[str, str]) -> Control:
    shape, error = one.shape, errors.get(path, "")
    if shape.kind == "list":
        return _list(one, typed, path, errors)
    if shape.kind in ("group", "either"):
        return _group(one, shape, typed, path, errors)
    if shape.kind == "carried":
        return Control("hidden", path, one.ask.label, typed=typed.get(path, ""))
    choices: tuple[tuple[str, str], ...] = tuple((key, LABELS.get(key, key)) for key in shape.choices)
    kind = {"quantity": "number", "number": "number", "whole": "number", "numbers": "lines"}.get(shape.kind, shape.kind)
    rows = table_choices(one.name)
    if rows is not None:
        kind, choices = "choice", (("", "Choose ..."), *rows)
    if shape.kind == "flag":
        kind, choices = "choice", (("yes", "yes"), ("no", "no"))
    text = typed.get(path, _default_text(one) if ":given" not in typed else "")
    if kind == "choice" and not text:
        text = _default_text(one)
    return Control(
        kind,
        path,
        one.ask.label,
        one.ask.unit,
        one.ask.words,
        one.ask.hint,
        text,
        error,
        one.is_optional,
        choices,
        has_spread=shape.kind == "quantity",
        known=typed.get(f"{path}:known", ""),
        plus_minus=typed.get(f"{path}:plus_minus", ""),
    )


def _default_text(one: FormField) -> str:
    default = getattr(one.default, "value", one.default)
    if isinstance(default, bool):
        return "yes" if default else "no"
    return f"{default:g}" if isinstance(default, (int, float)) else default if isinstance(default, str) else ""


def _group(one: FormField, shape: Shape, typed: Typed, path: str, errors: dict[str, str]) -> Control:
    """A part of the definition: its own fields, or the fields of the alternative that is chosen."""
    model, way, ways = shape.model, "", ()
    if shape.kind == "either":
        chosen = typed.get(f"{path}:way", "")
        blank = (("", "not given"),) if one.is_optional and one.name not in ("overall", "beyond") else ()
        ways = (*blank, *((option.key, LABELS.get(option.key, option.key)) for option in shape.options))
        way = chosen if chosen in dict(ways) else ways[0][0]
        model = next((option.model for option in shape.options if option.key == way), None)
    elif one.is_optional and one.name not in ("faces", "start", "outage"):
        ways = (("", "not given"), ("given", "given"))
        way = typed.get(f"{path}:way", "")
        model = shape.model if way else None
    return _part(model, typed, path, errors, one.ask.label, way, ways)


def _part(
    model: type[BaseModel] | None,
    typed: Typed,
    path: str,
    errors: dict[str, str],
    label: str,
    way: str,
    ways: tuple[tuple[str, str], ...],
) -> Control:
    children = _controls(model, typed, path, errors) if model is not None else []
    if model is not None and model in WAYS:
        ways = tuple((key, LABELS[key]) for key in WAYS[model])
        way = way_of(model, typed, path)
    shown = tuple(child for child in children if not _is_folded(child, typed))
    folded = tuple(child for child in children if _is_folded(child, typed))
    return Control(
        "group",
        path,
        label,
        error=errors.get(path, ""),
        way=way,
        ways=ways,
        children=shown,
        folded=folded,
        is_open=any(inner.error for child in folded for inner in child.flat()),
    )


def _is_folded(control: Control, typed: Typed) -> bool:
    name = control.path.rsplit(".", 1)[-1]
    if name not in _FOLDED or control.kind == "hidden":
        return False
    return not any(
        key == control.path or key.startswith((f"{control.path}[", f"{control.path}."))
        for key, text in typed.items()
        if text not in ("", "0", "middle", "yes") and not key.endswith(":way")
    )


def _list(one: FormField, typed: Typed, path: str, errors: dict[str, str]) -> Control:
    """A list of parts, each with a name of its own and a way to remove it."""
    shape = one.shape.item
    assert shape is not None
    singular = _SINGULAR.get(one.name, one.ask.label)
    children = []
    for index in range(count_of(typed, path)):
        at = f"{path}[{index}]"
        entry = FormField("entry", one.ask, shape, False, None)
        label = typed.get(f"{at}.name", "") or f"{singular} {index + 1}"
        children.append(_named(_group(entry, shape, typed, at, errors), label))
    return Control(
        "list",
        path,
        one.ask.label,
        error=errors.get(path, ""),
        children=tuple(children),
        count=len(children),
        item_label=singular.lower(),
    )


_SINGULAR = {
    "layers": "Layer",
    "openings": "Opening",
    "fittings": "Fitting",
    "contents": "Item",
    "packaging": "Packaging",
    "limits": "Limit",
    "coolants": "Coolant",
    "air_limits": "Limit on the air",
}
