"""Two-phase flow in pipes of any slope after Beggs and Brill (1973): regime, hold-up, friction, gradient."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from checker.hydraulics.arrays import GRAVITY, ArrayLike, BoolArray, CodeArray, FloatArray, floats
from checker.hydraulics.friction import friction_factor
from checker.hydraulics.two_phase import NoSlip, no_slip

FLOW_REGIMES = ("segregated", "transition", "intermittent", "distributed")
_SEGREGATED, _TRANSITION, _INTERMITTENT, _DISTRIBUTED = range(4)

# Level hold-up a, b, c and uphill inclination d, e, f, g by flow regime (Beggs and Brill 1973, tables 1 and 2), one
# column a regime; the column of the transition is that of segregated flow, with which its interpolation begins.
# d = 1 and zeros for distributed flow uphill stand for "no correction". Logarithms of a and d.
_LEVEL = (
    np.log([0.98, 0.98, 0.845, 1.065]),
    np.array([0.4846, 0.4846, 0.5351, 0.5824]),
    np.array([0.0868, 0.0868, 0.0173, 0.0609]),
)
_UPHILL = (
    np.log([0.011, 0.011, 2.96, 1.0]),
    np.array([-3.768, -3.768, 0.305, 0.0]),
    np.array([3.539, 3.539, -0.4473, 0.0]),
    np.array([-1.614, -1.614, 0.0978, 0.0]),
)
_DOWNHILL = (np.log(4.70), -0.3692, 0.1244, -0.5056)
_LARGEST_EXPONENT = 7.0


class TwoPhaseState(NamedTuple):
    """Local state of a two-phase line, SI, one value a line."""

    liquid_holdup: FloatArray
    flow_regime: CodeArray
    no_slip_factor: FloatArray
    friction_factor: FloatArray
    slip_density: FloatArray
    near_one: BoolArray
    mixture: NoSlip


class _Groups(NamedTuple):
    """Logarithms of the dimensionless groups, and the Froude number itself."""

    fraction: FloatArray
    log_fraction: FloatArray
    log_froude: FloatArray
    log_velocity_number: FloatArray
    sine: FloatArray


@np.errstate(all="ignore")
def local_state(
    *,
    mass_flux: ArrayLike,
    vapour_fraction: ArrayLike,
    liquid_density: ArrayLike,
    vapour_density: ArrayLike,
    liquid_viscosity: ArrayLike,
    vapour_viscosity: ArrayLike,
    surface_tension: ArrayLike,
    inside_diameter: ArrayLike,
    roughness: ArrayLike,
    sine: ArrayLike,
) -> TwoPhaseState:
    """Flow regime, liquid hold-up and friction factor after Beggs and Brill.

    Parameters
    ----------
    mass_flux : array_like
        Mass flow over bore area, [kg/(m2 s)], above zero.
    vapour_fraction : array_like
        Mass fraction of vapour, [-], 0 to 1.
    liquid_density, vapour_density : array_like
        [kg/m3], above zero.
    liquid_viscosity, vapour_viscosity : array_like
        [Pa s], above zero.
    surface_tension : array_like
        [N/m], above zero.
    inside_diameter, roughness : array_like
        [m].
    sine : array_like
        Rise over length, [-], -1 to 1, positive uphill.

    Returns
    -------
    TwoPhaseState
        NaN, and regime -1, where an argument is NaN or outside its range. `friction_factor` is the Darcy factor of the
        two-phase flow, to be used with the no-slip density; `slip_density` is the density with hold-up; `near_one`
        tells where the friction exponent takes its formula for ratios of 1 to 1.2, at the end of which it jumps.

    Notes
    -----
    The hold-up is not let below the no-slip liquid fraction, and the inclination term C not below zero. Without liquid
    the hold-up is zero and the friction that of the gas. The method rests on tests in pipes of 25 and 38 mm bore.

    References
    ----------
    .. [1] Beggs, H.D., Brill, J.P., J. Pet. Technol. 25 (1973) 607-617, doi:10.2118/4007-PA.
    .. [2] Brill, J.P., Beggs, H.D., "Two-Phase Flow in Pipes", 1994 (transition regime, modified regime map).
    """
    bore, slope = floats(inside_diameter), floats(sine)
    mixture = no_slip(
        mass_flux=mass_flux,
        vapour_fraction=vapour_fraction,
        liquid_density=liquid_density,
        vapour_density=vapour_density,
        liquid_viscosity=liquid_viscosity,
        vapour_viscosity=vapour_viscosity,
    )
    groups = _groups(mixture, floats(liquid_density), floats(surface_tension), bore, slope)
    regime = _flow_regime(groups)
    holdup = _holdup(regime, groups)
    plain = friction_factor(
        reynolds=mixture.density * mixture.velocity * bore / mixture.viscosity,
        relative_roughness=floats(roughness) / bore,
    )
    exponent, near_one = _friction_exponent(groups.log_fraction, holdup, mixture.liquid_fraction)
    factor = plain * np.exp(exponent)
    slip = floats(liquid_density) * holdup + floats(vapour_density) * (1.0 - holdup)
    return TwoPhaseState(holdup, regime, plain, factor, slip, near_one, mixture)


def _groups(
    mixture: NoSlip, liquid_density: FloatArray, surface_tension: FloatArray, bore: FloatArray, sine: FloatArray
) -> _Groups:
    tension = np.where(surface_tension > 0.0, surface_tension, np.nan)
    froude = mixture.velocity * mixture.velocity / (GRAVITY * bore)
    number = mixture.liquid_velocity * np.sqrt(np.sqrt(liquid_density / (GRAVITY * tension)))
    slope = np.where(np.abs(sine) <= 1.0, sine, np.nan)
    fraction, froude, number, slope = np.broadcast_arrays(mixture.liquid_fraction, froude, number, slope)
    return _Groups(fraction, np.log(fraction), np.log(froude), np.log(number), slope)


def _flow_regime(groups: _Groups) -> CodeArray:
    """Code of the flow regime, -1 where it is not known."""
    log_fraction, log_froude, fraction = groups.log_fraction, groups.log_froude, groups.fraction
    first = np.log(316.0) + 0.302 * log_fraction
    second = np.log(0.0009252) - 2.4684 * log_fraction
    third = np.log(0.1) - 1.4516 * log_fraction
    fourth = np.log(0.5) - 6.738 * log_fraction
    thin, lean = fraction < 0.01, fraction < 0.4
    upper = np.where(lean, first, fourth)
    code = np.where(log_froude > upper, _DISTRIBUTED, _INTERMITTENT)
    code = np.where(~thin & (log_froude <= third), _TRANSITION, code)
    code = np.where(thin & (log_froude >= first), _DISTRIBUTED, code)
    code = np.where(log_froude < np.where(thin, first, second), _SEGREGATED, code)
    known = ~np.isnan(log_froude) & ~np.isnan(fraction)
    return np.where(known, code, -1).astype(np.int8)


def _segregated_share(groups: _Groups) -> FloatArray:
    """Share of segregated flow in the transition, (L3 - Fr) / (L3 - L2)."""
    second = np.log(0.0009252) - 2.4684 * groups.log_fraction
    third = np.log(0.1) - 1.4516 * groups.log_fraction
    share: FloatArray = np.expm1(groups.log_froude - third) / np.expm1(second - third)
    return share


def _holdup(regime: CodeArray, groups: _Groups) -> FloatArray:
    holdup = _regime_holdup(np.maximum(regime, 0), groups)
    crossing = regime == _TRANSITION
    if np.any(crossing):
        part = _Groups(*(values[crossing] for values in groups))
        share = _segregated_share(part)
        other = _regime_holdup(np.full(share.shape, _INTERMITTENT, dtype=np.int8), part)
        holdup[crossing] = share * holdup[crossing] + (1.0 - share) * other
    return np.where(regime >= 0, holdup, np.nan)


def _regime_holdup(regime: CodeArray, groups: _Groups) -> FloatArray:
    level, share, froude = (column[regime] for column in _LEVEL)
    flat = np.exp(level + share * groups.log_fraction - froude * groups.log_froude)
    flat = np.maximum(flat, groups.fraction)
    up = groups.sine > 0.0
    constant, one, two, three = (
        np.where(up, column[regime], downhill) for column, downhill in zip(_UPHILL, _DOWNHILL, strict=True)
    )
    logarithm = constant + one * groups.log_fraction + two * groups.log_velocity_number + three * groups.log_froude
    inclination = np.maximum((1.0 - groups.fraction) * logarithm, 0.0)
    bend = np.sin(1.8 * np.arcsin(groups.sine))
    factor = 1.0 + inclination * bend * (1.0 - bend * bend / 3.0)
    factor = np.where((groups.sine == 0.0) | (groups.fraction == 1.0), 1.0, factor)
    holdup = np.where(groups.fraction == 0.0, 0.0, flat * factor)
    return np.asarray(np.where(np.isnan(groups.log_velocity_number + groups.sine), np.nan, holdup))


def _friction_exponent(
    log_fraction: FloatArray, holdup: FloatArray, fraction: FloatArray
) -> tuple[FloatArray, BoolArray]:
    """Exponent S of the two-phase friction factor, and where its formula for ratios just above one holds."""
    log_ratio = log_fraction - 2.0 * np.log(holdup)
    ratio = np.exp(log_ratio)
    square = log_ratio * log_ratio
    general = log_ratio / (-0.0523 + 3.182 * log_ratio - 0.8725 * square + 0.01853 * square * square)
    near = np.log(2.2 * ratio - 1.2)
    near_one = (ratio > 1.0) & (ratio < 1.2)
    exponent = np.where(near_one, near, general)
    return np.where(fraction == 0.0, 0.0, np.minimum(exponent, _LARGEST_EXPONENT)), near_one


@np.errstate(all="ignore")
def pressure_gradient(
    *,
    mass_flux: ArrayLike,
    vapour_fraction: ArrayLike,
    liquid_density: ArrayLike,
    vapour_density: ArrayLike,
    liquid_viscosity: ArrayLike,
    vapour_viscosity: ArrayLike,
    surface_tension: ArrayLike,
    inside_diameter: ArrayLike,
    roughness: ArrayLike,
    sine: ArrayLike,
    pressure: ArrayLike,
) -> FloatArray:
    r"""Pressure gradient of Beggs and Brill, acceleration included.

    .. math:: -\frac{dp}{dL} = \frac{\frac{f_{tp}}{D}\frac{\rho_n v_m^2}{2} + \rho_s g \sin\theta}
       {1 - \rho_s v_m v_{sg} / p}

    Parameters
    ----------
    mass_flux, vapour_fraction, liquid_density, vapour_density, liquid_viscosity : array_like
        As in `local_state`.
    vapour_viscosity, surface_tension, inside_diameter, roughness, sine : array_like
        As in `local_state`.
    pressure : array_like
        Absolute pressure, [Pa], above zero.

    Returns
    -------
    ndarray
        Fall of pressure along the line, [Pa/m]; NaN where an argument is NaN or the acceleration factor reaches one.

    References
    ----------
    .. [1] Beggs, H.D., Brill, J.P., J. Pet. Technol. 25 (1973) 607-617, doi:10.2118/4007-PA.
    """
    state = local_state(
        mass_flux=mass_flux,
        vapour_fraction=vapour_fraction,
        liquid_density=liquid_density,
        vapour_density=vapour_density,
        liquid_viscosity=liquid_viscosity,
        vapour_viscosity=vapour_viscosity,
        surface_tension=surface_tension,
        inside_diameter=inside_diameter,
        roughness=roughness,
        sine=sine,
    )
    velocity = state.mixture.velocity
    friction = state.friction_factor / floats(inside_diameter) * 0.5 * state.mixture.density * velocity * velocity
    static = state.slip_density * GRAVITY * floats(sine)
    factor = state.slip_density * velocity * state.mixture.vapour_velocity / floats(pressure)
    return np.where(factor < 1.0, (friction + static) / (1.0 - factor), np.nan)
