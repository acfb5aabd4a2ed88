"""Isothermal compressible flow of a gas in a pipe, elevation and kinetic energy included.

With p / rho = c^2 = Z R T / M constant along the line, the loss coefficient K (pipe and fittings) and the rise both
spread evenly, and x running from 0 to 1 along the line, the engineering Bernoulli balance of a slice is

    dx (g dz + K G^2 c^4 / (2 p^2)) = -(c^2 / p - alpha G^2 c^4 / p^3) dp

With u = p^2, E = 2 g dz / c^2, B = K G^2 c^2 and a = alpha G^2 c^2 it becomes

    dx (E u + B) = -(1 - a / u) du

A path coordinate t with du/dt = -(E u + B), hence dx/dt = 1 - a/u, gives u in closed form,

    u(t) = u1 - (E u1 + B) (1 - exp(-E t)) / E

and leaves one smooth equation for the end of the path, t - (a/B) ln(1 + B r / u2) = 1 with r = (1 - exp(-E t)) / E,
free of cancellation for a level line, a line without loss and a line in balance of fall and friction.
a = u is the choking condition: p* = G c sqrt(alpha).
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from checker.hydraulics.arrays import (
    GRAVITY,
    ArrayLike,
    BoolArray,
    FloatArray,
    IndexArray,
    expm1_ratio,
    floats,
    log1p_ratio,
)

_STEPS = 120
_TOLERANCE = 2.0e-15
#: p^2 over G^2 c^2 (alpha + K) above which no line chokes, and the path to choking is lost in rounding.
_FAR_FROM_CHOKING = 1.0e8


class GasFlow(NamedTuple):
    """Result of an isothermal line: end pressures in Pa, choking, the end of the path coordinate, p1 - p2 in Pa.

    The pressure drop is had without taking the difference of two near-equal pressures.
    """

    pressure_inlet: FloatArray
    pressure_outlet: FloatArray
    choked: BoolArray
    path: FloatArray
    pressure_drop: FloatArray


class _Line(NamedTuple):
    """u of the known end, its slope E u + B, and the constants E, B, a; one value a line."""

    known: FloatArray
    slope: FloatArray
    rise: FloatArray
    loss: FloatArray
    kinetic: FloatArray


@np.errstate(all="ignore")
def choking_pressure(
    *, mass_flux: ArrayLike, pressure_over_density: ArrayLike, kinetic_energy_factor: ArrayLike = 1.0
) -> FloatArray:
    r"""Lowest pressure at which the flow still goes through the pipe at constant temperature.

    .. math:: p^* = G c \sqrt{\alpha}, \quad c^2 = p / \rho

    Parameters
    ----------
    mass_flux : array_like
        G, [kg/(m2 s)].
    pressure_over_density : array_like
        c2 = Z R T / M, [J/kg].
    kinetic_energy_factor : array_like, optional
        alpha, [-].

    Returns
    -------
    ndarray
        p*, [Pa]; NaN where an argument is NaN.

    References
    ----------
    .. [1] Bird, R.B., Stewart, W.E., Lightfoot, E.N., "Transport Phenomena", 2nd ed., section 15.4 (Mach number at
       the end of an isothermal duct: 1/sqrt(k)).
    """
    return floats(mass_flux) * np.sqrt(floats(pressure_over_density) * floats(kinetic_energy_factor))


@np.errstate(all="ignore")
def mach_number(*, velocity: ArrayLike, pressure_over_density: ArrayLike, heat_capacity_ratio: ArrayLike) -> FloatArray:
    r"""Mach number of a gas.

    .. math:: Ma = \frac{v}{\sqrt{k Z R T / M}}, \quad Z R T / M = p / \rho

    Parameters
    ----------
    velocity : array_like
        v, [m/s].
    pressure_over_density : array_like
        p / rho, [J/kg], above zero.
    heat_capacity_ratio : array_like
        k, [-], 1 or above.

    Returns
    -------
    ndarray
        Ma, [-]; NaN where an argument is NaN or outside its range.

    Notes
    -----
    k of the ideal gas; near the critical point an equation of state gives the velocity of sound.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, eq. 1-10 (sonic velocity).
    """
    ratio, energy = floats(heat_capacity_ratio), floats(pressure_over_density)
    sonic = np.sqrt(ratio * energy)
    return np.where((ratio >= 1.0) & (energy > 0.0), floats(velocity) / sonic, np.nan)


@np.errstate(all="ignore")
def outlet_from_inlet(
    *,
    pressure_inlet: ArrayLike,
    mass_flux: ArrayLike,
    pressure_over_density: ArrayLike,
    loss_coefficient: ArrayLike,
    elevation_change: ArrayLike = 0.0,
    kinetic_energy_factor: ArrayLike = 1.0,
) -> GasFlow:
    """Outlet pressure of an isothermal gas line from its inlet pressure; the equation is in the module's text.

    Parameters
    ----------
    pressure_inlet : array_like
        Static pressure at the first plane of the pipe, [Pa], above zero.
    mass_flux : array_like
        G, [kg/(m2 s)], at or above zero.
    pressure_over_density : array_like
        c2 = Z R T / M, [J/kg], above zero.
    loss_coefficient : array_like
        K = f L/D + sum of fittings, [-], at or above zero.
    elevation_change : array_like, optional
        Outlet minus inlet, [m].
    kinetic_energy_factor : array_like, optional
        alpha, [-]; 1 gives the usual isothermal equation.

    Returns
    -------
    GasFlow
        Where the flow cannot get through, `choked` is True, the outlet pressure is the choking pressure, and the
        path NaN. NaN arguments, or ones outside their range, give NaN.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, eq. 1-6 (level line, alpha = 1).
    .. [2] Geankoplis, C.J., "Transport Processes and Unit Operations", 3rd ed., section 2.11.
    """
    first, flux, energy, loss, rise, alpha = np.broadcast_arrays(
        *map(
            floats,
            (
                pressure_inlet,
                mass_flux,
                pressure_over_density,
                loss_coefficient,
                elevation_change,
                kinetic_energy_factor,
            ),
        )
    )
    line = _line(first, flux, energy, loss, rise, alpha)
    far = line.known * np.exp(-np.maximum(line.rise, 0.0)) > _FAR_FROM_CHOKING * (line.kinetic + line.loss)
    limit = np.where(far, np.inf, _path_to_choking(line))
    reaches = (limit >= 1.0) & (_inlet_residual(limit, line)[0] >= 0.0) | np.isinf(limit)
    valid = np.isfinite(line.slope) & np.isfinite(line.kinetic)
    choked = valid & ~(reaches & (line.known >= line.kinetic))
    path = _solve(np.where(valid & ~choked, 1.0, np.nan), limit, line, from_inlet=True)
    fall = line.slope * path * expm1_ratio(-line.rise * path)
    outlet = np.where(choked, np.sqrt(line.kinetic), np.sqrt(line.known - fall))
    return GasFlow(np.where(valid, first, np.nan), outlet, choked, path, fall / (first + outlet))


@np.errstate(all="ignore")
def inlet_from_outlet(
    *,
    pressure_outlet: ArrayLike,
    mass_flux: ArrayLike,
    pressure_over_density: ArrayLike,
    loss_coefficient: ArrayLike,
    elevation_change: ArrayLike = 0.0,
    kinetic_energy_factor: ArrayLike = 1.0,
) -> GasFlow:
    """Inlet pressure of an isothermal gas line from the pressure behind its outlet.

    Parameters
    ----------
    pressure_outlet : array_like
        Static pressure at the last plane, or of the receiver behind it, [Pa], above zero.
    mass_flux, pressure_over_density, loss_coefficient, elevation_change, kinetic_energy_factor : array_like
        As in `outlet_from_inlet`.

    Returns
    -------
    GasFlow
        Where the stated outlet pressure is below the choking pressure, the exit plane floats up to the choking
        pressure: `choked` is True, the outlet pressure is that of the plane, and the line is solved upstream from
        there. NaN where no inlet pressure satisfies the balance (a fall that would need sonic flow upstream).

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, eq. 1-6 (level line, alpha = 1).
    .. [2] API Standard 521, 7th ed., 2020, section 5.5 (isothermal sizing of relief headers from the outlet).
    """
    last, flux, energy, loss, rise, alpha = np.broadcast_arrays(
        *map(
            floats,
            (
                pressure_outlet,
                mass_flux,
                pressure_over_density,
                loss_coefficient,
                elevation_change,
                kinetic_energy_factor,
            ),
        )
    )
    floor = choking_pressure(mass_flux=flux, pressure_over_density=energy, kinetic_energy_factor=alpha)
    choked = last < floor
    plane = np.where(choked, floor, last)
    line = _line(plane, flux, energy, loss, rise, alpha)
    line = line._replace(known=np.maximum(line.known, line.kinetic))
    limit = np.full_like(plane, np.inf)
    path = _solve(np.where(np.isfinite(line.slope), 1.0, np.nan), limit, line, from_inlet=False)
    fall = line.slope * path * expm1_ratio(line.rise * path)
    square = line.known + fall
    inlet = np.where(square >= line.kinetic, np.sqrt(square), np.nan)
    outlet = np.where(np.isfinite(line.slope), plane, np.nan)
    return GasFlow(inlet, outlet, choked, np.where(inlet > 0.0, path, np.nan), fall / (inlet + outlet))


def _line(
    pressure: FloatArray, flux: FloatArray, energy: FloatArray, loss: FloatArray, rise: FloatArray, alpha: FloatArray
) -> _Line:
    sound = (pressure > 0.0) & (flux >= 0.0) & (energy > 0.0) & (loss >= 0.0) & (alpha > 0.0)
    square = np.where(sound, pressure * pressure, np.nan)
    climb = 2.0 * GRAVITY * rise / energy
    dynamic = flux * flux * energy
    resistance = loss * dynamic
    return _Line(square, climb * square + resistance, climb, resistance, alpha * dynamic)


def _path_to_choking(line: _Line) -> FloatArray:
    """Path at which the outlet is sonic; infinite where the pressure rises along the line."""
    reduced = (line.known - line.kinetic) / line.slope
    limit = reduced * log1p_ratio(-line.rise * reduced)
    return np.where((line.slope > 0.0) & np.isfinite(limit), limit, np.inf)


def _inlet_residual(path: FloatArray, line: _Line) -> tuple[FloatArray, FloatArray]:
    reduced = path * expm1_ratio(-line.rise * path)
    square = line.known - line.slope * reduced
    share = line.kinetic * reduced / square
    return path - share * log1p_ratio(line.loss * reduced / square) - 1.0, 1.0 - line.kinetic / square


def _outlet_residual(path: FloatArray, line: _Line) -> tuple[FloatArray, FloatArray]:
    reduced = path * expm1_ratio(line.rise * path)
    square = line.known + line.slope * reduced
    spread = reduced / (line.known * (1.0 + line.rise * reduced))
    return path - line.kinetic * spread * log1p_ratio(line.loss * spread) - 1.0, 1.0 - line.kinetic / square


def _solve(start: FloatArray, limit: FloatArray, line: _Line, *, from_inlet: bool) -> FloatArray:
    """Bracketed Newton iteration; a line leaves it when converged, so that none depends on its neighbours."""
    path = start.ravel().copy()
    flat = _Line(*(values.ravel() for values in line))
    low, high = np.zeros_like(path), limit.ravel().copy()
    active: IndexArray = np.flatnonzero(np.isfinite(path))
    residual_of = _inlet_residual if from_inlet else _outlet_residual
    for _ in range(_STEPS):
        if active.size == 0:
            break
        here = path[active]
        residual, slope = residual_of(here, _Line(*(values[active] for values in flat)))
        low[active] = np.where(residual < 0.0, here, low[active])
        high[active] = np.where(residual > 0.0, here, high[active])
        there = _bracketed(here - residual / slope, here, low[active], high[active])
        path[active] = there
        active = active[~((np.abs(there - here) <= _TOLERANCE * np.abs(there)) | (residual == 0.0))]
    path[active[~np.isfinite(path[active])]] = np.nan
    return path.reshape(start.shape)


def _bracketed(proposal: FloatArray, here: FloatArray, low: FloatArray, high: FloatArray) -> FloatArray:
    middle = np.where(np.isfinite(high), 0.5 * (low + high), 2.0 * here)
    inside = (proposal >= low) & (proposal <= high)
    return np.where(inside, proposal, middle)
