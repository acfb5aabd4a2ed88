"""Rows shorter than their header: columns trimmed at the end, or a delimiter that stands unquoted in the header."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Sequence
from dataclasses import dataclass, field

from checker.intake.headers import HeaderReading, read_header
from checker.intake.placeholders import placeholder
from checker.intake.texts import shown
from checker.intake.unit_words import is_unit_text
from checker.model import Gap

__all__ = ["Widths", "unquoted_header"]

NEARLY_ALL = 0.9
SAMPLE = 100
MOST_MISSING = 3
_WORDS = frozenset({"from", "to", "phase", "service", "case"})
_NUMBER = re.compile(r"\s*[-+]?\d[\d.]*\s*")


@dataclass
class Widths:
    """How many cells the rows have that are shorter than the header, by count, and the first of these rows."""

    shorter: Counter[int] = field(default_factory=Counter)
    sample: list[list[str]] = field(default_factory=list)

    def add(self, row: list[str]) -> None:
        """Count a row that is shorter than the header."""
        self.shorter[len(row)] += 1
        if len(self.sample) < SAMPLE:
            self.sample.append(row)

    def common(self, rows: int) -> int:
        """Return how many cells the rows commonly have where nearly all of them are short, else 0."""
        if not self.shorter or sum(self.shorter.values()) < NEARLY_ALL * rows:
            return 0
        return self.shorter.most_common(1)[0][0]


def unquoted_header(header: Sequence[str], width: int, rows: Sequence[Sequence[str]], delimiter: str) -> str:
    """Return what tells that a delimiter stands unquoted in the header row, empty where nothing does.

    Parameters
    ----------
    header : sequence of str
        The header row as written.
    width : int
        Number of cells that the rows have.
    rows : sequence of rows
        Some of the rows.
    delimiter : str
        What parts the cells.
    """
    missing = len(header) - width
    if not 1 <= missing <= MOST_MISSING:
        return ""
    places = range(len(header) - missing)
    likely = next((place for place in places if _one_header(header[place : place + missing + 1], delimiter)), None)
    if likely is None:
        likely = _after_blank(header, missing)
    if likely is None:
        likely = _fits_better(header, missing, rows)
    if likely is None:
        return ""
    named = " and ".join(shown(cell) for cell in header[likely : likely + missing + 1])
    return f"the cells {named} seem to be one header"


def _one_header(parts: Sequence[str], delimiter: str) -> bool:
    """Return whether some cells are one header that is understood, of which only the first is one by itself."""
    joined = read_header(delimiter.join(parts))
    if joined is None or any(read_header(part) is not None for part in parts[1:]):
        return False
    return bool(joined.case) or is_unit_text(parts[-1].strip())


def _after_blank(header: Sequence[str], missing: int) -> int | None:
    """Return where a header is continued: its next cells, and no others, begin with a blank, as behind a comma."""
    blank = [place for place, cell in enumerate(header) if place and cell[:1] == " " and cell.strip()]
    if len(blank) != missing or blank != list(range(blank[0], blank[0] + missing)):
        return None
    return blank[0] - 1


def _fits_better(header: Sequence[str], missing: int, rows: Sequence[Sequence[str]]) -> int | None:
    """Return the header at which the rows must be moved for their cells to be of the kinds that the headers promise."""
    readings = [read_header(cell) for cell in header]
    as_read = _misfits(readings, rows, len(header), missing)
    moved = [_misfits(readings, rows, place, missing) for place in range(len(header) - missing)]
    texts = [reading is not None and reading.fields[0].name in _WORDS for reading in readings]
    best = min(range(len(moved)), key=lambda place: (moved[place], not all(texts[place : place + missing + 1])))
    return best if as_read - moved[best] >= max(1, len(rows) // 2) else None


def _misfits(readings: Sequence[HeaderReading | None], rows: Sequence[Sequence[str]], place: int, missing: int) -> int:
    """Return how many cells are of another kind than their header says, those behind `place` moved to the right."""
    count = 0
    for row in rows:
        for position, cell in enumerate(row):
            column = position if position <= place else position + missing
            reading = readings[column] if column < len(readings) and column != place else None
            count += reading is not None and _misfit(reading, cell)
    return count


def _misfit(reading: HeaderReading, cell: str) -> bool:
    if not cell.strip():
        return False
    if reading.fields[0].kind == "text":
        return reading.fields[0].name in _WORDS and _NUMBER.fullmatch(cell) is not None
    return not any(map(str.isdigit, cell)) and placeholder(cell.strip(), "") is Gap.GIVEN
