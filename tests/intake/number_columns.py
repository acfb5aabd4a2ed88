"""Columns of numbers for the tests of single cells, and what a cell in one of them becomes."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest

from checker.fields import field_named
from checker.intake.number_cells import CellReading, NumberContext, read_number_cell
from checker.model import Gap
from checker.units import read_unit

ATMOSPHERE = 100_000.0
AMBIENT = (263.15, 313.15)
COLUMNS = {
    "temperature": ("temperature", "temperature", "degC"),
    "design temperature": ("temperature_design", "temperature", "degC"),
    "lowest design temperature": ("temperature_design_minimum", "temperature", "degC"),
    "pressure": ("pressure", "pressure", "barg"),
    "design pressure": ("pressure_design", "pressure", "barg"),
    "flow": ("flow_mass", "mass flow", "kg/h"),
    "volume flow": ("flow_volume", "volume flow", "m3/h"),
    "density": ("density", "density", "kg/m3"),
    "viscosity": ("viscosity", "viscosity", "cP"),
    "molar mass": ("molar_mass", "molar mass", "kg/kmol"),
    "elevation": ("elevation_change", "length", "m"),
    "closure time": ("closure_time", "time", "s"),
    "gradient": ("pressure_gradient_stated", "pressure gradient", "bar/100m"),
    "compressibility": ("compressibility", "dimensionless", "-"),
}


def context(column: str, *, delimiter: str = ",", comma: bool = False, **changes: object) -> NumberContext:
    """Return what a column says of its cells."""
    name, dimension, spelling = COLUMNS[column]
    made = NumberContext(
        field_named(name), read_unit(spelling, dimension), "no unit", ATMOSPHERE, delimiter, comma, AMBIENT
    )
    return replace(made, **changes)


def reading(column: str, cell: str, **changes: object) -> CellReading:
    """Return what a cell becomes."""
    return read_number_cell(cell, context(column, **changes))


def assert_values(found: CellReading, *values: float) -> None:
    """Assert that a cell gives one SI value, or the two ends of a range."""
    assert found.gap is Gap.GIVEN, found.reason
    assert found.value == pytest.approx(values[0], rel=1e-12)
    if len(values) > 1:
        assert found.high == pytest.approx(values[1], rel=1e-12)
    else:
        assert math.isnan(found.high)


def assert_refused(found: CellReading, cell: str, *words: str) -> None:
    """Assert that a cell is refused in a sentence that shows it and says the words."""
    assert found.gap is Gap.REFUSED, found
    assert math.isnan(found.value)
    assert math.isnan(found.high)
    assert found.reason.startswith(f"'{cell[:20]}")
    assert found.reason.endswith((".", "?"))
    assert len(found.reason) < 200 + len(cell)
    for word in words:
        assert word in found.reason
