"""Merged ranges: a group name holds over its columns, a value merged downwards over its rows."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from checker.intake.header_groups import names_group
from checker.intake.texts import shown
from checker.intake.workbook.raw import BLANK, Merged, RawSheet

__all__ = ["Filled", "fill_down", "spread_headers"]

MOST_FILLED = 2_000_000
ROWS_ABOVE = 2
NAMED_LINES = 4


class Filled(NamedTuple):
    """A merged range that was filled: its column, its rows, all counted from 0, and how many cells were filled."""

    column: int
    top: int
    bottom: int
    cells: int


def _text(rows: Sequence[Sequence[str]], row: int, column: int) -> str:
    return rows[row][column] if row < len(rows) and column < len(rows[row]) else ""


def _put(rows: list[list[str]], row: int, column: int, text: str) -> bool:
    """Write a text into a cell that is blank, as every cell of a merged range but the first one should be."""
    cells = rows[row]
    cells.extend([""] * (column + 1 - len(cells)))
    if cells[column].strip():
        return False
    cells[column] = text
    return True


def spread_headers(raw: RawSheet, header: int, first: int) -> None:
    """Write the name of a merged group over each of its columns.

    Parameters
    ----------
    raw : RawSheet
        The sheet, changed in place.
    header, first : int
        Row of the headers and first row of lines, counted from 0. A row above the headers that holds a single text
        is a title and stays as it is. A header row that comes again further down, the same in every cell, is spread as
        the first one.
    """
    rows = raw.rows
    heads = range(max(header - ROWS_ABOVE, 0), min(first, len(rows)))
    written = {row: list(rows[row]) for row in heads}
    width = max((len(row) for row in rows[header : first + 1]), default=0)
    for merged in raw.merged:
        if not (header - ROWS_ABOVE <= merged.top < min(first, len(rows))) or merged.left >= merged.right:
            continue
        text = _text(rows, merged.top, merged.left)
        alone = sum(bool(cell.strip()) for cell in rows[merged.top]) == 1
        title = alone and merged.top < header and not names_group(text)
        if text.strip() and not title:
            for column in range(merged.left + 1, min(merged.right + 1, width)):
                _put(rows, merged.top, column, text)
    again = [(written[row], rows[row]) for row in heads if rows[row] != written[row]]
    for row in range(first, len(rows)) if again else ():
        for as_written, spread in again:
            if rows[row] == as_written:
                rows[row] = list(spread)


def _value_beside(rows: Sequence[Sequence[str]], row: int, merged: Merged) -> bool:
    """Return whether a row holds something outside a merged range."""
    cells = rows[row]
    return any(cell.strip() for cell in cells[: merged.left]) or any(cell.strip() for cell in cells[merged.right + 1 :])


def _copy_marks(raw: RawSheet, merged: Merged, row: int) -> None:
    """Let what was said of a merged cell hold for one of its rows."""
    here, there = (merged.top, merged.left), (row, merged.left)
    for marks in (raw.refused, raw.no_numbers):
        if here in marks:
            marks[there] = marks[here]
    if merged.left in raw.struck.get(merged.top, ()):
        raw.struck.setdefault(row, []).append(merged.left)


def _fill(raw: RawSheet, merged: Merged, last: int) -> int:
    text = _text(raw.rows, merged.top, merged.left)
    filled = 0
    for row in range(merged.top + 1, last + 1) if text.strip() else ():
        if raw.rows[row] is not BLANK and _value_beside(raw.rows, row, merged):
            if _put(raw.rows, row, merged.left, text):
                _copy_marks(raw, merged, row)
                filled += 1
    return filled


def _refuse_shared(raw: RawSheet, merged: Merged, last: int, line_column: int) -> None:
    """Refuse a number that is merged over lines of different numbers: each one's value, or one for all of them?"""
    text = _text(raw.rows, merged.top, merged.left)
    rows = [row for row in range(merged.top, last + 1) if _text(raw.rows, row, line_column).strip()]
    numbers = {" ".join(raw.rows[row][line_column].split()).casefold() for row in rows}
    if merged.left == line_column or len(numbers) < 2 or not any(map(str.isnumeric, text)):
        return
    named = ", ".join(dict.fromkeys(shown(raw.rows[row][line_column].strip()) for row in rows[:NAMED_LINES]))
    sentence = (
        f"{shown(text)} is merged over the lines {named}{' and more' if len(numbers) > NAMED_LINES else ''}: it may be "
        "the value of each of them, or one value (a sum) for all; undo the merging and write each line's value."
    )
    for row in rows:
        raw.no_numbers[row, merged.left] = sentence


def _doubt(raw: RawSheet, merged: Merged, last: int, width: int) -> int:
    """Refuse the numbers of the columns over which a value of a line is merged: whose value is it?"""
    text = _text(raw.rows, merged.top, merged.left)
    doubted = 0
    for row in range(merged.top, last + 1) if text.strip() else ():
        if raw.rows[row] is BLANK or not _value_beside(raw.rows, row, merged):
            continue
        for column in range(merged.left + 1, min(merged.right + 1, width)):
            raw.no_numbers[row, column] = (
                f"the cell is merged with the one that holds {shown(text)}: it is not known whether that value holds "
                "for this column too; undo the merging and write each value."
            )
            doubted += 1
    return doubted


def fill_down(raw: RawSheet, first: int, width: int, line_column: int) -> list[Filled]:
    """Fill a value that is merged over several rows of lines into each of them that holds anything else.

    Line numbers come first, for a number that is merged over different lines is refused in all of them.

    Parameters
    ----------
    raw : RawSheet
        The sheet, changed in place.
    first, width, line_column : int
        First row of lines and column of the line number, counted from 0, and number of columns of the table.

    Returns
    -------
    list of Filled
        Ranges filled. Beyond two million cells, filled or doubted, nothing more is done and a note says so.
    """
    filled: list[Filled] = []
    work = 0
    for merged in sorted(raw.merged, key=lambda merged: merged.left != line_column):
        if merged.top < first or merged.top >= len(raw.rows) or merged.left >= width:
            continue
        last = min(merged.bottom, len(raw.rows) - 1)
        work += last - merged.top + 1
        if work > MOST_FILLED:
            raw.notes.append(f"More than {MOST_FILLED} rows of merged ranges: the rest are left as they are.")
            break
        cells = _fill(raw, merged, last)
        if cells:
            filled.append(Filled(merged.left, merged.top, last, cells))
            _refuse_shared(raw, merged, last, line_column)
        if merged.right > merged.left:
            work += _doubt(raw, merged, last, width)
    return filled
