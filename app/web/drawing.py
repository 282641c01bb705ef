"""A small drawing of the store to scale: a section through its walls, with its contents as blocks."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from app.stores import StoreDefinition

_WIDTH, _HEIGHT, _EDGE = 320.0, 240.0, 26.0
_UNKNOWN_WALL_M = 0.06


@dataclass(frozen=True)
class Box:
    """A rectangle of the drawing."""

    x: float
    y: float
    width: float
    height: float


@dataclass(frozen=True)
class Text:
    """A word of the drawing."""

    x: float
    y: float
    text: str


@dataclass(frozen=True)
class Drawing:
    """Section through a store, in the units of its view box."""

    title: str
    width: float
    height: float
    outer: Box
    inner: Box
    blocks: tuple[Box, ...]
    texts: tuple[Text, ...]


def drawing_of(definition: StoreDefinition) -> Drawing:
    """The drawing of a store: outer wall, inside, and the share of its volume that the contents take."""
    inside: Any = definition.enclosure.inside_m
    across = inside.diameter.value if hasattr(inside, "diameter") else inside.width.value
    high = inside.height.value
    wall_m = _wall_m(definition)
    scale = min((_WIDTH - 2 * _EDGE) / (across + 2 * wall_m), (_HEIGHT - 2 * _EDGE) / (high + 2 * wall_m))
    outer = _centred(scale * (across + 2 * wall_m), scale * (high + 2 * wall_m))
    inner = _centred(scale * across, scale * high)
    blocks = _blocks(definition, inner)
    texts = (Text(_WIDTH / 2, _HEIGHT - 6, f"{across:g} m wide, {high:g} m high, walls {1000 * wall_m:.0f} mm"),)
    return Drawing("Section to scale: walls, inside, contents by volume", _WIDTH, _HEIGHT, outer, inner, blocks, texts)


def _wall_m(definition: StoreDefinition) -> float:
    faces, overall = definition.enclosure.faces, definition.enclosure.overall
    if faces is not None and faces.walls.layers:
        return sum(layer.thickness_m.value for layer in faces.walls.layers)
    if overall is not None and overall.wall_thickness_m is not None:
        return overall.wall_thickness_m.value
    return _UNKNOWN_WALL_M


def _centred(width: float, height: float) -> Box:
    return Box(round((_WIDTH - width) / 2, 1), round((_HEIGHT - 12 - height) / 2, 1), round(width, 1), round(height, 1))


def _blocks(definition: StoreDefinition, inner: Box) -> tuple[Box, ...]:
    """One block an item, side by side on the floor, as high as its share of the inside volume."""
    inside: Any = definition.enclosure.inside_m
    floor_m2 = (
        0.785 * inside.diameter.value**2 if hasattr(inside, "diameter") else inside.width.value * inside.depth.value
    )
    count = len(definition.contents)
    gap = 4.0
    width = (inner.width - gap * (count + 1)) / count
    if width <= 1.0:
        return ()
    blocks = []
    for index, contents in enumerate(definition.contents):
        volume = contents.mass_kg.value / _USUAL_DENSITY_KG_PER_M3
        share = min(volume * count / (floor_m2 * inside.height.value), 1.0)
        height = round(max(share * (inner.height - 4.0), 3.0), 1)
        x = inner.x + gap + index * (width + gap)
        blocks.append(Box(round(x, 1), round(inner.y + inner.height - height, 1), round(width, 1), height))
    return tuple(blocks)


_USUAL_DENSITY_KG_PER_M3 = 600.0
"""Of packed contents with the air between: for the drawing only."""
