"""Stored values of cells as the texts that stand for them: numbers, dates, and what their style adds."""

from __future__ import annotations

import datetime as dt
import math
from decimal import Decimal
from typing import Any

from checker.intake.texts import shown
from checker.intake.workbook.number_formats import Style

__all__ = [
    "MOST_FIGURES",
    "as_date",
    "beyond_figures",
    "date_sentence",
    "date_text",
    "figures_sentence",
    "number_text",
    "odd_sentence",
    "styled_text",
]

_MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")
MOST_FIGURES = 15
"""Figures of a number that a workbook keeps."""

_LARGEST_WHOLE = 1e21
_DENOMINATORS = {2002: 2, 2004: 4, 2008: 8}
_RETYPE = "format the column as text and type it anew."

When = dt.datetime | dt.date | dt.time | dt.timedelta


def number_text(stored: str) -> str:
    """Return a stored number in its shortest form: ``5`` for 5.0, ``0.1`` for 0.10000000000000001.

    A text that is no plain decimal number comes back as it is, so that the reading of numbers refuses it.
    """
    if stored.isdigit() and stored.isascii() and (stored[0] != "0" or len(stored) == 1):
        return stored
    if not stored.isascii() or "_" in stored:
        return stored
    try:
        number = float(stored)
    except ValueError:
        return stored
    if not math.isfinite(number):
        return stored
    return str(int(number)) if number.is_integer() and abs(number) < _LARGEST_WHOLE else repr(number)


def beyond_figures(text: str) -> bool:
    """Return whether a stored number is whole and has more figures than a workbook keeps."""
    return len(text.lstrip("-")) > MOST_FIGURES and (text.lstrip("-").isdigit() or "e+" in text)


def figures_sentence(text: str) -> str:
    """Return why a whole number of too many figures is not used."""
    return (
        f"the cell holds the number {shown(text)}: a workbook keeps {MOST_FIGURES} figures of a number, the others are "
        f"lost; {_RETYPE}"
    )


def styled_text(stored: str, style: Style) -> str:
    """Return a stored number with what its format adds: leading zeros, per cent, a unit or another literal."""
    text = number_text(stored)
    if style.digits and text.isdigit():
        text = text.zfill(style.digits)
    if style.kind == "per cent":
        text = f"{_hundredfold(text)} %"
    before, after = style.before.strip(), style.after.strip()
    gap = " " if after[:1].isalpha() else ""
    return f"{before}{text}{gap}{after}"


def odd_sentence(stored: str, style: Style) -> str:
    """Return why a number whose format shows something else is no number for certain."""
    shows = {
        "words": f"shows {shown(style.before.strip())} in its place" if style.before.strip() else "does not show it",
        "added": "shows further digits beside it",
        "inlaid": "shows signs among its digits",
        "sign": "shows it with another sign",
    }[style.kind]
    return (
        f"the cell holds {shown(number_text(stored))}, but its number format {shown(style.code)} {shows}: write the "
        "value as it is meant, in a plain format."
    )


def _hundredfold(text: str) -> str:
    try:
        return number_text(f"{(Decimal(text) * 100).normalize():f}")
    except ArithmeticError:
        return text


def as_date(stored: str, style: Style, epoch: dt.datetime) -> When | None:
    """Return the date, time or duration that a stored number stands for, None where it stands for none."""
    from openpyxl.utils.datetime import from_excel

    try:
        when: Any = from_excel(float(stored), epoch, timedelta=style.kind == "duration")
    except (ValueError, OverflowError, TypeError):
        return None
    return when if isinstance(when, dt.datetime | dt.date | dt.time | dt.timedelta) else None


def date_text(when: When) -> str:
    """Return a date as ``2-Jan-2026``, with its time where it has one; a time of day as ``13:30:00``."""
    if isinstance(when, dt.timedelta | dt.time):
        return str(when)
    text = f"{when.day}-{_MONTHS[when.month - 1]}-{when.year}"
    if isinstance(when, dt.datetime) and (when.hour or when.minute or when.second):
        text += f" {when:%H:%M:%S}"
    return text


def _likely(when: dt.date) -> list[str]:
    """Return what was probably typed where a spreadsheet program made a date of it."""
    low, high = sorted((when.day, when.month))
    typed = []
    if (low, high) == (1, 2) and when.year not in _DENOMINATORS:
        typed.append("1-1/2")
    if when.year in _DENOMINATORS:
        below = _DENOMINATORS[when.year]
        typed += [
            f"{whole}-{above}/{below}" for whole, above in dict.fromkeys([(high, low), (low, high)]) if above < below
        ]
    typed += [f"{low}-{high}", f"{low}/{high}"]
    return typed


def date_sentence(when: When | None, text: str) -> str:
    """Return why a date is no number and no size, with what was probably typed."""
    if when is None:
        return f"the cell is formatted as a date, but its number {shown(text)} is none: {_RETYPE}"
    if isinstance(when, dt.timedelta | dt.time):
        return f"the cell holds the time {shown(text)}, not a number: {_RETYPE}"
    originals = " or ".join(f"'{typed}'" for typed in _likely(when))
    return (
        f"the cell holds the date {shown(text)}: the spreadsheet program has turned what was typed into a date, "
        f"likely {originals}; {_RETYPE}"
    )
