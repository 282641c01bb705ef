"""From a definition to the network of its store: the one place where the parts of a store are put together.

The inside air is body 0; faces, fittings, contents and coolants hang on it. Whatever the definition leaves out
is filled in here and listed as assumed, with where the value comes from.
"""

from __future__ import annotations

from dataclasses import dataclass, field

import numpy as np

from app.engine import Network, build_network
from app.engine.histories import Constant, History, pieces_of, temperature_c
from app.engine.network import (
    BODY_TEMPERATURE,
    COLDEST,
    MEAN,
    MELTED,
    SOLID_LEFT,
    WARMEST,
    Body,
    Boundary,
    FixedLink,
    Watch,
)
from app.physics.air import AIR_SPECIFIC_HEAT_J_PER_KG_K, air_density_kg_per_m3
from app.physics.melting import constant_curve
from app.physics.walls import surface_resistance_m2_k_per_w
from app.reference import opening_kind
from app.stores.definition import Contents, Coolant, Limit, StoreDefinition
from app.stores.enclosure import WALL_TOLERANCE_K, Surroundings, layered_face
from app.stores.geometry import FaceSize, box_faces, cylinder_faces
from app.stores.histories_of import history_of
from app.stores.loads import Load, contents_load, coolant_load, fitting_load
from app.stores.overall import USUAL_WALL_THICKNESS_M, overall_heat_leak_w_per_k
from app.stores.shell import BoxInside, Face, Faces, Fitting, FixedTemperature, KValue, Opening
from app.units import seconds_from_hours

AIR_TOLERANCE_K = 0.1

WALL_SPECIFIC_HEAT_J_PER_KG_K = 1000.0
"""Of an appliance's wall, foam and liner and sheet together (foam 1400, plastic 1300, steel 450)."""

_HEAT_DIRECTION = {"walls": "sideways", "ceiling": "down", "floor": "up"}
"""Heat flows into a cold store."""

_OUTDOOR_FILM_M2_K_PER_W = 0.04


@dataclass(frozen=True)
class Assumption:
    """A value that the definition did not give, by field path, with where it comes from."""

    field: str
    value: float | str
    source: str


@dataclass(frozen=True)
class PlacedItem:
    """An item or a coolant in the network: its load, its limits, and the columns of its traces.

    ``columns`` maps a quantity of ``engine.network`` (WARMEST, MEAN, COLDEST, MELTED, SOLID_LEFT) to the
    number of the watch that traces it.
    """

    name: str
    load: Load
    first_body: int
    columns: dict[int, int]
    start_c: float
    holds_ice: bool
    limits: tuple[Limit, ...] = ()


@dataclass(frozen=True)
class StoreNetwork:
    """A store ready to march, and what is needed to read its answer."""

    network: Network
    items: tuple[PlacedItem, ...]
    coolants: tuple[PlacedItem, ...]
    air_column: int
    air_limits: tuple[Limit, ...]
    room: History
    start_air_c: float
    heat_leak_w_per_k: float
    path_w_per_k: dict[str, float]
    wall_delays_h: tuple[tuple[str, float], ...]
    stored_in_walls_j_per_k: float
    fittings_j_per_k: float
    assumed: tuple[Assumption, ...]


def network_of(definition: StoreDefinition) -> StoreNetwork:
    """The network of a store whose overall figure, if any, is not a rise time (see ``rise_time``)."""
    parts = _Parts(definition)
    parts.add_air()
    parts.add_openings()
    parts.add_bridges()
    if definition.enclosure.faces is not None:
        parts.add_faces(definition.enclosure.faces)
    else:
        parts.add_overall()
    for fitting in definition.enclosure.fittings:
        parts.add_fitting(fitting)
    items = tuple(parts.place_contents(contents) for contents in definition.contents)
    coolants = tuple(parts.place_coolant(k, coolant) for k, coolant in enumerate(definition.coolants))
    return StoreNetwork(
        network=build_network(parts.bodies, parts.boundaries, parts.histories, parts.watches),
        items=items,
        coolants=coolants,
        air_column=0,
        air_limits=definition.air_limits,
        room=parts.histories[0],
        start_air_c=parts.air_c,
        heat_leak_w_per_k=sum(parts.path_w_per_k.values()),
        path_w_per_k=parts.path_w_per_k,
        wall_delays_h=tuple(parts.delays.items()),
        stored_in_walls_j_per_k=sum(parts.wall_share.values()),
        fittings_j_per_k=parts.fittings_j_per_k,
        assumed=tuple(parts.assumed),
    )


@dataclass
class _Parts:
    """What has been put together so far; used up by ``network_of``."""

    definition: StoreDefinition
    bodies: list[Body] = field(default_factory=list)
    boundaries: list[Boundary] = field(default_factory=list)
    histories: list[History] = field(default_factory=list)
    watches: list[Watch] = field(default_factory=list)
    assumed: list[Assumption] = field(default_factory=list)
    path_w_per_k: dict[str, float] = field(default_factory=dict)
    delays: dict[str, float] = field(default_factory=dict)
    wall_share: dict[str, float] = field(default_factory=dict)
    fittings_j_per_k: float = 0.0
    air_c: float = 0.0
    sizes: dict[str, FaceSize] = field(default_factory=dict)
    opening_m2: dict[str, float] = field(default_factory=dict)

    def add_air(self) -> None:
        """The inside air, its volume and its start, and the surroundings."""
        enclosure, surroundings = self.definition.enclosure, self.definition.surroundings
        inside = enclosure.inside_m
        if isinstance(inside, BoxInside):
            width, depth, height = inside.width.value, inside.depth.value, inside.height.value
            self.sizes = box_faces(width, depth, height)
            volume_m3 = width * depth * height
        else:
            self.sizes = cylinder_faces(inside.diameter.value, inside.height.value)
            volume_m3 = self.sizes["floor"].inside_m2 * inside.height.value
        self.histories.append(history_of(surroundings.room))
        if surroundings.outdoors is not None:
            self.histories.append(history_of(surroundings.outdoors))
        self.air_c = self._start_air_c()
        density = air_density_kg_per_m3(self.air_c)
        curve = constant_curve(
            specific_heat_j_per_kg_k=AIR_SPECIFIC_HEAT_J_PER_KG_K,
            conductivity_w_per_m_k=1.0,
            density_kg_per_m3=density,
        )
        self.bodies.append(Body("air", 0, None, curve, density * volume_m3, self.air_c, AIR_TOLERANCE_K))
        self.watches.append(Watch("air", BODY_TEMPERATURE, 0, 0))

    def _start_air_c(self) -> float:
        given = self.definition.start.air_c
        if given is not None:
            return given.value
        coldest = min(contents.start_c.value for contents in self.definition.contents)
        self.assumed.append(Assumption("start.air_c", coldest, "the coldest start temperature of the contents"))
        return coldest

    def add_boundary(self, path: str, body: int, history: int, conductance_w_per_k: float) -> None:
        """A plain conductance from the surroundings to a body, under the name of its path."""
        if conductance_w_per_k > 0.0:
            self.boundaries.append(Boundary(body, history, conductance_w_per_k, path))
            self.path_w_per_k[path] = self.path_w_per_k.get(path, 0.0) + conductance_w_per_k

    def add_openings(self) -> None:
        """Door leaves and their seals."""
        room_c = self._start_c(0)
        for k, opening in enumerate(self.definition.enclosure.openings):
            area_m2 = opening.width_m.value * opening.height_m.value
            self.opening_m2[opening.in_face] = self.opening_m2.get(opening.in_face, 0.0) + area_m2
            self.add_boundary(f"{opening.name}, leaf", 0, 0, self._leaf_u(k, opening) * area_m2)
            leak_m3_per_s = self._seal_leak_m3_per_h(k, opening) / seconds_from_hours(1.0)
            heat_w_per_k = leak_m3_per_s * air_density_kg_per_m3(room_c) * AIR_SPECIFIC_HEAT_J_PER_KG_K
            self.add_boundary(f"{opening.name}, seals", 0, 0, heat_w_per_k)

    def _leaf_u(self, k: int, opening: Opening) -> float:
        if opening.u_w_per_m2_k is not None:
            return opening.u_w_per_m2_k.value
        usual = opening_kind("solid_swing_door")
        self.assumed.append(Assumption(f"enclosure.openings[{k}].u_w_per_m2_k", usual.u_w_per_m2_k, usual.source_text))
        return usual.u_w_per_m2_k

    def _seal_leak_m3_per_h(self, k: int, opening: Opening) -> float:
        if opening.seal_leak_m3_per_h is not None:
            return opening.seal_leak_m3_per_h.value
        usual = opening_kind("solid_swing_door")
        gasket_m = 2.0 * (opening.width_m.value + opening.height_m.value)
        leak = usual.leak_l_per_s_m / 1000.0 * seconds_from_hours(1.0) * gasket_m
        self.assumed.append(Assumption(f"enclosure.openings[{k}].seal_leak_m3_per_h", leak, usual.source_text))
        return leak

    def add_bridges(self) -> None:
        """Thermal bridges, straight from the room to the inside air."""
        bridges = self.definition.enclosure.bridges_w_per_k
        if bridges is not None:
            self.add_boundary("thermal bridges", 0, 0, bridges.value)

    def add_faces(self, faces: Faces) -> None:
        """Walls, ceiling and floor, layered or by U-value."""
        for name, size in self.sizes.items():
            face: Face = getattr(faces, name)
            beyond = self._beyond(name, face)
            if face.layers is None:
                assert face.u_w_per_m2_k is not None  # the definition has checked it
                area_m2 = size.inside_m2 - self.opening_m2.get(name, 0.0)
                self.add_boundary(name, 0, beyond.history, face.u_w_per_m2_k.value * area_m2)
                continue
            part = layered_face(
                name,
                face,
                size,
                self.opening_m2.get(name, 0.0),
                self.definition.enclosure.edge_factors,
                len(self.bodies),
                self._inside_film(name, face),
                beyond,
                self.air_c,
            )
            self.bodies += part.bodies
            self.boundaries += part.boundaries
            self.path_w_per_k[name] = part.conductance_w_per_k
            self.wall_share[name] = part.felt_inside_j_per_k
            self.delays[name] = part.delay_h

    def _inside_film(self, name: str, face: Face) -> float:
        if face.films_w_per_m2_k is not None:
            return 1.0 / face.films_w_per_m2_k.inside.value
        return surface_resistance_m2_k_per_w(_HEAT_DIRECTION[name])

    def _beyond(self, name: str, face: Face) -> Surroundings:
        still = surface_resistance_m2_k_per_w(_HEAT_DIRECTION[name])
        given = None if face.films_w_per_m2_k is None else 1.0 / face.films_w_per_m2_k.outside.value
        if face.beyond == "room":
            return Surroundings(0, self._start_c(0), given or still)
        if face.beyond == "outdoors":
            return Surroundings(1, self._start_c(1), given or _OUTDOOR_FILM_M2_K_PER_W)
        assert isinstance(face.beyond, FixedTemperature)  # the definition has refused the ground
        fixed_c = face.beyond.temperature_c.value
        self.histories.append(Constant(fixed_c))
        return Surroundings(len(self.histories) - 1, fixed_c, given or still)

    def _start_c(self, history: int) -> float:
        return float(temperature_c(pieces_of(self.histories[history]), np.zeros(1))[0])

    def add_overall(self) -> None:
        """One figure for the whole store, with the mass of its wall halfway through when that is known."""
        enclosure = self.definition.enclosure
        overall = enclosure.overall
        assert overall is not None  # the definition has checked it
        leak = overall_heat_leak_w_per_k(enclosure, self.sizes, sum(self.path_w_per_k.values()))
        if overall.wall_thickness_m is None and isinstance(overall, KValue):
            self.assumed.append(
                Assumption("enclosure.overall.wall_thickness_m", USUAL_WALL_THICKNESS_M, "common practice")
            )
        if overall.wall_mass_kg is None or leak == 0.0:
            self.add_boundary("walls", 0, 0, leak)
            return
        mass_kg = overall.wall_mass_kg.value
        middle_c = 0.5 * (self.air_c + self._start_c(0))
        curve = constant_curve(
            specific_heat_j_per_kg_k=WALL_SPECIFIC_HEAT_J_PER_KG_K,
            conductivity_w_per_m_k=1.0,
            density_kg_per_m3=1000.0,
        )
        body = Body("walls", 0, FixedLink(2.0 * leak), curve, mass_kg, middle_c, WALL_TOLERANCE_K)
        self.boundaries.append(Boundary(len(self.bodies), 0, 2.0 * leak, "walls"))
        self.bodies.append(body)
        self.path_w_per_k["walls"] = leak
        self.wall_share["walls"] = 0.25 * mass_kg * WALL_SPECIFIC_HEAT_J_PER_KG_K

    def add_fitting(self, fitting: Fitting) -> None:
        """Racks and liners, which warm with the air."""
        load = fitting_load(fitting, self.air_c)
        self.bodies += load.bodies
        self.fittings_j_per_k += load.mass_kg * load.curve.segments[0].capacity_j_per_kg_k

    def place_contents(self, contents: Contents) -> PlacedItem:
        """One item, its bodies and the watches that its limits and its series need."""
        load = contents_load(contents, contents.start_c.value, len(self.bodies), self._usual_air_c())
        return self._place(contents.name, load, (WARMEST, MEAN, COLDEST, MELTED), contents.limits)

    def place_coolant(self, k: int, coolant: Coolant) -> PlacedItem:
        """One coolant, its bodies and its watches."""
        start_c = self.air_c
        if coolant.start_c is not None:
            start_c = coolant.start_c.value
        else:
            self.assumed.append(Assumption(f"coolants[{k}].start_c", start_c, "the air at the start"))
        load = coolant_load(coolant, start_c, len(self.bodies), self._usual_air_c())
        if coolant.area_m2 is None:
            self.assumed.append(
                Assumption(f"coolants[{k}].area_m2", load.area_m2, "flat packs 30 mm thick, air on both sides")
            )
        return self._place(coolant.name, load, (MEAN, SOLID_LEFT, MELTED), ())

    def _place(self, name: str, load: Load, quantities: tuple[int, ...], limits: tuple[Limit, ...]) -> PlacedItem:
        first, last = len(self.bodies), len(self.bodies) + len(load.bodies) - 1
        columns = {quantity: len(self.watches) + j for j, quantity in enumerate(quantities)}
        self.watches += [Watch(f"{name}, {quantity}", quantity, first, last) for quantity in quantities]
        self.bodies += load.bodies
        start_c = load.bodies[0].start_c
        ice = load.curve.ice_kg_per_kg(load.curve.enthalpy_j_per_kg(start_c))
        return PlacedItem(name, load, first, columns, start_c, ice > 0.0, limits)

    def _usual_air_c(self) -> float:
        """Air temperature around which films are laid out: between the start and the room, nearer the start."""
        return self.air_c + 0.25 * (self._start_c(0) - self.air_c)
