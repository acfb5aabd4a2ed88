"""Blank files to begin from."""

from __future__ import annotations

import csv
import io
from collections.abc import Iterable
from importlib.resources import files
from pathlib import Path

from checker.deviations import COLUMNS
from checker.fields import Field, all_fields
from checker.intake.equipment_fields import equipment_fields
from checker.report.atomic import write_files
from checker.report.blank_workbook import blank_workbook
from checker.report.field_texts import header_of

__all__ = ["write_templates"]

LIST_NAME, WORKBOOK_NAME = "line_list.csv", "line_list.xlsx"
CRITERIA_NAME, CLASSES_NAME = "criteria.toml", "classes.csv"
EQUIPMENT_NAME, DEVIATIONS_NAME = "equipment.csv", "deviations.csv"
_LEFT_OUT = (
    "flow_volume", "flow_standard", "outside_diameter", "wall_thickness", "inside_diameter", "roughness",
    "vapour_fraction_outlet", "sand_rate", "velocity_stated", "pressure_drop_stated", "pressure_gradient_stated",
    "velocity_allowed", "closure_time", "equivalent_length", "stream", "allowable_stress", "fluid_group",
)  # fmt: skip


def blank_fields() -> tuple[Field, ...]:
    """Return the fields that the rules need, one row a line and case.

    Columns that a list need not have are left out: a column with a blank cell asks for that value.
    """
    return tuple(field for field in all_fields() if field.name not in _LEFT_OUT)


def _csv(rows: Iterable[Iterable[str]]) -> str:
    text = io.StringIO(newline="")
    csv.writer(text, lineterminator="\r\n").writerows(rows)
    return text.getvalue()


def blank_list() -> str:
    """Return a header row with the unit of each field."""
    return _csv([[header_of(field) for field in blank_fields()]])


def blank_equipment() -> str:
    """Return the header row of an equipment list, and two rows as an example."""
    columns = equipment_fields()
    examples = zip(*(column.examples for column in columns), strict=True)
    return _csv([[header_of(column.field) for column in columns], *examples])


def write_templates(folder: Path) -> list[str]:
    """Write the blank files into a folder; files that are there already are left alone.

    Returns
    -------
    list of str
        One sentence a file.
    """
    criteria = files("checker.criteria")
    contents = {
        LIST_NAME: blank_list().encode(),
        WORKBOOK_NAME: blank_workbook(blank_fields()),
        CRITERIA_NAME: criteria.joinpath("template.toml").read_bytes(),
        CLASSES_NAME: criteria.joinpath("template_classes.csv").read_bytes(),
        EQUIPMENT_NAME: blank_equipment().encode(),
        DEVIATIONS_NAME: _csv([COLUMNS]).encode(),
    }
    new = {name: content for name, content in contents.items() if not (folder / name).exists()}
    if new:
        write_files(folder, new)
    return [f"{folder / name}: {'written' if name in new else 'was there already, left as it is'}" for name in contents]
