"""One value stated in two units, and numbers that begin with zeros."""

from __future__ import annotations

import pytest
from number_columns import assert_refused, assert_values, context, reading

from checker.intake.number_cells import record_of

AGREE = [
    ("temperature", "50 °C (122 °F)", 323.15), ("temperature", "50 (122 °F)", 323.15),
    ("temperature", "50°C [122°F]", 323.15), ("temperature", "-29 °C (-20 °F)", 244.15),
    ("pressure", "10 barg (145 psig)", 1_100_000.0), ("pressure", "10 barg (11 bara)", 1_100_000.0),
    ("temperature", "50°C/122°F", 323.15), ("temperature", "50 °C = 122 °F", 323.15), ("temperature", "-29 °C / -20 °F", 244.15),
    ("pressure", "5 barg/72.5 psig", 600_000.0), ("flow", "3600 kg/h / 7936.6 lb/h", 1.0), ("pressure", "5 barg/6 bara", 6e5),
    ("pressure", "1 barg (14.5 psig)", 200_000.0), ("flow", "3600 kg/h (7937 lb/h)", 1.0),
]  # fmt: skip
DIFFER = [
    ("temperature", "50 °C (132 °F)"), ("temperature", "50.0 °C (122.9 °F)"), ("temperature", "50 (-122 °F)"),
    ("pressure", "5 barg/80 psig"), ("temperature", "50°C/140°F"), ("flow", "5 kg/h / 13 lb/h"),
    ("pressure", "10 barg (10 bara)"), ("pressure", "10 barg (1450 psig)"), ("flow", "10 kg/h (10 lb/h)"),
]  # fmt: skip


@pytest.mark.parametrize(("column", "cell", "value"), AGREE)
def test_one_value_in_two_units_is_read(column: str, cell: str, value: float) -> None:
    assert_values(reading(column, cell), value)
    assert "stated twice" in record_of(cell, context(column)).remark


@pytest.mark.parametrize(("column", "cell"), DIFFER)
def test_two_values_in_two_units_are_asked(column: str, cell: str) -> None:
    assert_refused(reading(column, cell), cell, "which are not one value")


@pytest.mark.parametrize(
    "cell", ["50 °C (122)", "10 cP (12 cSt)", "50-60 °C (122-140 °F)", "~50 °C (122 °F)", "50 (12"]
)
def test_any_other_number_in_brackets_is_refused(cell: str) -> None:
    column = "viscosity" if "cP" in cell else "temperature"
    assert_refused(reading(column, cell), cell)


@pytest.mark.parametrize("cell", ["000", "007", "00", "05", "-012", "0120 kg/h", "00 to 05"])
def test_a_number_that_begins_with_zeros_is_asked(cell: str) -> None:
    assert_refused(reading("flow", cell), cell, "begins with zeros")


@pytest.mark.parametrize(("cell", "value"), [("0", 0.0), ("0.5", 0.5), ("0.050", 0.05), ("1E05", 1e5), ("100", 100.0)])
def test_a_zero_before_the_mark_is_no_leading_zero(cell: str, value: float) -> None:
    assert_values(reading("elevation", cell), value)


@pytest.mark.parametrize("cell", ["5 barg/7 bar(g)", "5/7 barg", "5 barg / 7"])
def test_two_values_in_one_unit_stay_a_range(cell: str) -> None:
    assert_values(reading("pressure", cell), 6e5, 8e5)
