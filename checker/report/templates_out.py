"""Blank files to begin from."""

from __future__ import annotations

import csv
import io
from importlib.resources import files
from pathlib import Path

from checker.deviations import COLUMNS
from checker.fields import all_fields
from checker.report.atomic import write_files

__all__ = ["write_templates"]

LIST_NAME, CRITERIA_NAME, CLASSES_NAME, DEVIATIONS_NAME = (
    "line_list.csv",
    "criteria.toml",
    "classes.csv",
    "deviations.csv",
)
_GAUGE = ("pressure", "pressure_design", "pressure_test")
_LEFT_OUT = (
    "flow_volume", "flow_standard", "outside_diameter", "wall_thickness", "inside_diameter", "schedule", "roughness",
    "vapour_fraction_outlet", "sand_rate", "velocity_stated", "pressure_drop_stated", "pressure_gradient_stated",
    "velocity_allowed", "closure_time", "equivalent_length", "stream", "allowable_stress", "fluid_group",
)  # fmt: skip


def _header(name: str, unit: str) -> str:
    return f"{name} [{unit}]" if unit and unit != "-" else name


def blank_list() -> str:
    """Return a header row of the fields that the rules need, one row a line and case, with their units.

    Columns that a list need not have are left out: a column with a blank cell asks for that value.
    """
    fields = [field for field in all_fields() if field.name not in _LEFT_OUT]
    header = [_header(field.name, "barg" if field.name in _GAUGE else field.unit) for field in fields]
    text = io.StringIO(newline="")
    csv.writer(text, lineterminator="\r\n").writerow(header)
    return text.getvalue()


def write_templates(folder: Path) -> list[str]:
    """Write the blank files into a folder; files that are there already are left alone.

    Returns
    -------
    list of str
        One sentence a file.
    """
    criteria = files("checker.criteria")
    contents = {
        LIST_NAME: blank_list(),
        CRITERIA_NAME: criteria.joinpath("template.toml").read_text(encoding="utf-8"),
        CLASSES_NAME: criteria.joinpath("template_classes.csv").read_text(encoding="utf-8"),
        DEVIATIONS_NAME: ",".join(COLUMNS) + "\r\n",
    }
    new = {name: text.encode() for name, text in contents.items() if not (folder / name).exists()}
    if new:
        write_files(folder, new)
    return [f"{folder / name}: {'written' if name in new else 'was there already, left as it is'}" for name in contents]
