"""Sorting the rows beneath the header: which are lines, and why the others are none."""

from __future__ import annotations

from collections.abc import Collection, Sequence

import numpy as np

from checker.intake.cells import CodedCells, NumberCells
from checker.intake.later_headers import LaterHeaders
from checker.intake.plain_numbers import PARTING
from checker.intake.row_kinds import (
    HOLDS_NOTHING,
    LONGEST_NO_NUMBER,
    RepeatedRows,
    deleted_word,
    doubts_line,
    heading_test,
    may_be_no_line,
    no_line_number,
    only_spare,
    says_deleted,
    why_no_line,
)
from checker.intake.table_rows import Cells, Table
from checker.intake.texts import shown
from checker.model import Address, BoolArray, UnreadItem

__all__ = ["Sorting"]


def _numbers(written: tuple[str, ...]) -> tuple[str, ...]:
    """Return line numbers with runs of blanks and line breaks as one blank; the same tuple where there are none."""
    joined = PARTING.join(("", *written, ""))
    if joined.isascii() and not any(sign in joined for sign in ("  ", " \0", "\0 ", *"\t\n\r\x0b\x0c\x1c\x1d\x1e\x1f")):
        return written
    return tuple(" ".join(text.split()) for text in written)


def _row(columns: Sequence[Cells], index: int) -> list[str]:
    """Return the cells of a row that are not blank."""
    return [text for column in columns if (text := column[index].strip())]


class Sorting:
    """Sorts the rows beneath the header: `keep` says which are lines; the others are listed or blank."""

    def __init__(self, table: Table, columns: tuple[Cells, ...], line_column: int, file: str, header: str) -> None:
        self.columns = columns
        written = tuple(columns[line_column])
        self.numbers = _numbers(written)
        self.as_written = self.numbers is written
        self.keep = np.ones(len(self.numbers), dtype=np.bool_)
        self.unread: list[UnreadItem] = []
        self.deleted: list[UnreadItem] = []
        self.questions: list[UnreadItem] = []
        self._row_numbers = table.row_numbers
        self._broken = table.broken
        self._line_column, self._file, self._header = line_column, file, header

    def _put(self, index: int, reason: str) -> None:
        text = " | ".join(filled) if (filled := _row(self.columns, index)) else ""
        row = self._row_numbers[index]
        address = Address(self._file, row, self._header)
        self.keep[index] = False
        self.unread.append(UnreadItem("", text[:200], f"Row {row} {shown(text)}: {reason}", address))

    def _delete(self, index: int, reason: str) -> None:
        row, number = self._row_numbers[index], self.numbers[index]
        self.keep[index] = False
        item = UnreadItem(number, number, f"Row {row}: {reason}", Address(self._file, row, self._header))
        self.deleted.append(item)

    def other_tables(self, later: LaterHeaders) -> None:
        """Take out the rows of headers or units that differ from the first ones, and refuse what is beneath them."""
        found, spans = later.differences(self.numbers, self.columns, self._row_numbers)
        for difference in found:
            self._put(difference.index, f"{difference.reason}, so it begins another table.")
        for first, end, reason in spans:
            self._broken.update(dict.fromkeys(range(first + 1, end), reason))

    def by_number(self, repeated: RepeatedRows) -> None:
        """Take out blank rows, repeats of the header, totals, notes, and lines called deleted instead of numbered."""
        suspects = may_be_no_line(self.numbers, repeated)
        deleted = deleted_word([self.numbers[index] for index in suspects])
        for index, is_deleted in zip(suspects, deleted, strict=True):
            if not self.keep[index]:
                continue
            number, row = self.numbers[index], [column[index] for column in self.columns]
            if is_deleted:
                self._delete(index, says_deleted("line number", number))
            elif not any(cell.strip() for cell in row):
                self.keep[index] = False
            elif reason := repeated.why(number, row) or why_no_line(number, row, self._line_column):
                self._put(index, reason)

    def by_words(self, said_columns: Collection[int], status_columns: Collection[int], headers: Sequence[str]) -> None:
        """Take out the lines that are called deleted: in their remarks or status, or in the one cell they fill.

        Where a cell only lets suspect that its line is deleted, the line is kept and the cell is asked about.
        """
        for position, column in enumerate(self.columns):
            if position == self._line_column:
                continue
            self._delete_said(position, headers[position], said=position in said_columns)
            if position in said_columns:
                doubtful = np.array(doubts_line(column.texts, status=position in status_columns), dtype=np.bool_)
                for index in self._with(column, doubtful):
                    self._ask(index, headers[position], column[index])

    def _with(self, column: Cells, chosen: BoolArray) -> list[int]:
        """Return the rows kept whose cell is one of the chosen distinct texts of a column."""
        if not chosen.any():
            return []
        mine: list[int] = np.flatnonzero(chosen[column.codes] & (column.codes >= 0) & self.keep).tolist()
        return mine

    def _delete_said(self, position: int, header: str, *, said: bool) -> None:
        column = self.columns[position]
        for index in self._with(column, np.array(deleted_word(column.texts), dtype=np.bool_)):
            text = column[index]
            if self._says_nothing_else(index) or (said and not only_spare(text)):
                self._delete(index, says_deleted(f"column {shown(header)}", text))
            else:
                self._ask(index, header, text)

    def _ask(self, index: int, header: str, text: str) -> None:
        """Ask whether a line is deleted that is checked as it stands."""
        row = self._row_numbers[index]
        reason = (
            f"row {row}: column {shown(header)} says {shown(text)}: is the line deleted? It is checked as it stands; "
            "write DELETED alone in its remarks or status, or nothing of the kind."
        )
        self.questions.append(UnreadItem(self.numbers[index], text[:200], reason, Address(self._file, row, header)))

    def without_number(self) -> None:
        """Refuse the values of rows whose line number can be none: an error value, a yes or no, zero."""
        short = {number for number in self.numbers if len(number) <= LONGEST_NO_NUMBER}
        reasons = {number: reason for number in short if (reason := no_line_number(number))}
        if not reasons:
            return
        for index, number in enumerate(self.numbers):
            if self.keep[index] and number in reasons:
                self._broken[index] = reasons[number]

    def _says_nothing_else(self, index: int) -> bool:
        """Return whether every cell of a row besides its line number is blank, a dash or the word itself."""
        cells = [column[index].strip() for place, column in enumerate(self.columns) if place != self._line_column]
        filled = [cell for cell in cells if not HOLDS_NOTHING.fullmatch(cell)]
        return all(deleted_word(filled))

    def struck(self, struck: Collection[int]) -> None:
        """Take out the lines that are struck through."""
        for index, row in enumerate(self._row_numbers if struck else ()):
            if self.keep[index] and row - 1 in struck:
                self._delete(index, "the line is struck through, so it is taken as deleted and is not checked.")

    def headings(self) -> None:
        """Take out rows that hold a heading and nothing else."""
        alone = self._alone()
        if not alone:
            return
        apart = set(alone)
        is_heading = heading_test(
            number for index, number in enumerate(self.numbers) if self.keep[index] and index not in apart
        )
        for index in alone:
            if is_heading(self.numbers[index]):
                self._put(index, "it is a heading, not a line.")

    def _alone(self) -> list[int]:
        """Return the rows kept that hold nothing besides their line number; a dash holds nothing."""
        mine = np.flatnonzero(self.keep)
        for numbers in (column for column in self.columns if isinstance(column, NumberCells)):
            nothing = np.array([HOLDS_NOTHING.fullmatch(text.strip()) is not None for text in numbers.texts])
            codes = numbers.codes[mine]
            mine = mine[(codes >= 0) & nothing[codes]]
        alone: list[int] = mine.tolist()
        for position, column in enumerate(self.columns):
            if position != self._line_column and isinstance(column, CodedCells):
                alone = [index for index in alone if HOLDS_NOTHING.fullmatch(column[index].strip())]
        return alone
