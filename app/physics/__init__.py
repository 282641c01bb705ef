"""Published relations, one a function, numbers in, numbers out.

``enthalpy``, ``films``, ``foods``, ``melting``, ``conduction``, ``lumped`` and ``kinetic`` are modules of public
functions and are imported by their own names; what the engine builds on stands here.
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
