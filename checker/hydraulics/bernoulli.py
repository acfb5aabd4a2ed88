"""Terms of the engineering Bernoulli balance, each its own function, in J/kg; wall shear and dynamic thrust.

integral of dp/rho from 2 to 1 = (alpha2 v2^2 - alpha1 v1^2)/2 + g (z2 - z1) + l_v + w_s
"""

from __future__ import annotations

import numpy as np

from checker.hydraulics.arrays import GRAVITY, ArrayLike, FloatArray, floats, positive


@np.errstate(all="ignore")
def pressure_term(*, pressure_drop: ArrayLike, density: ArrayLike) -> FloatArray:
    """Pressure term of an incompressible fluid, (p1 - p2) / rho.

    Parameters
    ----------
    pressure_drop : array_like
        p1 - p2, [Pa].
    density : array_like
        [kg/m3], above zero.

    Returns
    -------
    ndarray
        [J/kg]; NaN where an argument is NaN or outside its range.

    References
    ----------
    .. [1] Geankoplis, C.J., "Transport Processes and Unit Operations", 3rd ed., eq. 2.7-28.
    """
    return floats(pressure_drop) / positive(density)


@np.errstate(all="ignore")
def kinetic_term(
    *,
    velocity_inlet: ArrayLike,
    velocity_outlet: ArrayLike,
    kinetic_energy_factor_inlet: ArrayLike,
    kinetic_energy_factor_outlet: ArrayLike,
) -> FloatArray:
    """Kinetic term, (alpha2 v2^2 - alpha1 v1^2) / 2.

    Parameters
    ----------
    velocity_inlet, velocity_outlet : array_like
        [m/s]; 0 for a vessel at rest or a receiver.
    kinetic_energy_factor_inlet, kinetic_energy_factor_outlet : array_like
        alpha, [-].

    Returns
    -------
    ndarray
        [J/kg]; NaN where an argument is NaN.

    References
    ----------
    .. [1] Geankoplis, 3rd ed., eq. 2.7-28, with the kinetic-energy correction of section 2.7D.
    """
    first = floats(kinetic_energy_factor_inlet) * floats(velocity_inlet) ** 2
    second = floats(kinetic_energy_factor_outlet) * floats(velocity_outlet) ** 2
    return 0.5 * (second - first)


def elevation_term(*, elevation_change: ArrayLike) -> FloatArray:
    """Elevation term, g (z2 - z1), [J/kg], from outlet minus inlet in m (Geankoplis, 3rd ed., eq. 2.7-28)."""
    return GRAVITY * floats(elevation_change)


@np.errstate(all="ignore")
def pipe_loss(
    *, friction_factor: ArrayLike, length: ArrayLike, inside_diameter: ArrayLike, velocity: ArrayLike
) -> FloatArray:
    """Viscous loss of straight pipe, f (L/D) v^2 / 2.

    Parameters
    ----------
    friction_factor : array_like
        Darcy, [-].
    length, inside_diameter : array_like
        [m]; the bore above zero.
    velocity : array_like
        [m/s].

    Returns
    -------
    ndarray
        [J/kg]; NaN where an argument is NaN or outside its range.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, eq. 1-4.
    """
    return floats(friction_factor) * floats(length) / positive(inside_diameter) * 0.5 * floats(velocity) ** 2


@np.errstate(all="ignore")
def fittings_loss(*, loss_coefficient: ArrayLike, velocity: ArrayLike) -> FloatArray:
    """Viscous loss of fittings, K v^2 / 2, [J/kg] (Crane TP-410, 2009, eq. 2-2); NaN where an argument is NaN."""
    return floats(loss_coefficient) * 0.5 * floats(velocity) ** 2


@np.errstate(all="ignore")
def exit_loss(*, kinetic_energy_factor: ArrayLike, velocity: ArrayLike) -> FloatArray:
    """Loss of a jet in its receiver, alpha v^2 / 2, [J/kg]: it stands in the place of an outlet kinetic term.

    The static pressure does not change across the exit plane (Crane TP-410, 2009, A-30: exit K = 1 with alpha = 1).
    """
    return 0.5 * floats(kinetic_energy_factor) * floats(velocity) ** 2


@np.errstate(all="ignore")
def shaft_work(
    *, pressure_term: ArrayLike, kinetic_term: ArrayLike, elevation_term: ArrayLike, viscous_loss: ArrayLike
) -> FloatArray:
    """Shaft work done by the fluid that closes a balance: negative where a pump does work on the fluid.

    Parameters
    ----------
    pressure_term, kinetic_term, elevation_term, viscous_loss : array_like
        Terms of the balance, [J/kg].

    Returns
    -------
    ndarray
        [J/kg]; NaN where an argument is NaN.

    References
    ----------
    .. [1] Geankoplis, 3rd ed., eq. 2.7-28.
    """
    return floats(pressure_term) - floats(kinetic_term) - floats(elevation_term) - floats(viscous_loss)


@np.errstate(all="ignore")
def as_pressure(*, energy: ArrayLike, density: ArrayLike) -> FloatArray:
    """Turn J/kg into Pa at a density in kg/m3, above zero."""
    return floats(energy) * positive(density)


def as_head(*, energy: ArrayLike) -> FloatArray:
    """Turn J/kg into metres of the flowing fluid, at standard gravity."""
    return floats(energy) / GRAVITY


@np.errstate(all="ignore")
def power(*, energy: ArrayLike, flow_mass: ArrayLike) -> FloatArray:
    """Turn J/kg into W at a mass flow in kg/s."""
    return floats(energy) * floats(flow_mass)


@np.errstate(all="ignore")
def wall_shear_force(*, wall_shear_stress: ArrayLike, inside_diameter: ArrayLike, length: ArrayLike) -> FloatArray:
    """Force of the fluid on the wall of a straight section, from the macroscopic momentum balance.

    Parameters
    ----------
    wall_shear_stress : array_like
        tau = (dp/dL) D / 4, [Pa].
    inside_diameter, length : array_like
        [m].

    Returns
    -------
    ndarray
        pi D L tau along the flow, [N]; NaN where an argument is NaN.

    References
    ----------
    .. [1] Bird, R.B., Stewart, W.E., Lightfoot, E.N., "Transport Phenomena", 2nd ed., section 7.2.
    """
    return np.pi * positive(inside_diameter) * floats(length) * floats(wall_shear_stress)


@np.errstate(all="ignore")
def bend_thrust(*, momentum_flux: ArrayLike, inside_diameter: ArrayLike, angle: ArrayLike = 90.0) -> FloatArray:
    r"""Dynamic thrust of the flow on a bend.

    .. math:: F = \rho v^2 A \sqrt{2 (1 - \cos\theta)}

    Parameters
    ----------
    momentum_flux : array_like
        rho v2, [Pa].
    inside_diameter : array_like
        [m].
    angle : array_like, optional
        Change of direction, [degrees], 0 to 180.

    Returns
    -------
    ndarray
        Resultant, [N], along the outward bisector; NaN where an argument is NaN.

    Notes
    -----
    The dynamic part only: pressure times area is carried by the wall of restrained pipe.

    References
    ----------
    .. [1] Bird, R.B., Stewart, W.E., Lightfoot, E.N., "Transport Phenomena", 2nd ed., section 7.2 and example 7.6-3.
    """
    turn = np.radians(floats(angle))
    area = 0.25 * np.pi * positive(inside_diameter) ** 2
    return floats(momentum_flux) * area * 2.0 * np.abs(np.sin(0.5 * turn))
