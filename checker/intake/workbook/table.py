"""From a raw sheet to the sheet of the intake: its table, deleted lines, merged values, and what to say of it."""

from __future__ import annotations

from collections.abc import Collection, Mapping, Sequence
from dataclasses import dataclass

from checker.errors import InputError
from checker.intake.layout import find_layout, line_number_columns
from checker.intake.records import MOST_COLUMNS
from checker.intake.sheet import Sheet
from checker.intake.texts import shown
from checker.intake.workbook.deleted import settle_line_numbers, struck_rows
from checker.intake.workbook.header_marks import take_out_marks
from checker.intake.workbook.merged import Filled, fill_down, spread_headers
from checker.intake.workbook.per_cent import refuse_per_cent
from checker.intake.workbook.raw import BLANK, HEAD, RawSheet

__all__ = ["sheet_of"]

NAMED = 8


@dataclass(frozen=True, slots=True)
class _Table:
    """Row of the headers and first row of lines, counted from 0, the headers, and the column of the line number."""

    header: int
    first: int
    headers: tuple[str, ...]
    line_column: int


def _table(raw: RawSheet, file: str, hints: Mapping[str, str]) -> _Table | None:
    """Return where the table stands, None where it is not found: the intake then says so itself."""
    head = [row[:MOST_COLUMNS] for row in raw.rows[:HEAD]]
    try:
        layout = find_layout(head, file=file, hints=hints)
    except InputError:
        return None
    columns = line_number_columns(layout.headers, hints)
    return _Table(layout.header_row - 1, layout.first_row - 1, layout.headers, columns[0]) if columns else None


def _width(raw: RawSheet, table: _Table) -> int:
    """Return the number of columns of the table: up to the last header."""
    heads = raw.rows[table.header : table.first]
    return max((column + 1 for row in heads for column, cell in enumerate(row) if cell.strip()), default=1)


def _named(names: Sequence[str]) -> str:
    more = f" and {len(names) - NAMED} more" if len(names) > NAMED else ""
    return ", ".join(names[:NAMED]) + more


def _even(raw: RawSheet, first: int, width: int) -> None:
    """Give every written row the width of the table; what is written beyond its headers is said in a note."""
    beyond = []
    for number, row in enumerate(raw.rows):
        if row is BLANK or len(row) == width:
            continue
        if len(row) < width:
            row.extend([""] * (width - len(row)))
            continue
        if number >= first and any(cell.strip() for cell in row[width:]):
            beyond.append(str(number + 1))
        del row[width:]
    if beyond:
        raw.notes.append(f"Cells to the right of the last header are not read: rows {_named(beyond)}.")


def _letters(column: int) -> str:
    """Return the letters of a column counted from 0."""
    from openpyxl.utils import get_column_letter

    return str(get_column_letter(column + 1))


def _hidden(raw: RawSheet, headers: Sequence[str]) -> list[str]:
    notes = []
    if raw.hidden_rows:
        rows = [str(row + 1) for row in sorted(raw.hidden_rows)]
        notes.append(f"Hidden rows, read all the same: {_named(rows)}.")
    width = len(headers)
    columns = [
        f"{_letters(column)} {shown(headers[column])}"
        for first, last in raw.hidden_columns
        for column in range(max(first, 0), min(last + 1, width))
    ]
    if columns:
        notes.append(f"Hidden columns, read all the same: {_named(columns)}.")
    if raw.filtered:
        notes.append("A filter is set on the sheet: rows that it hides are read all the same.")
    return notes


def _struck_headers(raw: RawSheet, table: _Table) -> list[str]:
    rows = range(table.header, table.first)
    struck = [shown(raw.rows[row][column]) for row in rows for column in raw.struck.get(row, ())]
    return [f"Headers struck through, their columns are read all the same: {_named(struck)}."] if struck else []


def _filled(filled: Sequence[Filled], headers: Sequence[str]) -> list[str]:
    names = [
        f"{shown(headers[column]) if column < len(headers) else _letters(column)} rows {top + 1} to {bottom + 1}"
        for column, top, bottom, _ in sorted(filled)
    ]
    cells = sum(each.cells for each in filled)
    said = "Merged cells: their value is taken for each of their rows"
    return [f"{said} ({cells} cells filled): {_named(names)}."] if cells else []


def _stored(raw: RawSheet) -> list[str]:
    notes = []
    if raw.formulas:
        notes.append(f"Cells with a formula: {raw.formulas}; their stored values are used, nothing is calculated.")
    if raw.external:
        notes.append(
            f"This workbook takes {raw.external} cells from other files or programs: their stored values are used, "
            "no link is followed."
        )
    if raw.comments:
        notes.append(f"Cell comments are not read: {raw.comments} on this sheet.")
    return notes


def sheet_of(
    raw: RawSheet, *, name: str, sha256: str, file: str, hints: Mapping[str, str], notes: Collection[str]
) -> Sheet:
    """Return a sheet as the intake reads it.

    Parameters
    ----------
    raw : RawSheet
        The sheet as stored; it is used up.
    name, sha256, file : str
        Name of the sheet, hash of the workbook, and the name for messages.
    hints : mapping of str to str
        Field of each header key that the criteria explain.
    notes : collection of str
        What was found before.
    """
    taken_out = take_out_marks(raw, hints)
    if taken_out:
        raw.notes.append(f"Headers read without their raised marks: {_named(taken_out)}.")
    table = _table(raw, file, hints)
    headers: tuple[str, ...] = ()
    struck: frozenset[int] = frozenset()
    if table is not None:
        spread_headers(raw, table.header, table.first)
        table = _table(raw, file, hints) or table
        width = _width(raw, table)
        raw.notes.extend(_struck_headers(raw, table))
        raw.notes.extend(_filled(fill_down(raw, table.first, width, table.line_column), table.headers))
        if raw.per_cent_unseen:
            refuse_per_cent(raw, table.header, table.first, width)
        settle_line_numbers(raw, table.first, width, table.line_column)
        struck = struck_rows(raw, table.first, width, table.line_column)
        _even(raw, table.first, width)
        headers = (*table.headers, *[""] * width)[:width]
    return Sheet(
        name=name,
        sha256=sha256,
        rows=raw.rows,
        refused=raw.refused,
        no_numbers=raw.no_numbers,
        struck=struck,
        hidden=frozenset(raw.hidden_rows),
        notes=(*notes, *_hidden(raw, headers), *_stored(raw), *raw.notes),
    )
