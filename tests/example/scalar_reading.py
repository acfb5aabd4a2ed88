"""Reads the example list, its criteria and its class file by hand, for the scalar check."""

from __future__ import annotations

import csv
import fnmatch
import math
import re
import tomllib
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from scalar_tables import (
    COLUMNS,
    FITTING_N,
    OUTSIDE_DIAMETER_MM,
    PHASES,
    STAINLESS_OUTSIDE_DIAMETER_MM,
    UNITS,
    WALL_MM,
)

CASES = ("minimum", "normal", "maximum")
ZERO = ("NNF", "ATM")
AMBIENT = "AMB"
NOT_APPLICABLE = ("N/A", "none")
OPEN = ("HOLD", "TBC")
LIMITS = (
    "velocity_maximum", "velocity_minimum", "pressure_gradient_maximum", "momentum_flux_maximum", "mach_maximum",
    "erosional_constant", "npsh_margin_minimum", "npsh_ratio_minimum",
)  # fmt: skip


@dataclass(frozen=True)
class Service:
    """One row of the criteria, its limits in SI for one size and one pressure."""

    name: str
    steam: bool
    pump_suction: bool
    limits: dict[str, float]


@dataclass(frozen=True)
class Line:
    """One row of the list in SI; NaN where the cell is blank or open."""

    number: str
    phase: str
    basis: str
    service: Service | None
    values: dict[str, float]
    held: frozenset[str]
    not_set: frozenset[str]
    fittings_n: float
    entrances: int
    row: dict[str, str]
    atmosphere: float
    end: str
    others: tuple[str, ...]
    schedule: str
    wall_exists: bool
    bore: float
    roughness: float
    flow: dict[str, float] = field(default_factory=dict)

    def __getitem__(self, name: str) -> float:
        return self.values[name]


def size(text: str) -> float:
    """1-1/2\", NPS 3/4 and the like, as a number of inches."""
    whole, _, part = text.replace("NPS", "").strip().rstrip('"').rpartition("-")
    top, _, bottom = part.partition("/")
    return (float(whole) if whole else 0.0) + float(top) / float(bottom or 1)


def quantity(text: float | str) -> float:
    """A criteria value in SI: `0.45 bar / 100 m`, or a plain number."""
    if not isinstance(text, str):
        return float(text)
    number, _, unit = text.partition(" ")
    return float(number) * UNITS[unit.replace(" / ", "/")]


def banded(limit: Any, nps: float, pressure: float, atmosphere: float) -> float:
    """The value of a limit for one size or operating pressure; a band ends at its `up_to`, which it includes."""
    if not isinstance(limit, dict):
        return quantity(limit)
    for band in limit["bands"]:
        if "up_to" not in band:
            return quantity(band["value"])
        if limit["by"] == "size" and nps <= size(band["up_to"]):
            return quantity(band["value"])
        if limit["by"] == "pressure" and pressure <= quantity(band["up_to"]) + atmosphere:
            return quantity(band["value"])
    return math.nan


def find_service(criteria: dict[str, Any], text: str, nps: float, pressure: float, atmosphere: float) -> Service | None:
    """The criteria row whose `matches` fit the list's service cell; None for a blank cell."""
    for row in criteria["service"]:
        if any(fnmatch.fnmatch(text.lower(), pattern.lower()) for pattern in row["matches"]):
            limits = {key: banded(row[key], nps, pressure, atmosphere) for key in LIMITS if key in row}
            return Service(row["name"], row.get("steam", False), row.get("pump_suction", False), limits)
    if text:
        raise KeyError(text)
    return None


def number(text: str) -> float:
    """A cell's number: no flow and atmospheric gauge pressure are zero; an ambient temperature is a range.

    Of a design pressure such as 3.5/FV the first is the design pressure; full vacuum is the other side.
    """
    text = text.removesuffix("/FV")
    if text in ZERO:
        return 0.0
    return math.nan if text in ("", AMBIENT, *OPEN, *NOT_APPLICABLE) else float(text)


def fittings(text: str) -> tuple[float, int]:
    """Sum of n of the cell's fittings, and its entrances; NaN for a cell that says nothing."""
    if text in ("", *OPEN):
        return math.nan, 0
    total, entrances = 0.0, 0
    for part in [] if text == "none" else text.split(";"):
        match = re.fullmatch(r"(\d+) x (.+)", part.strip())
        assert match, text
        if match[2] == "entrance":
            entrances += int(match[1])
        else:
            total += int(match[1]) * FITTING_N[match[2]]
    return total, entrances


def wall(classes: list[dict[str, str]], name: str, nps: float) -> tuple[str, bool, float, float]:
    """Schedule, whether the standard has it, bore and roughness of one size in one class."""
    for row in classes:
        if row["piping_class"] == name and size(row["size_from"]) <= nps <= size(row["size_to"]):
            schedule = row["schedule"]
            if schedule:
                thickness = WALL_MM[schedule].get(nps, math.nan)
            else:
                thickness = float(row["wall_thickness [mm]"])
            diameters = STAINLESS_OUTSIDE_DIAMETER_MM if schedule.endswith("S") else OUTSIDE_DIAMETER_MM
            bore = (diameters[nps] - 2 * thickness) / 1000
            return schedule, not math.isnan(thickness), bore, float(row["roughness [mm]"]) / 1000
    raise KeyError(f"{name} {nps}")


def ends(row: dict[str, str], criteria: dict[str, Any]) -> list[tuple[str, float]]:
    """Both ends of the site's ambient range where the temperature says AMB, each a case of its own; else none."""
    if row["Oper. Temp. [°C]"] != AMBIENT:
        return [("", math.nan)]
    site = criteria["site"]
    pairs = (("low", site["ambient_minimum"]), ("high", site["ambient_maximum"]))
    return [(f", with {word} temperature", float(text.removesuffix(" degC"))) for word, text in pairs]


def read_line(
    row: dict[str, str],
    criteria: dict[str, Any],
    classes: list[dict[str, str]],
    others: list[str],
    end: str,
    ambient: float,
) -> Line:
    atmosphere = quantity(criteria["site"]["atmospheric_pressure"])
    values = {name: number(row[header]) * factor for header, (name, factor) in COLUMNS.items()}
    values["pressure"] += atmosphere
    if end:
        values["temperature"] = ambient
    nps = size(row["Size (NPS)"])
    fittings_n, entrances = fittings(row["Fittings"])
    schedule, exists, bore, roughness = wall(classes, row["Piping Class"], nps)
    return Line(
        number=row["Line No."],
        phase=PHASES[row["Phase"]],
        basis=row["Press. Basis"],
        service=find_service(criteria, row["Service"], nps, values["pressure"], atmosphere),
        values=values,
        held=frozenset(name for header, (name, _) in COLUMNS.items() if row[header] in OPEN),
        not_set=frozenset(name for header, (name, _) in COLUMNS.items() if row[header] in NOT_APPLICABLE),
        fittings_n=fittings_n,
        entrances=entrances,
        row=row,
        atmosphere=atmosphere,
        end=end,
        others=tuple(others),
        schedule=schedule,
        wall_exists=exists,
        bore=bore,
        roughness=roughness,
        flow={case: values[f"flow_{case}"] for case in CASES},
    )


def read(list_path: Path, criteria_path: Path, classes_path: Path) -> tuple[list[Line], float]:
    """Every line of the list (each end of a range as one of its own), and the tolerance on stated values."""
    criteria = tomllib.loads(criteria_path.read_text(encoding="utf-8"))
    with classes_path.open(encoding="utf-8", newline="") as stream:
        classes = list(csv.DictReader(stream))
    with list_path.open(encoding="utf-8", newline="") as stream:
        rows = list(csv.DictReader(stream))
    lines = []
    for row in rows:
        others = [other["Line No."] for other in rows if other is not row]
        lines += [read_line(row, criteria, classes, others, *end) for end in ends(row, criteria)]
    return lines, float(criteria.get("defaults", {}).get("stated_values_tolerance", 0.10))
