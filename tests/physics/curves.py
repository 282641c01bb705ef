"""Enthalpy curves of every kind, fixed ones and random ones."""

from __future__ import annotations

from hypothesis import strategies as st

from app.physics import EnthalpyCurve
from app.physics.foods import Composition, food_curve
from app.physics.melting import aqueous_curve, constant_curve, curve_from_points, phase_change_curve, water_curve


def lean_meat() -> EnthalpyCurve:
    """A food whose water freezes over a range."""
    return food_curve(
        Composition(water=0.74, protein=0.20, fat=0.05, ash=0.01),
        initial_freezing_c=-1.5,
    )


def pack(*, melting_c: float, range_k: float, latent_j_per_kg: float = 200e3) -> EnthalpyCurve:
    """A phase-change pack."""
    return phase_change_curve(
        melting_c=melting_c,
        melting_range_k=range_k,
        latent_j_per_kg=latent_j_per_kg,
        specific_heat_solid_j_per_kg_k=2000.0,
        specific_heat_liquid_j_per_kg_k=3000.0,
        conductivity_solid_w_per_m_k=1.0,
        conductivity_liquid_w_per_m_k=0.5,
        density_kg_per_m3=1000.0,
    )


CURVES = {
    "lean meat": lean_meat(),
    "water": water_curve(),
    "saline": aqueous_curve(freezing_c=-0.52),
    "glycol": aqueous_curve(freezing_c=-20.6, water_fraction=0.6),
    "pure medicine": aqueous_curve(freezing_c=0.0, water_fraction=1.0),
    "eutectic": pack(melting_c=-21.1, range_k=0.0),
    "paraffin": pack(melting_c=5.0, range_k=2.0),
    "oil": constant_curve(specific_heat_j_per_kg_k=2000.0, conductivity_w_per_m_k=0.17, density_kg_per_m3=900.0),
    "points": curve_from_points(
        temperature_c=[-30.0, -5.0, -5.0, 20.0],
        enthalpy_j_per_kg=[0.0, 60e3, 300e3, 400e3],
        conductivity_w_per_m_k=0.5,
        density_kg_per_m3=1000.0,
    ),
    "meat in cartons": lean_meat().with_capacity(120.0),
}


@st.composite
def foods(draw: st.DrawFn) -> EnthalpyCurve:
    """Any food."""
    water = draw(st.floats(0.1, 0.98))
    protein = draw(st.floats(0.0, 1.0)) * (1.0 - water)
    fat = draw(st.floats(0.0, 1.0)) * (1.0 - water - protein)
    return food_curve(
        Composition(water=water, protein=protein, fat=fat, carbohydrate=1.0 - water - protein - fat),
        initial_freezing_c=-draw(st.floats(0.05, 30.0)),
    )


def any_curve() -> st.SearchStrategy[EnthalpyCurve]:
    """A random curve of any kind."""
    plain = st.floats(500.0, 5000.0)
    return st.one_of(
        foods(),
        st.just(water_curve()),
        st.builds(
            lambda t, w: aqueous_curve(freezing_c=t, water_fraction=w), st.floats(-30.0, 0.0), st.floats(0.2, 1.0)
        ),
        st.builds(
            lambda t, r, latent: pack(melting_c=t, range_k=r, latent_j_per_kg=latent),
            st.floats(-50.0, 30.0),
            st.sampled_from([0.0, 0.5, 2.0, 6.0]),
            st.floats(5e4, 4e5),
        ),
        st.builds(
            lambda c: constant_curve(specific_heat_j_per_kg_k=c, conductivity_w_per_m_k=0.2, density_kg_per_m3=900.0),
            plain,
        ),
    )
