"""Outside diameter and wall thickness of steel pipe by nominal size and schedule, ASME B36.10M and B36.19M."""

from __future__ import annotations

import re
from collections.abc import Sequence
from functools import cache
from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from checker.tables.reading import read_table

__all__ = ["PipeDimensions", "look_up", "normalised_schedule", "schedules"]

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]

_WORDS = {
    "STD": "STD", "STANDARD": "STD", "STDWT": "STD", "STDWEIGHT": "STD", "STANDARDWEIGHT": "STD", "SW": "STD",
    "XS": "XS", "XH": "XS", "EXTRASTRONG": "XS", "EXTRAHEAVY": "XS", "EH": "XS", "XSTRONG": "XS",
    "XXS": "XXS", "XXH": "XXS", "DOUBLEEXTRASTRONG": "XXS", "DOUBLEEXTRAHEAVY": "XXS", "XXSTRONG": "XXS",
}  # fmt: skip
_PREFIX = re.compile(r"^(?:SCHEDULES?|SCHED|SCH|S)(?=\d|STD|X|$)")


class PipeDimensions(NamedTuple):
    """Outside diameter and wall, m (NaN where there is none), and whether the size has that schedule."""

    outside_diameter: FloatArray
    wall_thickness: FloatArray
    exists: BoolArray


class _Table(NamedTuple):
    """Sizes in inches, schedules, and dense tables [size, schedule] in m; the last row and column are "not known"."""

    sizes: FloatArray
    schedules: tuple[str, ...]
    outside: FloatArray
    wall: FloatArray
    outside_of_size: FloatArray


@cache
def _table() -> _Table:
    rows = read_table("pipe_dimensions")
    sizes = sorted({float(row["nps"]) for row in rows})
    names = tuple(dict.fromkeys(row["schedule"] for row in rows))
    outside = np.full((len(sizes) + 1, len(names) + 1), np.nan)
    wall = np.full_like(outside, np.nan)
    of_size = np.full(len(sizes) + 1, np.nan)
    for row in rows:
        place = sizes.index(float(row["nps"])), names.index(row["schedule"])
        outside[place] = float(row["outside_diameter_mm"]) / 1000.0
        wall[place] = float(row["wall_thickness_mm"]) / 1000.0
        if row["schedule"] == "STD":
            of_size[place[0]] = outside[place]
    return _Table(np.array(sizes), names, outside, wall, of_size)


def schedules() -> tuple[str, ...]:
    """Return every schedule of the tables, in their own spelling: ``40``, ``40S``, ``STD``, ``XXS`` ..."""
    return _table().schedules


def normalised_schedule(text: str) -> str:
    """Bring a schedule to the spelling of the tables.

    Parameters
    ----------
    text : str
        As the list writes it: ``Sch 40``, ``SCH.40``, ``40``, ``S40``, ``STD``, ``std wt``, ``XS``, ``40S`` ...

    Returns
    -------
    str
        The spelling of the tables, empty where the text is none of them.

    Notes
    -----
    ``S40`` is schedule 40 and ``40S`` that of stainless pipe; they differ in wall from NPS 12 on.

    Examples
    --------
    >>> normalised_schedule("Sch. 40"), normalised_schedule("std wt"), normalised_schedule("S-10S")
    ('40', 'STD', '10S')
    """
    plain = re.sub(r"[\s.\-_:/]+", "", text.upper())
    bare = _PREFIX.sub("", plain)
    bare = re.sub(r"^0+(?=\d)", "", bare)
    found = _WORDS.get(bare, _WORDS.get(plain, bare))
    return found if found in _table().schedules else ""


def look_up(*, nps: ArrayLike, schedule_code: ArrayLike, schedule_names: Sequence[str]) -> PipeDimensions:
    """Outside diameter and wall thickness of steel pipe.

    Parameters
    ----------
    nps : array_like
        Nominal pipe size, [inch]; NaN where missing.
    schedule_code : array_like of int
        Position in `schedule_names`; -1 where missing.
    schedule_names : sequence of str
        Distinct schedules as the list writes them.

    Returns
    -------
    PipeDimensions
        In m. A size that has no such schedule keeps its outside diameter but has no wall; a size that is in no
        standard, or missing, has neither. Nothing is interpolated.

    References
    ----------
    .. [1] ASME B36.10M-2004, welded and seamless wrought steel pipe (metric columns).
    .. [2] ASME B36.19M-2004, stainless steel pipe (metric columns).
    """
    table = _table()
    size = np.asarray(nps, dtype=np.float64)
    code = np.asarray(schedule_code, dtype=np.intp)
    names = [normalised_schedule(name) for name in schedule_names]
    unknown = len(table.schedules)
    columns = np.array([table.schedules.index(name) if name else unknown for name in names] + [unknown], dtype=np.intp)
    column = columns[np.where((code >= 0) & (code < len(names)), code, len(names))]
    row = _row_of(size, table.sizes)
    wall = table.wall[row, column]
    exists = np.isfinite(wall)
    outside = np.where(exists, table.outside[row, column], table.outside_of_size[row])
    return PipeDimensions(outside, wall, exists)


def _row_of(size: FloatArray, sizes: FloatArray) -> NDArray[np.intp]:
    """Row of a size that stands in the table, else the last row."""
    place = np.minimum(np.searchsorted(sizes, size), sizes.size - 1)
    return np.where(np.abs(sizes[place] - size) <= 1e-9 * sizes[place], place, sizes.size).astype(np.intp)
