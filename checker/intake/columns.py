"""Which column carries which field, in which case and in which unit."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from itertools import islice

from checker.criteria.hints import ColumnHint
from checker.errors import InputError, Problem
from checker.fields import Field, all_fields, field_named
from checker.intake.case_names import canonical_case
from checker.intake.headers import read_header, unit_in_header
from checker.intake.layout import Layout
from checker.intake.sizes import column_basis
from checker.intake.texts import fold_words, key_of, place, shown
from checker.intake.unit_words import settled_by, size_basis, unit_in_cell, unit_or_refusal
from checker.units import Unit, read_unit

__all__ = ["Plan", "PlannedColumn", "hint_fields", "number_columns", "plan_columns"]

DESCRIPTIVE = frozenset({"area", "drawing", "remarks", "revision"})
UNITLESS = frozenset({"dimensionless", "fraction"})
CELLS_LOOKED_AT = 2_000
_CASE_ORDER = ("minimum", "normal", "maximum")


@dataclass(frozen=True, slots=True)
class PlannedColumn:
    """One column that will be read.

    `unit` is the unit as written, `reading` the unit understood (None for texts and sizes, and where `refusal` says why
    bare numbers cannot be read), `basis` the basis of bare sizes, `hinted` whether the criteria name the column.
    """

    index: int
    header: str
    field: Field
    case: str = ""
    unit: str = ""
    reading: Unit | None = None
    refusal: str = ""
    basis: str = ""
    hinted: bool = False


@dataclass(frozen=True)
class Plan:
    """Columns to be read, headers no field claimed, cases named by columns, and what to say."""

    columns: tuple[PlannedColumn, ...]
    unmatched: tuple[str, ...]
    cases: tuple[str, ...]
    notes: tuple[str, ...]


@dataclass(frozen=True)
class _Draft:
    index: int
    header: str
    fields: tuple[Field, ...]
    unit: str
    case: str
    hinted: bool


def hint_fields(hints: Mapping[str, ColumnHint]) -> dict[str, str]:
    """Return the field that the criteria give each header, by folded header."""
    return {key_of(header): hint.field for header, hint in hints.items()}


def _hinted(index: int, header: str, hint: ColumnHint, file: str) -> _Draft | None:
    if not hint.field:
        return None
    names = {field.name for field in all_fields()}
    if hint.field not in names:
        raise InputError(
            Problem(
                f"[columns] gives the field '{hint.field}', which is no field of a line list.",
                where=place(file, None, header),
                remedy="`linelist fields` lists them.",
            )
        )
    field = field_named(hint.field)
    unit = hint.unit or ("" if field.kind == "text" else unit_in_header(header, field))
    case = canonical_case(hint.case) if hint.case else ""
    return _Draft(index, header, (field,), unit, case, True)


def _drafts(layout: Layout, hints: Mapping[str, ColumnHint], file: str) -> list[_Draft]:
    by_key = {key_of(header): hint for header, hint in hints.items()}
    drafts = []
    for index, header in enumerate(layout.headers):
        hint = by_key.get(key_of(header)) if header else None
        reading = None if hint is not None else read_header(header)
        draft = None if hint is None else _hinted(index, header, hint, file)
        if reading is not None:
            draft = _Draft(index, header, reading.fields, reading.unit, reading.case, False)
        if draft is not None:
            drafts.append(draft)
    return drafts


def number_columns(layout: Layout, hints: Mapping[str, ColumnHint], file: str) -> frozenset[int]:
    """Return the columns whose headers promise numbers."""
    return frozenset(draft.index for draft in _drafts(layout, hints, file) if draft.fields[0].kind == "number")


def _knows(field: Field, unit: str) -> bool:
    reading = unit_or_refusal(unit, field.dimension) if unit and field.kind == "number" else ""
    return not isinstance(reading, str)


def _by_cells(fields: Sequence[Field], cells: Sequence[str]) -> Field | None:
    """Return the field whose dimension knows the units that the cells themselves carry."""
    counts = dict.fromkeys(fields, 0)
    for cell in dict.fromkeys(islice(cells, CELLS_LOOKED_AT)):
        unit = cell.strip().lstrip("+-0123456789.,eE ")
        for field in fields:
            counts[field] += bool(unit) and not isinstance(unit_in_cell(unit, field.dimension), str)
    best = max(counts, key=lambda field: counts[field])
    return best if counts[best] else None


def _one_field(draft: _Draft, row_unit: str, units: Mapping[str, str], cells: Sequence[str]) -> Field:
    """Return the one field of a header that fits several: its unit's dimension decides."""
    fields = draft.fields
    if len(fields) == 1:
        return fields[0]
    if not draft.unit:
        by_row = [field for field in fields if _knows(field, row_unit)]
        by_criteria = [field for field in fields if field.dimension in units]
        for found in (by_row, by_criteria):
            if len(found) == 1:
                return found[0]
        return _by_cells(fields, cells) or fields[0]
    return fields[0]


def _with_unit(column: PlannedColumn, row_unit: str, units: Mapping[str, str]) -> PlannedColumn:
    """Return a number column with its unit read: of the hint or header, else the units row, else the criteria."""
    dimension = column.field.dimension
    written = column.unit or row_unit or units.get(dimension, "")
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
    if column.field.kind == "number":
        return _with_unit(column, row_unit, units)
    if column.field.kind == "size":
        return _with_basis(column, row_unit, units, cells, comma)
    return replace(column, unit="")


def _normal_named(columns: list[PlannedColumn]) -> list[PlannedColumn]:
    """Give ``Normal pressure`` to the case normal where other columns of its field name cases."""
    named = {(column.field.name, column.case) for column in columns}
    with_cases = {field for field, case in named if case}
    return [
        replace(column, case="normal")
        if not column.case
        and not column.hinted
        and column.field.name in with_cases
        and (column.field.name, "normal") not in named
        and fold_words(column.header).split()[0] in ("normal", "norm")
        else column
        for column in columns
    ]


def _without_overruled(columns: list[PlannedColumn]) -> list[PlannedColumn]:
    """Leave out a column whose field and case the criteria give to another one."""
    taken = {(column.field.name, column.case) for column in columns if column.hinted}
    return [column for column in columns if column.hinted or (column.field.name, column.case) not in taken]


def _without_repeated(columns: list[PlannedColumn]) -> tuple[list[PlannedColumn], list[PlannedColumn]]:
    """Return the columns with the first one only of each descriptive field that no check reads, and the others."""
    seen: set[str] = set()
    kept: list[PlannedColumn] = []
    repeated: list[PlannedColumn] = []
    for column in columns:
        name = column.field.name
        (repeated if name in seen and name in DESCRIPTIVE else kept).append(column)
        seen.add(name)
    return kept, repeated


def _refuse_duplicates(columns: Sequence[PlannedColumn], file: str, row: int) -> None:
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
        remedy = "Say in [columns] of the criteria which header carries the field, or rename one of them."
        problems.append(Problem(what, where=place(file, row), remedy=remedy))
    if problems:
        raise InputError(problems)


def _cases(columns: Sequence[PlannedColumn]) -> tuple[str, ...]:
    named = dict.fromkeys(column.case for column in columns if column.case)
    return (*(case for case in _CASE_ORDER if case in named), *(case for case in named if case not in _CASE_ORDER))


def _one_case(columns: Sequence[PlannedColumn], cases: Sequence[str]) -> list[PlannedColumn]:
    """Give a contractor's stated result that names no case to the case normal, where there are several."""
    if len(cases) < 2:
        return list(columns)
    return [replace(c, case="normal") if c.field.one_case and not c.case else c for c in columns]


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
    columns = [
        PlannedColumn(
            draft.index,
            draft.header,
            _one_field(draft, layout.units[draft.index], units, cells[draft.index]),
            case=draft.case,
            unit=draft.unit,
            hinted=draft.hinted,
        )
        for draft in _drafts(layout, hints, file)
    ]
    columns = _without_overruled(_normal_named(columns))
    by_rows = any(column.field.name == "case" for column in columns)
    left_out = [column for column in columns if by_rows and column.case]
    columns, repeated = _without_repeated([column for column in columns if column not in left_out])
    _refuse_duplicates(columns, file, layout.header_row)
    cases = _cases(columns)
    columns = [_measured(c, layout, units, cells[c.index], comma) for c in _one_case(columns, cases)]
    read = {column.index for column in columns}
    unmatched = tuple(header for index, header in enumerate(layout.headers) if header and index not in read)
    notes = [
        f"Column {shown(column.header)}: the field {column.field.name} is read from an earlier column, not here."
        for column in repeated
    ]
    return Plan(tuple(columns), unmatched, cases, (*_notes(columns, left_out, cases, layout), *notes))
