"""What the list itself says beyond its values: whose columns name cases, which cells of a row are on HOLD."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.contradictions import NORMAL, case_is
from checker.intake.hold_marks import marks_hold
from checker.intake.placeholders import holds
from checker.model import RANGE_WORDS, CaseKind, Coded, Gap, LineList

__all__ = ["STATE_FIELDS", "case_columns", "case_group", "first_of_row", "hold_fields", "state_told"]

_REMARKS = "remarks"
_MARK = "hold"
MOST_NAMED = 62
STATE_FIELDS = (
    "pressure", "temperature", "density", "viscosity", "vapour_fraction", "molar_mass", "compressibility",
    "liquid_density", "liquid_viscosity", "vapour_density", "vapour_viscosity",
)  # fmt: skip


def case_columns(line_list: LineList) -> frozenset[tuple[str, str]]:
    """Return every field and case for which the list has a column that names the case."""
    return frozenset((column.field, column.case) for column in line_list.columns if column.case)


def case_group(line_list: LineList, line_group: NDArray[np.int32]) -> NDArray[np.int32]:
    """Return within what cases of one line stand: its rows where the list has a case column, else its one row."""
    return line_group if line_list.has("case") else line_list.line


def _told(line_list: LineList, group: NDArray[np.int64]) -> NDArray[np.intp]:
    """Return for each line case that of its group at which what holds for the whole of it is told: its normal case."""
    order = np.argsort(~case_is(line_list.case, NORMAL), kind="stable")
    groups, first = np.unique(group[order], return_index=True)
    at = np.zeros(int(group.max(initial=-1)) + 1, dtype=np.intp)
    at[groups] = order[first]
    return at[group]


def first_of_row(line_list: LineList) -> NDArray[np.int8]:
    """Return 1 at one line case of each row of the list (its normal case, else its first), 0 at the others."""
    told = _told(line_list, line_list.line.astype(np.int64))
    return np.equal(told, np.arange(line_list.line_cases)).astype(np.int8)


def _ends(line_list: LineList) -> tuple[NDArray[np.int64], int]:
    """Return which ends of the row's ranges each line case takes, as codes, and how many there are."""
    texts = [text.partition(RANGE_WORDS)[2] for text in line_list.case.texts]
    ends = tuple(dict.fromkeys([*texts, ""]))
    table = np.array([*(ends.index(text) for text in texts), ends.index("")], dtype=np.int64)
    return table[line_list.case.codes], len(ends)


def state_told(line_list: LineList) -> NDArray[np.int8]:
    """Return 0 where a line case only repeats the state of its row's normal case, value by value, else 1.

    What a rule says of pressure, temperature and properties is then said once for both; of a range once an end. Cases
    that last and those that do not are told apart, for codes allow an occasional case what they deny a lasting one.
    """
    ends, count = _ends(line_list)
    at = _told(line_list, line_list.line.astype(np.int64) * count + ends)
    lasting = np.where(line_list.case_kind == CaseKind.NO_FLOW, CaseKind.CONTINUOUS, line_list.case_kind)
    repeats: NDArray[np.bool_] = np.equal(lasting, lasting[at])
    for name in STATE_FIELDS:
        if name in line_list.numbers:
            values, gaps = line_list.number(name), line_list.gap(name)
            same = (values == values[at]) | (np.isnan(values) & np.isnan(values[at]))
            repeats &= same & (gaps == gaps[at])
    told: NDArray[np.bool_] = ~repeats | np.equal(at, np.arange(line_list.line_cases))
    return told.astype(np.int8)


def _held(line_list: LineList, name: str) -> NDArray[np.bool_]:
    """Return which rows have a field on HOLD, in any case."""
    held = np.zeros(len(line_list.line_number), dtype=np.bool_)
    held[line_list.line[line_list.gap(name) == Gap.HOLD]] = True
    if name == _REMARKS:
        text = line_list.text(name)
        held[line_list.line[text.where([holds(each) for each in text.texts])]] = True
    if name == _MARK:
        text = line_list.text(name)
        held[line_list.line[text.where([marks_hold(each) for each in text.texts])]] = True
    return held


def hold_fields(line_list: LineList) -> Coded:
    """Return the names of a row's fields on HOLD (or to be confirmed, or the vendor's to say), missing where none is.

    Remarks count where they speak of a HOLD, a column of open items where it holds any mark but a no. Beyond 62 fields
    the further ones are not named.
    """
    keys = np.zeros(len(line_list.line_number), dtype=np.int64)
    names: list[str] = []
    for name in line_list.gaps:
        held = _held(line_list, name)
        if len(names) < MOST_NAMED and held.any():
            keys[held] += 1 << len(names)
            names.append(name)
    codes = np.full(keys.shape, -1, dtype=np.int32)
    distinct, codes[keys > 0] = np.unique(keys[keys > 0], return_inverse=True)
    texts = [", ".join(name for bit, name in enumerate(names) if key >> bit & 1) for key in distinct.tolist()]
    return Coded(codes[line_list.line], tuple(texts))
