"""A row of group names above the header row: joined where it is understood, asked about where it is not."""

from __future__ import annotations

import re
from collections.abc import Collection, Mapping, Sequence
from dataclasses import dataclass, field

from checker.intake.header_rows import (
    MECHANICAL,
    exact_extents,
    is_mechanical,
    is_neutral,
    joined_name,
    understood,
    whether_in_group,
)
from checker.intake.headers import HeaderReading
from checker.intake.planned import FLOWS
from checker.intake.texts import fold_words, key_of, shown

__all__ = ["GroupedHeaders", "names_group", "with_groups"]

MOST_WORDS = 5
_TELLING = re.compile(
    r"\b(?:design|des|mechanical|mech|test|hydrotest|jacket\w*|trac(?:ing|ed|er)|insulat\w*|vacuum|normal|max\w*|min\w*|"
    r"case|oper\w*|upset|relief|stand ?by|alternat\w*)\b"
)
_TITLE = re.compile(
    r"\b(?:project|client|customer|owner|contract\w*|job|doc|document|drawing|rev|revision|date|sheet|page|title|plant|"
    r"location|prepared|checked|approved|issued?|line ?list|list|schedule of|company|vendor|site|facility|terminal)\b"
)
_WIDE = re.compile(r"oper(?:ating|ation)?|op|flowing|normal operating")


@dataclass
class GroupedHeaders:
    """Headers joined with the groups above them, and by column why one must not be read plainly."""

    headers: list[str]
    doubts: dict[int, str] = field(default_factory=dict)


def _is_title(text: str) -> bool:
    """Return whether a text above the headers is a title's: by its words, a colon, a number, or its length."""
    words = fold_words(text)
    if _TELLING.search(words) and ":" not in text:
        return False
    return (
        ":" in text
        or len(words.split()) > MOST_WORDS
        or _TITLE.search(words) is not None
        or bool(re.search(r"\d", text))
    )


def names_group(text: str) -> bool:
    """Return whether a text that stands alone above the headers names a group of columns, not a title of the list."""
    return _TELLING.search(fold_words(text)) is not None and not _TITLE.search(fold_words(text)) and ":" not in text


def _without_titles(above: Sequence[str], headers: Sequence[str], lines: Collection[int]) -> list[str]:
    """Return the row above with the texts of a title block blank, and the values beside their names with them."""
    cells = [cell.strip() for cell in above] + [""] * (len(headers) - len(above))
    told = [index for index, cell in enumerate(cells) if cell]
    before = [index for index in told if index <= max(lines, default=-1)]
    value_next = False
    for index in told:
        telling = _TELLING.search(fold_words(cells[index])) is not None
        title = _is_title(cells[index]) or (value_next and not telling)
        value_next = title and not value_next
        if title:
            cells[index] = ""
    if (
        len(told) == 2
        and before == told[:1]
        and told[1] == told[0] + 1
        and not _TELLING.search(fold_words(cells[told[1]]))
    ):
        cells[told[0]] = cells[told[1]] = ""  # a name and its value, such as Project | X
    return cells


def _fields(reading: HeaderReading | str | None) -> tuple[str, ...]:
    return tuple(one.name for one in reading.fields) if isinstance(reading, HeaderReading) else ()


def _is_text(reading: HeaderReading | str | None) -> bool:
    return isinstance(reading, HeaderReading) and all(one.kind == "text" for one in reading.fields)


def _own(group: str, under: str, hints: Mapping[str, str]) -> tuple[str, str]:
    """Return the header beneath a group of its own, and why it is not read, empty where it is."""
    name = joined_name(group, under, True, hints)
    if name == under or understood(name, hints) is not None or understood(under, hints) is None:
        return name, ""
    if _WIDE.fullmatch(fold_words(group)):
        return under, ""
    return name, (
        f"{shown(group)} stands above {shown(under)}, and no field is known for the two together, so the column is not "
        "read: name it in [columns] of the criteria if it is one."
    )


def _spread(group: str, under: str, hints: Mapping[str, str], *, exact: bool, ends: bool) -> tuple[str, str]:
    """Return the header to the right of a group's own, and the question whether it belongs to the group.

    `exact` says that the row shows how far its groups reach, `ends` that the group before had no such header.
    """
    name = joined_name(group, under, False, hints)
    alone, joined = understood(under, hints), understood(name, hints)
    if name == under or alone is None or (_is_text(alone) and (exact or joined is None)):
        return (under if joined is None or exact else name), ""
    mechanical = is_mechanical(group)
    flow = bool(set(_fields(joined)) & set(FLOWS)) and mechanical
    if joined is not None and not flow and not exact:
        return name, ""
    if joined is None and (exact or ends or _WIDE.fullmatch(fold_words(group))):
        return under, ""
    return under, whether_in_group(under, group)


def _means(name: str, hints: Mapping[str, str]) -> tuple[tuple[str, ...], str] | None:
    reading = understood(name, hints)
    return (_fields(reading), reading.case) if isinstance(reading, HeaderReading) and not _is_text(reading) else None


def with_groups(
    above: Sequence[str], headers: Sequence[str], lines: Collection[int], hints: Mapping[str, str]
) -> GroupedHeaders:
    """Return the headers with the groups above them.

    Parameters
    ----------
    above, headers : sequence of str
        The row above the headers, and the headers.
    lines : collection of int
        Columns whose header names the line number: a text above them is a title, except where it names a duty.
    hints : mapping of str to str
        Field of each header key that the criteria explain.
    """
    exact = exact_extents(above)
    cells = _without_titles(above, headers, lines)
    found = GroupedHeaders([])
    group, single = "", False
    before: list[str] = []
    inside: list[str] = []
    meant: list[tuple[tuple[str, ...], str] | None] = []
    for index, under in enumerate(headers):
        over = cells[index] if index < len(cells) else ""
        if index in lines:
            group, single = (over, True) if MECHANICAL.fullmatch(fold_words(over)) else ("", False)
            found.headers.append(under)
            continue
        if not under:
            group = ""
            found.headers.append(over if over and understood(over, hints) is not None else "")
            continue
        if over:
            if over != group:
                before, inside, meant = (inside if group else []), [], []
            single = over != group
            group = over
            name, doubt = _own(over, under, hints)
        elif group and not is_neutral(group) and (single or not exact):
            ends = bool(before) and inside[: len(before)] == before
            name, doubt = _spread(group, under, hints, exact=exact, ends=ends)
            if name != under and _means(name, hints) in meant:  # a group has no second pressure: is this one beyond it?
                name, doubt = under, whether_in_group(under, group)
        else:
            name, doubt = under, ""
        inside.append(key_of(under))
        meant += [means] if (means := _means(name, hints)) is not None else []
        found.headers.append(name)
        if doubt:
            found.doubts[index] = doubt
    return found
