"""Have the engine compiled before the first person asks: answer one small question."""

from __future__ import annotations

from app.answers.hold_time import hold_time
from app.stores import read_definition

_QUESTION = {
    "name": "warm-up",
    "enclosure": {
        "inside_m": {"width": 0.5, "depth": 0.5, "height": 0.5},
        "overall": {"heat_leak_w_per_k": 0.5},
    },
    "contents": [
        {
            "name": "water",
            "substance": "water",
            "mass_kg": 5.0,
            "start_c": -5.0,
            "stacking": {"kind": "exposed", "area_m2": 0.2, "half_thickness_m": 0.02},
            "limits": [{"kind": "above", "temperature_c": 4.0}],
        }
    ],
    "surroundings": {"room": {"kind": "constant", "temperature_c": 20.0}},
    "outage": {"horizon_h": 1.0},
}


def warm_up() -> None:
    """Answer one small question, so that the compiled code is there."""
    hold_time(read_definition(_QUESTION))
