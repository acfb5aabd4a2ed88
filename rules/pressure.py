"""Pressure gradient, the row's own pressure budget, and the contractor's stated values against ours."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of

FloatArray = NDArray[np.float64]


def _budgeted(*, flowing: TriState, pressure_drop_allowed_given: TriState) -> TriState:
    return all_of(flowing, pressure_drop_allowed_given)


def _flows(*, flowing: TriState) -> TriState:
    return flowing


def _stated(*, flowing: TriState, stated_values_given: TriState) -> TriState:
    return all_of(flowing, stated_values_given)


@rule(
    id="pressure-gradient",
    title="Pressure gradient",
    force="should",
    sense="at most",
    source=Source("common practice", clause="value by service from the criteria"),
    applies=_flows,
    calculation=(
        "dp/L = f rho v^2 / (2 D) = {pressure_gradient}, f = {friction_factor}; at most {pressure_gradient_maximum}"
    ),
    unit="bar/100m",
    dimension="pressure gradient",
    conservative=("compressibility", "heat_capacity_ratio"),
    limit_key="pressure_gradient_maximum",
)
def pressure_gradient(
    *, pressure_gradient: FloatArray, pressure_gradient_maximum: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Hold the friction gradient at the inlet state against the service's maximum; static head is no part of it."""
    return pressure_gradient, pressure_gradient_maximum


@rule(
    id="pressure-budget",
    title="Pressure budget",
    force="should",
    sense="at most",
    source=Source("common practice", clause="the row's own allowance from the pressure profile"),
    applies=_budgeted,
    calculation=(
        "dp = pipe {dp_friction} + fittings {dp_fittings} + acceleration {dp_acceleration} = {pressure_loss};"
        " allowed {pressure_drop_allowed}"
    ),
    unit="bar",
    dimension="pressure difference",
    conservative=("compressibility", "heat_capacity_ratio"),
)
def pressure_budget(*, pressure_loss: FloatArray, pressure_drop_allowed: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Hold the loss of the line against the allowance its row states; static head is no part of it."""
    return pressure_loss, pressure_drop_allowed


@rule(
    id="stated-values",
    title="Stated values against ours",
    force="note",
    sense="at most",
    source=Source("common practice", clause="tolerance from the criteria"),
    applies=_stated,
    calculation=(
        "largest of |stated - ours| / ours: velocity {velocity_stated} against {velocity_at_stated_pressure},"
        " pressure drop {pressure_drop_stated} against {pressure_loss},"
        " gradient {pressure_gradient_stated} against {pressure_gradient}"
    ),
    unit="",
    dimension="dimensionless",
)
def stated_values(
    *, stated_difference: FloatArray, stated_values_tolerance: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Hold the contractor's stated velocity, pressure drop and gradient against the computed ones."""
    return stated_difference, stated_values_tolerance
