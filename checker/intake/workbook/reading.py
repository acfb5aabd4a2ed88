"""`read_sheet`: the one sheet of a workbook that holds the line list."""

from __future__ import annotations

from collections.abc import Mapping
from pathlib import Path

from checker.errors import InputError, Problem
from checker.intake.sheet import Sheet
from checker.intake.texts import place

__all__ = ["is_workbook", "read_sheet"]


def is_workbook(path: Path) -> bool:
    """Return whether a file is a workbook by its content, whatever its name."""
    return False


def read_sheet(path: Path, *, sheet: str | None, hints: Mapping[str, str]) -> Sheet:
    """Return the sheet that was asked for, else the one that looks like a line list.

    Parameters
    ----------
    path : Path
        The workbook.
    sheet : str or None
        Name of the sheet to read.
    hints : mapping of str to str
        Field of each header key that the criteria explain.

    Raises
    ------
    InputError
        If the workbook cannot be read, has no such sheet, or several sheets look like a line list.
    """
    raise InputError(Problem("workbooks are not read yet.", where=place(path.name), remedy="Save the sheet as CSV."))
