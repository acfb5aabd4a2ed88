"""Columns that claim one field: which of them counts, and what is asked where nothing tells."""

from __future__ import annotations

from collections.abc import Sequence

from checker.errors import InputError, Problem
from checker.intake.planned import PlannedColumn
from checker.intake.texts import fold_words, key_of, place, shown
from checker.intake.unit_words import unit_or_refusal

__all__ = ["DESCRIPTIVE", "refuse_duplicates", "second_service", "without_overruled", "without_repeated"]

DESCRIPTIVE = frozenset(
    {
        "area", "drawing", "remarks", "revision", "sequence", "status", "stream", "painting", "examination",
        "heat_treatment", "stress_category",
    }
)  # fmt: skip


SERVICE = "service"


def without_overruled(columns: list[PlannedColumn]) -> list[PlannedColumn]:
    """Leave out a column whose field and case the criteria give to another one."""
    taken = {(column.field.name, column.case) for column in columns if column.hinted}
    return [column for column in columns if column.hinted or (column.field.name, column.case) not in taken]


def without_repeated(columns: list[PlannedColumn]) -> tuple[list[PlannedColumn], list[PlannedColumn]]:
    """Return the columns with one only of each descriptive field and of the service, and the others.

    The first one counts; of a service and a fluid code, which many lists state side by side, the service does.
    """
    seen: set[str] = set()
    kept: list[PlannedColumn] = []
    repeated: list[PlannedColumn] = []
    for column in sorted(columns, key=_is_code):
        name = column.field.name
        (repeated if name in seen and name in (*DESCRIPTIVE, SERVICE) else kept).append(column)
        seen.add(name)
    return sorted(kept, key=lambda column: column.index), repeated


def _is_code(column: PlannedColumn) -> bool:
    return column.field.name == SERVICE and not column.hinted and "code" in fold_words(column.header).split()


def second_service(repeated: Sequence[PlannedColumn], kept: Sequence[PlannedColumn]) -> list[tuple[int, str]]:
    """Return the question on each further column of the service: the limits rest on which one is read."""
    read = next((column.header for column in kept if column.field.name == SERVICE), "")
    return [
        (
            column.index,
            f"{shown(column.header)} names the service too; it is read from {shown(read)}. If the limits of the "
            "criteria are matched by this one, say so in [columns].",
        )
        for column in repeated
        if column.field.name == SERVICE
    ]


def _refuse_second_table(columns: Sequence[PlannedColumn], file: str, row: int) -> None:
    """Refuse two tables side by side: from the second line number on, the headers of the first come again.

    Raises
    ------
    InputError
        If it is so.
    """
    lines = [column.index for column in columns if column.field.name == "line_number"]
    if len(lines) < 2:
        return
    first, second = sorted(lines)[:2]
    left = {column.field.name for column in columns if first < column.index < second}
    again = {column.field.name for column in columns if column.index > second} & left
    if again:
        what = f"two tables stand side by side: the second begins with a line number in column {second + 1}."
        remedy = "Put each table on a sheet or in a file of its own: which of the two is the line list?"
        raise InputError(Problem(what, where=place(file, row), remedy=remedy))


def _remedy(first: str, second: str) -> str:
    if key_of(first) == key_of(second):
        return "Both are headed alike, so [columns] of the criteria cannot tell them apart: rename one of them."
    return "Say in [columns] of the criteria which header carries the field, or rename one of them."


def _unit_trouble(column: PlannedColumn) -> str:
    """Return the sentence on a column whose unit is none of its field, else an empty text."""
    if column.field.kind != "number" or not column.unit:
        return ""
    reading = unit_or_refusal(column.unit, column.field.dimension)
    if not isinstance(reading, str) or "gauge or absolute" in reading:
        return ""
    return f" The unit of {shown(column.header)} is not read: {reading}"


def refuse_duplicates(columns: Sequence[PlannedColumn], file: str, row: int) -> None:
    """Refuse a list in which two columns carry one field in one case.

    Raises
    ------
    InputError
        With each pair of columns, and how the criteria settle which one counts.
    """
    _refuse_second_table(columns, file, row)
    seen: dict[tuple[str, str], PlannedColumn] = {}
    problems = []
    for column in columns:
        first = seen.setdefault((column.field.name, column.case), column)
        if first is column:
            continue
        case = f" in the case '{column.case}'" if column.case else ""
        what = (
            f"two columns for the field {column.field.name}{case}: {shown(first.header)} (column {first.index + 1}) "
            f"and {shown(column.header)} (column {column.index + 1})."
        )
        what += "".join(_unit_trouble(one) for one in (first, column))
        remedy = _remedy(first.header, column.header)
        problems.append(Problem(what, where=place(file, row), remedy=remedy))
    if problems:
        raise InputError(problems)
