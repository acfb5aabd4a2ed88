"""Providers of data rules: do density, viscosity and compressibility have the magnitude of what the row calls them.

The bounds are common practice. A value that agrees with another unit says so.
"""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria
from checker.evaluation.contradictions import above, asked, below, contradiction, said
from checker.evaluation.identity import LEAST_LIQUID_DENSITY
from checker.evaluation.provider import provider
from checker.fluid.gas_density import GAS_CONSTANT, GREATEST_GAS_DENSITY, gas_density
from checker.fluid.water_viscosity import liquid_water_viscosity
from checker.model import Gap, Phase
from checker.ruling.tristate import UNKNOWN, YES, all_of, is_code

__all__ = ["PROVIDERS"]

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
Named = dict[str, Any]

LOW_PRESSURE = 1.0e6
IDEAL_RANGE, REAL_RANGE = (0.9, 1.05), (0.3, 1.3)
LIQUID_DENSITY = (400.0, 1900.0)
WATER_DENSITY = (950.0, 1005.0)
WATER_BELOW = 373.15
GRAM_PER_CUBIC_CENTIMETRE = (0.4, 2.2)
GAS_VISCOSITY = (6e-6, 5e-5)
LIQUID_VISCOSITY = (5e-5, 5.0)
WATER_FACTOR = 2.0
THOUSAND = 1000.0
AGREES_WITHIN = 0.02
DENSITY_TELLS_UP_TO = 2.0e6
VELOCITY_TELLS_UP_TO = 5.0e5


def _outside(values: FloatArray, bounds: tuple[float, float]) -> BoolArray:
    return below(values, bounds[0]) | above(values, bounds[1])


def _inside(values: FloatArray, bounds: tuple[float, float]) -> BoolArray:
    with np.errstate(invalid="ignore"):
        return np.asarray((values >= bounds[0]) & (values <= bounds[1]), dtype=np.bool_)


def gas_density_check(
    *,
    phase_said: CodeArray,
    phase_contradictory: BoolArray,
    density_listed: FloatArray,
    density_gap: CodeArray,
    pressure: FloatArray,
    pressure_gap: CodeArray,
    temperature: FloatArray,
    temperature_gap: CodeArray,
    molar_mass: FloatArray,
    molar_mass_gap: CodeArray,
    compressibility_listed: FloatArray,
    compressibility_gap: CodeArray,
    density_contradictory: BoolArray,
) -> Named:
    """Return Z = P M / (rho R T) and whether a gas's listed density contradicts it.

    Z from 0.9 to 1.05 is expected below 10 bar absolute, from 0.3 to 1.3 above; a density beyond 5 % of P M / (Z R T)
    with the list's own Z contradicts too, and so does one above 400 kg/m3.
    """
    stated = asked(density_gap, pressure_gap, temperature_gap, molar_mass_gap)
    with np.errstate(all="ignore"):
        implied = pressure * molar_mass / (density_listed * GAS_CONSTANT * temperature)
        low = pressure < LOW_PRESSURE
    beyond = np.where(low, _outside(implied, IDEAL_RANGE), _outside(implied, REAL_RANGE))
    dense = above(density_listed, GREATEST_GAS_DENSITY)
    against = density_contradictory & np.isfinite(density_listed + compressibility_listed)
    by_z = asked(compressibility_gap) & np.isnan(compressibility_listed)
    return {
        "gas_density_stated": all_of(is_code(phase_said, Phase.GAS), stated),
        "gas_density_contradicts": contradiction(
            beyond | dense | against, phase_contradictory | np.isnan(implied) | by_z
        ),
        "implied_compressibility": implied,
        "gas_density_said": said(
            "as expected",
            (dense, "above 400 kg/m3, which is no gas"),
            (beyond & low, "0.9 to 1.05 is expected below 10 bar absolute"),
            (beyond, "0.3 to 1.3 is expected"),
            (against, "more than 5 % from the list's own compressibility factor"),
        ),
    }


def liquid_density_check(
    *,
    phase_said: CodeArray,
    phase_contradictory: BoolArray,
    density_listed: FloatArray,
    density_gap: CodeArray,
    liquid_density_listed: FloatArray,
    liquid_density_gap: CodeArray,
    temperature: FloatArray,
    temperature_gap: CodeArray,
    water: CodeArray,
) -> Named:
    """Return whether a liquid's density is none: outside 400 to 1 900 kg/m3; water below 100 degC 950 to 1 005.

    The liquid of a two-phase line counts. Below 250 kg/m3 nothing is a liquid; 0.4 to 2.2 is the number of a density
    in g/cm3 or of a specific gravity.
    """
    two_phase = phase_said == Phase.TWO_PHASE
    density = np.where(two_phase, liquid_density_listed, density_listed)
    gap = np.where(two_phase, liquid_density_gap, density_gap).astype(np.int8)
    with np.errstate(invalid="ignore"):
        cold = temperature < WATER_BELOW
    grams = _inside(density, GRAM_PER_CUBIC_CENTIMETRE)
    light = below(density, LEAST_LIQUID_DENSITY)
    other = _outside(density, LIQUID_DENSITY)
    no_water = (water == YES) & cold & _outside(density, WATER_DENSITY)
    water_open = (water == UNKNOWN) | ((water == YES) & np.isnan(temperature) & asked(temperature_gap))
    return {
        "liquid_density_stated": all_of(is_code(phase_said, Phase.LIQUID, Phase.TWO_PHASE), asked(gap)),
        "liquid_density_contradicts": contradiction(
            grams | light | other | no_water,
            phase_contradictory | np.isnan(density) | (water_open & _outside(density, WATER_DENSITY)),
        ),
        "density_of_liquid": density,
        "liquid_density_in_grams": grams,
        "liquid_density_said": said(
            "a liquid's",
            (grams, "the number of a density in g/cm3 or of a specific gravity"),
            (light, "below 250 kg/m3, which is no liquid"),
            (other, "400 to 1 900 kg/m3 is usual for a liquid"),
            (no_water, "water below 100 degC has 950 to 1 005 kg/m3"),
        ),
    }


def _off_by_thousand(values: FloatArray, usual: tuple[float, float]) -> tuple[BoolArray, BoolArray, BoolArray]:
    """Return where a viscosity is not usual, and where a thousand times or a thousandth of it would be."""
    unusual = _outside(values, usual)
    return unusual, unusual & _inside(values * THOUSAND, usual), unusual & _inside(values / THOUSAND, usual)


def viscosity_check(
    *,
    phase_said: CodeArray,
    phase_contradictory: BoolArray,
    viscosity: FloatArray,
    viscosity_gap: CodeArray,
    liquid_viscosity: FloatArray,
    liquid_viscosity_gap: CodeArray,
    vapour_viscosity: FloatArray,
    vapour_viscosity_gap: CodeArray,
    temperature: FloatArray,
    temperature_gap: CodeArray,
    water: CodeArray,
) -> Named:
    """Return whether a viscosity is none of its phase: gas 0.006 to 0.05 cP, liquid 0.05 to 5 000 cP.

    Liquid water within a factor of 2 of the viscosity that its temperature gives it. Of a two-phase line both.
    """
    gas, two_phase = phase_said == Phase.GAS, phase_said == Phase.TWO_PHASE
    liquid = np.where(two_phase, liquid_viscosity, np.where(gas, np.nan, viscosity))
    vapour = np.where(two_phase, vapour_viscosity, np.where(gas, viscosity, np.nan))
    pair = asked(liquid_viscosity_gap, vapour_viscosity_gap)
    with np.errstate(all="ignore"):
        ratio = liquid / liquid_water_viscosity(temperature)
    off = _outside(ratio, (1.0 / WATER_FACTOR, WATER_FACTOR))
    parts = (_off_by_thousand(liquid, LIQUID_VISCOSITY), _off_by_thousand(vapour, GAS_VISCOSITY))
    unusual, small, large = (np.logical_or(*both) for both in zip(*parts, strict=True))
    values = np.where(two_phase, liquid, viscosity)
    missing = np.where(two_phase, np.isnan(liquid + vapour), np.isnan(viscosity))
    no_temperature = (water == YES) & np.isfinite(liquid) & np.isnan(temperature) & asked(temperature_gap)
    open_water = ((water == UNKNOWN) & off) | no_temperature
    no_water = (water == YES) & off
    return {
        "viscosity_stated": all_of(
            is_code(phase_said, *Phase), np.where(two_phase, pair, asked(viscosity_gap)).astype(np.int8)
        ),
        "viscosity_contradicts": contradiction(unusual | no_water, phase_contradictory | missing | open_water),
        "viscosity_judged": np.where(two_phase & (parts[1][0] | np.isnan(liquid)), vapour, values),
        "viscosity_said": said(
            "usual for its phase",
            (small, "a thousand times too small: the number of another unit (Pa s written as cP)"),
            (large, "a thousand times too large: the number of another unit"),
            (unusual, "0.05 to 5 000 cP is usual for a liquid, 0.006 to 0.05 cP for a gas"),
            (no_water, "more than a factor 2 from the viscosity of water at that temperature"),
        ),
    }


def _mixed_up(agreement: Any) -> tuple[BoolArray, BoolArray]:
    """Return where a value agrees with one atmosphere more, and with one less, and with neither as it stands."""
    as_written, more, less = agreement
    return more & ~as_written, less & ~as_written & ~more


def _near(first: FloatArray, second: FloatArray) -> BoolArray:
    with np.errstate(all="ignore"):
        return np.asarray(np.abs(first / second - 1.0) <= AGREES_WITHIN, dtype=np.bool_)


def gauge_by_density(
    *,
    criteria: Criteria,
    phase_said: CodeArray,
    phase_contradictory: BoolArray,
    pressure: FloatArray,
    pressure_gap: CodeArray,
    temperature: FloatArray,
    molar_mass: FloatArray,
    molar_mass_gap: CodeArray,
    compressibility_listed: FloatArray,
    compressibility_gap: CodeArray,
    density_listed: FloatArray,
    density_gap: CodeArray,
) -> Named:
    """Return whether a gas's density goes with one atmosphere more or less than its pressure as written.

    Held against P M / (Z R T) with the list's own Z, up to 20 bar absolute: beyond that one atmosphere is within the
    accuracy of a density.
    """
    stated = asked(density_gap, pressure_gap, molar_mass_gap, compressibility_gap)
    with np.errstate(invalid="ignore"):
        stated &= ~(pressure > DENSITY_TELLS_UP_TO)
    expected = [
        gas_density(
            pressure=pressure + change,
            temperature=temperature,
            molar_mass=molar_mass,
            compressibility=compressibility_listed,
        )
        for change in (0.0, criteria.atmosphere, -criteria.atmosphere)
    ]
    more, less = _mixed_up([_near(density_listed, each) for each in expected])
    return {
        "gauge_told_by_density": all_of(is_code(phase_said, Phase.GAS), stated),
        "gauge_against_density": contradiction(
            more | less, phase_contradictory | np.isnan(density_listed + expected[0])
        ),
        "density_expected": expected[0],
        "gauge_density_said": said(
            "it goes with the pressure as written",
            (more, "it goes with one atmosphere more: a gauge pressure written as absolute"),
            (less, "it goes with one atmosphere less: an absolute pressure written as gauge"),
        ),
    }


def gauge_by_velocity(
    *,
    criteria: Criteria,
    phase_said: CodeArray,
    phase_contradictory: BoolArray,
    pressure: FloatArray,
    density_gap: CodeArray,
    velocity_stated: FloatArray,
    velocity_stated_gap: CodeArray,
    velocity_at_stated_pressure: FloatArray,
) -> Named:
    """Return whether a gas's stated velocity goes with one atmosphere more or less than its pressure as written.

    Where the list has no density column a velocity goes by 1 / P. Up to 5 bar absolute: another bore or temperature may
    look like one atmosphere above that.
    """
    stated = (density_gap == Gap.NO_COLUMN) & asked(velocity_stated_gap)
    with np.errstate(all="ignore"):
        stated &= ~(pressure > VELOCITY_TELLS_UP_TO)
        velocities = [
            velocity_at_stated_pressure * pressure / (pressure + change)
            for change in (0.0, criteria.atmosphere, -criteria.atmosphere)
        ]
    more, less = _mixed_up([_near(velocity_stated, each) for each in velocities])
    return {
        "gauge_told_by_velocity": all_of(is_code(phase_said, Phase.GAS), stated),
        "gauge_against_velocity": contradiction(
            more | less, phase_contradictory | np.isnan(velocity_stated + velocities[0])
        ),
        "gauge_velocity_said": said(
            "it goes with the pressure as written",
            (more, "it goes with one atmosphere more: a gauge pressure written as absolute"),
            (less, "it goes with one atmosphere less: an absolute pressure written as gauge"),
        ),
    }


PROVIDERS = (
    provider(
        gas_density_check,
        "gas_density_stated",
        "gas_density_contradicts",
        "implied_compressibility",
        "gas_density_said",
    ),
    provider(
        liquid_density_check,
        "liquid_density_stated",
        "liquid_density_contradicts",
        "density_of_liquid",
        "liquid_density_in_grams",
        "liquid_density_said",
    ),
    provider(
        viscosity_check,
        "viscosity_stated",
        "viscosity_contradicts",
        "viscosity_judged",
        "viscosity_said",
    ),
    provider(
        gauge_by_density,
        "gauge_told_by_density",
        "gauge_against_density",
        "density_expected",
        "gauge_density_said",
    ),
    provider(gauge_by_velocity, "gauge_told_by_velocity", "gauge_against_velocity", "gauge_velocity_said"),
)
