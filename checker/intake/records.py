"""From text to rows: the delimiter, the records, and what is refused of their form."""

from __future__ import annotations

import csv
import io
import re
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import chain, islice

from checker.errors import InputError, Problem
from checker.intake.layout import LINE_NUMBER_WEIGHT, ROWS_SEARCHED, header_score
from checker.intake.texts import place, shown

__all__ = ["LONGEST_CELL", "MOST_COLUMNS", "MOST_ROWS", "Block", "Form", "read_blocks", "read_form"]

MOST_COLUMNS = 2_000
MOST_ROWS = 200_000
LONGEST_CELL = 32_767
MOST_NEWLINES = 20
SAMPLE = 200_000
ROWS_BENEATH = 6
BLOCK = 500
_OTHER_ENDS_ASCII = "\x0b\x0c\x1c\x1d\x1e"
_OTHER_ENDS = "\x85\u2028\u2029"
DELIMITERS = {",": "comma", ";": "semicolon", "\t": "tab", "|": "pipe"}
_CLOSE_QUOTES = 'Close the quotation mark, or double it inside a quoted cell (6"" for 6").'


@dataclass(frozen=True, slots=True)
class Form:
    """What was understood of a file's form before its rows are read: the delimiter, decimal commas, the first rows."""

    delimiter: str
    comma: bool
    head: tuple[tuple[str, ...], ...]
    notes: tuple[str, ...]


@dataclass(slots=True)
class Block:
    """Some consecutive rows of a file.

    `first` is the index of the first one; `damaged` holds, by index in the block, the text of a row whose quotation
    marks contradict each other (its cells are empty).
    """

    first: int
    rows: list[list[str]]
    damaged: dict[int, str]


def _refuse(file: str, row: int | None, what: str, remedy: str) -> InputError:
    return InputError(Problem(what, where=place(file, row), remedy=remedy))


def _sample(text: str, delimiter: str) -> list[list[str]]:
    reader = csv.reader(io.StringIO(text, newline=""), delimiter=delimiter)
    rows: list[list[str]] = []
    try:
        rows.extend(islice(reader, ROWS_SEARCHED + ROWS_BENEATH))
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


class _TextLines:
    """The lines of a text, piece by piece; `any_long` says whether one met so far outgrows a cell."""

    def __init__(self, pieces: Iterable[str]) -> None:
        self._pieces = pieces
        self._lines: list[str] = []
        self._before = 0
        self.any_long = False

    def __iter__(self) -> Iterator[str]:
        return chain.from_iterable(map(self._split, self._pieces))

    def _split(self, piece: str) -> list[str]:
        self._before += len(self._lines)
        self._lines = _lines_of(piece)
        self.any_long = self.any_long or max(map(len, self._lines), default=0) > LONGEST_CELL
        return self._lines

    def line(self, number: int) -> str:
        """Return a line of the latest piece, counted from 1 over all; empty outside it."""
        place = number - 1 - self._before
        return self._lines[place] if 0 <= place < len(self._lines) else ""


def _lines_of(piece: str) -> list[str]:
    """Return the lines of a piece with their ends: only line feed and carriage return end one."""
    if any(sign in piece for sign in _OTHER_ENDS_ASCII) or (
        not piece.isascii() and any(sign in piece for sign in _OTHER_ENDS)
    ):
        return list(io.StringIO(piece, newline=""))
    return piece.splitlines(keepends=True)


def _damaged(error: csv.Error, file: str, row: int, line: int, lines_read: int, latest: str) -> str:
    """Return the text of a row that contradicts itself, or refuse the file where the rows beyond are in doubt."""
    if lines_read > line + 1 or "unexpected end" in str(error):
        what = f"a quotation mark opened in this row (text row {line + 1}) is not closed."
        raise _refuse(file, row, what, _CLOSE_QUOTES) from error
    if "field larger" in str(error):
        raise _refuse(file, row, f"a cell is longer than {LONGEST_CELL} characters.", "Shorten it.") from error
    return latest.rstrip("\r\n")


def read_blocks(pieces: Iterable[str], *, delimiter: str, file: str) -> Iterator[Block]:
    """Yield the rows of a delimited text, given in pieces that end where a line ends, some hundreds at a time.

    Raises
    ------
    InputError
        If a quotation mark is not closed, or the file has too many rows or columns or too long a cell.
    """
    text_lines = _TextLines(pieces)
    reader = csv.reader(text_lines, delimiter=delimiter, strict=True)
    first, line, width = 0, 0, 0
    while True:
        block = Block(first, [], {})
        try:
            block.rows.extend(islice(reader, BLOCK))
        except csv.Error as error:
            line += len(block.rows) + sum(map(_newlines, block.rows))
            row = first + len(block.rows)
            latest = text_lines.line(reader.line_num)
            block.damaged[len(block.rows)] = _damaged(error, file, row + 1, line, reader.line_num, latest)
            block.rows.append([])
            line = reader.line_num - len(block.rows)
        if not block.rows:
            return
        spans, line = reader.line_num - line != len(block.rows), reader.line_num
        width = width or max(map(len, block.rows))
        _refuse_oversize(block, file)
        if spans:
            _refuse_swallowed(block, delimiter, file, width)
        if spans or text_lines.any_long:
            _refuse_long_cells(block, file)
        first += len(block.rows)
        yield block


def _refuse_swallowed(block: Block, delimiter: str, file: str, width: int) -> None:
    """Refuse a record whose quoted cell has swallowed rows: an unclosed quotation mark that a later one closed."""
    for index, row in enumerate(block.rows, start=block.first):
        breaks = _newlines(row)
        if not breaks:
            continue
        texts = (line for cell in row if "\n" in cell or "\r" in cell for line in re.split(r"[\r\n]+", cell))
        widest = max(line.count(delimiter) for line in texts)
        if breaks > MOST_NEWLINES or widest >= max(4, width - 1):
            what = f"a quotation mark opened in this row swallows {breaks} line breaks: it is not closed in its row."
            raise _refuse(file, index + 1, what, _CLOSE_QUOTES)


def _refuse_oversize(block: Block, file: str) -> None:
    if block.first + len(block.rows) > MOST_ROWS:
        raise _refuse(file, None, f"the file has more than {MOST_ROWS} rows.", "Split the list by unit or area.")
    widest = max(map(len, block.rows))
    if widest > MOST_COLUMNS:
        row = next(index for index, cells in enumerate(block.rows, start=block.first) if len(cells) == widest)
        what = f"the row has {widest} columns, more than {MOST_COLUMNS}."
        raise _refuse(file, row + 1, what, "Check the delimiter, or leave out the columns that no check needs.")


def _refuse_long_cells(block: Block, file: str) -> None:
    for index, row in enumerate(block.rows, start=block.first):
        for position, cell in enumerate(row):
            if len(cell) > LONGEST_CELL:
                what = f"cell {position + 1} has {len(cell)} characters, more than {LONGEST_CELL}: {shown(cell)}."
                raise _refuse(file, index + 1, what, "Shorten it, or check the quotation marks of the row.")


def _decimal_commas(pieces: Iterable[str], delimiter: str) -> bool:
    """Return whether a list that is not parted by commas writes its decimals with commas."""
    if delimiter == ",":
        return False
    edge = re.escape(delimiter)
    decimal = re.compile(rf"(?:^|[{edge}\"]) *[-+]?\d+,\d+ *(?:[{edge}\"\r\n]|$)", re.MULTILINE)
    return any("," in piece and decimal.search(piece) is not None for piece in pieces)


def _refuse_fixed_width(text: str, delimiter: str, hints: Mapping[str, str], file: str) -> None:
    """Refuse a table whose columns are parted by runs of blanks: where one ends cannot be told from the text."""
    if (
        max((header_score(row, hints) for row in _sample(text, delimiter) if len(row) > 1), default=0)
        >= LINE_NUMBER_WEIGHT
    ):
        return
    for index, line in enumerate(text[:SAMPLE].splitlines()[:ROWS_SEARCHED]):
        cells = re.split(r" {2,}|\t+", line.strip())
        if len(cells) > 2 and header_score(cells, hints) > LINE_NUMBER_WEIGHT:
            what = "no table found: the columns are parted by blanks (fixed width), so cells cannot be told apart."
            raise _refuse(file, index + 1, what, "Ask for the list as CSV, or open it in a spreadsheet and save it so.")


def read_form(pieces: Sequence[str], *, hints: Mapping[str, str], file: str) -> Form:
    """Return the delimiter of a text, whether it is written with decimal commas, and its first rows.

    Raises
    ------
    InputError
        If the text is a table of fixed width.
    """
    start = _start(pieces)
    delimiter, note = _delimiter(start, hints)
    _refuse_fixed_width(start, delimiter, hints, file)
    comma = _decimal_commas(pieces, delimiter)
    head = tuple(map(tuple, _sample(start, delimiter)))
    return Form(delimiter, comma, head, (note,))


def _start(pieces: Iterable[str]) -> str:
    start = ""
    for piece in pieces:
        start += piece[:SAMPLE]
        if len(start) >= SAMPLE:
            break
    return start[:SAMPLE]
