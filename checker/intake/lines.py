"""Which rows are lines: blank rows, headings, notes and totals are none; deleted lines are listed apart."""

from __future__ import annotations

from collections.abc import Collection, Iterable, Sequence
from dataclasses import dataclass
from itertools import compress

import numpy as np

from checker.errors import InputError, Problem
from checker.intake.later_headers import LaterHeaders
from checker.intake.layout import Layout
from checker.intake.records import Block, Form
from checker.intake.row_kinds import RepeatedRows, two_tags
from checker.intake.row_sorting import Sorting
from checker.intake.table_rows import Cells, Table, read_table
from checker.intake.texts import place, shown
from checker.model import Address, IntArray, UnreadItem

__all__ = ["Lines", "find_lines", "named_rows"]

NAMED_ROWS = 6


@dataclass(frozen=True)
class Lines:
    """Lines of the list, in the order of their rows.

    `columns` holds the cells by column, one a line; `row` the row of each line; `broken` the reason why every value of
    a line is refused, by line.
    """

    numbers: tuple[str, ...]
    row: IntArray
    columns: tuple[Cells, ...]
    broken: dict[int, str]
    unread: tuple[UnreadItem, ...]
    notes: tuple[str, ...]
    deleted: tuple[UnreadItem, ...] = ()


def named_rows(rows: Sequence[int]) -> str:
    """Return the first of some rows by number, and how many more there are."""
    names = ", ".join(map(str, rows[:NAMED_ROWS]))
    return f"{names} and {len(rows) - NAMED_ROWS} more" if len(rows) > NAMED_ROWS else names


def _break_rows_with_two_tags(table: Table, sorting: Sorting, written: Cells) -> list[int]:
    """Refuse the values of rows that give two line numbers, and return the rows whose number was only joined."""
    joined = []
    texts = () if sorting.as_written else written
    for index, text in enumerate(texts):
        if sorting.numbers[index] == text.strip() or not sorting.keep[index]:
            continue
        if two_tags(text):
            table.broken[index] = (
                f"{shown(text)} holds two line numbers against one set of values: give each line a row of its own."
            )
        else:
            joined.append(table.row_numbers[index])
    return joined


def find_lines(
    blocks: Iterable[Block],
    form: Form,
    layout: Layout,
    *,
    file: str,
    line_column: int,
    number_columns: Collection[int],
    said_columns: Collection[int] = (),
    status_columns: Collection[int] = (),
    struck: Collection[int] = frozenset(),
) -> Lines:
    """Read the rows beneath the header and return the lines, and the rows that are none.

    Parameters
    ----------
    blocks : iterable of Block
        Every row of the file from its first one on.
    form, layout : Form, Layout
        What was understood of its form and its headers.
    file : str
        Name of the file, for messages.
    line_column : int
        Column of the line number.
    number_columns : collection of int
        Columns whose plain numbers are read on the way.
    said_columns : collection of int
        Columns of remarks and status, which may say that a line is deleted.
    status_columns : collection of int
        Those of the status among them, where one letter may say so.
    struck : collection of int
        Rows (counted from 0) that are struck through: lines deleted by their originator.

    Raises
    ------
    InputError
        If the table holds no line at all: nothing read is never nothing wrong.
    """
    table = read_table(blocks, form, layout, number_columns, file)
    sorting = Sorting(table, table.columns(), line_column, file, layout.headers[line_column])
    sorting.struck(struck)
    sorting.other_tables(LaterHeaders(form.head, layout, line_column, number_columns))
    sorting.by_number(RepeatedRows(form.head, layout, line_column))
    sorting.by_words(said_columns, status_columns, layout.headers)
    sorting.headings()
    sorting.without_number()
    if not sorting.keep.any():
        raise InputError(
            Problem(
                "no lines: the header row is there, but no row beneath it has a line number.",
                where=place(file, layout.header_row),
                remedy="Give a list with at least one line; an empty list is never checked as if it were in order.",
            )
        )
    return _kept(table, sorting, line_column, _trimmed(table, layout, file))


def _notes(table: Table, sorting: Sorting, joined: Sequence[int], lines: int) -> tuple[str, ...]:
    listed, rows = len(sorting.unread) + len(sorting.deleted), len(table.row_numbers) + table.blank
    notes = [
        f"Rows beneath the header: {rows}, of which {lines} are lines, {len(sorting.deleted)} deleted lines, "
        f"{len(sorting.unread)} no lines and {rows - lines - listed} blank."
    ]
    if table.short and not table.common_width:
        notes.append(f"Rows shorter than the header, the rest taken as blank: {named_rows(table.short)}.")
    if joined:
        notes.append(
            f"Line numbers with line breaks or runs of blanks, joined by one blank: rows {named_rows(joined)}."
        )
    return tuple(notes)


def _trimmed(table: Table, layout: Layout, file: str) -> tuple[UnreadItem, ...]:
    """Return the question that nearly all rows raise by being shorter than the header."""
    if not table.common_width:
        return ()
    last = next(header for header in reversed(layout.headers) if header) if any(layout.headers) else ""
    reason = (
        f"nearly all rows have {table.common_width} cells where the header has {len(layout.headers)} (rows "
        f"{named_rows(table.short)}): the last columns, to {shown(last)}, are taken as blank in them; if instead a "
        "delimiter stands unquoted in the header, put that header in quotation marks, for the columns behind it are "
        "read one place off."
    )
    return (UnreadItem("", last, reason, Address(file, layout.header_row, last)),)


def _kept(table: Table, sorting: Sorting, line_column: int, trimmed: tuple[UnreadItem, ...]) -> Lines:
    keep, columns = sorting.keep, sorting.columns
    joined = _break_rows_with_two_tags(table, sorting, columns[line_column])
    every = bool(keep.all())
    place_of = np.cumsum(keep) - 1
    return Lines(
        sorting.numbers if every else tuple(compress(sorting.numbers, keep.tolist())),
        np.asarray(table.row_numbers, dtype=np.int32)[keep],
        columns if every else tuple(column.kept(keep) for column in columns),
        {int(place_of[index]): reason for index, reason in table.broken.items() if keep[index]},
        tuple(sorted((*trimmed, *sorting.unread, *sorting.questions), key=lambda item: item.address.row)),
        _notes(table, sorting, joined, int(keep.sum())),
        tuple(sorted(sorting.deleted, key=lambda item: item.address.row)),
    )
