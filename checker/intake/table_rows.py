"""The rows beneath the header as columns of cells: short rows filled, over-long and damaged ones marked as broken."""

from __future__ import annotations

import re
from collections.abc import Collection, Iterable, Iterator, Sequence

from checker.errors import InputError, Problem
from checker.intake.cells import CellCollector, CodedCells, NumberCells, NumberCollector, collect_numbers
from checker.intake.layout import Layout
from checker.intake.records import DELIMITERS, MOST_COLUMNS, Block, Form
from checker.intake.texts import place, shown
from checker.intake.widths import Widths, unquoted_header

__all__ = ["Cells", "Table", "read_table"]

_BREAKS = re.compile("[\x0b\x0c\x1c-\x1e\x85\u2028\u2029]")

_GROUP = re.compile(r"0\d\d", re.ASCII)
_LEADING = re.compile(r"[-+]?[1-9]\d{0,2}", re.ASCII)

Cells = CodedCells | NumberCells


class Table:
    """Rows of the table turned into columns, block by block."""

    def __init__(self, width: int, number_columns: Collection[int]) -> None:
        self.width = width
        self.numbers = {i: NumberCollector() for i in range(width) if i in number_columns}
        self.texts = {i: CellCollector() for i in range(width) if i not in number_columns}
        self.row_numbers: list[int] = []
        self.broken: dict[int, str] = {}
        self.short: list[int] = []
        self.widths = Widths()
        self.common_width = 0
        self.blank = 0

    def add(self, block: Block, delimiter: str) -> None:
        """Append a block: short rows are filled, over-long and damaged ones marked as broken, blank ones left out."""
        if not block.damaged and set(map(len, block.rows)) <= {self.width}:
            rows = block.rows
            self.row_numbers.extend(range(block.first + 1, block.first + 1 + len(rows)))
        else:
            rows = list(self._evened(block, delimiter))
        if not rows:
            return
        columns = list(zip(*rows, strict=True))
        for position, collector in self.texts.items():
            collector.add(columns[position])
        zeros = collect_numbers(tuple(self.numbers.values()), [columns[position] for position in self.numbers])
        if zeros and delimiter == ",":
            self._break_moved(rows, zeros)

    def _break_moved(self, rows: Sequence[Sequence[str]], zeros: Sequence[tuple[int, int]]) -> None:
        """Refuse rows in which a comma has parted the thousands of a number that is not quoted (``1,000``)."""
        positions, first = tuple(self.numbers), len(self.row_numbers) - len(rows)
        for column, index in zeros:
            position, row = positions[column], rows[index]
            if position and _GROUP.fullmatch(row[position].strip()) and _LEADING.fullmatch(row[position - 1].strip()):
                self.broken.setdefault(first + index, _moved_reason(row, position))

    def columns(self) -> tuple[Cells, ...]:
        """Return all cells collected, column by column."""
        collectors: dict[int, NumberCollector | CellCollector] = {**self.numbers, **self.texts}
        return tuple(collectors[position].cells() for position in range(self.width))

    def _evened(self, block: Block, delimiter: str) -> Iterator[list[str]]:
        width = self.width
        for index, row in enumerate(block.rows):
            number, line = block.first + index + 1, len(self.row_numbers)
            cells = row
            if index in block.damaged:
                cells = block.damaged[index].split(delimiter)
                self.broken[line] = _damaged_reason(block.damaged[index])
            elif not any(cell.strip() for cell in row):
                self.blank += 1
                continue
            elif len(row) < width:
                self.short.append(number)
                self.widths.add(row)
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


def _moved_reason(row: Sequence[str], position: int) -> str:
    before, group = row[position - 1].strip(), row[position].strip()
    return (
        f"cells {position} and {position + 1} ({shown(before)} and {shown(group)}) may be one number with a comma "
        f"between its thousands ({before},{group}), which moves the values behind it: none of the row is used; put the "
        "number in quotation marks, or write it without the comma."
    )


def _damaged_reason(text: str) -> str:
    return f"quotation marks contradict each other in the row {shown(text)}: double them inside a quoted cell."


def read_table(
    blocks: Iterable[Block], form: Form, layout: Layout, number_columns: Collection[int], file: str
) -> Table:
    """Read every row beneath the header into columns.

    Raises
    ------
    InputError
        If the quotation marks down to the header contradict each other.
    """
    table = Table(len(layout.headers), number_columns)
    skip = layout.first_row - 1
    for block in blocks:
        above = max(0, min(skip - block.first, len(block.rows)))
        if above:
            _refuse_damaged_header(block, above, layout, form, file)
            damaged = {index - above: damage for index, damage in block.damaged.items() if index >= above}
            block = Block(block.first + above, block.rows[above:], damaged)
        if block.rows:
            table.add(block, form.delimiter)
    if form.delimiter:
        _refuse_unquoted_header(table, form, layout, file)
    return table


def _refuse_unquoted_header(table: Table, form: Form, layout: Layout, file: str) -> None:
    """Refuse a file whose header row has more cells than its rows, where they tell that its headers have moved."""
    header = form.head[layout.header_row - 1]
    header = header[: max(count for count, cell in enumerate(header, start=1) if cell.strip())]
    table.common_width = table.widths.common(len(table.row_numbers))
    evidence = (
        unquoted_header(header, table.common_width, table.widths.sample, form.delimiter) if table.common_width else ""
    )
    if evidence:
        sign = DELIMITERS.get(form.delimiter, "delimiter")
        raise InputError(
            Problem(
                f"the header row has {len(header)} cells and the rows have {table.common_width}: {evidence}, so a "
                f"{sign} stands unquoted in the header and every column behind it would be read under a wrong header.",
                where=place(file, layout.header_row),
                remedy=f"Put the header that holds a {sign} in quotation marks.",
            )
        )


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
