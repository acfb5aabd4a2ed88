"""Which rows state one line in one case twice, and which line numbers look alike without being written alike."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import combinations_with_replacement

import numpy as np
from numpy.typing import NDArray

from checker.line_numbers.folding import folded_keys, looser_keys
from checker.line_numbers.tokens import coded

__all__ = ["alike_in", "doubled_rows", "look_alikes"]

IntArray = NDArray[np.int32]
BoolArray = NDArray[np.bool_]


def _keys(rows: IntArray, fields: Sequence[int]) -> NDArray[np.int64]:
    """Return one code per distinct row of the chosen columns of a table of codes."""
    key = np.zeros(len(rows), dtype=np.int64)
    for field in fields:
        values = rows[:, field].astype(np.int64)
        _, key = np.unique(key * (int(values.max(initial=-1)) + 2) + values + 1, return_inverse=True)
    return key


def doubled_rows(group: IntArray, told_by: IntArray) -> BoolArray:
    """Return which rows another row of their group repeats.

    Parameters
    ----------
    group : int array, shape (rows,)
        What must be the same: line and case.
    told_by : int array, shape (rows, fields)
        What tells segments of one line apart (from, to, size), as codes; -1 where the row does not state it.

    Returns
    -------
    bool array, shape (rows,)
        True where another row of the group differs from it in no field that both state: a blank tells nothing apart.
    """
    doubled = np.zeros(group.size, dtype=np.bool_)
    counts = np.bincount(group) if group.size else np.zeros(0, dtype=np.int64)
    mine = np.flatnonzero(counts[group] > 1) if group.size else np.zeros(0, dtype=np.int64)
    rows = np.column_stack((group[mine], told_by[mine])).astype(np.int32)
    stated = rows >= 0
    fields = rows.shape[1]
    masks = stated @ (1 << np.arange(fields))
    for one, other in combinations_with_replacement(np.unique(masks).tolist(), 2):
        both = [field for field in range(fields) if (one & other) >> field & 1]
        chosen = np.flatnonzero((masks == one) | (masks == other))
        key = _keys(rows[chosen], both)
        first = masks[chosen] == one
        in_one, in_other = (np.bincount(key[each], minlength=int(key.max(initial=0)) + 1) for each in (first, ~first))
        if one == other:
            doubled[mine[chosen[in_one[key] > 1]]] = True
        else:
            doubled[mine[chosen[(in_one[key] > 0) & (in_other[key] > 0)]]] = True
    return doubled


def alike_in(texts: Sequence[str], keys: Sequence[str]) -> IntArray:
    """Return for each text the place of another spelling of the same key, the first by alphabet; -1 where none is."""
    spellings: dict[str, dict[str, int]] = {}
    for place, (text, key) in enumerate(zip(texts, keys, strict=True)):
        spellings.setdefault(key, {}).setdefault(text, place)
    several = {key: found for key, found in spellings.items() if len(found) > 1 and key}
    alike = np.full(len(texts), -1, dtype=np.int32)
    if several:
        for place, (text, key) in enumerate(zip(texts, keys, strict=True)):
            if key in several:
                others = sorted(other for other in several[key] if other != text)[:1]
                alike[place] = several[key][others[0]]
    return alike


def look_alikes(texts: Sequence[str]) -> IntArray:
    """Return for each line number another one that looks like it but is written otherwise, -1 where there is none.

    Two look alike where they have the same folded key, or the same looser one.
    """
    if not texts:
        return np.zeros(0, dtype=np.int32)
    distinct = coded(list(texts))
    loose = looser_keys(distinct.texts)
    strict = folded_keys(distinct.texts)
    if len(set(loose)) == len(set(strict)) == len(distinct.texts):
        return np.full(len(texts), -1, dtype=np.int32)
    found = alike_in(distinct.texts, strict)
    found = np.where(found < 0, alike_in(distinct.texts, loose), found)
    first = np.full(len(distinct.texts), -1, dtype=np.int32)
    stated = np.flatnonzero(distinct.codes >= 0)[::-1].astype(np.int32)
    first[distinct.codes[stated]] = stated
    per_text = np.where(found < 0, -1, first[found])
    return np.where(distinct.codes < 0, -1, per_text[distinct.codes]).astype(np.int32)
