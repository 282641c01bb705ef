"""A store as a thermal network: bodies that hold heat, joined to a tree, and the surroundings.

Body 0 is the inside air. Every other body hangs on a parent with a lower index (wall cells and shells of
contents are chains), so the heat balance is solved leaf to root without a matrix. ``build_network`` turns
these dataclasses into the arrays that ``march`` reads; ``stack`` puts many networks end to end, so that one
store is a batch of one. What the numbers mean physically is decided in ``stores.network_of``.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field, replace

import numpy as np
from numpy.typing import NDArray

from app.engine.histories import History, pieces_of
from app.physics import EnthalpyCurve, FilmLaw

Floats = NDArray[np.float64]
Whole = NDArray[np.int64]
Records = NDArray[np.void]
"""Arrays of the engine; the kinds of records stand below."""

FIXED, SERIES, FILM = 0, 1, 2
"""Links to the parent: a conductance; a resistance with paths through bodies that may melt; still air."""

BODY_TEMPERATURE, SURFACE, WARMEST, COLDEST, MEAN, MELTED, SOLID_LEFT = 0, 1, 2, 3, 4, 5, 6
"""Quantities that a watch traces. Temperatures in °C; MELTED and SOLID_LEFT as shares of full freezing."""

BODY = np.dtype(
    [
        ("parent", np.int64),
        ("link", np.int64),
        ("conductance_w_per_k", np.float64),
        ("resistance_k_per_w", np.float64),
        ("near_path_per_m", np.float64),
        ("far_path_per_m", np.float64),
        ("area_m2", np.float64),
        ("base", np.float64),
        ("gain", np.float64),
        ("is_sixth", np.float64),
        ("reference_c", np.float64),
        ("per_k", np.float64),
        ("emissivity", np.float64),
        ("conductivity_liquid", np.float64),
        ("conductivity_solid", np.float64),
        ("resistivity", np.float64),
        ("first_segment", np.int64),
        ("segments", np.int64),
        ("start_segment", np.int64),
        ("start_j", np.float64),
        ("least_k_per_j", np.float64),
        ("tolerance_k", np.float64),
        ("mass_kg", np.float64),
    ]
)
SEGMENT = np.dtype(
    [
        ("shape", np.int64),
        ("start_c", np.float64),
        ("end_c", np.float64),
        ("start_j", np.float64),
        ("end_j", np.float64),
        ("capacity_j_per_k", np.float64),
        ("k_per_j", np.float64),
        ("bend", np.float64),
        ("ice_start", np.float64),
        ("ice_end", np.float64),
        ("end_tolerance_j", np.float64),
    ]
)
BOUNDARY = np.dtype([("body", np.int64), ("drive", np.int64), ("conductance_w_per_k", np.float64), ("path", np.int64)])
WATCH = np.dtype(
    [
        ("quantity", np.int64),
        ("first_body", np.int64),
        ("last_body", np.int64),
        ("first_segment", np.int64),
        ("segments", np.int64),
        ("full", np.float64),
    ]
)

_KINK_FRACTION = 0.02
"""A break of a curve where the capacity jumps by more than this share ends a step."""

_KINK_TOLERANCE_K = 1e-3
"""How far, in temperature, a step may carry a body past such a break before it is cut there."""


@dataclass(frozen=True)
class FixedLink:
    """A conductance to the parent that does not change."""

    conductance_w_per_k: float


@dataclass(frozen=True)
class FilmLink:
    """A surface in still air: convection and radiation to the parent, behind the body's own half path.

    ``near_path_per_m`` is the path from the body's middle to its surface over the area: R = path / k.
    """

    area_m2: float
    law: FilmLaw
    emissivity: float
    near_path_per_m: float


@dataclass(frozen=True)
class SteadyFilmLink:
    """As ``FilmLink``, with a film coefficient that somebody gave, convection and radiation together."""

    area_m2: float
    film_w_per_m2_k: float
    near_path_per_m: float


@dataclass(frozen=True)
class CellLink:
    """Conduction to the parent's cell through half of each: R = near / k of this + far / k of the parent."""

    near_path_per_m: float
    far_path_per_m: float


Link = FixedLink | FilmLink | SteadyFilmLink | CellLink


@dataclass(frozen=True)
class Body:
    """Something that holds heat. ``curve`` is per kilogram, ``mass_kg`` says how many; body 0 has no link.

    ``tolerance_k`` is the temperature error allowed in one step: small where the hold time hangs on it.
    """

    name: str
    parent: int
    link: Link | None
    curve: EnthalpyCurve
    mass_kg: float
    start_c: float
    tolerance_k: float


@dataclass(frozen=True)
class Boundary:
    """A fixed conductance between a body and one of the surroundings; ``path`` names the way of the heat."""

    body: int
    history: int
    conductance_w_per_k: float
    path: str


@dataclass(frozen=True)
class Watch:
    """A quantity to trace: of one body, or of an item made of the bodies ``first`` to ``last`` inclusive.

    An item's bodies follow each other from its surface inwards.
    """

    name: str
    quantity: int
    first_body: int
    last_body: int


@dataclass(frozen=True)
class Network:
    """One store, ready to march: arrays of BODY, SEGMENT, BOUNDARY, PIECE and WATCH, and the names of rows.

    ``piece_starts`` has shape (n_histories + 1,); ``stops_s`` are the times at which a step must end.
    """

    bodies: NDArray[np.void]
    segments: NDArray[np.void]
    boundaries: NDArray[np.void]
    pieces: NDArray[np.void]
    piece_starts: NDArray[np.int64]
    stops_s: NDArray[np.float64]
    watches: NDArray[np.void]
    body_names: tuple[str, ...]
    path_names: tuple[str, ...]
    watch_names: tuple[str, ...]


def build_network(
    bodies: Sequence[Body],
    boundaries: Sequence[Boundary],
    histories: Sequence[History],
    watches: Sequence[Watch],
) -> Network:
    """Lay out a network as arrays; the bodies' order is kept, parents before children."""
    tables = _Tables()
    body_rows = [tables.body_row(index, body) for index, body in enumerate(bodies)]
    watch_rows = [tables.watch_row(watch, bodies) for watch in watches]
    paths = tuple(dict.fromkeys(boundary.path for boundary in boundaries))
    pieces = [pieces_of(history) for history in histories]
    stops = np.unique(np.concatenate([_kinks_s(p) for p in pieces])) if pieces else np.empty(0)
    return Network(
        bodies=np.array(body_rows, dtype=BODY),
        segments=np.array(tables.segment_rows, dtype=SEGMENT),
        boundaries=np.array(
            [(b.body, b.history, b.conductance_w_per_k, paths.index(b.path)) for b in boundaries],
            dtype=BOUNDARY,
        ),
        pieces=np.concatenate(pieces),
        piece_starts=np.cumsum([0] + [len(p) for p in pieces]),
        stops_s=stops,
        watches=np.array(watch_rows, dtype=WATCH),
        body_names=tuple(body.name for body in bodies),
        path_names=paths,
        watch_names=tuple(watch.name for watch in watches),
    )


def with_mean_watches(network: Network, watches: Sequence[Watch], curve: EnthalpyCurve) -> Network:
    """The same network with other watches: means of some bodies that share one curve."""
    tables = _Tables([tuple(row) for row in network.segments])
    rows = []
    for watch in watches:
        mass_kg = float(network.bodies["mass_kg"][watch.first_body : watch.last_body + 1].sum())
        rows.append((MEAN, watch.first_body, watch.last_body, *tables.curve_rows(curve, mass_kg), 0.0))
    return replace(
        network,
        segments=np.array(tables.segment_rows, dtype=SEGMENT),
        watches=np.array(rows, dtype=WATCH),
        watch_names=tuple(watch.name for watch in watches),
    )


@dataclass
class _Tables:
    """The segment rows as they grow while bodies and watches are laid out."""

    segment_rows: list[tuple[float, ...]] = field(default_factory=list)

    def curve_rows(self, curve: EnthalpyCurve, mass_kg: float) -> tuple[int, int]:
        first = len(self.segment_rows)
        full = curve.ice_full if curve.ice_full > 0.0 else 1.0
        for index, segment in enumerate(curve.segments):
            last = index + 1 == len(curve.segments)
            self.segment_rows.append(
                (
                    segment.shape,
                    segment.start_c,
                    segment.end_c,
                    segment.start_j_per_kg * mass_kg,
                    math.inf if last else segment.end_j_per_kg * mass_kg,
                    segment.capacity_j_per_kg_k * mass_kg,
                    1.0 / (segment.capacity_j_per_kg_k * mass_kg),
                    segment.bend * mass_kg,
                    segment.ice_start / full,
                    segment.ice_end / full,
                    math.inf if last else _tolerance_j_per_kg(curve, index) * mass_kg,
                )
            )
        return first, len(curve.segments)

    def body_row(self, index: int, body: Body) -> tuple[float, ...]:
        if not 0 <= body.parent < max(index, 1):
            raise ValueError(f"{body.name}: a parent must come before its children")
        first, count = self.curve_rows(body.curve, body.mass_kg)
        start = body.curve.enthalpy_j_per_kg(body.start_c)
        capacity = min(s.capacity_j_per_kg_k for s in body.curve.segments if math.isfinite(s.capacity_j_per_kg_k))
        return (
            body.parent,
            *_link_columns(body.link),
            body.curve.conductivity_liquid_w_per_m_k,
            body.curve.conductivity_solid_w_per_m_k,
            1.0 / body.curve.conductivity_liquid_w_per_m_k,
            first,
            count,
            body.curve.segment_at(start),
            start * body.mass_kg,
            # what error is worth on a plateau, where enthalpy moves no temperature
            0.2 / (capacity * body.mass_kg),
            body.tolerance_k,
            body.mass_kg,
        )

    def watch_row(self, watch: Watch, bodies: Sequence[Body]) -> tuple[float, ...]:
        item = bodies[watch.first_body : watch.last_body + 1]
        mass_kg = sum(body.mass_kg for body in item)
        first, count = self.curve_rows(item[0].curve, mass_kg) if watch.quantity == MEAN else (0, 0)
        start_ice = [
            body.curve.ice_kg_per_kg(body.curve.enthalpy_j_per_kg(body.start_c)) * body.mass_kg for body in item
        ]
        full = mass_kg * (item[0].curve.ice_full or 1.0)
        return (watch.quantity, watch.first_body, watch.last_body, first, count, sum(start_ice) / full)


def _link_columns(link: Link | None) -> tuple[float, ...]:
    """The columns of BODY from ``link`` to ``emissivity``."""
    nothing = (0.0, 0.0, 0.0, 1.0, 0.0, 0.0, 0.0)
    if isinstance(link, CellLink):
        return SERIES, 0.0, 0.0, link.near_path_per_m, link.far_path_per_m, *nothing
    if isinstance(link, SteadyFilmLink):
        resistance = 1.0 / (link.film_w_per_m2_k * link.area_m2)
        return SERIES, 0.0, resistance, link.near_path_per_m, 0.0, *nothing
    if isinstance(link, FilmLink):
        law = link.law
        return (
            FILM,
            0.0,
            0.0,
            link.near_path_per_m,
            0.0,
            link.area_m2,
            law.base,
            law.gain,
            float(math.isclose(law.exponent, 1.0 / 6.0)),
            law.reference_c,
            law.per_k,
            link.emissivity,
        )
    return FIXED, link.conductance_w_per_k if link is not None else 0.0, 0.0, 0.0, 0.0, *nothing


def _tolerance_j_per_kg(curve: EnthalpyCurve, index: int) -> float:
    """Enthalpy by which a step may overshoot the end of a segment; any where the capacity does not jump."""
    here, there = curve.segments[index], curve.segments[index + 1]
    before, after = here.slope_k_per_j(here.end_c), there.slope_k_per_j(there.start_c)
    steeper = max(before, after)
    if abs(before - after) <= _KINK_FRACTION * steeper:
        return math.inf
    return _KINK_TOLERANCE_K / steeper


def _kinks_s(pieces: NDArray[np.void]) -> NDArray[np.float64]:
    """Times at which a history bends: the starts of its pieces after the first."""
    starts: NDArray[np.float64] = pieces["start_s"][1:]
    return starts
