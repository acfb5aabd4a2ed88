"""One number at the head of a text: digits, marks of decimals and thousands, powers of ten.

A number is ASCII digits with one sign, one decimal mark and one exponent, so that what Python's ``float`` also takes
(``nan``, ``1_000``, digits of other scripts) is refused. Nothing is evaluated.
"""

from __future__ import annotations

import re
from typing import NamedTuple

from checker.intake.decimal_marks import DECIMAL, THOUSANDS, Marks

__all__ = ["Head", "NumberRefusedError", "plain_powers", "read_head"]

#: Magnitude below which a number that is not zero could become zero on its way to SI.
SMALLEST_POWER = 200
SMALLEST = 10.0**-SMALLEST_POWER
_TOO_SMALL = "is too small for any value of a line: write the value, or 0."
_SUPERSCRIPTS = str.maketrans(
    "\u2070\u00b9\u00b2\u00b3\u2074\u2075\u2076\u2077\u2078\u2079\u207a\u207b", "0123456789+-"
)
_POWER_SIGN = "\u207a\u207b"
_POWER_DIGITS = "\u2070\u00b9\u00b2\u00b3\u2074-\u2079"
_RAISED = re.compile(rf"((?:[xX\u00d7*\u00b7\u22c5]\s?10))\s?([{_POWER_SIGN}]?[{_POWER_DIGITS}]{{1,3}})")
_LONE_POWER = re.compile(
    rf"([-+]?)10\s?(?:([{_POWER_SIGN}][{_POWER_DIGITS}]{{1,3}})|\^\s?([-+]?\d{{1,3}})(?!\d))", re.ASCII
)
_HEAD = re.compile(
    r"([-+]?) ?((?:\d+(?:[.,]\d+)*(?:[ ']\d{3}(?!\d)(?:[.,]\d+)*)*|[.,]\d+)(?:\.(?![.\d]))?)"
    r"(?: ?[eE]([-+]?\d{1,4})(?![\d.,]))?(.*)",
    re.DOTALL | re.ASCII,
)
_TIMES_TEN = re.compile(r"\s?(?:[xX\u00d7*\u00b7\u22c5])\s?10\s?(\^|\*\*)?\s?([-+]?)\s?(\d{1,3})(?![\d.,])", re.ASCII)
_GROUPS = re.compile(r"[1-9]\d{0,2}(?:[ ']\d{3})+(?:[.,]\d+)?\.?", re.ASCII)
_COMMA_THOUSANDS = re.compile(r"(?:[1-9]\d{0,2}(?:,\d{3})+|[1-9]\d?(?:,\d{2})+,\d{3})(\.\d*)?", re.ASCII)
_LONE_COMMA = re.compile(r"[1-9]\d{0,2},\d{3}", re.ASCII)
_DECIMAL_COMMA = re.compile(r"(\d*|[1-9]\d{0,2}(?:\.\d{3})+),(\d+)", re.ASCII)
_LONE_POINT = re.compile(r"[1-9]\d{0,2}\.\d{3}", re.ASCII)
_LEADING_ZERO = re.compile(r"0\d+", re.ASCII)
_POINT_THOUSANDS = re.compile(r"[1-9]\d{0,2}(?:\.\d{3}){2,}", re.ASCII)


class NumberRefusedError(ValueError):
    """Why a text is no number, as the end of a sentence that begins with the text."""


class Head(NamedTuple):
    """A number and what stands behind it."""

    number: float
    rest: str


def plain_powers(text: str) -> str:
    """Return a text in which the raised power behind *times ten* is written with ``^``; footnote marks stay raised."""
    return _RAISED.sub(lambda match: f"{match[1]}^{match[2].translate(_SUPERSCRIPTS)}", text)


def _comma(body: str, marks: Marks, delimiter: str) -> str:
    """Return a body that holds a comma with its decimal mark as a point and no thousands marks."""
    lone = _LONE_COMMA.fullmatch(body) is not None
    if lone and not marks.comma:
        raise NumberRefusedError(
            f"reads as {body.replace(',', '.')} or as {body.replace(',', '')}: write it without a comma."
        )
    if (lone and marks.comma == THOUSANDS) or (not lone and _COMMA_THOUSANDS.fullmatch(body)):
        return body.replace(",", "")
    decimal = _DECIMAL_COMMA.fullmatch(body)
    if decimal is None:
        raise NumberRefusedError("is not one number.")
    value = f"{decimal[1].replace('.', '')}.{decimal[2]}"
    if delimiter == "," and marks.comma != DECIMAL:
        raise NumberRefusedError(f"has a decimal comma in a comma-delimited list: write {value} if that is meant.")
    if marks.comma == THOUSANDS:
        raise NumberRefusedError(f"has a decimal comma where commas part thousands: write {value} if that is meant.")
    return value


def _point(body: str, marks: Marks) -> str:
    """Return a body that holds a point and no comma without thousands marks."""
    if _POINT_THOUSANDS.fullmatch(body):
        return body.replace(".", "")
    if body.count(".") > 1:
        raise NumberRefusedError("is not one number.")
    if marks.point == DECIMAL or not _LONE_POINT.fullmatch(body):
        return body
    if marks.point == THOUSANDS:
        return body.replace(".", "")
    where = "in a list with decimal commas" if marks.comma == DECIMAL else "and the other cells do not show which"
    whole = body.replace(".", "")
    raise NumberRefusedError(f"reads as {body} or as {whole} {where}: write {body}0 or {whole}.")


def _digits(body: str, marks: Marks, delimiter: str) -> str:
    """Return a body as ``float`` takes it."""
    if _LEADING_ZERO.fullmatch(body):
        raise NumberRefusedError(
            "begins with zeros, like a code or the cell of another column: write it without them if a number is meant."
        )
    if " " in body or "'" in body:
        if not _GROUPS.fullmatch(body):
            raise NumberRefusedError("is more than one number: give one value per case.")
        plain = body.replace(" ", "").replace("'", "")
        return _comma(plain, marks, delimiter) if "," in plain else plain
    if "," in body:
        return _comma(body, marks, delimiter)
    return _point(body, marks)


def _power(rest: str) -> tuple[str, str]:
    """Return the exponent of *times ten* behind a number, empty where there is none, and what stands behind it."""
    match = _TIMES_TEN.match(rest)
    if match is None:
        return "", rest
    raised, sign, digits = match[1], match[2], match[3]
    if not raised and not sign:
        raise NumberRefusedError(f"reads as times 10 to the power {digits} or as times 10{digits}: write it with E.")
    return f"{sign}{digits}", rest[match.end() :]


def read_head(text: str, marks: Marks, delimiter: str) -> Head | None:
    """Return the number at the head of a text and the rest; None where the text does not begin with a number.

    Parameters
    ----------
    text : str
        Text of bounded length, after `plain_powers`.
    marks : Marks
        What a comma and a point mean in the column.
    delimiter : str
        Delimiter of the file: in a list parted by commas a decimal comma needs evidence.

    Raises
    ------
    NumberRefusedError
        If the number can be read in two ways or in none.
    """
    lone = _LONE_POWER.match(text)
    if lone is not None:
        exponent = lone[3] or lone[2].translate(_SUPERSCRIPTS)
        if int(exponent) < -SMALLEST_POWER:
            raise NumberRefusedError(_TOO_SMALL)
        return Head(float(f"{lone[1]}1e{exponent}"), text[lone.end() :].strip())
    match = _HEAD.fullmatch(text)
    if match is None:
        return None
    sign, body, exponent, rest = match[1], match[2], match[3] or "", match[4]
    if not exponent:
        exponent, rest = _power(rest)
    digits = _digits(body, marks, delimiter)
    number = float(f"{sign}{digits}e{exponent or 0}")
    if abs(number) < SMALLEST and digits.strip("0."):
        raise NumberRefusedError(_TOO_SMALL)
    return Head(number, rest.strip())
