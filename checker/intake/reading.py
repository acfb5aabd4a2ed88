"""`read_line_list`: a CSV file or a sheet of a workbook becomes a `LineList`."""

from __future__ import annotations

import gc
from collections.abc import Iterator, Mapping, Sequence
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

import numpy as np

from checker.criteria.hints import ColumnHint
from checker.errors import InputError, Problem
from checker.intake.assemble import Assembly, Converted, assemble
from checker.intake.cells import NumberCells
from checker.intake.column_hints import hint_fields
from checker.intake.columns import Plan, number_columns, plan_columns
from checker.intake.convert import ConvertedNumbers, convert_line_numbers, convert_numbers, convert_sizes, convert_texts
from checker.intake.layout import Layout, find_layout, line_number_columns
from checker.intake.lines import Lines, find_lines
from checker.intake.opening import Opened, open_table
from checker.intake.planned import PlannedColumn
from checker.intake.records import Form
from checker.intake.texts import place
from checker.model import Address, Column, Gap, HoldItem, LineList, Source, UnreadItem
from checker.units import STANDARD_ATMOSPHERE

__all__ = ["read_line_list"]


@contextmanager
def _no_collection() -> Iterator[None]:
    """Keep the garbage collector from walking millions of cells while they are read.

    Afterwards they count as old objects at once (frozen and thawed), so that the next small allocation does not walk
    them either.
    """
    enabled = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if enabled and gc.get_freeze_count() == 0:
            gc.freeze()
            gc.unfreeze()
        if enabled:
            gc.enable()


def read_line_list(
    path: Path,
    *,
    units: Mapping[str, str] | None = None,
    columns: Mapping[str, ColumnHint] | None = None,
    atmosphere: float = STANDARD_ATMOSPHERE,
    ambient: tuple[float, float] | None = None,
    sheet: str | None = None,
) -> LineList:
    """Read a line list from a delimited text or a workbook.

    Every number becomes SI, every value keeps its address, and nothing is guessed: a value without a unit, a pressure
    that says neither gauge nor absolute, or a cell with two readings is refused with a sentence. The file is only read.

    Parameters
    ----------
    path : Path
        The file.
    units : mapping of str to str, optional
        Unit by dimension, and the basis of nominal sizes by ``size``, for columns that state none.
    columns : mapping of str to ColumnHint, optional
        What the criteria say of single headers, by header; wins over the header itself.
    atmosphere : float, optional
        The site's atmospheric pressure, Pa, on which gauge pressures rest.
    ambient : (float, float), optional
        The site's lowest and highest ambient temperature, K, for cells that say ambient.
    sheet : str, optional
        Sheet of a workbook; without it the one that looks like a line list.

    Returns
    -------
    LineList
        Lines, line cases, values in SI, gaps, refusals, the HOLD register and what was not read.

    Raises
    ------
    InputError
        If the file cannot be read, holds no table, no line-number column, no line, two columns for one field in one
        case, or not one value besides the line numbers; or if `columns` gives a unit other than the list's own.
    """
    hints = columns or {}
    with _no_collection():
        fields = hint_fields(hints)
        opened = open_table(Path(path), sheet=sheet, hints=fields)
        form, file = opened.form, opened.label
        layout = find_layout(form.head, file=file, hints=fields)
        lines = find_lines(
            opened.blocks(),
            form,
            layout,
            file=file,
            line_column=line_number_columns(layout.headers, fields)[0],
            number_columns=frozenset() if form.comma else number_columns(layout, hints, file),
            struck=opened.struck,
        )
        plan = plan_columns(layout, lines.columns, file=file, hints=hints, units=units or {}, comma=form.comma)
        return _line_list(opened, layout, lines, plan, Site(atmosphere, ambient))


@dataclass(frozen=True, slots=True)
class Site:
    """What a cell may rest on: atmospheric pressure, Pa, and the range of ambient temperature, K, if known."""

    atmosphere: float
    ambient: tuple[float, float] | None


def _converted(column: PlannedColumn, lines: Lines, form: Form, site: Site) -> Converted:
    cells = lines.columns[column.index]
    if column.field.name == "line_number":
        return convert_line_numbers(cells)
    if isinstance(cells, NumberCells) or column.field.kind == "number":
        return convert_numbers(cells, column, atmosphere=site.atmosphere, delimiter=form.delimiter, comma=form.comma)
    if column.field.kind == "size":
        return convert_sizes(cells, column, comma=form.comma)
    return convert_texts(cells, column.field)


def _refuse_broken(converted: Converted, column: PlannedColumn, broken: Mapping[int, str]) -> None:
    """Refuse every value of the rows whose cells may have moved."""
    if not broken or column.field.name == "line_number":
        return
    indices = list(broken)
    converted.gaps[indices] = Gap.REFUSED
    if isinstance(converted, ConvertedNumbers):
        converted.values[indices] = np.nan
    else:
        converted.coded.codes[indices] = -1
    converted.reasons.update(broken)
    converted.holds[:] = [index for index in converted.holds if index not in broken]


def _first_refusal(column: PlannedColumn, converted: Converted, lines: Lines, header_row: int) -> tuple[str, int]:
    """Return the first reason why a column is not read, empty where there is none, and its row."""
    if isinstance(converted, ConvertedNumbers) and converted.column_refusal:
        return converted.column_refusal, header_row
    first = min(converted.reasons, default=-1)
    return ("", header_row) if first < 0 else (converted.reasons[first], int(lines.row[first]))


def _refuse_if_nothing(
    columns: Sequence[PlannedColumn], converted: Mapping[int, Converted], lines: Lines, file: str, layout: Layout
) -> None:
    numbers = [column for column in columns if column.field.kind != "text"]
    if any(bool((converted[column.index].gaps == Gap.GIVEN).any()) for column in numbers):
        return
    problems = [
        Problem(
            "not one number of the list could be read, so nothing can be checked.",
            where=place(file, layout.header_row),
            remedy="`linelist fields` shows the headers and units understood.",
        )
    ]
    for column in numbers:
        reason, row = _first_refusal(column, converted[column.index], lines, layout.header_row)
        if reason:
            problems.append(Problem(reason, where=place(file, row, column.header)))
    raise InputError(problems)


def _holds(plan: Plan, converted: Mapping[int, Converted], lines: Lines, file: str) -> tuple[HoldItem, ...]:
    found = [(index, column) for column in plan.columns for index in converted[column.index].holds]
    return tuple(
        HoldItem(
            lines.numbers[index],
            column.field.name,
            lines.columns[column.index][index].strip(),
            Address(file, int(lines.row[index]), column.header),
        )
        for index, column in sorted(found, key=lambda item: (item[0], item[1].index))
    )


def _unread(
    plan: Plan, converted: Mapping[int, Converted], lines: Lines, layout: Layout, file: str
) -> list[UnreadItem]:
    """Return the refused headers, rows and cells, each with its sentence."""
    items = [UnreadItem("", header, why, Address(file, layout.header_row, header)) for header, why in plan.unread]
    items.extend(lines.unread)
    for column in plan.columns:
        mine = converted[column.index]
        if isinstance(mine, ConvertedNumbers) and mine.column_refusal:
            address = Address(file, layout.header_row, column.header)
            items.append(UnreadItem("", column.header, mine.column_refusal, address))
        cells = lines.columns[column.index]
        items.extend(
            UnreadItem(lines.numbers[index], cells[index], reason, Address(file, int(lines.row[index]), column.header))
            for index, reason in mine.reasons.items()
            if index not in lines.broken
        )
    header = layout.headers[next(column.index for column in plan.columns if column.field.name == "line_number")]
    items.extend(
        UnreadItem(lines.numbers[index], lines.numbers[index], reason, Address(file, int(lines.row[index]), header))
        for index, reason in lines.broken.items()
    )
    return sorted(items, key=lambda item: item.address.row)


def _refuse_cells(
    converted: Converted, column: PlannedColumn, lines: Lines, refused: Mapping[tuple[int, int], str]
) -> None:
    """Refuse the cells that a workbook marks as no value: an uncalculated formula, a text half struck out."""
    row_of = {int(row) - 1: index for index, row in enumerate(lines.row)} if refused else {}
    for (row, position), reason in refused.items():
        if position == column.index and row in row_of:
            index = row_of[row]
            converted.gaps[index] = Gap.REFUSED
            if isinstance(converted, ConvertedNumbers):
                converted.values[index] = np.nan
            else:
                converted.coded.codes[index] = -1
            converted.reasons[index] = reason


def _notes(opened: Opened, layout: Layout, lines: Lines, plan: Plan, assembly: Assembly) -> tuple[str, ...]:
    notes = [*opened.notes, *layout.notes, *plan.notes, *lines.notes]
    if bool(assembly.composite.any()):
        codes = np.unique(assembly.case.codes[assembly.composite])
        names = ", ".join(assembly.case.texts[int(code)] for code in codes)
        notes.append(
            f"Composite cases (their own flow beside pressure, temperature or properties of all cases): {names}."
        )
    return tuple(notes)


def _line_list(opened: Opened, layout: Layout, lines: Lines, plan: Plan, site: Site) -> LineList:
    file = opened.label
    converted = {column.index: _converted(column, lines, opened.form, site) for column in plan.columns}
    for column in plan.columns:
        _refuse_broken(converted[column.index], column, lines.broken)
        _refuse_cells(converted[column.index], column, lines, opened.refused)
    read = [column for column in plan.columns if column.field.name != "line_number"]
    _refuse_if_nothing(read, converted, lines, file, layout)
    assembly = assemble(read, converted, cases=plan.cases, rows=lines.row, file=file, header_row=layout.header_row)
    return LineList(
        source=Source(file, opened.sha256, " ".join(opened.notes)),
        columns=tuple(
            Column(column.field.name, column.header, column.case, column.unit, lines.columns[column.index])
            for column in plan.columns
        ),
        unmatched=plan.unmatched,
        notes=_notes(opened, layout, lines, plan, assembly),
        line_number=lines.numbers,
        row=lines.row,
        line=assembly.line,
        case=assembly.case,
        case_kind=assembly.case_kind,
        composite=assembly.composite,
        numbers=assembly.numbers,
        texts=assembly.texts,
        gaps=assembly.gaps,
        refusals=assembly.refusals,
        holds=_holds(plan, converted, lines, file),
        unread=tuple(_unread(plan, converted, lines, layout, file)),
        deleted=lines.deleted,
    )
