"""Text for the terminal: lines of at most 100 characters, nothing hidden in them."""

from __future__ import annotations

import textwrap

from checker.report.numbers import NARROW_SPACE
from checker.report.safe_text import LONGEST_PROSE, shortened, visible_line

__all__ = ["WIDTH", "wrapped"]

WIDTH = 100


def wrapped(text: str, *, indent: str = "", first: str | None = None) -> list[str]:
    """Return a text on lines of at most 100 characters, nothing hidden in it."""
    plain = visible_line(shortened(text, LONGEST_PROSE).replace("\n", " ").replace(NARROW_SPACE, " "))
    start = indent if first is None else first
    lines = textwrap.wrap(plain, WIDTH, initial_indent=start, subsequent_indent=indent, break_on_hyphens=False)
    return lines or [start.rstrip()]
