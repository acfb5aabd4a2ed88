"""Where the table begins: the header row or rows, and the row of units beneath them."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from checker.errors import InputError, Problem
from checker.intake.headers import HeaderReading, read_header
from checker.intake.texts import key_of, place, shown
from checker.intake.unit_words import is_unit_text

__all__ = ["Layout", "find_layout", "header_score", "line_number_columns"]

ROWS_SEARCHED = 30
LINE_NUMBER_WEIGHT = 1000
ENOUGH = LINE_NUMBER_WEIGHT + 4
_LETTER = re.compile(r"[^\W\d_]")


@dataclass(frozen=True, slots=True)
class Layout:
    """Headers (of two rows where two carry them), units beneath them, the first row of lines, and what to say of it."""

    headers: tuple[str, ...]
    units: tuple[str, ...]
    header_row: int
    first_row: int
    notes: tuple[str, ...]


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


def _joined(upper: Sequence[str], lower: Sequence[str]) -> tuple[str, ...]:
    """Return two header rows as one: a group name holds for the blanks to its right."""
    width = max(len(upper), len(lower))
    upper, lower = [*upper, *[""] * (width - len(upper))], [*lower, *[""] * (width - len(lower))]
    group, joined = "", []
    for over, under in zip(upper, lower, strict=True):
        group = over.strip() or (group if under.strip() else "")
        joined.append(f"{group} {under.strip()}".strip() if group != under.strip() else group)
    return tuple(joined)


def _is_units_row(row: Sequence[str], headers: Sequence[str], line_column: int) -> bool:
    first = row[line_column].strip().casefold() if line_column < len(row) else ""
    if first not in ("", "-", "units", "unit", "uom"):
        return False
    cells = [cell.strip() for index, cell in enumerate(row[: len(headers)]) if index != line_column and cell.strip()]
    known = sum(is_unit_text(_bare(cell)) for cell in cells)
    return known > 0 and 2 * known >= len(cells)


def _bare(cell: str) -> str:
    """Return a units cell without the brackets around it."""
    text = cell.strip()
    return text[1:-1] if text[:1] in "[(" and text[-1:] in "])" and len(text) > 2 else text


def _is_numbering(row: Sequence[str]) -> bool:
    """Return whether a row only numbers the columns."""
    cells = [cell.strip().strip("()") for cell in row if cell.strip()]
    return len(cells) > 2 and cells == [str(number) for number in range(1, len(cells) + 1)]


def _best(rows: Sequence[Sequence[str]], hints: Mapping[str, str]) -> tuple[int, int]:
    best, best_score = 0, 0
    for index, row in enumerate(rows[:ROWS_SEARCHED]):
        score = header_score(row, hints)
        if score > best_score:
            best, best_score = index, score
        if score >= ENOUGH:
            break
    return best, best_score


def _refuse(file: str, row: int, cells: Sequence[str], score: int) -> InputError:
    if score < 3:
        return InputError(
            Problem(
                f"no table found: none of the first {ROWS_SEARCHED} rows holds headers of a line list.",
                where=place(file),
                remedy="Give a header row with a line-number column; `linelist fields` shows the spellings understood.",
            )
        )
    named = ", ".join(shown(cell) for cell in cells if cell.strip())
    return InputError(
        Problem(
            f"no line-number column among the headers {named[:600]}.",
            where=place(file, row),
            remedy="Head it 'Line No', or name its header in [columns] of the criteria.",
        )
    )


def line_number_columns(headers: Sequence[str], hints: Mapping[str, str]) -> list[int]:
    """Return the columns whose header names the line number; one that the criteria name comes first."""
    mine = [index for index, cell in enumerate(headers) if _line_number_header(cell, hints)]
    return sorted(mine, key=lambda index: key_of(headers[index]) not in hints)


def find_layout(rows: Sequence[Sequence[str]], *, file: str, hints: Mapping[str, str]) -> Layout:
    """Find the header row, a second header row, and a units row.

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
        If no row holds headers, or the headers hold no line number.
    """
    index, score = _best(rows, hints)
    if score < LINE_NUMBER_WEIGHT:
        raise _refuse(file, index + 1, rows[index] if rows else (), score)
    headers = tuple(cell.strip() for cell in rows[index])
    line_column = line_number_columns(headers, hints)[0]
    notes, follows = [f"Headers in row {index + 1}."], index + 1
    lower = rows[follows] if follows < len(rows) else ()
    blank_beneath = line_column >= len(lower) or not lower[line_column].strip()
    if lower and blank_beneath and not _is_units_row(lower, headers, line_column):
        joined = _joined(headers, lower)
        if header_score(joined, hints) > score:
            headers, follows = joined, follows + 1
            notes = [f"Headers in rows {index + 1} and {index + 2}, read together."]
    units: tuple[str, ...] = ("",) * len(headers)
    for ahead in range(follows, min(follows + 2, len(rows))):
        if _is_units_row(rows[ahead], headers, line_column):
            units = tuple(_bare(cell) for cell in rows[ahead])[: len(headers)]
            units += ("",) * (len(headers) - len(units))
            notes.append(f"Units in row {ahead + 1}.")
            follows = ahead + 1 if ahead == follows else follows
            break
    while follows < len(rows) and _is_numbering(rows[follows]):
        notes.append(f"Row {follows + 1} numbers the columns: left out.")
        follows += 1
    return Layout(headers, units, index + 1, follows + 1, tuple(notes))
