"""Text for the terminal: lines of at most 100 characters, nothing hidden in them."""

from __future__ import annotations

import textwrap

from checker.report.numbers import NARROW_SPACE
from checker.report.safe_text import LONGEST_PROSE, shortened, visible_line

__all__ = ["WIDTH", "wrapped"]

WIDTH = 100
#: Stands for a blank inside a number while the lines are broken.
_TOGETHER = "\u00a0"


def wrapped(text: str, *, indent: str = "", first: str | None = None) -> list[str]:
    """Return a text on lines of at most 100 characters, nothing hidden in it."""
    parts = shortened(text, LONGEST_PROSE).replace("\n", " ").split(NARROW_SPACE)
    plain = _TOGETHER.join(map(visible_line, parts))
    start = indent if first is None else first
    lines = textwrap.wrap(plain, WIDTH, initial_indent=start, subsequent_indent=indent, break_on_hyphens=False)
    return [line.replace(_TOGETHER, " ") for line in lines] or [start.rstrip()]
