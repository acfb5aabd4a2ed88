"""Erosional velocity of two-phase flow."""

from __future__ import annotations

import math

import numpy as np

from checker.hydraulics.arrays import ArrayLike, FloatArray, floats, positive

#: C in SI for C = 1 in ft/s and lb/ft3: a foot times the square root of (a pound over a cubic foot).
SI_CONSTANT = 0.3048 * math.sqrt(0.45359237 / 0.3048**3)


def erosional_constant_si(*, field_constant: ArrayLike) -> FloatArray:
    """Turn C of the API formula from ft/s and lb/ft3 into m/s and kg/m3 (100 becomes 122)."""
    return SI_CONSTANT * floats(field_constant)


@np.errstate(all="ignore")
def erosional_velocity(*, density: ArrayLike, erosional_constant: ArrayLike) -> FloatArray:
    r"""Erosional velocity of API RP 14E.

    .. math:: v_e = \frac{C}{\sqrt{\rho_m}}

    Parameters
    ----------
    density : array_like
        No-slip mixture density at flowing pressure and temperature, [kg/m3], above zero.
    erosional_constant : array_like
        C in SI, [(kg/(m s2))^0.5], above zero: 122 for solids-free continuous service.

    Returns
    -------
    ndarray
        [m/s]; NaN where an argument is NaN or outside its range.

    Notes
    -----
    For solids-free two-phase flow. With solids no C is published; for single phase it is a misuse in the view of many
    published reviews.

    References
    ----------
    .. [1] API RP 14E, 5th ed., 1991, section 2.5, eq. 2.14.

    Examples
    --------
    >>> round(float(erosional_velocity(density=100.0, erosional_constant=122.0)), 6)
    12.2
    """
    return positive(erosional_constant) / np.sqrt(positive(density))
