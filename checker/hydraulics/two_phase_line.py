"""Local terms of a two-phase line: what each slice of it takes from the pressure, by either method."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, fields
from typing import Literal, NamedTuple

import numpy as np

from checker.hydraulics.arrays import GRAVITY, BoolArray, CodeArray, FloatArray, IndexArray
from checker.hydraulics.beggs_brill import local_state
from checker.hydraulics.friction import LAMINAR_LIMIT, friction_factor
from checker.hydraulics.two_phase import mixture_density, no_slip

Method = Literal["beggs-brill", "homogeneous"]


@dataclass(frozen=True)
class TwoPhaseLine:
    """Constants of two-phase lines, one value a line, SI; x runs from 0 at the inlet to 1 at the outlet.

    `energy` is stated pressure over vapour density: the vapour density follows the pressure at constant temperature.
    """

    mass_flux: FloatArray
    quality_inlet: FloatArray
    quality_change: FloatArray
    liquid_density: FloatArray
    energy: FloatArray
    liquid_viscosity: FloatArray
    vapour_viscosity: FloatArray
    surface_tension: FloatArray
    inside_diameter: FloatArray
    roughness: FloatArray
    length: FloatArray
    extra_length: FloatArray
    cell_coefficient: FloatArray
    rise: FloatArray
    sine: FloatArray
    kinetic_energy_factor: FloatArray
    recovery: BoolArray

    def take(self, rows: IndexArray | BoolArray) -> TwoPhaseLine:
        """Return the lines of these rows."""
        return TwoPhaseLine(**{field.name: getattr(self, field.name)[rows] for field in fields(self)})

    def quality(self, place: FloatArray) -> FloatArray:
        """Vapour mass fraction at a place of the line, clipped against rounding only."""
        return np.clip(self.quality_inlet + self.quality_change * place, 0.0, 1.0)

    def density(self, pressure: FloatArray, place: FloatArray) -> FloatArray:
        """No-slip density at a pressure and place."""
        return mixture_density(
            vapour_fraction=self.quality(place),
            liquid_density=self.liquid_density,
            vapour_density=pressure / self.energy,
        )


class Slice(NamedTuple):
    """Terms of a slice per unit of x: Pa for the pressure drop and its parts, J/kg for the ledger."""

    drop: FloatArray
    friction: FloatArray
    fittings: FloatArray
    elevation: FloatArray
    acceleration: FloatArray
    loss_pipe: FloatArray
    loss_fittings: FloatArray
    slip: FloatArray
    acceleration_factor: FloatArray
    branch: CodeArray


class State(NamedTuple):
    """What both methods say of the state at a place."""

    factor: FloatArray
    plain_factor: FloatArray
    weight_density: FloatArray
    density: FloatArray
    velocity: FloatArray
    vapour_velocity: FloatArray
    viscosity: FloatArray
    holdup: FloatArray
    regime: CodeArray
    near_one: BoolArray


def state_at(line: TwoPhaseLine, pressure: FloatArray, place: FloatArray, method: Method) -> State:
    """Friction factor, densities, velocities, hold-up and regime at a pressure and place."""
    shared: Mapping[str, FloatArray] = {
        "mass_flux": line.mass_flux,
        "vapour_fraction": line.quality(place),
        "liquid_density": line.liquid_density,
        "vapour_density": pressure / line.energy,
        "liquid_viscosity": line.liquid_viscosity,
        "vapour_viscosity": line.vapour_viscosity,
    }
    if method == "homogeneous":
        mixture = no_slip(**shared)
        number = line.mass_flux * line.inside_diameter / mixture.viscosity
        factor = friction_factor(reynolds=number, relative_roughness=line.roughness / line.inside_diameter)
        return State(
            factor,
            factor,
            mixture.density,
            mixture.density,
            mixture.velocity,
            mixture.vapour_velocity,
            mixture.viscosity,
            mixture.liquid_fraction,
            np.full(factor.shape, -1, dtype=np.int8),
            np.zeros(factor.shape, dtype=np.bool_),
        )
    found = local_state(
        **shared,
        surface_tension=line.surface_tension,
        inside_diameter=line.inside_diameter,
        roughness=line.roughness,
        sine=line.sine,
    )
    mixture = found.mixture
    return State(
        found.friction_factor,
        found.no_slip_factor,
        found.slip_density,
        mixture.density,
        mixture.velocity,
        mixture.vapour_velocity,
        mixture.viscosity,
        found.liquid_holdup,
        found.flow_regime,
        found.near_one,
    )


def slice_at(line: TwoPhaseLine, pressure: FloatArray, place: FloatArray, method: Method) -> Slice:
    r"""Pressure drop per unit of x at a pressure and place, and its parts.

    .. math:: -\frac{dp}{dx} = \frac{F + E + \alpha G^2 \frac{dx_v}{dx} (1/\rho_G - 1/\rho_L)}{1 - \epsilon}

    Beggs and Brill: epsilon = rho_s v_m v_sg / p, E with the hold-up density. Homogeneous: epsilon = alpha rho_n v_m
    v_sg / p, which is the kinetic energy of the no-slip mixture, E with the no-slip density. Fittings take K G^2 /
    (2 rho_n), an equivalent length the friction of the method. A falling line gets nothing back unless `recovery`.
    """
    state = state_at(line, pressure, place, method)
    dynamic = line.mass_flux * line.mass_flux
    head = 0.5 * dynamic / state.density
    per_length = state.factor / line.inside_diameter * head
    friction = per_length * line.length
    fittings = np.where(line.extra_length == 0.0, 0.0, per_length * line.extra_length) + line.cell_coefficient * head
    counted = line.recovery | (line.rise >= 0.0)
    static = np.where(counted, state.weight_density * GRAVITY * line.rise, 0.0)
    plain = line.kinetic_energy_factor * state.density * state.velocity * state.vapour_velocity / pressure
    method_factor = state.weight_density * state.velocity * state.vapour_velocity / pressure
    factor = plain if method == "homogeneous" else method_factor
    volume_change = line.energy / pressure - 1.0 / line.liquid_density
    evaporation = line.kinetic_energy_factor * dynamic * line.quality_change * volume_change
    drop = (friction + fittings + static + evaporation) / (1.0 - factor)
    slip = static / state.density - GRAVITY * line.rise + (factor - plain) * drop / state.density
    return Slice(
        drop,
        friction,
        fittings,
        static,
        factor * drop + evaporation,
        friction / state.density,
        fittings / state.density,
        slip,
        factor,
        _branch(state, line),
    )


def _branch(state: State, line: TwoPhaseLine) -> CodeArray:
    """Code of the formulas in use: where it changes along the line, a step is divided."""
    number = line.mass_flux * line.inside_diameter / state.viscosity
    laminar = np.where(number < LAMINAR_LIMIT, 8, 0)
    return (state.regime + laminar + np.where(state.near_one, 16, 0)).astype(np.int8)
