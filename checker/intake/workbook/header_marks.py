"""Raised marks in headers, such as the number of a footnote: left out where the header is known without them."""

from __future__ import annotations

from collections.abc import Mapping

from checker.intake.layout import header_score
from checker.intake.texts import shown
from checker.intake.workbook.raw import RawSheet

__all__ = ["take_out_marks"]

MOST_MARKED = 500


def take_out_marks(raw: RawSheet, hints: Mapping[str, str]) -> list[str]:
    """Take raised marks out of headers that are known without them only, and return those headers, for a note.

    Parameters
    ----------
    raw : RawSheet
        The sheet, changed in place.
    hints : mapping of str to str
        Field of each header key that the criteria explain.
    """
    found = []
    for (row, column), text in sorted(raw.unmarked.items())[:MOST_MARKED]:
        marked = raw.rows[row][column]
        if header_score([text], hints) > header_score([marked], hints):
            raw.rows[row][column] = text
            found.append(shown(marked))
    return found
