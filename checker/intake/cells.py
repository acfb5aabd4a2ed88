"""The cells of a column as codes into its distinct texts: each text is kept and read once, however often it stands."""

from __future__ import annotations

from array import array
from collections.abc import Sequence
from typing import overload

import numpy as np

from checker.model import BoolArray, FloatArray, IntArray

__all__ = ["CellCollector", "CodedCells", "plain_numbers"]

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

    @overload
    def __getitem__(self, index: int) -> str: ...

    @overload
    def __getitem__(self, index: slice) -> Sequence[str]: ...

    def __getitem__(self, index: int | slice) -> str | Sequence[str]:
        if isinstance(index, slice):
            return CodedCells(self.codes[index], self.texts)
        return self.texts[self.codes[index]]

    def kept(self, keep: BoolArray) -> CodedCells:
        """Return the cells of the rows kept."""
        return CodedCells(self.codes[keep], self.texts)


class _Codes(dict[str, int]):
    def __missing__(self, text: str) -> int:
        code = self[text] = len(self)
        return code


class CellCollector:
    """Collects the cells of one column, a block of rows at a time."""

    def __init__(self) -> None:
        self._codes = _Codes()
        self._blocks: list[IntArray] = []

    def add(self, cells: Sequence[str]) -> None:
        """Append the cells of a block."""
        self._blocks.append(np.fromiter(map(self._codes.__getitem__, cells), dtype=np.int32, count=len(cells)))

    def cells(self) -> CodedCells:
        """Return all cells collected."""
        codes = np.concatenate(self._blocks) if self._blocks else np.zeros(0, dtype=np.int32)
        return CodedCells(codes, tuple(self._codes))


def _traps(joined: str) -> tuple[int, int]:
    """Return how many signs of a text ``float`` might wrongly take: the blank of `1_000`, digits of other scripts."""
    return joined.count("_"), 0 if joined.isascii() else len(joined.encode("utf-8", "surrogatepass")) - len(joined)


def plain_numbers(texts: Sequence[str]) -> tuple[FloatArray, list[int]]:
    """Return texts as floats, NaN where a text is no plain finite number, and the indices of those.

    ``extend`` keeps what it has when a text fails, and ``map`` goes on behind it.
    """
    numbers, odd = array("d"), []
    remaining = map(float, texts)
    while True:
        try:
            numbers.extend(remaining)
            break
        except ValueError:
            odd.append(texts[len(numbers)])
            numbers.append(NAN)
    values = np.array(numbers, dtype=np.float64)
    if _traps("".join(texts)) != _traps("".join(odd)):
        values[[index for index, text in enumerate(texts) if not text.isascii() or "_" in text]] = NAN
    values[~np.isfinite(values)] = NAN
    return values, np.flatnonzero(np.isnan(values)).tolist()
