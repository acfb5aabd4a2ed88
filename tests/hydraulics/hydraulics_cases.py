"""Random line cases in SI for the hydraulics tests."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

FloatArray = NDArray[np.float64]
Arguments = dict[str, NDArray[np.generic]]


def line_cases(count: int, seed: int, shares: tuple[float, float, float] = (0.4, 0.3, 0.3)) -> Arguments:
    """Plausible line cases of all phases, known at either end, some from a vessel or into a receiver."""
    random = np.random.default_rng(seed)
    phase = random.choice(3, count, p=shares).astype(np.int8)
    bore = random.uniform(0.02, 0.6, count)
    speed = np.choose(
        phase, [random.uniform(0.2, 4.0, count), random.uniform(2.0, 60.0, count), random.uniform(1.0, 12.0, count)]
    )
    pressure = 10.0 ** random.uniform(5.2, 7.0, count)
    gas_density = pressure * random.uniform(0.004, 0.044, count) / 8.314 / random.uniform(250.0, 500.0, count)
    vapour_density = pressure * random.uniform(0.016, 0.044, count) / 8.314 / 300.0
    liquid_density = random.uniform(450.0, 1100.0, count)
    quality = 10.0 ** random.uniform(-2.5, -0.2, count)
    mixture = 1.0 / ((1.0 - quality) / liquid_density + quality / vapour_density)
    density = np.choose(phase, [liquid_density, gas_density, mixture])
    length = 10.0 ** random.uniform(0.5, 2.5, count)
    two_phase = phase == 2
    return {
        "phase": phase,
        "pressure_basis": random.integers(0, 2, count).astype(np.int8),
        "flow_mass": density * speed * np.pi / 4.0 * bore**2,
        "density": np.where(two_phase, np.nan, density),
        "viscosity": np.where(phase == 0, 10.0 ** random.uniform(-4.0, -1.0, count), 1.2e-5),
        "vapour_fraction": np.where(two_phase, quality, np.nan),
        "vapour_fraction_outlet": np.where(random.random(count) < 0.2, np.minimum(1.0, quality * 1.1), np.nan),
        "liquid_density": liquid_density,
        "liquid_viscosity": 10.0 ** random.uniform(-4.0, -2.5, count),
        "vapour_density": vapour_density,
        "vapour_viscosity": np.full(count, 1.2e-5),
        "surface_tension": random.uniform(0.01, 0.07, count),
        "pressure": pressure,
        "heat_capacity_ratio": random.uniform(1.05, 1.4, count),
        "inside_diameter": bore,
        "roughness": random.choice([0.0, 1.5e-6, 4.5e-5, 5e-4], count),
        "length": length,
        "fittings_length": np.where(random.random(count) < 0.3, 0.2 * length, 0.0),
        "fittings_coefficient_n": random.integers(0, 300, count).astype(np.float64),
        "fittings_coefficient_k": random.choice([0.0, 1.5], count),
        "entrance": (random.random(count) < 0.25).astype(np.float64),
        "exit": (random.random(count) < 0.25).astype(np.float64),
        "elevation_change": random.uniform(-1.0, 1.0, count) * np.minimum(0.5 * length, 30.0),
    }


def one_case(**changes: float) -> Arguments:
    """A single line case, water by default; change what a test needs."""
    base: dict[str, float] = {
        "phase": 0,
        "pressure_basis": 0,
        "flow_mass": 20.0,
        "density": 998.0,
        "viscosity": 1e-3,
        "vapour_fraction": np.nan,
        "vapour_fraction_outlet": np.nan,
        "liquid_density": np.nan,
        "liquid_viscosity": np.nan,
        "vapour_density": np.nan,
        "vapour_viscosity": np.nan,
        "surface_tension": np.nan,
        "pressure": 6e5,
        "heat_capacity_ratio": np.nan,
        "inside_diameter": 0.10226,
        "roughness": 4.5e-5,
        "length": 100.0,
        "fittings_length": 0.0,
        "fittings_coefficient_n": 0.0,
        "fittings_coefficient_k": 0.0,
        "entrance": 0.0,
        "exit": 0.0,
        "elevation_change": 0.0,
    }
    unknown = set(changes) - set(base)
    assert not unknown, unknown
    return {name: np.array([value]) for name, value in (base | changes).items()}


GAS = {"phase": 1, "flow_mass": 2.0, "density": 8.0, "viscosity": 1.1e-5, "heat_capacity_ratio": 1.3, "pressure": 1e6}
TWO_PHASE = {
    "phase": 2,
    "flow_mass": 12.0,
    "density": np.nan,
    "viscosity": np.nan,
    "vapour_fraction": 0.05,
    "liquid_density": 750.0,
    "liquid_viscosity": 4e-4,
    "vapour_density": 15.0,
    "vapour_viscosity": 1.2e-5,
    "surface_tension": 0.02,
    "pressure": 1.5e6,
}
