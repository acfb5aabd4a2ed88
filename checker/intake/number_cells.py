"""One cell that should be a number: its value and its own unit, or a sentence that says why not.

Nothing here evaluates a cell: a number is ASCII digits with one sign, one decimal mark and one exponent, so that
what Python's ``float`` also takes (``nan``, ``1_000``, digits of other scripts) is refused.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import NamedTuple

from checker.fields import Field
from checker.intake.placeholders import AMBIENT, ATMOSPHERE, FULL_VACUUM, NO_FLOW, placeholder, word_of
from checker.intake.texts import shown, tidy
from checker.intake.unit_words import unit_in_cell
from checker.model import Gap
from checker.units import Unit, to_si

__all__ = ["KINEMATIC", "LONGEST_NUMBER", "SPECIFIC_GRAVITY", "CellReading", "NumberContext", "read_number_cell"]

NAN = float("nan")
LONGEST_NUMBER = 60
KINEMATIC, SPECIFIC_GRAVITY = 1, 2
_SHAPE = re.compile(
    r"([-+]?)\s?((?:\d[\d.,]*|[.,]\d[\d.,]*)(?:[ ']\d{3}(?!\d)[\d.,]*)*)([eE][-+]?\d{1,4}(?!\d))?(.*)",
    re.DOTALL | re.ASCII,
)
_LIMIT = re.compile(
    r"(?:[<>~\u2264\u2265\u2248\u00b1=@]|ca\.?\s|approx|abt|about|max|min|up to|less|more)", re.IGNORECASE
)
_SECOND = re.compile(
    r"(?:[-~/\u00b1x\u00d7&;:]|to\b|\.\.+|and\b|or\b)\s*[-+]?\s*[\d.]|/\s*[A-Za-z]{2,3}$", re.IGNORECASE | re.ASCII
)
_THOUSANDS = re.compile(r"\d{1,3}(?:[ ']\d{3})+(?:[.,]\d+)?", re.ASCII)
_FLOWS = frozenset({"flow_mass", "flow_volume", "flow_standard"})


class CellReading(NamedTuple):
    """One number cell: SI value (NaN where there is none), its gap, the reason, and what its unit still rests on."""

    value: float
    gap: Gap
    reason: str = ""
    rests_on: int = 0


@dataclass(frozen=True, slots=True)
class NumberContext:
    """What a column says of its cells: field, unit (None: the refusal says why), site's atmosphere, decimal marks."""

    field: Field
    unit: Unit | None
    refusal: str
    atmosphere: float
    delimiter: str
    comma: bool


class _Refusal(Exception):  # noqa: N818
    """The reason why a text is no number; never leaves this module."""


def unit_rests_on(unit: Unit | None) -> int:
    """Return whether a unit needs the density (kinematic viscosity) or the phase (specific gravity) beside it."""
    if unit is None:
        return 0
    if unit.reference == "kinematic":
        return KINEMATIC
    relative = unit.dimension == "density" and unit.spelling.casefold().startswith(("sg", "spgr"))
    return SPECIFIC_GRAVITY if relative else 0


def _with_comma(body: str, *, comma: bool, delimiter: str) -> str:
    """Return a body that holds a comma with its decimal mark as a point and no thousands marks."""
    if re.fullmatch(r"\d{1,3}(?:,\d{2,3})*,\d{3}\.\d+", body) or re.fullmatch(r"\d{1,3}(?:,\d{2,3})+,\d{3}", body):
        return body.replace(",", "")
    if re.fullmatch(r"[1-9]\d{0,2},\d{3}", body):
        raise _Refusal(f"reads as {body.replace(',', '.')} or as {body.replace(',', '')}: write it without a comma.")
    decimal = re.fullmatch(r"(\d*|\d{1,3}(?:\.\d{3})+),(\d+)", body)
    if decimal is None:
        raise _Refusal("is not one number.")
    if delimiter == "," and not comma:
        value = f"{decimal[1].replace('.', '')}.{decimal[2]}"
        raise _Refusal(f"has a decimal comma in a comma-delimited list: write {value} if that is meant.")
    return f"{decimal[1].replace('.', '')}.{decimal[2]}"


def _body(body: str, *, comma: bool, delimiter: str) -> str:
    if " " in body or "'" in body:
        if not _THOUSANDS.fullmatch(body):
            raise _Refusal("is more than one number: give one value per case.")
        body = body.replace(" ", "").replace("'", "")
        return (
            body.replace(",", ".")
            if comma
            else _with_comma(body, comma=False, delimiter=delimiter)
            if ("," in body)
            else body
        )
    if "," in body:
        return _with_comma(body, comma=comma, delimiter=delimiter)
    if comma and re.fullmatch(r"[1-9]\d{0,2}\.\d{3}", body):
        raise _Refusal(f"reads as {body} or as {body.replace('.', '')} in a list with decimal commas: write which.")
    if comma and re.fullmatch(r"\d{1,3}(?:\.\d{3}){2,}", body):
        return body.replace(".", "")
    if body.count(".") > 1:
        raise _Refusal("is not one number.")
    return body


def _split(text: str, context: NumberContext) -> tuple[float, str]:
    """Return the number at the head of a cell and the rest, its unit."""
    if len(text) > LONGEST_NUMBER:
        raise _Refusal("is too long for a number.")
    if _LIMIT.match(text):
        raise _Refusal("is a limit or an approximation: give one value per case.")
    match = _SHAPE.fullmatch(text)
    if match is None:
        raise _Refusal("is not a number.")
    sign, body, exponent, rest = match[1], match[2], match[3] or "", match[4].strip()
    if _SECOND.match(rest) or rest[:1].isdigit():
        raise _Refusal("holds two readings (a range, two values or a broken number): give one value per case.")
    if rest[:1] in ("*", "+"):
        raise _Refusal("is a limit or carries a mark: give one value per case and put notes into the remarks.")
    return float(f"{sign}{_body(body, comma=context.comma, delimiter=context.delimiter)}{exponent}"), rest


def _special(text: str, context: NumberContext) -> CellReading | None:
    """Return the reading of a word that stands for a value, or that asks for one."""
    word, field = word_of(text), context.field
    if word in NO_FLOW and field.name in _FLOWS:
        return CellReading(0.0, Gap.GIVEN)
    if word in ATMOSPHERE and field.dimension == "pressure":
        return CellReading(context.atmosphere, Gap.GIVEN)
    if word in FULL_VACUUM and field.dimension == "pressure":
        return CellReading(NAN, Gap.REFUSED, f"{shown(text)} is full vacuum, no operating value: give the pressure.")
    if word in AMBIENT:
        return CellReading(NAN, Gap.REFUSED, f"{shown(text)} is a range of the site, no value: give the number.")
    return None


def _converted(number: float, rest: str, text: str, context: NumberContext) -> CellReading:
    unit = context.unit
    if rest:
        own = unit_in_cell(rest, context.field.dimension)
        if isinstance(own, str):
            return CellReading(NAN, Gap.REFUSED, f"{shown(text)}: {own}")
        unit = own
    if unit is None:
        return CellReading(NAN, Gap.REFUSED, context.refusal)
    value = float(to_si(number, unit, atmosphere=context.atmosphere))
    return CellReading(value, Gap.GIVEN, rests_on=unit_rests_on(unit))


def read_number_cell(text: str, context: NumberContext) -> CellReading:
    """Read one cell of a number column; never raises, whatever the cell holds."""
    plain = tidy(text)
    special = _special(plain, context)
    if special is not None:
        return special
    gap = placeholder(plain, context.field.name)
    if gap is not Gap.GIVEN:
        return CellReading(NAN, gap)
    try:
        number, rest = _split(plain, context)
    except _Refusal as refusal:
        return CellReading(NAN, Gap.REFUSED, f"{shown(text)} {refusal}")
    return _converted(number, rest, text, context)
