"""Viscosity of liquid water, near enough to tell a wrong unit."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["liquid_water_viscosity"]

LOWEST, HIGHEST = 273.15, 573.15


def liquid_water_viscosity(temperature: ArrayLike) -> NDArray[np.float64]:
    """Return the viscosity of liquid water.

    Parameters
    ----------
    temperature : array_like
        Temperature [K].

    Returns
    -------
    float array
        Dynamic viscosity [Pa s], within 6 % from 0 to 300 degC; NaN outside.

    References
    ----------
    mu = A 10^(B / (T - C)), A = 2.414e-5 Pa s, B = 247.8 K, C = 140 K: the handbooks' three-constant equation, from
    memory; held against the IAPWS formulation of 2008 in the tests.
    """
    kelvin = np.asarray(temperature, dtype=np.float64)
    with np.errstate(invalid="ignore"):
        within = (kelvin >= LOWEST) & (kelvin <= HIGHEST)
    used = np.where(within, kelvin, LOWEST)
    return np.where(within, 2.414e-5 * 10.0 ** (247.8 / (used - 140.0)), np.nan)
