"""Mean kinetic temperature of a record of temperatures. The engine has its own for a running window."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from scipy.special import logsumexp

from app.units import GAS_CONSTANT_J_PER_MOL_K, ZERO_CELSIUS_K


def mean_kinetic_c(
    temperatures_c: Sequence[float], durations_h: Sequence[float], activation_kj_per_mol: float = 83.144
) -> float:
    """The one temperature that would have done the same damage as a record. [°C]

    Parameters
    ----------
    temperatures_c : sequence of float
        Of each stretch, shape (n,). [°C]
    durations_h : sequence of float
        Of each stretch, shape (n,). [h]
    activation_kj_per_mol : float
        Activation energy; 83.144 in the pharmacopoeia. [kJ/mol]

    Returns
    -------
    float
        Mean kinetic temperature. [°C]

    Notes
    -----
    For damage that follows Arrhenius; not for freezing, melting or growth.

    Examples
    --------
    >>> mean_kinetic_c([5.0, 15.0], [21.0, 3.0])
    7.107

    References
    ----------
    USP <1160>.
    """
    over_k = activation_kj_per_mol * 1000.0 / GAS_CONSTANT_J_PER_MOL_K
    kelvin = np.asarray(temperatures_c) + ZERO_CELSIUS_K
    weights = np.asarray(durations_h) / np.sum(durations_h)
    return float(over_k / -logsumexp(-over_k / kelvin, b=weights)) - ZERO_CELSIUS_K
