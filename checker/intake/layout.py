"""Where the table begins: the header row or rows, and the row of units beneath them."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

from checker.errors import InputError, Problem
from checker.intake.header_beneath import cases_beneath, with_units_beneath_groups, words_beneath
from checker.intake.header_groups import names_group, with_groups
from checker.intake.header_reach import within_reach
from checker.intake.header_rows import (
    bare,
    count_numbers,
    count_understood,
    is_numbering,
    is_symbols_row,
    is_units_row,
    join_rows,
    names_quantities,
)
from checker.intake.headers import HeaderReading, read_header
from checker.intake.texts import key_of, place, shown

__all__ = ["Layout", "find_layout", "header_score", "line_number_columns"]

ROWS_SEARCHED = 40
LINE_NUMBER_WEIGHT = 1000
ENOUGH = LINE_NUMBER_WEIGHT + 4
MOST_HEADER_ROWS = 5
LONGEST_LINE_HEADER = 40
FEW_NUMBERS = 2
COLUMNS_SEARCHED = 3
_LETTER = re.compile(r"[^\W\d_]")


@dataclass(frozen=True, slots=True)
class Layout:
    """Headers (of two rows where two carry them), units beneath them, the first row of lines, and what to say of it.

    `doubts` says by column why it must not be read plainly; `cases` gives a column's own header and the case
    beneath it, where a text names the case that is no usual case name.
    """

    headers: tuple[str, ...]
    units: tuple[str, ...]
    header_row: int
    first_row: int
    notes: tuple[str, ...]
    doubts: Mapping[int, str] = field(default_factory=dict)
    cases: Mapping[int, tuple[str, str]] = field(default_factory=dict)


def _line_number_header(cell: str, hints: Mapping[str, str]) -> bool:
    hinted = hints.get(key_of(cell))
    reading = None if hinted is not None else read_header(cell)
    return hinted == "line_number" or (reading is not None and reading.fields[0].name == "line_number")


def _worth(cell: str, hints: Mapping[str, str]) -> int:
    if len(cell) > 120 or not _LETTER.search(cell):
        return 0
    hinted = hints.get(key_of(cell))
    reading: HeaderReading | None = None if hinted is not None else read_header(cell)
    if hinted is None and reading is None:
        return 0
    if _line_number_header(cell, hints):
        return LINE_NUMBER_WEIGHT
    return 1 if hinted is not None or len(key_of(cell)) > 1 else 0


def header_score(cells: Sequence[str], hints: Mapping[str, str]) -> int:
    """Return how much a row looks like headers: a line-number header weighs more than all others together."""
    worths = [_worth(cell, hints) for cell in cells]
    return min(sum(worths), LINE_NUMBER_WEIGHT + sum(worth == 1 for worth in worths))


def _best(rows: Sequence[Sequence[str]], hints: Mapping[str, str]) -> tuple[int, int]:
    best, best_score = 0, 0
    for index, row in enumerate(rows[:ROWS_SEARCHED]):
        score = header_score(row, hints)
        if score > best_score:
            best, best_score = index, score
        if score >= ENOUGH:
            break
    return best, best_score


def _has_line_number(row: Sequence[str], hints: Mapping[str, str]) -> bool:
    """Return whether a row holds a line-number header; a cell with digits is none, which spares reading the lines."""
    return any(
        len(cell) <= LONGEST_LINE_HEADER and not any(map(str.isdigit, cell)) and _line_number_header(cell, hints)
        for cell in row
        if cell.strip()
    )


def _legend_passed(rows: Sequence[Sequence[str]], index: int, hints: Mapping[str, str]) -> int:
    """Return the row of the headers where the first row with a line-number header is one of a legend or title block.

    It is one where a later row has more headers of numbers, and the first has next to none or nothing beneath it.
    """
    best, most = index, count_numbers(rows[index], hints)
    for later in range(index + 2, min(len(rows), ROWS_SEARCHED)):
        if not _has_line_number(rows[later], hints):
            continue
        numbers = count_numbers(rows[later], hints)
        nothing_between = not any(cell.strip() for row in rows[best + 1 : later] for cell in row)
        if numbers > most and (nothing_between or most < FEW_NUMBERS <= numbers - most):
            best, most = later, numbers
    return best


def _refuse(file: str, rows: Sequence[Sequence[str]], index: int, score: int, hints: Mapping[str, str]) -> InputError:
    """Return the refusal of a file without a line-number column, or without headers at all."""
    for position in range(COLUMNS_SEARCHED):
        column = [cells[position] for cells in rows[:ROWS_SEARCHED] if position < len(cells)]
        beneath = count_understood([cell.strip() for cell in column], hints)
        if beneath >= 3 and beneath > score:
            return _transposed(f"{beneath} headers stand in column {position + 1}", file, None)
    if score < 3:
        return InputError(
            Problem(
                f"no table found: none of the first {ROWS_SEARCHED} rows holds headers of a line list.",
                where=place(file),
                remedy="Give a header row with a line-number column; `linelist fields` shows the spellings understood.",
            )
        )
    cells = rows[index]
    named = ", ".join(shown(cell) for cell in cells if cell.strip())
    blank = [str(position + 1) for position, cell in enumerate(cells) if not cell.strip()][:3]
    which = f" (column {' or '.join(blank)}, without a header, if it holds the numbers)" if blank else ""
    return InputError(
        Problem(
            f"no line-number column among the headers {named[:600]}.",
            where=place(file, index + 1),
            remedy=f"Head it 'Line No'{which}, or name its header in [columns] of the criteria.",
        )
    )


def _transposed(what: str, file: str, row: int | None) -> InputError:
    remedy = "Turn it (copy, paste special, transpose), so that each line is a row and the headers are the first row."
    return InputError(
        Problem(f"the table is transposed: {what}, one line a column.", where=place(file, row), remedy=remedy)
    )


def line_number_columns(headers: Sequence[str], hints: Mapping[str, str]) -> list[int]:
    """Return the columns whose header names the line number; one that the criteria name comes first."""
    mine = [index for index, cell in enumerate(headers) if _line_number_header(cell, hints)]
    return sorted(mine, key=lambda index: key_of(headers[index]) not in hints)


def _refuse_transposed(rows: Sequence[Sequence[str]], index: int, hints: Mapping[str, str], file: str) -> None:
    """Refuse a table whose lines stand in columns: its headers run down one column.

    Raises
    ------
    InputError
        If more headers stand beneath the line number's than beside it.
    """
    row = rows[index]
    line_column = next(position for position, cell in enumerate(row) if _line_number_header(cell, hints))
    beside = sum(_worth(cell, hints) == 1 for cell in row)
    column = [cells[line_column] for cells in rows[index + 1 : ROWS_SEARCHED] if line_column < len(cells)]
    beneath = count_understood(column, hints)
    if beneath >= 3 and beneath > beside:
        raise _transposed(f"{beneath} headers stand beneath {shown(row[line_column])}", file, index + 1)


@dataclass(frozen=True, slots=True)
class _Above:
    """Headers with the rows above them, how many rows were used, and the columns in doubt."""

    headers: tuple[str, ...]
    used: int
    doubts: Mapping[int, str]


def _split_line_number(
    above: Sequence[str], headers: tuple[str, ...], hints: Mapping[str, str]
) -> tuple[str, ...] | None:
    """Return the headers joined with a row above that has a line-number header too; None where that says nothing."""
    joined = join_rows(above, headers, hints)
    keeps_line_number = any(_line_number_header(cell, hints) for cell in joined)
    as_many = count_understood(joined, hints) >= count_understood(headers, hints)
    return joined if as_many and keeps_line_number else None


def _with_rows_above(
    rows: Sequence[Sequence[str]], index: int, headers: tuple[str, ...], hints: Mapping[str, str]
) -> _Above:
    """Return the headers with the group names of the row above them, of two rows where both name groups."""
    plain = _Above(headers, 0, {})
    above = rows[index - 1] if index else ()
    if not any(cell.strip() for cell in above):
        return plain
    if any(_line_number_header(cell, hints) for cell in above):
        joined = _split_line_number(above, headers, hints)
        return _Above(joined, 1, {}) if joined else plain
    lines = line_number_columns(headers, hints)[:1]
    found = with_groups(above, headers, lines, hints)
    if tuple(found.headers) == headers and not found.doubts:
        return plain
    higher = [cell if names_group(cell) else "" for cell in (rows[index - 2] if index > 1 else ())]
    if not any(higher):
        return _Above(tuple(found.headers), 1, found.doubts)
    twice = with_groups(higher, found.headers, lines, hints)
    return _Above(tuple(twice.headers), 2, found.doubts | twice.doubts)


def _no_number(row: Sequence[str], headers: Sequence[str], line_column: int) -> bool:
    """Return whether a row beneath the headers has no line number: a blank, a dash, or words of the header's own."""
    cell = row[line_column].strip() if line_column < len(row) else ""
    if cell in ("", "-", "\u2013") or cell.casefold() == headers[line_column].casefold():
        return True
    return len(cell) > 1 and cell.isalpha() and _line_number_header(f"{headers[line_column]} {cell}", {})


@dataclass
class _Beneath:
    """What was found beneath the first header row."""

    headers: tuple[str, ...]
    units: tuple[str, ...]
    follows: int
    joined: list[int]
    notes: list[str]
    doubts: dict[int, str] = field(default_factory=dict)
    cases: dict[int, tuple[str, str]] = field(default_factory=dict)


def _deeper(
    rows: Sequence[Sequence[str]], number: int, headers: tuple[str, ...], hints: Mapping[str, str]
) -> tuple[str, ...] | None:
    """Return the headers read with two more rows beneath them, None where that makes no more of them understood.

    A row of group names (normal, maximum) says nothing by itself; read over the row beneath it, it does.
    """
    line_column = line_number_columns(headers, hints)[0]
    beneath = rows[number + 1] if number + 1 < len(rows) else ()
    if not any(cell.strip() for cell in beneath) or not _no_number(beneath, headers, line_column):
        return None
    ends = {index for index, header in enumerate(headers) if header}
    joined = join_rows(headers, join_rows(rows[number], beneath, hints, ends=ends), hints)
    return joined if count_understood(joined, hints) > count_understood(headers, hints) + 1 else None


def _each_beneath_its_own(row: Sequence[str], headers: Sequence[str]) -> bool:
    """Return whether nearly every text of a row stands beneath a header of its own, as symbols do."""
    above = [index < len(headers) and bool(headers[index]) for index, cell in enumerate(row) if cell.strip()]
    return 5 * sum(above) >= 4 * len(above)


def _join_beneath(
    found: _Beneath, rows: Sequence[Sequence[str]], number: int, line_column: int, hints: Mapping[str, str]
) -> bool:
    """Read a row as headers, with the next one if need be, or as symbols; return whether it is one of these."""
    row = rows[number]
    cases = None if found.units or found.cases else cases_beneath(row, found.headers, hints)
    if cases is not None:
        found.headers, found.follows = tuple(cases.headers), number + 1
        found.cases |= cases.cases
        found.doubts |= cases.doubts
        found.joined.append(number)
        return True
    joined = join_rows(found.headers, row, hints)
    better = count_understood(joined, hints) > count_understood(found.headers, hints)
    words = names_quantities(row, found.headers, hints) or words_beneath(row, joined, hints)
    symbols = not better and is_symbols_row(row, line_column) and _each_beneath_its_own(row, found.headers)
    if not found.units and (better or words) and not symbols:
        found.headers, doubts = within_reach(found.headers, row, joined, hints)
        found.follows, found.doubts = number + 1, found.doubts | doubts
        found.joined.append(number)
        return True
    deeper = None if found.units else _deeper(rows, number, found.headers, hints)
    if deeper is not None:
        found.headers, found.follows = deeper, number + 2
        found.joined += [number, number + 1]
        return True
    if is_symbols_row(row, line_column):
        found.notes.append(f"Row {number + 1} holds symbols: left out.")
        found.follows = number + 1
        return True
    return False


def _read_beneath(
    rows: Sequence[Sequence[str]], index: int, headers: tuple[str, ...], hints: Mapping[str, str]
) -> _Beneath:
    """Read the rows beneath a header row: further header rows, symbols, units and a numbering of the columns."""
    found = _Beneath(headers, (), index + 1, [], [])
    line_column = line_number_columns(headers, hints)[0]
    while found.follows < min(index + 1 + MOST_HEADER_ROWS, len(rows)):
        number = found.follows
        row = rows[number]
        if is_numbering(row):
            found.notes.append(f"Row {number + 1} numbers the columns: left out.")
        elif not found.units and is_units_row(row, found.headers, line_column, hints):
            found.units = tuple(bare(cell) for cell in row)
            found.headers, doubts = with_units_beneath_groups(found.headers, found.units, hints)
            found.doubts |= doubts
            found.notes.append(f"Units in row {number + 1}.")
        elif any(cell.strip() for cell in row) and _no_number(row, found.headers, line_column):
            if _join_beneath(found, rows, number, line_column, hints):
                continue
            break
        else:
            break
        found.follows = number + 1
    return found


def find_layout(rows: Sequence[Sequence[str]], *, file: str, hints: Mapping[str, str]) -> Layout:
    """Find the header rows, one to three, and the rows of units, symbols and column numbers beneath them.

    Parameters
    ----------
    rows : sequence of rows
        At least the first rows of the file.
    file : str
        Name of the file, for messages.
    hints : mapping of str to str
        Field of each header key that the criteria explain.

    Raises
    ------
    InputError
        If no row holds headers, the headers hold no line number, or the lines stand in columns.
    """
    index, score = _best(rows, hints)
    if score < LINE_NUMBER_WEIGHT:
        raise _refuse(file, rows, index, score, hints)
    first = index
    index = _legend_passed(rows, first, hints)
    _refuse_transposed(rows, index, hints, file)
    headers = tuple(cell.strip() for cell in rows[index])
    above = _with_rows_above(rows, index, headers, hints)
    found = _read_beneath(rows, index, above.headers, hints)
    numbers = [*range(index + 1 - above.used, index + 1), index + 1, *(number + 1 for number in found.joined)]
    if len(numbers) > 1:
        notes = [f"Headers in rows {', '.join(map(str, numbers[:-1]))} and {numbers[-1]}, read together."]
    else:
        notes = [f"Headers in row {index + 1}."]
    if index != first:
        notes.append(
            f"Row {first + 1} names a line number too, but few numbers: the rows above row {index + 1} are not read."
        )
    units = (*found.units, *[""] * len(found.headers))[: len(found.headers)]
    doubts = {**above.doubts, **found.doubts}
    return Layout(found.headers, units, index + 1, found.follows + 1, (*notes, *found.notes), doubts, found.cases)
