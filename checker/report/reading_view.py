"""How a list was read, put into rows and counts: what the terminal and the report show of it."""

from __future__ import annotations

from dataclasses import dataclass

from checker.model import HeaderMatch, UnreadItem
from checker.report.review_contract import ReviewLike

__all__ = ["Reading", "reading_of"]


@dataclass(frozen=True, slots=True)
class Reading:
    """How the list was read.

    Attributes
    ----------
    matched, unmatched : tuple of HeaderMatch
        Headers that a field claimed, in the order of the list, and those that none claimed.
    questions : tuple of UnreadItem
        Columns that were refused or could be read in two ways, each with its sentence.
    rows_aside : int
        Rows beneath the header that are no lines (totals, notes, rows without a line number).
    cells_refused : int
        Cells of matched columns that were refused.
    """

    matched: tuple[HeaderMatch, ...]
    unmatched: tuple[HeaderMatch, ...]
    questions: tuple[UnreadItem, ...]
    rows_aside: int
    cells_refused: int

    @property
    def every(self) -> tuple[HeaderMatch, ...]:
        """Every header, in the order of the list."""
        return tuple(sorted((*self.matched, *self.unmatched), key=lambda match: match.position))


def reading_of(review: ReviewLike) -> Reading:
    """Return how the list of a review was read."""
    matches = review.matching or _matches_by_columns(review)
    aside = [item for item in review.unread_items if not item.line_number]
    questions = tuple(item for item in aside if item.text == item.address.column)
    return Reading(
        matched=tuple(match for match in matches if match.field),
        unmatched=tuple(match for match in matches if not match.field),
        questions=questions,
        rows_aside=len(aside) - len(questions),
        cells_refused=len(review.unread_items) - len(aside),
    )


def _matches_by_columns(review: ReviewLike) -> tuple[HeaderMatch, ...]:
    """Return what is known of the columns where the reading kept no record of every header."""
    matched = [(header, field, case, unit) for header, field, case, unit in review.columns_matched]
    matched += [(header, "", "", "") for header in review.columns_unmatched]
    return tuple(
        HeaderMatch(position, header, field, case, unit, "")
        for position, (header, field, case, unit) in enumerate(matched, start=1)
    )
