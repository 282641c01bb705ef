"""What a form holds: texts by field path, as a tree.

A path is that of the definition, ``contents[1].mass_kg``. Names after a colon are the form's own: ``:way`` says
which way of giving a thing is chosen, ``:item`` marks a group that is there, ``:json`` carries what the form has no
field for. Groups can be added and removed; nothing that was typed is lost.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator
from dataclasses import dataclass, field

_PATH = re.compile(r"(?:[a-z][a-z0-9_]*(?:\.[a-z][a-z0-9_]*|\[\d{1,6}\])*)?(?::[a-z]+)?")
_STEP = re.compile(r"([a-z][a-z0-9_]*)|\[(\d+)\]|(:[a-z]+)")
_LONGEST_PATH = 160

Step = str | int


@dataclass
class Typed:
    """One place of the tree: its own text, and what lies below it."""

    text: str | None = None
    below: dict[Step, Typed] = field(default_factory=dict)

    def at(self, path: str) -> Typed:
        """The place of a path, made when it is not there."""
        place = self
        for step in steps(path):
            place = place.below.setdefault(step, Typed())
        return place

    def put(self, path: str, text: str) -> None:
        """Set the text of a path."""
        self.at(path).text = text

    def get(self, step: Step) -> Typed:
        """What lies below a step; an empty place when there is nothing."""
        return self.below.get(step, _NOTHING)

    def said(self, step: Step, default: str = "") -> str:
        """The text below a step."""
        text = self.get(step).text
        return default if text is None else text

    def items(self) -> list[int]:
        """The numbers of the repeated groups below, in order."""
        return sorted(step for step in self.below if isinstance(step, int))

    def remove(self, path: str) -> None:
        """Take away what lies at a path; later groups of the same list move up."""
        *before, last = steps(path)
        place = self
        for step in before:
            place = place.get(step)
        place.below.pop(last, None)
        place.renumber()

    def renumber(self) -> None:
        """Number the repeated groups from 0, all the way down."""
        items = [self.below.pop(number) for number in self.items()]
        self.below.update(enumerate(items))
        for place in self.below.values():
            place.renumber()

    def flat(self, path: str = "") -> Iterator[tuple[str, str]]:
        """Every path that has a text, with it."""
        if self.text is not None:
            yield path, self.text
        for step, place in self.below.items():
            yield from place.flat(join(path, step))


_NOTHING = Typed()


def read_typed(pairs: Iterable[tuple[str, str]]) -> Typed:
    """The tree of what a form posted; names that are no paths are passed over."""
    root = Typed()
    for name, text in pairs:
        if is_path(name):
            root.put(name, text.replace("\r\n", "\n"))
    root.renumber()
    return root


def is_path(name: str) -> bool:
    """Whether a name can be that of a field."""
    return len(name) <= _LONGEST_PATH and _PATH.fullmatch(name) is not None


def steps(path: str) -> list[Step]:
    """The steps of a path: names, numbers of repeated groups, and the form's own names."""
    return [int(number) if number else name or mark for name, number, mark in _STEP.findall(path)]


def join(path: str, step: Step) -> str:
    """A path one step longer."""
    if isinstance(step, int):
        return f"{path}[{step}]"
    if step.startswith(":") or not path:
        return f"{path}{step}"
    return f"{path}.{step}"
