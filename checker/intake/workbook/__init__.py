"""Workbooks: which sheet holds the line list, and its cells as texts.

The readers are imported only when a workbook is read: a text never waits for them.
"""

from __future__ import annotations

from collections.abc import Mapping
from pathlib import Path

from checker.intake.sheet import Sheet
from checker.intake.workbook.container import is_workbook, name_says

__all__ = ["is_workbook", "name_says", "read_sheet"]


def read_sheet(path: Path, *, sheet: str | None, hints: Mapping[str, str]) -> Sheet:
    """Return the sheet that was asked for, else the one that looks like a line list: see `reading.read_sheet`.

    Raises
    ------
    InputError
        If the workbook cannot be read, exceeds a limit, has no such sheet, or several sheets look like a line list.
    """
    from checker.intake.workbook import reading

    return reading.read_sheet(path, sheet=sheet, hints=hints)
