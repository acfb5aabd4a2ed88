"""What a strike through cells means for their row: the line deleted, or a question."""

from __future__ import annotations

from collections.abc import Sequence

from checker.intake.texts import shown
from checker.intake.workbook.cell_texts import beyond_figures
from checker.intake.workbook.raw import RawSheet

__all__ = ["settle_line_numbers", "struck_rows"]


def _written(row: Sequence[str], width: int) -> list[int]:
    return [column for column, cell in enumerate(row[:width]) if cell.strip()]


def _refuse_row(raw: RawSheet, row: int, width: int, reason: str) -> None:
    for column in _written(raw.rows[row], width):
        raw.refused[row, column] = reason


def struck_rows(raw: RawSheet, first: int, width: int, line_column: int) -> frozenset[int]:
    """Return the rows that are struck through as deleted lines; other struck cells are refused with a question.

    A row is deleted where each of its cells is struck, or its line number and most of its cells are. Where
    the line number alone is struck, none of the row's values is used.

    Parameters
    ----------
    raw : RawSheet
        The sheet; refusals are added to it.
    first, width, line_column : int
        First row of lines and column of the line number, counted from 0, and number of columns of the table.
    """
    deleted = set()
    for row, columns in raw.struck.items():
        written, struck = _written(raw.rows[row], width), {column for column in columns if column < width}
        if row < first or not struck:
            continue
        if struck.issuperset(written) or (line_column in struck and 2 * len(struck) > len(written)):
            deleted.add(row)
        elif line_column in struck:
            number = shown(raw.rows[row][line_column])
            reason = f"the line number {number} is struck through, but other cells of its row are not: is it deleted?"
            _refuse_row(raw, row, width, f"{reason} Strike the whole row, or none of it.")
        else:
            for column in sorted(struck):
                text = shown(raw.rows[row][column])
                raw.refused[row, column] = f"{text} is struck through: write the value that holds, or leave it blank."
    return frozenset(deleted)


def settle_line_numbers(raw: RawSheet, first: int, width: int, line_column: int) -> None:
    """Ask for line numbers that are dates, and refuse every value of a row whose line number is not known.

    It is not known where it is a formula that was never calculated, or a number that has lost figures.

    Parameters
    ----------
    raw : RawSheet
        The sheet; refusals are added to it.
    first, width, line_column : int
        First row of lines and column of the line number, counted from 0, and number of columns of the table.
    """
    for row, column in [at for at in raw.refused if at[0] >= first and at[1] == line_column]:
        if raw.rows[row][column].startswith("="):
            _refuse_row(raw, row, width, f"the line number of the row is not known: {raw.refused[row, column]}")
    for (row, column), reason in raw.no_numbers.items():
        if row >= first and column == line_column and (row, column) not in raw.as_shown:
            raw.refused.setdefault((row, column), reason)
            if beyond_figures(raw.rows[row][column]):
                _refuse_row(raw, row, width, f"the line number of the row is not known: {reason}")
