"""Headers that no field claims and that must be said aloud: flows in an unknown form, Reid vapour pressures, others
that are easily taken for a field which they are not."""

from __future__ import annotations

import re
from collections.abc import Iterable
from itertools import islice

from checker.intake.header_splits import holds_several
from checker.intake.headers import says_reid, units_in_header
from checker.intake.texts import fold_words, shown
from checker.intake.unit_words import is_unit_text
from checker.units import dimensions_knowing

__all__ = ["easily_mistaken", "unread_reason"]

CELLS_LOOKED_AT = 2_000
LONGEST_LOOKED_AT = 1_000
_FLOW_DIMENSIONS = frozenset({"mass flow", "volume flow", "standard flow"})
_FLOW_WORD = re.compile(r"\b(?:mass|vol)?flow(?:s|rates?)?\b")
_NO_FLOW_VALUE = re.compile(
    r"\b(?:no|number|tag|diagram|sheet|scheme|direction|meter|element|regime|pattern|code|area)\b"
)
_NUMBER = re.compile(r"\s*[-+]?[\d.,]*\d[\d.,]*(?:[eE][-+]?\d+)?\s*(.*)", re.DOTALL | re.ASCII)
_BRACKETED = re.compile(r"[(\[][^)\]]*[)\]]")
REID = (
    "a Reid vapour pressure (RVP) is measured at 37.8 degC in a set apparatus, so it is no true vapour pressure at the "
    "flowing temperature and is not read: give the true vapour pressure."
)
_MISTAKEN = (
    (
        re.compile(
            r"(?:max|maximum|maxi|largest|min|minimum|smallest) (?:(?:line|pipe|nominal|nom) )?(?:size|dia|dn|nps)|"
            r"(?:(?:line|pipe) )?size (?:max|maximum|min|minimum)"
        ),
        "size",
        "names the largest or smallest size of a line, not the size of this row",
    ),
    (
        re.compile(r"(?:line |pipe |pipeline )?(?:elev|elevation|el)(?: (?:m|mm|ft|inlet|outlet|from|to|max|min))*"),
        "elevation_change",
        "may be the height of one end, and outlet minus inlet is needed",
    ),
    (
        re.compile(r"mawp|maop|max(?:imum)? allowable (?:working|operating) press(?:ure)?"),
        "pressure_design",
        "is the pressure that a line may bear, which need not be its design pressure",
    ),
    (
        re.compile(r"from to|from (?:and )?to|origin destination|de a|von nach|desde hasta"),
        "from",
        "holds both ends of a line in one column: give From and To a column each",
    ),
)  # fmt: skip


def _is_flow_unit(text: str) -> bool:
    return not _FLOW_DIMENSIONS.isdisjoint(dimensions_knowing(text))


def _flow_cell(cell: str) -> bool:
    match = _NUMBER.fullmatch(cell) if len(cell) <= 60 else None
    return match is not None and (not match[1].strip() or _is_flow_unit(match[1].strip()))


def _is_flow(header: str, row_unit: str, cells: Iterable[str]) -> bool:
    """Return whether a header states a flow: by a flow unit, or by a flow word over numbers without another unit."""
    words = fold_words(header[:LONGEST_LOOKED_AT])
    units = [*units_in_header(header), row_unit] if row_unit else units_in_header(header)
    if any(map(_is_flow_unit, units)):
        return True
    if not _FLOW_WORD.search(words) or _NO_FLOW_VALUE.search(words) or any(map(is_unit_text, units)):
        return False
    return any(map(_flow_cell, dict.fromkeys(islice(cells, CELLS_LOOKED_AT))))


def unread_reason(header: str, *, row_unit: str, cells: Iterable[str]) -> str:
    """Return why a header that no field claims is an open item, empty where it is none.

    Parameters
    ----------
    header : str
        Header as written.
    row_unit : str
        Unit beneath it, empty where there is none.
    cells : iterable of str
        Cells of the column.
    """
    if says_reid(header):
        return f"{shown(header)}: {REID}"
    if holds_several(header[:LONGEST_LOOKED_AT]):
        return f"{shown(header)} holds several values in one column, so it is not read: give each one its own column."
    if _is_flow(header, row_unit, cells):
        return (
            f"{shown(header)} states a flow in words that are not understood, so it is not read: name its field and "
            "its case in [columns] of the criteria."
        )
    return ""


def easily_mistaken(header: str) -> tuple[str, str]:
    """Return the field for which a header is easily taken, and the sentence that says why it is not; else two blanks.

    A largest size is no size of a row, a height no difference of heights.
    """
    words = fold_words(_BRACKETED.sub(" ", header[:LONGEST_LOOKED_AT]))
    for pattern, field, why in _MISTAKEN:
        if pattern.fullmatch(words):
            return field, f"{shown(header)} {why}, so it is not read: name it in [columns] if it is the {field}."
    return "", ""
