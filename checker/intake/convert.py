"""One column of cells becomes one array: numbers at once, odd cells once per distinct text."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, field
from itertools import compress

import numpy as np

from checker.fields import Field
from checker.intake.cells import CodedCells, NumberCells
from checker.intake.number_cells import NumberContext, read_number_cell, unit_rests_on
from checker.intake.placeholders import OPEN_WORDS, holds, placeholder
from checker.intake.planned import PlannedColumn
from checker.intake.sizes import read_size
from checker.intake.texts import shown, tidy
from checker.intake.unit_words import unit_or_refusal
from checker.model import BoolArray, CodeArray, Coded, FloatArray, Gap, IntArray
from checker.units import from_si, to_si

__all__ = [
    "ConvertedNumbers",
    "ConvertedTexts",
    "convert_line_numbers",
    "convert_numbers",
    "convert_sizes",
    "convert_texts",
]

NAN = float("nan")
_PHASES = {
    "liquid": "l liq liquid liquidphase liqphase",
    "gas": "v g vap vapour vapor gas vapourphase vaporphase gasphase steam",
    "two-phase": "m mixed mix 2ph 2phase twophase vl lv lg gl tp multiphase mp mixedphase 2p lplusg vplusl",
}
_ENDS = {"inlet": "inlet in upstream start from beginning source", "outlet": "outlet out downstream end to"}
_VOCABULARY = {
    "phase": {word: name for name, words in _PHASES.items() for word in words.split()},
    "pressure_basis": {word: name for name, words in _ENDS.items() for word in words.split()},
}


@dataclass
class ConvertedNumbers:
    """A column of numbers in SI, one a line: NaN and a gap where there is none, and the reason of each refusal.

    `column_refusal` holds for every bare number of the column; `reasons` are those of single cells; `rests_on` says
    which numbers still need the density or the phase beside them.
    """

    values: FloatArray
    gaps: CodeArray
    column_refusal: str
    rests_on: CodeArray
    reasons: dict[int, str] = field(default_factory=dict)
    holds: list[int] = field(default_factory=list)


@dataclass
class ConvertedTexts:
    """A column of texts as codes, one a line, with gaps, refusals and open items."""

    coded: Coded
    gaps: CodeArray
    reasons: dict[int, str] = field(default_factory=dict)
    holds: list[int] = field(default_factory=list)


def convert_numbers(
    cells: CodedCells | NumberCells, column: PlannedColumn, *, atmosphere: float, delimiter: str, comma: bool
) -> ConvertedNumbers:
    """Convert a column of number cells to SI.

    Parameters
    ----------
    cells : CodedCells or NumberCells
        The cells as written; the plain numbers beside them, if any, are converted in one step.
    column : PlannedColumn
        Field and unit of the column.
    atmosphere : float
        The site's atmospheric pressure, Pa.
    delimiter : str
        Delimiter of the file.
    comma : bool
        Whether the list is written with decimal commas: then no cell is taken as plain.

    Returns
    -------
    ConvertedNumbers
        SI values. Every distinct text that is no plain number is read once; values outside the field's bounds are
        refused.
    """
    context = NumberContext(column.field, column.reading, column.refusal, atmosphere, delimiter, comma)
    texts = cells.texts if isinstance(cells, CodedCells) else cells.written
    plain = np.full(len(texts), NAN) if isinstance(cells, CodedCells) or comma else cells.numbers
    with np.errstate(all="ignore"):
        converted = _in_si(plain, context)
        _read_odd(texts, np.isnan(plain), converted, context)
        _check_bounds(texts, converted, column.field, atmosphere)
    if isinstance(cells, CodedCells):
        return _spread(converted, cells.codes)
    converted.holds = np.flatnonzero(converted.gaps == Gap.HOLD).tolist()
    return converted


def _in_si(plain: FloatArray, context: NumberContext) -> ConvertedNumbers:
    """Return the plain numbers of a column in SI; all of them refused where the column has no unit."""
    known = context.unit is not None
    values = to_si(plain, context.unit, atmosphere=context.atmosphere) if context.unit else np.full(plain.shape, NAN)
    gaps = np.full(plain.shape, Gap.GIVEN if known else Gap.REFUSED, dtype=np.int8)
    rests_on = np.full(plain.shape, unit_rests_on(context.unit), dtype=np.int8)
    return ConvertedNumbers(values, gaps, context.refusal, rests_on)


def _read_odd(texts: Sequence[str], is_odd: BoolArray, converted: ConvertedNumbers, context: NumberContext) -> None:
    """Read the cells that are no plain numbers, each distinct text once; most of them are blank."""
    mine, odd = list(compress(texts, is_odd.tolist())), np.flatnonzero(is_odd)
    code_of = {text: code for code, text in enumerate(dict.fromkeys(mine))}
    codes = np.fromiter(map(code_of.__getitem__, mine), np.intp, odd.size)
    readings = [read_number_cell(text, context) for text in code_of]
    converted.values[odd] = np.array([reading.value for reading in readings], dtype=np.float64)[codes]
    converted.gaps[odd] = np.array([reading.gap for reading in readings], dtype=np.int8)[codes]
    converted.rests_on[odd] = np.array([reading.rests_on for reading in readings], dtype=np.int8)[codes]
    explained = [reading.gap is Gap.REFUSED and reading.reason is not context.refusal for reading in readings]
    refused = np.flatnonzero(np.array(explained, dtype=np.bool_)[codes])
    for index, code in zip(odd[refused].tolist(), codes[refused].tolist(), strict=True):
        converted.reasons[index] = readings[code].reason


def _spread(distinct: ConvertedNumbers, codes: IntArray) -> ConvertedNumbers:
    """Return the numbers of all cells from those of the distinct texts."""
    gaps = distinct.gaps[codes]
    return ConvertedNumbers(
        distinct.values[codes],
        gaps,
        distinct.column_refusal,
        distinct.rests_on[codes],
        _spread_reasons(distinct.reasons, codes, distinct.gaps.size),
        np.flatnonzero(gaps == Gap.HOLD).tolist(),
    )


def _spread_reasons(reasons: Mapping[int, str], codes: IntArray, count: int) -> dict[int, str]:
    """Return the reason of each refused cell from those of the distinct texts."""
    refused = np.zeros(count, dtype=np.bool_)
    refused[list(reasons)] = True
    mine = np.flatnonzero(refused[codes])
    return dict(zip(mine.tolist(), map(reasons.__getitem__, codes[mine].tolist()), strict=True))


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


def _check_bounds(texts: Sequence[str], distinct: ConvertedNumbers, field_: Field, atmosphere: float) -> None:
    values = distinct.values
    possible = (values > field_.above) & (values < field_.below)
    wrong = np.flatnonzero((distinct.gaps == Gap.GIVEN) & ~possible)
    for index in wrong.tolist():
        distinct.reasons[index] = _impossible(texts[index], float(values[index]), field_, atmosphere)
    values[wrong] = NAN
    distinct.gaps[wrong] = Gap.REFUSED
    values += 0.0


def convert_sizes(cells: CodedCells, column: PlannedColumn, *, comma: bool) -> ConvertedNumbers:
    """Convert a column of nominal sizes to NPS inches."""
    readings = [read_size(text, column.basis, comma) for text in cells.texts]
    values = np.array([reading.nps for reading in readings], dtype=np.float64)
    gaps = np.array([reading.gap for reading in readings], dtype=np.int8)
    reasons = {index: reading.reason for index, reading in enumerate(readings) if reading.gap is Gap.REFUSED}
    return _spread(ConvertedNumbers(values, gaps, "", np.zeros(gaps.shape, dtype=np.int8), reasons), cells.codes)


def _plain(text: str, field_: Field) -> tuple[str, Gap, str]:
    tidied = " ".join(text.split())
    gap = placeholder(tidied, field_.name)
    return ("", gap, "") if gap is not Gap.GIVEN else (tidied, gap, "")


def _vocabulary(text: str, field_: Field) -> tuple[str, Gap, str]:
    """Read a text that must be one of a few words."""
    _, gap, _ = _plain(text, field_)
    if gap is not Gap.GIVEN:
        return "", gap, ""
    words = _VOCABULARY[field_.name]
    plain = tidy(text).casefold().replace("+", "" if len(text.strip()) <= 3 else "plus")
    word = "".join(character for character in plain if character.isalnum())
    if word in words:
        return words[word], Gap.GIVEN, ""
    names = ", ".join(dict.fromkeys(words.values()))
    return "", Gap.REFUSED, f"{shown(text)} is no {field_.name.replace('_', ' ')}: write one of {names}."


def convert_texts(cells: CodedCells, field_: Field) -> ConvertedTexts:
    """Convert a column of texts to codes; the phase and the pressure's end become canonical words."""
    read: Callable[[str, Field], tuple[str, Gap, str]] = _vocabulary if field_.name in _VOCABULARY else _plain
    readings = [read(text, field_) for text in cells.texts]
    texts: dict[str, int] = {}
    codes = [texts.setdefault(text, len(texts)) if gap is Gap.GIVEN else -1 for text, gap, _ in readings]
    gaps = np.array([gap for _, gap, _ in readings], dtype=np.int8)
    reasons = {index: reason for index, (_, _, reason) in enumerate(readings) if reason}
    return ConvertedTexts(
        Coded(np.array(codes, dtype=np.int32)[cells.codes], tuple(texts)),
        gaps[cells.codes],
        _spread_reasons(reasons, cells.codes, len(readings)),
        find_open_items(cells, certain=gaps == Gap.HOLD),
    )


def find_open_items(cells: CodedCells, *, certain: BoolArray | None = None) -> list[int]:
    """Return the indices of the cells that carry an open item, those of the `certain` texts among them."""
    capitals = "\n".join(cells.texts).upper()
    found = np.zeros(len(cells.texts), dtype=np.bool_) if certain is None else certain
    if any(word in capitals for word in OPEN_WORDS):
        found = found | np.array([holds(text) for text in cells.texts], dtype=np.bool_)
    return np.flatnonzero(found[cells.codes]).tolist()


def convert_line_numbers(cells: Sequence[str]) -> ConvertedTexts:
    """Return the open items of the line numbers, whose texts are kept as written beside the table."""
    count = len(cells)
    missing = Coded(np.full(count, -1, dtype=np.int32), ())
    codes = np.arange(count, dtype=np.int32)
    open_items = find_open_items(CodedCells(codes, tuple(cells)))
    return ConvertedTexts(missing, np.zeros(count, dtype=np.int8), {}, open_items)
