"""Momentum flux, erosional velocity and Mach number."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.hydraulics.erosion import erosional_velocity as erosional_velocity_of
from checker.model import Phase
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of, is_code

FloatArray = NDArray[np.float64]


def _compressible_flows(*, phase: NDArray[np.int8], flowing: TriState) -> TriState:
    return all_of(is_code(phase, Phase.GAS, Phase.TWO_PHASE), flowing)


def _gas_flows(*, phase: NDArray[np.int8], flowing: TriState) -> TriState:
    return all_of(is_code(phase, Phase.GAS), flowing)


def _two_phase_flows(*, phase: NDArray[np.int8], flowing: TriState) -> TriState:
    return all_of(is_code(phase, Phase.TWO_PHASE), flowing)


@rule(
    id="momentum-flux",
    title="Momentum flux",
    force="should",
    sense="at most",
    source=Source(
        "common practice", clause="ladder by operating pressure; NORSOK P-001 6.5 for flare; from the criteria"
    ),
    applies=_compressible_flows,
    calculation="rho v^2 at the end of lowest density = {momentum_flux}; at most {momentum_flux_maximum}",
    unit="Pa",
    dimension="momentum flux",
    conservative=("compressibility", "heat_capacity_ratio"),
    limit_key="momentum_flux_maximum",
)
def momentum_flux(*, momentum_flux: FloatArray, momentum_flux_maximum: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Hold rho v^2 at the worst end against the adopted maximum (reaction force, vibration)."""
    return momentum_flux, momentum_flux_maximum


@rule(
    id="erosional-velocity",
    title="Erosional velocity",
    force="should",
    sense="at most",
    source=Source("API RP 14E", "5th ed., 1991 (R2019)", "2.5, eq. 2.14"),
    applies=_two_phase_flows,
    calculation=(
        "v_e = C / sqrt(rho_m), C = {erosional_constant}, rho_m = {density_lowest}; v_m worst end = {velocity_highest}"
    ),
    unit="m/s",
    dimension="velocity",
    limit_key="erosional_constant",
)
def erosional_velocity(
    *, velocity_highest: FloatArray, density_lowest: FloatArray, erosional_constant: FloatArray, sand_free: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Hold the mixture velocity against C / sqrt(rho_m), both at the end of lowest density.

    For solids-free two-phase service only: published reviews dispute its use elsewhere, and sand needs an erosion
    model of its own. Where the row states sand, or leaves its sand cell open, this rule does not judge.
    """
    return velocity_highest, erosional_velocity_of(
        density=density_lowest, erosional_constant=erosional_constant
    ) * sand_free


@rule(
    id="mach-number",
    title="Mach number",
    force="should",
    sense="at most",
    source=Source("API STD 521", "7th ed., 2020", "5.5 (design choice); value by service from the criteria"),
    applies=_gas_flows,
    calculation="Ma = v / sqrt(k p / rho): inlet {mach}, outlet {mach_outlet}; worst end at most {mach_maximum}",
    unit="",
    dimension="dimensionless",
    conservative=("compressibility", "heat_capacity_ratio"),
    limit_key="mach_maximum",
)
def mach_number(*, mach_highest: FloatArray, mach_maximum: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Hold the Mach number at the worst end against the adopted maximum."""
    return mach_highest, mach_maximum
