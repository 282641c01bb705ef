"""The form as a page shows it: its tree in sections, in the order of a walk round the store, with faults in place.

A fault stands at the control it belongs to, or at the nearest group that is shown; the summary on top links there.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass

from app.errors import FieldFault
from app.web.form_tree import Control, Group, Node, form_tree, walk
from app.web.typed import Typed, join, steps


@dataclass(frozen=True)
class FormFault:
    """One fault: the place that shows it, where that lies in words, and what is wrong."""

    path: str
    where: str
    message: str


@dataclass(frozen=True)
class Section:
    """One stop of the walk; ``key`` is its place on the page."""

    key: str
    title: str
    hint: str
    nodes: tuple[Node, ...]
    folded: tuple[Node, ...] = ()


@dataclass(frozen=True)
class Form:
    """The form with its faults; ``kept`` is what was typed for ways that are not chosen now."""

    root: Group
    sections: tuple[Section, ...]
    faults: tuple[FormFault, ...] = ()
    kept: tuple[tuple[str, str], ...] = ()

    def faults_at(self, path: str) -> tuple[str, ...]:
        """Words of the faults that one place shows."""
        return tuple(fault.message for fault in self.faults if fault.path == path)

    def is_open(self, folded: tuple[Node, ...]) -> bool:
        """Whether a folded part must stand open: something is typed in it, or wrong."""
        nodes = [below for node in folded for below in walk(node)]
        wrong = {fault.path for fault in self.faults}
        return any(node.path in wrong or (isinstance(node, Control) and not node.is_blank) for node in nodes)


@dataclass(frozen=True)
class _Stop:
    key: str
    title: str
    hint: str
    paths: tuple[str, ...]
    folded: tuple[str, ...] = ()


_WALK = (
    _Stop(
        "size",
        "Size and walls",
        "Inside dimensions, and what is known of the insulation. Nobody knows everything: take the way you have "
        "figures for.",
        (
            "name",
            "enclosure.shape",
            "enclosure.inside_m",
            "enclosure:way",
            "enclosure.faces",
            "enclosure.overall",
        ),
        ("enclosure.bridges_w_per_k", "enclosure.fittings", "enclosure.edge_factors"),
    ),
    _Stop("door", "Door or lid", "Shut, with its seals as they are.", ("enclosure.openings",)),
    _Stop(
        "inside",
        "What is inside, and what it must not pass",
        "One item for each kind or lot: how much, how warm it is held, how it stands, its limits.",
        ("contents",),
    ),
    _Stop("coolants", "Coolants", "Ice, packs and plates that are in the store at the loss of power.", ("coolants",)),
    _Stop("room", "Room around it", "", ("surroundings.room", "surroundings.outdoors")),
    _Stop(
        "limits",
        "Limits on the air, the start, and how far to look",
        "",
        ("air_limits", "start.air_c", "outage.horizon_h"),
    ),
)


def form_of(typed: Typed, faults: Iterable[FieldFault] = ()) -> Form:
    """The form for what was typed, with its faults."""
    root = form_tree(typed)
    by_path = {node.path: node for node in walk(root)}
    sections = tuple(_section(stop, by_path) for stop in _WALK)
    carried = tuple(_carried(root))
    if carried:
        hint = "What the opened file holds besides. Clear a box to leave it out."
        sections += (Section("other", "Other parts of the file", hint, carried),)
    places = {node.path: node for part in sections for top in (*part.nodes, *part.folded) for node in walk(top)}
    shown = {name for node in places.values() for name in _names(node)}
    kept = tuple((path, text) for path, text in typed.flat() if path not in shown)
    placed = tuple(dict.fromkeys(_placed(fault, places) for fault in faults))
    return Form(root, sections, placed, kept)


def _section(stop: _Stop, by_path: Mapping[str, Node]) -> Section:
    nodes = tuple(by_path[path] for path in stop.paths if path in by_path)
    return Section(stop.key, stop.title, stop.hint, nodes, tuple(by_path[path] for path in stop.folded))


def _carried(root: Group) -> Iterator[Control]:
    for node in walk(root):
        if isinstance(node, Group) and node.carried:
            label = f"In {node.label}" if node.label else "In the whole"
            yield Control(f"{node.path}:json", "carried", label, node.carried)


def _names(node: Node) -> tuple[str, ...]:
    """Names of the inputs that a node shows."""
    if isinstance(node, Control):
        extra = (f"{node.path}.plus_minus", f"{node.path}.known") if node.kind == "quantity" else ()
        return (node.path, *extra)
    return (f"{node.path}:item",) if isinstance(node, Group) and node.removable else ()


def _placed(fault: FieldFault, places: Mapping[str, Node]) -> FormFault:
    """A fault at the nearest place that the form shows, in the words of the form."""
    path = fault.field
    while path and path not in places:
        path = path[: max(path.rfind("."), path.rfind("["), path.rfind(":"), 0)]
    return FormFault(path, ", ".join(labels_around(path, places)), _message(fault, places.get(path)))


def labels_around(path: str, places: Mapping[str, Node]) -> list[str]:
    """Labels of the groups around a place, from the outside in."""
    labels, here = [], ""
    for step in steps(path)[:-1]:
        here = join(here, step)
        node = places.get(here)
        if isinstance(node, Group) and node.label:
            labels.append(node.label)
    return labels


def _message(fault: FieldFault, node: Node | None) -> str:
    is_missing = fault.message.endswith(" is missing.") and isinstance(node, Control) and node.path == fault.field
    if not is_missing or not isinstance(node, Control):
        return fault.message
    label = node.label[0].lower() + node.label[1:] if node.label[1:2].islower() else node.label
    if node.options:
        return f"Choose the {label}."
    return f"Enter the {label}, in {node.words}." if node.words else f"Enter the {label}."
