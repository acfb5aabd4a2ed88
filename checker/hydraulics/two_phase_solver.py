"""Two-phase flow over line cases."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from checker.hydraulics.arrays import BoolArray, FloatArray, positive
from checker.hydraulics.cases import Cases, Fittings, Results, common_reasons, first_reason, fittings_of
from checker.hydraulics.ends import mass_flux, pressure_before_entrance, pressure_behind_entrance
from checker.hydraulics.friction import transitional
from checker.hydraulics.kinetic_energy import kinetic_energy_factor
from checker.hydraulics.liquid import pressure_gradient
from checker.hydraulics.march import March, march
from checker.hydraulics.solution import INLET, OUTLET, Methods
from checker.hydraulics.two_phase import mixture_density
from checker.hydraulics.two_phase_line import TwoPhaseLine, state_at


class TwoPhaseCases:
    """Everything of two-phase line cases that is known before the line is marched."""

    def __init__(self, cases: Cases, methods: Methods) -> None:
        """Work out the line constants, the listed no-slip density and the plane at the known end."""
        self.cases, self.methods = cases, methods
        self.fittings: Fittings = fittings_of(cases)
        self.stated = positive(cases.pressure)
        self.from_inlet, self.from_outlet = cases.pressure_basis == INLET, cases.pressure_basis == OUTLET
        quality, quality_outlet = _qualities(cases)
        self.known_quality = np.where(self.from_outlet, quality_outlet, quality)
        self.listed_density = mixture_density(
            vapour_fraction=self.known_quality,
            liquid_density=cases.liquid_density,
            vapour_density=cases.vapour_density,
        )
        line = self._line(quality, quality_outlet - quality)
        at_listed = replace(line, quality_inlet=self.known_quality, quality_change=0.0 * self.known_quality)
        self.listed = state_at(at_listed, self.stated, np.zeros_like(self.stated), methods.two_phase)
        number = line.mass_flux * line.inside_diameter / self.listed.viscosity
        alpha = kinetic_energy_factor(reynolds=number, friction_factor=self.listed.plain_factor)
        self.line = replace(line, kinetic_energy_factor=alpha)
        self.entrance_step = self.fittings.entrance_step(alpha)

    def _line(self, quality: FloatArray, quality_change: FloatArray) -> TwoPhaseLine:
        cases, fittings = self.cases, self.fittings
        length = np.where(cases.length >= 0.0, cases.length, np.nan)
        sine = np.where(cases.elevation_change == 0.0, 0.0, cases.elevation_change / length)
        bore = positive(cases.inside_diameter)
        return TwoPhaseLine(
            mass_flux=positive(mass_flux(flow_mass=cases.flow_mass, inside_diameter=bore)),
            quality_inlet=quality,
            quality_change=quality_change,
            liquid_density=positive(cases.liquid_density),
            energy=self.stated / positive(cases.vapour_density),
            liquid_viscosity=positive(cases.liquid_viscosity),
            vapour_viscosity=positive(cases.vapour_viscosity),
            surface_tension=positive(cases.surface_tension),
            inside_diameter=bore,
            roughness=cases.roughness,
            length=length,
            extra_length=fittings.extra_length,
            cell_coefficient=fittings.cell,
            rise=cases.elevation_change,
            sine=sine,
            kinetic_energy_factor=np.ones_like(length),
            recovery=np.full(length.shape, self.methods.downhill_recovery, dtype=np.bool_),
        )

    def volume(self) -> tuple[FloatArray, FloatArray]:
        """Return a and b of 1/rho = a + b/p of the no-slip mixture at the inlet."""
        quality = self.line.quality_inlet
        return (1.0 - quality) / self.line.liquid_density, quality * self.line.energy

    def behind_entrance(self) -> FloatArray:
        """Pressure of the first plane in the pipe where the inlet pressure is stated."""
        constant, slope = self.volume()
        behind = pressure_behind_entrance(
            pressure_vessel=self.stated,
            mass_flux=self.line.mass_flux,
            coefficient=self.entrance_step,
            volume_constant=constant,
            volume_slope=slope,
        )
        return np.where(self.from_inlet, behind, np.nan)

    def marched(self, *, ledger: bool = False) -> March:
        """March every line from its known end."""
        start = np.where(self.from_inlet, self.behind_entrance(), np.where(self.from_outlet, self.stated, np.nan))
        return march(self.line, start, self.methods.two_phase, downstream=~self.from_outlet, ledger=ledger)


def _qualities(cases: Cases) -> tuple[FloatArray, FloatArray]:
    quality = np.where((cases.vapour_fraction >= 0.0) & (cases.vapour_fraction <= 1.0), cases.vapour_fraction, np.nan)
    given = cases.vapour_fraction_outlet
    inside = np.where((given >= 0.0) & (given <= 1.0), given, np.nan)
    return quality, np.where(np.isnan(given), quality, inside)


@np.errstate(all="ignore")
def solve_two_phase(cases: Cases, methods: Methods) -> Results:
    """Hydraulics of two-phase line cases; names as in `Solution`."""
    known = TwoPhaseCases(cases, methods)
    line, found = known.line, known.marched()
    first = np.where(known.from_inlet, known.behind_entrance(), np.where(known.from_outlet, found.pressure, np.nan))
    last = np.where(known.from_outlet, known.stated, np.where(known.from_inlet, found.pressure, np.nan))
    inlet = state_at(line, first, np.zeros_like(first), methods.two_phase)
    density, density_outlet = _densities(known, first, last)
    gradient = pressure_gradient(
        friction_factor=inlet.factor, mass_flux=line.mass_flux, density=density, inside_diameter=line.inside_diameter
    )
    number = line.mass_flux * line.inside_diameter / inlet.viscosity
    result = _drops(known, found, first)
    result |= _end_pressures(known, first, last)
    result |= {
        "velocity": line.mass_flux / density,
        "velocity_outlet": line.mass_flux / density_outlet,
        "velocity_at_stated_pressure": line.mass_flux / known.listed_density,
        "reynolds": number,
        "friction_factor": inlet.factor,
        "kinetic_energy_factor": line.kinetic_energy_factor,
        "density": density,
        "density_outlet": density_outlet,
        "pressure_gradient": gradient,
        "momentum_flux": line.mass_flux**2 / np.minimum(density, density_outlet),
        "wall_shear_stress": 0.25 * gradient * line.inside_diameter,
        "liquid_holdup": inlet.holdup,
        "flow_regime": inlet.regime.astype(np.float64),
        "transitional": transitional(reynolds=number),
        "choked": found.choked,
        "status": _status(known, found),
    }
    return result


def _densities(known: TwoPhaseCases, first: FloatArray, last: FloatArray) -> tuple[FloatArray, FloatArray]:
    line = known.line
    density = line.density(first, np.zeros_like(first))
    density_outlet = line.density(last, np.ones_like(last))
    at_rest = known.fittings.entrance == 0.0
    density = np.where(known.from_inlet & at_rest, known.listed_density, density)
    return density, np.where(known.from_outlet, known.listed_density, density_outlet)


def _end_pressures(known: TwoPhaseCases, first: FloatArray, last: FloatArray) -> Results:
    constant, slope = known.volume()
    outside = pressure_before_entrance(
        pressure_pipe=first,
        mass_flux=known.line.mass_flux,
        coefficient=known.entrance_step,
        volume_constant=constant,
        volume_slope=slope,
    )
    return {"pressure_inlet": np.where(known.from_inlet, known.stated, outside), "pressure_outlet": last}


def _drops(known: TwoPhaseCases, found: March, first: FloatArray) -> Results:
    line, fittings = known.line, known.fittings
    head = 0.5 * line.mass_flux**2 / line.density(first, np.zeros_like(first))
    taken_up = np.where(fittings.entrance == 0.0, 0.0, line.kinetic_energy_factor * fittings.entrance * head)
    entry_loss = np.where(fittings.entrance == 0.0, 0.0, fittings.entrance_coefficient * head)
    friction, losses, elevation, acceleration = found.parts[0], found.parts[1], found.parts[2], found.parts[3]
    factor = known.listed.factor
    in_line = fittings.coefficient(friction_factor=factor, inside_diameter=line.inside_diameter)
    return {
        "dp_friction": friction,
        "dp_fittings": losses + entry_loss,
        "dp_elevation": elevation,
        "dp_acceleration": acceleration + taken_up,
        "dp_total": friction + losses + elevation + acceleration + entry_loss + taken_up,
        "fittings_coefficient": in_line + fittings.entrance_coefficient,
    }


def _status(known: TwoPhaseCases, found: March) -> FloatArray:
    cases, line = known.cases, known.line
    tension = np.isnan(line.surface_tension) & (known.methods.two_phase == "beggs-brill")
    rough = cases.roughness / line.inside_diameter
    given = cases.vapour_fraction_outlet
    status = first_reason(
        {
            "flow": ~(cases.flow_mass >= 0.0),
            "no flow": cases.flow_mass == 0.0,
            "bore": ~(cases.inside_diameter > 0.0),
            "vapour fraction": np.isnan(line.quality_inlet),
            "outlet vapour fraction": ~np.isnan(given) & ~((given >= 0.0) & (given <= 1.0)),
            "liquid density": ~(cases.liquid_density > 0.0),
            "vapour density": ~(cases.vapour_density > 0.0),
            "viscosity": ~((cases.liquid_viscosity > 0.0) & (cases.vapour_viscosity > 0.0)),
            "surface tension": tension,
            "roughness": ~((rough >= 0.0) & (rough < 1.0)),
            **common_reasons(cases, known.fittings),
            "slope": ~(np.abs(line.sine) <= 1.0),
            "choked two-phase": found.choked | _stopped_at_entrance(known),
            "pressure used up": found.used_up,
            "method range": np.isnan(found.pressure),
        }
    )
    return status.astype(np.float64)


def _stopped_at_entrance(known: TwoPhaseCases) -> BoolArray:
    ready = ~np.isnan(known.stated + known.entrance_step + known.line.mass_flux)
    stopped: BoolArray = known.from_inlet & ready & np.isnan(known.behind_entrance())
    return stopped
