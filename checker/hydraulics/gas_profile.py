"""What happens along an isothermal gas line: pressure-drop parts and ledger integrals by quadrature.

The integrals run along the path of `checker.hydraulics.gas`: where the pressure changes little, over the path
coordinate, in which u = p^2 is explicit; where it changes much, over ln p, in which the integrands stay smooth.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from checker.hydraulics.arrays import (
    GRAVITY,
    ArrayLike,
    BoolArray,
    FloatArray,
    expm1_ratio,
    floats,
    gauss_legendre,
)

_POINTS = 24
#: Change of p^2, as a share of the larger end, up to which the path coordinate is used.
_GENTLE = 0.4


class GasProfile(NamedTuple):
    """Integrals along the line: friction and elevation in Pa, friction loss in J/kg, the line covered (1)."""

    friction: FloatArray
    elevation: FloatArray
    loss: FloatArray
    covered: FloatArray


@np.errstate(all="ignore")
def along_line(
    *,
    pressure_inlet: ArrayLike,
    pressure_outlet: ArrayLike,
    path: ArrayLike,
    mass_flux: ArrayLike,
    pressure_over_density: ArrayLike,
    loss_coefficient: ArrayLike,
    elevation_change: ArrayLike,
    kinetic_energy_factor: ArrayLike,
) -> GasProfile:
    r"""Friction and elevation parts of the pressure drop, and the viscous loss, integrated along the line.

    .. math:: \int_0^1 \frac{K G^2 c^2}{2 p} dx, \quad \int_0^1 \frac{p g \Delta z}{c^2} dx,
       \quad \int_0^1 \frac{K G^2 c^4}{2 p^2} dx

    Parameters
    ----------
    pressure_inlet, pressure_outlet, path : array_like
        Solution of `checker.hydraulics.gas`: end pressures in the pipe, [Pa], and end of the path coordinate.
    mass_flux, pressure_over_density, loss_coefficient, elevation_change, kinetic_energy_factor : array_like
        As in `checker.hydraulics.gas.outlet_from_inlet`.

    Returns
    -------
    GasProfile
        NaN where an argument is NaN.

    References
    ----------
    .. [1] Bird, R.B., Stewart, W.E., Lightfoot, E.N., "Transport Phenomena", 2nd ed., sections 7.4 and 15.4.
    """
    first, last, end, flux, energy, loss, rise, alpha = np.broadcast_arrays(
        *map(
            floats,
            (
                pressure_inlet,
                pressure_outlet,
                path,
                mass_flux,
                pressure_over_density,
                loss_coefficient,
                elevation_change,
                kinetic_energy_factor,
            ),
        )
    )
    dynamic = flux * flux * energy
    climb = 2.0 * GRAVITY * rise / energy
    resistance, kinetic = loss * dynamic, alpha * dynamic
    gentle = np.abs(first * first - last * last) <= _GENTLE * np.maximum(first, last) ** 2
    friction, elevation, viscous, covered = (np.zeros_like(first) for _ in range(4))
    for node, weight in gauss_legendre(_POINTS):
        square, slice_ = _node(node, first, last, end, climb, resistance, kinetic, gentle)
        pressure = np.sqrt(square)
        share = weight * slice_
        friction = friction + share * 0.5 * resistance / pressure
        elevation = elevation + share * 0.5 * climb * pressure
        viscous = viscous + share * 0.5 * resistance * energy / square
        covered = covered + share
    return GasProfile(friction, elevation, viscous, covered)


def _node(
    node: float,
    first: FloatArray,
    last: FloatArray,
    end: FloatArray,
    climb: FloatArray,
    resistance: FloatArray,
    kinetic: FloatArray,
    gentle: BoolArray,
) -> tuple[FloatArray, FloatArray]:
    """Square of the pressure at a node, and dx over d(node)."""
    start = first * first
    place = end * node
    square_gentle = start - (climb * start + resistance) * place * expm1_ratio(-climb * place)
    span = np.log(first / last)
    square_steep = start * np.exp(-2.0 * span * node)
    square = np.where(gentle, square_gentle, square_steep)
    steep = span * 2.0 * square / (climb * square + resistance)
    return square, np.where(gentle, end, steep) * (1.0 - kinetic / square)


@np.errstate(all="ignore")
def pressure_energy(
    *, pressure_inlet: ArrayLike, pressure_drop: ArrayLike, pressure_over_density: ArrayLike
) -> FloatArray:
    r"""Pressure term of the balance for a gas at constant temperature, by quadrature over the pressure.

    .. math:: \int_{p_2}^{p_1} \frac{dp}{\rho} = c^2 \int_{p_2}^{p_1} \frac{dp}{p}

    Parameters
    ----------
    pressure_inlet : array_like
        p1, [Pa], above zero.
    pressure_drop : array_like
        p1 - p2, [Pa], below p1; negative where the pressure rises.
    pressure_over_density : array_like
        c2, [J/kg].

    Returns
    -------
    ndarray
        [J/kg]; NaN where an argument is NaN.

    Notes
    -----
    Eight panels, each covering the same ratio of pressures when the drop is large and the same difference when it is
    small, so that neither the logarithm of the closed form nor a difference of near-equal pressures is used.

    References
    ----------
    .. [1] Bird, R.B., Stewart, W.E., Lightfoot, E.N., "Transport Phenomena", 2nd ed., eq. 15.4-1.
    """
    first, drop = floats(pressure_inlet), floats(pressure_drop)
    last = first - drop
    panels = 8
    ratio = (last / first) ** (1.0 / panels)
    steep = np.abs(drop) > 0.5 * first
    total = np.zeros_like(first * drop)
    upper = first
    for panel in range(1, panels + 1):
        lower = np.where(steep, upper * ratio, first - drop * (panel / panels))
        width = np.where(steep, upper - lower, drop / panels)
        for node, weight in gauss_legendre(_POINTS):
            total = total + weight * width / (upper - width * node)
        upper = lower
    return floats(pressure_over_density) * total
