"""What providers of data rules share: three-valued contradictions, what to say of them, order among cases."""

from __future__ import annotations

from typing import Any, NamedTuple

import numpy as np
from numpy.typing import NDArray

from checker.model import Coded, Gap, base_case

__all__ = [
    "EQUAL_WITHIN",
    "MAXIMUM",
    "MINIMUM",
    "NORMAL",
    "Order",
    "above",
    "asked",
    "below",
    "case_is",
    "contradiction",
    "order_of_cases",
    "said",
]

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
EQUAL_WITHIN = 1e-9
MINIMUM, NORMAL, MAXIMUM = "minimum", "normal", "maximum"


def contradiction(found: BoolArray, unknown: BoolArray) -> FloatArray:
    """Return 1 where a contradiction is found, NaN where it cannot be told, 0 where there is none."""
    return np.where(found, 1.0, np.where(unknown, np.nan, 0.0))


def said(otherwise: str, *choices: tuple[BoolArray, str]) -> Coded:
    """Return the text of the first condition that holds, line case by line case."""
    codes = np.select([mask for mask, _ in choices], [np.int32(index) for index in range(len(choices))], len(choices))
    return Coded(codes.astype(np.int32), (*(text for _, text in choices), otherwise))


def asked(*gaps: CodeArray) -> BoolArray:
    """Return True where the list has every one of these columns.

    A cell that says not applicable is a gap like a blank one: it takes no value out of a comparison.
    """
    held = np.ones(gaps[0].shape, dtype=np.bool_)
    for gap in gaps:
        held &= gap != Gap.NO_COLUMN
    return held


def below(first: FloatArray, second: Any) -> BoolArray:
    """Return True where the first is below the second by more than rounding; never where either is missing."""
    with np.errstate(invalid="ignore"):
        return np.asarray(first < second - EQUAL_WITHIN * np.abs(second), dtype=np.bool_)


def above(first: FloatArray, second: Any) -> BoolArray:
    """Return True where the first is above the second by more than rounding; never where either is missing."""
    with np.errstate(invalid="ignore"):
        return np.asarray(first > second + EQUAL_WITHIN * np.abs(second), dtype=np.bool_)


def case_is(case: Coded, name: str) -> BoolArray:
    """Return True where a line case is of that case, whatever end of a range it takes."""
    return case.where([base_case(text) == name for text in case.texts])


class Order(NamedTuple):
    """Minimum, normal and maximum of one quantity held against each other within a line.

    `compared` is True where a line case has something to be held against, `found` where the order is broken,
    `unknown` where a value it needs is missing; `reference` is the value it is held against, NaN where there is none.
    """

    compared: BoolArray
    found: BoolArray
    unknown: BoolArray
    reference: FloatArray


def _extreme(values: FloatArray, chosen: BoolArray, group: NDArray[np.int32], *, highest: bool) -> FloatArray:
    """Return a line's highest or lowest value in the chosen cases: NaN where one is missing, infinite where none is."""
    reached = np.full(int(group.max(initial=-1)) + 1, -np.inf if highest else np.inf)
    with np.errstate(invalid="ignore"):
        (np.maximum if highest else np.minimum).at(reached, group[chosen], values[chosen])
    return reached[group]


def order_of_cases(values: FloatArray, case: Coded, group: NDArray[np.int32]) -> Order:
    """Hold the maximum case against normal and minimum, and the minimum against normal and maximum.

    Parameters
    ----------
    values : float array, shape (line cases,)
        One quantity, none below zero (absolute pressure, absolute temperature, flow).
    case : Coded, shape (line cases,)
        Case of each line case; both ends of a range count as that case.
    group : int array, shape (line cases,)
        The line (all its rows, or one) within which cases are held against each other.
    """
    normal, least, most = (case_is(case, name) for name in (NORMAL, MINIMUM, MAXIMUM))
    floor_normal = _extreme(values, normal, group, highest=True)
    floor_least = _extreme(values, least, group, highest=True)
    ceiling_normal = _extreme(values, normal, group, highest=False)
    ceiling_most = _extreme(values, most, group, highest=False)
    at_most = most & ~(np.isneginf(floor_normal) & np.isneginf(floor_least))
    at_least = least & ~(np.isposinf(ceiling_normal) & np.isposinf(ceiling_most))
    floor, ceiling = np.maximum(floor_normal, floor_least), np.minimum(ceiling_normal, ceiling_most)
    found = at_most & (below(values, floor_normal) | below(values, floor_least))
    found |= at_least & (above(values, ceiling_normal) | above(values, ceiling_most))
    reference = np.where(at_most, floor, np.where(at_least, ceiling, np.nan))
    compared = at_most | at_least
    return Order(compared, found, compared & (np.isnan(values) | np.isnan(reference)), reference)
