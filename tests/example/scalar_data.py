"""The data rules on the Marrowquay list, one line case at a time: is the row what it says it is.

What a row says of pressure, temperature and properties it says for its three cases alike, so that it is told once, at
the normal case. Bounds: common practice. Saturation of water: IAPWS SR1-86(1992), which is another equation than that
of IAPWS-IF97.
"""

from __future__ import annotations

import math
import re
from collections.abc import Callable
from typing import Protocol

from scalar_reading import CASES, OPEN, Line

MEETS, FAILS, NOT_CHECKED, NOT_APPLICABLE = "meets", "does not meet", "not checked", "not applicable"
Outcome = tuple[str, float, float]
NONE: Outcome = (NOT_APPLICABLE, math.nan, math.nan)
GAS_CONSTANT, ICE_POINT = 8.314462618, 273.15
WATER = ("Water", "Steam", "Boiler feed water", "Cooling water")
IDLE_WORDS = {"flare", "relief", "drain"}
EITHER_WORDS = {"vent"}


class Case(Protocol):
    """The part of a line case that these rules read."""

    @property
    def line(self) -> Line: ...
    @property
    def case(self) -> str: ...


def said(contradicts: bool, *needed: float) -> Outcome:
    """Contradicting is not met; else every value it needs must be there."""
    if contradicts:
        return FAILS, math.nan, math.nan
    known = all(math.isfinite(value) for value in needed)
    return (MEETS if known else NOT_CHECKED), math.nan, math.nan


def once_a_row(judge: Callable[[Line], Outcome]) -> Callable[[Case], Outcome]:
    """Told at the normal case, of two ends of a range at the first."""
    return lambda case: judge(case.line) if case.case == "normal" and "high" not in case.line.end else NONE


def once(judge: Callable[[Line], Outcome]) -> Callable[[Case], Outcome]:
    """Told at the normal case."""
    return lambda case: judge(case.line) if case.case == "normal" else NONE


def saturation_pressure(temperature: float) -> float:
    """IAPWS SR1-86(1992), equation 1."""
    tau = 1 - temperature / 647.096
    terms = (
        (-7.85951783, 1),
        (1.84408259, 1.5),
        (-11.7866497, 3),
        (22.6807411, 3.5),
        (-15.9618719, 4),
        (1.80122502, 7.5),
    )
    return 22.064e6 * math.exp(647.096 / temperature * sum(a * tau**power for a, power in terms))


def boiling(pressure: float) -> float:
    """Saturation temperature [degC] by bisection; NaN stays NaN."""
    if math.isnan(pressure):
        return math.nan
    low, high = 273.16, 647.0
    for _ in range(60):
        middle = (low + high) / 2
        low, high = (middle, high) if saturation_pressure(middle) < pressure else (low, middle)
    return low - ICE_POINT


def pressure_rank(line: Line) -> Outcome:
    design, operating = line["design_pressure_gauge"], line["pressure"] - line.atmosphere
    return said(design < operating, design, operating)


def temperature_rank(line: Line) -> Outcome:
    least, most, operating = line["design_temperature_minimum"], line["design_temperature"], line["temperature"]
    return said(most < operating or least > operating or least > most, least, most, operating)


def impossible_value(line: Line) -> Outcome:
    return said(
        max(line["temperature"], line["design_temperature"]) > 1000, line["temperature"], line["design_temperature"]
    )


def pressure_of_test(line: Line) -> Outcome:
    if line.row["Test Medium"] != "Water" or "test_pressure_gauge" in line.not_set:
        return NONE
    value, limit = line["test_pressure_gauge"], 1.5 * line["design_pressure_gauge"]
    if not math.isfinite(value + limit):
        return NOT_CHECKED, value, limit
    return (MEETS if value >= limit * (1 - 1e-9) else FAILS), value, limit


def case_order(case: Case) -> Outcome:
    if case.case == "normal":
        return NONE
    flow = case.line.flow
    mine, others = flow[case.case], [flow[name] for name in CASES if name != case.case]
    if case.case == "maximum":
        return said(any(mine < other for other in others), mine, *others)
    return said(any(mine > other for other in others), mine, *others)


def implied_z(line: Line, pressure: float, density: float) -> float:
    return pressure * line["molar_mass"] / (density * GAS_CONSTANT * (line["temperature"] + ICE_POINT))


def gas_density_rule(line: Line) -> Outcome:
    if line.phase != "gas":
        return NONE
    z, listed = implied_z(line, line["pressure"], line["density"]), line["compressibility"]
    low, high = (0.9, 1.05) if line["pressure"] < 10e5 else (0.3, 1.3)
    return said((not low <= z <= high and math.isfinite(z)) or abs(listed / z - 1) > 0.05, z, listed)


def gauge_absolute(line: Line) -> Outcome:
    if line.phase != "gas" or line["pressure"] > 20e5:
        return NONE
    ratios = [
        implied_z(line, line["pressure"] + change, line["density"]) / line["compressibility"]
        for change in (0.0, line.atmosphere, -line.atmosphere)
    ]
    # Density over P M / (Z R T), within 2 %.
    agrees = [ratio != 0 and abs(1 / ratio - 1) <= 0.02 for ratio in ratios]
    return said(not agrees[0] and (agrees[1] or agrees[2]), *ratios)


def is_water(line: Line) -> bool:
    return line.row["Fluid"] in WATER


def liquid_density(line: Line) -> Outcome:
    if line.phase == "gas":
        return NONE
    density = line["liquid_density"] if line.phase == "two-phase" else line["density"]
    cold_water = is_water(line) and line["temperature"] < 100
    wrong = not 400 <= density <= 1900 or (cold_water and not 950 <= density <= 1005)
    return said(wrong and math.isfinite(density), density)


def water_viscosity(temperature: float) -> float:
    """A 10^(B / (T - C)) [Pa s], the three-constant equation of the handbooks."""
    return 2.414e-5 * 10 ** (247.8 / (temperature + ICE_POINT - 140))


def viscosity_magnitude(line: Line) -> Outcome:
    if line.phase == "gas":
        return said(not 6e-6 <= line["viscosity"] <= 5e-5, line["viscosity"])
    liquid = line["liquid_viscosity"] if line.phase == "two-phase" else line["viscosity"]
    wrong = not 5e-5 <= liquid <= 5.0
    if is_water(line):
        wrong = wrong or not 0.5 <= liquid / water_viscosity(line["temperature"]) <= 2
    if line.phase == "liquid":
        return said(wrong, liquid)
    return said(wrong or not 6e-6 <= line["vapour_viscosity"] <= 5e-5, liquid, line["vapour_viscosity"])


def density_of(line: Line) -> float:
    return line["density"]


def mass_against_volume_flow(case: Case) -> Outcome:
    line, volume = case.line, case.line["volume_flow_normal"]
    if case.case != "normal" or math.isnan(volume):
        return NONE
    mass = line.flow["normal"]
    difference = abs(mass - volume * density_of(line)) / mass
    return said(difference > 0.02, difference)


def standard_taken_for_actual(case: Case) -> Outcome:
    line, volume = case.line, case.line["volume_flow_normal"]
    if case.case != "normal" or line.phase != "gas" or math.isnan(volume):
        return NONE
    mass = line.flow["normal"]
    molar = 1000 * volume * line["molar_mass"] / mass
    return said(22.3 <= molar <= 24.2 and abs(volume * density_of(line) / mass - 1) > 0.1, molar)


def steam_saturation(line: Line) -> Outcome:
    if not is_water(line):
        return NONE
    if line.phase == "gas":
        boils = boiling(line["pressure"])
        return said(line["temperature"] < boils - 3, line["temperature"], boils)
    flows, boils = boiling(line["pressure"]), boiling(line["design_pressure_gauge"] + line.atmosphere)
    return said(line["temperature"] > flows + 3 or line["temperature"] > boils, line["temperature"], flows, boils)


def words(text: str) -> set[str]:
    return set(re.findall("[a-z]+", text.lower()))


def zero_flow_row(line: Line) -> Outcome:
    if line.service is None:
        return NOT_CHECKED, math.nan, math.nan
    normal, flows = line.flow["normal"], list(line.flow.values())
    if words(line.row["Service"]) & IDLE_WORDS:
        return said(normal > 0.05 * max(flows), normal, *(flows if normal > 0 else []))
    if any(flow > 0 for flow in flows):
        return said(False)
    return said(not words(line.row["Service"]) & EITHER_WORDS and all(flow == 0 for flow in flows), *flows)


def on_hold(line: Line) -> bool:
    return any(cell in OPEN for cell in line.row.values()) or "HOLD" in line.row["Remarks"]


def standing_hold(line: Line) -> Outcome:
    return said(True) if on_hold(line) else NONE


def aged_hold(line: Line) -> Outcome:
    """The newest revision of the list is A: nothing is older, and of the newest nothing is said."""
    return said(True) if on_hold(line) and line.row["Rev."] != "A" else NONE


def doubled_line_number(line: Line) -> Outcome:
    return said(line.number in line.others)


def look_alike_number(line: Line) -> Outcome:
    """A capital O and a zero, and the like: not the same text, the same looks."""
    looks = str.maketrans("OIl", "011")
    return said(line.number.translate(looks) in {other.translate(looks) for other in line.others})


def number_against_columns(line: Line) -> Outcome:
    """Size and class of size-service-sequence-class; the service code repeats no column word by word."""
    size, _, _, piping_class = line.number.rsplit("-", 3)
    return said(size != line.row["Size (NPS)"] or piping_class != line.row["Piping Class"])


DATA_RULES: dict[str, Callable[[Case], Outcome]] = {
    "pressure-rank": once(pressure_rank),
    "temperature-rank": once(temperature_rank),
    "impossible-value": once(impossible_value),
    "test-pressure-rank": once_a_row(pressure_of_test),
    "case-order": case_order,
    "gas-density": once(gas_density_rule),
    "gauge-absolute": once(gauge_absolute),
    "liquid-density": once(liquid_density),
    "viscosity-magnitude": once(viscosity_magnitude),
    "mass-against-volume-flow": mass_against_volume_flow,
    "standard-taken-for-actual": standard_taken_for_actual,
    "steam-saturation": once(steam_saturation),
    "zero-flow-row": once_a_row(zero_flow_row),
    "standing-hold": once_a_row(standing_hold),
    "aged-hold": once_a_row(aged_hold),
    "doubled-line-number": once_a_row(doubled_line_number),
    "look-alike-number": once_a_row(look_alike_number),
    "number-against-columns": once_a_row(number_against_columns),
}
