"""One column of number cells in SI: plain numbers at once, all other cells once per distinct text."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

from checker.fields import Field
from checker.intake.cells import CodedCells, NumberCells
from checker.intake.converted import ConvertedNumbers
from checker.intake.decimal_marks import DECIMAL, Evidence, Marks, evidence_of, marks_without_evidence
from checker.intake.doubts import doubt_of, stand_in_reason, stand_ins
from checker.intake.number_cells import CellReading, NumberContext, read_number_cell, unit_rests_on
from checker.intake.plain_numbers import Mark
from checker.intake.texts import shown
from checker.intake.unit_words import unit_or_refusal
from checker.model import BoolArray, FloatArray, Gap, IntArray
from checker.units import from_si, to_si

__all__ = ["column_evidence", "convert_numbers", "holds_commas"]

NAN = float("nan")
_WITNESSES = 200
NOUGHTS_REASON = (
    "may be the end of a number whose thousands are parted (1,000) as well as zero: write 0, or the whole number."
)


def column_evidence(cells: CodedCells | NumberCells) -> Evidence:
    """Return what the cells of a column prove of its decimal marks."""
    if isinstance(cells, CodedCells):
        return evidence_of(cells.texts)
    witnesses: dict[str, None] = {}
    present = np.bincount(cells.marks, minlength=len(Mark))
    for mark in (Mark.POINT, Mark.COMMA):
        mine = np.flatnonzero(cells.marks == mark)[:_WITNESSES] if present[mark] else ()
        witnesses.update(dict.fromkeys(cells[int(index)] for index in mine))
    return evidence_of((*witnesses, *cells.texts))


def holds_commas(cells: CodedCells | NumberCells) -> bool:
    """Return whether any cell of a column holds a comma, so that what it means is worth a note."""
    written = isinstance(cells, NumberCells) and bool(np.isin(cells.marks, (Mark.COMMA, Mark.COMMA_OR_THOUSANDS)).any())
    return written or any("," in text for text in cells.texts)


def convert_numbers(cells: CodedCells | NumberCells, context: NumberContext) -> ConvertedNumbers:
    """Convert a column of number cells to SI.

    Parameters
    ----------
    cells : CodedCells or NumberCells
        The cells as written; the plain numbers beside them, if any, are converted in one step.
    context : NumberContext
        Field, unit, site, and what a comma and a point mean in the column.

    Returns
    -------
    ConvertedNumbers
        SI values. Every distinct text that is no plain number is read once; values outside the field's bounds are
        refused.
    """
    with np.errstate(all="ignore"):
        if isinstance(cells, CodedCells):
            distinct = _in_si(np.full(len(cells.texts), NAN), context)
            every = np.arange(len(cells.texts), dtype=np.int32)
            _put_odd(every.astype(np.intp), every, cells.texts, distinct, context)
            _check_bounds(cells.texts, distinct, context)
            return distinct.spread(cells.codes)
        converted = _in_si(cells.numbers, context)
        odd = np.flatnonzero(cells.codes >= 0)
        _put_odd(odd, cells.codes[odd], cells.texts, converted, context)
        _read_unsettled(cells, converted, context)
        _check_bounds(cells, converted, context)
        _refuse_stand_ins(cells, converted, context)
    converted.holds = np.flatnonzero(converted.gaps == Gap.HOLD).tolist()
    return converted


def _in_si(plain: FloatArray, context: NumberContext) -> ConvertedNumbers:
    """Return the plain numbers of a column in SI; all of them refused where the column has no unit."""
    known = context.unit is not None
    values = to_si(plain, context.unit, atmosphere=context.atmosphere) if context.unit else np.full(plain.shape, NAN)
    gaps = np.full(plain.shape, Gap.GIVEN if known else Gap.REFUSED, dtype=np.int8)
    rests_on = np.full(plain.shape, unit_rests_on(context.unit), dtype=np.int8)
    return ConvertedNumbers(values, gaps, context.refusal, rests_on)


def _settled(marks: Marks) -> BoolArray:
    """Return by `Mark` whether a plain number with it is read as it stands."""
    point, comma = marks.point == DECIMAL, marks.comma == DECIMAL
    settled = {
        Mark.NONE: True,
        Mark.POINT: point,
        Mark.COMMA: comma,
        Mark.POINT_OR_THOUSANDS: point,
        Mark.COMMA_OR_THOUSANDS: comma,
    }
    return np.array([settled[mark] for mark in Mark], dtype=np.bool_)


def _read_unsettled(cells: NumberCells, converted: ConvertedNumbers, context: NumberContext) -> None:
    """Read again the plain numbers whose mark is not the column's decimal mark, or may part thousands."""
    marks = context.marks or marks_without_evidence(comma=context.comma)
    mine = np.flatnonzero(~_settled(marks)[cells.marks])
    if not mine.size:
        return
    written = [cells[index] for index in mine.tolist()]
    code_of = {text: code for code, text in enumerate(dict.fromkeys(written))}
    codes = np.fromiter(map(code_of.__getitem__, written), np.int32, mine.size)
    _put_odd(mine, codes, tuple(code_of), converted, context)


def _put_odd(
    indices: NDArray[np.intp],
    codes: IntArray,
    texts: Sequence[str],
    converted: ConvertedNumbers,
    context: NumberContext,
) -> None:
    """Read the cells at some indices, each distinct text once; `codes` are theirs into the texts."""
    readings = [_reading(text, context) for text in texts]
    converted.values[indices] = np.array([reading.value for reading in readings], dtype=np.float64)[codes]
    converted.gaps[indices] = np.array([reading.gap for reading in readings], dtype=np.int8)[codes]
    converted.rests_on[indices] = np.array([reading.rests_on for reading in readings], dtype=np.int8)[codes]
    remarkable = [_remarkable(reading, context) for reading in readings]
    mine = np.flatnonzero(np.array(remarkable, dtype=np.bool_)[codes])
    for index, code in zip(indices[mine].tolist(), codes[mine].tolist(), strict=True):
        _put_remarkable(index, readings[code], converted, context)


def _reading(text: str, context: NumberContext) -> CellReading:
    """Read one cell; noughts only (``000``) are no zero but may be what is left of a number."""
    stripped = text.strip()
    if len(stripped) > 1 and not stripped.strip("0"):
        return CellReading(NAN, Gap.REFUSED, f"{shown(text)} {NOUGHTS_REASON}")
    return _possible_ends(text, read_number_cell(text, context), context)


def _remarkable(reading: CellReading, context: NumberContext) -> bool:
    """Return whether a reading says more than a value and a gap."""
    refused = reading.gap is Gap.REFUSED and reading.reason is not context.refusal
    return refused or bool(reading.note) or reading.high == reading.high or reading.lowest == reading.lowest


def _put_remarkable(index: int, reading: CellReading, converted: ConvertedNumbers, context: NumberContext) -> None:
    if reading.gap is Gap.REFUSED and reading.reason is not context.refusal:
        converted.reasons[index] = reading.reason
    if reading.high == reading.high:
        converted.highs[index] = reading.high
    if reading.lowest == reading.lowest:
        converted.lowest[index] = reading.lowest
    if reading.note:
        converted.notes[index] = reading.note


def _possible_ends(text: str, reading: CellReading, context: NumberContext) -> CellReading:
    """Return a reading, refused where its upper end is impossible; the lower one is looked at with all values."""
    field = context.field
    if reading.high != reading.high or field.above < reading.high < field.below:
        return reading
    return CellReading(NAN, Gap.REFUSED, _impossible(text, reading.high, field, context.atmosphere))


def _impossible(text: str, value: float, field_: Field, atmosphere: float) -> str:
    """Return the sentence for a value at or outside its bounds."""
    if not np.isfinite(value):
        return f"{shown(text)} is not a finite number."
    if value < 0.0 and field_.name.startswith("flow_"):
        return f"{shown(text)} is a negative flow: is From/To reversed?"
    bound = field_.above if value <= field_.above else field_.below
    side = "at or below" if value <= field_.above else "at or above"
    unit = unit_or_refusal(field_.unit, field_.dimension)
    if isinstance(unit, str):
        return f"{shown(text)} is {side} {bound:g} (SI), which is impossible for the {field_.meaning}."
    seen, limit = (float(from_si(number, unit, atmosphere=atmosphere)) for number in (value, bound))
    limit = 0.0 if abs(limit) < 1e-200 else limit
    return (
        f"{shown(text)} is {seen:.6g} {field_.unit}, {side} {limit:.6g} {field_.unit}: impossible for the "
        f"{field_.meaning}."
    )


def _check_bounds(texts: Sequence[str], converted: ConvertedNumbers, context: NumberContext) -> None:
    values, field, atmosphere = converted.values, context.field, context.atmosphere
    possible = (values > field.above) & (values < field.below)
    wrong = np.flatnonzero((converted.gaps == Gap.GIVEN) & ~possible).tolist()
    sentences: dict[str, str] = {}
    refused = {}
    for index in wrong:
        text = texts[index]
        if text not in sentences:
            doubt = doubt_of(text, field, context.unit, atmosphere)
            sentences[text] = _impossible(text, float(values[index]), field, atmosphere) + doubt
        refused[index] = sentences[text]
    if refused:
        converted.refuse(refused)
    values += 0.0


def _refuse_stand_ins(cells: NumberCells, converted: ConvertedNumbers, context: NumberContext) -> None:
    """Refuse the plain numbers that commonly stand for an unknown value."""
    found = np.flatnonzero(stand_ins(cells.numbers, context.field) & (converted.gaps == Gap.GIVEN))
    if found.size:
        converted.refuse({index: stand_in_reason(cells[index]) for index in found.tolist()})
