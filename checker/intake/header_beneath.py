"""What stands beneath group names of a header row: names of cases that are no usual ones, and bare units."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

from checker.intake.case_names import canonical_case
from checker.intake.header_rows import exact_extents, understood
from checker.intake.headers import HeaderReading
from checker.intake.texts import fold_words, shown
from checker.intake.unit_words import is_unit_text, unit_or_refusal

__all__ = ["CasesBeneath", "cases_beneath", "with_units_beneath_groups", "words_beneath"]

LONGEST_CASE = 20
_NO_CASE = frozenset(
    {"value", "values", "unit", "units", "uom", "basis", "type", "inlet", "outlet", "in", "out", "from", "to"}
)
_NUMBER = re.compile(r"[-+<>~]?\s*[\d.,]+.*")


@dataclass
class CasesBeneath:
    """Headers with the case texts beneath them, by column the header and case, and by column what is asked."""

    headers: list[str]
    cases: dict[int, tuple[str, str]] = field(default_factory=dict)
    doubts: dict[int, str] = field(default_factory=dict)


def _groups(row: Sequence[str], headers: Sequence[str]) -> list[tuple[str, list[int]]]:
    """Return each header that has two texts or more beneath it and the blanks beside it, with their columns."""
    groups: list[tuple[str, list[int]]] = []
    exact = exact_extents(headers)
    for index, header in enumerate(headers):
        text = row[index].strip() if index < len(row) else ""
        goes_on = bool(groups) and groups[-1][1][-1] == index - 1
        if goes_on and text and (header == groups[-1][0] if header else not exact):
            groups[-1][1].append(index)
        elif header and text:
            groups.append((header, [index]))
    return [group for group in groups if len(group[1]) > 1]


def _may_be_case(text: str) -> bool:
    return len(text) <= LONGEST_CASE and not _NUMBER.fullmatch(text) and not is_unit_text(text)


def _has_cases(header: str, texts: Sequence[str], hints: Mapping[str, str]) -> bool:
    """Return whether the texts beneath a number's header can only be names of cases or of something unknown."""
    alone = understood(header, hints)
    if not isinstance(alone, HeaderReading) or alone.case or not all(one.per_case for one in alone.fields):
        return False
    joined = [understood(f"{header} {text}", hints) for text in texts]
    told = all(one is None or (isinstance(one, HeaderReading) and one.case) for one in joined)
    different = len({text.casefold() for text in texts}) == len(texts)
    return told and None in joined and different and all(map(_may_be_case, texts))


def cases_beneath(row: Sequence[str], headers: Sequence[str], hints: Mapping[str, str]) -> CasesBeneath | None:
    """Return the headers with the case names beneath them, None where a row holds none.

    The same texts beneath two quantities or more are cases; texts beneath one only may mean something else: a question.
    """
    groups = [
        (header, columns)
        for header, columns in _groups(row, headers)
        if _has_cases(header, [row[index].strip() for index in columns], hints)
    ]
    if not groups:
        return None
    sets = {tuple(sorted(row[index].strip().casefold() for index in columns)) for _, columns in groups}
    words = {fold_words(row[index]) for _, columns in groups for index in columns}
    certain = len(groups) > 1 and len(sets) == 1 and _NO_CASE.isdisjoint(words)
    found = CasesBeneath(list(headers))
    for header, columns in groups:
        for index in columns:
            text = row[index].strip()
            found.headers[index] = f"{header} {text}"
            if certain:
                found.cases[index] = (header, canonical_case(text))
            else:
                found.doubts[index] = (
                    f"{shown(text)} stands beneath {shown(header)}: is it a case, or another quantity? Write the whole "
                    "name in one header, or name the column with its case in [columns] of the criteria."
                )
    return found


def words_beneath(row: Sequence[str], joined: Sequence[str], hints: Mapping[str, str]) -> bool:
    """Return whether a row holds words that are understood with the headers above them: two at least, and the half."""
    cells = [(index, text) for index, cell in enumerate(row[: len(joined)]) if (text := cell.strip())]
    if any(_NUMBER.fullmatch(text) for _, text in cells):
        return False
    told = sum(len(text) > 1 and understood(joined[index], hints) is not None for index, text in cells)
    return told > 1 and 2 * told >= len(cells)


def _quantity(unit: str) -> str:
    """Return ``pressure`` or ``temperature`` where a unit is one of these, else an empty text."""
    for dimension in ("pressure", "temperature"):
        reading = unit_or_refusal(unit, dimension)
        if not isinstance(reading, str) or "gauge or absolute" in reading:
            return dimension
    return ""


def with_units_beneath_groups(
    headers: Sequence[str], units: Sequence[str], hints: Mapping[str, str]
) -> tuple[tuple[str, ...], dict[int, str]]:
    """Return the headers with a group's pressure and temperature told by their units, and what is asked by column.

    ``Operating`` over ``barg`` and ``C`` is the operating pressure and the operating temperature.
    """
    exact = exact_extents(headers)
    named, doubts, group = list(headers), {}, ""
    for index, header in enumerate(headers):
        unit = units[index] if index < len(units) else ""
        group = header if header else (group if unit and not exact else "")
        if not group or not unit or understood(group, hints) is not None:
            continue
        quantity = _quantity(unit)
        name = f"{group} {quantity}"
        if quantity and understood(name, hints) is not None:
            named[index] = name
        elif not header:
            named[index] = f"{group} ({unit})"
            doubts[index] = (
                f"{shown(unit)} stands beneath {shown(group)} without a header of its own, so the column is not read: "
                "name the quantity in the header."
            )
    return tuple(named), doubts
