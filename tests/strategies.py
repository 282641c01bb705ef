"""Random store definitions for tests: small, valid documents that reach every kind of part.

``definitions()`` makes documents whose dimensions, masses and volumes fit together, so that a refusal is a
fault of the reader and a crash a fault of the model.
"""

from __future__ import annotations

import math
from typing import Any

from hypothesis import strategies as st

from app.reference import coolant_materials, foods, limit_presets, materials

Document = dict[str, Any]

_FOODS = [row.key for row in foods()]
_MATERIALS = [row.key for row in materials()]
_INSULATION = ["pir_foam", "pur_foam", "xps_foam", "eps_foam", "mineral_wool", "cork_board"]
_SKINS = ["steel_sheet", "stainless_steel", "aluminium", "plywood", "polyethylene", "grp"]
_COOLANTS = [row.key for row in coolant_materials()]
_PRESETS = [row.key for row in limit_presets()]


def numbers(low: float, high: float) -> st.SearchStrategy[float]:
    """Numbers of a range, short enough to be read in a failure."""
    return st.floats(low, high, allow_nan=False).map(lambda x: min(max(float(f"{x:.4g}"), low), high))


@st.composite
def quantities(draw: st.DrawFn, low: float, high: float) -> Any:
    """A number, bare or with its spread and how it is known."""
    value = draw(numbers(low, high))
    form = draw(st.sampled_from(["bare", "bare", "spread", "known"]))
    if form == "spread":
        return {"value": value, "plus_minus": abs(value) / 8.0}
    if form == "known":
        return {"value": value, "known": draw(st.sampled_from(["measured", "data_sheet", "estimated", "typical"]))}
    return value


@st.composite
def definitions(draw: st.DrawFn, *, by_rise_time: bool = False) -> Document:
    """A valid definition as a document; one known by its rise time, which takes many runs, where that is asked for."""
    shape = draw(st.sampled_from(["box", "box", "cylinder"]))
    inside, inside_m3 = draw(_boxes() if shape == "box" else _cylinders())
    enclosure: Document = {"shape": shape, "inside_m": inside}
    with_outdoors = False
    if not by_rise_time and draw(st.booleans()):
        with_outdoors = draw(st.booleans())
        beyond = ["room", {"temperature_c": 12.0}] + (["outdoors"] if with_outdoors else [])
        enclosure["faces"] = {name: draw(_faces(beyond)) for name in ("walls", "ceiling", "floor")}
        enclosure["edge_factors"] = draw(st.booleans())
    else:
        enclosure["overall"] = draw(_overalls(inside_m3, by_rise_time))
    if not by_rise_time:  # doors that leak more than a rise time allows are refused
        enclosure["openings"] = draw(_openings())
        if draw(st.booleans()):
            enclosure["bridges_w_per_k"] = draw(quantities(0.0, 2.0))
    enclosure["fittings"] = [
        {"material": draw(st.sampled_from(_MATERIALS)), "mass_kg": draw(quantities(0.5, 30.0))}
        for _ in range(draw(st.integers(0, 2)))
    ]
    horizon_h = draw(numbers(2.0, 48.0))
    count = draw(st.integers(1, 3))
    contents = [draw(_contents(f"item {k + 1}", inside_m3 * 0.2, horizon_h)) for k in range(count)]
    document: Document = {
        "name": "Random store",
        "enclosure": enclosure,
        "contents": contents,
        "coolants": [draw(_coolants(f"coolant {k + 1}", inside_m3)) for k in range(draw(st.integers(0, 2)))],
        "air_limits": draw(st.lists(_limits(horizon_h, on_air=True), max_size=2)),
        "surroundings": {"room": draw(histories())},
        "outage": {"horizon_h": horizon_h},
    }
    if with_outdoors:
        document["surroundings"]["outdoors"] = draw(histories())
    if draw(st.booleans()):
        document["start"] = {"air_c": draw(quantities(-30.0, 10.0))}
    if not any(one["limits"] for one in contents) and not document["air_limits"]:
        contents[0]["limits"] = [{"kind": "above", "temperature_c": 8.0}]
    return document


@st.composite
def _boxes(draw: st.DrawFn) -> tuple[Document, float]:
    width, depth, height = (draw(numbers(0.3, 2.0)) for _ in range(3))
    return {"width": width, "depth": {"value": depth, "known": "measured"}, "height": height}, width * depth * height


@st.composite
def _cylinders(draw: st.DrawFn) -> tuple[Document, float]:
    diameter, height = draw(numbers(0.3, 1.5)), draw(numbers(0.3, 2.0))
    return {"diameter": diameter, "height": height}, math.pi / 4.0 * diameter**2 * height


@st.composite
def _faces(draw: st.DrawFn, beyond: list[Any]) -> Document:
    face: Document = {"beyond": draw(st.sampled_from(beyond))}
    if draw(st.booleans()):
        return face | {"u_w_per_m2_k": draw(quantities(0.1, 1.5))}
    layers: list[Document] = [
        {"material": draw(st.sampled_from(_SKINS)), "thickness_m": draw(quantities(0.0005, 0.01))}
    ]
    if draw(st.booleans()):
        layers.append({"material": draw(st.sampled_from(_INSULATION)), "thickness_m": draw(quantities(0.02, 0.2))})
    else:
        own = {"thickness_m": draw(quantities(0.02, 0.2)), "conductivity_w_per_m_k": draw(quantities(0.015, 0.1))}
        if draw(st.booleans()):
            own |= {
                "density_kg_per_m3": draw(quantities(20.0, 600.0)),
                "specific_heat_j_per_kg_k": draw(quantities(800.0, 2500.0)),
            }
        layers.append(own)
    if draw(st.booleans()):
        layers.append(layers[0])
    if draw(st.booleans()):
        face["films_w_per_m2_k"] = {"inside": draw(quantities(3.0, 15.0)), "outside": draw(quantities(5.0, 30.0))}
    return face | {"layers": layers}


@st.composite
def _overalls(draw: st.DrawFn, inside_m3: float, by_rise_time: bool) -> Document:
    """One figure for the whole; heat leaks grow with the area, as real ones do."""
    area_m2 = 6.0 * inside_m3 ** (2.0 / 3.0)
    more: Document = {}
    if draw(st.booleans()):
        more["wall_mass_kg"] = draw(quantities(2.0, 80.0))
    way = "rise" if by_rise_time else draw(st.sampled_from(["leak", "k", "energy"]))
    if way == "leak":
        return more | {"heat_leak_w_per_k": draw(quantities(0.2 * area_m2, 1.5 * area_m2))}
    if way == "k":
        if draw(st.booleans()):
            more["wall_thickness_m"] = draw(quantities(0.02, 0.15))
        if draw(st.booleans()):
            more["inside_area_m2"] = area_m2
        return more | {"k_w_per_m2_k": draw(quantities(0.2, 1.5))}
    if way == "energy":
        return more | {
            "energy_kwh_per_day": draw(quantities(0.3, 4.0)),
            "at_room_c": draw(quantities(16.0, 32.0)),
            "inside_c": draw(quantities(-25.0, 8.0)),
            "cop": draw(quantities(0.8, 3.0)),
        }
    return more | {
        "rise_time_h": draw(quantities(8.0, 40.0)),
        "from_c": -18.0,
        "to_c": -9.0,
        "at_room_c": 25.0,
        "test_load_kg": max(0.2 * inside_m3 * 1000.0, 1.0),
    }


@st.composite
def _openings(draw: st.DrawFn) -> list[Document]:
    openings = []
    for k, face in enumerate(draw(st.sampled_from([(), ("walls",), ("ceiling",), ("walls", "ceiling")]))):
        opening = {
            "name": f"opening {k + 1}",
            "in_face": face,
            "width_m": draw(quantities(0.1, 0.2)),
            "height_m": draw(quantities(0.1, 0.25)),
        }
        if draw(st.booleans()):
            opening["u_w_per_m2_k"] = draw(quantities(0.2, 3.0))
        if draw(st.booleans()):
            opening["seal_leak_m3_per_h"] = draw(quantities(0.0, 1.0))
        openings.append(opening)
    return openings


@st.composite
def _contents(draw: st.DrawFn, name: str, most_m3: float, horizon_h: float) -> Document:
    volume_m3 = most_m3 * draw(numbers(0.05, 1.0))
    item = {
        "name": name,
        "mass_kg": volume_m3 * draw(numbers(300.0, 1100.0)),
        "start_c": draw(quantities(-40.0, 12.0)),
        "stacking": draw(_stackings(volume_m3)),
        "limits": draw(st.lists(_limits(horizon_h, on_air=False), max_size=3)),
    }
    item |= draw(_substances())
    if draw(st.booleans()):
        mass_kg = 0.1 * item["mass_kg"] + 0.001
        item["packaging"] = [{"material": draw(st.sampled_from(["cardboard", "glass", "pet"])), "mass_kg": mass_kg}]
    if draw(st.booleans()):
        item["film_w_per_m2_k"] = draw(quantities(2.0, 25.0))
    return item


@st.composite
def _substances(draw: st.DrawFn) -> Document:
    """What an item is, in one of the six ways."""
    way = draw(st.sampled_from(["food", "food", "water", "aqueous", "constant", "curve", "composition"]))
    if way == "food":
        return {"food": draw(st.sampled_from(_FOODS))}
    if way == "water":
        return {"substance": "water"}
    if way == "aqueous":
        return {"substance": "aqueous", "freezing_c": draw(quantities(-15.0, 0.0))}
    known = {"conductivity_w_per_m_k": draw(numbers(0.1, 2.0)), "density_kg_per_m3": draw(numbers(500.0, 1200.0))}
    if way == "constant":
        return {"substance": known | {"specific_heat_j_per_kg_k": draw(numbers(600.0, 4500.0))}}
    if way == "curve":
        return {"substance": known | draw(_curves())}
    water = draw(numbers(0.3, 0.95))
    fat = round((1.0 - water) * draw(numbers(0.0, 1.0)), 4)
    return {
        "composition": {"water": water, "fat": fat, "protein": round(1.0 - water - fat, 4)},
        "initial_freezing_c": draw(quantities(-6.0, -0.1)),
    }


@st.composite
def _curves(draw: st.DrawFn) -> Document:
    """An enthalpy that was measured, now and then with a plateau in the middle."""
    temperatures, heats = [-60.0], [0.0]
    for k, step_k in enumerate(draw(st.lists(numbers(1.0, 40.0), min_size=2, max_size=6))):
        temperatures.append(temperatures[-1] + step_k)
        heats.append(heats[-1] + step_k * draw(numbers(1200.0, 20000.0)))
        if k == 0 and draw(st.booleans()):
            temperatures.append(temperatures[-1])
            heats.append(heats[-1] + draw(numbers(5e4, 3e5)))
    return {"temperature_c": temperatures, "enthalpy_j_per_kg": heats}


@st.composite
def _stackings(draw: st.DrawFn, volume_m3: float) -> Document:
    """Pieces that take a volume together."""
    kind = draw(st.sampled_from(["packs", "cartons", "pallet", "carcass", "bottles", "bulk", "exposed"]))
    if kind == "exposed":
        half_m = draw(numbers(0.005, 0.1))
        return {"kind": kind, "area_m2": volume_m3 / half_m, "half_thickness_m": half_m}
    counts = {"packs": (1, 30), "cartons": (1, 60), "pallet": (1, 4), "carcass": (1, 4), "bottles": (1, 30)}
    count = 1 if kind == "bulk" else draw(st.integers(*counts[kind]))
    one_m3 = volume_m3 / count
    if kind in ("carcass", "bottles"):
        slender = draw(numbers(2.0, 4.0))
        diameter_m = (one_m3 * 4.0 / math.pi / slender) ** (1.0 / 3.0)
        along = "length_m" if kind == "carcass" else "height_m"
        return {"kind": kind, "count": count, "diameter_m": diameter_m, along: slender * diameter_m}
    flat, wide = draw(numbers(0.4, 2.5)), draw(numbers(0.5, 2.0))
    side_m = (one_m3 / flat / wide) ** (1.0 / 3.0)
    stacking: Document = {"kind": kind, "width_m": wide * side_m, "depth_m": side_m, "height_m": flat * side_m}
    if kind != "bulk":
        stacking["count"] = count
    if kind == "cartons":
        stacking["blocks"] = draw(st.integers(1, 3))
    return stacking


@st.composite
def _coolants(draw: st.DrawFn, name: str, inside_m3: float) -> Document:
    coolant: Document = {
        "name": name,
        "coolant": draw(st.sampled_from(_COOLANTS)),
        "mass_kg": max(inside_m3 * draw(numbers(2.0, 80.0)), 0.01),
    }
    if draw(st.booleans()):
        coolant["start_c"] = draw(quantities(-35.0, 8.0))
    if draw(st.booleans()):
        coolant["area_m2"] = coolant["mass_kg"] / 1000.0 * draw(numbers(20.0, 150.0))
    if draw(st.booleans()):
        coolant["film_w_per_m2_k"] = draw(quantities(2.0, 25.0))
    return coolant


@st.composite
def _limits(draw: st.DrawFn, horizon_h: float, *, on_air: bool) -> Document:
    kinds = ["preset", "above", "below", "mean_kinetic"] + ([] if on_air else ["thawed"])
    kind = draw(st.sampled_from(kinds))
    if kind == "preset":
        return {"preset": draw(st.sampled_from(_PRESETS))}
    if kind == "thawed":
        return {"kind": kind, "share": draw(numbers(0.0, 1.0))}
    limit: Document = {"kind": kind, "temperature_c": draw(numbers(-30.0, 15.0))}
    if draw(st.booleans()):
        limit["at"] = draw(st.sampled_from(["warmest", "mean", "coldest"]))
    if kind == "mean_kinetic":
        return limit | {"window_h": draw(numbers(0.5, 2.0 * horizon_h))}
    if draw(st.booleans()):
        limit["longer_than_h"] = draw(numbers(0.0, horizon_h))
    return limit


def histories() -> st.SearchStrategy[Document]:
    """Any temperature around a store."""
    return st.one_of(_steady(), _drifts())


@st.composite
def _drifts(draw: st.DrawFn) -> Document:
    return {
        "kind": "drift",
        "start_c": draw(quantities(10.0, 25.0)),
        "towards": draw(_steady()),
        "time_constant_h": draw(quantities(0.5, 24.0)),
    }


@st.composite
def _steady(draw: st.DrawFn) -> Document:
    kind = draw(st.sampled_from(["constant", "ramp", "day", "series"]))
    if kind == "constant":
        return {"kind": kind, "temperature_c": draw(quantities(-10.0, 40.0))}
    if kind == "ramp":
        over_h = draw(quantities(0.1, 24.0))
        return {
            "kind": kind,
            "from_c": draw(quantities(0.0, 25.0)),
            "to_c": draw(quantities(0.0, 40.0)),
            "over_h": over_h,
        }
    if kind == "day":
        day: Document = {"kind": kind, "mean_c": draw(quantities(5.0, 32.0)), "swing_k": draw(quantities(0.0, 12.0))}
        return day | ({"start_hour": draw(quantities(0.0, 24.0))} if draw(st.booleans()) else {})
    steps = draw(st.lists(numbers(0.1, 12.0), min_size=1, max_size=6))
    times = [0.0]
    for step_h in steps:
        times.append(times[-1] + step_h)
    return {"kind": kind, "time_h": times, "temperature_c": [draw(numbers(-5.0, 40.0)) for _ in times]}
