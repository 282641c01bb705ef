"""Foods from their composition: specific heat, density, conductivity, ice, and the enthalpy curve.

Food does not melt at one temperature: its water freezes out over a range, and the curve says how. Called by
``stores.loads``, which looks compositions up.
"""

from __future__ import annotations

from dataclasses import dataclass

from app.errors import InputOutOfRange
from app.physics.components import (
    component_conductivity_w_per_m_k,
    component_density_kg_per_m3,
    component_specific_heat_j_per_kg_k,
)
from app.physics.enthalpy import FREEZING, LINEAR, QUADRATIC, EnthalpyCurve, Segment, segment_enthalpy
from app.physics.freezing import ice_fraction

LATENT_HEAT_OF_WATER_J_PER_KG = 333.6e3
"""At 0 °C, as all the correlations of this module use it (ASHRAE Refrigeration 2006, ch. 9)."""

COLDEST_OF_CURVE_C = -40.0
"""Below this the correlation for the freezing range ends; solids and ice carry on."""

_FROZEN_CONDUCTIVITY_AT_C = -25.0
_BELOW_CURVE_C = -95.0
_ABOVE_FREEZING_K = 100.0


@dataclass(frozen=True)
class Composition:
    """Mass fractions of a food; carbohydrate without fibre. What is not water is scaled to add up to 1 with it.

    Raises ``InputOutOfRange`` when they add up to less than 0.95 or more than 1.05, or one is outside 0 to 1.
    """

    water: float
    protein: float = 0.0
    fat: float = 0.0
    carbohydrate: float = 0.0
    fibre: float = 0.0
    ash: float = 0.0

    def __post_init__(self) -> None:
        for name, value in self.fractions().items():
            if not 0.0 <= value <= 1.0:
                raise InputOutOfRange(name, value, "", 0.0, 1.0)
        if not 0.95 <= self.total() <= 1.05:
            raise InputOutOfRange("sum of the fractions", self.total(), "", 0.95, 1.05)

    def fractions(self) -> dict[str, float]:
        """The fractions by name, as they were given."""
        return {
            "water": self.water,
            "protein": self.protein,
            "fat": self.fat,
            "carbohydrate": self.carbohydrate,
            "fibre": self.fibre,
            "ash": self.ash,
        }

    def total(self) -> float:
        """What the fractions add up to."""
        return sum(self.fractions().values())

    def scaled(self) -> dict[str, float]:
        """The fractions by name, adding up to 1: the water as given, the rest scaled to fill what is left."""
        solids = self.total() - self.water
        if solids == 0.0:
            return {**self.fractions(), "water": 1.0}
        scale = (1.0 - self.water) / solids
        return {name: value if name == "water" else value * scale for name, value in self.fractions().items()}


def specific_heat_j_per_kg_k(composition: Composition, temperature_c: float) -> float:
    """Specific heat of unfrozen food. [J/kg·K]

    Parameters
    ----------
    composition : Composition
        Mass fractions. [-]
    temperature_c : float
        Above freezing. [°C]

    Returns
    -------
    float
        Sum over the components. [J/kg·K]

    Notes
    -----
    Above the initial freezing point only.

    Examples
    --------
    >>> milk = Composition(water=0.8799, protein=0.0329, fat=0.0334, carbohydrate=0.0466, ash=0.0072)
    >>> specific_heat_j_per_kg_k(milk, 5.0)
    3888.

    References
    ----------
    ASHRAE Handbook Refrigeration 2006, ch. 9, mixing rule for specific heat.
    """
    return sum(
        share * component_specific_heat_j_per_kg_k(name, temperature_c) for name, share in composition.scaled().items()
    )


def bound_water_fraction(composition: Composition) -> float:
    """Water that does not freeze. [kg/kg]

    Parameters
    ----------
    composition : Composition
        Mass fractions. [-]

    Returns
    -------
    float
        0.4 times the protein, at most the water there is. [kg/kg]

    Notes
    -----
    Foods; pure solutions have none.

    Examples
    --------
    >>> bound_water_fraction(Composition(water=0.8122, protein=0.1781, ash=0.0116))
    0.071

    References
    ----------
    Schwartzberg (1976) in ASHRAE Handbook Refrigeration 2006, ch. 9.
    """
    return min(0.4 * composition.protein, composition.water)


def conductivity_w_per_m_k(composition: Composition, ice: float, temperature_c: float) -> float:
    """Thermal conductivity of food with some of its water frozen. [W/m·K]

    Parameters
    ----------
    composition : Composition
        Mass fractions. [-]
    ice : float
        Ice in a kilogram of food. [kg/kg]
    temperature_c : float
        Of the food. [°C]

    Returns
    -------
    float
        Mean of the bounds for a mixture without direction. [W/m·K]

    Notes
    -----
    Without pores. The bounds are those of Hashin and Shtrikman, which for two components are the two forms of
    Maxwell and Eucken's relation; that their mean is taken is our choice. Measured lean meat and fish lie up
    to 20 % higher, so a surface is shown to warm a little fast.

    Examples
    --------
    >>> beef = Composition(water=0.717, protein=0.2124, fat=0.044, ash=0.0108)
    >>> conductivity_w_per_m_k(beef, 0.0, 5.0)
    0.454

    References
    ----------
    Hashin and Shtrikman (1962), J. Applied Physics 33:3125 (from memory).
    """
    shares = _volume_shares(composition, ice, temperature_c)
    parts = [(share, component_conductivity_w_per_m_k(name, temperature_c)) for name, share in shares.items()]
    values = [value for _, value in parts]
    bounds = []
    for around in (min(values), max(values)):
        inverse = sum(share / (value + 2.0 * around) for share, value in parts)
        bounds.append(1.0 / inverse - 2.0 * around)
    return sum(bounds) / 2.0


def conductivity_bounds_w_per_m_k(composition: Composition, ice: float, temperature_c: float) -> tuple[float, float]:
    """Highest and lowest conductivity that the components allow. [W/m·K]

    Parameters
    ----------
    composition : Composition
        Mass fractions. [-]
    ice : float
        Ice in a kilogram of food. [kg/kg]
    temperature_c : float
        Of the food. [°C]

    Returns
    -------
    tuple of float
        Heat along the layers, heat across them. [W/m·K]

    Notes
    -----
    Without pores.

    Examples
    --------
    >>> pork = Composition(water=0.7263, protein=0.1955, fat=0.0714, ash=0.0102)
    >>> along, across = conductivity_bounds_w_per_m_k(pork, 0.6715, -40.0)
    >>> round(along, 1), round(across, 1)
    (2.0, 0.5)

    References
    ----------
    ASHRAE Handbook Refrigeration 2006, ch. 9.
    """
    shares = _volume_shares(composition, ice, temperature_c)
    parallel = sum(share * component_conductivity_w_per_m_k(name, temperature_c) for name, share in shares.items())
    across = sum(share / component_conductivity_w_per_m_k(name, temperature_c) for name, share in shares.items())
    return parallel, 1.0 / across


def density_kg_per_m3(composition: Composition, ice: float, temperature_c: float) -> float:
    """Density of food without pores. [kg/m³]

    Parameters
    ----------
    composition : Composition
        Mass fractions. [-]
    ice : float
        Ice in a kilogram of food. [kg/kg]
    temperature_c : float
        Of the food. [°C]

    Returns
    -------
    float
        Density. [kg/m³]

    Notes
    -----
    Pores are not counted.

    Examples
    --------
    >>> pork = Composition(water=0.7263, protein=0.1955, fat=0.0714, ash=0.0102)
    >>> density_kg_per_m3(pork, 0.6715, -40.0)
    995.

    References
    ----------
    ASHRAE Handbook Refrigeration 2006, ch. 9.
    """
    return 1.0 / sum(_volumes(composition, ice, temperature_c).values())


def food_curve(composition: Composition, *, initial_freezing_c: float) -> EnthalpyCurve:
    """Enthalpy curve of a food, 0 at -40 °C.

    Parameters
    ----------
    composition : Composition
        Mass fractions. [-]
    initial_freezing_c : float
        Where freezing begins, -38 to -0.05. [°C]

    Returns
    -------
    EnthalpyCurve
        Solids and ice below -40 °C, the freezing range up to the freezing point, unfrozen above. [J/kg]

    Raises
    ------
    InputOutOfRange
        Freezing point outside its range.

    Notes
    -----
    Freezing range from -40 °C; below, the ice of -40 °C stays and solids and ice have their own heat. Above
    freezing the correlation is for lean foods: cheese and fat meat come out 4 to 7 % low and butter 18 %, so
    they warm a little fast.

    Examples
    --------
    >>> cod = food_curve(Composition(water=0.8122, protein=0.1781, ash=0.0097), initial_freezing_c=-2.2)
    >>> round(cod.enthalpy_j_per_kg(-18.0) / 1000.0, 1)
    55.9

    References
    ----------
    Chen (1985) in ASHRAE Handbook Refrigeration 2006, ch. 9; Choi and Okos (1986) below -40 °C.
    """
    if not -38.0 <= initial_freezing_c <= -0.05:
        raise InputOutOfRange("initial_freezing_c", initial_freezing_c, "°C", -38.0, -0.05)
    # solids are what is not water, as in the handbook, also where the fractions do not quite add up
    solids = 1.0 - composition.water
    free = composition.water - bound_water_fraction(composition)
    bend = -free * LATENT_HEAT_OF_WATER_J_PER_KG * initial_freezing_c
    frozen = 1550.0 + 1260.0 * solids
    unfrozen = 4190.0 - 2300.0 * solids - 628.0 * solids**3
    top = segment_enthalpy(FREEZING, COLDEST_OF_CURVE_C, 0.0, frozen, bend, initial_freezing_c)
    ice = ice_fraction(free_water=free, initial_freezing_c=initial_freezing_c, temperature_c=COLDEST_OF_CURVE_C)
    return EnthalpyCurve(
        (
            _below(composition, ice),
            Segment(FREEZING, COLDEST_OF_CURVE_C, initial_freezing_c, 0.0, top, frozen, bend, ice, 0.0),
            Segment(
                LINEAR,
                initial_freezing_c,
                initial_freezing_c + _ABOVE_FREEZING_K,
                top,
                top + unfrozen * _ABOVE_FREEZING_K,
                unfrozen,
            ),
        ),
        conductivity_liquid_w_per_m_k=conductivity_w_per_m_k(composition, 0.0, 0.0),
        conductivity_solid_w_per_m_k=conductivity_w_per_m_k(composition, ice, _FROZEN_CONDUCTIVITY_AT_C),
        density_kg_per_m3=density_kg_per_m3(composition, 0.0, 0.0),
    )


def _below(composition: Composition, ice: float) -> Segment:
    """Heat of solids, unfrozen water and ice below the freezing range, ending at 0 J/kg."""

    def heat(at_c: float) -> float:
        shares = composition.scaled()
        unfrozen = max(shares.pop("water") - ice, 0.0)
        solids = sum(x * component_specific_heat_j_per_kg_k(name, at_c) for name, x in shares.items())
        # what stays unfrozen is bound to the solids; it is given the heat of ice
        return solids + (ice + unfrozen) * component_specific_heat_j_per_kg_k("ice", at_c)

    cold, warm = heat(_BELOW_CURVE_C), heat(COLDEST_OF_CURVE_C)
    width = COLDEST_OF_CURVE_C - _BELOW_CURVE_C
    start = -0.5 * (cold + warm) * width
    return Segment(QUADRATIC, _BELOW_CURVE_C, COLDEST_OF_CURVE_C, start, 0.0, cold, (warm - cold) / width, ice, ice)


def _volumes(composition: Composition, ice: float, temperature_c: float) -> dict[str, float]:
    """Cubic metres of each component in a kilogram."""
    masses = composition.scaled()
    masses["water"] = max(masses["water"] - ice, 0.0)
    masses["ice"] = ice
    return {
        name: mass / component_density_kg_per_m3(name, temperature_c) for name, mass in masses.items() if mass > 0.0
    }


def _volume_shares(composition: Composition, ice: float, temperature_c: float) -> dict[str, float]:
    volumes = _volumes(composition, ice, temperature_c)
    total = sum(volumes.values())
    return {name: volume / total for name, volume in volumes.items()}
