"""Providers: the route, and the solver's columns for every line case at once."""

from __future__ import annotations

from typing import Any, cast

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria
from checker.evaluation.gaps import is_open
from checker.evaluation.provider import provider
from checker.hydraulics.compose import Methods, solve
from checker.hydraulics.fittings import read_fittings
from checker.model import Coded, Gap

__all__ = ["HYDRAULIC_OUTPUTS", "PROVIDERS", "SOLVED"]

FloatArray = NDArray[np.float64]
CodeArray = NDArray[np.int8]
Named = dict[str, Any]

EQUAL_WITHIN = 1e-9
HYDRAULIC_OUTPUTS = (
    "velocity", "velocity_outlet", "reynolds", "friction_factor", "kinetic_energy_factor", "density",
    "pressure_gradient", "dp_friction", "dp_fittings", "dp_elevation", "dp_acceleration", "dp_total",
    "pressure_inlet", "pressure_outlet", "mach", "mach_outlet", "momentum_flux", "wall_shear_stress",
    "liquid_holdup",
)  # fmt: skip
ROUTE = (
    "pipe_length", "fittings_length", "fittings_n", "fittings_k", "entrances", "entrance_coefficient", "exits",
)  # fmt: skip
SOLVED = (
    *HYDRAULIC_OUTPUTS,
    "flow_regime", "density_outlet", "velocity_at_stated_pressure", "fittings_coefficient", "status", "transitional",
    "choked",
)  # fmt: skip


def route(
    *,
    criteria: Criteria,
    length_listed: FloatArray,
    length_gap: CodeArray,
    equivalent_length: FloatArray,
    equivalent_length_gap: CodeArray,
    fittings: Coded,
    fittings_gap: CodeArray,
) -> Named:
    """Return straight length and fittings, from the equivalent length or the fittings cell.

    An equivalent length is the total of the line: what it exceeds the straight length by are the fittings (less than
    the straight length contradicts, NaN; so do fittings that a cell counts and the length leaves out). Where the list
    has neither column the criteria's allowance serves, if the criteria adopt one. On HOLD or unreadable: NaN.
    """
    by_length = np.isfinite(equivalent_length)
    straight = np.where(by_length & np.isnan(length_listed) & ~is_open(length_gap), equivalent_length, length_listed)
    surplus = np.where(by_length, equivalent_length - straight, np.nan)
    read = read_fittings(list(fittings.texts))
    counted = ("n", "k", "entrances", "exits", "entrance_coefficient")
    cell = {name: _by_text(getattr(read, name), fittings) for name in counted}
    allowance = (equivalent_length_gap == Gap.NO_COLUMN) & (fittings_gap == Gap.NO_COLUMN)
    by_allowance = np.where(allowance, criteria.fittings_allowance * straight, np.nan)
    extra = np.where(by_length, np.where(surplus >= 0.0, surplus, np.nan), by_allowance)
    by_cell = ~by_length & (fittings.codes >= 0)
    extra = np.where(by_cell, 0.0, extra)
    unread = (fittings.codes >= 0) & np.isnan(cell["n"])
    against = by_length & (fittings.codes >= 0) & (cell["n"] + cell["k"] > 0.0) & ~(surplus > 0.0)
    unknown = np.isnan(extra) | is_open(equivalent_length_gap, fittings_gap) | unread | against
    use = {name: np.where(by_cell, values, 0.0) for name, values in cell.items()}
    return {
        "pipe_length": straight,
        "fittings_length": np.where(unknown, np.nan, extra),
        "fittings_n": np.where(unknown, np.nan, use["n"]),
        "fittings_k": np.where(unknown, np.nan, use["k"]),
        "entrances": use["entrances"],
        "entrance_coefficient": use["entrance_coefficient"],
        "exits": use["exits"],
    }


def _by_text(values: FloatArray, coded: Coded) -> FloatArray:
    return np.append(np.asarray(values, dtype=np.float64), np.nan)[coded.codes]


def elevation_along(*, elevation_change: FloatArray, pipe_length: FloatArray) -> FloatArray:
    """Return the elevation change, NaN where it is more than the line is long."""
    with np.errstate(invalid="ignore"):
        beyond = np.abs(elevation_change) > pipe_length * (1.0 + EQUAL_WITHIN)
    return np.where(beyond, np.nan, elevation_change)


def hydraulics(
    *,
    criteria: Criteria,
    phase: CodeArray,
    flow_mass: FloatArray,
    density_stated: FloatArray,
    viscosity: FloatArray,
    vapour_fraction: FloatArray,
    vapour_fraction_outlet: FloatArray,
    vapour_fraction_outlet_gap: CodeArray,
    liquid_density: FloatArray,
    liquid_viscosity: FloatArray,
    vapour_density: FloatArray,
    vapour_viscosity: FloatArray,
    surface_tension: FloatArray,
    pressure: FloatArray,
    pressure_basis: CodeArray,
    heat_capacity_ratio: FloatArray,
    inside_diameter: FloatArray,
    roughness: FloatArray,
    pipe_length: FloatArray,
    fittings_length: FloatArray,
    fittings_n: FloatArray,
    fittings_k: FloatArray,
    entrances: FloatArray,
    entrance_coefficient: FloatArray,
    exits: FloatArray,
    elevation_along: FloatArray,
) -> Named:
    """Return every column of the solver.

    A list with a column for the outlet's vapour fraction must fill it (or write N/A where the fluid does not flash):
    a blank there leaves the line unsolved.
    """
    not_told = ~np.isin(vapour_fraction_outlet_gap, (Gap.GIVEN, Gap.NOT_APPLICABLE, Gap.NO_COLUMN))
    methods = Methods(
        gas=cast(Any, criteria.gas_method),
        two_phase=cast(Any, criteria.two_phase_method),
        downhill_recovery=criteria.downhill_recovery,
    )
    arguments: dict[str, Any] = dict(
        phase=phase,
        flow_mass=flow_mass,
        density=density_stated,
        viscosity=viscosity,
        vapour_fraction=np.where(not_told, np.nan, vapour_fraction),
        vapour_fraction_outlet=vapour_fraction_outlet,
        liquid_density=liquid_density,
        liquid_viscosity=liquid_viscosity,
        vapour_density=vapour_density,
        vapour_viscosity=vapour_viscosity,
        surface_tension=surface_tension,
        pressure=pressure,
        pressure_basis=pressure_basis,
        heat_capacity_ratio=heat_capacity_ratio,
        inside_diameter=inside_diameter,
        roughness=roughness,
        length=pipe_length,
        fittings_length=fittings_length,
        fittings_coefficient_n=fittings_n,
        fittings_coefficient_k=fittings_k,
        entrance=entrances,
        entrance_coefficient=entrance_coefficient,
        exit=exits,
        elevation_change=elevation_along,
    )
    solution = solve(**arguments, methods=methods)
    columns = {name: getattr(solution, name) for name in SOLVED}
    return columns | {"solution": solution, "solver_arguments": arguments | {"methods": methods}}


PROVIDERS = (
    provider(route, *ROUTE),
    provider(elevation_along),
    provider(hydraulics, *SOLVED, "solution", "solver_arguments"),
)
