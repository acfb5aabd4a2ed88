"""Is the list complete: its line numbers against those on the drawings."""

from __future__ import annotations

from checker.completeness.comparing import compare
from checker.completeness.reading import read_drawing_lines
from checker.completeness.record import Completeness, CompletenessItem, DrawingLines

__all__ = ["Completeness", "CompletenessItem", "DrawingLines", "compare", "read_drawing_lines"]
