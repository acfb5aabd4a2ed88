"""The line cases as the solver takes them, and what holds for all phases: mass flux, fittings, missing values."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, fields
from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.hydraulics.arrays import BoolArray, CodeArray, FloatArray
from checker.hydraulics.friction import crane_turbulent_factor
from checker.hydraulics.solution import STATUS_CODES

#: Results by name, as in `solution.Solution`.
Results = dict[str, NDArray[Any]]


@dataclass(frozen=True)
class Cases:
    """Arguments of `compose.solve`, one value a line case, SI."""

    phase: CodeArray
    pressure_basis: CodeArray
    flow_mass: FloatArray
    density: FloatArray
    viscosity: FloatArray
    vapour_fraction: FloatArray
    vapour_fraction_outlet: FloatArray
    liquid_density: FloatArray
    liquid_viscosity: FloatArray
    vapour_density: FloatArray
    vapour_viscosity: FloatArray
    surface_tension: FloatArray
    pressure: FloatArray
    heat_capacity_ratio: FloatArray
    inside_diameter: FloatArray
    roughness: FloatArray
    length: FloatArray
    fittings_length: FloatArray
    fittings_coefficient_n: FloatArray
    fittings_coefficient_k: FloatArray
    entrance: FloatArray
    entrance_coefficient: FloatArray
    exit: FloatArray
    elevation_change: FloatArray

    def take(self, rows: slice | NDArray[np.intp] | BoolArray) -> Cases:
        """Return the cases of these rows."""
        return Cases(**{field.name: getattr(self, field.name)[rows] for field in fields(self)})


@dataclass(frozen=True)
class Fittings:
    """Fittings of the line cases: loss in the line, at its entrance, and whether there is an entrance (1, 0, NaN)."""

    cell: FloatArray
    extra_length: FloatArray
    entrance: FloatArray
    entrance_coefficient: FloatArray

    def coefficient(self, *, friction_factor: FloatArray, inside_diameter: FloatArray) -> FloatArray:
        """Loss coefficient of the fittings in the line, without entrance and exit."""
        piped = friction_factor * self.extra_length / inside_diameter
        return self.cell + np.where(self.extra_length == 0.0, 0.0, piped)

    def entrance_step(self, kinetic_energy_factor: FloatArray) -> FloatArray:
        """alpha plus K of the entrance; 0 where there is none."""
        step = kinetic_energy_factor * self.entrance + self.entrance_coefficient
        return np.where(self.entrance == 0.0, 0.0, step)


def fittings_of(cases: Cases) -> Fittings:
    """Put together what the list says of fittings; one that is not known (NaN) makes the loss not known."""
    shape, constant = cases.fittings_coefficient_n, cases.fittings_coefficient_k
    turbulent = crane_turbulent_factor(inside_diameter=cases.inside_diameter)
    cell = np.where(shape == 0.0, 0.0, shape * turbulent) + constant
    extra = np.where(cases.fittings_length >= 0.0, cases.fittings_length, np.nan)
    present = np.where(np.isnan(cases.entrance), np.nan, (cases.entrance > 0.0).astype(np.float64))
    loss = np.where(present == 0.0, 0.0, cases.entrance_coefficient)
    return Fittings(np.where(cell >= 0.0, cell, np.nan), extra, present, loss)


def first_reason(conditions: Mapping[str, BoolArray]) -> CodeArray:
    """Status code of the first condition that is true, 0 where none is."""
    codes = [STATUS_CODES[name] for name in conditions]
    return np.select(list(conditions.values()), codes, default=0).astype(np.int8)


def common_reasons(cases: Cases, fittings: Fittings) -> dict[str, BoolArray]:
    """Conditions under which no phase can be solved along the line."""
    line = fittings.cell + fittings.extra_length + fittings.entrance + fittings.entrance_coefficient
    return {
        "length": ~(cases.length >= 0.0),
        "fittings": np.isnan(line),
        "elevation": np.isnan(cases.elevation_change),
        "pressure": ~(cases.pressure > 0.0),
        "pressure basis": ~np.isin(cases.pressure_basis, (0, 1)),
    }
