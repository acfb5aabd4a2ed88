"""One sheet of a workbook as rows of texts, with what only a workbook can say of its rows and cells."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field

from checker.intake.records import BLOCK, Block

__all__ = ["Sheet"]


@dataclass(frozen=True, slots=True)
class Sheet:
    """One sheet, read whole.

    Attributes
    ----------
    name : str
        Name of the sheet as the workbook writes it.
    sha256 : str
        SHA-256 of the workbook's bytes.
    rows : list of list of str
        Every row from the first one on, as texts; rows may differ in width, and a blank cell is an empty text.
    refused : mapping of (int, int) to str
        Sentence for each cell whose value must not be read, by row and column, both counted from 0.
    no_numbers : mapping of (int, int) to str
        Sentence for each cell that is no number and no size, though a text column may show it: a date, for one.
    struck : frozenset of int
        Rows (counted from 0) whose written cells are struck through: deleted lines.
    hidden : frozenset of int
        Rows (counted from 0) that the workbook hides; they are read all the same.
    notes : tuple of str
        Sentences on what was found.
    """

    name: str
    sha256: str
    rows: list[list[str]]
    refused: Mapping[tuple[int, int], str] = field(default_factory=dict)
    no_numbers: Mapping[tuple[int, int], str] = field(default_factory=dict)
    struck: frozenset[int] = frozenset()
    hidden: frozenset[int] = frozenset()
    notes: tuple[str, ...] = ()

    def blocks(self) -> Iterator[Block]:
        """Yield the rows, some hundreds at a time, as the records of a text would come."""
        for first in range(0, len(self.rows), BLOCK):
            yield Block(first, self.rows[first : first + BLOCK], {})
