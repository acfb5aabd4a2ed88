"""The records that pass between the stages.

Everything is held as arrays: a line case is an index, a text is an integer code (-1 missing), a missing number is NaN
with the kind of its gap beside it, and a cell's address is a row number per line and a column per field and case.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, field
from enum import IntEnum
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

__all__ = [
    "RANGE_WORDS",
    "Address",
    "CaseKind",
    "CellRecord",
    "Coded",
    "Column",
    "Gap",
    "HeaderMatch",
    "HoldItem",
    "LineList",
    "Phase",
    "PressureBasis",
    "RangeItem",
    "Source",
    "UnreadItem",
    "base_case",
]

FloatArray = NDArray[np.float64]
IntArray = NDArray[np.int32]
CodeArray = NDArray[np.int8]
BoolArray = NDArray[np.bool_]

#: Between a case and the end of a range that its line case takes: ``normal, with low pressure``.
RANGE_WORDS = ", with "


def base_case(case: str) -> str:
    """Return the case as the list names it, without the end of a range that a line case takes."""
    return case.partition(RANGE_WORDS)[0]


class Phase(IntEnum):
    """Phase of the fluid in a line case."""

    UNKNOWN = -1
    LIQUID = 0
    GAS = 1
    TWO_PHASE = 2


class PressureBasis(IntEnum):
    """End of the line at which its pressure is stated."""

    UNKNOWN = -1
    INLET = 0
    OUTLET = 1


class CaseKind(IntEnum):
    """Kind of a case: it decides which limits hold."""

    UNKNOWN = -1
    CONTINUOUS = 0
    INTERMITTENT = 1
    NO_FLOW = 2
    MECHANICAL_ONLY = 3


class Gap(IntEnum):
    """Why a value is not there."""

    GIVEN = 0
    BLANK = 1
    HOLD = 2
    NOT_APPLICABLE = 3
    REFUSED = 4
    NO_COLUMN = 5


@dataclass(frozen=True, slots=True)
class Source:
    """One input file as it was read: its name, its SHA-256 and what was understood of its form."""

    name: str
    sha256: str
    form: str = ""


@dataclass(frozen=True, slots=True)
class Address:
    """Where a value stands: file, row (counted from 1) and the column's header as written."""

    file: str
    row: int
    column: str

    def __str__(self) -> str:
        return f"{self.file}, row {self.row}, column '{self.column}'"


class CellRecord(NamedTuple):
    """One number cell in full: as written, the number or numbers read, their unit, the SI values, and what to say.

    A range has two numbers, the lower one first; a limit or an approximation has one, and `remark` says why it is
    not used; a cell without a number has none.
    """

    text: str
    numbers: tuple[float, ...] = ()
    unit: str = ""
    values: tuple[float, ...] = ()
    remark: str = ""


@dataclass(frozen=True, slots=True)
class Column:
    """One matched column of the list.

    Attributes
    ----------
    field : str
        Canonical field it carries.
    header : str
        Header as written.
    case : str
        Case it names; empty where it belongs to every case.
    unit : str
        Unit read for it, as written; empty for texts and for columns whose cells carry their own.
    cells : sequence of str
        The cells as written, one a line of the list.
    record : callable, optional
        Reads one cell of a number column again, in full; None where the column holds no numbers.
    """

    field: str
    header: str
    case: str
    unit: str
    cells: Sequence[str]
    record: Callable[[str], CellRecord] | None = None


@dataclass(frozen=True, slots=True)
class Coded:
    """Texts as integer codes into a table of distinct texts; -1 is missing."""

    codes: IntArray
    texts: tuple[str, ...]

    def text(self, index: int) -> str:
        """Return the text at an index, empty where missing."""
        code = int(self.codes[index])
        return self.texts[code] if code >= 0 else ""

    def take(self, indices: IntArray) -> Coded:
        """Return the texts at the given indices."""
        return Coded(self.codes[indices], self.texts)

    def where(self, chosen: Sequence[bool]) -> BoolArray:
        """Return True where the text at that code is chosen; a missing text never is."""
        table = np.append(np.asarray(chosen, dtype=np.bool_), False)
        return table[self.codes]


@dataclass(frozen=True, slots=True)
class HoldItem:
    """One open item of the originator."""

    line_number: str
    field: str
    text: str
    address: Address


@dataclass(frozen=True, slots=True)
class UnreadItem:
    """One row or cell that was refused, with the sentence that says why and what to do."""

    line_number: str
    text: str
    reason: str
    address: Address


@dataclass(frozen=True, slots=True)
class HeaderMatch:
    """What became of one header of the list.

    `position` counts from 1; `field` is empty where no field claims the header, and `remark` then names the closest
    one; `unit` is the unit as written, and `remark` also says where a unit came from that the header does not state,
    or why the column is not read.
    """

    position: int
    header: str
    field: str
    case: str
    unit: str
    remark: str


@dataclass(frozen=True, slots=True)
class RangeItem:
    """One cell that states two values: both ends in SI, each judged as a line case of its own."""

    line_number: str
    field: str
    text: str
    low: float
    high: float
    address: Address


@dataclass(frozen=True)
class LineList:
    """A line list as it was understood.

    Attributes
    ----------
    source : Source
        The file.
    columns : tuple of Column
        Matched columns.
    unmatched : tuple of str
        Headers that no field claimed.
    notes : tuple of str
        Sentences on what was understood (delimiter, header row, case columns, composite cases ...).
    line_number : tuple of str
        Line number of each line, as written.
    row : int array, shape (lines,)
        Row of the file on which each line stands, counted from 1.
    line : int32 array, shape (line cases,)
        Index of the line of each line case.
    case : Coded, shape (line cases,)
        Case of each line case, in canonical words (``normal``, ``maximum``, ``minimum`` ...).
    case_kind : int8 array, shape (line cases,)
        `CaseKind` of each line case.
    composite : bool array, shape (line cases,)
        True where one case's flow stands beside another case's pressure, temperature or properties.
    numbers : mapping of str to float array, shape (line cases,)
        SI values of every number field that the list has a column for; ``size`` in NPS inches.
    texts : mapping of str to Coded, shape (line cases,)
        Texts of every text field that the list has a column for.
    gaps : mapping of str to int8 array, shape (line cases,)
        `Gap` of every field that the list has a column for (texts too).
    refusals : mapping of (str, int) to str
        Sentence for each refused value, by field and line case.
    holds, unread : tuple
        HOLD register and refused rows or cells.
    deleted : tuple of UnreadItem
        Lines that their originator has deleted (struck through, or said so): listed, not checked.
    matching : tuple of HeaderMatch
        What became of every header.
    ranges : tuple of RangeItem
        Cells that state two values.
    """

    source: Source
    columns: tuple[Column, ...]
    unmatched: tuple[str, ...]
    notes: tuple[str, ...]
    line_number: tuple[str, ...]
    row: IntArray
    line: IntArray
    case: Coded
    case_kind: CodeArray
    composite: BoolArray
    numbers: Mapping[str, FloatArray]
    texts: Mapping[str, Coded]
    gaps: Mapping[str, CodeArray]
    refusals: Mapping[tuple[str, int], str] = field(default_factory=dict)
    holds: tuple[HoldItem, ...] = ()
    unread: tuple[UnreadItem, ...] = ()
    deleted: tuple[UnreadItem, ...] = ()
    matching: tuple[HeaderMatch, ...] = ()
    ranges: tuple[RangeItem, ...] = ()

    @property
    def line_cases(self) -> int:
        """Number of line cases."""
        return int(self.line.size)

    def has(self, name: str) -> bool:
        """Return whether the list has a column for a field."""
        return name in self.numbers or name in self.texts

    def number(self, name: str) -> FloatArray:
        """Return a number field over the line cases, NaN throughout where the list has no such column."""
        values = self.numbers.get(name)
        return np.full(self.line_cases, np.nan) if values is None else values

    def text(self, name: str) -> Coded:
        """Return a text field over the line cases, missing throughout where the list has no such column."""
        coded = self.texts.get(name)
        return Coded(np.full(self.line_cases, -1, dtype=np.int32), ()) if coded is None else coded

    def gap(self, name: str) -> CodeArray:
        """Return why each value of a field is missing; `Gap.NO_COLUMN` where the list has no such column."""
        gaps = self.gaps.get(name)
        return np.full(self.line_cases, Gap.NO_COLUMN, dtype=np.int8) if gaps is None else gaps

    def column_of(self, name: str, line_case: int) -> Column | None:
        """Return the column from which a field of a line case was read."""
        mine = [column for column in self.columns if column.field == name]
        case = base_case(self.case.text(line_case))
        return next((column for column in mine if column.case == case), next((c for c in mine if not c.case), None))

    def address(self, name: str, line_case: int) -> Address | None:
        """Return where a field of a line case stands, None where the list has no such column."""
        column = self.column_of(name, line_case)
        if column is None:
            return None
        return Address(self.source.name, int(self.row[self.line[line_case]]), column.header)

    def cell(self, name: str, line_case: int) -> str:
        """Return the cell as written from which a field of a line case was read."""
        column = self.column_of(name, line_case)
        return "" if column is None else column.cells[int(self.line[line_case])]

    def record(self, name: str, line_case: int) -> CellRecord | None:
        """Return a number field's cell in full: text, number, unit and SI value; None where there is no such column."""
        column = self.column_of(name, line_case)
        if column is None or column.record is None:
            return None
        return column.record(column.cells[int(self.line[line_case])])
