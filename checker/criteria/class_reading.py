"""A class file as its cells: a CSV table whose headers are fields of a piping class, with their units in brackets."""

from __future__ import annotations

import csv
import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import cache
from io import StringIO
from pathlib import Path

from checker.criteria.file_reading import read_text
from checker.errors import InputError, Problem
from checker.fields import field_named
from checker.model import Source

__all__ = ["CLASS_FIELDS", "ClassTable", "read_class_table"]

CLASS_FIELDS = (
    "piping_class",
    "size_from",
    "size_to",
    "schedule",
    "wall_thickness",
    "material",
    "corrosion_allowance",
    "flange_rating",
    "roughness",
)
_NEEDED = ("piping_class", "size_from", "size_to")
_OWN_SPELLINGS = {
    "size_from": ("from size", "size min", "minimum size", "min size", "nps from", "dn from"),
    "size_to": ("to size", "size max", "maximum size", "max size", "nps to", "dn to"),
}
_HEADER = re.compile(r"(?P<name>[^\[\](]*?)\s*(?:[\[(](?P<unit>[^\])]*)[\])])?\s*")
_DELIMITERS = (",", ";", "\t")


@dataclass(frozen=True, slots=True)
class ClassTable:
    """The cells of a class file.

    Attributes
    ----------
    source : Source
        The file.
    header_row : int
        Row of the headers, counted from 1.
    headers, units : mapping of str to str
        Header as written and its unit, by field.
    rows : sequence of (int, mapping of str to str)
        Row of the file, counted from 1, and its cells by field.
    unmatched : tuple of str
        Headers that no field claimed.
    """

    source: Source
    header_row: int
    headers: Mapping[str, str]
    units: Mapping[str, str]
    rows: Sequence[tuple[int, Mapping[str, str]]]
    unmatched: tuple[str, ...]


def _folded(text: str) -> str:
    return " ".join(re.sub(r"[\W_]+", " ", text.casefold()).split())


@cache
def _spellings() -> Mapping[str, str]:
    spellings: dict[str, str] = {}
    for name in CLASS_FIELDS:
        others = _OWN_SPELLINGS.get(name) or field_named(name).spellings
        spellings.update({_folded(spelling): name for spelling in (name, *others)})
    return spellings


def _rows_of(text: str, file: str) -> list[tuple[int, list[str]]]:
    """Return the non-blank rows with the line on which each begins."""
    first = text.partition("\n")[0]
    delimiter = max(_DELIMITERS, key=first.count)
    reader = csv.reader(StringIO(text, newline=""), delimiter=delimiter, strict=True)
    rows: list[tuple[int, list[str]]] = []
    begins = 1
    try:
        for cells in reader:
            if any(cell.strip() for cell in cells):
                rows.append((begins, [cell.strip() for cell in cells]))
            begins = reader.line_num + 1
    except csv.Error as error:
        place = f"{file}, row {reader.line_num}"
        raise InputError(Problem(f"the row cannot be read: {error}.", place, "Check its quotes.")) from error
    return rows


def _match_headers(headers: Sequence[str]) -> tuple[dict[str, int], dict[str, str], list[str], list[str]]:
    """Return column and unit by field, the headers that no field claimed, and those that a field claimed twice."""
    columns: dict[str, int] = {}
    units: dict[str, str] = {}
    unmatched: list[str] = []
    twice: list[str] = []
    for index, header in enumerate(headers):
        match = _HEADER.fullmatch(header)
        field = _spellings().get(_folded(match["name"] if match else header))
        if field is None:
            unmatched.append(header)
        elif field in columns:
            twice.append(header)
        else:
            columns[field] = index
            units[field] = (match["unit"] or "").strip() if match else ""
    return columns, units, [header for header in unmatched if header], twice


def _header_problems(columns: Mapping[str, int], twice: Sequence[str], place: str) -> list[Problem]:
    problems = [
        Problem(f"there is no column {name!r}.", place, f"Add a column headed {name}.")
        for name in _NEEDED
        if name not in columns
    ]
    if "schedule" not in columns and "wall_thickness" not in columns:
        remedy = "Add a column headed schedule or wall_thickness [mm]."
        problems.append(Problem("there is neither a column 'schedule' nor 'wall_thickness'.", place, remedy))
    problems += [
        Problem("a column before says the same.", f"{place}, column {header!r}", "Leave one of them.")
        for header in twice
    ]
    return problems


def read_class_table(path: Path) -> ClassTable:
    """Return the cells of a class file.

    Raises
    ------
    InputError
        If the file cannot be read, has no rows, or its headers cannot be used; all problems of the headers at once.
    """
    text, source = read_text(path, what="class file")
    rows = _rows_of(text, source.name)
    if len(rows) < 2:
        raise InputError(Problem("there is no row below a header.", source.name, "Begin from the blank class file."))
    number, headers = rows[0]
    columns, units, unmatched, twice = _match_headers(headers)
    problems = _header_problems(columns, twice, f"{source.name}, row {number}")
    problems += [
        Problem(f"the row has {len(cells)} cells, the header {len(headers)}.", f"{source.name}, row {row}",
                "Put cells that hold the delimiter in quotes.")
        for row, cells in rows[1:]
        if len(cells) > len(headers)
    ]  # fmt: skip
    if problems:
        raise InputError(problems)
    return ClassTable(
        source=source,
        header_row=number,
        headers={field: headers[column] for field, column in columns.items()},
        units=units,
        rows=[
            (row, {field: cells[column] if column < len(cells) else "" for field, column in columns.items()})
            for row, cells in rows[1:]
        ],
        unmatched=tuple(unmatched),
    )
