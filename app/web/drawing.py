"""A small drawing of the store to scale: its front with walls cut open, doors, and contents by their volume."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

from app.answers import wording
from app.stores import StoreDefinition

_WIDTH, _HEIGHT, _EDGE, _FOOT = 320.0, 230.0, 8.0, 24.0
_UNKNOWN_WALL_M = 0.06
_GAP = 3.0

_FILLED_KG_PER_M3 = 600.0
"""Mass in a cubic metre of packed contents with the air between (common practice); for the drawing only."""


@dataclass(frozen=True)
class Box:
    """A rectangle of the drawing."""

    x: float
    y: float
    width: float
    height: float


@dataclass(frozen=True)
class Text:
    """Words in the drawing."""

    x: float
    y: float
    text: str


@dataclass(frozen=True)
class Drawing:
    """Everything the macro draws, in the units of its view box."""

    title: str
    caption: str
    width: float
    height: float
    is_wall_known: bool
    outer: Box
    inner: Box
    blocks: tuple[Box, ...]
    doors: tuple[Box, ...]
    texts: tuple[Text, ...]


def drawing_of(definition: StoreDefinition) -> Drawing:
    """The drawing of a store."""
    inside: Any = definition.enclosure.inside_m
    across_m = inside.diameter.value if hasattr(inside, "diameter") else inside.width.value
    high_m = inside.height.value
    known_m = _wall_m(definition)
    wall_m = _UNKNOWN_WALL_M if known_m is None else known_m
    room = (_WIDTH - 2 * _EDGE, _HEIGHT - _FOOT - 2 * _EDGE)
    scale = min(room[0] / (across_m + 2 * wall_m), room[1] / (high_m + 2 * wall_m))
    inner = _centred(scale * across_m, scale * high_m)
    words = f"{wording.number_text(across_m)} m wide, {wording.number_text(high_m)} m high inside"
    walls = "walls not drawn to scale" if known_m is None else f"walls {wording.number_text(1000 * wall_m, 'mm')}"
    return Drawing(
        title=f"The store to scale, {words}, {walls}",
        caption="To scale, seen from the front. Grey: walls. Blocks: contents by volume. Dashes: doors.",
        width=_WIDTH,
        height=_HEIGHT,
        is_wall_known=known_m is not None,
        outer=_centred(scale * (across_m + 2 * wall_m), scale * (high_m + 2 * wall_m)),
        inner=inner,
        blocks=_blocks(definition, inner),
        doors=_doors(definition, inner, scale),
        texts=(Text(_WIDTH / 2, _HEIGHT - 8.0, words),),
    )


def _wall_m(definition: StoreDefinition) -> float | None:
    faces, overall = definition.enclosure.faces, definition.enclosure.overall
    if faces is not None and faces.walls.layers:
        return sum(layer.thickness_m.value for layer in faces.walls.layers)
    if overall is not None and overall.wall_thickness_m is not None:
        return overall.wall_thickness_m.value
    return None


def _centred(width: float, height: float) -> Box:
    middle = (_HEIGHT - _FOOT) / 2
    return Box(round((_WIDTH - width) / 2, 1), round(middle - height / 2, 1), round(width, 1), round(height, 1))


def _blocks(definition: StoreDefinition, inner: Box) -> tuple[Box, ...]:
    """One block an item, side by side on the floor, as high as its share of the inside volume."""
    inside: Any = definition.enclosure.inside_m
    is_round = hasattr(inside, "diameter")
    floor_m2 = math.pi / 4 * inside.diameter.value**2 if is_round else inside.width.value * inside.depth.value
    count = len(definition.contents)
    width = (inner.width - _GAP * (count + 1)) / count
    if width <= 1.0:
        return ()
    blocks = []
    for index, contents in enumerate(definition.contents):
        volume_m3 = contents.mass_kg.value / _FILLED_KG_PER_M3
        share = min(volume_m3 * count / (floor_m2 * inside.height.value), 1.0)
        height = round(max(share * (inner.height - _GAP), 3.0), 1)
        x = inner.x + _GAP + index * (width + _GAP)
        blocks.append(Box(round(x, 1), round(inner.y + inner.height - height, 1), round(width, 1), height))
    return tuple(blocks)


def _doors(definition: StoreDefinition, inner: Box, scale: float) -> tuple[Box, ...]:
    """Doors in the walls, side by side from the left, standing on the floor."""
    doors, x = [], inner.x + 2 * _GAP
    for opening in definition.enclosure.openings:
        if opening.in_face == "walls":
            width = min(scale * opening.width_m.value, inner.width)
            height = min(scale * opening.height_m.value, inner.height)
            doors.append(Box(round(x, 1), round(inner.y + inner.height - height, 1), round(width, 1), round(height, 1)))
            x += width + 2 * _GAP
    return tuple(doors)
