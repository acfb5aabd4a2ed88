"""Which case a column belongs to that names none: nothing a contractor wrote may be left in no case at all."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

from checker.errors import InputError, Problem
from checker.intake.planned import FLOWS, PlannedColumn
from checker.intake.texts import fold_words, place, shown

__all__ = ["named_cases", "one_case", "with_cases"]

_CASE_ORDER = ("minimum", "normal", "maximum")


def named_cases(columns: Sequence[PlannedColumn]) -> tuple[str, ...]:
    """Return the cases that columns name: minimum, normal, maximum, then the others as they stand."""
    named = dict.fromkeys(column.case for column in columns if column.case)
    return (*(case for case in _CASE_ORDER if case in named), *(case for case in named if case not in _CASE_ORDER))


def _normal_named(columns: Sequence[PlannedColumn]) -> list[PlannedColumn]:
    """Give ``Normal pressure`` to the case normal where other columns of its field name cases."""
    named = {(column.field.name, column.case) for column in columns}
    with_named = {field for field, case in named if case}
    return [
        replace(column, case="normal")
        if not column.case
        and not column.hinted
        and column.field.name in with_named
        and (column.field.name, "normal") not in named
        and fold_words(column.header).split()[0] in ("normal", "norm")
        else column
        for column in columns
    ]


def _flows_named(columns: Sequence[PlannedColumn], file: str, row: int) -> list[PlannedColumn]:
    """Give a flow that names no case to the case normal where another flow names a case.

    Raises
    ------
    InputError
        If one flow names the case normal and others name other cases: then the flow without a case word is in doubt.
    """
    flows = [column for column in columns if column.field.name in FLOWS]
    bare = [column for column in flows if not column.case]
    normal = [column for column in flows if column.case == "normal"]
    if not bare or len(bare) == len(flows):
        return list(columns)
    if normal and any(column.case not in ("", "normal") for column in flows):
        what = (
            f"two columns for one case: the flow {shown(bare[0].header)} (column {bare[0].index + 1}) names no case, "
            f"and {shown(normal[0].header)} (column {normal[0].index + 1}) is the flow of the case 'normal'."
        )
        remedy = "Say in [columns] of the criteria which header carries which field and case, or rename one of them."
        raise InputError(Problem(what, where=place(file, row, bare[0].header), remedy=remedy))
    return [replace(column, case="normal") if column in bare else column for column in columns]


def _unused_named(columns: Sequence[PlannedColumn]) -> list[PlannedColumn]:
    """Give a column that names no case to the case normal where every case has a column of its own for its field."""
    cases = set(named_cases(columns))
    own: dict[str, set[str]] = {}
    for column in columns:
        own.setdefault(column.field.name, set()).add(column.case)
    return [
        replace(column, case="normal")
        if not column.case and column.field.per_case and cases and cases <= own[column.field.name]
        else column
        for column in columns
    ]


def with_cases(columns: Sequence[PlannedColumn], *, file: str, row: int) -> list[PlannedColumn]:
    """Return the columns with the case normal for each that names none and can be no other's.

    Parameters
    ----------
    columns : sequence of PlannedColumn
        Columns of a list whose cases stand in its columns.
    file : str
        Name of the file, for messages.
    row : int
        Row of the headers.

    Raises
    ------
    InputError
        If a flow that names no case stands beside flows of the case normal and of others.
    """
    return _unused_named(_flows_named(_normal_named(columns), file, row))


def one_case(columns: Sequence[PlannedColumn], cases: Sequence[str]) -> list[PlannedColumn]:
    """Give a contractor's stated result that names no case to the case normal, where there are several."""
    if len(cases) < 2:
        return list(columns)
    return [replace(c, case="normal") if c.field.one_case and not c.case else c for c in columns]
