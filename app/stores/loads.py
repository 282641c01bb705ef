"""Contents, coolants and fittings as bodies: curve, exposed surface, shells by Biot number.

A piece is one lump where its Biot number is small and a row of shells where it is not. Air runs along every
face as along an upright plate of the piece's height, which is within about a fifth of the relations for tops
and undersides together and on the warm side of them. Called by ``network_of``.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

from app.engine.network import Body, CellLink, FilmLink, Link, SteadyFilmLink
from app.physics import EnthalpyCurve
from app.physics.conduction import block_conductivity_w_per_m_k
from app.physics.films import vertical_plate_law
from app.physics.foods import Composition, food_curve
from app.physics.melting import (
    aqueous_curve,
    constant_curve,
    curve_from_points,
    phase_change_curve,
    water_curve,
)
from app.reference import coolant_material, food, material
from app.stores.definition import Contents, Coolant, CurveSubstance, Packaging, PlainSubstance
from app.stores.geometry import Block, Shell, box_block, cylinder_block, near_cubic_stack, slab_block
from app.stores.shell import Fitting

CONTENTS_TOLERANCE_K = 0.005
"""Temperature error allowed in contents in one step: the hold time hangs on it."""

FITTING_TOLERANCE_K = 0.2

EMISSIVITY = 0.9
"""Of packaging, food and paint, which all lie close to it (handbook tables of emissivity, from memory)."""

LUMP_BIOT = 0.1
"""Below this Biot number one lump is right within a few per cent (Incropera, ch. 5)."""

_SHELLS = ((0.3, 8), (1.0, 12), (4.0, 14), (math.inf, 16))
"""Biot number up to which so many shells do; doubling them moves a hold time by less than 0.5 %."""

_USUAL_DIFFERENCE_K = 5.0
"""Difference between air and surface at which the Biot number and the film's range are judged."""

PACK_THICKNESS_M = 0.03
"""Thickness of a pack of coolant whose area was not given."""

FITTING_THICKNESS_M = 0.002
"""Thickness of the metal or plastic of fittings, with air on both sides."""

FITTING_FILM_W_PER_M2_K = 6.0
"""Still air and radiation over fittings (practical values for closed rooms, from memory)."""


@dataclass(frozen=True)
class Load:
    """An item or a coolant as bodies: outermost shell first, the first hung on the air (body 0)."""

    bodies: tuple[Body, ...]
    biot: float
    film_w_per_m2_k: float
    curve: EnthalpyCurve
    mass_kg: float
    area_m2: float


def contents_load(contents: Contents, start_c: float, first_body: int, usual_air_c: float) -> Load:
    """One item of the contents. ``usual_air_c`` is the air temperature around which its film is laid out."""
    curve = contents_curve(contents)
    block = contents_block(contents)
    mass_kg = contents.mass_kg.value
    packed = curve.with_capacity(_packaging_j_per_k(contents.packaging) / mass_kg)
    share = mass_kg / curve.density_kg_per_m3 / block.volume_m3
    return _load(
        contents.name,
        packed,
        mass_kg,
        block,
        start_c,
        first_body,
        usual_air_c,
        given_film=contents.film_w_per_m2_k.value if contents.film_w_per_m2_k else None,
        filled=min(share, 1.0) if contents.stacking.kind != "exposed" else 1.0,
    )


def coolant_load(coolant: Coolant, start_c: float, first_body: int, usual_air_c: float) -> Load:
    """One coolant: flat packs of the usual thickness unless its area was given."""
    known = coolant_material(coolant.coolant)
    curve = phase_change_curve(
        melting_c=known.melting_c,
        melting_range_k=known.melting_range_k,
        latent_j_per_kg=known.latent_j_per_kg,
        specific_heat_solid_j_per_kg_k=known.specific_heat_solid_j_per_kg_k,
        specific_heat_liquid_j_per_kg_k=known.specific_heat_liquid_j_per_kg_k,
        conductivity_solid_w_per_m_k=known.conductivity_solid_w_per_m_k,
        conductivity_liquid_w_per_m_k=known.conductivity_liquid_w_per_m_k,
        density_kg_per_m3=known.density_kg_per_m3,
    )
    mass_kg = coolant.mass_kg.value
    volume_m3 = mass_kg / known.density_kg_per_m3
    area_m2 = coolant.area_m2.value if coolant.area_m2 else 2.0 * volume_m3 / PACK_THICKNESS_M
    block = slab_block(area_m2, volume_m3 / area_m2, height_m=min(math.sqrt(area_m2 / 2.0), 0.5))
    return _load(
        coolant.name,
        curve,
        mass_kg,
        block,
        start_c,
        first_body,
        usual_air_c,
        given_film=coolant.film_w_per_m2_k.value if coolant.film_w_per_m2_k else None,
        filled=1.0,
    )


def fitting_load(fitting: Fitting, start_c: float) -> Load:
    """Racks, liners and the like: bare sheet with air on both sides."""
    known = material(fitting.material)
    mass_kg = fitting.mass_kg.value
    curve = constant_curve(
        specific_heat_j_per_kg_k=known.specific_heat_j_per_kg_k,
        conductivity_w_per_m_k=known.conductivity_w_per_m_k,
        density_kg_per_m3=known.density_kg_per_m3,
    )
    area_m2 = 2.0 * mass_kg / known.density_kg_per_m3 / FITTING_THICKNESS_M
    link = SteadyFilmLink(area_m2, FITTING_FILM_W_PER_M2_K, 0.0)
    name = f"fittings, {known.label}"
    body = Body(name, 0, link, curve, mass_kg, start_c, FITTING_TOLERANCE_K)
    return Load((body,), 0.0, FITTING_FILM_W_PER_M2_K, curve, mass_kg, area_m2)


def contents_curve(contents: Contents) -> EnthalpyCurve:
    """Enthalpy curve of one kilogram of the contents, without packaging."""
    if contents.food is not None:
        row = food(contents.food)
        composition = Composition(
            water=row.water_fraction,
            protein=row.protein_fraction,
            fat=row.fat_fraction,
            carbohydrate=row.carbohydrate_fraction,
            fibre=row.fibre_fraction,
            ash=row.ash_fraction,
        )
        return food_curve(composition, initial_freezing_c=row.initial_freezing_c)
    if contents.composition is not None:
        given = contents.composition
        composition = Composition(
            water=given.water.value,
            protein=given.protein.value,
            fat=given.fat.value,
            carbohydrate=given.carbohydrate.value,
            fibre=given.fibre.value,
            ash=given.ash.value,
        )
        assert contents.initial_freezing_c is not None  # the definition has checked it
        return food_curve(composition, initial_freezing_c=contents.initial_freezing_c.value)
    return _substance_curve(contents)


def _substance_curve(contents: Contents) -> EnthalpyCurve:
    substance = contents.substance
    if substance == "water":
        return water_curve()
    if substance == "aqueous":
        assert contents.freezing_c is not None  # the definition has checked it
        return aqueous_curve(freezing_c=contents.freezing_c.value)
    if isinstance(substance, CurveSubstance):
        return curve_from_points(
            temperature_c=substance.temperature_c,
            enthalpy_j_per_kg=substance.enthalpy_j_per_kg,
            conductivity_w_per_m_k=substance.conductivity_w_per_m_k,
            density_kg_per_m3=substance.density_kg_per_m3,
        )
    assert isinstance(substance, PlainSubstance)  # the definition has checked it
    return constant_curve(
        specific_heat_j_per_kg_k=substance.specific_heat_j_per_kg_k,
        conductivity_w_per_m_k=substance.conductivity_w_per_m_k,
        density_kg_per_m3=substance.density_kg_per_m3,
    )


def contents_block(contents: Contents) -> Block:
    """How the contents stand in the air, by their stacking."""
    stacking = contents.stacking
    if stacking.kind == "exposed":
        area_m2 = stacking.area_m2.value
        return slab_block(area_m2, stacking.half_thickness_m.value, height_m=min(math.sqrt(area_m2), 2.0))
    if stacking.kind == "bottles":
        return cylinder_block(
            stacking.count,
            stacking.diameter_m.value,
            stacking.height_m.value,
            height_m=stacking.height_m.value,
        )
    if stacking.kind == "carcass":
        return cylinder_block(
            stacking.count,
            stacking.diameter_m.value,
            stacking.length_m.value,
            height_m=stacking.length_m.value,
        )
    sides = (stacking.width_m.value, stacking.depth_m.value, stacking.height_m.value)
    if stacking.kind == "packs":
        return box_block(stacking.count, *sides, stands=False)
    if stacking.kind == "cartons":
        blocks = stacking.blocks
        return box_block(blocks, *near_cubic_stack(math.ceil(stacking.count / blocks), *sides), stands=True)
    return box_block(stacking.count if stacking.kind == "pallet" else 1, *sides, stands=True)


def _load(
    name: str,
    curve: EnthalpyCurve,
    mass_kg: float,
    block: Block,
    start_c: float,
    first_body: int,
    usual_air_c: float,
    *,
    given_film: float | None,
    filled: float,
) -> Load:
    liquid = block_conductivity_w_per_m_k(solid_w_per_m_k=curve.conductivity_liquid_w_per_m_k, filled=filled)
    solid = block_conductivity_w_per_m_k(solid_w_per_m_k=curve.conductivity_solid_w_per_m_k, filled=filled)
    stacked = replace(curve, conductivity_liquid_w_per_m_k=liquid, conductivity_solid_w_per_m_k=solid)
    film = given_film or _still_air_film_w_per_m2_k(block.height_m, usual_air_c)
    biot = film * block.volume_m3 / block.area_m2 / min(liquid, solid)
    shells = block.shells(shell_count(biot))
    bodies = tuple(
        Body(
            name=name if len(shells) == 1 else f"{name}, shell {j + 1}",
            parent=0 if j == 0 else first_body + j - 1,
            link=_link(shells, j, block, given_film, usual_air_c),
            curve=stacked,
            mass_kg=mass_kg * shell.volume_share,
            start_c=start_c,
            tolerance_k=CONTENTS_TOLERANCE_K,
        )
        for j, shell in enumerate(shells)
    )
    return Load(bodies, biot, film, stacked, mass_kg, block.area_m2)


def shell_count(biot: float) -> int:
    """Shells that a Biot number asks for."""
    if biot < LUMP_BIOT:
        return 1
    return next(count for limit, count in _SHELLS if biot <= limit)


def _link(shells: tuple[Shell, ...], j: int, block: Block, given_film: float | None, usual_air_c: float) -> Link:
    if j > 0:
        return CellLink(near_path_per_m=shells[j].outward_per_m, far_path_per_m=shells[j - 1].inward_per_m)
    if given_film is not None:
        return SteadyFilmLink(block.area_m2, given_film, shells[0].outward_per_m)
    law = vertical_plate_law(height_m=block.height_m, reference_c=usual_air_c)
    return FilmLink(block.area_m2, law, EMISSIVITY, shells[0].outward_per_m)


def _still_air_film_w_per_m2_k(height_m: float, air_c: float) -> float:
    """Convection and radiation at the usual difference. [W/m²·K]"""
    law = vertical_plate_law(height_m=height_m, reference_c=air_c)
    return law.film_w_per_m2_k(surface_c=air_c - _USUAL_DIFFERENCE_K, air_c=air_c, emissivity=EMISSIVITY)


def _packaging_j_per_k(packaging: tuple[Packaging, ...]) -> float:
    return sum(p.mass_kg.value * material(p.material).specific_heat_j_per_kg_k for p in packaging)
