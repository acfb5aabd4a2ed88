"""Quantities of a criteria file: a text with its unit becomes SI, or a sentence says why it cannot."""

from __future__ import annotations

import math
from collections.abc import Sequence
from functools import lru_cache

from checker.criteria.nominal_size import read_nominal_size
from checker.criteria.places import PathPart, ProblemList, shown
from checker.units import STANDARD_ATMOSPHERE, UnitRefusedError, dimensions_knowing, read_quantity, read_unit

__all__ = ["EXAMPLES", "LARGEST_ROUGHNESS", "read_atmosphere", "read_number", "read_size", "read_value"]

LONGEST_QUANTITY = 80
LARGEST_ROUGHNESS = 0.1
LOWEST_ATMOSPHERE, HIGHEST_ATMOSPHERE = 20_000.0, 120_000.0
EXAMPLES = {
    "velocity": "3.0 m/s",
    "pressure gradient": "0.45 bar / 100 m",
    "momentum flux": "6000 kg/m/s2",
    "dimensionless": "0.3",
    "erosional constant": "122 SI",
    "length": "0.6 m",
    "diameter": "0.05 mm",
    "pressure": "20 barg",
    "temperature": "32 degC",
    "pressure difference": "1.01325 bar",
}


@lru_cache(maxsize=1024)
def _read_once(text: str, dimension: str, atmosphere: float) -> float:
    """Read a quantity; the same few texts stand in many services."""
    return read_quantity(text, dimension, atmosphere=atmosphere)


def _unit_of(text: str) -> str:
    return text.strip().lstrip("+-0123456789.").strip()


def _other_dimension(text: str, dimension: str) -> str:
    """Return the dimension to which the unit of a text does belong; empty where it belongs to this one or to none."""
    known = dimensions_knowing(_unit_of(text)) if len(text) <= LONGEST_QUANTITY else ()
    return "" if dimension in known or not known else known[0]


def read_number(value: float, path: Sequence[PathPart], problems: ProblemList) -> float:
    """Return a plain number as a float; NaN, and a sentence, where it is not finite."""
    try:
        number = float(value)
    except OverflowError:
        number = math.inf
    if not math.isfinite(number):
        problems.add(path, f"{shown(value)} is not a finite number.", "Write a finite number.")
        return math.nan
    return number


def read_value(
    value: str | float,
    dimension: str,
    path: Sequence[PathPart],
    problems: ProblemList,
    *,
    atmosphere: float = STANDARD_ATMOSPHERE,
) -> float:
    """Return the SI value of a quantity; NaN, and a sentence, where it cannot be read.

    A plain number is taken for the dimensionless keys and, as SI, for the erosional constant; else it has no unit.
    """
    example = f'Write a {dimension} such as "{EXAMPLES[dimension]}".'
    if not isinstance(value, str):
        if dimension in ("dimensionless", "erosional constant"):
            return read_number(value, path, problems)
        problems.add(path, f"{shown(value)} has no unit.", example)
        return math.nan
    try:
        return _read_once(value, dimension, atmosphere)
    except UnitRefusedError as error:
        other = _other_dimension(value, dimension)
        problems.add(path, f"{shown(value)} is a {other}, not a {dimension}." if other else str(error), example)
        return math.nan


def read_size(text: str, path: Sequence[PathPart], problems: ProblemList) -> float:
    """Return the NPS of a size; NaN, and a sentence, where it is no nominal size."""
    size = read_nominal_size(text)
    if math.isnan(size):
        problems.add(path, f"{shown(text)} is not a nominal size of ASME B36.10M.", 'Write "NPS 2" or "DN 50".')
    return size


def _pressure_reference(text: str) -> str:
    """Return what a pressure's unit says: ``gauge``, ``absolute``, or empty where it says neither."""
    try:
        return read_unit(_unit_of(text), "pressure").reference
    except UnitRefusedError:
        return ""


def read_atmosphere(text: str, path: Sequence[PathPart], problems: ProblemList) -> float:
    """Return the site's atmospheric pressure, Pa; NaN, and a sentence, where it is none.

    ``bar`` and ``bara`` both mean the absolute pressure here: an atmosphere is never gauge.
    """
    example = 'Write an absolute pressure such as "1.01325 bar".'
    reference = _pressure_reference(text)
    if reference == "gauge":
        problems.add(path, f"{shown(text)} is a gauge pressure, which rests on the atmosphere itself.", example)
        return math.nan
    value = read_value(text, "pressure" if reference else "pressure difference", path, problems)
    if math.isfinite(value) and not LOWEST_ATMOSPHERE <= value <= HIGHEST_ATMOSPHERE:
        problems.add(path, f"{shown(text)} is no atmospheric pressure on land.", example)
        return math.nan
    return value
