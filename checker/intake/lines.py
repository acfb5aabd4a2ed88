"""Which rows are lines: blank rows, notes and totals are none; short rows are filled, over-long rows refused."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass
from itertools import compress

import numpy as np

from checker.errors import InputError, Problem
from checker.intake.layout import Layout
from checker.intake.records import Records
from checker.intake.texts import place, shown
from checker.model import Address, IntArray, UnreadItem

__all__ = ["Lines", "find_lines"]

_NO_LINE = re.compile(
    r"(grand |sub-?\s?)?totals?\b(?!\w)|(sub)?sum\b|page \d+( of \d+)?\s*$|end of (list|table)", re.IGNORECASE
)
_HEADING = re.compile(
    r"(general )?notes?\b|legend\b|abbreviations?\b|remarks?:|hold list|\(?\d{1,2}[).] \w", re.IGNORECASE
)
_NO_NUMBER = re.compile(r"[-_\u2013\u2014]*$")
_DOUBTFUL = re.compile("|".join(f"(?:{part.pattern})" for part in (_NO_LINE, _HEADING, _NO_NUMBER)), re.IGNORECASE)
_BREAKS = re.compile("[\x0b\x0c\x1c-\x1e\x85\u2028\u2029]")
NAMED_ROWS = 6


@dataclass(frozen=True)
class Lines:
    """Lines of the list.

    `columns` holds the cells by column, one a line; `row` the row of each line; `broken` the reason why every value of
    a line is refused, by line index.
    """

    numbers: tuple[str, ...]
    row: IntArray
    columns: tuple[Sequence[str], ...]
    broken: dict[int, str]
    unread: tuple[UnreadItem, ...]
    notes: tuple[str, ...]


@dataclass
class _Sorted:
    rows: list[list[str]]
    row_numbers: list[int]
    broken: dict[int, str]
    short: list[int]


def _long_reason(row: Sequence[str], width: int) -> str:
    extra = next(cell for cell in row[width:] if cell.strip())
    broken = " A control character that breaks lines stands in it." if any(map(_BREAKS.search, row)) else ""
    return (
        f"the row has {len(row)} cells where the header has {width} columns (cell {width + 1} and on: {shown(extra)}): "
        f"an unquoted delimiter may have moved its values, none is used.{broken}"
    )


def _damaged_reason(text: str) -> str:
    return f"quotation marks contradict each other in the row {shown(text)}: double them inside a quoted cell."


def _sort_rows(records: Records, layout: Layout) -> _Sorted:
    """Return the rows of the table, all as wide as the header."""
    width, first = len(layout.headers), layout.first_row - 1
    rows = records.rows[first:]
    if not records.damaged and set(map(len, rows)) <= {width}:
        return _Sorted(rows, list(range(first + 1, first + 1 + len(rows))), {}, [])
    found = _Sorted([], [], {}, [])
    for index, row in enumerate(rows, start=first):
        if index in records.damaged:
            cells = re.split(re.escape(records.delimiter), records.damaged[index])
            found.broken[len(found.rows)] = _damaged_reason(records.damaged[index])
        elif not any(cell.strip() for cell in row):
            continue
        else:
            cells = row
            if len(row) < width:
                found.short.append(index + 1)
            elif any(cell.strip() for cell in row[width:]):
                found.broken[len(found.rows)] = _long_reason(row, width)
        found.rows.append([*cells[:width], *[""] * (width - len(cells))])
        found.row_numbers.append(index + 1)
    return found


def _named(rows: Sequence[int]) -> str:
    names = ", ".join(map(str, rows[:NAMED_ROWS]))
    return f"{names} and {len(rows) - NAMED_ROWS} more" if len(rows) > NAMED_ROWS else names


def _why_no_line(number: str, header: str, columns: Sequence[Sequence[str]], line_column: int, index: int) -> str:
    """Return why a row is no line, empty where it is one."""
    if _NO_NUMBER.match(number):
        return "it has no line number, so it is not a line and is not checked."
    if _NO_LINE.match(number):
        return "it is a total or the foot of a page, not a line."
    if number.casefold() == header.casefold():
        return "it repeats the header."
    if _HEADING.match(number) and not any(
        column[index].strip() for position, column in enumerate(columns) if position != line_column
    ):
        return "it is a note, not a line."
    return ""


def _suspects(numbers: Sequence[str], header: str) -> list[int]:
    """Return the indices of rows that may be no lines."""
    repeated, doubtful = header.casefold(), _DOUBTFUL.match
    return [index for index, number in enumerate(numbers) if doubtful(number) or number.casefold() == repeated]


def _unread(index: int, reason: str, found: _Sorted, file: str, header: str) -> UnreadItem:
    row = found.row_numbers[index]
    text = " | ".join(cell.strip() for cell in found.rows[index] if cell.strip())
    return UnreadItem("", text[:200], f"Row {row} {shown(text)}: {reason}", Address(file, row, header))


def find_lines(records: Records, layout: Layout, *, file: str, line_column: int) -> Lines:
    """Return the lines of the table, and the rows that are none.

    Raises
    ------
    InputError
        If the table holds no line at all: nothing read is never nothing wrong.
    """
    found = _sort_rows(records, layout)
    header = layout.headers[line_column]
    columns: tuple[Sequence[str], ...] = tuple(zip(*found.rows, strict=True)) or ((),) * len(layout.headers)
    numbers = [" ".join(text.split()) for text in columns[line_column]]
    keep = np.ones(len(numbers), dtype=np.bool_)
    unread: list[UnreadItem] = []
    for index in _suspects(numbers, header):
        blank = not any(cell.strip() for cell in found.rows[index])
        reason = "" if blank else _why_no_line(numbers[index], header, columns, line_column, index)
        keep[index] = not (blank or reason)
        if reason:
            unread.append(_unread(index, reason, found, file, header))
    if not keep.any():
        raise InputError(
            Problem(
                "no lines: the header row is there, but no row beneath it has a line number.",
                where=place(file, layout.header_row),
                remedy="Give a list with at least one line; an empty list is never checked as if it were in order.",
            )
        )
    found.rows.clear()
    return _kept(found, columns, numbers, keep, tuple(unread), line_column)


def _kept(
    found: _Sorted,
    columns: tuple[Sequence[str], ...],
    numbers: Sequence[str],
    keep: np.ndarray[tuple[int], np.dtype[np.bool_]],
    unread: tuple[UnreadItem, ...],
    line_column: int,
) -> Lines:
    notes = []
    if found.short:
        notes.append(f"Rows shorter than the header, the rest taken as blank: {_named(found.short)}.")
    joined = [
        found.row_numbers[i] for i, text in enumerate(columns[line_column]) if numbers[i] != text.strip() and keep[i]
    ]
    if joined:
        notes.append(f"Line numbers with line breaks or runs of blanks, joined by one blank: rows {_named(joined)}.")
    place_of = np.cumsum(keep) - 1
    broken = {int(place_of[index]): reason for index, reason in found.broken.items() if keep[index]}
    row = np.asarray(found.row_numbers, dtype=np.int32)[keep]
    if keep.all():
        return Lines(tuple(numbers), row, columns, broken, unread, tuple(notes))
    kept = tuple(tuple(compress(column, keep)) for column in columns)
    return Lines(tuple(compress(numbers, keep)), row, kept, broken, unread, tuple(notes))
