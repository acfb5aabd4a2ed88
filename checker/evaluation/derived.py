"""Providers: what rules ask of the hydraulics beyond the solver's own columns (worst ends, NPSH, stated values)."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.gaps import given_state
from checker.evaluation.provider import provider
from checker.hydraulics.erosion import erosional_velocity as erosional_velocity_of
from checker.hydraulics.suction import npsh_available as npsh_from_terms
from checker.model import Coded, Gap, base_case
from checker.ruling.tristate import NO, UNKNOWN, YES

__all__ = ["PROVIDERS"]

FloatArray = NDArray[np.float64]
CodeArray = NDArray[np.int8]
Named = dict[str, NDArray[Any]]
EQUAL_WITHIN = 1e-9
MINIMUM_CASE = "minimum"


def velocity_highest(*, velocity: FloatArray, velocity_outlet: FloatArray) -> FloatArray:
    """Return the higher of both ends' velocities; NaN where either is not known."""
    return np.maximum(velocity, velocity_outlet)


def velocity_lowest(*, velocity: FloatArray, velocity_outlet: FloatArray) -> FloatArray:
    """Return the lower of both ends' velocities; NaN where either is not known."""
    return np.minimum(velocity, velocity_outlet)


def mach_highest(*, mach: FloatArray, mach_outlet: FloatArray) -> FloatArray:
    """Return the higher of both ends' Mach numbers; NaN where either is not known."""
    return np.maximum(mach, mach_outlet)


def density_lowest(*, density: FloatArray, density_outlet: FloatArray) -> FloatArray:
    """Return the lower of both ends' densities (no-slip mixture for two-phase); NaN where either is not known."""
    return np.minimum(density, density_outlet)


def pressure_loss(*, dp_friction: FloatArray, dp_fittings: FloatArray, dp_acceleration: FloatArray) -> FloatArray:
    """Return the pressure lost to pipe, fittings and acceleration, static head left out."""
    return dp_friction + dp_fittings + dp_acceleration


def flow_volume_flowing(*, flow_mass: FloatArray, density: FloatArray) -> FloatArray:
    """Return the volume flow at the inlet's flowing conditions."""
    with np.errstate(all="ignore"):
        return flow_mass / density


def npsh_required_at_flow(
    *, npsh_required: FloatArray, npsh_required_flow: FloatArray, flow_volume_flowing: FloatArray
) -> FloatArray:
    """Return NPSH required where the case's flow is at most the flow it is quoted at, else NaN."""
    with np.errstate(invalid="ignore"):
        within = flow_volume_flowing <= npsh_required_flow * (1.0 + EQUAL_WITHIN)
    return np.where(within, npsh_required, np.nan)


def npsh_available(
    *,
    source_pressure: FloatArray,
    vapour_pressure: FloatArray,
    density: FloatArray,
    static_head: FloatArray,
    dp_friction: FloatArray,
    dp_fittings: FloatArray,
) -> FloatArray:
    """Return NPSH available from the row's own suction data."""
    return npsh_from_terms(
        source_pressure=source_pressure,
        vapour_pressure=vapour_pressure,
        density=density,
        static_head=static_head,
        friction_loss=dp_friction + dp_fittings,
    )


def flowing(*, case_kind: CodeArray, relief_load_given: CodeArray) -> CodeArray:
    """Return 1 for continuous and intermittent cases, 0 for no-flow and mechanical-only ones, -1 where not known.

    No case of a relief line is known to flow as it must be judged while its relief load is not stated.
    """
    table = np.array([YES, YES, NO, NO, UNKNOWN], dtype=np.int8)
    return np.where(relief_load_given == YES, table[case_kind], UNKNOWN).astype(np.int8)


def continuous(*, case_kind: CodeArray) -> CodeArray:
    """Return 1 for continuous cases, 0 for the others, -1 where the kind is not known."""
    table = np.array([YES, NO, NO, NO, UNKNOWN], dtype=np.int8)
    return table[case_kind]


def is_minimum_case(*, case: Coded, own_flow: NDArray[np.bool_]) -> CodeArray:
    """Return 1 where the case is the minimum case with a flow of its own, 0 where not, -1 where it is not known."""
    table = np.array([*(YES if base_case(text) == MINIMUM_CASE else NO for text in case.texts), UNKNOWN], dtype=np.int8)
    named = table[case.codes]
    return np.where((named == YES) & ~own_flow, NO, named).astype(np.int8)


def line_has_minimum_case(*, is_minimum_case: CodeArray, line_group: NDArray[np.int32]) -> CodeArray:
    """Return 1 where the line, all its rows taken together, has a minimum case; -1 where a row's case is not known."""
    groups = int(line_group.max(initial=-1)) + 1
    has = np.zeros(groups, dtype=np.bool_)
    unknown = np.zeros(groups, dtype=np.bool_)
    has[line_group[is_minimum_case == YES]] = True
    unknown[line_group[is_minimum_case == UNKNOWN]] = True
    return np.where(has, YES, np.where(unknown, UNKNOWN, NO)).astype(np.int8)[line_group]


def lowest_sustained_flow(*, flow_mass: FloatArray, continuous: CodeArray, line_group: NDArray[np.int32]) -> FloatArray:
    """Return the least flow of a line's continuous cases; NaN while the flow of one of them is not known."""
    least = np.full(int(line_group.max(initial=-1)) + 1, np.inf)
    counted = continuous != NO
    with np.errstate(invalid="ignore"):
        np.minimum.at(least, line_group[counted], flow_mass[counted])
    return least[line_group]


def velocity_at_minimum(
    *, velocity: FloatArray, is_minimum_case: CodeArray, flow_mass: FloatArray, lowest_sustained_flow: FloatArray
) -> FloatArray:
    """Return the inlet velocity, the slow end, in the minimum case; NaN in every other case.

    A minimum above the flow of another continuous case is no minimum: NaN.
    """
    with np.errstate(invalid="ignore"):
        least = flow_mass <= lowest_sustained_flow * (1.0 + EQUAL_WITHIN)
    return np.where((is_minimum_case == YES) & least, velocity, np.nan)


def pressure_lowest(
    *,
    pressure: FloatArray,
    pressure_inlet: FloatArray,
    pressure_outlet: FloatArray,
    length_gap: CodeArray,
    equivalent_length_gap: CodeArray,
    fittings_gap: CodeArray,
    elevation_change_gap: CodeArray,
) -> FloatArray:
    """Return the lowest pressure of the line; the stated one where the list says nothing of a route at all.

    Where the list has a column for length, fittings or elevation both ends must be known: a row that leaves its route
    open is not known to stay above its bubble point.
    """
    ends = np.minimum(pressure_inlet, pressure_outlet)
    gaps = np.stack([length_gap, equivalent_length_gap, fittings_gap, elevation_change_gap])
    no_route = (gaps == Gap.NO_COLUMN).all(axis=0)
    return np.where(no_route, pressure, np.minimum(ends, pressure))


def sand_free(*, sand_rate: FloatArray, sand_rate_gap: CodeArray) -> FloatArray:
    """Return 1 where the row states no sand, or the list has no column for it; NaN where it states some or is open."""
    free = (sand_rate == 0.0) | (sand_rate_gap == Gap.NO_COLUMN) | (sand_rate_gap == Gap.NOT_APPLICABLE)
    return np.where(free, 1.0, np.nan)


def erosional_velocity(*, density_lowest: FloatArray, erosional_constant: FloatArray) -> FloatArray:
    """Return C / sqrt(rho_m) at the end of lowest density."""
    return erosional_velocity_of(density=density_lowest, erosional_constant=erosional_constant)


def pressure_drop_allowed_given(*, pressure_drop_allowed_gap: CodeArray) -> CodeArray:
    """Return whether the row states an allowance."""
    return given_state(pressure_drop_allowed_gap)


def vapour_pressure_given(*, vapour_pressure_gap: CodeArray) -> CodeArray:
    """Return whether the row states a vapour pressure."""
    return given_state(vapour_pressure_gap)


def npsh_required_given(*, npsh_required_gap: CodeArray) -> CodeArray:
    """Return whether the row states an NPSH required; a blank is told by the service, so it counts as no."""
    return np.equal(npsh_required_gap, Gap.GIVEN).astype(np.int8)


def schedule_given(*, schedule_state: CodeArray) -> CodeArray:
    """Return 1 where a schedule is to be looked up, 0 where the wall is given instead, -1 where neither is known."""
    table = np.array([YES, YES, NO, UNKNOWN], dtype=np.int8)
    return table[schedule_state]


def _difference(stated: FloatArray, computed: FloatArray, given: CodeArray) -> FloatArray:
    """Return |stated - computed| / |computed|; minus infinity where nothing is stated, NaN where it is missing."""
    with np.errstate(all="ignore"):
        difference = np.abs(stated - computed) / np.abs(computed)
    return np.where(given == NO, -np.inf, np.where(given == YES, difference, np.nan))


def stated_difference(
    *,
    velocity_stated: FloatArray,
    velocity_stated_gap: CodeArray,
    pressure_drop_stated: FloatArray,
    pressure_drop_stated_gap: CodeArray,
    pressure_gradient_stated: FloatArray,
    pressure_gradient_stated_gap: CodeArray,
    velocity_at_stated_pressure: FloatArray,
    pressure_loss: FloatArray,
    pressure_gradient: FloatArray,
) -> Named:
    """Return the largest relative difference between the contractor's stated results and ours.

    NaN where one of the columns that the list has is blank, on HOLD or cannot be compared: one unread value may not
    hide behind another that agrees. A cell that says not applicable states nothing: what else the row states is judged.
    """
    pairs = (
        (velocity_stated, velocity_at_stated_pressure, given_state(velocity_stated_gap)),
        (pressure_drop_stated, pressure_loss, given_state(pressure_drop_stated_gap)),
        (pressure_gradient_stated, pressure_gradient, given_state(pressure_gradient_stated_gap)),
    )
    differences = np.stack([_difference(*pair) for pair in pairs])
    states = np.stack([pair[2] for pair in pairs])
    worst = np.maximum.reduce(differences, axis=0)
    given = np.where((states == YES).any(axis=0), YES, np.where((states == UNKNOWN).any(axis=0), UNKNOWN, NO))
    return {
        "stated_difference": np.where(np.isneginf(worst), np.nan, worst),
        "stated_values_given": given.astype(np.int8),
    }


PROVIDERS = (
    *(
        provider(function)
        for function in (
            velocity_highest, velocity_lowest, mach_highest, density_lowest, pressure_loss, flow_volume_flowing,
            npsh_required_at_flow, npsh_available, flowing, continuous, is_minimum_case, line_has_minimum_case,
            lowest_sustained_flow, velocity_at_minimum, pressure_lowest, sand_free, erosional_velocity,
            pressure_drop_allowed_given, vapour_pressure_given, npsh_required_given, schedule_given,
        )
    ),
    provider(stated_difference, "stated_difference", "stated_values_given"),
)  # fmt: skip
