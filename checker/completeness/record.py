"""The records of completeness: the lines on the drawings, and what became of them and of the list's."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np
from numpy.typing import NDArray

from checker.model import Source, UnreadItem

if TYPE_CHECKING:
    import pandas as pd

__all__ = [
    "DELETED", "KINDS", "NOT_IN_LIST", "NOT_ON_DRAWINGS", "OTHER_DRAWING", "OTHER_SPELLING", "RENUMBERED",
    "Completeness", "CompletenessItem", "DrawingLines",
]  # fmt: skip

NOT_IN_LIST = "on the drawings, not in the list"
NOT_ON_DRAWINGS = "in the list, not on the drawings"
RENUMBERED = "renumbering suspected"
OTHER_SPELLING = "spelled differently"
OTHER_DRAWING = "on another drawing than the list says"
DELETED = "deleted in the list, still on the drawings"
KINDS = (NOT_IN_LIST, NOT_ON_DRAWINGS, RENUMBERED, OTHER_SPELLING, OTHER_DRAWING, DELETED)
_COLUMNS = ("kind", "line_number", "drawing_line_number", "drawing", "row", "drawing_row", "sentence")


@dataclass(frozen=True, slots=True)
class DrawingLines:
    """The lines on the drawings, as a file lists them.

    Attributes
    ----------
    source : Source
        The file.
    numbers, drawings : tuple of str
        Line number and drawing of each row, as written; the drawing is empty where the file names none.
    row : int array
        Row of the file, counted from 1.
    notes : tuple of str
        What was understood of the file.
    unread : tuple of UnreadItem
        Rows that name no line, each with its sentence.
    """

    source: Source
    numbers: tuple[str, ...]
    drawings: tuple[str, ...]
    row: NDArray[np.int32]
    notes: tuple[str, ...]
    unread: tuple[UnreadItem, ...]


@dataclass(frozen=True, slots=True)
class CompletenessItem:
    """One line that the list and the drawings do not agree on.

    `line_number` is the list's, `drawing_line_number` that on the drawings; one of them is empty where there is none.
    `row` and `drawing_row` are the rows of the list and of the drawings' file, 0 where there is none.
    """

    kind: str
    line_number: str
    drawing_line_number: str
    drawing: str
    row: int
    drawing_row: int
    sentence: str


@dataclass(frozen=True, slots=True)
class Completeness:
    """The list held against the drawings.

    Attributes
    ----------
    source : Source
        The drawings' file.
    listed, drawn, both : int
        Distinct line numbers of the list, on the drawings, and in both.
    items : tuple of CompletenessItem
        What does not agree, in the order of `KINDS` and then of the rows. A line of which renumbering is suspected
        stands among those missing on either side as well.
    notes : tuple of str
        What was understood of the drawings' file.
    unread : tuple of UnreadItem
        Its rows that name no line.
    """

    source: Source
    listed: int
    drawn: int
    both: int
    items: tuple[CompletenessItem, ...]
    notes: tuple[str, ...]
    unread: tuple[UnreadItem, ...]

    @property
    def counts(self) -> Mapping[str, int]:
        """How many items there are of each kind, in the order of `KINDS`."""
        return {kind: sum(item.kind == kind for item in self.items) for kind in KINDS}

    @property
    def complete(self) -> bool:
        """Whether list and drawings name the same lines on the same drawings, spelled alike, and every row was read."""
        return not self.items and not self.unread

    @property
    def sentence(self) -> str:
        """The outcome in one sentence."""
        told = ", ".join(f"{count} {kind}" for kind, count in self.counts.items() if count)
        count = len(self.unread)
        unread = f", {count} row{'' if count == 1 else 's'} of the drawings' file not read" if count else ""
        return (
            f"{self.drawn} lines on the drawings and {self.listed} in the list, {self.both} of them the same: "
            f"{told or 'nothing differs'}{unread}."
        )

    def of_kind(self, kind: str) -> tuple[CompletenessItem, ...]:
        """Return the items of one kind."""
        return tuple(item for item in self.items if item.kind == kind)

    def frame(self) -> pd.DataFrame:
        """Return the items as a table, one row an item."""
        import pandas as pd

        return pd.DataFrame([[getattr(item, name) for name in _COLUMNS] for item in self.items], columns=list(_COLUMNS))
