"""Expected outcomes of the Marrowquay list, by plain loops over lines, cases and rules.

Run as `python tests/example/scalar_check.py` it prints how many line cases have each outcome under each rule.
It imports nothing of the checker. The deliberate faults of the list stand in `deliberate_faults.csv` beside it.
"""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path

from scalar_data import DATA_RULES, FAILS, MEETS, NONE, NOT_APPLICABLE, NOT_CHECKED, Outcome
from scalar_hydraulics import GRAVITY, ChokedError, Mixture, Pipe, Result, gas, gas_inlet_only, liquid, two_phase
from scalar_reading import CASES, Line, read

GAS_CONSTANT = 8.314462618
ASSUMED_Z_UP_TO = 10e5
GAS_DENSITY_AGREEMENT = 0.05
FLOW_AGREEMENT = 0.02

Key = tuple[str, str, str]

EXAMPLE = Path(__file__).resolve().parents[2] / "example_linelists"
LIST, CRITERIA, CLASSES = EXAMPLE / "marrowquay_rev_a.csv", EXAMPLE / "criteria.toml", EXAMPLE / "classes.csv"


@dataclass(frozen=True)
class LineCase:
    """One line in one case, with its hydraulics."""

    line: Line
    case: str
    flow: float
    result: Result
    z_assumed: bool
    tolerance: float

    @property
    def flows(self) -> bool:
        return self.flow != 0

    def limit(self, name: str) -> float:
        return math.nan if self.line.service is None else self.line.service.limits.get(name, math.nan)

    def has_limit(self, name: str) -> bool:
        """True too where the service is not known, so that the outcome is `not checked`."""
        return self.line.service is None or name in self.line.service.limits


def gas_density(line: Line) -> tuple[float, bool]:
    """Density of a gas, from the list or from P M / (Z R T), and whether Z = 1 was assumed."""
    if line.held & {"density", "molar_mass", "compressibility", "temperature", "pressure"}:
        return math.nan, False
    z, assumed = line["compressibility"], False
    if math.isnan(z) and line["pressure"] < ASSUMED_Z_UP_TO:
        z, assumed = 1.0, True
    temperature = line["temperature"] + 273.15
    computed = line["pressure"] * line["molar_mass"] / (z * GAS_CONSTANT * temperature)
    listed = line["density"]
    if math.isnan(listed):
        return computed, assumed
    if not assumed and abs(listed - computed) > GAS_DENSITY_AGREEMENT * computed:
        return math.nan, False
    return listed, False


def make_pipe(line: Line) -> Pipe:
    """The route; a total equivalent length holds the fittings' part, else the cell of fittings does."""
    extra, n = line["equivalent_length"] - line["length"], line.fittings_n
    if not math.isnan(extra):
        n = 0.0 if math.isnan(n) else n
    elif not math.isnan(n):
        extra = 0.0
    return Pipe(line.bore, line.roughness, line["length"], extra, n, line.entrances, line["elevation_change"])


def hydraulics(line: Line, flow: float) -> tuple[Result, bool]:
    """Result of one line case; empty where a needed value is missing, and whether Z = 1 was assumed."""
    pipe = make_pipe(line)
    if line.phase == "liquid":
        return liquid(pipe, flow, line["density"], line["viscosity"]), False
    if line.phase == "gas":
        return gas_result(line, pipe, flow)
    mixture = Mixture(
        flow, *(line[name] for name in ("vapour_fraction", "liquid_density", "liquid_viscosity", "vapour_density",
                                        "vapour_viscosity", "surface_tension", "pressure"))
    )  # fmt: skip
    known = [flow, line.bore, pipe.fittings_length, pipe.elevation_change, *vars(mixture).values()]
    if any(math.isnan(value) for value in known) or not line.basis:
        return Result(), False
    try:
        return two_phase(pipe, mixture, line.basis), False
    except ChokedError:
        return Result(), False


def gas_result(line: Line, pipe: Pipe, flow: float) -> tuple[Result, bool]:
    density, assumed = gas_density(line)
    k = 1.0 if math.isnan(line["heat_capacity_ratio"]) else line["heat_capacity_ratio"]
    if any(math.isnan(value) for value in (flow, density, line.bore, line["viscosity"])) or not line.basis:
        return Result(), assumed
    route = (pipe.length, pipe.fittings_length, pipe.elevation_change)
    if any(math.isnan(value) for value in route):
        if line.basis == "outlet":
            return Result(), assumed
        return gas_inlet_only(pipe, flow, density, line["viscosity"], k, line["pressure"]), assumed
    try:
        return gas(pipe, flow, density, line["viscosity"], line["pressure"], line.basis, k), assumed
    except ChokedError:
        return Result(), assumed


def at_most(value: float, limit: float) -> Outcome:
    if not (math.isfinite(value) and math.isfinite(limit)):
        return NOT_CHECKED, value, limit
    return (MEETS if value <= limit * (1 + 1e-9) else FAILS), value, limit


def at_least(value: float, limit: float) -> Outcome:
    if not (math.isfinite(value) and math.isfinite(limit)):
        return NOT_CHECKED, value, limit
    return (MEETS if value >= limit * (1 - 1e-9) else FAILS), value, limit


def worst_end(inlet: float, outlet: float, limit: float) -> Outcome:
    """The greater of both ends; one end alone can only show that the limit is not met."""
    if math.isfinite(inlet) and math.isfinite(outlet):
        return at_most(max(inlet, outlet), limit)
    known = [value for value in (inlet, outlet) if math.isfinite(value)]
    if known and at_most(known[0], limit)[0] == FAILS:
        return FAILS, known[0], limit
    return NOT_CHECKED, math.nan, limit


def velocity_rule(phase: str, steam: bool) -> Callable[[LineCase], Outcome]:
    def judge(case: LineCase) -> Outcome:
        service = case.line.service
        if case.line.phase != phase or not case.flows:
            return NONE
        if phase == "gas" and service is not None and service.steam != steam:
            return NONE
        return worst_end(case.result.velocity_inlet, case.result.velocity_outlet, case.limit("velocity_maximum"))

    return judge


def minimum_velocity(case: LineCase) -> Outcome:
    if case.case != "minimum" or not case.flows or not case.has_limit("velocity_minimum"):
        return NONE
    return at_least(case.result.velocity_inlet, case.limit("velocity_minimum"))


def erosional_velocity(case: LineCase) -> Outcome:
    if case.line.phase != "two-phase" or not case.flows:
        return NONE
    density = min(case.result.density_inlet, case.result.density_outlet)
    velocity = max(case.result.velocity_inlet, case.result.velocity_outlet)
    return at_most(velocity, case.limit("erosional_constant") / math.sqrt(density))


def momentum_flux(case: LineCase) -> Outcome:
    if case.line.phase == "liquid" or not case.flows:
        return NONE
    result = case.result
    inlet = result.density_inlet * result.velocity_inlet**2
    outlet = result.density_outlet * result.velocity_outlet**2
    return worst_end(inlet, outlet, case.limit("momentum_flux_maximum"))


def pressure_gradient(case: LineCase) -> Outcome:
    if not case.flows or not case.has_limit("pressure_gradient_maximum"):
        return NONE
    return at_most(case.result.pressure_gradient, case.limit("pressure_gradient_maximum"))


def pressure_budget(case: LineCase) -> Outcome:
    if not case.flows or "pressure_drop_allowed" in case.line.not_set:
        return NONE
    return at_most(case.result.dp_without_static, case.line["pressure_drop_allowed"])


def npsh_margin(case: LineCase) -> Outcome:
    line, service = case.line, case.line.service
    given = not math.isnan(line["npsh_required"])
    if not case.flows or not (given or service is None or service.pump_suction):
        return NONE
    weight = line["density"] * GRAVITY
    required, margin, ratio = (
        line["npsh_required"], case.limit("npsh_margin_minimum"), case.limit("npsh_ratio_minimum"),
    )  # fmt: skip
    head = (line["source_pressure"] - line["vapour_pressure"]) / weight + line["static_head"]
    available = head - case.result.dp_friction_and_fittings / weight
    limit = max(ratio * required, required + margin)
    if not case.flow / line["density"] <= line["npsh_required_flow"]:
        return NOT_CHECKED, available, limit
    return at_least(available, limit)


def mach_number(case: LineCase) -> Outcome:
    if case.line.phase != "gas" or not case.flows:
        return NONE
    return worst_end(case.result.mach_inlet, case.result.mach_outlet, case.limit("mach_maximum"))


def stated_values(case: LineCase) -> Outcome:
    """The normal case alone: velocity at the stated pressure, and the loss without static head."""
    if case.case != "normal" or not case.flows:
        return NONE
    pairs = (
        (case.line["velocity_stated"], case.result.velocity_stated_end),
        (case.line["pressure_drop_stated"], case.result.dp_without_static),
    )
    differences = [abs(stated - computed) / computed for stated, computed in pairs]
    if case.z_assumed or not all(math.isfinite(difference) for difference in differences):
        return NOT_CHECKED, math.nan, case.tolerance
    return at_most(max(differences), case.tolerance)


def schedule_exists(case: LineCase) -> Outcome:
    if not case.line.schedule:
        return NONE
    return (MEETS if case.line.wall_exists else FAILS), math.nan, math.nan


def phase_change(case: LineCase) -> Outcome:
    if case.line.phase != "liquid":
        return NONE
    line = case.line
    if not line.basis:
        return NOT_CHECKED, line["vapour_pressure"], math.nan
    pipe = make_pipe(line)
    known = pipe.bore + pipe.roughness + pipe.length + pipe.fittings_length + line["viscosity"]
    losses = case.result.dp_without_static if case.flows else 0.0 * known
    fall = losses + line["density"] * GRAVITY * line["elevation_change"]
    other_end = line["pressure"] - fall if line.basis == "inlet" else line["pressure"] + fall
    lowest = min(line["pressure"], other_end) if other_end > 0 else math.nan
    return at_most(line["vapour_pressure"], lowest)


RULES: dict[str, Callable[[LineCase], Outcome]] = {
    "liquid-velocity": velocity_rule("liquid", steam=False),
    "gas-velocity": velocity_rule("gas", steam=False),
    "steam-velocity": velocity_rule("gas", steam=True),
    "two-phase-velocity": velocity_rule("two-phase", steam=False),
    "minimum-velocity": minimum_velocity,
    "erosional-velocity": erosional_velocity,
    "momentum-flux": momentum_flux,
    "pressure-gradient": pressure_gradient,
    "pressure-budget": pressure_budget,
    "npsh-margin": npsh_margin,
    "mach-number": mach_number,
    "stated-values": stated_values,
    "schedule-exists": schedule_exists,
    "phase-change": phase_change,
    **DATA_RULES,
}


def stated_flow(line: Line, case: str) -> float:
    """The mass flow of a case; NaN where a volume flow beside it says another."""
    mass, volume = line.flow[case], line["volume_flow_normal"]
    density = gas_density(line)[0] if line.phase == "gas" else line["density"]
    flows = (mass, volume * density)
    if case == "normal" and all(math.isfinite(flow) for flow in flows):
        if abs(flows[0] - flows[1]) > FLOW_AGREEMENT * max(flows):
            return math.nan
    return mass


def line_cases(list_path: Path, criteria_path: Path, classes_path: Path) -> list[LineCase]:
    lines, tolerance = read(list_path, criteria_path, classes_path)
    cases = []
    for line in lines:
        for case in CASES:
            flow = stated_flow(line, case)
            result, assumed = hydraulics(line, flow) if flow != 0 else (Result(), False)
            cases.append(LineCase(line, case, flow, result, assumed, tolerance))
    return cases


def expected(list_path: Path, criteria_path: Path, classes_path: Path) -> dict[Key, Outcome]:
    """Outcome, value and limit (SI) by line number, case and rule."""
    outcomes = {}
    for case in line_cases(list_path, criteria_path, classes_path):
        for rule, judge in RULES.items():
            outcomes[case.line.number, case.case + case.line.end, rule] = judge(case)
    return outcomes


def main() -> None:
    outcomes = expected(LIST, CRITERIA, CLASSES)
    counts = Counter((rule, outcome) for (_, _, rule), (outcome, _, _) in outcomes.items())
    states = (MEETS, FAILS, NOT_CHECKED, NOT_APPLICABLE)
    print(f"{'rule':22}" + "".join(f"{state:>16}" for state in states))
    for rule in RULES:
        print(f"{rule:22}" + "".join(f"{counts[rule, state]:16d}" for state in states))
    total = [sum(counts[rule, state] for rule in RULES) for state in states]
    print(f"{'all rules':22}" + "".join(f"{count:16d}" for count in total))
    print(f"checked: {100 * (total[0] + total[1]) / sum(total[:3]):.1f} % of what is applicable")
    failing = {line for (line, _, _), (outcome, _, _) in outcomes.items() if outcome == FAILS}
    print(f"lines: {len({line for line, _, _ in outcomes})}, of which {len(failing)} do not meet something")


if __name__ == "__main__":
    main()
