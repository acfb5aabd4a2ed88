"""What the criteria's ``[columns]`` say of headers, and where that contradicts the list."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from typing import NamedTuple

from checker.criteria.hints import ColumnHint
from checker.errors import InputError, Problem
from checker.fields import Field, all_fields, field_named
from checker.intake.case_names import canonical_case
from checker.intake.headers import unit_in_header, unit_of_name, units_in_header
from checker.intake.texts import key_of, place, shown
from checker.intake.unit_words import is_unit_text, settled_by, size_basis, unit_or_refusal

__all__ = ["Hinted", "absent_headers", "hint_fields", "hinted_column", "same_unit"]

LONGEST_COMPARED = 120
LIKENESS = 0.4


class Hinted(NamedTuple):
    """The field, unit and case that the criteria give one header."""

    field: Field
    unit: str
    case: str


def hint_fields(hints: Mapping[str, ColumnHint]) -> dict[str, str]:
    """Return the field that the criteria give each header, by folded header."""
    return {key_of(header): hint.field for header, hint in hints.items()}


def same_unit(stated: str, hinted: str, field: Field) -> bool:
    """Return whether two units of a field are one, or the hint only settles what the list leaves open."""
    if field.kind == "size":
        return size_basis(stated) == size_basis(hinted) or not size_basis(stated)
    one, other = (unit_or_refusal(text, field.dimension) for text in (stated, hinted))
    if isinstance(other, str):
        return True
    if isinstance(one, str):
        settled = field.dimension == "pressure" and settled_by(stated, hinted) is not None
        return settled or not is_unit_text(stated)
    same = math.isclose(one.scale, other.scale, rel_tol=1e-9) and math.isclose(one.offset, other.offset, rel_tol=1e-9)
    return same and one.reference == other.reference


def _stated_unit(header: str, row_unit: str, field: Field) -> str:
    """Return the unit that the list itself states for a column: a unit of the field, or a bracketed one of another."""
    fitting = unit_in_header(header, field)
    other = next((unit for unit in units_in_header(header, bracketed=True) if is_unit_text(unit)), "")
    return fitting or other or unit_of_name(header) or row_unit


def hinted_column(header: str, hint: ColumnHint, *, row_unit: str, file: str, row: int) -> Hinted | None:
    """Return what the criteria say of a header, None where they say that it carries no field.

    Raises
    ------
    InputError
        If they name a field that there is not, or a unit other than the one that the list itself states.
    """
    if not hint.field:
        return None
    where = place(file, row, header)
    if hint.field not in {field.name for field in all_fields()}:
        what = f"[columns] gives the field '{hint.field}', which is no field of a line list."
        raise InputError(Problem(what, where=where, remedy="`linelist fields` lists them."))
    field = field_named(hint.field)
    stated = "" if field.kind == "text" else _stated_unit(header, row_unit, field)
    if hint.unit and stated and not same_unit(stated, hint.unit, field):
        what = f"[columns] gives the unit {shown(hint.unit)}, the list itself states {shown(stated)}: which one holds?"
        raise InputError(Problem(what, where=where, remedy="Correct the unit in [columns], or the header of the list."))
    unit = hint.unit or ("" if field.kind == "text" else unit_in_header(header, field))
    return Hinted(field, unit, canonical_case(hint.case) if hint.case else "")


def _closest(header: str, headers: Sequence[str]) -> str:
    from difflib import SequenceMatcher

    key = key_of(header[:LONGEST_COMPARED])
    likeness = {text: SequenceMatcher(None, key, key_of(text[:LONGEST_COMPARED])).ratio() for text in headers if text}
    best = max(likeness, key=lambda text: likeness[text], default="")
    return best if best and likeness[best] >= LIKENESS else ""


def absent_headers(hints: Mapping[str, ColumnHint], headers: Sequence[str]) -> list[tuple[str, str]]:
    """Return each header that the criteria explain and the list does not have, with the sentence that says so."""
    present = {key_of(header) for header in headers if header}
    found = []
    for header in hints:
        if key_of(header) in present:
            continue
        closest = _closest(header, headers)
        like = f"; the closest one is {shown(closest)}" if closest else ""
        found.append((header, f"[columns] of the criteria explains {shown(header)}, which is no header here{like}."))
    return found
