"""The kind of each line case: what its name means, and what its flow cells say of it."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np

from checker.intake.case_names import case_kind
from checker.intake.planned import FLOWS
from checker.model import BoolArray, CaseKind, CodeArray, Coded, FloatArray, Gap, IntArray

__all__ = ["case_kinds"]


def _flows(numbers: Mapping[str, FloatArray], gaps: Mapping[str, CodeArray], count: int) -> tuple[BoolArray, BoolArray]:
    """Return where a flow is zero, and where one is above zero, on HOLD or refused."""
    zero, other = np.zeros(count, dtype=np.bool_), np.zeros(count, dtype=np.bool_)
    for name in FLOWS:
        if name in numbers:
            zero |= numbers[name] == 0.0
            other |= (numbers[name] > 0.0) | np.isin(gaps[name], (Gap.HOLD, Gap.REFUSED))
    return zero, other


def _absent(
    gaps: Mapping[str, CodeArray], own: Mapping[str, BoolArray], line: IntArray, flowing: BoolArray
) -> BoolArray:
    """Return where a line says N/A for the flow of one of its cases and not of all of them."""
    said = np.zeros(line.shape, dtype=np.bool_)
    for name, mine in own.items():
        said |= mine & (gaps[name] == Gap.NOT_APPLICABLE)
    said &= ~flowing
    others = np.zeros(int(line.max(initial=-1)) + 1, dtype=np.bool_)
    others[line[~said]] = True
    return said & others[line]


def case_kinds(
    case: Coded,
    line: IntArray,
    numbers: Mapping[str, FloatArray],
    gaps: Mapping[str, CodeArray],
    own: Mapping[str, BoolArray],
) -> CodeArray:
    """Return the kind of every line case.

    A case named design, test or the like is mechanical only where it states no flow; one named no flow flows where its
    flow is above zero; a zero flow, or N/A in the column of one case, is no flow. A flow on HOLD or refused may be any.

    Parameters
    ----------
    case : Coded, shape (line cases,)
        Case names.
    line : int array, shape (line cases,)
        Line of each line case.
    numbers, gaps : mapping of str to array, shape (line cases,)
        Values and gaps of the fields of the list.
    own : mapping of str to bool array, shape (line cases,)
        Where a flow field's column names the case.
    """
    table = np.array([*(case_kind(name) for name in case.texts), CaseKind.UNKNOWN], dtype=np.int8)
    kinds: CodeArray = table[case.codes]
    zero, other = _flows(numbers, gaps, line.size)
    by_name = (kinds == CaseKind.MECHANICAL_ONLY) | (kinds == CaseKind.NO_FLOW)
    kinds[by_name & other] = CaseKind.CONTINUOUS
    known = kinds != CaseKind.UNKNOWN
    kinds[zero & ~other & known] = CaseKind.NO_FLOW
    absent = _absent(gaps, own, line, zero | other)
    kinds[absent & known & (kinds != CaseKind.MECHANICAL_ONLY)] = CaseKind.NO_FLOW
    return kinds
