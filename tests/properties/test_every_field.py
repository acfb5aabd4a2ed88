"""Every field a rule reads, directly or behind it, is a column here: blanking a cell never makes a line meet.

The list is made here (invented), consistent in itself, each duty once within its limits and once well over them.
"""

from __future__ import annotations

import csv
import io
from functools import cache
from pathlib import Path
from typing import Any

import pytest
from example_rows import Outcomes, outcomes_of

import checker
from checker.evaluation import known_fields
from checker.evaluation.dependencies import behind
from checker.fields import all_fields, field_named
from checker.model import Phase
from checker.ruling.catalogue import load_rules

GAUGE = ("pressure",)
CRITERIA = """
[project]
based_on = "default"
[[service]]
name = "test liquid"
matches = ["TEST LIQUID"]
velocity_maximum = { by = "size", bands = [ { up_to = "NPS 4", value = "2 m/s" }, { value = "3 m/s" } ] }
velocity_minimum = "0.5 m/s"
pressure_gradient_maximum = "0.45 bar / 100 m"
source = "test"
basis = "common practice"
[[service]]
name = "test gas"
matches = ["TEST GAS"]
velocity_maximum = "40 m/s"
mach_maximum = 0.2
momentum_flux_maximum = { by = "pressure", bands = [ { up_to = "20 barg", value = "6000 Pa" }, { value = "9000 Pa" } ] }
pressure_gradient_maximum = "0.2 bar / 100 m"
source = "test"
basis = "common practice"
"""
COMMON = {
    "piping_class": "", "case": "minimum", "size": "6", "schedule": "40", "outside_diameter": 168.3,
    "wall_thickness": 7.11, "inside_diameter": 154.08, "material": "carbon steel", "roughness": 0.05, "length": 60,
    "equivalent_length": 75, "fittings": "none", "elevation_change": 1, "pressure_basis": "inlet",
    "pressure_drop_allowed": 0.4, "sand_rate": 0, "pressure": 8, "temperature": 40, "fluid": "test fluid",
    "pressure_design": 14, "temperature_design": 220, "temperature_design_minimum": -10, "pressure_test": 22,
    "design_code": "ASME B31.3", "test_medium": "water", "revision": "B",
}  # fmt: skip
LIQUID = {
    "phase": "liquid", "density": 990, "viscosity": 0.7, "vapour_pressure": 0.07, "npsh_required": 3.0,
    "npsh_required_flow": 500, "source_pressure": 1.5, "static_head": 4,
}  # fmt: skip
GAS = {"phase": "gas", "molar_mass": 28.01, "compressibility": 0.99, "heat_capacity_ratio": 1.4, "viscosity": 0.018}
TWO_PHASE = {
    "phase": "two-phase", "vapour_fraction": 0.2, "vapour_fraction_outlet": "N/A", "liquid_density": 800,
    "liquid_viscosity": 0.5, "vapour_density": 8, "vapour_viscosity": 0.012, "surface_tension": 20,
}  # fmt: skip
DUTIES = {
    "CW": LIQUID | {"service": "TEST LIQUID", "fluid": "cooling water"},
    "SUCTION": LIQUID | {"service": "pump suction"},
    "GAS": GAS | {"service": "TEST GAS"},
    "STEAM": GAS | {"service": "LP steam", "fluid": "steam", "molar_mass": 18.015, "temperature": 190},
    "FLARE": GAS | {"service": "flare header", "case": "relief", "pressure": 0.5, "pressure_basis": "outlet"},
    "MIXED": TWO_PHASE | {"service": "two-phase hydrocarbon"},
}
# P M / (Z R T) of the duty GAS.
DENSITY_OF_GAS = 901325 * 0.02801 / (0.99 * 8.314462618 * 313.15)
# They need one pattern of numbers, two cases of a line, a stated result or an open item: tests/engine.
ELSEWHERE = {
    "stated-values", "number-against-columns", "composite-case", "case-order", "gauge-absolute-by-velocity",
    "aged-hold", "standing-hold",
}  # fmt: skip
FLOWS = {"CW": 120e3, "SUCTION": 40e3, "GAS": 9e3, "STEAM": 5e3, "FLARE": 9e3, "MIXED": 20e3}
OVER = {"CW": 3.0, "SUCTION": 6.0, "GAS": 4.0, "STEAM": 5.0, "FLARE": 20.0, "MIXED": 8.0}


def read_by_rules() -> frozenset[str]:
    """Return every field of a list that some rule, its `applies` or a limit table reads in some phase."""
    names: set[str] = set()
    for rule in load_rules(known_fields=known_fields()):
        for asked in (*rule.parameters, *rule.applies_parameters):
            for phase in Phase:
                names |= behind(asked, phase)
    listed = {name.removesuffix("_listed").removesuffix("_gap") for name in names}
    return frozenset(field.name for field in all_fields() if field.name in listed | {"size", "pressure", "case"})


COLUMNS = tuple(field.name for field in all_fields() if field.name in read_by_rules() | {"line_number"})


def header() -> list[str]:
    units = {name: "barg" if name in GAUGE else field_named(name).unit for name in COLUMNS}
    return [f"{name} [{unit}]" if unit not in ("", "-") else name for name, unit in units.items()]


def rows() -> list[dict[str, Any]]:
    made = []
    for name, duty in DUTIES.items():
        for factor, suffix in ((1.0, "A"), (OVER[name], "B")):
            row: dict[str, Any] = COMMON | duty | {"line_number": f"{name}-{suffix}"}
            flow = FLOWS[name] * factor
            row |= {"flow_mass": flow}
            if row["phase"] == "liquid":
                row |= {"flow_volume": flow / float(row["density"])}
            if name == "GAS":
                row |= {"flow_volume": flow / DENSITY_OF_GAS}
            # Fittings as an equivalent length or as a cell: two ways of saying one thing, never both here.
            row |= {"fittings": ""} if name in ("CW", "GAS", "FLARE") else {"equivalent_length": ""}
            if name == "CW" and suffix == "B":
                row |= {"size": "4", "outside_diameter": 114.3, "wall_thickness": 6.02, "inside_diameter": 102.26}
            made.append(row)
    return made


def outcomes(folder: Path, made: list[dict[str, Any]]) -> Outcomes:
    text = io.StringIO(newline="")
    writer = csv.writer(text)
    writer.writerow(header())
    writer.writerows([str(row.get(name, "")) for name in COLUMNS] for row in made)
    (folder / "list.csv").write_text(text.getvalue(), encoding="utf-8")
    (folder / "criteria.toml").write_text(CRITERIA, encoding="utf-8")
    return outcomes_of(checker.review(folder / "list.csv", criteria=folder / "criteria.toml"))


@cache
def base(folder: Path) -> Outcomes:
    return outcomes(folder, rows())


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return tmp_path_factory.mktemp("every_field")


def test_the_list_has_every_rule_judged_and_lines_on_both_sides(folder: Path) -> None:
    words = base(folder)
    assert {rule for (_, _, rule), word in words.items() if word != "not applicable"} >= {
        rule.id for rule in load_rules(known_fields=known_fields())
    } - ELSEWHERE
    assert sum(word == "meets" for word in words.values()) > 25
    assert sum(word == "does not meet" for word in words.values()) > 12


@pytest.mark.parametrize("filling", ["", "HOLD", "abc", "?"])
@pytest.mark.parametrize("column", [name for name in COLUMNS if name != "line_number"])
def test_spoiling_a_cell_never_makes_a_line_meet(folder: Path, column: str, filling: str) -> None:
    words = base(folder)
    made = rows()
    for row in made:
        row[column] = filling
    after = outcomes(folder, made)
    lines = {key[0] for key in words}
    assert {key[0] for key in after} == lines
    # A case cell that is blank or open changes the case's name, not the line or the rule.
    before = {(line, rule): word for (line, _, rule), word in words.items()}
    newly = {key: before[key[0], key[2]] for key, word in after.items() if word == "meets" != before[key[0], key[2]]}
    assert newly == {}
