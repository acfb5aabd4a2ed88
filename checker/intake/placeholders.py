"""Words that stand where a value should be: open items, blanks, not applicable."""

from __future__ import annotations

import re

from checker.model import Gap

__all__ = ["AMBIENT", "ATMOSPHERE", "FULL_VACUUM", "NO_FLOW", "OPEN_WORDS", "holds", "placeholder", "word_of"]

_HOLD_WORD = re.compile(r"\bHOLDS?\b(?!\s*-?\s*UP\b)|\b(?:TBC|TBA|TBD|TBF)\b", re.IGNORECASE)
_LETTERS = re.compile(r"[A-Za-z./\s_-]+")
_DASHES = re.compile(r"[-_\u2010-\u2015\u2212\s]+")
_HOLD_CELLS = frozenset(
    {
        "vta", "vts", "later", "byvendor", "vendor", "vendortoadvise", "byothers", "tobeconfirmed", "tobeadvised",
        "tobedetermined", "tobedefined", "pending",
    }
)  # fmt: skip
_NOT_APPLICABLE = frozenset({"na", "notapplicable", "nr", "notrequired", "none", "nil"})
_ABSENT_WORDS = frozenset({"none", "nil"})
OPEN_WORDS = ("HOLD", "TB", "VTA", "VTS", "LATER", "VENDOR", "OTHERS", "TO BE", "PENDING")
ATMOSPHERE = frozenset({"atm", "atmos", "atmospheric", "atmosphere"})
FULL_VACUUM = frozenset({"fv", "fullvac", "fullvacuum", "vacuum", "vac"})
AMBIENT = frozenset({"amb", "ambient", "ambt"})
NO_FLOW = frozenset({"nnf", "noflow", "normallynoflow", "nonormalflow"})
_KEEPS_NONE = frozenset({"fittings", "insulation", "tracing", "test_medium", "remarks", "area", "drawing", "revision"})


def word_of(text: str) -> str:
    """Return the letters of a cell that holds letters, blanks, dots and strokes only; else an empty text."""
    if len(text) > 40 or not _LETTERS.fullmatch(text):
        return ""
    return "".join(filter(str.isalpha, text.lower()))


def _open(text: str) -> bool:
    capitals = text.upper()
    return ("HOLD" in capitals or "TB" in capitals) and _HOLD_WORD.search(text) is not None


def holds(text: str) -> bool:
    """Return whether a cell carries an open item of the originator."""
    return _open(text) or word_of(text) in _HOLD_CELLS


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
