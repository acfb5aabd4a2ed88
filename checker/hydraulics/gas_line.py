"""Isothermal gas flow over line cases."""

from __future__ import annotations

import numpy as np

from checker.hydraulics.arrays import BoolArray, FloatArray, positive
from checker.hydraulics.cases import Cases, Fittings, Results, common_reasons, first_reason, fittings_of
from checker.hydraulics.ends import mass_flux, pressure_before_entrance, pressure_behind_entrance
from checker.hydraulics.friction import friction_factor, reynolds, transitional
from checker.hydraulics.gas import GasFlow, choking_pressure, inlet_from_outlet, mach_number, outlet_from_inlet
from checker.hydraulics.gas_profile import GasProfile, along_line
from checker.hydraulics.kinetic_energy import LAMINAR_FACTOR, kinetic_energy_factor
from checker.hydraulics.liquid import pressure_gradient
from checker.hydraulics.solution import INLET, OUTLET, STATUS_CODES


class GasLine:
    """Everything of gas line cases that is known before the line is solved."""

    def __init__(self, cases: Cases) -> None:
        """Work out mass flux, friction factor, kinetic-energy factor and loss coefficients."""
        self.cases = cases
        self.bore = positive(cases.inside_diameter)
        self.stated = positive(cases.pressure)
        self.listed_density = positive(cases.density)
        self.energy = self.stated / self.listed_density
        self.flux = mass_flux(flow_mass=cases.flow_mass, inside_diameter=self.bore)
        self.number = reynolds(mass_flux=self.flux, inside_diameter=self.bore, viscosity=positive(cases.viscosity))
        self.factor = friction_factor(reynolds=self.number, relative_roughness=cases.roughness / self.bore)
        self.alpha = kinetic_energy_factor(reynolds=self.number, friction_factor=self.factor)
        self.fittings: Fittings = fittings_of(cases)
        moving = np.where(self.flux == 0.0, 0.0, self.factor)
        self.loss_fittings = self.fittings.coefficient(friction_factor=moving, inside_diameter=self.bore)
        self.loss_pipe = moving * np.where(cases.length >= 0.0, cases.length, np.nan) / self.bore
        self.entrance_step = self.fittings.entrance_step(self.alpha)

    def known_end(self) -> tuple[FloatArray, FloatArray]:
        """Pressure of the plane in the pipe at the end that is known, inlet or outlet; NaN at the other."""
        behind = pressure_behind_entrance(
            pressure_vessel=self.stated,
            mass_flux=self.flux,
            coefficient=self.entrance_step,
            volume_constant=0.0,
            volume_slope=self.energy,
        )
        inlet = np.where(self.cases.pressure_basis == INLET, behind, np.nan)
        outlet = np.where(self.cases.pressure_basis == OUTLET, self.stated, np.nan)
        return inlet, outlet

    def solve(self) -> GasFlow:
        """End pressures of the planes in the pipe."""
        inlet, outlet = self.known_end()
        shared = {
            "mass_flux": self.flux,
            "pressure_over_density": self.energy,
            "loss_coefficient": self.loss_pipe + self.loss_fittings,
            "elevation_change": self.cases.elevation_change,
            "kinetic_energy_factor": self.alpha,
        }
        downstream = outlet_from_inlet(pressure_inlet=inlet, **shared)
        upstream = inlet_from_outlet(pressure_outlet=outlet, **shared)
        from_inlet = self.cases.pressure_basis == INLET
        return GasFlow(
            *(np.where(from_inlet, first, second) for first, second in zip(downstream, upstream, strict=True))
        )

    def profile(self, flow: GasFlow) -> tuple[GasProfile, FloatArray]:
        """Integrals along the solved line, and the share of its friction that the pipe itself takes."""
        loss = self.loss_pipe + self.loss_fittings
        found = along_line(
            pressure_inlet=flow.pressure_inlet,
            pressure_outlet=flow.pressure_outlet,
            path=flow.path,
            mass_flux=self.flux,
            pressure_over_density=self.energy,
            loss_coefficient=loss,
            elevation_change=self.cases.elevation_change,
            kinetic_energy_factor=self.alpha,
        )
        return found, np.where(loss == 0.0, 0.0, self.loss_pipe / loss)


def solve_gas(cases: Cases) -> Results:
    """Hydraulics of gas line cases; names as in `Solution`."""
    line = GasLine(cases)
    flow = line.solve()
    from_inlet, from_outlet = cases.pressure_basis == INLET, cases.pressure_basis == OUTLET
    first, last, blocked = _planes(line, flow)
    result = _drops(line, flow, blocked)
    velocity, velocity_outlet = line.flux * line.energy / first, line.flux * line.energy / last
    at_rest = line.fittings.entrance == 0.0
    velocity = np.where(from_inlet & at_rest, line.flux / line.listed_density, velocity)
    at_stated = from_outlet & (line.stated >= _choking(line))
    velocity_outlet = np.where(at_stated, line.flux / line.listed_density, velocity_outlet)
    density, density_outlet = line.flux / velocity, line.flux / velocity_outlet
    density = np.where(line.flux == 0.0, first / line.energy, density)
    density_outlet = np.where(line.flux == 0.0, last / line.energy, density_outlet)
    gradient = pressure_gradient(
        friction_factor=line.factor, mass_flux=line.flux, density=density, inside_diameter=line.bore
    )
    outside = pressure_before_entrance(
        pressure_pipe=first,
        mass_flux=line.flux,
        coefficient=line.entrance_step,
        volume_constant=0.0,
        volume_slope=line.energy,
    )
    lowest = np.minimum(density, density_outlet)
    result |= {
        "velocity": velocity,
        "velocity_outlet": velocity_outlet,
        "velocity_at_stated_pressure": line.flux / line.listed_density,
        "reynolds": line.number,
        "friction_factor": line.factor,
        "kinetic_energy_factor": line.alpha,
        "density": density,
        "density_outlet": density_outlet,
        "pressure_gradient": gradient,
        "pressure_inlet": np.where(from_inlet, line.stated, outside),
        "pressure_outlet": last,
        "momentum_flux": line.flux * line.flux / lowest,
        "wall_shear_stress": 0.25 * gradient * line.bore,
        "transitional": transitional(reynolds=line.number),
        "choked": blocked | flow.choked,
    }
    for name, speed in (("mach", velocity), ("mach_outlet", velocity_outlet)):
        result[name] = mach_number(
            velocity=speed, pressure_over_density=line.energy, heat_capacity_ratio=cases.heat_capacity_ratio
        )
    result["status"] = _status(line, flow, blocked)
    return result


def _choking(line: GasLine) -> FloatArray:
    # Without a viscosity alpha is not known; its laminar value, the largest, then bounds the choking pressure.
    alpha = np.where(np.isnan(line.alpha), LAMINAR_FACTOR, line.alpha)
    return choking_pressure(mass_flux=line.flux, pressure_over_density=line.energy, kinetic_energy_factor=alpha)


def _planes(line: GasLine, flow: GasFlow) -> tuple[FloatArray, FloatArray, BoolArray]:
    """Pressures of the two planes in the pipe, and where the stated inlet pressure cannot drive the flow."""
    inlet, outlet = line.known_end()
    from_inlet, from_outlet = line.cases.pressure_basis == INLET, line.cases.pressure_basis == OUTLET
    ready = ~np.isnan(line.stated + line.entrance_step + line.flux + line.energy)
    stopped = from_inlet & ready & np.isnan(inlet)
    blocked = stopped | (from_inlet & flow.choked)
    floor = _choking(line)
    first = np.where(from_inlet, inlet, flow.pressure_inlet)
    floating = np.where(np.isnan(line.alpha), np.nan, floor)
    at_outlet = np.where(outlet >= floor, outlet, floating)
    last = np.where(from_outlet, at_outlet, flow.pressure_outlet)
    last = np.where(blocked, floating, last)
    return first, last, blocked


def _drops(line: GasLine, flow: GasFlow, blocked: BoolArray) -> Results:
    profile, share = line.profile(flow)
    head = 0.5 * line.flux * line.flux * line.energy / flow.pressure_inlet
    taken_up = np.where(line.fittings.entrance == 0.0, 0.0, line.alpha * line.fittings.entrance * head)
    entry_loss = np.where(line.fittings.entrance == 0.0, 0.0, line.fittings.entrance_coefficient * head)
    dynamic = line.alpha * line.flux * line.flux * line.energy
    gained = dynamic * flow.pressure_drop / (flow.pressure_inlet * flow.pressure_outlet)
    drops = {
        "dp_friction": profile.friction * share,
        "dp_fittings": profile.friction * (1.0 - share) + entry_loss,
        "dp_elevation": profile.elevation,
        "dp_acceleration": gained + taken_up,
        "dp_total": flow.pressure_drop + taken_up + entry_loss,
    }
    drops = {name: np.where(blocked, np.nan, values) for name, values in drops.items()}
    return drops | {"fittings_coefficient": line.loss_fittings + line.fittings.entrance_coefficient}


def _status(line: GasLine, flow: GasFlow, blocked: BoolArray) -> FloatArray:
    cases = line.cases
    status = first_reason(
        {
            "flow": ~(cases.flow_mass >= 0.0),
            "bore": ~(cases.inside_diameter > 0.0),
            "density": ~(cases.density > 0.0),
            "viscosity": ~(cases.viscosity > 0.0),
            "roughness": np.isnan(line.factor) & (line.flux != 0.0),
            **common_reasons(cases, line.fittings),
            "choked": blocked,
            "no inlet pressure": np.isnan(flow.pressure_inlet) | np.isnan(flow.pressure_outlet),
        }
    )
    # Sonic flow at a stated inlet is certain without the length: say that rather than what is missing.
    return np.where(blocked, STATUS_CODES["choked"], status).astype(np.float64)
