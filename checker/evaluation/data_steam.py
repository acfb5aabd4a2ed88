"""Providers of the data rule on steam and water: the state of a row against the saturation line."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.contradictions import asked, below, contradiction, said
from checker.evaluation.provider import provider
from checker.fluid.saturation import saturation_temperature
from checker.model import Phase
from checker.ruling.tristate import NO, UNKNOWN, all_of, is_code

__all__ = ["PROVIDERS"]

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
Named = dict[str, Any]

SATURATION_WITHIN = 3.0
ICE_POINT = 273.15


def _read_as_fahrenheit(temperature: FloatArray) -> FloatArray:
    """Return the temperature that the same number means in degF [K]."""
    return (temperature - ICE_POINT - 32.0) / 1.8 + ICE_POINT


def steam_and_water(
    *,
    water: CodeArray,
    saturated: BoolArray,
    phase_said: CodeArray,
    phase_contradictory: BoolArray,
    pressure: FloatArray,
    pressure_gap: CodeArray,
    temperature: FloatArray,
    temperature_gap: CodeArray,
    pressure_design: FloatArray,
    pressure_design_gap: CodeArray,
    temperature_design: FloatArray,
    temperature_design_gap: CodeArray,
) -> Named:
    """Return whether steam or water contradicts the saturation line.

    Steam colder than it boils is wet; saturated steam, or water and steam together, stand on the line within 3 K; water
    more than 3 K hotter than it boils at its operating pressure, or hotter than it boils at the design pressure, is
    steam; a saturated service needs a design temperature that is not below saturation at its design pressure.
    """
    boils, boils_at_design = saturation_temperature(pressure), saturation_temperature(pressure_design)
    state = asked(pressure_gap, temperature_gap)
    gas, liquid = phase_said == Phase.GAS, phase_said == Phase.LIQUID
    two_phase = phase_said == Phase.TWO_PHASE
    by_design = liquid & asked(temperature_gap, pressure_design_gap)
    on_line = (saturated & gas | two_phase) & state
    designed = saturated & ~liquid & asked(pressure_design_gap, temperature_design_gap)
    with np.errstate(invalid="ignore"):
        off = on_line & (np.abs(temperature - boils) > SATURATION_WITHIN)
        wet = gas & state & (temperature < boils - SATURATION_WITHIN)
        flashing = liquid & state & (temperature > boils + SATURATION_WITHIN)
        as_degf = np.abs(_read_as_fahrenheit(temperature) - boils) <= SATURATION_WITHIN
    boiling = by_design & below(boils_at_design, temperature)
    weak = designed & below(temperature_design, boils_at_design)
    unknown = (((gas | liquid) & state) | on_line) & np.isnan(temperature + boils)
    unknown |= by_design & np.isnan(temperature + boils_at_design)
    unknown |= designed & np.isnan(temperature_design + boils_at_design)
    judged = ((gas | liquid) & state) | on_line | by_design | designed
    found = off | wet | flashing | boiling | weak
    return {
        "saturation_asked": all_of(
            _perhaps_water(water, found), is_code(phase_said, *Phase), judged | (phase_said < 0)
        ),
        "saturation_contradicts": contradiction(found, unknown | phase_contradictory),
        "saturation_temperature": boils,
        "saturation_temperature_design": boils_at_design,
        "saturation_said": said(
            "they agree",
            (off & as_degf, "the temperature agrees with saturation when its number is read in degF"),
            (wet, "steam colder than it boils is wet"),
            (off, "saturated steam stands within 3 K of it"),
            (flashing, "water more than 3 K hotter than it boils at its pressure is steam"),
            (boiling, "water is hotter than it boils at the design pressure"),
            (weak, "the design temperature of a saturated service is below saturation at its design pressure"),
        ),
    }


def _perhaps_water(water: CodeArray, found: BoolArray) -> CodeArray:
    """Return 1 for water; a fluid that is not known matters only where as water it would contradict: -1."""
    return np.where(water == UNKNOWN, np.where(found, UNKNOWN, NO), water).astype(np.int8)


PROVIDERS = (
    provider(
        steam_and_water,
        "saturation_asked",
        "saturation_contradicts",
        "saturation_temperature",
        "saturation_temperature_design",
        "saturation_said",
    ),
)
