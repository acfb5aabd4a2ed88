"""Density of a gas from pressure, temperature, molar mass and compressibility."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["DENSITY_TOLERANCE", "GAS_CONSTANT", "gas_density", "resolved_gas_density"]

FloatArray = NDArray[np.float64]
GAS_CONSTANT = 8.314462618
DENSITY_TOLERANCE = 0.05
GREATEST_GAS_DENSITY = 400.0


def gas_density(
    *, pressure: FloatArray, temperature: FloatArray, molar_mass: FloatArray, compressibility: FloatArray
) -> FloatArray:
    """Return P M / (Z R T), the real-gas law.

    Parameters
    ----------
    pressure : float array
        Absolute pressure [Pa].
    temperature : float array
        Temperature [K].
    molar_mass : float array
        Molar mass [kg/mol].
    compressibility : float array
        Compressibility factor [-].

    Returns
    -------
    float array
        Density [kg/m3]; NaN where any of them is missing or not above zero.

    References
    ----------
    Definition of the compressibility factor; R = 8.314462618 J/(mol K), CODATA 2018.

    Examples
    --------
    >>> import numpy as np
    >>> float(gas_density(pressure=np.array(101325.0), temperature=np.array(273.15), molar_mass=np.array(0.0289652),
    ...                   compressibility=np.array(1.0)).round(4))
    1.2923
    """
    with np.errstate(all="ignore"):
        density = pressure * molar_mass / (compressibility * GAS_CONSTANT * temperature)
    return np.where(np.isfinite(density) & (density > 0.0), density, np.nan)


def resolved_gas_density(*, listed: FloatArray, computed: FloatArray) -> tuple[FloatArray, NDArray[np.bool_]]:
    """Return the listed density, else the computed one; NaN and True where they contradict each other or a gas.

    They contradict each other beyond 5 %; a computed density above 400 kg/m3 is that of no gas (common practice).
    """
    with np.errstate(invalid="ignore"):
        contradictory = np.abs(listed - computed) > DENSITY_TOLERANCE * computed
        contradictory |= computed > GREATEST_GAS_DENSITY
    density = np.where(np.isfinite(listed), listed, computed)
    return np.where(contradictory, np.nan, density), contradictory
