"""Yes, no and not known: the logic by which a rule decides whether it applies.

NumPy compares NaN to False; here what is not known stays not known unless another condition settles it.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["NO", "UNKNOWN", "YES", "all_of", "any_of", "given", "is_code", "not_"]

NO, YES, UNKNOWN = 0, 1, -1
TriState = NDArray[np.int8]


def is_code(codes: ArrayLike, *wanted: int) -> TriState:
    """Return whether integer codes are among the wanted ones; a negative code is not known."""
    array = np.asarray(codes)
    return np.where(array < 0, UNKNOWN, np.isin(array, wanted)).astype(np.int8)


def given(values: ArrayLike) -> TriState:
    """Return whether numbers are there at all (never 'not known')."""
    return np.isfinite(np.asarray(values, dtype=np.float64)).astype(np.int8)


def not_(state: ArrayLike) -> TriState:
    """Turn yes and no about; not known stays."""
    array = np.asarray(state, dtype=np.int8)
    return np.where(array < 0, UNKNOWN, 1 - array).astype(np.int8)


def all_of(*states: ArrayLike) -> TriState:
    """Return yes where all are yes, no where any is no, else not known."""
    arrays = np.broadcast_arrays(*(np.asarray(state, dtype=np.int8) for state in states))
    any_no = np.any([array == NO for array in arrays], axis=0)
    all_yes = np.all([array == YES for array in arrays], axis=0)
    return np.where(any_no, NO, np.where(all_yes, YES, UNKNOWN)).astype(np.int8)


def any_of(*states: ArrayLike) -> TriState:
    """Return yes where any is yes, no where all are no, else not known."""
    return not_(all_of(*(not_(state) for state in states)))
