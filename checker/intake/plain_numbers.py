"""Plain numbers out of many cells at once: digits, one sign, one decimal mark, one exponent, and nothing else.

A number of at most 15 figures is a whole number below 2^53 times or divided by a power of ten of at most 22, both of
which a float64 holds exactly, so the one multiplication or division rounds as ``float`` does (Clinger 1990, "How to
read floating point numbers accurately", fast path). Longer numbers are left to ``float``, all others to the caller;
so are those with a power of ten below -200, which ``float`` might take for zero.
"""

from __future__ import annotations

from dataclasses import dataclass
from enum import IntEnum

import numpy as np
from numpy.typing import NDArray

from checker.model import BoolArray, CodeArray, FloatArray

__all__ = ["PARTING", "Mark", "PlainNumbers", "read_plain"]

#: Stands between two cells of a joined text, and behind the last one.
PARTING = "\0"
_MOST_FIGURES = 15
_MOST_BYTES = 60
_LARGEST_POWER = 22
_SMALLEST_POWER = 200
_POWERS = np.zeros(64)
_POWERS[: _LARGEST_POWER + 1] = 10.0 ** np.arange(_LARGEST_POWER + 1)
_FIGURE = np.zeros(256)
_FIGURE[48:58] = range(10)
# Counts of figures, points, commas, signs and other bytes, six bits each: a text of at most 60 bytes overflows none,
# and the differences of a running sum hold though the sum itself wraps round.
_FIGURES, _POINTS, _COMMAS, _SIGNS, _OTHERS = 0, 6, 12, 18, 24
_SIX_BITS = np.uint32(63)
_KIND = np.full(256, 1 << _OTHERS, dtype=np.uint32)
_KIND[48:58] = 1 << _FIGURES
_KIND[ord(".")] = 1 << _POINTS
_KIND[ord(",")] = 1 << _COMMAS
_KIND[[ord("+"), ord("-")]] = 1 << _SIGNS
_ANY_MARK = np.uint32((1 << _POINTS) | (1 << _COMMAS))
_KIND[[0, ord("e"), ord("E")]] = 0


class Mark(IntEnum):
    """Decimal mark of a plain number: as written, and whether it might as well part thousands (``1,234``)."""

    NONE = 0
    POINT = 1
    COMMA = 2
    POINT_OR_THOUSANDS = 3
    COMMA_OR_THOUSANDS = 4


@dataclass(frozen=True, slots=True)
class PlainNumbers:
    """Numbers of joined cells, one a cell.

    Attributes
    ----------
    values : float array, shape (cells,)
        The number with its mark taken as decimal; NaN where the cell is not plain, as one that begins with noughts.
    marks : int8 array, shape (cells,)
        `Mark` of each plain number.
    long : bool array, shape (cells,)
        True where the cell is a plain number of more figures or a higher power than can be read here.
    blank : bool array, shape (cells,)
        True where the cell is empty.
    noughts : bool array, shape (cells,)
        True where the cell is a whole number without a sign that begins with a nought and has more figures.
    """

    values: FloatArray
    marks: CodeArray
    long: BoolArray
    blank: BoolArray
    noughts: BoolArray


@dataclass(frozen=True, slots=True)
class _Runs:
    """Runs of bytes between partings and exponent letters: value without its mark, and what it is made of."""

    whole: FloatArray
    figures: NDArray[np.uint32]
    decimals: NDArray[np.int64]
    marks: CodeArray
    sound: BoolArray
    noughts: BoolArray
    leading: BoolArray


def read_plain(joined: str) -> PlainNumbers:
    """Read the plain numbers of cells that are each followed by `PARTING`."""
    octets = np.frombuffer(joined.encode("utf-8", "replace"), dtype=np.uint8).astype(np.intp)
    kinds = _KIND.take(octets)
    ends = np.flatnonzero(kinds == 0)
    starts = np.empty_like(ends)
    starts[:1], starts[1:] = 0, ends[:-1] + 1
    closes = octets.take(ends) == 0
    blank = closes & (starts == ends)
    blank[1:] &= closes[:-1]
    filled = np.flatnonzero(~blank)
    numbers = blank[closes]
    values, marks = np.full(numbers.size, np.nan), np.zeros(numbers.size, dtype=np.int8)
    long, noughts = np.zeros(numbers.size, dtype=np.bool_), np.zeros(numbers.size, dtype=np.bool_)
    if filled.size:
        cells = np.flatnonzero(~numbers)
        lead = starts[filled[0]]
        values[cells], marks[cells], long[cells], noughts[cells] = _read_filled(
            octets[lead:], kinds[lead:], starts[filled] - lead, ends[filled] - lead
        )
    return PlainNumbers(values, marks, long, numbers, noughts)


def _read_filled(
    octets: NDArray[np.intp], kinds: NDArray[np.uint32], starts: NDArray[np.int64], ends: NDArray[np.int64]
) -> tuple[FloatArray, CodeArray, BoolArray, BoolArray]:
    """Return value and mark of each cell that is not blank, whether it is too long, and whether it begins with noughts.

    A cell is one run, or two where it has an exponent.
    """
    runs = _read_runs(octets, kinds, starts, ends)
    last = np.flatnonzero(octets.take(ends) == 0)
    power, marks, plain, values, figures = -runs.decimals, runs.marks, runs.sound, runs.whole, runs.figures
    leading, noughts = runs.leading, runs.noughts & runs.sound
    if last.size < ends.size:
        count = np.diff(last, prepend=-1)
        first = last - count + 1
        values, power, marks, figures = values[first], power[first], marks[first], figures[first]
        plain, noughts = plain[first] & (count <= 2), noughts[first] & (count == 1)
        leading = leading[first]
        raised = np.flatnonzero(plain & (count == 2))
        exponent = last[raised]
        plain[raised] = runs.sound[exponent] & (runs.marks[exponent] == Mark.NONE) & (runs.figures[exponent] <= 3)
        raised, exponent = raised[plain[raised]], exponent[plain[raised]]
        power[raised] += runs.whole[exponent].astype(np.int64)
        marks[raised[marks[raised] > Mark.COMMA]] -= np.int8(Mark.COMMA)
    plain &= (power >= -_SMALLEST_POWER) & ~leading
    exact = plain & (figures <= _MOST_FIGURES) & (np.abs(power) <= _LARGEST_POWER)
    scale = _POWERS.take(np.minimum(np.abs(power), _LARGEST_POWER))
    values = np.where(power < 0, values / scale, values * scale)
    values[~exact] = np.nan
    marks *= plain
    return values, marks, plain & ~exact, noughts


def _read_runs(
    octets: NDArray[np.intp], kinds: NDArray[np.uint32], starts: NDArray[np.int64], ends: NDArray[np.int64]
) -> _Runs:
    running = np.cumsum(kinds, dtype=np.uint32)
    at_end = running.take(ends)
    counts = np.diff(at_end, prepend=np.uint32(0))
    figures, points, commas, signs = (
        (counts >> np.uint32(shift)) & _SIX_BITS for shift in (_FIGURES, _POINTS, _COMMAS, _SIGNS)
    )
    length = ends - starts
    following = np.diff(starts, append=octets.size)
    behind = (np.repeat(at_end, following) - running) & _SIX_BITS
    whole = np.add.reduceat(_FIGURE.take(octets) * _POWERS.take(behind), starts)
    leading = octets.take(starts)
    signed = (leading == 43) | (leading == 45)
    sound = (figures >= 1) & (points + commas <= 1) & (signs == signed)
    sound &= (length <= _MOST_BYTES) & (counts >> np.uint32(_OTHERS) == 0)
    decimals = np.zeros(ends.size, dtype=np.int64)
    marked = np.flatnonzero(sound & (points + commas == 1))
    decimals[marked] = _figures_behind_mark(kinds, behind, starts, marked)
    doubtful = (decimals == 3) & (figures >= 4) & (figures <= 6) & (octets.take(starts + signed) != 48)
    marks = (points + 2 * commas + 2 * doubtful).astype(np.int8)
    several = (figures >= 2) & (marks == Mark.NONE)
    zeros = several & (octets.take(starts + signed) == 48)
    return _Runs(
        np.where(leading == 45, -whole, whole), figures, decimals, marks, sound, several & (leading == 48), zeros
    )


def _figures_behind_mark(
    kinds: NDArray[np.uint32],
    behind: NDArray[np.uint32],
    starts: NDArray[np.int64],
    marked: NDArray[np.int64],
) -> NDArray[np.uint32]:
    """Return how many figures stand behind the one mark of each marked run."""
    places = np.flatnonzero((kinds & _ANY_MARK) != 0)
    return behind.take(places.take(np.searchsorted(places, starts.take(marked))))
