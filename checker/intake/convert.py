"""One column of cells becomes one array: numbers at once, odd cells once per distinct text."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field

import numpy as np

from checker.fields import Field
from checker.intake.columns import PlannedColumn
from checker.intake.number_cells import NumberContext, read_number_cell, unit_rests_on
from checker.intake.placeholders import holds, placeholder
from checker.intake.sizes import read_size
from checker.intake.texts import shown, tidy
from checker.intake.unit_words import unit_or_refusal
from checker.model import BoolArray, CodeArray, Coded, FloatArray, Gap
from checker.units import from_si, to_si

__all__ = ["ConvertedNumbers", "ConvertedTexts", "convert_numbers", "convert_sizes", "convert_texts", "find_open_items"]

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
    which numbers still need the density or the phase beside them; `no_flow` where the cell says so in words.
    """

    values: FloatArray
    gaps: CodeArray
    column_refusal: str
    reasons: dict[int, str] = field(default_factory=dict)
    holds: list[int] = field(default_factory=list)
    rests_on: CodeArray | None = None


@dataclass
class ConvertedTexts:
    """A column of texts as codes, one a line, with gaps, refusals and open items."""

    coded: Coded
    gaps: CodeArray
    reasons: dict[int, str] = field(default_factory=dict)
    holds: list[int] = field(default_factory=list)


def _plain_numbers(
    cells: Sequence[str], plain: tuple[FloatArray, list[int]] | None, column: PlannedColumn, atmosphere: float
) -> tuple[ConvertedNumbers, list[int]]:
    """Return the plain numbers of a column in SI, and the indices of the cells still to be read."""
    numbers, odd = (np.full(len(cells), NAN), list(range(len(cells)))) if plain is None else plain
    gaps = np.full(len(cells), Gap.GIVEN, dtype=np.int8)
    if column.reading is None:
        gaps[:] = Gap.REFUSED
        numbers[:] = NAN
    else:
        numbers = to_si(numbers, column.reading, atmosphere=atmosphere)
    rests_on = unit_rests_on(column.reading)
    basis = np.full(len(cells), rests_on, dtype=np.int8) if rests_on else None
    return ConvertedNumbers(numbers, gaps, column.refusal, rests_on=basis), odd


def convert_numbers(
    cells: Sequence[str],
    plain: tuple[FloatArray, list[int]] | None,
    column: PlannedColumn,
    *,
    atmosphere: float,
    delimiter: str,
    comma: bool,
) -> ConvertedNumbers:
    """Convert a column of number cells to SI.

    Parameters
    ----------
    cells : sequence of str
        The cells as written.
    plain : tuple of float array and list of int, or None
        The plain numbers among them and the indices of the other cells; None where no cell may be taken as plain.
    column : PlannedColumn
        Field and unit of the column.
    atmosphere : float
        The site's atmospheric pressure, Pa.
    delimiter : str
        Delimiter of the file.
    comma : bool
        Whether the list is written with decimal commas.

    Returns
    -------
    ConvertedNumbers
        SI values; every other distinct text is read once; values outside the field's bounds are refused.
    """
    context = NumberContext(column.field, column.reading, column.refusal, atmosphere, delimiter, comma)
    with np.errstate(all="ignore"):
        converted, odd = _plain_numbers(cells, plain, column, atmosphere)
        _read_odd(cells, odd, converted, context)
        _check_bounds(cells, converted, column.field, atmosphere)
    return converted


def _read_odd(cells: Sequence[str], odd: Sequence[int], converted: ConvertedNumbers, context: NumberContext) -> None:
    readings = {text: read_number_cell(text, context) for text in dict.fromkeys(cells[index] for index in odd)}
    mine = [readings[cells[index]] for index in odd]
    indices = np.asarray(odd, dtype=np.intp)
    converted.values[indices] = [reading.value for reading in mine]
    converted.gaps[indices] = [reading.gap for reading in mine]
    rests_on = [reading.rests_on for reading in mine]
    if any(rests_on) or converted.rests_on is not None:
        if converted.rests_on is None:
            converted.rests_on = np.zeros(len(cells), dtype=np.int8)
        converted.rests_on[indices] = rests_on
    for index, reading in zip(odd, mine, strict=True):
        if reading.gap is Gap.REFUSED and reading.reason is not context.refusal:
            converted.reasons[index] = reading.reason
        elif reading.gap is Gap.HOLD:
            converted.holds.append(index)


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


def _check_bounds(cells: Sequence[str], converted: ConvertedNumbers, field_: Field, atmosphere: float) -> None:
    values = converted.values
    possible = (values > field_.above) & (values < field_.below)
    wrong = np.flatnonzero((converted.gaps == Gap.GIVEN) & ~possible)
    for index in wrong.tolist():
        converted.reasons[index] = _impossible(cells[index], float(values[index]), field_, atmosphere)
    values[wrong] = NAN
    converted.gaps[wrong] = Gap.REFUSED
    values += 0.0


def convert_sizes(cells: Sequence[str], column: PlannedColumn, *, comma: bool) -> ConvertedNumbers:
    """Convert a column of nominal sizes to NPS inches."""
    readings = {text: read_size(text, column.basis, comma) for text in dict.fromkeys(cells)}
    distinct = {text: index for index, text in enumerate(readings)}
    position = np.fromiter(map(distinct.__getitem__, cells), dtype=np.int32, count=len(cells))
    values = np.array([reading.nps for reading in readings.values()], dtype=np.float64)[position]
    gaps = np.array([reading.gap for reading in readings.values()], dtype=np.int8)[position]
    refused = np.flatnonzero(gaps == Gap.REFUSED).tolist()
    reasons = {index: readings[cells[index]].reason for index in refused}
    return ConvertedNumbers(values, gaps, "", reasons, np.flatnonzero(gaps == Gap.HOLD).tolist())


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


def convert_texts(cells: Sequence[str], field_: Field) -> ConvertedTexts:
    """Convert a column of texts to codes; the phase and the pressure's end become canonical words."""
    read: Callable[[str, Field], tuple[str, Gap, str]] = _vocabulary if field_.name in _VOCABULARY else _plain
    distinct = {text: index for index, text in enumerate(dict.fromkeys(cells))}
    position = np.fromiter(map(distinct.__getitem__, cells), dtype=np.int32, count=len(cells))
    readings = [read(text, field_) for text in distinct]
    texts: dict[str, int] = {}
    codes = [texts.setdefault(text, len(texts)) if gap is Gap.GIVEN else -1 for text, gap, _ in readings]
    gaps = np.array([gap for _, gap, _ in readings], dtype=np.int8)[position]
    reasons = {i: readings[position[i]][2] for i in np.flatnonzero(gaps == Gap.REFUSED).tolist()}
    open_items: BoolArray = np.array(
        [
            gap is Gap.HOLD or (gap is Gap.GIVEN and holds(text))
            for text, (_, gap, _) in zip(distinct, readings, strict=True)
        ],
        dtype=np.bool_,
    )[position]
    return ConvertedTexts(
        Coded(np.array(codes, dtype=np.int32)[position], tuple(texts)),
        gaps,
        reasons,
        np.flatnonzero(open_items).tolist(),
    )


def find_open_items(cells: Sequence[str]) -> ConvertedTexts:
    """Return the open items of a column whose texts are kept as written elsewhere (line numbers)."""
    capitals = "\n".join(cells).upper()
    suspect = any(word in capitals for word in ("HOLD", "TB", "VTA", "LATER", "VENDOR", "PENDING"))
    found = [index for index, text in enumerate(cells) if holds(text)] if suspect else []
    return ConvertedTexts(Coded(np.full(len(cells), -1, dtype=np.int32), ()), np.zeros(len(cells), np.int8), {}, found)
