"""A sheet as a reader of workbooks hands it on: texts by row, and what must be said of single cells."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import NamedTuple, Protocol

__all__ = ["BLANK", "HEAD", "Book", "Merged", "RawSheet", "SheetName"]

BLANK: list[str] = []
"""The row that holds nothing, one object for all of them; never changed."""


HEAD = 40
"""First rows of a sheet, among which its headers stand."""


class Merged(NamedTuple):
    """A merged range, its rows and columns counted from 0, the last ones within it."""

    top: int
    left: int
    bottom: int
    right: int


@dataclass(slots=True)
class RawSheet:
    """One sheet as stored, before its table is known.

    Attributes
    ----------
    rows : list of list of str
        Every row from the first one on, each as wide as its last written cell.
    refused, no_numbers : dict of (int, int) to str
        Sentence for each cell that must not be read at all, or not as a number or a size.
    struck : dict of int to list of int
        Columns of the cells that are struck through, by row.
    hidden_rows : set of int
        Written rows that are hidden.
    hidden_columns : list of (int, int)
        First and last column of each hidden run.
    merged : list of Merged
        Merged ranges.
    as_shown : set of (int, int)
        Cells whose text is what is shown, though their number is stored otherwise: no number, but a line number.
    unmarked : dict of (int, int) to str
        Texts of the first rows without their raised marks, where they carry any.
    formulas, external, comments : int
        Cells with a formula, with a formula that takes from another file or program, with a comment.
    per_cent_unseen : bool
        Whether a number shown in per cent cannot be told from another one.
    filtered : bool
        Whether a filter is set.
    notes : list of str
        Further sentences.
    """

    rows: list[list[str]] = field(default_factory=list)
    refused: dict[tuple[int, int], str] = field(default_factory=dict)
    no_numbers: dict[tuple[int, int], str] = field(default_factory=dict)
    struck: dict[int, list[int]] = field(default_factory=dict)
    hidden_rows: set[int] = field(default_factory=set)
    hidden_columns: list[tuple[int, int]] = field(default_factory=list)
    merged: list[Merged] = field(default_factory=list)
    as_shown: set[tuple[int, int]] = field(default_factory=set)
    unmarked: dict[tuple[int, int], str] = field(default_factory=dict)
    formulas: int = 0
    external: int = 0
    comments: int = 0
    per_cent_unseen: bool = False
    filtered: bool = False
    notes: list[str] = field(default_factory=list)


class SheetName(NamedTuple):
    """A sheet by its name, and whether it is shown."""

    name: str
    visible: bool


class Book(Protocol):
    """A workbook opened."""

    sheets: tuple[SheetName, ...]
    notes: tuple[str, ...]

    def head(self, index: int) -> RawSheet:
        """Return the first rows of a sheet."""

    def whole(self, index: int) -> RawSheet:
        """Return a sheet, read whole."""
