"""Headers beneath the first one: a row of headers or units that differs makes the values beneath it another table's."""

from __future__ import annotations

import re
from collections.abc import Collection, Iterable, Sequence
from dataclasses import dataclass
from itertools import islice

import numpy as np

from checker.intake.cells import CodedCells, NumberCells
from checker.intake.header_rows import bare, is_numbering, is_units_row
from checker.intake.headers import read_header
from checker.intake.layout import Layout
from checker.intake.placeholders import AMBIENT, ATMOSPHERE, FULL_VACUUM, NO_FLOW, ditto, placeholder, word_of
from checker.intake.texts import key_of, shown, spared, tidy
from checker.intake.unit_words import is_unit_text
from checker.model import Gap, IntArray

__all__ = ["Difference", "LaterHeaders", "folded_row"]

UNDERSTOOD = 3
LONGEST_HEADER = 120
_WORDED = re.compile(r"\s*[\[(]?[^\W\d_\s]")
_DIGIT = re.compile(r"\d")
_A_NUMBER = re.compile(r"\s*[-+<>~]?\s*[\d.,]*\d")
_NOTHING = re.compile(r"[-_\u2013\u2014\s]*$")
_STAND_INS = AMBIENT | ATMOSPHERE | FULL_VACUUM | NO_FLOW
_REMEDY = "so the values beneath it are not read: give each table a sheet or file of its own, with one header."


@dataclass(frozen=True, slots=True)
class Difference:
    """A row of headers or units that is not that of the list, by its index among the rows read, and what to say."""

    index: int
    reason: str


def folded_row(row: Iterable[str], width: int) -> tuple[str, ...]:
    """Return the cells of a row as two rows are compared: no blanks, stops or capitals, no blank cells behind."""
    cells = [spared(cell) for cell in islice(row, width)]
    while cells and not cells[-1]:
        cells.pop()
    return tuple(cells)


class LaterHeaders:
    """The header rows of a list, to tell a row beneath that repeats them from one that begins another table.

    Parameters
    ----------
    head : sequence of rows
        The first rows of the file.
    layout : Layout
        What was understood of its headers.
    line_column : int
        Column of the line number.
    number_columns : collection of int
        Columns whose headers promise numbers.
    """

    def __init__(
        self, head: Sequence[Sequence[str]], layout: Layout, line_column: int, number_columns: Collection[int]
    ) -> None:
        self._layout, self._line_column, self._width = layout, line_column, len(layout.headers)
        self._number_columns = sorted(number_columns)
        self._grouped = _grouped(head, layout)
        first = layout.header_row - 1 - self._grouped
        self._rows = [row for row in head[first : layout.first_row - 1] if _tells(row)]
        self._first = first + 1
        self._folded = [folded_row(row, self._width) for row in self._rows]
        self._above = {folded_row(row, self._width) for row in head[:first]}
        self._named = spared(layout.headers[line_column])
        raw = head[layout.header_row - 1] if layout.header_row <= len(head) else ()
        written = raw[line_column] if line_column < len(raw) else ""
        self._names = {self._named, spared(written)} - {""}

    def differences(
        self, numbers: Sequence[str], columns: Sequence[CodedCells | NumberCells], row_numbers: Sequence[int]
    ) -> tuple[list[Difference], list[tuple[int, int, str]]]:
        """Return the rows that differ from the header, and the spans of rows beneath them with the reason of each.

        A span ends where every row of the first header stands again, one beneath the other.
        """
        found: list[Difference] = []
        spans: list[tuple[int, int, str]] = []
        open_since, reason, seen, latest = -1, "", 0, -9
        for index in self._candidates(numbers, columns):
            row = [column[index] for column in columns]
            folded = folded_row(row, self._width)
            if folded in self._folded:
                seen = self._seen(folded, seen if index - latest <= 2 else 0)
                latest = index
                if seen == 0 and (why := self._other_groups(folded, columns, index - 1, row_numbers)):
                    open_since, reason = self._opened(found, spans, (open_since, reason), Difference(index - 1, why))
                if seen == len(self._folded) and open_since >= 0:
                    spans.append((open_since, index, reason))
                    open_since = -1
                continue
            why = "" if folded in self._above else self._why(row, row_numbers[index], after=index - latest <= 2)
            if why:
                open_since, reason = self._opened(found, spans, (open_since, reason), Difference(index, why))
                seen = 0
        if open_since >= 0:
            spans.append((open_since, len(numbers), reason))
        return found, spans

    @staticmethod
    def _opened(
        found: list[Difference], spans: list[tuple[int, int, str]], before: tuple[int, str], now: Difference
    ) -> tuple[int, str]:
        """Begin a span, and end the one before it."""
        found.append(now)
        if before[0] >= 0:
            spans.append((before[0], now.index, before[1]))
        return now.index, f"{now.reason}, {_REMEDY}"

    def _other_groups(
        self,
        folded: tuple[str, ...],
        columns: Sequence[CodedCells | NumberCells],
        above: int,
        row_numbers: Sequence[int],
    ) -> str:
        """Return why the group names above a repeated header are others, empty where there are none."""
        if not self._grouped or above < 0 or folded != self._folded[1]:
            return ""
        row = [column[above] for column in columns]
        if _DIGIT.search(row[self._line_column]) or not any(_WORDED.match(row[at]) for at in self._number_columns):
            return ""
        return (
            f"the groups of headers in row {row_numbers[above]} differ from those in row {self._first}"
            f"{self._where(row, self._rows[0])}"
        )

    def _seen(self, folded: tuple[str, ...], seen: int) -> int:
        """Return how many header rows have stood again in their order, this one among them."""
        if seen < len(self._folded) and folded == self._folded[seen]:
            return seen + 1
        return 1 if folded == self._folded[0] else 0

    def _candidates(self, numbers: Sequence[str], columns: Sequence[CodedCells | NumberCells]) -> list[int]:
        """Return the rows to look at: words instead of numbers, or the header of the line number once more."""
        worded = np.zeros(len(numbers), dtype=np.int32)
        for position in self._number_columns:
            column = columns[position]
            words = np.array([_is_word(text) for text in column.texts], dtype=np.bool_)
            if words.any():
                worded += words[column.codes] & (column.codes >= 0)
        enough = min(2, max(1, len(self._number_columns)))
        some: IntArray = np.flatnonzero(worded).astype(np.int32)
        mine = {index for index in some.tolist() if worded[index] >= enough or not _DIGIT.search(numbers[index])}
        longest = 2 * max(map(len, self._names), default=0)
        mine.update(
            index for index, number in enumerate(numbers) if len(number) <= longest and spared(number) in self._names
        )
        group = self._folded[0] if self._folded else ()
        if self._line_column >= len(group) or not group[self._line_column]:
            mine.update(self._same_rows(numbers, columns))
        return sorted(mine)

    def _same_rows(self, numbers: Sequence[str], columns: Sequence[CodedCells | NumberCells]) -> list[int]:
        """Return the rows without a line number that repeat a header row."""
        known = set(self._folded)
        blank = [index for index, number in enumerate(numbers) if not number]
        return [index for index in blank if folded_row((column[index] for column in columns), self._width) in known]

    def _why(self, row: Sequence[str], row_number: int, *, after: bool) -> str:
        """Return why a row begins another table, empty where it does not; `after` tells that a header row is above."""
        number = spared(row[self._line_column])
        others = [cell for index, cell in enumerate(row) if index != self._line_column and not _NOTHING.match(cell)]
        if not others:
            return ""
        if self._is_units(row):
            return self._units_differ(row, row_number, after=after)
        if number in self._names or self._is_header(row):
            return f"the header in row {row_number} differs from that in row {self._layout.header_row}" + self._where(
                row, self._header_row()
            )
        return ""

    def _is_units(self, row: Sequence[str]) -> bool:
        if not is_units_row(row, self._layout.headers, self._line_column):
            return False
        return any(is_unit_text(bare(row[position])) for position in self._number_columns if row[position].strip())

    def _units_differ(self, row: Sequence[str], row_number: int, *, after: bool) -> str:
        if any(self._layout.units):
            headers, known = self._layout.headers, reversed(self._rows)
            units = next((cells for cells in known if is_units_row(cells, headers, self._line_column)), headers)
            return f"the units in row {row_number} differ from those of the header{self._where(row, units)}"
        stands = "beneath a header that has none in its first place" if after else "in the middle of the list"
        position = next(position for position in self._number_columns if row[position].strip())
        header = self._layout.headers[position]
        return f"row {row_number} holds units {stands} ({shown(row[position].strip())} in column {shown(header)})"

    def _header_row(self) -> Sequence[str]:
        return self._rows[min(self._layout.header_row - self._first, len(self._rows) - 1)]

    def _where(self, row: Sequence[str], known: Sequence[str]) -> str:
        """Return the first column in which two rows differ, in brackets."""
        for position in range(self._width):
            here, there = (cells[position].strip() if position < len(cells) else "" for cells in (row, known))
            if spared(here) != spared(there):
                return f" (column {position + 1}: {shown(here)} against {shown(there)})"
        return ""

    def _is_header(self, row: Sequence[str]) -> bool:
        """Return whether a row holds words only, of which three are headers or most stand for numbers."""
        filled = [cell.strip() for cell in row if not _NOTHING.match(cell)]
        if len(filled) < UNDERSTOOD or any(_A_NUMBER.match(cell) or len(cell) > LONGEST_HEADER for cell in filled):
            return False
        if _DIGIT.search(row[self._line_column]):
            return False
        understood = sum(read_header(cell) is not None for cell in filled if len(cell) > 1)
        return understood >= UNDERSTOOD or self._words_for_numbers(row)

    def _words_for_numbers(self, row: Sequence[str]) -> bool:
        """Return whether most number columns hold words of their own, none of them a known stand-in for a value."""
        cells = [row[position].strip() for position in self._number_columns]
        words = {cell.casefold() for cell in cells if _is_word(cell)}
        return len(words) >= 2 and 2 * len(words) > len(cells)


def _is_word(cell: str) -> bool:
    """Return whether a cell of a number column holds a word that is no known stand-in for a value."""
    if _WORDED.match(cell) is None or placeholder(cell.strip(), "") is not Gap.GIVEN or ditto(tidy(cell)):
        return False
    return word_of(cell.strip()) not in _STAND_INS


def _tells(row: Sequence[str]) -> bool:
    """Return whether a row says more than the numbers of the columns."""
    return any(cell.strip() for cell in row) and not is_numbering(row)


def _grouped(head: Sequence[Sequence[str]], layout: Layout) -> bool:
    """Return whether the row above the header row was read with it: its words stand in the headers."""
    index = layout.header_row - 1
    if index == 0 or index >= len(head):
        return False
    above, row = head[index - 1], head[index]
    for position, header in enumerate(layout.headers):
        over = key_of(above[position]) if position < len(above) else ""
        raw = key_of(row[position]) if position < len(row) else ""
        if over and over in key_of(header) and over not in raw:
            return True
    return False
