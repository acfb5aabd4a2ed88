"""Which rows are lines: blank rows, notes and totals are none; short rows are filled, over-long rows refused."""

from __future__ import annotations

import re
from collections.abc import Collection, Iterable, Iterator, Sequence
from dataclasses import dataclass
from itertools import compress

import numpy as np

from checker.errors import InputError, Problem
from checker.intake.cells import CellCollector, CodedCells, NumberCells, NumberCollector
from checker.intake.layout import Layout
from checker.intake.records import MOST_COLUMNS, Block, Form
from checker.intake.texts import place, shown
from checker.model import Address, BoolArray, IntArray, UnreadItem

__all__ = ["Lines", "find_lines"]

_NO_LINE = re.compile(
    r"(grand |sub-?\s?)?totals?(?=$|[:\s])|(sub)?sum(?=$|[:\s])|page \d+( of \d+)?\s*$|end of (list|table)",
    re.IGNORECASE,
)
_HEADING = re.compile(
    r"(general )?notes?\b|legend\b|abbreviations?\b|remarks?:|hold list|\(?\d{1,2}[).] \w", re.IGNORECASE
)
_NO_NUMBER = re.compile(r"[-_\u2013\u2014]*$")
_DOUBTFUL = "|".join(f"(?:{part.pattern})" for part in (_NO_LINE, _HEADING, _NO_NUMBER))
_BREAKS = re.compile("[\x0b\x0c\x1c-\x1e\x85\u2028\u2029]")
NAMED_ROWS = 6


Cells = CodedCells | NumberCells


@dataclass(frozen=True)
class Lines:
    """Lines of the list.

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


class _Table:
    """Rows of the table turned into columns, block by block."""

    def __init__(self, width: int, number_columns: Collection[int]) -> None:
        self.width = width
        self.collectors = [NumberCollector() if i in number_columns else CellCollector() for i in range(width)]
        self.row_numbers: list[int] = []
        self.broken: dict[int, str] = {}
        self.short: list[int] = []

    def add(self, block: Block, delimiter: str) -> None:
        """Append a block: short rows are filled, over-long and damaged ones marked as broken, blank ones left out."""
        if not block.damaged and set(map(len, block.rows)) <= {self.width}:
            rows = block.rows
            self.row_numbers.extend(range(block.first + 1, block.first + 1 + len(rows)))
        else:
            rows = list(self._evened(block, delimiter))
        for collector, cells in zip(self.collectors, zip(*rows, strict=True), strict=bool(rows)):
            collector.add(cells)

    def _evened(self, block: Block, delimiter: str) -> Iterator[list[str]]:
        width = self.width
        for index, row in enumerate(block.rows):
            number, line = block.first + index + 1, len(self.row_numbers)
            cells = row
            if index in block.damaged:
                cells = block.damaged[index].split(delimiter)
                self.broken[line] = _damaged_reason(block.damaged[index])
            elif not any(cell.strip() for cell in row):
                continue
            elif len(row) < width:
                self.short.append(number)
            elif any(cell.strip() for cell in row[width:]):
                self.broken[line] = _long_reason(row, width)
            self.row_numbers.append(number)
            yield [*cells[:width], *[""] * (width - len(cells))]


def _long_reason(row: Sequence[str], width: int) -> str:
    extra = next(cell for cell in row[width:] if cell.strip())
    broken = " A control character that breaks lines stands in it." if any(map(_BREAKS.search, row)) else ""
    return (
        f"the row has {len(row)} cells where the header has {width} columns (cell {width + 1} and on: {shown(extra)}): "
        f"an unquoted delimiter may have moved its values, none is used.{broken}"
    )


def _damaged_reason(text: str) -> str:
    return f"quotation marks contradict each other in the row {shown(text)}: double them inside a quoted cell."


def _named(rows: Sequence[int]) -> str:
    names = ", ".join(map(str, rows[:NAMED_ROWS]))
    return f"{names} and {len(rows) - NAMED_ROWS} more" if len(rows) > NAMED_ROWS else names


def _why_no_line(number: str, header: str, columns: Sequence[Sequence[str]], line_column: int, index: int) -> str:
    """Return why a row is no line, empty where it is one."""
    values = _values(columns, line_column, index)
    if not number or (not values and _NO_NUMBER.match(number)):
        left = f": {values} value{'' if values == 1 else 's'} left unread" if values else ""
        return f"it has no line number, so it is not a line and is not checked{left}."
    if _NO_LINE.match(number):
        return "it is a total or the foot of a page, not a line."
    if number.casefold() == header.casefold():
        return "it repeats the header."
    if _HEADING.match(number) and not any(
        column[index].strip() for position, column in enumerate(columns) if position != line_column
    ):
        return "it is a note, not a line."
    return ""


def _values(columns: Sequence[Sequence[str]], line_column: int, index: int) -> int:
    """Return how many cells of a row hold something besides its line number; a dash holds nothing."""
    cells = (column[index].strip() for position, column in enumerate(columns) if position != line_column)
    return sum(not _NO_NUMBER.fullmatch(cell) for cell in cells)


def _suspects(numbers: Sequence[str], header: str) -> list[int]:
    """Return the indices of rows that may be no lines."""
    doubtful = re.compile(f"{_DOUBTFUL}|{re.escape(header)}$", re.IGNORECASE).match
    return [index for index, number in enumerate(numbers) if doubtful(number)]


def _numbers(cells: Iterable[str]) -> list[str]:
    """Return line numbers with runs of blanks and line breaks as one blank."""
    return [" ".join(text.split()) for text in cells]


def _row(columns: Sequence[Cells], index: int) -> list[str]:
    """Return the cells of a row that are not blank."""
    return [text for column in columns if (text := column[index].strip())]


def _unread(index: int, row: int, reason: str, columns: Sequence[Cells], file: str, header: str) -> UnreadItem:
    text = " | ".join(_row(columns, index))
    return UnreadItem("", text[:200], f"Row {row} {shown(text)}: {reason}", Address(file, row, header))


def _table(blocks: Iterable[Block], form: Form, layout: Layout, number_columns: Collection[int], file: str) -> _Table:
    table = _Table(len(layout.headers), number_columns)
    skip = layout.first_row - 1
    for block in blocks:
        above = max(0, min(skip - block.first, len(block.rows)))
        if above:
            _refuse_damaged_header(block, above, layout, form, file)
            damaged = {index - above: damage for index, damage in block.damaged.items() if index >= above}
            block = Block(block.first + above, block.rows[above:], damaged)
        if block.rows:
            table.add(block, form.delimiter)
    return table


def _refuse_damaged_header(block: Block, above: int, layout: Layout, form: Form, file: str) -> None:
    """Refuse a file whose quotation marks are contradictory down to the header."""
    header = layout.header_row - 1 - block.first
    moved = (
        0 <= header < len(block.rows) and tuple(block.rows[header])[:MOST_COLUMNS] != form.head[layout.header_row - 1]
    )
    damaged = [index for index in block.damaged if index < above]
    if damaged or moved:
        row = (damaged or [header])[0]
        what = f"quotation marks contradict each other: {shown(block.damaged.get(row, ''))}."
        remedy = 'Double a quotation mark inside a quoted cell (6"" for 6").'
        raise InputError(Problem(what, where=place(file, block.first + row + 1), remedy=remedy))


def _deleted(
    row_numbers: Sequence[int],
    numbers: Sequence[str],
    keep: BoolArray,
    struck: Collection[int],
    file: str,
    header: str,
) -> tuple[UnreadItem, ...]:
    """Take the lines that are struck through out of the lines kept, and return them."""
    found = []
    for index, row in enumerate(row_numbers if struck else ()):
        if keep[index] and row - 1 in struck:
            keep[index] = False
            reason = f"Row {row}: the line is struck through, so it is taken as deleted and is not checked."
            found.append(UnreadItem(numbers[index], numbers[index], reason, Address(file, row, header)))
    return tuple(found)


def find_lines(
    blocks: Iterable[Block],
    form: Form,
    layout: Layout,
    *,
    file: str,
    line_column: int,
    number_columns: Collection[int],
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
    struck : collection of int
        Rows (counted from 0) that are struck through: lines deleted by their originator.

    Raises
    ------
    InputError
        If the table holds no line at all: nothing read is never nothing wrong.
    """
    table = _table(blocks, form, layout, number_columns, file)
    header = layout.headers[line_column]
    columns = tuple(collector.cells() for collector in table.collectors)
    numbers = _numbers(columns[line_column])
    keep = np.ones(len(numbers), dtype=np.bool_)
    unread: list[UnreadItem] = []
    for index in _suspects(numbers, header):
        blank = not _row(columns, index)
        reason = "" if blank else _why_no_line(numbers[index], header, columns, line_column, index)
        keep[index] = not (blank or reason)
        if reason:
            unread.append(_unread(index, table.row_numbers[index], reason, columns, file, header))
    deleted = _deleted(table.row_numbers, numbers, keep, struck, file, header)
    if not keep.any():
        raise InputError(
            Problem(
                "no lines: the header row is there, but no row beneath it has a line number.",
                where=place(file, layout.header_row),
                remedy="Give a list with at least one line; an empty list is never checked as if it were in order.",
            )
        )
    return _kept(table, columns, numbers, keep, tuple(unread), deleted, line_column)


def _kept(
    table: _Table,
    columns: tuple[Cells, ...],
    numbers: Sequence[str],
    keep: BoolArray,
    unread: tuple[UnreadItem, ...],
    deleted: tuple[UnreadItem, ...],
    line_column: int,
) -> Lines:
    notes = []
    if table.short:
        notes.append(f"Rows shorter than the header, the rest taken as blank: {_named(table.short)}.")
    written = columns[line_column]
    joined = [
        table.row_numbers[index]
        for index, (number, text) in enumerate(zip(numbers, written, strict=True))
        if number != text.strip() and keep[index]
    ]
    if joined:
        notes.append(f"Line numbers with line breaks or runs of blanks, joined by one blank: rows {_named(joined)}.")
    place_of = np.cumsum(keep) - 1
    return Lines(
        tuple(compress(numbers, keep)),
        np.asarray(table.row_numbers, dtype=np.int32)[keep],
        columns if keep.all() else tuple(column.kept(keep) for column in columns),
        {int(place_of[index]): reason for index, reason in table.broken.items() if keep[index]},
        unread,
        tuple(notes),
        deleted,
    )
