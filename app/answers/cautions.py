"""What a person must know before acting on the number: rules in one place, the most serious first.

Each rule looks at the definition, its network and its answer, and speaks only where it applies. Texts restate
common public advice and defer to local rules and to the person in charge.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass

import numpy as np

from app.answers.answer import Caution
from app.engine.histories import pieces_of, temperature_c
from app.reference import limit_preset
from app.stores import StoreDefinition, StoreNetwork

STANDING_NOTICE = (
    "Planning aid only. Presets restate published limits; editions and local adoptions differ. Defer to the local "
    "code, the product label or monograph, the facility quality unit and the competent authority. When in doubt, "
    "discard or quarantine."
)


@dataclass(frozen=True)
class _Case:
    definition: StoreDefinition
    store: StoreNetwork
    best_estimate_h: float | None


def cautions_for(
    definition: StoreDefinition, store: StoreNetwork, best_estimate_h: float | None
) -> tuple[Caution, ...]:
    """All cautions that apply, in order of how serious they are."""
    case = _Case(definition, store, best_estimate_h)
    return tuple(caution for rule in _RULES for caution in rule(case))


def _groups(case: _Case) -> set[str]:
    """Groups of the presets in use: food, vaccine, blood, pharmacy, laboratory."""
    limits = [limit for contents in case.definition.contents for limit in contents.limits]
    limits += case.definition.air_limits
    return {limit_preset(limit.preset).group for limit in limits if limit.kind == "preset"}


def _best_estimate_only(_: _Case) -> Iterator[Caution]:
    yield Caution(
        "best_estimate_only",
        "This is a best estimate, not a planning value: how far the real store may lie on either side of it is not "
        "worked out yet. Act well before it, and measure.",
    )


def _already_past(case: _Case) -> Iterator[Caution]:
    if case.best_estimate_h == 0.0:
        yield Caution(
            "already_past",
            "A limit is already broken at the start. Check the start temperatures and the limit; if they are right, "
            "act now and do not release the contents before the person in charge has decided.",
        )


def _medicine(case: _Case) -> Iterator[Caution]:
    if _groups(case) & {"vaccine", "blood", "pharmacy"}:
        yield Caution(
            "medicine",
            "Vaccines, medicines and blood components: treat anything out of its range as an excursion, keep it apart "
            "and cold, mark it, and ask the manufacturer or the responsible pharmacist or blood bank. Do not discard "
            "and do not use before they have answered.",
        )


def _freezing(case: _Case) -> Iterator[Caution]:
    below = any(limit.kind == "below" for contents in case.definition.contents for limit in contents.limits)
    medicine = _groups(case) & {"vaccine", "blood", "pharmacy"}
    cold = [c for c in case.definition.coolants if c.start_c is not None and c.start_c.value < 0.0]
    if cold and (below or medicine):
        yield Caution(
            "frozen_coolant_near_freeze_sensitive",
            "Coolants below 0 °C stand beside contents that freezing harms. The model lets them meet only through the "
            "air; a package that touches a frozen pack can freeze. Let packs warm until their ice begins to melt, or "
            "keep them apart.",
        )


def _food(case: _Case) -> Iterator[Caution]:
    if "food" in _groups(case) or any(contents.food for contents in case.definition.contents):
        yield Caution(
            "food",
            "Never taste food to judge whether it is safe. Keep the time and the temperature of every lot; the local "
            "food authority's rules decide what may be kept.",
        )


def _presets(case: _Case) -> Iterator[Caution]:
    if _groups(case):
        yield Caution("preset_notice", STANDING_NOTICE)


def _door(_: _Case) -> Iterator[Caution]:
    yield Caution(
        "door_shut",
        "The answer holds with the door shut. Openings are not counted: each one shortens the time.",
    )


def _shorter_than_air(case: _Case) -> Iterator[Caution]:
    if case.best_estimate_h is not None and 0.0 < case.best_estimate_h < _AIR_SETTLES_H:
        yield Caution(
            "shorter_than_air_settles",
            "The limit is reached within the first quarter of an hour, while the air in the store is still settling "
            "after the fans have stopped. Such a short time is uncertain: count on none.",
        )


def _room_colder(case: _Case) -> Iterator[Caution]:
    room_c = float(temperature_c(pieces_of(case.store.room), np.zeros(1))[0])
    if room_c < case.store.start_air_c:
        yield Caution(
            "room_colder",
            "The room is colder than the store at the start, so the store cools first. The model's films and wall "
            "resistances are laid out for heat that comes in.",
        )


def _thick_contents(case: _Case) -> Iterator[Caution]:
    thick = [item.name for item in case.store.items if item.load.biot > _LARGE_BIOT]
    if thick:
        yield Caution(
            "thick_contents",
            f"{', '.join(thick)}: so thick, or so poor a conductor, that surface and middle differ much. The limit is "
            "read where it says; the other parts are colder.",
        )


def _doorless(case: _Case) -> Iterator[Caution]:
    enclosure = case.definition.enclosure
    if enclosure.faces is not None and not enclosure.openings:
        yield Caution(
            "no_door",
            "No door is described, so no heat comes through a door leaf or its seals. Add the door.",
        )


def _tight_walls(case: _Case) -> Iterator[Caution]:
    overall = case.definition.enclosure.overall
    if overall is not None and case.store.path_w_per_k.get("walls", 0.0) == 0.0:
        yield Caution(
            "walls_count_as_tight",
            "The doors and bridges that are given leak more than the figure for the whole store allows, so its walls "
            "count as tight. The figure includes doors: check it, or leave the doors out.",
        )


def _unused(case: _Case) -> Iterator[Caution]:
    names = case.definition.given_but_unused()
    if names:
        yield Caution("given_not_used", f"Given, but not used yet: {', '.join(names)}.")


_AIR_SETTLES_H = 0.25
_LARGE_BIOT = 10.0

_RULES: tuple[Callable[[_Case], Iterator[Caution]], ...] = (
    _already_past,
    _medicine,
    _freezing,
    _shorter_than_air,
    _best_estimate_only,
    _door,
    _doorless,
    _food,
    _room_colder,
    _thick_contents,
    _tight_walls,
    _unused,
    _presets,
)
"""All rules, the most serious first."""
