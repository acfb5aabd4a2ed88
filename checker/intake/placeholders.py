"""Words that stand where a value should be: open items, blanks, not applicable, marks that repeat a cell."""

from __future__ import annotations

import re

from checker.model import Gap

__all__ = [
    "AMBIENT",
    "ATMOSPHERE",
    "DITTO_REASON",
    "FULL_VACUUM",
    "NO_FLOW",
    "OPEN_WORDS",
    "ditto",
    "holds",
    "open_behind_number",
    "placeholder",
    "word_of",
]

_HOLD_WORD = re.compile(r"(?<![^\W\d_])(?:HOLDS?\b(?!\s*-?\s*UP\b)|(?:TBC|TBA|TBD|TBF)\b)", re.IGNORECASE)
_OPEN_BEHIND_NUMBER = re.compile(
    r"(?<![A-Za-z])(?:VTA|VTS|VTC|LATER|BY (?:VENDOR|OTHERS|LICENSOR|CLIENT)|VENDOR TO (?:ADVISE|CONFIRM)|PENDING"
    r"|TO BE (?:CONFIRMED|ADVISED|DETERMINED|DEFINED))\b",
    re.IGNORECASE | re.ASCII,
)
_LETTERS = re.compile(r"[A-Za-z./\s_-]+")
_DASHES = re.compile(r"[-_\u2010-\u2015\u2212\s]+")
_HOLD_CELLS = frozenset(
    {
        "vta", "vts", "vtc", "later", "byvendor", "vendor", "vendortoadvise", "vendortoconfirm", "byothers",
        "bylicensor", "byclient", "tobeconfirmed", "tobeadvised", "tobedetermined", "tobedefined", "tofollow",
        "pending", "tbc", "tba", "tbd", "tbf", "hold", "onhold",
    }
)  # fmt: skip
_NOT_APPLICABLE = frozenset({"na", "notapplicable", "nr", "notrequired", "none", "nil"})
_ABSENT_WORDS = frozenset({"none", "nil"})
#: Capitals of which one stands in every open item: where none does, no cell need be looked at.
OPEN_WORDS = (
    "HOLD", "TB", "T.B", "T B", "V.T", "VTA", "VTS", "VTC", "LATER", "VENDOR", "OTHERS", "LICENSOR", "CLIENT", "TO BE",
    "TO FOLLOW", "PENDING",
)  # fmt: skip
ATMOSPHERE = frozenset({"atm", "atmos", "atmospheric", "atmosphere", "atmosphericpressure", "atmpress", "atmpressure"})
FULL_VACUUM = frozenset({"fv", "fullvac", "fullvacuum", "vacuum", "vac"})
AMBIENT = frozenset({"amb", "ambient", "ambt", "ambienttemp", "ambtemp", "ambienttemperature", "siteambient"})
NO_FLOW = frozenset({"nnf", "noflow", "normallynoflow", "nonormalflow"})
_KEEPS_NONE = frozenset({"fittings", "insulation", "tracing", "test_medium", "remarks", "area", "drawing", "revision"})
_DITTO_SIGNS = frozenset({'"', "''", '""', "\u3003", "\u2193", "\u21d3", "\u2191", '"""', ",,", '-"-', '- " -'})
_DITTO_WORDS = frozenset(
    {"do", "ditto", "idem", "sameasabove", "asabove", "same", "seeabove", "sameaslineabove", "asprevious"}
)
DITTO_REASON = "repeats the cell above: write the value itself on every row."


def word_of(text: str) -> str:
    """Return the letters of a cell that holds letters, blanks, dots and strokes only; else an empty text."""
    if len(text) > 40 or not _LETTERS.fullmatch(text):
        return ""
    return "".join(filter(str.isalpha, text.lower()))


def ditto(text: str) -> bool:
    """Return whether a cell (tidied) says that it repeats the cell above instead of holding a value."""
    return len(text) <= 20 and (text in _DITTO_SIGNS or word_of(text) in _DITTO_WORDS)


def _open(text: str) -> bool:
    capitals = text.upper()
    return ("HOLD" in capitals or "TB" in capitals) and _HOLD_WORD.search(text) is not None


def holds(text: str) -> bool:
    """Return whether a cell carries an open item of the originator."""
    return _open(text) or word_of(text) in _HOLD_CELLS


def open_behind_number(text: str) -> bool:
    """Return whether words in the cell of a number leave it to somebody else (``12.5 by vendor``)."""
    return _OPEN_BEHIND_NUMBER.search(text) is not None


def placeholder(text: str, field: str) -> Gap:
    """Return the gap that a cell of a field stands for, `Gap.GIVEN` where it stands for none.

    An error value of a spreadsheet (``#N/A``) is no placeholder: it is refused where a number is needed.
    """
    if not text or (not text[-1].isalnum() and _DASHES.fullmatch(text)):
        return Gap.BLANK
    if field != "remarks" and _open(text):
        return Gap.HOLD
    word = word_of(text)
    if word in _HOLD_CELLS and field != "remarks":
        return Gap.HOLD
    if word in _NOT_APPLICABLE and not (field in _KEEPS_NONE and word in _ABSENT_WORDS):
        return Gap.NOT_APPLICABLE
    return Gap.GIVEN
