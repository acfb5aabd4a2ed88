"""Velocity by service and size: liquids, gas, steam, two-phase, and the minimum."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Phase
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of, any_of, is_code, not_

FloatArray = NDArray[np.float64]
NOT_KNOWN = np.array(np.nan)


def _liquid_flows(*, phase: NDArray[np.int8], flowing: TriState) -> TriState:
    return all_of(is_code(phase, Phase.LIQUID), flowing)


def _gas_flows(*, phase: NDArray[np.int8], flowing: TriState, steam: TriState) -> TriState:
    return all_of(is_code(phase, Phase.GAS), flowing, not_(steam))


def _steam_flows(*, phase: NDArray[np.int8], flowing: TriState, steam: TriState) -> TriState:
    return all_of(is_code(phase, Phase.GAS), flowing, steam)


def _two_phase_flows(*, phase: NDArray[np.int8], flowing: TriState) -> TriState:
    return all_of(is_code(phase, Phase.TWO_PHASE), flowing)


def _lowest_flow(*, continuous: TriState, is_minimum_case: TriState, line_has_minimum_case: TriState) -> TriState:
    return all_of(continuous, any_of(is_minimum_case, not_(line_has_minimum_case)))


def worst_or_already_over(*, worst: FloatArray, known: FloatArray, limit: FloatArray) -> FloatArray:
    """Return the worst end's value; where that is not known but the known end is over already, the known end's."""
    with np.errstate(invalid="ignore"):
        over = np.isnan(worst) & (known > limit)
    return np.where(over, known, worst)


@rule(
    id="liquid-velocity",
    title="Liquid velocity",
    force="should",
    sense="at most",
    source=Source("API RP 14E", "5th ed., 1991 (R2019)", "2.3; value by service from the criteria"),
    applies=_liquid_flows,
    calculation="v = 4 W / (pi rho D^2) = {velocity}; at most {velocity_maximum}",
    unit="m/s",
    dimension="velocity",
    limit_key="velocity_maximum",
)
def liquid_velocity(*, velocity: FloatArray, velocity_maximum: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Hold the liquid velocity against the service's maximum (friction, erosion-corrosion, noise, surge)."""
    return velocity, velocity_maximum


@rule(
    id="gas-velocity",
    title="Gas velocity",
    force="should",
    sense="at most",
    source=Source("NORSOK P-001", "5th ed., 2006", "6.3; value by service from the criteria"),
    applies=_gas_flows,
    calculation=(
        "v = W / (rho A): inlet {velocity}, outlet {velocity_outlet}, at the stated pressure"
        " {velocity_at_stated_pressure}; worst end at most {velocity_maximum}"
    ),
    unit="m/s",
    dimension="velocity",
    conservative=("compressibility", "heat_capacity_ratio"),
    limit_key="velocity_maximum",
)
def gas_velocity(
    *,
    velocity_at_stated_pressure: FloatArray,
    velocity_maximum: FloatArray,
    velocity_highest: FloatArray = NOT_KNOWN,
) -> tuple[FloatArray, FloatArray]:
    """Hold the gas velocity at its worst end (the lowest pressure) against the service's maximum."""
    known = velocity_at_stated_pressure
    return worst_or_already_over(worst=velocity_highest, known=known, limit=velocity_maximum), velocity_maximum


@rule(
    id="steam-velocity",
    title="Steam velocity",
    force="should",
    sense="at most",
    source=Source("common practice", clause="handbook tables of steam velocity; value by service from the criteria"),
    applies=_steam_flows,
    calculation=(
        "v = W / (rho A): inlet {velocity}, outlet {velocity_outlet}, at the stated pressure"
        " {velocity_at_stated_pressure}; worst end at most {velocity_maximum}"
    ),
    unit="m/s",
    dimension="velocity",
    conservative=("compressibility", "heat_capacity_ratio"),
    limit_key="velocity_maximum",
)
def steam_velocity(
    *,
    velocity_at_stated_pressure: FloatArray,
    velocity_maximum: FloatArray,
    velocity_highest: FloatArray = NOT_KNOWN,
) -> tuple[FloatArray, FloatArray]:
    """Hold the steam velocity at its worst end against the service's maximum."""
    known = velocity_at_stated_pressure
    return worst_or_already_over(worst=velocity_highest, known=known, limit=velocity_maximum), velocity_maximum


@rule(
    id="two-phase-velocity",
    title="Two-phase velocity",
    force="should",
    sense="at most",
    source=Source("API RP 14E", "5th ed., 1991 (R2019)", "2.5; value by service from the criteria"),
    applies=_two_phase_flows,
    calculation=(
        "v_m = (Q_L + Q_G) / A: inlet {velocity}, outlet {velocity_outlet}; worst end at most {velocity_maximum}"
    ),
    unit="m/s",
    dimension="velocity",
    limit_key="velocity_maximum",
)
def two_phase_velocity(
    *,
    velocity_at_stated_pressure: FloatArray,
    velocity_maximum: FloatArray,
    velocity_highest: FloatArray = NOT_KNOWN,
) -> tuple[FloatArray, FloatArray]:
    """Hold the no-slip mixture velocity at its worst end against the service's maximum."""
    known = velocity_at_stated_pressure
    return worst_or_already_over(worst=velocity_highest, known=known, limit=velocity_maximum), velocity_maximum


@rule(
    id="minimum-velocity",
    title="Minimum velocity",
    force="should",
    sense="at least",
    source=Source("API RP 14E", "5th ed., 1991 (R2019)", "2.3 (from memory); value by service from the criteria"),
    applies=_lowest_flow,
    calculation="v = 4 W / (pi rho D^2) at the minimum flow = {velocity_at_minimum}; at least {velocity_minimum}",
    unit="m/s",
    dimension="velocity",
    limit_key="velocity_minimum",
)
def minimum_velocity(*, velocity_at_minimum: FloatArray, velocity_minimum: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Hold the inlet velocity, the slow end, at the lowest sustained flow against the minimum (solids, fouling)."""
    return velocity_at_minimum, velocity_minimum
