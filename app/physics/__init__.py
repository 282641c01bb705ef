"""Published relations, one a function, numbers in, numbers out.

The modules hold public functions and are imported by their own names; what the engine builds on stands here.

``air``, ``convection`` and ``radiation`` lead to ``films``; ``components`` and ``freezing`` to ``foods``, which with
``melting`` hands out curves of ``enthalpy``; ``conduction``, ``walls`` and ``transient`` are heat in solids; ``lumped``
and ``kinetic`` serve the hand check and the limits.
"""

from app.physics.enthalpy import (
    FREEZING,
    LINEAR,
    QUADRATIC,
    EnthalpyCurve,
    Segment,
    segment_enthalpy,
    segment_ice,
    segment_ice_slope,
    segment_slope,
    segment_temperature,
)
from app.physics.films import FilmLaw, film_flow_w

__all__ = [
    "FREEZING",
    "LINEAR",
    "QUADRATIC",
    "EnthalpyCurve",
    "FilmLaw",
    "Segment",
    "film_flow_w",
    "segment_enthalpy",
    "segment_ice",
    "segment_ice_slope",
    "segment_slope",
    "segment_temperature",
]
