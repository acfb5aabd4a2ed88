"""The no-slip mixture of liquid and vapour: density, viscosity, velocities."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from checker.hydraulics.arrays import ArrayLike, FloatArray, floats, positive


class NoSlip(NamedTuple):
    """No-slip mixture, SI: liquid volume fraction, density, viscosity, mixture and superficial velocities."""

    liquid_fraction: FloatArray
    density: FloatArray
    viscosity: FloatArray
    velocity: FloatArray
    liquid_velocity: FloatArray
    vapour_velocity: FloatArray


@np.errstate(all="ignore")
def mixture_density(*, vapour_fraction: ArrayLike, liquid_density: ArrayLike, vapour_density: ArrayLike) -> FloatArray:
    r"""Density of the no-slip mixture.

    .. math:: \frac{1}{\rho_n} = \frac{1 - x}{\rho_L} + \frac{x}{\rho_G}

    Parameters
    ----------
    vapour_fraction : array_like
        Mass fraction of vapour, [-], 0 to 1.
    liquid_density, vapour_density : array_like
        [kg/m3], above zero.

    Returns
    -------
    ndarray
        [kg/m3]; NaN where an argument is NaN or outside its range.

    References
    ----------
    .. [1] API RP 14E, 5th ed., 1991, section 2.5 (mixture density at flowing pressure and temperature).
    """
    quality = _fraction(vapour_fraction)
    volume: FloatArray = (1.0 - quality) / positive(liquid_density) + quality / positive(vapour_density)
    return 1.0 / volume


@np.errstate(all="ignore")
def void_fraction(*, vapour_fraction: ArrayLike, liquid_density: ArrayLike, vapour_density: ArrayLike) -> FloatArray:
    r"""Volume fraction of vapour without slip (homogeneous void fraction).

    .. math:: \frac{x / \rho_G}{x / \rho_G + (1 - x) / \rho_L}

    Parameters
    ----------
    vapour_fraction, liquid_density, vapour_density : array_like
        As in `mixture_density`.

    Returns
    -------
    ndarray
        [-]; NaN where an argument is NaN or outside its range.

    References
    ----------
    .. [1] Ghiaasiaan, S.M., "Two-Phase Flow, Boiling and Condensation", 2007, chapter 3.
    """
    quality = _fraction(vapour_fraction)
    vapour = quality / positive(vapour_density)
    share: FloatArray = vapour / (vapour + (1.0 - quality) / positive(liquid_density))
    return share


@np.errstate(all="ignore")
def no_slip(
    *,
    mass_flux: ArrayLike,
    vapour_fraction: ArrayLike,
    liquid_density: ArrayLike,
    vapour_density: ArrayLike,
    liquid_viscosity: ArrayLike,
    vapour_viscosity: ArrayLike,
) -> NoSlip:
    r"""No-slip mixture: volume-weighted density and viscosity, mixture and superficial velocities.

    .. math:: \lambda_L = \frac{v_{sl}}{v_{sl} + v_{sg}}, \quad \mu_n = \lambda_L \mu_L + (1 - \lambda_L) \mu_G

    Parameters
    ----------
    mass_flux : array_like
        [kg/(m2 s)], above zero.
    vapour_fraction, liquid_density, vapour_density : array_like
        As in `mixture_density`.
    liquid_viscosity, vapour_viscosity : array_like
        [Pa s], above zero.

    Returns
    -------
    NoSlip
        NaN where an argument is NaN or outside its range.

    References
    ----------
    .. [1] Brill, J.P., Beggs, H.D., "Two-Phase Flow in Pipes", 1994, no-slip mixture properties.
    """
    flux, quality = positive(mass_flux), _fraction(vapour_fraction)
    liquid_velocity = flux * (1.0 - quality) / positive(liquid_density)
    vapour_velocity = flux * quality / positive(vapour_density)
    velocity = liquid_velocity + vapour_velocity
    fraction = liquid_velocity / velocity
    viscosity = positive(liquid_viscosity) * fraction + positive(vapour_viscosity) * (1.0 - fraction)
    return NoSlip(fraction, flux / velocity, viscosity, velocity, liquid_velocity, vapour_velocity)


def _fraction(values: ArrayLike) -> FloatArray:
    quality = floats(values)
    return np.where((quality >= 0.0) & (quality <= 1.0), quality, np.nan)
