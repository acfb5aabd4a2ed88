"""From text to rows: the delimiter, the records, and what is refused of their form."""

from __future__ import annotations

import csv
import io
import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from itertools import islice

from checker.errors import InputError, Problem
from checker.intake.layout import ROWS_SEARCHED, header_score
from checker.intake.texts import place, shown

__all__ = ["LONGEST_CELL", "MOST_COLUMNS", "MOST_ROWS", "Records", "read_records"]

MOST_COLUMNS = 2_000
MOST_ROWS = 1_000_000
LONGEST_CELL = 32_767
MOST_NEWLINES = 20
SAMPLE = 200_000
DELIMITERS = {",": "comma", ";": "semicolon", "\t": "tab", "|": "pipe"}
_CLOSE_QUOTES = 'Close the quotation mark, or double it inside a quoted cell (6"" for 6").'


@dataclass(slots=True)
class Records:
    """Rows of a file as texts, in the file's order (a damaged row is empty), and what was understood of its form.

    `damaged` holds, by row index, the text of each row whose quotation marks contradict each other.
    """

    rows: list[list[str]]
    delimiter: str
    comma: bool
    notes: tuple[str, ...]
    damaged: dict[int, str] = field(default_factory=dict)


def _refuse(file: str, row: int | None, what: str, remedy: str) -> InputError:
    return InputError(Problem(what, where=place(file, row), remedy=remedy))


def _sample(text: str, delimiter: str) -> list[list[str]]:
    reader = csv.reader(io.StringIO(text[:SAMPLE], newline=""), delimiter=delimiter)
    rows: list[list[str]] = []
    try:
        rows.extend(islice(reader, ROWS_SEARCHED))
    except csv.Error:
        pass
    return [row[:MOST_COLUMNS] for row in rows]


def _merit(text: str, delimiter: str, hints: Mapping[str, str]) -> tuple[int, int]:
    rows = _sample(text, delimiter)
    best = 0
    for row in rows:
        best = max(best, header_score(row, hints)) if len(row) > 1 else best
        if best > 1000:
            break
    return best, sum(len(row) - 1 for row in rows)


def _delimiter(text: str, hints: Mapping[str, str]) -> tuple[str, str]:
    """Return the delimiter and the note on it: an Excel ``sep=`` line decides, else the header row it uncovers."""
    stated = re.match(r"\s*\"?sep=(.)\"?\s*[\r\n]", text[:40], re.IGNORECASE)
    if stated and stated[1] in DELIMITERS:
        return stated[1], f"Cells parted by {DELIMITERS[stated[1]]}, as the line sep= says."
    best = max(DELIMITERS, key=lambda delimiter: _merit(text, delimiter, hints))
    return best, f"Cells parted by {DELIMITERS[best]}."


def _newlines(row: Sequence[str]) -> int:
    return sum(cell.count("\n") + cell.count("\r") - cell.count("\r\n") for cell in row)


def _damaged_text(text: str, line: int) -> str:
    return next(islice(io.StringIO(text, newline=""), line - 1, None), "").rstrip("\r\n")


def _parse(text: str, delimiter: str, file: str) -> tuple[list[list[str]], dict[int, str], bool]:
    """Return the rows, the damaged ones by index, and whether any record spans several lines of text."""
    reader = csv.reader(io.StringIO(text, newline=""), delimiter=delimiter, strict=True)
    rows: list[list[str]] = []
    damaged: dict[int, str] = {}
    counted, line = 0, 0
    while True:
        try:
            rows.extend(reader)
            break
        except csv.Error as error:
            line += len(rows) - counted + sum(map(_newlines, rows[counted:]))
            if "field larger" in str(error):
                raise _refuse(
                    file, len(rows) + 1, f"a cell is longer than {LONGEST_CELL} characters.", "Shorten it."
                ) from error
            if reader.line_num > line + 1 or "unexpected end" in str(error):
                what = f"a quotation mark opened in this row (text row {line + 1}) is not closed."
                raise _refuse(file, len(rows) + 1, what, _CLOSE_QUOTES) from error
            damaged[len(rows)] = _damaged_text(text, reader.line_num)
            rows.append([])
            counted, line = len(rows), reader.line_num
        if len(rows) > MOST_ROWS:
            break
    return rows, damaged, reader.line_num != len(rows)


def _refuse_swallowed(rows: Sequence[Sequence[str]], delimiter: str, file: str) -> None:
    """Refuse a record whose quoted cell has swallowed rows: an unclosed quotation mark that a later one closed."""
    for index, row in enumerate(rows):
        breaks = _newlines(row)
        if not breaks:
            continue
        widest = max(
            line.count(delimiter) for cell in row if "\n" in cell or "\r" in cell for line in cell.splitlines()
        )
        if breaks > MOST_NEWLINES or widest >= max(4, len(rows[0]) - 1):
            what = f"a quotation mark opened in this row swallows {breaks} line breaks: it is not closed in its row."
            raise _refuse(file, index + 1, what, _CLOSE_QUOTES)


def _refuse_oversize(rows: Sequence[Sequence[str]], file: str) -> None:
    if len(rows) > MOST_ROWS:
        raise _refuse(file, None, f"the file has more than {MOST_ROWS} rows.", "Split the list by unit or area.")
    widest = max(map(len, rows), default=0)
    if widest > MOST_COLUMNS:
        row = next(index for index, cells in enumerate(rows) if len(cells) == widest)
        what = f"the row has {widest} columns, more than {MOST_COLUMNS}."
        raise _refuse(file, row + 1, what, "Check the delimiter, or leave out the columns that no check needs.")


def _refuse_long_cells(rows: Sequence[Sequence[str]], text: str, spans: bool, file: str) -> None:
    if not spans and max(map(len, text.split("\n"))) <= LONGEST_CELL:
        return
    for index, row in enumerate(rows):
        for position, cell in enumerate(row):
            if len(cell) > LONGEST_CELL:
                what = f"cell {position + 1} has {len(cell)} characters, more than {LONGEST_CELL}: {shown(cell)}."
                raise _refuse(file, index + 1, what, "Shorten it, or check the quotation marks of the row.")


def _decimal_commas(text: str, delimiter: str) -> bool:
    """Return whether a list that is not parted by commas writes its decimals with commas."""
    if delimiter == ",":
        return False
    edge = re.escape(delimiter)
    return re.search(rf"(?:^|[{edge}\"]) *[-+]?\d+,\d+ *(?:[{edge}\"\r\n]|$)", text, re.MULTILINE) is not None


def read_records(text: str, *, file: str, hints: Mapping[str, str]) -> Records:
    """Read the rows of a delimited text.

    Raises
    ------
    InputError
        If a quotation mark is not closed, or the file has too many rows or columns or too long a cell.
    """
    delimiter, note = _delimiter(text, hints)
    rows, damaged, spans = _parse(text, delimiter, file)
    _refuse_oversize(rows, file)
    if spans:
        _refuse_swallowed(rows, delimiter, file)
    _refuse_long_cells(rows, text, spans, file)
    comma = _decimal_commas(text, delimiter)
    notes = (note, "Decimal commas.") if comma else (note,)
    if rows and len(rows[0]) <= 2 and rows[0] and re.match(r"\s*sep=", rows[0][0], re.IGNORECASE):
        rows[0] = []
    return Records(rows, delimiter, comma, notes, damaged)
