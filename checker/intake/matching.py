"""What became of every header: the field that took it, or why none did and which one is closest."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from functools import cache

from checker.fields import Field, all_fields
from checker.intake.case_names import split_case
from checker.intake.planned import PlannedColumn
from checker.intake.texts import fold_words, shown
from checker.intake.unread_headers import easily_mistaken
from checker.model import HeaderMatch

__all__ = ["closest_field", "header_matches", "near_header"]

LIKENESS = 0.85
SHORTEST_COMPARED = 5
LONGEST_COMPARED = 60
_BRACKETED = re.compile(r"[(\[][^)\]]*[)\]]")


@cache
def _words_of_fields() -> tuple[tuple[str, Field], ...]:
    """Return every spelling of every field that is long enough to be compared by likeness."""
    return tuple(
        (words, field)
        for field in all_fields()
        for words in dict.fromkeys(fold_words(text) for text in (field.name, *field.spellings))
        if len(words) >= SHORTEST_COMPARED
    )


def closest_field(header: str) -> Field | None:
    """Return the field whose spelling a header is most like, None where none is near enough.

    The unit in brackets and a case word are left aside; a short header is never compared, for it is like too many.
    """
    from difflib import SequenceMatcher

    words = fold_words(_BRACKETED.sub(" ", header[:LONGEST_COMPARED]))
    forms = [form for form in dict.fromkeys((words, *(rest for _, rest in split_case(words)))) if form]
    best, found = LIKENESS, None
    for form in forms:
        if len(form) < SHORTEST_COMPARED:
            continue
        matcher = SequenceMatcher(b=form, autojunk=False)
        for spelling, field in _words_of_fields():
            matcher.set_seq1(spelling)
            if matcher.real_quick_ratio() > best and matcher.quick_ratio() > best and matcher.ratio() > best:
                best, found = matcher.ratio(), field
    return found


def near_header(header: str) -> tuple[str, str]:
    """Return the field that a header is nearly or seemingly one of, and the sentence that says so; else two blanks."""
    name, why = easily_mistaken(header)
    if name:
        return name, why
    field = closest_field(header)
    if field is None:
        return "", ""
    return field.name, (
        f"{shown(header)} is not matched, so it is not read; the closest field is {field.name} ({field.meaning}): "
        "if it is meant, name it in [columns] of the criteria or correct the header."
    )


def _origin(column: PlannedColumn, row_unit: str, in_header: bool) -> str:
    """Return what is worth saying of a column that is read."""
    if column.refusal:
        return column.refusal
    if column.hinted:
        return "as [columns] of the criteria says"
    if column.field.kind == "text" or not column.unit or in_header:
        return ""
    if column.field.kind == "size":
        return f"{column.unit} by its cells, the units row or the criteria"
    return "unit from the units row" if row_unit else "unit from the criteria"


def header_matches(
    headers: Sequence[str],
    row_units: Sequence[str],
    *,
    read: Sequence[PlannedColumn],
    units_in_headers: Mapping[int, str],
    unread: Mapping[int, str],
) -> tuple[HeaderMatch, ...]:
    """Return what became of every header, in the order of the columns.

    Parameters
    ----------
    headers, row_units : sequence of str
        Headers of the list and the units beneath them.
    read : sequence of PlannedColumn
        The columns that are read.
    units_in_headers : mapping of int to str
        Unit that the header itself states, by column.
    unread : mapping of int to str
        Why a column is not read, where there is a reason besides that no field claims it.
    """
    by_index = {column.index: column for column in read}
    matches = []
    for index, header in enumerate(headers):
        column = by_index.get(index)
        if column is None:
            if header:
                matches.append(HeaderMatch(index + 1, header, "", "", "", unread.get(index, "no field of that name")))
            continue
        remark = _origin(column, row_units[index], bool(units_in_headers.get(index)))
        unit = column.unit if column.unit != "-" else ""
        matches.append(HeaderMatch(index + 1, header, column.field.name, column.case, unit, remark))
    return tuple(matches)
