"""What one row of each reference table holds, and what is wrong with a row as a whole.

A field of a dataclass is a column of its table, in the same name and unit; ``source_text`` is filled in from
the table of sources. ``faults`` says in words what does not fit together in a row. Called by ``reading``.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Literal

from app.reference.bounds import (
    COOLANT_KINDS,
    FOOD_GROUPS,
    JUDGED_ON,
    LIMIT_GROUPS,
    LIMIT_KINDS,
    MATERIAL_CLASSES,
    POINTS,
)


@dataclass(frozen=True)
class Source:
    """A document, or a body of practice, from which values were taken."""

    source_key: str
    authors: str
    year: str
    title: str
    publisher: str
    doi_or_isbn: str
    page: str
    what_we_took: str

    @property
    def key(self) -> str:
        return self.source_key

    def faults(self) -> Iterator[str]:
        """Nothing beyond what every row is checked for."""
        return iter(())


@dataclass(frozen=True)
class Material:
    """A material of walls, fittings or packaging; the conductivity spreads from its low to its high value.

    Status and source are those of the conductivity; those of density and specific heat are named capacity.
    """

    key: str
    label: str
    group: str
    density_kg_per_m3: float
    specific_heat_j_per_kg_k: float
    conductivity_w_per_m_k: float
    conductivity_low_w_per_m_k: float
    conductivity_high_w_per_m_k: float
    status: str
    source_key: str
    capacity_status: str
    capacity_source_key: str
    note: str
    source_text: str = ""

    def faults(self) -> Iterator[str]:
        """What does not fit the group, or together."""
        yield from _choice("group", self.group, tuple(MATERIAL_CLASSES))
        if self.group in MATERIAL_CLASSES:
            usual = MATERIAL_CLASSES[self.group]
            for name in ("density_kg_per_m3", "specific_heat_j_per_kg_k", "conductivity_w_per_m_k"):
                low, high = getattr(usual, name)
                if not low <= getattr(self, name) <= high:
                    yield f"{name} {getattr(self, name):g} is not plausible for {self.group}: {low:g} to {high:g}"
        yield from _spread(
            "conductivity_w_per_m_k",
            self.conductivity_low_w_per_m_k,
            self.conductivity_w_per_m_k,
            self.conductivity_high_w_per_m_k,
        )


@dataclass(frozen=True)
class Food:
    """Composition and freezing point of a food; carbohydrate is without fibre.

    Status and source are those of the composition; those of the freezing point are named freezing.
    The handbook's own specific and latent heats serve checks only; none where the handbook has none to trust.
    """

    key: str
    label: str
    group: str
    water_fraction: float
    protein_fraction: float
    fat_fraction: float
    carbohydrate_fraction: float
    fibre_fraction: float
    ash_fraction: float
    initial_freezing_c: float
    handbook_specific_heat_above_j_per_kg_k: float | None
    handbook_specific_heat_below_j_per_kg_k: float | None
    handbook_latent_j_per_kg: float | None
    status: str
    source_key: str
    freezing_status: str
    freezing_source_key: str
    note: str
    source_text: str = ""

    def faults(self) -> Iterator[str]:
        """What does not add up."""
        yield from _choice("group", self.group, FOOD_GROUPS)
        total = sum(
            (
                self.water_fraction,
                self.protein_fraction,
                self.fat_fraction,
                self.carbohydrate_fraction,
                self.fibre_fraction,
                self.ash_fraction,
            )
        )
        if not 0.95 <= total <= 1.03:
            yield f"the fractions add up to {total:.4f}; a sum of 0.95 to 1.03 is plausible"


@dataclass(frozen=True)
class CoolantMaterial:
    """What a coolant is made of, per kilogram; its latent heat spreads from its low to its high value.

    Status and source are those of the latent heat; melting and the other properties have their own.
    """

    key: str
    label: str
    kind: str
    melting_c: float
    melting_range_k: float
    latent_j_per_kg: float
    latent_low_j_per_kg: float
    latent_high_j_per_kg: float
    density_kg_per_m3: float
    specific_heat_solid_j_per_kg_k: float
    specific_heat_liquid_j_per_kg_k: float
    conductivity_solid_w_per_m_k: float
    conductivity_liquid_w_per_m_k: float
    status: str
    source_key: str
    melting_status: str
    melting_source_key: str
    properties_status: str
    properties_source_key: str
    note: str
    source_text: str = ""

    def faults(self) -> Iterator[str]:
        """What does not fit the kind, or together."""
        yield from _choice("kind", self.kind, COOLANT_KINDS)
        yield from _spread("latent_j_per_kg", self.latent_low_j_per_kg, self.latent_j_per_kg, self.latent_high_j_per_kg)
        if self.kind == "eutectic" and self.melting_c >= 0.0:
            yield f"a salt eutectic melts below 0 °C, not at {self.melting_c:g} °C"


@dataclass(frozen=True)
class LimitRow:
    """One row of the table of limits: one limit of a preset; the rows of a preset belong together."""

    preset: str
    label: str
    group: str
    body: str
    document: str
    edition: str
    kind: str
    temperature_c: float
    longer_than_h: float
    window_h: float
    at: str
    on: str
    clause: str
    original: str
    status: str
    source_key: str
    note: str
    source_text: str = ""

    @property
    def key(self) -> str:
        """A preset may hold several limits; the same one twice is a slip."""
        return f"{self.preset} {self.kind} {self.temperature_c:g} °C for {self.longer_than_h:g} h"

    def faults(self) -> Iterator[str]:
        """What does not fit the kind."""
        yield from _choice("group", self.group, LIMIT_GROUPS)
        yield from _choice("kind", self.kind, LIMIT_KINDS)
        yield from _choice("at", self.at, POINTS)
        yield from _choice("on", self.on, JUDGED_ON)
        if (self.window_h > 0.0) != (self.kind == "mean_kinetic"):
            yield f"a limit of kind {self.kind} with a window of {self.window_h:g} h; mean_kinetic alone has one"
        if self.kind == "mean_kinetic" and self.longer_than_h > 0.0:
            yield "a mean kinetic temperature counts at once: longer_than_h must be 0"


@dataclass(frozen=True)
class PresetLimit:
    """One limit of a preset, in the names that a definition's own limits have."""

    kind: Literal["above", "below", "mean_kinetic"]
    temperature_c: float
    longer_than_h: float
    window_h: float
    at: Literal["warmest", "mean", "coldest"]
    on: Literal["contents", "air"]
    clause: str
    original: str
    status: str
    source_key: str
    note: str
    source_text: str


@dataclass(frozen=True)
class LimitPreset:
    """A published limit under one name; it is kept while every one of its limits is kept."""

    key: str
    label: str
    group: str
    body: str
    document: str
    edition: str
    limits: tuple[PresetLimit, ...]


@dataclass(frozen=True)
class OpeningKind:
    """A kind of door: air through its seals, per metre of gasket, and heat through its leaf."""

    key: str
    label: str
    leak_l_per_s_m: float
    leak_low_l_per_s_m: float
    leak_high_l_per_s_m: float
    u_w_per_m2_k: float
    u_low_w_per_m2_k: float
    u_high_w_per_m2_k: float
    status: str
    source_key: str
    note: str
    source_text: str = ""

    def faults(self) -> Iterator[str]:
        """Values outside their own spread."""
        yield from _spread("leak_l_per_s_m", self.leak_low_l_per_s_m, self.leak_l_per_s_m, self.leak_high_l_per_s_m)
        yield from _spread("u_w_per_m2_k", self.u_low_w_per_m2_k, self.u_w_per_m2_k, self.u_high_w_per_m2_k)


def _choice(name: str, given: str, allowed: tuple[str, ...]) -> Iterator[str]:
    if given not in allowed:
        yield f"{name} is {given!r}; allowed: {', '.join(allowed)}"


def _spread(name: str, low: float, value: float, high: float) -> Iterator[str]:
    if not low <= value <= high:
        yield f"{name} {value:g} does not lie between its low value {low:g} and its high value {high:g}"
