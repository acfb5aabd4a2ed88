"""Columns converted: arrays over the lines, with the reason of each refusal beside them."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import TypeVar

import numpy as np

from checker.model import CodeArray, Coded, FloatArray, Gap, IntArray

__all__ = ["Converted", "ConvertedNumbers", "ConvertedTexts", "spread_sparse"]

NAN = float("nan")
Kept = TypeVar("Kept")


class _Placed:
    """Sentences with their place, made once for all cases that a column holds for."""

    reasons: dict[int, str]
    _placed: tuple[int, dict[int, str]] | None = None

    def placed(self, file: str, column: str, rows: IntArray) -> dict[int, str]:
        """Return the sentence of each refused line with file, row and column before it, all of them as shown."""
        if self._placed is None or self._placed[0] != len(self.reasons):
            row_of = rows.tolist() if self.reasons else []
            texts = {
                line: f"{file}, row {row_of[line]}, column {column}: {reason}" for line, reason in self.reasons.items()
            }
            self._placed = (len(self.reasons), texts)
        return self._placed[1]


@dataclass
class ConvertedNumbers(_Placed):
    """A column of numbers in SI, one a line: NaN and a gap where there is none.

    Attributes
    ----------
    values : float array, shape (lines,)
        SI value; the lower end of a range.
    gaps : int8 array, shape (lines,)
        `Gap` of each value.
    column_refusal : str
        Why no bare number of the column can be read; empty where they can.
    rests_on : int8 array, shape (lines,)
        What a value still needs beside it: the density or the phase.
    reasons, notes : dict of int to str
        Sentence of each refused cell, and what to say of a cell that is read all the same, by line.
    highs, lowest : dict of int to float
        Upper end of a range, and the lowest design value beside a design value, in SI, by line.
    holds : list of int
        Lines whose cell is an open item.
    """

    values: FloatArray
    gaps: CodeArray
    column_refusal: str
    rests_on: CodeArray
    reasons: dict[int, str] = field(default_factory=dict)
    holds: list[int] = field(default_factory=list)
    highs: dict[int, float] = field(default_factory=dict)
    lowest: dict[int, float] = field(default_factory=dict)
    notes: dict[int, str] = field(default_factory=dict)

    def column_is_refused(self) -> bool:
        """Return whether the refusal of the whole column meets a cell: a bare number, or every cell that holds one.

        Where each cell carries its own unit and is read, nothing is left for it to be said of.
        """
        if not self.column_refusal:
            return False
        bare = int((self.gaps == Gap.REFUSED).sum()) > len(self.reasons)
        return bare or (bool(self.reasons) and not bool((self.gaps == Gap.GIVEN).any()))

    def refuse(self, reasons: Mapping[int, str]) -> None:
        """Refuse the values of some lines, whatever their cells say."""
        indices = list(reasons)
        self.values[indices] = np.nan
        self.gaps[indices] = Gap.REFUSED
        self.reasons.update(reasons)
        for index in indices:
            for sparse in (self.highs, self.lowest, self.notes):
                sparse.pop(index, None)
        self.holds = [index for index in self.holds if index not in reasons]

    def spread(self, codes: IntArray) -> ConvertedNumbers:
        """Return the numbers of all cells, these being those of the distinct texts."""
        gaps = self.gaps[codes]
        return ConvertedNumbers(
            self.values[codes],
            gaps,
            self.column_refusal,
            self.rests_on[codes],
            spread_sparse(self.reasons, codes, self.gaps.size),
            np.flatnonzero(gaps == Gap.HOLD).tolist(),
            spread_sparse(self.highs, codes, self.gaps.size),
            spread_sparse(self.lowest, codes, self.gaps.size),
            spread_sparse(self.notes, codes, self.gaps.size),
        )


@dataclass
class ConvertedTexts(_Placed):
    """A column of texts as codes, one a line, with gaps, refusals and open items."""

    coded: Coded
    gaps: CodeArray
    reasons: dict[int, str] = field(default_factory=dict)
    holds: list[int] = field(default_factory=list)

    def refuse(self, reasons: Mapping[int, str]) -> None:
        """Refuse the texts of some lines, whatever their cells say."""
        indices = list(reasons)
        self.coded.codes[indices] = -1
        self.gaps[indices] = Gap.REFUSED
        self.reasons.update(reasons)
        self.holds = [index for index in self.holds if index not in reasons]


Converted = ConvertedNumbers | ConvertedTexts


def spread_sparse(sparse: Mapping[int, Kept], codes: IntArray, count: int) -> dict[int, Kept]:
    """Return what some of the distinct texts carry for all cells that hold them."""
    if not sparse:
        return {}
    carries = np.zeros(count, dtype=np.bool_)
    carries[list(sparse)] = True
    mine = np.flatnonzero(carries[codes])
    return dict(zip(mine.tolist(), map(sparse.__getitem__, codes[mine].tolist()), strict=True))
