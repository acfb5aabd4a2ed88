"""Which column carries which field, in which case and in which unit."""

from __future__ import annotations

import re
from collections.abc import Collection, Mapping, Sequence
from dataclasses import dataclass, replace
from itertools import islice

from checker.criteria.hints import ColumnHint
from checker.fields import Field
from checker.intake.column_cases import named_cases, one_case, with_cases
from checker.intake.column_conflicts import (
    DESCRIPTIVE,
    refuse_duplicates,
    second_service,
    without_overruled,
    without_repeated,
)
from checker.intake.column_fields import CELLS_LOOKED_AT, UNSETTLED, Draft, one_field
from checker.intake.column_hints import absent_headers, hinted_column, same_unit
from checker.intake.fraction_basis import with_fraction_basis
from checker.intake.headers import read_header, says_reid, unit_of_name
from checker.intake.layout import Layout
from checker.intake.matching import header_matches, near_header
from checker.intake.planned import PlannedColumn
from checker.intake.sizes import column_basis
from checker.intake.texts import key_of, shown
from checker.intake.unit_words import settled_by, size_basis, unit_or_refusal
from checker.intake.unread_headers import unread_reason
from checker.model import HeaderMatch
from checker.units import read_unit

__all__ = ["Plan", "number_columns", "plan_columns"]

UNITLESS = frozenset({"dimensionless", "fraction"})
MOST_COMPARED = 60
LEAST_NUMBERS = 0.5
_NO_UNIT = ("", "-", "\u2013", "[-]", "--")
_NUMBER = re.compile(r"[-+]?\d[\d.,]*(?:[eE][-+]?\d+)?")
_ASIDE = "the field {} is read from another column"


@dataclass(frozen=True)
class Plan:
    """Columns to be read, headers no field claimed, cases named by columns, what to say, and what is an open item.

    `unread` holds headers that are open items, each with its sentence; `matching` what became of every header.
    """

    columns: tuple[PlannedColumn, ...]
    unmatched: tuple[str, ...]
    cases: tuple[str, ...]
    notes: tuple[str, ...]
    unread: tuple[tuple[str, str], ...]
    matching: tuple[HeaderMatch, ...] = ()


def _drafts(layout: Layout, hints: Mapping[str, ColumnHint], file: str) -> list[Draft]:
    by_key = {key_of(header): hint for header, hint in hints.items()}
    drafts = []
    for index, header in enumerate(layout.headers):
        hint = by_key.get(key_of(header)) if header else None
        named, case = layout.cases.get(index, (header, ""))
        reading = None if hint is not None else read_header(named)
        if reading is not None:
            drafts.append(Draft(index, header, reading.fields, reading.unit, case or reading.case, False))
        hinted = hint and hinted_column(header, hint, row_unit=layout.units[index], file=file, row=layout.header_row)
        if hinted:
            drafts.append(Draft(index, header, (hinted.field,), hinted.unit, hinted.case, True))
    return drafts


def number_columns(layout: Layout, hints: Mapping[str, ColumnHint], file: str) -> frozenset[int]:
    """Return the columns whose headers promise numbers."""
    return frozenset(
        draft.index for draft in _drafts(layout, hints, file) if all(field.kind == "number" for field in draft.fields)
    )


def _two_units(column: PlannedColumn, row_unit: str) -> str:
    """Return the question where a header states one unit and the units row beneath it another, else an empty text."""
    if column.hinted or not column.unit or row_unit in _NO_UNIT or same_unit(column.unit, row_unit, column.field):
        return ""
    return (
        f"the header states {shown(column.unit)}, the units row {shown(row_unit)}: which one holds? Correct one of "
        "them, or name the column with its unit in [columns] of the criteria."
    )


def _with_unit(column: PlannedColumn, row_unit: str, units: Mapping[str, str]) -> PlannedColumn:
    """Return a number column with its unit read: of the hint or header, else the units row, else the criteria."""
    dimension = column.field.dimension
    implied = unit_of_name(column.header) if column.unit and column.unit in _NO_UNIT else ""
    written = implied or column.unit or row_unit or units.get(dimension, "")
    if not written and dimension in UNITLESS:
        return replace(column, reading=read_unit("-", dimension))
    if not written:
        reason = f"no unit: write it in the header as [ ], in a units row, in the cell, or as [units] '{dimension}'."
        return replace(column, refusal=reason)
    reading = unit_or_refusal(written, dimension)
    if not isinstance(reading, str):
        return replace(column, unit=written, reading=reading)
    settled = None
    if dimension == "pressure":
        answers = (settled_by(written, answer) for answer in (row_unit, units.get(dimension, "")) if answer)
        settled = next((unit for unit in answers if unit is not None), None)
    if settled is not None:
        return replace(column, unit=settled.spelling, reading=settled)
    return replace(column, unit=written, refusal=reading)


def _with_basis(
    column: PlannedColumn, row_unit: str, units: Mapping[str, str], cells: Sequence[str], comma: bool
) -> PlannedColumn:
    """Return a size column with the basis of its bare numbers, empty where nothing says it."""
    stated = (
        size_basis(text) for text in (column.unit, row_unit, units.get("size", ""), units.get("nominal size", ""))
    )
    basis = next((text for text in stated if text), "") or column_basis(islice(cells, CELLS_LOOKED_AT), comma)
    return replace(column, unit=basis, basis=basis)


def _measured(
    column: PlannedColumn, layout: Layout, units: Mapping[str, str], cells: Sequence[str], comma: bool
) -> PlannedColumn:
    row_unit = layout.units[column.index]
    two = _two_units(column, row_unit) if column.field.kind != "text" else ""
    if two:
        return replace(column, field=_not_to_be_read(column.field), refusal=two)
    if column.field.kind == "number":
        return with_fraction_basis(_with_unit(column, row_unit, units), cells)
    if column.field.kind == "size":
        return _with_basis(column, row_unit, units, cells, comma)
    return replace(column, unit="")


def _notes(
    columns: Sequence[PlannedColumn], left_out: Sequence[PlannedColumn], cases: Sequence[str], layout: Layout
) -> list[str]:
    notes = []
    if left_out:
        names = ", ".join(shown(column.header) for column in left_out)
        notes.append(f"The list has a case column, so columns that name a case are not read: {names}.")
    if len(cases) > 1:
        notes.append(f"Cases by columns: {', '.join(cases)}.")
    blank = [str(index + 1) for index, header in enumerate(layout.headers) if not header]
    if blank:
        notes.append(f"Columns without a header, not read: {', '.join(blank[:10])}.")
    stated = [c.header for c in columns if c.field.one_case and len(cases) > 1 and c.case not in cases]
    if stated:
        names = ", ".join(map(shown, stated))
        notes.append(f"Columns that name no case in a list without a normal case, not compared: {names}.")
    return notes


def _notes_aside(
    columns: Sequence[PlannedColumn], overruled: Sequence[PlannedColumn], repeated: Sequence[PlannedColumn]
) -> list[str]:
    """Return what to say of columns that are not read, or read against their words, because the criteria say so."""
    return [
        *(f"Column {shown(c.header)}: [columns] gives its field to another column, not read." for c in overruled),
        *(
            f"Column {shown(c.header)}: the field {c.field.name} is read from an earlier column, not here."
            for c in repeated
        ),
        *(
            f"Column {shown(c.header)}: [columns] takes a Reid vapour pressure for the {c.field.meaning}."
            for c in columns
            if c.hinted and c.field.name == "vapour_pressure" and says_reid(c.header)
        ),
    ]


def _headerless(layout: Layout, cells: Sequence[Sequence[str]], read: Collection[int]) -> list[tuple[str, str]]:
    """Return the columns without a header that hold numbers between columns that are read: open items."""
    found = []
    for index, header in enumerate(layout.headers):
        if header or not any(one < index for one in read) or not any(one > index for one in read):
            continue
        texts = [text for cell in islice(cells[index], CELLS_LOOKED_AT) if (text := cell.strip())]
        numbers = sum(_NUMBER.fullmatch(text) is not None for text in texts)
        if numbers and numbers >= LEAST_NUMBERS * len(texts):
            reason = f"column {index + 1} has no header and holds numbers, so it is not read: give it a header."
            found.append((f"column {index + 1}", reason))
    return found


def _has_case_column(columns: Sequence[PlannedColumn]) -> bool:
    return any(column.field.name == "case" for column in columns)


def _unread_headers(
    layout: Layout,
    cells: Sequence[Sequence[str]],
    unmatched: Sequence[int],
    left_out: Sequence[PlannedColumn],
    settled: Collection[int],
    hints: Mapping[str, ColumnHint],
    near: Mapping[int, tuple[str, str]],
) -> list[tuple[int, str]]:
    """Return the columns that are open items: those that name a case beside a case column, and those in doubt."""
    aside = {column.index: column.case for column in left_out}
    keys = {key_of(header) for header in hints}
    found = []
    for index in unmatched:
        header = layout.headers[index]
        if index in layout.doubts and key_of(header) not in keys:
            reason = layout.doubts[index]
        elif index in aside:
            reason = f"{shown(header)} names the case '{aside[index]}' in a list with a case column, so it is not read."
        elif index in settled or key_of(header) in keys:
            reason = ""
        else:
            reason = unread_reason(header, row_unit=layout.units[index], cells=cells[index])
            reason = reason or near.get(index, ("", ""))[1]
        if reason:
            found.append((index, reason))
    return found


def _not_to_be_read(field: Field) -> Field:
    """Return a field as a number of no dimension, so that no cell of its column is read by a unit of its own."""
    return replace(field, kind="number", dimension=UNSETTLED)


def _doubted(draft: Draft, layout: Layout) -> bool:
    """Return whether the layout leaves open what a column is, and the criteria do not say it."""
    return draft.index in layout.doubts and not draft.hinted


def _columns(
    drafts: Sequence[Draft],
    layout: Layout,
    cells: Sequence[Sequence[str]],
    comma: bool,
) -> tuple[list[PlannedColumn], dict[int, str]]:
    """Return a column for each header that a field claims, and by index the question of each that several claim."""
    certain = {draft.fields[0].name for draft in drafts if len(draft.fields) == 1 and not _doubted(draft, layout)}
    columns, questions = [], {}
    for draft in drafts:
        if _doubted(draft, layout):
            field = _not_to_be_read(next((one for one in draft.fields if one.kind != "text"), draft.fields[0]))
            if field.name not in certain:
                certain.add(field.name)
                columns.append(PlannedColumn(draft.index, draft.header, field, case=draft.case, unit=draft.unit))
                questions[draft.index] = layout.doubts[draft.index]
            continue
        field, question = one_field(
            draft,
            row_unit=layout.units[draft.index],
            cells=cells[draft.index],
            taken=certain,
            comma=comma,
        )
        columns.append(
            PlannedColumn(draft.index, draft.header, field, case=draft.case, unit=draft.unit, hinted=draft.hinted)
        )
        if question:
            questions[draft.index] = question
    return columns, questions


def plan_columns(
    layout: Layout,
    cells: Sequence[Sequence[str]],
    *,
    file: str,
    hints: Mapping[str, ColumnHint],
    units: Mapping[str, str],
    comma: bool,
) -> Plan:
    """Match the headers to fields, cases and units.

    Parameters
    ----------
    layout : Layout
        Headers and units row.
    cells : sequence of columns
        Cells of each column, for headers whose field or size basis only the cells tell.
    file : str
        Name of the file, for messages.
    hints : mapping of str to ColumnHint
        What the criteria say of headers; it wins over everything.
    units : mapping of str to str
        Unit by dimension that the criteria state for columns without one.
    comma : bool
        Whether the list is written with decimal commas.

    Raises
    ------
    InputError
        If two columns carry one field in one case.
    """
    drafts = _drafts(layout, hints, file)
    columns, questions = _columns(drafts, layout, cells, comma)
    left_out = [column for column in columns if column.case] if _has_case_column(columns) else []
    kept = without_overruled([column for column in columns if column not in left_out])
    if not left_out:
        kept = without_overruled(with_cases(kept, file=file, row=layout.header_row))
    overruled = [column for column in columns if column.index not in {c.index for c in (*kept, *left_out)}]
    kept, repeated = without_repeated(kept)
    refuse_duplicates(kept, file, layout.header_row)
    cases = named_cases(kept)
    kept = [_measured(c, layout, units, cells[c.index], comma) for c in one_case(kept, cases)]
    kept = [replace(c, reading=None, refusal=questions[c.index]) if c.index in questions else c for c in kept]
    read = {column.index for column in kept}
    unmatched = [index for index, header in enumerate(layout.headers) if header and index not in read]
    settled = {column.index for column in (*overruled, *repeated)}
    near = {index: near_header(layout.headers[index]) for index in unmatched[:MOST_COMPARED] if index not in settled}
    needless = {column.field.name for column in kept} | DESCRIPTIVE
    needed = {index: found for index, found in near.items() if found[0] not in needless}
    unread = _unread_headers(layout, cells, unmatched, left_out, settled, hints, needed)
    unread += second_service(repeated, kept)
    remarks = {index: sentence for index, (_, sentence) in near.items() if sentence}
    why = remarks | {c.index: _ASIDE.format(c.field.name) for c in (*overruled, *repeated)} | dict(unread)
    return Plan(
        tuple(kept),
        tuple(layout.headers[index] for index in unmatched),
        cases,
        (*_notes(kept, left_out, cases, layout), *_notes_aside(kept, overruled, repeated)),
        (
            *((layout.headers[index], reason) for index, reason in unread),
            *_headerless(layout, cells, read),
            *absent_headers(hints, layout.headers),
        ),
        header_matches(
            layout.headers,
            layout.units,
            read=kept,
            units_in_headers={draft.index: draft.unit for draft in drafts},
            unread=why,
        ),
    )
