"""`read_equipment`: an equipment list becomes tags, kinds and numbers in SI."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from pathlib import Path

import numpy as np

from checker.errors import InputError, Problem
from checker.fields import Field
from checker.intake.cells import CodedCells
from checker.intake.convert import convert_sizes
from checker.intake.convert_numbers import column_evidence, convert_numbers
from checker.intake.converted import ConvertedNumbers
from checker.intake.decimal_marks import decide, together
from checker.intake.equipment_fields import KINDS, field_of_key, kind_of
from checker.intake.layout import Layout, find_layout
from checker.intake.number_cells import NumberContext
from checker.intake.opening import Opened, open_table
from checker.intake.placeholders import placeholder
from checker.intake.planned import PlannedColumn
from checker.intake.texts import key_of, place, shown
from checker.intake.unit_words import size_basis, unit_or_refusal
from checker.model import Address, FloatArray, Gap, HoldItem, IntArray, Source, UnreadItem
from checker.units import STANDARD_ATMOSPHERE, read_unit

__all__ = ["Equipment", "read_equipment"]

MOST_ROWS = 20_000
_HEADER = re.compile(r"(?P<name>[^\[\](]*?)\s*(?:[\[(](?P<unit>[^\])]*)[\])])?\s*")
_REMEDY = "`linelist template DIR` writes a blank equipment list to begin from."


@dataclass(frozen=True)
class Equipment:
    """An equipment list as it was understood.

    Attributes
    ----------
    source : Source
        The file.
    tag, kind : tuple of str, one a row
        Tag as written; kind in the words of `checker.intake.equipment_fields.KINDS`, empty where it is not known.
    row : int32 array, shape (rows,)
        Row of the file on which each stands, counted from 1.
    numbers : mapping of str to float array, shape (rows,)
        SI values (gauge pressures made absolute, sizes in NPS inches), NaN where there is none.
    unmatched : tuple of str
        Headers that no field claimed.
    holds, unread : tuple
        Open items, and cells or columns that were refused, each with its sentence.
    """

    source: Source
    tag: tuple[str, ...]
    kind: tuple[str, ...]
    row: IntArray
    numbers: Mapping[str, FloatArray]
    unmatched: tuple[str, ...] = ()
    holds: tuple[HoldItem, ...] = ()
    unread: tuple[UnreadItem, ...] = ()


@dataclass
class _Sheet:
    """Rows of the table, and what is said of their cells."""

    file: str
    layout: Layout
    columns: Mapping[str, PlannedColumn]
    rows: Sequence[tuple[int, Sequence[str]]]
    tags: tuple[str, ...]
    holds: list[HoldItem] = field(default_factory=list)
    unread: list[UnreadItem] = field(default_factory=list)

    def cells(self, name: str) -> list[str]:
        """Return the cells of a column."""
        index = self.columns[name].index
        return [cells[index].strip() for _, cells in self.rows]

    def address(self, index: int, name: str) -> Address:
        """Return where a cell stands."""
        return Address(self.file, self.rows[index][0], self.columns[name].header)

    def refuse(self, index: int, name: str, text: str, reason: str) -> None:
        """Keep a refused cell with its sentence."""
        self.unread.append(UnreadItem(self.tags[index], text, reason, self.address(index, name)))


def read_equipment(
    path: Path,
    *,
    units: Mapping[str, str] | None = None,
    atmosphere: float = STANDARD_ATMOSPHERE,
    sheet: str | None = None,
) -> Equipment:
    """Read an equipment list from a delimited text or a workbook; the file is only read.

    Parameters
    ----------
    path : Path
        The file: one row a piece of equipment, headers as in ``tables/equipment_fields.csv`` with their units.
    units : mapping of str to str, optional
        Unit by dimension for columns that state none.
    atmosphere : float, optional
        The site's atmospheric pressure, Pa, on which gauge pressures rest.
    sheet : str, optional
        Sheet of a workbook.

    Raises
    ------
    InputError
        If the file cannot be read, has no tag column or no row, repeats a header, or gives a tag twice.
    """
    hints = {key: "line_number" if each.name == "tag" else each.name for key, each in field_of_key().items()}
    opened = open_table(Path(path), sheet=sheet, hints=hints)
    layout = find_layout(opened.form.head, file=opened.label, hints=hints)
    columns, unmatched = _columns(layout, opened.label, units or {})
    rows = _rows(opened, layout, columns["tag"].index)
    tags = tuple(" ".join(cells[columns["tag"].index].split()) for _, cells in rows)
    _refuse_tags_given_twice(tags, rows, opened.label)
    table = _Sheet(opened.label, layout, columns, rows, tags)
    kinds = _kinds(table)
    numbers = _numbers(table, opened, atmosphere)
    return Equipment(
        source=Source(opened.label, opened.sha256, " ".join(opened.notes)),
        tag=tags,
        kind=kinds,
        row=np.array([row for row, _ in rows], dtype=np.int32),
        numbers=numbers,
        unmatched=unmatched,
        holds=tuple(table.holds),
        unread=tuple(sorted(table.unread, key=lambda item: item.address.row)),
    )


def _columns(layout: Layout, file: str, units: Mapping[str, str]) -> tuple[dict[str, PlannedColumn], tuple[str, ...]]:
    """Return the column of each field, and the headers that no field claims."""
    columns: dict[str, PlannedColumn] = {}
    unmatched: list[str] = []
    twice: list[Problem] = []
    where = place(file, layout.header_row)
    for index, header in enumerate(layout.headers):
        match = _HEADER.fullmatch(header)
        whole = field_of_key().get(key_of(header))
        found = whole or (field_of_key().get(key_of(match["name"])) if match else None)
        if found is None:
            unmatched += [header] if header else []
        elif found.name in columns:
            what = f"{shown(header)} and {shown(columns[found.name].header)} both say the {found.meaning}."
            twice.append(Problem(what, where, "Leave one of them."))
        else:
            unit = "" if whole or match is None else (match["unit"] or "").strip()
            columns[found.name] = _planned(index, header, found, unit or layout.units[index], units)
    if "tag" not in columns:
        twice.append(Problem("there is no column 'tag'.", where, _REMEDY))
    if twice:
        raise InputError(twice)
    return columns, tuple(unmatched)


def _planned(index: int, header: str, found: Field, unit: str, units: Mapping[str, str]) -> PlannedColumn:
    unit = unit or units.get(found.dimension, "")
    if found.kind == "text":
        return PlannedColumn(index, header, found)
    if found.kind == "size":
        basis = size_basis(unit) or units.get("size", "")
        return PlannedColumn(index, header, found, unit=basis, basis=basis)
    if found.dimension == "dimensionless":
        return PlannedColumn(index, header, found, reading=read_unit("-", "dimensionless"))
    if not unit:
        return PlannedColumn(index, header, found, refusal=f"no unit: write it in the header, as {found.name} [...].")
    reading = unit_or_refusal(unit, found.dimension)
    if isinstance(reading, str):
        return PlannedColumn(index, header, found, unit=unit, refusal=reading)
    return PlannedColumn(index, header, found, unit=unit, reading=reading)


def _rows(opened: Opened, layout: Layout, tag: int) -> list[tuple[int, Sequence[str]]]:
    """Return the rows beneath the header that hold a tag, each as wide as the header.

    Raises
    ------
    InputError
        If a row is longer than the header, holds values without a tag, or there is no row at all.
    """
    width = len(layout.headers)
    rows: list[tuple[int, Sequence[str]]] = []
    problems: list[Problem] = []
    for block in opened.blocks():
        for index, cells in enumerate(block.rows):
            number = block.first + index + 1
            if number < layout.first_row or number - 1 in opened.struck:
                continue
            problem = _row_problem(cells, width, tag, damaged=index in block.damaged)
            if problem:
                problems.append(Problem(problem[0], place(opened.label, number), problem[1]))
            elif any(cell.strip() for cell in cells):
                rows.append((number, [*cells[:width], *[""] * (width - len(cells))]))
    if not rows and not problems:
        problems.append(Problem("no equipment: no row beneath the header has a tag.", place(opened.label), _REMEDY))
    if len(rows) > MOST_ROWS:
        problems.append(Problem(f"more than {MOST_ROWS} rows.", place(opened.label), "Give the equipment of one list."))
    if problems:
        raise InputError(problems[:50])
    return rows


def _row_problem(cells: Sequence[str], width: int, tag: int, *, damaged: bool) -> tuple[str, str] | None:
    if damaged:
        return "quotation marks contradict each other in the row.", "Double them inside a quoted cell."
    if any(cell.strip() for cell in cells[width:]):
        return f"the row has more cells than the header has columns ({width}).", "Quote cells that hold the delimiter."
    if any(cell.strip() for cell in cells) and (tag >= len(cells) or not cells[tag].strip()):
        return "the row has values but no tag.", "Write the tag of the equipment on every row."
    return None


def _refuse_tags_given_twice(tags: Sequence[str], rows: Sequence[tuple[int, Sequence[str]]], file: str) -> None:
    first: dict[str, int] = {}
    problems = []
    for tag, (row, _) in zip(tags, rows, strict=True):
        before = first.setdefault(tag.casefold(), row)
        if before != row:
            what = f"the tag {shown(tag)} stands on row {before} too."
            problems.append(Problem(what, place(file, row), "Give each piece of equipment on one row."))
    if problems:
        raise InputError(problems)


def _kinds(table: _Sheet) -> tuple[str, ...]:
    if "kind" not in table.columns:
        return ("",) * len(table.tags)
    kinds = []
    for index, text in enumerate(table.cells("kind")):
        kind = kind_of(text)
        gap = Gap.GIVEN if kind else placeholder(text, "kind")
        if gap is Gap.HOLD:
            table.holds.append(HoldItem(table.tags[index], "kind", text, table.address(index, "kind")))
        elif not kind and gap is Gap.GIVEN:
            table.refuse(index, "kind", text, f"{shown(text)} is no kind of equipment known: {', '.join(KINDS)}.")
        kinds.append(kind)
    return tuple(kinds)


def _numbers(table: _Sheet, opened: Opened, atmosphere: float) -> dict[str, FloatArray]:
    """Return the number and size columns in SI; refusals and open items go to the table."""
    form = opened.form
    coded = {name: _coded(table.cells(name)) for name, column in table.columns.items() if column.field.kind != "text"}
    evidence = {name: column_evidence(cells) for name, cells in coded.items()}
    of_list = together(evidence.values())
    numbers: dict[str, FloatArray] = {}
    for name, cells in coded.items():
        column = table.columns[name]
        if column.field.kind == "size":
            converted = convert_sizes(cells, column, comma=form.comma)
        else:
            marks = decide(evidence[name], of_list, comma=form.comma, delimiter=form.delimiter)
            context = NumberContext(
                column.field, column.reading, column.refusal, atmosphere, form.delimiter, form.comma, None, marks
            )
            converted = convert_numbers(cells, context)
        numbers[name] = _given(table, opened, name, cells, converted)
    return numbers


def _coded(cells: Sequence[str]) -> CodedCells:
    texts = tuple(dict.fromkeys(cells))
    codes = {text: code for code, text in enumerate(texts)}
    return CodedCells(np.array([codes[text] for text in cells], dtype=np.int32), texts)


def _given(table: _Sheet, opened: Opened, name: str, cells: CodedCells, converted: ConvertedNumbers) -> FloatArray:
    """Return the values of a column; a range, a cell marked by the workbook and a refused column have none."""
    column = table.columns[name]
    ranged = {index: f"{shown(cells[index])} states two values: write one." for index in converted.highs}
    line_of = {row - 1: index for index, (row, _) in enumerate(table.rows)}
    marked = {**opened.no_numbers.get(column.index, {}), **opened.refused.get(column.index, {})}
    ranged |= {line_of[row]: reason for row, reason in marked.items() if row in line_of}
    needs = np.flatnonzero((converted.rests_on != 0) & (converted.gaps == Gap.GIVEN)).tolist()
    ranged |= {index: f"{shown(cells[index])}: its unit needs a density beside it." for index in needs}
    if ranged:
        converted.refuse(ranged)
    if converted.column_refusal:
        address = Address(table.file, table.layout.header_row, column.header)
        table.unread.append(UnreadItem("", column.header, converted.column_refusal, address))
    for index, reason in converted.reasons.items():
        table.refuse(index, name, cells[index], reason)
    for index in converted.holds:
        table.holds.append(HoldItem(table.tags[index], name, cells[index], table.address(index, name)))
    return np.where(converted.gaps == Gap.GIVEN, converted.values, np.nan)
