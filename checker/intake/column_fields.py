"""Which of several fields a header carries that names more than one: its unit or its cells say it, else it is asked."""

from __future__ import annotations

import re
from collections.abc import Collection, Sequence
from dataclasses import dataclass, replace
from itertools import islice

from checker.fields import Field
from checker.intake.placeholders import placeholder
from checker.intake.planned import FLOWS
from checker.intake.sizes import column_basis
from checker.intake.texts import fold_words, shown
from checker.intake.unit_words import size_basis, unit_in_cell, unit_or_refusal
from checker.model import Gap

__all__ = ["CELLS_LOOKED_AT", "UNSETTLED", "Draft", "one_field"]

CELLS_LOOKED_AT = 2_000
UNSETTLED = "an unsettled quantity"
_LARGEST = re.compile(r"\b(?:max|maximum|maxima)\b")
_NUMBER_FIRST = re.compile(r"[-+<>~]?\s*[\d.,]")


@dataclass(frozen=True, slots=True)
class Draft:
    """One header before its field is settled: the fields it may carry, the unit and the case that it names."""

    index: int
    header: str
    fields: tuple[Field, ...]
    unit: str
    case: str
    hinted: bool


def _may_have(field: Field, unit: str) -> bool:
    """Return whether a unit is one of a field's dimension, a pressure's without gauge or absolute among them."""
    if field.kind == "size":
        return bool(size_basis(unit))
    if field.kind == "text":
        return False
    reading = unit_or_refusal(unit, field.dimension)
    return not isinstance(reading, str) or "gauge or absolute" in reading


def _distinct(cells: Sequence[str]) -> list[str]:
    """Return the distinct first cells that hold more than a placeholder."""
    texts = (cell.strip() for cell in dict.fromkeys(islice(cells, CELLS_LOOKED_AT)))
    return [text for text in texts if text and placeholder(text, "") is Gap.GIVEN]


def _by_cells(fields: Sequence[Field], cells: Sequence[str]) -> Field | None:
    """Return the field whose dimension knows the units that the cells themselves carry."""
    counts = dict.fromkeys(fields, 0)
    for cell in cells:
        unit = cell.lstrip("+-0123456789.,eE ")
        for field in fields:
            counts[field] += bool(unit) and _known_in_cell(unit, field.dimension)
    best = max(counts, key=lambda field: counts[field])
    return best if counts[best] and list(counts.values()).count(counts[best]) == 1 else None


def _known_in_cell(unit: str, dimension: str) -> bool:
    reading = unit_in_cell(unit, dimension)
    return not isinstance(reading, str) or "gauge or absolute" in reading


def _without_unit(fields: Sequence[Field], cells: Sequence[str], comma: bool) -> Field | None:
    """Return the field of a header without a unit, None where its cells do not tell.

    A unit that [units] of the criteria gives a whole dimension says nothing of what one header means.
    """
    texts = [field for field in fields if field.kind == "text"]
    sizes = [field for field in fields if field.kind == "size"]
    numbers = [field for field in fields if field.kind == "number"]
    if not numbers:
        return fields[0]
    found = _distinct(cells)
    if sizes and column_basis(found, comma):
        return sizes[0]
    if by_cells := _by_cells(numbers, found):
        return by_cells
    if texts:
        return texts[0] if any(not _NUMBER_FIRST.match(cell) for cell in found) else None
    return None


def one_field(
    draft: Draft,
    *,
    row_unit: str,
    cells: Sequence[str],
    taken: Collection[str],
    comma: bool,
) -> tuple[Field, str]:
    """Return the field of a header, and the question where several remain: its column is then not read.

    Parameters
    ----------
    draft : Draft
        The header.
    row_unit : str
        Unit beneath it, empty where there is none.
    cells : sequence of str
        Cells of the column.
    taken : collection of str
        Fields that other headers carry beyond doubt; the question is put to another one where there is one.
    comma : bool
        Whether the list is written with decimal commas.
    """
    fields = draft.fields
    if len(fields) == 1:
        return fields[0], ""
    written = draft.unit or row_unit
    if written:
        fields = tuple(field for field in fields if _may_have(field, written)) or fields
        settled = fields[0] if len(fields) == 1 or not _may_have(fields[0], written) else None
    else:
        settled = _without_unit(fields, cells, comma)
    if settled is not None:
        return settled, ""
    numbers = [field for field in fields if field.kind == "number"]
    free = [field for field in numbers if field.name not in taken and field.name not in FLOWS]
    carrier = replace((free or numbers)[0], dimension=UNSETTLED)  # so that no cell is read by a unit of its own
    return carrier, _question(draft.header, written, fields)


def _question(header: str, written: str, fields: Sequence[Field]) -> str:
    names = " or ".join(_meaning(header, field) for field in fields)
    said = f"{shown(header)} in {shown(written)}" if written else f"no unit: {shown(header)}"
    alike = len({field.dimension for field in fields}) == 1
    remedy = "name its field in [columns]" if alike else "name its field in [columns], or write its unit in the header"
    return f"{said} could be {names}: {remedy}."


def _meaning(header: str, field: Field) -> str:
    largest = " in the maximum case" if field.one_case and _LARGEST.search(fold_words(header)) else ""
    return f"the {field.meaning}{largest} ({field.name})"
