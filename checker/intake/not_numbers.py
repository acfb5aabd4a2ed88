"""Cells of number columns that hold no number: what each well-known one is, and what to write instead."""

from __future__ import annotations

import re
import unicodedata

from checker.intake.placeholders import AMBIENT, ATMOSPHERE, DITTO_REASON, FULL_VACUUM, NO_FLOW, ditto, word_of
from checker.intake.spreadsheet_traces import spreadsheet_trace

__all__ = ["known_words", "no_number"]

_ELSEWHERE = re.compile(r"(?:see|refer|ref\.?|as per|per|acc\.?|note)\b", re.IGNORECASE)
_LOST_MINUS = re.compile(r"!\s?(\d[\d.,]*)", re.ASCII)
_BRACKETED = re.compile(r"\(\s?(\d[\d.,]*)\s?\)", re.ASCII)
_LIST = re.compile(r"[\[({]\s?[-+]?\d[\d.,eE+-]*\s?[,;|]\s?.*", re.ASCII | re.DOTALL)
_MARKS = re.compile(r"[?*.xX!\u2020\u2021\u2022\u2026\s]{1,20}")
_SEVERAL = re.compile(r"(\d{1,4})/(\d{1,4})/(\d{1,4})", re.ASCII)
_STATES = {
    "saturated": "saturated",
    "sat": "saturated",
    "satd": "saturated",
    "boiling": "boiling",
    "bubblepoint": "bubble point",
    "dewpoint": "dew point",
}


def known_words(text: str) -> str:
    """Return the end of the sentence that refuses a text which stands for no number, else an empty text.

    Parameters
    ----------
    text : str
        Tidied text of bounded length.
    """
    if not text:
        return ""
    if ditto(text):
        return DITTO_REASON
    values = _SEVERAL.fullmatch(text)
    if values and not _may_be_date(*map(int, values.groups())):
        return "holds three values: give one value per case."
    trace = spreadsheet_trace(text)
    if trace:
        return trace
    if _MARKS.fullmatch(text):
        return "is not a number but a mark: write the value, or HOLD where it is not known."
    if "\u221e" in text:
        return "is not a number: infinity is no value of a line."
    if text[0] in "=@" and text[:2] not in ("=<", "=>"):
        return "begins like a formula: nothing is computed here, write the value itself."
    return _puzzling(text) or _of_letters(text)


def _may_be_date(first: int, second: int, third: int) -> bool:
    """Return whether three numbers are a day, a month and a year, in any order in which dates are written."""
    orders = (first, second), (second, first), (third, second)
    return any(1 <= day <= 31 and 1 <= month <= 12 for day, month in orders)


def _puzzling(text: str) -> str:
    """Return the question about a number that something stands around."""
    if lost := _LOST_MINUS.fullmatch(text):
        return f"is not a number: a minus sign may have been lost. Write -{lost[1]} or {lost[1]}."
    if bracketed := _BRACKETED.fullmatch(text):
        return f"is a number in brackets: write {bracketed[1]}, or -{bracketed[1]} if that is meant."
    if _LIST.fullmatch(text):
        return "is a list of numbers: give one value per case."
    if text.isprintable():
        return ""
    invisible = next((sign for sign in text if unicodedata.category(sign) in ("Cf", "Cc") and sign not in "\n\r\t"), "")
    if invisible:
        return f"holds an invisible character (U+{ord(invisible):04X}): type the value again."
    return ""


def _of_letters(text: str) -> str:
    word = word_of(text)
    if word in _STATES:
        return f"is not a number but a state ({_STATES[word]}): write the value that goes with it."
    if word in NO_FLOW:
        return "is not a number: it says that nothing flows, which belongs into the flow column."
    if word in FULL_VACUUM | ATMOSPHERE | AMBIENT:
        return "is not a number, and no value of this column: write the value."
    if word in ("null", "undefined", "unknown", "blank"):
        return "is not a number and stands for no value: leave the cell blank, or write HOLD."
    if _ELSEWHERE.match(text):
        return "is not a number but points elsewhere: write the value here."
    return ""


def no_number(text: str) -> str:
    """Return the end of the sentence that refuses any other text that does not begin with a number."""
    digits = [sign for sign in text if sign.isnumeric() and not ("0" <= sign <= "9")]
    if digits:
        return f"is not a number: '{digits[0]}' is none of the digits 0 to 9."
    return "is not a number: write one value, or HOLD or TBC, N/A, or nothing where there is none."
