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
_WRITTEN_UNITS = {"pressure": "barg", "NPS": "NPS"}
_CASES = ("min", "norm", "max")
_PER_CASE = ("flow_mass",)


def _header(name: str, unit: str) -> str:
    return f"{name} [{unit}]" if unit and unit != "-" else name


def blank_list() -> str:
    """Return a header row with every field and its unit, the mass flow in three cases."""
    header: list[str] = []
    for field in all_fields():
        if field.name in ("case", "flow_volume", "flow_standard"):
            continue
        unit = _WRITTEN_UNITS.get(field.dimension, field.unit)
        cases = [f"{field.name} {case}" for case in _CASES] if field.name in _PER_CASE else [field.name]
        header += [_header(name, unit) for name in cases]
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
