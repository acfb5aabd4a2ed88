"""What spreadsheets leave in a cell in place of a number: dates, times, error values, truth values."""

from __future__ import annotations

import re

__all__ = ["date_originals", "error_value", "spreadsheet_trace"]

_MONTHS = ("jan", "feb", "mar", "apr", "may", "jun", "jul", "aug", "sep", "oct", "nov", "dec")
_MONTH = (
    r"(jan(?:uary)?|feb(?:ruary)?|mar(?:ch)?|apr(?:il)?|may|june?|july?|aug(?:ust)?|sept?(?:ember)?|oct(?:ober)?"
    r"|nov(?:ember)?|dec(?:ember)?)\.?"
)
_DAY_MONTH = re.compile(rf"(\d{{1,2}})[-/. ]{{1,2}}{_MONTH}(?:[-/., ]{{1,2}}\d{{2,4}})?", re.IGNORECASE | re.ASCII)
_MONTH_DAY = re.compile(rf"{_MONTH}[-/. ]{{1,2}}(\d{{1,4}})(?:[-/., ]{{1,2}}\d{{2,4}})?", re.IGNORECASE | re.ASCII)
_ISO = re.compile(r"\d{4}-(\d{1,2})-(\d{1,2})(?:[T ]\d{1,2}:\d{2}(?::\d{2}(?:\.\d{1,6})?)?)?", re.ASCII)
_NUMERIC = re.compile(r"(\d{1,2})([/.-])(\d{1,2})\2(?:\d{4}|\d{2})(?: \d{1,2}:\d{2}(?::\d{2})?)?", re.ASCII)
_TIME = re.compile(r"(\d{1,2}):(\d{2})(?::\d{2})?(?: ?[AP]M)?", re.IGNORECASE | re.ASCII)
_ERROR = re.compile(
    r"#[A-Z][A-Z0-9_/]{1,14}[!?]?|[-+]?\d[.,]?\d{0,4}#(?:IND|INF|Q?NAN|SNAN)0{0,4}|ERR:\d{1,4}",
    re.IGNORECASE | re.ASCII,
)
_TRUTH = frozenset({"true", "false", "yes", "no", "y", "n"})


def error_value(text: str) -> bool:
    """Return whether a cell holds an error value of a spreadsheet (``#N/A``, ``#REF!``, ``1.#IND``)."""
    return len(text) <= 20 and text[:1] in "#-+0123456789eE" and _ERROR.fullmatch(text) is not None


def _day_and_month(text: str) -> tuple[int, int] | None:
    """Return the two numbers of a date that is not its year, the month first."""
    if match := _DAY_MONTH.fullmatch(text):
        return _month_number(match[2]), int(match[1])
    if match := _MONTH_DAY.fullmatch(text):
        return _month_number(match[1]), int(match[2])
    if match := _ISO.fullmatch(text):
        return int(match[1]), int(match[2])
    if match := _NUMERIC.fullmatch(text):
        return int(match[3]), int(match[1])
    return None


def _month_number(name: str) -> int:
    return _MONTHS.index(name[:3].lower()) + 1


def date_originals(text: str) -> tuple[str, ...]:
    """Return what a date may have been before a spreadsheet made a date of it, empty where a text is no date.

    ``5-Jul`` may have been ``5-7`` or ``7-5``; ``2-Jan`` also ``1/2`` or ``1-1/2``.
    """
    found = _day_and_month(text) if 3 <= len(text) <= 30 else None
    if found is None:
        return ()
    month, day = found
    originals = [f"{month}-{day}", f"{day}-{month}"] if month != day else [f"{day}-{month}"]
    if month < day and day in (2, 4, 8, 16):
        originals.append(f"{month}/{day}")
    if month == 1 and day in (2, 4):
        originals.append(f"1-1/{day}")
    return tuple(originals)


def spreadsheet_trace(text: str) -> str:
    """Return the end of the sentence that refuses what a spreadsheet left in a number's place, else an empty text."""
    if error_value(text):
        return "is an error value of the spreadsheet: write the value."
    if len(text) > 1 and not text.strip("#"):
        return "is what a spreadsheet shows where a column is too narrow: widen it and save again."
    originals = date_originals(text)
    if originals:
        names = f"{', '.join(originals[:-1])} or {originals[-1]}" if len(originals) > 1 else originals[0]
        return f"is a date: a spreadsheet may have made it of {names}. Write the original, as a text."
    if _TIME.fullmatch(text):
        return "is a time of day: a spreadsheet may have made it of two numbers. Write the original, as a text."
    if text.casefold() in _TRUTH:
        return "is not a number but a yes or a no: write the value."
    return ""
