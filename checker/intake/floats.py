"""Plain numbers of a column, read while their texts are still warm in the cache; every odd cell is left for later."""

from __future__ import annotations

from array import array
from collections.abc import Sequence

import numpy as np

from checker.model import BoolArray, FloatArray

__all__ = ["FloatColumn"]

NAN = float("nan")
TRIAL = 4_000


def _traps(joined: str) -> tuple[int, int]:
    """Return how many signs of a text ``float`` might wrongly take: the blank of `1_000`, digits of other scripts."""
    return joined.count("_"), 0 if joined.isascii() else len(joined.encode("utf-8", "surrogatepass")) - len(joined)


class _Known(dict[str, float]):
    """Numbers by text, each read once; NaN for a text that is no plain number."""

    def __missing__(self, text: str) -> float:
        number = NAN
        if text.isascii() and "_" not in text:
            try:
                number = float(text)
            except ValueError:
                pass
        self[text] = number
        return number


class FloatColumn:
    """Cells of one column as floats, block by block; NaN and an index for each that is no plain finite number.

    Lists repeat their numbers, and looking one up is several times faster than reading it anew; a column whose first
    rows hardly repeat is read without looking up.
    """

    def __init__(self) -> None:
        self._numbers = array("d")
        self._known: _Known | None = _Known()

    def add(self, cells: Sequence[str]) -> None:
        """Append the cells of a block."""
        if self._known is None:
            self._add_distinct(cells)
            return
        self._numbers.extend(map(self._known.__getitem__, cells))
        if len(self._numbers) >= TRIAL and 2 * len(self._known) > len(self._numbers):
            self._known = None

    def _add_distinct(self, cells: Sequence[str]) -> None:
        """Append cells without looking them up: ``extend`` keeps what it has, and ``map`` goes on behind a bad cell."""
        numbers, start = self._numbers, len(self._numbers)
        odd = []
        remaining = map(float, cells)
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

    def taken(self, keep: BoolArray) -> tuple[FloatArray, list[int]]:
        """Return the numbers of the rows kept, and the indices among them that need a second look."""
        values = np.array(self._numbers, dtype=np.float64)[keep]
        return values, np.flatnonzero(~np.isfinite(values)).tolist()
