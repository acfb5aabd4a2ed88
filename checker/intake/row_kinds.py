"""What a row beneath the header is when it is no line: a repeat, a total, a note, a heading, a deleted line."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable, Sequence
from itertools import islice

from checker.intake.layout import Layout
from checker.intake.placeholders import ditto, placeholder
from checker.intake.texts import shown, spared, tidy
from checker.model import Gap

__all__ = [
    "HOLDS_NOTHING",
    "LONGEST_NO_NUMBER",
    "RepeatedRows",
    "deleted_word",
    "doubts_line",
    "heading_test",
    "may_be_no_line",
    "no_line_number",
    "only_spare",
    "says_deleted",
    "two_tags",
    "why_no_line",
]

HOLDS_NOTHING = re.compile(r"[-_\u2013\u2014]*$")
_TOTAL = re.compile(
    r"(grand |sub-?\s?)?totals?(?=$|[:\s])|(sub)?sum(?=$|[:\s])|(page|sheet) \d+( ?(of|/) ?\d+)?\s*$"
    r"|end of (list|table)",
    re.IGNORECASE,
)
_NOTE = re.compile(
    r"(general )?notes?\b|legend\b|abbreviations?\b|remarks?:|hold list|\(?\d{1,2}[).] \w", re.IGNORECASE
)
_DELETED = re.compile(
    r"[\W_]*(?:(?:line )?(?:is )?(?:deleted|cancel+ed|withdrawn|voided)|not (?:in )?used?|no longer used|unused"
    r"|void|spare)[\W_]*",
    re.IGNORECASE,
)
_SPARE = re.compile(r"[\W_]*spare[\W_]*", re.IGNORECASE)
_DOUBT = re.compile(
    r"\b(?:deleted|deletion|delete|cancel+ed|withdrawn|voided|demolish(?:ed)?|decommissioned|abandoned|superseded)\b"
    r"|\bdel\.(?!\w)",
    re.IGNORECASE,
)
_DOUBT_STEMS = (
    "DELET", "CANCEL", "WITHDRAWN", "VOIDED", "DEMOLISH", "DECOMMISSIONED", "ABANDONED", "SUPERSEDED", "DEL.",
)  # fmt: skip
_STATUS_DOUBT = re.compile(r"\W*(?:d|del|dem|demo)\W*", re.IGNORECASE)
_NO_NUMBERS = {
    **dict.fromkeys(("TRUE", "FALSE"), "a yes or no of the spreadsheet program"),
    **dict.fromkeys(("0", "0.0"), "nothing"),
    **dict.fromkeys(
        ("#REF!", "#N/A", "#VALUE!", "#NAME?", "#DIV/0!", "#NUM!", "#NULL!", "#SPILL!", "#CALC!", "#GETTING_DATA"),
        "an error of the spreadsheet program",
    ),
}
LONGEST_NO_NUMBER = max(map(len, _NO_NUMBERS))
_ANY = re.compile("|".join(f"(?:{part.pattern})" for part in (_TOTAL, _NOTE, HOLDS_NOTHING)), re.IGNORECASE)
_DELETED_STEMS = (
    "DELETED",
    "CANCEL",
    "WITHDRAWN",
    "VOID",
    "NOT USE",
    "NOT IN USE",
    "NO LONGER USED",
    "UNUSED",
    "SPARE",
)
_STARTS = (
    "grand", "sub", "total", "sum", "page", "end of", "general", "note", "legend", "abbreviation", "remark",
    "hold list", "sheet", "ditto", "do", "idem", "same", "as a", "see a", "as p", "line", "is ", "deleted",
    "cancel", "withdrawn", "void", "not ", "no l", "unused", "spare",
)  # fmt: skip
_NUMBERED = re.compile(r"\d{1,2}[).](?:\s|$)")
_PLACE = re.compile(
    r"(?:unit|area|section|system|train|zone|plant|building|module|package|block|battery limits?)\b[\s:#-]*",
    re.IGNORECASE,
)
_WORD = re.compile(r"[^\W\d_]{2,}")
_TAG_EDGE = re.compile(r"^[\W_]|[-_/.,&+]$")
PREFIX = 4
LOOKED_AT = 2_000


class RepeatedRows:
    """The rows of the header and those above it, to know them again where a printed page repeats them."""

    def __init__(self, head: Sequence[Sequence[str]], layout: Layout, line_column: int) -> None:
        self._width = len(layout.headers)
        self._kinds: dict[tuple[str, ...], str] = {}
        for index, row in enumerate(head[: layout.first_row - 1]):
            folded = self._folded(row)
            what = "it repeats the header." if index >= layout.header_row - 1 else "it repeats a row above the header."
            if folded:
                self._kinds.setdefault(folded, what)
        named = spared(layout.headers[line_column])
        self._kinds.setdefault((*("",) * line_column, named), "it repeats the header.")
        self.numbers = {row[line_column] for row in self._kinds if line_column < len(row)} | {named}
        self._named = named

    def _folded(self, row: Iterable[str]) -> tuple[str, ...]:
        cells = [spared(cell) for cell in islice(row, self._width)]
        while cells and not cells[-1]:
            cells.pop()
        return tuple(cells)

    def why(self, number: str, row: Sequence[str]) -> str:
        """Return why a row is a repeat, empty where it is none."""
        folded = spared(number)
        if folded == self._named:
            return "it repeats the header."
        return self._kinds.get(self._folded(row), "") if not folded or folded in self.numbers else ""


def _doubtful_start(prefix: str) -> bool:
    """Return whether a row whose line number begins like this must be looked at more closely."""
    folded = prefix.casefold()
    if not folded or not folded[0].isalnum():
        return True
    starts = any(word.startswith(folded) or folded.startswith(word[:PREFIX]) for word in _STARTS)
    return starts or _NUMBERED.match(folded) is not None


def may_be_no_line(numbers: Sequence[str], repeated: RepeatedRows) -> list[int]:
    """Return the indices of rows whose line number looks like none."""
    prefixes = {number[:PREFIX] for number in numbers}
    named = tuple(repeated.numbers)
    doubtful = {
        prefix
        for prefix in prefixes
        if _doubtful_start(prefix) or any(name.startswith(spared(prefix)) for name in named)
    }
    suspects = [index for index, number in enumerate(numbers) if number[:PREFIX] in doubtful]
    return [index for index in suspects if _doubtful(numbers[index], repeated)]


def _doubtful(number: str, repeated: RepeatedRows) -> bool:
    if _ANY.match(number) or spared(number) in repeated.numbers:
        return True
    return _DELETED.fullmatch(number) is not None or ditto(tidy(number))


def deleted_word(texts: Sequence[str]) -> list[bool]:
    """Return which texts say nothing but that their line is deleted."""
    capitals = "\n".join(texts).upper()
    if not any(stem in capitals for stem in _DELETED_STEMS):
        return [False] * len(texts)
    return [_DELETED.fullmatch(text) is not None for text in texts]


def only_spare(text: str) -> bool:
    """Return whether a text says *spare* only, which names a deleted line as well as a spare one."""
    return _SPARE.fullmatch(text) is not None


def doubts_line(texts: Sequence[str], *, status: bool) -> list[bool]:
    """Return which texts say that something is deleted, beside other words; in a column of the status, ``D`` too."""
    capitals = "\n".join(texts).upper()
    if not status and not any(stem in capitals for stem in _DOUBT_STEMS):
        return [False] * len(texts)
    return [_DOUBT.search(text) is not None or (status and _STATUS_DOUBT.fullmatch(text) is not None) for text in texts]


def no_line_number(number: str) -> str:
    """Return why a text cannot be a line number, empty where it can."""
    what = _NO_NUMBERS.get(number.upper())
    if what is None:
        return ""
    return f"the line number {shown(number)} is {what}, so the values of the row belong to no line: write its number."


def why_no_line(number: str, row: Sequence[str], line_column: int) -> str:
    """Return why a row that holds something is no line by its line number, empty where it is one."""
    others = [cell.strip() for position, cell in enumerate(row) if position != line_column]
    values = sum(not HOLDS_NOTHING.fullmatch(cell) for cell in others)
    if not number or (not values and HOLDS_NOTHING.match(number)):
        return _without_number(others, values)
    if ditto(tidy(number)):
        return f"its line number {shown(number)} repeats the one above, so it is not checked: write it on every row."
    if _TOTAL.match(number):
        return "it is a total or the foot of a page, not a line."
    if _NOTE.match(number) and not any(others):
        return "it is a note, not a line."
    return ""


def _without_number(others: Sequence[str], values: int) -> str:
    if values == 1 and any(_WORD.search(cell) for cell in others):
        return "it has no line number and one text only: a heading or a note, not a line."
    left = f": {values} value{'' if values == 1 else 's'} left unread" if values else ""
    remedy = "; if it belongs to the line above, repeat the line number there" if values else ""
    return f"it has no line number, so it is not a line and is not checked{left}{remedy}."


def heading_test(numbers: Iterable[str]) -> Callable[[str], bool]:
    """Return a test of whether a text that stands alone in its row is a heading, by the list's other line numbers."""
    others = [number for number in islice(numbers, LOOKED_AT) if number]
    digits = sum(any(map(str.isdigit, number)) for number in others)
    worded = sum(len(_WORD.findall(number)) > 1 and " " in number for number in others)

    def is_heading(text: str) -> bool:
        if not others or placeholder(text, "line_number") is not Gap.GIVEN:
            return False
        words = _WORD.findall(text)
        if not any(map(str.isdigit, text)):
            return bool(words) and digits >= 0.8 * len(others)
        place = _PLACE.match(text) is not None
        return (place or (len(words) > 1 and " " in text)) and worded <= 0.05 * len(others)

    return is_heading


def _outline(tag: str) -> str:
    """Return a tag with runs of digits and of letters each as one sign."""
    return re.sub(r"\d+", "9", re.sub(r"[^\W\d_]+", "a", tag))


def two_tags(written: str) -> bool:
    """Return whether the lines of one cell are line numbers of their own, not one number that is broken.

    A broken number leaves a mark at the break, or two parts that are not alike.
    """
    parts = [part.strip() for part in written.splitlines() if part.strip()]
    if len(parts) < 2 or any(not any(map(str.isdigit, part)) for part in parts):
        return False
    if any(_TAG_EDGE.search(part.strip("\"'")) for part in parts):
        return False
    first, *rest = (_outline(part) for part in parts)
    return len(first) > 2 and all(part == first for part in rest)


def says_deleted(what: str, text: str) -> str:
    """Return the sentence for a line that its originator calls deleted."""
    return f"the {what} says {shown(text)}, so the line is taken as deleted and is not checked."
