"""The class file: what a piping class says of a line of a given size."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

from checker.criteria.class_reading import ClassTable, read_class_table
from checker.criteria.nominal_size import read_nominal_size
from checker.criteria.places import MOST_PROBLEMS, shown
from checker.criteria.quantities import LARGEST_ROUGHNESS
from checker.criteria.schedule_walls import differing_walls
from checker.errors import InputError, Problem
from checker.model import Coded, Source
from checker.pipe.sizes import normalised_schedule
from checker.units import UnitRefusedError, read_quantity, read_unit

__all__ = ["ClassRow", "ClassValues", "Classes", "load_classes"]

FloatArray = NDArray[np.float64]
IntArray = NDArray[np.int32]
BoolArray = NDArray[np.bool_]

TOLERANCE = 1e-9
_OPEN = frozenset(("hold", "on hold", "tbc", "tba", "tbd", "tbf", "later", "?"))
_BLANKS = _OPEN | {"", "-", "\u2013", "\u2014", "n/a", "na", "n.a.", "none", "nil"}
_OPTIONAL = ("schedule", "wall_thickness", "material", "corrosion_allowance", "flange_rating", "roughness")
_NUMBERS = ("wall_thickness", "corrosion_allowance", "roughness")


@dataclass(frozen=True, slots=True)
class ClassRow:
    """One row of the class file.

    Attributes
    ----------
    row : int
        Row of the file, counted from 1.
    piping_class : str
        As written.
    size_from, size_to : float
        First and last size, NPS inches, both belonging to the row.
    schedule, material, flange_rating : str
        As written; empty where blank.
    wall_thickness, corrosion_allowance, roughness : float
        m; NaN where blank.
    """

    row: int
    piping_class: str
    size_from: float
    size_to: float
    schedule: str
    wall_thickness: float
    material: str
    corrosion_allowance: float
    flange_rating: str
    roughness: float


@dataclass(frozen=True, slots=True)
class ClassValues:
    """What the class file says of every line case, all of shape (n,).

    Attributes
    ----------
    schedule, material, flange_rating : Coded
        Texts; -1 where the class does not say.
    wall_thickness, corrosion_allowance, roughness : float array
        m; NaN where the class does not say.
    class_known : bool array
        True where the class file holds the class at all.
    known : bool array
        True where it holds the class at that size.
    row : int32 array
        Row of the class file, counted from 1; 0 where not known.
    """

    schedule: Coded
    wall_thickness: FloatArray
    material: Coded
    corrosion_allowance: FloatArray
    flange_rating: Coded
    roughness: FloatArray
    class_known: BoolArray
    known: BoolArray
    row: IntArray


def _same_class(text: str) -> str:
    """Return a class as it is compared: case and blanks aside; punctuation tells classes apart."""
    return "".join(text.casefold().split())


def _coded(texts: Sequence[str], position: NDArray[np.intp]) -> Coded:
    """Return the text at each position as codes; position -1 and empty texts are missing."""
    distinct = tuple(dict.fromkeys(text for text in texts if text))
    codes = [distinct.index(text) if text else -1 for text in texts]
    return Coded(np.array([*codes, -1], dtype=np.int32)[position], distinct)


def _numbers(values: Sequence[float], position: NDArray[np.intp]) -> FloatArray:
    """Return the number at each position; NaN at position -1."""
    return np.array([*values, np.nan], dtype=np.float64)[position]


@dataclass(frozen=True, slots=True)
class Classes:
    """The class file of a project.

    Attributes
    ----------
    source : Source
        The file.
    rows : tuple of ClassRow
        In file order.
    unmatched : tuple of str
        Headers that were not understood and are not used.
    """

    source: Source
    rows: tuple[ClassRow, ...]
    unmatched: tuple[str, ...] = ()

    def _position(self, class_of_line: IntArray, names: Mapping[str, int], size: FloatArray) -> NDArray[np.intp]:
        """Return the index of the class row of every line case; -1 where none holds its class and size."""
        position = np.full(size.shape, -1, dtype=np.intp)
        used = set(np.unique(class_of_line).tolist())
        with np.errstate(invalid="ignore"):
            for index, row in enumerate(self.rows):
                code = names[_same_class(row.piping_class)]
                if code in used:
                    low, high = row.size_from * (1.0 - TOLERANCE), row.size_to * (1.0 + TOLERANCE)
                    position[(class_of_line == code) & (size >= low) & (size <= high)] = index
        return position

    def look_up(self, *, piping_class: Coded, size: FloatArray) -> ClassValues:
        """Return what the class file says of every line case.

        Parameters
        ----------
        piping_class : Coded, shape (n,)
            Class of each line case; case and blanks do not matter.
        size : float array, shape (n,)
            Nominal size, NPS inches; NaN is known to no class.
        """
        names = {name: code for code, name in enumerate(dict.fromkeys(_same_class(r.piping_class) for r in self.rows))}
        table = [names.get(_same_class(text), -1) for text in piping_class.texts]
        class_of_line = np.array([*table, -1], dtype=np.int32)[piping_class.codes]
        position = self._position(class_of_line, names, size)
        return ClassValues(
            schedule=_coded([row.schedule for row in self.rows], position),
            wall_thickness=_numbers([row.wall_thickness for row in self.rows], position),
            material=_coded([row.material for row in self.rows], position),
            corrosion_allowance=_numbers([row.corrosion_allowance for row in self.rows], position),
            flange_rating=_coded([row.flange_rating for row in self.rows], position),
            roughness=_numbers([row.roughness for row in self.rows], position),
            class_known=class_of_line >= 0,
            known=position >= 0,
            row=np.array([*(row.row for row in self.rows), 0], dtype=np.int32)[position],
        )


class _CellReader:
    """Reads the cells of a class table and keeps every problem with file, row and column."""

    def __init__(self, table: ClassTable, units: Mapping[str, str]) -> None:
        self.table = table
        self.units = units
        self.problems: list[Problem] = []

    def add(self, row: int, field: str, what: str, remedy: str) -> None:
        place = f"{self.table.source.name}, row {row}, column {self.table.headers[field]!r}"
        self.problems.append(Problem(what, place, remedy))
        if len(self.problems) >= MOST_PROBLEMS:
            last = Problem(f"more than {MOST_PROBLEMS} problems.", self.table.source.name, "Correct these first.")
            raise InputError([*self.problems, last])

    def text(self, cells: Mapping[str, str], field: str) -> str:
        cell = cells.get(field, "")
        return "" if cell.casefold() in _BLANKS else cell

    def number(self, row: int, cells: Mapping[str, str], field: str) -> float:
        """Return a number field in m; the unit is the cell's own, the header's, or that of the criteria."""
        cell = self.text(cells, field)
        if not cell:
            return math.nan
        unit = self.table.units[field] or self.units.get("diameter", "")
        plain = cell.replace("+", "", 1).replace("-", "", 1).replace(".", "", 1).isdigit()
        try:
            value = read_quantity(f"{cell} {unit}" if plain else cell, "diameter")
        except UnitRefusedError as error:
            self.add(row, field, str(error), 'Write the unit in the header, such as "[mm]", and a number in the cell.')
            return math.nan
        if value < 0.0 or (value == 0.0 and field == "wall_thickness"):
            self.add(row, field, f"{shown(cell)} cannot be.", "Write a positive number or leave the cell blank.")
            return math.nan
        if field == "roughness" and value > LARGEST_ROUGHNESS:
            what = f"{shown(cell)}: no pipe is rougher than {LARGEST_ROUGHNESS * 1e3:g} mm."
            self.add(row, field, what, "Check the unit: steel has some 0.05 mm.")
            return math.nan
        return value

    def size(self, row: int, cells: Mapping[str, str], field: str) -> float:
        """Return a size in NPS inches; a bare number takes the header's unit."""
        cell, unit = cells[field], self.table.units[field].upper()
        metric = unit in ("DN", "MM") and cell.isdigit()
        size = read_nominal_size(f"DN {cell}" if metric else cell)
        if math.isnan(size):
            self.add(row, field, f"{shown(cell)} is not a nominal size of ASME B36.10M.", 'Write 6", NPS 6 or DN 150.')
        return size


def _schedule(reader: _CellReader, number: int, cells: Mapping[str, str]) -> str:
    schedule = reader.text(cells, "schedule")
    if schedule and not normalised_schedule(schedule):
        remedy = "Write one such as 40, 40S, STD or XS; a wall of no schedule stands in wall_thickness."
        reader.add(number, "schedule", f"{shown(schedule)} is no schedule of ASME B36.10M or B36.19M.", remedy)
    return schedule


def _check_walls(row: ClassRow, reader: _CellReader) -> None:
    """Refuse a row whose wall is not that of its schedule."""
    differing = differing_walls(
        schedule=row.schedule, wall_thickness=row.wall_thickness, size_from=row.size_from, size_to=row.size_to
    )
    if differing:
        size, wall = differing[0]
        others = " and at larger sizes of the row" if len(differing) > 1 else ""
        what = (
            f"the wall {row.wall_thickness * 1e3:.4g} mm is more than 12.5 % off that of schedule "
            f"{shown(row.schedule)}, {wall * 1e3:.4g} mm, at NPS {size:g}{others}."
        )
        reader.add(row.row, "wall_thickness", what, "Leave one of the two blank, or give each size a row.")


def _row(reader: _CellReader, number: int, cells: Mapping[str, str]) -> ClassRow:
    for field in _OPTIONAL:
        if cells.get(field, "").casefold() in _OPEN:
            what = f"{shown(cells[field])} is an open item, and lines of this class would be judged without it."
            reader.add(number, field, what, "Give the value, or leave the cell blank where the class does not set it.")
    name = reader.text(cells, "piping_class")
    if not name:
        reader.add(number, "piping_class", "the row names no class.", "Write the class.")
    size_from, size_to = (reader.size(number, cells, field) for field in ("size_from", "size_to"))
    if size_from > size_to:
        what = f"the sizes run from {cells['size_from']} down to {cells['size_to']}."
        reader.add(number, "size_to", what, "Write the smaller size first.")
    return ClassRow(
        row=number,
        piping_class=name,
        size_from=size_from,
        size_to=size_to,
        schedule=_schedule(reader, number, cells),
        wall_thickness=reader.number(number, cells, "wall_thickness"),
        material=reader.text(cells, "material"),
        corrosion_allowance=reader.number(number, cells, "corrosion_allowance"),
        flange_rating=reader.text(cells, "flange_rating"),
        roughness=reader.number(number, cells, "roughness"),
    )


def _check_units(reader: _CellReader) -> None:
    """Refuse header units that are no length, once a column."""
    row = reader.table.header_row
    for field in _NUMBERS:
        unit = reader.table.units.get(field)
        if unit:
            try:
                read_unit(unit, "diameter")
            except UnitRefusedError as error:
                reader.add(row, field, str(error), 'Write a unit of length, such as "[mm]".')
    for field in ("size_from", "size_to"):
        unit = reader.table.units[field]
        if unit.upper() not in ("", "NPS", "DN", "MM", "IN", "INCH", '"'):
            reader.add(row, field, f"{shown(unit)} is no unit of a nominal size.", "Write [NPS] or [DN].")


def _check_overlaps(rows: Sequence[ClassRow], reader: _CellReader) -> None:
    by_class: dict[str, list[ClassRow]] = {}
    for row in rows:
        if row.piping_class and row.size_from <= row.size_to:
            by_class.setdefault(_same_class(row.piping_class), []).append(row)
    for mine in by_class.values():
        mine.sort(key=lambda row: (row.size_from, row.row))
        widest = mine[0]
        for row in mine[1:]:
            if row.size_from <= widest.size_to * (1.0 + TOLERANCE):
                what = f"class {row.piping_class!r}: the sizes overlap those of row {widest.row}."
                reader.add(row.row, "size_from", what, "Let each size of a class stand in one row only.")
            widest = max(widest, row, key=lambda each: each.size_to)


def load_classes(path: Path, *, units: Mapping[str, str] | None = None) -> Classes:
    """Load a project's class file.

    A row may give a schedule and a wall only where the two agree within the mill tolerance of 12.5 %.

    Parameters
    ----------
    path : Path
        CSV with the columns piping_class, size_from, size_to, schedule or wall_thickness, and, where known, material,
        corrosion_allowance, flange_rating, roughness; units in the headers: ``wall_thickness [mm]``.
    units : mapping of str to str, optional
        Unit of a header that states none, by dimension (``diameter``), as the criteria's [units] say.

    Raises
    ------
    InputError
        If the file cannot be used. It holds all problems at once, each with file, row and column.
    """
    table = read_class_table(path)
    reader = _CellReader(table, units or {})
    _check_units(reader)
    if reader.problems:
        raise InputError(reader.problems)
    rows = tuple(_row(reader, number, cells) for number, cells in table.rows)
    for row in rows:
        _check_walls(row, reader)
    _check_overlaps(rows, reader)
    if reader.problems:
        raise InputError(reader.problems)
    return Classes(source=table.source, rows=rows, unmatched=table.unmatched)
