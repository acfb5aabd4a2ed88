"""`compare`: the lines of a list against the lines on the drawings."""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from checker.completeness.near import near_pairs
from checker.completeness.record import (
    DELETED,
    KINDS,
    NOT_IN_LIST,
    NOT_ON_DRAWINGS,
    OTHER_DRAWING,
    OTHER_SPELLING,
    RENUMBERED,
    Completeness,
    CompletenessItem,
    DrawingLines,
)
from checker.intake.texts import shown
from checker.line_numbers.alike import why_alike
from checker.line_numbers.folding import folded_keys, looser_keys
from checker.model import LineList

__all__ = ["compare"]

_SEVERAL = re.compile(r"[;,\n]|\s(?:/|&|\+|and)\s")
MOST_NAMED = 5


@dataclass(slots=True)
class _Number:
    """One line number of either side: its first spelling and row, its looser key, and its drawings by folded key."""

    text: str
    row: int
    loose: str
    drawings: dict[str, str]

    @property
    def drawing(self) -> str:
        """The drawings in words."""
        names = list(self.drawings.values())
        more = f" and {len(names) - MOST_NAMED} more" if len(names) > MOST_NAMED else ""
        return ", ".join(names[:MOST_NAMED]) + more


def _numbers(texts: Sequence[str], rows: Sequence[int], drawings: Iterable[tuple[int, str]]) -> dict[str, _Number]:
    """Return the distinct numbers by folded key, in the order of their first rows."""
    keys = [key or text for key, text in zip(folded_keys(texts), texts, strict=True)]
    found: dict[str, _Number] = {}
    for key, text, row, loose in zip(keys, texts, rows, looser_keys(texts), strict=True):
        if key not in found:
            found[key] = _Number(text, row, loose, {})
    named = sorted({(place, text) for place, text in drawings})
    parts = [(place, part) for place, text in named for part in map(str.strip, _SEVERAL.split(text)) if part]
    for (place, part), key in zip(parts, folded_keys([part for _, part in parts]), strict=True):
        found[keys[place]].drawings.setdefault(key, part)
    return found


def _listed(line_list: LineList) -> dict[str, _Number]:
    drawing = line_list.text("drawing")
    pairs = dict.fromkeys(zip(line_list.line.tolist(), drawing.codes.tolist(), strict=True))
    named = ((line, drawing.texts[code]) for line, code in pairs if code >= 0)
    return _numbers(line_list.line_number, line_list.row.tolist(), named)


def _drawn(drawing_lines: DrawingLines) -> dict[str, _Number]:
    named = ((place, text) for place, text in enumerate(drawing_lines.drawings) if text)
    return _numbers(drawing_lines.numbers, drawing_lines.row.tolist(), named)


def _item(kind: str, mine: _Number | None, theirs: _Number | None, sentence: str) -> CompletenessItem:
    return CompletenessItem(
        kind=kind,
        line_number="" if mine is None else mine.text,
        drawing_line_number="" if theirs is None else theirs.text,
        drawing=theirs.drawing if theirs is not None else mine.drawing if mine is not None else "",
        row=0 if mine is None else mine.row,
        drawing_row=0 if theirs is None else theirs.row,
        sentence=sentence,
    )


def _on(number: _Number) -> str:
    return f" (drawing {shown(number.drawing)})" if number.drawings else ""


def _deleted(line_list: LineList, drawn: dict[str, _Number], listed: dict[str, _Number]) -> list[CompletenessItem]:
    """Return the lines that the list says are deleted and the drawings still show, and take them out of `drawn`."""
    deleted = [item for item in line_list.deleted if item.line_number]
    items = []
    for item, key in zip(deleted, folded_keys([item.line_number for item in deleted]), strict=True):
        if key in listed or key not in drawn:
            continue
        theirs = drawn.pop(key)
        mine = _Number(item.line_number, item.address.row, theirs.loose, {})
        sentence = f"{shown(item.line_number)} is deleted in the list, but the drawings still show it{_on(theirs)}."
        items.append(_item(DELETED, mine, theirs, sentence))
    return items


def _spelled(listed: dict[str, _Number], drawn: dict[str, _Number]) -> list[CompletenessItem]:
    """Return the lines that differ in look-alikes only, and take them out of both sides."""
    by_loose: dict[str, list[str]] = {}
    for key, number in listed.items():
        by_loose.setdefault(number.loose, []).append(key)
    items = []
    for key, theirs in list(drawn.items()):
        same = by_loose.get(theirs.loose) if theirs.loose else None
        if same:
            mine = listed.pop(same.pop(0))
            del drawn[key]
            why = why_alike(mine.text, theirs.text, places=("in the list", "on the drawings"))
            sentence = f"{shown(mine.text)} is {shown(theirs.text)} there: {why}."
            items.append(_item(OTHER_SPELLING, mine, theirs, sentence))
    return items


def _other_drawings(
    listed: dict[str, _Number], drawn: dict[str, _Number], both: Sequence[str]
) -> list[CompletenessItem]:
    items = []
    for key in both:
        mine, theirs = listed[key], drawn[key]
        if mine.drawings and theirs.drawings and not mine.drawings.keys() & theirs.drawings.keys():
            sentence = (
                f"{shown(mine.text)} stands on {shown(mine.drawing)} by the list, and on {shown(theirs.drawing)} by "
                "the drawings' file."
            )
            items.append(_item(OTHER_DRAWING, mine, theirs, sentence))
    return items


def _missing(listed: dict[str, _Number], drawn: dict[str, _Number]) -> list[CompletenessItem]:
    """Return the lines of one side only, and which of them look like one line under two numbers."""
    mine, theirs = list(listed.values()), list(drawn.values())
    pairs = near_pairs([number.text for number in mine], [number.text for number in theirs])
    near_mine = {pair.first: theirs[pair.second].text for pair in pairs}
    near_theirs = {pair.second: mine[pair.first].text for pair in pairs}

    def perhaps(other: str | None) -> str:
        return f" Perhaps the same as {shown(other)} there." if other else ""

    items = [
        _item(
            RENUMBERED,
            mine[pair.first],
            theirs[pair.second],
            f"{shown(mine[pair.first].text)} in the list may be {shown(theirs[pair.second].text)} on the drawings: "
            f"{pair.words}.",
        )
        for pair in pairs
    ]
    for place, number in enumerate(theirs):
        there = f"{shown(number.text)} is on the drawings{_on(number)}"
        sentence = f"{there}, but not in the list.{perhaps(near_theirs.get(place))}"
        items.append(_item(NOT_IN_LIST, None, number, sentence))
    for place, number in enumerate(mine):
        sentence = f"{shown(number.text)} is in the list, but not on the drawings.{perhaps(near_mine.get(place))}"
        items.append(_item(NOT_ON_DRAWINGS, number, None, sentence))
    return items


def compare(line_list: LineList, drawing_lines: DrawingLines) -> Completeness:
    """Hold the lines of a list against those on the drawings.

    Numbers are the same where their folded keys are (case, blanks, quotation marks and kinds of hyphen do not count);
    where only look-alike characters differ, the line counts as found and the spelling is told. One number on several
    rows, on either side, is one line.

    Parameters
    ----------
    line_list : LineList
        The list as read; its deleted lines are known too.
    drawing_lines : DrawingLines
        The lines on the drawings.
    """
    listed, drawn = _listed(line_list), _drawn(drawing_lines)
    counts = len(listed), len(drawn)
    both = [key for key in listed if key in drawn]
    items = _other_drawings(listed, drawn, both)
    mine = {key: number for key, number in listed.items() if key not in drawn}
    theirs = {key: number for key, number in drawn.items() if key not in listed}
    items += _deleted(line_list, theirs, listed)
    spelled = _spelled(mine, theirs)
    items += spelled
    items += _missing(mine, theirs)
    order = {kind: place for place, kind in enumerate(KINDS)}
    return Completeness(
        source=drawing_lines.source,
        listed=counts[0],
        drawn=counts[1],
        both=len(both) + len(spelled),
        items=tuple(sorted(items, key=lambda item: (order[item.kind], item.row, item.drawing_row))),
        notes=drawing_lines.notes,
        unread=drawing_lines.unread,
    )
