"""The form as a tree: controls, groups and lists, from the definition's models and from what was typed.

``form_tree`` is the only way in. What the chosen ways do not ask is not in the tree. Called by ``form``.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from typing import ClassVar

from pydantic import BaseModel

from app.stores import StoreDefinition
from app.web.choices import Option, OptionGroup, grouped, options_of
from app.web.form_words import CHOICES, FOLDED, ITEMS, LABELS, LINKED, UNLESS_GIVEN, WAYS, Way, Ways
from app.web.schema import Question, Variant, questions
from app.web.typed import Typed, join, steps


@dataclass(frozen=True)
class Control:
    """One control: a number with how it is known, a text, a choice. ``is_blank``: nothing but its default is there."""

    part: ClassVar[str] = "control"

    path: str
    kind: str
    label: str
    value: str
    required: bool = False
    unit: str = ""
    words: str = ""
    hint: str = ""
    options: tuple[Option, ...] = ()
    changes_form: bool = False
    plus_minus: str = ""
    known: str = ""
    is_blank: bool = False

    @property
    def name(self) -> str:
        """Name of the field in its group."""
        return str(steps(self.path)[-1])

    @property
    def option_groups(self) -> tuple[OptionGroup, ...]:
        """What can be chosen, by kind."""
        return grouped(self.options)


@dataclass(frozen=True)
class Group:
    """Controls that belong together. ``word`` stands for the whole group where a variant is just a word."""

    part: ClassVar[str] = "group"

    path: str
    label: str
    nodes: tuple[Node, ...] = ()
    folded: tuple[Node, ...] = ()
    fixed: Mapping[str, str] = field(default_factory=dict)
    word: str = ""
    carried: str = ""
    removable: bool = False

    @property
    def name(self) -> str:
        """Name of the field in its group."""
        return str(steps(self.path)[-1]) if self.path else ""

    @property
    def is_named_by_first(self) -> bool:
        """Whether its first control says what the group is, so that a heading would say it twice."""
        first = self.nodes[0] if self.nodes else None
        return isinstance(first, Control) and first.label == self.label

    @property
    def list_path(self) -> str:
        """Where the list lies that this group is a member of; its own place for a group that stands alone."""
        return self.path[: self.path.rfind("[")] if self.path.endswith("]") else self.path


@dataclass(frozen=True)
class Listing:
    """Groups that can be added and removed; ``is_single`` for one group that may be left out."""

    part: ClassVar[str] = "listing"

    path: str
    label: str
    items: tuple[Group, ...]
    add: str
    is_single: bool = False

    @property
    def name(self) -> str:
        """Name of the field in its group."""
        return str(steps(self.path)[-1])

    @property
    def can_add(self) -> bool:
        """Whether there may be one more."""
        return not (self.is_single and self.items)

    @property
    def next_path(self) -> str:
        """Where the next group will stand."""
        return self.path if self.is_single else join(self.path, len(self.items))


Node = Control | Group | Listing


def form_tree(typed: Typed) -> Group:
    """The whole definition as a tree of what is asked, filled with what was typed."""
    return _group(StoreDefinition, typed, "", "")


def walk(node: Node) -> Iterator[Node]:
    """A node and all below it, in the order of the form."""
    yield node
    if isinstance(node, Group):
        for below in (*node.nodes, *node.folded):
            yield from walk(below)
    elif isinstance(node, Listing):
        for item in node.items:
            yield from (item_node for item_node in walk(item) if item_node.path != node.path)


def _group(
    model: type[BaseModel],
    typed: Typed,
    path: str,
    label: str,
    *,
    first: tuple[Control, ...] = (),
    removable: bool = False,
) -> Group:
    """The group of a model: its fields in order, the way before those that it chooses, rarely used ones folded."""
    ways = WAYS.get(model.__name__)
    way = ways.of(typed.said(":way")) if ways else None
    nodes: list[Node] = list(first)
    folded: list[Node] = []
    for question in _asked(model, typed, ways, way):
        if ways and way and question.name in ways.names and not _has_way(nodes):
            nodes.append(_way_control(ways, way.key, path))
        forced = (way.variant.get(question.name, "") if way else "") or _linked(question.name, typed)
        is_chosen = ways is not None and question.name in ways.names
        node = _node(question, typed.get(question.name), join(path, question.name), forced, is_chosen)
        (folded if question.name in FOLDED.get(model.__name__, ()) else nodes).append(node)
    if ways and way and not _has_way(nodes):
        nodes.insert(1, _way_control(ways, way.key, path))
    fixed = way.fixed if way else {}
    return Group(path, label, tuple(nodes), tuple(folded), fixed, carried=typed.said(":json"), removable=removable)


def _asked(model: type[BaseModel], typed: Typed, ways: Ways | None, way: Way | None) -> Iterator[Question]:
    """The fields that the form asks for: of the chosen way, and not those that change no answer yet."""
    for question in questions(model):
        is_of_other_way = ways and way and question.name in ways.names and question.name not in way.fields
        is_unused = question.name in UNLESS_GIVEN and question.name not in typed.below
        if question.kind != "other" and not is_of_other_way and not is_unused:
            yield question


def _has_way(nodes: list[Node]) -> bool:
    return any(isinstance(node, Control) and node.name == ":way" for node in nodes)


def _linked(name: str, typed: Typed) -> str:
    """The variant that another field chooses for this one."""
    if name not in LINKED:
        return ""
    sibling, variants = LINKED[name]
    return variants.get(typed.said(sibling), next(iter(variants.values())))


def _way_control(ways: Ways, key: str, path: str) -> Control:
    options = tuple(Option(way.key, way.label) for way in ways.ways)
    return Control(f"{path}:way", "choice", ways.label, key, required=True, options=options, changes_form=True)


def _node(question: Question, typed: Typed, path: str, forced: str, is_chosen: bool) -> Node:
    """The control, group or list of one field."""
    label = LABELS.get(question.name, question.ask.label)
    if question.kind == "list":
        return _listing(question, typed, path)
    if question.kind in ("group", "variants"):
        if question.required or is_chosen or question.default is not None:
            return _member(question, typed, path, label, forced=forced)
        items = (_member(question, typed, path, label, removable=True),) if typed.below else ()
        return Listing(path, "", items, ITEMS[question.name][1], is_single=True)
    return _control(question, typed, path)


def _listing(question: Question, typed: Typed, path: str) -> Listing:
    called, add = ITEMS.get(question.name, (question.ask.label, "Add one"))
    items = []
    for number in typed.items():
        item = typed.get(number)
        name = item.said("name")
        label = f"{called} {number + 1}" + (f": {name}" if name else "")
        items.append(_member(question, item, join(path, number), label, removable=True))
    return Listing(path, question.ask.label, tuple(items), add)


def _member(
    question: Question, typed: Typed, path: str, label: str, *, forced: str = "", removable: bool = False
) -> Group:
    """The group of one field or of one member of a list, in the variant that is chosen."""
    if question.kind == "group" or len(question.variants) == 1:
        return _group(question.model, typed, path, label, removable=removable)
    key = forced or typed.said(question.selector) or _first_key(question)
    variant = next((one for one in question.variants if one.key == key), Variant(key, None))
    first = () if forced else (_selector(question, key, path),)
    if variant.model is None:
        is_word = not forced and question.selector == ":way"
        return Group(path, label, first, word=key if is_word else "", carried=typed.said(":json"), removable=removable)
    return _group(variant.model, typed, path, label, first=first, removable=removable)


def _first_key(question: Question) -> str:
    return question.default if isinstance(question.default, str) else question.variants[0].key


def _selector(question: Question, key: str, path: str) -> Control:
    """The control that chooses between variants; what an opened file names and nobody knows stays to be seen."""
    labels = CHOICES.get(question.name, {})
    options = tuple(Option(one.key, labels.get(one.key, one.key.replace("_", " "))) for one in question.variants)
    if key not in {option.value for option in options}:
        options += (Option(key, f"{key} (not known)"),)
    called = "Kind of limit" if question.kind == "list" else question.ask.label
    return Control(join(path, question.selector), "choice", called, key, True, options=options, changes_form=True)


def _control(question: Question, typed: Typed, path: str) -> Control:
    value = "" if typed.text is None else typed.text
    options = options_of(question, value)
    default = _default_choice(question) if options else ""
    value = default if typed.text is None else value
    return Control(
        path=path,
        kind="choice" if options else question.kind,
        label=question.ask.label,
        value=value,
        required=question.required,
        unit=question.ask.unit,
        words=question.ask.words,
        hint=_hint(question),
        options=options,
        changes_form=any(question.name == sibling for sibling, _ in LINKED.values()),
        plus_minus=typed.said("plus_minus"),
        known=typed.said("known"),
        is_blank=value in ("", default),
    )


def _default_choice(question: Question) -> str:
    if isinstance(question.default, bool):
        return "yes" if question.default else "no"
    return "" if question.default is None else str(question.default)


def _hint(question: Question) -> str:
    """The field's own hint, and what stands in for a number that is left out."""
    hint = question.ask.hint
    default = getattr(question.default, "value", question.default)
    if isinstance(default, (int, float)) and not isinstance(default, bool):
        hint = f"{hint} Left blank: {default:g}.".strip()
    return hint
