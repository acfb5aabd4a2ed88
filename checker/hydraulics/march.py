"""Integration along two-phase lines: Runge-Kutta of fourth order, steps by line, cut where the regime changes.

All lines are marched together, each with its own step: its width comes from the line's own pressure-drop ratio
there, and a step in which the flow regime (or laminar and turbulent) changes is halved until it ends at the change.
A line that has arrived, choked or run dry leaves; nothing in the result of a line depends on its neighbours.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from typing import Any, NamedTuple

import numpy as np
from numpy.typing import NDArray

from checker.hydraulics.arrays import BoolArray, FloatArray, gauss_legendre
from checker.hydraulics.two_phase_line import Method, Slice, TwoPhaseLine, slice_at

Values = NDArray[Any]

_WIDEST, _SMALLEST = 0.25, 1.0 / 8192.0
#: Share of the pressure that one step may take, and that share per distance of the acceleration factor from one.
_RATIO_OF_STEP, _RATIO_NEAR_CHOKING = 0.0125, 0.03
#: A step is halved down to this share of its full width before it crosses a change of regime.
_NARROWEST = 2.0**-24
#: Steps after which a line is given up: it hovers on a border of flow regimes.
_LIMIT = 2000
#: Parts carried along: those of Slice from friction to slip, then the pressure term of the ledger.
PARTS = ("friction", "fittings", "elevation", "acceleration", "loss_pipe", "loss_fittings", "slip", "pressure_term")


class March(NamedTuple):
    """End of the march: pressure, summed parts (rows as in `PARTS`), and why it stopped before."""

    pressure: FloatArray
    parts: FloatArray
    choked: BoolArray
    used_up: BoolArray


class _Point(NamedTuple):
    pressure: FloatArray
    place: FloatArray
    terms: Slice


class _Walk:
    """State of the lines under way; `rows` are their places in the result."""

    def __init__(self, line: TwoPhaseLine, start: FloatArray, method: Method, downstream: BoolArray) -> None:
        place = np.where(downstream, 0.0, 1.0)
        terms = slice_at(line, start, place, method)
        full = _width(terms, start)
        self.sign = np.where(downstream, 1.0, -1.0)
        self.line, self.point = line, _Point(start, place, terms)
        self.full, self.width, self.left = full, full, np.ones_like(start)
        self.narrowing = np.zeros(start.shape, dtype=np.bool_)
        self.parts = np.zeros((len(PARTS), start.size))
        self.rows = np.arange(start.size)

    def keep(self, going: BoolArray) -> None:
        """Let the other lines leave."""
        if bool(np.all(going)):
            return
        self.line = self.line.take(going)
        terms = Slice._make(values[going] for values in self.point.terms)
        self.point = _Point(self.point.pressure[going], self.point.place[going], terms)
        self.full, self.width, self.left = self.full[going], self.width[going], self.left[going]
        self.narrowing, self.parts, self.rows = self.narrowing[going], self.parts[:, going], self.rows[going]
        self.sign = self.sign[going]

    def accept(self, taken: BoolArray, ahead: _Point, gain: FloatArray, width: FloatArray) -> None:
        """Go on to the point ahead where the step is taken."""
        terms = Slice._make(_chosen(taken, ahead.terms, self.point.terms))
        self.point = _Point(
            np.where(taken, ahead.pressure, self.point.pressure), np.where(taken, ahead.place, self.point.place), terms
        )
        self.parts = self.parts + np.where(taken, gain, 0.0)
        self.left = np.where(taken, self.left - width, self.left)


def _chosen(taken: BoolArray, new: Iterable[Values], old: Iterable[Values]) -> Iterator[Values]:
    """New values where the step is taken, else the old ones, array by array."""
    return (np.where(taken, one, other) for one, other in zip(new, old, strict=True))


def march(
    line: TwoPhaseLine, start: FloatArray, method: Method, *, downstream: BoolArray, ledger: bool = False
) -> March:
    """Pressure at the far end of each line, marched from its near end.

    Parameters
    ----------
    line : TwoPhaseLine
        The lines.
    start : ndarray
        Pressure of the plane at the known end, [Pa].
    method : str
        "beggs-brill" or "homogeneous".
    downstream : ndarray of bool
        True from inlet to outlet, False the other way; the parts always come as from inlet to outlet.
    ledger : bool
        Whether to carry the pressure term of the engineering Bernoulli balance along too.

    Returns
    -------
    March
        NaN where the pressure is used up, the acceleration factor reaches one, or an argument is NaN.
    """
    walk = _Walk(line, start, method, downstream)
    result = March(
        np.full_like(start, np.nan),
        np.full((len(PARTS), start.size), np.nan),
        walk.point.terms.acceleration_factor >= 1.0,
        np.zeros(start.shape, dtype=np.bool_),
    )
    walk.keep(np.isfinite(walk.full))
    for _ in range(_LIMIT):
        if walk.rows.size == 0:
            break
        _advance(walk, method, ledger, result)
    result.parts[:] = np.where(downstream, result.parts, -result.parts)
    return result


def _width(terms: Slice, pressure: FloatArray) -> FloatArray:
    """Width of the next step; NaN where the line cannot go on."""
    allowed = np.minimum(_RATIO_OF_STEP, _RATIO_NEAR_CHOKING * (1.0 - terms.acceleration_factor))
    width = np.clip(allowed * pressure / np.abs(terms.drop), _SMALLEST, _WIDEST)
    return np.where(terms.acceleration_factor < 1.0, width, np.nan)


def _advance(walk: _Walk, method: Method, ledger: bool, result: March) -> None:
    width = np.minimum(walk.width, walk.left)
    ahead, gain, fast, dry, crosses = _step(walk.line, walk.point, walk.sign * width, method, ledger)
    narrow = width <= walk.full * _NARROWEST
    failed = fast | dry
    taken = ~failed & (~crosses | narrow)
    walk.accept(taken, ahead, gain, width)
    # Within the halving every next step is half as wide, whether or not the last one was taken.
    walk.narrowing = (walk.narrowing | crosses) & ~narrow
    walk.full = np.where(walk.narrowing, walk.full, _width(walk.point.terms, walk.point.pressure))
    walk.width = np.where(walk.narrowing, 0.5 * width, walk.full)
    arrived = walk.left <= 0.0
    rows = walk.rows
    result.pressure[rows[arrived]] = walk.point.pressure[arrived]
    result.parts[:, rows[arrived]] = walk.parts[:, arrived]
    result.choked[rows[fast]] = True
    result.used_up[rows[dry & ~fast]] = True
    walk.keep(~(arrived | failed))


def _step(
    line: TwoPhaseLine, point: _Point, width: FloatArray, method: Method, ledger: bool
) -> tuple[_Point, FloatArray, BoolArray, BoolArray, BoolArray]:
    """One Runge-Kutta step: the point ahead, the parts gained, whether it choked, ran dry or met another regime."""
    slices = [point.terms]
    middle, place = point.place + 0.5 * width, point.place + width
    for share in (0.5, 0.5, 1.0):
        trial = point.pressure - share * width * slices[-1].drop
        slices.append(slice_at(line, trial, middle if share < 1.0 else place, method))
    pressure = point.pressure - width * _mean([s.drop for s in slices])
    end = slice_at(line, pressure, place, method)
    fast, crosses = end.acceleration_factor >= 1.0, end.branch != point.terms.branch
    for one in slices[1:]:
        fast = fast | (one.acceleration_factor >= 1.0)
        crosses = crosses | (one.branch != point.terms.branch)
    dry = ~np.isfinite(pressure) | ~np.isfinite(end.drop)
    ahead = _Point(pressure, place, end)
    gain = np.empty((len(PARTS), pressure.size))
    for row, name in enumerate(PARTS[:7]):
        gain[row] = width * _mean([getattr(s, name) for s in slices])
    gain[7] = _pressure_term(line, point, ahead, width) if ledger else 0.0
    return ahead, gain, fast, dry, crosses & ~(fast | dry)


def _mean(values: list[FloatArray]) -> FloatArray:
    first, second, third, fourth = values
    return (first + 2.0 * (second + third) + fourth) / 6.0


def _pressure_term(line: TwoPhaseLine, point: _Point, ahead: _Point, width: FloatArray) -> FloatArray:
    """Integral of dp / rho over a step, by quadrature along the cubic through both ends and their slopes."""
    fall = point.pressure - ahead.pressure
    slope_near, slope_far = width * point.terms.drop - fall, width * ahead.terms.drop - fall
    total = np.zeros_like(width)
    for node, weight in gauss_legendre(4):
        rest = 1.0 - node
        bend = slope_near * node * rest * rest - slope_far * node * node * rest
        pressure = point.pressure - fall * node - bend
        speed = fall + slope_near * rest * (1.0 - 3.0 * node) - slope_far * node * (2.0 - 3.0 * node)
        total = total + weight * speed / line.density(pressure, point.place + width * node)
    return total
