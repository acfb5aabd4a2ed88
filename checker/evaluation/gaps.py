"""What a gap means to a provider: may another value stand in, and does the list ask for one at all."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Gap
from checker.ruling.tristate import NO, UNKNOWN, YES, TriState

__all__ = ["asked_for", "given_state", "is_open"]

CodeArray = NDArray[np.int8]
BoolArray = NDArray[np.bool_]


def is_open(*gaps: CodeArray) -> BoolArray:
    """Return True where a cell is on HOLD or could not be read: then no other value may stand in."""
    held = np.zeros(gaps[0].shape, dtype=np.bool_)
    for gap in gaps:
        held |= np.isin(gap, (Gap.HOLD, Gap.REFUSED))
    return held


def asked_for(gap: CodeArray) -> BoolArray:
    """Return True where the list has the column: a value from elsewhere is then an assumption."""
    return np.not_equal(gap, Gap.NO_COLUMN)


def given_state(gap: CodeArray) -> TriState:
    """Return 1 where given, 0 where the list asks for nothing (no column, or N/A written), -1 where it is missing."""
    table = np.full(len(Gap), UNKNOWN, dtype=np.int8)
    table[Gap.GIVEN] = YES
    table[[Gap.NOT_APPLICABLE, Gap.NO_COLUMN]] = NO
    return table[gap]
