"""Saturation temperature of water and steam."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["HIGHEST_PRESSURE", "LOWEST_PRESSURE", "saturation_temperature"]

FloatArray = NDArray[np.float64]
#: Range of the equation, Pa: saturation at 273.15 K, and the critical pressure.
LOWEST_PRESSURE, HIGHEST_PRESSURE = 611.213, 22.064e6
#: n1 to n10 of IAPWS-IF97, region 4 (Table 34).
_N = (
    0.11670521452767e4, -0.72421316703206e6, -0.17073846940092e2, 0.12020824702470e5, -0.32325550322333e7,
    0.14915108613530e2, -0.48232657361591e4, 0.40511340542057e6, -0.23855557567849, 0.65017534844798e3,
)  # fmt: skip


def saturation_temperature(pressure: ArrayLike) -> FloatArray:
    """Return the temperature at which water boils.

    Parameters
    ----------
    pressure : array_like
        Absolute pressure [Pa].

    Returns
    -------
    float array
        Saturation temperature [K]; NaN below 611.213 Pa and above the critical pressure of 22.064 MPa.

    References
    ----------
    IAPWS R7-97(2012), Revised Release on the IAPWS Industrial Formulation 1997 for the Thermodynamic Properties of
    Water and Steam, equation 31 (backward equation of region 4).

    Examples
    --------
    >>> float(saturation_temperature(1e6).round(6))
    453.035632
    """
    n1, n2, n3, n4, n5, n6, n7, n8, n9, n10 = _N
    given = np.asarray(pressure, dtype=np.float64)
    with np.errstate(invalid="ignore"):
        within = (given >= LOWEST_PRESSURE) & (given <= HIGHEST_PRESSURE)
    beta = (np.where(within, given, 1e5) / 1e6) ** 0.25
    e = beta**2 + n3 * beta + n6
    f = n1 * beta**2 + n4 * beta + n7
    g = n2 * beta**2 + n5 * beta + n8
    d = n10 + 2.0 * g / (-f - np.sqrt(f**2 - 4.0 * e * g))
    temperature = 0.5 * (d - np.sqrt(d**2 - 4.0 * (n9 + n10 * (d - n10))))
    return np.where(within, temperature, np.nan)
