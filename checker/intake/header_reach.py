"""How far a group of a header row reaches over the headers beneath it, where nothing but blanks shows it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from checker.intake.header_rows import exact_extents, is_mechanical, understood, whether_in_group
from checker.intake.headers import HeaderReading
from checker.intake.planned import FLOWS
from checker.intake.texts import key_of

__all__ = ["within_reach"]


def _spans(upper: Sequence[str], lower: Sequence[str]) -> list[tuple[str, list[int]]]:
    """Return each group with the columns beneath it that hold a header: its own and those beneath the blanks beside."""
    spans: list[tuple[str, list[int]]] = []
    for index, over in enumerate(upper):
        under = lower[index].strip() if index < len(lower) else ""
        if over.strip():
            spans.append((over.strip(), [index] if under else []))
        elif under and spans and spans[-1][1] and spans[-1][1][-1] == index - 1:
            spans[-1][1].append(index)
    return [span for span in spans if span[1]]


def _meaning(text: str, hints: Mapping[str, str]) -> tuple[frozenset[str], str] | None:
    reading = understood(text, hints)
    if isinstance(reading, HeaderReading):
        return frozenset(one.name for one in reading.fields), reading.case
    return None if reading is None else (frozenset({reading}), "")


def _repeated(before: Sequence[int], columns: Sequence[int], lower: Sequence[str]) -> int:
    """Return how many headers beneath a group repeat those beneath the group before it, in the same order."""
    count = 0
    for one, other in zip(before, columns, strict=False):
        if key_of(lower[one]) != key_of(lower[other]):
            break
        count += 1
    return count


def within_reach(
    upper: Sequence[str], lower: Sequence[str], joined: Sequence[str], hints: Mapping[str, str]
) -> tuple[tuple[str, ...], dict[int, str]]:
    """Return the joined headers, those beyond the reach of their group without it, and by column what is asked.

    A group reaches over as many headers as repeat those of the group before it. Beyond, and over a flow beneath a
    mechanical group, a header that would mean something else with the group than alone is a question.

    Parameters
    ----------
    upper, lower, joined : sequence of str
        The row of groups, the row beneath it, and the two read together.
    hints : mapping of str to str
        Field of each header key that the criteria explain.
    """
    names = list(joined)
    doubts: dict[int, str] = {}
    if exact_extents(upper):
        return tuple(names), doubts
    before: list[int] = []
    for group, columns in _spans(upper, lower):
        reach = _repeated(before, columns, lower) if before else 0
        for place, index in enumerate(columns[1:], start=1):
            alone, together = _meaning(lower[index], hints), _meaning(names[index], hints)
            beyond = 0 < reach <= place
            flow = together is not None and bool(together[0] & set(FLOWS)) and is_mechanical(group)
            if not (beyond or flow) or alone is None or alone == together:
                continue
            names[index] = lower[index].strip()
            if together is not None:
                doubts[index] = whether_in_group(names[index], group)
        before = columns
    return tuple(names), doubts
