"""What a column says of its cells, and what one number cell becomes."""

from __future__ import annotations

from dataclasses import dataclass
from typing import NamedTuple

from checker.fields import Field
from checker.intake.decimal_marks import Marks
from checker.intake.ranges import LOWEST_DESIGN
from checker.model import CellRecord, Gap
from checker.units import Unit

__all__ = [
    "AT_60_DEGF",
    "KINEMATIC",
    "SPECIFIC_GRAVITY",
    "Cell",
    "CellReading",
    "NumberContext",
    "given",
    "of_two",
    "refused",
]

NAN = float("nan")
KINEMATIC, SPECIFIC_GRAVITY, AT_60_DEGF = 1, 2, 3


class CellReading(NamedTuple):
    """One number cell.

    Attributes
    ----------
    value : float
        SI value, the lower end where the cell states two; NaN where there is none.
    gap : Gap
        Why there is none.
    reason : str
        Sentence of a refusal.
    rests_on : int
        What the unit still needs beside it: `KINEMATIC`, `SPECIFIC_GRAVITY`, `AT_60_DEGF` (degrees API) or 0.
    high : float
        SI value of the upper end of a range, else NaN.
    note : str
        What to say of a value that is given all the same: its footnote mark.
    lowest : float
        SI value for the lowest design value that stands beside a design value (`checker.intake.ranges.LOWEST_DESIGN`);
        there also where the design value itself is refused (``FV`` alone). The value is then the higher of the two.
    """

    value: float
    gap: Gap
    reason: str = ""
    rests_on: int = 0
    high: float = NAN
    note: str = ""
    lowest: float = NAN


@dataclass(frozen=True, slots=True)
class NumberContext:
    """What a column says of its cells.

    Attributes
    ----------
    field, unit, refusal : Field, Unit or None, str
        Field and unit; without a unit the refusal says why bare numbers cannot be read.
    atmosphere : float
        The site's atmospheric pressure, Pa.
    delimiter, comma : str, bool
        Form of the file: what parts its cells, and whether it is written with decimal commas.
    ambient : (float, float), optional
        The site's lowest and highest ambient temperature, K.
    marks : Marks, optional
        What a comma and a point mean in the column; without it only cells that leave no choice are read.
    """

    field: Field
    unit: Unit | None
    refusal: str
    atmosphere: float
    delimiter: str
    comma: bool
    ambient: tuple[float, float] | None = None
    marks: Marks | None = None


class Cell(NamedTuple):
    """A cell in both forms: what the arrays take, and the record that is shown."""

    reading: CellReading
    record: CellRecord


def refused(text: str, reason: str, record: CellRecord | None = None) -> Cell:
    """Return a refused cell; what was read of it all the same stays in its record."""
    kept = (record or CellRecord(text))._replace(remark=reason)
    return Cell(CellReading(NAN, Gap.REFUSED, reason), kept)


def given(text: str, value: float, number: float, unit: str) -> Cell:
    """Return a cell with one value in SI, and the number and unit that stand for it."""
    return Cell(CellReading(value, Gap.GIVEN), CellRecord(text, (number,), unit, (value,)))


def of_two(low: float, high: float, field: Field, rests_on: int, note: str) -> CellReading:
    """Return the reading of two values: a range, or a design value and the lowest design value."""
    if low == high:
        return CellReading(low, Gap.GIVEN, "", rests_on, NAN, note)
    if field.name in LOWEST_DESIGN:
        return CellReading(high, Gap.GIVEN, "", rests_on, NAN, note, low)
    return CellReading(low, Gap.GIVEN, "", rests_on, high, note)
