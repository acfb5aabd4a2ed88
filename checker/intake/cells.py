"""The cells of a column: texts as codes into the distinct ones, numbers beside the plain floats among them."""

from __future__ import annotations

from array import array
from collections.abc import Iterator, Sequence
from itertools import compress
from typing import overload

import numpy as np

from checker.model import BoolArray, FloatArray, IntArray

__all__ = ["CellCollector", "CodedCells", "NumberCells", "NumberCollector"]

NAN = float("nan")


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

    def kept(self, keep: BoolArray) -> CodedCells:
        """Return the cells of the rows kept."""
        return CodedCells(self.codes[keep], self.texts)


class _Codes(dict[str, int]):
    def __missing__(self, text: str) -> int:
        code = self[text] = len(self)
        return code


class NumberCells(Sequence[str]):
    """Cells of a number column as written, one a line, beside the plain numbers among them.

    Attributes
    ----------
    written : tuple of str
        The cells.
    numbers : float array, shape (lines,)
        The cells as floats; NaN where a cell is no plain finite number.
    """

    __slots__ = ("numbers", "written")

    def __init__(self, written: tuple[str, ...], numbers: FloatArray) -> None:
        self.written = written
        self.numbers = numbers

    def __len__(self) -> int:
        return len(self.written)

    def __iter__(self) -> Iterator[str]:
        return iter(self.written)

    @overload
    def __getitem__(self, index: int) -> str: ...

    @overload
    def __getitem__(self, index: slice) -> Sequence[str]: ...

    def __getitem__(self, index: int | slice) -> str | Sequence[str]:
        return self.written[index]

    def kept(self, keep: BoolArray) -> NumberCells:
        """Return the cells of the rows kept."""
        return NumberCells(tuple(compress(self.written, keep.tolist())), self.numbers[keep])


class CellCollector:
    """Collects the cells of one column, a block of rows at a time, while they are still warm in the cache."""

    def __init__(self) -> None:
        self._codes = _Codes()
        self._cells: list[int] = []

    def add(self, cells: Sequence[str]) -> None:
        """Append the cells of a block."""
        self._cells.extend(map(self._codes.__getitem__, cells))

    def cells(self) -> CodedCells:
        """Return all cells collected."""
        return CodedCells(np.array(self._cells, dtype=np.int32), tuple(self._codes))


class NumberCollector:
    """Collects the cells of one number column and reads the plain numbers among them on the way."""

    def __init__(self) -> None:
        self._written: list[str] = []
        self._numbers = array("d")

    def add(self, cells: Sequence[str]) -> None:
        """Append the cells of a block.

        ``extend`` keeps what it has when a cell is no number, and ``map`` goes on behind that cell. Blank cells are
        common, so they are put as NaN rather than left to fail one by one.
        """
        numbers, start, odd = self._numbers, len(self._numbers), []
        self._written.extend(cells)
        remaining = map(float, [cell or "nan" for cell in cells] if "" in cells else cells)
        while True:
            try:
                numbers.extend(remaining)
                break
            except ValueError:
                odd.append(cells[len(numbers) - start])
                numbers.append(NAN)
        if _traps("".join(cells)) != _traps("".join(odd)):
            for index, text in enumerate(cells, start=start):
                if not text.isascii() or "_" in text:
                    numbers[index] = NAN

    def cells(self) -> NumberCells:
        """Return all cells collected."""
        numbers = np.array(self._numbers, dtype=np.float64)
        numbers[~np.isfinite(numbers)] = NAN
        return NumberCells(tuple(self._written), numbers)


def _traps(joined: str) -> tuple[int, int]:
    """Return how many signs of a text ``float`` might wrongly take: the blank of `1_000`, digits of other scripts."""
    return joined.count("_"), 0 if joined.isascii() else len(joined.encode("utf-8", "surrogatepass")) - len(joined)
