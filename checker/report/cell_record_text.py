"""One number cell in full, in words: the numbers read, their unit, and what they are in SI."""

from __future__ import annotations

from collections.abc import Iterable

from checker.fields import field_named
from checker.model import CellRecord
from checker.shown import si_unit_of

__all__ = ["read_as", "si_text"]

NO_UNIT = ("", "-")


def read_as(record: CellRecord | None, field: str) -> str:
    """Return the numbers and the unit read from a cell, and the SI values: ``50 m3/h = 0.0138889 m3/s``.

    Empty where the cell holds no number.
    """
    if record is None or not record.numbers:
        return ""
    unit = "" if record.unit in NO_UNIT else f" {record.unit}"
    read = f"{_together(f'{number:.12g}' for number in record.numbers)}{unit}"
    values = si_text(record.values, field)
    return f"{read} = {values}" if values and values != read else read


def si_text(values: Iterable[float], field: str) -> str:
    """Return the SI values of a field with their unit, six figures; empty where there are none."""
    unit = si_unit_of(field)
    if field_named(field).dimension == "pressure":
        unit = "Pa absolute"
    shown = _together(f"{value:.6g}" for value in values)
    return f"{shown} {unit}" if shown and unit not in NO_UNIT else shown


def _together(texts: Iterable[str]) -> str:
    return " and ".join(texts)
