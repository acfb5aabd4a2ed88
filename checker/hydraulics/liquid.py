"""Incompressible flow over line cases."""

from __future__ import annotations

import numpy as np

from checker.hydraulics.arrays import ArrayLike, FloatArray, floats, positive
from checker.hydraulics.cases import Cases, Results, common_reasons, first_reason, fittings_of
from checker.hydraulics.ends import mass_flux
from checker.hydraulics.friction import friction_factor, reynolds, transitional
from checker.hydraulics.kinetic_energy import kinetic_energy_factor
from checker.hydraulics.solution import INLET, OUTLET, STATUS_CODES


@np.errstate(all="ignore")
def pressure_gradient(
    *, friction_factor: ArrayLike, mass_flux: ArrayLike, density: ArrayLike, inside_diameter: ArrayLike
) -> FloatArray:
    r"""Friction pressure gradient of straight pipe (Darcy and Weisbach).

    .. math:: \frac{dp}{dL} = \frac{f}{D} \frac{G^2}{2 \rho}

    Parameters
    ----------
    friction_factor : array_like
        Darcy, [-]; not needed where the flow is zero.
    mass_flux : array_like
        G, [kg/(m2 s)].
    density : array_like
        [kg/m3], above zero.
    inside_diameter : array_like
        [m], above zero.

    Returns
    -------
    ndarray
        [Pa/m]; 0 where the flow is zero, NaN where an argument is NaN or outside its range.

    References
    ----------
    .. [1] Crane, "Flow of Fluids", TP-410, 2009, eq. 1-4.
    """
    flux = floats(mass_flux)
    base = 0.5 * flux * flux / positive(density) / positive(inside_diameter)
    return np.where(base == 0.0, 0.0, floats(friction_factor) * base)


def solve_liquid(cases: Cases) -> Results:
    """Hydraulics of liquid line cases; names as in `Solution`."""
    bore, density = positive(cases.inside_diameter), positive(cases.density)
    viscosity = positive(cases.viscosity)
    flux = mass_flux(flow_mass=cases.flow_mass, inside_diameter=bore)
    velocity = flux / density
    number = reynolds(mass_flux=flux, inside_diameter=bore, viscosity=viscosity)
    factor = friction_factor(reynolds=number, relative_roughness=cases.roughness / bore)
    alpha = kinetic_energy_factor(reynolds=number, friction_factor=factor)
    gradient = pressure_gradient(friction_factor=factor, mass_flux=flux, density=density, inside_diameter=bore)
    result: Results = {
        "velocity": velocity,
        "velocity_outlet": velocity,
        "velocity_at_stated_pressure": velocity,
        "reynolds": number,
        "friction_factor": factor,
        "kinetic_energy_factor": alpha,
        "density": density,
        "density_outlet": density,
        "pressure_gradient": gradient,
        "momentum_flux": flux * velocity,
        "wall_shear_stress": 0.25 * gradient * bore,
        "transitional": transitional(reynolds=number),
    }
    result |= _drops(cases, bore, density, flux, factor, alpha, gradient)
    result |= _pressures(cases, result["dp_total"])
    result["status"] = _status(cases, result)
    return result


def _drops(
    cases: Cases,
    bore: FloatArray,
    density: FloatArray,
    flux: FloatArray,
    factor: FloatArray,
    alpha: FloatArray,
    gradient: FloatArray,
) -> Results:
    fittings = fittings_of(cases)
    length = np.where(cases.length >= 0.0, cases.length, np.nan)
    head = 0.5 * flux * flux / density
    factor = np.where(flux == 0.0, 0.0, factor)
    coefficient = fittings.coefficient(friction_factor=factor, inside_diameter=bore) + fittings.entrance_coefficient
    friction = gradient * length
    losses = coefficient * head
    elevation = density * 9.80665 * cases.elevation_change
    acceleration = np.where(fittings.entrance == 0.0, 0.0, fittings.entrance * alpha * head)
    return {
        "dp_friction": friction,
        "dp_fittings": losses,
        "dp_elevation": elevation,
        "dp_acceleration": acceleration,
        "dp_total": friction + losses + elevation + acceleration,
        "fittings_coefficient": coefficient,
    }


def _pressures(cases: Cases, drop: FloatArray) -> Results:
    stated = positive(cases.pressure)
    from_inlet, from_outlet = cases.pressure_basis == INLET, cases.pressure_basis == OUTLET
    inlet = np.where(from_inlet, stated, np.where(from_outlet, positive(stated + drop), np.nan))
    outlet = np.where(from_outlet, stated, np.where(from_inlet, positive(stated - drop), np.nan))
    return {"pressure_inlet": inlet, "pressure_outlet": outlet}


def _status(cases: Cases, result: Results) -> FloatArray:
    fittings = fittings_of(cases)
    status = first_reason(
        {
            "flow": ~(cases.flow_mass >= 0.0),
            "bore": ~(cases.inside_diameter > 0.0),
            "density": ~(cases.density > 0.0),
            "viscosity": ~(cases.viscosity > 0.0),
            "roughness": np.isnan(result["pressure_gradient"]),
            **common_reasons(cases, fittings),
        }
    )
    lost = (status == 0) & (np.isnan(result["pressure_inlet"]) | np.isnan(result["pressure_outlet"]))
    other = np.where(cases.pressure_basis == INLET, STATUS_CODES["pressure used up"], STATUS_CODES["no inlet pressure"])
    return np.where(lost, other, status)
