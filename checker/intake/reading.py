"""`read_line_list`: a CSV file or a sheet of a workbook becomes a `LineList`."""

from __future__ import annotations

import gc
from collections.abc import Collection, Iterator, Mapping, Sequence
from contextlib import contextmanager
from dataclasses import dataclass
from functools import partial
from pathlib import Path

from checker.criteria.hints import ColumnHint
from checker.errors import InputError, Problem
from checker.intake.assemble import assemble
from checker.intake.cells import CodedCells
from checker.intake.column_hints import hint_fields
from checker.intake.columns import Plan, number_columns, plan_columns
from checker.intake.convert import convert_line_numbers, convert_sizes, convert_texts
from checker.intake.convert_numbers import column_evidence, convert_numbers, holds_commas
from checker.intake.converted import Converted, ConvertedNumbers
from checker.intake.decimal_marks import decide, together
from checker.intake.headers import read_header
from checker.intake.layout import Layout, find_layout, line_number_columns
from checker.intake.lines import Lines, find_lines
from checker.intake.listing import (
    decimal_sentence,
    hold_register,
    notes_on_cells,
    notes_on_list,
    unread_items,
)
from checker.intake.number_cells import NumberContext, record_of
from checker.intake.opening import Opened, open_table
from checker.intake.planned import PlannedColumn
from checker.intake.ranges import expand
from checker.intake.records import Form
from checker.intake.texts import key_of, place
from checker.model import Column, Gap, LineList, Source
from checker.units import STANDARD_ATMOSPHERE

__all__ = ["read_line_list"]

SAYS_DELETED = frozenset({"remarks", "status"})


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
        layout = _layout(opened, fields)
        lines = find_lines(
            opened.blocks(),
            form,
            layout,
            file=file,
            line_column=line_number_columns(layout.headers, fields)[0],
            number_columns=number_columns(layout, hints, file),
            said_columns=_columns_of(layout.headers, SAYS_DELETED, fields),
            status_columns=_columns_of(layout.headers, {"status"}, fields),
            struck=opened.struck,
        )
        plan = plan_columns(layout, lines.columns, file=file, hints=hints, units=units or {}, comma=form.comma)
        return _line_list(opened, layout, lines, plan, Site(atmosphere, ambient))


def _layout(opened: Opened, fields: Mapping[str, str]) -> Layout:
    """Find the headers; a refusal says how the file was read so far, which may be why there are none."""
    try:
        return find_layout(opened.form.head, file=opened.label, hints=fields)
    except InputError as error:
        read_as = Problem(f"The file was read so: {' '.join(opened.notes)}", where=place(opened.label))
        raise InputError((*error.problems, read_as)) from error


def _columns_of(headers: Sequence[str], names: Collection[str], hinted: Mapping[str, str]) -> list[int]:
    """Return the columns whose header names one of some fields."""
    found = []
    for index, header in enumerate(headers):
        name = hinted.get(key_of(header), "")
        reading = None if name or not header else read_header(header)
        if name in names or (reading is not None and reading.fields[0].name in names):
            found.append(index)
    return found


@dataclass(frozen=True, slots=True)
class Site:
    """What a cell may rest on: atmospheric pressure, Pa, and the range of ambient temperature, K, if known."""

    atmosphere: float
    ambient: tuple[float, float] | None


def _contexts(plan: Plan, lines: Lines, form: Form, site: Site) -> dict[int, NumberContext]:
    """Return what each number column says of its cells, by column."""
    numbers = [column for column in plan.columns if column.field.kind == "number"]
    evidence = {column.index: column_evidence(lines.columns[column.index]) for column in numbers}
    of_list = together(evidence.values())
    contexts = {}
    for column in numbers:
        marks = decide(evidence[column.index], of_list, comma=form.comma, delimiter=form.delimiter)
        if marks.note and not form.comma and not holds_commas(lines.columns[column.index]):
            marks = marks._replace(note="")
        contexts[column.index] = NumberContext(
            column.field,
            column.reading,
            column.refusal,
            site.atmosphere,
            form.delimiter,
            form.comma,
            site.ambient,
            marks,
        )
    return contexts


def _converted(column: PlannedColumn, lines: Lines, form: Form, context: NumberContext | None) -> Converted:
    cells = lines.columns[column.index]
    if column.field.name == "line_number":
        return convert_line_numbers(cells)
    if context is not None:
        return convert_numbers(cells, context)
    assert isinstance(cells, CodedCells)
    if column.field.kind == "size":
        return convert_sizes(cells, column, comma=form.comma)
    return convert_texts(cells, column.field)


def _refuse_marked(converted: Converted, column: PlannedColumn, lines: Lines, opened: Opened) -> None:
    """Refuse every value of the rows whose cells may have moved, and the cells that a workbook marks as no value."""
    if lines.broken and column.field.name != "line_number":
        converted.refuse(lines.broken)
    marked = dict(opened.no_numbers.get(column.index, {})) if column.field.kind != "text" else {}
    marked.update(opened.refused.get(column.index, {}))
    if marked:
        line_of = {row - 1: index for index, row in enumerate(lines.row.tolist())}
        converted.refuse({line_of[row]: reason for row, reason in marked.items() if row in line_of})


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


def _columns(plan: Plan, lines: Lines, contexts: Mapping[int, NumberContext]) -> tuple[Column, ...]:
    return tuple(
        Column(
            column.field.name,
            column.header,
            column.case,
            column.unit,
            lines.columns[column.index],
            partial(record_of, context=contexts[column.index]) if column.index in contexts else None,
        )
        for column in plan.columns
    )


def _line_list(opened: Opened, layout: Layout, lines: Lines, plan: Plan, site: Site) -> LineList:
    file, contexts = opened.label, _contexts(plan, lines, opened.form, site)
    converted: dict[int, Converted] = {}
    for column in plan.columns:
        mine = converted[column.index] = _converted(column, lines, opened.form, contexts.get(column.index))
        _refuse_marked(mine, column, lines, opened)
    read = [column for column in plan.columns if column.field.name != "line_number"]
    _refuse_if_nothing(read, converted, lines, file, layout)
    assembly = assemble(read, converted, cases=plan.cases, rows=lines.row, file=file, header_row=layout.header_row)
    form = tuple(note for note in (*opened.notes, decimal_sentence(opened.form, contexts.values())) if note)
    line_list = LineList(
        source=Source(file, opened.sha256, " ".join(form)),
        columns=_columns(plan, lines, contexts),
        unmatched=plan.unmatched,
        notes=(
            *form,
            *notes_on_list(layout, lines, plan, assembly),
            *notes_on_cells(plan, contexts, converted, lines),
        ),
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
        holds=hold_register(plan, converted, lines, file),
        unread=tuple(unread_items(plan, converted, lines, layout, file)),
        deleted=lines.deleted,
        matching=plan.matching,
    )
    if assembly.highs or assembly.lowest:
        return expand(line_list, assembly.highs, assembly.lowest)
    return line_list
