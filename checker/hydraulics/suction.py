"""Net positive suction head of a pump."""

from __future__ import annotations

import numpy as np

from checker.hydraulics.arrays import GRAVITY, ArrayLike, FloatArray, floats, positive


@np.errstate(all="ignore")
def npsh_available(
    *,
    source_pressure: ArrayLike,
    vapour_pressure: ArrayLike,
    density: ArrayLike,
    static_head: ArrayLike,
    friction_loss: ArrayLike,
) -> FloatArray:
    r"""Net positive suction head available at the pump datum.

    .. math:: NPSH_A = \frac{p_s - p_v}{\rho g} + z - \frac{\Delta p_f}{\rho g}

    Parameters
    ----------
    source_pressure : array_like
        Absolute pressure at the liquid surface of the source, [Pa], at or above zero.
    vapour_pressure : array_like
        True vapour pressure at flowing temperature, [Pa], at or above zero.
    density : array_like
        [kg/m3], above zero.
    static_head : array_like
        Liquid surface above the pump datum, [m]; negative for a lift.
    friction_loss : array_like
        Viscous loss of the suction line, [Pa], without elevation and velocity head.

    Returns
    -------
    ndarray
        [m]; may be negative. NaN where an argument is NaN or outside its range.

    Notes
    -----
    A total head: the velocity head at the suction flange belongs to it and is not taken off.

    References
    ----------
    .. [1] ANSI/HI 9.6.1-2012; Crane, "Flow of Fluids", TP-410, 2009, chapter 6 (NPSH available).

    Examples
    --------
    >>> round(float(npsh_available(source_pressure=101325.0, vapour_pressure=2339.0, density=998.2,
    ...                            static_head=2.0, friction_loss=5000.0)), 2)
    11.6
    """
    source, vapour, weight = floats(source_pressure), floats(vapour_pressure), positive(density) * GRAVITY
    head = (source - vapour - floats(friction_loss)) / weight + floats(static_head)
    return np.where((source >= 0.0) & (vapour >= 0.0), head, np.nan)


@np.errstate(all="ignore")
def npsh_from_flange_pressure(
    *, pressure: ArrayLike, vapour_pressure: ArrayLike, density: ArrayLike, velocity: ArrayLike
) -> FloatArray:
    """NPSH available from the static pressure measured at the suction flange: its velocity head is added.

    Parameters
    ----------
    pressure, vapour_pressure : array_like
        Absolute, [Pa].
    density : array_like
        [kg/m3], above zero.
    velocity : array_like
        In the suction pipe, [m/s].

    Returns
    -------
    ndarray
        [m]; NaN where an argument is NaN or outside its range.

    References
    ----------
    .. [1] ANSI/HI 9.6.1-2012, definition of NPSH available.
    """
    static = (floats(pressure) - floats(vapour_pressure)) / (positive(density) * GRAVITY)
    return static + floats(velocity) ** 2 / (2.0 * GRAVITY)


@np.errstate(all="ignore")
def acceleration_head(
    *, length: ArrayLike, velocity: ArrayLike, speed: ArrayLike, pump_constant: ArrayLike, fluid_constant: ArrayLike
) -> FloatArray:
    r"""Acceleration head of a reciprocating pump's suction line.

    .. math:: h_a = \frac{L v N C}{K g}

    Parameters
    ----------
    length : array_like
        Actual length of the suction line (not the equivalent one), [m]; the formula holds up to about 15 m.
    velocity : array_like
        Mean velocity in it, [m/s].
    speed : array_like
        Crank speed N, [1/min] (the constant C carries the minute).
    pump_constant : array_like
        C by type of pump: triplex 0.066, quintuplex 0.040, duplex double-acting 0.115, [-].
    fluid_constant : array_like
        K of the liquid: 1.4 deaerated water, 1.5 most liquids, 2.0 hydrocarbons, 2.5 hot oil, [-].

    Returns
    -------
    ndarray
        [m]; NaN where an argument is NaN.

    References
    ----------
    .. [1] Hydraulic Institute, ANSI/HI 6.1-6.5 (constants of C read in a quotation, of K from memory).
    """
    moved = floats(length) * floats(velocity) * floats(speed) * floats(pump_constant)
    return moved / (positive(fluid_constant) * GRAVITY)
