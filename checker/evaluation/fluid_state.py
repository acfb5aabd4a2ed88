"""Providers: one flow, one density and the gas properties of each line case, with what had to be assumed."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.gaps import is_open
from checker.evaluation.provider import provider
from checker.fluid.flow import mass_flow
from checker.fluid.gas_density import gas_density, resolved_gas_density
from checker.model import Phase

__all__ = ["PROVIDERS"]

FloatArray = NDArray[np.float64]
CodeArray = NDArray[np.int8]
Named = dict[str, NDArray[Any]]
IDEAL_GAS_BELOW = 1.0e6


def compressibility(
    *,
    compressibility_listed: FloatArray,
    compressibility_gap: CodeArray,
    density_listed: FloatArray,
    pressure: FloatArray,
    phase: CodeArray,
) -> Named:
    """Return Z: listed, else 1.0 assumed for a gas below 10 bar absolute (common practice), else NaN."""
    missing = np.isnan(compressibility_listed) & ~is_open(compressibility_gap)
    assumed = missing & (phase == Phase.GAS) & (pressure < IDEAL_GAS_BELOW) & np.isnan(density_listed)
    return {
        "compressibility": np.where(assumed, 1.0, compressibility_listed),
        "compressibility_assumed": assumed,
    }


def heat_capacity_ratio(
    *, heat_capacity_ratio_listed: FloatArray, heat_capacity_ratio_gap: CodeArray, phase: CodeArray
) -> Named:
    """Return Cp/Cv: listed, else 1.0 assumed for a gas: the lower bound, by which the Mach number is an upper bound."""
    missing = np.isnan(heat_capacity_ratio_listed) & ~is_open(heat_capacity_ratio_gap)
    assumed = missing & (phase == Phase.GAS)
    return {
        "heat_capacity_ratio": np.where(assumed, 1.0, heat_capacity_ratio_listed),
        "heat_capacity_ratio_assumed": assumed,
    }


def density_stated(
    *,
    density_listed: FloatArray,
    density_gap: CodeArray,
    pressure: FloatArray,
    temperature: FloatArray,
    molar_mass: FloatArray,
    compressibility: FloatArray,
    phase: CodeArray,
) -> Named:
    """Return the density at the stated pressure: listed, for a gas else P M / (Z R T); NaN for two-phase."""
    computed = gas_density(
        pressure=pressure, temperature=temperature, molar_mass=molar_mass, compressibility=compressibility
    )
    computed = np.where((phase == Phase.GAS) & ~is_open(density_gap), computed, np.nan)
    density, contradictory = resolved_gas_density(listed=density_listed, computed=computed)
    single = (phase == Phase.LIQUID) | (phase == Phase.GAS)
    return {
        "density_stated": np.where(single, density, np.nan),
        "density_contradictory": contradictory,
    }


def flow(
    *,
    flow_mass_listed: FloatArray,
    flow_mass_gap: CodeArray,
    flow_volume_listed: FloatArray,
    flow_volume_gap: CodeArray,
    flow_standard_listed: FloatArray,
    flow_standard_gap: CodeArray,
    density_stated: FloatArray,
    molar_mass: FloatArray,
) -> Named:
    """Return the mass flow from whichever flow the row states; NaN where one of them is on HOLD or they contradict."""
    flow_mass, contradictory = mass_flow(
        flow_mass=flow_mass_listed,
        flow_volume=flow_volume_listed,
        flow_standard=flow_standard_listed,
        density=density_stated,
        molar_mass=molar_mass,
    )
    held = is_open(flow_mass_gap, flow_volume_gap, flow_standard_gap)
    return {"flow_mass": np.where(held, np.nan, flow_mass), "flow_contradictory": contradictory}


PROVIDERS = (
    provider(compressibility, "compressibility", "compressibility_assumed"),
    provider(heat_capacity_ratio, "heat_capacity_ratio", "heat_capacity_ratio_assumed"),
    provider(density_stated, "density_stated", "density_contradictory"),
    provider(flow, "flow_mass", "flow_contradictory"),
)
