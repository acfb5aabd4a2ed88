"""Which token the numbers of a list use for each service of its column, and the numbers that use another."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from checker.line_numbers.folding import folded_keys
from checker.model import Coded

__all__ = ["ServiceTokens", "service_tokens"]

IntArray = NDArray[np.int32]
BoolArray = NDArray[np.bool_]
LEAST_LINES = 3
CLEAR_MAJORITY = 0.75
MOST_SLIPS = 0.10


class ServiceTokens(NamedTuple):
    """Over the lines: is there a usual token for the line's service, has the line another, and which is the usual."""

    told: BoolArray
    slip: BoolArray
    usual: Coded


def _codes(column: Coded) -> IntArray:
    """Return codes in which texts of one folded key are equal, -1 where missing."""
    places: dict[str, int] = {}
    table = [places.setdefault(key, len(places)) for key in folded_keys(column.texts)]
    return np.array([*table, -1], dtype=np.int32)[column.codes]


def service_tokens(token: Coded, service: Coded) -> ServiceTokens:
    """Hold the service token of each line's number against the token that other lines of its service have.

    A service has a usual token where at least 3 lines, and three quarters of those that state it, have that one. A
    token on one line of the service, or on at most a tenth of them, is then a slip; on more it may be a second code.

    Parameters
    ----------
    token, service : Coded, shape (lines,)
        The token of each number, and the text of the service column; compared by their folded keys.
    """
    mine, theirs = _codes(token), _codes(service)
    known = np.flatnonzero((mine >= 0) & (theirs >= 0))
    told, slip = (np.zeros(mine.shape, dtype=np.bool_) for _ in range(2))
    usual = np.full(mine.shape, -1, dtype=np.int32)
    if not known.size:
        return ServiceTokens(told, slip, Coded(usual, token.texts))
    width = np.int64(mine.max()) + 1
    pairs, first, pair, lines = np.unique(
        theirs[known] * width + mine[known], return_index=True, return_inverse=True, return_counts=True
    )
    of_service = pairs // width
    stated = np.bincount(of_service, weights=lines)
    order = np.argsort(lines, kind="stable")
    commonest = np.zeros(stated.size, dtype=np.intp)
    commonest[of_service[order]] = order
    most = lines[commonest]
    clear = (most >= LEAST_LINES) & (most >= CLEAR_MAJORITY * stated)
    services = theirs[known]
    mine_here = lines[pair.ravel()]
    told[known] = clear[services]
    few = (mine_here == 1) | (mine_here <= MOST_SLIPS * stated[services])
    slip[known] = clear[services] & few & (pair.ravel() != commonest[services])
    usual[known] = token.codes[known[first[commonest[services]]]]
    return ServiceTokens(told, slip, Coded(np.where(told, usual, -1).astype(np.int32), token.texts))
