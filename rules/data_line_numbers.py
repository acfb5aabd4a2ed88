"""Data rules: is each line number its own, and does it say what the columns say."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of

BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]


def _numbered(*, line_number_stated: TriState, first_of_row: TriState) -> TriState:
    return all_of(first_of_row, line_number_stated)


def _of_known_pattern(*, number_pattern_known: TriState, first_of_row: TriState) -> TriState:
    return all_of(first_of_row, number_pattern_known)


@rule(
    id="doubled-line-number",
    title="One line number on several rows",
    on_data=True,
    force="shall",
    sense="condition",
    source=Source("common practice", clause="one number names one line; its segments and cases differ in the row"),
    applies=_numbered,
    calculation="{line_number_text} stands on more than one row for the same case, from, to and size",
)
def doubled_line_number(*, doubled_line_number: BoolArray) -> BoolArray:
    """Contradict where one number states one case on several rows that neither from, to nor size tells apart.

    Segments of a line and rows of other cases are in order.
    """
    return doubled_line_number


@rule(
    id="look-alike-number",
    title="Line numbers that look alike",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="O and 0, I and 1, capitals and marks are easily mistaken"),
    applies=_numbered,
    calculation="{line_number_text} {look_alike_said}",
)
def look_alike_number(*, look_alike_number: BoolArray) -> BoolArray:
    """Contradict where another line's number differs only in characters that look alike: perhaps one and the same."""
    return look_alike_number


@rule(
    id="number-against-columns",
    title="Line number against the columns",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="size, service, class and insulation of the number as in its columns"),
    applies=_of_known_pattern,
    calculation="{line_number_text}: {number_mismatch_said}",
)
def number_against_columns(*, number_against_columns: CodeArray) -> BoolArray:
    """Contradict where a part of the line number, read by the pattern of the list's numbers, is not its column's."""
    return np.greater(number_against_columns, 0)
