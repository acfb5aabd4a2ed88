"""What a comma and a point mean in the numbers of a list: decided from the cells that leave no choice.

``10,5`` can only be a decimal comma, ``1,234,567`` only thousands; ``1,234`` and ``12.345`` are either. The cells of
the same column decide, then those of the whole list unless it shows both marks as decimals; without evidence, or
against contradictory evidence, such a cell is refused with both readings. Plain numbers such as ``4.5`` are evidence
too.
"""

from __future__ import annotations

import re
from collections.abc import Iterable
from itertools import islice
from typing import NamedTuple

from checker.intake.texts import shown, tidy

__all__ = ["DECIMAL", "THOUSANDS", "Evidence", "Marks", "decide", "evidence_of", "marks_without_evidence", "together"]

DECIMAL, THOUSANDS = "decimal", "thousands"
MOST_TEXTS = 5_000
LONGEST = 60
_NUMBER = re.compile(r"(?<![\w.,])\d[\d.,' ]*\d(?![\d])|(?<![\w.,])[.,]\d+", re.ASCII)
_SHAPES = (
    ("comma", DECIMAL, True, re.compile(r"0?,\d+|\d{1,3}(?:[.' ]\d{3})+,\d+|\d+,\d{4,}|\d{4,},\d+", re.ASCII)),
    ("comma", DECIMAL, False, re.compile(r"\d+,\d{1,2}", re.ASCII)),
    ("comma", THOUSANDS, True, re.compile(r"[1-9]\d{0,2}(?:,\d{2,3})*,\d{3}\.\d+", re.ASCII)),
    ("comma", THOUSANDS, True, re.compile(r"[1-9]\d{0,2}(?:,\d{2,3})+,\d{3}", re.ASCII)),
    ("point", THOUSANDS, True, re.compile(r"[1-9]\d{0,2}(?:\.\d{3})+,\d+|[1-9]\d{0,2}(?:\.\d{3}){2,}", re.ASCII)),
    ("point", DECIMAL, True, re.compile(r"0?\.\d+|\d{1,3}(?:[,' ]\d{2,3})+\.\d+|\d+\.\d{4,}|\d{4,}\.\d+", re.ASCII)),
    ("point", DECIMAL, True, re.compile(r"\d+\.\d{1,2}", re.ASCII)),
)


class Marks(NamedTuple):
    """What a comma and a point mean in a column.

    `comma` and `point` are ``decimal``, ``thousands`` or empty: then a number that could be read both ways is refused.
    Where `point` is not ``decimal``, no cell may be taken as a plain number by ``float``. `note` is a sentence for the
    notes of the list, beginning in lower case, empty where there is nothing to say.
    """

    comma: str = ""
    point: str = DECIMAL
    note: str = ""


class Evidence(NamedTuple):
    """Cells that leave no choice, the first two distinct ones of each reading.

    `certain` holds those readings that even one cell proves: a lone ``10,5`` in a list parted by commas could also be
    two numbers.
    """

    cells: dict[tuple[str, str], tuple[str, ...]]
    certain: frozenset[tuple[str, str]]


NOTHING = Evidence({}, frozenset())


def marks_without_evidence(*, comma: bool) -> Marks:
    """Return the marks of a list of which only its form is known: `comma` where its decimals stand behind commas."""
    return Marks("", "" if comma else DECIMAL)


def _read(text: str) -> list[tuple[str, str, bool]]:
    """Return what the numbers of a text prove: mark, meaning, and whether beyond doubt."""
    return [
        (mark, meaning, certain)
        for number in _NUMBER.findall(tidy(text[:LONGEST]))
        for mark, meaning, certain, shape in _SHAPES
        if shape.fullmatch(number.strip())
    ]


def evidence_of(texts: Iterable[str]) -> Evidence:
    """Return what the cells of a column prove.

    Parameters
    ----------
    texts : iterable of str
        Distinct texts that are no plain numbers (every distinct text where decimal commas are known of); the first
        5000 that hold a comma or a point are looked at.
    """
    marked = (text for text in texts if "," in text or "." in text)
    cells: dict[tuple[str, str], tuple[str, ...]] = {}
    certain = set()
    for text in islice(marked, MOST_TEXTS):
        for mark, meaning, beyond_doubt in _read(text):
            known = cells.get((mark, meaning), ())
            if len(known) < 2 and text not in known:
                cells[mark, meaning] = (*known, text)
            if beyond_doubt:
                certain.add((mark, meaning))
    return Evidence(cells, frozenset(certain))


def together(parts: Iterable[Evidence]) -> Evidence:
    """Return the evidence of several columns as one."""
    cells: dict[tuple[str, str], tuple[str, ...]] = {}
    certain: frozenset[tuple[str, str]] = frozenset()
    for part in parts:
        certain |= part.certain
        for key, texts in part.cells.items():
            cells[key] = tuple(dict.fromkeys((*cells.get(key, ()), *texts)))[:2]
    return Evidence(cells, certain)


def _meaning(mark: str, evidence: Evidence, delimiter: str) -> tuple[str, bool]:
    """Return the meaning of a mark, empty where nothing or too much is proved, and whether the evidence clashes."""
    decimal, thousands = ((mark, meaning) in evidence.cells for meaning in (DECIMAL, THOUSANDS))
    if decimal and thousands:
        return "", True
    if decimal and mark == "comma" and delimiter == "," and (mark, DECIMAL) not in evidence.certain:
        decimal = len(evidence.cells[mark, DECIMAL]) > 1
    return (DECIMAL if decimal else THOUSANDS if thousands else ""), False


def decide(column: Evidence, file: Evidence, *, comma: bool, delimiter: str) -> Marks:
    """Decide what the marks of a column mean: by its own cells, else by those of the whole list.

    Parameters
    ----------
    column, file : Evidence
        What the cells of the column and of all number columns prove.
    comma : bool
        Whether the list is known to be written with decimal commas (its form says so).
    delimiter : str
        Delimiter of the file, empty for a workbook: its stored numbers have a point, whatever the list is written with.
    """
    of_comma, comma_clash = _meaning("comma", column, delimiter)
    of_point, point_clash = _meaning("point", column, delimiter)
    if comma_clash or point_clash or (of_comma and of_comma == of_point) or _both_decimal(column):
        return Marks("", "", "commas and points are used in two ways: each doubtful cell is asked about.")
    maybe_comma = bool(column.cells.get(("comma", DECIMAL)))
    of_comma, of_point = _completed(of_comma, of_point, file, delimiter, maybe_comma=maybe_comma)
    if of_comma == THOUSANDS:
        return Marks(THOUSANDS, DECIMAL, _note("comma", THOUSANDS, column, file))
    if of_comma == DECIMAL and of_point == THOUSANDS:
        return Marks(DECIMAL, THOUSANDS, _note("point", THOUSANDS, column, file))
    if of_comma == DECIMAL:
        return Marks(DECIMAL, of_point, "" if comma else _note("comma", DECIMAL, column, file))
    if of_point == DECIMAL and delimiter and not comma and _points_alone(column, file):
        return Marks(THOUSANDS, DECIMAL, _note("point", DECIMAL, column, file))
    return Marks("", of_point or ("" if comma or delimiter else DECIMAL))


def _points_alone(column: Evidence, file: Evidence) -> bool:
    """Return whether the list shows points as decimals and nowhere a comma that could be one, so that commas part."""
    shows = any(("point", DECIMAL) in evidence.cells for evidence in (column, file))
    return shows and not any(("comma", DECIMAL) in evidence.cells for evidence in (column, file))


def _both_decimal(evidence: Evidence) -> bool:
    """Return whether cells show both marks as decimals, be it only in one cell that could also be two numbers."""
    return ("comma", DECIMAL) in evidence.cells and ("point", DECIMAL) in evidence.cells


def _completed(of_comma: str, of_point: str, file: Evidence, delimiter: str, *, maybe_comma: bool) -> tuple[str, str]:
    """Return the meanings of a column, those its own cells leave open taken from the list unless that contradicts.

    A list that shows both marks in one meaning says nothing of a column without evidence, and a lone ``10,5`` in the
    column (`maybe_comma`) keeps the point from being taken as decimal.
    """
    file_comma, file_point = (_meaning(mark, file, delimiter)[0] for mark in ("comma", "point"))
    both = _both_decimal(file) or (file_comma and file_comma == file_point)
    if both and not (of_comma or of_point):
        return "", ""
    if maybe_comma and file_point == DECIMAL:
        file_point = ""
    if of_point == THOUSANDS and not of_comma:
        of_comma = DECIMAL
    if not of_comma and file_comma != of_point:
        of_comma = file_comma
    if not of_point and file_point != of_comma:
        of_point = file_point
    return of_comma, of_point


def _note(mark: str, meaning: str, column: Evidence, file: Evidence) -> str:
    """Return what a mark means and a cell that shows it."""
    cells = column.cells.get((mark, meaning)) or file.cells.get((mark, meaning), ("",))
    words = f"a {mark} is the decimal mark" if meaning == DECIMAL else f"{mark}s part thousands"
    return f"{words}, as {shown(cells[0])} shows."
