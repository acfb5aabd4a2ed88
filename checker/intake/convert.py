"""One column of sizes or texts becomes one array, each distinct text read once."""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np

from checker.fields import Field
from checker.intake.cells import CodedCells
from checker.intake.converted import ConvertedNumbers, ConvertedTexts, spread_sparse
from checker.intake.hold_marks import marks_hold
from checker.intake.phase_words import PHASES, phase_word
from checker.intake.placeholders import DITTO_REASON, OPEN_WORDS, ditto, holds, placeholder
from checker.intake.planned import PlannedColumn
from checker.intake.size_columns import read_sizes
from checker.intake.texts import shown, tidy
from checker.model import BoolArray, CodeArray, Coded, Gap

__all__ = ["convert_line_numbers", "convert_sizes", "convert_texts"]

HOLD_COLUMN = "hold"
_ENDS = {"inlet": "inlet in upstream start from beginning source", "outlet": "outlet out downstream end to"}
_VOCABULARY = {
    "phase": PHASES,
    "pressure_basis": {word: name for name, words in _ENDS.items() for word in words.split()},
}


def convert_sizes(cells: CodedCells, column: PlannedColumn, *, comma: bool) -> ConvertedNumbers:
    """Convert a column of nominal sizes to NPS inches."""
    readings = read_sizes(cells, column.basis, comma=comma)
    values = np.array([reading.nps for reading in readings], dtype=np.float64)
    gaps = np.array([reading.gap for reading in readings], dtype=np.int8)
    reasons = {index: reading.reason for index, reading in enumerate(readings) if reading.gap is Gap.REFUSED}
    return ConvertedNumbers(values, gaps, "", np.zeros(gaps.shape, dtype=np.int8), reasons).spread(cells.codes)


def _plain(text: str, field_: Field) -> tuple[str, Gap, str]:
    tidied = " ".join(text.split())
    if field_.name != "remarks" and ditto(tidy(tidied)) and tidied.casefold() != "do":  # DO: a fluid code too
        return "", Gap.REFUSED, f"{shown(text)} {DITTO_REASON}"
    gap = placeholder(tidied, field_.name)
    return ("", gap, "") if gap is not Gap.GIVEN else (tidied, gap, "")


def _vocabulary(text: str, field_: Field) -> tuple[str, Gap, str]:
    """Read a text that must be one of a few words."""
    _, gap, reason = _plain(text, field_)
    if gap is not Gap.GIVEN:
        return "", gap, reason
    words = _VOCABULARY[field_.name]
    word = phase_word(tidy(text))
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
        spread_sparse(reasons, cells.codes, len(readings)),
        find_open_items(cells, certain=_marked(cells, gaps, field_)),
    )


def _marked(cells: CodedCells, gaps: CodeArray, field_: Field) -> BoolArray:
    """Return which distinct texts are open items for certain: HOLD and the like, any mark in the column for them."""
    if field_.name != HOLD_COLUMN:
        return np.equal(gaps, Gap.HOLD)
    return np.array([marks_hold(text) for text in cells.texts], dtype=np.bool_)


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
