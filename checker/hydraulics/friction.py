"""Reynolds number and Darcy friction factor: laminar, Colebrook-White, transition, fully rough."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray

from checker.hydraulics.arrays import ArrayLike, BoolArray, FloatArray, floats

SingleArray = NDArray[np.float32]

LAMINAR_LIMIT = 2000.0
TURBULENT_LIMIT = 4000.0
#: Absolute roughness of the clean commercial steel pipe behind Crane's fT, m (0.0018 in; Crane TP-410, A-24).
CRANE_ROUGHNESS = 0.0018 * 0.0254

_COLEBROOK_SLOPE = 2.0 / math.log(10.0)
#: Values worked on at once, so that the arrays stay in the processor's cache.
_BLOCK = 8192


@np.errstate(all="ignore")
def reynolds(*, mass_flux: ArrayLike, inside_diameter: ArrayLike, viscosity: ArrayLike) -> FloatArray:
    r"""Reynolds number of pipe flow from the mass flux.

    .. math:: Re = \frac{G D}{\mu}

    Parameters
    ----------
    mass_flux : array_like
        Mass flow over bore area, [kg/(m2 s)], at or above zero.
    inside_diameter : array_like
        Bore, [m], above zero.
    viscosity : array_like
        Dynamic viscosity, [Pa s], above zero.

    Returns
    -------
    ndarray
        Reynolds number, [-]; NaN where an argument is NaN or outside its range.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, eq. 1-1 and 1-2.

    Examples
    --------
    >>> float(reynolds(mass_flux=1000.0, inside_diameter=0.1, viscosity=1e-3))
    100000.0
    """
    flux, bore, dynamic = floats(mass_flux), floats(inside_diameter), floats(viscosity)
    number = flux * bore / dynamic
    return np.where((flux >= 0.0) & (bore > 0.0) & (dynamic > 0.0), number, np.nan)


@np.errstate(all="ignore")
def colebrook(*, reynolds: ArrayLike, relative_roughness: ArrayLike) -> FloatArray:
    r"""Darcy friction factor of Colebrook and White (1939), to machine precision.

    .. math:: \frac{1}{\sqrt f} = -2 \log_{10}\left(\frac{\epsilon/D}{3.7} + \frac{2.51}{Re \sqrt f}\right)

    Parameters
    ----------
    reynolds : array_like
        Reynolds number, [-], above zero; meant for 2000 and above.
    relative_roughness : array_like
        Roughness over bore, [-], 0 to below 1 (data behind the formula: up to 0.05).

    Returns
    -------
    ndarray
        Darcy friction factor, [-]; NaN where an argument is NaN or outside its range.

    Notes
    -----
    The start is the explicit formula of Brkic and Praks [2]_ (two logarithms, within 1e-4), with one step of Newton in
    single precision and one in double precision. The number of steps is fixed, so that no element depends on its
    neighbours.

    References
    ----------
    .. [1] Colebrook, C.F., J. Inst. Civ. Eng. 11 (1939) 133-156, doi:10.1680/ijoti.1939.13150.
    .. [2] Brkic, D., Praks, P., Mathematics 7 (2019) 34, doi:10.3390/math7010034.

    Examples
    --------
    >>> round(float(colebrook(reynolds=1e5, relative_roughness=1e-4)), 11)
    0.01851386608
    """
    number, rough = floats(reynolds), floats(relative_roughness)
    start = _single_precision_root(number.astype(np.float32), rough.astype(np.float32)).astype(np.float64)
    smooth_term = 2.51 / number
    argument = rough * (1.0 / 3.7) + smooth_term * start
    slope = 1.0 + _COLEBROOK_SLOPE * smooth_term / argument
    root = start - (start + _COLEBROOK_SLOPE * np.log(argument)) / slope
    return np.where((rough >= 0.0) & (rough < 1.0), 1.0 / (root * root), np.nan)


def _single_precision_root(number: SingleArray, rough: SingleArray) -> SingleArray:
    """1/sqrt(f) to seven digits. In single precision the logarithm costs a tenth."""
    single = np.float32
    log_part = np.log(number) - single(0.7794)
    both = number * rough * single(1.0 / 8.0884) + log_part
    log_both = np.log(both)
    correction = log_both / (both - single(0.5588) * log_both + single(1.2079))
    root = single(0.8686) * (log_part - log_both + correction)
    smooth_term = single(2.51) / number
    argument = rough * single(1.0 / 3.7) + smooth_term * root
    slope = single(1.0) + single(_COLEBROOK_SLOPE) * smooth_term / argument
    improved: SingleArray = root - (root + single(_COLEBROOK_SLOPE) * np.log(argument)) / slope
    return improved


@np.errstate(all="ignore")
def friction_factor(*, reynolds: ArrayLike, relative_roughness: ArrayLike) -> FloatArray:
    r"""Darcy friction factor over all flow regimes (4 times the Fanning factor).

    Below Re = 2000 it is 64/Re, from 4000 on that of Colebrook and White; between them the larger of both is taken,
    which is the safe side for pressure drop.

    Parameters
    ----------
    reynolds : array_like
        Reynolds number, [-], above zero.
    relative_roughness : array_like
        Roughness over bore, [-], 0 to below 1; not needed where the flow is laminar.

    Returns
    -------
    ndarray
        Darcy friction factor, [-]; NaN where it is not defined.

    Notes
    -----
    From Re = 2000 on Colebrook's value is above 64/Re for every roughness (0.0495 against 0.032 at 2000 in smooth
    pipe), so that the larger of both in the critical zone is Colebrook's.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, chapter 1 (critical zone 2000 to 4000).
    .. [2] Colebrook, C.F., J. Inst. Civ. Eng. 11 (1939) 133-156.

    Examples
    --------
    >>> float(friction_factor(reynolds=1000.0, relative_roughness=1e-3))
    0.064
    """
    number, rough = np.broadcast_arrays(floats(reynolds), floats(relative_roughness))
    if number.size <= _BLOCK:
        return _all_regimes(number, rough)
    factor = np.empty(number.size)
    flat_number, flat_rough = number.ravel(), rough.ravel()
    for start in range(0, number.size, _BLOCK):
        rows = slice(start, start + _BLOCK)
        factor[rows] = _all_regimes(flat_number[rows], flat_rough[rows])
    return factor.reshape(number.shape)


def _all_regimes(number: FloatArray, rough: FloatArray) -> FloatArray:
    turbulent = colebrook(reynolds=number, relative_roughness=rough)
    factor = np.where(number < LAMINAR_LIMIT, 64.0 / number, turbulent)
    return np.where(number > 0.0, factor, np.nan)


@np.errstate(all="ignore")
def transitional(*, reynolds: ArrayLike) -> BoolArray:
    """Tell where the flow lies in the critical zone, 2000 to 4000 (Crane TP-410, 2009, chapter 1); NaN is False."""
    number = floats(reynolds)
    return (number >= LAMINAR_LIMIT) & (number < TURBULENT_LIMIT)


@np.errstate(all="ignore")
def fully_rough(*, relative_roughness: ArrayLike) -> FloatArray:
    r"""Darcy friction factor of complete turbulence, the limit of Colebrook's formula at infinite Reynolds number.

    .. math:: f_T = \left(2 \log_{10} \frac{3.7}{\epsilon / D}\right)^{-2}

    Parameters
    ----------
    relative_roughness : array_like
        Roughness over bore, [-], above 0 and below 1.

    Returns
    -------
    ndarray
        Darcy friction factor, [-]; NaN outside the range (0 gives NaN: a smooth wall has no rough limit).

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, eq. 2-8.
    """
    rough = floats(relative_roughness)
    root = -_COLEBROOK_SLOPE * np.log(rough / 3.7)
    return np.where((rough > 0.0) & (rough < 1.0), 1.0 / (root * root), np.nan)


@np.errstate(all="ignore")
def crane_turbulent_factor(*, inside_diameter: ArrayLike) -> FloatArray:
    """Crane's fT: complete turbulence in clean commercial steel pipe of this bore.

    Parameters
    ----------
    inside_diameter : array_like
        Bore, [m], above zero.

    Returns
    -------
    ndarray
        fT, [-]; NaN where the bore is NaN or not above the roughness of steel pipe.

    Notes
    -----
    The K of a fitting is n times this fT whatever the pipe is made of: n is a shape, and fT of steel of that size
    only carries its size effect. The roughness of the line itself is therefore not used here.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, pages 2-8 and A-27.
    """
    return fully_rough(relative_roughness=CRANE_ROUGHNESS / floats(inside_diameter))
