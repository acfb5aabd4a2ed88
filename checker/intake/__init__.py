"""A file becomes a `LineList`: cells, headers, quantities in SI, and where each came from."""

from __future__ import annotations

from checker.intake.reading import read_line_list

__all__ = ["read_line_list"]
