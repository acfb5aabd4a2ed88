"""The two ends of a line: pipe bore, vessel at rest before an entrance, receiver behind an exit.

Ends 1 and 2 are planes in the pipe. With an entrance fitting end 1 is a vessel at rest, whose pressure is higher than
that of the first plane by the entrance loss and by the kinetic energy that the fluid takes up. With an exit fitting
end 2 is the receiver: the jet's kinetic energy is lost there (exit loss alpha v2^2 / 2, outlet kinetic term zero), and
the static pressure does not change across the exit plane. An exit loss and an outlet kinetic term are therefore never
both counted as pressure drop.

All three phases are covered by one law for the specific volume at constant temperature,

    1 / rho = a + b / p

with a = 0 for gas and b = 0 for liquid; in two-phase flow it is that of the no-slip mixture.
"""

from __future__ import annotations

import numpy as np

from checker.hydraulics.arrays import ArrayLike, FloatArray, floats

#: Loss coefficient of a flush, sharp-edged entrance (Crane TP-410, 2009, A-30).
FLUSH_ENTRANCE_COEFFICIENT = 0.5


@np.errstate(all="ignore")
def mass_flux(*, flow_mass: ArrayLike, inside_diameter: ArrayLike) -> FloatArray:
    """Mass flow over bore area, 4 m / (pi D^2), [kg/(m2 s)]; NaN for a negative flow or a bore not above zero."""
    flow, bore = floats(flow_mass), floats(inside_diameter)
    flux = flow / (0.25 * np.pi * bore * bore)
    return np.where((flow >= 0.0) & (bore > 0.0), flux, np.nan)


@np.errstate(all="ignore")
def pressure_behind_entrance(
    *,
    pressure_vessel: ArrayLike,
    mass_flux: ArrayLike,
    coefficient: ArrayLike,
    volume_constant: ArrayLike,
    volume_slope: ArrayLike,
) -> FloatArray:
    r"""Static pressure in the pipe just behind an entrance from a vessel at rest.

    .. math:: p_0 - p_1 = (\alpha + K) \frac{G^2}{2 \rho_1}, \quad 1/\rho_1 = a + b / p_1

    a quadratic in p1, of which the larger root is the flow that goes through.

    Parameters
    ----------
    pressure_vessel : array_like
        Pressure p0 at rest, [Pa].
    mass_flux : array_like
        G, [kg/(m2 s)].
    coefficient : array_like
        alpha plus the loss coefficient K of the entrance, [-]; 0 where there is no entrance.
    volume_constant, volume_slope : array_like
        a, [m3/kg], and b, [J/kg], of the specific volume.

    Returns
    -------
    ndarray
        p1, [Pa]; NaN where an argument is NaN, or the flow cannot enter (no real root).

    Notes
    -----
    The step is taken at the density of the plane behind the entrance: the step is short, and that is its lowest
    density, so that the loss is on the safe side.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, A-30 (entrance K); the step is the engineering Bernoulli balance.
    """
    step = 0.5 * floats(coefficient) * floats(mass_flux) ** 2
    level = floats(pressure_vessel) - step * floats(volume_constant)
    root = np.sqrt(level * level - 4.0 * step * floats(volume_slope))
    inside = 0.5 * (level + root)
    return np.where(level > 0.0, inside, np.nan)


@np.errstate(all="ignore")
def pressure_before_entrance(
    *,
    pressure_pipe: ArrayLike,
    mass_flux: ArrayLike,
    coefficient: ArrayLike,
    volume_constant: ArrayLike,
    volume_slope: ArrayLike,
) -> FloatArray:
    """Pressure of the vessel at rest from the pressure just behind its entrance; see `pressure_behind_entrance`.

    Parameters
    ----------
    pressure_pipe : array_like
        Pressure p1 of the plane behind the entrance, [Pa], above zero.
    mass_flux, coefficient, volume_constant, volume_slope : array_like
        As in `pressure_behind_entrance`.

    Returns
    -------
    ndarray
        p0, [Pa]; NaN where an argument is NaN.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, A-30.
    """
    inside = floats(pressure_pipe)
    step = 0.5 * floats(coefficient) * floats(mass_flux) ** 2
    outside = inside + step * (floats(volume_constant) + floats(volume_slope) / inside)
    return np.where(inside > 0.0, outside, np.nan)
