"""Kinetic-energy correction of the engineering Bernoulli balance."""

from __future__ import annotations

import numpy as np

from checker.hydraulics.arrays import ArrayLike, FloatArray, floats
from checker.hydraulics.friction import LAMINAR_LIMIT, TURBULENT_LIMIT

LAMINAR_FACTOR = 2.0


@np.errstate(all="ignore")
def power_law_factor(*, exponent: ArrayLike) -> FloatArray:
    r"""Kinetic-energy factor of the profile v = v_max (1 - r/R)^(1/n).

    .. math:: \alpha = \frac{(1+n)^3 (1+2n)^3}{4 n^4 (3+n)(3+2n)}

    Parameters
    ----------
    exponent : array_like
        n, [-], above zero; 7 is the usual value near Re = 1e5.

    Returns
    -------
    ndarray
        alpha, [-]; NaN where n is NaN or not above zero.

    References
    ----------
    .. [1] White, F.M., "Fluid Mechanics", section on the energy equation (n = 7: 1.058; from memory); the formula
       follows from the integral of v cubed over the bore.

    Examples
    --------
    >>> round(float(power_law_factor(exponent=7.0)), 3)
    1.058
    """
    order = floats(exponent)
    factor = (1.0 + order) ** 3 * (1.0 + 2.0 * order) ** 3 / (4.0 * order**4 * (3.0 + order) * (3.0 + 2.0 * order))
    return np.where(order > 0.0, factor, np.nan)


@np.errstate(all="ignore")
def kinetic_energy_factor(*, reynolds: ArrayLike, friction_factor: ArrayLike) -> FloatArray:
    r"""Kinetic-energy correction alpha of fully developed pipe flow.

    alpha is 2 in laminar flow; in turbulent flow that of a power-law profile of exponent 1/n with
    n = 1/sqrt(f), f Darcy; in the transition the larger of both.

    Parameters
    ----------
    reynolds : array_like
        Reynolds number, [-], at or above zero.
    friction_factor : array_like
        Darcy friction factor, [-], above zero; not needed where the flow is laminar.

    Returns
    -------
    ndarray
        alpha, [-]; NaN where it is not defined.

    References
    ----------
    .. [1] Nunner, W., VDI-Forschungsheft 455 (1956): n = 1/sqrt(f).
    .. [2] Bird, R.B., Stewart, W.E., Lightfoot, E.N., "Transport Phenomena", 2nd ed., section 7.4 (laminar: 2).
    """
    number = floats(reynolds)
    turbulent = power_law_factor(exponent=1.0 / np.sqrt(floats(friction_factor)))
    upper = np.where(number < TURBULENT_LIMIT, np.maximum(LAMINAR_FACTOR, turbulent), turbulent)
    factor = np.where(number < LAMINAR_LIMIT, LAMINAR_FACTOR, upper)
    return np.where(number >= 0.0, factor, np.nan)
