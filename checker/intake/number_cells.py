"""One cell that should be a number: its value or both its ends in SI, or a sentence that says why not.

Nothing here evaluates a cell, and a text longer than `LONGEST_NUMBER` is never parsed.
"""

from __future__ import annotations

import math
import re

import numpy as np

from checker.fields import Field
from checker.intake.cell_parts import APPROXIMATION, CellParts, read_parts, without_sure_marks
from checker.intake.cell_reading import (
    AT_60_DEGF,
    KINEMATIC,
    SPECIFIC_GRAVITY,
    Cell,
    CellReading,
    NumberContext,
    of_two,
    refused,
)
from checker.intake.decimal_marks import marks_without_evidence
from checker.intake.doubts import is_stand_in, stand_in_reason
from checker.intake.not_numbers import known_words
from checker.intake.number_shapes import NumberRefusedError
from checker.intake.placeholders import open_behind_number, placeholder
from checker.intake.ranges import LOWEST_DESIGN
from checker.intake.stated_twice import agree, two_statements
from checker.intake.texts import shown, tidy
from checker.intake.unit_words import unit_in_cell
from checker.intake.word_values import word_value
from checker.model import CellRecord, Gap
from checker.shown import si_unit_of_dimension
from checker.units import API, Unit, from_si, to_si

__all__ = [
    "AT_60_DEGF",
    "KINEMATIC",
    "LONGEST_NUMBER",
    "SPECIFIC_GRAVITY",
    "CellReading",
    "NumberContext",
    "read_number_cell",
    "record_of",
    "unit_rests_on",
]

NAN = float("nan")
#: Above 20 degC, in K, the lower of two design temperatures is not taken for the lowest design temperature.
MOST_LOWEST_TEMPERATURE = 293.15
_TWO_DESIGN_VALUES = (
    "{text} states two values for the {meaning}: is it {ends}? Write the {meaning} alone, and the lowest one in a "
    "column of its own."
)
LONGEST_NUMBER = 60
_LOWEST_FIELDS = frozenset(LOWEST_DESIGN.values())
_BARE = re.compile(r"[-+]?\d+(?:[.,]\d+)?(?:[eE][-+]?\d+)?", re.ASCII)
_VACUUM = r"(?:F[./]?V\.?|full\s?vac(?:uum)?\.?|vacuum)"
_WITH_VACUUM = re.compile(
    rf"(?:{_VACUUM}\s?(?:[/&+,-]|to|and)\s?(?P<behind>.+)|(?P<before>.+?)\s?(?:[/&+,-]|to|and)\s?{_VACUUM}"
    rf"|(?P<beside>.+?)\s?[(\[]\s?{_VACUUM}\s?[)\]])",
    re.IGNORECASE | re.ASCII,
)


def unit_rests_on(unit: Unit | None) -> int:
    """Return whether a unit needs the density (kinematic viscosity) or the phase (specific gravity) beside it."""
    if unit is None:
        return 0
    if unit.reference == "kinematic":
        return KINEMATIC
    if unit.reference == API:
        return AT_60_DEGF
    relative = unit.dimension == "density" and unit.spelling.casefold().startswith(("sg", "spgr"))
    return SPECIFIC_GRAVITY if relative else 0


def _parts(plain: str, context: NumberContext) -> CellParts:
    if len(plain) > LONGEST_NUMBER:
        raise NumberRefusedError("is too long for a number.")
    known = "" if _BARE.fullmatch(plain) else known_words(plain)
    if known:
        raise NumberRefusedError(known)
    marks = context.marks or marks_without_evidence(comma=context.comma)
    dimension = context.field.dimension
    parts = read_parts(plain, dimension=dimension, unit=context.unit, marks=marks, delimiter=context.delimiter)
    if not all(map(math.isfinite, parts.numbers)):
        raise NumberRefusedError("is not a finite number.")
    return parts


def _with_vacuum(text: str, plain: str, context: NumberContext) -> Cell | None:
    """Return the reading of a pressure written beside full vacuum (``3.5/FV``), None for any other cell."""
    plain, mark = without_sure_marks(plain) if len(plain) <= LONGEST_NUMBER else ("", "")
    match = _WITH_VACUUM.fullmatch(plain)
    if match is None or context.field.dimension != "pressure":
        return None
    if context.field.name not in LOWEST_DESIGN:
        return refused(text, f"{shown(text)} says full vacuum, a design condition: give the pressure alone.")
    cell = _read((match["behind"] or match["before"] or match["beside"]).strip(), context)
    if cell.reading.gap is not Gap.GIVEN or not math.isnan(cell.reading.lowest):
        return refused(text, f"{shown(text)} is not a design pressure beside full vacuum: write it as '3.5/FV'.")
    record, own = cell.record, unit_in_cell(cell.record.unit, "pressure")
    unit = context.unit if isinstance(own, str) else own
    vacuum = float(from_si(0.0, unit, atmosphere=context.atmosphere)) if unit else 0.0
    record = CellRecord(text, (vacuum, *record.numbers), record.unit, (0.0, *record.values), "down to full vacuum")
    note = cell.reading.note or (f"footnote mark {shown(mark)}" if mark else "")
    return Cell(cell.reading._replace(lowest=0.0, note=note), record)


def _same(one: Unit, other: Unit) -> bool:
    """Return whether two units are one in two spellings."""
    return (one.scale, one.offset, one.reference) == (other.scale, other.offset, other.reference)


def _stated_twice(text: str, plain: str, context: NumberContext) -> Cell | None:
    """Return the reading of one value stated in two units (``50 °C (122 °F)``), None for any other cell."""
    texts = two_statements(plain) if len(plain) <= LONGEST_NUMBER else None
    if texts is None:
        return None
    try:
        first, second = (_parts(part, context) for part in texts)
    except NumberRefusedError:
        return None
    units = first.units[0] or context.unit, second.units[0]
    if units[0] is None or units[1] is None or any(len(part.numbers) > 1 or part.kind for part in (first, second)):
        return None
    bracketed = plain.endswith((")", "]"))
    if not bracketed and (first.units[0] is None or _same(units[0], units[1])):
        return None
    cells = [_measured(text, part, context) for part in (first, second)]
    if any(cell.reading.gap is not Gap.GIVEN or cell.reading.rests_on for cell in cells):
        return None
    if not agree(texts, (cells[0].reading.value, cells[1].reading.value), (units[0], units[1])):
        names = " and ".join(shown(part) for part in texts)
        return refused(text, f"{shown(text)} states {names}, which are not one value: write the one that holds.")
    return Cell(cells[0].reading, cells[0].record._replace(remark="stated twice, in two units that agree"))


def _not_used(parts: CellParts, record: CellRecord, context: NumberContext) -> Cell:
    """Return the refusal of a limit or an approximation, with what is known of it."""
    known = f"{' and '.join(f'{number:g}' for number in parts.numbers)} {record.unit}".rstrip()
    if record.values:
        values = " and ".join(f"{value:.6g}" for value in record.values)
        known += f" ({values} {si_unit_of_dimension(context.field.dimension)})".replace(" -)", ")")
    what = f"{parts.kind}, not a value" if parts.kind != APPROXIMATION else f"{parts.kind}, not the value"
    return refused(
        record.text, f"{shown(record.text)} is {what}: {known} is kept but not used; write the value itself.", record
    )


def _measured(text: str, parts: CellParts, context: NumberContext) -> Cell:
    """Return the SI values of the numbers of a cell."""
    units = [unit or context.unit for unit in parts.units]
    spelling = parts.spelling or (context.unit.spelling if context.unit else "")
    numbers = parts.numbers
    if any(unit is None for unit in units):
        record = CellRecord(text, numbers, spelling, (), context.refusal)
        if parts.kind:
            return _not_used(parts, record, context)
        return Cell(CellReading(NAN, Gap.REFUSED, context.refusal), record)
    known = [unit for unit in units if unit is not None]
    with np.errstate(all="ignore"):
        pairs = zip(numbers, known, strict=True)
        values = tuple(float(to_si(number, unit, atmosphere=context.atmosphere)) + 0.0 for number, unit in pairs)
    if not all(map(math.isfinite, values)):
        return refused(text, f"{shown(text)} is not a finite number.", CellRecord(text, numbers, spelling))
    record = CellRecord(text, numbers, spelling, values)
    if any(is_stand_in(number, context.field) for number in numbers):
        return refused(text, stand_in_reason(text), record)
    if parts.kind:
        return _not_used(parts, record, context)
    note = f"footnote mark {shown(parts.mark)}" if parts.mark else ""
    rests_on = {unit_rests_on(unit) for unit in known}
    if len(values) == 1:
        return Cell(CellReading(values[0], Gap.GIVEN, "", rests_on.pop(), NAN, note), record._replace(remark=note))
    return _two_values(record, rests_on, note, parts, context)


def _two_values(record: CellRecord, rests_on: set[int], note: str, parts: CellParts, context: NumberContext) -> Cell:
    """Return the reading of a cell with two values, in order."""
    text, field = record.text, context.field
    low, high = record.values
    one_unit = parts.units[0] == parts.units[1]
    if not parts.either and (record.numbers[0] > record.numbers[1] if one_unit else low > high):
        first, second = (f"{number:g}" for number in record.numbers)
        return refused(
            text, f"{shown(text)} runs downwards: is it {second} to {first}? Write the lower end first.", record
        )
    if low > high:
        unit = " and ".join(reversed(record.unit.split(" and ")))
        record = record._replace(numbers=record.numbers[::-1], unit=unit, values=record.values[::-1])
        low, high = record.values
    if len(rests_on) > 1:
        return refused(text, f"{shown(text)} names two kinds of unit: write both ends in one.", record)
    if field.name in _LOWEST_FIELDS and low != high:
        return refused(
            text, f"{shown(text)} states two values for the {field.meaning}: write the lowest alone.", record
        )
    if field.name in LOWEST_DESIGN and low != high and not _lowest_by_itself(low, context):
        reason = _TWO_DESIGN_VALUES.format(text=shown(text), meaning=field.meaning, ends=_ends(record))
        return refused(text, reason, record)
    reading = of_two(low, high, field, rests_on.pop(), note)
    if not math.isnan(reading.lowest) and not _possible_lowest(reading.lowest, field):
        return refused(text, f"{shown(text)} has an impossible lower value: write the {field.meaning} alone.", record)
    return Cell(reading, record._replace(remark=note or "two values: both ends are kept"))


def _ends(record: CellRecord) -> str:
    low, high = (f"{number:g}" for number in record.numbers)
    return f"{high} with a lowest of {low}, or {low} in one case and {high} in another"


def _lowest_by_itself(low: float, context: NumberContext) -> bool:
    """Return whether the lower of two design values can be nothing but a lowest one: up to atmospheric, up to 20 degC.

    Two ordinary design values may as well be those of two cases, or two choices of which one is open.
    """
    most = context.atmosphere if context.field.dimension == "pressure" else MOST_LOWEST_TEMPERATURE
    return low <= most * (1.0 + 1e-9)


def _possible_lowest(value: float, field: Field) -> bool:
    """Return whether the lower of two design values is possible: unlike a design pressure it may be full vacuum."""
    return field.above < value < field.below or (field.dimension == "pressure" and value == 0.0)


def _word(text: str, plain: str, context: NumberContext) -> Cell | None:
    """Return the reading of a word that stands for a value, with or without a footnote mark; None for any other."""
    cell = word_value(text, plain, context)
    if cell is not None or not plain[:1].isalpha() or len(plain) > LONGEST_NUMBER:
        return cell
    word, mark = without_sure_marks(plain)
    cell = word_value(text, word, context) if mark else None
    if cell is None or cell.reading.gap is not Gap.GIVEN:
        return cell
    return cell._replace(reading=cell.reading._replace(note=f"footnote mark {shown(mark)}"))


def _read(text: str, context: NumberContext) -> Cell:
    plain = tidy(text)
    special = _word(text, plain, context)
    if special is not None:
        return special
    gap = placeholder(plain, context.field.name)
    if gap is Gap.GIVEN and len(plain) <= LONGEST_NUMBER and open_behind_number(plain):
        gap = Gap.HOLD
    if gap is not Gap.GIVEN:
        return Cell(CellReading(NAN, gap), CellRecord(text))
    special = _with_vacuum(text, plain, context) or _stated_twice(text, plain, context)
    if special is not None:
        return special
    try:
        parts = _parts(plain, context)
    except NumberRefusedError as refusal:
        return refused(text, f"{shown(text)} {refusal}")
    return _measured(text, parts, context)


def read_number_cell(text: str, context: NumberContext) -> CellReading:
    """Read one cell of a number column; never raises, whatever the cell holds."""
    return _read(text, context).reading


def record_of(text: str, context: NumberContext) -> CellRecord:
    """Return one cell of a number column in full: text, numbers, unit as read, SI values and what to say of it.

    A plain number has a record too; a blank, an open item or a text has one without numbers. The bounds of the field
    are not looked at: a number that is impossible keeps its SI value here.
    """
    return _read(text, context).record
