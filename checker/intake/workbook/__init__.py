"""Workbooks: which sheet holds the line list, and its cells as texts."""

from __future__ import annotations

from checker.intake.workbook.container import name_says
from checker.intake.workbook.reading import is_workbook, read_sheet

__all__ = ["is_workbook", "name_says", "read_sheet"]
