"""Data rules: are density, viscosity and pressure those of the fluid that the row names."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Coded
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]


def _gas_with_density(*, gas_density_stated: TriState, state_told: TriState) -> TriState:
    return all_of(gas_density_stated, state_told)


def _liquid_with_density(*, liquid_density_stated: TriState, state_told: TriState) -> TriState:
    return all_of(liquid_density_stated, state_told)


def _with_viscosity(*, viscosity_stated: TriState, state_told: TriState) -> TriState:
    return all_of(viscosity_stated, state_told)


def _told_by_density(*, gauge_told_by_density: TriState, state_told: TriState) -> TriState:
    return all_of(gauge_told_by_density, state_told)


def _told_by_velocity(*, gauge_told_by_velocity: TriState) -> TriState:
    return gauge_told_by_velocity


def _in_grams(*, value: FloatArray, liquid_density_in_grams: BoolArray) -> BoolArray:
    return liquid_density_in_grams


@rule(
    id="gas-density",
    title="Density of a gas against its pressure and temperature",
    on_data=True,
    force="should",
    sense="condition",
    source=Source(
        "common practice", clause="Z = P M / (rho R T) of 0.9 to 1.05 below 10 bar absolute, else 0.3 to 1.3"
    ),
    applies=_gas_with_density,
    calculation=(
        "Z = P M / (rho R T) = {implied_compressibility}, {gas_density_said}; P = {pressure}, M = {molar_mass},"
        " rho = {density_listed}, T = {temperature}, the list's Z {compressibility_listed}"
    ),
)
def gas_density(*, gas_density_contradicts: FloatArray, gas_density_said: Coded) -> FloatArray:
    """Contradict where a listed gas density is not that of the listed pressure, temperature and molar mass.

    Beyond 5 % from the list's own compressibility factor the hydraulics of the row are not checked; this rule says why.
    """
    return gas_density_contradicts


@rule(
    id="liquid-density",
    title="Density of a liquid",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="400 to 1 900 kg/m3; water below 100 degC 950 to 1 005 kg/m3"),
    applies=_liquid_with_density,
    calculation="rho = {density_of_liquid}: {liquid_density_said}",
    shall_where=_in_grams,
)
def liquid_density(*, liquid_density_contradicts: FloatArray, liquid_density_said: Coded) -> FloatArray:
    """Contradict where a density is none of a liquid, or none of water where the fluid is water.

    The number of a density in g/cm3 under a header in kg/m3 is a `shall`: nothing of the row can be computed.
    """
    return liquid_density_contradicts


@rule(
    id="viscosity-magnitude",
    title="Magnitude of the viscosity",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="gas 0.006 to 0.05 cP, liquid 0.05 to 5 000 cP, water by temperature"),
    applies=_with_viscosity,
    calculation="mu = {viscosity_judged}: {viscosity_said}",
)
def viscosity_magnitude(*, viscosity_contradicts: FloatArray, viscosity_said: Coded) -> FloatArray:
    """Contradict where a viscosity has not the magnitude of its phase, or of water where the fluid is water."""
    return viscosity_contradicts


@rule(
    id="gauge-absolute",
    title="Gauge and absolute pressure",
    on_data=True,
    force="shall",
    sense="condition",
    source=Source("common practice", clause="rho = P M / (Z R T) with one atmosphere more or less"),
    applies=_told_by_density,
    calculation=("rho = {density_listed} where P M / (Z R T) = {density_expected} at {pressure}: {gauge_density_said}"),
)
def gauge_absolute(*, gauge_against_density: FloatArray, gauge_density_said: Coded) -> FloatArray:
    """Contradict where a gas's density goes with its pressure only when one atmosphere is added or taken away."""
    return gauge_against_density


@rule(
    id="gauge-absolute-by-velocity",
    title="Gauge and absolute pressure by the stated velocity",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="v goes by 1 / P, with one atmosphere more or less"),
    applies=_told_by_velocity,
    calculation=(
        "stated velocity {velocity_stated} where {velocity_at_stated_pressure} is computed at {pressure}:"
        " {gauge_velocity_said}"
    ),
)
def gauge_absolute_by_velocity(*, gauge_against_velocity: FloatArray, gauge_velocity_said: Coded) -> FloatArray:
    """Contradict where a stated gas velocity goes with the pressure only when one atmosphere is added or taken away.

    For lists without a density column. Another bore may look alike, so it is no `shall`.
    """
    return gauge_against_velocity
