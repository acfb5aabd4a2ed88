"""Two values in one cell: each end becomes a line case of its own, so that every rule meets its own worst.

`expand` takes the list as assembled, in which a ranged field holds the lower end, and the upper ends beside it. The
design fields do not multiply: their higher value is the design value, and the lower one goes to the field of the
lowest design value. Ranges of several flows of one row (mass, volume, standard) are one range said in several ways:
their low ends go together, and their high ends.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from checker.intake.planned import FLOWS
from checker.intake.texts import place, shown
from checker.model import (
    RANGE_WORDS,
    Address,
    Coded,
    Column,
    FloatArray,
    Gap,
    IntArray,
    LineList,
    RangeItem,
    UnreadItem,
)

__all__ = ["LOWEST_DESIGN", "MOST_RANGES", "expand"]

#: Most ranged fields in one line case, all flows counted as one: 8 combinations.
MOST_RANGES = 3
#: Field that takes the lower of two design values.
LOWEST_DESIGN = {"pressure_design": "pressure_design_minimum", "temperature_design": "temperature_design_minimum"}
#: Ranged fields of one line case, those that vary together in one group.
Groups = tuple[tuple[str, ...], ...]
_TOO_MANY = f"states two values, as more than {MOST_RANGES} cells of its row do: give one value per case."


def expand(
    line_list: LineList,
    highs: Mapping[tuple[str, int], float],
    lowest: Mapping[tuple[str, int], float] | None = None,
) -> LineList:
    """Give every combination of the ends of ranges a line case of its own.

    Parameters
    ----------
    line_list : LineList
        The list as assembled; a ranged field holds its lower end (`CellReading.value`).
    highs : mapping of (str, int) to float
        Upper end in SI (`CellReading.high`) by field and line case.
    lowest : mapping of (str, int) to float, optional
        Lower design value in SI (`CellReading.lowest`) by design field and line case.

    Returns
    -------
    LineList
        With 2, 4 or 8 line cases in place of each that has ranges (case ``normal, with low pressure and high
        temperature``), `LineList.ranges` filled, and the cells of a line case with more than three ranges refused.
        The kind of each case, its gaps and its refusals are those of the case from which it was made.
    """
    listed = _with_lowest(line_list, lowest) if lowest else line_list
    if not highs:
        return listed
    names_of: dict[int, list[str]] = {}
    for name, index in highs:
        names_of.setdefault(index, []).append(name)
    ranged = {index: _groups(names) for index, names in sorted(names_of.items())}
    crowded = {index: names_of[index] for index, groups in ranged.items() if len(groups) > MOST_RANGES}
    if crowded:
        listed = _refuse_crowded(listed, crowded)
    kept = {index: groups for index, groups in ranged.items() if index not in crowded}
    return _expanded(listed, kept, highs) if kept else listed


def _groups(names: Sequence[str]) -> Groups:
    """Return the ranged fields of a line case by what they vary together: all flows as one."""
    flows = tuple(name for name in names if name in FLOWS)
    groups = (flows if name in FLOWS else (name,) for name in names)
    return tuple(dict.fromkeys(groups))


def _with_lowest(line_list: LineList, lowest: Mapping[tuple[str, int], float]) -> LineList:
    """Write the lower design values where the list states no lowest design value of its own."""
    numbers, gaps, columns = dict(line_list.numbers), dict(line_list.gaps), list(line_list.columns)
    for source in dict.fromkeys(name for name, _ in lowest):
        target = LOWEST_DESIGN[source]
        mine = {index: value for (name, index), value in lowest.items() if name == source}
        indices, values = np.array(list(mine), dtype=np.int32), np.array(list(mine.values()))
        if not line_list.has(target):
            columns.extend(_seen_as(column, target) for column in line_list.columns if column.field == source)
        own, gap = line_list.number(target).copy(), line_list.gap(target).copy()
        free = (gap[indices] == Gap.BLANK) | (gap[indices] == Gap.NO_COLUMN)
        own[indices[free]], gap[indices[free]] = values[free], Gap.GIVEN
        numbers[target], gaps[target] = own, gap
    return replace(line_list, numbers=numbers, gaps=gaps, columns=tuple(columns))


def _seen_as(column: Column, field: str) -> Column:
    """Return a column as the one from which another field was read too, so that its values have an address."""
    return replace(column, field=field)


def _cell(line_list: LineList, name: str, index: int) -> tuple[str, str, Address]:
    """Return the line number, the text and the address of a cell."""
    address = line_list.address(name, index) or Address(line_list.source.name, 0, name)
    return line_list.line_number[int(line_list.line[index])], line_list.cell(name, index), address


def _refuse_crowded(line_list: LineList, crowded: Mapping[int, Sequence[str]]) -> LineList:
    """Refuse the two-valued cells of line cases that have too many of them."""
    numbers, gaps = dict(line_list.numbers), dict(line_list.gaps)
    for name in {name for names in crowded.values() for name in names}:
        numbers[name], gaps[name] = numbers[name].copy(), gaps[name].copy()
    refusals, unread = dict(line_list.refusals), dict.fromkeys(line_list.unread)
    for index, names in crowded.items():
        for name in names:
            line_number, text, address = _cell(line_list, name, index)
            reason = f"{shown(text)} {_TOO_MANY}"
            numbers[name][index], gaps[name][index] = np.nan, Gap.REFUSED
            refusals[name, index] = f"{place(address.file, address.row, address.column)}: {reason}"
            unread[UnreadItem(line_number, text, reason, address)] = None
    ordered = tuple(sorted(unread, key=lambda item: item.address.row))
    return replace(line_list, numbers=numbers, gaps=gaps, refusals=refusals, unread=ordered)


@dataclass(frozen=True)
class _Places:
    """Where the line cases go: `take` is the old index of each new one, `first` the new index of each old one."""

    take: IntArray
    first: IntArray


def _places(count: int, ranged: Mapping[int, Groups]) -> _Places:
    copies = np.ones(count, dtype=np.int32)
    for index, groups in ranged.items():
        copies[index] = 2 ** len(groups)
    first = np.zeros(count, dtype=np.int32)
    np.cumsum(copies[:-1], out=first[1:])
    return _Places(np.repeat(np.arange(count, dtype=np.int32), copies), first)


def _words(groups: Groups, ends: int) -> str:
    """Return the ends that one combination takes: ``low pressure and high temperature``."""
    names = ["flow" if len(group) > 1 else group[0].replace("_", " ") for group in groups]
    parts = [f"{'high' if ends >> bit & 1 else 'low'} {name}" for bit, name in enumerate(names)]
    return f"{', '.join(parts[:-1])} and {parts[-1]}" if len(parts) > 1 else parts[0]


def _cases(line_list: LineList, ranged: Mapping[int, Groups], places: _Places) -> Coded:
    codes = line_list.case.codes[places.take].copy()
    texts = {text: code for code, text in enumerate(line_list.case.texts)}
    for index, groups in ranged.items():
        for ends in range(2 ** len(groups)):
            text = f"{line_list.case.text(index)}{RANGE_WORDS}{_words(groups, ends)}"
            codes[places.first[index] + ends] = texts.setdefault(text, len(texts))
    return Coded(codes, tuple(texts))


def _numbers(
    line_list: LineList, ranged: Mapping[int, Groups], highs: Mapping[tuple[str, int], float], places: _Places
) -> dict[str, FloatArray]:
    numbers = {name: values[places.take] for name, values in line_list.numbers.items()}
    for index, groups in ranged.items():
        for bit, group in enumerate(groups):
            mine = [places.first[index] + ends for ends in range(2 ** len(groups)) if ends >> bit & 1]
            for name in group:
                numbers[name][mine] = highs[name, index]
    return numbers


def _items(
    line_list: LineList, ranged: Mapping[int, Groups], highs: Mapping[tuple[str, int], float]
) -> tuple[RangeItem, ...]:
    """Return one item a cell, also where several cases of a line share it."""
    items: dict[tuple[Address, str], RangeItem] = {}
    for index, groups in ranged.items():
        for name in (name for group in groups for name in group):
            line_number, text, address = _cell(line_list, name, index)
            low, high = float(line_list.numbers[name][index]), highs[name, index]
            items.setdefault((address, name), RangeItem(line_number, name, text, low, high, address))
    return tuple(sorted(items.values(), key=lambda item: item.address.row))


def _expanded(line_list: LineList, ranged: Mapping[int, Groups], highs: Mapping[tuple[str, int], float]) -> LineList:
    places = _places(line_list.line_cases, ranged)
    refusals = {
        (name, int(places.first[index]) + ends): sentence
        for (name, index), sentence in line_list.refusals.items()
        for ends in range(2 ** len(ranged.get(index, ())))
    }
    return replace(
        line_list,
        line=line_list.line[places.take],
        case=_cases(line_list, ranged, places),
        case_kind=line_list.case_kind[places.take],
        composite=line_list.composite[places.take],
        numbers=_numbers(line_list, ranged, highs, places),
        texts={name: coded.take(places.take) for name, coded in line_list.texts.items()},
        gaps={name: gap[places.take] for name, gap in line_list.gaps.items()},
        refusals=refusals,
        ranges=(*line_list.ranges, *_items(line_list, ranged, highs)),
    )
