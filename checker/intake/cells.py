"""The cells of a column: texts as codes into the distinct ones, numbers beside the plain floats among them."""

from __future__ import annotations

import math
import re
from bisect import bisect_right
from collections.abc import Iterator, Sequence
from itertools import chain
from typing import TypeVar, overload

import numpy as np
from numpy.typing import NDArray

from checker.intake.plain_numbers import PARTING, Mark, read_plain
from checker.model import BoolArray, CodeArray, FloatArray, IntArray

__all__ = ["CellCollector", "CodedCells", "NumberCells", "NumberCollector", "collect_numbers"]

NAN = float("nan")
_DAMAGED = "\ufffd"
_PADDED_NUMBER = re.compile(
    r" *(?![-+]?0\d+(?:[eE ]|$))[-+]?(\d+([.,]\d*)?|[.,]\d+)([eE](?:\+?\d{1,4}|-\d{1,2}))? *", re.ASCII
)
_THOUSANDS = re.compile(r"[-+]?[1-9]\d{0,2}[.,]\d{3}", re.ASCII)
LONGEST_NUMBER = 60
Scalar = TypeVar("Scalar", np.float64, np.int32, np.int8)


class CodedCells(Sequence[str]):
    """Cells as written, one a line, held as codes into a table of distinct texts.

    Attributes
    ----------
    codes : int32 array, shape (lines,)
        Code of each cell.
    texts : tuple of str
        Distinct texts; some may stand in no cell.
    """

    __slots__ = ("codes", "texts")

    def __init__(self, codes: IntArray, texts: tuple[str, ...]) -> None:
        self.codes = codes
        self.texts = texts

    def __len__(self) -> int:
        return int(self.codes.size)

    def __iter__(self) -> Iterator[str]:
        return map(self.texts.__getitem__, self.codes.tolist())

    @overload
    def __getitem__(self, index: int) -> str: ...

    @overload
    def __getitem__(self, index: slice) -> Sequence[str]: ...

    def __getitem__(self, index: int | slice) -> str | Sequence[str]:
        if isinstance(index, slice):
            return CodedCells(self.codes[index], self.texts)
        return self.texts[int(self.codes[index])]

    def at(self, indices: Sequence[int]) -> list[str]:
        """Return some cells."""
        return [self.texts[code] for code in self.codes[indices].tolist()] if len(indices) else []

    def kept(self, keep: BoolArray) -> CodedCells:
        """Return the cells of the rows kept."""
        return CodedCells(self.codes[keep], self.texts)


class _Codes(dict[str, int]):
    def __missing__(self, text: str) -> int:
        code = self[text] = len(self)
        return code


class _Written:
    """The cells of one column as written, joined block by block and parted again where one is asked for."""

    def __init__(self, blocks: Sequence[str], starts: Sequence[int]) -> None:
        self._blocks = blocks
        self._starts = starts
        self._latest = (-1, [""])

    def cell(self, index: int) -> str:
        """Return one cell, counted over all rows read."""
        block = bisect_right(self._starts, index) - 1
        if self._latest[0] != block:
            self._latest = (block, self._blocks[block].split(PARTING))
        return self._latest[1][index - self._starts[block]]

    def __iter__(self) -> Iterator[str]:
        return chain.from_iterable(block.split(PARTING) for block in self._blocks)


class NumberCells(Sequence[str]):
    """Cells of a number column as written, one a line, beside the plain numbers among them.

    Attributes
    ----------
    numbers : float array, shape (lines,)
        The cells as floats, their mark taken as decimal; NaN where a cell is no plain finite number.
    marks : int8 array, shape (lines,)
        `plain_numbers.Mark` of each plain number.
    codes : int32 array, shape (lines,)
        Code of each cell that is no plain number into `texts`; -1 for a plain number.
    texts : tuple of str
        Distinct texts that are no plain numbers, the blank one first.
    """

    def __init__(
        self,
        written: _Written,
        numbers: FloatArray,
        marks: CodeArray,
        codes: IntArray,
        texts: tuple[str, ...],
        rows: IntArray | None = None,
    ) -> None:
        self.numbers = numbers
        self.marks = marks
        self.codes = codes
        self.texts = texts
        self._written = written
        self._rows = rows

    def __len__(self) -> int:
        return int(self.numbers.size)

    def __iter__(self) -> Iterator[str]:
        if self._rows is None:
            return iter(self._written)
        return map(self._written.cell, self._rows.tolist())

    @overload
    def __getitem__(self, index: int) -> str: ...

    @overload
    def __getitem__(self, index: slice) -> Sequence[str]: ...

    def __getitem__(self, index: int | slice) -> str | Sequence[str]:
        if isinstance(index, slice):
            return [self[place] for place in range(len(self))[index]]
        code = int(self.codes[index])
        if code >= 0:
            return self.texts[code]
        place = range(len(self))[index]
        return self._written.cell(place if self._rows is None else int(self._rows[place]))

    def at(self, indices: Sequence[int]) -> list[str]:
        """Return some cells; quicker than one by one where they are no plain numbers."""
        texts = self.texts
        codes = self.codes[indices].tolist() if len(indices) else []
        return [texts[code] if code >= 0 else self[index] for index, code in zip(indices, codes, strict=True)]

    def kept(self, keep: BoolArray) -> NumberCells:
        """Return the cells of the rows kept."""
        rows = np.flatnonzero(keep).astype(np.int32)
        rows = rows if self._rows is None else self._rows[rows]
        return NumberCells(self._written, self.numbers[keep], self.marks[keep], self.codes[keep], self.texts, rows)


class CellCollector:
    """Collects the cells of one column, a block of rows at a time, while they are still warm in the cache."""

    def __init__(self) -> None:
        self._codes = _Codes()
        self._cells: list[IntArray] = []

    def add(self, cells: Sequence[str]) -> None:
        """Append the cells of a block."""
        self._cells.append(np.fromiter(map(self._codes.__getitem__, cells), np.int32, len(cells)))

    def cells(self) -> CodedCells:
        """Return all cells collected."""
        return CodedCells(_together(self._cells, np.int32), tuple(self._codes))


class NumberCollector:
    """Collects the cells of one number column, joined by blocks, with the plain numbers among them read."""

    def __init__(self) -> None:
        self.written: list[str] = []
        self.starts = [0]
        self.numbers: list[FloatArray] = []
        self.marks: list[CodeArray] = []
        self.codes: list[IntArray] = []
        self.texts = _Codes({"": 0})

    def cells(self) -> NumberCells:
        """Return all cells collected."""
        return NumberCells(
            _Written(self.written, self.starts),
            _together(self.numbers, np.float64),
            _together(self.marks, np.int8),
            _together(self.codes, np.int32),
            tuple(self.texts),
        )


def _together(parts: list[NDArray[Scalar]], dtype: type[Scalar]) -> NDArray[Scalar]:
    """Return blocks as one array, and let go of them."""
    whole = np.concatenate(parts) if parts else np.zeros(0, dtype=dtype)
    parts.clear()
    return whole


def collect_numbers(collectors: Sequence[NumberCollector], columns: Sequence[Sequence[str]]) -> list[tuple[int, int]]:
    """Append a block of cells to the number columns, and read the plain numbers of all of them in one step.

    Returns
    -------
    list of (int, int)
        Column and row of the whole numbers that begin with a nought (``000``, ``050``).
    """
    if not columns or not columns[0]:
        return []
    rows = len(columns[0])
    joined = [_joined(cells) for cells in columns]
    plain = read_plain(PARTING.join(joined) + PARTING)
    values, marks = plain.values.reshape(-1, rows), plain.marks.reshape(-1, rows)
    codes = np.where(plain.blank, 0, -1).astype(np.int32).reshape(-1, rows)
    _read_long(np.flatnonzero(plain.long), columns, rows, plain.values, plain.marks)
    for index in np.flatnonzero(np.isnan(plain.values) & ~plain.blank).tolist():
        column, row = divmod(index, rows)
        text, texts = columns[column][row], collectors[column].texts
        if text not in texts:
            number, mark = _padded_number(text)
            if number == number:
                values[column, row], marks[column, row] = number, mark
                continue
        codes[column, row] = texts[text]
    noughts = [divmod(index, rows) for index in np.flatnonzero(plain.noughts).tolist()]
    for column, row in noughts:
        if not columns[column][row].strip("0"):
            values[column, row], codes[column, row] = NAN, collectors[column].texts[columns[column][row]]
    for position, collector in enumerate(collectors):
        collector.written.append(joined[position])
        collector.starts.append(collector.starts[-1] + rows)
        collector.numbers.append(values[position])
        collector.marks.append(marks[position])
        collector.codes.append(codes[position])
    return noughts


def _read_long(
    indices: NDArray[np.intp], columns: Sequence[Sequence[str]], rows: int, values: FloatArray, marks: CodeArray
) -> None:
    """Read plain numbers of many figures by ``float``, each by itself; one beyond its range stays NaN."""
    if not indices.size:
        return
    texts = [columns[index // rows][index % rows] for index in indices.tolist()]
    numbers = np.array([float(text.replace(",", ".")) for text in texts])
    finite = np.isfinite(numbers)
    values[indices] = np.where(finite, numbers, NAN)
    marks[indices[~finite]] = Mark.NONE


def _joined(cells: Sequence[str]) -> str:
    joined = PARTING.join(cells)
    if joined.count(PARTING) == len(cells) - 1:
        return joined
    return PARTING.join(cell.replace(PARTING, _DAMAGED) for cell in cells)


def _padded_number(text: str) -> tuple[float, Mark]:
    """Read a number with outer blanks; NaN where a text is none."""
    match = _PADDED_NUMBER.fullmatch(text) if len(text) <= LONGEST_NUMBER else None
    number = float(text.replace(",", ".")) if match else NAN
    if match is None or not math.isfinite(number) or (len(text.strip()) > 1 and not text.strip(" 0")):
        return NAN, Mark.NONE
    mark = Mark.COMMA if "," in text else Mark.POINT if "." in text else Mark.NONE
    if mark and _THOUSANDS.fullmatch(text.strip()):
        return number, Mark(mark + 2)
    return number, mark
